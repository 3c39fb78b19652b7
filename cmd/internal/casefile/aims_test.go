package casefile

import (
	"math"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/google/go-cmp/cmp/cmpopts"

	"standfast/lem"
	"standfast/remedies"
)

// TestAimsAreFilled compares what is read of objective, sensitivity, combinations and known slips with the file, number by number.
func TestAimsAreFilled(t *testing.T) {
	c, err := Parse("aims.yaml", []byte(small+`
objective: carbon
economics: {carbon: {cut: 2}}
sensitivity: {cohesion: 20%, friction: 2, undrained: 0.25, unit_weight: 5%, water: 0.5, drains: 30%}
known_slips:
  - {line: [[18, 10], [22, 6], [31, 5]], cohesion: 1, friction: 12}
  - {line: [[19, 10], [33, 5]], friction: 0}
remedies: {regrade: {}, trench_drains: {effectiveness: 0.5}, unload: {}}
combinations: [[unload, regrade], [regrade, trench_drains, unload]]
`))
	if err != nil {
		t.Fatal(err)
	}
	j := c.Job
	radians := func(degrees float64) float64 { return degrees * math.Pi / 180 }
	for name, pair := range map[string][2]any{
		"objective": {j.Objective, remedies.LeastCarbon},
		"sensitivity": {j.Swings, remedies.Swings{
			Cohesion: 0.2, Friction: radians(2), Undrained: 0.25, UnitWeight: 0.05, Water: 0.5, DrainsEffect: 0.3,
		}},
		"combinations": {j.Combinations, [][]string{{"unload", "regrade"}, {"regrade", "trench_drains", "unload"}}},
		"known slips": {j.Section.Known, []lem.KnownSlip{
			{Line: lem.Profile{{X: 18, Y: 10}, {X: 22, Y: 6}, {X: 31, Y: 5}}, Cohesion: 1, Friction: radians(12)},
			{Line: lem.Profile{{X: 19, Y: 10}, {X: 33, Y: 5}}},
		}},
	} {
		if diff := cmp.Diff(pair[1], pair[0], cmpopts.EquateApprox(0, 1e-12)); diff != "" {
			t.Errorf("%s (-want +got):\n%s", name, diff)
		}
	}
}

// TestKnownSlipDugAway: a known slip that works have dug away is not written, since a reader would refuse it.
func TestKnownSlipDugAway(t *testing.T) {
	w := &writer{section: &lem.Section{
		Ground: lem.Profile{{X: 0, Y: 5}, {X: 50, Y: 5}},
		Known: []lem.KnownSlip{
			{Line: lem.Profile{{X: 10, Y: 8}, {X: 20, Y: 6}}},
			{Line: lem.Profile{{X: 10, Y: 8}, {X: 20, Y: 4}}},
		},
	}}
	if n := len(w.knownSlips().Content); n != 1 {
		t.Errorf("%d known slips written, want the one that still lies in the ground", n)
	}
	if _, err := Parse("gone.yaml", []byte(small+"known_slips: [{line: [[18, 12], [30, 9]], friction: 12}]\n")); err == nil || !strings.Contains(err.Error(), "below the ground") {
		t.Errorf("a known slip in the air: %v", err)
	}
}
