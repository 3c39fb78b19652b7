package remedies

import (
	"errors"
	"math"

	"standfast/lem"
)

// ErrNoSlip says that a check has no governing slip to look into.
var ErrNoSlip = errors.New("remedies: no slip converged")

// Working returns the slice table of the governing slip of a check, as the method that governs solved it.
func (o *Outcome) Working() (lem.Detail, error) {
	m, err := o.model()
	if err != nil {
		return lem.Detail{}, err
	}
	return m.Detail(&o.Slip, o.setting)
}

// Influence returns what loads on the ground, kN per metre run, do to the FS of the governing slip of a check.
func (o *Outcome) Influence(load float64) (lem.Influence, error) {
	m, err := o.model()
	if err != nil {
		return lem.Influence{}, err
	}
	return m.Influence(&o.Slip, o.setting, load)
}

func (o *Outcome) model() (*lem.Model, error) {
	if math.IsNaN(o.FS) {
		return nil, ErrNoSlip
	}
	var m lem.Model
	return &m, m.Compile(o.Check.Section, &o.Check.Situation)
}
