package lem

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"
)

// twinBefore is the effective vertical stress before works at a point, by sampling.
func twinBefore(s *Section, water Profile, x, y float64) float64 {
	const samples = 20000
	before := &Section{Ground: s.GroundBefore(), Soils: s.Soils, Strata: s.Strata}
	top := twinLevel(before.Ground, x)
	if y >= top {
		return 0
	}
	sigma := twinWeight(before, &Water{Line: water}, x, y, samples)
	if len(water) > 0 {
		sigma -= GammaW * max(0, twinLevel(water, x)-y)
	}
	return sigma
}

// TestRatioStrengthAgreesWithTwin compares cu at the base of every slice with ratio times stress by sampling, whatever has been placed or cut.
func TestRatioStrengthAgreesWithTwin(t *testing.T) {
	slices := 0
	rapid.Check(t, func(t *rapid.T) {
		s, sit := drawSection(t)
		if rapid.Bool().Draw(t, "cut") { // Works: the ground lowered on top.
			s.Ground = append(Profile{}, s.Ground...)
			s.Ground[0].Y -= 2
			s.Ground[1].Y -= 2
		}
		water := Profile{{-40, between(t, -2, 14, "before left")}, {between(t, 0, 20, "before x"), between(t, -4, 10, "before")}, {60, between(t, -4, 4, "before right")}}
		for i := range s.Soils {
			s.Soils[i].Undrained = &UndrainedStrength{Ratio: between(t, 0.15, 0.4, "ratio"), Minimum: between(t, 0, 15, "minimum"), WaterBefore: water}
		}
		sit.Undrained = []bool{true, true, true, true}
		slip := drawCircle(t, s)
		var m Model
		if err := m.Compile(s, sit); err != nil {
			t.Fatal(err)
		}
		var ws Workspace
		m.FS(&ws, &slip, Setting{Method: Ordinary})
		for i := range ws.n {
			sl := &ws.slice[i]
			if sl.b < 0.01 {
				continue
			}
			slices++
			u := s.Soils[twinSoil(s, sl.x, sl.y)].Undrained
			want := max(u.Minimum, u.Ratio*twinBefore(s, water, sl.x, sl.y))
			delta := sl.b / (slip.Radius * sl.cos)
			if got := sl.cl * sl.cos / sl.b; math.Abs(got-want) > want*delta*delta/10+0.005 {
				t.Fatalf("slice at x = %.3f, base %.3f: cu = %.4f kPa, twin %.4f", sl.x, sl.y, got, want)
			}
		}
	})
	if slices < 500 {
		t.Errorf("only %d slices compared", slices)
	}
}

// TestRatioStrengthStays: neither fill, nor a surcharge, nor water after works, changes cu in the ground; cu of fill is the minimum.
func TestRatioStrengthStays(t *testing.T) {
	g := Profile{{-20, 5}, {20, 5}}
	soil := Soil{UnitWeight: 18, SaturatedUnitWeight: 20, Undrained: &UndrainedStrength{Ratio: 0.3, Minimum: 4, WaterBefore: Profile{{-20, 3}, {20, 3}}}}
	before := &Section{Ground: g, Soils: []Soil{soil}, Strata: []Stratum{{0, g}}}
	filled := &Section{
		Ground: Profile{{-20, 5}, {-10, 9}, {10, 9}, {20, 5}}, Soils: []Soil{soil}, Strata: []Stratum{{0, g}},
		Placed: []Body{{0, []Point{{-20, 5}, {-10, 9}, {10, 9}, {20, 5}}}}, Loads: []Surcharge{{FromX: -5, ToX: 5, Pressure: 50}},
	}
	cut := &Section{Ground: Profile{{-20, 5}, {-10, 1}, {10, 1}, {20, 5}}, Soils: []Soil{soil}, Strata: []Stratum{{0, g}}}
	wet := &Situation{Undrained: []bool{true}, Water: Water{Line: Profile{{-20, 5}, {20, 5}}}}
	cu := func(s *Section, sit *Situation, y float64) float64 {
		m := compiled(t, s, sit)
		sl := slice{x: 1, y: y, b: 1, cos: 1}
		col := &m.cols[m.columnAt(1)]
		m.fill(&sl, col, &m.layers[m.layerAt(col, col.first, 1, y)], 1)
		return sl.cl
	}
	// At level 0: 2 m of 18 and 3 m of 20 less 3 m of water, by hand.
	want := 0.3 * (2*18 + 3*20 - 3*GammaW)
	for name, s := range map[string]*Section{"as it is": before, "filled": filled, "cut": cut} {
		for _, sit := range []*Situation{{Undrained: []bool{true}}, wet} {
			if got := cu(s, sit, 0); !within(got, want, 1e-9) {
				t.Errorf("%s: cu = %.4f kPa, want %.4f", name, got, want)
			}
		}
	}
	if got := cu(filled, wet, 7); got != 4 {
		t.Errorf("in the fill cu = %v kPa, want the minimum", got)
	}
	if got := cu(before, wet, 4.9); got != 4 {
		t.Errorf("near the ground cu = %v kPa, want the minimum", got)
	}
}

