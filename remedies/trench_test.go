package remedies

import (
	"errors"
	"math"
	"strings"
	"testing"

	"standfast/lem"
	"standfast/optimize"
)

// benchJob returns the cutting as a bench with a level base of stiff clay and a water line along the ground, so that drains have one head.
func benchJob() *Job {
	j := cutting()
	ground := lem.Profile{{X: 0, Y: 103}, {X: 20, Y: 103}, {X: 40, Y: 103 - 1e-6}, {X: 80, Y: 103 - 1e-6}}
	j.Section.Ground, j.Section.Strata[0].Top = ground, ground
	j.Section.Strata[1].Top = lem.Profile{{X: 0, Y: 100}, {X: 80, Y: 100}}
	j.Crest, j.Toe = lem.Point{X: 20, Y: 103}, lem.Point{X: 40, Y: 103 - 1e-6}
	j.Waters[0].Line = lem.Profile{{X: 0, Y: 103}, {X: 80, Y: 103}}
	return j
}

func toStiffClay() map[string]int { return map[string]int{"low_permeability": stiffClay} }

// TestTrenchDrains checks drawdown and quantities where every number follows by hand: H = 3 m, clear spacing 6 m, S/H = 2.
func TestTrenchDrains(t *testing.T) {
	for facing, j := range map[string]*Job{"right": benchJob(), "left": mirrorJob(benchJob())} {
		t.Run(facing, func(t *testing.T) {
			p := apply(t, j, request("trench_drains", toStiffClay(), 3.5, 6.6, 0.6, nan, nan, nan))
			if len(p.Violations) > 0 {
				t.Fatal(p.Violations)
			}
			near(t, "dig", p.Quantities.TrenchDig, 20*3*0.6/6.6, 1e-5)
			near(t, "stone", p.Quantities.Stone, 20*3*0.6/6.6, 1e-5)
			near(t, "drain", p.Quantities.Drain, 20/6.6, 1e-9)
			near(t, "earthworks", p.Quantities.Earthworks(), 2*20*3*0.6/6.6, 1e-5)
			mid := 1 - midspanHead(2)
			for i, want := range []float64{0.5, 0.25, nan, nan} {
				d := p.Waters[i].Drains
				if math.IsNaN(want) {
					if d != nil {
						t.Errorf("situation %d is drained", i)
					}
					continue
				}
				near(t, "fade", d.Fade, 3, 1e-12)
				near(t, "left end", d.Invert.Left(), min(j.Crest.X, j.Toe.X), 0)
				near(t, "right end", d.Invert.Right(), max(j.Crest.X, j.Toe.X), 0)
				for k := range d.Ratio {
					near(t, "ratio", d.Ratio[k], want, 1e-6)
					near(t, "invert", d.Invert[k].Y, 100, 1e-9)
				}
				lowered := LoweredLine(&p.Waters[i])
				near(t, "line between drains", lowered.At((j.Crest.X+j.Toe.X)/2), 103-want*3, 1e-5)
				near(t, "line outside", lowered.At(j.Toe.X+10*j.Facing()), 103, 0)
			}
			var got []string
			for _, c := range Checks(j, p) {
				got = append(got, c.Name+"/"+c.Note)
				if c.Note == midspanNote {
					near(t, "midspan ratio", c.Situation.Water.Drains.Ratio[0], mid*j.Situations[c.SituationI].DrainsWorking, 1e-6)
					near(t, "required", c.Required, j.Situations[c.SituationI].RequiredFS, 0)
				}
			}
			want := "high water/,high water/midspan between drains,drains clogged/,drains clogged/midspan between drains,artesian/,dry/"
			if s := strings.Join(got, ","); s != want {
				t.Errorf("checks %s, want %s", s, want)
			}
		})
	}
}

