package casefile

import (
	"errors"
	"io/fs"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"

	"standfast/lem"
	"standfast/optimize"
	"standfast/remedies"
)

var demos = []string{"cutting.yaml", "embankment.yaml"}

func readDemo(t *testing.T, name string) *Case {
	t.Helper()
	c, err := Read(root + "/testdata/demo/" + name)
	if err != nil {
		t.Fatal(err)
	}
	return c
}

// small is the least case that can be read; tests put one line in the place of another.
const small = `title: Small
length: 10
ground: [[0, 10], [20, 10], [30, 5], [50, 5]]
soils:
  clay: {unit_weight: 19, drained: {cohesion: 2, friction: 24}}
strata:
  - {soil: clay, top: ground}
situations:
  - {name: dry, water: none, required_fs: 1.3}
`

func parseSmall(t *testing.T, old, new string) (*Case, error) {
	t.Helper()
	if !strings.Contains(small, old) {
		t.Fatalf("the small case does not hold %q", old)
	}
	return Parse("small.yaml", []byte(strings.Replace(small, old, new, 1)))
}

func mustParseSmall(t *testing.T, old, new string) *Case {
	t.Helper()
	c, err := parseSmall(t, old, new)
	if err != nil {
		t.Fatal(err)
	}
	return c
}

func TestDemosAreRead(t *testing.T) {
	for _, name := range demos {
		c := readDemo(t, name)
		if !strings.Contains(c.Job.Title, "invented") {
			t.Errorf("%s: the title does not say that the case is invented", name)
		}
		if len(c.Warnings) > 0 {
			t.Errorf("%s: warnings %q", name, c.Warnings)
		}
		if len(c.Job.Requests) < 5 {
			t.Errorf("%s: %d remedies", name, len(c.Job.Requests))
		}
	}
}

// TestCuttingIsFilled compares what is read with the file, number by number.
func TestCuttingIsFilled(t *testing.T) {
	j := readDemo(t, "cutting.yaml").Job
	rad := func(deg float64) float64 { return deg * math.Pi / 180 }
	checks := []struct {
		name      string
		got, want any
	}{
		{"length", j.Length, 80.0},
		{"ground", j.Section.Ground, lem.Profile{{X: 0, Y: 109.6}, {X: 30, Y: 109}, {X: 52.5, Y: 100}, {X: 75, Y: 99.8}}},
		{"crest", j.Crest, lem.Point{X: 30, Y: 109}},
		{"toe", j.Toe, lem.Point{X: 52.5, Y: 100}},
		{"depth", j.MinDepth, 1.0},
		{"soil", j.Section.Soils[0], lem.Soil{Name: "weathered clay", UnitWeight: 19, Cohesion: 3, Friction: rad(23), Undrained: &lem.UndrainedStrength{Strength: 35}}},
		{"rockfill", j.Section.Soils[4], lem.Soil{Name: "rockfill", UnitWeight: 20, Friction: rad(40), FreeDraining: true}},
		{"clay", j.Clay, []bool{true, true, false, false, false}},
		{"second stratum", j.Section.Strata[1], lem.Stratum{Soil: 1, Top: lem.Profile{{X: 0, Y: 106.1}, {X: 30, Y: 105.5}, {X: 52.5, Y: 97.5}, {X: 75, Y: 97.3}}}},
		{"ground before", j.Section.GroundBefore(), j.Section.Ground},
		{"loads", j.Section.Loads, []lem.Surcharge{{Name: "farm track", FromX: 20, ToX: 29, Pressure: 5}}},
		{"last situation", j.Situations[2], remedies.Situation{Name: "drains half clogged", Water: 0, RequiredFS: 1.2, DrainsWorking: 0.5}},
		{"drains without a word", j.Situations[0].DrainsWorking, 1.0},
		{"stages", j.Stage, remedies.StageSettings{Given: true, Water: 2, RequiredFS: 1.1}},
		{"left", *j.Limits.Left, remedies.Fence{Name: "crest fence", X: 24}},
		{"right", *j.Limits.Right, remedies.Fence{Name: "toe fence", X: 58.5}},
		{"zone", j.Limits.KeepClear[0], remedies.KeepClear{Name: "cable", FromX: 58.5, ToX: 61.5, NoDig: true}},
		{"outfall", *j.Limits.Outfall, 99.4},
		{"berm", j.Requests[2], remedies.Request{
			Kind: "berm", Soils: map[string]int{"fill": 3}, Words: map[string]string{},
			Axes: []optimize.Axis{{Name: "height", Min: 0.5, Max: 3, Step: 0.1}, {Name: "top_width", Min: 3, Max: 8, Step: 0.25}, {Name: "batter", Min: 2, Max: 2}, {}},
		}},
	}
	for _, c := range checks {
		if diff := cmp.Diff(c.want, c.got); diff != "" {
			t.Errorf("%s (-want +got):\n%s", c.name, diff)
		}
	}
}

