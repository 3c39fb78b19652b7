package pdfreport

import (
	"errors"
	"fmt"
	"math"

	"standfast/cmd/internal/drawing"
	"standfast/cmd/internal/report"
	"standfast/lem"
	"standfast/remedies"
)

// existing writes the slope as it is.
func (a *author) existing() error {
	a.chapter("The slope as it is")
	o, r := &a.f.Existing, &a.r.Existing
	list := answersOf(o)
	a.heading("Factor of safety by method on the critical slip of each situation (rounded down)")
	a.factors(list)
	a.heading("Critical slips")
	a.slips(list)
	for _, n := range append(append([]string{}, o.Notes...), o.NotChecked...) {
		a.item(sentence(n))
	}
	a.handChecks(o)
	if err := a.sensitivity(o, r); err != nil {
		return err
	}
	back, err := a.back()
	if err != nil {
		return err
	}
	g := r.Governing()
	if g != nil && !math.IsNaN(g.FS) {
		a.para(fmt.Sprintf("The section with the slip that governs (%s), its slice table, and its influence line of load follow on pages that fold out.", g.Check.Label()))
	}
	figure, err := drawing.Section(a.r.Job, r, drawing.Options{})
	if err := a.onFold(figure, err); err != nil {
		return err
	}
	if err := a.slices(g); err != nil {
		return err
	}
	if err := a.influence(g); err != nil {
		return err
	}
	return a.onFold(back, nil)
}

// influence draws what loads on the ground do to the critical slip of a check.
func (a *author) influence(o *remedies.Outcome) error {
	if o == nil || math.IsNaN(o.FS) {
		return nil
	}
	var m lem.Model
	d, err := a.working(&m, o)
	if err == nil {
		var v lem.Influence
		if v, err = m.Influence(&o.Slip, d.Setting, report.InfluenceLoad); err == nil {
			figure, err := drawing.Influence(a.f.Case.Title, o, &v, drawing.Options{})
			return a.onFold(figure, err)
		}
	}
	if errors.Is(err, lem.ErrNoWorking) {
		return nil
	}
	return fmt.Errorf("influence line: %w", err)
}
