package sheet

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"standfast/cmd/internal/report"
)

// invented is a made-up result: one situation that requires 1.30 and a stage that requires 1.10, a slope that stands at existing, and one
// option with these statuses, FS and earthworks, sized anew for the shifts given.
func invented(existing float64, status string, fs, works float64, points ...report.TradePoint) *report.File {
	ground := []report.Point{{0, 10}, {20, 10}, {40, 0}, {60, 0}}
	section := func() *report.Section {
		return &report.Section{GroundBefore: ground, Ground: ground, Strata: []report.Stratum{{Soil: "clay", Top: ground}}}
	}
	answer := func(v float64) []report.Answer {
		return []report.Answer{{Name: "normal", RequiredFS: 1.3, Found: report.Found{FS: report.Number(v), Resolved: true}}}
	}
	least := "berm"
	f := &report.File{
		Case:       report.Case{Title: "Made-up Bank", Length: 10, Crest: report.Point{20, 10}, Toe: report.Point{40, 0}},
		Settings:   report.Settings{Allowance: 0.005},
		Situations: []report.Situation{{Name: "normal", RequiredFS: 1.3}},
		Existing:   report.Option{Name: "existing", Status: "existing", Section: section(), Situations: answer(existing)},
		Options: []report.Option{{
			Name: "berm", Title: "toe berm", Remedies: []string{"berm"}, Status: status, Section: section(), Situations: answer(fs),
			Quantities: report.Quantities{Fill: works, Earthworks: works}, Tradeoff: points, Reason: "as judged",
			Parameters: parameters(works), Order: []string{"height"},
			Stages: []report.Stage{{Name: "built", RequiredFS: 1.1, Found: report.Found{FS: 2, Resolved: true}, Section: section()}},
		}},
		LeastEarthworks: &least,
	}
	if status != meetsTarget {
		f.LeastEarthworks = nil
	}
	return f
}

func parameters(height float64) map[string]report.Parameter {
	return map[string]report.Parameter{"height": {Value: report.Number(height), Unit: "m"}}
}

// point is a point of the made-up trade-off that reaches fs in the situation that requires 1.30.
func point(shift, fs, works float64) report.TradePoint {
	return report.TradePoint{
		Shift: shift, RequiredFS: report.Number(1.3 + shift), ReachedFS: report.Number(fs), Earthworks: report.Number(works),
		Parameters: parameters(works), Quantities: report.Quantities{Fill: works, Earthworks: works},
		Ground: []report.Point{{0, 10}, {20, 10}, {38, 1}, {40, 1}, {42, 0}, {60, 0}},
		Checks: []report.Answer{
			{Name: "normal", RequiredFS: 1.3 + shift, Found: report.Found{FS: report.Number(fs), Resolved: true}},
			{Name: "built", RequiredFS: 1.1 + shift, Found: report.Found{FS: 2, Resolved: true}},
		},
	}
}

// cost is a total of the made-up result.
func cost(v float64) *report.Number {
	n := report.Number(v)
	return &n
}

// TestLeastCost checks that where cost was made least the slider goes by cost, though it takes more earthworks, and says so.
func TestLeastCost(t *testing.T) {
	dear, cheap := point(0.05, 1.358, 15), point(0.05, 1.36, 16)
	dear.Cost, cheap.Cost = cost(900), cost(800)
	f := invented(1.1, meetsTarget, 1.306, 10, dear)
	other := invented(1.1, meetsTarget, 1.306, 11, cheap).Options[0]
	f.Options[0].Totals.Cost, other.Totals.Cost = cost(700), cost(750)
	other.Name, other.Title = "buttress", "toe buttress"
	f.Options = append(f.Options, other)
	for _, c := range []struct{ objective, want string }{
		{"", "At this target least earthworks: toe berm, 15.00 m³ per metre run"},
		{"cost", "At this target least cost: toe buttress, 800 EUR, 16.00 m³ per metre run"},
	} {
		f.Settings.Objective, f.Economics.Currency = c.objective, "EUR"
		b := newBuilder(f)
		b.addStops()
		d := &b.m.Data
		if got := d.Stops[d.Specified+5].Answer; !strings.HasPrefix(got, c.want) {
			t.Errorf("the answer is %q, want %q", got, c.want)
		}
	}
}

