package sheet

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"strings"

	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// The slider adds a shift to the required FS of every check. At each of its stops an option shows a design that was sized and searched:
// the one with the least works whose FS exceeds what is asked by the search allowance in every check, which is the next design on the
// safe side. No design and no FS is ever inferred from two others.

// Stops of the slider.
const (
	stopStep  = 0.01
	leastFS   = 1.0  // No required FS below this is offered.
	leastRise = 0.05 // By this the slider goes beyond the specified target at least.
	fsNoise   = 1e-9 // By this the sum of an FS and a shift may be off.
)

// addStops works out what every option comes to at every stop.
func (b *builder) addStops() {
	d := &b.m.Data
	d.Stops = []target{}
	for i := range d.Options {
		d.Options[i].Stops = []stop{}
	}
	lo, hi := b.stopRange()
	d.Specified = -lo
	for k := lo; k <= hi; k++ {
		shift := math.Round(float64(k)*stopStep*fsDigits) / fsDigits
		t := b.target(shift)
		for i := range d.Options {
			d.Options[i].Stops = append(d.Options[i].Stops, b.pick(i, shift))
		}
		t.Least = b.least(shift)
		t.Answer = b.answerAt(shift, t.Least)
		d.Stops = append(d.Stops, t)
	}
}

// stopRange returns the first and the last stop, in steps from the specified target: down to where nothing is needed, though to no
// required FS below 1, and up to the last target that anything was sized for. Without a trade-off there is one stop.
func (b *builder) stopRange() (lo, hi int) {
	sized := false
	top := leastRise
	for i := range b.f.Options {
		for _, p := range b.f.Options[i].Tradeoff {
			sized, top = true, max(top, p.Shift)
		}
	}
	if !sized {
		return 0, 0
	}
	least := math.Inf(1)
	for _, r := range b.m.Data.Rows {
		least = min(least, r.required)
	}
	lo = int(math.Ceil((leastFS-least)/stopStep - fsNoise))
	if m := b.m.Data.Existing.margin; m.Known() {
		lo = max(lo, int(math.Floor((float64(m)-b.f.Settings.Allowance)/stopStep+fsNoise)))
	}
	return min(lo, 0), int(math.Round(top / stopStep))
}

// target says what is asked at a shift.
func (b *builder) target(shift float64) target {
	d := &b.m.Data
	t := target{Required: []string{}, Existing: marks(&d.Existing, shift), Least: -1}
	var order []string
	groups := map[string][]string{}
	for _, r := range d.Rows {
		fs := required(shifted(r.required, shift))
		t.Required = append(t.Required, fs)
		if r.Parent >= 0 {
			continue
		}
		if groups[fs] == nil {
			order = append(order, fs)
		}
		name := r.Name
		if r.Stage {
			name = "construction stages"
		}
		if !slices.Contains(groups[fs], name) {
			groups[fs] = append(groups[fs], name)
		}
	}
	for i, fs := range order {
		order[i] = fs + " in " + strings.Join(groups[fs], ", ")
	}
	t.Long = strings.Join(order, "; ")
	if len(t.Required) > 0 {
		t.Short = t.Required[0]
	}
	return t
}

// marks says by row how a design stands at a shift.
func marks(d *design, shift float64) string {
	out := make([]byte, len(d.Answers))
	for i, a := range d.Answers {
		switch {
		case a == nil:
			out[i] = markNone
		case !d.fs[i].Known():
			out[i] = markOpen
		case float64(d.fs[i]) < shifted(d.required[i], shift):
			out[i] = markFail
		case !d.resolved[i]:
			out[i] = markOpen
		default:
			out[i] = markPass
		}
	}
	return string(out)
}

// reaches reports whether a design meets a target, the allowance for a finite search included.
func reaches(d *design, shift, allowance float64) bool {
	for i, a := range d.Answers {
		if a != nil && !d.resolved[i] {
			return false
		}
	}
	return float64(d.margin) >= shift+allowance-fsNoise // False if the margin is not known.
}

// pick chooses what an option shows at a shift.
func (b *builder) pick(i int, shift float64) stop {
	o, designs := &b.f.Options[i], b.m.Data.Options[i].Designs
	own := &designs[0]
	switch {
	case shift == 0:
		return b.specified(o, own)
	case b.nothingNeeded(shift):
		return stop{
			Design: -1, State: stateNothing, Status: "nothing needed", Note: "The slope as it is meets this target.",
			Marks: marks(&b.m.Data.Existing, shift),
		}
	case o.Trial:
		return b.trial(own, shift)
	}
	at := b.choose(o, designs, shift)
	s := stop{Design: at}
	switch {
	case o.Status == statusUnresolved:
		s.State, s.Status, s.Note = stateOpen, o.Status, sentence(o.Reason)
	case at == 0:
		s.State, s.Status, s.Note = stateMeets, "reaches it", "The works sized for the specified target reach this one too."
	case at > 0:
		s.State, s.Status = stateMeets, "reaches it"
		s.Note = "Sized by a search for this target or the next above it; not audited, so size the case anew before relying on it."
	default:
		at = b.nearest(o, designs)
		s.State, s.Status, s.Note = stateShort, "cannot reach it", b.short(o, &designs[at], shift)
	}
	s.Design = max(at, 0)
	s.Marks = marks(&designs[s.Design], shift)
	return s
}

