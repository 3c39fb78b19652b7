package remedies_test

import (
	"cmp"
	"fmt"
	"math"
	"os"
	"slices"
	"testing"

	"standfast/lem"
	"standfast/optimize"
	"standfast/remedies"
)

// drainedBank returns the invented bank, wetter, with a berm and drilled drains to be sized together, on a lattice of 9 designs; of 24 in the
// long run.
func drainedBank() *remedies.Job {
	height, length := optimize.Axis{Min: 1, Max: 2, Step: 0.5}, optimize.Axis{Name: "length", Min: 14, Max: 14}
	if os.Getenv("STANDFAST_LONG") != "" {
		height.Min, length = 0.5, optimize.Axis{Name: "length", Min: 8, Max: 14, Step: 6}
	}
	j := bankCase{height: height, width: optimize.Axis{Min: 3, Max: 3}}.job()
	j.Stage = remedies.StageSettings{}
	j.Situations[0].RequiredFS = 1.1
	j.Waters[0].Line = lem.Profile{{X: 0, Y: 15.6}, {X: 20, Y: 14.8}, {X: 32, Y: 10}, {X: 60, Y: 9.7}}
	kind, _ := remedies.Find("drilled_drains")
	drains := remedies.DefaultRequest(&kind)
	for i, p := range kind.Parameters {
		for _, a := range []optimize.Axis{
			length,
			{Name: "spacing", Min: 3, Max: 9, Step: 3},
			{Name: "permeability", Min: 1e-6, Max: 1e-6},
			{Name: "recharge", Min: 1e-7, Max: 1e-7},
		} {
			if a.Name == p.Name {
				drains.Axes[i] = a
			}
		}
	}
	j.Requests = append(j.Requests, drains)
	return j
}

// everyDesign returns the pair of the job at every design of its lattice as trials of their own.
func everyDesign(j *remedies.Job) []remedies.Trial {
	var axes []optimize.Axis
	for _, r := range j.Requests {
		axes = append(axes, r.Axes...)
	}
	designs := 1
	for _, a := range axes {
		designs *= a.Len()
	}
	var out []remedies.Trial
	for i := range designs {
		x := optimize.Point(axes, i)
		t := remedies.Trial{Name: fmt.Sprint(i)}
		for _, r := range j.Requests {
			r.Axes = append([]optimize.Axis(nil), r.Axes...)
			for k := range r.Axes {
				if r.Axes[k].Name != "" {
					r.Axes[k] = optimize.Axis{Name: r.Axes[k].Name, Min: x[k], Max: x[k]}
				}
			}
			x = x[len(r.Axes):]
			t.Requests = append(t.Requests, r)
		}
		out = append(out, t)
	}
	return out
}

// TestFrontAgainstEveryDesign compares the front of a pair with the designs of its lattice, each searched and audited by itself as works of the
// user's own: those that stand and that no other betters in earthworks or metres of drain without being worse in the other.
func TestFrontAgainstEveryDesign(t *testing.T) {
	j := drainedBank()
	j.Combinations, j.Trials = [][]string{{"berm", "drilled_drains"}}, everyDesign(j)
	r, err := remedies.Study(t.Context(), j, remedies.Settings{Fronts: true, Slices: 12})
	if err != nil {
		t.Fatal(err)
	}
	const clear = 0.003 // Of FS: a design nearer to what is asked may pass one search and fail another.
	var front *remedies.Front
	var stand [][2]float64
	for _, o := range r.Options {
		q := &o.Proposal.Quantities
		switch {
		case o.Front != nil:
			front = o.Front
		case !o.Trial:
		case o.Status == remedies.MeetsTarget:
			stand = append(stand, [2]float64{q.Earthworks(), q.Drain})
		}
		if g := o.Governing(); o.Trial && math.Abs(g.Margin()-remedies.DefaultAllowance) < clear {
			t.Fatalf("design %s has FS %.4f: too near to %.2f to tell by", o.Name, g.FS, g.Check.Required)
		}
	}
	var want [][2]float64
	for _, a := range stand {
		bettered := slices.ContainsFunc(stand, func(b [2]float64) bool { return b[0] <= a[0] && b[1] <= a[1] && b != a })
		if !bettered && !slices.Contains(want, a) {
			want = append(want, a)
		}
	}
	slices.SortFunc(want, func(a, b [2]float64) int { return cmp.Compare(a[0], b[0]) })
	if front == nil || len(want) < 3 {
		t.Fatalf("front %v, %d designs not bettered: the case no longer shows what it should", front, len(want))
	}
	var got [][2]float64
	for i, p := range front.Points {
		got = append(got, [2]float64{p.Earthworks, p.Drain})
		g := p.Governing()
		if g == nil || g.Margin() < remedies.DefaultAllowance || p.Answer != (i == 0) || len(p.Parameters) == 0 || p.Proposal.Quantities.Drain != p.Drain {
			t.Errorf("point %d: %+v governed by %+v", i, p, g)
		}
	}
	if !slices.Equal(got, want) || !front.Whole || front.Unresolved > 0 || front.Searches == 0 {
		t.Errorf("front %v, want %v; whole %v, %d unresolved, %d searches", got, want, front.Whole, front.Unresolved, front.Searches)
	}
}
