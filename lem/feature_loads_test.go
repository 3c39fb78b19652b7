package lem

import (
	"context"
	"math"
	"testing"
)

// bank is an invented slope of two soils that falls to the right.
func bank() *Section {
	ground := Profile{{-30, 10}, {0, 10}, {20, 0}, {50, 0}}
	return &Section{Ground: ground, Soils: []Soil{
		{Name: "upper", UnitWeight: 18, SaturatedUnitWeight: 19, Cohesion: 6, Friction: 26 * degree},
		{Name: "lower", UnitWeight: 20, Cohesion: 9, Friction: 22 * degree},
	}, Strata: []Stratum{{0, ground}, {1, Profile{{-30, 4}, {50, 1}}}}}
}

// bankSlips are a circle and a polyline through both soils of the bank.
func bankSlips() []Slip {
	return []Slip{
		{Centre: Point{12, 18}, Radius: 18.6},
		{Kind: Polyline, Nodes: []Point{{-5, 10}, {2, 3}, {12, -1}, {24, 0}}},
	}
}

// methodsFor lists the methods that can evaluate a kind of slip.
func methodsFor(kind SlipKind) []Method {
	if kind == Circle {
		return []Method{Ordinary, Bishop, Spencer, MorgensternPrice, JanbuPlain, Janbu}
	}
	return []Method{Ordinary, Spencer, MorgensternPrice, JanbuPlain, Janbu}
}

// sameF compares F of two sections on the slips of the bank with every method.
func sameF(t *testing.T, a *Section, sitA *Situation, b *Section, sitB *Situation, rel float64) {
	t.Helper()
	ma, mb := compiled(t, a, sitA), compiled(t, b, sitB)
	for _, slip := range bankSlips() {
		for _, method := range methodsFor(slip.Kind) {
			o := Setting{Method: method, Slices: 60}
			ra, rb := evaluate(t, ma, slip, o), evaluate(t, mb, slip, o)
			if !within(ra.F, rb.F, rel) {
				t.Errorf("kind %d, %v: F = %.6f and %.6f", slip.Kind, method, ra.F, rb.F)
			}
		}
	}
}

// TestTriangularLoadIsSumOfStrips replaces a pressure that falls from 40 to 10 kPa by many uniform strips.
func TestTriangularLoadIsSumOfStrips(t *testing.T) {
	const from, to, n = -4.0, 6.0, 200
	a, b := bank(), bank()
	a.Loads = []Surcharge{{FromX: from, ToX: to, Pressure: 40, Rise: -30}}
	for i := range n {
		x := from + (to-from)*float64(i)/n
		b.Loads = append(b.Loads, Surcharge{FromX: x, ToX: x + (to-from)/n, Pressure: 40 - 30*(float64(i)+0.5)/n})
	}
	for _, kh := range []float64{0, 0.1} {
		sit := &Situation{Kh: kh}
		sameF(t, a, sit, b, sit, 2e-4)
	}
	without := bank()
	m, bare := compiled(t, a, &Situation{}), compiled(t, without, &Situation{})
	for _, slip := range bankSlips() {
		o := Setting{Method: Spencer}
		if f, was := evaluate(t, m, slip, o).F, evaluate(t, bare, slip, o).F; !(f < was*0.99) {
			t.Errorf("F = %.4f under the load, %.4f without", f, was)
		}
	}
}

// TestLineLoadIsNarrowStrip compares a line load with strips of the same force about it, 1 m to 1 cm wide: the difference vanishes with the width.
func TestLineLoadIsNarrowStrip(t *testing.T) {
	const x, v, h = -1.5, 60.0, 15.0
	a := bank()
	a.LineLoads = []LineLoad{{X: x, Vertical: v, Horizontal: h}}
	ma := compiled(t, a, &Situation{})
	for _, slip := range bankSlips() {
		for _, method := range methodsFor(slip.Kind) {
			o := Setting{Method: method, Slices: 60}
			f := evaluate(t, ma, slip, o).F
			for _, width := range []float64{0.1, 0.01} {
				b := bank()
				b.Loads = []Surcharge{{FromX: x - width/2, ToX: x + width/2, Pressure: v / width, Shear: h / width}}
				if g := evaluate(t, compiled(t, b, &Situation{}), slip, o).F; !within(f, g, 0.005*width) {
					t.Errorf("%v: line load F = %.6f, strip of %g m %.6f", method, f, width, g)
				}
			}
		}
	}
}

