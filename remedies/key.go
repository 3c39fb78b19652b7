package remedies

import (
	"math"

	"standfast/lem"
)

// hole is a trapezium dug below the ground and filled again.
type hole struct {
	centre float64 // x of the middle of its bottom, on the slope.
	bottom float64 // Level of its bottom, m.
	width  float64 // Of its bottom, m.
	batter float64 // Of its sides, n of 1V:nH.
}

// shape returns the hole as a cut from the ground in force.
func (h *hole) shape(s *slope, noun string) shape {
	limit := "shape of the " + noun
	a := lem.Point{X: h.centre - h.width/2, Y: h.bottom}
	b := lem.Point{X: h.centre + h.width/2, Y: h.bottom}
	if a.X < s.ground.Left() || b.X > s.ground.Right() {
		return noShape("ground within the section", math.Max(s.ground.Left()-a.X, b.X-s.ground.Right()), "bottom of %s lies outside the section", noun)
	}
	for _, p := range []lem.Point{a, b} {
		if p.Y > s.ground.At(p.X)-limitSlack {
			return noShape(limit, p.Y-s.ground.At(p.X), "bottom of %s at x = %s m does not lie below the ground", noun, metres(s.x(p.X)))
		}
	}
	up, okUp := meet(ray(s.ground, a, h.batter), s.ground, a.X, s.ground.Left(), upper)
	down, okDown := meet(ray(s.ground, b, -h.batter), s.ground, b.X, s.ground.Right(), upper)
	if !okUp || !okDown {
		return noShape("ground within the section", 0, "a side of %s at %s meets no ground in the section", noun, batterText(h.batter))
	}
	var line path
	for _, p := range []lem.Point{up, a, b, down} {
		line.add(p.X, p.Y)
	}
	sh := shape{
		line: lem.Profile(line), cut: true, uphill: "uphill side of " + noun, foot: "downhill side of " + noun,
		faces: []face{{batter: h.batter, temporary: true}},
		dims:  []Dimension{lengthDim("width of "+noun, a, b)},
	}
	return sh
}

// refill digs to a shape and fills it again to the ground that was there. The water lines stay: they find the ground as it was.
func (p *Proposal) refill(j *Job, sh *shape, mirrored bool, soil int, noun string) {
	ground := p.Section.Ground
	after := spliced(ground, sh.line, sh.from(), sh.to(), lower)
	runs := runsAbove(ground, after)
	for _, r := range runs {
		addSoilAreas(p.Quantities.Cut, &p.Section, ground, after, r.from, r.to)
		p.addTopsoil(j, after, r.from, r.to)
		p.checkDig(j, after, r.from, r.to, noun)
		p.Quantities.Fill[soil] += r.area
		p.exchanged = append(p.exchanged, lem.Range{From: r.from, To: r.to})
	}
	for i := range runs {
		p.Section.Placed = append(p.Section.Placed, lem.Body{Soil: soil, Outline: runs[i].outline()})
	}
	left, right := sh.uphill, sh.foot
	if mirrored {
		left, right = right, left
	}
	p.checkFences(j, runs, left, right)
	p.checkForm(j, sh, false, noun)
	p.Dimensions = append(p.Dimensions, sh.dims...)
}
