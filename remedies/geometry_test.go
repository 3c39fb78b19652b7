package remedies

import (
	"math"
	"strings"
	"testing"

	"standfast/lem"
)

// TestAreas checks quantities against closed forms of plane geometry.
func TestAreas(t *testing.T) {
	fill := fillOf(sandFill)
	tests := []struct {
		name      string
		request   Request
		cut, fill float64
		strip     float64
		source    string
	}{
		{
			name: "flatten 1:2.5 to 1:3 about the toe", request: request("regrade", nil, 3, 0), cut: 20.25,
			strip: 9*math.Sqrt(1+2.5*2.5) + 4.5, source: "closed form: (3 - 2.5) 9^2/2; strip: face and top of the triangle cut",
		},
		{
			name: "flatten about the middle of the face", request: request("regrade", fill, 3, 0.5), cut: 0.5 * 4.5 * 4.5 / 2, fill: 0.5 * 4.5 * 4.5 / 2,
			strip: 9*math.Sqrt(1+2.5*2.5) + 4.5, source: "closed form: (3 - 2.5) 4.5^2/2 above and below the pivot",
		},
		{
			name: "flatten about the crest", request: request("regrade", fill, 3, 1), fill: 20.25,
			strip: 9*math.Sqrt(1+2.5*2.5) + 4.5, source: "closed form: (3 - 2.5) 9^2/2",
		},
		{name: "same batter", request: request("regrade", nil, 2.5, 0), source: "no works"},
		{
			name: "berm", request: request("berm", fill, 2.5, 6, 2), fill: 2.5*6 + 0.5*(2-2.5)*2.5*2.5,
			strip: 2.5*math.Sqrt(1+2.5*2.5) + 6 - 1.25, source: "closed form: w h + (m - n) h^2/2 with n the face",
		},
		{
			name: "buttress", request: request("buttress", fillOf(rockfill), 3, 4, 1.5), fill: 3*4 + 0.5*(1.5-2.5)*9,
			strip: 3*math.Sqrt(1+2.5*2.5) + 4 - 3, source: "closed form: w h + (m - n) h^2/2",
		},
		{
			// Platform 2 m down comes out at x = 35, its back is at 28.5, the batter's top at 24.5.
			name: "unload", request: request("unload", nil, 2, 6.5, 2), cut: 2*(6.5+10.5)/2 - 2.5*2*2/2,
			strip: 5.5 + 2*math.Sqrt(1+2.5*2.5), source: "closed form: trapezium to x = 35 less the triangle outside the face",
		},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			for facing, j := range map[string]*Job{"right": cutting(), "left": mirrorJob(cutting())} {
				p := apply(t, j, tt.request)
				if len(p.Violations) > 0 {
					t.Fatalf("facing %s: violations %v", facing, p.Violations)
				}
				near(t, "cut", p.Quantities.TotalCut(), tt.cut, 1e-9)
				near(t, "fill", p.Quantities.TotalFill(), tt.fill, 1e-9)
				near(t, "strip", p.Quantities.Strip, tt.strip, 1e-9)
			}
		})
	}
}

// TestCutBySoil splits a cut by soil where a stratum pinches out and a body is painted over the strata; areas by hand.
func TestCutBySoil(t *testing.T) {
	j := cutting()
	level := lem.Profile{{X: 0, Y: 109}, {X: 30, Y: 109}, {X: 52.5, Y: 100}, {X: 80, Y: 100}}
	j.Section.Ground, j.Section.Strata[0].Top = level, level
	// The stiff clay rises above the clay left of x = 27 and lies out of reach right of it.
	j.Section.Strata[1].Top = lem.Profile{{X: 0, Y: 112}, {X: 27, Y: 112}, {X: 27, Y: 90}, {X: 80, Y: 90}}
	j.Section.Placed = []lem.Body{{Soil: rockfill, Outline: []lem.Point{{X: 28.5, Y: 109}, {X: 30, Y: 109}, {X: 30, Y: 108}, {X: 28.5, Y: 108}}}}
	p := apply(t, j, request("unload", nil, 2, 6.5, 2))
	near(t, "stiff clay", p.Quantities.Cut[stiffClay], 2.5*2.5/2/2, 1e-9) // triangle x = 24.5 to 27 under 1V:2H
	near(t, "body", p.Quantities.Cut[rockfill], 1.5, 1e-9)
	near(t, "clay", p.Quantities.Cut[clay], 12-2.5*2.5/2/2-1.5, 1e-9)
}