func TestEmbankmentIsFilled(t *testing.T) {
	j := readDemo(t, "embankment.yaml").Job
	want := []bool{false, true, true, false, false, false}
	if diff := cmp.Diff(want, j.Situations[2].Undrained); diff != "" {
		t.Errorf("undrained soils (-want +got):\n%s", diff)
	}
	if diff := cmp.Diff([]lem.StrengthPoint{{X: 23, Y: 8.8, Strength: 28.5}, {X: 33, Y: 8.8, Strength: 22.5}}, j.Section.Soils[2].Undrained.Points); diff != "" {
		t.Errorf("strength at points (-want +got):\n%s", diff)
	}
	if !j.Section.Loads[0].Variable || j.Direction != lem.RightwardOnly || j.Head != (lem.Range{From: 2, To: 33}) {
		t.Errorf("load %+v, direction %v, head %v", j.Section.Loads[0], j.Direction, j.Head)
	}
	for i, a := range j.Requests[4].Axes {
		k, _ := remedies.Find("water_lowering")
		if a != k.Parameters[i].Default {
			t.Errorf("an empty remedy has %+v, want the default %+v", a, k.Parameters[i].Default)
		}
	}
}

// TestForms reads each form in which a value may be written.
func TestForms(t *testing.T) {
	dry := `{name: dry, water: none, required_fs: 1.3}`
	soil := `{unit_weight: 19, drained: {cohesion: 2, friction: 24}}`
	cases := []struct {
		name, old, new string
		ok             func(j *remedies.Job) bool
	}{
		{"share as percentage", dry, `{name: dry, water: none, required_fs: 1.3, drains_working: 35%}`, func(j *remedies.Job) bool { return j.Situations[0].DrainsWorking == 0.35 }},
		{"share as number", dry, `{name: dry, water: none, required_fs: 1.3, drains_working: 0.35}`, func(j *remedies.Job) bool { return j.Situations[0].DrainsWorking == 0.35 }},
		{"ratio", dry, `{name: dry, water: none, required_ratio: 1.25}`, func(j *remedies.Job) bool {
			return j.Situations[0].RatioToExisting == 1.25 && j.Situations[0].RequiredFS == 0
		}},
		{"kh", dry, `{name: dry, water: none, required_fs: 1, kh: .08}`, func(j *remedies.Job) bool { return j.Situations[0].Kh == 0.08 }},
		{"dry", dry, dry, func(j *remedies.Job) bool { return j.Situations[0].Water == -1 && j.Situations[0].Undrained == nil }},
		{"exponent", "length: 10", "length: 1e1", func(j *remedies.Job) bool { return j.Length == 10 }},
		{"emoji", "title: Small", "title: Small 🚧 ½", func(j *remedies.Job) bool { return j.Title == "Small 🚧 ½" }},
		{"number as title", "title: Small", "title: 1.50", func(j *remedies.Job) bool { return j.Title == "1.50" }},
		{"byte order mark", "title", "\ufefftitle", func(j *remedies.Job) bool { return j.Title == "Small" }},
		{"unnamed fence", "strata:", "limits: {works_between: {left: 3}}\nstrata:", func(j *remedies.Job) bool {
			return j.Limits.Left.X == 3 && j.Limits.Left.Name == "left limit" && j.Limits.Right == nil
		}},
		{"artesian", "strata:", "water: {deep: {line: [[0, 4], [50, 4]], artesian: true}, high: [[0, 8], [50, 5]]}\nstrata:", func(j *remedies.Job) bool {
			return j.Waters[0].Artesian && len(j.Waters[0].Line) == 2 && !j.Waters[1].Artesian
		}},
		{"ru", soil, `{unit_weight: 19, drained: {cohesion: 2, friction: 24}, ru: 0}`, func(j *remedies.Job) bool { return j.Section.Soils[0].HasRu }},
		{"gradient below ground", soil, `{unit_weight: 19, drained: {cohesion: 2, friction: 24}, undrained: {strength: 20, gradient: 1.5, below: ground}}`, func(j *remedies.Job) bool {
			return cmp.Equal(j.Section.Soils[0].Undrained.Datum, j.Section.Ground)
		}},
		{"gradient below a stratum", soil, `{unit_weight: 19, drained: {cohesion: 2, friction: 24}, undrained: {strength: 20, gradient: 1.5, below: clay}}`, func(j *remedies.Job) bool {
			return cmp.Equal(j.Section.Soils[0].Undrained.Datum, j.Section.Ground)
		}},
		{"gradient below points", soil, `{unit_weight: 19, drained: {cohesion: 2, friction: 24}, undrained: {strength: 20, gradient: 1.5, below: [[0, 3], [50, 2]]}}`, func(j *remedies.Job) bool {
			return cmp.Equal(j.Section.Soils[0].Undrained.Datum, lem.Profile{{X: 0, Y: 3}, {X: 50, Y: 2}})
		}},
		{"outline anticlockwise", "situations:", "placed: [{soil: clay, outline: [[0, 0], [2, 0], [2, 1]]}]\nsituations:", func(j *remedies.Job) bool {
			return signedArea(j.Section.Placed[0].Outline) == -1
		}},
		{"leftward", "strata:", "slips: {direction: leftward}\nslope: {crest: [20, 10], toe: [30, 5]}\nstrata:", func(j *remedies.Job) bool { return j.Direction == lem.LeftwardOnly }},
		{"zone with depth", "strata:", "limits: {keep_clear: [{name: main, from: 2, to: 3, forbid: [load, dig], dig_allowed_to_depth: 0.4}]}\nstrata:", func(j *remedies.Job) bool {
			z := j.Limits.KeepClear[0]
			return z.NoDig && z.NoLoad && *z.DigBelow == 0.4
		}},
		{"vertical step", "[20, 10], [30, 5]", "[20, 10], [20, 9], [30, 5]", func(j *remedies.Job) bool { return len(j.Section.Ground) == 5 }},
		{"fixed size", "situations:", "remedies: {regrade: {batter: 3}}\nsituations:", func(j *remedies.Job) bool {
			return j.Requests[0].Axes[0] == optimize.Axis{Name: "batter", Min: 3, Max: 3}
		}},
		{"range of one value", "situations:", "remedies: {regrade: {batter: 3 to 3 by 0.1}}\nsituations:", func(j *remedies.Job) bool {
			return j.Requests[0].Axes[0] == optimize.Axis{Name: "batter", Min: 3, Max: 3}
		}},
		{"trial", "situations:", "trials: [{name: sketch, works: {regrade: {batter: 3}}}]\nsituations:", func(j *remedies.Job) bool {
			return len(j.Trials) == 1 && j.Trials[0].Requests[0].Axes[0].Len() == 1
		}},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			if got := mustParseSmall(t, c.old, c.new); !c.ok(got.Job) {
				t.Errorf("read as %+v", *got.Job)
			}
		})
	}
}

