package remedies

import (
	"context"
	"math"
	"testing"

	"standfast/lem"
)

// TestPanelFS checks the sum over lengths: 3 m open in every 9 m.
func TestPanelFS(t *testing.T) {
	p := Panels{Open: 3, Spacing: 9}
	near(t, "FS", p.PanelFS(100, 150, 400, 250), (3*100+6*400)/(3*150+6*250.0), 1e-12)
	near(t, "all open", Panels{Open: 5, Spacing: 5}.PanelFS(100, 150, 400, 250), 100/150.0, 1e-12)
	near(t, "none open", Panels{Open: 0, Spacing: 5}.PanelFS(100, 150, 400, 250), 1.6, 1e-12)
}

// ordinarySums returns resistance and driving of a circle by the Ordinary method, kN per metre, from thin slices and columns of small
// cells: slow and plain. Where the circle is above the ground there is nothing.
func ordinarySums(s *lem.Section, ground lem.Profile, w *lem.Water, slip lem.Slip, from, to float64) (resistance, driving float64) {
	const n, cell = 1500, 0.02
	dx := (to - from) / n
	for i := range n {
		x := from + (float64(i)+0.5)*dx
		dip := x - slip.Centre.X
		y := slip.Centre.Y - math.Sqrt(slip.Radius*slip.Radius-dip*dip)
		top := ground.At(x)
		if y >= top {
			continue
		}
		cells := math.Ceil((top - y) / cell)
		var weight float64
		for k := 0.5; k < cells; k++ {
			weight += s.Soils[s.SoilAt(x, y+(top-y)*k/cells)].UnitWeight * (top - y) / cells * dx
		}
		soil := s.Soils[s.SoilAt(x, y-1e-9)]
		sin := -dip / slip.Radius
		cos := math.Sqrt(1 - sin*sin)
		u := lem.GammaW * math.Max(0, math.Min(w.Line.At(x), top)-y)
		resistance += soil.Cohesion*dx/cos + (weight*cos-u*dx/cos)*math.Tan(soil.Friction)
		driving += weight * sin
	}
	return resistance, driving
}

// TestAveragedSection compares the engine on the mean section with the sum over open and intact lengths, for slips that pass through the
// hole, under it, and beside it.
func TestAveragedSection(t *testing.T) {
	j := cutting()
	j.Waters[0].Line = lem.Profile{{X: 0, Y: 106}, {X: 30, Y: 105}, {X: 52.5, Y: 99.6}, {X: 80, Y: 99}} // below the ground, above the hole
	hole := lem.Profile{{X: 51, Y: 100.6}, {X: 52, Y: 98.2}, {X: 56, Y: 98.2}, {X: 57, Y: 100}}
	open := spliced(j.Section.Ground, hole, 51, 57, lower)
	water := waterAt(j, 0, nil)
	tests := []struct {
		name string
		slip lem.Slip
	}{
		{"through the hole", circleThrough(lem.Point{X: 27, Y: 109}, lem.Point{X: 55.2, Y: 100}, 22)},
		{"under it", circleThrough(lem.Point{X: 27, Y: 109}, lem.Point{X: 60, Y: 100}, 16)},
		{"grazing its floor", circleThrough(lem.Point{X: 27, Y: 109}, lem.Point{X: 57.1, Y: 100}, 30)},
		{"beside it", circleThrough(lem.Point{X: 27, Y: 109}, lem.Point{X: 49, Y: 101.4}, 22)},
	}
	for _, tt := range tests {
		for _, p := range []Panels{{3, 4.5}, {3, 12}} {
			t.Run(tt.name, func(t *testing.T) {
				mean, wet := averaged(&j.Section, open, water, false, p)
				var m lem.Model
				if err := m.Compile(&mean, &lem.Situation{Water: wet}); err != nil {
					t.Fatal(err)
				}
				d, err := m.Detail(&tt.slip, lem.Setting{Method: lem.Ordinary, Slices: 600})
				if err != nil {
					t.Fatal(err)
				}
				from, to := d.Result.From.X, d.Result.To.X
				ro, do := ordinarySums(&j.Section, open, &water, tt.slip, from, to)
				ri, di := ordinarySums(&j.Section, j.Section.Ground, &water, tt.slip, from, to)
				near(t, "FS", d.Result.F, p.PanelFS(ro, do, ri, di), 2e-3*d.Result.F)
				near(t, "resistance", d.Resisting, p.Share()*ro+(1-p.Share())*ri, 2e-3*ri)
				near(t, "driving", d.Driving, p.Share()*do+(1-p.Share())*di, 2e-3*di)
				if tt.name != "beside it" && !(ro/do < 0.98*ri/di) {
					t.Errorf("the hole changes FS from %g to %g only", ri/di, ro/do)
				}
			})
		}
	}
}

