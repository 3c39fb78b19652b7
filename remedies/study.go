package remedies

import (
	"context"
	"fmt"
	"math"
	"runtime"
	"slices"

	"standfast/lem"
	"standfast/optimize"
)

// Study answers a job: it assesses the slope as it is, sizes every remedy asked for, then pairs of them, and checks the user's own works; all of
// it again at the points of a back-analysis, if asked for. The answer depends on the job and the settings only, not on the number of workers.
// The error is that of the context, or a fault of a request.
func Study(ctx context.Context, job *Job, s Settings) (*Result, error) {
	s = s.resolved()
	j, existing, err := assess(ctx, job, &s)
	if err != nil {
		return nil, err
	}
	st := &study{ctx: ctx, j: j, s: &s, existing: existing, pools: map[string][]pooled{}}
	if err := st.priced(); err != nil {
		return nil, err
	}
	again := s.Points && job.Observed != nil
	groups := len(j.groups(s.Pairs))
	if st.total = groups + len(j.Trials); again {
		st.total *= 1 + len(pointNames)
	}
	if s.Curves || s.Relaxations || s.Sensitivity {
		st.total += groups
	}
	res, err := st.answer()
	if err == nil && again {
		res.Points, err = st.points(job, res)
	}
	if err != nil {
		return nil, err
	}
	return res, nil
}

// answer sizes and checks everything on the slope as assessed, and ranks it.
func (st *study) answer() (*Result, error) {
	needed := !adequate(st.existing, st.s)
	if needed {
		for _, g := range st.j.groups(st.s.Pairs) {
			if err := st.size(g); err != nil {
				return nil, err
			}
		}
	}
	for i := range st.j.Trials {
		if err := st.check(&st.j.Trials[i]); err != nil {
			return nil, err
		}
	}
	if err := st.beside(); err != nil {
		return nil, err
	}
	res := &Result{Job: st.j, Settings: *st.s, Existing: *st.existing, Options: st.options}
	rank(st.j, res.Options)
	if !needed {
		res.Least = st.existing.Name
		return res, nil
	}
	for i := range res.Options {
		if o := &res.Options[i]; o.Status == MeetsTarget && !o.WhatIf {
			res.Least = o.Name
			break
		}
	}
	return res, nil
}

// study is the state of one Study.
type study struct {
	ctx      context.Context
	j        *Job
	s        *Settings
	existing *Option
	options  []Option
	sized    []sized             // The options that were sized, for what is asked beside their size.
	done     int                 // Options of the studies before, and of this one those for which all is done that is asked beside.
	total    int                 // Options in all.
	pools    map[string][]pooled // Slips known from sizing a remedy, by its name.
	plain    bool                // What does not fit is not sized once more without limits.
	at       string              // Behind the names in reports of progress.
}

// tell reports progress.
func (st *study) tell(name string, share float64) {
	if st.s.Progress != nil {
		st.s.Progress(Progress{Option: name + st.at, Done: st.done + len(st.options), Total: st.total, Share: share})
	}
}

// check checks a trial of the user's own.
func (st *study) check(t *Trial) error {
	st.tell(t.Name, 0)
	o, err := checkTrial(st.ctx, st.j, st.s, t)
	if err != nil {
		return err
	}
	st.add(o)
	return nil
}

// add files an option and hands it on.
func (st *study) add(o *Option) {
	for _, r := range st.j.remarks(o) {
		o.Proposal.Notes = appendOnce(o.Proposal.Notes, r)
	}
	st.options = append(st.options, *o)
	if st.s.Finished != nil {
		st.s.Finished(o)
	}
}

// resolved returns the settings with defaults filled in.
func (s Settings) resolved() Settings {
	if s.Workers <= 0 {
		s.Workers = runtime.GOMAXPROCS(0)
	}
	if s.Slices == 0 {
		s.Slices = lem.DefaultSlices
	}
	if s.Allowance == 0 {
		s.Allowance = DefaultAllowance
	}
	return s
}

// rank sorts options: those that meet the target in ascending order of the objective, what-ifs behind them, those that fail last.
func rank(j *Job, os []Option) {
	class := func(o *Option) int {
		switch {
		case o.Status == MeetsTarget && !o.WhatIf:
			return 0
		case o.Status == MeetsTarget:
			return 1
		case o.WhatIf:
			return 3
		}
		return 2
	}
	slices.SortStableFunc(os, func(a, b Option) int {
		if c := class(&a) - class(&b); c != 0 {
			return c
		}
		qa, qb := &a.Proposal.Quantities, &b.Proposal.Quantities
		switch ea, eb := j.Objective.value(j, qa), j.Objective.value(j, qb); {
		case ea < eb || ea == eb && qa.Drain < qb.Drain:
			return -1
		case ea > eb || qa.Drain > qb.Drain:
			return 1
		}
		return 0
	})
}

