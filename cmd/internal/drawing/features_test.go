package drawing

import (
	"bytes"
	"math"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"standfast/cmd/internal/casefile"
	"standfast/cmd/internal/dxf"
	"standfast/lem"
	"standfast/remedies"
)

// feature reads one of the small cases that use a feature each.
func feature(t *testing.T, name string) drawn {
	t.Helper()
	c, err := casefile.Read(filepath.Join("../../../testdata/cases/features", name+".yaml"))
	if err != nil {
		t.Fatal(err)
	}
	return drawn{job: c.Job}
}

// Whatever a case can say of the section is drawn and named.
func TestFeaturesAreDrawn(t *testing.T) {
	tests := []struct {
		name string
		want []string
		not  []string
	}{
		{"crack", []string{"bottom of tension cracks, water in them at level 39.00 m"}, nil},
		{"known", []string{"existing slip surface: c′ 0 kPa, φ′ 13°", "slip surface that exists already"}, nil},
		{"loads", []string{
			"heap 0 to 30 kPa", "abutment 30 kPa, 6 kPa to the right", "lorries 10 to 15 kPa, 1 kPa to the right (variable)", "wall 12 kN/m",
			"pipe anchor 5 kN/m, 4 kN/m to the left", " line load ",
		}, []string{"heap 0 kPa"}},
		{"observed", []string{"slip that has happened"}, nil},
		{"strength", []string{"τ = 0.85 pa (σ′/pa)^0.8, pa 101.325 kPa", "cu 0.3 σ′v before works"}, []string{"cu 0 kPa", "c′ 0 kPa, φ′ 0°"}},
		{"water", []string{
			"main, seepage (inclined), artesian water", "perched water in silty sand", "artesian water in stiff clay", "u 196.2 kPa", "pore pressure known",
			"cu 0.3 σ′v before works, at least 25 kPa",
		}, []string{"cu 0 kPa"}},
		{"holding", []string{
			"old sheet piles holding 12 kN/m", " restraint ", "bottom of tension cracks, 1.50 m deep, 50 % full of water", "existing slip surface: c′ 0 kPa, φ′ 18°",
			"uplift anchor 8 kN/m upwards", "boundary wall 15 kN/m, 3 kN/m to the right", "slip that has happened", "cable: no dig",
			"sewer: no dig deeper than 0.30 m, no load", "power line, level 61.00 m: works stay 5.00 m below", "overhead line with its clearance",
		}, nil},
	}
	for _, c := range tests {
		t.Run(c.name, func(t *testing.T) {
			d := feature(t, c.name)
			f, err := Section(d.job, nil, Options{})
			if err != nil {
				t.Fatal(err)
			}
			checkLabels(t, f)
			keep(t, "feature-"+c.name, f)
			says(t, strings.ReplaceAll(texts(f), "\n", " "), c.want, c.not)
		})
	}
}

// furnish adds whatever else a case can say of a section, anywhere in it.
func furnish(t *rapid.T, d drawn) {
	j := d.job
	g := j.Section.Ground
	offset := func(what string) float64 { return rapid.Float64Range(g.Left()-5, g.Right()+5).Draw(t, what) }
	depth := rapid.Float64Range(0.1, 8).Draw(t, "depth")
	var s lem.Section
	for range rapid.IntRange(0, 3).Draw(t, "restraints") {
		x := offset("restraint at")
		s.Restraints = append(s.Restraints, lem.Restraint{Name: "row of piles", X: x, Top: g.At(x), Bottom: g.At(x) - depth, Force: 40})
		s.LineLoads = append(s.LineLoads, lem.LineLoad{Name: "wall", X: offset("line load at"), Vertical: rapid.Float64Range(-9, 9).Draw(t, "down"), Horizontal: 3})
		a, b := offset("slip from"), offset("slip to")
		if a > b {
			a, b = b, a
		}
		if b-a > 0.1 {
			s.Known = append(s.Known, lem.KnownSlip{Line: lem.Profile{{X: a, Y: g.At(a)}, {X: (a + b) / 2, Y: g.At((a+b)/2) - depth}, {X: b, Y: g.At(b)}}, Friction: 0.2})
			j.Limits.Overhead = append(j.Limits.Overhead, remedies.Overhead{Name: "line", FromX: a, ToX: b, Level: g.At(a) + depth, Clearance: depth / 2})
		}
		j.Waters[0].Points = append(j.Waters[0].Points, lem.PressurePoint{X: x, Y: g.At(x) - depth, Pressure: 9.81 * depth})
	}
	switch rapid.IntRange(0, 2).Draw(t, "crack") {
	case 1:
		s.Crack = &lem.TensionCrack{Depth: depth, WaterShare: 0.5}
	case 2:
		a := offset("crack from")
		s.Crack = &lem.TensionCrack{Line: lem.Profile{{X: a, Y: g.At(a) - depth}, {X: a + 6, Y: g.At(a)}}}
	}
	j.Waters[0].BySoil = []remedies.SoilLine{{Soil: 0, Line: j.Waters[0].Line}, {Soil: 1, Line: g}}
	r := rapid.Float64Range(1, 60).Draw(t, "radius")
	j.Observed = &remedies.Observed{Slip: lem.Slip{Kind: lem.Circle, Centre: lem.Point{X: offset("centre at"), Y: g[0].Y + r/2}, Radius: r}}
	targets := []*lem.Section{&j.Section}
	if d.opt != nil {
		targets = append(targets, &d.opt.Proposal.Section)
	}
	for _, q := range targets {
		q.Restraints, q.LineLoads, q.Known, q.Crack = s.Restraints, s.LineLoads, s.Known, s.Crack
	}
}

