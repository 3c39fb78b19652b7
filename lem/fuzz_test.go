package lem

import (
	"math"
	"math/rand/v2"
	"testing"
)

// decoder turns fuzzed bytes into numbers on a coarse grid, so that lines that touch, coincide or stand upright come up all the time.
type decoder struct{ data []byte }

func (d *decoder) next(n int) int {
	if len(d.data) == 0 {
		return 0
	}
	v := int(d.data[0])
	d.data = d.data[1:]
	return v % n
}

func (d *decoder) number(low, step float64, n int) float64 { return low + step*float64(d.next(n)) }

// line decodes a profile; points in the same place and vertical steps are legal.
func (d *decoder) line(points int) Profile {
	p := Profile{{d.number(-12, 1, 4), d.number(-4, 0.5, 24)}}
	for range 1 + d.next(points) {
		p = append(p, Point{p[len(p)-1].X + d.number(0, 1, 7), d.number(-4, 0.5, 24)})
	}
	return p
}

func (d *decoder) section() (*Section, *Situation) {
	s, sit := &Section{}, &Situation{}
	for range 1 + d.next(3) {
		s.Soils = append(s.Soils, Soil{
			UnitWeight: d.number(0, 10, 3), SaturatedUnitWeight: d.number(0, 11, 3), Cohesion: d.number(0, 5, 4),
			Friction: d.number(0, 15*degree, 4), HasRu: d.next(5) == 0, Ru: d.number(0, 0.3, 4), FreeDraining: d.next(5) == 0,
			Undrained: &UndrainedStrength{Strength: d.number(0, 20, 3), Gradient: d.number(0, 2, 2), Datum: Profile{{-5, 2}, {5, 1}}},
		})
		sit.Undrained = append(sit.Undrained, d.next(4) == 0)
	}
	s.Ground = d.line(6)
	s.Strata = []Stratum{{0, s.Ground}}
	for range d.next(3) {
		s.Strata = append(s.Strata, Stratum{d.next(len(s.Soils)), d.line(4)})
	}
	for range d.next(3) {
		b := Body{Soil: d.next(len(s.Soils))}
		for range 3 + d.next(3) {
			b.Outline = append(b.Outline, Point{d.number(-8, 1, 20), d.number(-4, 0.5, 24)})
		}
		s.Placed = append(s.Placed, b)
	}
	for range d.next(2) {
		x := d.number(-8, 1, 16)
		s.Loads = append(s.Loads, Surcharge{FromX: x, ToX: x + d.number(1, 1, 4), Pressure: d.number(0, 10, 4), Variable: d.next(2) == 0})
	}
	if d.next(3) == 0 {
		s.FirmBase = d.line(3)
	}
	switch d.next(4) {
	case 0:
		sit.Water.Line = d.line(4)
	case 1: // On the ground line itself.
		sit.Water.Line = s.Ground
	case 2:
		sit.Water.Line = d.line(2)
		invert := d.line(2)
		sit.Water.Drains = &Drawdown{Invert: invert, Ratio: make([]float64, len(invert)), Fade: d.number(0.5, 1, 3)}
		for i := range invert {
			sit.Water.Drains.Ratio[i] = d.number(0, 0.25, 5)
		}
	}
	if d.next(3) == 0 {
		sit.Water.Free = []FreeWater{{d.number(-4, 0.5, 24), -12, d.number(-8, 1, 40)}}
	}
	sit.Kh = d.number(0, 0.1, 3)
	return s, sit
}

func (d *decoder) slip() Slip {
	if d.next(4) == 0 {
		s := Slip{Kind: Polyline, Nodes: []Point{{d.number(-10, 1, 20), d.number(-4, 0.5, 24)}}}
		for range 1 + d.next(4) {
			s.Nodes = append(s.Nodes, Point{s.Nodes[len(s.Nodes)-1].X + d.number(1, 1, 6), d.number(-4, 0.5, 24)})
		}
		return s
	}
	if d.next(3) > 0 { // Through two points of the grid, as ground vertices are.
		x := d.number(-10, 1, 20)
		a, b := Point{x, d.number(-4, 0.5, 24)}, Point{x + d.number(1, 1, 12), d.number(-4, 0.5, 24)}
		c, r := arcThrough(a, b, d.number(0.1, 0.3, 6))
		return Slip{Centre: c, Radius: r}
	}
	return Slip{Centre: Point{d.number(-10, 1, 20), d.number(-2, 0.5, 40)}, Radius: d.number(0.5, 0.5, 40)}
}