// TestLoweredLine compares the lowered line with its definition at every station of drains down a slope.
func TestLoweredLine(t *testing.T) {
	j := cutting()
	p := apply(t, j, request("trench_drains", toStiffClay(), 4, 5, 0.6, nan, nan, nan))
	if len(p.Violations) > 0 {
		t.Fatal(p.Violations)
	}
	w := &p.Waters[0]
	lowered := LoweredLine(w)
	rises := 0
	for i, q := range w.Drains.Invert[1 : len(w.Drains.Invert)-1] {
		r := w.Drains.Ratio[i+1]
		near(t, "lowered line", lowered.At(q.X), w.Line.At(q.X)-r*max(0, w.Line.At(q.X)-q.Y), 1e-9)
		if r != w.Drains.Ratio[i] {
			rises++
		}
	}
	if rises < 10 {
		t.Errorf("the ratio varies at %d stations only", rises)
	}
	for i := 1; i < len(lowered); i++ {
		if x := lowered[i].X; x == lowered[i-1].X && x != w.Drains.Invert.Left() && x != w.Drains.Invert.Right() {
			t.Errorf("step in the lowered line at x = %g", x)
		}
	}
	if first := w.Drains.Invert[0]; lowered.At(first.X-1e-6) != w.Line.At(first.X-1e-6) {
		t.Error("lowered beyond the end of the drains")
	}
	dry := lem.Water{}
	if LoweredLine(&dry) != nil {
		t.Error("dry ground has got a line")
	}
}

// TestGivenEffectiveness checks that a given share is used as it is, with a parabola for midspan, and needs no firm base.
func TestGivenEffectiveness(t *testing.T) {
	p := apply(t, benchJob(), request("trench_drains", nil, 2, 6.6, 0.6, 0.7, 22, 36))
	near(t, "ratio", p.Waters[0].Drains.Ratio[0], 0.7, 0)
	near(t, "half working", p.Waters[1].Drains.Ratio[0], 0.35, 1e-15)
	near(t, "midspan", Checks(benchJob(), p)[1].Situation.Water.Drains.Ratio[0], 1-1.5*0.3, 1e-15)
	near(t, "invert", p.Waters[0].Drains.Invert.At(30), 101, 1e-6)
	near(t, "from", p.Waters[0].Drains.Invert.Left(), 22, 0)
	near(t, "to", p.Waters[0].Drains.Invert.Right(), 36, 0)
}

// TestOutletHeldUp checks that a trench runs shallower towards an outfall that its depth would not reach, and that an outfall above the
// ground is a violation.
func TestOutletHeldUp(t *testing.T) {
	j := benchJob()
	outfall := 101.5
	j.Limits.Outfall = &outfall
	p := apply(t, j, request("trench_drains", nil, 2, 6.6, 0.6, 0.7, 22, 36))
	if len(p.Violations) != 0 {
		t.Fatalf("violations %+v", p.Violations)
	}
	near(t, "invert", p.Waters[0].Drains.Invert.At(30), outfall, 1e-9)
	near(t, "dig", p.Quantities.TrenchDig, 14*1.5*0.6/6.6, 1e-5)
	outfall = 103.5
	p = apply(t, j, request("trench_drains", nil, 2, 6.6, 0.6, 0.7, 22, 36))
	if len(p.Violations) != 1 || !strings.Contains(p.Violations[0].Detail, "cannot discharge") {
		t.Fatalf("violations %+v", p.Violations)
	}
}

func TestTrenchDrainFaults(t *testing.T) {
	outfall := 100.5
	tests := []struct {
		name    string
		request Request
		limit   string
		detail  string
		by      float64
	}{
		{"too shallow", request("trench_drains", toStiffClay(), 2, 6, 0.6, nan, nan, nan), "low_permeability", "do not reach the top of stiff clay at x = 20.00 m, 3.00 m below ground: deepen them or give an effectiveness", 1},
		{"too close", request("trench_drains", toStiffClay(), 4, 0.6, 0.6, nan, nan, nan), "layout of the trench drains", "leave no ground between them", 0},
		{"outside", request("trench_drains", toStiffClay(), 4, 6, 0.6, nan, 20, 90), "layout of the trench drains", "reach outside the section", 10},
		{"no length", request("trench_drains", toStiffClay(), 4, 6, 0.6, nan, 30, 30), "layout of the trench drains", "have no length", 0},
		{"held up by the outfall", request("trench_drains", toStiffClay(), 4, 6, 0.6, nan, nan, nan), "outfall", "keeps trench drains 0.50 m above the top of stiff clay", 0.5},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			j := benchJob()
			j.Limits.Outfall = &outfall
			p := apply(t, j, tt.request)
			if len(p.Violations) != 1 || p.Violations[0].Limit != tt.limit || !strings.Contains(p.Violations[0].Detail, tt.detail) {
				t.Fatalf("violations %+v, want %q: %q", p.Violations, tt.limit, tt.detail)
			}
			near(t, "by", p.Violations[0].By, tt.by, 1e-5)
			if got, want := len(Checks(j, p)), 6; got != want {
				t.Errorf("%d checks, want %d whatever the size", got, want)
			}
			if p.Waters[0].FreeDrainingLevel != outfall || !p.Waters[0].HasFreeDrainingLevel {
				t.Error("free-draining soils do not fill to the outfall")
			}
		})
	}
}

