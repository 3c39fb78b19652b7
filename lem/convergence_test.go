package lem

import (
	"fmt"
	"math"
	"testing"
)

// convergenceCases are sections on which the error by the number of slices is studied; docs/theory.md prints the table.
func convergenceCases() []struct {
	name string
	m    *Model
	slip Slip
} {
	type item = struct {
		name string
		m    *Model
		slip Slip
	}
	var out []item
	add := func(name string, s *Section, sit *Situation, slip Slip) {
		m := new(Model)
		if err := m.Compile(s, sit); err != nil {
			panic(err)
		}
		out = append(out, item{name, m, slip})
	}
	s, slip := fredlundKrahn(0)
	add("Fredlund and Krahn 1", s, &Situation{}, slip)
	s, slip = fredlundKrahn(0.25)
	add("Fredlund and Krahn 3", s, &Situation{}, slip)
	add("Giam and Donald 1(c)", giamLayered(), &Situation{}, Slip{Centre: Point{34.3, 42.3}, Radius: 17.9})
	add("Giam and Donald 1(d)", giamLayered(), &Situation{Kh: 0.15}, Slip{Centre: Point{35.5, 52}, Radius: 27.8})
	layered, sit := benchSection(3)
	add("three strata, water line", layered, sit, benchSlip())
	drained := *sit
	drained.Water.Drains = &Drawdown{Invert: Profile{{2, 4}, {20, -1}}, Ratio: []float64{0.3, 0.7}, Fade: 2}
	add("the same with drains", layered, &drained, benchSlip())
	pooled := &Situation{Water: Water{Line: Profile{{-40, 9}, {0, 8}, {17, 3.5}, {64, 3.5}}, Free: []FreeWater{{3.5, 10, 64}}}}
	add("the same with free water", layered, pooled, benchSlip())
	return out
}

// TestErrorFallsWithSquareOfSlices: the answer converges to the second order, across strata, the water line and drains too, and the default
// number of slices is at most 0.1 % off.
func TestErrorFallsWithSquareOfSlices(t *testing.T) {
	for _, c := range convergenceCases() {
		for _, method := range []Method{Ordinary, Bishop, Spencer} {
			t.Run(fmt.Sprint(c.name, "/", method), func(t *testing.T) {
				f := func(n int) float64 { return evaluate(t, c.m, c.slip, Setting{Method: method, Slices: n}).F }
				limit := f(8000)
				errorAt := func(n int) float64 { return math.Abs(f(n)/limit - 1) }
				if e := errorAt(DefaultSlices); e > 0.001 {
					t.Errorf("error %.2e with %d slices, want 1e-3 at most", e, DefaultSlices)
				}
				// Where the edges of columns fall shifts the error a little: the greatest of some neighbouring numbers is compared.
				greatest := func(ns ...int) float64 {
					var e float64
					for _, n := range ns {
						e = max(e, errorAt(n))
					}
					return e
				}
				coarse, fine := greatest(18, 20, 22, 25), greatest(180, 200, 220, 250)
				if order := math.Log10(coarse / fine); order < 1.7 {
					t.Errorf("error %.2e, with ten times the slices %.2e: order %.2f, want 2", coarse, fine, order)
				}
			})
		}
	}
}