// TestFaultHasItsPlace checks every part of a fault, and that all faults of a file come at once.
func TestFaultHasItsPlace(t *testing.T) {
	_, err := parseSmall(t, "cohesion: 2, friction: 24", "cohesion: -2, frictoin: 24")
	faults := Faults(err)
	if len(faults) != 2 {
		t.Fatalf("%d faults in %v", len(faults), err)
	}
	want := &Fault{
		File: "small.yaml", Line: 5, Column: 51, Path: "soils.clay.drained", Message: "unknown key `frictoin`",
		Suggestion: "did you mean `friction`?", LineText: "  clay: {unit_weight: 19, drained: {cohesion: -2, frictoin: 24}}",
	}
	if diff := cmp.Diff(want, faults[1]); diff != "" {
		t.Errorf("(-want +got):\n%s", diff)
	}
	text := "small.yaml:5:51: soils.clay.drained: unknown key `frictoin`\n" +
		"     5 |   clay: {unit_weight: 19, drained: {cohesion: -2, frictoin: 24}}\n" +
		"       |                                                   ^\n" +
		"         did you mean `friction`?"
	if got := faults[1].Error(); got != text {
		t.Errorf("printed as\n%s\nwant\n%s", got, text)
	}
	var one *Fault
	if !errors.As(err, &one) {
		t.Error("errors.As finds no fault in the joined error")
	}
}

