package casefile

import (
	"bytes"
	"crypto/sha256"
	"encoding/hex"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"
	"unicode/utf8"

	"go.yaml.in/yaml/v4"

	"standfast/remedies"
)

// MaxSize is the greatest size of a case file, bytes.
const MaxSize = 5 << 20

// Case is a case file that has been read.
type Case struct {
	Job      *remedies.Job
	File     string   // Name of the file, as given.
	SHA256   string   // Of the file's bytes, in hexadecimal.
	Source   string   // The file's text.
	Finished bool     // A proposed section, which names the ground before works: it is assessed, and nothing is sized on it.
	Notes    []string // What was deduced or holds without being written, to be printed.
	Warnings []string // What is legal but probably not meant, each with file and line.
}

// Read reads the case file at path. Its error joins one [*Fault] for each thing wrong with the file (see [Faults]), or is the
// operating system's error if the file cannot be read.
func Read(path string) (*Case, error) {
	f, err := os.Open(path)
	if err != nil {
		return nil, fmt.Errorf("casefile: %w", err)
	}
	defer f.Close() //nolint:errcheck // only read from
	src, err := io.ReadAll(io.LimitReader(f, MaxSize+1))
	if err != nil {
		return nil, fmt.Errorf("casefile: %w", err)
	}
	return Parse(filepath.ToSlash(path), src)
}

// Parse reads a case file from memory; name is what faults call it. Its error joins one [*Fault] for each thing wrong.
func Parse(name string, src []byte) (*Case, error) {
	r := &reader{file: name, bad: map[*yaml.Node]bool{}}
	root := r.tree(src)
	if len(r.faults) > 0 {
		return nil, joinFaults(r.faults)
	}
	r.check(caseShape(), root)
	b := r.build(root)
	if len(r.faults) > 0 {
		return nil, joinFaults(r.faults)
	}
	sum := sha256.Sum256(src)
	return &Case{
		Job: &b.job, File: name, SHA256: hex.EncodeToString(sum[:]), Source: string(src),
		Finished: b.finished, Notes: r.notes, Warnings: r.warned,
	}, nil
}

// tree returns the mapping at the top of the file; it records a fault if there is none.
func (r *reader) tree(src []byte) value {
	if len(src) > MaxSize {
		r.faultAt(nil, "", "", "the file is larger than %d MB", MaxSize>>20)
		return value{}
	}
	src = bytes.TrimPrefix(src, []byte("\xef\xbb\xbf"))
	r.lines = strings.Split(string(src), "\n")
	if !r.checkBytes(src) {
		return value{}
	}
	loader, err := yaml.NewLoader(bytes.NewReader(src))
	if err != nil {
		r.syntaxFault(err)
		return value{}
	}
	var document, second yaml.Node
	if err := loader.Load(&document); err != nil || len(document.Content) == 0 {
		r.syntaxFault(err)
		return value{}
	}
	if err := loader.Load(&second); !errors.Is(err, io.EOF) {
		if err != nil {
			r.syntaxFault(err)
		} else {
			r.faultAt(&second, "", "keep one case in a file", "a second document starts here")
		}
		return value{}
	}
	top := value{node: document.Content[0]}
	if top.node.Kind != yaml.MappingNode {
		r.addFault(top, "start with `title: …`, one key in each line", "the file is not a mapping of keys to values")
	}
	return top
}

// checkBytes records a fault at the first byte that no text has, since the YAML library gives no position for it.
func (r *reader) checkBytes(src []byte) bool {
	for i, line := range r.lines {
		column := 0
		for rest := line; len(rest) > 0; {
			c, n := utf8.DecodeRuneInString(rest)
			column++
			if c == utf8.RuneError && n == 1 || c < ' ' && c != '\t' && c != '\r' || c == 0x7f {
				at := &yaml.Node{Line: i + 1, Column: column}
				r.lines[i] = strings.ToValidUTF8(strings.Map(visible, line), "?")
				r.faultAt(at, "", "save the file as plain text in UTF-8", "a byte that is not text")
				return false
			}
			rest = rest[n:]
		}
	}
	return utf8.Valid(src)
}

// visible replaces control characters, so that a line can be shown.
func visible(c rune) rune {
	if c < ' ' && c != '\t' || c == 0x7f {
		return '?'
	}
	return c
}

// syntaxWords puts the YAML library's messages into words for people who write case files.
var syntaxWords = []struct{ has, message, suggestion string }{
	{"mapping values are not allowed", "a colon where none can be", "check the indentation; put text that holds `: ` in quotes"},
	{"did not find expected ',' or ']'", "a list opened with `[` is not closed", "add the missing `]` or comma"},
	{"did not find expected ',' or '}'", "a mapping opened with `{` is not closed", "add the missing `}` or comma"},
	{"found character that cannot start any token", "a tab or another character that cannot stand here", "indent with blanks; put text that starts with a sign in quotes"},
	{"could not find expected ':'", "a key without a colon", "write `key: value`"},
	{"found unexpected end of stream", "the text in quotes is not closed", "add the missing quote"},
	{"did not find expected node content", "a value is missing", "check for a list or mapping that is not closed"},
	{"did not find expected key", "the indentation does not fit the lines above", "give keys of one mapping the same indentation"},
	{"did not find expected '-' indicator", "the indentation does not fit the list above", "start each item with `- ` in the same column"},
	{"unknown anchor", "an alias, which the case file does not have", "write the value out, or put the text in quotes"},
}

// syntaxFault records an error of the YAML library; nil stands for an empty file.
func (r *reader) syntaxFault(err error) {
	var load *yaml.LoadError
	if err == nil || errors.Is(err, io.EOF) {
		r.faultAt(nil, "", "`standfast new FILE` writes a case to start from", "the file is empty")
		return
	}
	if !errors.As(err, &load) {
		r.faultAt(nil, "", "", "the file is not YAML")
		return
	}
	message, suggestion := "not YAML: "+load.Message, ""
	for _, w := range syntaxWords {
		if strings.Contains(load.Message, w.has) {
			message, suggestion = w.message, w.suggestion
		}
	}
	line, column := load.Mark.Line, load.Mark.Column
	if c := load.ContextMark; c.Line > 0 && c.Line < line {
		line, column = c.Line, c.Column // where the unfinished part starts, which is what the reader looks for
	}
	r.faultAt(&yaml.Node{Line: line, Column: column}, "", suggestion, "%s", message)
}
