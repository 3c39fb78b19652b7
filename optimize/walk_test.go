package optimize

import (
	"context"
	"math"
	"slices"
	"testing"
)

func TestUnresolvedIsRetriedOnLaterCuts(t *testing.T) {
	// The search of row 0 misses cut 1 and sees no margin for cut 0; row 1 brings cut 1 to light.
	p := line([]float64{nan, -1}, []float64{1, -1}, []float64{1, 1})
	problem := p.problem()
	open := problem.Open
	problem.Open = func(x []float64) Design[int] { return blindDesign{open(x), p.row(x) == 0} }
	r, err := Minimize(t.Context(), problem, Settings[int]{FullSearches: 1})
	if err != nil || r.Status != Optimal || r.X[0] != 2 || r.Unresolved != 0 || r.Lattice[0].Margin != -1 {
		t.Errorf("%+v, %v", r, err)
	}
}

type blindDesign struct {
	Design[int]
	blind bool
}

func (d blindDesign) Search(ctx context.Context, e Effort) ([]Found[int], error) {
	found, err := d.Design.Search(ctx, e)
	if d.blind {
		found = found[:1]
	}
	return found, err
}

// rising has n rows of which the first fail on one cut and the rest pass.
func rising(n, fail int) *table {
	rows := make([][]float64, n)
	for i := range rows {
		rows[i] = []float64{float64(i-fail) + 0.5}
	}
	return line(rows...)
}

func TestLittleIsWastedBehindTheAnswer(t *testing.T) {
	p := rising(5000, 0)
	if r := p.minimize(t, Settings[int]{Workers: 7}); r.Spent.DesignsOpened > 20 || r.Spent.FullySearched != 1 || r.Spent.ExchangeSearched != 1 {
		t.Errorf("first design passes: spent %+v", r.Spent)
	}
	p = rising(5000, 1000)
	r := p.minimize(t, Settings[int]{Workers: 7, FullSearches: 1})
	if r.X[0] != 1000 || r.Spent.DesignsOpened > 1000+largestBatch+8 || r.Spent.FullySearched != 2 || r.Spent.ExchangeSearched != 0 {
		t.Errorf("x %v, spent %+v", r.X, r.Spent)
	}
}

func TestSmallBatchesWhereThePoolFails(t *testing.T) {
	// Rows 1000 to 1040 pass the pool and fail their searches, each on a cut of its own: no more than the smallest batch
	// may be opened behind the answer, row 1041.
	const first, answer = 1000, 1041
	p := rising(2000, first)
	for i := range p.margins {
		own := slices.Repeat([]float64{1}, answer-first)
		if i >= first && i < answer {
			own[i-first] = -1
		}
		p.margins[i] = append(p.margins[i], own...)
	}
	p.hidden = make([]bool, 1+answer-first)
	r := p.minimize(t, Settings[int]{FullSearches: 1, Start: []int{0}})
	searched := answer - first + 1
	if r.X[0] != answer || r.Spent.Searches != searched || r.Spent.DesignsOpened > answer+searched+smallestBatch {
		t.Errorf("x %v, spent %+v", r.X, r.Spent)
	}
}

func TestLatestRejectingCutIsTriedFirst(t *testing.T) {
	const designs, cuts = 2000, 20
	rows := make([][]float64, designs+1)
	start := make([]int, cuts)
	for c := range start {
		start[c] = c
	}
	for i := range rows {
		rows[i] = slices.Repeat([]float64{1}, cuts)
		if i < designs {
			rows[i][i*cuts/designs] = -1
		}
	}
	r := line(rows...).minimize(t, Settings[int]{Start: start, FullSearches: 1})
	// Where the cut changes, one batch at most tries the wrong order.
	if most := designs + (cuts+1)*largestBatch*cuts/2; r.Spent.MarginEvaluations > most {
		t.Errorf("%d margins evaluated, want at most %d", r.Spent.MarginEvaluations, most)
	}
}

func TestFarCheaperThanSearchingAll(t *testing.T) {
	r := rising(5000, 1000).minimize(t, Settings[int]{})
	if r.X[0] != 1000 || r.Spent.Searches > 3 || math.Abs(r.ContinuousEstimate-1000) > 1 {
		t.Errorf("x %v, estimate %v, spent %+v", r.X, r.ContinuousEstimate, r.Spent)
	}
}