// FuzzCompileAndSolve looks for a section or slip that makes the engine panic, run on, or give an F that is none.
func FuzzCompileAndSolve(f *testing.F) {
	f.Add([]byte{})
	f.Add([]byte("a vertical face, a bench, a stratum of no thickness and an arc through a vertex"))
	f.Add([]byte{0, 2, 1, 2, 2, 4, 1, 4, 1, 1, 1, 3, 0, 20, 4, 6, 20, 0, 8, 6, 8, 6, 8, 0, 0, 0, 2, 0, 2, 1, 1, 4, 20, 11, 8, 3})
	f.Add([]byte{1, 1, 1, 2, 2, 4, 1, 4, 1, 1, 1, 3, 2, 1, 1, 1, 2, 4, 1, 4, 1, 1, 0, 18, 5, 6, 18, 6, 6, 6, 6, 2, 1, 0, 6, 3, 6, 6, 1, 1, 1, 1, 1, 2, 1, 4, 18, 9, 6, 2})
	f.Fuzz(func(t *testing.T, data []byte) {
		if len(data) > 200 {
			return
		}
		d := &decoder{data}
		s, sit := d.section()
		var m Model
		if m.Compile(s, sit) != nil {
			return
		}
		var ws Workspace
		for range 3 {
			slip := d.slip()
			o := Setting{Slices: d.next(40), MinDepth: d.number(0, 0.5, 3)}
			for _, o.Method = range allMethods() {
				checkResult(t, m.FS(&ws, &slip, o), o)
			}
		}
	})
}

// TestDegenerateSections runs the fuzzed check on a fixed stream of bytes, and sees that it reaches every status.
func TestDegenerateSections(t *testing.T) {
	rng := rand.New(rand.NewPCG(7, 11))
	var ws Workspace
	seen := map[Status]int{}
	for range 4000 {
		data := make([]byte, 160)
		for i := range data {
			data[i] = byte(rng.UintN(256))
		}
		d := &decoder{data}
		s, sit := d.section()
		var m Model
		if m.Compile(s, sit) != nil {
			continue
		}
		slip := d.slip()
		for _, method := range allMethods() {
			o := Setting{Method: method}
			r := m.FS(&ws, &slip, o)
			checkResult(t, r, o)
			seen[r.Status]++
		}
	}
	for st := Missed; st <= NotConverged; st++ {
		if seen[st] < 20 {
			t.Errorf("%v came up %d times only: %v", st, seen[st], seen)
		}
	}
}

func checkResult(t *testing.T, r Result, o Setting) {
	t.Helper()
	switch r.Status {
	case Converged:
		if !(r.F > 0) || math.IsInf(r.F, 0) || !(r.From.X < r.To.X) || r.Slices < MinSlices || r.Depth < o.MinDepth || math.IsNaN(r.Lambda) {
			t.Fatalf("%v: converged to %+v", o.Method, r)
		}
		if !math.IsNaN(r.Screen) {
			t.Fatalf("%v: converged and has a screen: %+v", o.Method, r)
		}
	case Missed, Inadmissible, NotConverged:
		if !math.IsNaN(r.F) {
			t.Fatalf("%v: %v and F = %v", o.Method, r.Status, r.F)
		}
	default:
		t.Fatalf("%v: unknown status %d", o.Method, r.Status)
	}
	if math.IsNaN(r.From.X+r.From.Y+r.To.X+r.To.Y+r.Depth) || math.IsInf(r.Depth, 0) {
		t.Fatalf("%v: ends or depth are no numbers: %+v", o.Method, r)
	}
}