// TestInclinedLoadByHand checks the moment of a horizontal load on an undrained circle: F = cu R^2 theta/(sum of moments), closed form.
func TestInclinedLoadByHand(t *testing.T) {
	const cu, shear, width = 30.0, 12.0, 4.0
	s := uniform(Profile{{-30, 10}, {0, 10}, {20, 0}, {50, 0}}, Soil{UnitWeight: 18, Cohesion: cu})
	slip := Slip{Centre: Point{11, 17}, Radius: 18}
	o := Setting{Method: Bishop, Slices: 240}
	bare := evaluate(t, compiled(t, s, &Situation{}), slip, o)
	s.Loads = []Surcharge{{FromX: -5, ToX: -5 + width, Shear: shear}}
	loaded := evaluate(t, compiled(t, s, &Situation{}), slip, o)
	c, r := slip.Centre, slip.Radius
	theta := math.Asin((bare.To.X-c.X)/r) - math.Asin((bare.From.X-c.X)/r)
	moment := cu*r*r*theta/bare.F + shear*width*(c.Y-10) // The load acts at the ground, level 10.
	if want := cu * r * r * theta / moment; !within(loaded.F, want, 1e-4) {
		t.Errorf("F = %.5f, want %.5f (closed form: moments about the centre)", loaded.F, want)
	}
	if !(loaded.F < bare.F) {
		t.Error("a load to the right on a slip that moves to the right did not lower F")
	}
}

// TestLoadsMirror reflects a section with every kind of load, a crack and kv: F is the same.
func TestLoadsMirror(t *testing.T) {
	var ws Workspace
	compared := 0
	for _, variable := range []bool{false, true} {
		s := bank()
		s.Loads = []Surcharge{{FromX: -3, ToX: 2, Pressure: 10, Rise: 25, Shear: 6, Variable: variable}}
		s.LineLoads = []LineLoad{{X: -4, Vertical: 30, Horizontal: -5}}
		s.Crack = &TensionCrack{Depth: 2, WaterShare: 0.7}
		sit := &Situation{Kh: 0.08, Kv: -0.04, Water: Water{Line: Profile{{-30, 7}, {20, 0}, {50, 0}}}}
		other, sitOther := mirrored(s, sit)
		sitOther.Kv = sit.Kv
		l := s.Loads[0]
		other.Loads[0].Pressure, other.Loads[0].Rise, other.Loads[0].Shear = l.Pressure+l.Rise, -l.Rise, -l.Shear
		other.LineLoads = []LineLoad{{X: 4, Vertical: 30, Horizontal: 5}}
		other.Crack = s.Crack
		m, om := compiled(t, s, sit), compiled(t, other, sitOther)
		for _, slip := range bankSlips() {
			for _, method := range methodsFor(slip.Kind) {
				o := Setting{Method: method}
				turned := mappedSlip(slip, func(p Point) Point { return Point{-p.X, p.Y} }, 1, true)
				a, b := m.FS(&ws, &slip, o), om.FS(&ws, &turned, o)
				if a.Status == Converged {
					compared++
				}
				if a.Status != b.Status || a.Status == Converged && !within(a.F, b.F, 1e-9) || !within(a.Crack, b.Crack, 1e-9) || a.Leftward == b.Leftward {
					t.Errorf("variable %v, %v: F = %.9f and %.9f, crack %v and %v", variable, method, a.F, b.F, a.Crack, b.Crack)
				}
			}
		}
	}
	if compared < 16 {
		t.Errorf("only %d answers were compared", compared)
	}
}

