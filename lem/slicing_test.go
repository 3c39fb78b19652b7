package lem

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// TestPlainFillIsFill: where a layer is marked plain, the short form of fill gives every slice the numbers that the whole one gives.
func TestPlainFillIsFill(t *testing.T) {
	plain := 0
	rapid.Check(t, func(t *rapid.T) {
		s, sit := drawSection(t)
		var m Model
		if err := m.Compile(s, sit); err != nil {
			t.Fatal(err)
		}
		for i := range m.cols {
			c := &m.cols[i]
			for k := c.first; k < c.last; k++ {
				l := &m.layers[k]
				if !l.plain {
					continue
				}
				plain++
				x, sin := (c.x0+c.x1)/2, rapid.Float64Range(-0.9, 0.9).Draw(t, "sin")
				got := slice{x: x, y: c.ground.at(x) - rapid.Float64Range(0, 20).Draw(t, "depth"), b: 1, sin: sin, cos: math.Sqrt(1 - sin*sin)}
				want := got
				m.fillPlain(&got, c, l, 1/got.cos)
				if wet := m.fillAny(&want, c, l, 1/want.cos); wet || !alike(&got, &want) {
					t.Fatalf("layer %d at %g: %+v, want %+v", k, x, got, want)
				}
			}
		}
	})
	if plain == 0 {
		t.Error("no layer is plain")
	}
}

// alike reports whether two slices are the same to rounding.
func alike(a, b *slice) bool {
	for _, p := range [][2]float64{
		{a.soilW, b.soilW}, {a.q, b.q}, {a.h, b.h}, {a.k, b.k}, {a.ground, b.ground}, {a.tan, b.tan}, {a.cl, b.cl}, {a.ul, b.ul}, {a.frees, b.frees},
	} {
		if math.Abs(p[0]-p[1]) > 1e-12*(1+math.Abs(p[1])) {
			return false
		}
	}
	return a.variable == b.variable
}

// TestAnglesOfArcs checks angles between bearings and the series of sine and cosine against the functions they spare.
func TestAnglesOfArcs(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a := rapid.Float64Range(-1.57, 1.57).Draw(t, "from")
		b := rapid.Float64Range(a, 1.57).Draw(t, "to")
		got := bearing{math.Sin(a), math.Cos(a)}.angleTo(bearing{math.Sin(b), math.Cos(b)})
		if math.Abs(got-(b-a)) > 1e-15 {
			t.Errorf("from %g to %g: %g, want %g", a, b, got, b-a)
		}
		sin, cos := smallSincos(b - a)
		if ws, wc := math.Sincos(b - a); math.Abs(sin-ws) > 3e-16*ws || math.Abs(cos-wc) > 3e-16 {
			t.Errorf("sine and cosine of %g: %v, %v, want %v, %v", b-a, sin, cos, ws, wc)
		}
	})
	p := bearingOf(3+5*math.Sin(0.3), 3, 1.0/5)
	if !within(p.sin, math.Sin(0.3), 1e-15) || !within(p.cos, math.Cos(0.3), 1e-15) {
		t.Errorf("bearing %v, want that of 0.3", p)
	}
}

// TestBracketStaysAtTheRoot: an iteration that has hit its root does not leave it for the middle of its bounds, which once cost F up to 1e-6.
func TestBracketStaysAtTheRoot(t *testing.T) {
	root := bracket{0, math.Inf(1)}
	if f := root.next(2, 0, 1, 1); f != 2 {
		t.Errorf("from the root at 2 to %v", f)
	}
	// One slice: a/(f + c) = d is solved in one step from either side.
	for _, f := range []float64{0.5, 4} {
		const a, c, d = 6.0, 1.0, 2.0
		root := bracket{0, math.Inf(1)}
		q := 1 / (f + c)
		if next := root.next(f, a*q-d, a*q*q, a*q*q*q); !within(next, a/d-c, 1e-14) {
			t.Errorf("from %g to %v, want %g", f, next, a/d-c)
		}
	}
	// Outside the bounds and without a derivative: doubled, or halved.
	root = bracket{1, math.Inf(1)}
	if f := root.next(3, 1, 0, 0); f != 6 {
		t.Errorf("without a derivative from 3 to %v, want 6", f)
	}
	if f := root.next(6, -1, 0, 0); f != 4.5 {
		t.Errorf("without a derivative from 6 to %v, want 4.5", f)
	}
}
