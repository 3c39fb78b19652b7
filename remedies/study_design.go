package remedies

import (
	"context"
	"fmt"
	"math"
	"slices"
	"sync"
	"sync/atomic"

	"standfast/lem"
	"standfast/optimize"
)

// The audit's search looks with another parametrisation of slips, another seed, finer slices and more trials than the first.
const (
	auditEffort = 4.0
	auditSlices = 2 // Multiple of the search's slices.
)

// sizing is what all designs of one option share.
type sizing struct {
	j              *Job
	w              *works
	s              *Settings
	workers        int
	shift          float64 // Added to every required FS; 0 but for trade-off curves.
	noAudit        bool    // Trade-off curves are searched, not audited.
	existingMargin float64 // Least margin of the slope as it is.
	models         sync.Pool
	searches       atomic.Int64 // One search is one check of one design.
	audits         atomic.Int64
	trials         atomic.Int64
}

func newSizing(j *Job, w *works, s *Settings) *sizing {
	z := &sizing{j: j, w: w, s: s, workers: s.Workers}
	z.models.New = func() any { return new(lem.Model) }
	return z
}

// open makes a design ready.
func (z *sizing) open(x []float64) optimize.Design[Cut] { return z.openProposal(z.w.apply(z.j, x)) }

func (z *sizing) openProposal(p *Proposal) *design {
	d := &design{z: z, proposal: p, checks: Checks(z.j, p)}
	d.models = make([]*lem.Model, len(d.checks))
	return d
}

// window returns the slips that the job looks at.
func (j *Job) window() lem.Window {
	return lem.Window{Direction: j.Direction, Head: j.Head, Toe: j.Exit}
}

// design is one design made ready for the optimiser: a model for each check, compiled when first asked for.
type design struct {
	z        *sizing
	proposal *Proposal
	checks   []Check
	models   []*lem.Model
	ws       lem.Workspace
}

// required returns the FS that a check of the design asks for.
func (d *design) required(i int) float64 { return d.checks[i].Required + d.z.shift }

// model returns the compiled model of a check. A section that remedies made and the engine cannot compile is a fault of ours, not of
// the user's input, which was compiled when it was assessed.
func (d *design) model(i int) *lem.Model {
	if d.models[i] == nil {
		m := d.z.models.Get().(*lem.Model)
		if err := m.Compile(d.checks[i].Section, &d.checks[i].Situation); err != nil {
			panic(fmt.Sprintf("remedies: %s, check %s: %v", d.z.w.name, d.checks[i].Name, err))
		}
		d.models[i] = m
	}
	return d.models[i]
}

// Margin returns FS less required FS of a slip of the pool.
func (d *design) Margin(c *Cut) float64 { return d.margin(&d.ws, c) }

// margin is Margin for one of several goroutines, with a workspace of its own.
func (d *design) margin(ws *lem.Workspace, c *Cut) float64 {
	r := d.model(int(c.Check)).FS(ws, &c.Slip, c.Setting)
	switch r.Status {
	case lem.Converged:
		return r.F - d.required(int(c.Check))
	case lem.Missed, lem.Inadmissible:
		return math.Inf(1)
	case lem.NotConverged:
	}
	return math.NaN()
}

// Search looks for critical slips in every check, the checks side by side.
func (d *design) Search(ctx context.Context, e optimize.Effort) ([]optimize.Found[Cut], error) {
	if e.Audit && d.z.noAudit {
		return []optimize.Found[Cut]{{Margin: math.Inf(1)}}, nil
	}
	if e.ToReject { // Circles are quick, and one that fails is enough.
		if found, err := d.searchAll(ctx, e, false); err != nil || d.rejectedBy(found) {
			return found, err
		}
	}
	return d.searchAll(ctx, e, true)
}

// rejectedBy reports whether a search found a slip that fails.
func (d *design) rejectedBy(found []optimize.Found[Cut]) bool {
	return slices.ContainsFunc(found, func(f optimize.Found[Cut]) bool { return !f.Unresolved && f.Margin < d.z.s.Allowance })
}

// searchAll searches every check and returns what was found: circles, and non-circular slips too if asked for.
func (d *design) searchAll(ctx context.Context, e optimize.Effort, polylines bool) ([]optimize.Found[Cut], error) {
	found := make([][]optimize.Found[Cut], len(d.checks))
	errs := make([]error, len(d.checks))
	same := d.sameAs()
	for i := range d.checks {
		d.model(i) // Compiled here, one after another: the models are then only read.
	}
	next := atomic.Int64{}
	var wg sync.WaitGroup
	for range min(max(d.z.workers, 1), len(d.checks)) {
		wg.Go(func() {
			for {
				i := int(next.Add(1)) - 1
				if i >= len(d.checks) {
					return
				}
				if same[i] == i {
					found[i], errs[i] = d.searchOne(ctx, i, e, polylines)
				}
			}
		})
	}
	wg.Wait()
	for _, err := range errs {
		if err != nil {
			return nil, err
		}
	}
	for i, k := range same {
		if k != i {
			found[i] = d.asFoundIn(i, k, found[k])
		}
	}
	if out := slices.Concat(found...); len(out) > 0 {
		return out, nil
	}
	return []optimize.Found[Cut]{{Margin: math.Inf(1)}}, nil
}

func (d *design) searchOne(ctx context.Context, i int, e optimize.Effort, polylines bool) ([]optimize.Found[Cut], error) {
	o := lem.SearchOptions{
		Slices: d.z.s.Slices, MinDepth: d.z.j.MinDepth, Seed: e.Seed + d.z.s.Seed, Window: d.z.j.window(), SideForce: d.z.j.SideForce,
		Below: d.required(i) + d.z.s.Allowance, Polylines: polylines,
	}
	if e.Audit {
		o.Sampler, o.Effort, o.Slices = lem.ByCentre, auditEffort, auditSlices*d.z.s.Slices
		d.z.audits.Add(1)
	} else {
		d.z.searches.Add(1)
	}
	minima, err := d.models[i].Search(ctx, o)
	d.z.trials.Add(int64(minima.Trials))
	if err != nil {
		return nil, err
	}
	var out []optimize.Found[Cut]
	var ws lem.Workspace // Not the design's: other checks are searched meanwhile.
	for k := range minima.Basins {
		b := &minima.Basins[k]
		out = append(out, optimize.Found[Cut]{
			Cut:    Cut{uint16(i), b.Setting, b.Slip},
			Margin: b.Result.F - d.required(i),
		})
		out = append(out, d.companions(&ws, i, b)...)
	}
	for _, u := range minima.Unresolved {
		if u.Result.Screen < d.required(i)+d.z.s.Allowance {
			out = append(out, optimize.Found[Cut]{Cut: Cut{uint16(i), u.Setting, u.Slip}, Margin: math.NaN(), Unresolved: true})
		}
	}
	return out, nil
}

// Close gives the models back.
func (d *design) Close() {
	for i, m := range d.models {
		if m != nil {
			d.z.models.Put(m)
			d.models[i] = nil
		}
	}
}
