package lem

import (
	"fmt"
	"math"
	"testing"
)

// TestWaterAgainstVerticalFace compares an undrained circle behind a vertical face that stands in water with the moments by hand.
func TestWaterAgainstVerticalFace(t *testing.T) {
	const cu, gamma, height = 20.0, 20.0, 5.0
	for _, depth := range []float64{0, 1, 2, 3, 4, 4.5, 5} {
		for _, mirror := range []bool{false, true} {
			t.Run(fmt.Sprint(depth, mirror), func(t *testing.T) {
				s := uniform(Profile{{-40, height}, {0, height}, {0, 0}, {60, 0}}, Soil{UnitWeight: gamma, Cohesion: cu})
				sit := &Situation{Water: Water{Free: []FreeWater{{depth, 0, 200}}}}
				slip := Slip{Centre: Point{2, 8}, Radius: 9}
				want := cutByHand(slip, cu, gamma, height, depth)
				if mirror {
					s, sit = mirrored(s, sit)
					slip.Centre.X = -2
				}
				r := evaluate(t, compiled(t, s, sit), slip, Setting{Method: Bishop, Slices: 400})
				if !within(r.F, want, 1e-4) {
					t.Errorf("F = %.5f, want %.5f (closed form: cu R^2 theta over moments, water push at a third of its depth)", r.F, want)
				}
			})
		}
	}
}

// cutByHand returns F of an undrained circle through a vertical cut at x = 0 with water in front of it.
func cutByHand(s Slip, cu, gamma, height, depth float64) float64 {
	c, r := s.Centre, s.Radius
	x0 := c.X - math.Sqrt(r*r-(c.Y-height)*(c.Y-height))
	x1 := c.X + math.Sqrt(r*r-c.Y*c.Y)
	theta := math.Asin((x1-c.X)/r) - math.Asin((x0-c.X)/r)
	const n = 200000
	var moment float64
	for i := range n {
		x := x0 + (x1-x0)*(float64(i)+0.5)/n
		ground, water := height, 0.0
		if x > 0 {
			ground, water = 0, depth
		}
		y := c.Y - math.Sqrt(r*r-(x-c.X)*(x-c.X))
		moment += (gamma*(ground-y) + GammaW*water) * (c.X - x) * (x1 - x0) / n
	}
	moment -= GammaW * depth * depth / 2 * (c.Y - depth/3)
	return cu * r * r * theta / moment
}
