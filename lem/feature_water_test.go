package lem

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// drawFeatureWater adds lines of single soils, the inclined-line factor and pressures at points to a random situation.
func drawFeatureWater(t *rapid.T, s *Section, sit *Situation) {
	sit.Undrained = nil
	w := &sit.Water
	for i := range s.Soils {
		if rapid.Bool().Draw(t, "own line") {
			w.BySoil = append(w.BySoil, SoilWater{i, Profile{{-40, between(t, -2, 14, "own left")}, {between(t, 0, 20, "own x"), between(t, -4, 10, "own")}, {60, between(t, -4, 4, "own right")}}})
		}
	}
	w.InclinedLine = rapid.Bool().Draw(t, "inclined")
	if rapid.IntRange(0, 3).Draw(t, "points") == 0 {
		for range rapid.IntRange(1, 6).Draw(t, "count") {
			w.Points = append(w.Points, PressurePoint{between(t, -10, 30, "point x"), between(t, -6, 10, "point y"), between(t, -20, 80, "pressure")})
		}
	}
}

// twinPore returns the pore pressure at a point by the rules as they are written down.
func twinPore(s *Section, w *Water, x, y, above float64) float64 {
	soil := twinSoil(s, x, y)
	switch {
	case s.Soils[soil].HasRu:
		return s.Soils[soil].Ru * above
	case len(w.Points) > 0:
		return max(0, twinPoints(w.Points, x, y))
	}
	head, line := twinHead(s, w, x, y), w.Line
	for _, own := range w.BySoil {
		if own.Soil == soil {
			line = own.Line
			head = twinLevel(line, x)
		}
	}
	factor := 1.0
	if w.InclinedLine && len(line) > 0 {
		const dx = 1e-5
		slope := (twinLevel(line, x+dx) - twinLevel(line, x-dx)) / (2 * dx)
		factor = 1 / (1 + slope*slope)
	}
	if d := twinFree(s, w, x); d > 0 && soil == twinSoil(s, x, twinLevel(s.Ground, x)-1e-6) {
		if level := twinLevel(s.Ground, x) + d; level >= head {
			head, factor = level, 1
		}
	}
	return GammaW * factor * max(0, head-y)
}

// twinPoints interpolates by brute force: on every x that has points, then between the nearest two.
func twinPoints(ps []PressurePoint, x, y float64) float64 {
	onVertical := func(at float64) float64 {
		above, below := PressurePoint{Y: math.Inf(1)}, PressurePoint{Y: math.Inf(-1)}
		for _, p := range ps {
			if p.X != at {
				continue
			}
			if p.Y >= y && p.Y < above.Y {
				above = p
			}
			if p.Y <= y && p.Y > below.Y {
				below = p
			}
		}
		switch {
		case math.IsInf(above.Y, 1):
			return below.Pressure
		case math.IsInf(below.Y, -1), above.Y == below.Y:
			return above.Pressure
		}
		return below.Pressure + (above.Pressure-below.Pressure)*(y-below.Y)/(above.Y-below.Y)
	}
	left, right := math.Inf(-1), math.Inf(1)
	for _, p := range ps {
		if p.X <= x {
			left = max(left, p.X)
		}
		if p.X >= x {
			right = min(right, p.X)
		}
	}
	switch {
	case math.IsInf(left, -1):
		return onVertical(right)
	case math.IsInf(right, 1), left == right:
		return onVertical(left)
	}
	t := (x - left) / (right - left)
	return onVertical(left)*(1-t) + onVertical(right)*t
}

// TestFeatureWaterAgreesWithTwin compares the pore pressure at the base of every slice with the twin.
func TestFeatureWaterAgreesWithTwin(t *testing.T) {
	slices, wet := 0, 0
	rapid.Check(t, func(t *rapid.T) {
		s, sit := drawSection(t)
		drawFeatureWater(t, s, sit)
		distinct := map[Point]bool{}
		for _, p := range sit.Water.Points {
			if distinct[Point{p.X, p.Y}] {
				return // Which of two at one place counts is open.
			}
			distinct[Point{p.X, p.Y}] = true
		}
		slip := drawCircle(t, s)
		var m Model
		if err := m.Compile(s, sit); err != nil {
			t.Fatal(err)
		}
		var ws Workspace
		m.FS(&ws, &slip, Setting{Method: Ordinary})
		for i := range ws.n {
			sl := &ws.slice[i]
			if sl.b < 0.01 || twinBend(&sit.Water, sl.x) { // Where a step is drawn out, or the slope of a line changes.
				continue
			}
			slices++
			above := sl.soilW/sl.b - twinLoad(s, sl.x)
			u := twinPore(s, &sit.Water, sl.x, sl.y, above)
			if u > 0 {
				wet++
			}
			delta := sl.b / (slip.Radius * sl.cos)
			if got := sl.ul * sl.cos / sl.b; math.Abs(got-u) > u*delta*delta/10+1e-4 {
				t.Fatalf("slice at x = %.3f, base %.3f: u = %.4f kPa, twin %.4f", sl.x, sl.y, got, u)
			}
		}
	})
	if slices < 500 || wet < 200 {
		t.Errorf("only %d slices compared, %d wet", slices, wet)
	}
}