// TestPinchedOutBase checks that drains cannot rest on a stratum that is not there.
func TestPinchedOutBase(t *testing.T) {
	j := benchJob()
	j.Section.Strata = append(j.Section.Strata, lem.Stratum{Soil: rockfill, Top: lem.Profile{{X: 0, Y: 90}, {X: 30, Y: 90}, {X: 31, Y: 101}, {X: 80, Y: 101}}})
	p := apply(t, j, request("trench_drains", toStiffClay(), 4, 6, 0.6, nan, nan, nan))
	if len(p.Violations) != 1 || !strings.Contains(p.Violations[0].Detail, "does not lie under the whole length") {
		t.Errorf("violations %v", p.Violations)
	}
}

func TestRequestFaults(t *testing.T) {
	bad := request("berm", fillOf(sandFill), 2, 5, 2)
	bad.Axes[0].Max = 99
	misnamed := request("berm", fillOf(sandFill), 2, 5, 2)
	misnamed.Axes[1].Name = "width"
	tests := []struct {
		name    string
		request Request
		want    string
	}{
		{"no effectiveness and no base", request("trench_drains", nil, 3, 6, 0.6, nan, nan, nan), "name the soil that they reach down to under low_permeability, or give an effectiveness"},
		{"base is no stratum", request("trench_drains", map[string]int{"low_permeability": rockfill}, 3, 6, 0.6, nan, nan, nan), `"rockfill", which is no stratum`},
		{"buttress of clay", request("buttress", fillOf(clay), 3, 4, 1.5), `fill "clay" is not free-draining`},
		{"berm without fill", request("berm", nil, 2, 5, 2), "fill names no soil"},
		{"no such soil", request("berm", fillOf(9), 2, 5, 2), "fill is soil 9 of 5"},
		{"out of range", bad, "height from 2 to 99 must lie within 0.1 to 50"},
		{"misnamed", misnamed, `parameter 2 is "top_width", not "width"`},
		{"unknown", Request{Kind: "moat"}, `no remedy "moat"`},
		{"too few", Request{Kind: "berm", Soils: fillOf(sandFill)}, "berm has 4 parameters, not 0"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			_, err := NewRemedies(cutting(), []Request{tt.request})
			if !errors.Is(err, ErrRequest) || !strings.Contains(err.Error(), tt.want) {
				t.Errorf("error %v, want %q", err, tt.want)
			}
		})
	}
}

// TestDefaultRequests makes every kind with its defaults, at both ends of every axis.
func TestDefaultRequests(t *testing.T) {
	for _, k := range Catalogue() {
		t.Run(k.Name, func(t *testing.T) {
			r := DefaultRequest(&k)
			for _, c := range k.Choices {
				r.Soils[c.Name] = map[string]int{"fill": rockfill, "low_permeability": stiffClay, "blanket_fill": noSoil}[c.Name]
				if r.Soils[c.Name] == noSoil {
					delete(r.Soils, c.Name)
				}
			}
			if k.Name == "lightweight_fill" {
				r.Soils["fill"] = lightFill
			}
			for i, p := range k.Parameters { // Numbers that nobody but the user can know.
				switch p.Name {
				case "permeability":
					r.Axes[i] = optimize.Axis{Name: p.Name, Min: 1e-6, Max: 1e-6}
				case "recharge":
					r.Axes[i] = optimize.Axis{Name: p.Name, Min: 1e-8, Max: 1e-8}
				}
			}
			if _, err := NewRemedies(cutting(), []Request{r}); err != nil {
				t.Error(err)
			}
			for i, a := range DefaultRequest(&k).Axes {
				if optional := k.Parameters[i].Optional; optional != (a.Name == "") || (!optional && a.Name != k.Parameters[i].Name) {
					t.Errorf("axis %d of the default is named %q", i, a.Name)
				}
			}
		})
	}
}
