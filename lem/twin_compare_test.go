package lem

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// TestEngineAgreesWithTwin compares the engine with its twin on random layered sections.
func TestEngineAgreesWithTwin(t *testing.T) {
	counts := map[Method]int{}
	rapid.Check(t, func(t *rapid.T) {
		method := rapid.SampledFrom([]Method{Ordinary, Bishop, Spencer}).Draw(t, "method")
		s, sit := drawSection(t)
		slip := drawCircle(t, s)
		var m Model
		if err := m.Compile(s, sit); err != nil {
			t.Fatal(err)
		}
		var ws Workspace
		r := m.FS(&ws, &slip, Setting{Method: method, Slices: 240})
		if r.Status != Converged {
			return
		}
		ts := twinSlices(s, sit, slip, r.From.X, r.To.X, twinCuts, twinDown, r.Leftward)
		if twinDelicate(ts, slip, r) {
			return
		}
		counts[method]++
		if f := twinF(t, ts, slip, method, r); !within(r.F, f, twinTol) {
			t.Fatalf("%v: engine %.5f, twin %.5f on %+v", method, r.F, f, r)
		}
	})
	for _, method := range []Method{Ordinary, Bishop, Spencer} {
		if counts[method] < 5 {
			t.Errorf("%v was compared %d times only", method, counts[method])
		}
	}
}

// TestPartsAgreeWithTwin draws arcs that cut the ground more than once: F is that of the lowest part, and the parts are those of the twin.
func TestPartsAgreeWithTwin(t *testing.T) {
	several := 0
	rapid.Check(t, func(t *rapid.T) {
		ground := Profile{{-30, 9}, {0, 9}}
		for i := range 3 { // Three faces with benches that rise a little outwards.
			last := ground[len(ground)-1]
			x := last.X + between(t, 3, 7, "run")
			y := last.Y - 3
			ground = append(ground, Point{x, y}, Point{x + between(t, 3, 8, "bench"), y + 0.1*float64(i)})
		}
		ground = append(ground, Point{ground[len(ground)-1].X + 30, ground[len(ground)-1].Y})
		s := uniform(ground, Soil{UnitWeight: 19, Cohesion: 8, Friction: 25 * degree})
		// Never through a vertex: whether an arc that touches one is cut there is a matter of rounding.
		x0, x1 := between(t, -5, 6, "head")+0.0037, between(t, 12, 28, "exit")+0.0041
		centre, r := arcThrough(Point{x0, s.Ground.At(x0)}, Point{x1, s.Ground.At(x1)}, between(t, 0.05, 0.7, "half angle"))
		slip := Slip{Centre: centre, Radius: r}
		var m Model
		if err := m.Compile(s, &Situation{}); err != nil {
			t.Fatal(err)
		}
		var ws Workspace
		got := m.FS(&ws, &slip, Setting{Method: Bishop, Slices: 240})
		parts := twinParts(s, slip)
		if len(parts) > 1 {
			several++
		}
		lowest := math.Inf(1)
		for _, p := range parts {
			for _, left := range []bool{false, true} { // The uphill one has a negative moment.
				ts := twinSlices(s, &Situation{}, slip, p.From, p.To, 400, 20, left)
				if moment := twinMoment(ts, slip.Centre, slip.Radius); moment > 0 {
					if f, least := twinBishop(ts, moment); least >= 0.2 {
						lowest = min(lowest, f)
					}
				}
			}
		}
		if lowest > 100 { // A sliver of hardly any weight, or none at all.
			if got.Status == Converged && got.F < 50 {
				t.Fatalf("engine %.4f, the twin finds no slip", got.F)
			}
			return
		}
		if !within(got.F, lowest, 0.003) {
			t.Fatalf("engine %.5f (%v), twin %.5f, lowest of %d parts", got.F, got.Status, lowest, len(parts))
		}
	})
	if several < 10 {
		t.Errorf("only %d arcs had several parts", several)
	}
}

// Resolution of the twin: its slices, its samples down a slice, and how far it may be from the engine for that.
const (
	twinCuts, twinDown = 2000, 100
	twinTol            = 0.002
)

