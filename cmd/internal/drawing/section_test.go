package drawing

import (
	"bytes"
	"encoding/xml"
	"errors"
	"fmt"
	"io"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"standfast/lem"
	"standfast/remedies"
)

func pictureOf(d drawn) *picture {
	p := &picture{job: d.job, opt: d.opt, sec: &d.job.Section}
	if d.opt != nil {
		p.sec = &d.opt.Proposal.Section
	}
	p.gather()
	return p
}

func TestScalesAreEqual(t *testing.T) {
	const tol = 1e-9
	for name, d := range cases() {
		t.Run(name, func(t *testing.T) {
			p := pictureOf(d)
			v := p.layOut(Options{}, nil).view
			o, a, b := v.at(lem.Point{}), v.at(lem.Point{X: 1}), v.at(lem.Point{Y: 1})
			if r := (a.X - o.X) / (b.Y - o.Y); math.Abs(r-1) > tol {
				t.Errorf("a metre across is %.12f of a metre up", r)
			}
			for _, q := range []lem.Point{{X: p.x0, Y: p.lo}, {X: p.x1, Y: p.hi}} {
				if !v.frame.grown(tol).holds(v.at(q)) {
					t.Errorf("%v of the window lies outside the frame", q)
				}
			}
		})
	}
}

// TestNothingLeavesThePage looks at the marks themselves: what is drawn stays on the page.
func TestNothingLeavesThePage(t *testing.T) {
	for name, d := range cases() {
		t.Run(name, func(t *testing.T) {
			f, err := Section(d.job, d.opt, Options{})
			if err != nil {
				t.Fatal(err)
			}
			for _, m := range f.marks {
				var sets [][]xy
				switch v := m.(type) {
				case stroke:
					sets = v.lines
				case fill:
					sets = v.rings
				}
				for _, l := range sets {
					for _, q := range l {
						if !f.Page().holds(q) {
							t.Fatalf("%T has a point off the page: %v", m, q)
						}
					}
				}
			}
		})
	}
}

func texts(f *Figure) string {
	var b strings.Builder
	for _, l := range f.Labels {
		b.WriteString(strings.NewReplacer("\n", " ", string(noBreak), " ").Replace(l.Text) + "\n")
	}
	return b.String()
}

func TestWhatASectionSays(t *testing.T) {
	tests := []struct {
		name string
		d    drawn
		want []string
		not  []string
	}{
		{"works", cuttingWithBerm(), []string{
			"Harrow Lane", "meets target", "FS 1.255 (Bishop)", "winter water", "required 1.25", "top width 5.50 m", "height 2.50 m", "1V:2.0H",
			"garden fence, offset 22.00 m", "highway boundary, offset 55.00 m", "haul road 10 kPa", "fill 12.90 m³", "granular fill", "weathered clay",
			"siltstone", "stage: end of construction", "offset, m", "level, m", "ground before works", "ground after works", "drain outfall 49.40 m",
			"no dig deeper than 1.00 m, no load", "crest", "toe", "Preliminary sizing aid",
		}, []string{"cut\n"}},
		{"existing", existingCutting(), []string{"existing slope", "FS 1.029 (Bishop)", "winter water", "summer water", "below"}, []string{"before works"}},
		{"as read", asRead(embankment()), []string{
			"Section as read", "normal water", "flood water", "free water, flood, level 8.90 m", "traffic 10 kPa (variable)", "works no higher than 17.50 m",
			"slips start between offsets 34.00 m and 60.00 m", "crest (40.00, 15.00)",
		}, []string{"FS "}},
		{"drains", regradeWithDrains(), []string{"infeasible", "Best FS 1.212 where 1.250 is required", "invert of drains", "head at drain invert", "midspan between drains", "drains 0.25 m"}, nil},
	}
	for _, c := range tests {
		t.Run(c.name, func(t *testing.T) {
			f, err := Section(c.d.job, c.d.opt, Options{})
			if err != nil {
				t.Fatal(err)
			}
			says(t, texts(f), c.want, c.not)
		})
	}
}

