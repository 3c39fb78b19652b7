package cli

import (
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"
)

// feature is a part of the engine with where it is exercised and described.
type feature struct {
	name   string
	keys   string // Keys of docs/case-file.md, parted by blanks; each stands in one of the cases, and a message tells of its misuse.
	cases  string // Small cases, parted by blanks.
	theory string // What docs/theory.md says of it.
	misuse string // What a script shows of its misuse, where it has no key.
}

// features are all features that a case can ask for, but for remedies.
var features = []feature{
	{"ordinary method", "", "sand.yaml", "**Ordinary** (Fellenius 1936)", `unknown method "ordinary"`},
	{"Bishop", "", "sand.yaml fredlund.yaml", "**Bishop simplified** (Bishop 1955)", "method is for circles"},
	{"Janbu with and without f0", "", "sand.yaml loads.yaml", "**Janbu simplified** (Janbu 1954, 1973)", ""},
	{"Spencer and Morgenstern-Price", "side_force_function", "side-forces.yaml fredlund.yaml", "**Spencer** (1967) and **Morgenstern-Price** (Morgenstern and Price 1965)", ""},
	{"slice table", "", "plane.yaml", "## The slice table", ""},
	{"slips that are no circles", "slips.head slips.toe slips.direction", "side-forces.yaml", "## Slips that are no circles", ""},
	{"composite slips", "strata[].top", "fredlund.yaml side-forces.yaml", "composite slip", ""},
	{"known slips", "known_slips[].line known_slips[].friction", "known.yaml", "A known slip surface has a strength of its own", ""},
	{"slips about fill", "placed[].soil placed[].outline", "fill.yaml", "placed fill", ""},
	{"firm base", "firm_base", "giam.yaml", "firm base", ""},
	{"tension crack", "tension_crack.depth tension_crack.line tension_crack.filled tension_crack.water_level", "crack.yaml giam.yaml", "A tension crack ends a slip", ""},
	{"water lines", "water.NAME.line", "water.yaml", "| piezometric line |", ""},
	{"perched and artesian water", "water.NAME.by_soil water.NAME.artesian", "water.yaml", "| line of one soil |", ""},
	{"partly submerged", "situations[].free_water", "sand.yaml", "| free water |", ""},
	{"inclined lines", "water.NAME.inclined", "water.yaml sand.yaml", "cos^2(beta)", ""},
	{"pressures at points", "water.NAME.points", "water.yaml", "| points |", ""},
	{"pore pressure ratio", "soils.NAME.ru", "slab.yaml", "| pore pressure ratio |", ""},
	{"cu by ratio", "soils.NAME.undrained.ratio soils.NAME.undrained.minimum soils.NAME.undrained.water_before", "strength.yaml", "cu = max(minimum, r sigma'_v)", ""},
	{"curved envelope", "soils.NAME.power_law.a soils.NAME.power_law.b", "strength.yaml slab.yaml", "Charles and Watts 1980", ""},
	{"inclined and triangular strips", "surcharges[].pressure_to surcharges[].horizontal", "loads.yaml", "A strip presses with p(x)", ""},
	{"line loads", "line_loads[].vertical line_loads[].horizontal", "loads.yaml", "A line load", ""},
	{"earthquake", "situations[].kh situations[].kv", "sand.yaml water.yaml", "kv scales the same weight", ""},
	{"back-analysis", "observed_slip.line observed_slip.circle observed_slip.situation", "observed.yaml plane.yaml fredlund.yaml", "## Back-analysis", `did you mean "strength"`},
	{"influence of load", "", "loads.yaml plane.yaml", "## Influence of load", ""},
}

// TestFeatureMatrix fails where a feature loses its case, its row in docs/case-file.md, its place in docs/theory.md, or the message of its misuse.
func TestFeatureMatrix(t *testing.T) {
	const top = "../../../"
	read := func(pattern string) string {
		t.Helper()
		paths, err := filepath.Glob(pattern)
		if err != nil || len(paths) == 0 {
			t.Fatalf("nothing at %s: %v", pattern, err)
		}
		var all strings.Builder
		for _, path := range paths {
			text, err := os.ReadFile(path)
			if err != nil {
				t.Fatal(err)
			}
			all.Write(text)
		}
		return all.String()
	}
	keys, theory := read(top+"docs/case-file.md"), read(top+"docs/theory.md")
	messages, scripts, tests := read(top+"testdata/cases/*.txt"), read("testdata/script/*.txtar"), read("features*_test.go")
	for _, f := range features {
		t.Run(f.name, func(t *testing.T) {
			var cases strings.Builder
			for _, name := range strings.Fields(f.cases) {
				cases.WriteString(read(filepath.Join(featureCases, name)))
				if !strings.Contains(tests, `"`+name+`"`) && !strings.Contains(scripts, "features/"+name) {
					t.Errorf("no test runs %s", name)
				}
			}
			if !strings.Contains(strings.Join(strings.Fields(theory), " "), f.theory) { // However its lines are broken.
				t.Errorf("docs/theory.md does not hold %q", f.theory)
			}
			if !strings.Contains(scripts, f.misuse) {
				t.Errorf("no script shows %q", f.misuse)
			}
			for _, key := range strings.Fields(f.keys) {
				if !strings.Contains(keys, "| `"+key+"` |") {
					t.Errorf("docs/case-file.md has no row for %s", key)
				}
				last := key[strings.LastIndexByte(key, '.')+1:]
				if !strings.Contains(cases.String(), last+":") {
					t.Errorf("%s is in none of %s", key, f.cases)
				}
				path := strings.NewReplacer(`\.NAME`, `\.[^.:]+`, `\[\]`, `\[\d+\]`).Replace(regexp.QuoteMeta(key))
				if !regexp.MustCompile(`(?m)^\S+:\d+:\d+: ` + path + `(\.[^:]+|\[\d+\])*: `).MatchString(messages) {
					t.Errorf("no message of testdata/cases tells of a misuse of %s", key)
				}
			}
		})
	}
}
