package lem

import (
	"math"
	"slices"
)

// addColumn adds the column between two breakpoints, with its layers.
func (m *Model) addColumn(d *draught, x0, x1 float64) {
	xm := (x0 + x1) / 2
	c := column{
		x0: x0, x1: x1, ground: lineOver(d.ground, x0, x1), water: nowhere, free: math.Inf(-1), firm: nowhere,
		first: int32(len(m.layers)),
	}
	c.tangent = c.ground.b / math.Hypot(1, c.ground.b)
	if d.s.FirmBase != nil {
		c.firm = lineOver(d.s.FirmBase, x0, x1)
	}
	m.addWater(d, &c, xm)
	c.crack = d.crackOver(&c)
	c.surface = d.s.SoilAt(xm, c.ground.at(xm)-d.step)
	m.addLoads(d, &c, xm)
	m.addLayers(d, &c, xm)
	c.last = int32(len(m.layers))
	m.cols = append(m.cols, c)
}

// addWater sets the column's head line, free water and drains.
func (m *Model) addWater(d *draught, c *column, xm float64) {
	w := &d.sit.Water
	if d.water != nil {
		c.water = lineOver(d.water, c.x0, c.x1)
	}
	lowest := min(c.ground.at(c.x0), c.ground.at(c.x1))
	for _, f := range d.free { // Water that reaches to a vertical face stands against all of the drawn-out step.
		if f.FromX-d.step < xm && xm < f.ToX+d.step && f.Level > lowest+d.step {
			c.free = max(c.free, f.Level)
		}
	}
	if c.free > c.water.at(xm) { // Still water: the head under it is its level.
		c.water = line{c.free, 0}
	}
	if dr := w.Drains; dr != nil && dr.Invert.Left() < xm && xm < dr.Invert.Right() {
		c.invert = lineOver(dr.Invert, c.x0, c.x1)
		ratio := make(Profile, len(dr.Ratio))
		for i, r := range dr.Ratio {
			ratio[i] = Point{dr.Invert[i].X, r}
		}
		c.ratio = lineOver(ratio, c.x0, c.x1)
		c.fade = dr.Fade
	}
}

// addLayers adds the layers of a column from the top down, and sums up the weight above them.
func (m *Model) addLayers(d *draught, c *column, xm float64) {
	ground := c.ground.at(xm)
	var below []line
	for _, e := range d.edges {
		if e.a.X <= c.x0+d.step/4 && e.b.X >= c.x1-d.step/4 && e.b.X-e.a.X > d.step/4 {
			if l := e.line(); l.at(xm) < ground-d.step {
				below = append(below, l)
			}
		}
	}
	slices.SortFunc(below, func(p, q line) int { return compareDown(p.at(xm), q.at(xm)) })
	below = append(below, nowhere)
	top := c.ground
	var sigma line // Weight of the layers above the present one.
	for _, l := range below {
		y := top.at(xm)
		if y-l.at(xm) < d.step {
			continue
		}
		mid := y - 1 // Of the lowest layer, which has no bottom.
		if l != nowhere {
			mid = (y + l.at(xm)) / 2
		}
		next := m.newLayer(d, c, xm, mid)
		next.bottom = l
		n := len(m.layers)
		if n > int(c.first) && m.layers[n-1].continues(&next) {
			m.layers[n-1].bottom = l
		} else {
			next.sigma, next.slope = sigma.a+next.gamma*top.a, sigma.b+next.gamma*top.b
			m.layers = append(m.layers, next)
		}
		if l != nowhere {
			sigma.a += next.gamma * (top.a - l.a)
			sigma.b += next.gamma * (top.b - l.b)
		}
		top = l
	}
}

// continues reports whether the next layer down is the same but for its place.
func (l *layer) continues(next *layer) bool {
	return l.soil == next.soil && l.gamma == next.gamma && l.known == next.known && l.gradient == next.gradient && l.datum == next.datum
}

// newLayer returns the layer that holds the point, without its place in the column.
func (m *Model) newLayer(d *draught, c *column, x, y float64) layer {
	i := d.s.SoilAt(x, y)
	soil := &d.s.Soils[i]
	l := layer{soil: int32(i), gamma: soil.UnitWeight, pore: poreNone}
	if y < m.setPore(d, &l, c, x) && soil.SaturatedUnitWeight > 0 {
		l.gamma = soil.SaturatedUnitWeight
	}
	if m.shear(d, &l, x, y) {
		return l
	}
	if i < len(d.sit.Undrained) && d.sit.Undrained[i] {
		d.setUndrained(&l, c, x, y)
		return l
	}
	l.c, l.tan = soil.Cohesion, math.Tan(soil.Friction)
	if p := soil.PowerLaw; p != nil {
		l.kind, l.curve, m.curved = strengthCurved, p.envelope(), true
		_, l.tan = l.curve.tangent(AtmosphericPressure)
	}
	return l
}

// setUndrained gives a layer the undrained strength of its soil.
func (d *draught) setUndrained(l *layer, c *column, x, y float64) {
	u := d.s.Soils[l.soil].Undrained
	l.pore, l.c, l.tan = poreNone, u.Strength, 0
	switch {
	case len(u.Points) > 0:
		l.kind = strengthPoints
	case u.byRatio():
		base, perMetre := d.effectiveBefore(c, d.before[l.soil], x, y)
		l.kind, l.c = strengthRatio, u.Minimum
		l.gradient, l.datum = u.Ratio*perMetre, line{u.Ratio * base.a, u.Ratio * base.b}
	case u.Gradient != 0 && len(u.Datum) > 0:
		l.kind, l.gradient, l.datum = strengthGradient, u.Gradient, lineOver(u.Datum, c.x0, c.x1)
	}
}

// byRatio reports whether cu hangs on the stress before works.
func (u *UndrainedStrength) byRatio() bool { return u.Ratio != 0 && len(u.Points) == 0 }
