package remedies

import (
	"cmp"
	"context"
	"math"
	"slices"
	"testing"

	"pgregory.net/rapid"

	"standfast/optimize"
)

// grid is a lattice of designs whose margins at every cut stand in a table. A search finds all cuts but those that are hidden from it.
type grid struct {
	f       *frontier[int]
	margins [][]float64 // By design and cut.
	hidden  [][]bool
}

// gridDesign is a design of a grid.
type gridDesign struct {
	g *grid
	i int
}

func (d gridDesign) Margin(c *int) float64 { return d.g.margins[d.i][*c] }
func (d gridDesign) Close()                {}
func (d gridDesign) Search(context.Context, optimize.Effort) ([]optimize.Found[int], error) {
	out := []optimize.Found[int]{{Margin: math.Inf(1)}}
	for c, m := range d.g.margins[d.i] {
		if !d.g.hidden[d.i][c] {
			out = append(out, optimize.Found[int]{Cut: c, Margin: m})
		}
	}
	return out, nil
}

// newGrid draws a lattice whose FS rises with works and drains, roughly, and sizes its answer.
func newGrid(t *rapid.T, byCost bool, hide float64) *grid {
	side := 40 // Half of the lattices have a front of more points than are shown.
	if rapid.Bool().Draw(t, "small") {
		side = rapid.IntRange(1, 6).Draw(t, "side")
	}
	axes := []optimize.Axis{{Name: "works", Max: float64(side) / 4, Step: 0.25}, {Name: "drains", Min: 3, Max: 3 + float64(side), Step: 1}}
	designs := axes[0].Len() * axes[1].Len()
	g := &grid{f: newFrontier[int](axes, designs), margins: make([][]float64, designs), hidden: make([][]bool, designs)}
	g.f.byCost, g.f.settings.Allowance = byCost, 0.005
	g.f.open = func(x []float64) optimize.Design[int] { return gridDesign{g, g.f.index(x)} }
	const cuts = 3
	noise := rapid.Float64Range(-0.05, 0.05)
	asked := rapid.SampledFrom([]float64{0.6, 0.7, 0.8}).Draw(t, "asked")
	chance := rapid.Float64Range(0, 1)
	for i := range designs {
		x := optimize.Point(axes, i)
		g.f.earthworks[i], g.f.drain[i] = x[0], 12/x[1]
		g.f.out[i] = chance.Draw(t, "forbidden") < 0.05
		for range cuts {
			g.margins[i] = append(g.margins[i], x[0]/axes[0].Max+3/x[1]+noise.Draw(t, "noise")-asked)
			g.hidden[i] = append(g.hidden[i], chance.Draw(t, "hidden") < hide)
		}
	}
	cost := func(x []float64) (cost, tie float64, ok bool) {
		i := g.f.index(x)
		if byCost {
			return 10*g.f.earthworks[i] + 7*g.f.drain[i], 0, !g.f.out[i]
		}
		return g.f.earthworks[i], g.f.drain[i], !g.f.out[i]
	}
	res, err := optimize.Minimize(context.Background(), optimize.Problem[int]{Axes: axes, Cost: cost, Open: g.f.open}, g.f.settings)
	if err != nil {
		t.Fatal(err)
	}
	if res.X == nil {
		return nil
	}
	g.f.leaveOut(&res)
	g.f.answer = stand[int]{g.f.index(res.X), res.Lowest}
	return g
}

// exactly returns earthworks and drain of the front, ascending in earthworks, by comparing every design that stands with every other.
func (g *grid) exactly(forbidden []bool) (front [][2]float64) {
	stands := func(i int) bool { return !forbidden[i] && slices.Min(g.margins[i]) >= g.f.settings.Allowance }
	for i := range g.margins {
		bettered := !stands(i)
		for k := range g.margins {
			e, d := g.f.earthworks[k]-g.f.earthworks[i], g.f.drain[k]-g.f.drain[i]
			bettered = bettered || stands(k) && e <= 0 && d <= 0 && e+d < 0
		}
		if !bettered {
			front = append(front, [2]float64{g.f.earthworks[i], g.f.drain[i]})
		}
	}
	slices.SortFunc(front, func(a, b [2]float64) int { return cmp.Compare(a[0], b[0]) })
	return slices.Compact(front)
}

func (g *grid) points(stands []stand[int]) (front [][2]float64) {
	for _, s := range stands {
		front = append(front, [2]float64{g.f.earthworks[s.index], g.f.drain[s.index]})
	}
	return front
}

