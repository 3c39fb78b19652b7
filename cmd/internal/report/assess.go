package report

import (
	"fmt"
	"io"
	"slices"

	"github.com/jedib0t/go-pretty/v6/table"

	"standfast/lem"
)

// WriteAssessment prints the slope as it is: in every situation the FS of every method and the critical slip, then the cautions.
func WriteAssessment(w io.Writer, f *File, look Look) error {
	p := newPrinter(w, look)
	p.title(f)
	p.factors(&f.Existing)
	p.slips(&f.Existing)
	p.neutral(&f.Existing)
	for _, n := range f.Existing.Notes {
		p.para("Note: ", n)
	}
	for _, n := range f.Existing.NotChecked {
		p.para("Not checked: ", n)
	}
	p.cautions(f.Cautions)
	return p.err
}

// methodsOf returns the names of the methods that answered in any situation, in the engine's order.
func methodsOf(o *Option) []string {
	var names []string
	for m := lem.Ordinary; m.String() != "unknown"; m++ {
		if slices.ContainsFunc(o.Situations, func(a Answer) bool { _, ok := a.FSByMethod[m.String()]; return ok }) {
			names = append(names, m.String())
		}
	}
	return names
}

// factors prints the FS of every method on the critical slip of each situation.
func (p *printer) factors(o *Option) {
	p.heading("Factor of safety of the slope as it is, by method on the critical slip (rounded down)")
	columns := []column{{head: "situation", most: 32}, {head: "FS", right: true}, {head: "required", right: true}, {head: "governs"}}
	methods := methodsOf(o)
	for _, m := range methods {
		columns = append(columns, column{head: MethodText(m), right: true})
	}
	var rows []table.Row
	for _, s := range o.Situations {
		row := table.Row{s.Name, FactorText(s.FS), RequiredText(Number(s.RequiredFS)), method(s.Found)}
		for _, m := range methods {
			fs, ok := s.FSByMethod[m]
			if !ok {
				fs = nan
			}
			row = append(row, FactorText(fs))
		}
		rows = append(rows, append(row, verdict(s.Found, s.RequiredFS)))
	}
	p.table(append(columns, column{}), rows)
}

// slips prints the critical slip of each situation.
func (p *printer) slips(o *Option) {
	p.heading("Critical slips (m)")
	var rows []table.Row
	for _, s := range o.Situations {
		if s.Slip == nil {
			rows = append(rows, table.Row{s.Name, "none converged"})
			continue
		}
		shape, radius := fmt.Sprintf("%d points", len(s.Slip.Points)), unknown
		if s.Slip.Centre != nil {
			shape, radius = pointText(*s.Slip.Centre), fmt.Sprintf("%.2f", s.Slip.Radius)
		}
		rows = append(rows, table.Row{s.Name, shape, radius, pointText(s.Slip.From), pointText(s.Slip.To), fmt.Sprintf("%.2f", float64(s.Depth))})
	}
	p.table([]column{
		{head: "situation", most: 32}, {head: "centre"}, {head: "radius", right: true}, {head: "from"}, {head: "to"}, {head: "depth", right: true},
	}, rows)
}