// size sizes the remedies of a group together.
func (st *study) size(group []Request) error {
	w, err := newWorks(st.j, groupName(group), group)
	if err != nil {
		return err
	}
	st.tell(w.name, 0)
	z := newSizing(st.j, w, st.s)
	if g := st.existing.Governing(); g != nil {
		z.existingMargin = g.Margin()
	}
	ctx := st.ctx
	start := st.start(z, group)
	res, front, err := st.fronted(z, group, start)
	if err != nil {
		return err
	}
	o := &Option{Name: w.name, Title: w.title, Remedies: w.kinds, WhatIf: w.whatIf, Front: front}
	x := res.X
	found := res.Lowest
	if x == nil {
		x = res.Best.X
	}
	if x == nil { // Limits or geometry forbid everything: show the smallest works.
		x = w.smallest()
	}
	o.Parameters = w.values(x)
	o.Proposal = w.apply(st.j, x)
	d := z.openProposal(o.Proposal)
	defer d.Close()
	if res.X == nil && res.Best.X != nil { // Searched already; the audit is left to us.
		if found, err = d.Search(ctx, optimize.Effort{Audit: true, Seed: 2}); err != nil {
			return err
		}
		found = append(append(found, res.Best.Found...), res.Best.Binding)
	}
	if len(found) > 0 {
		o.Situations, o.Stages = split(d.outcomes(found))
	}
	z.judge(o, &res)
	if o.Status == Infeasible {
		if err := z.explain(ctx, o, &res, st.plain, st.tell); err != nil {
			return err
		}
	}
	if res.X != nil {
		o.StepLess = z.stepsLess(&res)
	}
	o.Certificate = z.certificate(&res)
	st.sized = append(st.sized, sized{option: len(st.options), z: z, res: res, alone: len(group) == 1})
	st.keep(w.name, d.checks, res.Pool[len(start):])
	st.add(o)
	return nil
}

// bestSearches bounds the designs that are searched to find the best of a remedy that cannot meet the target.
const bestSearches = 5

// costFunc is the Cost of an optimize.Problem.
type costFunc func(x []float64) (cost, tie float64, ok bool)

// cost returns the objective of a design within the limits; fewer drains break ties.
func (z *sizing) cost(x []float64) (cost, tie float64, ok bool) {
	p := z.w.apply(z.j, x)
	cost, tie = z.price(p, x)
	return cost, tie, len(p.Violations) == 0
}

// price returns what is made least. A what-if has no works: the least change is the first parameter's.
func (z *sizing) price(p *Proposal, x []float64) (cost, tie float64) {
	cost = z.j.Objective.value(z.j, &p.Quantities)
	if z.w.whatIf && len(x) > 0 {
		return cost, x[0]
	}
	return cost, p.Quantities.Drain
}

// minimize runs the optimiser over the lattice of the works.
func (z *sizing) minimize(ctx context.Context, cost costFunc, start []Cut, tell func(string, float64)) (optimize.Result[Cut], error) {
	settings := optimize.Settings[Cut]{
		Workers: z.s.Workers, Seed: z.s.Seed, Allowance: z.s.Allowance, Start: start,
		BestSearches: bestSearches, BestUnaudited: true, // size audits it.
	}
	if z.noAudit { // An estimate, and the pool is full already: no exchange.
		settings.FullSearches, settings.BestSearches = 1, 1
	}
	if tell != nil {
		settings.Progress = func(p optimize.Progress) {
			tell(z.w.name, float64(p.Done)/math.Max(1, float64(p.Designs)))
		}
	}
	res, err := optimize.Minimize(ctx, optimize.Problem[Cut]{Axes: z.w.axes, Cost: cost, Open: z.open}, settings)
	if err != nil {
		return res, fmt.Errorf("%s: %w", z.w.name, err)
	}
	return res, nil
}

// searchBoth searches a design as a sizing does, search and audit together.
func (d *design) searchBoth(ctx context.Context) ([]optimize.Found[Cut], error) {
	found, err := d.Search(ctx, optimize.Effort{Seed: 1})
	if err != nil {
		return nil, err
	}
	audit, err := d.Search(ctx, optimize.Effort{Audit: true, Seed: 2})
	return append(found, audit...), err
}
