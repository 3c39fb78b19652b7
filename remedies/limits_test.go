package remedies

import (
	"slices"
	"strings"
	"testing"

	"standfast/lem"
)

// TestLimits checks that every limit broken is named with its numbers, in both facings.
func TestLimits(t *testing.T) {
	berm := request("berm", fillOf(sandFill), 2.5, 8.05, 2) // toe at 59.30
	half := 0.5
	tests := []struct {
		name    string
		limits  Limits
		request Request
		detail  string // For a slope that descends to the right.
		limit   string
		by      float64
	}{
		{"toe fence", Limits{Right: &Fence{Name: "toe fence", X: 58.5}}, berm, "toe of berm at x = 59.30 m, limit toe fence at x = 58.50 m", "toe fence", 0.8},
		{"unnamed fence", Limits{Right: &Fence{X: 58.5}}, berm, "toe of berm at x = 59.30 m, limit right limit at x = 58.50 m", "right limit", 0.8},
		{"fence just kept", Limits{Right: &Fence{X: 59.3}}, berm, "", "", 0},
		{"crest fence", Limits{Left: &Fence{Name: "farm", X: 26}}, request("regrade", nil, 3, 0), "top of regraded face at x = 25.50 m, limit farm at x = 26.00 m", "farm", 0.5},
		{"no load", Limits{KeepClear: []KeepClear{{Name: "main", FromX: 58.3, ToX: 60, NoLoad: true}}}, berm, "berm puts 0.50 m of fill at x = 58.30 m, inside main (x = 58.30 to 60.00 m), where no load is allowed", "main", 0.5},
		{"load beside it", Limits{KeepClear: []KeepClear{{Name: "main", FromX: 59.3, ToX: 60, NoLoad: true}}}, berm, "", "", 0},
		{"fill is no dig", Limits{KeepClear: []KeepClear{{Name: "main", FromX: 50, ToX: 60, NoDig: true}}}, berm, "", "", 0},
		{"no dig", Limits{KeepClear: []KeepClear{{Name: "main", FromX: 0, ToX: 27, NoDig: true}}}, request("regrade", nil, 3, 0), "regraded face digs 0.50 m below ground at x = 27.00 m, inside main (x = 0.00 to 27.00 m), where no dig is allowed", "main", 0.5},
		{"dig too deep", Limits{KeepClear: []KeepClear{{Name: "main", FromX: 0, ToX: 28.5, NoDig: true, DigBelow: &half}}}, request("regrade", nil, 3, 0), "where 0.50 m is the deepest dig allowed", "main", 0.5},
		{"dig not too deep", Limits{KeepClear: []KeepClear{{Name: "main", FromX: 0, ToX: 27, NoDig: true, DigBelow: &half}}}, request("regrade", nil, 3, 0), "", "", 0},
		{"maximum level", Limits{MaxLevels: []MaxLevel{{Name: "sight line", FromX: 0, ToX: 80, Level: 102}}}, berm, "berm rises to level 102.50 m", "sight line", 0.5},
		{"trench in no dig", Limits{KeepClear: []KeepClear{{Name: "main", FromX: 50, ToX: 60, NoDig: true}}}, request("trench_drains", nil, 2, 6, 0.6, 0.5, nan, nan), "trench drain digs 2.00 m below ground at x = 50.00 m", "main", 2},
		{"drains beyond fence", Limits{Left: &Fence{Name: "farm", X: 31}}, request("trench_drains", nil, 2, 6, 0.6, 0.5, nan, nan), "head of trench drains at x = 30.00 m, limit farm at x = 31.00 m", "farm", 1},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			j := cutting()
			j.Limits = tt.limits
			m := mirrorJob(j)
			for facing, j := range map[string]*Job{"right": j, "left": m} {
				p := apply(t, j, tt.request)
				if tt.detail == "" {
					if len(p.Violations) > 0 {
						t.Errorf("facing %s: %v", facing, p.Violations)
					}
					continue
				}
				if len(p.Violations) != 1 {
					t.Fatalf("facing %s: violations %+v, want one", facing, p.Violations)
				}
				v := p.Violations[0]
				near(t, "by", v.By, tt.by, 1e-9)
				if facing == "right" && (!strings.Contains(v.Detail, tt.detail) || v.Limit != tt.limit) {
					t.Errorf("violation %+v, want %q: %q", v, tt.limit, tt.detail)
				}
			}
		})
	}
}

// TestRefilledCutIsNoLoad regrades and then places a berm where the ground was cut: only what stands above the ground before works
// loads a no-load zone.
func TestRefilledCutIsNoLoad(t *testing.T) {
	j := cutting()
	j.Limits.KeepClear = []KeepClear{{Name: "main", FromX: 30, ToX: 46.25, NoLoad: true}}
	p := apply(t, j, request("regrade", nil, 3, 0), request("berm", fillOf(sandFill), 2.5, 4, 2))
	if len(p.Violations) > 0 {
		t.Error(p.Violations)
	}
	// The top runs on inward from the face before works, x = 46.25, to the new face, x = 45.
	near(t, "back of berm", p.Section.Placed[0].Outline[0].X, 45, 1e-9)
	near(t, "cut", p.Quantities.TotalCut(), 20.25, 1e-9)
	near(t, "fill", p.Quantities.TotalFill(), 2.5*4+0.5*(2-2.5)*6.25+0.5*0.5*6.25, 1e-9)
}

