package remedies

import (
	"slices"
	"strings"
	"testing"

	"standfast/lem"
	"standfast/optimize"
)

// TestStages lists the stages that works add, in their order.
func TestStages(t *testing.T) {
	regrade := request("regrade", nil, 3, 0)
	berm := request("berm", fillOf(sandFill), 2, 4, 2)
	drains := request("trench_drains", nil, 2, 6, 0.6, 0.5, nan, nan)
	balanced := request("regrade", fillOf(sandFill), 3, 0.5)
	keyed := request("buttress", fillOf(rockfill), 2, 4, 1.5, 1, 3)
	panels := request("buttress", fillOf(rockfill), 2, 4, 1.5, 1, 3, nan, nan, 3, 9)
	tests := []struct {
		name   string
		change func(*Job)
		works  []Request
		want   string
	}{
		{"cut", nil, []Request{regrade}, ""},
		{"fill", nil, []Request{berm}, "end of construction"},
		{"cut and fill of one works", nil, []Request{balanced}, "fill placed, cut to come; end of construction"},
		{"cut and fill", nil, []Request{regrade, berm}, "fill placed, cut to come; end of construction"},
		{"drains", nil, []Request{drains}, ""},
		{"drains and cut", nil, []Request{drains, regrade}, "drains in place, other works to come"},
		{"all", nil, []Request{drains, berm, regrade}, "fill placed, cut to come; end of construction; drains in place, other works to come"},
		{"key", nil, []Request{keyed}, "key open; end of construction"},
		{"key in panels", nil, []Request{panels}, "key open, in panels; key open, plane strain; end of construction"},
		{"plant on a cut", func(j *Job) { j.Stage.Plant = 15 }, []Request{regrade}, "plant on the works"},
		{"plant on fill", func(j *Job) { j.Stage.Plant = 15 }, []Request{regrade, berm}, "fill placed, cut to come; end of construction"},
		{"strip", func(j *Job) { j.Economics.StripDepth = 0.3 }, []Request{regrade}, "topsoil stripped"},
		{"no settings", func(j *Job) { j.Stage = StageSettings{} }, []Request{panels, regrade, drains}, ""},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			j := cutting()
			if tt.change != nil {
				tt.change(j)
			}
			p := apply(t, j, tt.works...)
			if got := strings.Join(labels(p.Stages), "; "); got != tt.want {
				t.Errorf("stages %q, want %q", got, tt.want)
			}
			for _, c := range p.Stages {
				want := 1.1
				if c.Advisory {
					want = 0
				}
				if !c.Stage || c.SituationI != -1 || c.Required != want {
					t.Errorf("stage %+v", c)
				}
				var m lem.Model
				if err := m.Compile(c.Section, &c.Situation); err != nil {
					t.Errorf("%s: %v", c.Label(), err)
				}
			}
		})
	}
}

// find returns a stage.
func find(t *testing.T, p *Proposal, label string) *Check {
	t.Helper()
	for i := range p.Stages {
		if p.Stages[i].Label() == label {
			return &p.Stages[i]
		}
	}
	t.Fatalf("no stage %q in %q", label, labels(p.Stages))
	return nil
}

// TestStageSections checks the ground and water of each stage at places that follow by hand.
func TestStageSections(t *testing.T) {
	j := cutting()
	j.Stage.Plant, j.Economics.StripDepth = 15, 0.3
	regrade := request("regrade", nil, 3, 0)
	keyed := request("buttress", fillOf(rockfill), 2, 4, 1.5, 1, 3, 2, 0.5, 3, 9)
	p := apply(t, j, request("trench_drains", nil, 2, 6, 0.6, 0.5, nan, nan), regrade, keyed)
	if len(p.Violations) > 0 {
		t.Fatal(p.Violations)
	}
	near(t, "ground at the end", p.Section.Ground.At(54.5), 102-(54.5-51.5)/1.5, 1e-9)

	before := find(t, p, FillBeforeCut)
	near(t, "crest not cut yet", before.Section.Ground.At(28), 109, 1e-9)
	near(t, "fill placed", before.Section.Ground.At(51), 102, 1e-9)

	open := find(t, p, KeyOpen+", "+PlaneStrain)
	near(t, "floor of the key", open.Section.Ground.At(54.5), 99, 1e-9)
	near(t, "side of the key", open.Section.Ground.At(56.25), 99.5, 1e-9)
	near(t, "nothing cut before", open.Section.Ground.At(28), 109, 1e-9)
	near(t, "water in the hole", open.Situation.Water.Line.At(54.5), 99, 1e-9)
	near(t, "water beside it", open.Situation.Water.Line.At(45), j.Waters[0].Line.At(45), 1e-12)
	if n := len(open.Section.Loads); n != 2 || !open.Section.Loads[0].Variable || open.Section.Loads[0].Pressure != 15 {
		t.Errorf("plant %+v", open.Section.Loads)
	}

	panels := find(t, p, KeyOpen+", "+InPanels)
	near(t, "ground as it was", panels.Section.Ground.At(54.5), 100, 1e-9)
	soil := panels.Section.Soils[panels.Section.SoilAt(54.5, 99.5)]
	near(t, "two thirds of the clay", soil.UnitWeight, 19*2/3.0, 1e-9)
	if panels.Panels == nil || panels.Panels.Share() != 1/3.0 {
		t.Errorf("panels %+v", panels.Panels)
	}

	strip := find(t, p, TopsoilStripped)
	near(t, "stripped", strip.Section.Ground.At(40), 105-0.3, 1e-9)
	near(t, "not stripped", strip.Section.Ground.At(10), 109, 1e-9)

	drains := find(t, p, DrainsFirst)
	near(t, "ground", drains.Section.Ground.At(28), 109, 1e-9)
	near(t, "drained", slices.Max(drains.Situation.Water.Drains.Ratio), 0.5, 1e-12)

	end := find(t, p, EndOfConstruction)
	if n := len(end.Section.Loads); n == 0 || end.Section.Loads[n-1].Name != "plant" {
		t.Errorf("plant %+v", end.Section.Loads)
	}
	if len(p.Section.Loads) != 0 {
		t.Error("plant stands on the finished works")
	}
}

