package remedies

import (
	"math"
	"slices"
	"testing"

	"pgregory.net/rapid"

	"standfast/lem"
)

// anyJob draws a slope that descends to the right with an uneven face, steps included, over strata that may pinch out, with a placed
// body and water lines.
func anyJob(t *rapid.T) *Job {
	j := cutting()
	half := func(name string, from, to int) float64 {
		return float64(rapid.IntRange(2*from, 2*to).Draw(t, name)) / 2
	}
	ground := lem.Profile{{X: 0, Y: half("back", 9, 13)}, {X: 20, Y: 10}}
	x, y := 20.0, 10.0
	for y > 0 {
		x += half("run", 0, 8)
		y = max(0, y-half("drop", 0, 4))
		if last := ground[len(ground)-1]; last.X != x || last.Y != y {
			ground = append(ground, lem.Point{X: x, Y: y})
		}
		if x > 60 {
			y = 0
		}
	}
	j.Crest, j.Toe = ground[1], ground[len(ground)-1]
	if j.Toe.Y != 0 || j.Toe.X <= j.Crest.X+1 {
		ground = append(ground, lem.Point{X: x + 5, Y: 0})
		j.Toe = ground[len(ground)-1]
	}
	ground = append(ground, lem.Point{X: 120, Y: half("beyond", -2, 1)})
	j.Section.Ground = ground
	line := func(name string, from, to int) lem.Profile {
		return lem.Profile{{X: 0, Y: half(name, from, to)}, {X: 25, Y: half(name, from, to)}, {X: 60, Y: half(name, -8, 6)}, {X: 120, Y: half(name, -8, 0)}}
	}
	j.Section.Strata = []lem.Stratum{{Soil: clay, Top: ground}, {Soil: stiffClay, Top: line("stiff", 0, 12)}, {Soil: clay, Top: line("lower", -5, 9)}}
	bx, by := half("body x", 10, 40), half("body y", 0, 9)
	j.Section.Placed = []lem.Body{{Soil: rockfill, Outline: []lem.Point{{X: bx, Y: by}, {X: bx + 1, Y: by + 3}, {X: bx + 6, Y: by + 1}, {X: bx + 2, Y: by - 2}}}}
	j.Waters[0].Line = line("water", 0, 12)
	return j
}

// anyRequest draws works.
func anyRequest(t *rapid.T) Request {
	size := func(name string, from, to float64) float64 {
		return math.Round(10*rapid.Float64Range(from, to).Draw(t, name)) / 10
	}
	switch rapid.SampledFrom([]string{"regrade", "unload", "berm", "buttress", "trench_drains", "drilled_drains", "lightweight_fill", "shear_key", "piles_or_nails", "toe_drain", "interceptor"}).Draw(t, "kind") {
	case "regrade":
		x := []float64{size("batter", 1, 5), size("pivot", 0, 1)}
		if rapid.Bool().Draw(t, "benched") {
			x = append(x, float64(rapid.IntRange(0, 3).Draw(t, "benches")), size("interval", 1, 4), nan, size("bench", 0.5, 4), size("upper", 1, 5))
		}
		return request("regrade", fillOf(sandFill), x...)
	case "unload":
		return request("unload", nil, size("depth", 0.5, 9), size("width", 0, 15), size("back", 0.5, 4))
	case "buttress":
		x := []float64{size("height", 0.5, 9), size("top", 0.1, 8), size("batter", 0.5, 3)}
		if rapid.Bool().Draw(t, "keyed") {
			x = append(x, size("key", 0.5, 4), size("key width", 0.5, 5), size("offset", -6, 6), size("sides", 0.1, 2))
			if rapid.Bool().Draw(t, "panels") {
				x = append(x, size("panel", 1, 4), size("spacing", 5, 20))
			}
		}
		return request("buttress", fillOf(rockfill), x...)
	case "trench_drains":
		return request("trench_drains", nil, size("depth", 1, 4), size("spacing", 2, 10), 0.6, size("share", 0, 1), nan, nan)
	case "lightweight_fill":
		return request("lightweight_fill", fillOf(lightFill), size("depth", 0.5, 9), size("width", 0, 15), size("back", 0.5, 4))
	case "shear_key":
		x := []float64{size("depth", 1, 5), size("width", 0.5, 5), size("position", -5, 20), size("sides", 0.1, 2)}
		if rapid.Bool().Draw(t, "panels") {
			x = append(x, size("panel", 1, 4), size("spacing", 5, 20))
		}
		return request("shear_key", fillOf(rockfill), x...)
	case "piles_or_nails":
		return request("piles_or_nails", nil, size("capacity", 10, 400), size("spacing", 0.5, 4), size("position", -5, 30), size("length", 2, 15))
	case "toe_drain":
		return request("toe_drain", map[string]int{"low_permeability": stiffClay}, size("depth", 0.5, 3), size("offset", -3, 3), 0.6, 1e-6, 1e-8)
	case "interceptor":
		return request("interceptor", map[string]int{"low_permeability": stiffClay}, size("depth", 1, 6), size("setback", 0, 10), 0.6, 1e-6, 1e-8)
	case "drilled_drains":
		return request("drilled_drains", nil, size("length", 8, 40), size("spacing", 3, 15), size("rise", 0, 10), size("outlet", 0, 3), 0.1, size("solid", 0, 4), 1e-6, 1e-8, size("below", 0, 5))
	default:
		return request("berm", fillOf(sandFill), size("height", 0.5, 9), size("top", 0.1, 8), size("batter", 0.5, 3))
	}
}

