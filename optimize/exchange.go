package optimize

import (
	"cmp"
	"slices"
)

const (
	// leadShare is the share of what the last search found missing that the next master answer must have to spare on the pool.
	leadShare = 0.7
	// nearCuts is how many cuts at or above the allowance join the pool with the violating ones of a search, lowest first:
	// the next master answer is likely to violate those.
	nearCuts = 3
	// nearestTried bounds how many lattice designs around a master answer are screened for one that passes the pool.
	nearestTried = 4 * largestBatch
)

// exchange fills the pool: master answer, full search at the nearest lattice design that passes the pool, violating cuts
// to the pool, again. Cuts of a small design often say little of a larger one, which then fails by almost as much, so the master asks the
// pool for a lead as well: a share of what the last search found missing. It ends when a search finds no violating cut
// without a lead, when the master or the lattice near it has no answer, or when its share of the searches is spent. With an
// empty pool the master's answer is the cheapest design.
func (r *run[C]) exchange() error {
	m := newMaster(r)
	rounds := r.s.FullSearches * 2 / 3
	if len(m.free) == 0 || rounds == 0 {
		return nil
	}
	lead := 0.0
	for round := range rounds {
		near := []int{0}
		if len(r.pool) > 0 {
			answer, ok, err := m.solve(round, lead)
			if err != nil {
				return err
			}
			if lead == 0 {
				r.res.ContinuousEstimate = answer.cost
				if !ok {
					return nil
				}
			}
			near = m.nearest(answer.u) // Where nothing has the lead, the design that misses it by least tells most.
		}
		rank, ok, err := r.firstPassing(near)
		if err != nil || !ok && lead == 0 {
			return err
		}
		if !ok {
			lead = 0
			continue
		}
		r.res.Spent.ExchangeSearched++
		v, err := r.examineRank(rank)
		switch {
		case err != nil:
			return err
		case v.standing == rejected:
			lead = leadShare * (r.s.Allowance - v.found[0].Margin)
		case lead == 0:
			return nil
		default:
			lead = 0
		}
		r.report(Exchanging, 0)
	}
	if len(r.pool) == 0 {
		return nil
	}
	answer, _, err := m.solve(rounds, 0)
	r.res.ContinuousEstimate = answer.cost
	return err
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
