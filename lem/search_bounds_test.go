package lem

import (
	"context"
	"fmt"
	"math"
	"slices"
	"testing"
)

// bermOnClay is an invented bank of undrained clay, 6 m high at 1V:2H, with a frictional berm at its toe. Its lowest slips are held by two
// bounds at once: the depth of interest, and the ends of the berm, where clay takes the place of fill and F jumps.
type bermOnClay struct{ cu, height, width, batter, friction float64 }

// bermsOnClay draws such banks; the first is that of which searches once found anything between 1.726 and 1.889.
func bermsOnClay(n int) []bermOnClay {
	cs := []bermOnClay{{45, 2.5, 2, 2, 36}}
	q := sequenceOf(7)
	for k := range n - 1 {
		u, v := q.at(2*k), q.at(2*k+1)
		b := bermOnClay{40 + 30*u[0], 2 + u[1], 2, 2, 34 + 4*v[1]}
		if k%2 == 1 { // Near by.
			b.width, b.batter = 1.9+0.2*u[2], 1.95+0.1*v[0]
		}
		cs = append(cs, b)
	}
	return cs
}

// section draws the bank facing right, or mirrored.
func (b bermOnClay) section(mirrored bool) *Section {
	before := Profile{{0, 16.2}, {20, 16}, {32, 10}, {60, 9.8}}
	top := 10 + b.height
	inner := profileX(before, top)
	outer := inner + b.width
	// The batter runs down to the ground beyond the toe.
	const fall = 0.2 / 28
	toe := (top + outer/b.batter - 10 - 32*fall) / (1/b.batter - fall)
	low := 10 - (toe-32)*fall
	ground := Profile{{0, 16.2}, {20, 16}, {inner, top}, {outer, top}, {toe, low}, {60, 9.8}}
	body := []Point{{inner, top}, {outer, top}, {toe, low}, {32, 10}}
	load := Surcharge{FromX: 8, ToX: 12, Pressure: 5}
	if mirrored {
		flip := func(ps []Point) {
			for i := range ps {
				ps[i].X = -ps[i].X
			}
			slices.Reverse(ps)
		}
		flip(before)
		flip(ground)
		flip(body)
		load.FromX, load.ToX = -12, -8
	}
	return &Section{
		Ground: ground,
		Soils: []Soil{
			{UnitWeight: 19, Undrained: &UndrainedStrength{Strength: b.cu}},
			{UnitWeight: 19.5, Friction: b.friction * degree},
		},
		Strata: []Stratum{{0, before}},
		Placed: []Body{{1, body}},
		Loads:  []Surcharge{load},
	}
}

// TestSearchHeldByBounds: whatever the seed and the facing, the search finds the same lowest F on slips held by the depth of interest, by a boundary
// to stronger soil, or both, and nothing higher than long searches by the other sampler find. The allowance is a fifth of that of the sizing.
func TestSearchHeldByBounds(t *testing.T) {
	const tol = 1e-3
	type bank struct {
		name   string
		models []*Model
	}
	var banks []bank
	for i, b := range bermsOnClay(11) {
		sit := &Situation{Undrained: []bool{true, false}}
		banks = append(banks, bank{fmt.Sprintf("berm %d", i), []*Model{compiled(t, b.section(false), sit), compiled(t, b.section(true), sit)}})
	}
	for _, k := range []uint64{6, 21} { // Held by a boundary alone.
		s, sit, _ := inventedSection(k)
		banks = append(banks, bank{fmt.Sprintf("section %d", k), []*Model{compiled(t, s, sit)}})
	}
	for _, b := range banks {
		lowest, highest := math.Inf(1), 0.0
		search := func(m *Model, o SearchOptions) float64 {
			o.MinDepth = 1
			found, err := m.Search(context.Background(), o)
			if err != nil {
				t.Fatal(err)
			}
			return found.Basins[0].Result.F
		}
		for _, m := range b.models {
			for seed := range uint64(6) {
				f := search(m, SearchOptions{Seed: seed})
				lowest, highest = min(lowest, f), max(highest, f)
			}
		}
		other := search(b.models[0], SearchOptions{Seed: 50, Effort: 2, Sampler: ByCentre})
		if highest > (1+tol)*min(lowest, other) {
			t.Errorf("%s: F is %.4f to %.4f, by centre %.4f", b.name, lowest, highest, other)
		}
	}
}
