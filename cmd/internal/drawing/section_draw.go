package drawing

import (
	"standfast/lem"
)

// fillKey names everything that will be drawn, before the size of the sheet is known.
func (p *picture) fillKey() {
	ground := "ground"
	if p.reshaped {
		p.key.addLine("ground before works", beforePen)
		ground = "ground after works"
	}
	p.key.addLine(ground, groundPen)
	if p.stage != nil {
		p.key.addLine("ground in the governing stage", stagePen)
	}
	if len(p.cuts) > 0 {
		p.key.addHatch("cut", paper, cutPen, cutHatchAngle)
	}
	for _, b := range p.bodies {
		if b.added {
			p.key.addHatch("fill: "+p.soilWords(b.soil), soilTint(b.soil), fillPen, fillHatchAngle)
		}
	}
	if len(p.fills) > 0 && !p.hasAdded() {
		p.key.addHatch("fill", paper, fillPen, fillHatchAngle)
	}
	for _, w := range p.waters {
		p.key.addLine(w.what, w.pen)
	}
	if p.drains != nil && len(p.drains.Invert) > 1 {
		p.key.addLine("invert of drains", invertPen)
	}
	if len(p.free) > 0 {
		p.key.addTint("free water", waterFill)
	}
	if len(p.known) > 0 {
		p.key.add("pore pressure known", samplePressure)
	}
	if p.slip != nil {
		p.key.addLine("governing slip", slipPen)
	}
	if p.sec.FirmBase != nil {
		p.key.addLine("firm base, no slip below", firmPen)
	}
	p.keyGiven()
	p.keyLimits()
	for _, t := range p.sec.Strata {
		p.key.addTint(p.soilWords(t.Soil), soilTint(t.Soil))
	}
	for _, b := range p.bodies {
		if !b.added {
			p.key.addTint(p.soilWords(b.soil), soilTint(b.soil))
		}
	}
}

func (p *picture) keyLimits() {
	l := &p.job.Limits
	if len(p.sec.Loads) > 0 {
		p.key.add("surcharge", sampleLoad)
	}
	if len(p.sec.LineLoads) > 0 {
		p.key.add("line load", sampleLineLoad)
	}
	if l.Left != nil || l.Right != nil {
		p.key.addLine("limit of works, arrow towards the works", limitPen)
	}
	if len(l.KeepClear) > 0 {
		p.key.add("keep-clear zone", sampleZone)
	}
	if len(l.MaxLevels) > 0 {
		p.key.addLine("greatest level of works", zonePen)
	}
	if len(l.Overhead) > 0 {
		p.key.add("overhead line with its clearance", sampleOverhead)
	}
}

func (p *picture) hasAdded() bool {
	for _, b := range p.bodies {
		if b.added {
			return true
		}
	}
	return false
}

// drawSection draws everything inside the frame: areas, then lines, then texts.
func (p *picture) drawSection(s *sheet) {
	s.inside = true
	defer func() { s.inside = false }()
	floor := lem.Profile{{X: p.x0, Y: s.view.y0}, {X: p.x1, Y: s.view.y0}}
	for i, t := range p.tops {
		next := floor
		if i+1 < len(p.tops) {
			next = p.tops[i+1]
		}
		s.add(fill{soilTint(p.sec.Strata[i].Soil), s.view.lines(between(t, next))})
	}
	p.drawBodies(s)
	p.drawFree(s)
	if cuts := s.view.lines(p.cuts); len(cuts) > 0 {
		s.stroke(cutPen, lighter, hatch(cutHatchAngle, hatchSpacing, cuts)...)
	}
	p.drawLines(s)
	p.drawLimits(s)
	p.drawLoads(s)
	p.drawGiven(s)
	p.drawSlip(s)
	p.label(s)
}

