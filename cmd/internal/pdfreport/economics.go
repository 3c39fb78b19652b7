package pdfreport

import (
	"fmt"
	"maps"
	"slices"
	"strings"

	"standfast/cmd/internal/report"
)

// economics writes the rates and factors of the case and the material of its site, if it gives any.
func (a *author) economics() {
	e := &a.f.Economics
	var rows []row
	add := func(name string, v *float64, unit string) {
		if v != nil {
			rows = append(rows, cells(name, report.SizeText(*v)+unit))
		}
	}
	add("topsoil stripped under the works", e.StripDepth, " m")
	add("steps cut into a face before it is filled", e.BenchStep, " m high")
	add("lorry load, loose", e.LorryLoad, " m³")
	factors := func(of string, f report.SoilFactors) {
		add("bulking of "+of+", loose over bank", f.Bulking, "")
		add("shrinkage of "+of+", compacted over bank", f.Shrinkage, "")
		add("rate of "+of+" brought", f.ImportRate, money(e)+" per m³")
		add("carbon of "+of+" brought", f.ImportCarbon, " kg CO2e per m³")
	}
	for _, name := range slices.Sorted(maps.Keys(e.Soils)) {
		factors(name, e.Soils[name])
	}
	factors("stone in trenches", e.Stone)
	for _, name := range slices.Sorted(maps.Keys(e.Rates)) {
		rows = append(rows, cells("rate: "+dimension(name), report.SizeText(e.Rates[name])+money(e)))
	}
	for _, name := range slices.Sorted(maps.Keys(e.Carbon)) {
		rows = append(rows, cells("carbon: "+dimension(name), report.SizeText(e.Carbon[name])+" kg CO2e"))
	}
	for _, s := range a.f.OnSite {
		rows = append(rows, cells("material of the site: "+s.Name, onSite(&s)))
	}
	if len(rows) == 0 {
		return
	}
	a.heading("Rates, factors and material of the site")
	a.table([]column{text("what the case gives"), text("value")}, rows)
}

// money is the currency of the rates behind a blank, if one is named.
func money(e *report.Economics) string {
	if e.Currency == "" {
		return ""
	}
	return " " + e.Currency
}

func onSite(s *report.OnSiteFill) string {
	out := "stockpile"
	if s.CutOf != "" {
		out = report.SizeText(100*s.Share) + " % of the cut of " + s.CutOf
	}
	out += ", may be placed as " + strings.Join(s.Serves, ", ")
	if s.Volume != nil {
		out += ", at most " + report.SizeText(*s.Volume) + " m³ compacted"
	}
	return out
}

// known reports whether an optional number is there.
func known(n *report.Number) bool { return n != nil && n.Known() }

// total writes an optional amount rounded up to a whole number.
func total(n *report.Number) string {
	if !known(n) {
		return none
	}
	return report.TotalText(float64(*n))
}

// amount writes an optional amount with two decimals, rounded up.
func amount(n *report.Number) string {
	if !known(n) {
		return none
	}
	return report.QuantityText(float64(*n))
}

// haul sets side by side what is brought, taken away and spent for the whole length: only what any option has.
func (a *author) haul() {
	columns := []column{text("option"), number("brought\nm³ compacted"), number("taken away\nm³ bank"), number("stripped\nm²")}
	shown := [3]bool{}
	for i := range a.f.Options {
		t := &a.f.Options[i].Totals
		shown = [3]bool{shown[0] || known(t.Loads), shown[1] || known(t.Cost), shown[2] || known(t.Carbon)}
	}
	for k, head := range []string{"lorry\nloads", "cost\n" + strings.TrimSpace(money(&a.f.Economics)), "carbon\nt CO2e"} {
		if shown[k] {
			columns = append(columns, number(head))
		}
	}
	var rows []row
	for i := range a.f.Options {
		o := &a.f.Options[i]
		t := &o.Totals
		r := cells(optionTitle(o), report.TotalText(t.Import), report.TotalText(t.Dispose), report.TotalText(t.Strip))
		for k, s := range []string{total(t.Loads), total(t.Cost), amount(t.Carbon)} {
			if shown[k] {
				r.cells = append(r.cells, s)
			}
		}
		rows = append(rows, r)
	}
	a.heading(fmt.Sprintf("For the whole length of %s m (rounded up)", report.SizeText(a.f.Case.Length)))
	a.table(columns, rows)
	if !shown[1] {
		a.note("Cost, carbon and lorry loads are shown where the case gives the rates and factors that they need.")
	}
}

// bill writes the works as they are measured, with what they cost where the case gives rates.
func (a *author) bill(o *report.Option) {
	if len(o.Bill) == 0 {
		return
	}
	priced, weighed := false, false
	for i := range o.Bill {
		priced, weighed = priced || known(o.Bill[i].Cost), weighed || known(o.Bill[i].Carbon)
	}
	columns := []column{text("work"), text("soil"), number("per metre run"), number("in all"), text("unit")}
	if priced {
		columns = append(columns, number("cost"+"\n"+strings.TrimSpace(money(&a.f.Economics))))
	}
	if weighed {
		columns = append(columns, number("carbon\nkg CO2e"))
	}
	var rows []row
	for i := range o.Bill {
		it := &o.Bill[i]
		soil := it.Soil
		if soil == "" {
			soil = none
		}
		r := cells(dimension(it.Work), soil, amount(it.PerMetre), total(it.Total), raised(it.Unit))
		if priced {
			r.cells = append(r.cells, total(it.Cost))
		}
		if weighed {
			r.cells = append(r.cells, total(it.Carbon))
		}
		rows = append(rows, r)
	}
	a.heading("Works as measured (rounded up)")
	a.table(columns, rows)
	if slices.ContainsFunc(rows, func(r row) bool { return slices.Contains(r.cells[2:], none) }) {
		a.note(none + ": not worked out, since the case does not give the rate, the factor or the measure that it needs.")
	}
}
