package cli

import (
	"bytes"
	"encoding/json"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"standfast/cmd/internal/report"
)

// edited returns the text of one of the small cases with texts replaced in pairs.
func edited(t *testing.T, name string, replace ...string) string {
	t.Helper()
	src, err := os.ReadFile(filepath.Join(featureCases, name))
	if err != nil {
		t.Fatal(err)
	}
	text := string(src)
	for i := 0; i+1 < len(replace); i += 2 {
		if !strings.Contains(text, replace[i]) {
			t.Fatalf("%s has no %q", name, replace[i])
		}
		text = strings.ReplaceAll(text, replace[i], replace[i+1])
	}
	return text
}

// backAnalysed runs `backanalyse --json` on a case.
func backAnalysed(t *testing.T, text string, flags ...string) *report.BackFile {
	t.Helper()
	folder := t.TempDir()
	path := filepath.Join(folder, "case.yaml")
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
	var out, errs bytes.Buffer
	args := append([]string{"backanalyse", path, "--json", "--out", folder}, flags...)
	if code := run(t.Context(), args, nil, &out, &errs); code != exitOK {
		t.Fatalf("exit code %d: %s", code, &errs)
	}
	f := new(report.BackFile)
	if err := json.Unmarshal(out.Bytes(), f); err != nil {
		t.Fatal(err)
	}
	return f
}

// The wedge of plane.yaml: 8 m of the level top and a face of 16 m, 12 m high, over a plane of 1V:2H.
const (
	planeRun, planeFall = 24.0, 12.0
	wedgeArea           = 8 * planeFall / 2
	wedgeWeight         = 19 * wedgeArea
)

var (
	planeLength = math.Hypot(planeRun, planeFall)
	planeSin    = planeFall / planeLength
	planeCos    = planeRun / planeLength
)

// onPlane is a body on a plane: forces on it for a metre run, kN, and what resists along the plane.
type onPlane struct {
	v, h float64 // Vertical and horizontal force, down and in the direction of movement.
	u    float64 // Integral of the pore pressure along the plane.
	cl   float64 // Cohesion, or cu, times length.
	tan  float64 // tan(phi).
}

// fs is the resistance along the plane over what drives along it: statics.
func (p onPlane) fs() float64 {
	return (p.cl + (p.v*planeCos-p.h*planeSin-p.u)*p.tan) / (p.v*planeSin + p.h*planeCos)
}

// Texts of plane.yaml that rows replace.
const (
	planeGround = "ground: [[0, 30], [20, 30], [36, 18], [70, 18]]"
	planeClay   = "{unit_weight: 19, drained: {cohesion: 8, friction: 24}"
	planeDry    = "water: none"
	planeStrata = "strata:\n  - {soil: clay, top: ground}\n"
)

// planeRow is a case on the plane with what it must come to.
type planeRow struct {
	name    string
	replace []string // Of plane.yaml, in pairs.
	want    onPlane
}

// planeTan is tan(phi') of the clay.
var planeTan = math.Tan(24 * degree)

// dryWith returns the wedge of plane.yaml with a change.
func dryWith(change func(*onPlane)) onPlane {
	p := onPlane{v: wedgeWeight, cl: 8 * planeLength, tan: planeTan}
	change(&p)
	return p
}

