package lem

import (
	"context"
	"fmt"
	"math"
	"testing"
)

// benchSection is a slope of three strata with a water line, invented; n strata on request, evenly spaced.
func benchSection(strata int) (*Section, *Situation) {
	g := Profile{{-40, 12}, {0, 12}, {24, 0}, {64, 0}}
	s := &Section{Ground: g}
	for i := range strata {
		s.Soils = append(s.Soils, Soil{UnitWeight: 18 + 0.1*float64(i), Cohesion: 4, Friction: (24 + 0.3*float64(i)) * degree})
		top := Profile{{-40, 12 - 14*float64(i)/float64(strata)}, {64, 9 - 14*float64(i)/float64(strata)}}
		if i == 0 {
			top = g
		}
		s.Strata = append(s.Strata, Stratum{i, top})
	}
	return s, &Situation{Water: Water{Line: Profile{{-40, 9}, {0, 8}, {24, 0}, {64, -0.5}}}}
}

// benchSlip cuts all three strata and the water line.
func benchSlip() Slip { return Slip{Centre: Point{20, 22}, Radius: 24.5} }

func TestEvaluationsDoNotAllocate(t *testing.T) {
	s, sit := benchSection(3)
	s.Loads = []Surcharge{{FromX: -8, ToX: -2, Pressure: 10}, {FromX: -8, ToX: 4, Pressure: 10, Variable: true}}
	m := compiled(t, s, sit)
	circle := benchSlip()
	line := Slip{Kind: Polyline, Nodes: []Point{{-5, 10}, {0, 5}, {12, 0}, {22, -1}, {30, 1}}}
	var ws Workspace
	for _, method := range allMethods() {
		for _, slip := range []*Slip{&circle, &line} {
			o := Setting{Method: method, Slices: 30}
			if n := testing.AllocsPerRun(100, func() { m.FS(&ws, slip, o) }); n != 0 {
				t.Errorf("%v on kind %d: %v allocations an evaluation, want none", method, slip.Kind, n)
			}
		}
	}
}

// plainLine gives the levels of a line at rising x by walking along it.
type plainLine struct {
	p Profile
	i int
}

func (l *plainLine) at(x float64) float64 {
	for l.i+2 < len(l.p) && x > l.p[l.i+1].X {
		l.i++
	}
	a, b := l.p[l.i], l.p[l.i+1]
	return a.Y + (b.Y-a.Y)*(x-a.X)/(b.X-a.X)
}

// plainSlice is what the plain loop's iteration needs of a slice.
type plainSlice struct{ sin, cos, tan, frees, w float64 }

// plainBishop is Bishop's method on three strata with a water line as one would write it by hand for one section: no drains, loads, free water,
// parts or admissibility, slices of equal width, F by fixed-point iteration.
func plainBishop(lines *[4]plainLine, soils []Soil, tans []float64, c Point, r, x0, x1 float64, buf []plainSlice) float64 {
	for i := range lines {
		lines[i].i = 0
	}
	b := (x1 - x0) / float64(len(buf))
	var driving float64
	for i := range buf {
		x := x0 + (float64(i)+0.5)*b
		sin := (c.X - x) / r
		cos := math.Sqrt(1 - sin*sin)
		y := c.Y - r*cos
		top, w, k := lines[0].at(x), 0.0, 0
		for j := 1; j < 3; j++ {
			next := lines[j].at(x)
			if y >= next {
				break
			}
			w += (top - min(next, top)) * soils[k].UnitWeight
			top, k = min(next, top), j
		}
		w = (w + (top-y)*soils[k].UnitWeight) * b
		u := GammaW * max(0, lines[3].at(x)-y)
		buf[i] = plainSlice{sin, cos, tans[k], soils[k].Cohesion*b + (w-u*b)*tans[k], w}
		driving += w * sin
	}
	f := 1.0
	for range 50 {
		var sum float64
		for i := range buf {
			s := &buf[i]
			sum += s.frees / (s.cos + s.sin*s.tan/f)
		}
		next := sum / driving
		if math.Abs(next-f) < 1e-6 {
			return next
		}
		f = next
	}
	return math.NaN()
}