// anyPair draws two works, at most one of them drains.
func anyPair(t *rapid.T) (first, second Request) {
	first, second = anyRequest(t), anyRequest(t)
	if isDrains(first) && isDrains(second) {
		second = request("unload", nil, 2, 10, 2)
	}
	return first, second
}

// sameWorks fails unless two proposals have the same quantities, scaled, and the same violations and checks.
func sameWorks(t *rapid.T, ja, jb *Job, a, b *Proposal, scale float64) {
	same := func(what string, x, y float64) {
		if math.Abs(x-y) > 1e-7*(1+math.Abs(x)) {
			t.Errorf("%s: %g and %g", what, x, y)
		}
	}
	for i := range a.Quantities.Cut {
		same("cut", a.Quantities.Cut[i]*scale*scale, b.Quantities.Cut[i])
		same("fill", a.Quantities.Fill[i]*scale*scale, b.Quantities.Fill[i])
	}
	same("strip", a.Quantities.Strip*scale, b.Quantities.Strip)
	same("dig", a.Quantities.TrenchDig*scale*scale, b.Quantities.TrenchDig)
	same("drain", a.Quantities.Drain, b.Quantities.Drain)
	if len(a.Violations) != len(b.Violations) {
		t.Fatalf("violations %v and %v", a.Violations, b.Violations)
	}
	for i := range a.Violations {
		same("by", a.Violations[i].By*scale, b.Violations[i].By)
	}
	ca, cb := Checks(ja, a), Checks(jb, b)
	if !slices.EqualFunc(ca, cb, sameCheck) {
		t.Fatal("checks differ")
	}
}

func sameCheck(x, y Check) bool {
	return x.Name == y.Name && x.Note == y.Note && x.Required == y.Required && x.Advisory == y.Advisory
}

// TestSameChecksForEverySize checks that the list of checks depends on the remedies and their choices, never on sizes: a slip of a pool
// names its check by its place in the list.
func TestSameChecksForEverySize(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		j := anyJob(t)
		if rapid.Bool().Draw(t, "plant") {
			j.Stage.Plant, j.Economics.StripDepth = 15, 0.3
		}
		first, second := anyPair(t)
		other := func(r Request) Request {
			k, _ := Find(r.Kind)
			r.Axes = slices.Clone(r.Axes)
			for i := range r.Axes {
				p := &k.Parameters[i]
				if r.Axes[i].Name != "" && p.Name != "pivot" { // a pivot at the toe places no fill
					v := rapid.Float64Range(p.Min, min(p.Max, 100)).Draw(t, p.Name)
					r.Axes[i].Min, r.Axes[i].Max = v, v
				}
				if p.Name == "benches" && r.Axes[i].Name != "" {
					r.Axes[i].Min = math.Round(r.Axes[i].Min)
					r.Axes[i].Max = r.Axes[i].Min
				}
			}
			return r
		}
		rs := []Request{first, second}
		remedy, err := Combine(j, rs)
		if err != nil {
			t.Fatal(err)
		}
		a := Checks(j, remedy.Apply(j, Start(j), slices.Concat(first.Fixed(), second.Fixed())))
		first, second = other(first), other(second)
		b := Checks(j, remedy.Apply(j, Start(j), slices.Concat(first.Fixed(), second.Fixed())))
		if !slices.EqualFunc(a, b, sameCheck) {
			t.Errorf("checks differ with sizes: %v and %v", labels(a), labels(b))
		}
	})
}

func labels(cs []Check) []string {
	var out []string
	for i := range cs {
		out = append(out, cs[i].Label())
	}
	return out
}