func planeLoads() []planeRow {
	add := func(text string) []string { return []string{planeStrata, planeStrata + text + "\n"} }
	return []planeRow{
		{"as it is", nil, dryWith(func(*onPlane) {})},
		{"strip load", add("surcharges: [{name: a, from: 13, to: 18, pressure: 20}]"), dryWith(func(p *onPlane) { p.v += 100 })},
		{"variable load", add("surcharges: [{name: a, from: 13, to: 18, pressure: 20, variable: true}]"), dryWith(func(p *onPlane) { p.v += 100 })},
		{"inclined load", add("surcharges: [{name: a, from: 13, to: 18, pressure: 20, horizontal: 6}]"), dryWith(func(p *onPlane) { p.v += 100; p.h += 30 })},
		{"triangular load", add("surcharges: [{name: a, from: 13, to: 18, pressure: 0, pressure_to: 30}]"), dryWith(func(p *onPlane) { p.v += 75 })},
		{"line load", add("line_loads: [{name: a, x: 15, vertical: 40, horizontal: 10}]"), dryWith(func(p *onPlane) { p.v += 40; p.h += 10 })},
		{"placed fill", []string{
			planeGround, "ground: [[0, 30], [13, 30], [14, 32], [16, 32], [17, 30], [20, 30], [36, 18], [70, 18]]",
			planeStrata, planeStrata + "placed: [{soil: fill, outline: [[13, 30], [14, 32], [16, 32], [17, 30]]}]\n",
		}, dryWith(func(p *onPlane) { p.v += 20 * 6 })},
		{"kv up", []string{planeDry, "water: none, kv: -0.2"}, dryWith(func(p *onPlane) { p.v *= 0.8 })},
		{"kv down", []string{planeDry, "water: none, kv: 0.1"}, dryWith(func(p *onPlane) { p.v *= 1.1 })},
		{"kh and kv", []string{planeDry, "water: none, kh: 0.02, kv: 0.01"}, dryWith(func(p *onPlane) { p.v *= 1.01; p.h = 0.02 * wedgeWeight })},
	}
}

func planeWater() []planeRow {
	const gammaW = 9.81
	wet := func(text string) []string {
		return []string{planeStrata, planeStrata + "water: {wet: " + text + "}\n", planeDry, "water: wet"}
	}
	// Two strata of the same strength that meet at a level of 24 m, half way down the plane.
	twoSoils := func(text string) []string {
		return append([]string{
			"  clay: " + planeClay + "}\n", "  clay: " + planeClay + "}\n  lower clay: " + planeClay + "}\n",
			planeStrata, planeStrata + "  - {soil: lower clay, top: [[0, 24], [70, 24]]}\nwater: {wet: {by_soil: {" + text + "}}}\n",
		}, planeDry, "water: wet")
	}
	// The integral along the plane of a pressure that grows from 0 to u over a fall of the plane by h.
	growing := func(u, h float64) float64 { return u / 2 * math.Hypot(2*h, h) }
	return []planeRow{
		{"water line", wet("[[0, 24], [70, 24]]"), dryWith(func(p *onPlane) { p.u = growing(gammaW*6, 6) })},
		// 1V:4H, 3 m above the plane at the toe, where cos^2 of its inclination is 16/17.
		{"inclined line", wet("{line: [[0, 30], [70, 12.5]], inclined: true}"), dryWith(func(p *onPlane) { p.u = growing(gammaW*3*16/17, 6) })},
		{"perched", twoSoils("clay: [[0, 27], [70, 27]]"), dryWith(func(p *onPlane) { p.u = growing(gammaW*3, 3) })},
		{"artesian", twoSoils("lower clay: {line: [[0, 26], [70, 26]], artesian: true}"), dryWith(func(p *onPlane) { p.u = growing(gammaW*(8-2), 6) + gammaW*2*planeLength/2 })},
		{"partly submerged", []string{
			planeStrata, planeStrata + "water: {wet: [[0, 21], [70, 21]]}\n", planeDry, "water: wet, free_water: [{level: 21, from: 30, to: 70}]",
		}, dryWith(func(p *onPlane) { p.u = growing(gammaW*3, 3); p.v += gammaW * 4 * 3 / 2; p.h -= gammaW * 3 * 3 / 2 })},
		{"points", wet("{points: [[12, 30, 0], [12, 10, 60], [36, 30, 0], [36, 10, 60]]}"), dryWith(func(p *onPlane) { p.u = growing(36, 12) })},
		{"ru", []string{planeClay, "{unit_weight: 19, drained: {cohesion: 8, friction: 24}, ru: 0.2"}, dryWith(func(p *onPlane) { p.u = 0.2 * wedgeWeight / planeCos })},
		{"saturated below the line", []string{
			planeClay, "{unit_weight: 19, saturated_unit_weight: 20, drained: {cohesion: 8, friction: 24}",
			planeStrata, planeStrata + "water: {wet: [[0, 24], [70, 24]]}\n", planeDry, "water: wet",
		}, dryWith(func(p *onPlane) { p.u = growing(gammaW*6, 6); p.v += wedgeArea / 4 })}, // A triangle of half the height and half the breadth.
	}
}