// plain prepares the plain loop for the section of the benchmarks.
func plain(t testing.TB) (run func() float64, engine func() float64) {
	s, sit := benchSection(3)
	m := compiled(t, s, sit)
	slip := benchSlip()
	r := evaluate(t, m, slip, Setting{Method: Bishop, Slices: 30})
	var lines [4]plainLine
	var tans []float64
	for i := range s.Strata {
		lines[i].p = s.Strata[i].Top
		tans = append(tans, math.Tan(s.Soils[i].Friction))
	}
	lines[3].p = sit.Water.Line
	buf := make([]plainSlice, 30)
	ws := new(Workspace)
	run = func() float64 {
		return plainBishop(&lines, s.Soils, tans, slip.Centre, slip.Radius, r.From.X, r.To.X, buf)
	}
	engine = func() float64 { return m.FS(ws, &slip, Setting{Method: Bishop, Slices: 30}).F }
	return run, engine
}

// TestPlainLoopSolvesTheSame sees that the benchmark's two sides do the same work.
func TestPlainLoopSolvesTheSame(t *testing.T) {
	run, engine := plain(t)
	if a, b := run(), engine(); !within(a, b, 0.005) {
		t.Errorf("plain loop %.5f, engine %.5f", a, b)
	}
}

// BenchmarkBishop times one evaluation, 30 slices, three strata and a water line, beside the plain loop.
func BenchmarkBishop(b *testing.B) {
	run, engine := plain(b)
	b.Run("engine", func(b *testing.B) {
		b.ReportAllocs()
		for b.Loop() {
			engine()
		}
	})
	b.Run("plain", func(b *testing.B) {
		b.ReportAllocs()
		for b.Loop() {
			run()
		}
	})
}

func BenchmarkEveryMethod(b *testing.B) {
	s, sit := benchSection(3)
	m := compiled(b, s, sit)
	slip := benchSlip()
	for _, method := range allMethods() {
		b.Run(method.String(), func(b *testing.B) {
			var ws Workspace
			b.ReportAllocs()
			for b.Loop() {
				m.FS(&ws, &slip, Setting{Method: method, Slices: 30})
			}
		})
	}
}

func BenchmarkSlices(b *testing.B) {
	s, sit := benchSection(3)
	m := compiled(b, s, sit)
	slip := benchSlip()
	for _, n := range []int{15, 30, 60, 120, 240} {
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			var ws Workspace
			b.ReportAllocs()
			for b.Loop() {
				m.FS(&ws, &slip, Setting{Method: Bishop, Slices: n})
			}
		})
	}
}

func BenchmarkStrata(b *testing.B) {
	for _, n := range []int{1, 3, 5, 10, 20} {
		s, sit := benchSection(n)
		m := compiled(b, s, sit)
		slip := benchSlip()
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			var ws Workspace
			b.ReportAllocs()
			for b.Loop() {
				m.FS(&ws, &slip, Setting{Method: Bishop, Slices: 30})
			}
		})
	}
}

func BenchmarkCompile(b *testing.B) {
	for _, n := range []int{1, 3, 10, 20} {
		s, sit := benchSection(n)
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			var m Model
			b.ReportAllocs()
			for b.Loop() {
				if err := m.Compile(s, sit); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

func BenchmarkCircleSearch(b *testing.B) {
	s, sit := benchSection(3)
	m := compiled(b, s, sit)
	for _, sampler := range []Sampler{ByDaylight, ByCentre} {
		b.Run([]string{"by daylight", "by centre"}[sampler], func(b *testing.B) {
			b.ReportAllocs()
			trials := 0
			for b.Loop() {
				found, err := m.Search(context.Background(), SearchOptions{Sampler: sampler, MinDepth: 1})
				if err != nil {
					b.Fatal(err)
				}
				trials = found.Trials
			}
			b.ReportMetric(float64(trials), "trials/op")
		})
	}
}
