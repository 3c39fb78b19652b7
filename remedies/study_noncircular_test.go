package remedies

import (
	"context"
	"math"
	"slices"
	"testing"

	"standfast/lem"
	"standfast/optimize"
)

// seamedBerm returns the test cutting on a thin weak seam, along which a circle cannot run, with a berm to be sized.
func seamedBerm() *Job {
	j := fencedBerm(75)
	j.Situations = []Situation{{Name: "dry", Water: dry, RequiredFS: 1, DrainsWorking: 1}}
	seam := len(j.Section.Soils)
	j.Section.Soils = append(j.Section.Soils, lem.Soil{Name: "seam", UnitWeight: 19, Friction: 12 * math.Pi / 180})
	j.Clay = append(j.Clay, false)
	top := lem.Profile{{X: 0, Y: 99}, {X: 80, Y: 99}}
	under := lem.Profile{{X: 0, Y: 98.8}, {X: 80, Y: 98.8}}
	j.Section.Strata = []lem.Stratum{{Soil: clay, Top: j.Section.Ground}, {Soil: seam, Top: top}, {Soil: stiffClay, Top: under}}
	return j
}

// lowest returns the lowest FS of a design by one method on slips of a kind.
func lowest(t *testing.T, j *Job, p *Proposal, o lem.SearchOptions, kind lem.SlipKind) float64 {
	t.Helper()
	c := &Checks(j, p)[0]
	var m lem.Model
	if err := m.Compile(c.Section, &c.Situation); err != nil {
		t.Fatal(err)
	}
	o.MinDepth = j.MinDepth
	found, err := m.Search(context.Background(), o)
	if err != nil {
		t.Fatal(err)
	}
	f := math.Inf(1)
	for _, b := range found.Basins {
		if b.Slip.Kind == kind {
			f = math.Min(f, b.Result.F)
		}
	}
	return f
}

// TestNonCircularSlipRejects forces a size that every circle passes and only a non-circular slip by Spencer's method fails, and shows that
// it is rejected, by such a slip.
func TestNonCircularSlipRejects(t *testing.T) {
	j := seamedBerm()
	x := []float64{1.5, 4, 2}
	p, err := Apply(j, j.Requests, [][]float64{append(slices.Clone(x), j.Requests[0].Fixed()[3:]...)})
	if err != nil {
		t.Fatal(err)
	}
	circles := lowest(t, j, p, lem.SearchOptions{Methods: []lem.Method{lem.Bishop, lem.Spencer}, Effort: 4}, lem.Circle)
	spencer := lowest(t, j, p, lem.SearchOptions{Methods: []lem.Method{lem.Spencer}, Polylines: true}, lem.Polyline)
	if spencer > 0.97*circles {
		t.Fatalf("FS %g on circles, %g on non-circular slips: the seam no longer shows what it should", circles, spencer)
	}
	j.Situations[0].RequiredFS = (circles + spencer) / 2
	res, err := Study(context.Background(), j, Settings{})
	if err != nil {
		t.Fatal(err)
	}
	o := &res.Options[0]
	if o.Status == MeetsTarget && o.Proposal.Quantities.Earthworks() <= p.Quantities.Earthworks() {
		t.Fatalf("sized at %v, no more than a size that fails", o.Parameters)
	}
	c := o.Certificate
	i := slices.IndexFunc(c.Witnesses, func(w Witness) bool {
		return math.Abs(w.X[0]-x[0]) < 1e-9 && math.Abs(w.X[1]-x[1]) < 1e-9
	})
	if i < 0 {
		t.Fatalf("no witness against %v among %d", x, len(c.Witnesses))
	}
	if cut := c.Pool[c.Witnesses[i].Cut]; cut.Slip.Kind != lem.Polyline || cut.Setting.Method == lem.Bishop {
		t.Errorf("rejected by %+v, want a non-circular slip", cut)
	}
	if unaudited := circlesOnlyAnswer(t, j); !(unaudited <= p.Quantities.Earthworks()) {
		t.Errorf("with circles only the answer is %g m3/m, more than a size that they pass", unaudited)
	}
}

// circlesOnlyAnswer returns the earthworks of the answer that circles alone would give.
func circlesOnlyAnswer(t *testing.T, j *Job) float64 {
	t.Helper()
	s := Settings{}.resolved()
	w, err := newWorks(j, "berm", j.Requests)
	if err != nil {
		t.Fatal(err)
	}
	z := newSizing(j, w, &s)
	open := func(x []float64) optimize.Design[Cut] { return circular{z.openProposal(w.apply(j, x))} }
	res, err := optimize.Minimize(t.Context(), optimize.Problem[Cut]{Axes: w.axes, Cost: z.cost, Open: open}, optimize.Settings[Cut]{Allowance: s.Allowance})
	if err != nil || res.Status != optimize.Optimal {
		t.Fatalf("%v, %v", res.Status, err)
	}
	return res.Cost
}

// circular is a design whose searches look at circles only and whose audits look at nothing.
type circular struct{ *design }

func (c circular) Search(ctx context.Context, e optimize.Effort) ([]optimize.Found[Cut], error) {
	if e.Audit {
		return []optimize.Found[Cut]{{Margin: math.Inf(1)}}, nil
	}
	return c.searchAll(ctx, e, false)
}
