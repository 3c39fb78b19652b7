package casefile

import (
	"strings"
	"testing"

	"pgregory.net/rapid"

	"standfast/lem"
)

// deduce returns the crest and toe that are deduced from a ground, or the fault.
func deduce(ground lem.Profile, d lem.Direction) (crest, toe lem.Point, fault string) {
	r := &reader{}
	b := &builder{reader: r, before: ground}
	b.job.Direction = d
	b.deduceSlope(value{})
	if len(r.faults) > 0 {
		return lem.Point{}, lem.Point{}, r.faults[0].Message
	}
	return b.job.Crest, b.job.Toe, ""
}

func TestDeduceSlope(t *testing.T) {
	bank := lem.Profile{{X: 0, Y: 10}, {X: 20, Y: 10}, {X: 30, Y: 15}, {X: 40, Y: 15}, {X: 51, Y: 10}, {X: 70, Y: 10}}
	cases := []struct {
		name       string
		ground     lem.Profile
		direction  lem.Direction
		crest, toe float64 // x
		fault      string
	}{
		{"plain cutting", lem.Profile{{X: 0, Y: 9.6}, {X: 30, Y: 9}, {X: 52.5, Y: 0}, {X: 75, Y: -0.2}}, 0, 30, 52.5, ""},
		{"bench in the face", lem.Profile{{X: 0, Y: 10}, {X: 10, Y: 10}, {X: 20, Y: 5}, {X: 24, Y: 5}, {X: 34, Y: 0}, {X: 50, Y: 0}}, 0, 10, 34, ""},
		{"hillside above", lem.Profile{{X: 0, Y: 20}, {X: 60, Y: 10}, {X: 80, Y: 0}, {X: 99, Y: 0}}, 0, 60, 80, ""},
		{"small wall below", lem.Profile{{X: 0, Y: 10}, {X: 20, Y: 0}, {X: 40, Y: 0}, {X: 40, Y: -1}, {X: 60, Y: -1}}, 0, 0, 20, ""},
		{"brook beyond", lem.Profile{{X: 0, Y: 16.5}, {X: 20, Y: 16.5}, {X: 33, Y: 10}, {X: 43, Y: 10}, {X: 45, Y: 8.4}, {X: 47, Y: 8.4}, {X: 49, Y: 9.9}, {X: 70, Y: 9.9}}, 0, 20, 33, ""},
		{"face to the left", lem.Profile{{X: 0, Y: 0}, {X: 20, Y: 0}, {X: 40, Y: 10}, {X: 60, Y: 10}}, 0, 40, 20, ""},
		{"surveyed in steps", lem.Profile{{X: 0, Y: 5}, {X: 10, Y: 5}, {X: 12, Y: 4.2}, {X: 13, Y: 4.1}, {X: 16, Y: 2.6}, {X: 17, Y: 2.62}, {X: 22, Y: 0}, {X: 40, Y: 0}}, 0, 10, 22, ""},
		{"two faces", bank, 0, 0, 0, "two faces could be meant"},
		{"two faces, one direction", bank, lem.RightwardOnly, 40, 51, ""},
		{"two faces, other direction", bank, lem.LeftwardOnly, 30, 20, ""},
		{"level", lem.Profile{{X: 0, Y: 1}, {X: 50, Y: 1}}, 0, 0, 0, "no face steeper"},
		{"gentle", lem.Profile{{X: 0, Y: 1}, {X: 50, Y: 3}}, 0, 0, 0, "no face steeper"},
		{"wall alone", lem.Profile{{X: 0, Y: 5}, {X: 20, Y: 5}, {X: 20, Y: 0}, {X: 50, Y: 0}}, 0, 0, 0, "vertical"},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			crest, toe, fault := deduce(c.ground, c.direction)
			if c.fault == "" && (fault != "" || crest.X != c.crest || toe.X != c.toe) {
				t.Errorf("crest %v, toe %v, fault %q; want x = %g and %g", crest, toe, fault, c.crest, c.toe)
			}
			if c.fault != "" && !strings.Contains(fault, c.fault) {
				t.Errorf("fault %q, want %q in it", fault, c.fault)
			}
		})
	}
}

// TestDeducedSlopeMirrors checks that a mirrored ground gives the mirrored slope, or the same kind of refusal.
func TestDeducedSlopeMirrors(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(2, 8).Draw(t, "n")
		ground := lem.Profile{{}}
		for range n {
			last := ground[len(ground)-1]
			dx := float64(rapid.IntRange(0, 20).Draw(t, "dx"))
			ground = append(ground, lem.Point{X: last.X + dx, Y: float64(rapid.IntRange(-10, 10).Draw(t, "y"))})
		}
		crest, toe, fault := deduce(ground, lem.EitherWay)
		crestM, toeM, faultM := deduce(ground.Mirror(), lem.EitherWay)
		if (fault == "") != (faultM == "") || crest != (lem.Point{X: -crestM.X, Y: crestM.Y}) || toe != (lem.Point{X: -toeM.X, Y: toeM.Y}) {
			t.Fatalf("%v: crest %v, toe %v, %q; mirrored %v, %v, %q", ground, crest, toe, fault, crestM, toeM, faultM)
		}
	})
}
