package remedies

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// TestHooghoudt compares with worked examples: the spacing that keeps the head given.
func TestHooghoudt(t *testing.T) {
	const day = 86400.0
	tests := []struct {
		name    string
		h       hooghoudt
		d, head float64
		tolD    float64
		tolHead float64
		source  string
	}{
		{
			name: "four metres below the drains", h: hooghoudt{spacing: 48.5, depth: 4, radius: 0.05, permeability: 1e-6, recharge: 1e-8},
			d: 2.44, head: 1, tolD: 0.01, tolHead: 0.005, source: "Hooghoudt with Moody's depth by hand: S = 48.5 m, d = 2.44 m",
		},
		{
			name: "field drains", h: hooghoudt{spacing: 65, depth: 4.8, radius: 0.1, permeability: 0.14 / day, recharge: 0.001 / day},
			d: 3.3, head: 1, tolD: 0.1, tolHead: 0.01, source: "Ritzema (1994) ILRI Publ. 16, example 8.1: L = 65 m (recalled from memory)",
		},
		{
			name: "drains on the base", h: hooghoudt{spacing: 10, radius: 0.05, permeability: 1e-6, recharge: 4e-8},
			d: 0, head: 1, tolD: 1e-12, tolHead: 1e-12, source: "closed form: m = (S/2) sqrt(q/K)",
		},
		{
			name: "deep ground", h: hooghoudt{spacing: 10, depth: 50, radius: 0.05, permeability: 1e-6, recharge: 1e-8},
			d: math.Pi * 10 / (8 * (math.Log(200) - 1.15)), head: nan, tolD: 1e-12, source: "Moody (1966), deep ground (recalled from memory)",
		},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			near(t, "d", tt.h.equivalentDepth(), tt.d, tt.tolD)
			if !math.IsNaN(tt.head) {
				near(t, "midspan", tt.h.midspan(), tt.head, tt.tolHead)
			}
		})
	}
}

// TestMeanOfWaterTable integrates the ellipse between drains.
func TestMeanOfWaterTable(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		h := hooghoudt{
			spacing: rapid.Float64Range(1, 60).Draw(t, "S"), depth: rapid.Float64Range(0, 20).Draw(t, "D"), radius: 0.05,
			permeability: 1e-6, recharge: math.Exp(rapid.Float64Range(math.Log(1e-10), math.Log(5e-7)).Draw(t, "log q")),
		}
		d := h.equivalentDepth()
		const n = 20000
		var sum float64
		for i := range n {
			x := (float64(i) + 0.5) / n * h.spacing
			sum += math.Sqrt(d*d+h.recharge/h.permeability*x*(h.spacing-x)) - d
		}
		mean, mid := h.mean(), h.midspan()
		if math.Abs(mean-sum/n) > 1e-5*mid+1e-12 {
			t.Errorf("mean %g, by sum %g", mean, sum/n)
		}
		if !(mean >= mid*2/3-1e-6 && mean <= mid*math.Pi/4+1e-6 && d <= h.depth) {
			t.Errorf("mean %g of midspan %g", mean, mid)
		}
		if q := (8*h.permeability*d*mid + 4*h.permeability*mid*mid) / (h.spacing * h.spacing); math.Abs(q-h.recharge) > 1e-9*h.recharge {
			t.Errorf("recharge %g comes back as %g", h.recharge, q)
		}
	})
}

// TestDupuit checks flow and head by hand: K = 1e-6 m/s, 6 m to 2 m over 20 m.
func TestDupuit(t *testing.T) {
	d := dupuit{h1: 6, h2: 2, length: 20}
	near(t, "flow", d.flow(1e-6), 8e-7, 1e-18)
	near(t, "head midway", d.head(10), 4.472, 0.0005)
	near(t, "head at the start", d.head(0), 6, 1e-12)
	near(t, "head at the end", d.head(20), 2, 1e-12)
	// With recharge between drains at equal heads: h^2 = h2^2 + (w/K) L^2/4 midway.
	near(t, "recharge", (&dupuit{h1: 2, h2: 2, length: 20, ratio: 0.01}).head(10), math.Sqrt(4+0.01*100), 1e-12)
}

