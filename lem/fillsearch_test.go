package lem

import (
	"context"
	"fmt"
	"math"
	"math/rand/v2"
	"testing"
)

// filled is a slope with a berm at its toe, invented: top level, top width and outer batter.
func filled(height, width, batter float64) (s *Section, inner, outer, toe float64) {
	before := Profile{{-40, 9}, {0, 9}, {22, 0}, {80, 0}}
	inner = profileX(before, height)
	outer = inner + width
	toe = outer + batter*height
	return &Section{
		Ground: Profile{{-40, 9}, {0, 9}, {inner, height}, {outer, height}, {toe, 0}, {80, 0}},
		Soils: []Soil{
			{UnitWeight: 19, Cohesion: 4, Friction: 24 * degree},
			{UnitWeight: 17, Cohesion: 2, Friction: 20 * degree},
			{UnitWeight: 20, Friction: 36 * degree},
		},
		Strata: []Stratum{{0, before}, {1, Profile{{-40, -1}, {80, -1}}}, {2, Profile{{-40, -5}, {80, -5}}}},
		Placed: []Body{{2, []Point{{inner, height}, {outer, height}, {toe, 0}, {22, 0}}}},
	}, inner, outer, toe
}

// aboutFill names the way in which a slip to the right passes placed fill.
func aboutFill(m *Model, slip *Slip, r *Result, inner, outer, toe float64) string {
	head, exit := r.From.X, r.To.X
	switch {
	case head >= inner && exit <= toe:
		return "on the fill alone"
	case head >= inner:
		return ""
	case exit <= inner:
		return "over the fill"
	case exit < outer:
		return "out of the top of the fill"
	case exit < toe:
		return "through the fill"
	}
	for x := inner; x < toe; x += (toe - inner) / 50 {
		if dx := x - slip.Centre.X; slip.Centre.Y-math.Sqrt(slip.Radius*slip.Radius-dx*dx) < -1 {
			return "beneath and beyond the fill"
		}
	}
	return ""
}

// waysAboutFill are the answers of aboutFill that count.
var waysAboutFill = []string{
	"over the fill", "out of the top of the fill", "through the fill", "beneath and beyond the fill", "on the fill alone",
}

// bruteAboutFill returns the lowest F of each way: arcs on a grid of heads, exits and sags, then random steps from the best of each way. It shares
// nothing with the search but the evaluation of one slip.
func bruteAboutFill(m *Model, o Setting, inner, outer, toe float64) map[string]float64 {
	type arc [3]float64 // Head, exit, sag over length.
	best, at := map[string]float64{}, map[string]arc{}
	var ws Workspace
	try := func(a arc) (string, float64) {
		p, q := Point{a[0], m.groundAt(a[0])}, Point{a[1], m.groundAt(a[1])}
		chord := math.Hypot(q.X-p.X, q.Y-p.Y)
		if !(a[2] > 0.001 && a[2] < 0.6 && q.X > p.X && p.X > m.left && q.X < m.right) {
			return "", 0
		}
		radius := chord * (1 + 4*a[2]*a[2]) / (8 * a[2])
		up := radius - a[2]*chord
		slip := Slip{Centre: Point{(p.X+q.X)/2 + up*(p.Y-q.Y)/chord, (p.Y+q.Y)/2 + up*(q.X-p.X)/chord}, Radius: radius}
		r := m.FS(&ws, &slip, o)
		if r.Status != Converged {
			return "", 0
		}
		return aboutFill(m, &slip, &r, inner, outer, toe), r.F
	}
	keep := func(a arc) {
		if way, f := try(a); way != "" && (best[way] == 0 || f < best[way]) {
			best[way], at[way] = f, a
		}
	}
	var heads, exits []float64
	grid := func(xs []float64, from, to float64, n int) []float64 {
		for i := range n {
			xs = append(xs, from+(to-from)*(float64(i)+0.5)/float64(n))
		}
		return xs
	}
	heads = grid(grid(grid(heads, m.left, inner, 34), inner, outer, 8), outer, toe, 6)
	exits = grid(grid(grid(grid(exits, 0, inner, 10), inner, outer, 8), outer, toe, 10), toe, m.right, 20)
	for _, x0 := range heads {
		for _, x1 := range exits {
			for i := range 12 {
				keep(arc{x0, x1, 0.01 * math.Pow(50, float64(i)/11)})
			}
		}
	}
	rng := rand.New(rand.NewPCG(3, 4))
	for _, way := range waysAboutFill {
		size := 0.1
		for range 1200 {
			a, before := at[way], best[way]
			length := a[1] - a[0]
			sd := size * math.Pow(10, -2*rng.Float64())
			a[0] += sd * length * rng.NormFloat64()
			a[1] += sd * length * rng.NormFloat64()
			a[2] *= math.Exp(3 * sd * rng.NormFloat64())
			if keep(a); best[way] < before {
				size = min(size*1.2, 0.2)
			} else {
				size = max(size*0.99, 1e-3)
			}
		}
	}
	return best
}

