package report

import (
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/google/go-cmp/cmp/cmpopts"
	"github.com/santhosh-tekuri/jsonschema/v6"

	"standfast/lem"
	"standfast/remedies"
)

// featured is the sample with water of every kind, curved and ratio strengths, loads of every kind, a crack and kv.
func featured(crack *lem.TensionCrack) (*remedies.Result, Source) {
	job := sampleJob()
	line := lem.Profile{{X: 0, Y: 107}, {X: 75, Y: 98}}
	s := &job.Section
	s.Soils[0].Undrained = &lem.UndrainedStrength{Ratio: 0.3, Minimum: 12, WaterBefore: line}
	s.Soils[2] = lem.Soil{Name: "rock", UnitWeight: 20, PowerLaw: &lem.PowerLaw{A: 0.9, B: 0.75}}
	s.Loads = []lem.Surcharge{
		{Name: "heap", FromX: 2, ToX: 9, Rise: 25},
		{Name: "abutment", FromX: 20, ToX: 24, Pressure: 40, Rise: -10, Shear: -7},
		{Name: "lorries", FromX: 10, ToX: 15, Pressure: 10, Variable: true},
	}
	s.LineLoads = []lem.LineLoad{{Name: "wall", X: 26, Vertical: 30, Horizontal: -4}}
	s.Crack = crack
	job.Waters = []remedies.WaterLine{
		{Name: "spring", Line: line, Inclined: true, BySoil: []remedies.SoilLine{{Soil: 0, Line: lem.Profile{{X: 0, Y: 108}, {X: 75, Y: 99}}, Artesian: true}}},
		{Name: "measured", Points: []lem.PressurePoint{{X: 30, Y: 105, Pressure: 0}, {X: 30, Y: 95, Pressure: 80}}},
	}
	job.Situations[0].Kv = -0.03
	job.Situations[1].Water = 1
	existing := remedies.Option{Name: "existing", Title: "existing slope", Status: remedies.Existing, Proposal: remedies.Start(job)}
	existing.Situations, _ = outcomes(job, existing.Proposal, 1.15, 1.04)
	existing.Situations[0].Crack = 2.25
	return &remedies.Result{Job: job, Existing: existing}, Source{File: "featured.yaml", SHA256: "00", Version: "v0"}
}

// TestFeaturesAreWritten: the file is valid, holds every feature where an outsider looks for it, and turns back into the same section and water.
func TestFeaturesAreWritten(t *testing.T) {
	for _, crack := range []*lem.TensionCrack{
		{Depth: 2.25, WaterShare: 0.5},
		{Line: lem.Profile{{X: 0, Y: 107}, {X: 30, Y: 106}}, HasWaterLevel: true, WaterLevel: 107.5},
	} {
		result, src := featured(crack)
		text := encoded(t, New(result, src))
		doc, err := jsonschema.UnmarshalJSON(strings.NewReader(text))
		if err != nil {
			t.Fatal(err)
		}
		if err := compiled(t).Validate(doc); err != nil {
			t.Errorf("not valid: %v", err)
		}
		f, err := Decode(strings.NewReader(text))
		if err != nil {
			t.Fatal(err)
		}
		again, err := Rebuild(f)
		if err != nil {
			t.Fatal(err)
		}
		want, got := result.Existing.Proposal, again.Existing.Proposal
		opts := []cmp.Option{cmpopts.EquateEmpty(), cmpopts.EquateApprox(1e-12, 0)}
		same := func(what string, a, b any) {
			t.Helper()
			if diff := cmp.Diff(a, b, opts...); diff != "" {
				t.Errorf("%s (-result +rebuilt):\n%s", what, diff)
			}
		}
		same("loads", want.Section.Loads, got.Section.Loads)
		same("line loads", want.Section.LineLoads, got.Section.LineLoads)
		same("crack", want.Section.Crack, got.Section.Crack)
		same("undrained strength", want.Section.Soils[0].Undrained, got.Section.Soils[0].Undrained)
		same("curved strength", want.Section.Soils[2].PowerLaw, got.Section.Soils[2].PowerLaw)
		same("waters before", result.Job.Waters, again.Job.Waters)
		for i := range want.Waters {
			same("lines of soils", want.Waters[i].BySoil, got.Waters[i].BySoil)
			same("points", want.Waters[i].Points, got.Waters[i].Points)
			same("inclined", want.Waters[i].InclinedLine, got.Waters[i].InclinedLine)
		}
		same("kv", -0.03, again.Job.Situations[0].Kv)
		same("crack of the slip", 2.25, again.Existing.Situations[0].Crack)
		for _, part := range []string{
			`"power_law": {"a": 0.9, "b": 0.75, "atmospheric_pressure_kPa": 101.325, "least_stress_kPa": 1}`,
			`"kPa_to": 25`, `"horizontal_kPa": -7`, `"tension_crack_m": 2.25`, `"inclined_line": true`, `"kv": -0.03`, `"ratio": 0.3`,
			`"vertical_kN_per_m": 30`,
		} {
			if !strings.Contains(text, part) {
				t.Errorf("the file has no %s", part)
			}
		}
	}
}