// TestVerticalEarthquakeScalesWeight: kv changes F as unit weights, surcharges and the unit weight of water would, all times 1 + kv, with kh
// divided by it.
func TestVerticalEarthquakeScalesWeight(t *testing.T) {
	for _, kv := range []float64{-0.1, 0.05, 0.2} {
		a, b := bank(), bank()
		a.Loads = []Surcharge{{FromX: -8, ToX: -1, Pressure: 12, Rise: 6}}
		b.Loads = []Surcharge{{FromX: -8, ToX: -1, Pressure: 12 * (1 + kv), Rise: 6 * (1 + kv)}}
		for i := range b.Soils {
			b.Soils[i].UnitWeight *= 1 + kv
			b.Soils[i].SaturatedUnitWeight *= 1 + kv
		}
		sameF(t, a, &Situation{Kh: 0.1, Kv: kv}, b, &Situation{Kh: 0.1 / (1 + kv)}, 1e-9)
		// A water line is not touched by kv: with it the identity holds too, as unit weights do not change pore pressures.
		w := Water{Line: Profile{{-30, 6}, {20, 0}, {50, 0}}}
		sameF(t, a, &Situation{Kv: kv, Water: w}, b, &Situation{Water: w}, 1e-9)
	}
}

// TestVariableInclinedLoad: a variable load that pushes the slip counts as a permanent one does, and one that holds it back does not count.
func TestVariableInclinedLoad(t *testing.T) {
	for _, slip := range bankSlips() {
		for _, method := range []Method{Ordinary, JanbuPlain, Spencer} {
			f := func(shear float64, variable bool) float64 {
				s := bank()
				s.Loads = []Surcharge{{FromX: -4, ToX: 2, Shear: shear, Variable: variable}}
				return evaluate(t, compiled(t, s, &Situation{}), slip, Setting{Method: method}).F
			}
			bare := f(0, false)
			if a, b := f(5, true), f(5, false); !within(a, b, 1e-9) || !(a < bare) {
				t.Errorf("%v: pushed by a variable load F = %.5f, permanent %.5f, without %.5f", method, a, b, bare)
			}
			if a, b := f(-5, true), f(-5, false); !within(a, bare, 1e-9) || !(b > bare) {
				t.Errorf("%v: held by a variable load F = %.5f, permanent %.5f, without %.5f", method, a, b, bare)
			}
		}
	}
}

// TestSearchStepsBehindLineLoads: F jumps where the head of a slip passes a line load, so that a slip that ends just behind it is a minimum of its
// own, even beside a lower one. The search finds both.
func TestSearchStepsBehindLineLoads(t *testing.T) {
	const x = 19.0
	g := Profile{{0, 30}, {20, 30}, {33, 23}, {55, 23}}
	s := uniform(g, Soil{UnitWeight: 19, Cohesion: 6, Friction: 24 * degree})
	s.Loads = []Surcharge{{FromX: 16, ToX: 18, Pressure: 40, Shear: 6}}
	s.LineLoads = []LineLoad{{X: x, Vertical: 25}}
	m := compiled(t, s, &Situation{})
	found, err := m.Search(context.Background(), SearchOptions{MinDepth: 1.5, Methods: []Method{Bishop}})
	if err != nil {
		t.Fatal(err)
	}
	var ws Workspace
	grid := func(from, to float64) float64 { // The lowest F of slips with the head in a range.
		least := math.Inf(1)
		for head := from; head < to; head += (to - from) / 16 {
			for exit := 25.0; exit < 40; exit += 0.5 {
				for half := 0.05; half < 1.5; half += 0.05 {
					c, r := arcThrough(Point{head, g.At(head)}, Point{exit, g.At(exit)}, half)
					slip := Slip{Centre: c, Radius: r}
					if f := m.FS(&ws, &slip, Setting{Method: Bishop, MinDepth: 1.5}); f.Status == Converged {
						least = min(least, f.F)
					}
				}
			}
		}
		return least
	}
	for _, heads := range []Range{{10, x}, {x - 0.5, x}} {
		least := math.Inf(1)
		for _, b := range found.Basins {
			if head, _ := b.Result.ends(); heads.From < head && head < heads.To {
				least = min(least, b.Result.F)
			}
		}
		if want := grid(heads.From+0.001, heads.To); least > want*1.003 {
			t.Errorf("heads from %g to %g: search F = %.4f, grid %.4f", heads.From, heads.To, least, want)
		}
	}
}
