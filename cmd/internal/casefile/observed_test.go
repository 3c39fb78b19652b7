package casefile

import (
	"errors"
	"strings"
	"testing"

	"standfast/lem"
)

const observedCase = `title: Slid
length: 20
ground: [[0, 56.2], [20, 56.0], [32, 50.0], [55, 49.8]]
soils:
  clay: {unit_weight: 19.0, drained: {cohesion: 2, friction: 24}, undrained: {strength: 40}} # as tested
  "till: stiff":
    unit_weight: 20
    drained:
      friction: 30  # peak
      cohesion: 5.5
strata: [{soil: clay, top: ground}, {soil: "till: stiff", top: [[0, 50], [55, 45]]}]
situations:
  - {name: dry, water: none, required_fs: 1.3}
  - {name: wet season, water: none, required_fs: 1.2}
`

// TestObservedSlip reads a slip that has happened in both forms.
func TestObservedSlip(t *testing.T) {
	c, err := Parse("slid.yaml", []byte(observedCase+"observed_slip: {line: [[18, 56], [24, 51], [33, 49.9]], situation: wet season}\n"))
	if err != nil {
		t.Fatal(err)
	}
	if o := c.Job.Observed; o == nil || o.Slip.Kind != lem.Polyline || len(o.Slip.Nodes) != 3 || o.Situation != 1 {
		t.Errorf("read as %+v", o)
	}
	c, err = Parse("slid.yaml", []byte(observedCase+"observed_slip: {circle: {centre: [30, 62], radius: 13}}\n"))
	if err != nil {
		t.Fatal(err)
	}
	if o := c.Job.Observed; o == nil || o.Slip.Kind != lem.Circle || o.Slip.Radius != 13 || o.Situation != 0 {
		t.Errorf("read as %+v", o)
	}
	if _, err = Parse("slid.yaml", []byte(observedCase+"observed_slip: {line: [[18, 60], [24, 58]]}\n")); err == nil || !strings.Contains(err.Error(), "no point of the slip lies below the ground") {
		t.Errorf("a slip in the air gives %v", err)
	}
}

// TestWithSoil changes a soil and leaves every other letter.
func TestWithSoil(t *testing.T) {
	number := func(v float64) *float64 { return &v }
	tests := []struct {
		name     string
		change   SoilChange
		old, new string
	}{
		{"in one line", SoilChange{Soil: "clay", Cohesion: number(0), Friction: number(22.123456)}, "{cohesion: 2, friction: 24}", "{cohesion: 0, friction: 22.1235}"},
		{"in a block", SoilChange{Soil: "till: stiff", Cohesion: number(1.0 / 3), Friction: number(28)}, "friction: 30  # peak\n      cohesion: 5.5", "friction: 28  # peak\n      cohesion: 0.333333"},
		{"undrained", SoilChange{Soil: "clay", Strength: number(1e-9)}, "{strength: 40}", "{strength: 0.000000001}"},
		{"ru in one line", SoilChange{Soil: "clay", Ru: number(0.25)}, "clay: {unit_weight", "clay: {ru: 0.25, unit_weight"},
		{"ru in a block", SoilChange{Soil: "till: stiff", Ru: number(0.25)}, "stiff\":\n    unit_weight", "stiff\":\n    ru: 0.25\n    unit_weight"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			got, err := WithSoil([]byte(observedCase), &tt.change, "first\nsecond\x07")
			if err != nil {
				t.Fatal(err)
			}
			if want := "# first\n# second?\n" + strings.Replace(observedCase, tt.old, tt.new, 1); string(got) != want {
				t.Errorf("got\n%s\nwant\n%s", got, want)
			}
			if _, err := Parse("again.yaml", got); err != nil {
				t.Errorf("it cannot be read: %v", err)
			}
		})
	}
	ru := strings.Replace(observedCase, "clay: {", "clay: {ru: 0.1, ", 1)
	got, err := WithSoil([]byte(ru), &SoilChange{Soil: "clay", Ru: number(0.3)}, "")
	if err != nil || !strings.Contains(string(got), "clay: {ru: 0.3, ") {
		t.Errorf("ru in the place of another gives %v\n%s", err, got)
	}
	for _, change := range []SoilChange{{Soil: "sand", Cohesion: number(1)}, {Soil: "till: stiff", Strength: number(1)}} {
		if _, err := WithSoil([]byte(observedCase), &change, ""); !errors.Is(err, ErrNoPlace) {
			t.Errorf("%+v gives %v", change, err)
		}
	}
}
