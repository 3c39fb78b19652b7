package optimize

import (
	"context"
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

var (
	nan = math.NaN()
	inf = math.Inf(1)
)

// drawTable draws a small lattice with margins that follow no rule at all.
func drawTable(t *rapid.T) *table {
	p := &table{}
	size := 1
	for k := range rapid.IntRange(1, 3).Draw(t, "axes") {
		n := rapid.IntRange(1, 6).Draw(t, "len")
		a := Axis{Name: fmt.Sprint(k), Min: 0.3, Max: 0.3, Step: 0}
		if n > 1 {
			a.Step = 0.1
			a.Max = 0.3 + 0.1*float64(n-1)
		}
		p.axes = append(p.axes, a)
		size *= n
	}
	cuts := rapid.IntRange(1, 8).Draw(t, "cuts")
	values := [][]float64{
		{-2, -1, -0.5, 0, 0.004, 0.005, 1, 3, inf},
		{-2, 0.004, 0.005, 1, 1, 1, 2, 3, inf},
		{-2, -1, 0.004, 0.005, 1, 1, 2, nan, inf, math.Inf(-1)},
	}[rapid.IntRange(0, 2).Draw(t, "kind")]
	forbid := rapid.SampledFrom([]int{0, 5, 9, 10}).Draw(t, "forbidden tenths")
	for range size {
		p.cost = append(p.cost, float64(rapid.IntRange(-3, 9).Draw(t, "cost")))
		p.tie = append(p.tie, float64(rapid.IntRange(0, 1).Draw(t, "tie")))
		p.forbidden = append(p.forbidden, rapid.IntRange(0, 9).Draw(t, "forbidden") < forbid)
		p.margins = append(p.margins, rapid.SliceOfN(rapid.SampledFrom(values), cuts, cuts).Draw(t, "margins"))
	}
	p.hidden = make([]bool, cuts)
	// What is hidden from the search must not be needed to tell a rejected design from an unresolved one.
	if !slices.ContainsFunc(values, math.IsNaN) {
		for c := range cuts - 1 {
			p.hidden[c] = rapid.Bool().Draw(t, "hidden")
		}
	}
	return p
}

func TestMinimizeEqualsExhaustive(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawTable(t)
		allowance := rapid.SampledFrom([]float64{0, 0.005}).Draw(t, "allowance")
		var first string
		for _, workers := range []int{1, 2, 7} {
			r := p.minimize(t, Settings[int]{Workers: workers, Allowance: allowance, Seed: 3})
			checkAgainstPlain(t, p, r)
			checkWitnesses(t, p.problem(), r)
			got := fmt.Sprintf("%+v", r)
			if first == "" {
				first = got
			}
			if got != first {
				t.Fatalf("%d workers:\n%s\n1 worker:\n%s", workers, got, first)
			}
		}
	})
}

func checkAgainstPlain(t *rapid.T, p *table, r Result[int]) {
	want := p.solvePlain(r.Allowance)
	if r.Status != want.status || r.Unresolved != want.unresolved || len(r.Lattice) != want.before {
		t.Fatalf("status %v, %d unresolved, %d entries; exhaustive twin %+v", r.Status, r.Unresolved, len(r.Lattice), want)
	}
	switch r.Status {
	case Optimal:
		if p.row(r.X) != want.row || r.Cost != p.cost[want.row] {
			t.Fatalf("x %v cost %v; exhaustive twin %+v", r.X, r.Cost, want)
		}
		for _, f := range r.Lowest {
			if f.Unresolved || f.Margin != p.margins[want.row][f.Cut] || f.Margin < r.Allowance {
				t.Fatalf("answer reported with %+v", f)
			}
		}
	case Infeasible, Unresolved:
		if r.X != nil || !math.IsNaN(r.Cost) || r.Lowest != nil {
			t.Fatalf("an answer is claimed: %+v", r)
		}
		if r.Best.X == nil {
			if !math.IsInf(want.best, -1) {
				t.Fatalf("no best attempt; exhaustive twin %+v", want)
			}
			return
		}
		row := p.row(r.Best.X)
		if r.Best.Margin != want.best || p.margins[row][r.Best.Binding.Cut] != want.best || r.Best.Cost != p.cost[row] {
			t.Fatalf("best %+v; exhaustive twin %+v", r.Best, want)
		}
	case NoDesign, Interrupted:
		if r.X != nil || len(r.Lattice) != 0 {
			t.Fatalf("an answer is claimed: %+v", r)
		}
	}
}

