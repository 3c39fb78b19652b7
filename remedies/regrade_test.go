package remedies

import (
	"math"
	"strings"
	"testing"

	"standfast/lem"
	"standfast/optimize"
)

// TestBenches checks faces with benches against plane geometry: height 9 m, face 1V:2.5H, crest at x = 30, toe at x = 52.5.
func TestBenches(t *testing.T) {
	tests := []struct {
		name      string
		x         []float64
		cut, fill float64
		ground    lem.Profile // Between the level stretches.
		source    string
	}{
		{
			name: "one at mid-height", x: []float64{2.5, 0, 1, nan, nan, 4}, cut: 4 * 4.5,
			ground: lem.Profile{{X: 26, Y: 109}, {X: 37.25, Y: 104.5}, {X: 41.25, Y: 104.5}, {X: 52.5, Y: 100}},
			source: "closed form: the face above is set back by the width of the bench",
		},
		{
			name: "two in thirds", x: []float64{2.5, 0, 2, nan, nan, 3}, cut: 3*(9-3) + 3*(9-6),
			ground: lem.Profile{{X: 24, Y: 109}, {X: 31.5, Y: 106}, {X: 34.5, Y: 106}, {X: 42, Y: 103}, {X: 45, Y: 103}, {X: 52.5, Y: 100}},
			source: "closed form: each bench sets the face above it back",
		},
		{
			name: "interval and first level", x: []float64{2.5, 0, 2, 2, 5, 1}, cut: 1*(9-5) + 1*(9-7),
			ground: lem.Profile{{X: 28, Y: 109}, {X: 33, Y: 107}, {X: 34, Y: 107}, {X: 39, Y: 105}, {X: 40, Y: 105}, {X: 52.5, Y: 100}},
			source: "closed form",
		},
		{
			name: "flatter above the bench", x: []float64{2.5, 0, 1, nan, nan, 4, 3}, cut: 4*4.5 + 0.5*4.5*4.5/2,
			ground: lem.Profile{{X: 23.75, Y: 109}, {X: 37.25, Y: 104.5}, {X: 41.25, Y: 104.5}, {X: 52.5, Y: 100}},
			source: "closed form: with the triangle between 1V:2.5H and 1V:3H",
		},
		{
			// The face below the bench passes through mid-height; above the bench at 6 m it is set back by 2 m.
			name: "pivot at mid-height", x: []float64{3, 0.5, 1, nan, 6, 2}, cut: 0.5*4.5*4.5/2 + 2*(9-6), fill: 0.5 * 4.5 * 4.5 / 2,
			ground: lem.Profile{{X: 25.75, Y: 109}, {X: 34.75, Y: 106}, {X: 36.75, Y: 106}, {X: 54.75, Y: 100}},
			source: "closed form: cut above the pivot, fill below it, and the set-back",
		},
		{name: "none", x: []float64{3, 0, 0, nan, nan, 2}, cut: 20.25, ground: lem.Profile{{X: 25.5, Y: 109}, {X: 52.5, Y: 100}}, source: "closed form: (3 - 2.5) 9^2/2"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			want := append(append(lem.Profile{{X: 0, Y: 109}}, tt.ground...), lem.Point{X: 80, Y: 100})
			r := request("regrade", fillOf(sandFill), tt.x...)
			for facing, j := range map[string]*Job{"right": cutting(), "left": mirrorJob(cutting())} {
				p := apply(t, j, r)
				if len(p.Violations) > 0 {
					t.Fatalf("facing %s: %v", facing, p.Violations)
				}
				near(t, "cut", p.Quantities.TotalCut(), tt.cut, 1e-9)
				near(t, "fill", p.Quantities.TotalFill(), tt.fill, 1e-9)
				if facing == "right" {
					samePoints(t, p.Section.Ground, want)
				} else {
					samePoints(t, p.Section.Ground, want.Mirror())
				}
			}
		})
	}
}

// TestBenchesBetween: the estimate with continuous sizes asks for numbers of benches that are none; the nearest whole one is drawn.
func TestBenchesBetween(t *testing.T) {
	j := cutting()
	r := request("regrade", nil, 2.6, 0, 0, nan, nan, 2)
	r.Axes[regradeBenches] = optimize.Axis{Name: "benches", Min: 0, Max: 2, Step: 1}
	at := func(benches float64) *Proposal {
		p, err := Apply(j, []Request{r}, [][]float64{{2.6, 0, benches, nan, nan, 2, nan}})
		if err != nil {
			t.Fatal(err)
		}
		return p
	}
	for _, c := range [][2]float64{{0.05, 0}, {0.49, 0}, {0.51, 1}, {1.4, 1}, {1.6, 2}} {
		got, want := at(c[0]), at(c[1])
		samePoints(t, got.Section.Ground, want.Section.Ground)
		near(t, "cut", got.Quantities.TotalCut(), want.Quantities.TotalCut(), 1e-12)
	}
}