// TestOrderOfWorks checks that works come out the same whatever the order they are asked for.
func TestOrderOfWorks(t *testing.T) {
	rs := []Request{
		request("trench_drains", nil, 2, 6, 0.6, 0.5, nan, nan),
		request("berm", fillOf(sandFill), 2.5, 4, 2),
		request("regrade", nil, 3, 0),
	}
	a := apply(t, cutting(), rs[0], rs[1], rs[2])
	b := apply(t, cutting(), rs[2], rs[1], rs[0])
	samePoints(t, a.Section.Ground, b.Section.Ground)
	near(t, "earthworks", a.Quantities.Earthworks(), b.Quantities.Earthworks(), 0)
	samePoints(t, a.Waters[0].Drains.Invert, b.Waters[0].Drains.Invert)
}

// TestTrenchUnderBerm checks that a berm over the trenches is not dug through: they come first.
func TestTrenchUnderBerm(t *testing.T) {
	drains := request("trench_drains", nil, 2, 6, 0.6, 0.5, nan, nan)
	alone := apply(t, cutting(), drains)
	both := apply(t, cutting(), drains, request("berm", fillOf(sandFill), 2.5, 6, 2))
	near(t, "dig", both.Quantities.TrenchDig, alone.Quantities.TrenchDig, 1e-12)
	near(t, "dig", alone.Quantities.TrenchDig, 22.5*2*0.6/6, 1e-12)
	cut := apply(t, cutting(), drains, request("regrade", nil, 3, 0)) // the trench loses what the regrade cuts between toe and crest
	near(t, "dig after cut", cut.Quantities.TrenchDig, (22.5*2-areaCutAbove2m())*0.6/6, 1e-9)
}

// areaCutAbove2m returns the part of the cut 1V:2.5H to 1V:3H over the trench, 22.5 m long: the cut is x/2.5 - x/3 deep at x from the
// toe, nowhere 2 m.
func areaCutAbove2m() float64 { return (1/2.5 - 1/3.0) * 22.5 * 22.5 / 2 }

// TestWaterAndCuts checks that lines are clipped to cut ground, artesian ones are not, and nothing else changes.
func TestWaterAndCuts(t *testing.T) {
	j := cutting()
	p := apply(t, j, request("unload", nil, 4, 12, 2)) // platform at 105 from x = 28 to 40
	line := p.Waters[0].Line
	near(t, "under the platform", line.At(34), 105, 1e-9)
	near(t, "behind it", line.At(10), j.Waters[0].Line.At(10), 1e-12)
	near(t, "on the face", line.At(45), j.Waters[0].Line.At(45), 1e-12)
	near(t, "of the stage", p.stageWater.Line.At(34), 105, 1e-9)
	near(t, "artesian", p.Waters[2].Line.At(34), 108-4*34.0/80, 1e-12)
	if p.Waters[3].Line != nil {
		t.Error("a dry situation has got water")
	}
	want := []string{
		`water line "high" is lowered to the new ground where the works cut below it`,
		`water line "deep" is artesian and keeps its head above the new ground`,
	}
	if got := strings.Join(p.Notes, "; "); got != strings.Join(want, "; ") {
		t.Errorf("notes %q", got)
	}
	for x := 0.0; x <= 80; x += 0.25 {
		if y := line.At(x); y > max(p.Section.Ground.At(x), 0)+1e-9 && y > j.Section.Ground.At(x) {
			t.Errorf("line above new ground at x = %g", x)
		}
	}
}

func TestWaterLowering(t *testing.T) {
	j := cutting()
	p := apply(t, j, request("water_lowering", nil, 1.5))
	near(t, "line", p.Waters[0].Line.At(20), j.Waters[0].Line.At(20)-1.5, 1e-12)
	near(t, "artesian", p.Waters[2].Line.At(20), j.Waters[1].Line.At(20), 0)
	near(t, "stage", p.stageWater.Line.At(20), j.Waters[0].Line.At(20), 0)
	near(t, "earthworks", p.Quantities.Earthworks(), 0, 0)
	near(t, "line of the job", j.Waters[0].Line.At(0), 107.6, 0)
	k, _ := Find("water_lowering")
	if !k.WhatIf {
		t.Error("a plain lowering must be a what-if")
	}
}