func TestFaultsAreBounded(t *testing.T) {
	var b strings.Builder
	b.WriteString("title: x\n")
	for i := range 100 {
		b.WriteString(strings.Repeat("k", i+10) + ": 1\n")
	}
	_, err := Parse("x.yaml", []byte(b.String()))
	if n := len(Faults(err)); n != maxFaults+1 {
		t.Errorf("%d faults, want %d and one that counts the rest", n, maxFaults)
	}
}

func TestRead(t *testing.T) {
	dir := t.TempDir()
	if _, err := Read(filepath.Join(dir, "none.yaml")); !errors.Is(err, fs.ErrNotExist) || Faults(err) != nil {
		t.Errorf("a missing file gives %v", err)
	}
	big := filepath.Join(dir, "big.yaml")
	if err := os.WriteFile(big, []byte("# "+strings.Repeat("x", MaxSize)), 0o600); err != nil {
		t.Fatal(err)
	}
	if _, err := Read(big); err == nil || !strings.Contains(err.Error(), "larger than 5 MB") {
		t.Errorf("a file above the limit gives %v", err)
	}
	ok := filepath.Join(dir, "ok.yaml")
	if err := os.WriteFile(ok, []byte(small), 0o600); err != nil {
		t.Fatal(err)
	}
	c, err := Read(ok)
	if err != nil {
		t.Fatal(err)
	}
	// SHA-256 of the bytes of `small`, by the hashlib of Python.
	if want := "2b29cebc6057f06620e09b8a2f1a51441dd88d8d8b93534a20ac8afabe6e39c2"; c.SHA256 != want {
		t.Errorf("SHA-256 %s, want %s", c.SHA256, want)
	}
}

// TestNotText checks files that are not text, or not one mapping.
func TestNotText(t *testing.T) {
	cases := []struct{ name, src, want string }{
		{"empty", "", "the file is empty"},
		{"remarks only", "# nothing\n", "the file is empty"},
		{"nothing", "~\n", "not a mapping"},
		{"a list", "- 1\n", "not a mapping"},
		{"a word", "hello\n", "not a mapping"},
		{"latin-1", "title: caf\xe9\n", "x.yaml:1:11: a byte that is not text"},
		{"zero byte", "title: a\nlength: \x00\n", "x.yaml:2:9: a byte that is not text"},
		{"open quote", "title: \"a\nlength: 3\n", "x.yaml:1:8: the text in quotes is not closed"},
		{"key is a list", "? [a, b]\n: 3\n", "a key that is not a plain word"},
		{"alias of itself", "title: &a [*a]\n", "no anchors"},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			_, err := Parse("x.yaml", []byte(c.src))
			if err == nil || !strings.Contains(err.Error(), c.want) {
				t.Errorf("got %v, want %q in it", err, c.want)
			}
		})
	}
}

// TestHostileFilesAreQuick reads files that would blow up if aliases were followed or depth went unchecked.
func TestHostileFilesAreQuick(t *testing.T) {
	var bomb strings.Builder
	bomb.WriteString("a0: &a0 [x, x, x, x, x, x, x, x, x]\n")
	for i := 1; i < 30; i++ {
		p := string(rune('a'+i-1)) + "0"
		bomb.WriteString(string(rune('a'+i)) + "0: &" + string(rune('a'+i)) + "0 [*" + p + ", *" + p + ", *" + p + "]\n")
	}
	cases := map[string]string{
		"aliases":   bomb.String(),
		"depth":     "ground: " + strings.Repeat("[", 5000) + strings.Repeat("]", 5000),
		"many keys": strings.Repeat("k: 1\n", 100000),
		"long list": "ground: [" + strings.Repeat("[1, 2], ", 100000) + "]",
	}
	for name, src := range cases {
		if _, err := Parse(name, []byte(src)); err == nil {
			t.Errorf("%s: no fault", name)
		}
	}
}

