package report

import (
	"math"

	"standfast/lem"
	"standfast/optimize"
	"standfast/remedies"
)

// sample is an invented result with something in every corner of the layout: a berm that meets the target, drains with a variant, a
// regrade that a limit stops, a what-if without an FS.
func sample() (*remedies.Result, Source) {
	job := sampleJob()
	berm := sampleBerm(job)
	drains := sampleDrains(job)
	regrade := remedies.Option{
		Name: "regrade", Title: "regrade", Remedies: []string{"regrade"}, Status: remedies.Infeasible, Binding: "crest fence",
		Reason:     "No batter within the limits reaches 1.300 in normal water; the flattest that stops short of the crest fence, 1V:2.9H, reaches 1.248.",
		Parameters: []remedies.Value{{Name: "batter", Unit: "1V:nH", Value: 2.9}},
		Proposal:   &remedies.Proposal{Section: job.Section, Quantities: remedies.Quantities{Cut: []float64{18.2, 0, 0}}},
		Situations: []remedies.Outcome{outcome(job, 0, 1.2489), outcome(job, 1, 1.2511)},
	}
	lower := remedies.Option{
		Name: "water_lowering", Title: "lower water (what-if)", Remedies: []string{"water_lowering"}, Status: remedies.Unresolved, WhatIf: true,
		Reason: "No slip converged in wet spring.", Situations: []remedies.Outcome{outcome(job, 0, 1.31), outcome(job, 1, math.NaN())},
	}
	existing := remedies.Option{
		Name: "existing", Title: "existing slope", Status: remedies.Existing,
		Situations: []remedies.Outcome{outcome(job, 0, 1.1506), outcome(job, 1, 1.0413)},
	}
	return &remedies.Result{
			Job: job, Settings: remedies.Settings{Seed: 7, Workers: 3}, Existing: existing, Least: "berm",
			Options: []remedies.Option{berm, drains, regrade, lower},
		}, Source{
			File: "made-up.yaml", SHA256: "00ff", Version: "v0", Notes: []string{"toe taken at (52.50, 100.00)"},
			Files: []string{"result.json", "witnesses.json"},
		}
}

func sampleJob() *remedies.Job {
	ground := lem.Profile{{X: 0, Y: 109}, {X: 30, Y: 109}, {X: 52.5, Y: 100}, {X: 75, Y: 100}}
	return &remedies.Job{
		Title: "Made-up Bank", Length: 80, Crest: lem.Point{X: 30, Y: 109}, Toe: lem.Point{X: 52.5, Y: 100}, MinDepth: 1,
		Exit: lem.Range{From: 40, To: 70}, Direction: lem.RightwardOnly, Clay: []bool{true, false, false},
		Section: lem.Section{
			Ground: ground,
			Soils: []lem.Soil{
				{
					Name: "clay", UnitWeight: 19, Cohesion: 3, Friction: 23 * math.Pi / 180,
					Undrained: &lem.UndrainedStrength{Strength: 35, Gradient: 1.5, Datum: lem.Profile{{X: 0, Y: 104}, {X: 75, Y: 104}}},
				},
				{Name: "fill", UnitWeight: 19.5, SaturatedUnitWeight: 20.5, Friction: 35 * math.Pi / 180, HasRu: true, Ru: 0.1},
				{Name: "rock", UnitWeight: 20, Friction: 40 * math.Pi / 180, FreeDraining: true},
			},
			Strata: []lem.Stratum{{Soil: 0, Top: ground}},
			Loads:  []lem.Surcharge{{Name: "track", FromX: 20, ToX: 29, Pressure: 5}, {Name: "plant", FromX: 10, ToX: 15, Pressure: 10, Variable: true}},
		},
		Waters: []remedies.WaterLine{{Name: "spring", Line: lem.Profile{{X: 0, Y: 106}, {X: 75, Y: 99}}}},
		Situations: []remedies.Situation{
			{Name: "normal water", RequiredFS: 1.3, DrainsWorking: 1},
			{Name: "wet spring", RequiredFS: 1.2, Kh: 0.05, DrainsWorking: 0.5, Undrained: []bool{true, false, false}},
		},
	}
}

func sampleCheck(job *remedies.Job, i int) remedies.Check {
	s := &job.Situations[i]
	return remedies.Check{
		Name: s.Name, SituationI: i, Section: &job.Section, Required: s.RequiredFS,
		Situation: lem.Situation{Name: s.Name, Water: lem.Water{Line: job.Waters[0].Line}, Undrained: s.Undrained, Kh: s.Kh},
	}
}

func outcome(job *remedies.Job, i int, fs float64) remedies.Outcome {
	return remedies.Outcome{
		Check: sampleCheck(job, i), FS: fs, Method: lem.Bishop, Resolved: true,
		ByMethod: map[lem.Method]float64{lem.Ordinary: fs - 0.1, lem.Bishop: fs, lem.Spencer: fs + 0.004},
		Slip:     lem.Slip{Kind: lem.Circle, Centre: lem.Point{X: 48, Y: 120}, Radius: 20.5},
		From:     lem.Point{X: 30.75, Y: 108.7}, To: lem.Point{X: 52.9, Y: 100},
	}
}