// TestEndOfConstruction checks the stage that fill on clay adds.
func TestEndOfConstruction(t *testing.T) {
	berm := request("berm", fillOf(sandFill), 2.5, 6, 2)
	noStrength := func(j *Job, soil int) { j.Section.Soils[soil].Undrained = nil }
	tests := []struct {
		name       string
		change     func(j *Job)
		request    Request
		undrained  []bool
		stages     int
		notChecked string
		note       string
	}{
		{name: "fill on clay", request: berm, undrained: []bool{true, true, false, false, false}, stages: 1},
		{name: "no cu near the fill", change: func(j *Job) { noStrength(j, stiffClay) }, request: berm, undrained: []bool{true, false, false, false, false}, stages: 1, notChecked: "end of construction: not checked: no cu given for stiff clay"},
		{
			name: "no cu deeper than the base of the fill is wide",
			change: func(j *Job) {
				noStrength(j, stiffClay)
				j.Section.Strata[1].Top = lem.Profile{{X: 0, Y: 60}, {X: 80, Y: 60}}
			},
			request: berm, undrained: []bool{true, false, false, false, false}, stages: 1,
		},
		{
			name: "sand above clay within reach",
			change: func(j *Job) {
				j.Clay[clay] = false
			},
			request: berm, undrained: []bool{false, true, false, false, false}, stages: 1,
		},
		{name: "no clay", change: func(j *Job) { j.Clay = make([]bool, 5) }, request: berm},
		{name: "no stage settings", change: func(j *Job) { j.Stage = StageSettings{} }, request: berm, note: "construction stages are not checked: the case has no stage settings"},
		{name: "cut only", request: request("regrade", nil, 3, 0)},
		{name: "fill possible but none at this size", request: request("regrade", fillOf(sandFill), 3, 0), stages: 1},
		{name: "shape that does not exist", request: request("berm", fillOf(sandFill), 20, 6, 2), stages: 1},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			j := cutting()
			j.Situations = j.Situations[:2]
			if tt.change != nil {
				tt.change(j)
			}
			p := apply(t, j, tt.request)
			checks := Checks(j, p)
			if got := len(checks) - len(j.Situations); got != tt.stages || len(p.Stages) != tt.stages {
				t.Fatalf("%d stages, want %d", got, tt.stages)
			}
			if got := strings.Join(p.NotChecked, ";"); got != tt.notChecked {
				t.Errorf("not checked %q, want %q", got, tt.notChecked)
			}
			if got := strings.Join(p.Notes, ";"); got != tt.note {
				t.Errorf("notes %q, want %q", got, tt.note)
			}
			if tt.stages == 0 {
				return
			}
			c := checks[len(checks)-1]
			if c.Name != EndOfConstruction || !c.Stage || c.SituationI != -1 || c.Required != 1.1 || c.Section != &p.Section {
				t.Errorf("stage %+v", c)
			}
			if len(c.Situation.Undrained) != len(tt.undrained) {
				t.Fatalf("undrained %v, want %v", c.Situation.Undrained, tt.undrained)
			}
			for i := range tt.undrained {
				if c.Situation.Undrained[i] != tt.undrained[i] {
					t.Errorf("undrained %v, want %v", c.Situation.Undrained, tt.undrained)
				}
			}
		})
	}
}

// TestOneStageForSeveralFills checks that two fills share one end of construction, on the section with both.
func TestOneStageForSeveralFills(t *testing.T) {
	j := cutting()
	p := apply(t, j, request("regrade", fillOf(sandFill), 3, 0.5), request("berm", fillOf(rockfill), 2, 4, 2))
	if len(p.Stages) != 2 || p.Stages[1].Name != EndOfConstruction || p.Stages[1].Section != &p.Section || len(p.Section.Placed) != 2 {
		t.Errorf("stages %+v", p.Stages)
	}
}

// TestBranches applies several works to one proposal: none sees another, and the proposal stays as it was.
func TestBranches(t *testing.T) {
	j := cutting()
	requests := []Request{
		request("regrade", fillOf(sandFill), 3, 0.5),
		request("berm", fillOf(sandFill), 2.5, 6, 2),
		request("buttress", fillOf(rockfill), 1, 2, 2),
		request("unload", nil, 2, 10, 2),
		request("water_lowering", nil, 1),
		request("trench_drains", nil, 2, 6, 0.6, 0.5, nan, nan),
	}
	rs, err := NewRemedies(j, requests)
	if err != nil {
		t.Fatal(err)
	}
	base := rs[0].Apply(j, Start(j), requests[0].Fixed())
	base.Section.Placed = append(make([]lem.Body, 0, 9), base.Section.Placed...) // room to append in place, were it shared
	line, loaded := base.Waters[0].Line, slices.Clone(base.loaded)
	var placed [][]lem.Body
	var branches []*Proposal
	for i, r := range rs[1:] {
		b := r.Apply(j, base, requests[i+1].Fixed())
		branches = append(branches, b)
		placed = append(placed, slices.Clone(b.Section.Placed))
	}
	for i, b := range branches {
		for k, body := range b.Section.Placed {
			if body.Soil != placed[i][k].Soil {
				t.Errorf("branch %d has the body of another", i)
			}
		}
	}
	samePoints(t, base.Waters[0].Line, line)
	if base.Waters[0].Drains != nil || !slices.Equal(base.loaded, loaded) || len(base.variants) != 0 || len(base.Section.Placed) != 1 {
		t.Error("the proposal worked on has changed")
	}
}
