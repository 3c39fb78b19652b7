package lem

import (
	"math"
	"testing"
)

// TestSharpBendsAreNotSuspected: on lines that bend sharply at a firm base the equations of forces and moments may have no answer; the Ordinary
// method puts their F far below the lowest. Janbu's F, which is below that of the rigorous methods on such lines, is well above it, so that
// nothing is left in doubt, whichever way the slope faces. The section, with a curved envelope in the lower stratum, is invented.
func TestSharpBendsAreNotSuspected(t *testing.T) {
	ground := Profile{{0, 44.5}, {24, 43.9}, {49.08, 32.5}, {75, 32}}
	soils := []Soil{
		{Name: "upper", UnitWeight: 18.2, Cohesion: 3.75, Friction: 28.5 * math.Pi / 180},
		{Name: "lower", UnitWeight: 18.3, PowerLaw: &PowerLaw{A: 0.54, B: 0.8}},
	}
	lower, base := Profile{{0, 36.49}, {75, 30.79}}, Profile{{0, 23.29}, {75, 23.29}}
	line := Profile{{0, 41.66}, {24, 41.09}, {36.54, 36.33}, {49.08, 31}, {75, 30.9}}
	for facing, turn := range map[string]func(Profile) Profile{"right": func(p Profile) Profile { return p }, "left": Profile.Mirror} {
		t.Run(facing, func(t *testing.T) {
			section := Section{Ground: turn(ground), Soils: soils, Strata: []Stratum{{0, turn(ground)}, {1, turn(lower)}}, FirmBase: turn(base)}
			var m Model
			if err := m.Compile(&section, &Situation{Water: Water{Line: turn(line)}, Kh: 0.05}); err != nil {
				t.Fatal(err)
			}
			for seed := range uint64(3) {
				minima, err := m.Search(t.Context(), SearchOptions{MinDepth: 1.5, Polylines: true, Seed: seed, Below: 1.02})
				if err != nil {
					t.Fatal(err)
				}
				if f := minima.Basins[0].Result.F; !(f > 0.9 && f < 1.1) {
					t.Errorf("seed %d: lowest F %.4f", seed, f)
				}
				for _, u := range minima.Unresolved {
					t.Errorf("seed %d: screen %.3f, no answer on %v", seed, u.Result.Screen, u.Slip.Nodes)
				}
			}
		})
	}
}
