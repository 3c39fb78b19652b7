package optimize_test

import (
	"context"
	"fmt"
	"math"

	"standfast/optimize"
)

// disc is a circle of radius r round the origin that is to cover the ellipse (cos t, 2 sin t). A cut is an angle t.
type disc struct{ r float64 }

func (d disc) Margin(t *float64) float64 { return d.r - math.Hypot(math.Cos(*t), 2*math.Sin(*t)) }

func (d disc) Search(_ context.Context, e optimize.Effort) ([]optimize.Found[float64], error) {
	points := 64
	if e.Audit {
		points = 1000
	}
	lowest := optimize.Found[float64]{Margin: math.Inf(1)}
	for i := range points {
		t := 2 * math.Pi * float64(i) / float64(points)
		if m := d.Margin(&t); m < lowest.Margin {
			lowest = optimize.Found[float64]{Cut: t, Margin: m}
		}
	}
	return []optimize.Found[float64]{lowest}, nil
}

func (d disc) Close() {}

func ExampleMinimize() {
	r, err := optimize.Minimize(context.Background(), optimize.Problem[float64]{
		Axes: []optimize.Axis{{Name: "r", Min: 0.5, Max: 4, Step: 0.25}},
		Cost: func(x []float64) (cost, tie float64, ok bool) { return math.Pi * x[0] * x[0], 0, true },
		Open: func(x []float64) optimize.Design[float64] { return disc{r: x[0]} },
	}, optimize.Settings[float64]{})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%v: r = %.2f, cost %.2f\n", r.Status, r.X[0], r.Cost)
	fmt.Printf("%d cheaper designs, each with a witness; %d unresolved\n", len(r.Lattice), r.Unresolved)
	// Output:
	// optimal: r = 2.00, cost 12.57
	// 6 cheaper designs, each with a witness; 0 unresolved
}
