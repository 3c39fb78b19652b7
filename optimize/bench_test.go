package optimize

import (
	"context"
	"testing"
)

// BenchmarkWalk rejects 100,000 designs by a pool of 20 cuts, of which a different one rejects each stretch of the walk.
func BenchmarkWalk(b *testing.B) {
	const designs, cuts, stretch = 100_000, 20, 37
	rows := make([][]float64, designs+1)
	flat := make([]float64, (designs+1)*cuts)
	for i := range rows {
		rows[i] = flat[i*cuts : (i+1)*cuts]
		for c := range rows[i] {
			rows[i][c] = 1
		}
		if i < designs {
			rows[i][i/stretch%cuts] = -1
		}
	}
	p := line(rows...)
	start := make([]int, cuts)
	for c := range start {
		start[c] = c
	}
	b.ReportAllocs()
	for b.Loop() {
		r, err := Minimize(context.Background(), p.problem(), Settings[int]{Start: start, FullSearches: 1})
		if err != nil || r.Status != Optimal || len(r.Lattice) != designs {
			b.Fatal(r.Status, err)
		}
	}
}

// BenchmarkExchange solves a whole problem with three parameters, where the master and the searches dominate.
func BenchmarkExchange(b *testing.B) {
	all := intervals()
	p := all[len(all)-1]
	b.ReportAllocs()
	for b.Loop() {
		if r, err := Minimize(context.Background(), p.problem(), Settings[float64]{}); err != nil || r.Status != Optimal {
			b.Fatal(r.Status, err)
		}
	}
}
