package remedies

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"standfast/lem"
)

// fs returns the factor of safety of a slip in a check.
func fs(t testing.TB, c *Check, slip lem.Slip) lem.Result {
	t.Helper()
	var m lem.Model
	var ws lem.Workspace
	if err := m.Compile(c.Section, &c.Situation); err != nil {
		t.Fatal(err)
	}
	return m.FS(&ws, &slip, lem.Setting{Method: lem.Bishop})
}

// circleThrough returns the circle through two points with its centre the given distance above the middle of their chord.
func circleThrough(a, b lem.Point, rise float64) lem.Slip {
	dx, dy := b.X-a.X, b.Y-a.Y
	l := math.Hypot(dx, dy)
	c := lem.Point{X: (a.X+b.X)/2 - dy/l*rise, Y: (a.Y+b.Y)/2 + dx/l*rise}
	return lem.Slip{Kind: lem.Circle, Centre: c, Radius: math.Hypot(a.X-c.X, a.Y-c.Y)}
}

// TestBermBeyondExit checks that a berm wholly beyond where a fixed slip leaves the ground does nothing to it (statics: no slice has
// changed).
func TestBermBeyondExit(t *testing.T) {
	j := cutting()
	j.Clay = make([]bool, 5)
	slip := circleThrough(lem.Point{X: 26, Y: 109}, lem.Point{X: 46, Y: 102.6}, 12)
	before := Checks(j, Start(j))
	after := Checks(j, apply(t, j, request("berm", fillOf(sandFill), 2, 5, 2)))
	for i := range before {
		a, b := fs(t, &before[i], slip), fs(t, &after[i], slip)
		if a.Status != lem.Converged || math.Abs(a.F-b.F) > 1e-12 {
			t.Errorf("%s: F = %v before, %v after", before[i].Name, a, b)
		}
	}
}

// TestEngineTakesEveryProposal compiles every check of random works in both facings and compares a fixed slip between them.
func TestEngineTakesEveryProposal(t *testing.T) {
	compared := 0
	rapid.Check(t, func(t *rapid.T) {
		j := anyJob(t)
		first, second := anyPair(t)
		m := mirrorJob(j)
		// The ends are off the vertices of the ground: through one, rounding would decide which slices it has.
		exit := j.Toe.X + rapid.Float64Range(0.1, 5).Draw(t, "exit")
		slip := circleThrough(lem.Point{X: rapid.Float64Range(11, 18).Draw(t, "head"), Y: 10}, lem.Point{X: exit, Y: j.Section.Ground.At(exit)}, rapid.Float64Range(5, 40).Draw(t, "rise"))
		mirrored := slip
		mirrored.Centre.X = -slip.Centre.X
		requests := []Request{first, second}
		xs := [][]float64{first.Fixed(), second.Fixed()}
		a, err := Apply(j, requests, xs)
		if err != nil {
			t.Fatal(err)
		}
		b, err := Apply(m, requests, xs)
		if err != nil {
			t.Fatal(err)
		}
		ca, cb := Checks(j, a), Checks(m, b)
		for i := range ca {
			var models [2]lem.Model
			var ws lem.Workspace
			for k, c := range []Check{ca[i], cb[i]} {
				if err := models[k].Compile(c.Section, &c.Situation); err != nil {
					t.Fatalf("%s: %v", c.Name, err)
				}
			}
			ra := models[0].FS(&ws, &slip, lem.Setting{Method: lem.Ordinary, Slices: 200})
			rb := models[1].FS(&ws, &mirrored, lem.Setting{Method: lem.Ordinary, Slices: 200})
			if ra.Status != lem.Converged || rb.Status != lem.Converged || ra.F > 100 {
				continue // the mirror property of the engine itself is tested with it; at F > 100 nothing drives the slip
			}
			compared++
			if math.Abs(ra.F-rb.F) > 2e-3*ra.F { // rounding may add a slice
				t.Errorf("%s: F = %+v and %+v", ca[i].Name, ra, rb)
			}
		}
	})
	if compared < 100 {
		t.Errorf("only %d slips compared", compared)
	}
}