// TestStraightPowerLaw: with B = 1 the envelope is a friction angle of atan(A) without cohesion.
func TestStraightPowerLaw(t *testing.T) {
	a, b := bank(), bank()
	for i := range a.Soils {
		a.Soils[i].Cohesion = 0
		b.Soils[i].PowerLaw = &PowerLaw{A: math.Tan(a.Soils[i].Friction), B: 1}
	}
	sit := &Situation{Kh: 0.05, Water: Water{Line: Profile{{-30, 5}, {20, 0}, {50, 0}}}}
	sameF(t, a, sit, b, sit, 1e-9)
}

// TestPowerLawPlane checks a block on a plane, where the normal stress is known: F = A pa (sigma'/pa)^B/tau, sigma' = gamma z cos^2(beta).
func TestPowerLawPlane(t *testing.T) {
	const source = "closed form: infinite slope with tau = A pa (sigma'/pa)^B"
	const a, b, gamma, z, beta = 0.9, 0.72, 19.0, 3.0, 25 * degree
	const length = 20000.0
	drop := length * math.Tan(beta)
	ground := Profile{{0, drop}, {length, 0}}
	s := uniform(ground, Soil{UnitWeight: gamma, PowerLaw: &PowerLaw{A: a, B: b}})
	slip := Slip{Kind: Polyline, Nodes: []Point{{5000 - 1, ground.At(5000 - 1)}, {5000, ground.At(5000) - z}, {15000, ground.At(15000) - z}, {15000 + z, ground.At(15000 + z)}}}
	sin, cos := math.Sincos(beta)
	want := a * AtmosphericPressure * math.Pow(gamma*z*cos*cos/AtmosphericPressure, b) / (gamma * z * sin * cos)
	for _, method := range []Method{Ordinary, JanbuPlain} {
		if r := evaluate(t, compiled(t, s, &Situation{}), slip, Setting{Method: method}); !within(r.F, want, 0.001) {
			t.Errorf("%v: F = %.4f, want %.4f (%s)", method, r.F, want, source)
		}
	}
}

// TestPowerLawIsInStep: at the answer the shear strength of every slice is that of its envelope at its own normal stress, in every method.
func TestPowerLawIsInStep(t *testing.T) {
	s := bank()
	s.Soils[0].PowerLaw = &PowerLaw{A: 0.85, B: 0.8}
	s.Soils[1].PowerLaw = &PowerLaw{A: 0.7, B: 0.75}
	sit := &Situation{Water: Water{Line: Profile{{-30, 6}, {0, 5}, {20, 0}, {50, 0}}}}
	m := compiled(t, s, sit)
	for _, slip := range bankSlips() {
		for _, method := range methodsFor(slip.Kind) {
			d, err := m.Detail(&slip, Setting{Method: method})
			if err != nil {
				t.Fatalf("%v: %v", method, err)
			}
			if !within(d.Resisting, d.F*d.Driving, 1e-5) {
				t.Errorf("%v: resisting %.4f, F times driving %.4f", method, d.Resisting, d.F*d.Driving)
			}
			for _, row := range d.Slices {
				stress := row.Normal / row.Length
				got := row.Cohesion + stress*row.TanFriction
				want := s.Soils[row.Soil].PowerLaw.Strength(stress)
				if math.Abs(got-want) > 1e-3*math.Abs(want)+1e-6 {
					t.Errorf("%v at x = %.2f: %.4f kPa at %.3f kPa, envelope %.4f", method, row.X, got, stress, want)
				}
			}
		}
	}
}