func planeStrengths() []planeRow {
	undrained := func(text string) []string {
		return []string{planeClay, planeClay + ", undrained: " + text, planeDry, "water: none, strength: undrained"}
	}
	cu := func(cl float64) onPlane { return onPlane{v: wedgeWeight, cl: cl} }
	// Cut off by a crack, of which so much is under water: the ground behind it takes no part.
	cracked := func(depth, wet float64) onPlane {
		return onPlane{v: 19 * (wedgeArea - depth*depth), h: 9.81 * wet * wet / 2, cl: 8 * (planeLength - math.Hypot(2*depth, depth)), tan: planeTan}
	}
	add := func(text string) []string { return []string{planeStrata, planeStrata + text + "\n"} }
	// cu along the plane, 1V:2H below a face of 3V:4H: the water before works stands above it from x = 120/7 on, 1 m at the crest.
	wetArea := (20-120.0/7)/2 + 16.0/2
	return []planeRow{
		{"cu", undrained("{strength: 25}"), cu(25 * planeLength)},
		{"cu with depth", undrained("{strength: 10, gradient: 4, below: ground}"), cu(10*planeLength + 4*wedgeArea/planeCos)},
		{"cu at points", undrained("{points: [[12, 30, 10], [12, 18, 34], [36, 30, 10], [36, 18, 34]]}"), cu(22 * planeLength)},
		{"cu by ratio", undrained("{ratio: 0.4, water_before: none}"), cu(0.4 * wedgeWeight / planeCos)},
		{"cu by ratio under water", undrained("{ratio: 0.4, water_before: [[0, 30], [20, 27], [36, 18], [70, 18]]}"), cu(0.4 * (wedgeWeight - 9.81*wetArea) / planeCos)},
		{"straight power law", []string{planeClay, "{unit_weight: 19, power_law: {a: 0.6, b: 1}"}, onPlane{v: wedgeWeight, tan: 0.6}},
		{"crack by depth", add("tension_crack: {depth: 3}"), cracked(3, 0)},
		{"crack half full", add("tension_crack: {depth: 3, filled: 50%}"), cracked(3, 1.5)},
		{"crack by line, to a level", add("tension_crack: {line: [[0, 27.5], [20, 27.5]], water_level: 29.5}"), cracked(2.5, 2)},
	}
}

// TestFeaturesOnAPlane: loads, water, strengths and cracks through the command line against the statics of a wedge on a plane, in which the
// forces between slices cancel (closed form; with a crack and water in it as Hoek and Bray 1981, plane failure, recalled from memory).
func TestFeaturesOnAPlane(t *testing.T) {
	check := func(t *testing.T, c planeRow, tolerance float64) {
		t.Run(c.name, func(t *testing.T) {
			find := "strength"
			if c.want.tan == 0 {
				find = "cu"
			}
			f := backAnalysed(t, edited(t, "plane.yaml", c.replace...), "--find", find, "--method", "spencer")
			if got, want := float64(f.AsGiven), c.want.fs(); !(math.Abs(got-want) <= tolerance*want) {
				t.Errorf("FS %.6f, want %.6f", got, want)
			}
		})
	}
	for _, c := range slices.Concat(planeLoads(), planeStrengths()) {
		check(t, c, 1e-5)
	}
	for _, c := range planeWater() {
		check(t, c, 5e-4) // A slice that the water line crosses has the pressure at its middle.
	}
}