// moved returns a job scaled about the origin and then shifted.
func moved(j *Job, scale, dx, dy float64) *Job {
	m := *j
	at := func(p lem.Point) lem.Point { return lem.Point{X: p.X*scale + dx, Y: p.Y*scale + dy} }
	all := func(ps []lem.Point) []lem.Point {
		out := make([]lem.Point, len(ps))
		for i, p := range ps {
			out[i] = at(p)
		}
		return out
	}
	m.Section.Ground = all(j.Section.Ground)
	m.Section.Strata, m.Section.Placed, m.Waters = nil, nil, nil
	for _, s := range j.Section.Strata {
		m.Section.Strata = append(m.Section.Strata, lem.Stratum{Soil: s.Soil, Top: all(s.Top)})
	}
	for _, b := range j.Section.Placed {
		m.Section.Placed = append(m.Section.Placed, lem.Body{Soil: b.Soil, Outline: all(b.Outline)})
	}
	for _, w := range j.Waters {
		m.Waters = append(m.Waters, WaterLine{Name: w.Name, Artesian: w.Artesian, Line: all(w.Line)})
	}
	m.Crest, m.Toe = at(j.Crest), at(j.Toe)
	return &m
}

// scaled returns a request with its lengths scaled; batters and shares stay.
func scaled(r Request, k float64) Request {
	kind, _ := Find(r.Kind)
	r.Axes = slices.Clone(r.Axes)
	for i, p := range kind.Parameters {
		if p.Unit == "m" {
			r.Axes[i].Min *= k
			r.Axes[i].Max *= k
		}
	}
	return r
}

func must(t *rapid.T, j *Job, r Request) *Proposal {
	p, err := Apply(j, []Request{r}, [][]float64{r.Fixed()})
	if err != nil {
		t.Fatal(err)
	}
	return p
}

func TestMirror(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		j, r := anyJob(t), anyRequest(t)
		m := mirrorJob(j)
		a, b := must(t, j, r), must(t, m, r)
		sameWorks(t, j, m, a, b, 1)
		if !slices.EqualFunc(a.Section.Ground, b.Section.Ground.Mirror(), func(p, q lem.Point) bool { return math.Hypot(p.X-q.X, p.Y-q.Y) < 1e-9 }) {
			t.Errorf("ground %v and %v", a.Section.Ground, b.Section.Ground.Mirror())
		}
	})
}

func TestTranslation(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		j, r := anyJob(t), anyRequest(t)
		m := moved(j, 1, rapid.Float64Range(-500, 500).Draw(t, "dx"), rapid.Float64Range(-500, 500).Draw(t, "dy"))
		sameWorks(t, j, m, must(t, j, r), must(t, m, r), 1)
	})
}

func TestScaling(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		j, r := anyJob(t), anyRequest(t)
		k := rapid.SampledFrom([]float64{1.5, 2, 3}).Draw(t, "scale")
		m := moved(j, k, 0, 0)
		sameWorks(t, j, m, must(t, j, r), must(t, m, scaled(r, k)), k)
	})
}

// TestAgainstColumns measures the works by columns 1 cm apart, from the ground alone, and soils by points in them.
func TestAgainstColumns(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		j, r := anyJob(t), anyRequest(t)
		if k, _ := Find(r.Kind); k.order >= orderWater || k.order == orderExchange || len(r.Axes) > keyDepth && r.Kind == "buttress" && r.has(keyDepth) {
			t.Skip("drains and exchanged ground leave the ground as it is")
		}
		p := must(t, j, r)
		const step = 0.01
		var cut, fill, steps float64
		bySoil := make([]float64, len(j.Section.Soils))
		for x := step / 2; x < 120; x += step {
			d := j.Section.Ground.At(x) - p.Section.Ground.At(x)
			fill += math.Max(0, -d) * step
			cut += math.Max(0, d) * step
			const layers = 20
			for k := 0; d > 0 && k < layers; k++ {
				y := p.Section.Ground.At(x) + d*(float64(k)+0.5)/layers
				bySoil[j.Section.SoilAt(x, y)] += d * step / layers
			}
		}
		for i := 1; i < len(j.Section.Ground); i++ {
			if a, b := j.Section.Ground[i-1], j.Section.Ground[i]; a.X == b.X {
				steps += math.Abs(a.Y - b.Y)
			}
		}
		tol := step * (1 + steps)
		if math.Abs(cut-p.Quantities.TotalCut()) > tol || math.Abs(fill-p.Quantities.TotalFill()) > tol {
			t.Errorf("cut %g, fill %g, want %g, %g", p.Quantities.TotalCut(), p.Quantities.TotalFill(), cut, fill)
		}
		for i, a := range bySoil {
			if math.Abs(a-p.Quantities.Cut[i]) > tol+0.06*cut { // a boundary is off by up to half a layer of 20
				t.Errorf("cut of soil %d is %g, want %g", i, p.Quantities.Cut[i], a)
			}
		}
	})
}

