package drawing

import (
	"image/color"
	"math"

	"standfast/lem"
	"standfast/remedies"
)

// Offsets of a dimension line from what it measures, points, best first.
var dimOffsets = []float64{15, -15, 25, -25, 37, -37, 52, -52, 64, -64, 78, 94, 112}

// dimEnd is half the size of what is kept free at the ends of what is measured, points.
const dimEnd = 2.0

// Costs of a position for a dimension line, beside those of its label. They are set by eye.
const (
	offsetCost   = 0.5  // of each point of offset
	dimCrossCost = 30.0 // of each line that it crosses
)

// arrow draws an arrowhead with its tip at a point, pointing in a direction.
func (s *sheet) arrow(c color.NRGBA, tip, dir xy) {
	k := math.Hypot(dir.X, dir.Y)
	u := xy{dir.X / k, dir.Y / k}
	back := xy{tip.X - u.X*arrowHead, tip.Y - u.Y*arrowHead}
	s.add(fill{c, [][]xy{{tip, {back.X - u.Y*arrowHalf, back.Y + u.X*arrowHalf}, {back.X + u.Y*arrowHalf, back.Y - u.X*arrowHalf}}}})
}

// dimLayout is one way to draw a dimension.
type dimLayout struct {
	a, b   xy   // Ends of the dimension line.
	box    Box  // Of the label.
	inside bool // The label interrupts the line.
	short  bool // The arrows point inwards from outside.
}

// dimension draws a measured length: extension lines, a dimension line with arrows and its label.
func (p *picture) dimension(s *sheet, d remedies.Dimension) {
	a, b := s.view.at(d.From), s.view.at(d.To)
	n := noteOf(bodyFace, inkBlack, 150, d.Label)
	long := math.Hypot(b.X-a.X, b.Y-a.Y)
	if len(n.lines) == 0 {
		return
	}
	if long < 1 || !p.inWindow(d.From.X) || !p.inWindow(d.To.X) {
		s.label(n, above, a)
		return
	}
	u := xy{(b.X - a.X) / long, (b.Y - a.Y) / long}
	normal := xy{-u.Y, u.X}
	if normal.Y < 0 || normal.Y == 0 && normal.X*p.job.Facing() < 0 { // Upwards, or towards the toe.
		normal = xy{-normal.X, -normal.Y}
	}
	best, least := dimLayout{}, math.Inf(1)
	for _, o := range dimOffsets {
		for _, outside := range []bool{true, false} {
			if l, cost := s.tryDimension(a, b, u, normal, o, long, n, outside); cost < least {
				best, least = l, cost
			}
		}
	}
	if math.IsInf(least, 1) {
		s.label(n, above, xy{(a.X + b.X) / 2, (a.Y + b.Y) / 2})
		return
	}
	s.drawDimension(a, b, u, best)
	s.place.taken = append(s.place.taken, best.box)
	s.write(n, best.box)
}

// tryDimension returns the layout at an offset with its cost, +Inf if it cannot be drawn there. A label too long to interrupt the
// line stands outside it or between it and what it measures.
func (s *sheet) tryDimension(a, b, u, normal xy, o, long float64, n note, outside bool) (dimLayout, float64) {
	w, h := n.size()
	along := math.Abs(u.X)*w + math.Abs(u.Y)*h
	l := dimLayout{
		a:     xy{a.X + normal.X*o, a.Y + normal.Y*o},
		b:     xy{b.X + normal.X*o, b.Y + normal.Y*o},
		short: long < 4*arrowHead,
	}
	mid := xy{(l.a.X + l.b.X) / 2, (l.a.Y + l.b.Y) / 2}
	cost := offsetCost * math.Abs(o)
	if along+4*arrowHead <= long {
		l.inside = true
		l.box = Box{mid.X - w/2, mid.Y - h/2, mid.X + w/2, mid.Y + h/2}
	} else {
		sign := 1.0
		if o < 0 == outside {
			sign = -1
		}
		l.box = around(w, h, mid, 2.5, math.Atan2(sign*normal.Y, sign*normal.X))
	}
	if !s.place.free(l.box) {
		return l, math.Inf(1)
	}
	for _, q := range [][2]xy{{l.a, l.b}, {a, l.a}, {b, l.b}} {
		if !s.place.area.holds(q[1]) {
			return l, math.Inf(1)
		}
		for _, t := range s.place.taken {
			if clippedLength(q[0], q[1], t.grown(1)) > 0 {
				return l, math.Inf(1)
			}
		}
		for i := range s.place.ink {
			if k := &s.place.ink[i]; k.weight >= medium && crosses(q[0], q[1], k.a, k.b) {
				cost += dimCrossCost
			}
		}
	}
	// A line along another can be told from it no more.
	stretch := Box{min(l.a.X, l.b.X), min(l.a.Y, l.b.Y), max(l.a.X, l.b.X), max(l.a.Y, l.b.Y)}
	if min(stretch.width(), stretch.height()) < 1 {
		cost += s.place.covered(stretch)
	}
	return l, cost + s.place.covered(l.box)
}

