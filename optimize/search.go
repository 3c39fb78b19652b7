package optimize

import (
	"cmp"
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
)

// standing is where a design stands after a search.
type standing int

const (
	passed standing = iota
	rejected
	undecided
)

// verdict is the outcome of searching one design in full.
type verdict[C any] struct {
	standing standing
	found    []Found[C] // of search and, once made, audit, in the order of arrange
	whole    bool       // the search looked at everything
	missing  int        // unresolved cuts among all that were found
	witness  hit        // when rejected
}

// search makes one search or audit, with a seed of its own, and returns what it found in the order of arrange.
func (r *run[C]) search(d Design[C], x []float64, e Effort) ([]Found[C], error) {
	spent := &r.res.Spent
	e.Round = spent.Searches + spent.Audits
	e.Seed = rand.NewPCG(r.s.Seed, uint64(e.Round)).Uint64()
	if e.Audit {
		spent.Audits++
	} else {
		spent.Searches++
	}
	found, err := d.Search(r.ctx, e)
	if ctxErr := r.ctx.Err(); ctxErr != nil {
		return nil, ctxErr
	}
	if err != nil {
		return nil, fmt.Errorf("search of design %g: %w", x, err)
	}
	return arrange(slices.Clone(found)), nil
}

// arrange marks NaN margins as unresolved and sorts in place: ascending margins, the unresolved last.
func arrange[C any](found []Found[C]) []Found[C] {
	for i := range found {
		if math.IsNaN(found[i].Margin) {
			found[i].Unresolved = true
		}
	}
	slices.SortStableFunc(found, func(a, b Found[C]) int {
		if a.Unresolved != b.Unresolved {
			if a.Unresolved {
				return 1
			}
			return -1
		}
		return cmp.Compare(a.Margin, b.Margin)
	})
	return found
}

// judge weighs what a search found: one resolved cut below the allowance rejects, whatever else is unresolved; a
// search that found nothing shows nothing.
func judge[C any](found []Found[C], allowance float64) standing {
	switch {
	case len(found) == 0:
		return undecided
	case !found[0].Unresolved && found[0].Margin < allowance:
		return rejected
	case found[len(found)-1].Unresolved:
		return undecided
	}
	return passed
}

// unresolved counts the cuts without a margin.
func unresolved[C any](found []Found[C]) int {
	n := 0
	for i := range found {
		if found[i].Unresolved {
			n++
		}
	}
	return n
}

// examine searches or audits an open design and keeps the verdict. If that rejects the design, the cuts below the
// allowance join the pool, and up to near others.
func (r *run[C]) examine(d Design[C], rank int, audit bool, near int) (verdict[C], error) {
	found, err := r.search(d, r.point(r.designs[rank]), Effort{Audit: audit, ToReject: !audit})
	if err != nil {
		return verdict[C]{}, err
	}
	v := verdict[C]{standing: judge(found, r.s.Allowance)}
	v.whole = audit || v.standing != rejected
	v.found = arrange(append(slices.Clone(r.verdicts[rank].found), found...))
	v.missing = unresolved(v.found)
	if v.standing == rejected {
		v.witness = hit{cut: int32(len(r.pool)), margin: found[0].Margin}
		r.joinFound(found, r.s.Allowance, near)
	}
	r.verdicts[rank] = v
	return v, nil
}
