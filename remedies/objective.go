package remedies

import (
	"errors"
	"fmt"
	"math"
	"strings"
)

// Objective is what a sizing makes least.
type Objective uint8

// The objectives.
const (
	LeastEarthworks Objective = iota // Bank cut plus compacted fill, m3 per metre run.
	LeastCost                        // By the user's rates, for the whole length.
	LeastCarbon                      // By the user's factors, kg CO2 equivalent for the whole length.
	numObjectives
)

var objectiveNames = [numObjectives]string{"earthworks", "cost", "carbon"}

// String returns the name of the objective as in case and result files.
func (o Objective) String() string {
	if o < numObjectives {
		return objectiveNames[o]
	}
	return "unknown"
}

// Objectives returns the names of all objectives.
func Objectives() []string { return append([]string(nil), objectiveNames[:]...) }

// ParseObjective returns the objective of that name and reports whether there is one.
func ParseObjective(name string) (Objective, bool) {
	for i, n := range objectiveNames {
		if n == name {
			return Objective(i), true
		}
	}
	return 0, false
}

// ErrBlankRate says that an objective needs rates or factors that the case leaves blank.
var ErrBlankRate = errors.New("the objective needs rates or factors that are blank under `economics`")

// value returns what is made least of a proposal; NaN where it needs a blank rate.
func (o Objective) value(j *Job, q *Quantities) float64 {
	switch o {
	case LeastCost:
		return Cost(j, q)
	case LeastCarbon:
		return Carbon(j, q)
	case LeastEarthworks, numObjectives:
	}
	return q.Earthworks()
}

// blank names the rates, factors and measures that the objective needs for a proposal and that the case leaves blank.
func (o Objective) blank(j *Job, q *Quantities) []string {
	var out []string
	for _, it := range BillOf(j, q).Items {
		amount := it.Cost
		if o == LeastCarbon {
			amount = it.Carbon
		}
		switch {
		case math.IsNaN(it.PerMetre): // Benching alone is measured by a factor.
			out = appendOnce(out, "bench_step")
		case math.IsNaN(amount):
			out = appendOnce(out, it.Work.String())
		}
	}
	return out
}

// unpriced names what is blank of all that the works need, at their least size or, where the site allows it, their greatest.
func (w *works) unpriced(j *Job) []string {
	for i, x := range [][]float64{w.smallest(), w.greatest()} {
		p := w.apply(j, x)
		if i > 0 && len(p.Violations) > 0 {
			continue
		}
		if math.IsNaN(j.Objective.value(j, &p.Quantities)) {
			return j.Objective.blank(j, &p.Quantities)
		}
	}
	return nil
}

// priced reports an error if anything that is to be sized, or works of the user's own, cannot be priced: what has no price has no rank either.
func (st *study) priced() error {
	groups := [][]Request{}
	if !adequate(st.existing, st.s) {
		groups = st.j.groups(st.s.Pairs)
	}
	for i := range st.j.Trials {
		groups = append(groups, st.j.Trials[i].Requests)
	}
	var lacking []string
	for _, g := range groups {
		w, err := newWorks(st.j, groupName(g), g)
		if err != nil {
			return err
		}
		if names := w.unpriced(st.j); len(names) > 0 {
			lacking = appendOnce(lacking, w.title+" needs "+strings.Join(names, ", "))
		}
	}
	if len(lacking) > 0 {
		return fmt.Errorf("%w: %s", ErrBlankRate, strings.Join(lacking, "; "))
	}
	return nil
}
