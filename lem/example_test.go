package lem_test

import (
	"context"
	"fmt"
	"math"

	"standfast/lem"
)

// A slope in one soil with a water line: F of one circle by two methods, then the critical circles.
func Example() {
	ground := lem.Profile{{X: -30, Y: 10}, {X: 0, Y: 10}, {X: 25, Y: 0}, {X: 55, Y: 0}}
	section := lem.Section{
		Ground: ground,
		Soils:  []lem.Soil{{Name: "clay", UnitWeight: 19, Cohesion: 6, Friction: 25 * math.Pi / 180}},
		Strata: []lem.Stratum{{Soil: 0, Top: ground}},
	}
	situation := lem.Situation{Name: "normal water", Water: lem.Water{
		Line: lem.Profile{{X: -30, Y: 7}, {X: 0, Y: 6}, {X: 25, Y: 0}, {X: 55, Y: 0}},
	}}
	var model lem.Model
	if err := model.Compile(&section, &situation); err != nil {
		fmt.Println(err)
		return
	}
	var ws lem.Workspace
	slip := lem.Slip{Centre: lem.Point{X: 16, Y: 24}, Radius: 25}
	for _, method := range []lem.Method{lem.Bishop, lem.Spencer} {
		r := model.FS(&ws, &slip, lem.Setting{Method: method})
		fmt.Printf("%v: %.2f, %v\n", method, down(r.F), r.Status)
	}
	found, err := model.Search(context.Background(), lem.SearchOptions{MinDepth: 1})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("lowest: %.2f\n", down(found.Basins[0].Result.F))
	// Output:
	// bishop: 1.38, converged
	// spencer: 1.38, converged
	// lowest: 1.30
}

// down rounds a factor of safety down to two decimals, the safe direction.
func down(f float64) float64 { return math.Floor(f*100) / 100 }
