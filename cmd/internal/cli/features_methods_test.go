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
	if bad := remedies.Contradict(r.Job, &r.Existing, r.Settings); len(bad) > 0 {
		t.Errorf("FS of reported slips is another: %+v", bad)
	}
	r.Job.SideForce = lem.SideForce{Shape: lem.Constant}
	if bad := remedies.Contradict(r.Job, &r.Existing, r.Settings); len(bad) == 0 {
		t.Error("the function makes no difference")
	}
}

// TestFeatureJanbuCorrection: F with Janbu's factor over F without it is f0 = 1 + b1 [d/L - 1.4 (d/L)^2], d the greatest distance of the slip from its
// chord L, b1 = 0.31 without cohesion, 0.69 without friction, else 0.5 (Janbu 1973 as usually fitted, recalled from memory).
func TestFeatureJanbuCorrection(t *testing.T) {
	const tolerance = 1e-4
	for _, c := range []struct {
		name    string
		replace []string
		b1      float64
	}{
		{"loads.yaml", nil, 0.5},
		{"sand.yaml", []string{"shallower_than: 0.05", "shallower_than: 1"}, 0.31},
		{"fredlund.yaml", []string{"friction: 20}", "friction: 20}, undrained: {strength: 60}", "water: none", "water: none, strength: undrained"}, 0.69},
	} {
		_, f := assessed(t, c.name, c.replace...)
		s := f.Existing.Situations[0]
		from, to := s.Slip.From, s.Slip.To
		chord := math.Hypot(to[0]-from[0], to[1]-from[1])
		var d float64
		for _, p := range s.Slip.Points {
			d = max(d, math.Abs((p[0]-from[0])*(to[1]-from[1])-(p[1]-from[1])*(to[0]-from[0]))/chord)
		}
		if s.Slip.Kind == "circle" {
			d = s.Slip.Radius - math.Sqrt(s.Slip.Radius*s.Slip.Radius-chord*chord/4)
		}
		want := 1 + c.b1*(d/chord-1.4*d*d/chord/chord)
		got := float64(s.FSByMethod["janbu simplified"] / s.FSByMethod["janbu simplified (uncorrected)"])
		if !(math.Abs(got-want) <= tolerance) || want < 1.005 {
			t.Errorf("%s: f0 %.5f, want %.5f", c.name, got, want)
		}
	}
}
