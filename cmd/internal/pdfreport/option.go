package pdfreport

import (
	"fmt"
	"maps"
	"math"
	"slices"
	"strings"

	"standfast/cmd/internal/drawing"
	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// option writes one option: first what there is to read, then its section and slice table on pages that fold out.
func (a *author) option(o *report.Option, r *remedies.Option) error {
	a.chapter("Option: " + optionTitle(o))
	a.status(o)
	a.quantities(o)
	a.bill(o)
	list := answersOf(o)
	a.heading("Situations and stages: factor of safety by method on the critical slip (rounded down)")
	a.factors(list)
	a.heading("Critical slips")
	a.slips(list)
	for i := range o.Stages {
		if s := &o.Stages[i]; s.Says != "" {
			a.item(sentence(s.Name + ": " + s.Says))
		}
	}
	a.handChecks(o)
	a.certificate(o)
	figure, err := drawing.Sequence(&a.r.Existing, r, a.r.Job, a.width())
	if err := a.amid("Construction, from left to right: the lowest FS of each state", figure, err); err != nil {
		return err
	}
	if err := a.tradeoff(o, r); err != nil {
		return err
	}
	if err := a.drainFront(o, r); err != nil {
		return err
	}
	if err := a.sensitivity(o, r); err != nil {
		return err
	}
	section, err := drawing.Section(a.r.Job, r, drawing.Options{})
	if err := a.onFold(section, err); err != nil {
		return err
	}
	return a.slices(r.Governing())
}

// status writes what the sizing came to.
func (a *author) status(o *report.Option) {
	c := inkGood
	if o.Status != meetsTarget {
		c = inkBad
	}
	a.indented(faceStrong, c, 0, "", report.Capital(o.Status)+": "+reason(o)+".")
	if dims := o.Dimensions(o.Parameters); dims != "" {
		a.para("Works: " + dims + ".")
	}
	if o.BindsOn != "" && o.Status != meetsTarget { // Then the least margin says all there is.
		a.para("What binds: " + o.BindsOn + ".")
	}
	for _, l := range o.Broken {
		a.item(fmt.Sprintf("Breaks %s: %s.", l.Name, l.Detail))
	}
	for _, n := range o.Notes {
		a.item(sentence(n))
	}
	for _, n := range o.NotChecked {
		a.item("Not checked: " + n + ".")
	}
}

// reason says why the status is what it is, with the names of dimensions in words.
func reason(o *report.Option) string {
	s := cubic(o.Reason)
	for _, name := range o.Order {
		s = strings.ReplaceAll(s, name, dimension(name))
	}
	return s
}

// quantities writes the amounts that are not 0, per metre run and in all.
func (a *author) quantities(o *report.Option) {
	q, t := &o.Quantities, &o.Totals
	length := a.f.Case.Length
	var rows []row
	add := func(name string, perMetre, inAll float64, unit string) {
		if perMetre != 0 {
			rows = append(rows, cells(name, report.QuantityText(perMetre), report.TotalText(inAll), unit))
		}
	}
	add("earthworks: cut plus fill", q.Earthworks, t.Earthworks, "m³")
	add("cut, bank volume", q.Cut, t.Cut, "m³")
	for _, name := range slices.Sorted(maps.Keys(q.CutBySoil)) {
		add("– "+name, q.CutBySoil[name], q.CutBySoil[name]*length, "m³")
	}
	add("– dig of trenches", q.TrenchDig, q.TrenchDig*length, "m³")
	add("fill, compacted volume", q.Fill, t.Fill, "m³")
	for _, name := range slices.Sorted(maps.Keys(q.FillBySoil)) {
		add("– "+name, q.FillBySoil[name], q.FillBySoil[name]*length, "m³")
	}
	add("– stone in trenches", q.Stone, q.Stone*length, "m³")
	add("brought to the site, compacted", q.Import, t.Import, "m³")
	add("taken away, bank volume", q.Dispose, t.Dispose, "m³")
	add("drains", q.Drain, t.Drain, "m")
	add("ground stripped, beside the earthworks", q.Strip, t.Strip, "m²")
	for _, v := range []struct {
		name  string
		value *report.Number
		unit  string
	}{{"lorry loads", t.Loads, ""}, {"cost, at the rates of the case", t.Cost, a.f.Economics.Currency}, {"carbon, at the factors of the case", t.Carbon, "t CO2e"}} {
		if known(v.value) {
			rows = append(rows, cells(v.name, "", report.TotalText(float64(*v.value)), v.unit))
		}
	}
	a.heading("Quantities (rounded up)")
	if len(rows) == 0 {
		a.para("No earthworks and no drains.")
		return
	}
	a.table([]column{text("item"), number("per metre run"), number("over " + report.SizeText(length) + " m"), text("unit")}, rows)
}

// certificate writes what the answer rests on.
func (a *author) certificate(o *report.Option) {
	c := o.Certificate
	if c == nil {
		return
	}
	a.heading("Certificate")
	if o.Status == meetsTarget {
		a.para(report.Capital(cubic(strings.TrimPrefix(o.CertificateText(), "Certificate: "))))
	} else {
		a.para(fmt.Sprintf("No design of this lattice within the limits was found to meet every check; shown is the best that was reached. %s of %s designs were rejected by a slip each.",
			count(c.Witnessed), count(c.Cheaper)))
	}
	if s := a.f.StepLessText(o); s != "" {
		a.para(cubic(s))
	}
	for _, s := range a.f.RelaxationTexts(o) {
		a.item(cubic(s))
	}
	var axes []row
	for _, x := range c.Axes {
		step := report.SizeText(x.Step)
		if x.Step == 0 {
			step = "fixed"
		}
		axes = append(axes, cells(withUnit(dimension(x.Name), o.Parameters[x.Name].Unit), report.SizeText(x.Min), report.SizeText(x.Max), step))
	}
	if len(axes) > 0 {
		a.table([]column{text("lattice of sizes"), number("least"), number("greatest"), number("step")}, axes)
	}
	if s := o.CoarsenedText(); s != "" {
		a.item(sentence(s))
	}
	words := fmt.Sprintf("%s searched in full, %s slips evaluated.", several(c.DesignsSearched, "design was", "designs were"), count(c.SlipEvaluations))
	if c.Forbidden > 0 {
		words = several(c.Forbidden, "design is", "designs are") + " forbidden by a limit or by geometry; " + words
	}
	if c.ExchangeDesigns > 0 {
		words += " Of those searched, the exchange took " + count(c.ExchangeDesigns) + "."
	}
	if c.Unresolved > 0 {
		words += " " + several(c.Unresolved, "design", "designs") + " could be neither rejected nor accepted."
	}
	if c.ContinuousEstimate.Known() {
		words += " Between the steps of the lattice the exchange estimated " + report.QuantityText(float64(c.ContinuousEstimate)) +
			" m³/m from the slips that it knew: an estimate, not a bound, which may lie on either side of the answer."
	}
	a.para(words)
	var lows []row
	for _, l := range c.Audit.Lowest {
		lows = append(lows, cells(l.Check, required(float64(l.RequiredFS)), factor(l.FS), method(l.Method)))
	}
	if len(lows) > 0 {
		a.table([]column{text("lowest in the audit"), number("required"), number("FS"), text("method")}, lows)
	}
}

func count(n int) string { return report.TotalText(float64(n)) }

// several writes a number of things with the word for one or for more.
func several(n int, one, more string) string {
	if n == 1 {
		return "1 " + one
	}
	return count(n) + " " + more
}

// withUnit names a dimension with its unit.
func withUnit(name, unit string) string {
	switch unit {
	case "", "1":
		return name
	case "1V:nH":
		return name + ", n of 1V:nH"
	}
	return name + ", " + unit
}

// tradeoff writes what other required factors would take.
func (a *author) tradeoff(o *report.Option, r *remedies.Option) error {
	if len(o.Tradeoff) < 2 {
		return nil
	}
	const heading = "What another required factor would take"
	if curved(o.Tradeoff) {
		figure, err := drawing.TradeoffPlot([]remedies.Option{*r}, a.width(), leastPlot)
		if err := a.amid(heading, figure, err); err != nil {
			return err
		}
	} else {
		a.heading(heading)
	}
	var rows []row
	for i := range o.Tradeoff {
		t := &o.Tradeoff[i]
		if !t.ReachedFS.Known() || !t.Earthworks.Known() {
			continue
		}
		r := cells(asked(t), report.FactorText(reached(o, t)), report.QuantityText(float64(t.Earthworks)),
			report.TotalText(float64(t.Earthworks)*a.f.Case.Length), o.Dimensions(t.Parameters))
		if reached(o, t) < t.RequiredFS {
			r.cells[4] = "not reached; the best: " + r.cells[4]
			r.inks = map[int]colour{1: inkBad, 4: inkBad}
		}
		rows = append(rows, r)
	}
	a.table([]column{number("FS asked for"), number("FS reached"), number("earthworks\nm³/m"), number("in all\nm³"), text("works")}, rows)
	a.note("The required factor of every check moves alike; shown is that of the check that governs the option. Designs for another target were searched, and not audited: size the case anew before relying on one.")
	return nil
}

// curved reports whether a trade-off has designs of different earthworks, so that there is a line to draw.
func curved(points []report.TradePoint) bool {
	seen := map[string]bool{}
	for i := range points {
		if e := points[i].Earthworks; e.Known() && points[i].ReachedFS.Known() {
			seen[report.QuantityText(float64(e))] = true
		}
	}
	return len(seen) > 1
}

// asked is the required factor of a point of a trade-off, without what adding the shift leaves behind.
func asked(t *report.TradePoint) string {
	const digits = 1e9
	return required(math.Round(float64(t.RequiredFS)*digits) / digits)
}

// reached is the FS of a point of a trade-off: where it is the design that was sized, not more than its audit left.
func reached(o *report.Option, t *report.TradePoint) report.Number {
	sized := o.Dimensions(t.Parameters) == o.Dimensions(o.Parameters)
	if g, ok := o.Governing(); ok && sized && g.FS.Known() {
		return min(t.ReachedFS, t.RequiredFS-report.Number(t.Shift)+g.Margin())
	}
	return t.ReachedFS
}
