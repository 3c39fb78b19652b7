package remedies

import (
	"errors"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"standfast/lem"
)

// slid is a job of one soil with a slope 10 m high that falls to the right to a toe at (0, 0), and a situation without water.
func slid(beta float64, soil lem.Soil) *Job {
	const height = 10.0
	back := height / math.Tan(beta)
	ground := lem.Profile{{X: -back - 60, Y: height}, {X: -back, Y: height}, {X: 0, Y: 0}, {X: 60, Y: 0}}
	soil.Name = "clay"
	return &Job{
		Section: lem.Section{Ground: ground, Soils: []lem.Soil{soil, {Name: "elsewhere", UnitWeight: 20}}, Strata: []lem.Stratum{{Soil: 0, Top: ground}}},
		Crest:   ground[1], Toe: ground[2], Clay: []bool{true, true},
		Situations: []Situation{{Name: "as it failed", Water: dry, RequiredFS: 1.3}},
	}
}

// planar is a plane slip at an inclination through the toe.
func planar(theta float64) lem.Slip {
	return lem.Slip{Kind: lem.Polyline, Nodes: []lem.Point{{X: -10 / math.Tan(theta), Y: 10}, {X: 0, Y: 0}}}
}

// TestBackAnalyseBlock: on a plane the pairs lie on a straight line, c' A + (1 - ru sec^2 t) W cos(t) tan(phi') = W sin(t).
func TestBackAnalyseBlock(t *testing.T) {
	const source = "closed form: a block on a plane"
	beta, theta := 50*math.Pi/180, 32*math.Pi/180
	sin, cos := math.Sincos(theta)
	for _, ru := range []float64{0, 0.2} {
		for _, method := range []lem.Method{lem.Ordinary, lem.Spencer, lem.MorgensternPrice} { // Ordinary, the zero value, stands for the default.
			j := slid(beta, lem.Soil{UnitWeight: 19, Cohesion: 50, Friction: 0.5, HasRu: ru > 0, Ru: ru})
			b, err := BackAnalyse(j, &Observed{Slip: planar(theta)}, BackSettings{Method: method})
			if err != nil {
				t.Fatal(err)
			}
			weight := 19 * 100.0 / 2 * (1/math.Tan(theta) - 1/math.Tan(beta))
			area := 10 / sin
			press := (cos - ru/cos) * weight
			near(t, "phi' without cohesion", math.Tan(b.Curve[0].Friction), sin*weight/press, 1e-6)
			near(t, "cohesion without friction", b.Curve[len(b.Curve)-1].Cohesion, weight*sin/area, 1e-4)
			for _, p := range append(b.Curve, b.Low, b.Middle, b.High) {
				near(t, "c' A + N' tan(phi') over T ("+source+")", (p.Cohesion*area+press*math.Tan(p.Friction))/(weight*sin), 1, 1e-6)
			}
			if len(b.Curve) != curvePoints || !(b.Bend < 1e-6) || b.Share != 1 {
				t.Errorf("%d points, bend %v, share %v", len(b.Curve), b.Bend, b.Share)
			}
			near(t, "cohesion of the low point", b.Low.Cohesion, 0, 0)
			near(t, "cohesion of the high point", b.High.Cohesion, weight*sin/area/2, 1e-4)
		}
	}
}

// TestBackAnalyseUndrained: on an arc, cu = W d/(R^2 theta), with exact area and arm of the ground that moves.
func TestBackAnalyseUndrained(t *testing.T) {
	const gamma, height = 18.0, 10.0
	j := slid(30*math.Pi/180, lem.Soil{UnitWeight: gamma, Cohesion: 5, Friction: 0.4})
	c, r := lem.Point{X: -6, Y: 18}, 24.0
	x0, x1 := c.X-math.Sqrt(r*r-(c.Y-height)*(c.Y-height)), c.X+math.Sqrt(r*r-c.Y*c.Y)
	arc := math.Asin((x1-c.X)/r) - math.Asin((x0-c.X)/r)
	crest := -height / math.Tan(30*math.Pi/180)
	moment := height * ((crest-x0)*(c.X-(crest+x0)/2) - crest/2*(c.X-crest*2/3))
	at := func(x float64) float64 { // Of the part below the toe's level: the integral of (cx - x)(sqrt(R^2 - (x-cx)^2) - cy) dx.
		v := math.Sqrt(r*r - (x-c.X)*(x-c.X))
		return v*v*v/3 + c.Y*(r*r-v*v)/2
	}
	want := gamma * (moment + at(x1) - at(x0)) / (r * r * arc)
	slip := lem.Slip{Centre: c, Radius: r}
	b, err := BackAnalyse(j, &Observed{Slip: slip}, BackSettings{Unknown: UndrainedCu, Slices: 200})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "cu (closed form)", b.Middle.Strength, want, 2e-4*want)
	near(t, "cu at FS 0.95 (closed form)", b.Low.Strength, 0.95*want, 2e-4*want)
	near(t, "cu at FS 1.05 (closed form)", b.High.Strength, 1.05*want, 2e-4*want)
	// The end of the curve of pairs without friction is the same strength.
	pairs, err := BackAnalyse(j, &Observed{Slip: slip}, BackSettings{Slices: 200})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "cohesion without friction (closed form)", pairs.Curve[len(pairs.Curve)-1].Cohesion, want, 2e-4*want)
	if pairs.Bend > 0.05 {
		t.Errorf("the curve bends by %.3f of its greatest cohesion; it should be almost straight", pairs.Bend)
	}
}

