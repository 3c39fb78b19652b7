package lem

import (
	"math"
	"testing"
)

// TestDeepClayNeedsNoBends: in clay that acts undrained the circle is the worst shape. Its F is cu/(0.181 gamma H) where clay reaches far down
// (Taylor 1937; recalled from memory). Lines that bend sharply far down come out below it, on the safe side, since equilibrium alone does not know
// how they could move; without forces between slices that hold up what sinks they stay within a fifth, and two searches agree. With such forces
// F was half of Taylor's, and anything above that. The bank is invented.
func TestDeepClayNeedsNoBends(t *testing.T) {
	const cu, gamma, height, below, above, repeats = 24.0, 20.0, 8.0, 0.2, 0.03, 0.02
	ground := Profile{{0, 28}, {40, 28}, {56, 20}, {96, 20}}
	lowest, highest := math.Inf(1), 0.0
	for facing, turned := range map[string]Profile{"right": ground, "left": ground.Mirror()} {
		t.Run(facing, func(t *testing.T) {
			section := Section{
				Ground: turned,
				Soils:  []Soil{{Name: "clay", UnitWeight: gamma, Undrained: &UndrainedStrength{Strength: cu}}},
				Strata: []Stratum{{0, turned}},
			}
			var m Model
			if err := m.Compile(&section, &Situation{Undrained: []bool{true}}); err != nil {
				t.Fatal(err)
			}
			for seed := range uint64(2) {
				minima, err := m.Search(t.Context(), SearchOptions{MinDepth: 1, Polylines: true, Seed: seed})
				if err != nil {
					t.Fatal(err)
				}
				b := &minima.Basins[0]
				want := cu / (0.181 * gamma * height)
				lowest, highest = min(lowest, b.Result.F), max(highest, b.Result.F)
				if f := b.Result.F; !(f >= (1-below)*want && f <= (1+above)*want) {
					t.Errorf("seed %d: F %.4f by %s, lambda %.3f, on %v; Taylor %.4f", seed, f, b.Setting.Method, b.Result.Lambda, b.Slip.Nodes, want)
				}
			}
		})
	}
	if highest > (1+repeats)*lowest {
		t.Errorf("searches find F from %.4f to %.4f", lowest, highest)
	}
}
