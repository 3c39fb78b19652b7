package remedies

import (
	"context"
	"math"

	"standfast/lem"
	"standfast/optimize"
)

// Swings say how far inputs may be off either way: credible bounds of the user's own. 0: not swung.
type Swings struct {
	Cohesion     float64 // Share of every effective cohesion.
	Friction     float64 // Of every effective angle of friction, rad.
	Undrained    float64 // Share of every undrained strength.
	UnitWeight   float64 // Share of every unit weight.
	Water        float64 // Of every water line, m.
	DrainsEffect float64 // Share of the lowering by drains.
}

// Any reports whether something is swung.
func (s Swings) Any() bool { return s != Swings{} }

// Bar is one bar of a tornado diagram: the least margin's FS with one input at either end of its swing, critical slips searched anew.
type Bar struct {
	Input        string
	Low, High    float64 // FS with the input low and high; NaN if nothing was found.
	CheckL       string  // Check that governs with the input low.
	CheckH       string
	RequiredL    float64
	RequiredH    float64
	Base         float64 // FS with the inputs as given, by the same search.
	BaseCheck    string
	BaseRequired float64
}

// swing is one input with the change that moves it by a share t of its swing, -1 to 1.
type swing struct {
	input  string
	size   float64
	change func(s *lem.Section, sit *lem.Situation, t float64)
}

func (s Swings) list() []swing {
	soils := func(f func(*lem.Soil, float64)) func(*lem.Section, *lem.Situation, float64) {
		return func(sec *lem.Section, _ *lem.Situation, t float64) {
			sec.Soils = append([]lem.Soil(nil), sec.Soils...)
			for i := range sec.Soils {
				f(&sec.Soils[i], t)
			}
		}
	}
	return []swing{
		{"effective cohesion", s.Cohesion, soils(func(o *lem.Soil, t float64) { o.Cohesion *= 1 + t*s.Cohesion })},
		{"effective angle of friction", s.Friction, soils(func(o *lem.Soil, t float64) { o.Friction = math.Max(0, o.Friction+t*s.Friction) })},
		{"undrained strength", s.Undrained, soils(func(o *lem.Soil, t float64) { o.Undrained = scaledUndrained(o.Undrained, 1+t*s.Undrained) })},
		{"unit weight", s.UnitWeight, soils(func(o *lem.Soil, t float64) {
			o.UnitWeight *= 1 + t*s.UnitWeight
			o.SaturatedUnitWeight *= 1 + t*s.UnitWeight
		})},
		{"water level", s.Water, func(_ *lem.Section, sit *lem.Situation, t float64) { sit.Water = raised(sit.Water, t*s.Water) }},
		{"effect of drains", s.DrainsEffect, func(_ *lem.Section, sit *lem.Situation, t float64) {
			if d := sit.Water.Drains; d != nil {
				c := *d
				c.Ratio = append([]float64(nil), d.Ratio...)
				for i := range c.Ratio {
					c.Ratio[i] = math.Min(1, c.Ratio[i]*(1+t*s.DrainsEffect))
				}
				sit.Water.Drains = &c
			}
		}},
	}
}

// sensitivity swings each input of a proposal and searches every check anew, without audit.
func (z *sizing) sensitivity(ctx context.Context, p *Proposal) ([]Bar, error) {
	base, err := z.leastWith(ctx, p, nil, 0)
	if err != nil || base == nil {
		return nil, err
	}
	var out []Bar
	for _, s := range z.j.Swings.list() {
		if s.size == 0 {
			continue
		}
		b := Bar{Input: s.input, Low: math.NaN(), High: math.NaN(), Base: base.FS, BaseCheck: base.Check.Label(), BaseRequired: base.Check.Required}
		if low, err := z.leastWith(ctx, p, s.change, -1); err != nil {
			return nil, err
		} else if low != nil {
			b.Low, b.CheckL, b.RequiredL = low.FS, low.Check.Label(), low.Check.Required
		}
		if high, err := z.leastWith(ctx, p, s.change, 1); err != nil {
			return nil, err
		} else if high != nil {
			b.High, b.CheckH, b.RequiredH = high.FS, high.Check.Label(), high.Check.Required
		}
		if b.Low == b.Base && b.High == b.Base { // The input does not come into it.
			continue
		}
		out = append(out, b)
	}
	return out, nil
}

// leastWith returns the outcome with the least margin of a proposal whose checks are changed; nil if no slip was found.
func (z *sizing) leastWith(ctx context.Context, p *Proposal, change func(*lem.Section, *lem.Situation, float64), t float64) (*Outcome, error) {
	d := z.openProposal(p)
	defer d.Close()
	if change != nil {
		for i := range d.checks {
			s := *d.checks[i].Section
			change(&s, &d.checks[i].Situation, t)
			d.checks[i].Section = &s
		}
	}
	found, err := d.Search(ctx, optimize.Effort{Seed: 1})
	if err != nil {
		return nil, err
	}
	all := d.outcomes(found)
	var least *Outcome
	for i := range all {
		if o := &all[i]; !math.IsNaN(o.FS) && (least == nil || o.Margin() < least.Margin()) {
			least = o
		}
	}
	return least, nil
}

// raised returns a water with every line and every known pore pressure raised, m.
func raised(w lem.Water, by float64) lem.Water {
	w.Line = shifted(w.Line, by)
	w.BySoil = append([]lem.SoilWater(nil), w.BySoil...)
	for i := range w.BySoil {
		w.BySoil[i].Line = shifted(w.BySoil[i].Line, by)
	}
	w.Points = append([]lem.PressurePoint(nil), w.Points...)
	for i := range w.Points {
		w.Points[i].Pressure += lem.GammaW * by
	}
	return w
}

// scaledUndrained returns an undrained strength times a factor.
func scaledUndrained(u *lem.UndrainedStrength, k float64) *lem.UndrainedStrength {
	if u == nil {
		return nil
	}
	c := *u
	c.Strength *= k
	c.Gradient *= k
	c.Ratio *= k
	c.Minimum *= k
	c.Points = append([]lem.StrengthPoint(nil), u.Points...)
	for i := range c.Points {
		c.Points[i].Strength *= k
	}
	return &c
}