// TestDrilledDrains checks set-out, quantities and water: outlets 1 m above the toe, at x = 50, rising 5 degrees.
func TestDrilledDrains(t *testing.T) {
	h := hooghoudt{spacing: 8, radius: 0.05, permeability: 1e-6, recharge: 1e-8}
	near(t, "midspan", h.midspan(), 0.4, 1e-12)
	near(t, "mean", h.mean(), 0.4*math.Pi/4, 1e-12)
	sin, cos := math.Sincos(5 * math.Pi / 180)
	for facing, j := range map[string]*Job{"right": cutting(), "left": mirrorJob(cutting())} {
		t.Run(facing, func(t *testing.T) {
			own := j.Facing()
			p := apply(t, j, request("drilled_drains", nil, 20, 8, 5, 1, 0.1, 3, 1e-6, 1e-8))
			if len(p.Violations) > 0 {
				t.Fatal(p.Violations)
			}
			near(t, "drain", p.Quantities.Drain, 20.0/8, 1e-12)
			near(t, "drilled", p.Quantities.Drilled, 20.0/8, 1e-12)
			near(t, "earthworks", p.Quantities.Earthworks(), 0, 0)
			d := p.Waters[0].Drains
			inner, outer := d.Invert[0], d.Invert[len(d.Invert)-1]
			if own < 0 {
				inner, outer = outer, inner
			}
			near(t, "inner end", inner.X, own*(50-20*cos), 1e-9)
			near(t, "its level", inner.Y, 101+20*sin, 1e-9)
			near(t, "outer end", outer.X, own*(50-3*cos), 1e-9)
			near(t, "fade", d.Fade, 4, 1e-12)
			lowered := LoweredLine(&p.Waters[0])
			x := own * 40
			invert := 101 + (50-40)*sin/cos
			if y := lowered.At(x); y < invert+h.mean()-1e-9 || y > invert+h.mean()+0.05 {
				t.Errorf("water table at x = 40 is %g, want %g or a little above", y, invert+h.mean())
			}
			for _, c := range Checks(j, p) {
				if c.Note == midspanNote && c.Name == "high water" {
					if y := LoweredLine(&c.Situation.Water).At(x); y < invert+0.4-1e-9 || y > invert+0.45 {
						t.Errorf("midspan water table at x = 40 is %g, want %g or a little above", y, invert+0.4)
					}
				}
			}
		})
	}
}

func TestDrilledDrainFaults(t *testing.T) {
	outfall := 101.5
	tests := []struct {
		name   string
		limits Limits
		x      []float64
		limit  string
		detail string
	}{
		{"outfall", Limits{Outfall: &outfall}, []float64{20, 8, 5, 1, 0.1, 3, 1e-6, 1e-8}, "outfall", "outlets of drilled drains at level 101.00 m lie below the outfall, level 101.50 m"},
		{"all solid", Limits{}, []float64{3, 8, 5, 1, 0.1, 3, 1e-6, 1e-8}, "layout of the drilled drains", "take no water"},
		{"too long", Limits{}, []float64{60, 8, 5, 1, 0.1, 3, 1e-6, 1e-8}, "ground within the section", "outside the section"},
		{"too steep", Limits{}, []float64{40, 8, 25, 1, 0.1, 3, 1e-6, 1e-8}, "layout of the drilled drains", "come out of the ground"},
		{"above the crest", Limits{}, []float64{20, 8, 5, 10, 0.1, 3, 1e-6, 1e-8}, "layout of the drilled drains", "do not lie on the face"},
		{"neighbour", Limits{Left: &Fence{Name: "neighbour", X: 35}}, []float64{20, 8, 5, 1, 0.1, 3, 1e-6, 1e-8}, "neighbour", "inner end of drilled drains"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			j := cutting()
			j.Limits = tt.limits
			p := apply(t, j, request("drilled_drains", nil, tt.x...))
			if len(p.Violations) != 1 || p.Violations[0].Limit != tt.limit || !strings.Contains(p.Violations[0].Detail, tt.detail) {
				t.Errorf("violations %+v, want %q: %q", p.Violations, tt.limit, tt.detail)
			}
			if got, want := len(Checks(j, p)), 6; got != want {
				t.Errorf("%d checks, want %d whatever the size", got, want)
			}
		})
	}
	for name, rs := range map[string][]Request{
		"give the permeability and the recharge": {request("drilled_drains", nil, 20, 8, 5, 1, 0.1, 3)},
		"does not pass through ground":           {request("drilled_drains", nil, 20, 8, 5, 1, 0.1, 3, 1e-8, 1e-7)},
		"one kind of drains at a time":           {request("drilled_drains", nil, 20, 8, 5, 1, 0.1, 3, 1e-6, 1e-8), request("trench_drains", nil, 2, 6, 0.6, 0.5)},
	} {
		if _, err := NewRemedies(cutting(), rs); err == nil || !strings.Contains(err.Error(), name) {
			t.Errorf("error %v, want %q", err, name)
		}
	}
}
