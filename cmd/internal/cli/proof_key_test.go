package cli

import (
	"bytes"
	"encoding/json"
	"errors"
	"math"
	"testing"

	"standfast/cmd/internal/casefile"
	"standfast/cmd/internal/report"
	"standfast/lem"
	"standfast/remedies"
)

// openKey is an invented cutting in summer, 9 m deep in clay, whose toe is dug for the key of a buttress: 3 m wide, 1 m below the toe, with a
// nearly vertical back, in panels 3 m long every 15 m. Slips of its back alone are left out: their F hangs on the depth that is just looked at.
const openKey = `
title: invented cutting with an open key
length: 60
ground: [[0, 109.6], [30, 109], [52.5, 100], [75, 99.8]]
slope: {crest: [30, 109], toe: [52.5, 100]}
ignore_slips_shallower_than: 1.5
soils:
  weathered clay: {unit_weight: 19, drained: {cohesion: 3, friction: 23}, undrained: {strength: 35}}
  stiff clay: {unit_weight: 19.8, drained: {cohesion: 4, friction: 23}, undrained: {strength: 60}}
  mudstone: {unit_weight: 20.5, drained: {cohesion: 20, friction: 28}, clay: false}
  rockfill: {unit_weight: 20, drained: {cohesion: 0, friction: 40}, free_draining: true}
strata:
  - {soil: weathered clay, top: ground}
  - {soil: stiff clay, top: [[0, 106.1], [30, 105.5], [52.5, 97.5], [75, 97.3]]}
  - {soil: mudstone, top: [[0, 96], [75, 95.5]]}
water:
  summer: [[0, 105.6], [22, 105], [30, 104.2], [40, 102], [52.5, 99.2], [75, 98.6]]
surcharges:
  - {name: track, from: 20, to: 29, pressure: 5}
situations:
  - {name: summer, water: summer, required_fs: 1.1}
stages: {water: summer, required_fs: 1.1}
remedies:
  buttress: {fill: rockfill, height: 2, top_width: 3, batter: 1.5, key_depth: 1, key_width: 3, key_offset: 1.5, key_batter: 0.05, key_panel: 3, key_spacing: 15}
`

// TestOpenKeyByAStranger compares the least F of circles by Bishop's method that the program finds on the slope as it is, on the open key in
// plane strain and in panels, with that of a stranger's own search on the sections of result.json. The two share no code; his grid may stop a
// little short of the bottom, and the program may not be above what he found.
func TestOpenKeyByAStranger(t *testing.T) {
	j, request := jobOf(t, []byte(openKey), "buttress")
	p, err := remedies.Apply(j, []remedies.Request{request}, [][]float64{request.Fixed()})
	if err != nil {
		t.Fatal(err)
	}
	checks := append(remedies.Checks(j, remedies.Start(j)), remedies.Checks(j, p)...)
	o := remedies.Option{Name: "key", Proposal: p}
	for i := range checks {
		c := checks[i]
		c.Stage, c.Advisory = true, false
		o.Stages = append(o.Stages, remedies.Outcome{Check: c, FS: math.NaN()})
	}
	var b bytes.Buffer
	f := new(theirFile)
	result := &remedies.Result{Job: j, Options: []remedies.Option{o}}
	if err := errors.Join(report.New(result, sourceOf(&casefile.Case{}, nil)).Encode(&b), json.Unmarshal(b.Bytes(), f)); err != nil {
		t.Fatal(err)
	}
	gs, answers := strangers(f, &f.Options[0])
	least := map[string]float64{}
	for i, g := range gs {
		const theirs, ours = 0.006, 0.001 // Shares of F.
		name := answers[i].Name
		circles := g.searchGrid()
		if len(circles) == 0 {
			t.Fatalf("%s: no circle", name)
		}
		var m lem.Model
		if err := m.Compile(checks[i].Section, &checks[i].Situation); err != nil {
			t.Fatal(err)
		}
		found, err := m.Search(t.Context(), lem.SearchOptions{MinDepth: j.MinDepth, Seed: 1, Slices: fewSlices})
		if err != nil {
			t.Fatal(err)
		}
		want := circles[0].f
		got := math.Inf(1)
		for _, basin := range found.Basins {
			if basin.Setting.Method == lem.Bishop {
				got = min(got, basin.Result.F)
			}
		}
		if !(got <= want*(1+ours) && got >= want*(1-theirs)) {
			t.Errorf("%s: F by Bishop %.4f, a stranger finds %.4f", name, got, want)
		}
		if _, there := least[name]; !there {
			least[name] = want
		}
		t.Logf("%s: F by Bishop %.4f, a stranger finds %.4f", name, got, want)
	}
	before, hole, panels := least["summer"], least["key open, plane strain"], least["key open, in panels"]
	if !(hole < panels-0.05 && panels < before && panels > 1.1) {
		t.Errorf("F %g before, %g in panels, %g in plane strain", before, panels, hole)
	}
}
