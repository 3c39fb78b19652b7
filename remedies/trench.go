package remedies

import (
	"math"
	"slices"

	"standfast/lem"
)

const (
	// drainStation is the greatest distance between points at which the ratio lowered is worked out, m.
	drainStation = 0.75
	// midspanNote marks the check midway between drains.
	midspanNote = "midspan between drains"
)

// trenchDrains is the remedy with its choices made.
type trenchDrains struct {
	soil int // Soil of low permeability reached; noSoil if the effectiveness is given.
}

// trench is one trench as a line of the section, in the section's own coordinates.
type trench struct {
	from, to float64
	spacing  float64 // Centre to centre, m.
	clear    float64 // Between trenches, m.
	width    float64
	invert   lem.Profile // From x = from to x = to.
}

// Apply lowers the pore pressure of every situation in the share that its drains work, and adds to each such situation the state
// midway between drains.
func (d *trenchDrains) Apply(j *Job, on *Proposal, x []float64) *Proposal {
	p := on.clone()
	f := slopeOf(j, on)
	t, ok := d.trench(j, f, p, x)
	if ok {
		d.measure(j, p, f, t)
	} else {
		t = nil
	}
	p.drain(j, t, "trench drains", meanFall(x[drainEffectiveness]), midspanFall(x[drainEffectiveness]))
	d.explain(p, x)
	p.finish(j)
	return p
}

// drain lowers the pore pressure of every situation by drains laid out as t, in the share that they work, and adds to each such situation the
// state midway between drains; nil lowers nothing and adds the same states.
func (p *Proposal) drain(j *Job, t *trench, noun string, mean, mid fall) {
	p.mayDrain = true
	for i, s := range j.Situations {
		if s.Water == dry || s.DrainsWorking == 0 {
			continue
		}
		l := &j.Waters[s.Water]
		if why := l.undrainable(); why != "" {
			p.note("water line %q %s: %s are not taken to lower it", l.Name, why, noun)
			continue
		}
		if len(l.BySoil) > 0 {
			p.note("water line %q: %s are not taken to lower the lines of single soils", l.Name, noun)
		}
		between := p.Waters[i]
		if t != nil {
			between.Drains = t.drawdown(between.Line, s.DrainsWorking, mid)
			p.Waters[i].Drains = t.drawdown(p.Waters[i].Line, s.DrainsWorking, mean)
		}
		p.variants = append(p.variants, variant{situation: i, note: midspanNote, water: between})
	}
	if line := j.Stage.Water; t != nil && j.Stage.Given && line != dry && j.Waters[line].undrainable() == "" {
		p.drained = t.drawdown(j.Waters[line].Line, 1, mean)
	}
	if !slices.ContainsFunc(j.Situations, func(s Situation) bool { return s.DrainsWorking < 1 }) {
		p.note("%s: no design situation takes the drains as partly blocked", noun)
	}
}

// undrainable says why drains are not taken to lower a line; "" if they are.
func (l *WaterLine) undrainable() string {
	switch {
	case l.Artesian:
		return "is artesian"
	case len(l.Points) > 0:
		return "has pore pressures at points"
	case l.Line == nil:
		return "has no line but those of single soils"
	}
	return ""
}

// explain notes where the fall of the head comes from.
func (d *trenchDrains) explain(p *Proposal, x []float64) {
	if math.IsNaN(x[drainEffectiveness]) {
		p.note("trench drains: pore pressure from the series for drains down to soil of low permeability, the water line taken as fed from the surface")
		return
	}
	p.note("trench drains: effectiveness as given, a mean between drains; midway between them the head left is taken as 1.5 times that, as for a parabola")
}

