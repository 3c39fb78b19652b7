package report

import (
	"fmt"
	"slices"
	"strings"
	"unicode"
	"unicode/utf8"

	"standfast/lem"
	"standfast/optimize"
	"standfast/remedies"
)

// Capital gives a text a capital; it may be in any alphabet.
func Capital(s string) string {
	first, n := utf8.DecodeRuneInString(s)
	if n == 0 {
		return s
	}
	return string(unicode.ToUpper(first)) + s[n:]
}

// sizeOf returns a dimension in words, such as "top width 4 m" or "batter 1V:2H".
func sizeOf(name string, value float64, unit string) string {
	return remedies.Value{Name: name, Value: value, Unit: unit}.Words(SizeText(value))
}

// Dimensions returns dimensions of an option in words, in the order of its remedy: its own, or those of a point of its trade-off.
func (o *Option) Dimensions(parameters map[string]Parameter) string {
	var out []string
	for _, name := range o.Order {
		if v, ok := parameters[name]; ok && v.Value.Known() {
			out = append(out, sizeOf(name, float64(v.Value), v.Unit))
		}
	}
	return strings.Join(out, ", ")
}

// Governing is the check of an option with the least margin.
type Governing struct {
	Check      string
	FS         Number
	RequiredFS float64
}

// Margin returns FS less the required FS; it is not known if the FS is not.
func (g Governing) Margin() Number { return g.FS - Number(g.RequiredFS) }

// Governing returns the situation or stage with the least margin and reports whether there is one. A check without an FS governs before all
// others.
func (o *Option) Governing() (Governing, bool) {
	var g Governing
	any := false
	consider := func(name string, fs Number, required float64) {
		c := Governing{name, fs, required}
		if !any || !(c.Margin() >= g.Margin()) {
			g = c
		}
		any = true
	}
	for i := range o.Situations {
		consider(o.Situations[i].Name, o.Situations[i].FS, o.Situations[i].RequiredFS)
	}
	for i := range o.Stages {
		if o.Stages[i].Advisory { // Nothing is asked of it.
			continue
		}
		consider(o.Stages[i].Name, o.Stages[i].FS, o.Stages[i].RequiredFS)
	}
	return g, any
}

// Least returns the option with the least of what sizings make least of those that meet the target; nil if there is none. It may be the existing slope.
func (f *File) Least() *Option {
	if f.LeastEarthworks == nil {
		return nil
	}
	for i := range f.Options {
		if f.Options[i].Name == *f.LeastEarthworks {
			return &f.Options[i]
		}
	}
	return &f.Existing
}

// Met reports whether something meets the target: the slope as it is, or an option that is no what-if.
func (f *File) Met() bool {
	return f.LeastEarthworks != nil || slices.ContainsFunc(f.Options, func(o Option) bool { return o.Status == meetsTarget && !o.WhatIf })
}

// Nearest returns the option that comes nearest to the target, what-ifs left out; nil if no option has an FS.
func (f *File) Nearest() *Option {
	var best *Option
	var margin Number
	for i := range f.Options {
		o := &f.Options[i]
		g, ok := o.Governing()
		if o.WhatIf || !ok || !g.FS.Known() {
			continue
		}
		if best == nil || g.Margin() > margin {
			best, margin = o, g.Margin()
		}
	}
	return best
}

// Recommendation is the answer in one plain sentence.
func (f *File) Recommendation() string {
	if o := f.Least(); o == &f.Existing {
		return "Nothing is needed: the slope as it is meets the required factor of safety in every situation."
	} else if o != nil {
		return fmt.Sprintf("Least %s: %s, %s (%s m3 over %s m): %s.", f.Objective(), o.Title, f.Amount(o), TotalText(o.Totals.Earthworks), SizeText(f.Case.Length), o.Dimensions(o.Parameters))
	}
	o := f.Nearest()
	if o == nil {
		return "Nothing meets the target."
	}
	g, _ := o.Governing()
	s := fmt.Sprintf("Nothing meets the target. Nearest: %s, which reaches FS %s of the %s required in %s",
		o.Title, FactorText(g.FS), RequiredText(Number(g.RequiredFS)), g.Check)
	if o.BindsOn != "" {
		s += "; what binds: " + o.BindsOn
	}
	return s + "."
}

// StepLessText tells in one sentence why one step less of each dimension fails; empty if there is nothing to tell.
func (f *File) StepLessText(o *Option) string {
	var parts []string
	for _, s := range o.StepLess {
		size := sizeOf(s.Parameter, s.Value, o.Parameters[s.Parameter].Unit)
		switch {
		case s.Limit != "":
			parts = append(parts, fmt.Sprintf("%s breaks %s", size, s.Limit))
		case s.FS >= s.RequiredFS:
			parts = append(parts, fmt.Sprintf("%s gives FS %s in %s, within the search allowance %v of the %s required",
				size, FactorText(s.FS), s.Check, f.Settings.Allowance, RequiredText(s.RequiredFS)))
		default:
			parts = append(parts, fmt.Sprintf("%s gives FS %s in %s, %s required", size, FactorText(s.FS), s.Check, RequiredText(s.RequiredFS)))
		}
	}
	if len(parts) == 0 {
		return ""
	}
	return "A step less fails: " + strings.Join(parts, "; ") + "."
}

