package cli

import (
	"bytes"
	"encoding/json"
	"fmt"
	"math"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"sync"
	"testing"

	"standfast/cmd/internal/report"
	"standfast/remedies"
)

const (
	manyCases  = 200 // Random cases of the long run.
	ofEachKind = 60  // Cases with an option that meets the target, and with none, that there must be among them.
	wholeEvery = 10  // Every so many cases go through the command with all that it writes; the others without curves and drawings.
	byChance   = 4   // Options of 200 cases whose mirror image may have another answer, since one search found a slip that the other did not,
	bestOfFew  = 20  // and of those that meet nothing whose best design may be another, since but a few designs are searched for it.
)

// quickCases are the random cases of the short run: some with an answer, some without, some that need nothing, all worked out quickly.
var quickCases = []int{1, 3, 12, 13, 17, 20, 106, 107, 116, 118, 126, 128}

// TestRandomCases sizes random valid cases: no crash, no blank governing check, method, slip, limit or reason; verify, with its four times the
// effort, refutes nothing; and the mirror image gets the same answers. `STANDFAST_LONG=1 go test -run TestRandomCases/case/^17$` repeats one.
func TestRandomCases(t *testing.T) {
	cases := quickCases
	if longRun {
		cases = nil
		for i := range manyCases {
			cases = append(cases, i)
		}
	}
	tally := randomTally{}
	t.Run("case", func(t *testing.T) {
		for _, i := range cases {
			t.Run(strconv.Itoa(i), func(t *testing.T) {
				t.Parallel()
				tally.add(randomCaseHolds(t, uint64(i), i%wholeEvery == 0))
			})
		}
	})
	t.Logf("%d cases: %d with an option that meets the target, %d with none, %d that need nothing; %d answers and %d best designs differ in the mirror",
		tally.n, tally.met, tally.none, tally.idle, tally.answers, tally.best)
	if tally.n < manyCases { // One case was asked for, or the short run.
		return
	}
	if tally.met < ofEachKind || tally.none < ofEachKind {
		t.Errorf("%d cases with an option that meets the target and %d with none, want %d of each", tally.met, tally.none, ofEachKind)
	}
	if tally.answers > byChance || tally.best > bestOfFew {
		t.Errorf("%d mirror images have another answer, want %d at most, and %d another best design, want %d at most", tally.answers, byChance, tally.best, bestOfFew)
	}
}

// randomTally counts what came out.
type randomTally struct {
	sync.Mutex
	n, met, none, idle int
	answers, best      int // Options whose mirror image differs within the repeatability of the searches.
}

// randomOutcome is what came out of one case.
type randomOutcome struct {
	met, idle     bool
	answers, best int
}

func (n *randomTally) add(o randomOutcome) {
	n.Lock()
	defer n.Unlock()
	n.n++
	switch {
	case o.met:
		n.met++
	case o.idle:
		n.idle++
	default:
		n.none++
	}
	n.answers += o.answers
	n.best += o.best
}

// randomCaseHolds checks one case; whole says whether the command writes everything.
func randomCaseHolds(t *testing.T, seed uint64, whole bool) (out randomOutcome) {
	text := randomCase(seed, false)
	defer func() {
		if t.Failed() {
			t.Logf("the case:\n%s", text)
		}
	}()
	folder := t.TempDir()
	f, witnesses := sized(t, text, filepath.Join(folder, "works"), whole, nil)
	for i := range f.Options {
		t.Logf("%s %s: %s", f.Options[i].Name, f.Options[i].Status, f.Options[i].Reason)
	}
	noBlanks(t, f)
	verifies(t, filepath.Join(folder, "works"))
	var targets []string
	for _, s := range f.Situations {
		if s.VariantOf == "" {
			targets = append(targets, s.Name+"="+strconv.FormatFloat(s.RequiredFS, 'g', -1, 64))
		}
	}
	image, others := sized(t, randomCase(seed, true), filepath.Join(folder, "image"), false, targets)
	out.idle = f.LeastEarthworks != nil && *f.LeastEarthworks == f.Existing.Name
	for i := range f.Options {
		out.met = out.met || f.Options[i].Status == "meets target"
	}
	out.answers, out.best = sameImage(t, f, image, witnesses, others)
	return out
}