// twinDelicate reports whether F says little about the engine: the driving moment is a small difference of large ones, or a denominator of
// the method is near zero on some slice, so that F hangs on where the slices lie.
func twinDelicate(ts []twinSlice, slip Slip, r Result) bool {
	var sum float64
	least := 1.0
	for _, t := range ts {
		sum += t.down() * math.Abs(t.sin)
		k := t.tan / r.F
		least = min(least, t.cos+t.sin*k, t.cos+t.sin*k+r.Lambda*(t.sin-t.cos*k))
	}
	return twinMoment(ts, slip.Centre, slip.Radius) < sum/4 || least < 0.4 || r.F > 10
}

// twinF solves the twin's slices by a method.
func twinF(t *rapid.T, ts []twinSlice, slip Slip, method Method, r Result) float64 {
	moment := twinMoment(ts, slip.Centre, slip.Radius)
	if method == Ordinary {
		return twinOrdinary(ts, moment)
	}
	if method == Bishop {
		f, _ := twinBishop(ts, moment)
		return f
	}
	f, _, ok := twinSpencer(ts, r.Lambda)
	if !ok {
		t.Fatalf("spencer: no root of the twin near lambda %.3f, engine F %.4f", r.Lambda, r.F)
	}
	return f
}

// TestGrazingArcIsMissed lets an arc touch the crest's edge: what it cuts off by rounding is no slip.
func TestGrazingArcIsMissed(t *testing.T) {
	const depth = 1e-9
	s := uniform(Profile{{-30, 8}, {0, 8}, {16, 0}, {46, 0}}, Soil{UnitWeight: 18, Friction: 30 * degree})
	m := compiled(t, s, &Situation{})
	var ws Workspace
	slip := Slip{Centre: Point{3, 18}, Radius: math.Hypot(3, 10) + depth}
	for _, method := range []Method{Ordinary, Bishop, Spencer} {
		if r := m.FS(&ws, &slip, Setting{Method: method}); r.Status != Missed {
			t.Errorf("%v: F = %v (%v) on a sliver %v m deep, want missed", method, r.F, r.Status, depth)
		}
	}
}

// TestSlicesAgreeWithTwin compares the weight of every slice and the pore pressure at its base with sums over the section.
func TestSlicesAgreeWithTwin(t *testing.T) {
	slices := 0
	rapid.Check(t, func(t *rapid.T) {
		s, sit := drawSection(t)
		slip := drawCircle(t, s)
		sit.Undrained = nil
		var m Model
		if err := m.Compile(s, sit); err != nil {
			t.Fatal(err)
		}
		var ws Workspace
		m.FS(&ws, &slip, Setting{Method: Ordinary})
		for i := range ws.n {
			sl := &ws.slice[i]
			if sl.b < 0.01 { // Where a vertical step is drawn out.
				continue
			}
			slices++
			const samples = 4000
			above := twinWeight(s, &sit.Water, sl.x, sl.y, samples)
			load := 0.0
			for _, l := range s.Loads {
				if sl.x > l.FromX && sl.x < l.ToX {
					load += l.Pressure
				}
			}
			// A sample may fall on either side of a boundary.
			tol := 10 * max(0.2, s.Ground.At(sl.x)-sl.y) / samples
			if got := sl.soilW / sl.b; math.Abs(got-above-load) > tol {
				t.Fatalf("slice at x = %.3f, base %.3f: %.4f kPa of ground and surcharge, twin %.4f", sl.x, sl.y, got, above+load)
			}
			soil := s.Soils[twinSoil(s, sl.x, sl.y)]
			u := GammaW * max(0, twinHead(s, &sit.Water, sl.x, sl.y)-sl.y)
			if soil.HasRu {
				u = soil.Ru * above
			}
			delta := sl.b / (slip.Radius * sl.cos)
			if got := sl.ul * sl.cos / sl.b; math.Abs(got-u) > u*delta*delta/10+tol {
				t.Fatalf("slice at x = %.3f, base %.3f: u = %.4f kPa, twin %.4f", sl.x, sl.y, got, u)
			}
		}
	})
	if slices < 500 {
		t.Errorf("only %d slices compared", slices)
	}
}