// TestKeyQuantities checks dig and refill by hand: bottom 3 m wide 1 m below the toe, sides 1V:0.5H, wholly under level ground.
func TestKeyQuantities(t *testing.T) {
	for facing, j := range map[string]*Job{"right": cutting(), "left": mirrorJob(cutting())} {
		t.Run(facing, func(t *testing.T) {
			plain := apply(t, j, request("buttress", fillOf(rockfill), 2, 4, 1.5))
			p := apply(t, j, request("buttress", fillOf(rockfill), 2, 4, 1.5, 1, 3, 3))
			if len(p.Violations) > 0 {
				t.Fatal(p.Violations)
			}
			near(t, "dig", p.Quantities.TotalCut(), 3.5, 1e-9)
			near(t, "refill", p.Quantities.Fill[rockfill]-plain.Quantities.Fill[rockfill], 3.5, 1e-9)
			near(t, "ground", p.Section.Ground.At(j.Toe.X), plain.Section.Ground.At(j.Toe.X), 1e-12)
			x := j.Toe.X + 3*j.Facing()
			if s := p.Section.SoilAt(x, 99.2); s != rockfill {
				t.Errorf("soil %d in the key", s)
			}
			if s := p.Section.SoilAt(x, 98.9); s != clay {
				t.Errorf("soil %d under the key", s)
			}
			near(t, "water line", p.Waters[0].Line.At(x), j.Waters[0].Line.At(x), 0)
		})
	}
}

// TestKeyFaults lists keys that cannot be and requests that make no sense.
func TestKeyFaults(t *testing.T) {
	cable := Limits{KeepClear: []KeepClear{{Name: "cable", FromX: 54, ToX: 56, NoDig: true}}}
	tests := []struct {
		name   string
		limits Limits
		x      []float64
		limit  string
		by     float64
	}{
		{"cable", cable, []float64{2, 4, 1.5, 1, 3, 3}, "cable", 1},
		{"temporary batter", Limits{Batters: Batters{Temporary: 1}}, []float64{2, 4, 1.5, 1, 3, 3}, limitTemporary, 0.5},
		{"fence", Limits{Right: &Fence{Name: "fence", X: 56}}, []float64{1, 1, 1.5, 1, 3, 3}, "fence", 1.5},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			j := cutting()
			j.Limits = tt.limits
			p := apply(t, j, request("buttress", fillOf(rockfill), tt.x...))
			if len(p.Violations) != 1 || p.Violations[0].Limit != tt.limit {
				t.Fatalf("violations %+v", p.Violations)
			}
			near(t, "by", p.Violations[0].By, tt.by, 1e-9)
		})
	}
	sized := request("buttress", fillOf(rockfill), 2, 4, 1.5, 1, 3, nan, nan, 3, 9)
	sized.Axes[keyPanel] = optimize.Axis{Name: "key_panel", Min: 3, Max: 10, Step: 1}
	for name, r := range map[string]Request{
		"key_width needs a key":          request("buttress", fillOf(rockfill), 2, 4, 1.5, nan, 3),
		"the key needs a width":          request("buttress", fillOf(rockfill), 2, 4, 1.5, 1),
		"their length and their spacing": request("buttress", fillOf(rockfill), 2, 4, 1.5, 1, 3, nan, nan, 3),
		"leave no ground between them":   sized,
	} {
		if _, err := NewRemedies(cutting(), []Request{r}); err == nil || !strings.Contains(err.Error(), name) {
			t.Errorf("error %v, want %q", err, name)
		}
	}
}

// TestHolesInWaterOfSoils digs a key, strips the ground and drains the crest where the water is that of single soils, or known at points.
func TestHolesInWaterOfSoils(t *testing.T) {
	for line := range 2 {
		j := perched()
		j.Stage.Water, j.Economics.StripDepth = line, 0.3
		j.Section.Strata[1].Top = lem.Profile{{X: 0, Y: 96}, {X: 80, Y: 96}}
		p := apply(t, j, request("buttress", fillOf(rockfill), 2, 4, 1.5, 2, 3, 2, 0.5, 3, 9), request("interceptor", onStiffClay(), 6, 4, 0.6, 1e-6, 0))
		for _, c := range Checks(j, p) {
			var m lem.Model
			if err := m.Compile(c.Section, &c.Situation); err != nil {
				t.Errorf("%s: %v", c.Label(), err)
			}
		}
		open, panels := find(t, p, KeyOpen+", "+PlaneStrain), find(t, p, KeyOpen+", "+InPanels)
		if line == 0 {
			near(t, "perched water in the hole", open.Situation.Water.BySoil[0].Line.At(54.5), 98, 1e-9)
			near(t, "artesian water", open.Situation.Water.BySoil[1].Line.At(54.5), 108-2*54.5/80, 1e-9)
			if n := len(panels.Situation.Water.BySoil); n != 3 {
				t.Errorf("%d lines of soils in panels: the clay between them has lost its own", n)
			}
			if n := len(j.Waters[0].BySoil); n != 2 {
				t.Errorf("the case has got %d lines", n)
			}
		}
		if !noted(p, "interceptor is not taken to lower it") {
			t.Errorf("notes %q", p.Notes)
		}
	}
}
