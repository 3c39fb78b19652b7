package lem

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

const hutchinson = "Hutchinson (1977), Bull. IAEG 16, 131-155: tan(alpha) = (1 - B sec^2(alpha)) tan(phi)/F, recalled from memory"

// TestNeutralAngle checks the closed form at phi_m = 22 degrees, and that it solves Hutchinson's equation.
func TestNeutralAngle(t *testing.T) {
	for _, c := range []struct{ b, want float64 }{{0, 22}, {0.25, 16.4}, {0.5, 11}, {0.75, 5.6}, {1, 0}} {
		if got := NeutralAngle(22*degree, c.b) / degree; math.Abs(got-c.want) > 0.05 {
			t.Errorf("B = %v: %.3f degrees, want %v (closed form; worked out by hand)", c.b, got, c.want)
		}
	}
	rapid.Check(t, func(t *rapid.T) {
		phi, b := rapid.Float64Range(0, 1.2).Draw(t, "phi"), rapid.Float64Range(0, 1).Draw(t, "b")
		a := NeutralAngle(phi, b)
		cos := math.Cos(a)
		if left := math.Tan(a) - (1-b/(cos*cos))*math.Tan(phi); math.Abs(left) > 1e-9 {
			t.Errorf("alpha = %v leaves %v (%s)", a, left, hutchinson)
		}
	})
}

// neutralOf returns the neutral points of one line.
func neutralOf(v Influence, undrained, differences bool) []NeutralPoint {
	var out []NeutralPoint
	for _, n := range v.Neutral {
		if n.Undrained == undrained && n.Differences == differences {
			out = append(out, n)
		}
	}
	return out
}

// TestInfluencePublished finds the neutral points of Fredlund and Krahn's case 1, where the arc dips at the angle that Hutchinson's formula asks for
// with the F that they publish; the weight of a slice there is some 10 000 lb, so that 500 lb is small.
func TestInfluencePublished(t *testing.T) {
	s, slip := fredlundKrahn(0)
	m := compiled(t, s, &Situation{})
	for _, c := range []struct {
		method    Method
		published float64
	}{{Ordinary, 1.928}, {Bishop, 2.080}, {Spencer, 2.073}} {
		alpha := math.Atan(math.Tan(20*degree) / c.published)
		drained := slip.Centre.X - slip.Radius*math.Sin(alpha) // 105.2 for Ordinary, 106.1 for Bishop.
		v, err := m.Influence(&slip, Setting{Method: c.method, Slices: 80}, 500)
		if err != nil {
			t.Fatal(err)
		}
		for _, line := range []struct {
			undrained, differences bool
			want, tol              float64
		}{{false, false, drained, 0.15}, {true, false, slip.Centre.X, 0.15}, {false, true, drained, 1.2}, {true, true, slip.Centre.X, 2.5}} {
			got := neutralOf(v, line.undrained, line.differences)
			if len(got) != 1 || math.Abs(got[0].X-line.want) > line.tol {
				t.Errorf("%v, undrained %v, by differences %v: %+v, want x = %.2f within %v (%s; F of %s1)", c.method, line.undrained, line.differences, got, line.want, line.tol, hutchinson, fredlund)
			}
		}
	}
}

// TestInfluenceOfVanishingLoad compares the formula with differences of a tiny load: Bishop's and Janbu's are exact, for Ordinary and the methods that
// close moments and forces the sign must be that of the formula away from the neutral point.
func TestInfluenceOfVanishingLoad(t *testing.T) {
	for _, c := range methodCases() {
		m := compiled(t, c.s, c.sit)
		for _, o := range settings(c.slip.Kind) {
			const load = 1e-2
			v, err := m.Influence(&c.slip, o, load)
			if err != nil {
				t.Fatalf("%s, %v: %v", c.name, o.Method, err)
			}
			exact := o.Method == Bishop || o.Method == JanbuPlain && c.slip.Kind == Polyline
			if c.s.Soils[2].PowerLaw != nil { // The envelope bends under the load.
				exact = false
			}
			var greatest float64
			for _, p := range v.Points {
				greatest = max(greatest, math.Abs(p.Drained.Formula), math.Abs(p.Undrained.Formula))
			}
			for _, p := range v.Points {
				for _, ch := range []Change{p.Drained, p.Undrained} {
					central := (ch.Placed - ch.Removed) / 2
					if exact && math.Abs(central-ch.Formula) > 2e-3*greatest {
						t.Errorf("%s, %v at x = %.2f: formula %.4g, difference %.4g", c.name, o.Method, p.X, ch.Formula, central)
					}
					if !(central*ch.Formula > 0) && math.Abs(ch.Formula) > 0.35*greatest {
						t.Errorf("%s, %v at x = %.2f: formula %.4g, difference %.4g of the other sign", c.name, o.Method, p.X, ch.Formula, central)
					}
				}
			}
		}
	}
}

// TestInfluenceMirrored: the line of the mirrored slope is the mirror image.
func TestInfluenceMirrored(t *testing.T) {
	s, sit := cutting()
	back, water := mirrored(s, sit)
	left := mappedSlip(cuttingCircle, func(p Point) Point { return Point{-p.X, p.Y} }, 1, true)
	o := Setting{Method: Bishop}
	a, err := compiled(t, s, sit).Influence(&cuttingCircle, o, 10)
	if err != nil {
		t.Fatal(err)
	}
	b, err := compiled(t, back, water).Influence(&left, o, 10)
	if err != nil {
		t.Fatal(err)
	}
	n := len(a.Points)
	if n != len(b.Points) || len(a.Neutral) != len(b.Neutral) || len(a.Neutral) < 4 {
		t.Fatalf("%d and %d points, %d and %d neutral points", n, len(b.Points), len(a.Neutral), len(b.Neutral))
	}
	for i, p := range a.Points {
		q := b.Points[n-1-i]
		if math.Abs(p.X+q.X) > 1e-9 || math.Abs(p.Drained.Placed-q.Drained.Placed) > 1e-9 || math.Abs(p.Undrained.Formula-q.Undrained.Formula) > 1e-12 {
			t.Errorf("%+v is mirrored as %+v", p, q)
		}
	}
}