// What is asked for is answered by the next design on the safe side, and by nothing in between.
func TestPick(t *testing.T) {
	met := func() *report.File {
		return invented(1.1, meetsTarget, 1.306, 10, point(-0.1, 1.207, 4), point(-0.05, 1.262, 6), point(0.05, 1.358, 15), point(0.1, 1.37, 16))
	}
	short := func() *report.File {
		return invented(1.1, "infeasible", 1.272, 9, point(-0.1, 1.207, 4), point(-0.05, 1.262, 6), point(0, 1.2721, 9.5))
	}
	open := func() *report.File { f := met(); f.Options[0].Status = "unresolved"; return f }
	trial := func() *report.File {
		f := met()
		other := f.Options[0]
		other.Name, other.Trial, other.Tradeoff = "mine", true, nil
		f.Options = append([]report.Option{other}, f.Options...)
		return f
	}
	for _, c := range []struct {
		name   string
		file   *report.File
		shift  float64
		works  float64
		state  string
		status string
	}{
		{"as specified", met(), 0, 10, stateMeets, meetsTarget},
		{"a target that was sized for", met(), -0.05, 6, stateMeets, "reaches it"},
		{"between two, the dearer of them", met(), -0.07, 6, stateMeets, "reaches it"},
		{"what a design reaches counts, less the allowance", met(), -0.04, 10, stateMeets, "reaches it"},
		{"just within what a design reaches", met(), -0.043, 6, stateMeets, "reaches it"},
		{"below all that was sized", met(), -0.1, 4, stateMeets, "reaches it"},
		{"above the specified target", met(), 0.01, 15, stateMeets, "reaches it"},
		{"beyond what it can do, the nearest", met(), 0.07, 16, stateShort, "cannot reach it"},
		{"infeasible as specified", short(), 0, 9, stateShort, "infeasible"},
		{"infeasible, and more is asked", short(), 0.02, 9, stateShort, "cannot reach it"},
		{"infeasible, and enough less is asked", short(), -0.05, 6, stateMeets, "reaches it"},
		{"infeasible, and less is asked, met by the works shown", short(), -0.04, 9, stateMeets, "reaches it"},
		{"unresolved stays so", open(), -0.05, 6, stateOpen, "unresolved"},
		{"trial works reach less", trial(), -0.05, 10, stateMeets, "reaches it"},
		{"trial works fall short", trial(), 0.05, 10, stateShort, "falls short"},
	} {
		t.Run(c.name, func(t *testing.T) {
			b := newBuilder(c.file)
			s := b.pick(0, c.shift)
			got := b.m.Data.Options[0].Designs[s.Design].works
			if got != c.works || s.State != c.state || s.Status != c.status {
				t.Errorf("shift %v: works %v %s %q, want %v %s %q", c.shift, got, s.State, s.Status, c.works, c.state, c.status)
			}
			if s.Note == "" {
				t.Error("no reason is given")
			}
		})
	}
}

// Where the slope as it is meets a target, nothing is needed; no target below 1 is offered.
func TestStops(t *testing.T) {
	for _, c := range []struct {
		name         string
		existing     float64
		lo, hi       string
		first, count int
	}{
		{"down to where nothing is needed", 1.256, "1.25", "1.40", -5, 16},
		{"the stage goes to 1 first", 1.05, "1.20", "1.40", -10, 21},
	} {
		t.Run(c.name, func(t *testing.T) {
			d := newModel(invented(c.existing, meetsTarget, 1.306, 10, point(-0.05, 1.262, 6), point(0.1, 1.41, 16))).Data
			if len(d.Stops) != c.count || d.Specified != -c.first || d.Stops[0].Short != c.lo || d.Stops[len(d.Stops)-1].Short != c.hi {
				t.Fatalf("%d stops from %s to %s, the specified target at %d", len(d.Stops), d.Stops[0].Short, d.Stops[len(d.Stops)-1].Short, d.Specified)
			}
			for _, s := range d.Stops {
				for i, r := range s.Required {
					if r < "1.00" {
						t.Errorf("%s in %s is offered", r, d.Rows[i].Name)
					}
				}
			}
			if first := d.Options[0].Stops[0]; (first.State == stateNothing) != (c.existing > 1.25) {
				t.Errorf("at the first stop: %+v", first)
			}
		})
	}
	d := newModel(invented(1.1, meetsTarget, 1.306, 10)).Data
	if len(d.Stops) != 1 {
		t.Errorf("without a trade-off there are %d stops", len(d.Stops))
	}
}

