package remedies

import (
	"math"
	"testing"

	"standfast/lem"
)

// TestElements checks the row in the section, its quantities and its effect on a fixed slip by hand: 120 kN each at 2.5 m is 48 kN/m, which by
// moments about the centre takes 48 (yc - y)/R off what drives.
func TestElements(t *testing.T) {
	slip := circleThrough(lem.Point{X: 26, Y: 109}, lem.Point{X: 54, Y: 100}, 18)
	for facing, j := range map[string]*Job{"right": cutting(), "left": mirrorJob(cutting())} {
		t.Run(facing, func(t *testing.T) {
			s := slip
			s.Centre.X *= j.Facing()
			before := Checks(j, Start(j))[0]
			p := apply(t, j, request("piles_or_nails", nil, 120, 2.5, 10, 9))
			if len(p.Violations) > 0 || len(p.Section.Restraints) != 1 {
				t.Fatalf("%v, %v", p.Violations, p.Section.Restraints)
			}
			r := p.Section.Restraints[0]
			near(t, "x", r.X, j.Facing()*42.5, 1e-12)
			near(t, "top", r.Top, 104, 1e-9)
			near(t, "bottom", r.Bottom, 95, 1e-9)
			near(t, "force", r.Force, 48, 1e-12)
			near(t, "number", p.Quantities.Elements, 0.4, 1e-12)
			near(t, "length", p.Quantities.ElementsM, 3.6, 1e-12)
			near(t, "earthworks", p.Quantities.Earthworks(), 0, 0)
			b := BillOf(j, &p.Quantities)
			near(t, "bill", item(t, &b, Element, noSoil).Total, 3.6*80, 1e-9)

			var m lem.Model
			if err := m.Compile(before.Section, &before.Situation); err != nil {
				t.Fatal(err)
			}
			d, err := m.Detail(&s, lem.Setting{Method: lem.Ordinary, Slices: 400})
			if err != nil {
				t.Fatal(err)
			}
			dip := r.X - s.Centre.X
			y := s.Centre.Y - math.Sqrt(s.Radius*s.Radius-dip*dip)
			var sin float64 // of the slice that the row is on: the force also presses on its base, by the Ordinary method
			var tan float64
			for _, row := range d.Slices {
				if math.Abs(row.X-r.X) <= row.Width/2 {
					sin, tan = math.Sin(row.Inclination), row.TanFriction
				}
			}
			want := (d.Resisting + 48*sin*tan) / (d.Driving - 48*(s.Centre.Y-y)/s.Radius)
			after := Checks(j, p)[0]
			if err := m.Compile(after.Section, &after.Situation); err != nil {
				t.Fatal(err)
			}
			var ws lem.Workspace
			got := m.FS(&ws, &s, lem.Setting{Method: lem.Ordinary, Slices: 400})
			near(t, "FS", got.F, want, 2e-4)
			if !(got.F > d.Result.F+0.02) {
				t.Errorf("FS %g before, %g with the row", d.Result.F, got.F)
			}
		})
	}
	if v := apply(t, cutting(), request("piles_or_nails", nil, 120, 2.5, 60, 9)).Violations; len(v) != 1 || !v[0].Geometry {
		t.Errorf("violations %+v", v)
	}
	k, _ := Find("piles_or_nails")
	if !k.WhatIf {
		t.Error("a row without earthworks must not win the comparison of earthworks")
	}
}

// TestElementsInNoDigZone checks that a row is kept out of a zone, and one that does not reach down to what lies in it is not.
func TestElementsInNoDigZone(t *testing.T) {
	deep := 10.0
	for _, tt := range []struct {
		zone KeepClear
		n    int
	}{
		{KeepClear{Name: "main", FromX: 42, ToX: 43, NoDig: true}, 1},
		{KeepClear{Name: "main", FromX: 42, ToX: 43, NoDig: true, DigBelow: &deep}, 0},
		{KeepClear{Name: "main", FromX: 43, ToX: 44, NoDig: true}, 0},
	} {
		j := cutting()
		j.Limits.KeepClear = []KeepClear{tt.zone}
		if v := apply(t, j, request("piles_or_nails", nil, 120, 2.5, 10, 9)).Violations; len(v) != tt.n {
			t.Errorf("%+v: violations %+v", tt.zone, v)
		}
	}
}
