package pdfreport

import (
	"fmt"
	"strings"

	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// closing writes what the answer rests on and what would undo it.
func (a *author) closing() {
	a.chapter("Assumptions and cautions")
	a.assumptions()
	a.changes()
	a.heading("Cautions")
	for _, c := range a.f.Cautions {
		a.item(c)
	}
}

func (a *author) assumptions() {
	a.heading("Assumptions")
	list := []string{
		"The ground between and below the points given is as drawn; strengths and unit weights are those of the case, not factored, and the same along the works.",
		"The water lines given are taken as the worst credible ones of their situations, and those under works stay as drawn.",
		"Fill has its full strength as soon as it is placed and compacted, on stripped and benched ground.",
	}
	if len(a.f.OnSite) == 0 {
		list = append(list, "All fill is brought to the site and all cut is taken away: the case names no material of the site to use.")
	} else {
		list = append(list, "Cut and stockpiles are fit for the use that the case gives them, and what is won is not lost.")
	}
	if a.f.StageSettings != nil {
		list = append(list, "Works are done in the order of their stages, in the water of the construction season.")
	}
	for i := range a.f.Situations {
		if s := &a.f.Situations[i]; s.VariantOf == "" && s.DrainsWorking != nil && s.DrainsWorking.Known() && float64(*s.DrainsWorking) < 1 {
			list = append(list, fmt.Sprintf("Drains have %s %% of their effect in the situation %s.", report.SizeText(100*float64(*s.DrainsWorking)), s.Name))
		}
	}
	for _, s := range list {
		a.item(s)
	}
}

// changes writes what would change the answer, as far as the result itself tells.
func (a *author) changes() {
	a.heading("What would change the answer")
	a.water()
	o := a.f.Least()
	if o != nil {
		a.margin(o)
		if s := a.f.StepLessText(o); s != "" {
			a.item(report.Capital(cubic(s)))
		}
		a.shortSwings(o)
		for _, s := range a.f.RelaxationTexts(o) {
			a.item(cubic(s))
		}
		a.shifted(o)
		a.next(o)
	}
	for i := range a.f.Options {
		p := &a.f.Options[i]
		switch {
		case p.WhatIf && p.Status == meetsTarget:
			a.item(sentence(fmt.Sprintf("%s meets the target: %s", optionTitle(p), p.Reason)))
		case p.Status != meetsTarget && p.BindsOn != "":
			a.item(held(p))
		}
	}
	a.item("Other strengths or pore pressures than assumed: laboratory tests, a back-analysis of a slip that has been seen, and readings of water through a wet season tell most. Size the case anew with them.")
}

// held says what holds an option back: a limit that might be moved, or a check.
func held(o *report.Option) string {
	for _, c := range answersOf(o) {
		if strings.HasSuffix(c.name, o.BindsOn) && c.found.FS.Known() {
			return fmt.Sprintf("%s: falls short in %s, with FS %s where %s is required.", optionTitle(o), o.BindsOn, report.FactorText(c.found.FS), required(c.required))
		}
	}
	if strings.Contains(o.Reason, remedies.NotEven) {
		return fmt.Sprintf("%s: held back by %s, and within the range given no size reaches the target without it either.", optionTitle(o), o.BindsOn)
	}
	return fmt.Sprintf("%s: held back by %s. Moved, it might let this option in.", optionTitle(o), o.BindsOn)
}

// water tells how much FS of the slope as it is hangs on the situation.
func (a *author) water() {
	var low, high *report.Answer
	for i := range a.f.Existing.Situations {
		s := &a.f.Existing.Situations[i]
		if !s.FS.Known() {
			continue
		}
		if low == nil || s.FS < low.FS {
			low = s
		}
		if high == nil || s.FS > high.FS {
			high = s
		}
	}
	if low != nil && low.FS < high.FS {
		a.item(fmt.Sprintf("The slope as it is has FS %s in %s and %s in %s: so much hangs on the situation alone.",
			report.FactorText(low.FS), low.Name, report.FactorText(high.FS), high.Name))
	}
}

// margin tells by how little the answer stands.
func (a *author) margin(o *report.Option) {
	if g, ok := o.Governing(); ok && g.FS.Known() && g.Margin() >= 0 {
		a.item(fmt.Sprintf("%s stands by %s above the FS of %s required in %s. Whatever lowers FS there by more undoes the answer.",
			report.Capital(o.Title), report.FactorText(g.Margin()), required(g.RequiredFS), g.Check))
	}
}

// shifted tells what the answer's remedy would take for other required factors.
func (a *author) shifted(o *report.Option) {
	var parts []string
	for i := range o.Tradeoff {
		t := &o.Tradeoff[i]
		if t.Shift == 0 || !t.Earthworks.Known() {
			continue
		}
		if reached(o, t) < t.RequiredFS {
			parts = append(parts, fmt.Sprintf("FS %s: not reached, the best is %s", asked(t), report.FactorText(reached(o, t))))
			continue
		}
		parts = append(parts, fmt.Sprintf("FS %s: %s m³/m", asked(t), report.QuantityText(float64(t.Earthworks))))
	}
	if g, ok := o.Governing(); ok && len(parts) > 0 {
		a.item(fmt.Sprintf("Another required factor in %s, the others moved alike. %s", g.Check, strings.Join(parts, "; ")+"."))
	}
}

// next names the option that comes in if the answer is not accepted.
func (a *author) next(least *report.Option) {
	behind := false
	for i := range a.f.Options {
		o := &a.f.Options[i]
		switch {
		case o == least:
			behind = true
		case behind && o.Status == meetsTarget && !o.WhatIf:
			a.item(fmt.Sprintf("Should %s not be acceptable, %s comes next, with %s.", least.Title, o.Title, cubic(a.f.Amount(o))))
			return
		}
	}
}
