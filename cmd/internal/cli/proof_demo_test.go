package cli

import (
	"bytes"
	"encoding/json"
	"errors"
	"maps"
	"math"
	"math/rand/v2"
	"os"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"

	"standfast/cmd/internal/report"
	"standfast/remedies"
)

const demoFolder = "../../../testdata/demo"

// study sizes the remedies of a case and returns its result.json, which is that of the command but for the trade-off curves, and its
// witnesses.json. Without names it sizes all.
func study(t *testing.T, path string, workers int, only ...string) (result, witnesses []byte) {
	t.Helper()
	read, err := readCase(path)
	if err != nil {
		t.Fatal(err)
	}
	if err := applyOnly(read.Job, only); err != nil {
		t.Fatal(err)
	}
	answer, err := remedies.Study(t.Context(), read.Job, remedies.Settings{Workers: workers})
	if err != nil {
		t.Fatal(err)
	}
	var r, w bytes.Buffer
	src := sourceOf(read, nil)
	if err := errors.Join(report.New(answer, src).Encode(&r), report.NewWitnesses(answer, src).Encode(&w)); err != nil {
		t.Fatal(err)
	}
	return r.Bytes(), w.Bytes()
}

// resultOf returns what a stranger reads of the result of a case.
func resultOf(t *testing.T, path string, only ...string) *theirFile {
	t.Helper()
	result, _ := study(t, path, 0, only...)
	f := new(theirFile)
	if err := json.Unmarshal(result, f); err != nil {
		t.Fatal(err)
	}
	return f
}

// strangers returns a stranger for each check of an option, with the answer that the file gives. What is only told beside a check is left out.
func strangers(f *theirFile, o *theirOption) (gs []*stranger, answers []*theirAnswer) {
	for i := range o.Situations {
		a := &o.Situations[i]
		for _, s := range f.Situations {
			if s.Name == a.Name || s.Name == a.Of {
				gs = append(gs, &stranger{f, &o.Section, o.Section.Water[a.Name], s.Strength, s.Kh})
				answers = append(answers, a)
			}
		}
	}
	for i := range o.Stages {
		a := &o.Stages[i]
		if a.Advisory {
			continue
		}
		own := *f
		own.Soils = maps.Clone(f.Soils)
		maps.Copy(own.Soils, a.Section.Soils)
		gs = append(gs, &stranger{&own, &a.Section, a.Section.Water[a.Name], a.Strength, a.Kh})
		answers = append(answers, a)
	}
	return gs, answers
}

const (
	manySlices = 1000  // A stranger's slices of a slip that is reported,
	someSlices = 300   // of one that may be the lowest,
	fewSlices  = 40    // and of one that is looked at in passing.
	agreement  = 0.005 // Share of F within which two analyses of one slip agree.
	belowOK    = 0.002 // F by which a stranger may find a slip below the required F.
	circles    = 2500
)

// shortRun are the remedies of each demo that the short run sizes: all that meet the target, and some that do not.
var shortRun = map[string][]string{
	"cutting":    {"regrade", "unload", "berm", "water_lowering"},
	"embankment": {"berm"},
}

// known keeps what demo has worked out.
var known = map[string]*theirFile{}

// demo returns the result of a demo, all of its remedies in the long run.
func demo(t *testing.T, name string) *theirFile {
	t.Helper()
	if known[name] == nil {
		only := shortRun[name]
		if longRun {
			only = nil
		}
		known[name] = resultOf(t, filepath.Join(demoFolder, name+".yaml"), only...)
	}
	return known[name]
}

// TestStranger lets a stranger analyse the demos from result.json alone: F on every reported slip agrees, and no option that meets the
// target falls short, neither on the reported slips nor in a random search.
func TestStranger(t *testing.T) {
	for _, name := range []string{"cutting", "embankment"} {
		t.Run(name, func(t *testing.T) {
			f := demo(t, name)
			if met := strangersCheck(t, f); met == 0 || f.Least == nil {
				t.Errorf("%d options meet the target", met)
			}
		})
	}
}

