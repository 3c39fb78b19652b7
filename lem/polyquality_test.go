package lem

import (
	"context"
	"math"
	"math/rand/v2"
	"os"
	"testing"
)

// longRun says that the long form of a test is wanted.
func longRun() bool { return os.Getenv("STANDFAST_LONG") == "1" }

// inventedSection draws a section and a situation from a seed; they are invented. It tells whether it has placed fill or a weak stratum.
func inventedSection(seed uint64) (s *Section, sit *Situation, special string) {
	rng := rand.New(rand.NewPCG(seed, 17))
	between := func(a, b float64) float64 { return a + (b-a)*rng.Float64() }
	h, n := between(5, 14), between(1.3, 3.2)
	back, run := 3*h, 3*h
	ground := Profile{{-back, h * between(1, 1.1)}, {0, h}}
	if rng.IntN(3) == 0 { // A bench.
		w := between(1, 4)
		ground = append(ground, Point{n * h / 2, h / 2}, Point{n*h/2 + w, h / 2}, Point{n*h + w, 0})
	} else {
		ground = append(ground, Point{n * h, 0})
	}
	toe := ground[len(ground)-1].X
	ground = append(ground, Point{toe + run, 0})
	soil := func() Soil {
		return Soil{UnitWeight: between(17, 20), Cohesion: between(2, 12), Friction: between(18, 30) * degree}
	}
	s = &Section{Ground: ground, Soils: []Soil{soil()}, Strata: []Stratum{{0, ground}}}
	sit = &Situation{}
	dip := func(y0, slope float64) Profile { return Profile{{-back, y0}, {toe + run, y0 - slope*(toe+run+back)}} }
	add := func(soil Soil, top Profile) {
		s.Soils = append(s.Soils, soil)
		s.Strata = append(s.Strata, Stratum{len(s.Soils) - 1, top})
	}
	switch seed % 5 {
	case 0: // Uniform.
		special = ""
	case 1: // A thin weak layer.
		special = "weak layer"
		y, k, t := between(-0.4, 0.4)*h, between(-0.02, 0.08), between(0.2, 0.6)
		y += k * back
		add(Soil{UnitWeight: 19, Cohesion: between(0, 3), Friction: between(8, 14) * degree}, dip(y, k))
		add(soil(), dip(y-t, k))
	case 2: // Placed berm on a foundation of two layers.
		special = "placed fill"
		add(Soil{UnitWeight: 17, Cohesion: between(0, 4), Friction: between(16, 22) * degree}, dip(0.1*h, 0))
		add(Soil{UnitWeight: 20, Friction: 36 * degree}, dip(-between(0.3, 0.7)*h, 0))
		b, w := between(0.2, 0.4)*h, between(2, 6)
		s.Ground = bermed(ground, b, w)
		s.Soils = append(s.Soils, Soil{UnitWeight: 20, Friction: 35 * degree})
		m := 2.0
		xi := profileX(ground, b)
		xo := xi + w
		s.Placed = []Body{{len(s.Soils) - 1, append([]Point{{xi, b}, {xo, b}, {xo + m*b, 0}}, below(ground, xi, xo+m*b)...)}}
	case 3: // Soft clay, undrained, over a firm base.
		special = "weak stratum"
		add(Soil{UnitWeight: 17, Undrained: &UndrainedStrength{Strength: between(0.2, 0.3) * 18 * h}}, dip(-0.02*h, 0))
		sit.Undrained = []bool{false, true}
		y := -between(0.25, 0.9) * h
		s.FirmBase = Profile{{-back, y}, {toe + run, y - between(-1, 1)}}
	case 4: // Two layers and a firm base.
		add(soil(), dip(between(0.1, 0.7)*h, 0.02))
		y := -between(0.1, 0.6) * h
		s.FirmBase = Profile{{-back, y}, {toe + run, y}}
	}
	if rng.IntN(2) == 0 {
		sit.Water.Line = Profile{{-back, between(0.4, 0.8) * h}, {0, between(0.3, 0.6) * h}, {toe, -0.1}, {toe + run, -0.2}}
	}
	return s, sit, special
}

// profileX returns where a falling ground has a level.
func profileX(p Profile, y float64) float64 {
	for i := 1; i < len(p); i++ {
		if a, b := p[i-1], p[i]; a.Y > y && b.Y <= y {
			return a.X + (b.X-a.X)*(a.Y-y)/(a.Y-b.Y)
		}
	}
	return p[len(p)-1].X
}

