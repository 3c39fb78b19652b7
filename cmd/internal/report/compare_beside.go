package report

import (
	"fmt"
	"math"
	"strings"

	"github.com/jedib0t/go-pretty/v6/table"
)

// same is the relative difference below which two volumes are the same.
const same = 1e-9

// balanced reports whether an option brings other volumes than its fill, or takes away others than its cut.
func balanced(o *Option) bool {
	q := &o.Quantities
	return math.Abs(q.Import-q.Fill) > same*q.Fill || math.Abs(q.Dispose-q.Cut) > same*q.Cut
}

// materials prints what is brought and taken away, and what it costs, for the whole length: only the columns that say something new.
func (p *printer) materials(f *File) {
	var haul, loads, cost, carbon bool
	for i := range f.Options {
		o := &f.Options[i]
		haul = haul || balanced(o)
		loads, cost, carbon = loads || o.Totals.Loads != nil, cost || o.Totals.Cost != nil, carbon || o.Totals.Carbon != nil
	}
	if !haul && !loads && !cost && !carbon {
		return
	}
	columns := []column{{head: "option", most: 30}}
	add := func(shown bool, head string) {
		if shown {
			columns = append(columns, column{head: head, right: true})
		}
	}
	add(haul, "import\nm3")
	add(haul, "disposal\nm3")
	add(loads, "lorry\nloads")
	add(cost, strings.TrimSpace("cost\n"+f.Economics.Currency))
	add(carbon, "carbon\nt CO2e")
	var rows []table.Row
	for i := range f.Options {
		t := &f.Options[i].Totals
		row := table.Row{f.Options[i].Title}
		cell := func(shown bool, text string) {
			if shown {
				row = append(row, text)
			}
		}
		cell(haul, TotalText(t.Import))
		cell(haul, TotalText(t.Dispose))
		cell(loads, optional(t.Loads, TotalText))
		cell(cost, optional(t.Cost, TotalText))
		cell(carbon, optional(t.Carbon, QuantityText))
		rows = append(rows, row)
	}
	p.heading(fmt.Sprintf("For the whole length of %s m (rounded up; - where a rate or factor is blank)", SizeText(f.Case.Length)))
	p.table(columns, rows)
}

// optional returns the text of a number that may be unknown.
func optional(n *Number, text func(float64) string) string {
	if n == nil {
		return unknown
	}
	return text(float64(*n))
}

// relaxations prints what moving a limit would save to each option that meets the target.
func (p *printer) relaxations(f *File) {
	first := true
	for i := range f.Options {
		o := &f.Options[i]
		if o.Status != meetsTarget {
			continue
		}
		for _, s := range f.RelaxationTexts(o) {
			if first {
				p.line("")
				first = false
			}
			p.para(" ", Capital(o.Title)+": "+strings.ToLower(s[:1])+s[1:])
		}
	}
}

// sensitivity prints how the least margin swings with the inputs, for the slope as it is and for an option.
func (p *printer) sensitivity(f *File, o *Option) {
	if len(o.Sensitivity) == 0 {
		return
	}
	before := map[string]Bar{}
	for _, b := range f.Existing.Sensitivity {
		before[b.Input] = b
	}
	var rows []table.Row
	for _, b := range o.Sensitivity {
		row := table.Row{b.Input, FactorText(b.Low.FS), FactorText(b.High.FS)}
		if e, ok := before[b.Input]; ok {
			row = append(row, FactorText(e.Low.FS), FactorText(e.High.FS))
		} else {
			row = append(row, unknown, unknown)
		}
		rows = append(rows, append(row, shortfall(b)))
	}
	p.heading(fmt.Sprintf("How sure: FS of %s, and of the slope as it is, with one input at either end of its swing (searched, not audited)", o.Title))
	p.table([]column{
		{head: "input", most: 30},
		{head: "FS low", right: true},
		{head: "FS high", right: true},
		{head: "before\nworks, low", right: true},
		{head: "before\nworks, high", right: true},
		{most: 36},
	}, rows)
}

// shortfall names the checks that fall short at either end of a swing.
func shortfall(b Bar) string {
	var parts []string
	for _, end := range []struct {
		name string
		s    Swung
	}{{"low", b.Low}, {"high", b.High}} {
		if end.s.FS.Known() && end.s.FS < end.s.RequiredFS {
			parts = append(parts, fmt.Sprintf("%s: short of %s in %s", end.name, RequiredText(end.s.RequiredFS), end.s.Check))
		}
	}
	return strings.Join(parts, "; ")
}