// TestExchangeIsShort checks that the exchange takes few designs searched in full for each remedy of the demos, and that it leaves the walk few
// more: all others are rejected by slips known by then.
func TestExchangeIsShort(t *testing.T) {
	const exchange, all = 12, 18
	for _, name := range []string{"cutting", "embankment"} {
		for _, o := range demo(t, name).Options {
			c := o.Certificate
			if c == nil || c.Exchange < 1 || c.Exchange > exchange || c.Searched < c.Exchange || c.Searched > all {
				t.Errorf("%s, %s: certificate %+v, want at most %d designs searched by the exchange and %d in all", name, o.Name, c, exchange, all)
			}
		}
	}
}

// TestStoryOfTheCutting checks what the demo is there to show: within the limits flattening and unloading do not get there, and each says
// what stops it; something else does.
func TestStoryOfTheCutting(t *testing.T) {
	f := demo(t, "cutting")
	limits := []string{"crest fence", "toe fence", "cable", "highest berm"}
	met := 0
	for _, o := range f.Options {
		if o.Status == "meets target" && !o.WhatIf {
			met++
		}
		if o.Name != "regrade" && o.Name != "unload" {
			continue
		}
		names := slices.ContainsFunc(limits, func(l string) bool { return strings.Contains(o.Binds, l) && strings.Contains(o.Reason, l) })
		if o.Status != "infeasible" || !names || !strings.Contains(o.Reason, "reaches FS 1.") {
			t.Errorf("%s is %s, bound by %q: %s", o.Name, o.Status, o.Binds, o.Reason)
		}
	}
	if met == 0 || f.Least == nil || !slices.ContainsFunc(f.Options, func(o theirOption) bool { return o.Name == *f.Least }) {
		t.Errorf("%d options meet the target, least %v", met, f.Least)
	}
	for _, a := range f.Existing.Situations {
		if a.FS == nil || !(*a.FS < a.Required) {
			t.Errorf("the slope as it is stands in %s", a.Name)
		}
	}
}

// TestStrangerOfEverything does the same for an invented case that has everything a section can hold. In the short run it
// faces right only.
func TestStrangerOfEverything(t *testing.T) {
	for _, facing := range []string{"right", "left"} {
		t.Run(facing, func(t *testing.T) {
			if facing == "left" && !longRun {
				t.Skip("in the long run only: STANDFAST_LONG=1")
			}
			path := filepath.Join(t.TempDir(), "everything.yaml")
			if err := os.WriteFile(path, []byte(everything(facing == "left")), 0o644); err != nil {
				t.Fatal(err)
			}
			strangersCheck(t, resultOf(t, path))
		})
	}
}

// strangersCheck checks every option of a file and returns how many meet the target.
func strangersCheck(t *testing.T, f *theirFile) (met int) {
	t.Helper()
	compared := 0
	for i := range f.Options {
		o := &f.Options[i]
		meets := o.Status == "meets target"
		gs, answers := strangers(f, o)
		for k, g := range gs {
			a := answers[k]
			name := o.Name + ", " + a.Name
			compared += g.compare(t, name, a, meets)
			if !meets {
				continue
			}
			low, at := g.lookAround(rand.New(rand.NewPCG(3, uint64(k))), circles)
			if low < a.Required-belowOK {
				t.Errorf("%s: F = %.4f, required %.3f, on the circle from x = %.2f to %.2f m with centre %.2f, %.2f", name, low, a.Required, at[0], at[1], at[2], at[3])
			}
			t.Logf("%s: F reported %.4f, lowest of a stranger's search %.4f, required %.2f", name, *a.FS, low, a.Required)
		}
		if meets {
			met++
		}
	}
	if compared == 0 {
		t.Error("nothing was compared")
	}
	return met
}