// Whatever the curve: a design that is said to reach a target does so in every check by the allowance, none that is cheaper does, and nobody
// gets more for asking less.
func TestPickIsSafe(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		var points []report.TradePoint
		for i := range rapid.IntRange(1, 8).Draw(t, "points") {
			points = append(points, point(float64(i-4)*0.05, rapid.Float64Range(1.05, 1.5).Draw(t, "fs"), rapid.Float64Range(0, 30).Draw(t, "works")))
		}
		status := rapid.SampledFrom([]string{meetsTarget, "infeasible"}).Draw(t, "status")
		own := rapid.Float64Range(1.05, 1.29).Draw(t, "own fs")
		if status == meetsTarget {
			own = rapid.Float64Range(1.305, 1.4).Draw(t, "own fs")
		}
		f := invented(rapid.Float64Range(0.9, 1.28).Draw(t, "existing"), status, own, rapid.Float64Range(0, 30).Draw(t, "own works"), points...)
		d := newModel(f).Data
		last := math.Inf(-1)
		for k, s := range d.Options[0].Stops {
			if s.State != stateMeets {
				continue
			}
			asked := 1.3 + float64(k-d.Specified)*stopStep
			w := &d.Options[0].Designs[s.Design]
			if float64(w.fs[0]) < asked+f.Settings.Allowance-1e-6 || strings.ContainsRune(s.Marks, markFail) {
				t.Fatalf("FS %v is said to reach %v, marks %s", w.fs[0], asked, s.Marks)
			}
			if k == d.Specified || k == d.Specified+1 {
				last = math.Inf(-1) // As specified the audited design stands, and above it nothing cheaper than that.
			}
			if w.works < last {
				t.Fatalf("more is asked and less works are given: %v after %v", w.works, last)
			}
			last = w.works
			for i := range d.Options[0].Designs {
				o := &d.Options[0].Designs[i]
				if k < d.Specified && o.works < w.works && reaches(o, asked-1.3, f.Settings.Allowance) {
					t.Fatalf("%v would do in place of %v", o.works, w.works)
				}
			}
		}
	})
}

// The numbers on the sheet are rounded so that nobody is misled to the unsafe side.
func TestTexts(t *testing.T) {
	for _, c := range []struct{ name, got, want string }{
		{"a required FS", required(shifted(1.3, 0.05)), "1.35"},
		{"a required FS, up", required(1.2501), "1.251"},
		{"a required FS of three decimals", required(1.225), "1.225"},
		{"a saving, down", change(6.239, 10, 10), "37 m³ less than for the specified target (37 %)"},
		{"an addition, up", change(12.001, 10, 10), "21 m³ more than for the specified target (21 %)"},
		{"nothing to compare with", change(1.5, 0, 10), "15 m³ more than for the specified target"},
		{"the same", change(10.001, 10, 10), "as much as for the specified target"},
		{"not given", given(nil, " t"), notGiven},
		{"a sentence", sentence("top at x = 3 m, 4 m3 of fill"), "Top at x = 3 m, 4 m³ of fill."},
	} {
		if c.got != c.want {
			t.Errorf("%s: %q, want %q", c.name, c.got, c.want)
		}
	}
}

// Land is what works take in plan beyond crest and toe, by hand: a berm out to x = 42 beyond a toe at 40 over 10 m.
func TestLand(t *testing.T) {
	f := invented(1.1, meetsTarget, 1.306, 10)
	b := newBuilder(f)
	right := point(0, 1.3, 1).Ground
	for _, c := range []struct {
		name   string
		ground []report.Point
		placed []report.Body
		want   string
	}{
		{"untouched", f.Existing.Section.Ground, nil, "none"},
		{"beyond the toe", right, nil, "2.00 m beyond the toe (20 m²)"},
		{"behind the crest", []report.Point{{0, 10}, {17, 10}, {40, 0}, {60, 0}}, nil, "3.00 m behind the crest (30 m²)"},
		{"between", []report.Point{{0, 10}, {20, 10}, {25, 7}, {40, 0}, {60, 0}}, nil, "none beyond crest and toe"},
		{"a key beyond the toe", f.Existing.Section.Ground, []report.Body{{Soil: "rock", Outline: []report.Point{{39, 0}, {43, 0}, {42, -2}}}}, "3.00 m beyond the toe (30 m²)"},
	} {
		if got := b.landText(c.ground, c.placed, nil, false); got != c.want {
			t.Errorf("%s: %q, want %q", c.name, got, c.want)
		}
	}
}

// What nothing is asked of has no row, and costs stand with their currency, also for a point of the trade-off.
func TestAdvisoryAndCost(t *testing.T) {
	f := invented(1.1, meetsTarget, 1.306, 10, point(0.1, 1.41, 12))
	f.Economics.Currency = "EUR"
	o := &f.Options[0]
	cost, carbon := report.Number(1234.5), report.Number(2.25)
	o.Totals.Cost, o.Tradeoff[0].Carbon, o.Totals.Carbon = &cost, &carbon, &carbon
	o.Stages = append(o.Stages, report.Stage{Name: "open hole, plane strain", Advisory: true, Found: report.Found{FS: 0.9}, Section: o.Section})
	m := newBuilder(f)
	for _, r := range m.m.Data.Rows {
		if r.Name == "open hole, plane strain" {
			t.Error("an advisory check has a row")
		}
	}
	d := m.sized(o)
	if got := d.Texts["cost"]; got != "1,235 EUR" {
		t.Errorf("cost %q", got)
	}
	p := m.traded(o, &o.Tradeoff[0], &d)
	if got := p.Texts["carbon"]; got != "3 t" {
		t.Errorf("carbon of a point %q", got)
	}
	if got := p.Texts["cost"]; got != "not worked out for this target" {
		t.Errorf("cost of a point without one %q", got)
	}
}