func TestStatuses(t *testing.T) {
	tests := []struct {
		name       string
		margins    [][]float64
		forbidden  []int
		want       Status
		x          float64
		unresolved int
	}{
		{"first passes", [][]float64{{1}, {2}}, nil, Optimal, 0, 0},
		{"zero margin passes", [][]float64{{-1}, {0}}, nil, Optimal, 1, 0},
		{"missed by all cuts", [][]float64{{-1, 1}, {inf, inf}}, nil, Optimal, 1, 0},
		{"not monotone", [][]float64{{-1, 1}, {1, -1}, {2, 2}, {-1, -1}}, nil, Optimal, 2, 0},
		{"forbidden is passed over", [][]float64{{-1}, {1}, {1}}, []int{1}, Optimal, 2, 0},
		{"infeasible", [][]float64{{-1, 2}, {2, -3}}, nil, Infeasible, 0, 0},
		{"minus infinity", [][]float64{{math.Inf(-1)}}, nil, Infeasible, 0, 0},
		{"all forbidden", [][]float64{{1}, {1}}, []int{0, 1}, NoDesign, 0, 0},
		{"NaN never passes", [][]float64{{nan, 1}, {2, 2}}, nil, Optimal, 1, 1},
		{"NaN never rejects", [][]float64{{nan, 1}, {nan, -1}}, nil, Unresolved, 0, 1},
		{"rejected in spite of NaN", [][]float64{{nan, -1}}, nil, Infeasible, 0, 0},
		{"fixed design", [][]float64{{1, 2}}, nil, Optimal, 0, 0},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			p := line(tt.margins...)
			for _, i := range tt.forbidden {
				p.forbidden[i] = true
			}
			r := p.minimize(t, Settings[int]{})
			if r.Status != tt.want || r.Unresolved != tt.unresolved || r.Forbidden != len(tt.forbidden) {
				t.Fatalf("status %v, %d unresolved, %d forbidden", r.Status, r.Unresolved, r.Forbidden)
			}
			if tt.want == Optimal && r.X[0] != tt.x {
				t.Errorf("x %v, want %v", r.X, tt.x)
			}
		})
	}
}

// scripted is a design whose Search returns what it is told.
type scripted struct {
	Design[int]
	found []Found[int]
}

func (d scripted) Search(context.Context, Effort) ([]Found[int], error) { return d.found, nil }

// scriptedProblem gives every design of the table the same found cuts.
func scriptedProblem(p *table, found []Found[int]) Problem[int] {
	problem := p.problem()
	open := problem.Open
	problem.Open = func(x []float64) Design[int] { return scripted{open(x), found} }
	return problem
}

func TestUnresolvedFound(t *testing.T) {
	// A number marked unresolved neither passes, nor rejects, nor joins the pool, however good or bad it looks.
	const good, lowest, bad, absent = 3, -1, -5, 0
	tests := []struct {
		name  string
		found []Found[int]
		want  Status
		pool  int
	}{
		{"looks good", []Found[int]{{0, good, false}, {1, good, true}}, Unresolved, 0},
		{"looks bad", []Found[int]{{0, good, false}, {1, bad, true}}, Unresolved, 0},
		{"alone", []Found[int]{{1, bad, true}}, Unresolved, 0},
		{"beside a true rejection", []Found[int]{{1, bad, true}, {0, lowest, false}}, Infeasible, 1},
		{"zero value", []Found[int]{{0, absent, true}}, Unresolved, 0},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			given := slices.Clone(tt.found)
			r, err := Minimize(t.Context(), scriptedProblem(line([]float64{lowest, good}), given), Settings[int]{})
			if err != nil || r.Status != tt.want || len(r.Pool) != tt.pool {
				t.Fatalf("%+v, %v", r, err)
			}
			if r.Status == Infeasible && (r.Best.Margin != lowest || r.Best.Unresolved != 1+1) {
				t.Errorf("best %+v, want the resolved margin and the unresolved cuts of search and audit", r.Best)
			}
			if !slices.Equal(given, tt.found) {
				t.Error("the slice of the Search was changed")
			}
		})
	}
}

func TestSearchThatContradictsMargin(t *testing.T) {
	// Search says that cut 0 fails every row, Margin says that it fails none: the walk must end and accept nothing.
	p := rising(30, 0)
	r, err := Minimize(t.Context(), scriptedProblem(p, []Found[int]{{0, -1, false}}), Settings[int]{})
	if err != nil || r.Status != Infeasible || r.Spent.Searches != 30+1 { // And one without ToReject, of the best.
		t.Errorf("%v after %+v, %v", r.Status, r.Spent, err)
	}
	// Where both reject, the lower of the two is reported.
	p = line([]float64{-0.5})
	r, err = Minimize(t.Context(), scriptedProblem(p, []Found[int]{{0, -1, false}}), Settings[int]{Start: []int{0}})
	if err != nil || r.Best.Margin != -1 {
		t.Errorf("best %+v, %v", r.Best, err)
	}
}

