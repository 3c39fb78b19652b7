package drawing

import (
	"bytes"
	"strings"
	"testing"

	"standfast/cmd/internal/dxf"
	"standfast/cmd/internal/report"
	"standfast/cmd/internal/sample"
	"standfast/remedies"
)

// demoDrawings lays out every drawing of a finished demo case, by name.
func demoDrawings(t *testing.T, name string) map[string]*Figure {
	t.Helper()
	r, err := report.Rebuild(sample.Result(t, name))
	if err != nil {
		t.Fatal(err)
	}
	out := map[string]*Figure{}
	keepFigure := func(name string, f *Figure, err error) {
		t.Helper()
		if err != nil {
			t.Fatalf("%s: %v", name, err)
		}
		out[name] = f
	}
	f, err := Section(r.Job, nil, Options{})
	keepFigure("as read", f, err)
	f, err = Section(r.Job, &r.Existing, Options{})
	keepFigure("existing", f, err)
	f, err = Tradeoff(r.Job.Title, r.Options, Options{Credit: "standfast devel"})
	keepFigure("trade-off", f, err)
	const page = 511.0 // Points: a report's page between its margins.
	f, err = TradeoffPlot(r.Options, page, 200)
	keepFigure("plot", f, err)
	for i := range r.Options {
		o := &r.Options[i]
		f, err = Section(r.Job, o, Options{})
		keepFigure(o.Name, f, err)
		f, err = Sequence(&r.Existing, o, r.Job, page)
		keepFigure("construction of "+o.Name, f, err)
		f, err = TradeoffPlot([]remedies.Option{*o}, page, 200)
		keepFigure("plot of "+o.Name, f, err)
	}
	return out
}

// No text of any drawing of the demos leaves its page, stands in another, was cut short or found no room.
func TestLabelsOfTheDemos(t *testing.T) {
	for _, name := range sample.Names {
		for what, f := range demoDrawings(t, name) {
			t.Run(name+", "+what, func(t *testing.T) {
				checkLabels(t, f)
				got := texts(f)
				for _, not := range []string{ellipsis, "ithout room for a label", "NaN", "Inf", "?"} {
					if strings.Contains(got, not) {
						t.Errorf("the drawing says %q:\n%s", not, got)
					}
				}
				keep(t, "demo-"+name+"-"+strings.ReplaceAll(what, " ", "-"), f)
			})
		}
	}
}

// The structure of the main drawing: what lies where, in the section's own coordinates, whatever the pixels.
func TestStructureOfTheMainDrawing(t *testing.T) {
	file := sample.Result(t, "cutting")
	r, err := report.Rebuild(file)
	if err != nil {
		t.Fatal(err)
	}
	var o *remedies.Option
	for i := range r.Options {
		if r.Options[i].Name == "berm" {
			o = &r.Options[i]
		}
	}
	f, err := Section(r.Job, o, Options{})
	if err != nil {
		t.Fatal(err)
	}
	ground := strokesOf(f, groundPen)[0]
	after := o.Proposal.Section.Ground
	if len(ground) != len(after) {
		t.Fatalf("%d points of the ground drawn, want %d", len(ground), len(after))
	}
	scale := (ground[len(ground)-1].X - ground[0].X) / (after.Right() - after.Left())
	on := func(x, y float64) xy {
		return xy{ground[0].X + (x-after[0].X)*scale, ground[0].Y + (y-after[0].Y)*scale}
	}
	same := func(what string, got xy, x, y float64) {
		t.Helper()
		want := on(x, y)
		const tolerance = 1e-6 // Points.
		if d := max(got.X-want.X, want.X-got.X, got.Y-want.Y, want.Y-got.Y); d > tolerance {
			t.Errorf("%s at %v, want %v", what, got, want)
		}
	}
	for i, q := range after {
		same("ground", ground[i], q.X, q.Y)
	}
	slip := strokesOf(f, slipPen)[0]
	g := o.Governing()
	same("head of the slip", slip[0], g.From.X, g.From.Y)
	same("toe of the slip", slip[len(slip)-1], g.To.X, g.To.Y)
	fence := strokesOf(f, limitPen)[0]
	same("crest fence", xy{fence[0].X, on(24, 0).Y}, 24, 0)
	if n := len(strokesOf(f, fillPen)); n < 10 {
		t.Errorf("%d lines across the fill", n)
	}
	if n := len(strokesOf(f, cutPen)); n > 0 {
		t.Errorf("%d lines across a cut that there is not", n)
	}
}

// Every section of the demos can be read back as DXF, with ground before and after where the case has them.
func TestDXFOfTheDemos(t *testing.T) {
	for _, name := range sample.Names {
		r, err := report.Rebuild(sample.Result(t, name))
		if err != nil {
			t.Fatal(err)
		}
		for i := range r.Options {
			o := &r.Options[i]
			var b bytes.Buffer
			if err := SectionDXF(&b, r.Job, o); err != nil {
				t.Fatal(err)
			}
			f, err := dxf.Read(b.Bytes())
			if err != nil {
				t.Fatalf("%s, %s: %v", name, o.Name, err)
			}
			if got := onLayer(f, layerExisting)[0][0]; got != dxf.Point(o.Proposal.Section.GroundBefore()[0]) {
				t.Errorf("%s, %s: the ground before works starts at %v", name, o.Name, got)
			}
			if len(onLayer(f, layerLimits)) == 0 {
				t.Errorf("%s, %s: no limits", name, o.Name)
			}
		}
	}
}