// bermed returns the ground with a berm of the given height and top width at the toe, outer face 1:2.
func bermed(p Profile, height, width float64) Profile {
	x := profileX(p, height)
	var q Profile
	for _, a := range p {
		if a.X < x {
			q = append(q, a)
		}
	}
	return append(q, Point{x, height}, Point{x + width, height}, Point{x + width + 2*height, 0}, p[len(p)-1])
}

// below returns the vertices of a ground inside an interval, from right to left.
func below(p Profile, from, to float64) []Point {
	var out []Point
	for i := len(p) - 1; i >= 0; i-- {
		if p[i].X > from && p[i].X < to {
			out = append(out, p[i])
		}
	}
	return out
}

// randomWalk is the plain twin of the search for polylines: nodes are moved at random by steps that adapt to success, and a lower F is kept. The
// rules of shape are checked, not mended.
func randomWalk(m *Model, ws *Workspace, rng *rand.Rand, nodes []Point, o Setting, steps int) ([]Point, float64) {
	f := walked(m, ws, nodes, o)
	size := 0.1
	for k := range steps {
		trial := append([]Point(nil), nodes...)
		n := len(trial)
		length := trial[n-1].X - trial[0].X
		sd := size * math.Pow(10, -2*rng.Float64())
		switch k % 4 {
		case 0: // One node.
			i := rng.IntN(n)
			trial[i].X += sd * length * rng.NormFloat64()
			trial[i].Y += sd * length * rng.NormFloat64() * 0.5
		case 1: // All nodes.
			for i := range trial {
				trial[i].X += 0.3 * sd * length * rng.NormFloat64()
				trial[i].Y += 0.1 * sd * length * rng.NormFloat64()
			}
		case 2: // Shift and stretch.
			c, sx, sy := rng.Float64(), 1+sd*rng.NormFloat64(), 1+sd*rng.NormFloat64()
			x0, y0 := trial[0].X+c*length, max(trial[0].Y, trial[n-1].Y)
			for i := range trial {
				trial[i] = Point{x0 + (trial[i].X-x0)*sx, y0 + (trial[i].Y-y0)*sy}
			}
		case 3: // Bend about a place.
			c, w, by := rng.Float64(), 0.1+0.4*rng.Float64(), sd*length*0.3*rng.NormFloat64()
			for i := range trial {
				u := ((trial[i].X-trial[0].X)/length - c) / w
				trial[i].Y += by * math.Exp(-u*u)
			}
		}
		for _, i := range []int{0, n - 1} {
			trial[i].Y = m.groundAt(trial[i].X)
		}
		if g := walked(m, ws, trial, o); g < f {
			f, nodes = g, trial
			size = min(size*1.15, 0.3)
		} else {
			size = max(size*0.993, 1e-3)
		}
	}
	return nodes, f
}

// walked returns F of nodes, +Inf where they break a rule.
func walked(m *Model, ws *Workspace, nodes []Point, o Setting) float64 {
	for i := 1; i < len(nodes); i++ {
		if nodes[i].X-nodes[i-1].X < 1e-4 {
			return math.Inf(1)
		}
	}
	if !concave(nodes) {
		return math.Inf(1)
	}
	r := m.FS(ws, &Slip{Kind: Polyline, Nodes: nodes}, o)
	if r.Status != Converged || !m.sound(nodes, &r) {
		return math.Inf(1)
	}
	return r.F
}

// lowestOf returns the lowest minimum of a kind and method, if there is one.
func lowestOf(found *Minima, kind SlipKind, method Method) *Minimum {
	for i := range found.Basins {
		if b := &found.Basins[i]; b.Slip.Kind == kind && b.Setting.Method == method {
			return b
		}
	}
	return nil
}

// walks returns the lowest F of random walks: from nodes at random, and from a slip found.
func walks(m *Model, set Setting, from []Point, n, steps int) (best, onward float64) {
	var ws Workspace
	best = math.Inf(1)
	for k := range n {
		rng := rand.New(rand.NewPCG(uint64(k), 5))
		if nodes := randomNodes(m, &ws, rng, set); nodes != nil {
			_, f := randomWalk(m, &ws, rng, nodes, set, steps)
			best = min(best, f)
		}
	}
	_, onward = randomWalk(m, &ws, rand.New(rand.NewPCG(1, 6)), from, set, steps)
	return best, onward
}