// compare compares F by Bishop, Spencer and Morgenstern and Price on the slip that the file reports for a check, and returns how many of
// them the file has.
func (g *stranger) compare(t *testing.T, name string, a *theirAnswer, meets bool) (compared int) {
	t.Helper()
	if a.FS == nil || a.Slip == nil {
		t.Errorf("%s: no FS", name)
		return 0
	}
	base := chain(a.Slip.Points)
	if a.Slip.Kind == "circle" {
		base = arc(a.Slip.Centre, a.Slip.Radius)
	}
	ss, _ := g.cut(base, a.Slip.From[0], a.Slip.To[0], manySlices)
	lowest := math.Inf(1)
	for method, want := range a.ByMethod {
		var by solution
		switch method {
		case "bishop":
			by = bishop(a.Slip.Centre[1], a.Slip.Radius)
		case "spencer":
			by = rigorous(func(float64) float64 { return 1 }, want)
		case "morgenstern-price":
			by = rigorous(g.file.sideForce, want)
		default:
			continue
		}
		compared++
		f, _ := g.solve(ss, by)
		lowest = min(lowest, f)
		if !(math.Abs(f-want) <= agreement*want) {
			t.Errorf("%s: F by %s on the reported %s is %.4f, the file says %.4f", name, method, a.Slip.Kind, f, want)
		}
	}
	if meets && !(lowest >= a.Required-belowOK) {
		t.Errorf("%s: F on the reported slip is %.4f, required %.3f", name, lowest, a.Required)
	}
	return compared
}

// lookAround tries random circles through two points of the ground, then small random changes of the lowest, and returns the lowest F,
// by many slices, with x of both ends and the centre.
func (g *stranger) lookAround(rng *rand.Rand, circles int) (lowest float64, at [4]float64) {
	lowest = math.Inf(1)
	ground := g.section.Ground
	left, width := ground[0][0], ground[len(ground)-1][0]-ground[0][0]
	var best [3]float64
	try := func(v [3]float64) {
		x0, x1, half := min(v[0], v[1]), max(v[0], v[1]), v[2]
		if !(x1-x0 > 0.01 && half > 0.01 && half < math.Pi/2 && x0 >= left && x1 <= left+width) {
			return
		}
		y0, y1 := ground.at(x0), ground.at(x1)
		chord := math.Hypot(x1-x0, y1-y0)
		up, r := chord/2/math.Tan(half), chord/2/math.Sin(half)
		c := theirPoint{(x0+x1)/2 - (y1-y0)/chord*up, (y0+y1)/2 + (x1-x0)/chord*up}
		if c[1] < max(y0, y1) || g.counted(c, r, x0, x1, fewSlices) > lowest*1.01 {
			return
		}
		if f := g.counted(c, r, x0, x1, someSlices); f < lowest {
			lowest, best, at = f, v, [4]float64{x0, x1, c[0], c[1]}
		}
	}
	for range circles {
		half := rng.Float64()
		try([3]float64{left + width*rng.Float64(), left + width*rng.Float64(), half * half * math.Pi / 2})
	}
	for step := 0.1; step > 0.001; step *= 0.985 {
		n := rng.NormFloat64
		try([3]float64{best[0] + step*n()*width/10, best[1] + step*n()*width/10, best[2] + step*n()})
	}
	return lowest, at
}

// counted returns F of an arc, +Inf if it is none that the file's settings count.
func (g *stranger) counted(c theirPoint, r, from, to float64, n int) float64 {
	ss, ok := g.cut(arc(c, r), from, to, n)
	if !ok {
		return math.Inf(1)
	}
	f, leftward := g.solve(ss, bishop(c[1], r))
	head, exit := from, to
	if leftward {
		head, exit = to, from
	}
	s := &g.file.Settings
	within := func(x float64, r *[2]float64) bool { return r == nil || r[0] <= x && x <= r[1] }
	wrongWay := s.Direction == "left" && !leftward || s.Direction == "right" && leftward
	if math.IsNaN(f) || wrongWay || !within(head, s.Ranges.Head) || !within(exit, s.Ranges.Exit) {
		return math.Inf(1)
	}
	return f
}

