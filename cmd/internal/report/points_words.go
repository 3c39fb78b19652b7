package report

import (
	"fmt"
	"slices"
	"strings"

	"standfast/remedies"
)

// notNeeded stands for an option where the slope as it is already stands.
const notNeeded = "not needed"

// Strengths returns the cohesion and the angle of friction of a point, rounded down: "c' 0.00 kPa" and "phi' 25.49 degrees".
func (s *Sized) Strengths() (cohesion, friction string) {
	return "c' " + strengthText(s.Cohesion) + " kPa", "phi' " + strengthText(s.Friction) + " degrees"
}

// Text says which strength a point has.
func (s *Sized) Text() string {
	cohesion, friction := s.Strengths()
	return cohesion + ", " + friction
}

// PointsHeading stands over the table of what options come to at the points.
func (f *File) PointsHeading() string {
	return fmt.Sprintf("Sized again with strengths of %s that give the observed slip FS 1 in %s (searched and audited; quantities up)", f.BackAnalysis.Soil, f.BackAnalysis.Situation)
}

// ranking lists the options of a point that meet the target, what-ifs left out, the least first; the slope as it is alone if it stands.
func (s *Sized) ranking() []string {
	if s.needsNothing() {
		return []string{*s.Least}
	}
	var out []string
	for i := range s.Options {
		if o := &s.Options[i]; o.Status == meetsTarget && !o.WhatIf {
			out = append(out, o.Name)
		}
	}
	return out
}

// needsNothing reports whether the slope as it is stands with the strength of the point.
func (s *Sized) needsNothing() bool { return s.Least != nil && *s.Least == s.Existing.Name }

func (s *Sized) option(name string) *Option {
	i := slices.IndexFunc(s.Options, func(o Option) bool { return o.Name == name })
	if i < 0 {
		return nil
	}
	return &s.Options[i]
}

// sameLeast reports whether one option has the least of the objective at every point; nothing at every point is the same too.
func (a *BackAnalysis) sameLeast() bool {
	return !slices.ContainsFunc(a.Points, func(s Sized) bool {
		first := a.Points[0].Least
		return (s.Least == nil) != (first == nil) || first != nil && *s.Least != *first
	})
}

// flips reports whether two points have different options with the least of the objective.
func (a *BackAnalysis) flips() bool {
	names := map[string]bool{}
	for i := range a.Points {
		if l := a.Points[i].Least; l != nil {
			names[*l] = true
		}
	}
	return len(names) > 1
}

// sameOrder reports whether the options that meet the target are the same in the same order at every point.
func (a *BackAnalysis) sameOrder() bool {
	return !slices.ContainsFunc(a.Points, func(s Sized) bool { return !slices.Equal(s.ranking(), a.Points[0].ranking()) })
}

// RankingTexts tell in plain sentences what the observed slip leaves open: whether the choice is the same wherever on the curve the strength lies,
// and where it changes if not.
func (f *File) RankingTexts() []string {
	a := f.BackAnalysis
	switch {
	case a == nil:
		return nil
	case len(a.Points) == 0:
		return []string{"The observed slip has no back-analysis, and nothing was sized for it: " + a.Reason + "."}
	}
	out := []string{f.leastText(a)}
	if s := f.orderText(a); s != "" {
		out = append(out, s)
	}
	if s := a.chosenText(); s != "" {
		out = append(out, s)
	}
	return append(out, a.lowestText())
}

// chosenText tells how the works of the answer, of the size found with the strengths of the case, stand at each point; empty if there are none.
func (a *BackAnalysis) chosenText() string {
	var parts []string
	title := ""
	for i := range a.Points {
		o := a.Points[i].Chosen
		if o == nil {
			continue
		}
		title = o.Title
		says := "stands"
		if g, ok := o.Governing(); o.Status != meetsTarget && ok {
			says = fmt.Sprintf("FS %s of the %s required in %s", FactorText(g.FS), RequiredText(Number(g.RequiredFS)), g.Check)
			if g.Margin() >= 0 {
				says += ", " + o.Status
			}
		}
		parts = append(parts, a.Points[i].Name+" point, "+says)
	}
	if len(parts) == 0 {
		return ""
	}
	return fmt.Sprintf("%s, of the size found with the strengths of the case: %s.", Capital(title), strings.Join(parts, "; "))
}

