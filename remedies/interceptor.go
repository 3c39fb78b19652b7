package remedies

import (
	"fmt"
	"math"
	"slices"

	"standfast/lem"
	"standfast/optimize"
)

// Places of the parameters of a piped drain: a toe drain or a crest interceptor.
const (
	pipedDepth = iota
	pipedPlace
	pipedWidth
	pipedPermeability
	pipedRecharge
)

// toeDrainKind is a drain along the toe.
func toeDrainKind() Kind {
	return Kind{
		Name:    "toe_drain",
		Title:   "toe drain",
		Summary: "A drain in a trench along the toe that holds the water line down there; above it the line follows from steady flow.",
		Parameters: pipedParameters(
			// 0.6 m to 2 m is usual (common practice, no source).
			optimize.Axis{Name: "depth", Min: 0.6, Max: 2, Step: 0.2},
			Parameter{
				Name: "offset", Unit: "m", Meaning: "Distance of the drain from the toe, outward.",
				Min: -50, Max: 100, Default: optimize.Axis{Name: "offset"},
			}),
		Choices: []Choice{{Name: "low_permeability", Soil: true, Meaning: "Soil of low permeability that the water flows on."}},
		Place:   "toe water",
		order:   orderWater,
		New:     func(j *Job, r *Request) (Remedy, error) { return newPiped(j, r, false) },
	}
}

// interceptorKind is a drain behind the crest.
func interceptorKind() Kind {
	return Kind{
		Name:    "interceptor",
		Title:   "crest interceptor",
		Summary: "A drain in a trench behind the crest that catches water on its way to the slope; below it the line follows from the flow that is left.",
		Parameters: pipedParameters(
			// Down to the ground of low permeability, if it can be reached (common practice, no source).
			optimize.Axis{Name: "depth", Min: 1, Max: 5, Step: 0.25},
			Parameter{
				Name: "setback", Unit: "m", Meaning: "Distance of the drain behind the crest, beyond where cracks may open.",
				Min: 0, Max: 200, Default: optimize.Axis{Name: "setback", Min: 3, Max: 3},
			}),
		Choices: []Choice{{Name: "low_permeability", Soil: true, Meaning: "Soil of low permeability that the water flows on."}},
		Place:   "crest water",
		order:   orderWater,
		New:     func(j *Job, r *Request) (Remedy, error) { return newPiped(j, r, true) },
	}
}

func pipedParameters(depth optimize.Axis, place Parameter) []Parameter {
	return []Parameter{
		{Name: "depth", Unit: "m", Meaning: "Depth of the drain's invert below the ground before works; it stops at the low-permeability soil.", Min: 0.1, Max: 20, Default: depth},
		place,
		{Name: "width", Unit: "m", Meaning: "Width of the trench.", Min: 0.1, Max: 5, Default: optimize.Axis{Name: "width", Min: 0.6, Max: 0.6}},
		{Name: "permeability", Unit: "m/s", Optional: true, Meaning: "Permeability of the ground that carries the water; always needed.", Min: 1e-12, Max: 1},
		{Name: "recharge", Unit: "m/s", Optional: true, Meaning: "Steady inflow from above between crest and toe, per plan area; always needed, 0 if there is none.", Min: 0, Max: 1e-3},
	}
}

// newPiped makes the remedy.
func newPiped(j *Job, r *Request, crest bool) (Remedy, error) {
	if !r.has(pipedPermeability) || !r.has(pipedRecharge) {
		return nil, fmt.Errorf("%w: %s: the water line follows from the flow: give the permeability and the recharge, both in m/s", ErrRequest, r.Kind)
	}
	soil := r.soil("low_permeability")
	if !slices.ContainsFunc(j.Section.Strata, func(s lem.Stratum) bool { return s.Soil == soil }) {
		return nil, fmt.Errorf("%w: %s: low_permeability names %q, which is no stratum of the section: name the soil of a stratum", ErrRequest, r.Kind, j.Section.Soils[soil].Name)
	}
	noun := "toe drain"
	if crest {
		noun = "interceptor"
	}
	return &piped{soil: soil, crest: crest, noun: noun}, nil
}

// piped is a drain in a trench along the slope, in which the water stands at the invert.
type piped struct {
	soil  int
	crest bool // An interceptor behind the crest; else a toe drain.
	noun  string
}

