package lem

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// TestCircleEndsOnVertex is a circle that ends exactly on a vertex of the ground: what rounding leaves of it in the next column is no slice.
func TestCircleEndsOnVertex(t *testing.T) {
	ground := Profile{{0, 9}, {20, 10}, {27, 7}, {31.5, 6}, {36.5, 3.5}, {44.5, 3}, {51.5, 1}, {57, 0}, {120, -1}}
	soil := Soil{UnitWeight: 19, Cohesion: 5, Friction: 23 * degree}
	s := &Section{
		Ground: ground, Soils: []Soil{soil, soil, soil, soil},
		Strata: []Stratum{{0, ground}, {1, Profile{{0, 0.5}, {25, 9}, {60, -3.5}, {120, -4.5}}}, {2, Profile{{0, -2}, {25, 4}, {60, 0.5}, {120, 0}}}},
		Placed: []Body{{3, []Point{{11.5, 7.5}, {12.5, 10.5}, {17.5, 8.5}, {13.5, 5.5}}}},
	}
	m := compiled(t, s, &Situation{})
	slip := Slip{Centre: Point{36.644389632116834, 16.35287243636516}, Radius: 26.110674261096825}
	beside := slip
	beside.Radius += 1e-6
	for _, method := range allMethods() {
		o := Setting{Method: method}
		if a, b := evaluate(t, m, slip, o).F, evaluate(t, m, beside, o).F; !within(a, b, 1e-5) {
			t.Errorf("%v: F = %.6f through the vertex, %.6f beside it", method, a, b)
		}
	}
}

// TestSlipsThroughVertices draws slips through vertices of the ground, of strata, and through the edges of drawn-out vertical steps. They get the
// answer of a slip beside them.
func TestSlipsThroughVertices(t *testing.T) {
	compared := 0
	rapid.Check(t, func(t *rapid.T) {
		s, sit := drawSection(t)
		var m Model
		if err := m.Compile(s, sit); err != nil {
			t.Fatal(err)
		}
		var xs []float64 // Edges of columns: everything that bends or steps has one.
		for i := range m.cols {
			if x := m.cols[i].x0; x > -25 && x < s.Ground.Right() {
				xs = append(xs, x)
			}
		}
		pick := rapid.SampledFrom(xs)
		x0, x1 := pick.Draw(t, "from"), pick.Draw(t, "to")
		if x1 < x0 {
			x0, x1 = x1, x0
		}
		if x1-x0 < 3 {
			return
		}
		half := between(t, 0.2, 1.2, "half angle")
		slipAt := func(x0, x1 float64) Slip {
			a, b := Point{x0, m.groundAt(x0)}, Point{x1, m.groundAt(x1)}
			c, r := arcThrough(a, b, half)
			if rapid.Bool().Draw(t, "polyline") {
				return Slip{Kind: Polyline, Nodes: inscribed(nil, c, r, a, b, 6, 0.01)}
			}
			return Slip{Centre: c, Radius: r}
		}
		method := rapid.SampledFrom(allMethods()).Draw(t, "method")
		o := Setting{Method: method}
		slip := slipAt(x0, x1)
		var ws Workspace
		r := m.FS(&ws, &slip, o)
		if r.Status == Converged && (math.IsNaN(r.F) || math.IsInf(r.F, 0)) {
			t.Fatalf("converged to %v", r.F)
		}
		if r.Status == NotConverged && method == Ordinary && r.To.X-r.From.X > 1 {
			t.Fatalf("the Ordinary method has no answer on %+v: %+v", slip, r)
		}
		nudged := slip
		if slip.Kind == Polyline {
			nudged.Nodes = append([]Point(nil), slip.Nodes...)
			for i := range nudged.Nodes {
				nudged.Nodes[i].Y -= 1e-5
			}
		} else {
			nudged.Radius += 1e-5
		}
		b := m.FS(&ws, &nudged, o)
		if r.Status != Converged || b.Status != Converged || r.F > 20 || math.Abs(r.From.X-b.From.X)+math.Abs(r.To.X-b.To.X) > 0.01 {
			return // The nudge joins or parts what the vertex divides.
		}
		compared++
		if !within(r.F, b.F, 0.01) {
			t.Fatalf("%v: F = %.6f, %.6f just below, on %+v", method, r.F, b.F, slip)
		}
	})
	if compared < 20 {
		t.Errorf("only %d slips compared", compared)
	}
}

