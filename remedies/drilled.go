package remedies

import (
	"fmt"
	"math"

	"standfast/lem"
	"standfast/optimize"
)

// Places of the parameters of drilled drains.
const (
	drilledLength = iota
	drilledSpacing
	drilledRise
	drilledOutlet
	drilledDiameter
	drilledSolid
	drilledPermeability
	drilledRecharge
	drilledDepthBelow
)

// drilledDrainsKind is a row of drains drilled into the slope from its face.
func drilledDrainsKind() Kind {
	return Kind{
		Name:    "drilled_drains",
		Title:   "drilled drains",
		Summary: "A row of drains drilled into the slope from its face, a little upwards, that lower the water table between them.",
		Parameters: []Parameter{
			{
				// 20 m to 60 m is usual, 100 m about the most (common practice, no source).
				Name: "length", Unit: "m", Meaning: "Drilled length of a drain.",
				Min: 1, Max: 150, Default: optimize.Axis{Name: "length", Min: 15, Max: 50, Step: 2.5},
			},
			{
				// 3 m to 15 m is usual (common practice, no source).
				Name: "spacing", Unit: "m", Meaning: "Spacing of the drains along the slope.",
				Min: 0.5, Max: 100, Default: optimize.Axis{Name: "spacing", Min: 3, Max: 15, Step: 0.5},
			},
			{
				// 2 to 10 degrees is usual (common practice, no source).
				Name: "rise", Unit: "degrees", Meaning: "Angle at which a drain rises into the slope.",
				Min: 0, Max: 30, Default: optimize.Axis{Name: "rise", Min: 5, Max: 5},
			},
			{
				Name: "outlet", Unit: "m", Meaning: "Height of the outlets above the toe.",
				Min: 0, Max: 100, Default: optimize.Axis{Name: "outlet", Min: 0.5, Max: 0.5},
			},
			{
				// Holes of 100 mm to 120 mm are usual (common practice, no source).
				Name: "diameter", Unit: "m", Meaning: "Diameter of the hole.",
				Min: 0.02, Max: 1, Default: optimize.Axis{Name: "diameter", Min: 0.1, Max: 0.1},
			},
			{
				// The outer 3 m to 6 m are usually solid and grouted (common practice, no source).
				Name: "solid_length", Unit: "m", Meaning: "Outer part of a drain that is solid pipe and takes no water.",
				Min: 0, Max: 50, Default: optimize.Axis{Name: "solid_length", Min: 3, Max: 3},
			},
			{Name: "permeability", Unit: "m/s", Optional: true, Meaning: "Permeability of the ground; always needed.", Min: 1e-12, Max: 1},
			{Name: "recharge", Unit: "m/s", Optional: true, Meaning: "Steady inflow from above, per plan area; always needed.", Min: 1e-14, Max: 1e-3},
			{Name: "depth_below", Unit: "m", Optional: true, Meaning: "Depth of permeable ground below the drains; 0, the safe side, if not given.", Min: 0, Max: 200},
		},
		Place: "water",
		order: orderDrains,
		New:   newDrilledDrains,
	}
}

// newDrilledDrains makes the remedy; how far the drains lower the water follows from numbers that nobody but the user can know.
func newDrilledDrains(_ *Job, r *Request) (Remedy, error) {
	if !r.has(drilledPermeability) || !r.has(drilledRecharge) {
		return nil, fmt.Errorf("%w: drilled_drains: the spacing follows from the flow: give the permeability and the recharge, both in m/s", ErrRequest)
	}
	if r.Axes[drilledRecharge].Max >= r.Axes[drilledPermeability].Min {
		return nil, fmt.Errorf("%w: drilled_drains: a recharge of %g m/s does not pass through ground of permeability %g m/s: give a recharge below it", ErrRequest,
			r.Axes[drilledRecharge].Max, r.Axes[drilledPermeability].Min)
	}
	return drilledDrains{}, nil
}

type drilledDrains struct{}

