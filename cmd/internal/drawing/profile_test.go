package drawing

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"standfast/lem"
)

func area(ring []lem.Point) float64 {
	var a float64
	for i, p := range ring {
		q := ring[(i+1)%len(ring)]
		a += p.Y*(q.X-p.X) + (q.Y-p.Y)*(q.X-p.X)/2
	}
	return a
}

func areas(rings [][]lem.Point) float64 {
	var a float64
	for _, r := range rings {
		a += area(r)
	}
	return a
}

// anyProfile draws a profile from 0 to 40 m that may have vertical steps.
func anyProfile(t *rapid.T, name string) lem.Profile {
	n := rapid.IntRange(2, 9).Draw(t, name+" points")
	p := lem.Profile{{X: 0, Y: rapid.Float64Range(0, 10).Draw(t, name)}}
	for range n {
		x := min(40, p[len(p)-1].X+float64(rapid.IntRange(0, 12).Draw(t, name+" run")))
		p = append(p, lem.Point{X: x, Y: rapid.Float64Range(0, 10).Draw(t, name)})
	}
	return append(p, lem.Point{X: 40, Y: rapid.Float64Range(0, 10).Draw(t, name)})
}

// TestAreasBetween checks the area of cut against a sum over thin strips. Steps stand at whole metres, where strips end.
func TestAreasBetween(t *testing.T) {
	const strips, width, tol = 20, 1.0 / 20, 0.05
	rapid.Check(t, func(t *rapid.T) {
		a, b := anyProfile(t, "a"), anyProfile(t, "b")
		got := areas(between(a, lower(a, b)))
		if up := areas(between(upper(a, b), b)); math.Abs(up-got) > 40*thinnest {
			t.Fatalf("area above the lower line is %g, below the upper line %g", got, up)
		}
		var want float64
		for k := range 40 * strips {
			x := (float64(k) + 0.5) * width
			want += max(0, a.At(x)-b.At(x)) * width
		}
		if math.Abs(got-want) > tol {
			t.Fatalf("area of a above b is %g, strips give %g", got, want)
		}
	})
}

func TestLimitsAtAStep(t *testing.T) {
	p := lem.Profile{{X: 0, Y: 1}, {X: 2, Y: 1}, {X: 2, Y: 5}, {X: 4, Y: 7}}
	for _, c := range []struct {
		name           string
		x, left, right float64
	}{
		{"before the profile", -1, 1, 1},
		{"at its start", 0, 1, 1},
		{"at the step", 2, 1, 5},
		{"between points", 3, 6, 6},
		{"at its end", 4, 7, 7},
		{"behind it", 9, 7, 7},
	} {
		t.Run(c.name, func(t *testing.T) {
			if l, r := limits(p, c.x); l != c.left || r != c.right {
				t.Errorf("limits at %g are %g and %g, want %g and %g", c.x, l, r, c.left, c.right)
			}
		})
	}
}

func TestClipRing(t *testing.T) {
	b := Box{0, 0, 10, 10}
	ring := clipRing([]xy{{-5, -5}, {5, 15}, {15, -5}}, b)
	for _, q := range ring {
		if !b.grown(1e-9).holds(q) {
			t.Errorf("%v lies outside the box", q)
		}
	}
	var got float64
	for i, p := range ring {
		q := ring[(i+1)%len(ring)]
		got += (q.X - p.X) * (p.Y + q.Y) / 2
	}
	// Closed form: the triangle's sides y = 5 + 2x and y = 25 - 2x leave 2.5 x 5 / 2 in each upper corner of the box.
	if want := 100 - 2*2.5*5/2; math.Abs(math.Abs(got)-want) > 1e-9 {
		t.Errorf("area %g, want %g", got, want)
	}
}
