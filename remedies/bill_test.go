package remedies

import (
	"math"
	"slices"
	"testing"

	"pgregory.net/rapid"
)

// item returns the item of a work on a soil, or none.
func item(t *testing.T, b *Bill, w Work, soil int) Item {
	t.Helper()
	for _, it := range b.Items {
		if it.Work == w && it.Soil == soil {
			return it
		}
	}
	t.Errorf("no item %v of soil %d", w, soil)
	return Item{}
}

// TestBill prices a flattened cutting with a berm; all numbers by hand. Cut 1V:2.5H to 1V:3H about the toe, 20.25 m3/m; berm 2.5 m high
// and 4 m wide at 1V:2H on the new face: its back runs on inward by 1.25 m.
func TestBill(t *testing.T) {
	j := cutting()
	j.Section.Strata[1].Top = j.Section.Strata[1].Top[:1] // level at 106: the cut is clay above it, stiff clay below
	j.Economics = Economics{
		Soils:      []SoilFactors{clay: {Bulking: 1.3, Shrinkage: 0.9}, stiffClay: {Bulking: 1.35}, sandFill: {Bulking: 1.2, Shrinkage: 0.95}},
		StripDepth: 0.3, BenchStep: 0.5, LorryLoad: 10,
		Cost:   Factors{Work: map[Work]float64{Strip: 0.5, Excavate: 1, Place: 1, Import: 3, Dispose: 4, Benching: 2}, Import: map[int]float64{sandFill: 5}},
		Carbon: Factors{Work: map[Work]float64{Excavate: 1}},
	}
	j.OnSite = []OnSiteFill{{Name: "cut clay", Cut: clay, Serves: []int{sandFill}, Share: 0.5}}
	p := apply(t, j, request("regrade", nil, 3, 0), request("berm", fillOf(sandFill), 2.5, 4, 2))
	q := &p.Quantities
	b := BillOf(j, q)
	upper := 0.5 * (9*9 - 6*6) / 2 // between the faces, from 6 m to 9 m above the toe
	// Topsoil of the cut: 0.3 m below the level top and the face, as far as the new face lies deeper.
	near(t, "clay cut", item(t, &b, Excavate, clay).PerMetre, upper, 1e-9)
	near(t, "stiff clay cut", item(t, &b, Excavate, stiffClay).PerMetre, 20.25-upper, 1e-9)
	near(t, "loose clay", item(t, &b, Excavate, clay).Loose, upper*80*1.3, 1e-6)
	fill := 2.5*4 + 0.5*(2-2.5)*6.25 + 0.5*0.5*6.25
	near(t, "fill", q.TotalFill(), fill, 1e-9)
	// Above ground before works the fill lies on 4 - 2.5*2.5 + ... m of level ground: toe of berm at 46.25 + 4 + 5 = 55.25.
	base := 55.25 - 52.5
	near(t, "base on old ground", q.FillBase[sandFill], base, 1e-9)
	near(t, "need", b.Balance.Need[sandFill], fill+0.3*base, 1e-9)
	reused := 0.5 * 0.9 * (upper - q.Topsoil[clay])
	near(t, "reused", b.Balance.Reused[sandFill], reused, 1e-9)
	near(t, "import", b.Balance.Import[sandFill], fill+0.3*base-reused, 1e-9)
	near(t, "dispose of clay", b.Balance.Dispose[clay], upper-reused/0.9, 1e-9)
	near(t, "balance", b.Balance.Import[sandFill]+b.Balance.Reused[sandFill], b.Balance.Need[sandFill], 1e-12)
	imported := item(t, &b, Import, sandFill)
	near(t, "loads", imported.Loads, math.Ceil(imported.Total/0.95*1.2/10), 0)
	cost := 80 * (0.5*q.Strip + 20.25 + reused + 5*imported.PerMetre + 4*(20.25-reused/0.9))
	near(t, "cost", b.Cost, cost, 1e-6)
	near(t, "cost alone", Cost(j, q), cost, 1e-6)
	if !math.IsNaN(b.Carbon) || !math.IsNaN(Carbon(j, q)) {
		t.Errorf("carbon %g with factors left blank", b.Carbon)
	}
	j.Economics.Cost = Factors{}
	if c := Cost(j, q); !math.IsNaN(c) {
		t.Errorf("cost %g without rates", c)
	}
}

