package lem

import (
	"math"
	"testing"
)

// degree turns degrees into radians.
const degree = math.Pi / 180

// compiled returns the model of a section in a situation.
func compiled(t testing.TB, s *Section, sit *Situation) *Model {
	t.Helper()
	var m Model
	if err := m.Compile(s, sit); err != nil {
		t.Fatal(err)
	}
	return &m
}

// uniform is a section of one soil.
func uniform(ground Profile, soil Soil) *Section {
	return &Section{Ground: ground, Soils: []Soil{soil}, Strata: []Stratum{{Soil: 0, Top: ground}}}
}

// face is a plane slope of the given height and inclination that falls to the right; its toe is at (0,0). Level ground of length run lies
// before and behind it.
func face(height, beta, run float64) Profile {
	back := height / math.Tan(beta)
	return Profile{{-back - run, height}, {-back, height}, {0, 0}, {run, 0}}
}

// within reports whether got is want to a relative tolerance.
func within(got, want, rel float64) bool { return math.Abs(got-want) <= rel*math.Abs(want) }

// evaluate returns the result of a slip and fails the test unless it converged.
func evaluate(t testing.TB, m *Model, s Slip, o Setting) Result {
	t.Helper()
	var ws Workspace
	r := m.FS(&ws, &s, o)
	if r.Status != Converged {
		t.Fatalf("%v on %+v: %v", o.Method, s, r.Status)
	}
	return r
}

// mirrored returns the section and situation reflected about x = 0.
func mirrored(s *Section, sit *Situation) (*Section, *Situation) {
	return mapped(s, sit, func(p Point) Point { return Point{-p.X, p.Y} }, true)
}

// moved returns the section and situation shifted.
func moved(s *Section, sit *Situation, dx, dy float64) (*Section, *Situation) {
	return mapped(s, sit, func(p Point) Point { return Point{p.X + dx, p.Y + dy} }, false)
}

// scaled returns the section and situation with every length multiplied by k, and cohesion, undrained strength and surcharge with it.
func scaled(s *Section, sit *Situation, k float64) (*Section, *Situation) {
	a, b := mapped(s, sit, func(p Point) Point { return Point{p.X * k, p.Y * k} }, false)
	for i := range a.Soils {
		a.Soils[i].Cohesion *= k
		if u := a.Soils[i].Undrained; u != nil {
			u.Strength *= k
			for j := range u.Points {
				u.Points[j].Strength *= k
			}
		}
	}
	for i := range a.Loads {
		a.Loads[i].Pressure *= k
	}
	if d := b.Water.Drains; d != nil {
		d.Fade *= k
	}
	return a, b
}

// mapped returns a deep copy whose points are mapped; turn says that left and right change places.
func mapped(s *Section, sit *Situation, f func(Point) Point, turn bool) (*Section, *Situation) {
	line := func(p Profile) Profile {
		if p == nil {
			return nil
		}
		q := make(Profile, len(p))
		for i, a := range p {
			j := i
			if turn {
				j = len(p) - 1 - i
			}
			q[j] = f(a)
		}
		return q
	}
	span := func(a, b float64) (float64, float64) {
		x0, x1 := f(Point{X: a}).X, f(Point{X: b}).X
		return min(x0, x1), max(x0, x1)
	}
	out := &Section{Ground: line(s.Ground), FirmBase: line(s.FirmBase)}
	for _, soil := range s.Soils {
		if u := soil.Undrained; u != nil {
			c := *u
			c.Datum, c.Points = line(u.Datum), nil
			for _, p := range u.Points {
				q := f(Point{p.X, p.Y})
				c.Points = append(c.Points, StrengthPoint{q.X, q.Y, p.Strength})
			}
			soil.Undrained = &c
		}
		out.Soils = append(out.Soils, soil)
	}
	for _, st := range s.Strata {
		out.Strata = append(out.Strata, Stratum{st.Soil, line(st.Top)})
	}
	for _, b := range s.Placed {
		out.Placed = append(out.Placed, Body{b.Soil, line(b.Outline)})
	}
	for _, l := range s.Loads {
		l.FromX, l.ToX = span(l.FromX, l.ToX)
		out.Loads = append(out.Loads, l)
	}
	water := &Situation{Name: sit.Name, Undrained: sit.Undrained, Kh: sit.Kh}
	w := sit.Water
	w.Line, w.Free = line(w.Line), nil
	w.FreeDrainingLevel = f(Point{Y: w.FreeDrainingLevel}).Y
	for _, free := range sit.Water.Free {
		a, b := span(free.FromX, free.ToX)
		w.Free = append(w.Free, FreeWater{f(Point{Y: free.Level}).Y, a, b})
	}
	if d := w.Drains; d != nil {
		c := Drawdown{Invert: line(d.Invert), Fade: d.Fade, Ratio: append([]float64(nil), d.Ratio...)}
		if turn {
			for i, j := 0, len(c.Ratio)-1; i < j; i, j = i+1, j-1 {
				c.Ratio[i], c.Ratio[j] = c.Ratio[j], c.Ratio[i]
			}
		}
		w.Drains = &c
	}
	water.Water = w
	return out, water
}

// mappedSlip returns the slip with its points mapped and its radius multiplied by k.
func mappedSlip(s Slip, f func(Point) Point, k float64, turn bool) Slip {
	out := Slip{Kind: s.Kind, Centre: f(s.Centre), Radius: s.Radius * k}
	for i := range s.Nodes {
		j := i
		if turn {
			j = len(s.Nodes) - 1 - i
		}
		out.Nodes = append(out.Nodes, f(s.Nodes[j]))
	}
	return out
}
