package optimize

import (
	"cmp"
	"context"
	"fmt"
	"math"
	"slices"
	"sync/atomic"
)

// costChunk is how many designs one call of a worker prices.
const costChunk = 256

// design is a lattice design that geometry allows. Its place in run.designs is called its rank.
type design struct {
	index     int // on the lattice
	cost, tie float64
}

// run is one Minimize at work. Only counters marked atomic are touched by several goroutines.
type run[C any] struct {
	ctx context.Context
	p   Problem[C]
	s   Settings[C]

	designs  []design // in walk order
	pool     []C
	order    []int32            // pool indices in the order in which they are tried
	verdicts map[int]verdict[C] // by rank, of designs searched in full
	res      Result[C]

	opened, margins atomic.Int64
}

// Minimize finds the least-cost design of the lattice whose every known cut has a margin of at least s.Allowance; the package
// comment states the method and what its answer is worth.
//
// Infeasible, unresolved and forbidden problems are answers, told by Result.Status. The error is nil unless the problem
// or settings are invalid (ErrInvalid), a cost is not finite, a Search failed or ctx ended (its error is wrapped); the
// result then holds what is known so far, with status Interrupted. When ctx ends, each worker finishes at most one
// callback.
func Minimize[C any](ctx context.Context, p Problem[C], s Settings[C]) (Result[C], error) {
	r := &run[C]{ctx: ctx, p: p, s: s.resolved(), verdicts: map[int]verdict[C]{}}
	r.res = Result[C]{
		Cost: math.NaN(), ContinuousEstimate: math.NaN(), Allowance: s.Allowance, Seed: s.Seed,
	}
	if err := validate(&p, &s); err != nil {
		return r.res, err
	}
	err := r.solve()
	r.res.Pool = r.pool
	for i := range r.res.Lattice {
		if r.res.Lattice[i].Cut == NoCut {
			r.res.Unresolved++
		}
	}
	r.res.Spent.FullySearched += len(r.verdicts)
	r.res.Spent.DesignsOpened = int(r.opened.Load())
	r.res.Spent.MarginEvaluations = int(r.margins.Load())
	if err != nil {
		r.res.Status = Interrupted
		return r.res, fmt.Errorf("optimize: %w", err)
	}
	return r.res, nil
}

// solve runs the phases and sets the status, which is worthless if it returns an error.
func (r *run[C]) solve() error {
	r.res.Axes, r.res.Coarsened = coarsen(r.p.Axes, r.s.MaxDesigns)
	r.join(r.s.Start)
	if err := r.enumerate(); err != nil {
		return err
	}
	if len(r.designs) == 0 {
		r.res.Status = NoDesign
		return nil
	}
	if err := r.exchange(); err != nil {
		return err
	}
	answer, found, err := r.walk()
	if err != nil {
		return err
	}
	unresolved, err := r.retry()
	if err != nil {
		return err
	}
	switch {
	case found:
		r.accept(answer)
		r.res.Status = Optimal
		return nil
	case unresolved > 0:
		r.res.Status = Unresolved
	default:
		r.res.Status = Infeasible
	}
	if r.s.NoBest {
		return nil
	}
	return r.rankBest()
}

// enumerate prices the whole lattice and puts the allowed designs into walk order.
func (r *run[C]) enumerate() error {
	n := int(latticeSize(r.res.Axes))
	all := make([]design, n)
	allowed := make([]bool, n)
	chunks := (n + costChunk - 1) / costChunk
	err := each(r.ctx, r.s.Workers, chunks, func(chunk int) {
		x := make([]float64, len(r.res.Axes))
		for i := chunk * costChunk; i < min(n, (chunk+1)*costChunk); i++ {
			pointTo(x, r.res.Axes, i)
			all[i].index = i
			all[i].cost, all[i].tie, allowed[i] = r.p.Cost(x)
		}
	})
	if err != nil {
		return err
	}
	for _, ok := range allowed {
		if !ok {
			r.res.Forbidden++
		}
	}
	r.designs = make([]design, 0, n-r.res.Forbidden)
	for i, d := range all {
		if !allowed[i] {
			continue
		}
		if !finite(d.cost) || !finite(d.tie) {
			return fmt.Errorf("cost %g or tie %g of design %g is not finite", d.cost, d.tie, r.point(d))
		}
		r.designs = append(r.designs, d)
	}
	slices.SortFunc(r.designs, func(a, b design) int {
		return cmp.Or(cmp.Compare(a.cost, b.cost), cmp.Compare(a.tie, b.tie), cmp.Compare(a.index, b.index))
	})
	return nil
}

func finite(v float64) bool {
	return !math.IsNaN(v) && !math.IsInf(v, 0)
}

func (r *run[C]) point(d design) []float64 {
	return Point(r.res.Axes, d.index)
}

func (r *run[C]) open(x []float64) Design[C] {
	r.opened.Add(1)
	return r.p.Open(x)
}

func (r *run[C]) report(p Phase, done int) {
	if r.s.Progress == nil {
		return
	}
	cost := math.NaN()
	if p != Exchanging {
		cost = r.designs[max(0, done-1)].cost
	}
	r.s.Progress(Progress{
		Phase: p, Done: done, Designs: len(r.designs), Pool: len(r.pool),
		Searches: r.res.Spent.Searches + r.res.Spent.Audits, Cost: cost,
	})
}
