package report

import (
	"fmt"
	"slices"
	"strings"
)

// sizeOf returns a dimension in words, such as "top width 4 m" or "batter 1V:2H".
func sizeOf(name string, value float64, unit string) string {
	words := strings.ReplaceAll(name, "_", " ")
	switch unit {
	case "", "1":
		return words + " " + SizeText(value)
	case "1V:nH":
		return words + " 1V:" + SizeText(value) + "H"
	}
	return words + " " + SizeText(value) + " " + unit
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

// Least returns the option with the least earthworks of those that meet the target; nil if there is none. It may be the existing slope.
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
		return fmt.Sprintf("Least earthworks: %s, %s m3 per metre run (%s m3 over %s m): %s.",
			o.Title, QuantityText(o.Quantities.Earthworks), TotalText(o.Totals.Earthworks), SizeText(f.Case.Length), o.Dimensions(o.Parameters))
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
	s := fmt.Sprintf("Certificate: least on this lattice, for this remedy and these methods (%s); no slip below target found in %s searches, "+
		"%s cheaper designs rejected by a slip each", strings.Join(c.Audit.Methods, ", "), TotalText(float64(c.Searches+c.Audit.Searches)),
		TotalText(float64(c.Witnessed)))
	if c.Unresolved > 0 {
		s += fmt.Sprintf(", %d cheaper designs unresolved", c.Unresolved)
	}
	if c.Coarsened {
		s += "; the lattice was coarser than asked for"
	}
	return s + "."
}

func pointText(p Point) string { return fmt.Sprintf("(%.2f, %.2f)", p[0], p[1]) }
