package lem

import (
	"errors"
	"math"
	"testing"
)

// baseAt evaluates a flat polyline slip and returns cohesion and pore pressure, kPa, on the slice that holds x.
func baseAt(t *testing.T, s *Section, sit *Situation, x, y float64) (c, u float64) {
	t.Helper()
	m := compiled(t, s, sit)
	var ws Workspace
	slip := Slip{Kind: Polyline, Nodes: []Point{{x - 3, y + 60}, {x - 0.01, y}, {x + 0.01, y}, {x + 3, y + 60}}}
	m.FS(&ws, &slip, Setting{Method: Ordinary, Slices: MinSlices})
	for i := range ws.n {
		if sl := &ws.slice[i]; sl.x-sl.b/2 <= x && x <= sl.x+sl.b/2 && sl.sin == 0 {
			return sl.cl / sl.b, sl.ul / sl.b
		}
	}
	t.Fatalf("no slice at x = %v", x)
	return 0, 0
}

func level(y float64) Profile { return Profile{{-100, y}, {100, y}} }

// TestUndrainedStrength checks cu by depth below a line and between points, against interpolation by hand.
func TestUndrainedStrength(t *testing.T) {
	gradient := &UndrainedStrength{Strength: 20, Gradient: 2, Datum: Profile{{-100, 4}, {0, 4}, {100, 14}}}
	points := &UndrainedStrength{Points: []StrengthPoint{{0, 6, 10}, {0, -4, 30}, {20, 6, 20}, {20, 0, 50}}}
	tests := []struct {
		name       string
		cu         *UndrainedStrength
		x, y, want float64
	}{
		{"below the datum", gradient, -10, 1, 20 + 2*3},
		{"above the datum: no decrease", gradient, -10, 7, 20},
		{"below a sloping datum", gradient, 50, 5, 20 + 2*4},
		{"on a vertical", points, 0, 1, 20},
		{"above the uppermost point", points, 0, 9, 10},
		{"below the lowest point", points, 0, -9, 30},
		{"between verticals", points, 5, 1, 20*0.75 + 45*0.25},
		{"beyond the verticals", points, 35, 3, 35},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			s := uniform(level(10), Soil{UnitWeight: 18, Cohesion: 99, Friction: 0.5, Undrained: tt.cu})
			c, u := baseAt(t, s, &Situation{Water: Water{Line: level(9)}, Undrained: []bool{true}}, tt.x, tt.y)
			if !within(c, tt.want, 1e-3) || u != 0 {
				t.Errorf("cu = %.4f with u = %.3f, want %.4f without", c, u, tt.want)
			}
		})
	}
}

// TestPorePressure checks every source of pore pressure against the hydrostatic head by hand.
func TestPorePressure(t *testing.T) {
	clay := Soil{UnitWeight: 18}
	ru := Soil{UnitWeight: 18, HasRu: true, Ru: 0.3}
	rock := Soil{UnitWeight: 18, FreeDraining: true}
	drains := &Drawdown{Invert: level(2), Ratio: []float64{0.4, 0.4}, Fade: 3}
	tests := []struct {
		name  string
		soil  Soil
		water Water
		y     float64
		head  float64 // u over the unit weight of water, m.
	}{
		{"dry", clay, Water{}, 5, 0},
		{"below the line", clay, Water{Line: level(8)}, 5, 3},
		{"above the line", clay, Water{Line: level(4)}, 5, 0},
		{"line above ground", clay, Water{Line: level(13)}, 5, 8},
		{"free water", clay, Water{Free: []FreeWater{{12, -100, 100}}}, 5, 7},
		{"line above free water", clay, Water{Line: level(13), Free: []FreeWater{{12, -100, 100}}}, 5, 8},
		{"ratio of the soil's weight", ru, Water{Line: level(9)}, 5, 0.3 * 18 * 5 / GammaW},
		{"drains, above the invert", clay, Water{Line: level(8), Drains: drains}, 5, 0.6 * 3},
		{"drains, at the invert", clay, Water{Line: level(8), Drains: drains}, 2, 0.6 * 6},
		{"drains, fading below", clay, Water{Line: level(8), Drains: drains}, 0.5, 7.5 - 0.4*6*0.5},
		{"drains, below the fade", clay, Water{Line: level(8), Drains: drains}, -2, 10},
		{"free-draining, no outfall", rock, Water{Line: level(8)}, 5, 3},
		{"free-draining, outfall", rock, Water{Line: level(8), HasFreeDrainingLevel: true, FreeDrainingLevel: 6}, 5, 1},
		{"free-draining, outfall below", rock, Water{Line: level(8), HasFreeDrainingLevel: true, FreeDrainingLevel: 4}, 5, 0},
		{"free-draining, free water", rock, Water{Line: level(13), Free: []FreeWater{{12, -100, 100}}}, 5, 7},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			if _, u := baseAt(t, uniform(level(10), tt.soil), &Situation{Water: tt.water}, 0, tt.y); math.Abs(u-GammaW*tt.head) > 1e-3 {
				t.Errorf("u = %.4f kPa, want %.4f (closed form)", u, GammaW*tt.head)
			}
		})
	}
}