// TestSlipsAboutFill: slips over, through, beneath and beyond placed fill and on its own face are all among the seeds, close to the lowest of their
// kind; a search that is asked for one kind finds the lowest of it; and one that is asked for nothing finds those that are minima of their own (the
// lowest over and through the fill lie at the edge of their kind here). The lowest of each kind are those of a brute force.
func TestSlipsAboutFill(t *testing.T) {
	const (
		seedTol  = 0.06 // A seed is the best of a few dozen arcs between two stretches of ground.
		foundTol = 1e-3
	)
	minimaOfTheirOwn := map[string]bool{"out of the top of the fill": true, "beneath and beyond the fill": true, "on the fill alone": true}
	for _, c := range [][3]float64{{3, 6, 2}, {1.5, 3, 1.5}, {5, 2, 2.5}, {2, 14, 2}} {
		t.Run(fmt.Sprint(c), func(t *testing.T) {
			sec, inner, outer, toe := filled(c[0], c[1], c[2])
			m := compiled(t, sec, &Situation{})
			o := SearchOptions{Window: Window{Direction: RightwardOnly}, MinDepth: 0.5, Methods: []Method{Bishop}}
			want := bruteAboutFill(m, Setting{Method: Bishop, MinDepth: o.MinDepth, Window: o.Window}, inner, outer, toe)

			s := newSearcher(m, o)
			s.sweep(context.Background())
			seeds, basins := map[string]float64{}, map[string]float64{}
			lowest := func(of map[string]float64, slip *Slip, r *Result) {
				if way := aboutFill(m, slip, r, inner, outer, toe); of[way] == 0 || r.F < of[way] {
					of[way] = r.F
				}
			}
			for _, k := range s.cells {
				lowest(seeds, &k.slip, &k.r)
			}
			found, err := m.Search(context.Background(), o)
			if err != nil {
				t.Fatal(err)
			}
			for _, b := range found.Basins {
				lowest(basins, &b.Slip, &b.Result)
			}
			short, top, face, beyond := Range{m.left, inner}, Range{inner, outer}, Range{outer, toe}, Range{toe, m.right}
			windows := [...][2]Range{{short, short}, {short, top}, {short, face}, {short, beyond}, {{inner, toe}, {inner, toe}}}
			for i, way := range waysAboutFill {
				check := func(what string, f, tol float64) {
					if !(f > 0 && f <= want[way]*(1+tol)) {
						t.Errorf("%s, %s: F = %.4f, brute force %.4f", way, what, f, want[way])
					}
				}
				check("seed", seeds[way], seedTol)
				if minimaOfTheirOwn[way] {
					check("found", basins[way], foundTol)
				}
				one := o
				one.Window.Head, one.Window.Toe = windows[i][0], windows[i][1]
				check("asked for", lowestBy(t, m, Bishop, one).Result.F, foundTol)
			}
		})
	}
}