func sampleBerm(job *remedies.Job) remedies.Option {
	section := job.Section
	section.Ground = lem.Profile{{X: 0, Y: 109}, {X: 30, Y: 109}, {X: 48.75, Y: 101.5}, {X: 52.75, Y: 101.5}, {X: 55.75, Y: 100}, {X: 75, Y: 100}}
	section.Placed = []lem.Body{{Soil: 1, Outline: []lem.Point{{X: 48.75, Y: 101.5}, {X: 52.75, Y: 101.5}, {X: 55.75, Y: 100}, {X: 52.5, Y: 100}}}}
	stage := outcome(job, 0, 1.17)
	stage.Check = remedies.Check{
		Name: "end of construction", Stage: true, Section: &section, Required: 1.1, SituationI: -1,
		Situation: lem.Situation{Undrained: []bool{true, false, false}},
	}
	situations := []remedies.Outcome{outcome(job, 0, 1.30578), outcome(job, 1, 1.2213)}
	for i := range situations {
		situations[i].Check.Section = &section
	}
	return remedies.Option{
		Name: "berm", Title: "toe berm", Remedies: []string{"berm"}, Status: remedies.MeetsTarget, Reason: "Every check stands.",
		Parameters: []remedies.Value{{Name: "height", Unit: "m", Value: 1.5}, {Name: "top_width", Unit: "m", Value: 4}, {Name: "batter", Unit: "1V:nH", Value: 2}},
		Proposal:   &remedies.Proposal{Section: section, Quantities: remedies.Quantities{Fill: []float64{0, 5.4375, 0}, Strip: 7.01}},
		Situations: situations, Stages: []remedies.Outcome{stage},
		StepLess: []remedies.StepLess{
			{Parameter: "height", Value: 1.4, Check: "normal water", FS: 1.2987, Required: 1.3},
			{Parameter: "top_width", Value: 3.75, Check: "normal water", FS: 1.3024, Required: 1.3},
			{Parameter: "batter", Value: 1.9, Limit: "steepest batter", FS: math.NaN()},
		},
		Certificate: &remedies.Certificate{
			Axes:           []optimize.Axis{{Name: "height", Min: 0.5, Max: 3, Step: 0.1}, {Name: "top_width", Min: 3, Max: 8, Step: 0.25}, {Name: "batter", Min: 2, Max: 2}, {}},
			CheaperDesigns: 2, Witnessed: 2, ContinuousEstimate: 5.31, Allowance: 0.005, Searches: 57, AuditSearches: 6, SlipEvaluations: 123456,
			AuditLowest: []remedies.AuditLow{{Check: "normal water", FS: 1.3061, Method: lem.Spencer, Required: 1.3}},
			Pool:        []remedies.Cut{{Check: 0, Setting: lem.Setting{Method: lem.Bishop, Slices: 40, MinDepth: 1}, Slip: stage.Slip}, {Check: 2, Slip: lem.Slip{Kind: lem.Polyline, Nodes: []lem.Point{{X: 30, Y: 105}, {X: 55, Y: 99}}}}},
			Witnesses:   []remedies.Witness{{X: []float64{1.4, 4, 2, math.NaN()}, Earthworks: 5.01, Cut: 0, FS: 1.2987}, {X: []float64{1.5, 3.75, 2, math.NaN()}, Earthworks: 5.06, Cut: 1, FS: 1.3024}},
		},
		Tradeoff: []remedies.TradeoffPoint{{Shift: 0.05, RequiredFS: 1.35, Reached: 1.3562, Earthworks: 8.8, Parameters: []remedies.Value{{Name: "height", Unit: "m", Value: 2}}}},
	}
}

func sampleDrains(job *remedies.Job) remedies.Option {
	drained := outcome(job, 0, 1.33)
	drained.Check.Situation.Water.Drains = &lem.Drawdown{Invert: lem.Profile{{X: 32, Y: 104}, {X: 52, Y: 97}}, Ratio: []float64{0.7, 0.7}, Fade: 2}
	drained.Check.Situation.Water.Free = []lem.FreeWater{{Level: 99.5, FromX: 60, ToX: 75}}
	drained.Check.Situation.Water.FreeDrainingLevel, drained.Check.Situation.Water.HasFreeDrainingLevel = 99.4, true
	midspan := drained
	midspan.Check.Note, midspan.FS = "midspan between drains", 1.309
	return remedies.Option{
		Name: "trench_drains", Title: "trench drains", Remedies: []string{"trench_drains"}, Status: remedies.MeetsTarget,
		Parameters: []remedies.Value{{Name: "depth", Unit: "m", Value: 4}, {Name: "effectiveness", Unit: "1", Value: math.NaN()}},
		Proposal: &remedies.Proposal{
			Section: job.Section, Quantities: remedies.Quantities{TrenchDig: 9.6, Stone: 9.6, Drain: 3.7},
			Notes: []string{"The water line spring is cut down to the new ground."}, NotChecked: []string{"end of construction: no cu given"},
			Violations: []remedies.Violation{{Limit: "cable", Detail: "trench within 1.5 m", By: 0.2}},
		},
		Situations: []remedies.Outcome{drained, midspan, outcome(job, 1, 1.24)},
	}
}
