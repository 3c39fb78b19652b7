package drawing

import (
	"math"

	"standfast/lem"
	"standfast/remedies"
)

// Heights and depths of marks at the ground, points.
const (
	fenceAbove  = 34.0
	fenceBelow  = 14.0
	zoneAbove   = 13.0 // of a zone that no load may enter
	zoneBelow   = 22.0 // of a zone that no dig may enter
	zoneHatch   = 3.4
	outfallMark = 16.0
	arrowHead   = 4.6
	arrowHalf   = 1.35
)

// inWindow reports whether x is drawn.
func (p *picture) inWindow(x float64) bool { return x >= p.x0 && x <= p.x1 }

// fences returns the side limits of the works that are drawn; inwards is the sign of x towards the works.
func (p *picture) fences() (list []*remedies.Fence, inwards []float64) {
	l := &p.job.Limits
	if l.Left != nil && p.inWindow(l.Left.X) {
		list, inwards = append(list, l.Left), append(inwards, 1)
	}
	if l.Right != nil && p.inWindow(l.Right.X) {
		list, inwards = append(list, l.Right), append(inwards, -1)
	}
	return list, inwards
}

// highest returns the higher of the grounds at x on the page, and lowest the lower.
func (p *picture) highest(s *sheet, x float64) float64 {
	return s.view.at(lem.Point{X: x, Y: max(p.before.At(x), p.ground.At(x))}).Y
}

func (p *picture) lowest(s *sheet, x float64) float64 {
	return s.view.at(lem.Point{X: x, Y: min(p.before.At(x), p.ground.At(x))}).Y
}

func (p *picture) fenceTop(s *sheet, f *remedies.Fence) xy {
	return xy{s.view.at(lem.Point{X: f.X}).X, p.highest(s, f.X) + fenceAbove}
}

func (p *picture) drawLimits(s *sheet) {
	list, inwards := p.fences()
	for i, f := range list {
		top := p.fenceTop(s, f)
		s.stroke(limitPen, heavy, []xy{top, {top.X, p.lowest(s, f.X) - fenceBelow}})
		tip := xy{top.X + inwards[i]*11, top.Y - 4}
		s.stroke(pen{limitInk, 0.7, nil}, medium, []xy{{top.X, tip.Y}, tip})
		s.arrow(limitInk, tip, xy{inwards[i], 0})
	}
	for i := range p.job.Limits.KeepClear {
		if ring := p.zone(s, &p.job.Limits.KeepClear[i]); ring != nil {
			s.stroke(zoneHatchPen, light, hatch(0, zoneHatch, [][]xy{ring})...)
			s.stroke(zonePen, heavy, append(ring, ring[0]))
		}
	}
	for _, m := range p.job.Limits.MaxLevels {
		if x0, x1 := max(m.FromX, p.x0), min(m.ToX, p.x1); x0 < x1 {
			s.stroke(zonePen, heavy, s.view.line([]lem.Point{{X: x0, Y: m.Level}, {X: x1, Y: m.Level}}))
		}
	}
	p.drawOverhead(s)
	if a, ok := p.outfall(s); ok {
		s.stroke(pen{waterInk, 0.9, nil}, medium, []xy{{a.X - outfallMark/2, a.Y}, {a.X + outfallMark/2, a.Y}})
		s.arrow(waterInk, xy{a.X + p.job.Facing()*(outfallMark/2+arrowHead), a.Y}, xy{p.job.Facing(), 0})
	}
	p.drawRanges(s)
}

// drawOverhead draws what hangs above the ground, with the level that works must stay below for its clearance.
func (p *picture) drawOverhead(s *sheet) {
	for _, o := range p.job.Limits.Overhead {
		x0, x1 := max(o.FromX, p.x0), min(o.ToX, p.x1)
		if x0 >= x1 {
			continue
		}
		level := func(y float64) []xy { return s.view.line([]lem.Point{{X: x0, Y: y}, {X: x1, Y: y}}) }
		s.stroke(overheadPen, heavy, level(o.Level))
		s.stroke(zonePen, medium, level(o.Level-o.Clearance))
	}
}

// sampleOverhead draws what hangs above the ground in the key.
func sampleOverhead(s *sheet, b Box) {
	s.add(stroke{overheadPen, [][]xy{{{b.MinX, b.MaxY - 1.5}, {b.MaxX, b.MaxY - 1.5}}}}, stroke{zonePen, [][]xy{{{b.MinX, b.MinY + 1.5}, {b.MaxX, b.MinY + 1.5}}}})
}

// zone returns the outline of a keep-clear zone along the ground, on the page; nil outside the window.
func (p *picture) zone(s *sheet, k *remedies.KeepClear) []xy {
	x0, x1 := max(k.FromX, p.x0), min(k.ToX, p.x1)
	if x0 >= x1 {
		return nil
	}
	g := s.view.line(crop(p.before, x0, x1))
	up, down := 0.0, 0.0
	if k.NoLoad {
		up = zoneAbove
	}
	if k.NoDig {
		down = zoneBelow
		if k.DigBelow != nil && !k.NoLoad {
			up = -*k.DigBelow * s.view.sy
		}
		if k.DigBelow != nil {
			down += *k.DigBelow * s.view.sy
		}
	}
	var ring []xy
	for _, q := range g {
		ring = append(ring, xy{q.X, q.Y + up})
	}
	for i := len(g) - 1; i >= 0; i-- {
		ring = append(ring, xy{g[i].X, max(g[i].Y-down, s.view.frame.MinY)})
	}
	return ring
}

