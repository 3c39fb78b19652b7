package optimize

import (
	"context"
	"math"
	"slices"
	"testing"

	"pgregory.net/rapid"
)

// feasibilityTol forgives rounding where an exact answer lies on its constraint.
const feasibilityTol = 1e-9

// interval is a problem whose cuts are the t of lo <= t <= hi: margin(x, t) >= 0 for all of them.
type interval struct {
	name        string
	axes        []Axis
	cost        func(x []float64) float64
	margin      func(x []float64, t float64) float64
	lo, hi      float64
	want        float64   // least cost of the continuous problem
	latticeTol  float64   // how much more the lattice may cost
	estimateTol float64   // on either side of want, for the estimate between lattice points
	wantX       []float64 // lattice answer where it is known in closed form
	source      string
}

func (p *interval) problem() Problem[float64] {
	return Problem[float64]{
		Axes: p.axes,
		Cost: func(x []float64) (cost, tie float64, ok bool) { return p.cost(x), 0, true },
		Open: func(x []float64) Design[float64] { return &intervalDesign{p: p, x: x} },
	}
}

type intervalDesign struct {
	p *interval
	x []float64
}

func (d *intervalDesign) Margin(t *float64) float64 { return d.p.margin(d.x, *t) + feasibilityTol }
func (d *intervalDesign) Close()                    {}

// Search scans the index set and divides the bracket round every local minimum by golden section.
func (d *intervalDesign) Search(_ context.Context, e Effort) ([]Found[float64], error) {
	n := 101
	if e.Audit {
		n = 257
	}
	ts := make([]float64, n)
	ms := make([]float64, n)
	for i := range ts {
		ts[i] = d.p.lo + (d.p.hi-d.p.lo)*float64(i)/float64(n-1)
		ms[i] = d.Margin(&ts[i])
	}
	var found []Found[float64]
	for i := range ts {
		before, after := max(0, i-1), min(n-1, i+1)
		if ms[i] <= ms[before] && ms[i] <= ms[after] {
			t := d.descend(ts[before], ts[after], ts[i])
			found = append(found, Found[float64]{Cut: t, Margin: d.Margin(&t)})
		}
	}
	return found, nil
}

func (d *intervalDesign) descend(a, b, best float64) float64 {
	const ratio = 0.6180339887498949
	for range 50 {
		c, e := b-ratio*(b-a), a+ratio*(b-a)
		mc, me := d.Margin(&c), d.Margin(&e)
		at, m := c, mc
		if mc <= me {
			b = e
		} else {
			a, at, m = c, e, me
		}
		if m < d.Margin(&best) {
			best = at
		}
	}
	return best
}

func intervals() []interval {
	const recalled = ", recalled from memory"
	return []interval{
		{
			name: "one parameter", source: "closed form: max of t exp(-t) is 1/e at t = 1",
			axes:   []Axis{{"x", 0, 1, 0.01}},
			cost:   func(x []float64) float64 { return x[0] },
			margin: func(x []float64, t float64) float64 { return x[0] - t*math.Exp(-t) },
			lo:     0, hi: 5, want: 1 / math.E, latticeTol: 0.01, estimateTol: 1e-3, wantX: []float64{0.37},
		},
		{
			name: "line nearest to a parabola", source: "closed form: Chebyshev equioscillation at t = 0, 1/2, 1",
			axes: []Axis{{"a", -0.5, 0.5, 0.0625}, {"b", 0, 2, 0.125}, {"h", 0, 0.5, 0.0625}},
			cost: func(x []float64) float64 { return x[2] },
			margin: func(x []float64, t float64) float64 {
				return x[2] - math.Abs(t*t-x[0]-x[1]*t)
			},
			// The exchange ends early here: the lattice design nearest to the master's answer passes.
			lo: 0, hi: 1, want: 0.125, estimateTol: 0.02, wantX: []float64{-0.125, 1, 0.125},
		},
		{
			name: "least circle round an ellipse", source: "closed form: support function; semi-axes 2, 1, centre (0.5, 0.25)",
			axes: []Axis{{"cx", -1, 1, 0.125}, {"cy", -1, 1, 0.125}, {"r", 0.5, 4, 0.125}},
			cost: func(x []float64) float64 { return x[2] },
			margin: func(x []float64, t float64) float64 {
				sin, cos := math.Sincos(t)
				return x[2] + x[0]*cos + x[1]*sin - (0.5*cos + 0.25*sin + math.Hypot(2*cos, sin))
			},
			lo: 0, hi: 2 * math.Pi, want: 2, estimateTol: 0.02, wantX: []float64{0.5, 0.25, 2},
		},
		{
			name: "two parameters", source: "Coope and Watson 1985, problem 1" + recalled +
				"; x2 = -0.618 from t = 0, so -0.62 on the lattice",
			axes: []Axis{{"x1", -1.5, 0.5, 0.05}, {"x2", -1.5, 0.5, 0.02}},
			cost: func(x []float64) float64 { return x[0]*x[0]/3 + x[1]*x[1] + x[0]/2 },
			margin: func(x []float64, t float64) float64 {
				a := 1 - x[0]*x[0]*t*t
				return -(a*a - x[0]*t*t - x[1]*x[1] + x[1])
			},
			lo: 0, hi: 1, want: 0.194466, latticeTol: 0.0025, estimateTol: 1e-3, wantX: []float64{-0.75, -0.62},
		},
		{
			name: "nearest to the origin", source: "Coope and Watson 1985, problem 3" + recalled,
			axes: []Axis{{"x1", -1, 0.5, 0.1}, {"x2", -2, -0.5, 0.1}, {"x3", 0, 3, 0.1}},
			cost: func(x []float64) float64 { return x[0]*x[0] + x[1]*x[1] + x[2]*x[2] },
			margin: func(x []float64, t float64) float64 {
				return -(x[0] + x[1]*math.Exp(x[2]*t) + math.Exp(2*t) - 2*math.Sin(4*t))
			},
			lo: 0, hi: 1, want: 5.33469, latticeTol: 0.2, estimateTol: 0.05,
		},
		{
			name: "parabola over the tangent", source: "Coope and Watson 1985, problem 4 with n = 3" + recalled,
			axes: []Axis{{"x1", 0, 0.2, 0.01}, {"x2", 0.2, 0.6, 0.02}, {"x3", 0.8, 1.3, 0.02}},
			cost: func(x []float64) float64 { return x[0] + x[1]/2 + x[2]/3 },
			margin: func(x []float64, t float64) float64 {
				return x[0] + t*(x[1]+t*x[2]) - math.Tan(t)
			},
			lo: 0, hi: 1, want: 0.649042, latticeTol: 0.01, estimateTol: 2e-3,
		},
		{
			name: "parabola over a bell", source: "Coope and Watson 1985, exponential cost" + recalled,
			axes: []Axis{{"x1", 0.8, 1.2, 0.02}, {"x2", -0.5, 0.3, 0.05}, {"x3", -0.8, 0, 0.05}},
			cost: func(x []float64) float64 { return math.Exp(x[0]) + math.Exp(x[1]) + math.Exp(x[2]) },
			margin: func(x []float64, t float64) float64 {
				return x[0] + t*(x[1]+t*x[2]) - 1/(1+t*t)
			},
			lo: 0, hi: 1, want: 4.30118, latticeTol: 0.06, estimateTol: 0.01,
		},
	}
}