// TestLineAboveGroundIsNoLoad: a piezometric line above the ground is pore pressure only; free water alone loads the face.
func TestLineAboveGroundIsNoLoad(t *testing.T) {
	s := uniform(face(8, 26*degree, 30), Soil{UnitWeight: 19, Undrained: &UndrainedStrength{Strength: 40}})
	slip := Slip{Centre: Point{-5, 16}, Radius: 18}
	undrained := []bool{true}
	dry := evaluate(t, compiled(t, s, &Situation{Undrained: undrained}), slip, Setting{Method: Bishop}).F
	line := evaluate(t, compiled(t, s, &Situation{Undrained: undrained, Water: Water{Line: level(12)}}), slip, Setting{Method: Bishop}).F
	pool := evaluate(t, compiled(t, s, &Situation{Undrained: undrained, Water: Water{Free: []FreeWater{{6, -100, 100}}}}), slip, Setting{Method: Bishop}).F
	if !within(line, dry, 1e-9) || !(pool > 1.2*dry) {
		t.Errorf("F = %.4f dry, %.4f with a line above ground, %.4f with free water", dry, line, pool)
	}
}

// TestRulesOfAdmissibility checks what keeps a slip from having an F.
func TestRulesOfAdmissibility(t *testing.T) {
	s := uniform(face(8, 26*degree, 90), Soil{UnitWeight: 19, Cohesion: 3, Friction: 35 * degree})
	based := *s
	based.FirmBase = level(-1)
	deep := Slip{Centre: Point{-2, 14}, Radius: 17}    // Bottom at -3.
	tangent := Slip{Centre: Point{-2, 14}, Radius: 15} // Bottom at -1.
	tests := []struct {
		name   string
		s      *Section
		slip   Slip
		o      Setting
		want   Status
		reason Reason
	}{
		{"clear of everything", s, deep, Setting{}, Converged, Admissible},
		{"below the firm base", &based, deep, Setting{}, Inadmissible, BelowFirmBase},
		{"touching the firm base", &based, tangent, Setting{}, Converged, Admissible},
		{"as deep as wanted", s, deep, Setting{MinDepth: 3}, Converged, Admissible},
		{"too shallow", s, deep, Setting{MinDepth: 12}, Missed, Admissible},
		{"the other way", s, deep, Setting{Window: Window{Direction: LeftwardOnly}}, Missed, Admissible},
		{"head outside the range", s, deep, Setting{Window: Window{Head: Range{-5, 0}}}, Missed, Admissible},
		{"toe outside the range", s, deep, Setting{Window: Window{Toe: Range{20, 30}}}, Missed, Admissible},
		{"above ground", s, Slip{Centre: Point{0, 40}, Radius: 5}, Setting{}, Missed, Admissible},
		{"centre below the crest", s, Slip{Centre: Point{-10, 6}, Radius: 8}, Setting{}, Inadmissible, NotDaylighting},
		{"exit too steep", s, Slip{Centre: Point{-2, 9}, Radius: 45}, Setting{}, Inadmissible, SmallMAlpha},
		{"exit flatter", s, Slip{Centre: Point{-2, 20}, Radius: 45}, Setting{}, Converged, Admissible},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			tt.o.Method = Bishop
			var ws Workspace
			r := compiled(t, tt.s, &Situation{}).FS(&ws, &tt.slip, tt.o)
			if r.Status != tt.want || r.Reason != tt.reason {
				t.Errorf("%v (%v), F = %.3f; want %v (%v)", r.Status, r.Reason, r.F, tt.want, tt.reason)
			}
		})
	}
}

func TestCompileErrors(t *testing.T) {
	soil := Soil{Name: "clay", UnitWeight: 18}
	g := level(3)
	many := make([]Surcharge, 65)
	for i := range many {
		many[i] = Surcharge{FromX: 0, ToX: 1, Variable: true}
	}
	tests := []struct {
		name string
		s    Section
		sit  Situation
		want error
	}{
		{"nothing", Section{}, Situation{}, ErrEmptySection},
		{"no strata", Section{Ground: g, Soils: []Soil{soil}}, Situation{}, ErrEmptySection},
		{"stratum of no soil", Section{Ground: g, Soils: []Soil{soil}, Strata: []Stratum{{1, g}}}, Situation{}, ErrNoSuchSoil},
		{"body of no soil", Section{Ground: g, Soils: []Soil{soil}, Strata: []Stratum{{0, g}}, Placed: []Body{{Soil: -1}}}, Situation{}, ErrNoSuchSoil},
		{"right to left", *uniform(Profile{{3, 0}, {1, 0}}, soil), Situation{}, ErrNotLeftToRight},
		{"water right to left", *uniform(g, soil), Situation{Water: Water{Line: Profile{{3, 0}, {1, 0}}}}, ErrNotLeftToRight},
		{"no number", *uniform(Profile{{0, 0}, {1, math.NaN()}}, soil), Situation{}, ErrNotFinite},
		{"infinite", *uniform(Profile{{0, 0}, {math.Inf(1), 1}}, soil), Situation{}, ErrNotFinite},
		{"no undrained strength", *uniform(g, soil), Situation{Undrained: []bool{true}}, ErrNoUndrained},
		{"drains without fade", *uniform(g, soil), Situation{Water: Water{Drains: &Drawdown{Invert: g, Ratio: []float64{0, 0}}}}, ErrBadDrawdownRatio},
		{"drains with one ratio", *uniform(g, soil), Situation{Water: Water{Drains: &Drawdown{Invert: g, Ratio: []float64{0}, Fade: 1}}}, ErrBadDrawdownRatio},
		{"too many", Section{Ground: g, Soils: []Soil{soil}, Strata: []Stratum{{0, g}}, Loads: many}, Situation{}, ErrTooManyVariable},
		{"well formed", *uniform(g, soil), Situation{}, nil},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			var m Model
			if err := m.Compile(&tt.s, &tt.sit); !errors.Is(err, tt.want) {
				t.Errorf("error %v, want %v", err, tt.want)
			}
		})
	}
}
