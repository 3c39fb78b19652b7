package remedies

import (
	"context"
	"math"

	"standfast/optimize"
)

// Steps of the trade-off curves: the required FS of every check is shifted from where the existing slope stands to a little beyond.
const (
	curveStep   = 0.05
	curveBeyond = 0.15
	curveMost   = 14 // Points at the most.
)

// curve sizes an option for a range of required FS. Its points are searched like a sizing but not audited.
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
		r, err := c.minimize(ctx, c.cost, pool, nil)
		if err != nil {
			return nil, err
		}
		pool = r.Pool
		point, err := c.point(ctx, &r)
		if err != nil || point == nil {
			return out, err
		}
		point.Shift, point.RequiredFS = shift, g.Check.Required+shift
		point.Reached += point.RequiredFS
		out = append(out, *point)
		if r.X == nil { // The most that the remedy can do.
			break
		}
	}
	return out, nil
}

// point lays out the answer to one shift: the least works that meet it, or the most that the remedy can do; nil if it can do nothing. Its
// Reached is the least margin over every check.
func (z *sizing) point(ctx context.Context, r *optimize.Result[Cut]) (*TradeoffPoint, error) {
	x := r.X
	if x == nil {
		x = r.Best.X
	}
	if x == nil {
		return nil, nil
	}
	p := z.w.apply(z.j, x)
	d := z.openProposal(p)
	defer d.Close()
	found, low := r.Lowest, r.Best.Margin
	if r.X != nil {
		low = found[0].Margin
	} else {
		var err error
		if found, err = d.Search(ctx, optimize.Effort{Seed: 1}); err != nil {
			return nil, err
		}
		found = append(found, r.Best.Binding)
	}
	t := &TradeoffPoint{
		Reached: low, Earthworks: p.Quantities.Earthworks(), Drain: p.Quantities.Drain, Parameters: z.w.values(x), Proposal: p,
	}
	t.Situations, t.Stages = split(d.outcomes(found))
	return t, nil
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
