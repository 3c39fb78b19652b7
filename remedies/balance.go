package remedies

import "math"

// OnSiteFill is material of the site that may serve as fill: what is cut of a soil, or a stockpile.
type OnSiteFill struct {
	Name   string
	Cut    int      // Soil whose cut it is; -1: a stockpile.
	Serves []int    // Soils that it may be placed as.
	Share  float64  // Of the cut that is fit for use, 0 to 1; a stockpile does not look at it.
	Volume *float64 // Most that there is, compacted m3 for the whole length; nil: no limit.
}

// Balance says where fill comes from and where cut goes, per metre run.
type Balance struct {
	Need    []float64 // Fill by soil placed, the make-up of stripped ground included, compacted m3/m.
	Reused  []float64 // Of it, won on the site, compacted m3/m.
	Import  []float64 // Of it, brought, compacted m3/m: max(0, need - what the site can serve it with).
	Dispose []float64 // Cut and dig by soil that is not used again, bank m3/m.
}

// source is material on offer.
type source struct {
	offer     float64 // Compacted m3/m.
	serves    []int
	cut       int     // Soil, or noSoil.
	shrinkage float64 // Compacted over bank.
}

// BalanceOf balances cut against fill so that the least fill is brought. Cut of a soil is used again only where the job says what it may serve
// as and its shrinkage is known; topsoil never is. Cut is used before stockpiles, so that the least has to go.
func BalanceOf(j *Job, q *Quantities) Balance {
	n := len(q.Cut)
	b := Balance{Need: make([]float64, n), Reused: make([]float64, n), Import: make([]float64, n), Dispose: make([]float64, n)}
	for i := range n {
		b.Need[i] = q.Fill[i] + j.Economics.StripDepth*q.FillBase[i]
		b.Dispose[i] = q.Cut[i] + q.Dig[i]
	}
	sources := offers(j, q)
	flow := allot(sources, b.Need)
	for k, s := range sources {
		for i, v := range flow[k] {
			b.Reused[i] += v
			if s.cut != noSoil {
				b.Dispose[s.cut] -= v / s.shrinkage
			}
		}
	}
	for i := range n {
		b.Import[i] = math.Max(0, b.Need[i]-b.Reused[i])
		b.Dispose[i] = math.Max(0, b.Dispose[i])
	}
	return b
}

// offers lists what the site offers, cuts first.
func offers(j *Job, q *Quantities) []source {
	var cuts, piles []source
	for _, f := range j.OnSite {
		most := math.Inf(1)
		if f.Volume != nil {
			most = *f.Volume / j.Length
		}
		if f.Cut == noSoil {
			piles = append(piles, source{offer: most, serves: f.Serves, cut: noSoil})
			continue
		}
		_, shrinkage := j.Economics.soil(f.Cut)
		if math.IsNaN(shrinkage) {
			continue
		}
		bank := q.Cut[f.Cut] + q.Dig[f.Cut] - q.Topsoil[f.Cut]
		cuts = append(cuts, source{offer: math.Min(most, f.Share*shrinkage*bank), serves: f.Serves, cut: f.Cut, shrinkage: shrinkage})
	}
	return append(cuts, piles...)
}

// allot returns how much of each source goes to each soil so that the most need is met, earlier sources first (augmenting paths; Ford and
// Fulkerson 1956). A path that takes from an earlier source only hands its place to a later one.
func allot(sources []source, need []float64) [][]float64 {
	flow := make([][]float64, len(sources))
	left := append([]float64(nil), need...)
	for k := range sources {
		flow[k] = make([]float64, len(need))
	}
	for k := range sources {
		for range len(sources) * len(need) * 4 { // Far more paths than such a small net has.
			spare := sources[k].offer - sum(flow[k])
			if !(spare > limitSlack) || augment(sources, flow, left, make([]bool, len(need)), k, spare) <= 0 {
				break
			}
		}
	}
	return flow
}

// augment sends up to most from source k to soils with need left, moving earlier allotments aside where that frees need.
func augment(sources []source, flow [][]float64, left []float64, seen []bool, k int, most float64) float64 {
	for _, i := range sources[k].serves {
		if seen[i] {
			continue
		}
		seen[i] = true
		if v := math.Min(most, left[i]); v > limitSlack {
			left[i] -= v
			flow[k][i] += v
			return v
		}
		for m := range sources {
			if m == k || flow[m][i] <= limitSlack {
				continue
			}
			if v := augment(sources, flow, left, seen, m, math.Min(most, flow[m][i])); v > 0 {
				flow[m][i] -= v
				flow[k][i] += v
				return v
			}
		}
	}
	return 0
}
