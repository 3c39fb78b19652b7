package casefile

import (
	"errors"
	"math"
	"slices"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/google/go-cmp/cmp/cmpopts"
	"pgregory.net/rapid"

	"standfast/lem"
	"standfast/remedies"
)

// exact allows for nothing but the last digits of a coordinate, m, and of an angle turned into degrees and back.
var exact = cmpopts.EquateApprox(0, 1e-9)

// option returns a proposal as an option that was checked at the required FS of its situations.
func option(c *Case, name string, p *remedies.Proposal) *remedies.Option {
	o := &remedies.Option{Name: name, Title: name, Proposal: p}
	for i, s := range c.Job.Situations {
		o.Situations = append(o.Situations, remedies.Outcome{Check: remedies.Check{SituationI: i, Required: s.RequiredFS}})
	}
	return o
}

// reread writes an option and reads it again.
func reread(t *testing.T, c *Case, o *remedies.Option) *Case {
	t.Helper()
	src, err := c.Proposed(o)
	if err != nil {
		t.Fatal(err)
	}
	again, err := Parse(o.Name+".yaml", src)
	if err != nil {
		t.Fatalf("%v\nin\n%s", err, src)
	}
	return again
}

// compareProposal compares a re-read case with the proposal that was written.
func compareProposal(t *testing.T, c *Case, o *remedies.Option, again *Case) {
	t.Helper()
	p := o.Proposal
	if diff := cmp.Diff(p.Section, again.Job.Section, exact, cmpopts.EquateEmpty()); diff != "" {
		t.Errorf("%s: section (-written +read):\n%s", o.Name, diff)
	}
	for i, s := range again.Job.Situations {
		var line lem.Profile
		if s.Water >= 0 {
			line = again.Job.Waters[s.Water].Line
		}
		want := c.Job.Situations[i]
		checks := map[string][2]any{
			"line":      {p.Waters[i].Line, line},
			"free":      {p.Waters[i].Free, s.Free},
			"drains":    {p.Waters[i].Drains, again.Job.Situations[i].Drains},
			"name":      {want.Name, s.Name},
			"undrained": {want.Undrained, s.Undrained},
			"kh":        {want.Kh, s.Kh},
			"required":  {o.Situations[i].Check.Required, s.RequiredFS},
		}
		for what, pair := range checks {
			if diff := cmp.Diff(pair[0], pair[1], exact, cmpopts.EquateEmpty()); diff != "" {
				t.Errorf("%s: situation %d: %s (-written +read):\n%s", o.Name, i+1, what, diff)
			}
		}
	}
	same := func(j *remedies.Job) []any {
		return []any{j.Crest, j.Toe, j.Clay, j.Limits, j.MinDepth, j.Head, j.Exit, j.Direction, j.SideForce, j.Length}
	}
	if diff := cmp.Diff(same(c.Job), same(again.Job), exact, cmpopts.EquateEmpty()); diff != "" {
		t.Errorf("%s: (-written +read):\n%s", o.Name, diff)
	}
	if len(again.Job.Requests)+len(again.Job.Trials) > 0 || again.Job.Stage.Given || !again.Finished {
		t.Errorf("%s: remedies, trials or stages are left", o.Name)
	}
}

// TestProposedRoundTrip writes every remedy of the demos at the middle of its ranges and reads it back.
func TestProposedRoundTrip(t *testing.T) {
	for _, name := range demos {
		c := readDemo(t, name)
		for _, q := range c.Job.Requests {
			var x []float64
			for _, a := range q.Axes {
				if a.Name == "" {
					x = append(x, math.NaN())
					continue
				}
				x = append(x, a.At(a.Len()/2))
			}
			p, err := remedies.Apply(c.Job, []remedies.Request{q}, [][]float64{x})
			if err != nil {
				t.Fatal(err)
			}
			o := option(c, q.Kind, p)
			compareProposal(t, c, o, reread(t, c, o))
		}
	}
}