func (s *sheet) drawDimension(a, b, u xy, l dimLayout) {
	const gap, over = 2.0, 2.5 // of the extension lines, points
	for _, e := range [][2]xy{{a, l.a}, {b, l.b}} {
		dx, dy := e[1].X-e[0].X, e[1].Y-e[0].Y
		k := math.Hypot(dx, dy)
		v := xy{dx / k, dy / k}
		s.stroke(dimPen, medium, []xy{{e[0].X + v.X*gap, e[0].Y + v.Y*gap}, {e[1].X + v.X*over, e[1].Y + v.Y*over}})
	}
	s.stroke(dimPen, heaviest, []xy{l.a, l.b})
	for _, q := range []xy{l.a, l.b} { // No label hides an arrow.
		s.place.marks = append(s.place.marks, Box{q.X, q.Y, q.X, q.Y}.grown(arrowHead))
	}
	if l.short {
		const tail = 2 * arrowHead
		s.stroke(dimPen, heaviest, []xy{{l.a.X - u.X*tail, l.a.Y - u.Y*tail}, l.a}, []xy{l.b, {l.b.X + u.X*tail, l.b.Y + u.Y*tail}})
		s.arrow(inkBlack, l.a, u)
		s.arrow(inkBlack, l.b, xy{-u.X, -u.Y})
		return
	}
	s.arrow(inkBlack, l.a, xy{-u.X, -u.Y})
	s.arrow(inkBlack, l.b, u)
}

// batter names the slope of a face on its outer side.
func (p *picture) batter(s *sheet, d remedies.Dimension) {
	m := lem.Point{X: (d.From.X + d.To.X) / 2, Y: (d.From.Y + d.To.Y) / 2}
	if p.inWindow(m.X) {
		a, b := s.view.at(d.From), s.view.at(d.To)
		out := side(math.Atan2(b.X-a.X, a.Y-b.Y)) // Square to the face.
		if b.X < a.X {
			out += math.Pi
		}
		s.label(noteOf(bodyFace, inkBlack, 150, d.Label), out, s.view.at(m))
	}
}

// markSlope draws the marks of crest and toe.
func (p *picture) markSlope(s *sheet) {
	const half = 2.2
	for _, q := range []lem.Point{p.job.Crest, p.job.Toe} {
		a := s.view.at(q)
		ring := []xy{{a.X - half, a.Y}, {a.X, a.Y + half}, {a.X + half, a.Y}, {a.X, a.Y - half}, {a.X - half, a.Y}}
		s.add(fill{paper, [][]xy{ring}}, stroke{pen{inkBlack, 0.7, nil}, [][]xy{ring}})
		s.place.marks = append(s.place.marks, Box{a.X, a.Y, a.X, a.Y}.grown(half))
	}
}

// labelSlope names crest and toe.
func (p *picture) labelSlope(s *sheet) {
	words := func(name string, q lem.Point) string {
		if p.opt != nil {
			return name
		}
		return name + " (" + number(q.X, 2) + ", " + number(q.Y, 2) + ")"
	}
	s.label(noteOf(bodyFace, inkBlack, 150, words("crest", p.job.Crest)), above, s.view.at(p.job.Crest))
	s.label(noteOf(bodyFace, inkBlack, 150, words("toe", p.job.Toe)), below, s.view.at(p.job.Toe))
}