// reach is a stretch of ground between a piped drain and the other end of the slope, in the slope's coordinates.
type reach struct {
	drain, other float64 // x of the drain and of the other end, where the line stays.
	invert, base float64 // Levels, m.
	ratio        float64 // Recharge over permeability.
}

// Apply lowers the lines between the drain and the other end of the slope, in the share that drains work in each situation, and counts the
// trench.
func (d *piped) Apply(j *Job, on *Proposal, x []float64) *Proposal {
	p := on.clone()
	f := slopeOf(j, on)
	if r, ok := d.reach(j, f, p, x); ok {
		d.measure(j, p, f, r, x)
		d.lower(j, p, f, r, x)
	}
	p.note("%s: water line by Dupuit over the level of the low-permeability soil, with the recharge given; pressure from below is not drained; the trench must be supported and dug in short lengths", d.noun)
	p.finish(j)
	return p
}

// steepestBase is the fall of the base over its length up to which flow on it is taken as level flow (Dupuit's assumption; common practice,
// no source).
const steepestBase = 0.1

// reach sets out the drain; it reports false, with the violation added, where it cannot be or its assumptions fail.
func (d *piped) reach(j *Job, f *slope, p *Proposal, x []float64) (reach, bool) {
	limit := "assumptions of the " + d.noun
	r := reach{drain: f.toe.X + x[pipedPlace], other: f.crest.X, ratio: x[pipedRecharge] / x[pipedPermeability]}
	if d.crest {
		r.drain, r.other = f.crest.X-x[pipedPlace], f.toe.X
	}
	if r.drain-x[pipedWidth]/2 < f.before.Left() || r.drain+x[pipedWidth]/2 > f.before.Right() {
		p.geometry("ground within the section", math.Max(f.before.Left()-r.drain, r.drain-f.before.Right()), "%s at x = %s m lies outside the section", d.noun, metres(f.x(r.drain)))
		return r, false
	}
	a, b := f.x(r.drain), f.x(r.other)
	from, to := math.Min(a, b), math.Max(a, b)
	firm, ok := firstTop(&j.Section, d.soil, from, to)
	name := j.Section.Soils[d.soil].Name
	switch {
	case to-from <= sameLevel || d.crest != (r.drain < r.other):
		p.geometry(limit, 0, "%s at x = %s m does not lie on the wanted side of the slope", d.noun, metres(a))
		return r, false
	case !ok:
		p.geometry(limit, 0, "%s does not lie under the whole of x = %s to %s m", name, metres(from), metres(to))
		return r, false
	}
	low, high := math.Inf(1), math.Inf(-1)
	for _, q := range clipped(firm, from, to) {
		low, high = math.Min(low, q.Y), math.Max(high, q.Y)
	}
	if fall := (high - low) / (to - from); fall > steepestBase+sameLevel {
		p.geometry(limit, high-low, "the top of %s falls by %.0f %% of its length between the drain and the other end of the slope: flow on it is not level flow, for which %.0f %% is the most", name, 100*fall, 100*steepestBase)
		return r, false
	}
	r.base = high
	r.invert = math.Max(j.Section.Ground.At(a)-x[pipedDepth], firm.At(a))
	return r, true
}

// measure adds the trench and checks the limits.
func (d *piped) measure(j *Job, p *Proposal, f *slope, r reach, x []float64) {
	at, half := f.x(r.drain), x[pipedWidth]/2
	top := spliced(p.Section.Ground, j.Section.Ground, at-half, at+half, lower)
	floor := lem.Profile{{X: at - half, Y: r.invert}, {X: at + half, Y: r.invert}}
	before := sum(p.Quantities.Dig)
	addSoilAreas(p.Quantities.Dig, &p.Section, top, floor, at-half, at+half)
	dug := sum(p.Quantities.Dig) - before
	p.Quantities.TrenchDig += dug
	p.Quantities.Stone += dug
	p.Quantities.Drain++
	p.Quantities.Piped++
	p.checkSpan(j, at-half, at+half, d.noun, d.noun)
	p.checkDig(j, floor, at-half, at+half, d.noun)
	if o := j.Limits.Outfall; o != nil && *o-r.invert > limitSlack {
		p.violate("outfall", *o-r.invert, "invert of %s at level %s m lies below the outfall, level %s m", d.noun, metres(r.invert), metres(*o))
	}
	p.Dimensions = append(p.Dimensions, lengthDim("drain depth", lem.Point{X: at, Y: j.Section.Ground.At(at)}, lem.Point{X: at, Y: r.invert}))
}