// TestEverythingRoundTrips writes a case that has every kind of thing in it, untouched by works.
func TestEverythingRoundTrips(t *testing.T) {
	src := `title: "All of it: \"quotes\", # and 🚧"
length: 12.5
ground: [[0, 10.123456789012345], [20, 10], [20, 9], [30, 5], [50, 5]]
slope: {crest: [20, 10], toe: [30, 5]}
soils:
  "yes": {unit_weight: 19, saturated_unit_weight: 19.7, drained: {cohesion: 2, friction: 24.7}, undrained: {strength: 20, gradient: 1.5, below: ground}}
  "12": {unit_weight: 19, drained: {cohesion: 0, friction: 33.3}, ru: 0.2, clay: false}
  ": odd": {unit_weight: 20, drained: {cohesion: 5, friction: 0}, undrained: {points: [[1, 2, 30], [1, 4, 20]]}}
  rockfill: {unit_weight: 20, drained: {cohesion: 0, friction: 40}, free_draining: true}
strata:
  - {soil: "yes", top: ground}
  - {soil: "12", top: [[0, 7], [50, 3]]}
  - {soil: ": odd", top: [[0, 4], [50, 1]]}
placed: [{soil: rockfill, outline: [[30, 5], [31, 6], [33, 5]]}]
water:
  high: [[0, 9], [50, 4.5]]
  deep: {line: [[0, 8], [50, 6]], artesian: true}
firm_base: [[0, -3], [50, -4]]
restraints: [{name: piles, x: 25, top: 8, bottom: -1.5, force: 48.25}]
surcharges:
  - {name: track, from: 1, to: 4, pressure: 5}
  - {name: crane, from: 5, to: 7, pressure: 20, variable: true}
situations:
  - {name: none, water: high, required_fs: 1.3, kh: 0.1, free_water: [{level: 5.5, from: 29, to: 50}]}
  - {name: artesian, water: deep, required_ratio: 1.2, strength: {"yes": undrained}}
  - {name: dry, water: none, required_fs: 1.05, drains_working: 50%}
stages: {water: high, required_fs: 1.1}
limits:
  works_between: {left: 4, right: {x: 45, name: fence}}
  keep_clear: [{name: main, from: 2, to: 3, forbid: [load, dig], dig_allowed_to_depth: 0.4}]
  maximum_levels: [{name: wires, from: 2, to: 30, level: 14}]
  drain_outfall: 4.5
  overhead: [{name: power line, from: 20, to: 30, level: 20, clearance: 6}]
  steepest_batters: {permanent: 2.5, temporary: 0.5}
  minimum_bench_width: 2
  minimum_haul_width: 3.5
  maximum_import: 0
slips: {head: [0, 20], toe: [25, 50], direction: rightward}
side_force_function: [0.1, 0.5, 0.7, 0.9, 1, 1, 1, 0.9, 0.7, 0.5, 0.25]
`
	c, err := Parse("all.yaml", []byte(src))
	if err != nil {
		t.Fatal(err)
	}
	o := option(c, "existing", remedies.Start(c.Job))
	if _, err := c.Proposed(o); !errors.Is(err, ErrNotWritable) {
		t.Errorf("an unresolved ratio is written: %v", err)
	}
	resolved, unchecked := *c, *o
	j := *c.Job
	j.Situations = slices.Clone(j.Situations)
	j.Situations[1].RequiredFS = 1.44
	resolved.Job, unchecked.Situations = &j, nil
	if text, err := resolved.Proposed(&unchecked); err != nil || !strings.Contains(string(text), "1.44") {
		t.Errorf("an option that was never checked, where the ratio came to 1.44: %v", err)
	}
	o.Situations[1].Check.Required = 1.44
	o.Proposal.Waters[0].Drains = &lem.Drawdown{Invert: lem.Profile{{X: 20, Y: 6}, {X: 30, Y: 4}}, Ratio: []float64{0.5, 1. / 3}, Fade: 1.25}
	again := reread(t, c, o)
	compareProposal(t, c, o, again)
	if !again.Job.Waters[1].Artesian || again.Job.Waters[0].Artesian {
		t.Error("which line is artesian got lost")
	}
}

// TestRandomProposalsRoundTrip writes random grounds after works and lines, and reads them back.
func TestRandomProposalsRoundTrip(t *testing.T) {
	c, err := Parse("small.yaml", []byte(small))
	if err != nil {
		t.Fatal(err)
	}
	rapid.Check(t, func(rt *rapid.T) {
		line := func(label string) lem.Profile {
			p := lem.Profile{{X: 0, Y: rapid.Float64Range(-20, 20).Draw(rt, label)}}
			for range rapid.IntRange(1, 5).Draw(rt, label) {
				last := p[len(p)-1]
				p = append(p, lem.Point{X: last.X + rapid.Float64Range(1e-3, 30).Draw(rt, label), Y: rapid.Float64Range(-20, 20).Draw(rt, label)})
			}
			return p
		}
		p := remedies.Start(c.Job)
		p.Section.Ground = line("ground")
		p.Waters[0].Line = line("water")
		o := option(c, "random", p)
		compareProposal(t, c, o, reread(t, c, o))
	})
}

func TestHeaderNamesOriginAndCaution(t *testing.T) {
	c := readDemo(t, demos[0])
	c.File = "odd\nname: yes.yaml"
	src, err := c.Proposed(option(c, "existing", remedies.Start(c.Job)))
	if err != nil {
		t.Fatal(err)
	}
	for _, want := range []string{"# Proposed section", "odd?name: yes.yaml", c.SHA256, "competent engineer"} {
		if !strings.Contains(string(src), want) {
			t.Errorf("no %q in the head of\n%s", want, src)
		}
	}
	if strings.Contains(string(src), "remedies:") {
		t.Error("remedies are left in the file")
	}
	if _, err := c.Proposed(&remedies.Option{Name: "empty"}); !errors.Is(err, ErrNotWritable) {
		t.Errorf("an option without a section gives %v", err)
	}
}
