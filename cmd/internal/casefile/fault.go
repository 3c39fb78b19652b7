package casefile

import (
	"errors"
	"fmt"
	"sort"
	"strings"
)

// Fault is one thing that is wrong with a case file.
type Fault struct {
	File         string
	Line, Column int    // From 1, the column in characters; 0: the fault has no place in the file.
	Path         string // Keys down to the value, such as "soils.stiff clay.unit_weight"; list items count from 1.
	Message      string // What is wrong.
	Suggestion   string // What would be right; may be empty.
	LineText     string // The line that the fault is on.
}

// Error returns the fault as `file:line:column: path: message`, then the line with a caret under the column, then the suggestion.
func (f *Fault) Error() string {
	var b strings.Builder
	b.WriteString(f.File)
	if f.Line > 0 {
		fmt.Fprintf(&b, ":%d:%d", f.Line, f.Column)
	}
	b.WriteString(": ")
	if f.Path != "" {
		b.WriteString(f.Path + ": ")
	}
	b.WriteString(f.Message)
	if f.LineText != "" {
		fmt.Fprintf(&b, "\n%6d | %s\n       | %s^", f.Line, f.LineText, caretIndent(f.LineText, f.Column))
	}
	if f.Suggestion != "" {
		b.WriteString("\n         " + f.Suggestion)
	}
	return b.String()
}

// caretIndent returns the blanks that put a caret under the column of the line. Tabs stay tabs, so that both lines up alike.
func caretIndent(line string, column int) string {
	var b strings.Builder
	for i, c := range []rune(line) {
		if i >= column-1 {
			break
		}
		if c == '\t' {
			b.WriteRune('\t')
		} else {
			b.WriteRune(' ')
		}
	}
	return b.String()
}

// Faults returns the faults joined in an error from [Read] or [Parse], in the order of the file; nil if it holds none.
func Faults(err error) []*Fault {
	var one *Fault
	if joined, ok := err.(interface{ Unwrap() []error }); ok {
		var all []*Fault
		for _, e := range joined.Unwrap() {
			all = append(all, Faults(e)...)
		}
		return all
	}
	if errors.As(err, &one) {
		return []*Fault{one}
	}
	return nil
}

// maxFaults bounds the list of faults: nobody reads more, and a wrong file can hold one on every line.
const maxFaults = 100

// joinFaults returns the faults as one error in the order of the file; nil if there are none.
func joinFaults(faults []*Fault) error {
	sort.SliceStable(faults, func(i, j int) bool {
		a, b := faults[i], faults[j]
		if a.Line != b.Line {
			return a.Line < b.Line
		}
		return a.Column < b.Column
	})
	more := len(faults) - maxFaults
	if more > 0 {
		faults = append(faults[:maxFaults:maxFaults], &Fault{File: faults[0].File, Message: fmt.Sprintf("%d more faults are not listed", more)})
	}
	errs := make([]error, len(faults))
	for i, f := range faults {
		errs[i] = f
	}
	return errors.Join(errs...)
}