// TestFeatureCurvedEnvelope: on a slab of even thickness FS of a curved envelope is a pa (sigma'/pa)^b over the shear stress, with sigma' = gamma d
// cos^2(alpha), alpha the inclination of its bed (closed form; the power law as Charles and Watts 1980).
func TestFeatureCurvedEnvelope(t *testing.T) {
	const pa, weight, tolerance = 101.325, 20 * 5.0, 1e-5 // The slab is 5 m thick, vertically.
	for _, ru := range []float64{0, 0.15} {
		f := backAnalysed(t, edited(t, "slab.yaml", "ru: 0.15", fmt.Sprintf("ru: %g", ru)), "--method", "spencer")
		normal := weight*planeCos*planeCos - ru*weight
		want := 0.9 * pa * math.Pow(normal/pa, 0.8) / (weight * planeSin * planeCos)
		if got := float64(f.AsGiven); !(math.Abs(got-want) <= tolerance*want) {
			t.Errorf("ru %g: FS %.6f, want %.6f", ru, got, want)
		}
	}
}

// TestFeatureBackAnalysisOnAPlane: what gives the wedge FS = 1, by every unknown (closed form).
func TestFeatureBackAnalysisOnAPlane(t *testing.T) {
	const tolerance = 1e-5
	same := func(what string, got *float64, want float64) {
		t.Helper()
		if got == nil || !(math.Abs(*got-want) <= tolerance*want) {
			t.Errorf("%s: want %.6f, got %v", what, want, got)
		}
	}
	drives, presses := wedgeWeight*planeSin, wedgeWeight*planeCos
	text := edited(t, "plane.yaml", planeClay, planeClay+", undrained: {strength: 60}")
	pairs := backAnalysed(t, text)
	for _, p := range append(pairs.Curve, pairs.Low, pairs.Middle, pairs.High) {
		if c := (drives - presses*math.Tan(*p.Friction*degree)) / planeLength; math.Abs(*p.Cohesion-c) > tolerance*drives/planeLength {
			t.Errorf("phi' %.3f: c' %.6f, want %.6f", *p.Friction, *p.Cohesion, c)
		}
	}
	same("greatest c'", pairs.Curve[len(pairs.Curve)-1].Cohesion, drives/planeLength)
	same("phi'", backAnalysed(t, text, "--find", "friction").Middle.Friction, math.Atan(planeSin/planeCos)/degree)
	same("cu", backAnalysed(t, text, "--find", "cu").Middle.Strength, drives/planeLength)
	same("cu at FS 1.05", backAnalysed(t, text, "--find", "cu").High.Strength, 1.05*drives/planeLength)
	same("ru", backAnalysed(t, text, "--find", "ru").Middle.Ru, (8*planeLength+presses*planeTan-drives)/(planeTan*wedgeWeight/planeCos))
	rest := backAnalysed(t, text, "--cohesion", "2,4")
	same("phi' with c' = 2", rest.Low.Friction, math.Atan((drives-2*planeLength)/presses)/degree)
}

// TestFeatureKnownPlane: a search finds the plane of a slip that is known, with its own strength, in ground that is stronger: tan(phi)/tan(alpha),
// whatever part of it moves (closed form).
func TestFeatureKnownPlane(t *testing.T) {
	fs, f := assessed(t, "plane.yaml",
		planeClay, "{unit_weight: 19, drained: {cohesion: 60, friction: 30}",
		planeStrata, planeStrata+"known_slips: [{line: [[12, 30], [36, 18]], friction: 20}]\n",
		"slope:", "ignore_slips_shallower_than: 1\nslope:")
	if want := math.Tan(20*degree) * planeRun / planeFall; math.Abs(fs["failure"]-want) > 1e-4*want {
		t.Errorf("FS %.5f on the %s, want %.5f", fs["failure"], f.Existing.Situations[0].Slip.Kind, want)
	}
}