// TestBenchFaults lists benches that cannot be, and requests that make no sense.
func TestBenchFaults(t *testing.T) {
	p := apply(t, cutting(), request("regrade", nil, 2.5, 0, 2, 4.5, nan, 2))
	if len(p.Violations) != 1 || !p.Violations[0].Geometry || !strings.Contains(p.Violations[0].Detail, "bench 2, 9.00 m above the toe, does not lie below the crest") {
		t.Errorf("violations %+v", p.Violations)
	}
	half := request("regrade", nil, 2.5, 0, 0, nan, nan, 2)
	half.Axes[regradeBenches] = optimize.Axis{Name: "benches", Min: 0, Max: 2, Step: 0.5}
	tests := []struct {
		name    string
		request Request
		want    string
	}{
		{"width without number", request("regrade", nil, 2.5, 0, nan, nan, nan, 3), "need benches: give their number"},
		{"number without width", request("regrade", nil, 2.5, 0, 1), "benches need a width: give bench_width"},
		{"half a bench", half, "benches is a whole number"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			if _, err := NewRemedies(cutting(), []Request{tt.request}); err == nil || !strings.Contains(err.Error(), tt.want) {
				t.Errorf("error %v, want %q", err, tt.want)
			}
		})
	}
}

// TestFormLimits checks the limits on batters, benches, haul widths and overhead clearance, on either side of each.
func TestFormLimits(t *testing.T) {
	berm := request("berm", fillOf(sandFill), 2.5, 4, 2)
	benched := request("regrade", nil, 2.5, 0, 1, nan, nan, 3)
	tests := []struct {
		name    string
		limits  Limits
		request Request
		limit   string
		by      float64
		detail  string
	}{
		{"mowing", Limits{Batters: Batters{Permanent: 3}}, request("regrade", nil, 2.6, 0), limitBatter, 0.4, "face of regraded face at 1V:2.6H is steeper than the steepest permanent batter, 1V:3.0H"},
		{"mowing kept", Limits{Batters: Batters{Permanent: 2.6}}, request("regrade", nil, 2.6, 0), "", 0, ""},
		{"mowing a berm", Limits{Batters: Batters{Permanent: 2.5}}, berm, limitBatter, 0.5, "1V:2.0H"},
		{"rockfill is not mown", Limits{Batters: Batters{Permanent: 2.5}}, request("buttress", fillOf(rockfill), 2, 4, 1.5), "", 0, ""},
		{"back batter", Limits{Batters: Batters{Permanent: 3}}, request("unload", nil, 2, 6.5, 2), limitBatter, 1, "1V:2.0H"},
		{"temporary limit alone", Limits{Batters: Batters{Temporary: 3}}, berm, "", 0, ""},
		{"narrow bench", Limits{MinBench: 3.5}, benched, limitBench, 0.5, "bench is 3.00 m wide, minimum bench width is 3.50 m"},
		{"wide enough", Limits{MinBench: 3, MinHaul: 4}, benched, "", 0, ""},
		{"narrow berm", Limits{MinHaul: 5}, berm, limitHaul, 1, "top of berm is 4.00 m wide"},
		{"narrow platform", Limits{MinHaul: 7}, request("unload", nil, 2, 6.5, 2), limitHaul, 0.5, "platform is 6.50 m wide"},
		{"wire", Limits{Overhead: []Overhead{{Name: "wire", FromX: 40, ToX: 60, Level: 108, Clearance: 6}}}, berm, "wire", 0.5, "berm rises 0.50 m into the clearance of wire"},
		{"wire clear", Limits{Overhead: []Overhead{{Name: "wire", FromX: 40, ToX: 60, Level: 108.5, Clearance: 6}}}, berm, "", 0, ""},
		{"wire elsewhere", Limits{Overhead: []Overhead{{Name: "wire", FromX: 0, ToX: 20, Level: 108, Clearance: 6}}}, berm, "", 0, ""},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			j := cutting()
			j.Limits = tt.limits
			p := apply(t, j, tt.request)
			if tt.limit == "" {
				if len(p.Violations) > 0 {
					t.Errorf("violations %+v", p.Violations)
				}
				return
			}
			if len(p.Violations) != 1 || p.Violations[0].Limit != tt.limit || !strings.Contains(p.Violations[0].Detail, tt.detail) {
				t.Fatalf("violations %+v, want %q: %q", p.Violations, tt.limit, tt.detail)
			}
			near(t, "by", p.Violations[0].By, tt.by, 1e-9)
			if math.IsNaN(p.Violations[0].By) {
				t.Error("by is not a number")
			}
		})
	}
}
