package drawing

import (
	"math"
	"slices"

	"standfast/lem"
)

// strip is a layer to be named: what lies between two lines.
type strip struct {
	name       string
	top, floor lem.Profile
}

// labelStrata writes the names of soils inside the strata and placed bodies where there is room, beside them with a leader line
// where there is not.
func (p *picture) labelStrata(s *sheet) {
	for i := range p.bodies {
		b := &p.bodies[i]
		p.nameBody(s, noteOf(bodyFace, inkBlack, 110, p.sec.Soils[b.soil].Name), b.outline)
	}
	floor := lem.Profile{{X: p.x0, Y: s.view.y0}, {X: p.x1, Y: s.view.y0}}
	for i, t := range p.tops {
		bottom := floor
		if i+1 < len(p.tops) {
			bottom = p.tops[i+1]
		}
		p.nameStrip(s, strip{p.sec.Soils[p.sec.Strata[i].Soil].Name, t, bottom})
	}
}

// nameBody writes a name inside an outline if it fits there, else beside it with a leader line.
func (p *picture) nameBody(s *sheet, n note, outline []lem.Point) {
	if len(n.lines) == 0 {
		return
	}
	w, h := n.size()
	ring := s.view.line(outline)
	spots := insideOf(ring)
	best, least := Box{}, math.Inf(1)
	for _, at := range spots {
		b := Box{at.X - w/2, at.Y - h/2, at.X + w/2, at.Y + h/2}
		if s.place.free(b) && holds(ring, b) {
			if cost := s.place.covered(b); cost < least {
				best, least = b, cost
			}
		}
	}
	if !math.IsInf(least, 1) {
		s.place.taken = append(s.place.taken, best)
		s.write(n, best)
		return
	}
	n.pointed = true
	anchor := spots[0]
	for _, at := range spots {
		if !slices.ContainsFunc(s.place.taken, func(b Box) bool { return b.grown(leaderClear).holds(at) }) {
			anchor = at
			break
		}
	}
	s.label(n, above, anchor)
}

// holds reports whether a box lies inside a ring: its upper and lower edges do.
func holds(ring []xy, b Box) bool {
	for _, y := range []float64{b.MinY, b.MaxY} {
		xs := crossings([][]xy{ring}, y)
		inside := false
		for i := 0; i+1 < len(xs); i += 2 {
			inside = inside || xs[i] <= b.MinX && b.MaxX <= xs[i+1]
		}
		if !inside {
			return false
		}
	}
	return true
}

// insideOf returns points inside a ring, those in its widest middle first; the first corner if the ring has no inside.
func insideOf(ring []xy) []xy {
	lo, hi := math.Inf(1), math.Inf(-1)
	for _, q := range ring {
		lo, hi = min(lo, q.Y), max(hi, q.Y)
	}
	var out []xy
	for _, share := range []float64{0.5, 0.3, 0.7, 0.15, 0.85} {
		for _, t := range []float64{0.5, 0.4, 0.6, 0.28, 0.72, 0.16, 0.84} {
			y := lo + t*(hi-lo)
			xs := crossings([][]xy{ring}, y)
			for i := 0; i+1 < len(xs); i += 2 {
				out = append(out, xy{xs[i] + share*(xs[i+1]-xs[i]), y})
			}
		}
	}
	if len(out) == 0 {
		return ring[:1]
	}
	return out
}

// stripGap is kept free between a name and the edges of its layer, points.
const stripGap = 0.8

// nameSteps is the number of places along the section where a name is tried.
const nameSteps = 40

// nameStrip writes the name where the layer has room for it; else beside its thickest part.
func (p *picture) nameStrip(s *sheet, t strip) {
	n := noteOf(bodyFace, inkBlack, 150, t.name)
	if len(n.lines) == 0 {
		return
	}
	w, h := n.size()
	var best Box
	least, thickest := math.Inf(1), 0.0
	var anchor xy
	for k := 1; k < nameSteps; k++ {
		x := p.x0 + (p.x1-p.x0)*float64(k)/nameSteps
		low, high := room(s, t, x, 0)
		if high-low > thickest {
			thickest, anchor = high-low, xy{s.view.at(lem.Point{X: x}).X, (low + high) / 2}
		}
		low, high = room(s, t, x, w/2+2)
		for y := low + stripGap; y+h+stripGap <= high; y += max(3, (high-low-h)/6) {
			c := s.view.at(lem.Point{X: x}).X
			b := Box{c - w/2, y, c + w/2, y + h}
			if !s.place.free(b) {
				continue
			}
			// Names stand best in the middle of their layer, away from its ends.
			cost := s.place.covered(b) + math.Abs(y+h/2-(low+high)/2)/4 + math.Abs(float64(k)/nameSteps-0.5)*20
			if cost < least {
				best, least = b, cost
			}
		}
	}
	switch {
	case !math.IsInf(least, 1):
		s.place.taken = append(s.place.taken, best)
		s.write(n, best)
	case thickest > 0:
		n.pointed = true
		s.label(n, below, anchor)
	}
}

// room returns the heights between which a layer is open from half a width left of x to half a width right of it, on the page.
func room(s *sheet, t strip, x, half float64) (low, high float64) {
	r := half / s.view.sx
	x0, x1 := x-r, x+r
	if x0 < t.top.Left() || x1 > t.top.Right() {
		return 0, 0
	}
	top, floor := math.Inf(1), math.Inf(-1)
	for _, q := range crop(t.top, x0, x1) {
		top = min(top, q.Y)
	}
	for _, q := range crop(t.floor, x0, x1) {
		floor = max(floor, q.Y)
	}
	return max(s.view.at(lem.Point{Y: floor}).Y, s.view.frame.MinY), s.view.at(lem.Point{Y: top}).Y
}
