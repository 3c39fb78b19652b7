package remedies

import (
	"cmp"
	"context"
	"math"
	"slices"

	"standfast/optimize"
)

// Steps of the trade-off curves: the required FS of every check is shifted from where the existing slope stands to a little beyond.
const (
	curveStep   = 0.05
	curveBeyond = 0.15
	curveMost   = 14 // Points at the most.
)

// curve sizes an option for a range of required FS. Its points are searched, circles and non-circular slips, but not audited.
func (z *sizing) curve(ctx context.Context, o *Option, res *optimize.Result[Cut]) ([]TradeoffPoint, error) {
	g := o.Governing()
	if g == nil {
		return nil, nil
	}
	c := newSizing(z.j, z.w, z.s)
	c.noAudit = true
	var out []TradeoffPoint
	pool := res.Pool
	for _, shift := range z.shifts() {
		c.shift = shift
		x, found, err := c.settle(ctx, &pool)
		if err != nil || x == nil {
			return out, err
		}
		point := c.point(x, found)
		point.Shift, point.RequiredFS = shift, g.Check.Required+shift
		point.Reached += point.RequiredFS
		if found[0].Margin >= z.s.Allowance {
			out = append(out, *point)
			continue
		}
		// The most that the remedy can do, unless a design of a lower target did as much.
		if len(out) == 0 || point.Reached > out[len(out)-1].Reached {
			out = append(out, *point)
		}
		break
	}
	return out, nil
}

// settle sizes the works for the shift in force. It returns the answer, or the best there is, with all that was found there and the slips of the
// pool, in ascending margin; the pool grows.
func (z *sizing) settle(ctx context.Context, pool *[]Cut) (x []float64, found []optimize.Found[Cut], err error) {
	r, err := z.minimize(ctx, z.cost, *pool, nil)
	if err != nil {
		return nil, nil, err
	}
	*pool = r.Pool
	if x, found = r.X, r.Lowest; x == nil {
		if x, found = r.Best.X, r.Best.Found; x == nil {
			return nil, nil, nil
		}
	}
	d := z.openProposal(z.w.apply(z.j, x))
	defer d.Close()
	for i := range r.Pool {
		if m := d.Margin(&r.Pool[i]); !math.IsNaN(m) && !math.IsInf(m, 1) {
			found = append(found, optimize.Found[Cut]{Cut: r.Pool[i], Margin: m})
		}
	}
	slices.SortStableFunc(found, func(a, b optimize.Found[Cut]) int { return cmp.Compare(keyOf(a), keyOf(b)) })
	return x, found, nil
}

// keyOf orders what was found by margin; what has none comes last.
func keyOf(f optimize.Found[Cut]) float64 {
	if f.Unresolved || math.IsNaN(f.Margin) {
		return math.Inf(1)
	}
	return f.Margin
}

// point lays out a design as a point of a curve. Its Reached is the least margin over every check.
func (z *sizing) point(x []float64, found []optimize.Found[Cut]) *TradeoffPoint {
	p := z.w.apply(z.j, x)
	d := z.openProposal(p)
	defer d.Close()
	t := &TradeoffPoint{
		Reached: found[0].Margin, Earthworks: p.Quantities.Earthworks(), Drain: p.Quantities.Drain, Parameters: z.w.values(x), Proposal: p,
	}
	t.Situations, t.Stages = split(d.outcomes(found))
	return t
}

// shifts returns the shifts of the required FS at which a curve has points, ascending, 0 among them.
func (z *sizing) shifts() []float64 {
	deficit := -z.existingMargin
	first := -math.Min(math.Floor(math.Max(deficit, 0)/curveStep), curveMost-curveBeyond/curveStep)
	var out []float64
	for k := first; k*curveStep <= curveBeyond+curveStep/2; k++ {
		out = append(out, math.Round(k*curveStep*100)/100)
	}
	return out
}