// TestThinSoil checks that a soil of which only a share is there has that share of strength, whatever its law, under the weight that is left.
func TestThinSoil(t *testing.T) {
	s := lem.Soil{
		UnitWeight: 20, SaturatedUnitWeight: 21, Cohesion: 4, PowerLaw: &lem.PowerLaw{A: 0.9, B: 0.8},
		Undrained: &lem.UndrainedStrength{Strength: 30, Gradient: 2, Ratio: 0.3, Minimum: 5, Points: []lem.StrengthPoint{{X: 1, Y: 2, Strength: 40}}},
	}
	const share = 0.4
	h := thin(s, share)
	near(t, "weight", h.UnitWeight, 8, 1e-12)
	near(t, "saturated", h.SaturatedUnitWeight, 8.4, 1e-12)
	near(t, "cohesion", h.Cohesion, 1.6, 1e-12)
	for _, stress := range []float64{20, 150} {
		near(t, "power law", h.PowerLaw.Strength(share*stress), share*s.PowerLaw.Strength(stress), 1e-9)
	}
	near(t, "cu", h.Undrained.Strength, 12, 1e-12)
	near(t, "gradient", h.Undrained.Gradient, 0.8, 1e-12)
	near(t, "points", h.Undrained.Points[0].Strength, 16, 1e-12)
	near(t, "ratio", h.Undrained.Ratio, 0.12, 1e-12)
	near(t, "points of the soil itself", s.Undrained.Points[0].Strength, 40, 0)
}

// storyJob returns an invented cutting in summer, 9 m deep in clay.
func storyJob() *Job {
	j := cutting()
	const phi = 23 * math.Pi / 180
	j.Section.Ground = lem.Profile{{X: 0, Y: 109.6}, {X: 30, Y: 109}, {X: 52.5, Y: 100}, {X: 75, Y: 99.8}}
	j.Section.Soils[clay] = lem.Soil{Name: "weathered clay", UnitWeight: 19, Cohesion: 3, Friction: phi}
	j.Section.Soils[stiffClay] = lem.Soil{Name: "stiff clay", UnitWeight: 19.8, Cohesion: 4, Friction: phi}
	j.Section.Soils = append(j.Section.Soils, lem.Soil{Name: "mudstone", UnitWeight: 20.5, Cohesion: 20, Friction: 28 * math.Pi / 180})
	j.Clay = append(j.Clay, false)
	j.Section.Strata = []lem.Stratum{
		{Soil: clay, Top: j.Section.Ground},
		{Soil: stiffClay, Top: lem.Profile{{X: 0, Y: 106.1}, {X: 30, Y: 105.5}, {X: 52.5, Y: 97.5}, {X: 75, Y: 97.3}}},
		{Soil: lightFill + 1, Top: lem.Profile{{X: 0, Y: 96}, {X: 75, Y: 95.5}}},
	}
	j.Section.Loads = []lem.Surcharge{{FromX: 20, ToX: 29, Pressure: 5}}
	j.Waters = []WaterLine{{Name: "summer", Line: lem.Profile{{X: 0, Y: 105.6}, {X: 22, Y: 105}, {X: 30, Y: 104.2}, {X: 40, Y: 102}, {X: 52.5, Y: 99.2}, {X: 75, Y: 98.6}}}}
	j.Situations = []Situation{{Name: "summer", Water: 0, RequiredFS: 1.1}}
	return j
}

// TestOpenKeyStory digs the toe of an invented cutting in summer: 3 m wide, 1 m below the toe, with a nearly vertical back. The hole takes
// the passive ground away and is far from safe in plane strain; in short panels far apart it is nearly as safe as the slope. The values themselves
// are compared with those of an analysis that shares no code in cmd/internal/cli, TestOpenKeyByAStranger.
func TestOpenKeyStory(t *testing.T) {
	j := storyJob()
	p := apply(t, j, request("buttress", fillOf(rockfill), 2, 3, 1.5, 1, 3, 1.5, 0.05, 3, 15))
	least := map[string]float64{}
	for _, c := range Checks(j, p) {
		var m lem.Model
		if err := m.Compile(c.Section, &c.Situation); err != nil {
			t.Fatal(err)
		}
		found, err := m.Search(context.Background(), lem.SearchOptions{MinDepth: 1, Seed: 1})
		if err != nil || len(found.Basins) == 0 {
			t.Fatalf("%s: %v", c.Label(), err)
		}
		least[c.Label()] = found.Basins[0].Result.F
	}
	start := Checks(j, Start(j))[0]
	var m lem.Model
	if err := m.Compile(start.Section, &start.Situation); err != nil {
		t.Fatal(err)
	}
	found, err := m.Search(context.Background(), lem.SearchOptions{MinDepth: 1, Seed: 1})
	if err != nil {
		t.Fatal(err)
	}
	before := found.Basins[0].Result.F
	hole, panels := least["key open, plane strain"], least["key open, in panels"]
	if !(panels > hole+0.1 && panels < before && panels > 1.1) {
		t.Errorf("FS %g before, %g in panels, %g in plane strain", before, panels, hole)
	}
	if got := HoleText(0.9412); got != "in plane strain the open hole has FS 0.941: it does not stand without support" {
		t.Error(got)
	}
	if got := HoleText(1.2); got != "in plane strain the open hole has FS 1.200" {
		t.Error(got)
	}
}
