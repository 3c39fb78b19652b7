package sheet

import (
	"math"
	"reflect"

	"standfast/cmd/internal/report"
)

// designs returns the option as specified, then the designs of its trade-off that differ from it, in the order of the targets that they
// were sized for.
func (b *builder) designs(o *report.Option) []design {
	out := []design{b.sized(o)}
	for i := range o.Tradeoff {
		if p := &o.Tradeoff[i]; !reflect.DeepEqual(p.Parameters, o.Parameters) {
			out = append(out, b.traded(o, p, &out[0]))
		}
	}
	return out
}

// sized lays out an option as specified, or the slope as it is.
func (b *builder) sized(o *report.Option) design {
	d := b.blank(o.Section.Ground, o.Section.Placed)
	d.Posts = posts(o.Section)
	for i := range o.Situations {
		a := &o.Situations[i]
		b.addAnswer(&d, a.Name, a.RequiredFS, &a.Found, o.Section.Water)
	}
	for i := range o.Stages {
		s := &o.Stages[i]
		b.addAnswer(&d, s.Name, s.RequiredFS, &s.Found, s.Section.Water)
		if at, known := b.rows[s.Name]; known {
			if g := b.line(s.Section.Ground); g != d.Ground {
				d.Answers[at].Ground = g
			}
		}
	}
	b.govern(&d)
	t := &o.Totals
	b.addTexts(&d, o, o.Parameters, &o.Quantities)
	d.works = b.amount(&o.Quantities, t.Cost, t.Carbon)
	d.Texts["cost"], d.Texts["carbon"], d.Texts["loads"] = given(t.Cost, b.currency()), given(t.Carbon, " t"), given(t.Loads, "")
	if o.Status == meetsTarget {
		d.Texts["change"] = "as much as for the specified target"
	}
	d.Texts["land"] = b.landText(o.Section.Ground, o.Section.Placed, o.Section.Water, o.Quantities.Drain > 0)
	return d
}

// currency returns what stands behind a cost.
func (b *builder) currency() string {
	if c := b.f.Economics.Currency; c != "" {
		return " " + c
	}
	return ""
}

// moved reports whether a row of elements stands elsewhere, or is longer or shorter, at a point of a trade-off than as specified.
func moved(o *report.Option, p *report.TradePoint) bool {
	return p.Parameters["position"] != o.Parameters["position"] || p.Parameters["length"] != o.Parameters["length"]
}

// traded lays out a point of a trade-off.
func (b *builder) traded(o *report.Option, p *report.TradePoint, specified *design) design {
	d := b.blank(p.Ground, p.Placed)
	d.Posts, d.shift = specified.Posts, p.Shift
	if moved(o, p) { // Then only the rows that were there before are known.
		d.Posts = posts(b.f.Existing.Section)
	}
	for i := range p.Checks {
		a := &p.Checks[i]
		b.addAnswer(&d, a.Name, unshifted(a.RequiredFS, p.Shift), &a.Found, p.Water)
	}
	b.govern(&d)
	d.margin = min(d.margin, p.ReachedFS-p.RequiredFS+report.Number(p.Shift))
	b.addTexts(&d, o, p.Parameters, &p.Quantities)
	d.works = b.amount(&p.Quantities, p.Cost, p.Carbon)
	d.Texts["cost"] = forTarget(p.Cost, b.currency(), specified.Texts["cost"])
	d.Texts["carbon"] = forTarget(p.Carbon, " t", specified.Texts["carbon"])
	d.Texts["loads"] = forTarget(p.Loads, "", specified.Texts["loads"])
	d.Texts["land"] = b.landText(p.Ground, p.Placed, p.Water, p.Quantities.Drain > 0)
	if o.Status == meetsTarget {
		d.Texts["change"] = change(p.Quantities.Earthworks, o.Quantities.Earthworks, b.f.Case.Length)
	}
	return d
}

func (b *builder) blank(ground []report.Point, bodies []report.Body) design {
	n := len(b.m.Data.Rows)
	d := design{
		Ground: b.line(ground), Placed: []placed{}, Answers: make([]*answer, n), Governing: -1, Texts: map[string]string{},
		required: make([]float64, n), fs: make([]report.Number, n), resolved: make([]bool, n), margin: report.Number(math.NaN()),
	}
	before := len(b.f.Existing.Section.Placed)
	for i, p := range bodies {
		d.Placed = append(d.Placed, placed{Soil: b.soil(p.Soil), Outline: b.line(p.Outline), Works: i >= before})
	}
	return d
}

func (b *builder) addAnswer(d *design, name string, required float64, found *report.Found, waters map[string]report.Water) {
	at, known := b.rows[name]
	if !known {
		return
	}
	d.required[at], d.fs[at], d.resolved[at] = required, found.FS, found.Resolved
	a := &answer{FS: report.FactorText(found.FS), Method: found.Method, Slip: slipOf(found.Slip), Ground: -1}
	if w, known := waters[name]; known {
		a.Water = b.water(&w)
	}
	d.Answers[at] = a
}

// govern finds the check with the least margin; one without an FS comes before all others.
func (b *builder) govern(d *design) {
	for i, a := range d.Answers {
		if a == nil {
			continue
		}
		if m := d.fs[i] - report.Number(d.required[i]); d.Governing < 0 || !(m >= d.margin) {
			d.Governing, d.margin = i, m
		}
	}
}

func (b *builder) water(w *report.Water) *water {
	out := &water{Line: b.line(w.Line), Head: -1, Invert: -1, Free: []freeWater{}}
	if d := w.Drains; d != nil && len(d.Invert) > 1 {
		out.Line, out.Head, out.Invert = b.line(d.LineBefore), b.line(within(w.Line, d.Invert)), b.line(d.Invert)
	}
	for _, f := range w.FreeWater {
		out.Free = append(out.Free, freeWater{Level: f.Level, From: f.FromX, To: f.ToX})
	}
	return out
}

// within returns the part of a line between the ends of another.
func within(line, ends []report.Point) []report.Point {
	x0, x1 := ends[0][0], ends[len(ends)-1][0]
	var out []report.Point
	for _, p := range line {
		if p[0] >= x0 && p[0] <= x1 {
			out = append(out, p)
		}
	}
	return out
}

func slipOf(s *report.Slip) *slip {
	if s == nil {
		return nil
	}
	out := &slip{From: near(s.From), To: near(s.To)}
	if s.Centre != nil {
		centre := near(*s.Centre)
		out.Centre, out.Radius = &centre, round(s.Radius)
		return out
	}
	out.Line = append(out.Line, out.From)
	for _, p := range s.Points {
		if p[0] > s.From[0] && p[0] < s.To[0] {
			out.Line = append(out.Line, near(p))
		}
	}
	out.Line = append(out.Line, out.To)
	return out
}
