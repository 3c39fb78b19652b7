package report

import (
	"math"
	"strings"
	"testing"

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
		Reason:     "no batter within the limits reaches 1.300 in normal water; the flattest that stops short of the crest fence reaches 1.248",
		Parameters: []remedies.Value{{Name: "batter", Unit: "1V:nH", Value: 2.9}},
		Proposal:   works(job, "regrade", nil, 2.9, 0),
	}
	regrade.Situations, _ = outcomes(job, regrade.Proposal, 1.2489, 1.2511, 1.3)
	lower := remedies.Option{
		Name: "water_lowering", Title: "lower water (what-if)", Remedies: []string{"water_lowering"}, Status: remedies.Unresolved, WhatIf: true,
		Reason: "no slip converged in wet spring", Proposal: works(job, "water_lowering", nil, 2),
	}
	lower.Situations, _ = outcomes(job, lower.Proposal, 1.31, math.NaN(), 1.3)
	existing := remedies.Option{Name: "existing", Title: "existing slope", Status: remedies.Existing, Proposal: remedies.Start(job)}
	existing.Situations, _ = outcomes(job, existing.Proposal, 1.1506, 1.0413)
	result := &remedies.Result{
		Job: job, Settings: remedies.Settings{Seed: 7, Workers: 3}, Existing: existing, Least: "berm",
		Options: []remedies.Option{berm, drains, regrade, lower},
	}
	return result, Source{
		File: "made-up.yaml", SHA256: "00ff", Version: "v0", Notes: []string{"toe taken at (52.50, 100.00)"},
		Files: []string{"result.json", "witnesses.json"},
	}
}

func sampleJob() *remedies.Job {
	outfall := 99.4
	ground := lem.Profile{{X: 0, Y: 109}, {X: 30, Y: 109}, {X: 52.5, Y: 100}, {X: 75, Y: 100}}
	return &remedies.Job{
		Title: "Made-up Bank", Length: 80, Crest: lem.Point{X: 30, Y: 109}, Toe: lem.Point{X: 52.5, Y: 100}, MinDepth: 1,
		Stage:  remedies.StageSettings{Given: true, RequiredFS: 1.1},
		Limits: remedies.Limits{Outfall: &outfall},
		Exit:   lem.Range{From: 40, To: 70}, Direction: lem.RightwardOnly, Clay: []bool{true, false, false},
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
			{Name: "normal water", RequiredFS: 1.3, DrainsWorking: 1, Free: []lem.FreeWater{{Level: 100.2, FromX: 60, ToX: 75}}},
			{Name: "wet spring", RequiredFS: 1.2, Kh: 0.05, DrainsWorking: 0.5, Undrained: []bool{true, false, false}},
		},
	}
}

// works applies a remedy of these sizes to the job.
func works(job *remedies.Job, kind string, soils map[string]int, x ...float64) *remedies.Proposal {
	k, _ := remedies.Find(kind)
	r := remedies.DefaultRequest(&k)
	r.Soils = soils
	for i := range x {
		r.Axes[i] = optimize.Axis{Name: k.Parameters[i].Name, Min: x[i], Max: x[i]}
	}
	for len(x) < len(r.Axes) {
		x = append(x, math.NaN())
	}
	p, err := remedies.Apply(job, []remedies.Request{r}, [][]float64{x})
	if err != nil {
		panic(err)
	}
	return p
}

// outcomes returns invented answers to the checks of a proposal.
func outcomes(job *remedies.Job, p *remedies.Proposal, fs ...float64) (situations, stages []remedies.Outcome) {
	for i, c := range remedies.Checks(job, p) {
		o := remedies.Outcome{
			Check: c, FS: fs[i], Method: lem.Bishop, Resolved: true,
			ByMethod: map[lem.Method]float64{lem.Ordinary: fs[i] - 0.1, lem.Bishop: fs[i], lem.Spencer: fs[i] + 0.004},
			Slip:     lem.Slip{Kind: lem.Circle, Centre: lem.Point{X: 48, Y: 120}, Radius: 20.5},
			From:     lem.Point{X: 30.75, Y: 108.7}, To: lem.Point{X: 52.9, Y: 100}, Depth: 3.879,
		}
		if c.Stage {
			stages = append(stages, o)
		} else {
			situations = append(situations, o)
		}
	}
	return situations, stages
}

func sampleBerm(job *remedies.Job) remedies.Option {
	p := works(job, "berm", map[string]int{"fill": 1}, 1.5, 4, 2)
	situations, stages := outcomes(job, p, 1.30578, 1.2213, 1.17)
	return remedies.Option{
		Name: "berm", Title: "toe berm", Remedies: []string{"berm"}, Status: remedies.MeetsTarget, Reason: "every check stands",
		Binding:    "normal water",
		Parameters: []remedies.Value{{Name: "height", Unit: "m", Value: 1.5}, {Name: "top_width", Unit: "m", Value: 4}, {Name: "batter", Unit: "1V:nH", Value: 2}},
		Proposal:   p, Situations: situations, Stages: stages,
		StepLess: []remedies.StepLess{
			{Parameter: "height", Value: 1.4, Check: "normal water", FS: 1.2987, Required: 1.3},
			{Parameter: "top_width", Value: 3.75, Check: "normal water", FS: 1.3024, Required: 1.3},
			{Parameter: "batter", Value: 1.9, Limit: "steepest batter", FS: math.NaN()},
		},
		Certificate: &remedies.Certificate{
			Axes:           []optimize.Axis{{Name: "height", Min: 0.5, Max: 3, Step: 0.1}, {Name: "top_width", Min: 3, Max: 8, Step: 0.25}, {Name: "batter", Min: 2, Max: 2}, {}},
			CheaperDesigns: 2, Witnessed: 2, ContinuousEstimate: 5.31, Allowance: 0.005, Searches: 57, AuditSearches: 6, SlipEvaluations: 123456,
			AuditLowest: []remedies.AuditLow{{Check: "normal water", FS: 1.3061, Method: lem.Spencer, Required: 1.3}},
			Pool:        []remedies.Cut{{Check: 0, Setting: lem.Setting{Method: lem.Bishop, Slices: 40, MinDepth: 1}, Slip: situations[0].Slip}, {Check: 2, Slip: lem.Slip{Kind: lem.Polyline, Nodes: []lem.Point{{X: 30, Y: 105}, {X: 55, Y: 99}}}}},
			Witnesses:   []remedies.Witness{{X: []float64{1.4, 4, 2, math.NaN()}, Earthworks: 5.01, Cut: 0, FS: 1.2987}, {X: []float64{1.5, 3.75, 2, math.NaN()}, Earthworks: 5.06, Cut: 1, FS: 1.3024}},
		},
		Tradeoff: []remedies.TradeoffPoint{{Shift: 0.05, RequiredFS: 1.35, Reached: 1.3562, Earthworks: 8.8, Parameters: []remedies.Value{{Name: "height", Unit: "m", Value: 2}}, Proposal: p, Situations: situations, Stages: stages}},
	}
}