func (p *picture) drawBodies(s *sheet) {
	below := [][]xy{s.view.line(under(p.ground, min(p.lo, s.view.y0)-1))}
	var added [][]xy
	for _, b := range p.bodies {
		ring := s.view.line(b.outline)
		s.add(fill{soilTint(b.soil), [][]xy{ring}})
		s.stroke(bodyPen, light, append(ring, ring[0]))
		if b.added {
			added = append(added, ring)
		}
	}
	if len(added) == 0 {
		added = s.view.lines(p.fills)
	}
	for _, ring := range added { // One by one: bodies may cover each other.
		s.stroke(fillPen, lighter, hatch(fillHatchAngle, hatchSpacing, [][]xy{ring}, below)...)
	}
	for _, b := range p.bodies { // The ground cuts bodies.
		x0, x1 := ends(b.outline)
		if x0 < x1 {
			high := lem.Profile{{X: x0, Y: p.hi}, {X: x1, Y: p.hi}}
			s.add(fill{paper, s.view.lines(between(upper(high, crop(p.ground, x0, x1)), crop(p.ground, x0, x1)))})
		}
	}
}

func (p *picture) drawLines(s *sheet) {
	for i, t := range p.tops {
		if i > 0 {
			s.stroke(strataPen, light, s.view.line(t))
		}
	}
	floor := s.view.y0
	for _, q := range []lem.Point{p.ground[0], p.ground[len(p.ground)-1]} {
		s.add(stroke{strataPen, [][]xy{s.view.line([]lem.Point{q, {X: q.X, Y: floor}})}})
	}
	if p.sec.FirmBase != nil {
		s.stroke(firmPen, medium, s.view.line(crop(p.sec.FirmBase, p.x0, p.x1)))
	}
	p.drawWater(s)
	if p.reshaped {
		s.stroke(beforePen, medium, s.view.line(p.before))
	}
	if p.stage != nil {
		s.stroke(stagePen, medium, s.view.line(p.stage))
	}
	s.stroke(groundPen, heavy, s.view.line(p.ground))
}

func (p *picture) drawSlip(s *sheet) {
	if p.slip != nil {
		s.stroke(slipPen, heavy, s.view.line(p.slip))
	}
}

// label places the texts, those with least freedom or most weight first.
func (p *picture) label(s *sheet) {
	p.markSlope(s)
	if p.opt != nil && p.opt.Proposal != nil {
		for _, d := range p.opt.Proposal.Dimensions { // No label hides where a dimension starts.
			for _, q := range s.view.line([]lem.Point{d.From, d.To}) {
				s.place.marks = append(s.place.marks, Box{q.X, q.Y, q.X, q.Y}.grown(dimEnd))
			}
		}
		for _, d := range p.opt.Proposal.Dimensions {
			if d.Batter {
				p.batter(s, d)
			}
		}
		for _, d := range p.opt.Proposal.Dimensions {
			if !d.Batter {
				p.dimension(s, d)
			}
		}
	}
	p.labelSlip(s)
	p.labelOutfall(s)
	p.labelLoads(s)
	p.labelSlope(s)
	p.labelWater(s)
	p.labelGiven(s)
	p.labelLimits(s)
	p.labelStrata(s)
}

func (p *picture) labelSlip(s *sheet) {
	if p.slip == nil {
		return
	}
	g := p.gov
	n := note{
		lines:  []string{"FS " + fsDown(g.FS) + " (" + methodName(g.Method) + ")"},
		font:   bodyFace,
		colour: slipInk,
		bold:   true,
	}
	name := checkName(&g.Check)
	if g.Check.Stage {
		name = "stage: " + name
	}
	n.lines = append(n.lines, bodyFace.wrap(clean(name), 150, 2)...)
	n.lines = append(n.lines, "required "+requiredUp(g.Check.Required))
	var anchors []xy
	for _, share := range []float64{0.5, 0.4, 0.6, 0.3, 0.7} {
		anchors = append(anchors, s.view.at(pointAlong(p.slip, share)))
	}
	s.label(n, below, anchors...)
}

// pointAlong returns the point of a line at a share of its extent across.
func pointAlong(l []lem.Point, share float64) lem.Point {
	x := l[0].X + share*(l[len(l)-1].X-l[0].X)
	for i := 0; i+1 < len(l); i++ {
		if a, b := l[i], l[i+1]; x <= b.X && b.X > a.X {
			return lem.Point{X: x, Y: a.Y + (b.Y-a.Y)*(x-a.X)/(b.X-a.X)}
		}
	}
	return l[len(l)-1]
}
