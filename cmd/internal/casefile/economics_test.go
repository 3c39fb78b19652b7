package casefile

import (
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"

	"standfast/remedies"
)

// TestEconomicsAreFilled compares what is read with the file, number by number.
func TestEconomicsAreFilled(t *testing.T) {
	src := strings.Replace(small, "strata:", "  fill: {unit_weight: 19, drained: {cohesion: 0, friction: 36}, clay: false}\nstrata:", 1) + `
on_site_fill:
  - {name: cut, cut_of: clay, serves: [fill], share: 60%}
  - {name: stockpile, serves: [fill], volume: 250}
economics:
  currency: units
  strip_depth: 0.3
  bench_step: 0.5
  lorry_load: 10
  soils: {clay: {bulking: 1.3, shrinkage: 0.9}, fill: {import_rate: 5, import_carbon: 7}}
  stone: {bulking: 1.4}
  rates: {strip: 0.5, cut: 0}
  carbon: {element: 3}
limits:
  overhead: [{name: line, from: 20, to: 30, level: 70, clearance: 6}]
  steepest_batters: {permanent: 2.5, temporary: 0.5}
  minimum_bench_width: 2
  minimum_haul_width: 3.5
  maximum_import: 0
stages: {water: none, required_fs: 1.1, plant: 15}
`
	c, err := Parse("economics.yaml", []byte(src))
	if err != nil {
		t.Fatal(err)
	}
	j := c.Job
	clay, fill := -1, -1
	for i, s := range j.Section.Soils {
		switch s.Name {
		case "clay":
			clay = i
		case "fill":
			fill = i
		}
	}
	stock, none := 250.0, 0.0
	factors := make([]remedies.SoilFactors, max(clay, fill)+1)
	factors[clay] = remedies.SoilFactors{Bulking: 1.3, Shrinkage: 0.9}
	checks := map[string][2]any{
		"on site": {j.OnSite, []remedies.OnSiteFill{
			{Name: "cut", Cut: clay, Serves: []int{fill}, Share: 0.6},
			{Name: "stockpile", Cut: -1, Serves: []int{fill}, Share: 1, Volume: &stock},
		}},
		"economics": {j.Economics, remedies.Economics{
			Currency: "units", StripDepth: 0.3, BenchStep: 0.5, LorryLoad: 10, Soils: factors, Stone: remedies.SoilFactors{Bulking: 1.4},
			Cost:   remedies.Factors{Work: map[remedies.Work]float64{remedies.Strip: 0.5, remedies.Excavate: 0}, Import: map[int]float64{fill: 5}},
			Carbon: remedies.Factors{Work: map[remedies.Work]float64{remedies.Element: 3}, Import: map[int]float64{fill: 7}},
		}},
		"limits": {j.Limits, remedies.Limits{
			Overhead: []remedies.Overhead{{Name: "line", FromX: 20, ToX: 30, Level: 70, Clearance: 6}},
			Batters:  remedies.Batters{Permanent: 2.5, Temporary: 0.5}, MinBench: 2, MinHaul: 3.5, MaxImport: &none,
		}},
		"plant": {j.Stage.Plant, 15.0},
	}
	for name, c := range checks {
		if diff := cmp.Diff(c[1], c[0]); diff != "" {
			t.Errorf("%s (-want +got):\n%s", name, diff)
		}
	}
}

// TestEveryWorkIsDescribed checks that each work that may have a rate has a description for the reference.
func TestEveryWorkIsDescribed(t *testing.T) {
	for _, w := range remedies.Works() {
		if workMeaning(w) == "" || w.String() == "unknown" || w.Unit() == "" {
			t.Errorf("work %d has no name, unit or description", w)
		}
	}
}