// TestTopsoil checks the topsoil of a platform cut 2 m into level ground behind a wall: strip depth times its width, back batter included.
func TestTopsoil(t *testing.T) {
	j := cutting()
	j.Economics.StripDepth = 0.3
	p := apply(t, j, request("unload", nil, 2, 6.5, 2))
	// Level top: from 24.5 to 30, less the triangle where the batter has not reached 0.3 m; face: vertical depth 0.3 over 5 m, less that
	// at the front, where the cut is thinner than 0.3 m (0.75 m long).
	want := 0.3*5.5 - 0.3*0.6/2 + 0.3*5 - 0.3*0.75/2
	near(t, "topsoil", sum(p.Quantities.Topsoil), want, 1e-9)
}

// TestBenching checks the volume of steps against a staircase summed step by step.
func TestBenching(t *testing.T) {
	j := cutting()
	p := apply(t, j, request("berm", fillOf(sandFill), 2, 4, 2))
	near(t, "run of the face", p.Quantities.FaceRun, 5, 1e-9) // 2 m at 1V:2.5H
	var steps float64
	for k := 0; k < 4; k++ { // 0.5 m high and 1.25 m deep
		steps += 0.5 * 1.25 / 2
	}
	near(t, "steps", BenchingVolume(p.Quantities.FaceRun, 0.5), steps, 1e-9)
	b := BillOf(j, &p.Quantities)
	if it := item(t, &b, Strip, noSoil); !math.IsNaN(it.Cost) {
		t.Error("a blank rate has made a cost")
	}
}

// TestImportLimit checks the hard limit on either side.
func TestImportLimit(t *testing.T) {
	j := cutting()
	berm := request("berm", fillOf(sandFill), 2, 4, 2) // 2*4 - 0.5*4/2 = 7 m3/m, 560 m3 in all
	stock := 100.0
	j.OnSite = []OnSiteFill{{Name: "stockpile", Cut: noSoil, Serves: []int{sandFill}, Volume: &stock}}
	for _, most := range []float64{459, 460} {
		j.Limits.MaxImport = &most
		p := apply(t, j, berm)
		if most == 460 {
			if len(p.Violations) > 0 {
				t.Errorf("violations %+v", p.Violations)
			}
			continue
		}
		if len(p.Violations) != 1 || p.Violations[0].Detail != "460 m3 of fill have to be brought, the maximum import is 459 m3" {
			t.Fatalf("violations %+v", p.Violations)
		}
		near(t, "by", p.Violations[0].By, 1, 1e-6)
	}
}

// TestAllotMost compares the allotment with the least cut of the same net: over all sets of soils, the need of the set plus what the
// sources that serve soils outside it offer (max-flow min-cut theorem, Ford and Fulkerson 1956).
func TestAllotMost(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		need := rapid.SliceOfN(rapid.Float64Range(0, 10), 1, 4).Draw(t, "need")
		n := rapid.IntRange(0, 4).Draw(t, "sources")
		sources := make([]source, n)
		for k := range sources {
			sources[k] = source{offer: rapid.Float64Range(0, 10).Draw(t, "offer"), cut: noSoil}
			for i := range need {
				if rapid.Bool().Draw(t, "serves") {
					sources[k].serves = append(sources[k].serves, i)
				}
			}
		}
		flow := allot(sources, need)
		var total float64
		served := make([]float64, len(need))
		for k := range flow {
			if sum(flow[k]) > sources[k].offer+1e-9 {
				t.Errorf("source %d gives more than it has", k)
			}
			for i, v := range flow[k] {
				total += v
				served[i] += v
				if v < -1e-9 || v > 0 && !slices.Contains(sources[k].serves, i) {
					t.Errorf("source %d gives %g to %d", k, v, i)
				}
			}
		}
		for i := range served {
			if served[i] > need[i]+1e-9 {
				t.Errorf("soil %d gets more than it needs", i)
			}
		}
		best := math.Inf(1)
		for set := range 1 << len(need) {
			var cut float64
			for i := range need {
				if set>>i&1 == 1 {
					cut += need[i]
				}
			}
			for _, s := range sources {
				for _, i := range s.serves {
					if set>>i&1 == 0 {
						cut += s.offer
						break
					}
				}
			}
			best = math.Min(best, cut)
		}
		if math.Abs(total-best) > 1e-4 {
			t.Errorf("allotted %g, most is %g", total, best)
		}
	})
}
