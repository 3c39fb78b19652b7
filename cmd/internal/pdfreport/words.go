package pdfreport

import (
	"fmt"
	"regexp"
	"slices"
	"strings"

	"standfast/cmd/internal/report"
	"standfast/lem"
	"standfast/remedies"
)

// meetsTarget is the status of an option that meets the target.
const meetsTarget = "meets target"

// none stands where there is nothing to say.
const none = "–"

// at writes a point as offset and level.
func at(p report.Point) string { return fmt.Sprintf("(%.2f, %.2f)", p[0], p[1]) }

// line writes the points of a line.
func line(ps []report.Point) string {
	out := make([]string, len(ps))
	for i, p := range ps {
		out[i] = "(" + report.SizeText(p[0]) + ", " + report.SizeText(p[1]) + ")"
	}
	return strings.Join(out, " ")
}

// cubic writes cubic metres as printers do.
func cubic(s string) string { return strings.ReplaceAll(s, " m3", " m³") }

// raised writes the powers of a unit as printers do.
func raised(unit string) string { return strings.NewReplacer("m2", "m²", "m3", "m³").Replace(unit) }

// symbols writes letters of formulas as printers do.
var symbols = strings.NewReplacer("phi'", "φ′", "c' ", "c′ ", "tan beta", "tan β", " degrees", "°")

// sentence gives a text a capital and a full stop; quotation marks of the case file are left out.
func sentence(s string) string {
	s = symbols.Replace(strings.ReplaceAll(s, "`", ""))
	if s == "" {
		return ""
	}
	s = report.Capital(s)
	if !strings.HasSuffix(s, ".") {
		s += "."
	}
	return cubic(s)
}

// method spells a method of slices as people do.
func method(name string) string {
	switch name {
	case "":
		return none
	case lem.MorgensternPrice.String():
		return "Morgenstern-Price"
	case lem.Janbu.String():
		return "Janbu with f0"
	case lem.JanbuPlain.String():
		return "Janbu"
	}
	return report.Capital(name)
}

// required writes a required FS; a check of which nothing is asked has none.
func required(fs float64) string {
	if fs == 0 {
		return none
	}
	s := report.RequiredText(report.Number(fs))
	return strings.TrimSuffix(s, "0")
}

// factor writes an FS, or that there is none.
func factor(fs report.Number) string {
	if !fs.Known() {
		return "none"
	}
	return report.FactorText(fs)
}

// verdict says what an answer comes to, and in which ink.
func verdict(a *report.Found, required float64) (string, colour) {
	switch {
	case !a.FS.Known():
		return "no slip converged", inkBad
	case required == 0:
		return "told only", ink
	case float64(a.FS) < required:
		return "below", inkBad
	case !a.Resolved:
		return "unresolved", inkBad
	}
	return "meets", inkGood
}

// methodsOf returns the methods that answered in any of the checks, in the engine's order.
func methodsOf(found []*report.Found) []string {
	var out []string
	for _, m := range lem.Methods() {
		if slices.ContainsFunc(found, func(a *report.Found) bool { _, ok := a.FSByMethod[m.String()]; return ok }) {
			out = append(out, m.String())
		}
	}
	return out
}

// strength says which soils act undrained.
func strength(s report.Strength, order []string) string {
	var undrained []string
	for _, name := range order {
		if s.Of(name) == "undrained" {
			undrained = append(undrained, name)
		}
	}
	switch {
	case len(undrained) == 0:
		return "drained"
	case len(undrained) == len(order):
		return "undrained"
	}
	return "undrained in " + strings.Join(undrained, ", ") + "; drained elsewhere"
}

// measured finds a number with its unit.
var measured = regexp.MustCompile(`(\d) (m[²³]?|kPa|kN|%|m³/m)([ ,.;:)]|$)`)

// tied keeps numbers with their units, and with what they are of, on one line.
func tied(s string) string {
	return strings.ReplaceAll(measured.ReplaceAllString(s, "$1"+noBreak+"$2$3"), "x = ", "x"+noBreak+"="+noBreak)
}

// unbroken keeps a text on one line.
func unbroken(s string) string { return strings.ReplaceAll(s, " ", noBreak) }

// dimension is the name of a parameter in words.
func dimension(name string) string { return remedies.ParameterWords(name) }
