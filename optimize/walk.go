package optimize

import "math"

// Batches of the walk grow from the smallest to the largest while the pool rejects every design, and start again after
// one that it did not: near the answer most designs pass the pool, and screening far past the answer is wasted.
const (
	smallestBatch = 8
	largestBatch  = 64
)

// walk visits the designs in order until one passes search and audit, and returns its rank.
func (r *run[C]) walk() (answer int, found bool, err error) {
	size := smallestBatch
	for at := 0; at < len(r.designs); {
		ranks := make([]int, min(size, len(r.designs)-at))
		for i := range ranks {
			ranks[i] = at + i
		}
		known := len(r.pool)
		hits, err := r.screen(ranks)
		if err != nil {
			return 0, false, err
		}
		size = min(2*size, largestBatch)
		for i, rank := range ranks {
			if hits[i].cut == NoCut {
				size = smallestBatch
				var v verdict[C]
				if v, err = r.settle(rank, known); err != nil {
					return 0, false, err
				}
				if v.standing == passed {
					return rank, true, nil
				}
				hits[i] = v.witness
				if v.standing == undecided {
					hits[i] = hit{cut: NoCut, margin: math.NaN()}
				}
			}
			r.record(rank, hits[i])
		}
		at += len(ranks)
		r.report(Walking, at)
	}
	return 0, false, nil
}

// settle brings a design that passed the pool as it was when it had the given size to a verdict: cuts that have joined
// since, then a search unless the exchange made it, then an audit.
func (r *run[C]) settle(rank, known int) (verdict[C], error) {
	d := r.open(r.point(r.designs[rank]))
	defer d.Close()
	if h := r.reject(d, r.since(known)); h.cut != NoCut {
		r.promote(h.cut)
		return verdict[C]{standing: rejected, witness: h}, nil
	}
	v, searched := r.verdicts[rank]
	var err error
	if !searched {
		if v, err = r.examine(d, rank, false, 0); err != nil {
			return v, err
		}
	}
	if v.standing == passed {
		v, err = r.examine(d, rank, true, 0)
	}
	return v, err
}

// record enters the next design of the walk into the certificate.
func (r *run[C]) record(rank int, h hit) {
	d := r.designs[rank]
	r.res.Lattice = append(r.res.Lattice, Witness{Index: d.index, Cost: d.cost, Cut: h.cut, Margin: h.margin})
}

func (r *run[C]) accept(rank int) {
	r.res.X = r.point(r.designs[rank])
	r.res.Cost = r.designs[rank].cost
	r.res.Lowest = r.verdicts[rank].found
}

// retry tries the whole pool again on the designs that were left unresolved, since cuts have joined it
// after them, and returns how many remain.
func (r *run[C]) retry() (remaining int, err error) {
	var ranks []int
	for rank := range r.res.Lattice {
		if r.res.Lattice[rank].Cut == NoCut {
			ranks = append(ranks, rank)
		}
	}
	hits, err := r.screen(ranks)
	if err != nil {
		return 0, err
	}
	for i, h := range hits {
		if h.cut == NoCut {
			remaining++
			continue
		}
		r.res.Lattice[ranks[i]].Cut, r.res.Lattice[ranks[i]].Margin = h.cut, h.margin
	}
	return remaining, nil
}