// everything returns an invented case that has everything a section can hold: soils with every kind of strength and water, a pinched-out
// stratum, a placed body, free water, surcharges of both kinds, an earthquake, a firm base, drains. It descends to the right, or to the
// left if it is mirrored.
func everything(mirrored bool) string {
	text := `
title: invented case that has everything
length: 30
ground: [[0, 20], [22, 19.6], [40, 10.4], [48, 10], [52, 8.5], [70, 8.5]]
slope: {crest: [22, 19.6], toe: [40, 10.4]}
ignore_slips_shallower_than: 0.7
soils:
  old fill: {unit_weight: 18, saturated_unit_weight: 19.5, drained: {cohesion: 2, friction: 29}, ru: 0.12, clay: false}
  brown clay: {unit_weight: 18.5, saturated_unit_weight: 19.2, drained: {cohesion: 4, friction: 25}, undrained: {strength: 38, gradient: 1.5, below: ground}}
  grey clay: {unit_weight: 17, drained: {cohesion: 3, friction: 24}, undrained: {points: [[10, 9, 60], [10, 3, 75], [40, 9, 34], [40, 3, 52]]}}
  sandstone: {unit_weight: 22, drained: {cohesion: 30, friction: 33}, clay: false}
  stone: {unit_weight: 20, saturated_unit_weight: 21.5, drained: {cohesion: 0, friction: 40}, free_draining: true}
  sand fill: {unit_weight: 19, saturated_unit_weight: 20, drained: {cohesion: 0, friction: 35}, clay: false}
strata:
  - {soil: old fill, top: ground}
  - {soil: brown clay, top: [[0, 17.5], [22, 17], [30, 15.6], [40, 10.4], [48, 10], [70, 9]]}
  - {soil: grey clay, top: [[0, 10], [30, 9.5], [70, 5]]}
  - {soil: sandstone, top: [[0, 3], [70, 1]]}
placed:
  - {soil: stone, outline: [[41, 8], [42, 11], [46, 11], [47, 8]]}
firm_base: [[0, 1], [70, 0]]
water:
  high: [[0, 16], [22, 15], [34, 12.6], [40, 10.4], [52, 9.6], [70, 9.6]]
  low: [[0, 14], [22, 13], [34, 11], [40, 9.6], [52, 9], [70, 9]]
surcharges:
  - {name: store, from: 10, to: 16, pressure: 12}
  - {name: traffic, from: 17, to: 21, pressure: 10, variable: true}
  - {name: toe road, from: 41, to: 45, pressure: 8, variable: true}
situations:
  - {name: high water, water: high, required_fs: 1.25, free_water: [{level: 10.6, from: 40, to: 70}]}
  - {name: drains clogged, water: high, required_fs: 1.15, drains_working: 40%}
  - {name: earthquake, water: low, kh: 0.06, required_fs: 1.05}
  - {name: undrained, water: low, strength: undrained, required_fs: 1.2}
stages: {water: low, required_fs: 1.1}
limits: {drain_outfall: 9}
trials:
  - {name: berm and drains, works: {berm: {fill: sand fill, height: 3, top_width: 4, batter: 2}, trench_drains: {depth: 4, spacing: 5, width: 0.6, effectiveness: 0.7}}}
  - {name: face and buttress, works: {regrade: {fill: sand fill, batter: 2.5, pivot: 0.2}, buttress: {fill: stone, height: 3, top_width: 3, batter: 1.5}}}
`
	if !mirrored {
		return text
	}
	return mirroredCase(text)
}

var (
	pointLists = regexp.MustCompile(`\[\[[^\]]*\](?:, \[[^\]]*\])*\]`)
	slopeEnds  = regexp.MustCompile(`(crest|toe): \[`)
	spans      = regexp.MustCompile(`from: (\d+), to: (\d+)`)
)

// mirroredCase returns a case reflected about x = 0.
func mirroredCase(text string) string {
	text = pointLists.ReplaceAllStringFunc(text, func(list string) string {
		var points [][]float64
		if err := json.Unmarshal([]byte(list), &points); err != nil {
			panic(err)
		}
		slices.Reverse(points)
		for _, p := range points {
			p[0] = -p[0]
		}
		out, err := json.Marshal(points)
		if err != nil {
			panic(err)
		}
		return string(out)
	})
	text = slopeEnds.ReplaceAllString(text, "$1: [-")
	return spans.ReplaceAllString(text, "from: -$2, to: -$1")
}
