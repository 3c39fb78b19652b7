package cli

import (
	"bytes"
	"encoding/json"
	"maps"
	"math"
	"path/filepath"
	"reflect"
	"strings"
	"testing"
)

// theirBack is what a stranger reads of the back-analysis, written from docs/outputs.md.
type theirBack struct {
	Back struct {
		Soil      string
		Situation string
		Slip      struct {
			Centre   theirPoint
			Radius   float64
			From, To theirPoint
		}
		SameLeast bool `json:"same_least"`
		SameOrder bool `json:"same_ranking"`
		Points    []struct {
			Name     string
			Cohesion float64 `json:"cohesion_kPa"`
			Friction float64 `json:"friction_angle_deg"`
			FS       float64 `json:"observed_slip_fs"`
			Existing theirOption
			Options  []theirOption
			Least    *string
			Chosen   theirOption
		}
	} `json:"back_analysis"`
}

// pointsOf runs compare on a case and returns what it prints, the result, and the back-analysis in it, from which all else can be made again.
func pointsOf(t *testing.T, path string, args ...string) (printed string, f *theirFile, back *theirBack) {
	t.Helper()
	var stdout, stderr bytes.Buffer
	out := filepath.Join(t.TempDir(), "works")
	if code := run(t.Context(), append([]string{"compare", path, "--out", out}, args...), strings.NewReader(""), &stdout, &stderr); code != exitOK {
		t.Fatalf("exit code %d: %s", code, stderr.String())
	}
	files := filesOf(t, out)
	if code := run(t.Context(), []string{"report", out, "--quiet"}, nil, &stderr, &stderr); code != exitOK {
		t.Fatalf("exit code %d: %s", code, stderr.String())
	}
	for name, made := range filesOf(t, out) {
		if !bytes.Equal(made, files[name]) {
			t.Errorf("%s is not made again as it was", name)
		}
	}
	f, back = new(theirFile), new(theirBack)
	for _, to := range []any{f, back} {
		if err := json.Unmarshal(files[resultName], to); err != nil {
			t.Fatal(err)
		}
	}
	return strings.Join(strings.Fields(stdout.String()), " "), f, back
}

// TestChoiceFlipsAfterASlip compares the slipped demo by the command: drains gain by friction, so that they are least where most of the strength
// that the slip leaves open is friction, and do not get there where most of it is cohesion. A stranger finds FS 1 on the observed slip with the
// strength of each point, and the FS that the file says on every slip of every option.
func TestChoiceFlipsAfterASlip(t *testing.T) {
	printed, f, back := pointsOf(t, filepath.Join(demoFolder, "slipped.yaml"))
	want := map[string]string{"low": "trench_drains", "middle": "trench_drains", "high": "berm"}
	b := &back.Back
	if len(b.Points) != len(want) || b.SameLeast || b.SameOrder || !strings.Contains(printed, "The choice flips.") {
		t.Fatalf("%d points, same least %t, same ranking %t; printed %s", len(b.Points), b.SameLeast, b.SameOrder, printed)
	}
	for i := range b.Points {
		p := &b.Points[i]
		if p.Least == nil || *p.Least != want[p.Name] {
			t.Errorf("%s point: least %v, want %s", p.Name, p.Least, want[p.Name])
		}
		if math.Abs(p.FS-1) > 1e-6 {
			t.Errorf("%s point: FS of the observed slip %g", p.Name, p.FS)
		}
		then := *f
		then.Soils = maps.Clone(f.Soils)
		soil := then.Soils[b.Soil]
		soil.Drained.Cohesion, soil.Drained.Friction = p.Cohesion, p.Friction
		then.Soils[b.Soil] = soil
		gs, answers := strangers(&then, &p.Existing)
		for k, g := range gs {
			if answers[k].Name != b.Situation {
				continue
			}
			ss, _ := g.cut(arc(b.Slip.Centre, b.Slip.Radius), b.Slip.From[0], b.Slip.To[0], manySlices)
			if fs, _ := g.solve(ss, bishop(b.Slip.Centre[1], b.Slip.Radius)); !(math.Abs(fs-1) <= agreement) {
				t.Errorf("%s point: a stranger's FS of the observed slip is %.4f", p.Name, fs)
			}
		}
		if built := p.Chosen.Status == "meets target"; p.Chosen.Name != "trench_drains" || built != (p.Name != "high") {
			t.Errorf("%s point: %s as sized with the strengths of the case: %s", p.Name, p.Chosen.Name, p.Chosen.Status)
		}
		for _, o := range append(p.Options, p.Chosen) {
			gs, answers := strangers(&then, &o)
			for n, g := range gs {
				g.compare(t, p.Name+" point, "+o.Name+", "+answers[n].Name, answers[n], o.Status == "meets target")
			}
		}
	}
}

// TestOneOptionDoesNotFlip sizes the berm of the slipped demo alone: it is least at every point, and at the middle one of the size that the case
// which backanalyse writes for it gives.
func TestOneOptionDoesNotFlip(t *testing.T) {
	path := filepath.Join(demoFolder, "slipped.yaml")
	printed, _, back := pointsOf(t, path, "--only", "berm")
	b := &back.Back
	if len(b.Points) != 3 || !b.SameLeast || !b.SameOrder || !strings.Contains(printed, "least earthworks is the same at all three points: toe berm") {
		t.Fatalf("%d points, same least %t, same ranking %t; printed %s", len(b.Points), b.SameLeast, b.SameOrder, printed)
	}
	folder := t.TempDir()
	backanalysed(t, path, "--write", folder)
	printed, written, none := pointsOf(t, filepath.Join(folder, "slipped-middle.yaml"), "--only", "berm", "--skip-back-analysis")
	if len(none.Back.Points) > 0 || strings.Contains(printed, "three points") {
		t.Error("--skip-back-analysis does not leave it out")
	}
	got, want := &b.Points[1].Options[0], &written.Options[0]
	if got.Status != "meets target" || got.Status != want.Status || !reflect.DeepEqual(got.Parameters, want.Parameters) {
		t.Errorf("middle point: %s %v; the case written for it: %s %v", got.Status, got.Parameters, want.Status, want.Parameters)
	}
}
