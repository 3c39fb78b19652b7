package lem

import (
	"context"
	"fmt"
	"math"
	"testing"

	"pgregory.net/rapid"
)

const hoek = "Hoek, Practical Rock Engineering, A slope stability problem in Hong Kong: closed form of the planar slide, recalled from memory"

// TestPlanarSlideWithCrack checks Hoek's planar slide with a tension crack, water in crack and along the plane, and an earthquake:
// F = {c A + [W (cos p - a sin p) - U - V sin p] tan phi}/{W (sin p + a cos p) + V cos p}. On a plane every method gives it.
func TestPlanarSlideWithCrack(t *testing.T) {
	const height, gamma, gammaW = 60.0, 26.0, GammaW
	const facing, plane = 50 * degree, 35 * degree
	for _, tt := range []struct{ phi, c, z, share, kh float64 }{
		{35, 100, 14, 0.5, 0.08}, // The means.
		{35, 100, 14, 0, 0},
		{35, 100, 14, 1, 0},
		{30, 60, 8, 1, 0.12},
		{45, 20, 20, 0.3, 0.05},
	} {
		for _, mirror := range []bool{false, true} {
			t.Run(fmt.Sprint(tt, mirror), func(t *testing.T) {
				sin, cos := math.Sincos(plane)
				tanF, tanP := math.Tan(facing), math.Tan(plane)
				zw := tt.share * tt.z
				area := (height - tt.z) / sin
				weight := gamma / 2 * height * height * ((1-tt.z*tt.z/height/height)/tanP - 1/tanF)
				uplift, thrust := gammaW*zw*area/2, gammaW*zw*zw/2
				want := (tt.c*area + (weight*(cos-tt.kh*sin)-uplift-thrust*sin)*math.Tan(tt.phi*degree)) / (weight*(sin+tt.kh*cos) + thrust*cos)

				ground := Profile{{-200, height}, {-height / tanF, height}, {0, 0}, {100, 0}}
				s := uniform(ground, Soil{UnitWeight: gamma, Cohesion: tt.c, Friction: tt.phi * degree})
				s.Crack = &TensionCrack{Depth: tt.z, WaterShare: tt.share}
				x := -(height - tt.z) / tanP // Of the crack, from the toe.
				sit := &Situation{Kh: tt.kh, Water: Water{Line: Profile{{x, height - tt.z + zw}, {0, 0}}}}
				slip := Slip{Kind: Polyline, Nodes: []Point{{-height / tanP, height}, {0, 0}}}
				if mirror {
					crack := s.Crack
					s, sit = mirrored(s, sit)
					s.Crack = crack
					slip.Nodes = []Point{{0, 0}, {height / tanP, height}}
				}
				m := compiled(t, s, sit)
				for _, method := range []Method{Ordinary, JanbuPlain, Spencer, MorgensternPrice} {
					var ws Workspace
					r := m.FS(&ws, &slip, Setting{Method: method})
					if (method == Spencer || method == MorgensternPrice) && r.Status != Converged {
						continue // Moments need not close on a plane: the formula leaves them open too.
					}
					if !within(r.F, want, 1e-6) {
						t.Errorf("%v: F = %.6f (%v), want %.6f (%s)", method, r.F, r.Status, want, hoek)
					}
					if head, _ := r.ends(); !within(math.Abs(head), -x, 1e-9) || !within(r.Crack, tt.z, 1e-9) {
						t.Errorf("head at %.3f, crack %.3f deep; want %.3f, %.3f", head, r.Crack, x, tt.z)
					}
				}
			})
		}
	}
}

// TestHoekMeans pins the closed form itself at the means to the value worked by hand, F = 1.221 with unit weights of 26 and 10 kN/m3 there.
func TestHoekMeans(t *testing.T) {
	const height, z, zw, kh = 60.0, 14.0, 7.0, 0.08
	sin, cos := math.Sincos(35 * degree)
	area := (height - z) / sin
	weight := 26.0 / 2 * height * height * ((1-z*z/height/height)/math.Tan(35*degree) - 1/math.Tan(50*degree))
	u, v := 10*zw*area/2, 10*zw*zw/2
	f := (100*area + (weight*(cos-kh*sin)-u-v*sin)*math.Tan(35*degree)) / (weight*(sin+kh*cos) + v*cos)
	if !within(f, 1.221, 5e-3) {
		t.Errorf("closed form %.4f, want 1.221 (%s)", f, hoek)
	}
}

