package remedies

import (
	"strings"
	"testing"

	"standfast/optimize"
)

// TestNothingCanBeBuilt: where the ground forbids the whole range of a remedy, with limits of the site or without, the reason says so and names
// what forbids it. The interceptor is asked to stand on a stratum that falls too steeply.
func TestNothingCanBeBuilt(t *testing.T) {
	j := cutting()
	r := request("interceptor", onStiffClay(), 4, 4, 0.6, 1e-6, 0)
	r.Axes[0] = optimize.Axis{Name: "depth", Min: 4, Max: 6, Step: 1}
	j.Requests = []Request{r}
	j.Situations, j.Stage = j.Situations[:1], StageSettings{}
	res, err := Study(t.Context(), j, Settings{})
	if err != nil {
		t.Fatal(err)
	}
	o := &res.Options[0]
	want := "no design of the range can be built; even depth 4.00 m breaks assumptions of the interceptor: "
	if o.Status != Infeasible || o.Binding != "assumptions of the interceptor" || !strings.HasPrefix(o.Reason, want) {
		t.Errorf("%s, bound by %q: %s", o.Status, o.Binding, o.Reason)
	}
}

// TestContradictKnowsTheSlices: a reported slip is evaluated with the slices that it was found with, however few, and with others its FS is not
// what is reported.
func TestContradictKnowsTheSlices(t *testing.T) {
	j := cutting()
	s := Settings{Slices: 6}
	o, err := Assess(t.Context(), j, s)
	if err != nil {
		t.Fatal(err)
	}
	if bad := Contradict(j, o, s); len(bad) > 0 {
		t.Errorf("%s: FS %.5f is not what was found", bad[0].Check.Label(), bad[0].FS)
	}
	if bad := Contradict(j, o, Settings{Slices: 200}); len(bad) == 0 {
		t.Error("FS with 6 or 12 slices is taken for that with 200")
	}
}
