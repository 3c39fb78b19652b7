package remedies

import (
	"fmt"
	"math"

	"standfast/optimize"
)

// works are one or more remedies applied in order, with the parameters that are sized gathered in one vector.
type works struct {
	name     string
	title    string
	kinds    []Kind
	requests []Request
	remedies []Remedy
	axes     []optimize.Axis // Of all remedies, absent parameters left out.
	units    []string        // By axis.
	whatIf   bool
}

// newWorks makes the works of requests. Its error is a fault of a request, in words for the user.
func newWorks(j *Job, name string, requests []Request) (*works, error) {
	w := &works{name: name, requests: requests}
	for i := range requests {
		r := &requests[i]
		kind, ok := Find(r.Kind)
		if !ok {
			return nil, fmt.Errorf("remedies: no remedy is called %q", r.Kind)
		}
		if len(r.Axes) != len(kind.Parameters) {
			return nil, fmt.Errorf("remedies: %s has %d parameters, the request %d", kind.Name, len(kind.Parameters), len(r.Axes))
		}
		remedy, err := kind.New(j, r)
		if err != nil {
			return nil, fmt.Errorf("%s: %w", kind.Name, err)
		}
		w.kinds, w.remedies = append(w.kinds, kind), append(w.remedies, remedy)
		w.whatIf = w.whatIf || kind.WhatIf
		if w.title += kind.Title; i+1 < len(requests) {
			w.title += " with "
		}
		for k, axis := range r.Axes {
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
	p := Start(j)
	next := 0
	for i, remedy := range w.remedies {
		full := make([]float64, len(w.requests[i].Axes))
		for k, axis := range w.requests[i].Axes {
			full[k] = math.NaN()
			if axis.Name != "" {
				full[k] = x[next]
				next++
			}
		}
		p = remedy.Apply(j, p, full)
	}
	return p
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
