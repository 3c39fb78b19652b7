package remedies

import (
	"context"
	"errors"
	"math"
	"strings"
	"testing"

	"standfast/lem"
	"standfast/optimize"
)

// fencedBerm returns the test cutting with one dry situation and a berm whose foot a fence holds back.
func fencedBerm(fence float64) *Job {
	j := cutting()
	j.Situations = j.Situations[:1]
	j.Situations[0].RequiredFS = 1.15
	j.Stage.Given = false
	j.Limits.Right = &Fence{Name: "toe fence", X: fence}
	j.Requests = []Request{{
		Kind: "berm",
		Axes: []optimize.Axis{{Name: "height", Min: 0.5, Max: 3, Step: 0.5}, {Name: "top_width", Min: 2, Max: 6, Step: 0.5}, {Name: "batter", Min: 2, Max: 2}},
		Soils: map[string]int{
			"fill": sandFill,
		},
	}}
	k, _ := Find("berm")
	r := DefaultRequest(&k)
	for i, a := range r.Axes {
		if a.Name != "" && i < len(j.Requests[0].Axes) && j.Requests[0].Axes[i].Name == a.Name {
			r.Axes[i] = j.Requests[0].Axes[i]
		}
	}
	r.Soils = j.Requests[0].Soils
	j.Requests[0] = r
	return j
}

// TestRelaxationIsTheAnswerOfTheMovedLimit checks what moving a limit is said to save against the study of the job with the limit moved.
func TestRelaxationIsTheAnswerOfTheMovedLimit(t *testing.T) {
	j := fencedBerm(53.5)
	res, err := Study(context.Background(), j, Settings{Relaxations: true})
	if err != nil {
		t.Fatal(err)
	}
	o := &res.Options[0]
	moved, err := Study(context.Background(), fencedBerm(54.5), Settings{})
	if err != nil {
		t.Fatal(err)
	}
	if o.Status != MeetsTarget || moved.Options[0].Status != MeetsTarget {
		t.Fatalf("%s; moved: %s: the case no longer shows what it should", o.Reason, moved.Options[0].Reason)
	}
	a, b := o.Proposal.Quantities.Earthworks(), moved.Options[0].Proposal.Quantities.Earthworks()
	if b >= a {
		t.Fatalf("earthworks %g at the fence, %g with it moved: the fence does not bind", a, b)
	}
	if len(o.Relaxations) != 1 || o.Relaxations[0].Limit != "toe fence" || math.Abs(o.Relaxations[0].Saves-(a-b)) > 1e-12 {
		t.Errorf("relaxations %+v, want the toe fence to save %g", o.Relaxations, a-b)
	}
}

// TestSensitivityTurnsTheRightWay checks that weaker soil and higher water lower the FS, and that an input that does not come into it has no
// bar.
func TestSensitivityTurnsTheRightWay(t *testing.T) {
	j := cutting()
	j.Situations = j.Situations[:1]
	j.Swings = Swings{Cohesion: 0.2, Friction: 0.03, Undrained: 0.2, Water: 0.5, DrainsEffect: 0.3}
	res, err := Study(context.Background(), j, Settings{Sensitivity: true})
	if err != nil {
		t.Fatal(err)
	}
	want := map[string]float64{"effective cohesion": 1, "effective angle of friction": 1, "water level": -1}
	if len(res.Existing.Sensitivity) != len(want) {
		t.Fatalf("bars %+v, want those of %v only", res.Existing.Sensitivity, want)
	}
	for _, b := range res.Existing.Sensitivity {
		if sign := want[b.Input]; !(sign*(b.High-b.Base) > 0 && sign*(b.Base-b.Low) > 0) {
			t.Errorf("%s: FS %g low, %g as given, %g high", b.Input, b.Low, b.Base, b.High)
		}
	}
}

// TestObjectiveNeedsRates checks that a blank rate is an error and not a price of nothing, and that rates change what is least.
func TestObjectiveNeedsRates(t *testing.T) {
	j := fencedBerm(70)
	j.Objective = LeastCost
	if _, err := Study(context.Background(), j, Settings{}); !errors.Is(err, ErrBlankRate) || !strings.Contains(err.Error(), "toe berm needs strip, bench_step, import") {
		t.Fatalf("a study by cost without rates: %v", err)
	}
	j.Economics.Cost = Factors{Work: map[Work]float64{Import: 10, Strip: 0, Dispose: 0, Excavate: 0, Place: 0, Benching: 0}}
	j.Economics.BenchStep = 0.5
	res, err := Study(context.Background(), j, Settings{})
	if err != nil {
		t.Fatal(err)
	}
	q := &res.Options[0].Proposal.Quantities
	near(t, "cost", Cost(j, q), 10*q.Earthworks()*j.Length, 1e-9)
	delete(j.Economics.Cost.Work, Excavate)
	unload, _ := Find("unload")
	j.Trials = []Trial{{Name: "own", Requests: []Request{DefaultRequest(&unload)}}}
	if _, err := Study(context.Background(), j, Settings{}); !errors.Is(err, ErrBlankRate) || !strings.Contains(err.Error(), "unload the head needs cut") {
		t.Errorf("a trial without a price, which has no rank: %v", err)
	}
	for _, name := range Objectives() {
		if o, ok := ParseObjective(name); !ok || o.String() != name {
			t.Errorf("objective %q does not come back", name)
		}
	}
}

// TestRemarks checks the closed form for a cohesionless face, tan(phi')/tan(beta) (infinite slope), and the warning of a slip that ends at
// the edge of the section.
func TestRemarks(t *testing.T) {
	j := fencedBerm(70)
	p, err := Apply(j, j.Requests, [][]float64{j.Requests[0].Fixed()})
	if err != nil {
		t.Fatal(err)
	}
	o := &Option{Proposal: p, Situations: []Outcome{{Check: Check{Name: "high water"}, FS: 1.2, From: lem.Point{X: 1}, To: lem.Point{X: 60}}}}
	// tan 0.61 rad at 1V:2H: 0.69892 x 2 = 1.39784.
	want := []string{"section too short: the slip that governs high water ends within 1.60 m", "at 1V:2.0H: FS 1.397 for shallow slips"}
	got := j.remarks(o)
	if len(got) != len(want) {
		t.Fatalf("remarks %q", got)
	}
	for i := range want {
		if !strings.Contains(got[i], want[i]) {
			t.Errorf("remark %q, want %q in it", got[i], want[i])
		}
	}
}
