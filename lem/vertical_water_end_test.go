package lem

import (
	"math"
	"testing"
)

// TestWaterBeyondTheEnds checks that free water up to an end of the section goes on beyond it like the ground: a slip that straddles the
// end of level ground under level water has nothing that drives it (statics: still water on level ground loads both sides alike).
func TestWaterBeyondTheEnds(t *testing.T) {
	ground := Profile{{0, 20}, {20, 20}, {40, 10}, {70, 10}}
	s := &Section{
		Ground: ground, Soils: []Soil{{Name: "clay", UnitWeight: 19, Cohesion: 4, Friction: 0.44}},
		Strata: []Stratum{{Soil: 0, Top: ground}},
	}
	water := Water{Line: Profile{{0, 15}, {40, 12}, {70, 12}}, Free: []FreeWater{{Level: 12, FromX: 30, ToX: 70}}}
	for _, mirror := range []bool{false, true} {
		section, sit, sense := s, &Situation{Water: water}, 1.0
		if mirror {
			section, sit = mirrored(s, sit)
			sense = -1
		}
		var m Model
		if err := m.Compile(section, sit); err != nil {
			t.Fatal(err)
		}
		for radius := 2.0; radius < 8; radius++ {
			for x := 68.0; x <= 72; x += 0.25 {
				straddling := Slip{Kind: Circle, Centre: Point{X: sense * x, Y: 10 + radius/2}, Radius: radius}
				if r := m.FS(new(Workspace), &straddling, Setting{Method: Bishop}); r.Status == Converged && !(r.F > 1000) {
					t.Errorf("mirrored %t: F = %.3f on level ground under level water", mirror, r.F)
				}
			}
		}
		found, err := m.Search(t.Context(), SearchOptions{MinDepth: 0.5})
		if err != nil {
			t.Fatal(err)
		}
		b := found.Basins[0].Result
		if head, exit := b.ends(); math.Abs(head) > 45 || math.Abs(exit) > 45 {
			t.Errorf("mirrored %t: the lowest slip runs from x = %.2f to %.2f m", mirror, head, exit)
		}
	}
}