// TestPublishedTensionCrack searches the slope with a dry crack of depth 2 c/(gamma sqrt(Ka)).
func TestPublishedTensionCrack(t *testing.T) {
	const source = giam + "1(b): referee 1.65, range 1.65 to 1.70"
	const c, phi, gamma = 32.0, 10 * degree, 20.0
	depth := 2 * c / (gamma * math.Tan(math.Pi/4-phi/2))
	if !within(depth, 3.81, 2e-3) {
		t.Errorf("crack %.3f m deep, want 3.81 (%s)", depth, source)
	}
	s := uniform(giamGround(), Soil{UnitWeight: gamma, Cohesion: c, Friction: phi})
	s.FirmBase = Profile{{-200, 20}, {200, 20}}
	s.Crack = &TensionCrack{Depth: depth}
	m := compiled(t, s, &Situation{})
	for _, sampler := range []Sampler{ByDaylight, ByCentre} {
		for _, method := range []Method{Bishop, Spencer} {
			least := lowestBy(t, m, method, SearchOptions{Sampler: sampler})
			if f := least.Result.F; !(f >= 1.65 && f <= 1.70) {
				t.Errorf("%v, sampler %d: F = %.4f, want 1.65 to 1.70 (%s)", method, sampler, f, source)
			}
			if got := least.Result.Crack; !within(got, depth, 1e-6) {
				t.Errorf("%v: the lowest slip ends in a crack %.4f m deep, want %.4f", method, got, depth)
			}
		}
	}
	found, err := m.Search(context.Background(), SearchOptions{Polylines: true})
	if err != nil {
		t.Fatal(err)
	}
	polylines := 0
	for _, b := range found.Basins {
		if b.Slip.Kind == Polyline {
			polylines++
			if b.Result.F < 1.55 {
				t.Errorf("polyline with F = %.4f", b.Result.F)
			}
			break
		}
	}
	if polylines == 0 {
		t.Error("no polyline found beside the circles")
	}
}

// TestCrackAgainstMoments compares Bishop on an undrained circle, cut off at a crack with water in it, with moments summed over fine slices.
func TestCrackAgainstMoments(t *testing.T) {
	compared := 0
	rapid.Check(t, func(t *rapid.T) {
		cu, gamma := between(t, 20, 60, "cu"), between(t, 16, 21, "weight")
		ground := drawGround(t)
		s := uniform(ground, Soil{UnitWeight: gamma, Cohesion: cu})
		slip := drawCircle(t, s)
		depth, share := between(t, 0.5, 4, "crack"), between(t, 0, 1, "share")
		s.Crack = &TensionCrack{Depth: depth, WaterShare: share}
		var m Model
		if err := m.Compile(s, &Situation{}); err != nil {
			t.Fatal(err)
		}
		var ws Workspace
		r := m.FS(&ws, &slip, Setting{Method: Bishop, Slices: 400})
		parts := twinParts(s, slip)
		if len(parts) != 1 || r.Status == NotConverged {
			return
		}
		c, radius := slip.Centre, slip.Radius
		level := func(x float64) float64 { return c.Y - math.Sqrt(radius*radius-(x-c.X)*(x-c.X)) }
		const n = 20000
		dx := (parts[0].To - parts[0].From) / n
		// The slope falls to the right, so the head is on the left.
		start := math.NaN()
		for i := range n {
			if x := parts[0].From + dx*(float64(i)+0.5); twinLevel(ground, x)-level(x) >= depth {
				start = x
				break
			}
		}
		if math.IsNaN(start) {
			if r.Status != Missed {
				t.Fatalf("%v although the slip is nowhere %.2f m deep", r.Status, depth)
			}
			return
		}
		if r.Status != Converged || r.Leftward {
			return // Hardly anything is left.
		}
		if math.Abs(r.From.X-start) > 2*dx {
			t.Fatalf("crack at x = %.4f, twin %.4f", r.From.X, start)
		}
		var moment float64
		for x := start + dx/2; x < parts[0].To; x += dx {
			moment += gamma * (twinLevel(ground, x) - level(x)) * (c.X - x) * dx
		}
		hw := share * r.Crack
		moment += GammaW * hw * hw / 2 * (c.Y - level(start) - hw/3)
		theta := math.Asin((parts[0].To-c.X)/radius) - math.Asin((start-c.X)/radius)
		want := cu * radius * radius * theta / moment
		if want > 20 {
			return
		}
		compared++
		if !within(r.F, want, 0.004) {
			t.Fatalf("F = %.5f, twin %.5f; crack at %.3f, %.3f m deep", r.F, want, r.From.X, r.Crack)
		}
	})
	if compared < 30 {
		t.Errorf("only %d circles compared", compared)
	}
}