// TestFrontierAgainstAllPairs compares a front with the one found by comparing every two designs: all of it where it says so, else points of it
// from end to end, with the answer among them unless it is bettered.
func TestFrontierAgainstAllPairs(t *testing.T) {
	var wholes, parts int
	rapid.Check(t, func(t *rapid.T) {
		byCost := rapid.Bool().Draw(t, "by cost")
		g := newGrid(t, byCost, 0)
		if g == nil {
			return
		}
		var forbidden []bool
		for i := range g.f.out { // Those that a witness rejects are no part of it either way.
			forbidden = append(forbidden, g.f.out[i] && slices.Min(g.margins[i]) >= g.f.settings.Allowance)
		}
		want := g.exactly(forbidden)
		stands, whole, err := g.f.front(t.Context())
		if err != nil {
			t.Fatal(err)
		}
		got := g.points(stands)
		most := frontMost
		if byCost {
			most++
		}
		if whole {
			wholes++
			if !slices.Equal(got, want) {
				t.Fatalf("front %v, want %v", got, want)
			}
			return
		}
		if parts++; len(want) < frontMost {
			t.Fatalf("the %d points of the front were not all found", len(want))
		}
		if len(got) > most || got[0] != want[0] || got[len(got)-1] != want[len(want)-1] {
			t.Fatalf("%d points from %v to %v, want %d at most from %v to %v", len(got), got[0], got[len(got)-1], most, want[0], want[len(want)-1])
		}
		for _, p := range got {
			if !slices.Contains(want, p) {
				t.Fatalf("%v is no point of %v", p, want)
			}
		}
		own := g.points([]stand[int]{g.f.answer})[0]
		if slices.Contains(want, own) && !slices.Contains(got, own) {
			t.Fatalf("the answer %v is passed by: %v", own, got)
		}
	})

	if wholes == 0 || parts == 0 {
		t.Errorf("%d whole fronts, %d parts: one is not tested", wholes, parts)
	}
}

// TestFrontierKeepsNothingThatASlipRejects hides cuts from some searches: no point, and no answer of a front, may fall short of a cut that
// another design has brought to light.
func TestFrontierKeepsNothingThatASlipRejects(t *testing.T) {
	rejected := 0
	rapid.Check(t, func(t *rapid.T) {
		g := newGrid(t, rapid.Bool().Draw(t, "by cost"), 0.3)
		if g == nil {
			return
		}
		stands, _, err := g.f.front(t.Context())
		if err != nil {
			t.Fatal(err)
		}
		if g.f.rejected(g.f.answer.index) {
			rejected++
			if stands != nil {
				t.Fatal("a front of an answer that does not stand")
			}
		}
		for _, s := range stands {
			for _, c := range g.f.pool {
				if g.margins[s.index][c] < g.f.settings.Allowance {
					t.Fatalf("design %d falls short by cut %d: %g", s.index, c, g.margins[s.index][c])
				}
			}
		}
	})
	if rejected == 0 {
		t.Error("no answer was rejected: that is not tested")
	}
}

// TestHasFront checks which works are asked for a front: several, with drains whose metres the user leaves open.
func TestHasFront(t *testing.T) {
	kind := func(name, sized string) Request {
		k, _ := Find(name)
		r := DefaultRequest(&k)
		for i, a := range r.Axes {
			r.Axes[i].Max = a.Min
			if a.Name == sized {
				r.Axes[i].Max, r.Axes[i].Step = a.Min+1, 0.5
			}
		}
		return r
	}
	berm := kind("berm", "height")
	for name, c := range map[string]struct {
		group []Request
		want  bool
	}{
		"spacing":            {[]Request{berm, kind("drilled_drains", "spacing")}, true},
		"length":             {[]Request{kind("drilled_drains", "length"), berm}, true},
		"spacing of trench":  {[]Request{berm, kind("trench_drains", "spacing")}, true},
		"depth of trench":    {[]Request{berm, kind("trench_drains", "depth")}, false},
		"one length":         {[]Request{berm, kind("drilled_drains", "")}, false},
		"one remedy":         {[]Request{kind("drilled_drains", "spacing")}, false},
		"no drains":          {[]Request{berm, kind("regrade", "batter")}, false},
		"drains of one line": {[]Request{berm, kind("toe_drain", "depth")}, false},
	} {
		if got := hasFront(c.group); got != c.want {
			t.Errorf("%s: %v, want %v", name, got, c.want)
		}
	}
}