// verifies runs verify on a folder, which must refute nothing.
func verifies(t *testing.T, folder string) {
	t.Helper()
	var stdout, stderr bytes.Buffer
	code := run(t.Context(), []string{"verify", folder, "--json", "--jobs", "1"}, strings.NewReader(""), &stdout, &stderr)
	if code == exitOK {
		return
	}
	var verdicts []verdict
	if err := json.Unmarshal(stdout.Bytes(), &verdicts); err != nil {
		t.Errorf("verify ends with %d: %s", code, stderr.String())
	}
	for _, v := range verdicts {
		for _, l := range v.Lines {
			t.Errorf("verify: %s: %s", v.Option, l)
		}
	}
}

// noBlanks checks that nothing that an engineer needs to read is blank.
func noBlanks(t *testing.T, f *report.File) {
	t.Helper()
	var all []*report.Option
	all = append(all, &f.Existing)
	for i := range f.Options {
		all = append(all, &f.Options[i])
	}
	for _, o := range all {
		if o.Reason == "" || strings.Contains(o.Reason, "NaN") || strings.HasPrefix(o.Reason, ";") {
			t.Errorf("%s is %s for the reason %q", o.Name, o.Status, o.Reason)
		}
		if o.Status == "infeasible" && o.BindsOn == "" {
			t.Errorf("%s is infeasible and nothing binds: %s", o.Name, o.Reason)
		}
		for _, s := range o.StepLess {
			if s.Check == "" && s.Limit == "" || s.Check != "" && !s.FS.Known() {
				t.Errorf("%s: %s of %v fails for no reason", o.Name, s.Parameter, s.Value)
			}
		}
		for _, r := range o.Relaxations {
			if r.Limit == "" {
				t.Errorf("%s: a limit without a name is moved", o.Name)
			}
		}
		for _, s := range o.Situations {
			whole(t, o, s.Name, s.Found)
		}
		for _, s := range o.Stages {
			whole(t, o, s.Name, s.Found)
		}
		if g, ok := o.Governing(); ok && (g.Check == "" || !g.FS.Known()) {
			t.Errorf("%s: the governing check is %q with FS %v", o.Name, g.Check, g.FS)
		}
	}
}

// whole checks the answer to one check: an FS comes with its method and slip, and without one nothing meets the target.
func whole(t *testing.T, o *report.Option, name string, f report.Found) {
	t.Helper()
	switch {
	case name == "":
		t.Errorf("%s: a check has no name", o.Name)
	case !f.FS.Known():
		t.Errorf("%s, %s: no FS", o.Name, name)
	case f.Method == "" || f.Slip == nil || !f.Depth.Known():
		t.Errorf("%s, %s: FS %v by %q, slip %v, depth %v", o.Name, name, f.FS, f.Method, f.Slip, f.Depth)
	case !(math.Abs(float64(f.FSByMethod[f.Method]-f.FS)) <= 1e-9):
		t.Errorf("%s, %s: FS %v, by %s %v", o.Name, name, f.FS, f.Method, f.FSByMethod[f.Method])
	}
}

// FS within which two searches of one design agree, one of them of its mirror image.
const repeatable = 0.01

// sameImage checks that the mirror image of a case has the same options, works and volumes, and returns how many answers and how many best
// designs of options that meet nothing differ because the searches found FS on either side of a line.
func sameImage(t *testing.T, f, image *report.File, w, imageW *report.Witnesses) (answers, best int) {
	t.Helper()
	if len(f.Options) != len(image.Options) {
		t.Errorf("%d options, %d in the mirror image", len(f.Options), len(image.Options))
	}
	for i := range f.Options {
		o := &f.Options[i]
		at := slices.IndexFunc(image.Options, func(p report.Option) bool { return p.Name == o.Name })
		if at < 0 {
			t.Errorf("%s is missing in the mirror image", o.Name)
			continue
		}
		p := &image.Options[at]
		switch why := unlike(o, p); {
		case why == "":
		case o.Status == p.Status && o.Status != "meets target":
			t.Logf("%s, %s, has another best design in the mirror image: %s; margins %.4f and %.4f", o.Name, o.Status, why, margin(o), margin(p))
			best++
		case sameWorks(o, p) || explained(t, o, p, imageW) || explained(t, p, o, w):
			t.Logf("%s differs in the mirror image, where searches found other slips: %s", o.Name, why)
			answers++
		default:
			t.Errorf("%s differs in the mirror image: %s\n%s\n%s", o.Name, why, o.Reason, p.Reason)
		}
	}
	return answers, best
}

