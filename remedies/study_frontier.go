package remedies

import (
	"context"
	"math"
	"slices"

	"standfast/optimize"
)

const (
	// frontMost bounds the points of a front; the answer may come on top where something else than earthworks is made least.
	frontMost = 10
	// sameMetres is the difference below which two lengths of drain, m per m run, are one: what dividing by spacings leaves behind.
	sameMetres = 1e-9
)

// frontier is the search for a front with cuts C. A design that any of its sizings has rejected, or that of the answer, is left out of all
// others, so that the whole front takes little more than one walk over the lattice.
type frontier[C any] struct {
	axes       []optimize.Axis
	earthworks []float64 // By design of the lattice.
	drain      []float64
	out        []bool // Forbidden by a limit, rejected or unresolved.
	open       func(x []float64) optimize.Design[C]
	settings   optimize.Settings[C] // Of each sizing.
	progress   func(done int)       // Told how many designs are dealt with.
	answer     stand[C]
	byCost     bool // The answer is not the least earthworks but the least of something else.
	pool       []C
	unresolved int
	settled    int // Designs dealt with.
}

// stand is a design that meets every check.
type stand[C any] struct {
	index int // On the lattice.
	found []optimize.Found[C]
}

func newFrontier[C any](axes []optimize.Axis, designs int) *frontier[C] {
	return &frontier[C]{axes: axes, earthworks: make([]float64, designs), drain: make([]float64, designs), out: make([]bool, designs)}
}

// leaveOut takes note of what a sizing has rejected or could not judge.
func (f *frontier[C]) leaveOut(res *optimize.Result[C]) {
	f.pool = res.Pool
	f.unresolved += res.Unresolved
	f.settled += len(res.Lattice)
	for _, w := range res.Lattice {
		f.out[w.Index] = true
	}
}

// index returns the place of a design on the lattice; the last axis runs fastest.
func (f *frontier[C]) index(x []float64) int {
	i := 0
	for k, a := range f.axes {
		i *= a.Len()
		if a.Step > 0 {
			i += int(math.Round((x[k] - a.Min) / a.Step))
		}
	}
	return i
}

// rejected reports whether a cut of the pool rejects a design.
func (f *frontier[C]) rejected(index int) bool {
	d := f.open(optimize.Point(f.axes, index))
	defer d.Close()
	return slices.ContainsFunc(f.pool, func(c C) bool { return d.Margin(&c) < f.settings.Allowance })
}

// front returns the designs of the front and whether they are all of them; none if all designs have as much drain as each other, or if a cut was
// met that rejects the answer. Should a cut met on the way to one point reject another, the front is gone along again without that design.
func (f *frontier[C]) front(ctx context.Context) (stands []stand[C], whole bool, err error) {
	if slices.Max(f.drain)-slices.Min(f.drain) <= sameMetres {
		return nil, false, nil
	}
	for {
		stands, whole, err = f.along(ctx)
		if err != nil || f.rejected(f.answer.index) {
			return nil, false, err
		}
		known := len(stands)
		stands = slices.DeleteFunc(stands, func(s stand[C]) bool {
			f.out[s.index] = f.rejected(s.index)
			return f.out[s.index]
		})
		if len(stands) == known {
			return stands, whole, nil
		}
	}
}

// along goes along the front once, from its least earthworks to its least drain, then between the points found as far as there may be more.
func (f *frontier[C]) along(ctx context.Context) (stands []stand[C], whole bool, err error) {
	first := f.answer
	if f.byCost {
		var found bool
		if first, found, err = f.size(ctx, f.byEarthworks, func(int) bool { return true }); err != nil || !found {
			return nil, false, err
		}
	}
	stands = append(stands, first)
	at := f.drain[first.index]
	last, found, err := f.size(ctx, f.byDrain, func(i int) bool { return f.drain[i] < at-sameMetres })
	if err != nil || !found {
		return stands, true, err
	}
	step := (at - f.drain[last.index]) / (frontMost - 1)
	for {
		below := at - step
		if own := f.drain[f.answer.index]; own < at-sameMetres && own > below { // Not past the answer.
			below = own
		}
		next, found, err := f.between(ctx, below+sameMetres/2, last)
		if err != nil {
			return nil, false, err
		}
		if !found {
			return f.fill(ctx, append(stands, last))
		}
		stands = append(stands, next)
		at = f.drain[next.index]
	}
}

// fill looks for more points in the widest gaps between some, and reports whether there are no more.
func (f *frontier[C]) fill(ctx context.Context, stands []stand[C]) ([]stand[C], bool, error) {
	empty := map[int]bool{} // By the design that a gap begins with.
	for len(stands) < frontMost {
		at, widest := 0, 0.0
		for i := 1; i < len(stands); i++ {
			if w := f.drain[stands[i-1].index] - f.drain[stands[i].index]; w > widest && !empty[stands[i-1].index] {
				at, widest = i, w
			}
		}
		if at == 0 {
			return stands, true, nil
		}
		begin := stands[at-1].index
		next, found, err := f.between(ctx, f.drain[begin]-sameMetres, stands[at])
		if err != nil {
			return nil, false, err
		}
		if found {
			stands = slices.Insert(stands, at, next)
		} else {
			empty[begin] = true
		}
	}
	return stands, false, nil
}

// between returns the least earthworks with less drain than so much, but with more drain and less earthworks than a point.
func (f *frontier[C]) between(ctx context.Context, below float64, point stand[C]) (stand[C], bool, error) {
	drain, earthworks := f.drain[point.index]+sameMetres, f.earthworks[point.index]
	return f.size(ctx, f.byEarthworks, func(i int) bool { return f.drain[i] < below && f.drain[i] > drain && f.earthworks[i] < earthworks })
}

// byEarthworks and byDrain are what a point is the least of, and what breaks ties.
func (f *frontier[C]) byEarthworks(i int) (cost, tie float64) { return f.earthworks[i], f.drain[i] }
func (f *frontier[C]) byDrain(i int) (cost, tie float64)      { return f.drain[i], f.earthworks[i] }

// size returns the least of some designs that meets every check. The pool is full of cuts already: no exchange comes before the walk.
func (f *frontier[C]) size(ctx context.Context, by func(i int) (cost, tie float64), of func(i int) bool) (stand[C], bool, error) {
	s := f.settings
	s.Start, s.FullSearches, s.NoBest = f.pool, 1, true
	if before := f.settled; f.progress != nil {
		s.Progress = func(p optimize.Progress) { f.progress(before + p.Done) }
	}
	cost := func(x []float64) (cost, tie float64, ok bool) {
		i := f.index(x)
		cost, tie = by(i)
		return cost, tie, !f.out[i] && of(i)
	}
	res, err := optimize.Minimize(ctx, optimize.Problem[C]{Axes: f.axes, Cost: cost, Open: f.open}, s)
	if err != nil {
		return stand[C]{}, false, err
	}
	f.leaveOut(&res)
	if res.X == nil {
		return stand[C]{}, false, nil
	}
	return stand[C]{f.index(res.X), res.Lowest}, true, nil
}
