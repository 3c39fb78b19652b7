package optimize

import (
	"cmp"
	"container/heap"
	"slices"
)

// screensPerSearch is how many candidates may have their bounds lowered by a search that ends with what is quick to find, for each that may be
// searched for all there is.
const screensPerSearch = 2

// bestBatch is how many candidates have the pool tried on them at a time.
const bestBatch = largestBatch

// candidate is a rejected design with the lowest margin known so far, which bounds its margin from above.
type candidate[C any] struct {
	rank     int
	bound    float64
	cut      int32 // pool cut of the bound
	tried    int   // pool cuts tried, from the first
	screened bool
	searched bool
	audited  bool
	found    []Found[C] // by search and audit
	missing  int        // unresolved cuts met by search and audit
}

// candidates is a heap, greatest bound first, then lowest rank.
type candidates[C any] []*candidate[C]

func (h candidates[C]) Len() int      { return len(h) }
func (h candidates[C]) Swap(i, j int) { h[i], h[j] = h[j], h[i] }
func (h candidates[C]) Less(i, j int) bool {
	return cmp.Or(cmp.Compare(h[j].bound, h[i].bound), cmp.Compare(h[i].rank, h[j].rank)) < 0
}
func (h *candidates[C]) Push(x any) { *h = append(*h, x.(*candidate[C])) }
func (h *candidates[C]) Pop() any {
	old := *h
	last := old[len(old)-1]
	*h = old[:len(old)-1]
	return last
}

// rankBest looks for the design with the greatest margin among those that have a witness, best bound first: a bound is
// lowered by trying the whole pool, then by a search that may end with what is quick to find, then by a full search, then by an audit, and the
// first candidate to stay on top after all is the best. When searches of a kind run out, only those that had one stay in the queue.
func (r *run[C]) rankBest() error {
	var queue, screened, searched candidates[C]
	for rank, w := range r.res.Lattice {
		if w.Cut != NoCut {
			queue = append(queue, &candidate[C]{rank: rank, bound: w.Margin, cut: w.Cut})
		}
	}
	heap.Init(&queue)
	for len(queue) > 0 {
		top := queue[0]
		switch {
		case top.tried < len(r.pool):
			if err := r.tightenTop(&queue); err != nil {
				return err
			}
		case top.audited || top.searched && r.s.BestUnaudited:
			r.acceptBest(top)
			return nil
		case top.searched:
			if err := r.auditCandidate(top); err != nil {
				return err
			}
			heap.Fix(&queue, 0)
		case len(searched) == r.s.BestSearches:
			queue = searched
			heap.Init(&queue)
		case !top.screened && len(screened) == screensPerSearch*r.s.BestSearches:
			queue = screened
			heap.Init(&queue)
		case !top.screened:
			screened = append(screened, top)
			if err := r.screenCandidate(top); err != nil {
				return err
			}
			heap.Fix(&queue, 0)
		default:
			searched = append(searched, top)
			if err := r.searchCandidate(top); err != nil {
				return err
			}
			heap.Fix(&queue, 0)
			r.report(Ranking, len(r.designs))
		}
	}
	return nil
}

// tightenTop tries the rest of the pool on the top candidates that lack it.
func (r *run[C]) tightenTop(queue *candidates[C]) error {
	var batch []*candidate[C]
	for len(*queue) > 0 && len(batch) < bestBatch && (*queue)[0].tried < len(r.pool) {
		batch = append(batch, heap.Pop(queue).(*candidate[C]))
	}
	err := each(r.ctx, r.s.Workers, len(batch), func(i int) {
		c := batch[i]
		d := r.open(r.point(r.designs[c.rank]))
		defer d.Close()
		for k := c.tried; k < len(r.pool); k++ {
			if m := d.Margin(&r.pool[k]); m < c.bound {
				c.bound, c.cut = m, int32(k)
			}
		}
		r.margins.Add(int64(len(r.pool) - c.tried))
		c.tried = len(r.pool)
	})
	for _, c := range batch {
		heap.Push(queue, c)
	}
	return err
}

// screenCandidate lowers the bound of a candidate by what is quick to find, unless its search has ended with that before.
func (r *run[C]) screenCandidate(c *candidate[C]) error {
	c.screened = true
	if _, known := r.verdicts[c.rank]; known {
		return nil
	}
	_, err := r.lower(c, Effort{ToReject: true})
	return err
}

// searchCandidate searches a candidate for all that there is to find, unless that was done before.
func (r *run[C]) searchCandidate(c *candidate[C]) error {
	c.searched = true
	v, known := r.verdicts[c.rank]
	if v.whole {
		c.missing, c.found = v.missing, v.found
		return nil
	}
	if !known {
		r.res.Spent.FullySearched++
	}
	return r.look(c, Effort{})
}

// auditCandidate audits a candidate that has been searched.
func (r *run[C]) auditCandidate(c *candidate[C]) error {
	c.audited = true
	return r.look(c, Effort{Audit: true})
}

// look searches or audits a candidate for all there is, and keeps what was found.
func (r *run[C]) look(c *candidate[C], e Effort) error {
	found, err := r.lower(c, e)
	c.found = arrange(append(slices.Clone(c.found), found...))
	c.missing += unresolved(found)
	return err
}

// lower searches or audits a candidate on which the whole pool has been tried. Cuts below its bound are news: they
// join the pool, and the lowest is the new bound.
func (r *run[C]) lower(c *candidate[C], e Effort) ([]Found[C], error) {
	x := r.point(r.designs[c.rank])
	d := r.open(x)
	defer d.Close()
	found, err := r.search(d, x, e)
	if err != nil {
		return nil, err
	}
	lowest := int32(len(r.pool))
	if r.joinFound(found, c.bound, 0); int(lowest) < len(r.pool) {
		c.bound, c.cut = found[0].Margin, lowest
	}
	return found, nil
}

func (r *run[C]) acceptBest(c *candidate[C]) {
	d := r.designs[c.rank]
	r.res.Best = Attempt[C]{
		X: r.point(d), Cost: d.cost, Margin: c.bound, Unresolved: c.missing,
		Binding: Found[C]{Cut: r.pool[c.cut], Margin: c.bound}, Found: c.found,
	}
}
