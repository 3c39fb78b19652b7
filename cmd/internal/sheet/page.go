package sheet

import (
	"cmp"
	"fmt"
	"maps"
	"slices"
	"strings"

	"standfast/cmd/internal/report"
)

// matrixHead is a check as the head of a column.
type matrixHead struct {
	Index    int
	Name     string
	Stage    bool
	Required string
}

// matrixRow is the slope as it is or an option, with how it stands in every check, as specified.
type matrixRow struct {
	Column int // The option; -1: the slope as it is.
	Title  string
	Cells  []cell
}

// cell is one answer of the matrix.
type cell struct {
	Row  int
	FS   string
	Mark string
}

// soilText is a soil as the analysis took it.
type soilText struct {
	Name, Tint, Weight, Drained, Undrained string
}

// existingText says how the slope stands as it is.
type existingText struct {
	FS, Required, Check string
	Fails               bool
}

// addPage adds what stands in the page itself.
func (b *builder) addPage() {
	m, d := b.m, &b.m.Data
	now := d.Stops[d.Specified]
	m.Answer = now.Answer
	for i := range b.f.Options {
		m.Cards = append(m.Cards, b.card(i, now.Least == i))
	}
	for i, r := range d.Rows {
		m.Heads = append(m.Heads, matrixHead{Index: i, Name: r.Name, Stage: r.Stage, Required: now.Required[i]})
	}
	m.Matrix = append(m.Matrix, matrixRow{Column: -1, Title: "As it is", Cells: cells(&d.Existing, now.Existing)})
	for k := range d.Options {
		s := d.Options[k].Stops[d.Specified]
		m.Matrix = append(m.Matrix, matrixRow{Column: k, Title: m.Cards[k].Title, Cells: cells(&d.Options[k].Designs[s.Design], s.Marks)})
	}
	if g := d.Existing.Governing; g >= 0 {
		m.Existing = existingText{
			FS: d.Existing.Answers[g].FS, Required: now.Required[g], Check: d.Rows[g].Name, Fails: now.Existing[g] != markPass,
		}
	}
	b.addSoils()
	b.addRests()
	b.addPoints()
}

// pointText is a point of the back-analysis.
type pointText struct {
	Name, Strength string
}

// addPoints adds what options come to with the strengths that the observed slip leaves open.
func (b *builder) addPoints() {
	m, f := b.m, b.f
	if f.BackAnalysis == nil {
		return
	}
	for i := range f.BackAnalysis.Points {
		p := &f.BackAnalysis.Points[i]
		m.Points = append(m.Points, pointText{title(p.Name), p.Text()})
	}
	for _, r := range f.RankingRows() {
		r.Title = title(r.Title)
		for i, c := range r.Cells {
			r.Cells[i] = cubic(c)
		}
		m.Ranking = append(m.Ranking, r)
	}
	for _, s := range f.RankingTexts() {
		m.Verdict = append(m.Verdict, cubic(s))
	}
}

func (b *builder) card(i int, least bool) card {
	o, drawn := &b.f.Options[i], &b.m.Data.Options[i]
	c := card{Option: o, Index: i, Title: title(o.Title), Risk: riskOf(o.Remedies), Least: least, Stop: &drawn.Stops[b.m.Data.Specified]}
	c.Design = &drawn.Designs[c.Stop.Design]
	for _, list := range [][]string{o.NotChecked, o.Notes} {
		for _, n := range list {
			c.Notes = append(c.Notes, sentence(strings.TrimPrefix(n, o.Title+": ")))
		}
	}
	for _, l := range o.Broken {
		c.Notes = append(c.Notes, sentence("breaks "+l.Name+": "+l.Detail))
	}
	return c
}

// title gives a text a capital.
func title(s string) string { return strings.TrimSuffix(sentence(s), ".") }

func cells(d *design, marks string) []cell {
	out := make([]cell, len(d.Answers))
	for i, a := range d.Answers {
		out[i] = cell{Row: i, Mark: string(marks[i])}
		if a != nil {
			out[i].FS = a.FS
		}
	}
	return out
}

func (b *builder) addSoils() {
	tints := map[string]int{}
	for _, s := range b.m.Data.Soils {
		tints[s.Name] = s.Tint
	}
	names := slices.SortedFunc(maps.Keys(tints), func(p, q string) int { return cmp.Or(tints[p]-tints[q], cmp.Compare(p, q)) })
	for _, name := range names {
		s, known := b.f.Soils[name]
		if !known {
			continue
		}
		t := soilText{
			Name: name, Tint: fmt.Sprintf("tint%d", tints[name]), Weight: report.SizeText(s.UnitWeight) + " kN/m³",
			Drained: drainedWords(&s), Undrained: undrainedWords(s.Undrained),
		}
		b.m.Soils = append(b.m.Soils, t)
	}
}

func drainedWords(s *report.Soil) string {
	if p := s.PowerLaw; p != nil {
		return fmt.Sprintf("τ = %s pa (σ′/pa)^%s, pa %s kPa", report.SizeText(p.A), report.SizeText(p.B), report.SizeText(p.Atmospheric))
	}
	return fmt.Sprintf("c′ %s kPa, φ′ %s°", report.SizeText(s.Drained.Cohesion), report.SizeText(s.Drained.Friction))
}

func undrainedWords(u *report.Undrained) string {
	switch {
	case u == nil:
		return ""
	case len(u.Points) > 0:
		return "cu by position"
	case u.Ratio != nil:
		out := "cu " + report.SizeText(*u.Ratio) + " σ′v before works"
		if u.Minimum != nil && *u.Minimum > 0 {
			out += ", at least " + report.SizeText(*u.Minimum) + " kPa"
		}
		return out
	}
	out := "cu " + report.SizeText(u.Strength) + " kPa"
	if u.Gradient != 0 {
		out += " + " + report.SizeText(u.Gradient) + " kPa/m"
	}
	return out
}

// tintCount is the number of soil colours in the style.
const tintCount = 10

// addRests gathers what the answer rests on and what was assumed.
func (b *builder) addRests() {
	m, f := b.m, b.f
	if o := f.Least(); o != nil && o != &f.Existing {
		for _, s := range []string{f.StepLessText(o), o.CertificateText()} {
			if s != "" {
				m.Rests = append(m.Rests, cubic(s))
			}
		}
	}
	m.Assumed = append(m.Assumed, "Volumes: cut is bank volume, fill compacted volume, never netted; all cut is taken away and all fill is brought in, but for what the case says may serve as fill.")
	if f.Settings.DepthOfInterest > 0 {
		m.Assumed = append(m.Assumed, fmt.Sprintf("Slips nowhere deeper than %s m below ground are left out.", report.SizeText(f.Settings.DepthOfInterest)))
	}
	for _, n := range f.Case.Notes {
		m.Assumed = append(m.Assumed, sentence(strings.ReplaceAll(n, "`", "")))
	}
	for _, n := range f.Settings.Overrides {
		m.Assumed = append(m.Assumed, "Changed when the program was run: "+n+".")
	}
}
