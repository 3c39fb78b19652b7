package sheet

import (
	"slices"
	"strings"
	"testing"

	"standfast/cmd/internal/report"
	"standfast/cmd/internal/sample"
)

// The limits of the demo stand in the figures' data with what they forbid, and the window shows them.
func TestLimits(t *testing.T) {
	f := sample.Result(t, "cutting")
	allowed, to := 0.3, 25.0
	f.Limits.KeepClear = append(f.Limits.KeepClear, report.KeepClear{Name: "sewer", FromX: 64, ToX: 66, NoDig: true, NoLoad: true, DigBelow: &allowed})
	f.Limits.Overhead = []report.Overhead{{Name: "power line", FromX: 40, ToX: 60, Level: 112, Clearance: 6}}
	s := f.Existing.Section
	s.Surcharges = append(s.Surcharges, report.Surcharge{Name: "heap", FromX: 5, ToX: 12, PressureTo: &to})
	s.LineLoads = []report.LineLoad{{Name: "wall", X: 25, Vertical: 4, Horizontal: -3}}
	s.Restraints = []report.Restraint{{Name: "piles", X: 50, Top: 101, Bottom: 95, Force: 12}}
	d := newModel(f).Data
	var words []string
	for _, l := range d.Limits {
		words = append(words, l.Kind+" "+l.Words)
		if l.From < d.View.X0 || l.To > d.View.X1 {
			t.Errorf("%s lies outside the window", l.Words)
		}
	}
	got := strings.Join(words, "\n")
	for _, want := range []string{
		"fence crest fence", "fence toe fence", "zone cable: no dig\n", "zone sewer: no dig deeper than 0.3 m, no load", "level highest berm: works no higher than 103.5 m",
		"overhead power line: works stay 6 m below",
	} {
		if !strings.Contains(got+"\n", want) {
			t.Errorf("no %q among\n%s", want, got)
		}
	}
	if d.Limits[0].Inward != 1 || d.Limits[1].Inward != -1 {
		t.Error("the fences do not point towards the works")
	}
	if last := d.Limits[len(d.Limits)-1]; last.Kind != limitLevel || last.Level != 106 {
		t.Errorf("below the power line: %+v, want a level of 106", last)
	}
	if l := d.Loads[len(d.Loads)-1]; l.Name != "heap 0 to 25 kPa" || l.Start != 0 || l.End != 1 {
		t.Errorf("a heap that rises: %+v", l)
	}
	if p := d.Forces; len(p) != 1 || p[0].Dx != -0.6 || p[0].Dy != 0.8 {
		t.Errorf("line loads: %+v", p)
	}
	if p := d.Existing.Posts; len(p) != 1 || p[0].Bottom != 95 {
		t.Errorf("restraints: %+v", p)
	}
}

// A row of elements is not drawn where it stood for another target.
func TestMovedRow(t *testing.T) {
	f := sample.Result(t, "cutting")
	i := slices.IndexFunc(f.Options, func(o report.Option) bool { return len(o.Tradeoff) > 1 })
	o := &f.Options[i]
	o.Section.Restraints = []report.Restraint{{Name: "piles", X: 50, Top: 101, Bottom: 95, Force: 12}}
	of := func(position float64) map[string]report.Parameter {
		return map[string]report.Parameter{"position": {Value: report.Number(position), Unit: "m"}}
	}
	o.Parameters = of(3)
	for k := range o.Tradeoff {
		o.Tradeoff[k].Parameters = of(3 + float64(k))
	}
	designs := newModel(f).Data.Options[i].Designs
	if d := designs[0]; len(d.Posts) != 1 {
		t.Errorf("as specified: %+v", d.Posts)
	}
	if d := designs[len(designs)-1]; len(d.Posts) != 0 {
		t.Errorf("moved: %+v", d.Posts)
	}
}