// trench sets out a trench; it reports false, with the violation added, where none can be.
func (d *trenchDrains) trench(j *Job, s *slope, p *Proposal, x []float64) (*trench, bool) {
	const limit = "layout of the trench drains"
	t := &trench{from: j.Toe.X, to: j.Crest.X, spacing: x[drainSpacing], width: x[drainWidth], clear: x[drainSpacing] - x[drainWidth]}
	if !math.IsNaN(x[drainFrom]) {
		t.from = x[drainFrom]
	}
	if !math.IsNaN(x[drainTo]) {
		t.to = x[drainTo]
	}
	t.from, t.to = math.Min(t.from, t.to), math.Max(t.from, t.to)
	before := j.Section.Ground
	switch {
	case t.clear <= 0:
		p.violate(limit, -t.clear, "trenches %s m wide leave no ground between them at a spacing of %s m", metres(t.width), metres(t.spacing))
		return nil, false
	case t.to-t.from <= sameLevel:
		p.violate(limit, 0, "trench drains from x = %s m to x = %s m have no length", metres(t.from), metres(t.to))
		return nil, false
	case t.from < before.Left() || t.to > before.Right():
		p.violate(limit, math.Max(before.Left()-t.from, t.to-before.Right()), "trench drains from x = %s m to x = %s m reach outside the section", metres(t.from), metres(t.to))
		return nil, false
	}
	bottom := shifted(before, -x[drainDepth])
	if o := j.Limits.Outfall; o != nil { // The trench runs shallower towards its outlet, so that it can discharge.
		level := lem.Profile{{X: t.from, Y: *o}, {X: t.to, Y: *o}}
		if over, at := highest(level, before, t.from, t.to); over > limitSlack {
			p.violate("outfall", over, "the ground at x = %s m lies %s m below the outfall, level %s m: trench drains cannot discharge there", metres(at), metres(over), metres(*o))
			return nil, false
		}
		bottom = spliced(bottom, level, t.from, t.to, upper)
	}
	if d.soil != noSoil {
		firm, ok := firstTop(&j.Section, d.soil, t.from, t.to)
		name := j.Section.Soils[d.soil].Name
		if !ok {
			p.violate("low_permeability", 0, "%s does not lie under the whole length of the trench drains, x = %s to %s m: shorten them or give an effectiveness", name, metres(t.from), metres(t.to))
			return nil, false
		}
		if short, at := highest(bottom, firm, t.from, t.to); short > limitSlack && math.IsNaN(x[drainEffectiveness]) {
			if dug, _ := highest(shifted(before, -x[drainDepth]), firm, t.from, t.to); dug <= limitSlack {
				p.violate("outfall", short, "the outfall, level %s m, keeps trench drains %s m above the top of %s at x = %s m: end them further up or give an effectiveness",
					metres(*j.Limits.Outfall), metres(short), name, metres(at))
				return nil, false
			}
			p.violate("low_permeability", short, "trench drains %s m deep do not reach the top of %s at x = %s m, %s m below ground: deepen them or give an effectiveness",
				metres(x[drainDepth]), name, metres(at), metres(before.At(at)-firm.At(at)))
			return nil, false
		}
		bottom = spliced(bottom, firm, t.from, t.to, upper)
	}
	t.invert = clipped(bottom, t.from, t.to)
	return t, true
}

// firstTop returns the level at which a soil of the strata is first met going down, and whether it is met at all from x = from to
// x = to.
func firstTop(s *lem.Section, soil int, from, to float64) (lem.Profile, bool) {
	first := 0
	for s.Strata[first].Soil != soil {
		first++
	}
	top := spliced(s.Strata[first].Top, s.Ground, from, to, lower)
	for _, st := range s.Strata[first+1:] {
		if h, _ := highest(st.Top, top, from, to); h > limitSlack { // pinched out there
			return nil, false
		}
	}
	return top, true
}

// clipped returns the part of a profile from x = from to x = to.
func clipped(p lem.Profile, from, to float64) lem.Profile {
	var out path
	out.add(from, levelRight(p, from))
	for _, q := range p {
		if q.X > from && q.X < to {
			out.add(q.X, q.Y)
		}
	}
	out.add(to, levelLeft(p, to))
	return lem.Profile(out)
}

