package dxf

import (
	"bufio"
	"cmp"
	"fmt"
	"io"
	"math"
	"slices"
	"strconv"
	"strings"
)

// Point is a position in the drawing.
type Point struct{ X, Y float64 }

// LineType is a pattern of lines.
type LineType string

// The line types.
const (
	Solid   LineType = "CONTINUOUS"
	Dashed  LineType = "DASHED"
	DashDot LineType = "DASHDOT"
)

// Layer is a layer of a drawing.
type Layer struct {
	Name   string // Letters, digits, "-" and "_", 31 at most.
	Colour int    // Index of a colour, 1 to 255; 7 is black on paper.
	Line   LineType
}

// Drawing is a drawing to be written. The zero value is empty.
type Drawing struct {
	Layers   []Layer
	Dash     float64 // Length of a dash, m; 0: 1 m.
	entities []entity
}

// entity is one thing drawn, as pairs of a group code and a value.
type entity struct {
	layer string
	pairs []pair
}

type pair struct {
	code  int
	value string
}

// decimals are those of a coordinate: a micrometre.
const decimals = 6

// number writes a coordinate; always with a point, which some readers take for the mark of a real number.
func number(v float64) string {
	s := strings.TrimRight(strconv.FormatFloat(v, 'f', decimals, 64), "0")
	if strings.HasSuffix(s, ".") {
		s += "0"
	}
	if s == "-0.0" {
		return "0.0"
	}
	return s
}

func at(code int, p Point) []pair {
	return []pair{{code, number(p.X)}, {code + 10, number(p.Y)}, {code + 20, "0.0"}}
}

func (d *Drawing) add(layer, kind string, pairs ...[]pair) {
	d.entities = append(d.entities, entity{layer, slices.Concat([]pair{{0, kind}, {8, layer}}, slices.Concat(pairs...))})
}

// Line draws a straight line.
func (d *Drawing) Line(layer string, a, b Point) { d.add(layer, "LINE", at(10, a), at(11, b)) }

// Polyline draws straight lines from point to point, and back to the first if it is closed. Fewer than two points draw nothing.
func (d *Drawing) Polyline(layer string, points []Point, closed bool) {
	if len(points) < 2 {
		return
	}
	flag := "0"
	if closed {
		flag = "1"
	}
	d.add(layer, "POLYLINE", []pair{{66, "1"}}, at(10, Point{}), []pair{{70, flag}})
	for _, p := range points {
		d.add(layer, "VERTEX", at(10, p))
	}
	d.add(layer, "SEQEND")
}

// Arc draws an arc anticlockwise from one angle to the other, rad.
func (d *Drawing) Arc(layer string, centre Point, radius, from, to float64) {
	d.add(layer, "ARC", at(10, centre), []pair{{40, number(radius)}, {50, angle(from)}, {51, angle(to)}})
}

// angle writes an angle in degrees from 0 up to 360.
func angle(rad float64) string {
	const turn = 360
	return number(math.Mod(math.Mod(rad*180/math.Pi, turn)+turn, turn))
}

// Text writes a line of text whose baseline starts at a point and runs at an angle, rad; height is that of its capitals, m.
func (d *Drawing) Text(layer string, p Point, height, turn float64, text string) {
	d.add(layer, "TEXT", at(10, p), []pair{{40, number(height)}, {1, escape(text)}, {50, angle(turn)}, {7, styleName}})
}

const (
	styleName  = "STANDARD"
	textFactor = 0.8 // Width of letters: the plain stroke font of readers runs wide.
)

// escape writes text in ASCII. Backslashes and per cent signs, which start codes, are written so that they start none.
func escape(s string) string {
	var b strings.Builder
	for _, r := range s {
		switch {
		case r < ' ' || r == 0x7f:
			b.WriteByte(' ')
		case r > 0xffff:
			b.WriteByte('?')
		case r > 0x7e || r == '\\' || r == '%':
			fmt.Fprintf(&b, `\U+%04X`, r)
		default:
			b.WriteRune(r)
		}
	}
	return b.String()
}