func twinLoad(s *Section, x float64) float64 {
	load := 0.0
	for _, l := range s.Loads {
		if x > l.FromX && x < l.ToX {
			load += l.Pressure
		}
	}
	return load
}

// twinBend reports whether a line bends within a hair of x.
func twinBend(w *Water, x float64) bool {
	lines := []Profile{w.Line}
	for _, own := range w.BySoil {
		lines = append(lines, own.Line)
	}
	for _, l := range lines {
		for _, p := range l {
			if math.Abs(p.X-x) < 1e-3 {
				return true
			}
		}
	}
	return false
}

// TestInfiniteSlopeInclinedLine runs a plane slip parallel to a long slope and to its water line: with the factor cos^2 the methods that balance
// forces alone give the closed form of the infinite slope, apart from the short ends, which Spencer would close its moments with.
func TestInfiniteSlopeInclinedLine(t *testing.T) {
	const source = "closed form: Skempton and DeLory (1957), F = [c' + (gamma z - gamma_w h) cos^2(b) tan(phi')]/(gamma z sin(b) cos(b))"
	const z = 2.0
	for _, tt := range []struct {
		name                     string
		beta, c, phi, gamma, wet float64
		want                     float64 // Worked by hand from the closed form.
	}{
		{"full depth, no cohesion", 20, 0, 30, 20, 1, 0.808},
		{"half depth", 20, 5, 25, 19, 0.5, 1.360},
		{"dry", 20, 0, 30, 19, 0, 1.586},
	} {
		t.Run(tt.name, func(t *testing.T) {
			gamma := tt.gamma
			beta, phi := tt.beta*degree, tt.phi*degree
			const length = 20000.0
			drop := length * math.Tan(beta)
			ground := Profile{{0, drop}, {length, 0}}
			s := uniform(ground, Soil{UnitWeight: gamma, Cohesion: tt.c, Friction: phi})
			h := tt.wet * z
			sit := &Situation{Water: Water{InclinedLine: true, Line: Profile{{0, drop - z + h}, {length, -z + h}}}}
			at := func(x float64) Point { return Point{x, ground.At(x) - z} }
			head, exit := at(5000), at(15000)
			slip := Slip{Kind: Polyline, Nodes: []Point{{head.X - 1, ground.At(head.X - 1)}, head, exit, {exit.X + z, ground.At(exit.X + z)}}}
			sin, cos := math.Sincos(beta)
			want := (tt.c + (gamma*z-GammaW*h)*cos*cos*math.Tan(phi)) / (gamma * z * sin * cos)
			if !within(want, tt.want, 1e-3) {
				t.Errorf("closed form %.4f, worked by hand %.3f", want, tt.want)
			}
			m := compiled(t, s, sit)
			for _, method := range []Method{Ordinary, JanbuPlain} {
				r := evaluate(t, m, slip, Setting{Method: method})
				if !within(r.F, want, 0.001) { // The ends are 3 m of 10000.
					t.Errorf("%v: F = %.4f, want %.4f (%s)", method, r.F, want, source)
				}
			}
			if h > 0 { // Without the factor pressures are higher.
				sit.Water.InclinedLine = false
				r := evaluate(t, compiled(t, s, sit), slip, Setting{Method: JanbuPlain})
				if u := (tt.c + (gamma*z*cos*cos-GammaW*h)*math.Tan(phi)) / (gamma * z * sin * cos); !within(r.F, u, 0.001) {
					t.Errorf("vertical depth: F = %.4f, want %.4f (closed form with u = gamma_w h)", r.F, u)
				}
			}
		})
	}
}

// TestPerchedWater: water perched in the upper soil acts there and not in the lower one, and artesian water the other way round.
func TestPerchedWater(t *testing.T) {
	high := Profile{{-30, 9}, {0, 9}, {20, 0}, {50, 0}}
	f := func(w Water) float64 {
		s := bank()
		s.Soils[0].SaturatedUnitWeight = 0
		return evaluate(t, compiled(t, s, &Situation{Water: w}), bankSlips()[0], Setting{Method: Bishop, Slices: 120}).F
	}
	dry, perched, artesian, both := f(Water{}), f(Water{BySoil: []SoilWater{{0, high}}}), f(Water{BySoil: []SoilWater{{1, high}}}), f(Water{Line: high})
	again := f(Water{BySoil: []SoilWater{{1, high}, {0, high}}})
	if !(both < perched && both < artesian && perched < dry && artesian < dry) {
		t.Errorf("F dry %.4f, perched %.4f, artesian %.4f, both %.4f", dry, perched, artesian, both)
	}
	if !within(again, both, 1e-12) {
		t.Errorf("one line for each soil: F = %.6f, one for all %.6f", again, both)
	}
}

