package lem

import (
	"math"
	"testing"
)

// TestJanbuTwin solves Janbu's equation by repeated substitution on the printed slices.
func TestJanbuTwin(t *testing.T) {
	for _, c := range methodCases() {
		d := detailed(t, compiled(t, c.s, c.sit), c.slip, Setting{Method: JanbuPlain})
		f := 1.0
		for range 200 {
			var resisting, driving float64
			for _, s := range d.Slices {
				n := math.Cos(s.Inclination) * math.Cos(s.Inclination) * (1 + math.Tan(s.Inclination)*s.TanFriction/f)
				resisting += (s.Cohesion*s.Length*math.Cos(s.Inclination) + (s.Vertical-s.Pore*s.Length*math.Cos(s.Inclination))*s.TanFriction) / n
				driving += s.Vertical*math.Tan(s.Inclination) + s.Push + s.Quake
			}
			f = resisting / driving
		}
		if !within(d.Result.F, f, 1e-6) {
			t.Errorf("%s: F = %.7f, by substitution %.7f", c.name, d.Result.F, f)
		}
	}
}

// TestJanbuCorrection checks f0 against the formula with d/L = tan(theta/4)/2 of an arc of angle theta, and of a triangle.
func TestJanbuCorrection(t *testing.T) {
	ground := face(10, 30*degree, 30)
	half := 0.7
	centre, radius := arcThrough(Point{-22, 10}, Point{4, 0}, half)
	arc := Slip{Centre: centre, Radius: radius}
	sag := math.Tan(half/2) / 2
	// A triangle over the chord from (-22, 10) to (4, 0), 6 m deep at its apex.
	chord := math.Hypot(26, 10)
	triangle := Slip{Kind: Polyline, Nodes: []Point{{-22, 10}, {-10 - 60/chord, 10 - 10*12.0/26 - 156/chord}, {4, 0}}}
	tests := []struct {
		name  string
		soil  Soil
		slip  Slip
		share float64
		b1    float64
	}{
		{"arc general", Soil{UnitWeight: 19, Cohesion: 8, Friction: 25 * degree}, arc, sag, 0.5},
		{"arc no friction", Soil{UnitWeight: 19, Cohesion: 30}, arc, sag, 0.69},
		{"arc no cohesion", Soil{UnitWeight: 19, Friction: 35 * degree}, arc, sag, 0.31},
		{"triangle general", Soil{UnitWeight: 19, Cohesion: 8, Friction: 25 * degree}, triangle, 6 / chord, 0.5},
	}
	for _, tt := range tests {
		s, sit := uniform(ground, tt.soil), &Situation{}
		back, water := mirrored(s, sit)
		turned := mappedSlip(tt.slip, func(p Point) Point { return Point{-p.X, p.Y} }, 1, true)
		want := 1 + tt.b1*(tt.share-1.4*tt.share*tt.share)
		for _, c := range []methodCase{{"", s, sit, tt.slip}, {" leftward", back, water, turned}} {
			m := compiled(t, c.s, c.sit)
			plain, corrected := evaluate(t, m, c.slip, Setting{Method: JanbuPlain}), evaluate(t, m, c.slip, Setting{Method: Janbu})
			if got := corrected.F / plain.F; !within(got, want, 1e-9) {
				t.Errorf("%s%s: f0 = %.9f, want %.9f (Janbu 1973, formula as usually fitted)", tt.name, c.name, got, want)
			}
		}
	}
}

// TestPrandtlMechanism checks the statics of slices on a surface whose load is known: under a strip load of (2 + pi) cu on weightless ground without
// friction, moments about the edge of the load are in equilibrium at F = 1 on wedge, fan and wedge, with no vertical forces between slices
// (Prandtl 1921; the fan's normals pass through the edge).
func TestPrandtlMechanism(t *testing.T) {
	const width, cu, n = 10.0, 20.0, 400
	s := uniform(Profile{{-40, 0}, {40, 0}}, Soil{Cohesion: cu})
	s.Loads = []Surcharge{{FromX: 0, ToX: width, Pressure: (2 + math.Pi) * cu}}
	slip := Slip{Kind: Polyline, Nodes: []Point{{-width, 0}}}
	for i := range n + 1 {
		angle := (225 + 90*float64(i)/n) * degree
		slip.Nodes = append(slip.Nodes, Point{width / math.Sqrt2 * math.Cos(angle), width / math.Sqrt2 * math.Sin(angle)})
	}
	slip.Nodes = append(slip.Nodes, Point{width, 0})
	m := compiled(t, s, &Situation{})
	d := detailed(t, m, slip, Setting{Method: JanbuPlain, Slices: 400})
	var driving, resisting float64 // Moments about (0, 0) with shear S = c l/F: N = (Q - S sin)/cos.
	for _, row := range d.Slices {
		cos, sin := math.Cos(row.Inclination), math.Sin(row.Inclination)
		// Movement is to the left: the base's normal is (-sin, cos) and its shear on the body (cos, sin).
		pull := row.Cohesion * row.Length
		turn := func(fx, fy float64) float64 { return row.X*fy - row.Base*fx }
		driving += turn(0, -row.Vertical) + turn(-sin, cos)*row.Vertical/cos
		resisting += turn(cos, sin)*pull - turn(-sin, cos)*pull*sin/cos
	}
	if f := -resisting / driving; !within(f, 1, 0.002) {
		t.Errorf("F = %.4f, want 1 (Prandtl 1921, closed form)", f)
	}
}