func TestLowestHoldsSearchAndAudit(t *testing.T) {
	p := line([]float64{7, 2, 5, 9})
	p.hidden[1], p.hidden[2] = true, true
	r := p.minimize(t, Settings[int]{})
	var got []float64
	for _, f := range r.Lowest {
		got = append(got, f.Margin)
	}
	if want := []float64{2, 5, 7, 7, 9, 9}; !slices.Equal(got, want) {
		t.Errorf("margins %v, want %v", got, want)
	}
}

func TestNearCutsJoinThePool(t *testing.T) {
	p := line([]float64{4, -1, 3, inf, 1, 2}, []float64{9, 9, 9, 9, 9, 9})
	if r := p.minimize(t, Settings[int]{}); !slices.Equal(r.Pool, []int{1, 4, 5, 2}) {
		t.Errorf("pool %v, want the violating cut and the three lowest others", r.Pool)
	}
	if r := p.minimize(t, Settings[int]{FullSearches: 1}); !slices.Equal(r.Pool, []int{1}) {
		t.Errorf("pool %v, want the violating cut alone: the walk has no use for others", r.Pool)
	}
}

func TestNothingFoundIsUnresolved(t *testing.T) {
	p := line([]float64{1}, []float64{1})
	p.hidden[0] = true // the search finds nothing; only audits would
	if r := p.minimize(t, Settings[int]{}); r.Status != Unresolved || r.Unresolved != 2 || r.Spent.Audits != 0 {
		t.Errorf("%+v", r)
	}
}

func TestAuditFailureJoinsThePool(t *testing.T) {
	// Cut 1 is met by audits only. It fails rows 0 to 2: one audit finds it, then the pool rejects the others.
	p := line([]float64{1, -1}, []float64{1, -2}, []float64{1, -3}, []float64{1, 1}, []float64{1, 1})
	p.hidden[1] = true
	r := p.minimize(t, Settings[int]{})
	if r.Status != Optimal || r.X[0] != 3 {
		t.Fatalf("%+v", r)
	}
	for i, w := range r.Lattice {
		if r.Pool[w.Cut] != 1 || w.Margin != -float64(i+1) {
			t.Errorf("witness %d is %+v", i, w)
		}
	}
	if r.Spent.Audits != 2 || r.Spent.Searches != 2 {
		t.Errorf("spent %+v, want two searches and two audits", r.Spent)
	}
}

func TestAuditUsesAnotherSeed(t *testing.T) {
	p := line([]float64{1})
	var efforts []Effort
	p.onSearch = func(_ context.Context, _ int, e Effort) error {
		efforts = append(efforts, e)
		return nil
	}
	p.minimize(t, Settings[int]{Seed: 9})
	if len(efforts) != 2 || efforts[0].Audit || !efforts[1].Audit || efforts[0].Seed == efforts[1].Seed ||
		efforts[0].Round != 0 || efforts[1].Round != 1 {
		t.Errorf("efforts %+v", efforts)
	}
}

func TestAllowance(t *testing.T) {
	const allowance = 0.005
	p := line([]float64{0.004, 1}, []float64{0.004, -1}, []float64{0.005, 0.005})
	r := p.minimize(t, Settings[int]{Allowance: allowance, Start: []int{0, 1}})
	if r.Status != Optimal || r.X[0] != 2 {
		t.Fatalf("%+v", r)
	}
	// Row 0 has only a weak witness; row 1 has a strong one, which is preferred to the first that was tried.
	if r.Lattice[0].Margin != 0.004 || r.Lattice[1].Margin != -1 {
		t.Errorf("witnesses %+v", r.Lattice)
	}
}

func TestCoarsened(t *testing.T) {
	p := rising(5000, 1001)
	r := p.minimize(t, Settings[int]{MaxDesigns: 1250})
	if !r.Coarsened || r.Axes[0].Step != 4 || r.X[0] != 1004 || p.axes[0].Step != 1 {
		t.Errorf("x %v on %+v, caller's axis %+v", r.X, r.Axes, p.axes)
	}
	checkWitnesses(t, p.problem(), r)
}

