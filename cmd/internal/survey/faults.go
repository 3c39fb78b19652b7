package survey

import (
	"errors"
	"fmt"
	"strings"

	"standfast/cmd/internal/casefile"
)

// MaxSize is the greatest size of a survey file, bytes.
const MaxSize = 50 << 20

// maxFaults is the number of faults after which a file is read no further.
const maxFaults = 100

// faults collects what is wrong with a file.
type faults struct {
	file string
	list []*casefile.Fault
}

// add records a fault; line 0 stands for the file as a whole.
func (f *faults) add(line int, text, suggestion, format string, args ...any) {
	fault := &casefile.Fault{File: f.file, Line: line, Message: fmt.Sprintf(format, args...), Suggestion: suggestion}
	if line > 0 {
		fault.Column, fault.LineText = 1, shown(text)
	}
	f.list = append(f.list, fault)
}

// addAt records a fault at a column of a line, from 1, in characters.
func (f *faults) addAt(line, column int, text, suggestion, format string, args ...any) {
	f.add(line, text, suggestion, format, args...)
	f.list[len(f.list)-1].Column = column
}

func (f *faults) full() bool { return len(f.list) >= maxFaults }

func (f *faults) err() error {
	errs := make([]error, len(f.list))
	for i, fault := range f.list {
		errs[i] = fault
	}
	return errors.Join(errs...)
}

// shown returns a line as it is shown with a fault.
func shown(s string) string {
	const most = 240
	r := []rune(strings.Map(func(c rune) rune {
		if c < ' ' && c != '\t' || c == 0x7f {
			return ' '
		}
		return c
	}, strings.ToValidUTF8(strings.TrimRight(s, "\r\n"), "?")))
	return string(r[:min(len(r), most)])
}

// checkSize refuses a file that is too large.
func (f *faults) checkSize(src []byte) bool {
	if len(src) > MaxSize {
		f.add(0, "", "keep what lies near the section", "the file is larger than %d MB", MaxSize>>20)
		return false
	}
	return true
}
