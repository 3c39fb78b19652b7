package lem

import (
	"context"
	"math"
	"testing"
)

// plane is a section with a straight face and a known plane slip through the toe.
func plane(beta, dip float64, k KnownSlip) *Section {
	const height = 10.0
	s := uniform(face(height, beta, 20), Soil{UnitWeight: 20, Cohesion: 15, Friction: 25 * degree})
	k.Line = Profile{{-height / math.Tan(dip), height}, {0, 0}}
	s.Known = []KnownSlip{k}
	return s
}

// TestKnownPlane checks the closed form of a wedge on a plane: F = (c L + W cos(dip) tan phi)/(W sin(dip)), with the strength of the plane.
func TestKnownPlane(t *testing.T) {
	const height, beta, dip = 10.0, 50 * degree, 28 * degree
	weight := 20 * height * height / 2 * (1/math.Tan(dip) - 1/math.Tan(beta))
	length := height / math.Sin(dip)
	for _, k := range []KnownSlip{{Friction: 16 * degree}, {Cohesion: 4, Friction: 12 * degree}, {Cohesion: 20}} {
		m := compiled(t, plane(beta, dip, k), &Situation{})
		want := (k.Cohesion*length + weight*math.Cos(dip)*math.Tan(k.Friction)) / (weight * math.Sin(dip))
		for _, method := range []Method{Ordinary, Spencer, MorgensternPrice} {
			got := evaluate(t, m, Slip{Kind: Polyline, Nodes: m.known[0]}, Setting{Method: method})
			if !within(got.F, want, 1e-4) {
				t.Errorf("%v, %+v: F = %.5f, want %.5f (closed form)", method, k, got.F, want)
			}
		}
		found, err := m.Search(context.Background(), SearchOptions{})
		if err != nil {
			t.Fatal(err)
		}
		if a := lowestOf(&found, Polyline, Spencer); a == nil || !within(a.Result.F, want, 1e-4) {
			t.Errorf("%+v: the search did not give the known slip with F = %.4f: %+v", k, want, a)
		}
	}
}

// TestKnownSlipElsewhere checks that slips that do not run along the known surface keep their F.
func TestKnownSlipElsewhere(t *testing.T) {
	s := plane(45*degree, 25*degree, KnownSlip{Friction: 5 * degree})
	with := compiled(t, s, &Situation{})
	s.Known = nil
	without := compiled(t, s, &Situation{})
	for _, slip := range []Slip{
		{Kind: Circle, Centre: Point{0, 16}, Radius: 16.5},
		{Kind: Polyline, Nodes: []Point{{-16, 10}, {-12, 3}, {-4, -2}, {4, 0}}},
	} {
		a, b := evaluate(t, with, slip, Setting{Method: Spencer}).F, evaluate(t, without, slip, Setting{Method: Spencer}).F
		if !within(a, b, 2e-3) {
			t.Errorf("F = %.5f with a known surface that the slip crosses, %.5f without", a, b)
		}
	}
}

// TestKnownSlipShared checks that the search joins part of a known surface to an exit of its own: the surface runs out below the toe where
// nothing daylights, and a slip that leaves it must be found.
func TestKnownSlipShared(t *testing.T) {
	s := uniform(face(8, math.Atan(0.5), 30), Soil{UnitWeight: 19, Cohesion: 12, Friction: 24 * degree})
	s.Known = []KnownSlip{{Line: Profile{{-22, 8}, {-19, 3}, {-12, -1}, {4, -2}, {20, -2}, {24, 0}}, Friction: 11 * degree}}
	m := compiled(t, s, &Situation{})
	plain, err := m.Search(context.Background(), SearchOptions{MinDepth: 1})
	if err != nil {
		t.Fatal(err)
	}
	known := lowestOf(&plain, Polyline, Spencer)
	both, err := m.Search(context.Background(), SearchOptions{MinDepth: 1, Polylines: true})
	if err != nil {
		t.Fatal(err)
	}
	shared := lowestOf(&both, Polyline, Spencer)
	if known == nil || shared == nil {
		t.Fatal("no polyline found")
	}
	if !(shared.Result.F < 0.995*known.Result.F) || shared.Result.To.X > 20 {
		t.Errorf("F = %.4f on %v, and %.4f on the known surface", shared.Result.F, shared.Slip.Nodes, known.Result.F)
	}
	along := 0
	line := m.known[0]
	for _, p := range shared.Slip.Nodes {
		if math.Abs(polylineAt(line, p.X)-p.Y) < 1e-3 {
			along++
		}
	}
	if along < 3 {
		t.Errorf("only %d nodes of %v lie on the known surface", along, shared.Slip.Nodes)
	}
	kept := false // The known surface itself is reported all the same.
	for _, b := range both.Basins {
		kept = kept || b.Slip.Kind == Polyline && b.Result.F == known.Result.F
	}
	if !kept {
		t.Error("the known surface is missing beside the slip that shares it")
	}
}

// TestKnownSlipPore checks that the known surface carries the water of the situation where the soil acts undrained: closed form of a plane with a
// level water line.
func TestKnownSlipPore(t *testing.T) {
	const height, beta, dip = 10.0, 50 * degree, 28 * degree
	s := plane(beta, dip, KnownSlip{Friction: 20 * degree})
	s.Soils[0].Undrained = &UndrainedStrength{Strength: 80}
	const level = 4.0
	sit := &Situation{Undrained: []bool{true}, Water: Water{Line: Profile{{-100, level}, {100, level}}}}
	m := compiled(t, s, sit)
	weight := 20 * height * height / 2 * (1/math.Tan(dip) - 1/math.Tan(beta))
	wet := level / math.Sin(dip)
	uplift := GammaW * level / 2 * wet
	want := (weight*math.Cos(dip) - uplift) * math.Tan(20*degree) / (weight * math.Sin(dip))
	got := evaluate(t, m, Slip{Kind: Polyline, Nodes: m.known[0]}, Setting{Method: Spencer, Slices: 200})
	if !within(got.F, want, 1e-3) {
		t.Errorf("F = %.5f, want %.5f (closed form)", got.F, want)
	}
}
