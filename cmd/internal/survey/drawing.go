package survey

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"

	"standfast/cmd/internal/casefile"
	"standfast/cmd/internal/dxf"
	"standfast/lem"
)

// Layer maps a layer of a drawing to a name.
type Layer struct {
	Layer string
	Name  string // Of the soil or water line; empty: that of the layer.
}

// Mapping says what the layers of a drawing are.
type Mapping struct {
	Ground string
	Strata []Layer
	Waters []Layer
	Scale  float64 // Metres to a unit of the drawing; 0: 1, and a drawing in other units than metres is refused.
}

// Drawing reads a cross-section from a DXF whose x is the offset and whose y is the level. Lines and polylines of a layer that meet end
// to end are joined. A layer of strata or water may hold several lines, which are numbered; that of the ground holds one. It returns what it
// says besides, such as kinds of entities that it left out.
func Drawing(file string, src []byte, m Mapping) (*casefile.Sketch, []string, error) {
	d := &drawingReader{faults: faults{file: file}, scale: m.Scale}
	if !d.checkSize(src) {
		return nil, nil, d.err()
	}
	f, err := dxf.Read(src)
	var wrong *dxf.Error
	if errors.As(err, &wrong) {
		d.add(wrong.Line, "", "", "%s", wrong.Message)
		return nil, nil, d.err()
	}
	d.source = f
	d.checkUnits(m.Scale)
	s := d.sketch(m)
	if len(d.list) > 0 {
		return nil, nil, d.err()
	}
	return s, d.notes, nil
}

// drawingReader picks the lines of layers out of a drawing.
type drawingReader struct {
	faults
	source *dxf.File
	scale  float64
	notes  []string
}

// checkUnits refuses a drawing in other units than metres unless the user says what a unit is.
func (d *drawingReader) checkUnits(scale float64) {
	if d.scale == 0 {
		d.scale = 1
	}
	units := map[int]struct{ name, scale string }{dxf.Millimetres: {"millimetres", "0.001"}, dxf.Centimetres: {"centimetres", "0.01"}}
	u, known := units[d.source.Units]
	switch {
	case scale != 0 || d.source.Units == dxf.Unitless || d.source.Units == dxf.Metres:
	case known:
		d.add(0, "", "give `--scale "+u.scale+"`, or `--scale 1` if its coordinates are metres all the same", "the drawing says that it is in %s", u.name)
	default:
		d.add(0, "", "give `--scale` with the metres to a unit of the drawing", "the drawing says that it is not in metres (unit code %d)", d.source.Units)
	}
}

func (d *drawingReader) sketch(m Mapping) *casefile.Sketch {
	s := &casefile.Sketch{}
	if m.Ground == "" {
		d.add(0, "", d.layersThere(), "which layer is the ground is not known: name it with --ground")
		return nil
	}
	if ground := d.linesOf(m.Ground); len(ground) == 1 {
		s.Ground = ground[0]
	} else if len(ground) > 1 {
		a, b := ground[0][len(ground[0])-1], ground[1][0]
		d.add(0, "", "join them, or move what is not the ground to another layer",
			"the layer %q of the ground holds %d lines that do not meet, such as at (%v, %v) and (%v, %v)", m.Ground, len(ground), a.X, a.Y, b.X, b.Y)
	}
	s.Strata = d.named(m.Strata, casefile.MaxStrata)
	s.Waters = d.named(m.Waters, casefile.MaxWaters)
	if len(d.source.Left) > 0 {
		d.notes = append(d.notes, "entities left out: "+strings.Join(d.source.Left, ", "))
	}
	sortStrata(s)
	return s
}

// named returns the lines of layers under their names, numbered from above where a layer has several.
func (d *drawingReader) named(layers []Layer, most int) []casefile.NamedLine {
	var out []casefile.NamedLine
	for _, l := range layers {
		name := l.Name
		if name == "" {
			name = l.Layer
		}
		lines := d.linesOf(l.Layer)
		slices.SortStableFunc(lines, func(a, b lem.Profile) int {
			x := max(a.Left(), b.Left())
			switch ya, yb := a.At(x), b.At(x); {
			case ya > yb:
				return -1
			case ya < yb:
				return 1
			}
			return 0
		})
		for i, line := range lines {
			n := casefile.NamedLine{Name: name, Line: line}
			if len(lines) > 1 {
				n.Name = fmt.Sprintf("%s %d", name, i+1)
			}
			out = append(out, n)
		}
	}
	if len(out) > most {
		d.add(0, "", "", "%d lines are more than a case may have: %d", len(out), most)
	}
	return out
}

// linesOf returns the lines of a layer from left to right; it records a fault if there is none, or one that is no line of a section.
func (d *drawingReader) linesOf(layer string) []lem.Profile {
	var pieces []piece
	curved := false
	for i := range d.source.Polylines {
		p := &d.source.Polylines[i]
		if !strings.EqualFold(p.Layer, layer) || d.full() {
			continue
		}
		curved = curved || p.Curved
		if q, ok := d.piece(p); ok {
			pieces = append(pieces, q)
		}
	}
	switch {
	case len(pieces) == 0 && len(d.list) == 0:
		d.add(0, "", d.layersThere(), "the layer %q holds no line or polyline", layer)
	case len(pieces) > casefile.MaxLinePoints:
		d.add(0, "", "join them", "the layer %q holds %d lines; at most %d are read", layer, len(pieces), casefile.MaxLinePoints)
		return nil
	}
	if curved {
		d.notes = append(d.notes, fmt.Sprintf("the layer %q has arcs: straight lines between their ends were taken", layer))
	}
	var out []lem.Profile
	for _, chain := range chains(pieces) {
		if line, ok := d.profile(layer, chain); ok {
			out = append(out, line)
		}
	}
	return out
}

