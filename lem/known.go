package lem

import (
	"math"
	"slices"
)

// bandShare is half the thickness of the band that stands for a known slip surface, as a share of the section's width: thin enough to weigh
// nothing and to give nothing away to slips that cross it, thick against rounding.
const bandShare = 1e-5

// band returns half the thickness of the bands, m.
func (d *draught) band() float64 { return bandShare / stepWidth * d.step }

// addKnown draws out a known slip surface and adds the edges of its band.
func (d *draught) addKnown(p Profile) {
	q := d.drawOut(p)
	q = q[1 : len(q)-1] // Its ends do not run on.
	d.known = append(d.known, q)
	t := d.band()
	for i := 0; i+1 < len(q); i++ {
		a, b := q[i], q[i+1]
		d.edges = append(d.edges,
			segment{Point{a.X, a.Y + t}, Point{b.X, b.Y + t}},
			segment{Point{a.X, a.Y - t}, Point{b.X, b.Y - t}})
	}
}

// shear gives a layer, whose pore pressure is set, the strength of a known slip surface if the point of the layer lies in its band, and reports
// whether it does. Of surfaces that cross, the last counts.
func (m *Model) shear(d *draught, l *layer, x, y float64) bool {
	for i, q := range d.known {
		if x < q[0].X || x > q[len(q)-1].X || math.Abs(polylineAt(q, x)-y) > d.band() {
			continue
		}
		k := &d.s.Known[i]
		l.known, l.c, l.tan = int32(i+1), k.Cohesion, math.Tan(k.Friction)
	}
	return l.known != 0
}

// tryKnown evaluates the known slip surfaces with every governing method that can, and files them among the polylines, or the unresolved.
func (s *searcher) tryKnown() {
	for _, nodes := range s.m.known {
		for _, method := range s.polyMethods() {
			c := candidate{slip: Slip{Kind: Polyline, Nodes: slices.Clone(nodes)}, setting: s.setting}
			c.setting.Method = method
			c.r = s.m.FS(&s.ws, &c.slip, c.setting)
			switch c.r.Status {
			case Converged:
				s.known = append(s.known, c)
			case NotConverged:
				s.failed++
				if !math.IsNaN(c.r.Screen) {
					s.unres = append(s.unres, Minimum{c.slip, c.setting, c.r})
				}
			case Inadmissible:
				s.barred++
			case Missed:
			}
		}
	}
}