// leastText tells which option is least at each point.
func (f *File) leastText(a *BackAnalysis) string {
	first := &a.Points[0]
	switch {
	case a.sameLeast() && first.Least == nil:
		return "Nothing meets the target at any of the three points."
	case a.sameLeast() && first.needsNothing():
		return "Nothing is needed at any of the three points."
	case a.sameLeast():
		var values []string
		for i := range a.Points {
			values = append(values, f.valued(a.Points[i].option(*first.Least)))
		}
		then := ""
		if o := f.Least(); o == nil || o.Name != *first.Least {
			then = " With the strengths of the case it is not the least."
		}
		return fmt.Sprintf("The option with the least %s is the same at all three points: %s (%s).%s", f.Objective(), first.option(*first.Least).Title,
			strings.Join(values, "; "), then)
	}
	var parts []string
	for i := range a.Points {
		s := &a.Points[i]
		least := "nothing meets the target"
		switch {
		case s.needsNothing():
			least = "nothing is needed"
		case s.Least != nil:
			o := s.option(*s.Least)
			least = o.Title + ", " + f.valued(o)
		}
		parts = append(parts, fmt.Sprintf("at the %s point (%s): %s", s.Name, s.Text(), least))
	}
	lead := "The choice does not hold at every point"
	if a.flips() {
		lead = "The choice flips"
	}
	return fmt.Sprintf("%s. Least %s %s.", lead, f.Objective(), strings.Join(parts, "; "))
}

// orderText tells how the options that meet the target rank at each point; empty if that says nothing more.
func (f *File) orderText(a *BackAnalysis) string {
	if a.sameOrder() {
		if len(a.Points[0].ranking()) < 2 {
			return ""
		}
		return "The ranking of the options that meet the target is the same at all three points."
	}
	var parts []string
	most := 0
	for i := range a.Points {
		s := &a.Points[i]
		most = max(most, len(s.ranking()))
		var titles []string
		for _, name := range s.ranking() {
			if o := s.option(name); o != nil {
				titles = append(titles, o.Title)
			}
		}
		if len(titles) == 0 {
			titles = append(titles, "none")
		}
		parts = append(parts, s.Name+": "+strings.Join(titles, ", "))
	}
	if most < 2 { // Then the least says it all.
		return ""
	}
	return "The options that meet the target, least first, are not the same at all three points: " + strings.Join(parts, "; ") + "."
}

// lowestText sets the lowest FS of the slope as it is beside the observed slip's FS of 1.
func (a *BackAnalysis) lowestText() string {
	var parts []string
	for i := range a.Points {
		for _, s := range a.Points[i].Existing.Situations {
			if s.Name == a.Situation {
				parts = append(parts, FactorText(s.FS)+" at the "+a.Points[i].Name+" point")
			}
		}
	}
	return fmt.Sprintf("The lowest FS found in %s, where the observed slip has FS 1, is %s; were it far below 1, the slip, the water at failure or the strength of the other soils would not be as assumed.",
		a.Situation, strings.Join(parts, ", "))
}

// valued returns what is made least of an option, rounded up, with its unit.
func (f *File) valued(o *Option) string {
	switch least, _ := remedies.ParseObjective(f.Settings.Objective); {
	case least == remedies.LeastCost && o.Totals.Cost != nil:
		return f.money(TotalText(float64(*o.Totals.Cost)))
	case least == remedies.LeastCarbon && o.Totals.Carbon != nil:
		return QuantityText(float64(*o.Totals.Carbon)) + " t CO2 equivalent"
	}
	s := QuantityText(o.Quantities.Earthworks) + " m3/m"
	if o.Quantities.Drain > 0 {
		s += " and " + QuantityText(o.Quantities.Drain) + " m/m of drains"
	}
	return s
}

// RankingRow is one option at every point of the back-analysis.
type RankingRow struct {
	Title string
	Cells []string // By point: what is made least of it, or why it does not do.
}

// RankingRows list the options as ranked in the file, what they come to at each point.
func (f *File) RankingRows() []RankingRow {
	a := f.BackAnalysis
	if a == nil {
		return nil
	}
	type known struct{ name, title string }
	var options []known
	add := func(list []Option) {
		for i := range list {
			k := known{list[i].Name, list[i].Title}
			if list[i].Trial {
				k.title += " (trial)"
			}
			if !slices.Contains(options, k) {
				options = append(options, k)
			}
		}
	}
	add(f.Options)
	for i := range a.Points {
		add(a.Points[i].Options)
	}
	var rows []RankingRow
	for _, k := range options {
		r := RankingRow{Title: k.title}
		for i := range a.Points {
			r.Cells = append(r.Cells, f.rankingCell(&a.Points[i], k.name))
		}
		rows = append(rows, r)
	}
	return rows
}

// rankingCell says in a word or a number what an option comes to at a point.
func (f *File) rankingCell(s *Sized, name string) string {
	o := s.option(name)
	switch {
	case o == nil && s.needsNothing():
		return notNeeded
	case o == nil:
		return unknown
	case o.Status != meetsTarget:
		return o.Status
	case o.WhatIf: // Has no works to count.
		return o.Dimensions(o.Parameters)
	}
	return f.valued(o)
}