// lower brings the lines of the situations down, and notes what the drain has to carry.
func (d *piped) lower(j *Job, p *Proposal, f *slope, r reach, x []float64) {
	var most float64
	bring := func(s *Situation, w *lem.Water) {
		line := w.Line
		if f.mirrored {
			line = line.Mirror()
		}
		most = math.Max(most, x[pipedPermeability]*r.inflow(line, d.crest))
		line = r.lowered(line, s.DrainsWorking)
		if f.mirrored {
			line = line.Mirror()
		}
		w.Line = line
	}
	for i := range j.Situations {
		s := &j.Situations[i]
		if s.Water == dry || s.DrainsWorking == 0 {
			continue
		}
		l := &j.Waters[s.Water]
		if why := l.undrainable(); why != "" {
			p.note("water line %q %s: %s is not taken to lower it", l.Name, why, d.noun)
			continue
		}
		if len(l.BySoil) > 0 {
			p.note("water line %q: %s is not taken to lower the lines of single soils", l.Name, d.noun)
		}
		bring(s, &p.Waters[i])
		for k := range p.variants {
			if p.variants[k].situation == i {
				bring(s, &p.variants[k].water)
			}
		}
	}
	p.note("%s: it must carry about %.2g m3/s per m", d.noun, most)
}

// inflow returns what flows into the drain over the permeability, m2 per m: for an interceptor i D, the gradient of the line at the drain times
// the depth of flow that it cuts off (Darcy 1856); for a toe drain the flow of the lowered line.
func (r *reach) inflow(line lem.Profile, crest bool) float64 {
	level := line.At(r.drain)
	if level <= r.invert {
		return 0
	}
	if crest {
		const beside = 1.0 // m, over which the gradient is taken.
		gradient := math.Max(0, line.At(r.drain-beside)-level) / beside
		return gradient * (level - r.invert)
	}
	c := r.curve(line)
	return math.Abs(c.flow(1)) + r.ratio*c.length
}

// curve is the flow between the drain and the other end.
func (r *reach) curve(line lem.Profile) dupuit {
	return dupuit{
		h1: math.Max(0, math.Min(line.At(r.drain), r.invert)-r.base), h2: math.Max(0, line.At(r.other)-r.base),
		length: math.Abs(r.other - r.drain), ratio: r.ratio,
	}
}

// lowered returns a line brought down between the drain and the other end to that of steady flow between the level of the invert and the level
// that the line has at the other end, in a share. Upstream of an interceptor and downstream of a toe drain it stays, which is on the safe
// side. It is never raised.
func (r *reach) lowered(line lem.Profile, share float64) lem.Profile {
	if line.At(r.drain) <= r.invert {
		return line
	}
	c := r.curve(line)
	sense := 1.0
	if r.other < r.drain {
		sense = -1
	}
	n := int(math.Ceil(c.length / drainStation))
	flow := make(lem.Profile, n+1)
	step := c.length / float64(n)
	for i := range flow {
		at := step * float64(i)
		// The curve is hollow downwards: between stations it lies above its chords by at most twice its rise midway.
		rise := 0.0
		for _, next := range []float64{at - step, at + step} {
			if next > -step/2 && next < c.length+step/2 {
				rise = math.Max(rise, 2*(c.head((at+next)/2)-(c.head(at)+c.head(next))/2))
			}
		}
		flow[i] = lem.Point{X: r.drain + sense*at, Y: r.base + c.head(at) + rise}
	}
	if sense < 0 {
		slices.Reverse(flow)
	}
	from, to := flow.Left(), flow.Right()
	var out path
	for _, q := range pieces(line, flow, math.Min(from, line.Left()), math.Max(to, line.Right()), from, to) {
		y0, y1 := q.a0, q.a1
		if q.x0 >= from && q.x1 <= to {
			y0 -= share * math.Max(0, q.a0-q.b0)
			y1 -= share * math.Max(0, q.a1-q.b1)
		}
		out.add(q.x0, y0)
		out.add(q.x1, y1)
	}
	return lem.Profile(out)
}
