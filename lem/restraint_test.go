package lem

import (
	"math"
	"testing"
)

// wedge is a block of one soil above a plane that falls from (-4, 10) to (10, 0) under a face at 45 degrees.
func wedge() (*Section, Slip) {
	ground := Profile{{-30, 10}, {0, 10}, {10, 0}, {40, 0}}
	s := &Section{Ground: ground, Soils: []Soil{{UnitWeight: 20, Cohesion: 5, Friction: 25 * degree}}, Strata: []Stratum{{0, ground}}}
	return s, Slip{Kind: Polyline, Nodes: []Point{{-4, 10}, {10, 0}}}
}

// TestRestrainedWedge compares with the equilibrium of a rigid block on a plane by hand: W = 20*4*10/2 = 400 kN/m, held by P:
// F = [c l + (W cos + P sin) tan phi]/(W sin - P cos).
func TestRestrainedWedge(t *testing.T) {
	const w, c = 400.0, 5.0
	length := math.Hypot(14, 10)
	sin, cos, tan := 10/length, 14/length, math.Tan(25*degree)
	for _, p := range []float64{0, 50, 150} {
		want := (c*length + (w*cos+p*sin)*tan) / (w*sin - p*cos)
		s, slip := wedge()
		s.Restraints = []Restraint{{X: 2, Top: 10, Bottom: 0, Force: p}}
		m := compiled(t, s, &Situation{})
		for _, method := range []Method{Ordinary, JanbuPlain} {
			r := evaluate(t, m, slip, Setting{Method: method, Slices: 40})
			if r.Status != Converged || !within(r.F, want, 1e-5) {
				t.Errorf("P = %g, %v: %+v, want F = %.6f", p, method, r, want)
			}
		}
	}
}

// TestRestrainedCircle compares with moments about the centre by hand: the force P at level y takes P (yc - y)/R off what drives.
func TestRestrainedCircle(t *testing.T) {
	for _, leftward := range []bool{false, true} {
		s := bank()
		for i := range s.Soils {
			s.Soils[i].Friction = 0
		}
		slip := bankSlips()[0]
		x := 10.0
		y := slip.Centre.Y - math.Sqrt(slip.Radius*slip.Radius-(x-slip.Centre.X)*(x-slip.Centre.X))
		if leftward {
			s, slip, x = mirroredSection(s), Slip{Centre: Point{-slip.Centre.X, slip.Centre.Y}, Radius: slip.Radius}, -x
		}
		o := Setting{Method: Bishop, Slices: 200}
		d, err := compiled(t, s, &Situation{}).Detail(&slip, o)
		if err != nil {
			t.Fatal(err)
		}
		for _, p := range []float64{30, 100} {
			s.Restraints = []Restraint{{X: x, Top: y + 1, Bottom: y - 1, Force: p}}
			want := d.Resisting / (d.Driving - p*(slip.Centre.Y-y)/slip.Radius)
			if r := evaluate(t, compiled(t, s, &Situation{}), slip, o); !within(r.F, want, 1e-4) {
				t.Errorf("P = %g: F = %.6f, want %.6f", p, r.F, want)
			}
		}
	}
}

// mirroredSection reflects a section of ground, soils and strata about x = 0.
func mirroredSection(s *Section) *Section {
	m := *s
	m.Ground = s.Ground.Mirror()
	m.Strata = nil
	for _, st := range s.Strata {
		m.Strata = append(m.Strata, Stratum{st.Soil, st.Top.Mirror()})
	}
	return &m
}

// TestRestraintOutOfReach checks that a row that the slip passes beside, above or below does nothing.
func TestRestraintOutOfReach(t *testing.T) {
	for _, r := range []Restraint{{X: -25, Top: 10, Bottom: -20, Force: 500}, {X: 10, Top: 30, Bottom: 20, Force: 500}, {X: 10, Top: -10, Bottom: -20, Force: 500}} {
		a, b := bank(), bank()
		b.Restraints = []Restraint{r}
		sameF(t, a, &Situation{}, b, &Situation{}, 1e-12)
	}
}

// TestHeldAltogether checks that a slip that nothing drives any more is no slip.
func TestHeldAltogether(t *testing.T) {
	s, slip := wedge()
	s.Restraints = []Restraint{{X: 2, Top: 10, Bottom: 0, Force: 1000}}
	var ws Workspace
	if r := compiled(t, s, &Situation{}).FS(&ws, &slip, Setting{Method: JanbuPlain}); r.Status != Missed {
		t.Errorf("%+v", r)
	}
	for _, bad := range []Restraint{{X: 2, Top: 0, Bottom: 1}, {X: 2, Top: 1, Force: -1}, {X: math.NaN(), Top: 1}} {
		s.Restraints = []Restraint{bad}
		if err := new(Model).Compile(s, &Situation{}); err == nil {
			t.Errorf("%+v compiles", bad)
		}
	}
}