func TestBestIsSearchedWithinBounds(t *testing.T) {
	// Every row has a cut of its own that only its search finds: the bounds of the others never come down.
	n := 40
	rows := make([][]float64, n)
	for i := range rows {
		rows[i] = slices.Repeat([]float64{1}, n+1)
		rows[i][i] = -10 - float64(i)
		rows[i][n] = -1
	}
	p := line(rows...)
	r := p.minimize(t, Settings[int]{Start: []int{n}, FullSearches: 5})
	if r.Status != Infeasible || r.Spent.FullySearched > 5 || r.Best.Margin != -10 || r.Best.X[0] != 0 || r.Best.Binding.Cut != 0 {
		t.Errorf("%v best %+v spent %+v", r.Status, r.Best, r.Spent)
	}
	p = line(rows...)
	if r = p.minimize(t, Settings[int]{Start: []int{n}, FullSearches: 2 * n}); r.Best.Margin != -10 {
		t.Errorf("best %+v", r.Best)
	}
}

func TestBestIsBoundedByThePool(t *testing.T) {
	// The first search, which may end with what is quick to find, brings cut 1 to light, on which row 2 is best; the pool must spare the others
	// their searches.
	p := line([]float64{-1, -9}, []float64{-1, -8}, []float64{-2, -4}, []float64{-3, -7})
	r := p.minimize(t, Settings[int]{Start: []int{0}, FullSearches: 1})
	if r.Status != Infeasible || r.Best.X[0] != 2 || r.Best.Margin != -4 || r.Spent.Searches > 3 || r.Spent.FullySearched > 1 {
		t.Errorf("best %+v, spent %+v", r.Best, r.Spent)
	}
}

func TestStatusPhrases(t *testing.T) {
	seen := map[string]bool{}
	for s := Interrupted; s <= NoDesign; s++ {
		seen[s.String()] = true
	}
	if len(seen) != 5 || Status(9).String() != "Status(9)" {
		t.Errorf("phrases %v", seen)
	}
	if (Result[int]{}).Status != Interrupted {
		t.Error("the zero result claims an answer")
	}
}

func TestValidation(t *testing.T) {
	p := Problem[int]{Axes: []Axis{
		{"a", 1, 0, 0.1}, {"b", 0, nan, 1}, {"c", 0, 1, 0}, {"d", 0, 1, -1}, {"e", 0, 1e7, 1}, {"f", 0, 1, nan},
	}}
	_, err := Minimize(t.Context(), p, Settings[int]{Workers: -1, MaxDesigns: -1, FullSearches: -1, Allowance: nan})
	if !errors.Is(err, ErrInvalid) {
		t.Fatal(err)
	}
	for _, want := range []string{
		"(a): max 0 is below min 1", "(b): max NaN", "(c): step 0", "(d): step -1", "(e): max 1e+07", "(f): step NaN",
		"no Cost", "no Open", "Workers -1", "MaxDesigns -1", "FullSearches -1", "allowance NaN",
	} {
		if !strings.Contains(err.Error(), want) {
			t.Errorf("%q is not in:\n%v", want, err)
		}
	}
	if _, err = Minimize(t.Context(), Problem[int]{}, Settings[int]{}); err == nil || !strings.Contains(err.Error(), "no axes") {
		t.Errorf("no axes: %v", err)
	}
	for _, cost := range []float64{nan, inf} {
		q := line([]float64{1})
		q.cost[0] = cost
		r, err := Minimize(t.Context(), q.problem(), Settings[int]{})
		if err == nil || r.Status != Interrupted {
			t.Errorf("cost %v: %v, %v", cost, r.Status, err)
		}
	}
}

// TestBestMayBeLeftUnaudited checks that the best attempt of an infeasible problem costs no audit when the caller makes it, and that
// BestSearches bounds its searches apart from FullSearches.
func TestBestMayBeLeftUnaudited(t *testing.T) {
	rows := make([][]float64, 20)
	for i := range rows {
		rows[i] = []float64{-float64(20 - i), -1}
	}
	audited := line(rows...).minimize(t, Settings[int]{BestSearches: 2})
	left := line(rows...).minimize(t, Settings[int]{BestSearches: 2, BestUnaudited: true})
	if audited.Status != Infeasible || left.Status != Infeasible || audited.Spent.Audits == 0 {
		t.Fatalf("%v with %d audits, %v: the case does not show what it should", audited.Status, audited.Spent.Audits, left.Status)
	}
	if left.Spent.Audits != 0 || left.Best.Margin != audited.Best.Margin {
		t.Errorf("%d audits and margin %g left to the caller, want none and %g", left.Spent.Audits, left.Best.Margin, audited.Best.Margin)
	}
}
