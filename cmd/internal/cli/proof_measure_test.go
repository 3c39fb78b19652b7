package cli

import (
	"fmt"
	"math"

	"standfast/lem"
	"standfast/remedies"
)

// A stranger's own measuring of works, from the grounds and holes of result.json and the sizes alone: earthworks, drain metres, and what
// the limits of the site forbid. It does for the three invented sections of the twins: one straight face, limits at either side and on
// outfalls.

// measured is what is measured on a design.
type measured struct {
	job    *remedies.Job
	kind   string
	before *theirSection
	after  *theirSection
	size   map[string]float64 // Parameters by name.
	firm   theirLine          // Top of the soil of low permeability; nil if none is named.
	uphill float64            // +1 if the slope rises to the right.
	batter float64            // Of the face as it is.
}

// measure makes ready what is measured on the design at x.
func measure(j *remedies.Job, r *remedies.Request, before, after *theirSection, x []float64) *measured {
	m := &measured{job: j, kind: r.Kind, before: before, after: after, size: map[string]float64{}, uphill: -j.Facing()}
	for i, a := range r.Axes {
		if a.Name != "" {
			m.size[a.Name] = x[i]
		}
	}
	m.batter = math.Abs(j.Crest.X-j.Toe.X) / j.Height()
	if soil, ok := r.Soils["low_permeability"]; ok {
		for _, s := range before.Strata {
			if s.Soil == j.Section.Soils[soil].Name {
				m.firm = s.Top
			}
		}
	}
	return m
}

func (l theirLine) profile() lem.Profile {
	var p lem.Profile
	for _, q := range l {
		p = append(p, lem.Point{X: q[0], Y: q[1]})
	}
	return p
}

// holes returns the outlines of what is dug out and filled again: bodies placed in the ground as it was.
func (m *measured) holes() (out []theirLine) {
	for _, p := range m.after.Placed {
		var depth float64
		for _, q := range p.Outline {
			depth += m.before.Ground.at(q[0]) - q[1]
		}
		if depth > 0 {
			out = append(out, p.Outline)
		}
	}
	return out
}

// area is that of a closed outline (shoelace formula).
func (l theirLine) area() (a float64) {
	for i, q := range l {
		p := l[(i+len(l)-1)%len(l)]
		a += (p[0]*q[1] - q[0]*p[1]) / 2
	}
	return math.Abs(a)
}

// trench returns where trench drains begin and end.
func (m *measured) trench() (from, to float64) {
	from, to = m.job.Toe.X, m.job.Crest.X
	if x, ok := m.size["from"]; ok {
		from = x
	}
	if x, ok := m.size["to"]; ok {
		to = x
	}
	return min(from, to), max(from, to)
}

// invert is the level of the bottom of a drain's trench at x.
func (m *measured) invert(x float64) float64 {
	y := m.before.Ground.at(x) - m.size["depth"]
	if m.firm != nil {
		y = max(y, m.firm.at(x))
	}
	if o := m.job.Limits.Outfall; o != nil && m.kind == "trench_drains" {
		y = max(y, *o)
	}
	return y
}

// piped returns the middle of the trench of a toe drain or an interceptor.
func (m *measured) piped() float64 {
	if m.kind == "toe_drain" {
		return m.job.Toe.X - m.uphill*m.size["offset"]
	}
	return m.job.Crest.X + m.uphill*m.size["setback"]
}

// earthworks returns cut plus fill, m3/m, and the metres of drains a metre run.
func (m *measured) earthworks() (volume, drains float64) {
	volume = worksArea(m.before.Ground.profile(), m.after.Ground.profile())
	for _, h := range m.holes() {
		volume += 2 * h.area()
	}
	const dx = 0.002
	dig := func(from, to float64) (area, length float64) {
		for x := from + dx/2; x < to; x += dx {
			area += max(0, m.before.Ground.at(x)-m.invert(x)) * dx
			length += math.Hypot(dx, m.invert(x+dx/2)-m.invert(x-dx/2))
		}
		return area, length
	}
	switch m.kind {
	case "trench_drains":
		area, length := dig(m.trench())
		volume += 2 * area * m.size["width"] / m.size["spacing"]
		drains = length / m.size["spacing"]
	case "drilled_drains":
		drains = m.size["length"] / m.size["spacing"]
	case "toe_drain", "interceptor":
		half, floor := m.size["width"]/2, m.invert(m.piped())
		for x := m.piped() - half + dx/2; x < m.piped()+half; x += dx {
			volume += 2 * dx * max(0, m.before.Ground.at(x)-floor)
		}
		drains = 1
	}
	return volume, drains
}

// extent returns the outermost x of the works.
func (m *measured) extent() (from, to float64) {
	const same = 1e-6
	from, to = math.Inf(1), math.Inf(-1)
	reach := func(x float64) { from, to = min(from, x), max(to, x) }
	before, after := m.before.Ground.profile(), m.after.Ground.profile()
	xs := breaks(before, after)
	for i, x := range xs {
		if math.Abs(after.At(x)-before.At(x)) > same {
			reach(xs[max(i-1, 0)])
			reach(xs[min(i+1, len(xs)-1)])
		}
	}
	for _, h := range m.holes() {
		for _, q := range h {
			reach(q[0])
		}
	}
	switch m.kind {
	case "trench_drains":
		a, b := m.trench()
		reach(a)
		reach(b)
	case "drilled_drains":
		out := m.job.Toe.X + m.uphill*m.batter*m.size["outlet"]
		reach(out)
		reach(out + m.uphill*m.size["length"]*math.Cos(m.size["rise"]*math.Pi/180))
	case "toe_drain", "interceptor":
		reach(m.piped() - m.size["width"]/2)
		reach(m.piped() + m.size["width"]/2)
	}
	return from, to
}

// forbidden says which limit or which plain geometry stands against the works; "" if nothing does.
func (m *measured) forbidden() string {
	const slack = 1e-5 // m.
	l := &m.job.Limits
	from, to := m.extent()
	outlet := m.invert(m.piped())
	switch m.kind {
	case "drilled_drains":
		outlet = m.job.Toe.Y + m.size["outlet"]
		if m.size["solid_length"] >= m.size["length"] {
			return "drains that are solid all the way"
		}
	case "trench_drains":
		if a, b := m.trench(); m.firm != nil && m.size["effectiveness"] == 0 {
			for x := a; x <= b; x += 0.01 {
				if m.invert(x) > m.firm.at(x)+slack {
					return fmt.Sprintf("trenches end above the soil of low permeability at x = %.2f", x)
				}
			}
		}
	case "unload", "lightweight_fill": // The back batter must not come out on the face.
		if m.batter*m.size["depth"]-m.size["width"]-m.size["back_batter"]*m.size["depth"] > slack {
			return "face above undercut"
		}
	}
	drains := m.kind == "drilled_drains" || m.kind == "toe_drain" || m.kind == "interceptor"
	switch {
	case l.Left != nil && from < l.Left.X-slack:
		return l.Left.Name
	case l.Right != nil && to > l.Right.X+slack:
		return l.Right.Name
	case drains && l.Outfall != nil && outlet < *l.Outfall-slack:
		return "outfall"
	}
	return ""
}