// sameWorks reports whether an option meets the target with the same works in the mirror image, so that only FS differs.
func sameWorks(o, p *report.Option) bool {
	same := o.Status == p.Status
	for name, v := range o.Parameters {
		same = same && p.Parameters[name].Value == v.Value
	}
	return same && math.Abs(float64(o.Quantities.Earthworks-p.Quantities.Earthworks)) < 1e-6
}

// unlike says what differs between an option and its mirror image; "" if nothing does.
func unlike(o, p *report.Option) string {
	if o.Status != p.Status {
		return fmt.Sprintf("%s, %s in the mirror image", o.Status, p.Status)
	}
	for name, v := range o.Parameters {
		if got := p.Parameters[name].Value; got != v.Value {
			return fmt.Sprintf("%s %v, %v in the mirror image", name, v.Value, got)
		}
	}
	for _, q := range []struct {
		name      string
		got, want float64
	}{
		{"cut", p.Quantities.Cut, o.Quantities.Cut},
		{"fill", p.Quantities.Fill, o.Quantities.Fill},
		{"drains", p.Quantities.Drain, o.Quantities.Drain},
		{"strip", p.Quantities.Strip, o.Quantities.Strip},
		{"trench", p.Quantities.TrenchDig, o.Quantities.TrenchDig},
		{"stone", p.Quantities.Stone, o.Quantities.Stone},
	} {
		if math.Abs(q.got-q.want) > 1e-9*max(1, q.want) { // Rounding: sums run the other way.
			return fmt.Sprintf("%s %v m3/m, %v in the mirror image", q.name, q.want, q.got)
		}
	}
	if d := math.Abs(margin(o) - margin(p)); d > repeatable {
		return fmt.Sprintf("least margin %.4f, %.4f in the mirror image", margin(o), margin(p))
	}
	return ""
}

// margin returns FS over what is required in the governing check.
func margin(o *report.Option) float64 {
	g, ok := o.Governing()
	if !ok {
		return math.Inf(-1)
	}
	return float64(g.FS) - g.RequiredFS
}

// explained reports whether the answer o, which its searches passed, was rejected in the other study by a slip below what is required and the
// allowance, and tells both FS.
func explained(t *testing.T, o, p *report.Option, others *report.Witnesses) bool {
	t.Helper()
	if o.Status != "meets target" {
		return false
	}
	held := others.Options[p.Name]
	for _, d := range held.Designs {
		same := len(d.X) == len(held.Parameters)
		for i, name := range held.Parameters {
			same = same && (!d.X[i].Known() || math.Abs(float64(d.X[i]-o.Parameters[name].Value)) < 1e-9)
		}
		if !same {
			continue
		}
		check := held.Pool[d.Cut].Check
		found, required := answerOf(o, check)
		t.Logf("%s at %v: FS %.4f in %s by one study, %.4f by the other; required %.4f", o.Name, d.X, found, check, d.FS, required)
		return float64(d.FS) < required+remedies.DefaultAllowance
	}
	return false
}

// answerOf returns FS and required FS of a check of an option by its name.
func answerOf(o *report.Option, name string) (fs, required float64) {
	for _, s := range o.Situations {
		if s.Name == name {
			return float64(s.FS), s.RequiredFS
		}
	}
	for _, s := range o.Stages {
		if s.Name == name {
			return float64(s.FS), s.RequiredFS
		}
	}
	return math.NaN(), math.NaN()
}