// randomNodes returns the best of a number of concave lines at random.
func randomNodes(m *Model, ws *Workspace, rng *rand.Rand, o Setting) []Point {
	best, at := math.Inf(1), []Point(nil)
	for range 3000 {
		width := m.right - m.left
		x0 := m.left + width*rng.Float64()
		x1 := x0 + width*rng.Float64()*rng.Float64()
		deep := (x1 - x0) * rng.Float64() * 0.4
		p, q := 1+2*rng.Float64(), rng.Float64()
		nodes := make([]Point, 10)
		for i := range nodes {
			u := float64(i) / 9
			x, g0, g1 := x0+(x1-x0)*u, m.groundAt(x0), m.groundAt(x1)
			bow := math.Pow(u*(1-u)*4, 1/p) * (1 + q*(0.5-u))
			nodes[i] = Point{x, g0 + (g1-g0)*u - deep*bow}
		}
		nodes[0].Y, nodes[9].Y = m.groundAt(x0), m.groundAt(x1)
		bow(nodes, nil)
		if f := walked(m, ws, nodes, o); f < best {
			best, at = f, nodes
		}
	}
	return at
}

// TestCircleSearchQuality measures the default search for circles against one with more effort in the other parametrisation.
func TestCircleSearchQuality(t *testing.T) {
	const tol = 0.003
	sections, effort := 25, 4.0
	if longRun() {
		sections, effort = 60, 50
	}
	var worst float64
	for seed := range uint64(sections) {
		s, sit, special := inventedSection(seed)
		m := compiled(t, s, sit)
		o := SearchOptions{MinDepth: 1}
		got := lowestBy(t, m, Bishop, o).Result.F
		o.Sampler, o.Effort, o.Seed = ByCentre, effort, 99
		want := lowestBy(t, m, Bishop, o).Result.F
		worst = max(worst, got/want-1)
		if !(got <= want*(1+tol)) {
			t.Errorf("section %d %s: F = %.4f, the reference found %.4f", seed, special, got, want)
		}
	}
	t.Logf("worst: %.3f %% above the reference", 100*worst)
}

// TestSearchQuality measures the default search against one with 50 times its effort in the other parametrisation, and against random walks.
func TestSearchQuality(t *testing.T) {
	sections, effort, n, steps := 5, 4.0, 1, 3000
	if longRun() {
		sections, effort, n, steps = 40, 50, 6, 40000
	}
	const tol = 0.003
	var worst float64
	for seed := range uint64(sections) {
		s, sit, special := inventedSection(seed)
		m := compiled(t, s, sit)
		o := SearchOptions{MinDepth: 1, Polylines: true, Window: Window{Direction: RightwardOnly}}
		got, err := m.Search(context.Background(), o)
		if err != nil {
			t.Fatal(err)
		}
		o.Sampler, o.Effort, o.Seed = ByCentre, effort, 99
		ref, err := m.Search(context.Background(), o)
		if err != nil {
			t.Fatal(err)
		}
		check := func(what string, f, want float64) {
			worst = max(worst, f/want-1)
			if !(f <= want*(1+tol)) {
				t.Errorf("section %d, %s: F = %.4f, the reference found %.4f", seed, what, f, want)
			}
		}
		for _, method := range GoverningMethods(Circle) {
			a, b := lowestOf(&got, Circle, method), lowestOf(&ref, Circle, method)
			if a == nil || b == nil {
				t.Fatalf("section %d, %v: no circle", seed, method)
			}
			check("circle "+method.String(), a.Result.F, b.Result.F)
		}
		for _, method := range GoverningMethods(Polyline) {
			a, b := lowestOf(&got, Polyline, method), lowestOf(&ref, Polyline, method)
			if a == nil || b == nil {
				t.Fatalf("section %d, %v: no polyline", seed, method)
			}
			walk, onward := walks(m, a.Setting, a.Slip.Nodes, n, steps)
			check("polyline "+method.String(), a.Result.F, min(b.Result.F, walk, onward))
			if longRun() {
				t.Logf("section %2d %-12s %-17v: %.4f; against search %+.3f %%, walks %+.3f %%, walk from it %+.3f %%", seed, special, method, a.Result.F,
					100*(a.Result.F/b.Result.F-1), 100*(a.Result.F/walk-1), 100*(a.Result.F/onward-1))
			}
		}
	}
	t.Logf("worst: %.3f %% above the reference", 100*worst)
}