func TestSemiInfinite(t *testing.T) {
	for _, p := range intervals() {
		t.Run(p.name, func(t *testing.T) {
			r, err := Minimize(t.Context(), p.problem(), Settings[float64]{Seed: 1})
			if err != nil || r.Status != Optimal {
				t.Fatalf("status %v, error %v", r.Status, err)
			}
			t.Logf("x %v cost %.6f estimate %.6f spent %+v", r.X, r.Cost, r.ContinuousEstimate, r.Spent)
			if r.Cost < p.want-feasibilityTol-1e-6 || r.Cost > p.want+p.latticeTol+feasibilityTol {
				t.Errorf("cost %v, want %v to %v (%s)", r.Cost, p.want, p.want+p.latticeTol, p.source)
			}
			if math.Abs(r.ContinuousEstimate-p.want) > p.estimateTol {
				t.Errorf("estimate %v, want %v within %v (%s)", r.ContinuousEstimate, p.want, p.estimateTol, p.source)
			}
			if p.wantX != nil && !slices.Equal(r.X, p.wantX) {
				t.Errorf("x %v, want %v (%s)", r.X, p.wantX, p.source)
			}
			if want := exhaustive(&p); r.Cost != want {
				t.Errorf("cost %v, exhaustive twin %v", r.Cost, want)
			}
			checkWitnesses(t, p.problem(), r)
			if spent := r.Spent.FullySearched; spent > 3*DefaultFullSearches {
				t.Errorf("%d designs searched in full", spent)
			}
		})
	}
}

// exhaustive is the slow twin: the least cost of all lattice designs, by a plain scan of the index set.
func exhaustive(p *interval) float64 {
	const points = 1000
	best := math.Inf(1)
	for i := range int(latticeSize(p.axes)) {
		x := Point(p.axes, i)
		if p.cost(x) >= best {
			continue
		}
		ok := true
		for k := 0; k <= points && ok; k++ {
			ok = p.margin(x, p.lo+(p.hi-p.lo)*float64(k)/points)+feasibilityTol >= 0
		}
		if ok {
			best = p.cost(x)
		}
	}
	return best
}

// checkWitnesses re-evaluates every witness and checks the order and number of the certificate.
func checkWitnesses[C any](t rapid.TB, p Problem[C], r Result[C]) {
	t.Helper()
	cheaper := 0
	for i := range int(latticeSize(r.Axes)) {
		cost, _, ok := p.Cost(Point(r.Axes, i))
		if ok && (r.Status != Optimal || cost < r.Cost) {
			cheaper++
		}
	}
	if len(r.Lattice) < cheaper {
		t.Errorf("%d entries for %d cheaper designs", len(r.Lattice), cheaper)
	}
	seen := map[int]bool{}
	for i, w := range r.Lattice {
		if seen[w.Index] {
			t.Fatalf("design %d has two entries", w.Index)
		}
		seen[w.Index] = true
		if i > 0 && w.Cost < r.Lattice[i-1].Cost {
			t.Fatalf("entry %d is cheaper than the one before", i)
		}
		if w.Cut == NoCut {
			continue
		}
		if got := margin(p, Point(r.Axes, w.Index), &r.Pool[w.Cut]); got != w.Margin || !(got < r.Allowance) {
			t.Fatalf("witness %+v gives margin %v, allowance %v", w, got, r.Allowance)
		}
	}
}

func margin[C any](p Problem[C], x []float64, c *C) float64 {
	d := p.Open(x)
	defer d.Close()
	return d.Margin(c)
}
