package report

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"os"
	"slices"
)

// ErrFormat says that a file is not a result file of this layout.
var ErrFormat = errors.New("report: not a result file of format " + Format)

// Encode writes the file as JSON, laid out for people: what fits on a line stands on one.
func (f *File) Encode(w io.Writer) error { return encode(w, f) }

// Decode reads a result file back. It returns an error that wraps [ErrFormat] if the input is something else.
func Decode(r io.Reader) (*File, error) {
	src, err := io.ReadAll(r)
	if err != nil {
		return nil, fmt.Errorf("report: %w", err)
	}
	var head struct {
		Format string `json:"format"`
	}
	if err := json.Unmarshal(src, &head); err != nil || head.Format != Format {
		return nil, ErrFormat
	}
	f := new(File)
	if err := json.Unmarshal(src, f); err != nil {
		return nil, fmt.Errorf("%w: %w", ErrFormat, err)
	}
	return f, nil
}

// Read reads a result file back from disk.
func Read(path string) (*File, error) {
	in, err := os.Open(path)
	if err != nil {
		return nil, fmt.Errorf("report: %w", err)
	}
	defer in.Close() //nolint:errcheck // only read from
	return Decode(in)
}

func encode(w io.Writer, v any) error {
	raw, err := json.Marshal(v)
	if err != nil {
		return fmt.Errorf("report: %w", err)
	}
	var out bytes.Buffer
	layOut(&out, raw, 0, 0)
	out.WriteByte('\n')
	_, err = out.WriteTo(w)
	return err
}

// EncodeWithFiles writes a result file, given as its bytes, with another list of files; every other field stays as it is, those of later
// versions included. It returns an error that wraps [ErrFormat] if the bytes are something else.
func EncodeWithFiles(w io.Writer, raw []byte, files []string) error {
	var compact, out bytes.Buffer
	if err := json.Compact(&compact, raw); err != nil || compact.Len() < 2 || compact.Bytes()[0] != '{' {
		return ErrFormat
	}
	list, err := json.Marshal(files)
	if err != nil {
		return fmt.Errorf("report: %w", err)
	}
	key := []byte(`"files":`)
	fields := items(compact.Bytes())
	for i, f := range fields {
		if bytes.HasPrefix(f, key) {
			fields[i] = append(key, list...)
		}
	}
	layOut(&out, slices.Concat([]byte("{"), bytes.Join(fields, []byte(",")), []byte("}")), 0, 0)
	out.WriteByte('\n')
	_, err = out.WriteTo(w)
	return err
}

// lineWidth is the width up to which an object or array stands on one line.
const lineWidth = 120

// layOut writes compact, valid JSON with line breaks in those objects and arrays only that do not fit on a line. The value starts at
// the given column of a line whose indent is depth steps.
func layOut(out *bytes.Buffer, raw []byte, depth, column int) {
	if c := raw[0]; c != '{' && c != '[' || len(raw) == 2 {
		out.Write(raw)
		return
	}
	if column+len(raw) < lineWidth {
		if spaced := space(raw); column+len(spaced) < lineWidth {
			out.Write(spaced)
			return
		}
	}
	out.WriteByte(raw[0])
	indent := 2 * (depth + 1)
	for i, item := range items(raw) {
		if i > 0 {
			out.WriteByte(',')
		}
		newLine(out, indent)
		at := indent
		if raw[0] == '{' {
			k := stringEnd(item)
			out.Write(item[:k])
			out.WriteString(": ")
			item, at = item[k+1:], at+k+2
		}
		layOut(out, item, depth+1, at)
	}
	newLine(out, 2*depth)
	out.WriteByte(raw[len(raw)-1])
}

func newLine(out *bytes.Buffer, indent int) {
	out.WriteByte('\n')
	for range indent {
		out.WriteByte(' ')
	}
}

// space puts a blank behind every comma and colon outside strings.
func space(raw []byte) []byte {
	out := make([]byte, 0, len(raw)+len(raw)/4)
	for i := 0; i < len(raw); i++ {
		switch raw[i] {
		case '"':
			k := i + stringEnd(raw[i:])
			out = append(out, raw[i:k]...)
			i = k - 1
		case ',', ':':
			out = append(out, raw[i], ' ')
		default:
			out = append(out, raw[i])
		}
	}
	return out
}

// items splits a compact object or array at its commas.
func items(raw []byte) [][]byte {
	var out [][]byte
	level, start := 0, 1
	for i := 0; i < len(raw); i++ {
		switch raw[i] {
		case '"':
			i += stringEnd(raw[i:]) - 1
		case '{', '[':
			level++
		case '}', ']':
			level--
		case ',':
			if level == 1 {
				out = append(out, raw[start:i])
				start = i + 1
			}
		}
	}
	return append(out, raw[start:len(raw)-1])
}

// stringEnd returns the index behind the string that raw begins with.
func stringEnd(raw []byte) int {
	for i := 1; i < len(raw); i++ {
		switch raw[i] {
		case '\\':
			i++
		case '"':
			return i + 1
		}
	}
	return len(raw)
}