// sampleZone draws a keep-clear zone in the key.
func sampleZone(s *sheet, b Box) {
	ring := b.corners()
	s.add(stroke{zoneHatchPen, hatch(0, zoneHatch, [][]xy{ring})}, stroke{zonePen, [][]xy{append(ring, ring[0])}})
}

// outfall returns where the drain outfall is marked.
func (p *picture) outfall(s *sheet) (xy, bool) {
	o := p.job.Limits.Outfall
	if o == nil || *o < s.view.y0 {
		return xy{}, false
	}
	a := s.view.at(lem.Point{X: p.job.Toe.X, Y: *o})
	a.X += p.job.Facing() * 14
	return a, a.X-outfallMark > s.view.frame.MinX && a.X+outfallMark < s.view.frame.MaxX
}

// daylight is a range in which slips may leave the ground.
type daylight struct {
	name string
	r    lem.Range
	row  float64 // above the lower edge of the frame, points
}

// ranges returns the daylight ranges that the case gives and the window shows.
func (p *picture) ranges() []daylight {
	var out []daylight
	for _, d := range []daylight{{"slips start", p.job.Head, 8}, {"slips end", p.job.Exit, 17}} {
		d.r.From, d.r.To = max(d.r.From, p.x0), min(d.r.To, p.x1)
		if d.r.From < d.r.To && (d.r != lem.Range{}) {
			out = append(out, d)
		}
	}
	if (p.job.Head == lem.Range{}) && (p.job.Exit == lem.Range{}) {
		return nil
	}
	return out
}

func (p *picture) drawRanges(s *sheet) {
	for _, d := range p.ranges() {
		a, b, y := p.bracket(s, d)
		s.stroke(rangePen, heavy, []xy{{a, y + 3}, {a, y - 3}}, []xy{{a, y}, {b, y}}, []xy{{b, y + 3}, {b, y - 3}})
	}
}

func (p *picture) bracket(s *sheet, d daylight) (x0, x1, y float64) {
	return s.view.at(lem.Point{X: d.r.From}).X, s.view.at(lem.Point{X: d.r.To}).X, s.view.frame.MinY + d.row
}

func (p *picture) labelLimits(s *sheet) {
	put := func(txt string, at xy, prefer side) {
		s.label(noteOf(bodyFace, limitInk, 120, txt), prefer, at)
	}
	list, _ := p.fences()
	for _, f := range list {
		put(f.Name+", offset "+metres(f.X), p.fenceTop(s, f), above)
	}
	for i := range p.job.Limits.KeepClear {
		k := &p.job.Limits.KeepClear[i]
		if ring := p.zone(s, k); ring != nil {
			n := noteOf(bodyFace, limitInk, 120, zoneWords(k))
			n.pointed = true
			s.label(n, below, middle(ring))
		}
	}
	for _, m := range p.job.Limits.MaxLevels {
		if x0, x1 := max(m.FromX, p.x0), min(m.ToX, p.x1); x0 < x1 {
			var anchors []xy
			for _, t := range []float64{0.5, 0.75, 0.9, 0.25, 0.1} {
				anchors = append(anchors, s.view.at(lem.Point{X: x0 + t*(x1-x0), Y: m.Level}))
			}
			s.label(noteOf(bodyFace, limitInk, 120, m.Name+": works no higher than "+metres(m.Level)), above, anchors...)
		}
	}
	for _, o := range p.job.Limits.Overhead {
		if x0, x1 := max(o.FromX, p.x0), min(o.ToX, p.x1); x0 < x1 {
			words := o.Name + ", level " + metres(o.Level) + ": works stay " + metres(o.Clearance) + " below"
			s.label(noteOf(bodyFace, limitInk, 130, words), above, s.view.at(lem.Point{X: (x0 + x1) / 2, Y: o.Level}))
		}
	}
	for _, d := range p.ranges() {
		a, b, y := p.bracket(s, d)
		s.label(noteOf(smallFace, inkGrey, 200, d.name+" between offsets "+metres(d.r.From)+" and "+metres(d.r.To)), above, xy{(a + b) / 2, y})
	}
}

func (p *picture) labelOutfall(s *sheet) {
	if a, ok := p.outfall(s); ok {
		s.label(noteOf(bodyFace, waterInk, 120, "drain outfall "+metres(*p.job.Limits.Outfall)), below, a)
	}
}

func zoneWords(k *remedies.KeepClear) string {
	out := k.Name + ": "
	switch {
	case k.NoDig && k.DigBelow != nil:
		out += "no dig deeper than " + metres(*k.DigBelow)
		if k.NoLoad {
			out += ", no load"
		}
	case k.NoDig && k.NoLoad:
		out += "no dig, no load"
	case k.NoDig:
		out += "no dig"
	default:
		out += "no load"
	}
	return out
}

// middle returns the centre of the box about a ring.
func middle(ring []xy) xy {
	b := Box{math.Inf(1), math.Inf(1), math.Inf(-1), math.Inf(-1)}
	for _, q := range ring {
		b = Box{min(b.MinX, q.X), min(b.MinY, q.Y), max(b.MaxX, q.X), max(b.MaxY, q.Y)}
	}
	return b.centre()
}
