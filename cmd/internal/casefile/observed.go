package casefile

import (
	"math"

	"standfast/lem"
	"standfast/remedies"
)

func observedShape() *shape {
	return object(
		field{key: "line", shape: lineShape(), standard: "this or `circle` is required", meaning: "Points of the slip from left to right, no two above each other; its ends run on to the ground.", example: "[[28, 109], [36, 101], [46, 98.5], [54, 100]]"},
		field{key: "circle", shape: circleShape(), standard: "this or `line` is required", meaning: "The slip as the lower arc of a circle.", example: "{centre: [49, 119.5], radius: 22}"},
		field{key: "situation", shape: text("the name of a situation"), standard: "the first situation", meaning: "Name of the situation whose water, strength and earthquake held at failure.", example: "high water"},
	).exactlyOne("line", "circle")
}

func circleShape() *shape {
	return object(
		field{key: "centre", shape: pointShape(), required: true, meaning: "Centre of the circle.", example: "[49, 119.5]"},
		field{key: "radius", shape: number("m", above(0)), required: true, meaning: "Radius of the circle.", example: "22"},
	)
}

// readObserved fills the slip that has happened.
func (b *builder) readObserved(v value) {
	if !v.there() {
		return
	}
	o := &remedies.Observed{}
	ok := false
	if line := b.get(v, "line"); line.there() {
		o.Slip.Kind = lem.Polyline
		o.Slip.Nodes, ok = b.slipLine(line)
	} else {
		ok = b.slipCircle(b.get(v, "circle"), &o.Slip)
	}
	if at := b.get(v, "situation"); at.there() {
		i, found := b.situationRef(at)
		o.Situation, ok = i, ok && found
	}
	if ok {
		b.job.Observed = o
	}
}

// slipLine returns the points of a slip, which lie within the ground and of which no two stand above each other.
func (b *builder) slipLine(v value) (lem.Profile, bool) {
	line, ok := b.line(v)
	if !ok {
		return nil, false
	}
	items := b.items(v)
	for i := 1; i < len(line); i++ {
		if line[i].X == line[i-1].X {
			b.addFault(items[i], "set the two points 0.01 m apart", "a slip cannot be vertical, as it is at x = %s", figure(line[i].X))
			ok = false
		}
	}
	g := b.job.Section.Ground
	if g == nil || !ok {
		return line, ok
	}
	if line.Right() <= g.Left() || line.Left() >= g.Right() {
		b.addFault(v, "", "the slip lies beyond the ground, which runs from x = %s to %s", figure(g.Left()), figure(g.Right()))
		return line, false
	}
	if passesBelow(line, g) {
		return line, true
	}
	b.addFault(v, "write levels, not depths, some of them below the ground", "no point of the slip lies below the ground")
	return line, false
}

// slipCircle fills the circle of a slip, whose lower arc must pass below the ground.
func (b *builder) slipCircle(v value, s *lem.Slip) bool {
	centre, okCentre := b.point(b.get(v, "centre"))
	radius, okRadius := b.number(b.get(v, "radius"))
	g := b.job.Section.Ground
	if !okCentre || !okRadius || g == nil {
		return false
	}
	s.Centre, s.Radius = centre, radius
	const stations = 1000
	for i := range stations + 1 {
		dx := radius * (2*float64(i)/stations - 1)
		x := centre.X + dx
		if x >= g.Left() && x <= g.Right() && centre.Y-math.Sqrt(radius*radius-dx*dx) < g.At(x) {
			return true
		}
	}
	b.addFault(v, "write a centre above the ground and a radius that reaches below it", "the lower arc of the circle does not pass below the ground")
	return false
}

// situationRef returns the index of the situation that the value names; it records a fault if there is none of that name.
func (b *builder) situationRef(v value) (int, bool) {
	name, ok := b.text(v)
	if !ok {
		return 0, false
	}
	var all []string
	for i, s := range b.job.Situations {
		if s.Name == name {
			return i, true
		}
		all = append(all, s.Name)
	}
	b.addFault(v, didYouMean(name, all), "there is no situation named `%s`", clip(name))
	return 0, false
}
