package remedies_test

import (
	"fmt"
	"math"

	"standfast/lem"
	"standfast/optimize"
	"standfast/remedies"
)

// A berm of fixed size against an invented 6 m slope, with a fence that it must not pass.
func ExampleApply() {
	ground := lem.Profile{{X: 0, Y: 16}, {X: 20, Y: 16}, {X: 32, Y: 10}, {X: 60, Y: 10}}
	job := &remedies.Job{
		Section: lem.Section{
			Ground: ground,
			Soils:  []lem.Soil{{Name: "silt", UnitWeight: 18}, {Name: "gravel fill", UnitWeight: 20}},
			Strata: []lem.Stratum{{Soil: 0, Top: ground}},
		},
		Crest: lem.Point{X: 20, Y: 16}, Toe: lem.Point{X: 32, Y: 10},
		Clay:   []bool{false, false},
		Limits: remedies.Limits{Right: &remedies.Fence{Name: "garden fence", X: 36}},
	}
	berm := remedies.Request{
		Kind: "berm",
		Axes: []optimize.Axis{
			{Name: "height", Min: 2, Max: 2},
			{Name: "top_width", Min: 5, Max: 5},
			{Name: "batter", Min: 2, Max: 2},
			{}, // no drainage blanket
		},
		Soils: map[string]int{"fill": 1},
	}
	p, err := remedies.Apply(job, []remedies.Request{berm}, [][]float64{{2, 5, 2, math.NaN()}})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("fill %.2f m3/m\n", p.Quantities.TotalFill())
	for _, v := range p.Violations {
		fmt.Println(v.Detail)
	}
	for _, d := range p.Dimensions {
		fmt.Println(d.Label)
	}
	// Output:
	// fill 10.00 m3/m
	// toe of berm at x = 37.00 m, limit garden fence at x = 36.00 m
	// top width 5.00 m
	// height 2.00 m
	// 1V:2.0H
}
