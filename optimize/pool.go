package optimize

import (
	"math"
	"slices"
)

// hit is what a pool says about one design: the cut with the lowest margin among those tried, and that margin.
// Nothing below the allowance is NoCut with a NaN margin.
type hit struct {
	cut    int32
	margin float64
}

// join adds cuts to the pool and puts them first in the order of trial.
func (r *run[C]) join(cuts []C) {
	fresh := make([]int32, len(cuts))
	for i := range cuts {
		fresh[i] = int32(len(r.pool) + i)
	}
	r.pool = append(r.pool, cuts...)
	r.order = append(fresh, r.order...)
}

// joinFound adds the cuts of a search that lie below the limit, and up to near more, lowest first, that do not. found is
// in the order of arrange, so the first cut to join is the lowest.
func (r *run[C]) joinFound(found []Found[C], limit float64, near int) {
	var cuts []C
	for i := range found {
		f := &found[i]
		if f.Unresolved || math.IsInf(f.Margin, 1) {
			break
		}
		if f.Margin >= limit {
			if near == 0 {
				break
			}
			near--
		}
		cuts = append(cuts, f.Cut)
	}
	r.join(cuts)
}

// reject tries the cuts of the pool named by order on a design until one has a margin below zero. Failing that it
// returns the lowest margin below the allowance. NaN margins are passed over.
func (r *run[C]) reject(d Design[C], order []int32) hit {
	best := hit{cut: NoCut, margin: math.NaN()}
	tried := 0
	for _, k := range order {
		m := d.Margin(&r.pool[k])
		tried++
		if !(m < r.s.Allowance) {
			continue
		}
		if best.cut == NoCut || m < best.margin {
			best = hit{cut: k, margin: m}
		}
		if m < 0 {
			break
		}
	}
	r.margins.Add(int64(tried))
	return best
}

// screen opens each of the given designs and tries the pool on it. Since the order of trial is fixed meanwhile, the hits
// do not depend on the number of workers. Afterwards the rejecting cuts are moved to the front, the latest
// foremost: neighbours in the walk tend to fall to the same cut.
func (r *run[C]) screen(ranks []int) ([]hit, error) {
	hits := make([]hit, len(ranks))
	err := each(r.ctx, r.s.Workers, len(ranks), func(i int) {
		d := r.open(r.point(r.designs[ranks[i]]))
		defer d.Close()
		hits[i] = r.reject(d, r.order)
	})
	if err != nil {
		return nil, err
	}
	for _, h := range hits {
		r.promote(h.cut)
	}
	return hits, nil
}

// promote moves a pool cut to the front of the order of trial.
func (r *run[C]) promote(cut int32) {
	if at := slices.Index(r.order, cut); at > 0 {
		copy(r.order[1:at+1], r.order[:at])
		r.order[0] = cut
	}
}

// since returns the pool indices of the cuts that joined after the pool had the given size, lowest of a search first.
func (r *run[C]) since(size int) []int32 {
	out := make([]int32, 0, len(r.pool)-size)
	for k := size; k < len(r.pool); k++ {
		out = append(out, int32(k))
	}
	return out
}