// CertificateText tells in one sentence what the answer rests on; empty if nothing was sized.
func (o *Option) CertificateText() string {
	c := o.Certificate
	if c == nil {
		return ""
	}
	least := "least"
	if c.Unresolved > 0 {
		least = "least of the designs that could be judged"
	}
	s := fmt.Sprintf("Certificate: %s on this lattice, for this remedy and these methods (%s); no slip below target found in %s searches, "+
		"%s cheaper designs rejected by a slip each", least, GoverningText(), TotalText(float64(c.Searches+c.Audit.Searches)),
		TotalText(float64(c.Witnessed)))
	if c.Unresolved > 0 {
		s += fmt.Sprintf("; %s cheaper designs are unresolved, neither rejected nor accepted, and one of them may do", TotalText(float64(c.Unresolved)))
	}
	if c.Coarsened {
		s += "; the lattice was coarser than asked for"
	}
	return s + "."
}

// CoarsenedText says that the lattice of an option is coarser than asked for, and where; empty if it is not.
func (o *Option) CoarsenedText() string {
	if o.Certificate == nil || !o.Certificate.Coarsened {
		return ""
	}
	s := fmt.Sprintf("the lattice asked for has more than %s designs and was coarsened", TotalText(optimize.DefaultMaxDesigns))
	var steps []string
	for _, a := range o.Certificate.Axes {
		if a.StepAsked != 0 {
			steps = append(steps, fmt.Sprintf("%s by %s instead of %s", remedies.ParameterWords(a.Name), SizeText(a.Step), SizeText(a.StepAsked)))
		}
	}
	if len(steps) > 0 {
		s += ": " + strings.Join(steps, ", ")
	}
	return s + "; works between these sizes may do with less"
}

// Objective names what sizings make least; earthworks in a file that does not say.
func (f *File) Objective() string {
	if f.Settings.Objective == "" {
		return remedies.LeastEarthworks.String()
	}
	return f.Settings.Objective
}

// Amount returns in words what an option takes of what sizings make least: cost or carbon for the whole length, with its earthworks behind it.
func (f *File) Amount(o *Option) string {
	earthworks := QuantityText(o.Quantities.Earthworks) + " m3 per metre run"
	switch least, _ := remedies.ParseObjective(f.Settings.Objective); {
	case least == remedies.LeastCost && o.Totals.Cost != nil:
		return f.money(TotalText(float64(*o.Totals.Cost))) + ", " + earthworks
	case least == remedies.LeastCarbon && o.Totals.Carbon != nil:
		return QuantityText(float64(*o.Totals.Carbon)) + " t CO2 equivalent, " + earthworks
	}
	return earthworks
}

// money puts the currency of the rates behind an amount.
func (f *File) money(amount string) string {
	return strings.TrimSpace(amount + " " + f.Economics.Currency)
}

// MethodText returns the name of a method of slices as people spell it.
func MethodText(name string) string {
	words := strings.Split(name, "-")
	for i, w := range words {
		if w != "" {
			words[i] = strings.ToUpper(w[:1]) + w[1:]
		}
	}
	return strings.Join(words, "-")
}

// GoverningText names the methods that govern.
func GoverningText() string {
	of := func(k lem.SlipKind) string {
		var names []string
		for _, m := range lem.GoverningMethods(k) {
			names = append(names, MethodText(m.String()))
		}
		return strings.Join(names, " and ")
	}
	return of(lem.Circle) + " on circles, " + of(lem.Polyline) + " on non-circular slips"
}

// RelaxationTexts tell in a sentence each what moving a limit would save, rounded down; those that show as nothing are left out.
func (f *File) RelaxationTexts(o *Option) []string {
	var out []string
	for _, r := range o.Relaxations {
		saves := floorText(r.Saves, 2)
		if saves == "0.00" {
			continue
		}
		switch objective, _ := remedies.ParseObjective(f.Settings.Objective); objective {
		case remedies.LeastCost:
			saves = f.money(floorText(r.Saves, 0))
		case remedies.LeastCarbon:
			saves += " kg CO2 equivalent"
		case remedies.LeastEarthworks:
			saves += " m3 per metre run"
		}
		out = append(out, fmt.Sprintf("Moving the %s %s saves %s (%s; searched, not audited).", strings.TrimPrefix(r.Limit, "the "),
			strings.TrimPrefix(r.Change, "moved "), saves, o.Dimensions(r.Parameters)))
	}
	return out
}

func pointText(p Point) string { return fmt.Sprintf("(%.2f, %.2f)", p[0], p[1]) }
