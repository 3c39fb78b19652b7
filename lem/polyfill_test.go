package lem

import (
	"context"
	"math"
	"testing"
)

// TestPolylineSlidesBeneathFill checks that a slip along the soft ground beneath a fill, and one along the fill's own base, are found where
// they govern.
func TestPolylineSlidesBeneathFill(t *testing.T) {
	for _, tt := range []struct {
		name      string
		soft      int     // The soil that is weak.
		low, high float64 // Levels between which most of the flat part must lie.
	}{
		{"soft stratum", 1, -5, -1},
		{"smooth base of the fill", 3, -0.2, 0.2},
	} {
		t.Run(tt.name, func(t *testing.T) {
			sec, _, _, toe := filled(5, 8, 1.5)
			sec.Soils = append(sec.Soils, Soil{UnitWeight: 19, Cohesion: 4, Friction: 24 * degree})
			level := func(y float64) Profile { return Profile{{-40, y}, {80, y}} }
			sec.Strata = []Stratum{sec.Strata[0], {3, level(-0.02)}, {0, level(-0.1)}, sec.Strata[1], sec.Strata[2]}
			sec.Soils[0] = Soil{UnitWeight: 19, Cohesion: 15, Friction: 30 * degree}
			sec.Soils[1], sec.Soils[3] = sec.Soils[0], sec.Soils[0]
			sec.Soils[tt.soft] = Soil{UnitWeight: 18, Friction: 9 * degree}
			m := compiled(t, sec, &Situation{})
			got := lowestPolyline(t, m, Spencer, SearchOptions{MinDepth: 1, Window: Window{Direction: RightwardOnly}})
			r := got.Result
			var in float64
			for i := range 200 {
				if y := polylineAt(got.Slip.Nodes, r.From.X+(r.To.X-r.From.X)*(float64(i)+0.5)/200); y > tt.low && y < tt.high {
					in += 1.0 / 200
				}
			}
			if in < 0.4 || r.To.X < toe-6 {
				t.Errorf("F = %.3f on %v: only %.0f %% of it in the weak soil", r.F, got.Slip.Nodes, 100*in)
			}
		})
	}
}

// TestPolylineSearchOnAwkwardSections runs the search where geometry degenerates: it must end, and what it returns must be a number.
func TestPolylineSearchOnAwkwardSections(t *testing.T) {
	soils := []Soil{{UnitWeight: 18, Cohesion: 8, Friction: 0.4}, {UnitWeight: 19, Cohesion: 1, Friction: 0.2}, {UnitWeight: 20, Cohesion: 30}}
	slope := Profile{{-20, 8}, {0, 8}, {14, 0}, {40, 0}}
	tests := []struct {
		name   string
		ground Profile
		strata []Profile // Below the first.
		firm   Profile
		known  Profile
	}{
		{"vertical face", Profile{{-20, 6}, {0, 6}, {0, 0}, {30, 0}}, []Profile{{{-20, 1}, {30, 1}}}, nil, nil},
		{"stratum of no thickness", slope, []Profile{{{-20, 2}, {40, 0}}, {{-20, 2}, {40, 0}}}, nil, nil},
		{"stratum that pinches out and outcrops", slope, []Profile{{{-20, 6}, {40, -3}}, {{-20, 4}, {40, -3.5}}}, nil, nil},
		{"boundary in steps", slope, []Profile{{{-20, 3}, {2, 3}, {2, 1}, {40, 1}}}, nil, nil},
		{"boundary on the ground", slope, []Profile{slope}, nil, nil},
		{"zigzag firm base", slope, nil, Profile{{-20, 1}, {-5, 4}, {5, -2}, {15, -1}, {40, -6}}, nil},
		{"firm base at the toe", slope, nil, Profile{{-20, 0}, {40, 0}}, nil},
		{"known slip with a steep scarp, partly in the air", slope, nil, nil, Profile{{-3, 9}, {-3, 5}, {4, 1}, {12, 1}, {20, 3}}},
		{"known slip along a boundary", slope, []Profile{{{-20, 2}, {40, -1}}}, nil, Profile{{-20, 2}, {40, -1}}},
		{"valley", Profile{{-20, 8}, {0, 8}, {10, 0}, {12, 0}, {22, 8}, {40, 8}}, []Profile{{{-20, 1}, {40, 1}}}, nil, nil},
		{"level ground", Profile{{-20, 0}, {40, 0}}, []Profile{{{-20, -2}, {40, -2}}}, nil, nil},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			s := &Section{Ground: tt.ground, Soils: soils, Strata: []Stratum{{0, tt.ground}}, FirmBase: tt.firm}
			for i, p := range tt.strata {
				s.Strata = append(s.Strata, Stratum{1 + i, p})
			}
			if tt.known != nil {
				s.Known = []KnownSlip{{Line: tt.known, Friction: 0.2}}
			}
			m := compiled(t, s, &Situation{Water: Water{Line: tt.ground}})
			found, err := m.Search(context.Background(), SearchOptions{MinDepth: 0.5, Polylines: true})
			if err != nil {
				t.Fatal(err)
			}
			if len(found.Basins) == 0 && tt.name != "level ground" {
				t.Error("no minimum")
			}
			for _, b := range found.Basins {
				if f := b.Result.F; !(f > 0) || math.IsInf(f, 0) {
					t.Errorf("F = %v on %v", f, b.Slip)
				}
			}
		})
	}
}

// TestStripLoad checks the search on weightless clay under a strip load: the lowest arc is 5.52 cu, the mechanism of Prandtl 5.14 cu (closed
// forms). At 5.14 cu the arc has F = 5.52/5.14; a polyline must come out lower.
func TestStripLoad(t *testing.T) {
	const cu, width = 20.0, 10.0
	g := Profile{{-40, 0}, {50, 0}}
	s := uniform(g, Soil{UnitWeight: 1e-4, Cohesion: cu})
	s.Loads = []Surcharge{{FromX: 0, ToX: width, Pressure: (2 + math.Pi) * cu}}
	m := compiled(t, s, &Situation{})
	o := SearchOptions{Window: Window{Direction: LeftwardOnly}}
	arc := lowestBy(t, m, Bishop, o).Result.F
	if !within(arc, 5.52/(2+math.Pi), 0.005) {
		t.Errorf("arc: F = %.4f, want %.4f (closed form: q = 4 theta/sin^2 theta cu at tan theta = 2 theta)", arc, 5.52/(2+math.Pi))
	}
	if f := lowestPolyline(t, m, Spencer, o).Result.F; !(f < arc) {
		t.Errorf("polyline: F = %.4f, not below %.4f of the arc", f, arc)
	}
}
