package optimize

import (
	"context"
	"errors"
	"fmt"
	"strings"
	"sync/atomic"
	"testing"
)

// squares is a two-parameter table, so that the master runs gonum's methods.
func squares(n, fail int) *table {
	p := rising(n*n, fail)
	p.axes = []Axis{{"a", 0, float64(n - 1), 1}, {"b", 0, float64(n - 1), 1}}
	return p
}

func TestInterrupt(t *testing.T) {
	// The context ends at the k-th margin, from the master's first evaluations to the end of the walk.
	for _, workers := range []int{1, 7} {
		for _, k := range []int64{1, 100, 300, 1000, 1500, 2500} {
			t.Run(fmt.Sprintf("%d workers, margin %d", workers, k), func(t *testing.T) {
				ctx, cancel := context.WithCancel(t.Context())
				defer cancel()
				p := squares(60, 3600)
				var calls atomic.Int64
				p.onMargin = func(int) {
					if calls.Add(1) == k {
						cancel()
					}
				}
				r, err := Minimize(ctx, p.problem(), Settings[int]{Workers: workers})
				if !errors.Is(err, context.Canceled) || r.Status != Interrupted || r.X != nil {
					t.Errorf("status %v, x %v, error %v", r.Status, r.X, err)
				}
				if after := calls.Load() - k; after > int64(workers) {
					t.Errorf("%d margins after the context ended", after)
				}
				p.checkClosed(t)
			})
		}
	}
}

func TestInterruptBeforeStart(t *testing.T) {
	ctx, cancel := context.WithCancel(t.Context())
	cancel()
	p := rising(10, 5)
	if r, err := Minimize(ctx, p.problem(), Settings[int]{}); !errors.Is(err, context.Canceled) || r.Status != Interrupted {
		t.Errorf("%v, %v", r.Status, err)
	}
	if p.opened.Load() != 0 {
		t.Error("designs were opened")
	}
}

func TestInterruptDuringSearch(t *testing.T) {
	ctx, cancel := context.WithCancel(t.Context())
	p := rising(10, 5)
	p.onSearch = func(ctx context.Context, row int, _ Effort) error {
		if row > 0 {
			cancel()
			<-ctx.Done()
		}
		return nil
	}
	r, err := Minimize(ctx, p.problem(), Settings[int]{FullSearches: 1})
	if !errors.Is(err, context.Canceled) || r.Status != Interrupted || r.X != nil {
		t.Errorf("%+v, %v", r, err)
	}
	p.checkClosed(t)
}

func TestSearchErrorIsWrapped(t *testing.T) {
	boom := errors.New("boom")
	p := rising(10, 5)
	p.onSearch = func(context.Context, int, Effort) error { return boom }
	r, err := Minimize(t.Context(), p.problem(), Settings[int]{})
	if !errors.Is(err, boom) || r.Status != Interrupted || !strings.Contains(err.Error(), "design [0]") {
		t.Errorf("%v, %v", r.Status, err)
	}
	p.checkClosed(t)
}

func TestPanicsReachTheCaller(t *testing.T) {
	for _, workers := range []int{1, 7} {
		for _, k := range []int64{1, 100, 1500} {
			t.Run(fmt.Sprintf("%d workers, margin %d", workers, k), func(t *testing.T) {
				p := squares(60, 3600)
				var calls atomic.Int64
				p.onMargin = func(int) {
					if calls.Add(1) == k {
						panic("boom in a margin")
					}
				}
				defer func() {
					if v := recover(); v == nil || !strings.Contains(fmt.Sprint(v), "boom in a margin") {
						t.Errorf("recovered %v", v)
					}
					p.checkClosed(t)
				}()
				_, err := Minimize(t.Context(), p.problem(), Settings[int]{Workers: workers})
				t.Errorf("returned with error %v", err)
			})
		}
	}
}

func TestProgress(t *testing.T) {
	var got []Progress
	r := rising(500, 100).minimize(t, Settings[int]{Progress: func(p Progress) { got = append(got, p) }})
	if len(got) < 2 || r.Status != Optimal {
		t.Fatalf("%v after %d reports", r.Status, len(got))
	}
	phase := Exchanging
	for _, p := range got {
		if p.Phase < phase || p.Designs != 500 || p.Done > p.Designs || p.Phase.String() == "" {
			t.Errorf("report %+v after phase %v", p, phase)
		}
		phase = p.Phase
	}
}
