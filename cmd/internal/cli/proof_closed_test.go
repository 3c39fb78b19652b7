package cli

import (
	"math"
	"os"
	"path/filepath"
	"testing"

	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// closedForm is a case whose answer is known beforehand.
type closedForm struct {
	name, text string
	remedy     string
	parameter  string
	want       float64 // Its size.
	tol        float64
	fs, fsTol  float64 // FS of the slope as it is.
	source     string
}

// bedded is an invented slope of strong ground on a bed of 1V:4H through the toe, along which it is known to have slipped. On a plane statics
// alone give FS, whatever the forces between slices: F = (W cos(a) - U) tan(phi)/(W sin(a)).
const bedded = `
title: invented slope on a bed
length: 40
ground: [[-20, 30], [44, 30], [60, 18], [90, 18]]
slope: {crest: [44, 30], toe: [60, 18]}
ignore_slips_shallower_than: 1
soils:
  shale: {unit_weight: 19, drained: {cohesion: 300, friction: 35}, clay: false}
  floor: {unit_weight: 22, drained: {cohesion: 500, friction: 40}, clay: false}
strata:
  - {soil: shale, top: ground}
  - {soil: floor, top: [[-20, 10], [90, 10]]}
known_slips: [{line: [[12, 30], [60, 18]], friction: 20}]
`

const (
	bedRun, bedFall = 48.0, 12.0
	bedWeight       = 19 * 32 * bedFall / 2 // 32 m of level top over 12 m of fall.
	bedRequired     = 1.2
)

// bedFS returns FS at an integral of the head along the bed, and bedHead the integral at which FS is a given one.
func bedFS(head float64) float64 {
	return (bedRun - head*9.81*math.Hypot(bedRun, bedFall)/bedWeight) / bedFall * math.Tan(20*degree)
}

func bedHead(fs float64) float64 {
	return bedWeight * (bedRun - fs*bedFall/math.Tan(20*degree)) / math.Hypot(bedRun, bedFall) / 9.81
}

// hooghoudtSpacing returns the spacing at which drains hold the head midway between them at m: S^2 = (8 K d m + 4 K m^2)/q (Hooghoudt 1940), with the
// equivalent depth d for permeable ground of depth D below drains of radius r (Moody 1966), by repeated substitution.
func hooghoudtSpacing(k, q, depth, r, m float64) float64 {
	s := 10.0
	for range 200 {
		x := depth / s
		d := depth / (1 + x*(8/math.Pi*math.Log(depth/r)-(3.55-1.6*x+2*x*x)))
		s = math.Sqrt((8*k*d*m + 4*k*m*m) / q)
	}
	return s
}

// dupuitHead returns the integral of the head along the bed, with the line of Dupuit (1863) from an interceptor at x = 8 with its invert so deep to the
// toe, over a floor at a level of 10 m: h^2 falls evenly. The line as it was, from a level of 29.8 m by 28 m at x = 34 to 21 m, holds where it is lower.
func dupuitHead(depth float64) float64 {
	const drain, toe, floor, steps = 8.0, 60.0, 10.0, 2000
	h1, h2 := 30-depth-floor, 21-floor
	var sum float64
	for i := range steps {
		x := toe - bedRun + bedRun*(float64(i)+0.5)/steps
		line := floor + math.Sqrt(h1*h1-(h1*h1-h2*h2)*(x-drain)/(toe-drain))
		before := 29.8 - 1.8*(x-drain)/26
		if x > 34 {
			before = 28 - 7*(x-34)/26
		}
		bed := 18 + (toe-x)*bedFall/bedRun
		sum += max(0, min(line, before)-bed)
	}
	return sum / steps * math.Hypot(bedRun, bedFall)
}

func closedForms() []closedForm {
	long := math.Hypot(bedRun, bedFall)
	passing := bedRequired + remedies.DefaultAllowance
	m, asItIs := bedHead(passing)/long, bedFS(3*long) // Even head along the bed.
	depth := 1.0
	for dupuitHead(depth) > bedHead(passing+0.1) {
		depth += 0.001
	}
	const (
		gamma, height, from = 20.0, 6.0, 2.6 // Of the bank with seepage.
		cu, steep           = 30.0, 8.0      // Of the clay face of 60 degrees, and its height.
	)
	seeping := (1 - 9.81/gamma) * math.Tan(36*degree)
	return []closedForm{
		{
			"drilled drains", bedded + `
water: {wet: [[-20, 33], [12, 33], [60, 21], [90, 21]]}
situations: [{name: wet, water: wet, required_fs: 1.2}]
remedies:
  drilled_drains: {length: 49.4, spacing: 4 to 14 by 0.1, rise: 14.036243467926479, outlet: 0, solid_length: 0, permeability: 1e-6, recharge: 1e-7, depth_below: 2}
`, "drilled_drains", "spacing", math.Floor(hooghoudtSpacing(1e-6, 1e-7, 2, 0.05, m)*10) / 10, 0.1 + 1e-9, asItIs, 1e-3, // The last 0.08 m of the bed has no drain.
			"Hooghoudt (1940) and statics of a plane",
		},
		{
			"water lowered", bedded + `
water: {wet: [[-20, 33], [12, 33], [60, 21], [90, 21]]}
situations: [{name: wet, water: wet, required_fs: 1.2}]
remedies: {water_lowering: {lowering: 0.5 to 3 by 0.01}}
`, "water_lowering", "lowering", math.Ceil((3-m)*100) / 100, 1e-9, asItIs, 1e-3, "statics of a plane",
		},
		{
			"interceptor", bedded + `
water: {wet: [[-20, 29.9], [8, 29.8], [34, 28], [60, 21], [90, 20]]}
situations: [{name: wet, water: wet, required_fs: 1.3}]
remedies: {interceptor: {low_permeability: floor, depth: 1.5 to 6 by 0.05, setback: 36, permeability: 1e-5, recharge: 0}}
`, "interceptor", "depth", math.Ceil(depth*20) / 20, 0.05 + 1e-9, bedFS(dupuitHead(-20)), 1e-3, // The line is drawn with straight pieces, on the safe side.
			"Dupuit (1863) and statics of a plane",
		},
		{
			"flattening under seepage", `
title: invented bank of sand with seepage along its face
length: 10
ground: [[0, 16], [30, 16], [45.6, 10], [70, 10]]
slope: {crest: [30, 16], toe: [45.6, 10]}
soils: {sand: {unit_weight: 20, drained: {cohesion: 0, friction: 36}, clay: false}}
strata: [{soil: sand, top: ground}]
water: {along: {line: [[0, 12], [26, 12], [30, 16], [45.6, 10], [48, 8], [70, 8]], inclined: true}}
situations: [{name: wet, water: along, required_fs: 1.2}]
remedies: {regrade: {batter: 3 to 3.6 by 0.01}}
`, "regrade", "batter", math.Ceil(passing/seeping*100) / 100, 0.01 + 1e-9, from * seeping, 1e-3,
			"endless slope, seepage parallel to it: F = (1 - gamma_w/gamma) n tan(phi) (Skempton and DeLory 1957; Taylor 1948)",
		},
		{
			"unloading clay", `
title: invented face of clay
length: 10
ground: [[0, 18], [40, 18], [44.6188, 10], [70, 10]]
slope: {crest: [40, 18], toe: [44.6188, 10]}
soils: {clay: {unit_weight: 20, undrained: {strength: 30}}}
strata: [{soil: clay, top: ground}]
firm_base: [[0, 10], [70, 10]]
situations: [{name: undrained, water: none, strength: undrained, required_fs: 1.2}]
remedies: {unload: {depth: 0.5 to 3 by 0.05, width: 14, back_batter: 3}}
`, "unload", "depth", steep - cu/(0.191*gamma*passing), 0.05 + 0.003*steep, cu / (0.191 * gamma * steep), 0.003, // The number has three digits.
			"Taylor (1937): cu/(F gamma H) = 0.191 on a face of 60 degrees, toe circles; recalled from memory",
		},
	}
}

// TestClosedForms compares sizes that the program finds, from the case file to result.json, with those that closed forms ask for. The volumes of
// the dry sand are in TestDrySandExactly.
func TestClosedForms(t *testing.T) {
	for _, c := range closedForms() {
		t.Run(c.name, func(t *testing.T) {
			t.Parallel()
			f, _ := sized(t, c.text, filepath.Join(t.TempDir(), "works"), false, nil)
			o := optionOf(t, f, c.remedy)
			if o.Status != "meets target" {
				t.Fatalf("%s: %s", o.Status, o.Reason)
			}
			if got := float64(f.Existing.Situations[0].FS); !(math.Abs(got-c.fs) <= c.fsTol*c.fs) {
				t.Errorf("FS as it is %.5f, want %.5f (%s)", got, c.fs, c.source)
			}
			got := float64(o.Parameters[c.parameter].Value)
			t.Logf("%s %v, closed form %.4f; FS as it is %v, after works %v", c.parameter, got, c.want, f.Existing.Situations[0].FS, o.Situations[0].FS)
			if !(math.Abs(got-c.want) <= c.tol) {
				t.Errorf("%s is %v, want %.4f within %.4f (%s)", c.parameter, got, c.want, c.tol, c.source)
			}
		})
	}
}

// levelCrest is an invented slope with level ground above and below it, with works of fixed size.
const levelCrest = `
title: invented slope with level ground above and below
length: 40
ground: [[0, 9], [40, 9], [62.5, 0], [90, 0]]
slope: {crest: [40, 9], toe: [62.5, 0]}
ignore_slips_shallower_than: 1
soils:
  clay: {unit_weight: 19, drained: {cohesion: 8, friction: 28}, clay: false}
  fill: {unit_weight: 19, drained: {cohesion: 0, friction: 36}, clay: false}
strata: [{soil: clay, top: ground}]
situations: [{name: dry, water: none, required_fs: 1.2}]
on_site_fill: [{name: cut clay, cut_of: clay, serves: [fill], share: 50%}]
economics: {soils: {clay: {shrinkage: 0.9}}}
trials:
  - {name: flatter, works: {regrade: {batter: 3}}}
  - {name: toe fill, works: {berm: {fill: fill, height: 2.5, top_width: 6, batter: 2}}}
  - {name: both, works: {regrade: {batter: 3}, berm: {fill: fill, height: 2.5, top_width: 6, batter: 2}}}
`

// TestVolumesExactly compares volumes that the whole command reports with plane geometry: (n - n0) H^2/2 for a face flattened about its toe, w h +
// (m - n) h^2/2 for a berm; and what is brought and what of the cut is used again make up the fill.
func TestVolumesExactly(t *testing.T) {
	const cut, length, share, shrinkage = 0.5 * 9 * 9 / 2, 40.0, 0.5, 0.9
	// On a face at 1V:nH about the toe; the top is measured from the face as it was, at 1V:2.5H.
	berm := func(n float64) float64 { return (6+2.5*(n-2.5))*2.5 + (2-n)*2.5*2.5/2 }
	folder := t.TempDir()
	path, out := filepath.Join(folder, "level.yaml"), filepath.Join(folder, "works")
	if err := os.WriteFile(path, []byte(levelCrest), 0o644); err != nil {
		t.Fatal(err)
	}
	compareTo(t.Context(), t, path, out, "--quiet")
	_, f, err := readResult(out)
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		name                          string
		cut, fill, brought, takenAway float64
	}{
		{"flatter", cut, 0, 0, cut},
		{"toe fill", 0, berm(2.5), berm(2.5), 0},
		{"both", cut, berm(3), berm(3) - share*shrinkage*cut, cut - share*cut},
	} {
		o := optionOf(t, f, c.name)
		q, all := &o.Quantities, &o.Totals
		for _, v := range []struct {
			name      string
			got, want float64
		}{
			{"cut", q.Cut, c.cut},
			{"fill", q.Fill, c.fill},
			{"earthworks", q.Earthworks, c.cut + c.fill},
			{"import", q.Import, c.brought},
			{"disposal", q.Dispose, c.takenAway},
			{"cut in all", all.Cut, length * c.cut},
			{"fill in all", all.Fill, length * c.fill},
		} {
			if math.Abs(float64(v.got)-v.want) > 1e-9*max(1, v.want) {
				t.Errorf("%s: %s %.10g, want %.10g", c.name, v.name, v.got, v.want)
			}
		}
	}
}

// optionOf returns an option by its name.
func optionOf(t *testing.T, f *report.File, name string) *report.Option {
	t.Helper()
	for i := range f.Options {
		if f.Options[i].Name == name {
			return &f.Options[i]
		}
	}
	t.Fatalf("there is no option %s", name)
	return nil
}