// TestShapes checks the new ground point by point.
func TestShapes(t *testing.T) {
	tests := []struct {
		name    string
		request Request
		want    lem.Profile
	}{
		{"flatten", request("regrade", nil, 3, 0), lem.Profile{{X: 0, Y: 109}, {X: 25.5, Y: 109}, {X: 52.5, Y: 100}, {X: 80, Y: 100}}},
		{"unload", request("unload", nil, 2, 6.5, 2), lem.Profile{{X: 0, Y: 109}, {X: 24.5, Y: 109}, {X: 28.5, Y: 107}, {X: 35, Y: 107}, {X: 52.5, Y: 100}, {X: 80, Y: 100}}},
		{"berm", request("berm", fillOf(sandFill), 2.5, 6, 2), lem.Profile{{X: 0, Y: 109}, {X: 30, Y: 109}, {X: 46.25, Y: 102.5}, {X: 52.25, Y: 102.5}, {X: 57.25, Y: 100}, {X: 80, Y: 100}}},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			samePoints(t, apply(t, cutting(), tt.request).Section.Ground, tt.want)
			samePoints(t, apply(t, mirrorJob(cutting()), tt.request).Section.Ground, tt.want.Mirror())
		})
	}
}

func samePoints(t *testing.T, got, want []lem.Point) {
	t.Helper()
	if len(got) != len(want) {
		t.Fatalf("points %v, want %v", got, want)
	}
	for i := range got {
		if math.Hypot(got[i].X-want[i].X, got[i].Y-want[i].Y) > 1e-9 {
			t.Errorf("points %v, want %v", got, want)
			return
		}
	}
}

// TestBermBody checks the outline of a placed body: on the face, clockwise, no point too many.
func TestBermBody(t *testing.T) {
	p := apply(t, cutting(), request("berm", fillOf(sandFill), 2.5, 6, 2))
	if len(p.Section.Placed) != 1 || p.Section.Placed[0].Soil != sandFill {
		t.Fatalf("placed %v", p.Section.Placed)
	}
	samePoints(t, p.Section.Placed[0].Outline, []lem.Point{{X: 46.25, Y: 102.5}, {X: 52.25, Y: 102.5}, {X: 57.25, Y: 100}, {X: 52.5, Y: 100}})
}

// TestVerticalFace regrades and loads a slope that is a wall.
func TestVerticalFace(t *testing.T) {
	// A wall whose crest and toe share one x has no facing: the face here leans by 10 mm.
	const lean = 0.01
	j := cutting()
	wall := lem.Profile{{X: 0, Y: 104}, {X: 40, Y: 104}, {X: 40, Y: 101}, {X: 40 + lean, Y: 101}, {X: 40 + lean, Y: 100}, {X: 80, Y: 100}}
	j.Section.Ground, j.Section.Strata[0].Top = wall, wall
	j.Section.Strata[1].Top = lem.Profile{{X: 0, Y: 95}, {X: 80, Y: 95}}
	j.Crest, j.Toe = lem.Point{X: 40, Y: 104}, lem.Point{X: 40 + lean, Y: 100}
	for facing, j := range map[string]*Job{"right": j, "left": mirrorJob(j)} {
		t.Run(facing, func(t *testing.T) {
			p := apply(t, j, request("regrade", nil, 2, 0))
			near(t, "cut", p.Quantities.TotalCut(), 4*8/2-3*lean, 1e-9)
			p = apply(t, j, request("berm", fillOf(sandFill), 2, 3, 2))
			near(t, "fill", p.Quantities.TotalFill(), 2*3+2*2*2/2.0-lean, 1e-9)
			p = apply(t, j, request("unload", nil, 2, 3, 1))
			near(t, "cut", p.Quantities.TotalCut(), 2*3+2*2*1/2.0, 1e-9)
			if len(p.Violations) > 0 {
				t.Errorf("violations %v", p.Violations)
			}
		})
	}
}

