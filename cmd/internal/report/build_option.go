package report

import (
	"math"

	"standfast/lem"
	"standfast/remedies"
)

// meetsTarget is the status of an option that meets the target.
var meetsTarget = remedies.MeetsTarget.String()

// option lays out one option.
func (b *builder) option(o *remedies.Option) Option {
	out := Option{
		Name: o.Name, Title: o.Title, Remedies: list(o.Remedies), Status: o.Status.String(), Reason: o.Reason, BindsOn: o.Binding,
		WhatIf: o.WhatIf, Trial: o.Trial, Broken: []Limit{}, Order: make([]string, 0, len(o.Parameters)),
		Parameters: parametersOf(o.Parameters), Situations: make([]Answer, 0, len(o.Situations)), Stages: make([]Stage, 0, len(o.Stages)),
		StepLess: make([]StepLess, 0, len(o.StepLess)), NotChecked: []string{}, Notes: []string{},
		Tradeoff: make([]TradePoint, 0, len(o.Tradeoff)),
	}
	for _, v := range o.Parameters {
		out.Order = append(out.Order, v.Name)
	}
	for _, s := range o.StepLess {
		out.StepLess = append(out.StepLess, StepLess{
			Parameter: s.Parameter, Value: s.Value, Check: s.Check, FS: Number(s.FS), RequiredFS: known(s.Required), Limit: s.Limit,
		})
	}
	for _, t := range o.Tradeoff {
		out.Tradeoff = append(out.Tradeoff, b.tradePoint(o, &t))
	}
	out.Relaxations, out.Sensitivity = relaxationsOf(o.Relaxations), barsOf(o.Sensitivity)
	out.Certificate = certificateOf(o)
	out.Front = b.front(o)
	b.addProposal(&out, o)
	b.addAnswers(&out, o)
	return out
}

// known returns v, or a number that is not known for 0: no FS required is 0.
func known(v float64) Number {
	if v == 0 {
		return nan
	}
	return Number(v)
}

func parametersOf(values []remedies.Value) map[string]Parameter {
	out := make(map[string]Parameter, len(values))
	for _, v := range values {
		out[v.Name] = Parameter{Value: Number(v.Value), Unit: v.Unit}
	}
	return out
}

// addProposal adds the works, or the slope as it is where there is no proposal: the section with the water of every situation.
func (b *builder) addProposal(out *Option, o *remedies.Option) {
	p := o.Proposal
	if p == nil {
		p = remedies.Start(b.job)
	}
	for _, v := range p.Violations {
		out.Broken = append(out.Broken, Limit{Name: v.Limit, Detail: v.Detail, By: v.By})
	}
	out.NotChecked, out.Notes = list(p.NotChecked), list(p.Notes)
	bill := b.billOf(o, p)
	out.Quantities = b.quantities(&p.Quantities, &bill)
	out.Totals = totalsOf(&out.Quantities, &bill)
	out.Bill = b.bill(&bill)
	out.HandChecks = handChecksOf(p.HandChecks)
	out.Section = b.section(&p.Section)
	out.Measured = dimensionsOf(p.Dimensions)
	for _, c := range remedies.Checks(b.job, p) {
		if !c.Stage {
			out.Section.Water[c.Label()] = water(&c.Situation.Water, p.Section.Soils)
		}
	}
}

func (b *builder) quantities(q *remedies.Quantities, bill *remedies.Bill) Quantities {
	return Quantities{
		Cut: q.TotalCut(), Fill: q.TotalFill(), Earthworks: q.Earthworks(), Import: total(bill.Balance.Import) + q.Stone,
		Dispose: total(bill.Balance.Dispose), Drain: q.Drain, Strip: q.Strip, TrenchDig: q.TrenchDig, Stone: q.Stone,
		CutBySoil: b.bySoil(q.Cut), FillBySoil: b.bySoil(q.Fill), DigBySoil: b.bySoil(q.Dig), Topsoil: b.bySoil(q.Topsoil),
		FillBase: b.bySoil(q.FillBase), FaceRun: q.FaceRun, Drilled: q.Drilled, Piped: q.Piped, Elements: q.Elements, ElementsM: q.ElementsM,
	}
}

func total(volumes []float64) float64 {
	sum := 0.0
	for _, v := range volumes {
		sum += v
	}
	return sum
}

// bySoil names the volumes that are not 0.
func (b *builder) bySoil(volumes []float64) map[string]float64 {
	out := map[string]float64{}
	for i, v := range volumes {
		if v != 0 {
			out[b.soils[i]] = v
		}
	}
	return out
}

// billOf measures and prices a proposal. What a what-if would take is not designed, so that it has no price: least of all nothing.
func (b *builder) billOf(o *remedies.Option, p *remedies.Proposal) remedies.Bill {
	bill := remedies.BillOf(b.job, &p.Quantities)
	if o.WhatIf {
		bill.Cost, bill.Carbon, bill.Loads = math.NaN(), math.NaN(), math.NaN()
	}
	return bill
}