// Apply lowers the water between the drains to the mean of the water table of Hooghoudt, and adds the state midway between drains.
func (drilledDrains) Apply(j *Job, on *Proposal, x []float64) *Proposal {
	p := on.clone()
	f := slopeOf(j, on)
	h := hooghoudt{
		spacing: x[drilledSpacing], depth: given(x[drilledDepthBelow], 0), radius: x[drilledDiameter] / 2,
		permeability: x[drilledPermeability], recharge: x[drilledRecharge],
	}
	t, ok := drilled(f, p, x)
	if ok {
		measureDrilled(j, p, f, t, x)
	} else {
		t = nil
	}
	p.drain(j, t, "drilled drains", leaves(h.mean()), leaves(h.midspan()))
	p.note("drilled drains: water table between drains by Hooghoudt with the equivalent depth of Moody, from the permeability and recharge given; at midspan it stands %s m above the drains", metres(h.midspan()))
	p.note("drilled drains: they must meet the ground that carries the water; the outer %s m are solid; water from beyond their inner ends is not counted; without upkeep they last 15 to 20 years", metres(x[drilledSolid]))
	p.finish(j)
	return p
}

// leaves returns the fall that leaves a head above the drains.
func leaves(left float64) fall {
	return fall{ratio: func(_, h float64) float64 { return math.Max(0, 1-left/h) }}
}

// drilled sets out a drain; it reports false, with the violation added, where none can be.
func drilled(s *slope, p *Proposal, x []float64) (*trench, bool) {
	const limit = "layout of the drilled drains"
	level := s.toe.Y + x[drilledOutlet]
	out, ok := meet(ray(s.before, lem.Point{X: s.toe.X, Y: level}, math.Inf(1)), s.before, s.toe.X, s.crest.X, lower)
	if !ok {
		p.geometry(limit, level-s.crest.Y, "outlets %s m above the toe do not lie on the face", metres(x[drilledOutlet]))
		return nil, false
	}
	sin, cos := math.Sincos(x[drilledRise] * math.Pi / 180)
	at := func(l float64) lem.Point { return lem.Point{X: out.X - l*cos, Y: out.Y + l*sin} }
	solid, end := at(x[drilledSolid]), at(x[drilledLength])
	switch {
	case x[drilledSolid] >= x[drilledLength]-sameLevel:
		p.geometry(limit, x[drilledSolid]-x[drilledLength], "drilled drains %s m long are solid over %s m and take no water", metres(x[drilledLength]), metres(x[drilledSolid]))
		return nil, false
	case end.X < s.before.Left():
		p.geometry("ground within the section", s.before.Left()-end.X, "inner end of drilled drains at x = %s m lies outside the section", metres(s.x(end.X)))
		return nil, false
	}
	if h, _ := highest(lem.Profile{end, out}, s.before, end.X, out.X-limitSlack); h > limitSlack {
		p.geometry(limit, h, "drilled drains rising at %g degrees come out of the ground", x[drilledRise])
		return nil, false
	}
	a, b := s.own(end), s.own(solid)
	if a.X > b.X {
		a, b = b, a
	}
	return &trench{from: a.X, to: b.X, spacing: x[drilledSpacing], clear: x[drilledSpacing], invert: lem.Profile{a, b}}, true
}

// measureDrilled adds the quantities and the dimension of drilled drains and checks the limits.
func measureDrilled(j *Job, p *Proposal, s *slope, t *trench, x []float64) {
	p.Quantities.Drain += x[drilledLength] / t.spacing
	p.Quantities.Drilled += x[drilledLength] / t.spacing
	sin, cos := math.Sincos(x[drilledRise] * math.Pi / 180)
	solid, end := t.invert[len(t.invert)-1], t.invert[0]
	left, right := "inner end of drilled drains", "outlet of drilled drains"
	if s.mirrored {
		solid, end = end, solid
		left, right = right, left
	}
	out := lem.Point{X: solid.X + x[drilledSolid]*cos*j.Facing(), Y: solid.Y - x[drilledSolid]*sin}
	bore := lem.Profile{end, out}
	if s.mirrored {
		bore = lem.Profile{out, end}
	}
	p.checkSpan(j, bore.Left(), bore.Right(), left, right)
	p.checkDig(j, bore, bore.Left(), bore.Right(), "drilled drain")
	if o := j.Limits.Outfall; o != nil && *o-out.Y > limitSlack {
		p.violate("outfall", *o-out.Y, "outlets of drilled drains at level %s m lie below the outfall, level %s m", metres(out.Y), metres(*o))
	}
	p.Dimensions = append(p.Dimensions, lengthDim("drain length", end, out))
}
