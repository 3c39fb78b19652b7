package remedies

import (
	"math"

	"standfast/optimize"
)

// works are one or more remedies applied together, with the parameters that are sized gathered in one vector.
type works struct {
	name   string
	title  string
	kinds  []string
	remedy Remedy          // All of them as one; nil: no works.
	sized  []bool          // By parameter of all remedies: false if it is absent.
	axes   []optimize.Axis // Of the parameters that are present.
	units  []string        // By axis.
	whatIf bool
}

// newWorks makes the works of requests. Its error is a fault of a request, in words for the user.
func newWorks(j *Job, name string, requests []Request) (*works, error) {
	remedy, err := Combine(j, requests)
	if err != nil {
		return nil, err
	}
	w := &works{name: name, remedy: remedy}
	for i := range requests {
		kind, _ := Find(requests[i].Kind)
		w.kinds = append(w.kinds, kind.Name)
		w.whatIf = w.whatIf || kind.WhatIf
		if w.title += kind.Title; i+1 < len(requests) {
			w.title += " with "
		}
		for k, axis := range requests[i].Axes {
			w.sized = append(w.sized, axis.Name != "")
			if axis.Name == "" {
				continue
			}
			if len(requests) > 1 {
				axis.Name = kind.Name + "." + axis.Name
			}
			w.axes, w.units = append(w.axes, axis), append(w.units, kind.Parameters[k].Unit)
		}
	}
	return w, nil
}

// apply puts the works of a parameter vector on the existing slope.
func (w *works) apply(j *Job, x []float64) *Proposal {
	full := make([]float64, len(w.sized))
	next := 0
	for i, sized := range w.sized {
		full[i] = math.NaN()
		if sized {
			full[i] = x[next]
			next++
		}
	}
	if w.remedy == nil {
		return Start(j)
	}
	return w.remedy.Apply(j, Start(j), full)
}

// values returns the parameters of a design with names and units.
func (w *works) values(x []float64) []Value {
	out := make([]Value, len(x))
	for i, v := range x {
		out[i] = Value{w.axes[i].Name, w.units[i], v}
	}
	return out
}

// smallest returns the first design of the lattice.
func (w *works) smallest() []float64 {
	x := make([]float64, len(w.axes))
	for i, a := range w.axes {
		x[i] = a.At(0)
	}
	return x
}

// greatest returns the last design of the lattice.
func (w *works) greatest() []float64 {
	x := make([]float64, len(w.axes))
	for i, a := range w.axes {
		x[i] = a.At(a.Len() - 1)
	}
	return x
}