// TestPowerLawStrength checks the envelope by hand, its chord near the origin, and that it lies on or below its tangents.
func TestPowerLawStrength(t *testing.T) {
	p := PowerLaw{A: 0.8, B: 0.75}
	for _, tt := range []struct{ stress, want float64 }{
		{AtmosphericPressure, 0.8 * AtmosphericPressure},
		{16 * AtmosphericPressure, 0.8 * 8 * AtmosphericPressure}, // 16^0.75 = 8.
		{0, 0},
		{LeastEnvelopeStress / 2, p.Strength(LeastEnvelopeStress) / 2},
	} {
		if got := p.Strength(tt.stress); !within(got, tt.want, 1e-9) {
			t.Errorf("strength at %g kPa: %g kPa, want %g", tt.stress, got, tt.want)
		}
	}
	for _, at := range []float64{1, 5, 50, 500} {
		c, tan := p.envelope().tangent(at)
		for _, stress := range []float64{0.5, 1, 3, 20, 90, 1000} {
			if p.Strength(stress) > c+stress*tan+1e-9 {
				t.Errorf("envelope above its tangent at %g kPa, stress %g kPa", at, stress)
			}
		}
	}
}

// TestBadFeatures: what the engine cannot make sense of is refused by name.
func TestBadFeatures(t *testing.T) {
	line := Profile{{-30, 5}, {50, 0}}
	for _, tt := range []struct {
		name string
		want error
		edit func(s *Section, sit *Situation)
	}{
		{"soil with two lines", ErrSoilTwice, func(_ *Section, sit *Situation) { sit.Water.BySoil = []SoilWater{{0, line}, {0, line}} }},
		{"line of no soil", ErrNoSuchSoil, func(_ *Section, sit *Situation) { sit.Water.BySoil = []SoilWater{{2, line}} }},
		{"empty line", ErrEmptySection, func(_ *Section, sit *Situation) { sit.Water.BySoil = []SoilWater{{1, nil}} }},
		{"line backwards", ErrNotLeftToRight, func(_ *Section, sit *Situation) {
			sit.Water.BySoil = []SoilWater{{1, Profile{{5, 0}, {0, 0}}}}
		}},
		{"pressure not a number", ErrNotFinite, func(_ *Section, sit *Situation) {
			sit.Water.Points = []PressurePoint{{0, 0, math.NaN()}}
		}},
		{"power law without a", ErrBadStrength, func(s *Section, _ *Situation) { s.Soils[0].PowerLaw = &PowerLaw{B: 0.8} }},
		{"power law convex", ErrBadStrength, func(s *Section, _ *Situation) { s.Soils[0].PowerLaw = &PowerLaw{A: 1, B: 1.2} }},
		{"negative ratio", ErrBadStrength, func(s *Section, _ *Situation) { s.Soils[0].Undrained = &UndrainedStrength{Ratio: -0.2} }},
		{"water before works backwards", ErrNotLeftToRight, func(s *Section, _ *Situation) {
			s.Soils[0].Undrained = &UndrainedStrength{Ratio: 0.2, WaterBefore: Profile{{5, 0}, {0, 0}}}
		}},
		{"load backwards", ErrBadLoad, func(s *Section, _ *Situation) { s.Loads = []Surcharge{{FromX: 3, ToX: 1}} }},
		{"load without end", ErrNotFinite, func(s *Section, _ *Situation) { s.Loads = []Surcharge{{FromX: 3, ToX: math.Inf(1)}} }},
		{"line load not a number", ErrNotFinite, func(s *Section, _ *Situation) { s.LineLoads = []LineLoad{{X: math.NaN()}} }},
		{"no weight left", ErrBadEarthquake, func(_ *Section, sit *Situation) { sit.Kv = -1 }},
		{"crack without depth", ErrBadCrack, func(s *Section, _ *Situation) { s.Crack = &TensionCrack{} }},
		{"crack overfull", ErrBadCrack, func(s *Section, _ *Situation) { s.Crack = &TensionCrack{Depth: 2, WaterShare: 1.1} }},
		{"crack line backwards", ErrNotLeftToRight, func(s *Section, _ *Situation) { s.Crack = &TensionCrack{Line: Profile{{5, 0}, {0, 0}}} }},
	} {
		t.Run(tt.name, func(t *testing.T) {
			s, sit := bank(), &Situation{}
			tt.edit(s, sit)
			var m Model
			if err := m.Compile(s, sit); !errors.Is(err, tt.want) {
				t.Errorf("error %v, want %v", err, tt.want)
			}
		})
	}
}
