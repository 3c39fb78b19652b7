package cli

import (
	"bytes"
	"encoding/json"
	"maps"
	"math"
	"os"
	"path/filepath"
	"reflect"
	"regexp"
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

// pointsRun is a comparison made by the command.
type pointsRun struct {
	folder  string
	printed string // In one line.
	file    *theirFile
	back    *theirBack
}

// pointsOf runs compare on a case; what it writes can be made again from the result alone.
func pointsOf(t *testing.T, path string, args ...string) pointsRun {
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
	r := pointsRun{out, strings.Join(strings.Fields(stdout.String()), " "), new(theirFile), new(theirBack)}
	for _, to := range []any{r.file, r.back} {
		if err := json.Unmarshal(files[resultName], to); err != nil {
			t.Fatal(err)
		}
	}
	return r
}

// TestChoiceFlipsAfterASlip compares the slipped demo by the command: drains gain by friction, so that they are least where most of the strength
// that the slip leaves open is friction, and do not get there where most of it is cohesion. A stranger finds FS 1 on the observed slip with the
// strength of each point, and the FS that the file says on every slip of every option.
func TestChoiceFlipsAfterASlip(t *testing.T) {
	r := pointsOf(t, filepath.Join(demoFolder, "slipped.yaml"))
	f := r.file
	want := map[string]string{"low": "trench_drains", "middle": "trench_drains", "high": "berm"}
	b := &r.back.Back
	if len(b.Points) != len(want) || b.SameLeast || b.SameOrder || !strings.Contains(r.printed, "The choice flips.") {
		t.Fatalf("%d points, same least %t, same ranking %t; printed %s", len(b.Points), b.SameLeast, b.SameOrder, r.printed)
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
	r := pointsOf(t, path, "--only", "berm")
	b := &r.back.Back
	if len(b.Points) != 3 || !b.SameLeast || !b.SameOrder || !strings.Contains(r.printed, "least earthworks is the same at all three points: toe berm") {
		t.Fatalf("%d points, same least %t, same ranking %t; printed %s", len(b.Points), b.SameLeast, b.SameOrder, r.printed)
	}
	folder := t.TempDir()
	backanalysed(t, path, "--write", folder)
	written := pointsOf(t, filepath.Join(folder, "slipped-middle.yaml"), "--only", "berm", "--skip-back-analysis")
	if len(written.back.Back.Points) > 0 || strings.Contains(written.printed, "three points") {
		t.Error("--skip-back-analysis does not leave it out")
	}
	got, want := &b.Points[1].Options[0], &written.file.Options[0]
	if got.Status != "meets target" || got.Status != want.Status || !reflect.DeepEqual(got.Parameters, want.Parameters) {
		t.Errorf("middle point: %s %v; the case written for it: %s %v", got.Status, got.Parameters, want.Status, want.Parameters)
	}
	verifyTells(t, r.folder, exitOK, "berm at the high point: no slip below target found in 2 searches")
	path = filepath.Join(r.folder, resultName)
	src, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	forged := regexp.MustCompile(`("name": "high",\s+"cohesion_kPa": )6\.`).ReplaceAll(src, []byte("${1}5."))
	if bytes.Equal(forged, src) {
		t.Fatal("there is no cohesion to forge")
	}
	if err := os.WriteFile(path, forged, 0o644); err != nil {
		t.Fatal(err)
	}
	verifyTells(t, r.folder, exitNothingMeets, "in wet winter the reported slip has FS")
}

// verifyTells runs verify on a folder, which must end with a code and say something.
func verifyTells(t *testing.T, folder string, code int, want string) {
	t.Helper()
	var stdout, stderr bytes.Buffer
	if got := run(t.Context(), []string{"verify", folder}, nil, &stdout, &stderr); got != code || !strings.Contains(stdout.String(), want) {
		t.Errorf("exit code %d, want %d and %q: %s%s", got, code, want, &stdout, &stderr)
	}
}
