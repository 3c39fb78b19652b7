package cli

import (
	"bytes"
	"context"
	"math"
	"os"
	"path/filepath"
	"testing"

	"standfast/cmd/internal/report"
)

const featureCases = "../../../testdata/cases/features"

// assessed runs `assess --json` on one of the small cases, with texts replaced in pairs, and returns FS by situation and the file.
func assessed(t *testing.T, name string, replace ...string) (map[string]float64, *report.File) {
	t.Helper()
	text := edited(t, name, replace...)
	path := filepath.Join(t.TempDir(), name)
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
	var out, errs bytes.Buffer
	if code := run(context.Background(), []string{"assess", "--json", path}, nil, &out, &errs); code != 0 {
		t.Fatalf("exit code %d: %s", code, &errs)
	}
	f, err := report.Decode(&out)
	if err != nil {
		t.Fatal(err)
	}
	fs := map[string]float64{}
	for _, a := range f.Existing.Situations {
		fs[a.Name] = float64(a.FS)
		if math.IsNaN(fs[a.Name]) {
			t.Fatalf("%s: no FS in %s", name, a.Name)
		}
	}
	return fs, f
}

// TestFeatureWater: what each state of the water must do to FS, from the small case through the command line.
func TestFeatureWater(t *testing.T) {
	fs, f := assessed(t, "water.yaml")
	for _, less := range [][2]string{
		{"main", "seepage"}, // cos^2 takes away.
		{"seepage", "dry"},
		{"perched", "dry"},
		{"artesian", "main"},
		{"shaken", "main"},
	} {
		if !(fs[less[0]] < fs[less[1]]-0.005) {
			t.Errorf("FS %s %.4f, %s %.4f: want the first clearly lower", less[0], fs[less[0]], less[1], fs[less[1]])
		}
	}
	if math.Abs(fs["measured"]-fs["main"]) > 0.05*fs["main"] { // Straight on the level between verticals, and nothing saturated.
		t.Errorf("FS at points %.4f, with the line that they were taken from %.4f", fs["measured"], fs["main"])
	}
	if by := f.Existing.Section.Water["artesian"].BySoil["stiff clay"]; len(by.Line) != 2 {
		t.Errorf("the artesian line is not in the file: %+v", by)
	}
}

// TestFeatureStrength: a power law with b = 1 is a friction angle, and on one unit weight cu by ratio is a gradient below the ground.
// On the same slip they agree to rounding (package lem); here either is searched, and may end in another of two polylines that are as low.
func TestFeatureStrength(t *testing.T) {
	const tolerance = 3e-3 // What a default search may miss.
	same := func(what, situation string, a, b map[string]float64) {
		if math.Abs(a[situation]-b[situation]) > tolerance*a[situation] {
			t.Errorf("%s: FS %.5f and %.5f", what, a[situation], b[situation])
		}
	}
	const tip, sand = "power_law: {a: 0.85, b: 0.8}", "drained: {cohesion: 0, friction: 40}"
	const drainedOnly = "  - {name: undrained, water: none, strength: undrained, required_fs: 1.2}\n"
	friction, _ := assessed(t, "strength.yaml", tip, sand)
	straight, _ := assessed(t, "strength.yaml", "{a: 0.85, b: 0.8}", "{a: 0.8390996312, b: 1}", drainedOnly, "")
	same("straight power law", "drained", straight, friction)
	const weight, heavier = "unit_weight: 17", "unit_weight: 19"
	ratio, _ := assessed(t, "strength.yaml", tip, sand, weight, heavier)
	gradient, _ := assessed(t, "strength.yaml", tip, sand, weight, heavier, "{ratio: 0.3, minimum: 0, water_before: none}", "{strength: 0, gradient: 5.7, below: ground}")
	same("strength by ratio", "undrained", ratio, gradient)
}

// TestFeatureLoadsAndCrack: every load, and water in the crack, lowers FS.
func TestFeatureLoadsAndCrack(t *testing.T) {
	of := func(name, situation string, replace ...string) float64 {
		fs, _ := assessed(t, name, replace...)
		return fs[situation]
	}
	loaded := of("loads.yaml", "dry")
	for _, without := range [][]string{
		{"pressure: 30, horizontal: 6", "pressure: 30"},
		{"pressure: 30, horizontal: 6", "pressure: 0"},
	} {
		if f := of("loads.yaml", "dry", without...); !(f > loaded+0.002) {
			t.Errorf("FS %.4f with %q, %.4f with %q", f, without[1], loaded, without[0])
		}
	}
	fs, f := assessed(t, "crack.yaml")
	dry, full := of("crack.yaml", "dry ground", "water_level: 39", "filled: 0%"), of("crack.yaml", "dry ground", "water_level: 39", "filled: 100%")
	if filled := fs["dry ground"]; !(full < filled && filled < dry) {
		t.Errorf("FS with the crack full %.4f, 60 %% full %.4f, dry %.4f", full, filled, dry)
	}
	if slip := f.Existing.Situations[0].Slip; !(slip.Crack > 0.5 && slip.Crack <= 2.5+1e-9) {
		t.Errorf("the slip ends in a crack %.3f m deep", slip.Crack)
	}
}

// TestFeatureKnownSlip: a surface with residual strength lowers FS, is in the file, and with the strength of the soil changes next to nothing.
func TestFeatureKnownSlip(t *testing.T) {
	const known = "cohesion: 0, friction: 13"
	weak, f := assessed(t, "known.yaml")
	strong, _ := assessed(t, "known.yaml", known, "cohesion: 5, friction: 24")
	if !(weak["dry ground"] < strong["dry ground"]-0.05) {
		t.Errorf("FS %.4f with the known slip, %.4f with the soil's strength on it", weak["dry ground"], strong["dry ground"])
	}
	if k := f.Existing.Section.Known; len(k) != 1 || len(k[0].Line) != 5 || k[0].Cohesion != 0 || k[0].Friction != 13 {
		t.Errorf("known slips in the file: %+v", k)
	}
}