// TestCleanGeometry checks that new ground and bodies have no point too many, bodies are simple and clockwise, hold the fill measured
// and lie between old and new ground; and that the proposal worked on is not changed.
func TestCleanGeometry(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		j := anyJob(t)
		first, second := anyPair(t)
		rs, err := NewRemedies(j, []Request{first, second})
		if err != nil {
			t.Fatal(err)
		}
		p := rs[0].Apply(j, Start(j), first.Fixed())
		kept := *p.clone()
		q := rs[1].Apply(j, p, second.Fixed())
		if !slices.Equal(kept.Section.Ground, p.Section.Ground) || len(kept.Section.Placed) != len(p.Section.Placed) ||
			p.Quantities.Earthworks() != kept.Quantities.Earthworks() || len(kept.Violations) != len(p.Violations) {
			t.Error("the proposal worked on has changed")
		}
		for _, w := range []*Proposal{p, q} {
			if !slices.Equal(w.Section.Ground, j.Section.Ground) {
				clean(t, w.Section.Ground)
			}
			fill := 0.0
			for _, b := range w.Section.Placed[len(j.Section.Placed):] {
				clean(t, b.Outline)
				a := clockwiseArea(b.Outline)
				if a <= 0 {
					t.Errorf("outline %v is not clockwise", b.Outline)
				}
				fill += a
				simple(t, b.Outline)
				for _, v := range b.Outline {
					if v.Y > w.Section.Ground.At(v.X)+1e-6 && w == p {
						t.Errorf("outline above ground at %v", v)
					}
				}
			}
			if want := sum(w.Quantities.Fill); math.Abs(fill-want) > 1e-7 {
				t.Errorf("bodies hold %g, measured %g", fill, want)
			}
		}
	})
}

func clean(t *rapid.T, ps []lem.Point) {
	for i := 1; i < len(ps); i++ {
		if math.Hypot(ps[i].X-ps[i-1].X, ps[i].Y-ps[i-1].Y) <= sameLevel {
			t.Errorf("points %d and %d of %v repeat", i-1, i, ps)
		}
		if i >= 2 && onLine(ps[i-2], ps[i-1], ps[i]) {
			t.Errorf("point %d of %v lies on the way", i-1, ps)
		}
	}
}

func clockwiseArea(ps []lem.Point) float64 {
	var a float64
	for i, q := range ps {
		p := ps[(i+len(ps)-1)%len(ps)]
		a += (q.X - p.X) * (p.Y + q.Y) / 2
	}
	return a
}

// simple fails if two edges of an outline that are not neighbours cross.
func simple(t *rapid.T, ps []lem.Point) {
	turn := func(a, b, c lem.Point) float64 { return (b.X-a.X)*(c.Y-a.Y) - (b.Y-a.Y)*(c.X-a.X) }
	n := len(ps)
	for i := range n {
		for k := i + 2; k < n; k++ {
			if i == 0 && k == n-1 {
				continue
			}
			a, b, c, d := ps[i], ps[i+1], ps[k], ps[(k+1)%n]
			if turn(a, b, c)*turn(a, b, d) < -1e-12 && turn(c, d, a)*turn(c, d, b) < -1e-12 {
				t.Errorf("outline %v crosses itself", ps)
			}
		}
	}
}

// BenchmarkApply times what a sizing does for every design before any stability analysis.
func BenchmarkApply(b *testing.B) {
	for _, bb := range []struct {
		name    string
		request Request
	}{
		{"regrade", request("regrade", nil, 3, 0)},
		{"berm", request("berm", fillOf(sandFill), 2.5, 6, 2)},
		{"trench drains", request("trench_drains", nil, 3, 6, 0.6, 0.6, nan, nan)},
	} {
		b.Run(bb.name, func(b *testing.B) {
			j := cutting()
			r, err := Combine(j, []Request{bb.request})
			if err != nil {
				b.Fatal(err)
			}
			start, x := Start(j), bb.request.Fixed()
			b.ReportAllocs()
			for b.Loop() {
				r.Apply(j, start, x)
			}
		})
	}
}
