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
		x, low := r.X, 0.0
		if x == nil {
			if x, low = r.Best.X, r.Best.Margin; x == nil {
				break
			}
		} else {
			low = r.Lowest[0].Margin
		}
		q := z.w.apply(z.j, x).Quantities
		out = append(out, TradeoffPoint{
			Shift: shift, RequiredFS: g.Check.Required + shift, Reached: g.Check.Required + shift + low,
			Earthworks: q.Earthworks(), Drain: q.Drain, Parameters: z.w.values(x),
		})
		if r.X == nil { // The most that the remedy can do.
			break
		}
	}
	return out, nil
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
