package optimize

import (
	"cmp"
	"slices"
)

const (
	// nearCuts is how many cuts at or above the allowance join the pool with the violating ones of a search, lowest first:
	// the next master answer is likely to violate those.
	nearCuts = 3
	// nearestTried bounds how many lattice designs around a master answer are screened for one that passes the pool.
	nearestTried = 4 * largestBatch
)

// exchange fills the pool: master answer, full search at the nearest lattice design that passes the pool, violating cuts
// to the pool, again. It ends when the search there finds no violating cut, when the master or the lattice near it has no
// answer, or when its share of the searches is spent. With an empty pool the master's answer is the cheapest design.
func (r *run[C]) exchange() error {
	m := newMaster(r)
	rounds := r.s.FullSearches * 2 / 3
	if len(m.free) == 0 || rounds == 0 {
		return nil
	}
	for round := 0; ; round++ {
		near := []int{0}
		if len(r.pool) > 0 {
			answer, ok, err := m.solve(round)
			if err != nil {
				return err
			}
			r.res.ContinuousEstimate = answer.cost
			if !ok {
				return nil
			}
			near = m.nearest(answer.u)
		}
		if round == rounds {
			return nil
		}
		rank, ok, err := r.firstPassing(near)
		if err != nil || !ok {
			return err
		}
		if v, err := r.examineRank(rank); err != nil || v.standing != rejected {
			return err
		}
		r.report(Exchanging, 0)
	}
}

// firstPassing returns the first of the ranks that no pool cut rejects and that has not been searched. A searched one
// means that the exchange has nothing more to learn there: ok is false.
func (r *run[C]) firstPassing(ranks []int) (rank int, ok bool, err error) {
	for batch := range slices.Chunk(ranks, smallestBatch) {
		hits, err := r.screen(batch)
		if err != nil {
			return 0, false, err
		}
		for i, h := range hits {
			if h.cut == NoCut {
				_, searched := r.verdicts[batch[i]]
				return batch[i], !searched, nil
			}
		}
	}
	return 0, false, nil
}

func (r *run[C]) examineRank(rank int) (verdict[C], error) {
	d := r.open(r.point(r.designs[rank]))
	defer d.Close()
	return r.examine(d, rank, false, nearCuts)
}

// nearest returns the ranks of the designs nearest to the scaled point u, in lattice steps, nearest first; of equally
// near ones the cheaper first.
func (m *master[C]) nearest(u []float64) []int {
	type place struct {
		rank     int
		distance float64
	}
	places := make([]place, len(m.r.designs))
	x, p := m.at(u), make([]float64, len(m.base))
	for rank, d := range m.r.designs {
		pointTo(p, m.r.res.Axes, d.index)
		places[rank].rank = rank
		for _, k := range m.free {
			step := (p[k] - x[k]) / m.r.res.Axes[k].Step
			places[rank].distance += step * step
		}
	}
	slices.SortFunc(places, func(a, b place) int {
		return cmp.Or(cmp.Compare(a.distance, b.distance), cmp.Compare(a.rank, b.rank))
	})
	ranks := make([]int, min(len(places), nearestTried))
	for i := range ranks {
		ranks[i] = places[i].rank
	}
	return ranks
}