// TestNotesAndWarnings checks what is said of legal files that may not be meant.
func TestNotesAndWarnings(t *testing.T) {
	second := func(top string) string {
		return "strata:\n  - {soil: clay, top: ground}\n  - {soil: clay, top: " + top + "}"
	}
	strata := "strata:\n  - {soil: clay, top: ground}"
	cases := []struct{ name, old, new, want string }{
		{"slope deduced", "title", "title", "slope deduced from the ground: crest at (20.00, 10.00), toe at (30.00, 5.00)"},
		{"no stages", "title", "title", "construction stages are not checked"},
		{"pinched out", strata, second("[[0, 8], [50, 8]]"), "stratum 1 (`clay`) is absent from x = 24.00 to 50.00"},
		{"outcrop over a hollow", strata, second("[[0, 8], [20, 8], [25, 12], [30, 4], [50, 4]]"), "absent from x = 21.54 to 29.09"},
		{"nowhere present", strata, second("[[0, 20], [50, 20]]"), "small.yaml:7: strata[1].top: no `clay` is left anywhere"},
		{"short line", strata, second("[[10, 3], [50, 3]]"), "runs from x = 10 to 50 only and is held level beyond"},
		{"water above ground", "situations:\n  - {name: dry, water: none", "water: {high: [[0, 9], [50, 6.5]]}\nsituations:\n  - {name: wet, water: high", "stands up to 2.5 m above the ground (at x = 30)"},
		{"steps that miss the end", "situations:", "remedies: {regrade: {batter: 2 to 3 by 0.3}}\nsituations:", "steps of 0.3 end at 2.9 and do not reach 3"},
		{"water below ground", "required_fs: 1.3", "required_fs: 1.3, free_water: [{level: 4, from: 30, to: 40}]", "lies above the water level"},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			got := mustParseSmall(t, c.old, c.new)
			all := strings.Join(append(got.Notes, got.Warnings...), "\n")
			if !strings.Contains(all, c.want) {
				t.Errorf("said\n%s\nwant %q in it", all, c.want)
			}
		})
	}
	if got := mustParseSmall(t, strata, second("[[0, 3], [50, 3]]")); len(got.Warnings) > 0 {
		t.Errorf("a plain case warns: %q", got.Warnings)
	}
}

// TestUndrainedTakesClaysOnly reads a case with cu for a soil that is no clay: it stays drained.
func TestUndrainedTakesClaysOnly(t *testing.T) {
	src := strings.Replace(small, "friction: 24}}", "friction: 24}, undrained: {strength: 30}}\n  silt: {unit_weight: 19, drained: {cohesion: 2, friction: 30}, undrained: {strength: 40}, clay: false}", 1)
	src = strings.Replace(src, "required_fs: 1.3", "strength: undrained, required_fs: 1.3", 1)
	c, err := Parse("x.yaml", []byte(src))
	if err != nil {
		t.Fatal(err)
	}
	if diff := cmp.Diff([]bool{true, false}, c.Job.Situations[0].Undrained); diff != "" {
		t.Errorf("undrained soils (-want +got):\n%s", diff)
	}
}

// TestUndrainedOnlyCase reads a case that is undrained throughout and needs no drained strength.
func TestUndrainedOnlyCase(t *testing.T) {
	src := strings.Replace(small, "drained: {cohesion: 2, friction: 24}", "undrained: {strength: 30}", 1)
	src = strings.Replace(src, "required_fs: 1.3", "strength: undrained, required_fs: 1.3", 1)
	c, err := Parse("x.yaml", []byte(src))
	if err != nil {
		t.Fatal(err)
	}
	if !c.Job.Situations[0].Undrained[0] {
		t.Error("the soil is not undrained")
	}
	if _, err := Parse("x.yaml", []byte(src+"stages: {water: none, required_fs: 1.1}\n")); err == nil {
		t.Error("stages without a drained strength are accepted")
	}
}