func sampleDrains(job *remedies.Job) remedies.Option {
	p := works(job, "trench_drains", nil, 4, 6, 0.6, 0.7)
	p.NotChecked = append(p.NotChecked, "end of construction: no cu given")
	p.Notes = append(p.Notes, "water line spring is cut down to the new ground")
	p.Violations = append(p.Violations, remedies.Violation{Limit: "cable", Detail: "trench within 1.5 m", By: 0.2})
	fs := make([]float64, len(remedies.Checks(job, p)))
	for i := range fs {
		fs[i] = 1.309 + 0.01*float64(i)
	}
	situations, stages := outcomes(job, p, fs...)
	return remedies.Option{
		Name: "trench_drains", Title: "trench drains", Remedies: []string{"trench_drains"}, Status: remedies.MeetsTarget,
		Parameters: []remedies.Value{{Name: "depth", Unit: "m", Value: 4}, {Name: "effectiveness", Unit: "1", Value: math.NaN()}},
		Proposal:   p, Situations: situations, Stages: stages,
	}
}

// priceSample gives the sample invented rates and limits: clay and a stockpile may serve as fill.
func priceSample(job *remedies.Job) {
	most, bring := 40.0, 500.0
	job.Objective, job.Stage.Plant = remedies.LeastCost, 15
	job.OnSite = []remedies.OnSiteFill{{Name: "cut", Cut: 0, Serves: []int{1}, Share: 0.8}, {Name: "stockpile", Cut: -1, Serves: []int{1}, Share: 1, Volume: &most}}
	job.Economics = remedies.Economics{
		Currency: "EUR", BenchStep: 0.5, LorryLoad: 10, Soils: []remedies.SoilFactors{{Bulking: 1.3, Shrinkage: 0.9}, {Bulking: 1.2, Shrinkage: 0.95}},
		Cost: remedies.Factors{
			Work:   map[remedies.Work]float64{remedies.Strip: 0, remedies.Excavate: 2, remedies.Benching: 0, remedies.Place: 3, remedies.Import: 7, remedies.Dispose: 5},
			Import: map[int]float64{1: 8},
		},
		Carbon: remedies.Factors{Work: map[remedies.Work]float64{remedies.Import: 12}},
	}
	job.Limits.Overhead = []remedies.Overhead{{Name: "line", FromX: 20, ToX: 30, Level: 130, Clearance: 6}}
	job.Limits.Batters = remedies.Batters{Permanent: 1.5, Temporary: 0.5}
	job.Limits.MinBench, job.Limits.MinHaul, job.Limits.MaxImport = 2, 3, &bring
}

// TestTotalsAreTheBill: what is brought, what it costs and how it is carried follow from the fill of the berm, the stockpile and the rates.
func TestTotalsAreTheBill(t *testing.T) {
	result, src := sample()
	priceSample(result.Job)
	berm := New(result, src).Options[0]
	fill, length := result.Options[0].Proposal.Quantities.Fill[1], 80.0
	brought := fill*length - 40 // All but what the stockpile holds; nothing is cut.
	loads := math.Ceil(brought / 0.95 * 1.2 / 10)
	for _, c := range []struct {
		name      string
		got, want float64
	}{
		{"fill", berm.Totals.Fill, fill * length},
		{"import", berm.Totals.Import, brought},
		{"import per metre", berm.Quantities.Import, brought / length},
		{"disposal", berm.Totals.Dispose, 0},
		{"cost", float64(*berm.Totals.Cost), 40*3 + brought*8},
		{"lorry loads", float64(*berm.Totals.Loads), loads},
	} {
		if math.Abs(c.got-c.want) > 1e-9*(1+c.want) {
			t.Errorf("%s: %v, want %v", c.name, c.got, c.want)
		}
	}
	if berm.Totals.Carbon != nil { // The factors of placing and stripping are blank.
		t.Errorf("carbon %v though factors that it needs are blank", *berm.Totals.Carbon)
	}
	if p := berm.Tradeoff[0]; p.Cost == nil || *p.Cost != *berm.Totals.Cost {
		t.Errorf("the point of the trade-off with the same works costs %v", p.Cost)
	}
	var works []string
	for _, it := range berm.Bill {
		works = append(works, it.Work+" "+it.Soil)
	}
	if got := strings.Join(works, ", "); got != "strip , benching , place fill, import fill" {
		t.Errorf("the bill has: %s", got)
	}
}
