package drawing

import (
	"math"

	"standfast/lem"
)

// crackLine returns the bottom of the tension cracks in the window: as given, or that far below the ground behind the crest; nil if there are none.
func (p *picture) crackLine() lem.Profile {
	c := p.sec.Crack
	if c == nil {
		return nil
	}
	if len(c.Line) > 0 {
		l := cropInside(c.Line, p.x0, p.x1)
		if l == nil {
			return nil
		}
		return lower(l, crop(p.ground, l.Left(), l.Right()))
	}
	x0, x1 := p.x0, p.job.Crest.X
	if p.job.Facing() < 0 {
		x0, x1 = p.job.Crest.X, p.x1
	}
	if x0 >= x1 {
		return nil
	}
	l := crop(p.ground, x0, x1)
	for i := range l {
		l[i].Y -= c.Depth
	}
	return l
}

func crackWords(c *lem.TensionCrack) string {
	out := "bottom of tension cracks"
	if len(c.Line) == 0 {
		out += ", " + metres(c.Depth) + " deep"
	}
	switch {
	case c.HasWaterLevel:
		return out + ", water in them at level " + metres(c.WaterLevel)
	case c.WaterShare > 0:
		return out + ", " + number(100*c.WaterShare, 0) + " % full of water"
	}
	return out + ", dry"
}

// observedLine returns the slip that has happened, below the ground; nil if none was given.
func (p *picture) observedLine() []lem.Point {
	if p.job.Observed == nil || p.works { // Works are judged by what may happen yet.
		return nil
	}
	s := &p.job.Observed.Slip
	if s.Kind == lem.Polyline {
		return within(s.Nodes, p.x0, p.x1)
	}
	const pieces = 96
	var out []lem.Point
	for k := 0.0; k <= pieces; k++ {
		sin, cos := math.Sincos(math.Pi * (1 + k/pieces))
		q := lem.Point{X: s.Centre.X + s.Radius*cos, Y: s.Centre.Y + s.Radius*sin}
		if p.inWindow(q.X) && q.Y <= p.ground.At(q.X) {
			out = append(out, q)
		}
	}
	return out
}

// within returns the points of a line between two offsets.
func within(l []lem.Point, x0, x1 float64) []lem.Point {
	var out []lem.Point
	for _, q := range l {
		if q.X >= x0 && q.X <= x1 {
			out = append(out, q)
		}
	}
	return out
}

func (p *picture) keyGiven() {
	if len(p.sec.Restraints) > 0 {
		p.key.add("restraint", func(s *sheet, b Box) {
			x := b.centre().X
			s.add(stroke{restraintPen, [][]xy{{{x, b.MinY}, {x, b.MaxY}}}})
		})
	}
	if p.crackLine() != nil {
		p.key.addLine("bottom of tension cracks", crackPen)
	}
	if len(p.sec.Known) > 0 {
		p.key.addLine("slip surface that exists already", knownPen)
	}
	if p.observedLine() != nil {
		p.key.addLine("slip that has happened", observedPen)
	}
}

// drawGiven draws what else stands in the ground: restraints, cracks, and slips that exist or have happened.
func (p *picture) drawGiven(s *sheet) {
	p.drawSurfaces(s)
	p.drawRestraints(s)
}

func (p *picture) drawSurfaces(s *sheet) {
	if l := p.crackLine(); l != nil {
		s.stroke(crackPen, medium, s.view.line(l))
	}
	for _, k := range p.sec.Known {
		if l := cropInside(k.Line, p.x0, p.x1); l != nil {
			s.stroke(knownPen, medium, s.view.line(l))
		}
	}
	if l := p.observedLine(); l != nil {
		s.stroke(observedPen, medium, s.view.line(l))
	}
}

func (p *picture) drawRestraints(s *sheet) {
	for _, r := range p.sec.Restraints {
		if p.inWindow(r.X) {
			s.stroke(restraintPen, heavy, s.view.line([]lem.Point{{X: r.X, Y: r.Top}, {X: r.X, Y: r.Bottom}}))
		}
	}
}

func (p *picture) labelGiven(s *sheet) {
	for _, r := range p.sec.Restraints {
		if p.inWindow(r.X) {
			var anchors []xy
			for _, t := range []float64{0.5, 0.8, 0.2, 1} {
				anchors = append(anchors, s.view.at(lem.Point{X: r.X, Y: r.Top + t*(r.Bottom-r.Top)}))
			}
			s.label(noteOf(bodyFace, inkBlack, 120, named(r.Name, "holding "+number(r.Force, 0)+" kN/m")), rightOf, anchors...)
		}
	}
	for _, k := range p.sec.Known {
		if l := cropInside(k.Line, p.x0, p.x1); l != nil {
			words := "existing slip surface: c′ " + number(k.Cohesion, 0) + " kPa, φ′ " + number(k.Friction*180/math.Pi, 0) + "°"
			s.label(noteOf(bodyFace, slipInk, 130, words), below, onLines(s, l)...)
		}
	}
	if l := p.observedLine(); l != nil {
		s.label(noteOf(bodyFace, slipInk, 130, "slip that has happened"), below, onLines(s, l)...)
	}
	if l := p.crackLine(); l != nil {
		s.label(noteOf(bodyFace, slipInk, 130, crackWords(p.sec.Crack)), below, onLines(s, l)...)
	}
}

// onLines returns points of a line where its label may stand, its middle first.
func onLines(s *sheet, l lem.Profile) []xy {
	var out []xy
	for _, t := range []float64{0.5, 0.35, 0.65, 0.2, 0.8} {
		x := l.Left() + t*(l.Right()-l.Left())
		out = append(out, s.view.at(lem.Point{X: x, Y: l.At(x)}))
	}
	return out
}
