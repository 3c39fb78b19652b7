package remedies

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"standfast/lem"
)

// shape is the new surface of works, in the coordinates of a slope: cut where it lies below the ground in force, filled where above.
type shape struct {
	line         lem.Profile // From its uphill to its downhill end; nil when the shape does not exist.
	cut, fill    bool        // What the works may do.
	uphill, foot string      // Names of the ends, for messages: "top of cut", "toe of berm".
	dims         []Dimension
	faces        []face
	levels       []level
	faults       []Violation // Why the shape does not exist.
}

// face is a sloping part of a shape, for the limits on batters.
type face struct {
	batter    float64 // n of 1V:nH.
	temporary bool    // It stands open during construction only.
}

// level is a level part of a shape, for the limits on widths.
type level struct {
	what  string // "bench", "top of berm".
	width float64
	haul  bool // Plant has to travel on it; else it is a bench.
}

// flat is the fall over the length of a part of a shape below which it is level: far below any batter, far above rounding.
const flat = 1e-6

// describe adds the dimensions, faces and benches of a line of benches and faces. A stretch too short to set out is left out.
func (s *shape) describe(line lem.Profile) {
	for i := 1; i < len(line); i++ {
		a, b := line[i-1], line[i]
		fall := a.Y - b.Y
		switch {
		case b.X-a.X <= sameLevel:
		case fall <= flat*(b.X-a.X):
			s.dims = append(s.dims, lengthDim("bench width", a, b))
			s.levels = append(s.levels, level{what: "bench", width: b.X - a.X})
		default:
			n := (b.X - a.X) / fall
			s.dims = append(s.dims, batterDim(a, b, n))
			s.faces = append(s.faces, face{batter: n})
		}
	}
}

// from and to return the ends of the shape in x.
func (s *shape) from() float64 { return s.line[0].X }
func (s *shape) to() float64   { return s.line[len(s.line)-1].X }

// noShape returns a shape that does not exist.
func noShape(limit string, by float64, format string, args ...any) shape {
	return shape{faults: []Violation{{Limit: limit, Detail: fmt.Sprintf(format, args...), By: math.Max(by, 0), Geometry: true}}}
}

// own returns the shape in the section's own coordinates.
func (s shape) own(f *slope) shape {
	if !f.mirrored {
		return s
	}
	s.line = s.line.Mirror()
	dims := make([]Dimension, len(s.dims))
	for i, d := range s.dims {
		d.From, d.To = f.own(d.From), f.own(d.To)
		dims[i] = d
	}
	s.dims = dims
	return s
}

// lengthDim dimensions a measured length of the works.
func lengthDim(what string, from, to lem.Point) Dimension {
	return Dimension{From: from, To: to, Label: fmt.Sprintf("%s %s m", what, metres(math.Hypot(to.X-from.X, to.Y-from.Y)))}
}

// batterDim labels a face with its batter.
func batterDim(from, to lem.Point, n float64) Dimension {
	return Dimension{From: from, To: to, Label: batterText(n), Batter: true}
}

// batterText returns a batter as "1V:2.5H", with as many decimals as it has, up to four.
func batterText(n float64) string {
	s := strconv.FormatFloat(math.Round(n*1e4)/1e4, 'f', -1, 64)
	if !strings.Contains(s, ".") {
		s += ".0"
	}
	return "1V:" + s + "H"
}

// metres prints a length or a position to the centimetre.
func metres(v float64) string {
	return strconv.FormatFloat(math.Round(v*100)/100+0, 'f', 2, 64)
}
