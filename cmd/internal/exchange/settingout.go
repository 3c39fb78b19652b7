package exchange

import (
	"encoding/csv"
	"fmt"
	"io"
	"maps"
	"math"
	"slices"
	"strconv"

	"standfast/cmd/internal/report"
)

// settingOutHead is the first row of a setting-out table.
var settingOutHead = []string{"offset_m", "level_m", "existing_level_m", "change_m", "drain_invert_m", "description"}

// apart is the difference of levels from which ground counts as changed, m: half of the last decimal written.
const apart = 0.0005

// WriteSettingOut writes the profile after works as CSV: a row a point with its offset, its level, the level before works, the change
// (negative in cut), the invert of drains where there are any, and what the point is. Levels are in metres to the millimetre. Points at a
// vertical step have two rows. It returns the error of w.
func WriteSettingOut(w io.Writer, o *report.Option) error {
	out := csv.NewWriter(w)
	rows := settingOut(o)
	if err := out.WriteAll(append([][]string{settingOutHead}, rows...)); err != nil {
		return fmt.Errorf("exchange: %w", err)
	}
	return nil
}

// HasSettingOut reports whether the works of an option have something to set out.
func HasSettingOut(o *report.Option) bool {
	return o.Section != nil && (o.Quantities.Earthworks > 0 || o.Quantities.Drain > 0)
}

func settingOut(o *report.Option) [][]string {
	s := o.Section
	invert := drainInvert(s)
	var rows [][]string
	for _, p := range settingOutPoints(s, invert) {
		rows = append(rows, []string{
			millimetres(p.x), millimetres(p.level), millimetres(p.before), millimetres(p.level - p.before), p.invertText(), p.what,
		})
	}
	return rows
}

// settingOutPoint is a row of the table.
type settingOutPoint struct {
	x, level    float64
	left, right float64 // Levels before works on both sides of the point, m; they differ at a step.
	before      float64 // The one that is shown.
	invert      float64 // NaN: no drain here.
	what        string
}

func (p *settingOutPoint) invertText() string {
	if math.IsNaN(p.invert) {
		return ""
	}
	return millimetres(p.invert)
}

// millimetres writes a length to the millimetre.
func millimetres(v float64) string {
	s := strconv.FormatFloat(v, 'f', 3, 64)
	if s == "-0.000" {
		return "0.000"
	}
	return s
}

// drainInvert returns the invert of the drains of a section, the same in every situation; nil without drains.
func drainInvert(s *report.Section) []report.Point {
	for _, name := range slices.Sorted(maps.Keys(s.Water)) {
		if d := s.Water[name].Drains; d != nil {
			return straightened(d.Invert)
		}
	}
	return nil
}

// straightened returns a line without the points that lie on the straight between their neighbours.
func straightened(line []report.Point) []report.Point {
	var out []report.Point
	for i, p := range line {
		if i > 0 && i+1 < len(line) {
			a, b := out[len(out)-1], line[i+1]
			if b[0] > a[0] && math.Abs(a[1]+(b[1]-a[1])*(p[0]-a[0])/(b[0]-a[0])-p[1]) < apart {
				continue
			}
		}
		out = append(out, p)
	}
	return out
}

// settingOutPoints returns the points of the profile after works, with those of the invert of drains between them.
func settingOutPoints(s *report.Section, invert []report.Point) []settingOutPoint {
	line := slices.Clone(s.Ground)
	for _, q := range append(slices.Clone(invert), s.GroundBefore...) {
		line = withPoint(line, q[0])
	}
	var out []settingOutPoint
	for i, q := range line {
		left, right := levels(s.GroundBefore, q[0])
		before := right
		if i+1 < len(line) && line[i+1][0] == q[0] { // The first of the two points of a step.
			before = left
		}
		p := settingOutPoint{x: q[0], level: q[1], left: left, right: right, before: before, invert: math.NaN()}
		if n := len(invert); n > 0 && q[0] >= invert[0][0] && q[0] <= invert[n-1][0] {
			_, p.invert = levels(invert, q[0])
		}
		out = append(out, p)
	}
	describe(out, s.Ground)
	describeDrains(out, invert)
	return out
}

// describeDrains adds to the points of the invert of drains what they are.
func describeDrains(points []settingOutPoint, invert []report.Point) {
	for i := range points {
		for k, q := range invert {
			switch {
			case q[0] != points[i].x:
			case k == 0:
				points[i].what += "; drain from here"
			case k == len(invert)-1:
				points[i].what += "; drain to here"
			default:
				points[i].what += "; change of slope of the drain"
			}
		}
	}
}

// withPoint returns the line with a point at x, between those that it has.
func withPoint(line []report.Point, x float64) []report.Point {
	i, found := slices.BinarySearchFunc(line, x, func(p report.Point, x float64) int {
		switch {
		case p[0] < x:
			return -1
		case p[0] > x:
			return 1
		}
		return 0
	})
	if found || i == 0 || i == len(line) {
		return line
	}
	_, y := levels(line, x)
	return slices.Insert(line, i, report.Point{x, y})
}

// levels returns the levels of a line just left and right of x; it is level beyond its ends.
func levels(line []report.Point, x float64) (left, right float64) {
	n := len(line)
	if x < line[0][0] {
		return line[0][1], line[0][1]
	}
	if x > line[n-1][0] {
		return line[n-1][1], line[n-1][1]
	}
	left, right = math.NaN(), math.NaN()
	for i, p := range line {
		switch {
		case p[0] == x:
			if math.IsNaN(left) {
				left = p[1]
			}
			right = p[1]
		case i > 0 && line[i-1][0] < x && x < p[0]:
			a := line[i-1]
			y := a[1] + (p[1]-a[1])*(x-a[0])/(p[0]-a[0])
			return y, y
		}
	}
	return left, right
}

// describe says of each point what it is and how the ground runs on to the next.
func describe(points []settingOutPoint, ground []report.Point) {
	between := func(i int) bool { // Whether the stretch from point i to the next is changed.
		if i < 0 || i+1 >= len(points) {
			return false
		}
		a, b := &points[i], &points[i+1]
		return math.Abs(a.level-a.right) > apart || math.Abs(b.level-b.left) > apart
	}
	for i := range points {
		p := &points[i]
		switch {
		case !between(i-1) && !between(i):
			p.what = "ground unchanged"
		case !between(i - 1):
			p.what = "works start"
		case !between(i):
			p.what = "works end"
		case slices.ContainsFunc(ground, func(q report.Point) bool { return q[0] == p.x }):
			p.what = "change of slope"
		default:
			p.what = "on the slope"
		}
		if between(i) {
			p.what += ", then " + grade(points[i], points[i+1])
		}
	}
}

// grade tells how the ground runs from one point to the next.
func grade(a, b settingOutPoint) string {
	const flattest = 100.0 // n of 1V:nH from which ground is called level
	dx, dy := b.x-a.x, b.level-a.level
	way := "up"
	if dy < 0 {
		way = "down"
	}
	switch {
	case dx == 0 && dy == 0:
		return "level"
	case dx == 0:
		return "vertical " + way
	case math.Abs(dy) <= dx/flattest:
		return "level"
	}
	return fmt.Sprintf("1V:%sH %s", strconv.FormatFloat(dx/math.Abs(dy), 'f', 2, 64), way)
}
