package casefile

import (
	"path/filepath"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/google/go-cmp/cmp/cmpopts"

	"standfast/lem"
	"standfast/remedies"
)

// readFeature reads one of the small cases that use a feature each.
func readFeature(t *testing.T, name string) *Case {
	t.Helper()
	c, err := Read(filepath.Join(root, "testdata/cases/features", name))
	if err != nil {
		t.Fatal(err)
	}
	return c
}

// TestFeaturesAreRead compares what the reader makes of the keys for water, strength, loads and cracks.
func TestFeaturesAreRead(t *testing.T) {
	water := readFeature(t, "water.yaml").Job
	main := water.Waters[0].Line
	wantWaters := []remedies.WaterLine{
		{Name: "main", Line: main},
		{Name: "seepage", Line: main, Inclined: true},
		{Name: "perched", BySoil: []remedies.SoilLine{{Soil: 0, Line: lem.Profile{{X: 0, Y: 58.5}, {X: 22, Y: 58}, {X: 40, Y: 51}, {X: 70, Y: 50.5}}}}},
		{Name: "artesian", Line: main, BySoil: []remedies.SoilLine{{Soil: 1, Line: lem.Profile{{X: 0, Y: 57.5}, {X: 70, Y: 51.2}}, Artesian: true}}},
	}
	if diff := cmp.Diff(wantWaters, water.Waters[:4]); diff != "" {
		t.Errorf("waters (-want +read):\n%s", diff)
	}
	if ps := water.Waters[4].Points; len(ps) != 14 || ps[1] != (lem.PressurePoint{X: 0, Y: 38, Pressure: 196.2}) || water.Waters[4].Line != nil {
		t.Errorf("points %v", ps)
	}
	if u := water.Section.Soils[1].Undrained; u.Ratio != 0.3 || u.Minimum != 25 || !cmp.Equal(u.WaterBefore, main) {
		t.Errorf("undrained strength %+v", u)
	}
	if kv := water.Situations[7].Kv; kv != 0.03 {
		t.Errorf("kv = %v", kv)
	}
	strength := readFeature(t, "strength.yaml").Job.Section.Soils
	if p := strength[0].PowerLaw; p == nil || *p != (lem.PowerLaw{A: 0.85, B: 0.8}) || strength[1].Undrained.WaterBefore != nil {
		t.Errorf("soils %+v", strength)
	}
	loads := readFeature(t, "loads.yaml").Job.Section
	wantLoads := []lem.Surcharge{
		{Name: "heap", FromX: 8, ToX: 12, Rise: 30},
		{Name: "abutment", FromX: 16.5, ToX: 19, Pressure: 30, Shear: 6},
		{Name: "lorries", FromX: 4, ToX: 8, Pressure: 10, Rise: 5, Shear: 1, Variable: true},
	}
	if diff := cmp.Diff(wantLoads, loads.Loads); diff != "" {
		t.Errorf("surcharges (-want +read):\n%s", diff)
	}
	wantLines := []lem.LineLoad{{Name: "wall", X: 15, Vertical: 12}, {Name: "pipe anchor", X: 12, Vertical: 5, Horizontal: -4}}
	if diff := cmp.Diff(wantLines, loads.LineLoads); diff != "" {
		t.Errorf("line loads (-want +read):\n%s", diff)
	}
	wantCrack := &lem.TensionCrack{Line: lem.Profile{{X: 0, Y: 37.5}, {X: 25, Y: 37.5}}, HasWaterLevel: true, WaterLevel: 39}
	if diff := cmp.Diff(wantCrack, readFeature(t, "crack.yaml").Job.Section.Crack); diff != "" {
		t.Errorf("crack (-want +read):\n%s", diff)
	}
}

// TestFeaturesRoundTrip writes each of the small cases, after a cut, and reads it back.
func TestFeaturesRoundTrip(t *testing.T) {
	for _, name := range []string{"water.yaml", "strength.yaml", "loads.yaml", "crack.yaml", "known.yaml", "side-forces.yaml"} {
		for _, edit := range []func(*lem.Section){func(*lem.Section) {}, byDepth} {
			c := readFeature(t, name)
			edit(&c.Job.Section)
			k, _ := remedies.Find("unload")
			q := remedies.DefaultRequest(&k)
			x := make([]float64, len(q.Axes))
			for i := range x {
				x[i] = q.Axes[i].At(q.Axes[i].Len() / 2)
			}
			p, err := remedies.Apply(c.Job, []remedies.Request{q}, [][]float64{x})
			if err != nil {
				t.Fatal(err)
			}
			o := option(c, name, p)
			again := reread(t, c, o)
			compareProposal(t, c, o, again)
			for i, s := range again.Job.Situations {
				before := &c.Job.Situations[i]
				if before.Kv != s.Kv {
					t.Errorf("%s: kv = %v, written %v", name, s.Kv, before.Kv)
				}
				want, got := p.Waters[i], remedies.Start(again.Job).Waters[i]
				if diff := cmp.Diff(want, got, exact, cmpopts.EquateEmpty()); diff != "" {
					t.Errorf("%s: water of %s (-written +read):\n%s", name, s.Name, diff)
				}
				if s.Water < 0 {
					continue
				}
				for j, own := range again.Job.Waters[s.Water].BySoil {
					if own.Artesian != c.Job.Waters[before.Water].BySoil[j].Artesian {
						t.Errorf("%s: which line is artesian got lost", name)
					}
				}
			}
		}
	}
}

// byDepth gives a section a crack by depth, with water to a level.
func byDepth(s *lem.Section) {
	s.Crack = &lem.TensionCrack{Depth: 1.75, HasWaterLevel: true, WaterLevel: 39.5}
}