// TestUnconvergedIsNotShown guards the rule that a number that did not converge is never printed.
func TestUnconvergedIsNotShown(t *testing.T) {
	d := cuttingWithBerm()
	d.opt.Status = remedies.Unresolved
	d.opt.Situations[0].FS = math.NaN()
	f, err := Section(d.job, d.opt, Options{})
	if err != nil {
		t.Fatal(err)
	}
	if got := texts(f); strings.Contains(got, "NaN") || !strings.Contains(got, "unresolved") {
		t.Errorf("the drawing says:\n%s", got)
	}
}

func TestNothingToDraw(t *testing.T) {
	if _, err := Section(&remedies.Job{Title: "empty"}, nil, Options{}); !errors.Is(err, ErrNothingToDraw) {
		t.Errorf("an empty section gives %v", err)
	}
	if _, err := Tradeoff("empty", []remedies.Option{{Name: "berm"}}, Options{}); !errors.Is(err, ErrNothingToDraw) {
		t.Errorf("options without curves give %v", err)
	}
}

func TestFilesAreTheSameEachTime(t *testing.T) {
	var last [3][]byte
	for range 2 {
		d := cuttingWithBerm()
		f, err := Section(d.job, d.opt, Options{Credit: "<drawn> & \"checked\" \x01\U0001f600"})
		if err != nil {
			t.Fatal(err)
		}
		for i, write := range []func(io.Writer) error{f.WriteSVG, f.WritePNG, f.WritePDF} {
			var b bytes.Buffer
			if err := write(&b); err != nil {
				t.Fatal(err)
			}
			if last[i] != nil && !bytes.Equal(last[i], b.Bytes()) {
				t.Error("the bytes differ from run to run")
			}
			last[i] = b.Bytes()
		}
	}
	if !bytes.Contains(last[0], []byte("font-family:'Liberation Sans',Arial,Helvetica,sans-serif;")) {
		t.Error("the SVG names no fallback fonts")
	}
	for dec := xml.NewDecoder(bytes.NewReader(last[0])); ; {
		if _, err := dec.Token(); errors.Is(err, io.EOF) {
			break
		} else if err != nil {
			t.Fatalf("the SVG is not well formed: %v", err)
		}
	}
}

// anySection draws a section of either facing with works, waters, loads and limits of all sizes.
func anySection(t *rapid.T) drawn {
	d := cuttingWithBerm()
	if rapid.Bool().Draw(t, "unloaded") {
		d = regradeWithDrains()
	}
	j := d.job
	names := rapid.SliceOfN(rapid.StringMatching(`[a-zA-Zéß φ′-]{0,40}`), 8, 8).Draw(t, "names")
	j.Title = strings.Repeat(names[0], rapid.IntRange(1, 9).Draw(t, "title"))
	for i := range j.Section.Soils {
		j.Section.Soils[i].Name = names[i]
	}
	j.Limits.Left.Name, j.Limits.KeepClear[0].Name = names[5], names[6]
	for i := range rapid.IntRange(0, 8).Draw(t, "loads") {
		x := rapid.Float64Range(0, 60).Draw(t, "load at")
		j.Section.Loads = append(j.Section.Loads, lem.Surcharge{Name: fmt.Sprint(names[7], i), FromX: x, ToX: x + 0.5 + float64(i), Pressure: 12.5})
	}
	for i := range rapid.IntRange(0, 5).Draw(t, "waters") {
		l := append(lem.Profile(nil), j.Waters[0].Line...)
		for k := range l {
			l[k].Y -= rapid.Float64Range(-2, 6).Draw(t, "fall")
		}
		j.Waters = append(j.Waters, remedies.WaterLine{Name: fmt.Sprint("water ", names[1], i), Line: l})
		j.Situations = append(j.Situations, remedies.Situation{Name: names[2], Water: len(j.Waters) - 1, Free: []lem.FreeWater{{Level: 51, FromX: 30, ToX: 72}}})
		d.opt.Proposal.Waters = append(d.opt.Proposal.Waters, lem.Water{Line: l})
	}
	d.opt.Proposal.Section.Soils, d.opt.Proposal.Section.Loads = j.Section.Soils, j.Section.Loads
	d.opt.Reason = strings.Repeat(names[3]+" ", rapid.IntRange(0, 20).Draw(t, "reason"))
	if rapid.Bool().Draw(t, "left") {
		d = mirrored(d)
	}
	stretch(&d, rapid.Float64Range(0.2, 12).Draw(t, "across"), rapid.Float64Range(0.3, 5).Draw(t, "up"))
	if rapid.Bool().Draw(t, "as read") {
		d = asRead(d)
	}
	return d
}

