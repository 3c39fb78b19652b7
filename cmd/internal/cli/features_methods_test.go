package cli

import (
	"encoding/json"
	"math"
	"path/filepath"
	"testing"

	"standfast/lem"
	"standfast/remedies"
)

const sideForces = "side_force_function: constant"

// TestFeatureSideForces: a constant function is Spencer's method (Spencer 1967, Geotechnique 17; Morgenstern and Price 1965, Geotechnique 15), to
// the last digit; with any function a stranger finds the same F on the slip that is reported.
func TestFeatureSideForces(t *testing.T) {
	for _, c := range []struct {
		name, function string
		same           bool // F as by Spencer's method.
	}{
		{"constant", sideForces, true},
		{"eleven times the same", "side_force_function: [3, 3, 3, 3, 3, 3, 3, 3, 3, 3, 3]", true},
		{"left out", "", false},
		{"given", "side_force_function: [0.2, 0.9, 1, 1, 1, 1, 1, 1, 0.6, 0.3, 0.1]", false},
	} {
		t.Run(c.name, func(t *testing.T) {
			_, f := assessed(t, "side-forces.yaml", sideForces, c.function)
			raw, err := json.Marshal(f)
			if err != nil {
				t.Fatal(err)
			}
			theirs := new(theirFile)
			if err := json.Unmarshal(raw, theirs); err != nil {
				t.Fatal(err)
			}
			gs, answers := strangers(theirs, &theirs.Existing)
			if !c.same {
				if gs[1].compare(t, answers[1].Name, answers[1], false) != 2 {
					t.Error("not compared by both methods")
				}
			}
			for _, a := range answers {
				if a.Slip.Kind != "polyline" {
					t.Errorf("%s: the slip is a %s", a.Name, a.Slip.Kind)
				}
				price, spencer := a.ByMethod["morgenstern-price"], a.ByMethod["spencer"]
				if off := math.Abs(price-spencer) / spencer; c.same && off > 1e-9 || !c.same && off < 0.005 {
					t.Errorf("%s: FS %.6f by Morgenstern-Price, %.6f by Spencer", a.Name, price, spencer)
				}
				if sideForces == c.function && price != spencer {
					t.Errorf("%s: FS %v by Morgenstern-Price, %v by Spencer", a.Name, price, spencer)
				}
			}
		})
	}
}

// TestFeatureSideForcesAreKept: the works sized with a function are audited, replayed and searched anew with it.
func TestFeatureSideForcesAreKept(t *testing.T) {
	given := lem.SideForce{Shape: lem.Given, Ordinates: [lem.SideOrdinates]float64{1, 0.9, 0.8, 0.7, 0.6, 0.5, 0.4, 0.3, 0.2, 0.1, 0.05}}
	read, err := readCase(filepath.Join(featureCases, "side-forces.yaml"))
	if err != nil {
		t.Fatal(err)
	}
	read.Job.SideForce = given
	r, err := remedies.Study(t.Context(), read.Job, remedies.Settings{})
	if err != nil {
		t.Fatal(err)
	}
	cuts := 0
	for i := range r.Options {
		for _, c := range r.Options[i].Certificate.Pool {
			if cuts++; c.Setting.SideForce != given {
				t.Fatalf("a cut was found with another function: %+v", c.Setting)
			}
		}
	}
	if cuts == 0 {
		t.Error("no cuts")
	}
	if bad := remedies.Contradict(r.Job, &r.Existing); len(bad) > 0 {
		t.Errorf("FS of reported slips is another: %+v", bad)
	}
	r.Job.SideForce = lem.SideForce{Shape: lem.Constant}
	if bad := remedies.Contradict(r.Job, &r.Existing); len(bad) == 0 {
		t.Error("the function makes no difference")
	}
}
