package report

import (
	"bytes"
	"errors"
	"math"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/google/go-cmp/cmp/cmpopts"

	"standfast/cmd/internal/drawing"
	"standfast/lem"
	"standfast/remedies"
)

// drawings returns every drawing of a result as SVG and DXF, by name.
func drawings(t *testing.T, f *File) map[string]string {
	t.Helper()
	r, err := Rebuild(f)
	if err != nil {
		t.Fatal(err)
	}
	out := map[string]string{}
	for i := range r.Options {
		o := &r.Options[i]
		fig, err := drawing.Section(r.Job, o, drawing.Options{})
		if err != nil {
			t.Fatal(err)
		}
		var svg, dxf bytes.Buffer
		if err := errors.Join(fig.WriteSVG(&svg), drawing.SectionDXF(&dxf, r.Job, o)); err != nil {
			t.Fatal(err)
		}
		out[o.Name+".svg"], out[o.Name+".dxf"] = svg.String(), dxf.String()
	}
	return out
}

// What a result file is turned back into is drawn as the result itself is, to the byte.
func TestRebuildDrawsTheSame(t *testing.T) {
	result, src := sample()
	f, err := Decode(strings.NewReader(encoded(t, New(result, src))))
	if err != nil {
		t.Fatal(err)
	}
	got := drawings(t, f)
	for i := range result.Options {
		o := &result.Options[i]
		fig, err := drawing.Section(result.Job, o, drawing.Options{})
		if err != nil {
			t.Fatal(err)
		}
		var svg, dxf bytes.Buffer
		if err := errors.Join(fig.WriteSVG(&svg), drawing.SectionDXF(&dxf, result.Job, o)); err != nil {
			t.Fatal(err)
		}
		if got[o.Name+".svg"] != svg.String() {
			t.Errorf("%s: the drawing differs", o.Name)
		}
		if got[o.Name+".dxf"] != dxf.String() {
			t.Errorf("%s: the DXF differs", o.Name)
		}
	}
}

// TestRebuildKeepsWater: the water of every check is turned back as it was, with the level to which free-draining soils fill.
func TestRebuildKeepsWater(t *testing.T) {
	result, src := sample()
	f, err := Decode(strings.NewReader(encoded(t, New(result, src))))
	if err != nil {
		t.Fatal(err)
	}
	back, err := Rebuild(f)
	if err != nil {
		t.Fatal(err)
	}
	levels := 0
	same := func(o, got *remedies.Option) {
		for k, list := range [][]remedies.Outcome{o.Situations, o.Stages} {
			for i := range list {
				want, now := &list[i].Check, &[][]remedies.Outcome{got.Situations, got.Stages}[k][i].Check
				if diff := cmp.Diff(want.Situation.Water, now.Situation.Water, cmpopts.EquateApprox(0, 1e-9), cmpopts.EquateEmpty()); diff != "" {
					t.Errorf("%s, %s (-written +read):\n%s", o.Name, want.Label(), diff)
				}
				if now.Situation.Water.HasFreeDrainingLevel {
					levels++
				}
			}
		}
	}
	same(&result.Existing, &back.Existing)
	for i := range result.Options {
		same(&result.Options[i], &back.Options[i])
	}
	if levels == 0 {
		t.Error("no check with a level of free-draining soils")
	}
}

func TestRebuildRefuses(t *testing.T) {
	good := encoded(t, New(sample()))
	for _, c := range []struct{ name, old, new, want string }{
		{"an earlier version", `"soil_order"`, `"soil_orders"`, "soils or section"},
		{"a soil that is not there", `{"soil": "clay", "top"`, `{"soil": "silt", "top"`, `no soil "silt"`},
		{"a coordinate that no case has", `"ground": [[0, 109]`, `"ground": [[-1e300, 109]`, "out of bounds"},
		{"a line that runs back", `"ground": [[0, 109], [30, 109]`, `"ground": [[0, 109], [-30, 109]`, "runs back"},
		{"a line that is a point", `"line": [[0, 106], [75, 99]]`, `"line": [[0, 106]]`, "no length"},
		{"a water line that is not there", `"water_line": "spring"`, `"water_line": "autumn"`, `no water line "autumn"`},
		{"a direction that there is not", `"direction": "right"`, `"direction": "up"`, `no direction "up"`},
		{"a function that there is not", `"function": "half-sine"`, `"function": "square"`, `no side-force function "square"`},
		{"a function without ordinates", `"function": "half-sine"`, `"function": "given"`, "0 ordinates, not 11"},
		{"a circle without a radius", `"radius": 20.5`, `"radius": 0`, "without centre or radius"},
	} {
		t.Run(c.name, func(t *testing.T) {
			src := strings.Replace(good, c.old, c.new, 1)
			if src == good {
				t.Fatalf("nothing to replace: %s", c.old)
			}
			f, err := Decode(strings.NewReader(src))
			if err != nil {
				t.Fatal(err)
			}
			if _, err := Rebuild(f); !errors.Is(err, ErrIncomplete) || !strings.Contains(err.Error(), c.want) {
				t.Errorf("got %v, want %q", err, c.want)
			}
		})
	}
}