// TestOwnLineSaturates: soil below its own line weighs its saturated weight.
func TestOwnLineSaturates(t *testing.T) {
	const height, wet = 10.0, 6.0
	s := uniform(Profile{{-20, height}, {20, height}}, Soil{UnitWeight: 17, SaturatedUnitWeight: 20})
	m := compiled(t, s, &Situation{Water: Water{BySoil: []SoilWater{{0, Profile{{-20, wet}, {20, wet}}}}}})
	var sl slice
	sl.x, sl.y, sl.b, sl.cos = 0, 2, 1, 1
	col := &m.cols[m.columnAt(0)]
	m.fill(&sl, col, &m.layers[m.layerAt(col, col.first, 0, 2)], 1)
	if want := 17*(height-wet) + 20*(wet-2); !within(sl.q, want, 1e-9) || !within(sl.ul, GammaW*4, 1e-9) {
		t.Errorf("weight %.3f kPa, want %.3f; u = %.3f, want %.3f", sl.q, want, sl.ul, GammaW*4)
	}
}

// TestDrainsLeaveOwnLines: drains lower the main line only.
func TestDrainsLeaveOwnLines(t *testing.T) {
	line := Profile{{-30, 8}, {0, 8}, {20, 0}, {50, 0}}
	drains := &Drawdown{Invert: Profile{{-20, 3}, {15, -2}}, Ratio: []float64{0.6, 0.6}, Fade: 3}
	f := func(w Water) float64 {
		return evaluate(t, compiled(t, bank(), &Situation{Water: w}), bankSlips()[0], Setting{Method: Bishop}).F
	}
	own := []SoilWater{{0, line}, {1, line}}
	if a, b := f(Water{Line: line}), f(Water{Line: line, Drains: drains}); !(b > a*1.01) {
		t.Fatalf("drains on the main line: F = %.4f, without %.4f", b, a)
	}
	if a, b := f(Water{Line: line, BySoil: own}), f(Water{Line: line, BySoil: own, Drains: drains}); !within(a, b, 2e-4) { // The drains' ends cut slices.
		t.Errorf("drains on own lines: F = %.6f, without %.6f", b, a)
	}
}

// TestRuIsRapidDrawdown: with u = gamma_w z below the ground and gamma = 2 gamma_w, ru is 0.5 exactly, whether it is said by ru, by a line on the
// ground or by points.
func TestRuIsRapidDrawdown(t *testing.T) {
	const source = "identity; Morgenstern (1963), Geotechnique 13(2), F = 1.20, chart reading, recalled from memory"
	const height = 10.0
	g := face(height, math.Atan(1.0/3), 30)
	soil := Soil{UnitWeight: 2 * GammaW, Cohesion: 0.025 * 2 * GammaW * height, Friction: 30 * degree}
	lined := uniform(g, soil)
	soil.HasRu, soil.Ru = true, 0.5
	byRu := uniform(g, soil)
	lined.FirmBase, byRu.FirmBase = Profile{{-99, 0}, {99, 0}}, Profile{{-99, 0}, {99, 0}}
	var points []PressurePoint
	for _, p := range g {
		points = append(points, PressurePoint{p.X, p.Y, 0}, PressurePoint{p.X, p.Y - 50, 50 * GammaW})
	}
	for x := g[1].X; x < 0; x += 0.5 { // Between verticals pressures are interpolated on the level, so the face needs many.
		points = append(points, PressurePoint{x, g.At(x), 0}, PressurePoint{x, g.At(x) - 50, 50 * GammaW})
	}
	least := lowestBy(t, compiled(t, byRu, &Situation{}), Bishop, SearchOptions{})
	if f := least.Result.F; !within(f, 1.20, 0.02) {
		t.Errorf("F = %.3f, want 1.20 within 2 %% (%s)", f, source)
	}
	for _, method := range []Method{Ordinary, Bishop, Spencer} {
		o := Setting{Method: method}
		want := evaluate(t, compiled(t, byRu, &Situation{}), least.Slip, o).F
		if f := evaluate(t, compiled(t, lined, &Situation{Water: Water{Line: g}}), least.Slip, o).F; !within(f, want, 1e-9) {
			t.Errorf("%v: line on the ground F = %.6f, ru %.6f (%s)", method, f, want, source)
		}
		if f := evaluate(t, compiled(t, lined, &Situation{Water: Water{Points: points}}), least.Slip, o).F; !within(f, want, 0.01) {
			t.Errorf("%v: points F = %.4f, ru %.4f (%s)", method, f, want, source)
		}
	}
}
