package dxf

import (
	"bytes"
	"fmt"
	"math"
	"strconv"
	"strings"
)

// Polyline is a line or polyline that was read.
type Polyline struct {
	Layer  string
	Points []Point
	Closed bool
	Curved bool // Some of its parts are arcs, of which only the ends are kept.
	Line   int  // Of the file on which it starts, from 1.
}

// File is what is kept of a drawing.
type File struct {
	Polylines []Polyline // In the order of the file.
	Units     int        // As the header says: 0 none said, 4 millimetres, 5 centimetres, 6 metres.
	Left      []string   // Kinds of entities that were not kept, each once, in the order of the file.
}

// The units that a header can name and that a section is drawn in.
const (
	Unitless    = 0
	Millimetres = 4
	Centimetres = 5
	Metres      = 6
)

// Error is what is wrong with a file.
type Error struct {
	Line    int // From 1; 0: the file as a whole.
	Message string
}

// Error returns the message with its line.
func (e *Error) Error() string {
	if e.Line == 0 {
		return "dxf: " + e.Message
	}
	return fmt.Sprintf("dxf: line %d: %s", e.Line, e.Message)
}

// Read reads the lines and polylines of a drawing in text form, of any release. Blocks are not looked into. Its error is an [*Error].
func Read(src []byte) (*File, error) {
	if bytes.HasPrefix(src, []byte("AutoCAD Binary DXF")) {
		return nil, &Error{Message: "the drawing is in the binary form; save it as text (ASCII) DXF"}
	}
	r := &reader{rest: bytes.TrimPrefix(src, []byte("\xef\xbb\xbf")), out: &File{}, seen: map[string]bool{}}
	for r.next() {
		if err := r.take(); err != nil {
			return nil, err
		}
	}
	if r.err != nil {
		return nil, r.err
	}
	if !r.ended {
		return nil, &Error{Line: r.line, Message: "the file ends before its end mark (0, EOF): it is no DXF or was cut short"}
	}
	return r.out, nil
}

// reader walks through the pairs of a file.
type reader struct {
	rest    []byte
	line    int // Of the value in hand.
	code    int
	value   string
	err     *Error
	out     *File
	section string
	header  string // Variable of the header in hand.
	open    *Polyline
	kind    string // Entity in hand.
	vertex  bool   // The pairs in hand are those of a vertex.
	half    bool   // An x was read and its y was not yet.
	ended   bool
	seen    map[string]bool
}

// lineOf takes the next line off the file.
func (r *reader) lineOf() (string, bool) {
	if len(r.rest) == 0 {
		return "", false
	}
	line, rest, _ := bytes.Cut(r.rest, []byte("\n"))
	r.rest = rest
	r.line++
	return string(bytes.TrimRight(line, "\r")), true
}

// next reads a pair and reports whether there is one.
func (r *reader) next() bool {
	if r.ended || r.err != nil {
		return false
	}
	text, ok := r.lineOf()
	if !ok || strings.TrimSpace(text) == "" && len(bytes.TrimSpace(r.rest)) == 0 {
		return false
	}
	code, err := strconv.Atoi(strings.TrimSpace(text))
	if err != nil {
		r.err = &Error{Line: r.line, Message: fmt.Sprintf("%q is no group code: the file is no text DXF", clip(text))}
		return false
	}
	r.code = code
	if r.value, ok = r.lineOf(); !ok {
		r.err = &Error{Line: r.line, Message: "a group code without a value"}
		return false
	}
	if r.value = strings.TrimSpace(r.value); code == 0 && r.value == "EOF" {
		r.ended = true
	}
	return true
}

// clip shortens a text for a message.
func clip(s string) string {
	const most = 40
	if r := []rune(s); len(r) > most {
		return string(r[:most]) + "…"
	}
	return s
}

// take deals with the pair in hand.
func (r *reader) take() error {
	switch {
	case r.code == 0:
		r.begin()
	case r.code == 2 && r.kind == "SECTION":
		r.section = r.value
	case r.section == "HEADER" && r.code == 9:
		r.header = r.value
	case r.section == "HEADER" && r.header == "$INSUNITS" && r.code == 70:
		units, err := strconv.Atoi(r.value)
		if err != nil {
			return r.wrong("a whole number")
		}
		r.out.Units = units
	case r.section == "ENTITIES" && r.open != nil:
		return r.pair()
	}
	return nil
}

// begin starts the entity whose name is in hand.
func (r *reader) begin() {
	r.kind = r.value
	if r.section != "ENTITIES" {
		return
	}
	r.vertex = r.kind == "VERTEX"
	switch r.kind {
	case "VERTEX":
	case "LINE", "LWPOLYLINE", "POLYLINE":
		r.finish()
		r.open = &Polyline{Line: r.line}
	default:
		r.finish()
		switch {
		case r.kind == "ENDSEC":
			r.section = ""
		case r.kind != "SEQEND" && !r.seen[r.kind]:
			r.seen[r.kind] = true
			r.out.Left = append(r.out.Left, r.kind)
		}
	}
}

// finish keeps the polyline in hand.
func (r *reader) finish() {
	switch {
	case r.half:
		r.err = &Error{Line: r.line, Message: "the entity before has a point with x and no y"}
	case r.open != nil && len(r.open.Points) > 0:
		r.out.Polylines = append(r.out.Polylines, *r.open)
	}
	r.open, r.half = nil, false
}

// pair deals with a pair of the polyline in hand, or of one of its vertices.
func (r *reader) pair() error {
	polyline := r.kind == "POLYLINE"
	switch r.code {
	case 8:
		if !r.vertex {
			r.open.Layer = r.value
		}
	case 10, 11:
		if polyline || r.code == 11 && r.kind != "LINE" {
			return nil // A formality of old polylines.
		}
		if r.half {
			return &Error{Line: r.line, Message: "a point with x and no y before"}
		}
		x, err := r.real()
		if err != nil {
			return err
		}
		r.open.Points = append(r.open.Points, Point{X: x, Y: math.NaN()})
		r.half = true
	case 20, 21:
		if polyline || !r.half {
			return nil
		}
		y, err := r.real()
		if err != nil {
			return err
		}
		r.open.Points[len(r.open.Points)-1].Y, r.half = y, false
	case 42:
		bulge, err := r.real()
		if err != nil {
			return err
		}
		r.open.Curved = r.open.Curved || bulge != 0
	case 70:
		if r.vertex || r.kind == "LINE" {
			return nil
		}
		flags, err := strconv.Atoi(r.value)
		if err != nil {
			return r.wrong("a whole number")
		}
		r.open.Closed = flags&1 != 0
	}
	return nil
}

// real reads a finite number.
func (r *reader) real() (float64, error) {
	v, err := strconv.ParseFloat(r.value, 64)
	if err != nil || math.IsNaN(v) || math.IsInf(v, 0) {
		return 0, r.wrong("a number")
	}
	return v, nil
}

func (r *reader) wrong(want string) error {
	return &Error{Line: r.line, Message: fmt.Sprintf("%q is not %s", clip(r.value), want)}
}