// TestBackAnalyseSingle finds friction alone, and ru, on an endless slope in closed form: a long slip parallel to the face.
func TestBackAnalyseSingle(t *testing.T) {
	theta := 28 * math.Pi / 180
	j := slid(55*math.Pi/180, lem.Soil{UnitWeight: 20, Cohesion: 3, Friction: 40 * math.Pi / 180})
	b, err := BackAnalyse(j, &Observed{Slip: planar(theta)}, BackSettings{Unknown: FrictionAlone})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "residual friction: phi' = theta (closed form)", b.Middle.Friction, theta, 1e-6)
	near(t, "at FS 0.95", math.Tan(b.Low.Friction), 0.95*math.Tan(theta), 1e-6)
	near(t, "at FS 1.05", math.Tan(b.High.Friction), 1.05*math.Tan(theta), 1e-6)
	j.Section.Soils[0].Cohesion = 0
	b, err = BackAnalyse(j, &Observed{Slip: planar(theta)}, BackSettings{Unknown: PressureRatio})
	if err != nil {
		t.Fatal(err)
	}
	ru := func(fs float64) float64 {
		return math.Pow(math.Cos(theta), 2) * (1 - fs*math.Tan(theta)/math.Tan(40*math.Pi/180))
	}
	near(t, "ru = cos^2 t (1 - F tan t/tan phi) (closed form)", b.Middle.Ru, ru(1), 1e-6)
	near(t, "ru at FS 1.05", b.Low.Ru, ru(1.05), 1e-6)
	near(t, "ru at FS 0.95", b.High.Ru, ru(0.95), 1e-6)
}

// TestBackAnalyseFails lists what has no answer, and how that is said.
func TestBackAnalyseFails(t *testing.T) {
	steep := planar(32 * math.Pi / 180)
	soil := lem.Soil{UnitWeight: 19, Cohesion: 5, Friction: 0.4}
	held := slid(0.9, soil)
	held.Section.Soils = append(held.Section.Soils, lem.Soil{Name: "rock", UnitWeight: 25, Cohesion: 500})
	held.Section.Strata = append(held.Section.Strata, lem.Stratum{Soil: 2, Top: lem.Profile{{X: -100, Y: 5}, {X: 100, Y: 5}}})
	tests := []struct {
		name     string
		job      *Job
		slip     lem.Slip
		settings BackSettings
		is       error
		says     string
	}{
		{"slip in the air", slid(0.9, soil), lem.Slip{Centre: lem.Point{X: 0, Y: 50}, Radius: 5}, BackSettings{}, ErrNoBackAnalysis, "does not pass below the ground"},
		{"soil not there", slid(0.9, soil), steep, BackSettings{HasSoil: true, Soil: 1}, ErrRequest, "does not pass through elsewhere"},
		{"bishop on a polyline", slid(0.9, soil), steep, BackSettings{Method: lem.Bishop}, ErrRequest, "for circles"},
		{"held by rock", held, steep, BackSettings{HasSoil: true}, ErrNoBackAnalysis, "even if clay had no strength at all"},
		{"cohesion out of range", slid(0.9, soil), steep, BackSettings{HasRange: true, Low: 0, High: 90}, ErrNoBackAnalysis, "no angle of friction gives FS 1"},
		{"too weak for ru", slid(0.9, lem.Soil{UnitWeight: 19, Friction: 0.4}), steep, BackSettings{Unknown: PressureRatio}, ErrNoBackAnalysis, "is 1 nowhere"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			_, err := BackAnalyse(tt.job, &Observed{Slip: tt.slip}, tt.settings)
			if !errors.Is(err, tt.is) || !strings.Contains(err.Error(), tt.says) {
				t.Errorf("got %v, want %v with %q", err, tt.is, tt.says)
			}
		})
	}
}

// TestBackAnalyseGivesOne: whatever the slope, every pair gives the slip FS 1 when it is put into the case, and the curve falls.
func TestBackAnalyseGivesOne(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		j := slid(rapid.Float64Range(0.4, 1).Draw(t, "beta"), lem.Soil{UnitWeight: 19, Cohesion: 5, Friction: 0.4})
		slip := lem.Slip{Centre: lem.Point{X: rapid.Float64Range(-8, 0).Draw(t, "x"), Y: rapid.Float64Range(15, 25).Draw(t, "y")}}
		slip.Radius = slip.Centre.Y + rapid.Float64Range(0, 3).Draw(t, "depth")
		b, err := BackAnalyse(j, &Observed{Slip: slip}, BackSettings{})
		if errors.Is(err, ErrNoBackAnalysis) {
			t.Skip()
		}
		if err != nil {
			t.Fatal(err)
		}
		var m lem.Model
		var ws lem.Workspace
		for i, p := range b.Curve {
			s := j.Section
			s.Soils = append([]lem.Soil(nil), s.Soils...)
			s.Soils[0].Cohesion, s.Soils[0].Friction = p.Cohesion, p.Friction
			if err := m.Compile(&s, &lem.Situation{}); err != nil {
				t.Fatal(err)
			}
			if f := m.FS(&ws, &slip, lem.Setting{Method: lem.Bishop}).F; !(math.Abs(f-1) < 1e-5) {
				t.Errorf("c' %.3f, phi' %.4f: FS %v", p.Cohesion, p.Friction, f)
			}
			if i > 0 && (p.Cohesion <= b.Curve[i-1].Cohesion || p.Friction >= b.Curve[i-1].Friction) {
				t.Errorf("the curve turns at %+v", p)
			}
		}
		if b.Bend > 0.1 {
			t.Errorf("bend %v", b.Bend)
		}
	})
}
