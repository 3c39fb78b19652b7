package lem

import (
	"context"
	"math"
	"testing"
)

// lowestCircle returns the lowest F of a circle by Bishop.
func lowestCircle(t testing.TB, m *Model, o SearchOptions) float64 {
	t.Helper()
	o.Methods, o.MinDepth = []Method{Bishop}, 1
	found, err := m.Search(context.Background(), o)
	if err != nil {
		t.Fatal(err)
	}
	for _, b := range found.Basins {
		if b.Slip.Kind == Circle {
			return b.Result.F
		}
	}
	return math.Inf(1)
}

// TestDefaultSearchAgainstLongOnes: on invented sections the default search finds what searches of eight times the effort, with another seed and by
// the other sampler, find to 0.5 %, the allowance for a finite search.
func TestDefaultSearchAgainstLongOnes(t *testing.T) {
	for seed := range uint64(8) {
		s, sit, _ := inventedSection(seed)
		m := compiled(t, s, sit)
		got := lowestCircle(t, m, SearchOptions{})
		long := min(lowestCircle(t, m, SearchOptions{Effort: 8, Seed: 99}), lowestCircle(t, m, SearchOptions{Effort: 4, Seed: 98, Sampler: ByCentre}))
		if got > long*1.005 || math.IsInf(long, 1) {
			t.Errorf("section %d: F = %.4f, long searches find %.4f", seed, got, long)
		}
	}
}

// TestHowThorough measures searches for the lowest circle against the lowest of two of eight times the effort by both samplers; in its long form it
// prints the table of docs/theory.md.
func TestHowThorough(t *testing.T) {
	sections := uint64(5)
	if longRun() {
		sections = 60
	}
	rows := []struct {
		name string
		o    SearchOptions
		most float64
	}{
		{"by daylight, effort 0.5", SearchOptions{Effort: 0.5}, math.Inf(1)},
		{"by daylight, effort 1", SearchOptions{}, 0.003},
		{"by daylight, effort 2", SearchOptions{Effort: 2}, 0.003},
		{"by centre, effort 1", SearchOptions{Sampler: ByCentre}, math.Inf(1)},
	}
	miss := make([][]float64, len(rows))
	trials := make([]int, len(rows))
	for seed := range sections {
		s, sit, _ := inventedSection(seed)
		m := compiled(t, s, sit)
		long := min(lowestCircle(t, m, SearchOptions{Effort: 8, Seed: 99}), lowestCircle(t, m, SearchOptions{Effort: 8, Seed: 98, Sampler: ByCentre}))
		for i, row := range rows {
			row.o.Methods, row.o.MinDepth = []Method{Bishop}, 1
			found, err := m.Search(context.Background(), row.o)
			if err != nil {
				t.Fatal(err)
			}
			f := found.Basins[0].Result.F
			miss[i] = append(miss[i], f/long-1)
			trials[i] += found.Trials
			if f > long*(1+row.most) {
				t.Errorf("section %d, %s: F = %.4f, long searches find %.4f", seed, row.name, f, long)
			}
		}
	}
	for i, row := range rows {
		t.Logf("%s: too high by %s; %d evaluations", row.name, spread(miss[i]), trials[i]/int(sections))
	}
}

// TestSearchRepeats: the same model, options and seed give the same minima to the last bit; a search leaves nothing behind in the model.
func TestSearchRepeats(t *testing.T) {
	s, sit := benchSection(3)
	m := compiled(t, s, sit)
	for _, sampler := range []Sampler{ByDaylight, ByCentre} {
		o := SearchOptions{MinDepth: 1, Seed: 5, Sampler: sampler}
		a, err := m.Search(context.Background(), o)
		if err != nil {
			t.Fatal(err)
		}
		b, err := m.Search(context.Background(), o)
		if err != nil {
			t.Fatal(err)
		}
		if len(a.Basins) != len(b.Basins) || a.Trials != b.Trials {
			t.Fatalf("sampler %d: %d basins of %d trials, then %d of %d", sampler, len(a.Basins), a.Trials, len(b.Basins), b.Trials)
		}
		for i := range a.Basins {
			if a.Basins[i].Result.F != b.Basins[i].Result.F {
				t.Errorf("sampler %d, basin %d: F = %v, then %v", sampler, i, a.Basins[i].Result.F, b.Basins[i].Result.F)
			}
			if i > 0 && a.Basins[i].Result.F < a.Basins[i-1].Result.F {
				t.Errorf("sampler %d: basin %d is lower than the one before", sampler, i)
			}
		}
	}
}

// TestSearchStopsWhenAsked: a search whose context has ended says so.
func TestSearchStopsWhenAsked(t *testing.T) {
	s, sit := benchSection(3)
	m := compiled(t, s, sit)
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	if _, err := m.Search(ctx, SearchOptions{}); err == nil {
		t.Error("no error from a search whose context has ended")
	}
}

// TestBasinsAnswerAsFound: evaluating a basin's slip again with its setting gives its result, so that others can check it.
func TestBasinsAnswerAsFound(t *testing.T) {
	s, sit := benchSection(3)
	m := compiled(t, s, sit)
	found, err := m.Search(context.Background(), SearchOptions{MinDepth: 1})
	if err != nil {
		t.Fatal(err)
	}
	var ws Workspace
	for i, b := range found.Basins {
		if r := m.FS(&ws, &b.Slip, b.Setting); r.Status != Converged || r.F != b.Result.F {
			t.Errorf("basin %d: F = %v (%v), found as %v", i, r.F, r.Status, b.Result.F)
		}
		if b.Result.Depth < 1 {
			t.Errorf("basin %d is %.3f m deep, less than asked for", i, b.Result.Depth)
		}
	}
}