// TestCrackWater checks the depth of water by share and by level.
func TestCrackWater(t *testing.T) {
	for _, tt := range []struct {
		name  string
		crack TensionCrack
		want  float64
	}{
		{"dry", TensionCrack{}, 0},
		{"half", TensionCrack{WaterShare: 0.5}, 2},
		{"full", TensionCrack{WaterShare: 1}, 4},
		{"level below the bottom", TensionCrack{HasWaterLevel: true, WaterLevel: 5}, 0},
		{"level inside", TensionCrack{HasWaterLevel: true, WaterLevel: 7.5}, 1.5},
		{"level above the ground", TensionCrack{HasWaterLevel: true, WaterLevel: 12}, 4},
	} {
		if got := crackWaterOf(&tt.crack).depth(6, 10); got != tt.want {
			t.Errorf("%s: %g m of water, want %g", tt.name, got, tt.want)
		}
	}
	s := bank()
	last := math.Inf(1)
	for _, share := range []float64{0, 0.3, 0.6, 1} {
		s.Crack = &TensionCrack{Depth: 3, WaterShare: share}
		f := evaluate(t, compiled(t, s, &Situation{}), bankSlips()[0], Setting{Method: Spencer}).F
		if !(f < last) {
			t.Errorf("F = %.4f with %.0f %% of water, %.4f with less", f, 100*share, last)
		}
		last = f
	}
}

// TestCrackByLine: a line below the ground by a depth gives what the depth gives; beyond its ends there is no crack; a slip above it is missed.
func TestCrackByLine(t *testing.T) {
	o := Setting{Method: Bishop}
	slip := bankSlips()[0]
	with := func(k *TensionCrack) Result {
		s := bank()
		s.Crack = k
		var ws Workspace
		return compiled(t, s, &Situation{}).FS(&ws, &slip, o)
	}
	byDepth := with(&TensionCrack{Depth: 2})
	byLine := with(&TensionCrack{Line: Profile{{-30, 8}, {0, 8}, {20, -2}, {50, -2}}})
	if byDepth.Status != Converged || !within(byLine.F, byDepth.F, 1e-9) || !within(byDepth.Crack, 2, 1e-9) {
		t.Errorf("by depth %+v, by line %+v", byDepth, byLine)
	}
	bare := with(nil)
	for name, line := range map[string]Profile{
		"beyond its ends":  {{-30, 8}, {bare.From.X - 1, 8}},
		"above the ground": {{-30, 11}, {50, 11}},
	} {
		if r := with(&TensionCrack{Line: line}); !within(r.F, bare.F, 1e-6) || r.Crack != 0 {
			t.Errorf("%s: F = %.6f, crack %g; without any F = %.6f", name, r.F, r.Crack, bare.F)
		}
	}
	short := bare.From.X + 0.5 // The line ends before the slip is as deep as it.
	if r := with(&TensionCrack{Line: Profile{{-30, 5}, {short, 5}}}); !within(r.From.X, short, 1e-9) || !(r.Crack > 0 && r.Crack < 5) {
		t.Errorf("line that ends at %.3f: head at %.3f, crack %.3f m", short, r.From.X, r.Crack)
	}
	if r := with(&TensionCrack{Depth: 50}); r.Status != Missed {
		t.Errorf("crack deeper than the slip: %v, want missed", r.Status)
	}
}

