package pdfreport

import (
	"fmt"
	"strings"

	"standfast/cmd/internal/drawing"
	"standfast/cmd/internal/report"
)

// Heights of trade-offs on a page of text, points.
const (
	leastPlot = 180.0
	mostPlot  = 290.0
)

// comparison sets the options side by side.
func (a *author) comparison() error {
	if len(a.f.Options) == 0 {
		return nil
	}
	a.chapter("Options compared")
	a.indented(faceStrong, ink, 0, "", cubic(a.f.Recommendation()))
	a.heading("Works per metre run and in all, in ascending " + a.f.Objective() + "; those that fail last (FS rounded down, quantities up)")
	var rows []row
	for i := range a.f.Options {
		rows = append(rows, optionRow(&a.f.Options[i]))
	}
	a.table([]column{
		text("option"), number("earthworks\nm³/m"), number("cut\nm³/m"), number("fill\nm³/m"), number("drains\nm/m"), number("earthworks\nin all, m³"),
		text("check with the least margin"), number("FS"), number("required"), text("status"),
	}, rows)
	a.haul()
	a.matrix()
	a.points()
	a.reasons()
	high := contentFoot - a.y - 3*faceHead.lead()
	if high < leastPlot { // It goes to the next page.
		high = mostPlot
	}
	figure, err := drawing.TradeoffPlot(a.r.Options, a.width(), min(high, mostPlot))
	return a.amid("Earthworks against the factor of safety reached (ringed: the size that meets every requirement)", figure, err)
}

// optionRow is the row of an option in the comparison.
func optionRow(o *report.Option) row {
	q := &o.Quantities
	c := inkGood
	if o.Status != meetsTarget {
		c = inkBad
	}
	check, fs, asked := none, none, none
	if g, ok := o.Governing(); ok {
		check, fs, asked = g.Check, factor(g.FS), required(g.RequiredFS)
	}
	return row{cells: []string{
		optionTitle(o), report.QuantityText(q.Earthworks), report.QuantityText(q.Cut), report.QuantityText(q.Fill), report.QuantityText(q.Drain),
		report.TotalText(o.Totals.Earthworks), check, fs, asked, unbroken(o.Status),
	}, inks: map[int]colour{9: c}}
}

// optionTitle names an option, with what sets it apart.
func optionTitle(o *report.Option) string {
	name := report.Capital(o.Title)
	switch {
	case o.Trial:
		name += " (trial)"
	case o.WhatIf && !strings.Contains(name, "what-if"):
		name += " (what-if)"
	}
	return name
}

// matrixColumns are the options that a table of checks has room for.
const matrixColumns = 6

// matrix writes the FS of every option in every situation and stage.
func (a *author) matrix() {
	type check struct {
		name     string
		required float64
	}
	var checks []check
	seen := map[string]bool{}
	answers := make([]map[string]*report.Found, len(a.f.Options))
	for i := range a.f.Options {
		answers[i] = map[string]*report.Found{}
		o := &a.f.Options[i]
		see := func(name string, asked float64, f *report.Found) {
			answers[i][name] = f
			if !seen[name] {
				seen[name] = true
				checks = append(checks, check{name, asked})
			}
		}
		for k := range o.Situations {
			see(o.Situations[k].Name, o.Situations[k].RequiredFS, &o.Situations[k].Found)
		}
		for k := range o.Stages {
			see("stage: "+o.Stages[k].Name, o.Stages[k].RequiredFS, &o.Stages[k].Found)
		}
	}
	a.heading("Factor of safety of every option in every situation and stage")
	for from := 0; from < len(a.f.Options); from += matrixColumns {
		to := min(from+matrixColumns, len(a.f.Options))
		columns := []column{text("check"), number("required")}
		for i := from; i < to; i++ {
			columns = append(columns, text(optionTitle(&a.f.Options[i])))
		}
		var rows []row
		for _, c := range checks {
			r := row{cells: []string{c.name, required(c.required)}, inks: map[int]colour{}}
			for i := from; i < to; i++ {
				cell := none
				if f := answers[i][c.name]; f != nil {
					words, col := verdict(f, c.required)
					cell = words
					if f.FS.Known() {
						cell = report.FactorText(f.FS) + noBreak + unbroken(words)
					}
					r.inks[len(r.cells)] = col
				}
				r.cells = append(r.cells, cell)
			}
			rows = append(rows, r)
		}
		a.table(columns, rows)
	}
}

// reasons writes why options do not meet the target.
func (a *author) reasons() {
	var out []string
	for i := range a.f.Options {
		o := &a.f.Options[i]
		if o.Reason != "" && o.Status != meetsTarget {
			out = append(out, fmt.Sprintf("%s, %s: %s", optionTitle(o), o.Status, strings.TrimPrefix(reason(o), o.Title+", "+o.Status+": ")))
		}
	}
	if len(out) == 0 {
		return
	}
	a.heading("Why options do not meet the target")
	for _, s := range out {
		a.item(sentence(s))
	}
}