// TestFaults lists the shapes that do not exist, or must not be, with the words in which that is said.
func TestFaults(t *testing.T) {
	fill := fillOf(sandFill)
	tests := []struct {
		name    string
		request Request
		limit   string
		detail  string
		by      float64
	}{
		{"regrade needs fill", request("regrade", nil, 3, 0.5), "fill", "runs 0.75 m above the ground at x = 52.50 m and no fill soil is named", 0.75},
		{"regrade steeper", request("regrade", nil, 2, 0), "ground within the section", "steeper than the slope", 0},
		{"regrade off the section", request("regrade", nil, 7, 0), "ground within the section", "meets no ground at its top", 109 - (100 + 52.5/7)},
		{"unload below toe", request("unload", nil, 10, 5, 2), "shape of the platform", "10.00 m below the crest lies below the toe, 9.00 m", 1},
		{"unload undercuts", request("unload", nil, 4, 1, 1), "shape of the platform", "comes out on the face at x = 38.33 m, short of the crest at x = 30.00 m", 8 + 1.0/3},
		{"unload off the section", request("unload", nil, 2, 34, 4), "ground within the section", "back batter at 1V:4.0H meets no ground", 1.75},
		{"berm above crest", request("berm", fill, 9.5, 5, 2), "shape of the berm", "9.50 m above the toe lies above the crest, 9.00 m", 0.5},
		{"berm off the section", request("berm", fill, 5, 20, 10), "ground within the section", "outer face of berm at 1V:10.0H meets no ground", 5 - (80-60)/10},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			p := apply(t, cutting(), tt.request)
			if len(p.Violations) != 1 {
				t.Fatalf("violations %v, want one", p.Violations)
			}
			v := p.Violations[0]
			if v.Limit != tt.limit || !strings.Contains(v.Detail, tt.detail) {
				t.Errorf("violation %+v, want limit %q and detail with %q", v, tt.limit, tt.detail)
			}
			near(t, "by", v.By, tt.by, 1e-9)
		})
	}
}

// TestRunsAbove parts stretches that touch in a point, so that each outline is simple.
func TestRunsAbove(t *testing.T) {
	ground := lem.Profile{{X: 0, Y: 0}, {X: 1, Y: -1}, {X: 2, Y: 0}, {X: 3, Y: -2}, {X: 4, Y: 0}, {X: 5, Y: 1}, {X: 6, Y: 1}}
	runs := runsAbove(lem.Profile{{X: 0, Y: 0}, {X: 6, Y: 0}}, ground)
	if len(runs) != 2 {
		t.Fatalf("%d runs, want 2", len(runs))
	}
	near(t, "first", runs[0].area, 1, 1e-12)
	near(t, "second", runs[1].area, 2, 1e-12)
	samePoints(t, runs[1].outline(), []lem.Point{{X: 2, Y: 0}, {X: 4, Y: 0}, {X: 3, Y: -2}})
}

// TestPathLeavesOut lists the points that a path does not keep.
func TestPathLeavesOut(t *testing.T) {
	tests := []struct {
		name string
		add  []lem.Point
		want []lem.Point
	}{
		{"repeated", []lem.Point{{X: 0, Y: 0}, {X: 0, Y: 1e-12}, {X: 1, Y: 1}}, []lem.Point{{X: 0, Y: 0}, {X: 1, Y: 1}}},
		{"on the way", []lem.Point{{X: 0, Y: 0}, {X: 1, Y: 1}, {X: 2, Y: 2}, {X: 3, Y: 3}}, []lem.Point{{X: 0, Y: 0}, {X: 3, Y: 3}}},
		{"on a step", []lem.Point{{X: 0, Y: 0}, {X: 0, Y: 1}, {X: 0, Y: 2}, {X: 1, Y: 3}}, []lem.Point{{X: 0, Y: 0}, {X: 0, Y: 2}, {X: 1, Y: 3}}},
		{"spike on a step", []lem.Point{{X: 0, Y: 0}, {X: 0, Y: 3}, {X: 0, Y: 2}, {X: 1, Y: 3}}, []lem.Point{{X: 0, Y: 0}, {X: 0, Y: 2}, {X: 1, Y: 3}}},
		{"nearly a step", []lem.Point{{X: 0, Y: 0}, {X: 1, Y: 0}, {X: 1 + 1e-12, Y: 2}}, []lem.Point{{X: 0, Y: 0}, {X: 1, Y: 0}, {X: 1, Y: 2}}},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			var p path
			for _, q := range tt.add {
				p.add(q.X, q.Y)
			}
			samePoints(t, p, tt.want)
		})
	}
}