// layersThere lists the layers that hold lines.
func (d *drawingReader) layersThere() string {
	count := map[string]int{}
	var names []string
	for _, p := range d.source.Polylines {
		if count[p.Layer] == 0 {
			names = append(names, p.Layer)
		}
		count[p.Layer]++
	}
	if len(names) == 0 {
		return "the drawing holds no lines or polylines outside blocks"
	}
	const most = 30
	more := ""
	if len(names) > most {
		names, more = names[:most], " and more"
	}
	for i, n := range names {
		names[i] = fmt.Sprintf("%s (%d)", shown(n), count[n])
	}
	return "layers with lines: " + strings.Join(names, ", ") + more
}

// piece is a line or polyline in metres.
type piece struct {
	points []lem.Point
	line   int // Of the file.
}

func (p *piece) first() lem.Point { return p.points[0] }
func (p *piece) last() lem.Point  { return p.points[len(p.points)-1] }

// piece returns a polyline in metres, without points that stand twice in a row.
func (d *drawingReader) piece(p *dxf.Polyline) (piece, bool) {
	if p.Closed {
		d.add(p.Line, "", "draw it open", "the polyline on layer %q is closed", shown(p.Layer))
		return piece{}, false
	}
	if len(p.Points) > casefile.MaxLinePoints {
		d.add(p.Line, "", "keep the points at which it changes slope", "the polyline on layer %q has %d points; at most %d are allowed", shown(p.Layer), len(p.Points), casefile.MaxLinePoints)
		return piece{}, false
	}
	out := piece{line: p.Line}
	for _, q := range p.Points {
		v := lem.Point{X: round(q.X * d.scale), Y: round(q.Y * d.scale)}
		if !(math.Abs(v.X) <= casefile.MaxCoordinate && math.Abs(v.Y) <= casefile.MaxCoordinate) {
			d.add(p.Line, "", "move the section near the origin, or give `--scale`", "the point (%v, %v) on layer %q is out of bounds", v.X, v.Y, shown(p.Layer))
			return piece{}, false
		}
		if n := len(out.points); n == 0 || out.points[n-1] != v {
			out.points = append(out.points, v)
		}
	}
	return out, len(out.points) > 1
}

// round takes what a drawing program's arithmetic leaves behind off a coordinate: it keeps micrometres.
func round(v float64) float64 {
	const micro = 1e6
	return math.Round(v*micro)/micro + 0
}

// meeting is the distance within which ends of lines meet, m.
const meeting = 0.001

func meets(a, b lem.Point) bool { return math.Hypot(a.X-b.X, a.Y-b.Y) <= meeting }

// chains joins pieces that meet end to end, from left to right.
func chains(pieces []piece) [][]piece {
	left := slices.Clone(pieces)
	for i := range left {
		if p := &left[i]; p.first().X > p.last().X {
			p.points = slices.Clone(p.points)
			slices.Reverse(p.points)
		}
	}
	slices.SortStableFunc(left, func(a, b piece) int {
		switch {
		case a.first().X < b.first().X:
			return -1
		case a.first().X > b.first().X:
			return 1
		}
		return 0
	})
	var out [][]piece
	for len(left) > 0 {
		chain := []piece{left[0]}
		left = left[1:]
		for {
			end := chain[len(chain)-1].last()
			i := slices.IndexFunc(left, func(p piece) bool { return meets(p.first(), end) || p.first().X == p.last().X && meets(p.last(), end) })
			if i < 0 {
				break
			}
			next := left[i]
			if !meets(next.first(), end) {
				next.points = slices.Clone(next.points)
				slices.Reverse(next.points)
			}
			chain = append(chain, next)
			left = slices.Delete(left, i, i+1)
		}
		out = append(out, chain)
	}
	return out
}

// profile joins a chain to a line from left to right.
func (d *drawingReader) profile(layer string, chain []piece) (lem.Profile, bool) {
	var out lem.Profile
	for _, p := range chain {
		for i, q := range p.points {
			if n := len(out); n > 0 {
				if i == 0 && meets(out[n-1], q) {
					continue
				}
				if q.X < out[n-1].X {
					d.add(p.line, "", "draw it from left to right without overhangs", "the line on layer %q runs back from x = %v to %v", shown(layer), out[n-1].X, q.X)
					return nil, false
				}
			}
			out = append(out, q)
		}
	}
	switch {
	case len(out) > casefile.MaxLinePoints:
		d.add(chain[0].line, "", "keep the points at which it changes slope", "the line on layer %q has %d points; at most %d are allowed", shown(layer), len(out), casefile.MaxLinePoints)
		return nil, false
	case out[0].X == out[len(out)-1].X:
		d.add(chain[0].line, "", "", "the line on layer %q is upright: all its points have x = %v", shown(layer), out[0].X)
		return nil, false
	}
	return out, true
}
