package sheet

import (
	"fmt"
	"math"
	"strings"

	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// notGiven stands for what the case gives no rates or factors for.
const notGiven = "not given"

// meetsTarget is the status of an option that meets the target.
const meetsTarget = "meets target"

// required returns a required FS rounded up, with two decimals where two are enough.
func required(fs float64) string {
	s := report.RequiredText(report.Number(fs))
	if len(s) > 4 && strings.HasSuffix(s, "0") {
		s = s[:len(s)-1]
	}
	return s
}

// fsDigits is how finely a shifted FS is told apart from what adding the shift leaves behind.
const fsDigits = 1e9

// shifted returns a required FS moved by a shift, without the noise of the sum.
func shifted(fs, shift float64) float64 { return math.Round((fs+shift)*fsDigits) / fsDigits }

func unshifted(fs, shift float64) float64 { return shifted(fs, -shift) }

// given returns a total with its unit, or that it is not given.
func given(v *report.Number, unit string) string {
	if v == nil || !v.Known() {
		return notGiven
	}
	return report.TotalText(float64(*v)) + unit
}

// forTarget returns a total of a point of a trade-off, which may be missing where the option as specified has one.
func forTarget(v *report.Number, unit, specified string) string {
	if text := given(v, unit); text != notGiven || specified == notGiven {
		return text
	}
	return "not worked out for this target"
}

// cubic writes cubic metres as printers do.
func cubic(s string) string { return strings.ReplaceAll(s, " m3", " m³") }

// sentence gives a text a capital and a full stop.
func sentence(s string) string {
	if s == "" {
		return ""
	}
	s = report.Capital(s)
	if !strings.HasSuffix(s, ".") {
		s += "."
	}
	return cubic(s)
}

// addTexts adds the numbers of a design: per metre run, and for the whole length.
func (b *builder) addTexts(d *design, o *report.Option, parameters map[string]report.Parameter, q *report.Quantities) {
	t := d.Texts
	t["dims"] = o.Dimensions(parameters)
	t["change"] = ""
	for _, v := range []struct {
		key   string
		value float64
	}{
		{"earth", q.Earthworks}, {"cut", q.Cut}, {"fill", q.Fill}, {"import", q.Import}, {"dispose", q.Dispose}, {"drain", q.Drain},
	} {
		t[v.key+"-m"], t[v.key] = report.QuantityText(v.value), report.TotalText(v.value*b.f.Case.Length)
	}
	d.Cut, d.Fill = q.Cut, q.Fill
	t["fs"], t["check"] = "-", "no check answered"
	if g := d.Governing; g >= 0 {
		t["fs"], t["check"] = d.Answers[g].FS, b.m.Data.Rows[g].Name
	}
}

// amount returns what a design takes of what was made least; +Inf where that is not known, as of a what-if.
func (b *builder) amount(q *report.Quantities, cost, carbon *report.Number) float64 {
	total := carbon
	switch least, _ := remedies.ParseObjective(b.f.Objective()); least {
	case remedies.LeastEarthworks:
		return q.Earthworks
	case remedies.LeastCost:
		total = cost
	case remedies.LeastCarbon:
	}
	if total == nil || !total.Known() {
		return math.Inf(1)
	}
	return float64(*total)
}

// change says by how much the earthworks differ from those as specified: what is saved is rounded down, what is added up.
func change(works, specified, length float64) string {
	per, total := works-specified, (works-specified)*length
	switch {
	case math.Abs(per) < 0.005: // Less than what is printed.
		return "as much as for the specified target"
	case per < 0:
		return fmt.Sprintf("%s m³ less than for the specified target (%.0f %%)", flooredTotal(-total), math.Floor(-100*per/specified))
	case specified > 0:
		return fmt.Sprintf("%s m³ more than for the specified target (%.0f %%)", report.TotalText(total), math.Ceil(100*per/specified))
	}
	return fmt.Sprintf("%s m³ more than for the specified target", report.TotalText(total))
}

func flooredTotal(v float64) string { return report.TotalText(math.Floor(v)) }