// tonne is the mass of a tonne, kg.
const tonne = 1000

func totalsOf(q *Quantities, bill *remedies.Bill) Totals {
	length := bill.Length
	return Totals{
		Cut: q.Cut * length, Fill: q.Fill * length, Earthworks: q.Earthworks * length, Import: q.Import * length,
		Dispose: q.Dispose * length, Drain: q.Drain * length, Strip: q.Strip * length,
		Loads: ifKnown(bill.Loads), Cost: ifKnown(bill.Cost), Carbon: ifKnown(bill.Carbon / tonne),
	}
}

// tradePoint lays out one point of a curve.
func (b *builder) tradePoint(o *remedies.Option, t *remedies.TradeoffPoint) TradePoint {
	s := b.section(&t.Proposal.Section)
	bill := b.billOf(o, t.Proposal)
	out := TradePoint{
		Cost: ifKnown(bill.Cost), Carbon: ifKnown(bill.Carbon / tonne), Loads: ifKnown(bill.Loads),
		RequiredFS: Number(t.RequiredFS), Shift: t.Shift, ReachedFS: Number(t.Reached), Earthworks: Number(t.Earthworks),
		Parameters: parametersOf(t.Parameters), Quantities: b.quantities(&t.Proposal.Quantities, &bill), Ground: s.Ground, Placed: s.Placed,
		Water: map[string]Water{}, Checks: make([]Answer, 0, len(t.Situations)+len(t.Stages)),
	}
	for _, list := range [][]remedies.Outcome{t.Situations, t.Stages} {
		for i := range list {
			a := answer(&list[i])
			if !a.Advisory {
				a.RequiredFS += t.Shift
			}
			out.Checks = append(out.Checks, a)
			out.Water[a.Name] = water(&list[i].Check.Situation.Water, t.Proposal.Section.Soils)
		}
	}
	return out
}

// answer lays out the answer to one check.
func answer(o *remedies.Outcome) Answer {
	c := &o.Check
	a := Answer{Name: c.Label(), RequiredFS: c.Required, Advisory: c.Advisory, Found: found(o)}
	if c.Note != "" {
		a.VariantOf, a.Variant = c.Name, c.Note
	}
	return a
}

// addAnswers adds the answers to situations and stages.
func (b *builder) addAnswers(out *Option, o *remedies.Option) {
	for i := range o.Situations {
		out.Situations = append(out.Situations, answer(&o.Situations[i]))
	}
	for i := range o.Stages {
		s := &o.Stages[i]
		c := &s.Check
		st := Stage{
			Name: c.Label(), Order: i + 1, RequiredFS: c.Required, Strength: strengthOf(b.soils, c.Situation.Undrained),
			Kh: c.Situation.Kh, Found: found(s), Section: b.section(c.Section),
		}
		if c.Advisory {
			st.Advisory, st.Says = true, remedies.HoleText(s.FS)
		}
		st.Section.Water[st.Name] = water(&c.Situation.Water, c.Section.Soils)
		out.Stages = append(out.Stages, st)
	}
}

func certificateOf(o *remedies.Option) *Certificate {
	c := o.Certificate
	if c == nil {
		return nil
	}
	out := &Certificate{
		Axes: make([]Axis, 0, len(c.Axes)), Coarsened: c.Coarsened, Cheaper: c.CheaperDesigns, Witnessed: c.Witnessed,
		Forbidden: c.Forbidden, Unresolved: c.UnresolvedDesigns, ContinuousEstimate: Number(c.ContinuousEstimate),
		Allowance: Number(c.Allowance), Searches: c.Searches, DesignsSearched: c.DesignsSearched, ExchangeDesigns: c.ExchangeDesigns, SlipEvaluations: c.SlipEvaluations,
		PoolSize: len(c.Pool), Audit: Audit{Methods: []string{}, Searches: c.AuditSearches, Lowest: make([]AuditLow, 0, len(c.AuditLowest))},
	}
	for i, a := range c.Axes {
		if a.Name == "" { // An absent optional parameter has no name.
			continue
		}
		axis := Axis{Name: a.Name, Min: a.Min, Max: a.Max, Step: a.Step}
		if i < len(c.Steps) && c.Steps[i] != a.Step {
			axis.StepAsked = c.Steps[i]
		}
		out.Axes = append(out.Axes, axis)
	}
	for _, l := range c.AuditLowest {
		low := AuditLow{Check: l.Check, FS: Number(l.FS), RequiredFS: Number(l.Required)}
		if low.FS.Known() {
			low.Method = l.Method.String()
		}
		out.Audit.Lowest = append(out.Audit.Lowest, low)
	}
	for _, m := range lem.GoverningMethods(lem.Circle) {
		out.Audit.Methods = append(out.Audit.Methods, m.String())
	}
	return out
}