// A result file that somebody changed is drawn or refused; nothing panics.
func FuzzRebuild(f *testing.F) {
	var b bytes.Buffer
	if err := New(sample()).Encode(&b); err != nil {
		f.Fatal(err)
	}
	good := b.Bytes()
	f.Add(uint16(0), byte(0))
	f.Fuzz(func(t *testing.T, at uint16, c byte) {
		src := bytes.Clone(good)
		src[int(at)%len(src)] = c
		file, err := Decode(bytes.NewReader(src))
		if err != nil {
			return
		}
		r, err := Rebuild(file)
		if err != nil {
			return
		}
		if _, err := drawing.Section(r.Job, &r.Options[0], drawing.Options{}); err != nil && !errors.Is(err, drawing.ErrNothingToDraw) {
			t.Fatal(err)
		}
	})
}

// Whatever prices and limits works, and whatever is told of them besides, is turned back as it was.
func TestRebuildKeepsEconomics(t *testing.T) {
	result, src := sample()
	j := result.Job
	priceSample(j)
	berm := &result.Options[0]
	berm.Relaxations = []remedies.Relaxation{{Limit: "toe fence", Change: "moved 1.00 m outwards", Saves: 2.1, Objective: 3.2, Parameters: berm.Parameters}}
	berm.Sensitivity = []remedies.Bar{{
		Input: "water level", Low: 1.36, High: math.NaN(), CheckL: "wet spring", RequiredL: 1.2, Base: 1.306, BaseCheck: "normal water", BaseRequired: 1.3,
	}}
	berm.Proposal.HandChecks = []remedies.HandCheck{{Name: "bearing", FS: 2.4, Working: "5.14 x 35/75", Source: "Prandtl 1921"}}
	berm.Stages[0].Check.Advisory, berm.Stages[0].Check.Required, berm.Stages[0].FS = true, 0, 0.93
	f, err := Decode(strings.NewReader(encoded(t, New(result, src))))
	if err != nil {
		t.Fatal(err)
	}
	if s := f.Options[0].Stages[0]; !s.Advisory || !strings.Contains(s.Says, "0.930") {
		t.Errorf("an advisory check says %q", s.Says)
	}
	if g, _ := f.Options[0].Governing(); g.Check != "normal water" {
		t.Errorf("%s governs", g.Check)
	}
	r, err := Rebuild(f)
	if err != nil {
		t.Fatal(err)
	}
	got := &r.Options[0]
	for name, pair := range map[string][2]any{
		"limits": {j.Limits, r.Job.Limits}, "stages": {j.Stage.Plant, r.Job.Stage.Plant}, "objective": {j.Objective, r.Job.Objective},
		"economics": {j.Economics, r.Job.Economics}, "on site": {j.OnSite, r.Job.OnSite},
		"relaxations": {berm.Relaxations, got.Relaxations}, "sensitivity": {berm.Sensitivity, got.Sensitivity},
		"hand checks": {berm.Proposal.HandChecks, got.Proposal.HandChecks}, "quantities": {berm.Proposal.Quantities, got.Proposal.Quantities},
		"bill": {remedies.BillOf(j, &berm.Proposal.Quantities), remedies.BillOf(r.Job, &got.Proposal.Quantities)},
	} {
		if diff := cmp.Diff(pair[0], pair[1], cmpopts.EquateNaNs(), cmpopts.EquateEmpty()); diff != "" {
			t.Errorf("%s (-was +turned back):\n%s", name, diff)
		}
	}
}

// Which slips are looked at and how they are solved is turned back, so that a new search looks at the same.
func TestRebuildKeepsSearches(t *testing.T) {
	result, src := sample()
	j := result.Job
	for _, side := range []lem.SideForce{{}, {Shape: lem.Constant}, {Shape: lem.Given, Ordinates: [lem.SideOrdinates]float64{0, 0.5, 1, 1, 1, 1, 1, 1, 1, 0.25}}} {
		j.SideForce = side
		f, err := Decode(strings.NewReader(encoded(t, New(result, src))))
		if err != nil {
			t.Fatal(err)
		}
		r, err := Rebuild(f)
		if err != nil {
			t.Fatal(err)
		}
		search := func(j *remedies.Job) []any { return []any{j.MinDepth, j.Head, j.Exit, j.Direction, j.SideForce} }
		if diff := cmp.Diff(search(j), search(r.Job)); diff != "" {
			t.Errorf("searches (-was +turned back):\n%s", diff)
		}
	}
}

// An FS that is not known stays so.
func TestRebuildKeepsUnknown(t *testing.T) {
	result, src := sample()
	r, err := Rebuild(New(result, src))
	if err != nil {
		t.Fatal(err)
	}
	if fs := r.Options[3].Situations[1].FS; !math.IsNaN(fs) {
		t.Errorf("an FS that is not known became %v", fs)
	}
}
