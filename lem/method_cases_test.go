package lem

import (
	"strings"
	"testing"
)

// methodCase is an invented section with a slip that every method solves.
type methodCase struct {
	name string
	s    *Section
	sit  *Situation
	slip Slip
}

// cutting is an invented slope of three strata with a water line; the circle and the polyline pass through all of them.
func cutting() (*Section, *Situation) {
	ground := Profile{{0, 12}, {20, 12}, {45, 2}, {70, 2}}
	s := &Section{Ground: ground, Soils: []Soil{
		{UnitWeight: 18.5, Cohesion: 2, Friction: 28 * degree},
		{UnitWeight: 19.5, Cohesion: 6, Friction: 24 * degree},
		{UnitWeight: 20, Cohesion: 10, Friction: 22 * degree},
	}, Strata: []Stratum{{0, ground}, {1, Profile{{0, 8}, {70, 5}}}, {2, Profile{{0, 4}, {70, 1}}}}}
	return s, &Situation{Water: Water{Line: Profile{{0, 9}, {20, 8}, {45, 2}, {70, 2}}}}
}

var (
	cuttingCircle   = Slip{Centre: Point{36, 24}, Radius: 23.5}
	cuttingPolyline = Slip{Kind: Polyline, Nodes: []Point{{14, 12}, {20, 5}, {30, 1}, {42, 0.5}, {47, 2}}}
)

// methodCases returns the cutting with and without earthquake, free water and surcharges, on a circle and on a polyline, both ways round.
func methodCases() []methodCase {
	var out []methodCase
	for _, load := range []string{"plain", "quake", "pool", "pool and quake", "surcharges", "all at once"} {
		for _, slip := range []Slip{cuttingCircle, cuttingPolyline} {
			s, sit := cutting()
			if strings.Contains(load, "quake") {
				sit.Kh = 0.1
			}
			if strings.Contains(load, "pool") {
				sit.Water.Free = []FreeWater{{5, 20, 70}}
			}
			if load == "surcharges" {
				s.Loads = []Surcharge{{FromX: 5, ToX: 15, Pressure: 10}, {FromX: 15, ToX: 20, Pressure: 20, Variable: true}, {FromX: 45, ToX: 60, Pressure: 15, Variable: true}}
			}
			if load == "all at once" {
				sit.Kh, sit.Kv = 0.05, -0.04
				sit.Water.Free = []FreeWater{{3, 20, 70}}
				s.Crack = &TensionCrack{Depth: 1.5, WaterShare: 0.7}
				s.Soils[2].PowerLaw = &PowerLaw{A: 0.9, B: 0.8}
				s.LineLoads = []LineLoad{{X: 18.2, Vertical: 15, Horizontal: 4}}
				s.Loads = []Surcharge{{FromX: 22, ToX: 30, Pressure: 4, Rise: 6, Shear: 1}, {FromX: 16, ToX: 20, Pressure: 12, Shear: 2, Variable: true}}
			}
			name := load + " circle"
			if slip.Kind == Polyline {
				name = load + " polyline"
			}
			out = append(out, methodCase{name, s, sit, slip})
			back, water := mirrored(s, sit)
			water.Kv, back.Crack = sit.Kv, s.Crack
			for i := range back.Loads {
				l := &back.Loads[i]
				l.Pressure, l.Rise, l.Shear = l.Pressure+l.Rise, -l.Rise, -l.Shear
			}
			for _, l := range s.LineLoads {
				back.LineLoads = append(back.LineLoads, LineLoad{X: -l.X, Vertical: l.Vertical, Horizontal: -l.Horizontal})
			}
			out = append(out, methodCase{name + " leftward", back, water, mappedSlip(slip, func(p Point) Point { return Point{-p.X, p.Y} }, 1, true)})
		}
	}
	return out
}

// hump is a side-force function given by ordinates.
var hump = SideForce{Shape: Given, Ordinates: [SideOrdinates]float64{0.2, 0.6, 0.9, 1, 1, 0.9, 0.8, 0.7, 0.5, 0.4, 0.2}}

// settings returns a setting for every method on a kind of slip, Morgenstern-Price with three functions.
func settings(kind SlipKind) []Setting {
	out := []Setting{{Method: Ordinary}}
	if kind == Circle {
		out = append(out, Setting{Method: Bishop})
	}
	return append(out, Setting{Method: Spencer}, Setting{Method: MorgensternPrice}, Setting{Method: MorgensternPrice, SideForce: SideForce{Shape: Constant}},
		Setting{Method: MorgensternPrice, SideForce: hump}, Setting{Method: JanbuPlain}, Setting{Method: Janbu})
}

func BenchmarkMethods(b *testing.B) {
	s, sit := cutting()
	m := compiled(b, s, sit)
	for _, c := range []struct {
		name string
		slip Slip
	}{{"circle", cuttingCircle}, {"polyline", cuttingPolyline}} {
		for method := range numMethods {
			if method == Bishop && c.slip.Kind == Polyline {
				continue
			}
			b.Run(c.name+"/"+method.String(), func(b *testing.B) {
				var ws Workspace
				o := Setting{Method: method}
				r := evaluate(b, m, c.slip, o)
				b.ReportAllocs()
				for b.Loop() {
					m.FS(&ws, &c.slip, o)
				}
				b.ReportMetric(float64(r.Slices), "slices")
			})
		}
	}
}