// statusUnresolved is the status of an option that could not be judged.
const statusUnresolved = "unresolved"

// specified is what an option comes to as specified.
func (b *builder) specified(o *report.Option, own *design) stop {
	s := stop{State: stateShort, Status: o.Status, Note: sentence(strings.TrimPrefix(o.Reason, o.Title+": ")), Marks: marks(own, 0)}
	switch o.Status {
	case meetsTarget:
		s.State = stateMeets
	case statusUnresolved:
		s.State = stateOpen
	}
	return s
}

// trial is what works that are only checked come to.
func (b *builder) trial(own *design, shift float64) stop {
	s := stop{State: stateShort, Status: "falls short", Marks: marks(own, shift), Note: "Works as given; they are checked, not sized."}
	switch {
	case strings.ContainsRune(s.Marks, markFail):
	case strings.ContainsRune(s.Marks, markOpen) || strings.Trim(s.Marks, string(markNone)) == "":
		s.State, s.Status = stateOpen, statusUnresolved
	default:
		s.State, s.Status = stateMeets, "reaches it"
	}
	return s
}

// nothingNeeded reports whether the slope as it is meets a target.
func (b *builder) nothingNeeded(shift float64) bool {
	return reaches(&b.m.Data.Existing, shift, b.f.Settings.Allowance)
}

// choose returns the design with the least works that reaches the target; -1 if none does. Beyond the specified target an option needs
// at least the works that the specified one takes, which its certificate shows, and one that cannot meet the specified target meets
// none above it.
func (b *builder) choose(o *report.Option, designs []design, shift float64) int {
	order := make([]int, len(designs))
	for i := range order {
		order[i] = i
	}
	slices.SortStableFunc(order, func(p, q int) int {
		return cmp.Or(cmp.Compare(designs[p].works, designs[q].works), cmp.Compare(designs[p].shift, designs[q].shift))
	})
	for _, i := range order {
		if shift > 0 && (o.Status != meetsTarget || designs[i].works < designs[0].works) {
			continue
		}
		if reaches(&designs[i], shift, b.f.Settings.Allowance) {
			return i
		}
	}
	return -1
}

// nearest returns the design that comes nearest to a target that none reaches.
func (b *builder) nearest(o *report.Option, designs []design) int {
	best := 0
	if o.Status != meetsTarget {
		return best // The option as it stands in the result is the best that there is.
	}
	for i := range designs {
		if designs[i].margin > designs[best].margin {
			best = i
		}
	}
	return best
}

// short says why an option does not get to a target.
func (b *builder) short(o *report.Option, d *design, shift float64) string {
	g := d.Governing
	if g < 0 || !d.fs[g].Known() {
		return sentence(o.Reason)
	}
	asked := shifted(d.required[g], shift)
	s := fmt.Sprintf("The most that it can do within its limits and ranges reaches FS %s in %s; %s is asked for", d.Answers[g].FS,
		b.m.Data.Rows[g].Name, required(asked))
	if float64(d.fs[g]) >= asked {
		s += fmt.Sprintf(" with an allowance of %v for the search being finite", b.f.Settings.Allowance)
	}
	if o.BindsOn != "" && o.BindsOn != b.m.Data.Rows[g].Name && o.Status != meetsTarget {
		s += "; what binds: " + o.BindsOn
	}
	return s + "."
}

// least returns the option with the least of what was made least of those that meet the target of the stop being added, what-ifs left out; -1: none.
func (b *builder) least(shift float64) int {
	best, works := -1, math.Inf(1)
	for i := range b.m.Data.Options {
		o := &b.m.Data.Options[i]
		s := &o.Stops[len(o.Stops)-1]
		if s.State != stateMeets || b.f.Options[i].WhatIf {
			continue
		}
		if shift == 0 && (b.f.LeastEarthworks == nil || *b.f.LeastEarthworks != b.f.Options[i].Name) {
			continue
		}
		if w := o.Designs[s.Design].works; w < works {
			best, works = i, w
		}
	}
	return best
}

// answerAt is the answer at a stop in a sentence.
func (b *builder) answerAt(shift float64, least int) string {
	switch {
	case shift == 0:
		return cubic(b.f.Recommendation())
	case b.nothingNeeded(shift):
		return "At this target nothing is needed: the slope as it is meets it in every situation."
	case least < 0:
		return "At this target no option gets there."
	}
	o := &b.m.Data.Options[least]
	s := o.Stops[len(o.Stops)-1]
	t := o.Designs[s.Design].Texts
	amount := ""
	switch objective, _ := remedies.ParseObjective(b.f.Objective()); {
	case objective == remedies.LeastCost && t["cost"] != notGiven:
		amount = t["cost"] + ", "
	case objective == remedies.LeastCarbon && t["carbon"] != notGiven:
		amount = t["carbon"] + " CO2 equivalent, "
	}
	text := fmt.Sprintf("At this target least %s: %s, %s%s m³ per metre run (%s m³ over %s m): %s.", b.f.Objective(), b.f.Options[least].Title,
		amount, t["earth-m"], t["earth"], report.SizeText(b.f.Case.Length), t["dims"])
	if s.Design > 0 {
		text += " Searched, not audited."
	}
	return text
}