// stretch scales the ground, strata, water and works of a case.
func stretch(d *drawn, kx, ky float64) {
	pts := func(ps []lem.Point) []lem.Point {
		out := make([]lem.Point, len(ps))
		for i, q := range ps {
			out[i] = lem.Point{X: q.X * kx, Y: q.Y * ky}
		}
		return out
	}
	section := func(s lem.Section) lem.Section {
		s.Ground = pts(s.Ground)
		s.Strata = append([]lem.Stratum(nil), s.Strata...)
		for i := range s.Strata {
			s.Strata[i].Top = pts(s.Strata[i].Top)
		}
		s.Placed = append([]lem.Body(nil), s.Placed...)
		for i := range s.Placed {
			s.Placed[i].Outline = pts(s.Placed[i].Outline)
		}
		s.Loads = append([]lem.Surcharge(nil), s.Loads...)
		for i := range s.Loads {
			s.Loads[i].FromX *= kx
			s.Loads[i].ToX *= kx
		}
		return s
	}
	j, q := d.job, d.opt.Proposal
	j.Section, q.Section = section(j.Section), section(q.Section)
	j.Crest, j.Toe = pts([]lem.Point{j.Crest})[0], pts([]lem.Point{j.Toe})[0]
	for i := range j.Waters {
		j.Waters[i].Line = pts(j.Waters[i].Line)
	}
	for i := range q.Waters {
		q.Waters[i].Line = pts(q.Waters[i].Line)
	}
	for i := range q.Dimensions {
		e := pts([]lem.Point{q.Dimensions[i].From, q.Dimensions[i].To})
		q.Dimensions[i].From, q.Dimensions[i].To = e[0], e[1]
	}
	j.Limits.Left.X *= kx
	j.Limits.Right.X *= kx
	for i := range j.Limits.KeepClear {
		j.Limits.KeepClear[i].FromX *= kx
		j.Limits.KeepClear[i].ToX *= kx
	}
	for i := range d.opt.Situations {
		o := &d.opt.Situations[i]
		e := pts([]lem.Point{o.From, o.To})
		o.From, o.To = e[0], e[1]
		o.Slip = lem.Slip{Kind: lem.Polyline, Nodes: []lem.Point{e[0], {X: (e[0].X + e[1].X) / 2, Y: e[1].Y - 3}, e[1]}}
	}
}

func TestLabelsOfAnySection(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		d := anySection(t)
		furnish(t, d)
		f, err := Section(d.job, d.opt, Options{Credit: "test"})
		if err != nil {
			t.Fatal(err)
		}
		checkLabels(t, f)
		if err := SectionDXF(io.Discard, d.job, d.opt); err != nil {
			t.Fatal(err)
		}
	})
}

func BenchmarkSection(b *testing.B) {
	d := cuttingWithBerm()
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Section(d.job, d.opt, Options{}); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkWritePNG(b *testing.B) {
	d := cuttingWithBerm()
	f, err := Section(d.job, d.opt, Options{})
	if err != nil {
		b.Fatal(err)
	}
	b.ReportAllocs()
	for b.Loop() {
		if err := f.WritePNG(io.Discard); err != nil {
			b.Fatal(err)
		}
	}
}

// says checks that the texts of a drawing hold some words and do not hold others.
func says(t *testing.T, got string, want, not []string) {
	t.Helper()
	for _, w := range want {
		if !strings.Contains(got, w) {
			t.Errorf("the drawing does not say %q; it says:\n%s", w, got)
		}
	}
	for _, w := range not {
		if strings.Contains(got, w) {
			t.Errorf("the drawing says %q", w)
		}
	}
}
