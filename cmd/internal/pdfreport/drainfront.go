package pdfreport

import (
	"fmt"
	"slices"
	"strings"

	"standfast/cmd/internal/drawing"
	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// drainFront writes the earthworks of an option against its metres of drain, numbered as in the plot.
func (a *author) drainFront(o *report.Option, r *remedies.Option) error {
	if o.Front == nil {
		return nil
	}
	figure, err := drawing.FrontPlot(r, a.width(), leastPlot)
	if err := a.amid("Earthworks against metres of drain (ringed: the design of this option)", figure, err); err != nil {
		return err
	}
	priced := slices.ContainsFunc(o.Front.Points, func(p report.FrontPoint) bool { return known(p.Cost) })
	columns := []column{number("point"), number("drains\nm/m"), number("earthworks\nm³/m")}
	if priced {
		columns = append(columns, number(strings.TrimSpace("cost\n"+a.f.Economics.Currency)))
	}
	columns = append(columns, number("FS"), number("required"), text("in"), text("dimensions that differ"))
	var rows []row
	for i := range o.Front.Points {
		p := &o.Front.Points[i]
		name := fmt.Sprint(i + 1)
		if p.Answer {
			name = "this, " + name
		}
		list := []string{name, report.QuantityText(float64(p.Drain)), report.QuantityText(float64(p.Earthworks))}
		if priced {
			cost := none
			if known(p.Cost) {
				cost = report.TotalText(float64(*p.Cost))
			}
			list = append(list, cost)
		}
		rows = append(rows, cells(append(list, factor(p.FS), required(float64(p.RequiredFS)), p.Check, o.FrontDimensions(p))...))
	}
	a.table(columns, rows)
	a.note(o.FrontText())
	return nil
}