// strokesOf returns the lines drawn with a pen.
func strokesOf(f *Figure, p pen) [][]xy {
	var out [][]xy
	for _, m := range f.marks {
		if s, ok := m.(stroke); ok && s.pen.colour == p.colour && s.pen.width == p.width && slices.Equal(s.pen.dash, p.dash) {
			out = append(out, s.lines...)
		}
	}
	return out
}

// What stands in the ground is drawn where the case says: lengths on the page over those in the section are the scale.
func TestWhereFeaturesAreDrawn(t *testing.T) {
	d := feature(t, "holding")
	f, err := Section(d.job, nil, Options{})
	if err != nil {
		t.Fatal(err)
	}
	ground := strokesOf(f, groundPen)[0]
	scale := (ground[len(ground)-1].X - ground[0].X) / 75
	level := func(y float64) float64 { return ground[0].Y + (y-59.6)*scale }
	offset := func(x float64) float64 { return ground[0].X + x*scale }
	near := func(what string, got, want float64) {
		t.Helper()
		if math.Abs(got-want) > 1e-6*math.Abs(want) {
			t.Errorf("%s at %v, want %v", what, got, want)
		}
	}
	piles := strokesOf(f, restraintPen)[0]
	near("piles", piles[0].X, offset(50))
	near("top of piles", piles[0].Y, level(51))
	near("bottom of piles", piles[1].Y, level(45))
	near("crack", strokesOf(f, crackPen)[0][0].Y, level(59.6-1.5))
	near("power line", strokesOf(f, overheadPen)[0][0].Y, level(61))
	near("old slip", strokesOf(f, knownPen)[0][0].X, offset(28))
	for _, q := range strokesOf(f, observedPen)[0] {
		if r := math.Hypot(q.X-offset(47.5), q.Y-level(68)) / scale; math.Abs(r-20.5) > 1e-6 {
			t.Fatalf("the slip that has happened has a point %v m from its centre, want 20.5", r)
		}
	}
}

// A pressure that rises from nothing is drawn as a triangle.
func TestSurchargeHeight(t *testing.T) {
	p := picture{job: cutting(), sec: &lem.Section{Loads: []lem.Surcharge{{FromX: 2, ToX: 10, Rise: 30}}}, x0: 0, x1: 20, ground: lem.Profile{{X: 0, Y: 5}, {X: 20, Y: 5}}}
	s := &sheet{view: view{sx: 10, sy: 10, frame: Box{0, 0, 200, 100}}}
	up, low := p.loadLine(s, 0)
	if got := up[0].Y - low[0].Y; got != 0 {
		t.Errorf("height %v where the pressure is nothing", got)
	}
	if got := up[1].Y - low[1].Y; got != loadHeight {
		t.Errorf("height %v where the pressure is greatest, want %v", got, loadHeight)
	}
}

// A check of which nothing is asked is not said to be met.
func TestAdvisoryIsToldOnly(t *testing.T) {
	d := cuttingWithBerm()
	o := d.opt.Situations[0]
	o.FS, o.Check.Name, o.Check.Required, o.Check.Stage, o.Check.Advisory = 0.61, "open hole", 0, true, true
	d.opt.Stages = append(append([]remedies.Outcome{}, d.opt.Stages...), o)
	f, err := Section(d.job, d.opt, Options{})
	if err != nil {
		t.Fatal(err)
	}
	if got := texts(f); !strings.Contains(got, "open hole\n0.610\n") || !strings.Contains(got, "told only") || strings.Contains(got, "\n0.00\n") {
		t.Errorf("the drawing says:\n%s", got)
	}
	var b bytes.Buffer
	if err := SectionDXF(&b, d.job, d.opt); err != nil {
		t.Fatal(err)
	}
	if s := b.String(); !strings.Contains(s, "open hole: FS 0.610 (Bishop), told only") {
		t.Error("the DXF does not say that the open hole is told only")
	}
}

// The features stand in the DXF too, in real coordinates on their layers.
func TestFeaturesInDXF(t *testing.T) {
	f, err := dxf.Read(asDXF(t, feature(t, "holding")))
	if err != nil {
		t.Fatal(err)
	}
	has := func(layer string, want dxf.Point) {
		t.Helper()
		for _, l := range onLayer(f, layer) {
			for _, q := range l {
				if math.Hypot(q.X-want.X, q.Y-want.Y) < 1e-3 {
					return
				}
			}
		}
		t.Errorf("layer %s has no point %v", layer, want)
	}
	has(layerHolding, dxf.Point{X: 50, Y: 51})
	has(layerHolding, dxf.Point{X: 50, Y: 45})
	has(layerSlips, dxf.Point{X: 34, Y: 53})
	has(layerSlips, dxf.Point{X: 0, Y: 58.1})
	has(layerLimits, dxf.Point{X: 44, Y: 61})
}
