package report

import (
	"math"

	"standfast/lem"
	"standfast/remedies"
)

// statuses are all statuses of options.
var statuses = []remedies.OptionStatus{remedies.MeetsTarget, remedies.Infeasible, remedies.Unresolved, remedies.Existing, remedies.Fails}

func (b *rebuilder) option(j *remedies.Job, o *Option) remedies.Option {
	out := remedies.Option{
		Name: o.Name, Title: o.Title, Remedies: o.Remedies, Reason: o.Reason, Binding: o.BindsOn, WhatIf: o.WhatIf, Trial: o.Trial,
		Status: remedies.Unresolved, Parameters: valuesOf(o.Order, o.Parameters), Proposal: b.proposal(j, o),
	}
	for _, s := range statuses {
		if s.String() == o.Status {
			out.Status = s
		}
	}
	if o.Section == nil {
		b.wrong("%s has no section", o.Name)
		return out
	}
	addRobustness(&out, o)
	out.Front = frontOf(o)
	for i := range o.Situations {
		a := &o.Situations[i]
		c := remedies.Check{
			Name: a.Name, Note: a.Variant, Section: &out.Proposal.Section, Required: a.RequiredFS,
			Situation: lem.Situation{Name: a.Name, Water: b.water(o.Section.Water[a.Name])},
		}
		if a.VariantOf != "" {
			c.Name = a.VariantOf
		}
		if c.SituationI = situationIndex(j, c.Name); c.SituationI >= 0 {
			s := &j.Situations[c.SituationI]
			c.Situation.Undrained, c.Situation.Kh, c.Situation.Kv = s.Undrained, s.Kh, s.Kv
		}
		out.Situations = append(out.Situations, b.outcome(c, &a.Found))
	}
	for i := range o.Stages {
		s := &o.Stages[i]
		c := remedies.Check{
			Name: s.Name, Stage: true, Required: s.RequiredFS, Advisory: s.Advisory, SituationI: -1, Section: &out.Proposal.Section,
			Situation: lem.Situation{Name: s.Name, Undrained: b.undrained(s.Strength), Kh: s.Kh},
		}
		if s.Section != nil {
			section := b.section(s.Section)
			c.Section, c.Situation.Water = &section, b.water(s.Section.Water[s.Name], ownSoils(s.Section)...)
		}
		out.Stages = append(out.Stages, b.outcome(c, &s.Found))
	}
	for _, t := range o.Tradeoff {
		out.Tradeoff = append(out.Tradeoff, remedies.TradeoffPoint{
			Shift: t.Shift, RequiredFS: float64(t.RequiredFS), Reached: float64(t.ReachedFS), Earthworks: float64(t.Earthworks),
			Parameters: valuesOf(o.Order, t.Parameters),
		})
	}
	return out
}

func situationIndex(j *remedies.Job, name string) int {
	for i := range j.Situations {
		if j.Situations[i].Name == name {
			return i
		}
	}
	return -1
}

func valuesOf(order []string, parameters map[string]Parameter) []remedies.Value {
	var out []remedies.Value
	for _, name := range order {
		if p, ok := parameters[name]; ok {
			out = append(out, remedies.Value{Name: name, Unit: p.Unit, Value: float64(p.Value)})
		}
	}
	return out
}

func (b *rebuilder) proposal(j *remedies.Job, o *Option) *remedies.Proposal {
	p := &remedies.Proposal{NotChecked: o.NotChecked, Notes: o.Notes, Quantities: b.amounts(&o.Quantities)}
	if o.Section != nil {
		p.Section = b.section(o.Section)
		for i := range j.Situations {
			p.Waters = append(p.Waters, b.water(o.Section.Water[j.Situations[i].Name]))
		}
	}
	for _, d := range o.Measured {
		p.Dimensions = append(p.Dimensions, remedies.Dimension{From: b.point(d.From), To: b.point(d.To), Label: d.Label, Batter: d.Batter})
	}
	for _, l := range o.Broken {
		p.Violations = append(p.Violations, remedies.Violation{Limit: l.Name, Detail: l.Detail, By: l.By})
	}
	return p
}

func (b *rebuilder) amounts(q *Quantities) remedies.Quantities {
	by := func(volumes map[string]float64) []float64 {
		out := make([]float64, len(b.soils))
		for name, i := range b.soils {
			out[i] = volumes[name]
		}
		return out
	}
	return remedies.Quantities{
		Cut: by(q.CutBySoil), Fill: by(q.FillBySoil), Dig: by(q.DigBySoil), Topsoil: by(q.Topsoil), FillBase: by(q.FillBase), FaceRun: q.FaceRun,
		TrenchDig: q.TrenchDig, Stone: q.Stone, Drain: q.Drain, Drilled: q.Drilled, Piped: q.Piped, Strip: q.Strip,
		Elements: q.Elements, ElementsM: q.ElementsM,
	}
}

func (b *rebuilder) outcome(c remedies.Check, f *Found) remedies.Outcome {
	out := remedies.Outcome{Check: c, FS: float64(f.FS), Resolved: f.Resolved, Depth: float64(f.Depth), ByMethod: map[lem.Method]float64{}}
	for _, m := range lem.Methods() {
		if m.String() == f.Method {
			out.Method = m
		}
		if fs, ok := f.FSByMethod[m.String()]; ok {
			out.ByMethod[m] = float64(fs)
		}
	}
	if f.Slip == nil {
		out.FS = math.NaN()
		return out
	}
	out.From, out.To, out.Crack = b.point(f.Slip.From), b.point(f.Slip.To), f.Slip.Crack
	switch {
	case f.Slip.Kind == "polyline":
		out.Slip = lem.Slip{Kind: lem.Polyline, Nodes: b.line(f.Slip.Points)}
	case f.Slip.Centre == nil || !(f.Slip.Radius > 0):
		b.wrong("a circle without centre or radius")
	default:
		out.Slip = lem.Slip{Kind: lem.Circle, Centre: lem.Point{X: f.Slip.Centre[0], Y: f.Slip.Centre[1]}, Radius: f.Slip.Radius}
	}
	return out
}