// measure adds the quantities and the dimension of the trenches and checks the limits.
func (d *trenchDrains) measure(j *Job, p *Proposal, s *slope, t *trench) {
	// Trenches are dug after cuts and before fills.
	top := spliced(p.Section.Ground, j.Section.Ground, t.from, t.to, lower)
	dug := make([]float64, len(p.Quantities.Dig))
	addSoilAreas(dug, &p.Section, top, t.invert, t.from, t.to)
	var length float64
	for i := 1; i < len(t.invert); i++ {
		a, b := t.invert[i-1], t.invert[i]
		length += math.Hypot(b.X-a.X, b.Y-a.Y)
	}
	share := t.width / t.spacing
	for i, a := range dug {
		p.Quantities.Dig[i] += a * share
	}
	p.Quantities.TrenchDig += sum(dug) * share
	p.Quantities.Stone += sum(dug) * share
	p.Quantities.Drain += length / t.spacing

	left, right := "head of trench drains", "outlet of trench drains"
	if s.mirrored {
		left, right = right, left
	}
	p.checkSpan(j, t.from, t.to, left, right)
	p.checkDig(j, t.invert, t.from, t.to, "trench drain")
	at := t.deepest(j.Section.Ground)
	p.Dimensions = append(p.Dimensions, lengthDim("drain depth", lem.Point{X: at, Y: j.Section.Ground.At(at)}, lem.Point{X: at, Y: t.invert.At(at)}))
}

// deepest returns where the trench is deepest below a ground, in its middle part: near its ends an outfall or the bottom of the soil may hold the
// invert up.
func (t *trench) deepest(ground lem.Profile) float64 {
	var at float64
	most := math.Inf(-1)
	for _, share := range []float64{0.5, 0.4, 0.6, 0.3, 0.7, 0.2, 0.8} {
		x := t.from + share*(t.to-t.from)
		if d := ground.At(x) - t.invert.At(x); d > most+limitSlack {
			at, most = x, d
		}
	}
	return at
}

// fall says by what ratio the head above the invert falls at the invert.
type fall struct {
	ratio func(clear, head float64) float64
	// concave: the ratio is a concave function of the head, so that a straight line between two heads lies below it. Otherwise it is
	// only known to rise with the head.
	concave bool
}

// meanFall returns the mean between drains: as given, or by the series if effectiveness is NaN.
func meanFall(effectiveness float64) fall {
	if math.IsNaN(effectiveness) {
		return fall{ratio: func(clear, h float64) float64 { return 1 - meanHead(clear/h) }, concave: true}
	}
	return fall{ratio: func(_, _ float64) float64 { return effectiveness }, concave: true}
}

// midspanFall returns the fall midway between drains.
func midspanFall(effectiveness float64) fall {
	if math.IsNaN(effectiveness) {
		return fall{ratio: func(clear, h float64) float64 { return 1 - midspanHead(clear/h) }}
	}
	r := math.Max(0, 1-midspanOverMean*(1-effectiveness))
	return fall{ratio: func(_, _ float64) float64 { return r }, concave: true}
}

// between returns the ratios to take at two neighbouring heads so that the straight line between them nowhere overstates the ratio.
func (f *fall) between(clear, h0, h1 float64) (r0, r1 float64) {
	at := func(h float64) float64 {
		if h <= sameLevel {
			return 0
		}
		return f.ratio(clear, h)
	}
	if f.concave {
		return at(h0), at(h1)
	}
	low := at(math.Min(h0, h1))
	return low, low
}

// drawdown returns what the trenches do to a water line, in the share that they work.
func (t *trench) drawdown(line lem.Profile, working float64, f fall) *lem.Drawdown {
	d := &lem.Drawdown{Fade: t.clear / 2}
	add := func(s station, r float64) {
		if n := len(d.Invert); n > 0 && d.Invert[n-1].X == s.x && d.Invert[n-1].Y == s.invert {
			d.Ratio[n-1] = math.Min(d.Ratio[n-1], working*r) // the lesser ratio is safe on both sides
			return
		}
		d.Invert = append(d.Invert, lem.Point{X: s.x, Y: s.invert})
		d.Ratio = append(d.Ratio, working*r)
	}
	for _, p := range pieces(line, t.invert, t.from, t.to) {
		n := math.Ceil((p.x1 - p.x0) / drainStation)
		for i := 0.0; i < n; i++ {
			a, b := p.along(i/n), p.along((i+1)/n)
			r0, r1 := f.between(t.clear, a.head, b.head)
			add(a, r0)
			add(b, r1)
		}
	}
	return d
}

// station is a point of a trench with the head of the line above its invert.
type station struct{ x, invert, head float64 }

// along returns the station at share w of a piece of line over invert.
func (p *piece) along(w float64) station {
	mix := func(a, b float64) float64 { return a*(1-w) + b*w }
	invert := mix(p.b0, p.b1)
	return station{x: mix(p.x0, p.x1), invert: invert, head: mix(p.a0, p.a1) - invert}
}
