package remedies

import (
	"math"
	"testing"

	"standfast/lem"
	"standfast/optimize"
)

// Soils of the test cutting.
const (
	clay = iota
	stiffClay
	sandFill
	rockfill
	lightFill
)

// cutting returns an invented cutting: 9 m high at 1V:2.5H with level ground behind the crest at x = 30 and beyond the toe at 52.5.
func cutting() *Job {
	phi := 25 * math.Pi / 180
	ground := lem.Profile{{X: 0, Y: 109}, {X: 30, Y: 109}, {X: 52.5, Y: 100}, {X: 80, Y: 100}}
	return &Job{
		Title:  "test cutting (invented)",
		Length: 80,
		Section: lem.Section{
			Ground: ground,
			Soils: []lem.Soil{
				clay:      {Name: "clay", UnitWeight: 19, Cohesion: 3, Friction: phi, Undrained: &lem.UndrainedStrength{Strength: 35}},
				stiffClay: {Name: "stiff clay", UnitWeight: 20, Cohesion: 4, Friction: phi, Undrained: &lem.UndrainedStrength{Strength: 60}},
				sandFill:  {Name: "sand fill", UnitWeight: 19.5, Friction: 0.61},
				rockfill:  {Name: "rockfill", UnitWeight: 20, Friction: 0.7, FreeDraining: true},
				lightFill: {Name: "light fill", UnitWeight: 6, Friction: 0.6},
			},
			Strata: []lem.Stratum{
				{Soil: clay, Top: ground},
				{Soil: stiffClay, Top: lem.Profile{{X: 0, Y: 106}, {X: 30, Y: 105.5}, {X: 52.5, Y: 97.5}, {X: 80, Y: 97.3}}},
			},
		},
		Crest: lem.Point{X: 30, Y: 109}, Toe: lem.Point{X: 52.5, Y: 100},
		Clay: []bool{true, true, false, false, false},
		Waters: []WaterLine{
			{Name: "high", Line: lem.Profile{{X: 0, Y: 107.6}, {X: 30, Y: 106.8}, {X: 52.5, Y: 100}, {X: 80, Y: 99.5}}},
			{Name: "deep", Artesian: true, Line: lem.Profile{{X: 0, Y: 108}, {X: 80, Y: 104}}},
		},
		Situations: []Situation{
			{Name: "high water", Water: 0, RequiredFS: 1.2, DrainsWorking: 1},
			{Name: "drains clogged", Water: 0, RequiredFS: 1.1, DrainsWorking: 0.5},
			{Name: "artesian", Water: 1, RequiredFS: 1.2, DrainsWorking: 1},
			{Name: "dry", Water: -1, RequiredFS: 1.3, DrainsWorking: 1},
		},
		Stage:    StageSettings{Given: true, Water: 0, RequiredFS: 1.1},
		MinDepth: 1,
	}
}

// mirrorJob returns the job reflected about x = 0.
func mirrorJob(j *Job) *Job {
	m := *j
	m.Section.Ground = j.Section.Ground.Mirror()
	m.Section.Strata = make([]lem.Stratum, len(j.Section.Strata))
	for i, s := range j.Section.Strata {
		m.Section.Strata[i] = lem.Stratum{Soil: s.Soil, Top: s.Top.Mirror()}
	}
	m.Section.Placed = make([]lem.Body, len(j.Section.Placed))
	for i, b := range j.Section.Placed {
		m.Section.Placed[i] = lem.Body{Soil: b.Soil, Outline: mirrorPoints(b.Outline)}
	}
	m.Crest.X, m.Toe.X = -j.Crest.X, -j.Toe.X
	m.Waters = make([]WaterLine, len(j.Waters))
	for i, w := range j.Waters {
		m.Waters[i] = WaterLine{Name: w.Name, Artesian: w.Artesian, Line: w.Line.Mirror()}
	}
	m.Limits.Left, m.Limits.Right = mirrorFence(j.Limits.Right), mirrorFence(j.Limits.Left)
	m.Limits.KeepClear = nil
	for _, k := range j.Limits.KeepClear {
		k.FromX, k.ToX = -k.ToX, -k.FromX
		m.Limits.KeepClear = append(m.Limits.KeepClear, k)
	}
	m.Limits.MaxLevels = nil
	for _, l := range j.Limits.MaxLevels {
		l.FromX, l.ToX = -l.ToX, -l.FromX
		m.Limits.MaxLevels = append(m.Limits.MaxLevels, l)
	}
	return &m
}

func mirrorFence(f *Fence) *Fence {
	if f == nil {
		return nil
	}
	return &Fence{Name: f.Name, X: -f.X}
}

func mirrorPoints(ps []lem.Point) []lem.Point {
	out := make([]lem.Point, len(ps))
	for i, p := range ps {
		out[len(ps)-1-i] = lem.Point{X: -p.X, Y: p.Y}
	}
	return out
}

// request returns a request of fixed sizes; NaN, or sizes that end early, leave optional parameters out.
func request(kind string, soils map[string]int, x ...float64) Request {
	k, ok := Find(kind)
	if !ok {
		panic("no kind " + kind)
	}
	r := DefaultRequest(&k)
	r.Soils = soils
	for i, p := range k.Parameters {
		r.Axes[i] = optimize.Axis{}
		if i < len(x) && !math.IsNaN(x[i]) {
			r.Axes[i] = optimize.Axis{Name: p.Name, Min: x[i], Max: x[i]}
		}
	}
	return r
}

// apply returns the job with the works of requests of fixed sizes.
func apply(t testing.TB, j *Job, rs ...Request) *Proposal {
	t.Helper()
	xs := make([][]float64, len(rs))
	for i := range rs {
		xs[i] = rs[i].Fixed()
	}
	p, err := Apply(j, rs, xs)
	if err != nil {
		t.Fatal(err)
	}
	return p
}

// near fails the test unless got is within tol of want.
func near(t testing.TB, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s = %.10g, want %.10g within %g", what, got, want, tol)
	}
}

// fillOf is the choice of a fill soil.
func fillOf(soil int) map[string]int { return map[string]int{"fill": soil} }

var nan = math.NaN()
