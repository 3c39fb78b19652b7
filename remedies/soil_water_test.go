package remedies

import (
	"slices"
	"strings"
	"testing"

	"standfast/lem"
)

// perched returns the cutting with water in the upper clay alone, with artesian water in the stiff clay, and pressures at points beside it.
func perched() *Job {
	j := cutting()
	j.Waters = []WaterLine{
		{Name: "perched", Inclined: true, BySoil: []SoilLine{
			{Soil: clay, Line: lem.Profile{{X: 0, Y: 108.5}, {X: 30, Y: 108}, {X: 52.5, Y: 100}, {X: 80, Y: 100}}},
			{Soil: stiffClay, Line: lem.Profile{{X: 0, Y: 108}, {X: 80, Y: 106}}, Artesian: true},
		}},
		{Name: "piezometers", Line: lem.Profile{{X: 0, Y: 107}, {X: 80, Y: 100}}, Points: []lem.PressurePoint{{X: 30, Y: 100, Pressure: 40}}},
	}
	j.Situations = []Situation{
		{Name: "perched", Water: 0, RequiredFS: 1.2, DrainsWorking: 1, Kv: 0.02},
		{Name: "piezometers", Water: 1, RequiredFS: 1.2, DrainsWorking: 1},
	}
	j.Stage.Water = 0
	return j
}

func noted(p *Proposal, part string) bool {
	return slices.ContainsFunc(p.Notes, func(n string) bool { return strings.Contains(n, part) })
}

// TestCutsClipLinesOfSoils: lines of single soils follow the new ground, artesian ones and points stay, and all of it is said.
func TestCutsClipLinesOfSoils(t *testing.T) {
	j := perched()
	p := apply(t, j, request("unload", nil, 2, 8, 2))
	before := Start(j)
	if !p.Waters[0].InclinedLine || len(before.Waters[0].BySoil) != 2 {
		t.Fatal("the water of the case is not that of the situation")
	}
	own, artesian := p.Waters[0].BySoil[0].Line, p.Waters[0].BySoil[1].Line
	if h, x := highest(own, p.Section.Ground, 0, 80); h > sameLevel {
		t.Errorf("the perched line stands %.2f m above the new ground at x = %.1f", h, x)
	}
	if slices.Equal(own, before.Waters[0].BySoil[0].Line) {
		t.Error("the cut did not lower the perched line")
	}
	if !slices.Equal(artesian, before.Waters[0].BySoil[1].Line) || !slices.Equal(p.Waters[1].Points, j.Waters[1].Points) {
		t.Error("artesian water or pressures at points changed")
	}
	if h, _ := highest(p.stageWater.BySoil[0].Line, p.Section.Ground, 0, 80); h > sameLevel {
		t.Error("the perched line of stages is not lowered")
	}
	for _, part := range []string{`"perched" in clay is lowered`, `"perched" in stiff clay is artesian`, `points of "piezometers"`} {
		if !noted(p, part) {
			t.Errorf("nothing is said of %s: %q", part, p.Notes)
		}
	}
	if !slices.Equal(before.Waters[0].BySoil[0].Line, j.Waters[0].BySoil[0].Line) {
		t.Error("the job's own line changed")
	}
	if c := Checks(j, p)[0]; c.Situation.Kv != 0.02 {
		t.Errorf("kv = %v", c.Situation.Kv)
	}
}

// TestDrainsLeaveSoilLines: drains lower neither lines of single soils nor pressures at points, and say so.
func TestDrainsLeaveSoilLines(t *testing.T) {
	j := perched()
	p := apply(t, j, request("trench_drains", nil, 2.75, 9, 0.6, 0.5))
	for i := range p.Waters {
		if p.Waters[i].Drains != nil {
			t.Errorf("situation %d is drained", i)
		}
	}
	for _, part := range []string{`"perched" has no line but`, `"piezometers" has pore pressures at points`} {
		if !noted(p, part) {
			t.Errorf("nothing is said of %s: %q", part, p.Notes)
		}
	}
}

// TestLoweringOfSoilLines: the what-if lowers lines of single soils, but no artesian ones and no pressures at points, and says so.
func TestLoweringOfSoilLines(t *testing.T) {
	j := perched()
	p := apply(t, j, request("water_lowering", nil, 1.5))
	was := j.Waters[0].BySoil
	if p.Waters[0].BySoil[0].Line[0].Y >= was[0].Line[0].Y || p.Waters[0].BySoil[1].Line[0].Y != was[1].Line[0].Y {
		t.Errorf("lowered lines %v", p.Waters[0].BySoil)
	}
	if !noted(p, "artesian in stiff clay") || !noted(p, `points of "piezometers" are not lowered`) {
		t.Errorf("notes %q", p.Notes)
	}
}