// featured adds what the decoder can make of the features to a decoded section.
func (d *decoder) featured() (*Section, *Situation) {
	s, sit := d.section()
	n := len(s.Soils)
	if d.next(2) == 0 {
		sit.Water.BySoil = []SoilWater{{d.next(n), d.line(3)}}
	}
	sit.Water.InclinedLine = d.next(2) == 0
	for range d.next(4) {
		sit.Water.Points = append(sit.Water.Points, PressurePoint{d.number(-8, 2, 10), d.number(-4, 1, 12), d.number(-10, 10, 8)})
	}
	switch d.next(3) {
	case 0:
		s.Soils[d.next(n)].PowerLaw = &PowerLaw{A: d.number(0.2, 0.4, 4), B: d.number(0.25, 0.25, 4)}
	case 1:
		*s.Soils[d.next(n)].Undrained = UndrainedStrength{Ratio: d.number(0.1, 0.2, 3), Minimum: d.number(0, 5, 3), WaterBefore: d.line(2)}
	}
	for i := range s.Loads {
		s.Loads[i].Rise, s.Loads[i].Shear = d.number(-20, 10, 5), d.number(-10, 5, 5)
	}
	for range d.next(2) {
		s.LineLoads = append(s.LineLoads, LineLoad{X: d.number(-8, 1, 20), Vertical: d.number(-20, 20, 5), Horizontal: d.number(-10, 5, 5)})
	}
	switch d.next(3) {
	case 0:
		s.Crack = &TensionCrack{Depth: d.number(0.5, 0.5, 6), WaterShare: d.number(0, 0.5, 3)}
	case 1:
		s.Crack = &TensionCrack{Line: d.line(3), HasWaterLevel: true, WaterLevel: d.number(-2, 1, 8)}
	}
	sit.Kv = d.number(-0.4, 0.2, 5)
	return s, sit
}

// FuzzFeatures evaluates decoded slips on decoded sections with every feature: no panic, and no number without sense presented as an answer.
func FuzzFeatures(f *testing.F) {
	for _, seed := range []string{"", "a few bytes to start from, that reach into every switch of the decoder", "0123456789abcdefghijklmnopqrstuvwxyz0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZ"} {
		f.Add([]byte(seed))
	}
	var ws Workspace
	f.Fuzz(func(t *testing.T, data []byte) {
		d := &decoder{data: data}
		slip := Slip{Centre: Point{d.number(-8, 1, 20), d.number(0, 1, 16)}, Radius: d.number(1, 0.5, 30)}
		if d.next(2) == 0 {
			x := d.number(-10, 1, 8)
			slip = Slip{Kind: Polyline}
			for range 2 + d.next(5) {
				slip.Nodes = append(slip.Nodes, Point{x, d.number(-4, 0.5, 24)})
				x += d.number(0.5, 0.5, 6)
			}
		}
		s, sit := d.featured()
		var m Model
		if m.Compile(s, sit) != nil {
			return
		}
		for _, method := range allMethods() {
			r := m.FS(&ws, &slip, Setting{Method: method})
			if sense := r.F > 0 && !math.IsInf(r.F, 0); (r.Status == Converged) != sense {
				t.Fatalf("%v: %+v", method, r)
			}
			if r.Crack < 0 || math.IsNaN(r.Crack) || math.IsInf(r.Crack, 0) {
				t.Fatalf("%v: crack %v", method, r.Crack)
			}
			if r.Status == Converged || r.Status == Inadmissible {
				if _, err := m.Detail(&slip, Setting{Method: method}); err != nil && r.Status == Converged {
					t.Fatalf("%v: %+v: %v", method, r, err)
				}
			}
		}
	})
}

// TestFeaturesDoNotAllocate: FS allocates nothing with all features at once.
func TestFeaturesDoNotAllocate(t *testing.T) {
	s := bank()
	s.Soils[0].PowerLaw = &PowerLaw{A: 0.8, B: 0.8}
	s.Loads = []Surcharge{{FromX: -4, ToX: 3, Pressure: 10, Rise: 5, Shear: 2}, {FromX: -9, ToX: -4, Pressure: 10, Variable: true}}
	s.LineLoads = []LineLoad{{X: -2, Vertical: 20, Horizontal: 4}}
	s.Crack = &TensionCrack{Depth: 1.5, WaterShare: 1}
	sit := &Situation{Kh: 0.05, Kv: 0.03, Water: Water{InclinedLine: true, BySoil: []SoilWater{{0, Profile{{-30, 7}, {20, 0}}}}, Points: []PressurePoint{{0, 5, 10}, {0, 0, 40}, {20, -4, 30}}}}
	m := compiled(t, s, sit)
	for _, slip := range bankSlips() {
		for _, method := range methodsFor(slip.Kind) {
			var ws Workspace
			o := Setting{Method: method}
			m.FS(&ws, &slip, o)
			if n := testing.AllocsPerRun(20, func() { m.FS(&ws, &slip, o) }); n != 0 {
				t.Errorf("%v: %v allocations", method, n)
			}
		}
	}
}
