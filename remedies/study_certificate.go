package remedies

import (
	"math"
	"sort"

	"standfast/optimize"
)

// certificate says what the answer rests on.
func (z *sizing) certificate(res *optimize.Result[Cut]) *Certificate {
	c := &Certificate{
		Axes: res.Axes, Coarsened: res.Coarsened, CheaperDesigns: len(res.Lattice), Forbidden: res.Forbidden,
		UnresolvedDesigns: res.Unresolved, ContinuousEstimate: res.ContinuousEstimate, Allowance: res.Allowance,
		Searches: int(z.searches.Load()), AuditSearches: int(z.audits.Load()), DesignsSearched: res.Spent.FullySearched,
		ExchangeDesigns: res.Spent.ExchangeSearched,
		SlipEvaluations: int(z.trials.Load()) + res.Spent.MarginEvaluations, Pool: res.Pool,
	}
	if res.Coarsened {
		for _, a := range z.w.axes {
			c.Steps = append(c.Steps, a.Step)
		}
	}
	if z.j.Objective != LeastEarthworks {
		c.ContinuousEstimate = math.NaN()
	}
	checks := Checks(z.j, z.w.apply(z.j, z.w.smallest()))
	for _, w := range res.Lattice {
		if w.Cut == optimize.NoCut {
			continue
		}
		c.Witnessed++
		c.Witnesses = append(c.Witnesses, Witness{
			X: optimize.Point(res.Axes, w.Index), Earthworks: z.earthworks(res, w), Cut: w.Cut,
			FS: w.Margin + checks[res.Pool[w.Cut].Check].Required,
		})
	}
	c.AuditLowest = auditLowest(res, checks)
	return c
}

// earthworks returns the earthworks of a cheaper design, which are its cost where they are what is made least.
func (z *sizing) earthworks(res *optimize.Result[Cut], w optimize.Witness) float64 {
	if z.j.Objective == LeastEarthworks {
		return w.Cost
	}
	return z.w.apply(z.j, optimize.Point(res.Axes, w.Index)).Quantities.Earthworks()
}

// auditLowest returns the lowest FS found at the answer in each check.
func auditLowest(res *optimize.Result[Cut], checks []Check) []AuditLow {
	low := map[uint16]AuditLow{}
	for _, f := range res.Lowest { // Ascending: the first of a check is its lowest.
		if _, seen := low[f.Cut.Check]; seen || f.Unresolved || math.IsInf(f.Margin, 1) {
			continue
		}
		c := &checks[f.Cut.Check]
		low[f.Cut.Check] = AuditLow{Check: c.Label(), FS: f.Margin + c.Required, Method: f.Cut.Setting.Method, Required: c.Required}
	}
	var keys []int
	for k := range low {
		keys = append(keys, int(k))
	}
	sort.Ints(keys)
	var out []AuditLow
	for _, k := range keys {
		out = append(out, low[uint16(k)])
	}
	return out
}