// TestCrackUnderBothMovements: on a ridge the head is where the movement comes from.
func TestCrackUnderBothMovements(t *testing.T) {
	s := uniform(Profile{{-60, 0}, {-20, 0}, {-5, 10}, {5, 10}, {20, 0}, {60, 0}}, Soil{UnitWeight: 18, Cohesion: 15, Friction: 20 * degree})
	s.Crack = &TensionCrack{Depth: 2}
	m := compiled(t, s, &Situation{})
	for _, x := range []float64{-14, 14} {
		slip := Slip{Centre: Point{x, 16}, Radius: 16.2}
		r := evaluate(t, m, slip, Setting{Method: Spencer})
		head, _ := r.ends()
		if r.Leftward != (x < 0) || !within(r.Crack, 2, 1e-6) || math.Abs(head) > 5 {
			t.Errorf("centre at %g: %+v", x, r)
		}
	}
}

// TestSearchWithCrackAgreesWithGrid compares the search on the bank, with a crack half full, with plain random circles and with its own other
// parametrisation.
func TestSearchWithCrackAgreesWithGrid(t *testing.T) {
	s := bank()
	s.Crack = &TensionCrack{Line: Profile{{-30, 7.5}, {0, 7.5}}, WaterShare: 0.5}
	m := compiled(t, s, &Situation{})
	o := SearchOptions{MinDepth: 1, Window: Window{Direction: RightwardOnly}}
	a := lowestBy(t, m, Bishop, o)
	o.Sampler, o.Effort = ByCentre, 2
	b := lowestBy(t, m, Bishop, o)
	if !within(a.Result.F, b.Result.F, 0.003) {
		t.Errorf("F = %.4f by daylight, %.4f by centre", a.Result.F, b.Result.F)
	}
	if !(a.Result.Crack > 0) {
		t.Errorf("the lowest slip %+v ends in no crack", a.Result)
	}
	var ws Workspace
	least := math.Inf(1)
	for i := range 40 {
		for j := range 40 {
			for k := range 40 {
				slip := Slip{Centre: Point{float64(i), 8 + float64(j)/2}, Radius: 8 + float64(k)/2}
				if r := m.FS(&ws, &slip, Setting{Method: Bishop, MinDepth: 1, Window: o.Window}); r.Status == Converged {
					least = min(least, r.F)
				}
			}
		}
	}
	if a.Result.F > least*1.001 {
		t.Errorf("search F = %.4f, grid of circles %.4f", a.Result.F, least)
	}
	polys, err := m.Search(context.Background(), SearchOptions{MinDepth: 1, Polylines: true, Window: o.Window})
	if err != nil {
		t.Fatal(err)
	}
	for _, basin := range polys.Basins {
		if basin.Slip.Kind == Polyline {
			if basin.Result.F > a.Result.F*1.02 {
				t.Errorf("lowest polyline F = %.4f, circle %.4f", basin.Result.F, a.Result.F)
			}
			return
		}
	}
	t.Error("no polyline found")
}

// TestCrackWaterMoment checks the moment of the water in a deep crack on an undrained circle: 1/2 gamma_w hw^2 at a third of hw, by hand.
func TestCrackWaterMoment(t *testing.T) {
	const cu, depth = 40.0, 6.0
	s := uniform(Profile{{-40, 10}, {0, 10}, {20, 0}, {50, 0}}, Soil{UnitWeight: 18, Cohesion: cu})
	slip := Slip{Centre: Point{8, 16}, Radius: 18}
	for _, share := range []float64{0.5, 1} {
		o := Setting{Method: Bishop}
		s.Crack = &TensionCrack{Depth: depth}
		dry := evaluate(t, compiled(t, s, &Situation{}), slip, o)
		s.Crack = &TensionCrack{Depth: depth, WaterShare: share}
		wet := evaluate(t, compiled(t, s, &Situation{}), slip, o)
		c, r := slip.Centre, slip.Radius
		theta := math.Asin((dry.To.X-c.X)/r) - math.Asin((dry.From.X-c.X)/r)
		hw := share * depth
		moment := GammaW * hw * hw / 2 * (c.Y - (10 - depth) - hw/3)
		if got := cu * r * r * theta * (1/wet.F - 1/dry.F); !within(got, moment, 1e-4) {
			t.Errorf("%.0f %% full: moment of the water %.2f kNm, want %.2f (closed form)", 100*share, got, moment)
		}
	}
}