// Write writes the drawing. It returns the error of w.
func (d *Drawing) Write(w io.Writer) error {
	out := bufio.NewWriter(w)
	put := func(pairs ...pair) {
		for _, p := range pairs {
			fmt.Fprintf(out, "%3d\r\n%s\r\n", p.code, p.value)
		}
	}
	d.header(put)
	d.tables(put)
	put(pair{0, "SECTION"}, pair{2, "ENTITIES"})
	for _, e := range d.entities {
		put(e.pairs...)
	}
	put(pair{0, "ENDSEC"}, pair{0, "EOF"})
	return out.Flush()
}

func (d *Drawing) header(put func(...pair)) {
	lo, hi := d.extent()
	put(pair{0, "SECTION"}, pair{2, "HEADER"}, pair{9, "$ACADVER"}, pair{1, "AC1009"}, pair{9, "$EXTMIN"})
	put(at(10, lo)...)
	put(pair{9, "$EXTMAX"})
	put(at(10, hi)...)
	put(pair{0, "ENDSEC"})
}

// extent returns the corners of the box about every point of lines and texts.
func (d *Drawing) extent() (lo, hi Point) {
	lo, hi = Point{math.Inf(1), math.Inf(1)}, Point{math.Inf(-1), math.Inf(-1)}
	for _, e := range d.entities {
		if e.pairs[0].value == "POLYLINE" || e.pairs[0].value == "ARC" { // Its point is a formality, or a far centre.
			continue
		}
		for _, p := range e.pairs {
			v, err := strconv.ParseFloat(p.value, 64)
			switch {
			case err != nil:
			case p.code == 10 || p.code == 11:
				lo.X, hi.X = min(lo.X, v), max(hi.X, v)
			case p.code == 20 || p.code == 21:
				lo.Y, hi.Y = min(lo.Y, v), max(hi.Y, v)
			}
		}
	}
	if lo.X > hi.X {
		return Point{}, Point{}
	}
	return lo, hi
}

func (d *Drawing) tables(put func(...pair)) {
	dash := d.Dash
	if dash == 0 {
		dash = 1
	}
	put(pair{0, "SECTION"}, pair{2, "TABLES"})
	lines := []struct {
		name    LineType
		words   string
		lengths []float64
	}{
		{Solid, "solid", nil},
		{DashDot, "dash dot", []float64{dash, -dash / 2, 0, -dash / 2}},
		{Dashed, "dashes", []float64{dash, -dash / 2}},
	}
	put(pair{0, "TABLE"}, pair{2, "LTYPE"}, pair{70, strconv.Itoa(len(lines))})
	for _, l := range lines {
		var total float64
		for _, v := range l.lengths {
			total += math.Abs(v)
		}
		put(pair{0, "LTYPE"}, pair{2, string(l.name)}, pair{70, "0"}, pair{3, l.words}, pair{72, "65"}, pair{73, strconv.Itoa(len(l.lengths))}, pair{40, number(total)})
		for _, v := range l.lengths {
			put(pair{49, number(v)})
		}
	}
	put(pair{0, "ENDTAB"})
	layers := append([]Layer{{Name: "0", Colour: 7, Line: Solid}}, d.Layers...)
	slices.SortFunc(layers, func(a, b Layer) int { return cmp.Compare(a.Name, b.Name) })
	put(pair{0, "TABLE"}, pair{2, "LAYER"}, pair{70, strconv.Itoa(len(layers))})
	for _, l := range layers {
		put(pair{0, "LAYER"}, pair{2, l.Name}, pair{70, "0"}, pair{62, strconv.Itoa(l.Colour)}, pair{6, string(l.Line)})
	}
	put(pair{0, "ENDTAB"}, pair{0, "TABLE"}, pair{2, "STYLE"}, pair{70, "1"})
	put(pair{0, "STYLE"}, pair{2, styleName}, pair{70, "0"}, pair{40, "0.0"}, pair{41, number(textFactor)}, pair{50, "0.0"}, pair{71, "0"},
		pair{42, "1.0"}, pair{3, "txt"}, pair{4, ""})
	put(pair{0, "ENDTAB"}, pair{0, "ENDSEC"})
}
