package remedies

import (
	"errors"
	"fmt"
	"math"
	"slices"

	"standfast/optimize"
)

// ErrRequest is wrapped by every fault of a request.
var ErrRequest = errors.New("remedies: request cannot be met")

// soil returns the soil of a choice, or noSoil.
func (r *Request) soil(choice string) int {
	if i, ok := r.Soils[choice]; ok {
		return i
	}
	return noSoil
}

// has reports whether parameter i is present.
func (r *Request) has(i int) bool { return r.Axes[i].Name != "" }

// Fixed returns the parameter vector at the lower end of every axis, NaN for absent parameters: the sizes of a trial.
func (r *Request) Fixed() []float64 {
	x := make([]float64, len(r.Axes))
	for i, a := range r.Axes {
		x[i] = a.Min
		if a.Name == "" {
			x[i] = math.NaN()
		}
	}
	return x
}

// DefaultRequest returns the request for a kind with all its defaults: optional parameters absent, words at their first value. Soils
// have no default.
func DefaultRequest(k *Kind) Request {
	r := Request{Kind: k.Name, Axes: make([]optimize.Axis, len(k.Parameters)), Soils: map[string]int{}, Words: map[string]string{}}
	for i, p := range k.Parameters {
		if !p.Optional {
			r.Axes[i] = p.Default
		}
	}
	for _, c := range k.Choices {
		if !c.Soil && !c.Optional {
			r.Words[c.Name] = c.Values[0]
		}
	}
	return r
}

// NewRemedies makes the remedies of requests, in their order. The error joins all faults and wraps ErrRequest.
func NewRemedies(j *Job, requests []Request) ([]Remedy, error) {
	var faults []error
	out := make([]Remedy, len(requests))
	for i := range requests {
		r, err := newRemedy(j, &requests[i])
		if err != nil {
			faults = append(faults, err)
		}
		out[i] = r
	}
	if n := slices.IndexFunc(requests, isDrains); n >= 0 {
		if m := slices.IndexFunc(requests[n+1:], isDrains); m >= 0 {
			faults = append(faults, fmt.Errorf("%w: the effects of %s and %s do not add up: name one kind of drains at a time", ErrRequest, requests[n].Kind, requests[n+1+m].Kind))
		}
	}
	if err := errors.Join(faults...); err != nil {
		return nil, err
	}
	return out, nil
}

// isDrains reports whether a request is for drains that set the pore pressure between them.
func isDrains(r Request) bool {
	k, _ := Find(r.Kind)
	return k.order == orderDrains
}

// newRemedy checks a request against its kind and makes the remedy.
func newRemedy(j *Job, r *Request) (Remedy, error) {
	k, ok := Find(r.Kind)
	if !ok {
		return nil, fmt.Errorf("%w: there is no remedy %q", ErrRequest, r.Kind)
	}
	if err := errors.Join(slices.Concat(axisFaults(&k, r), choiceFaults(j, &k, r))...); err != nil {
		return nil, err
	}
	return k.New(j, r)
}

// axisFaults returns what is wrong with the axes of a request.
func axisFaults(k *Kind, r *Request) []error {
	if len(r.Axes) != len(k.Parameters) {
		return []error{fmt.Errorf("%w: %s has %d parameters, not %d", ErrRequest, k.Name, len(k.Parameters), len(r.Axes))}
	}
	var out []error
	for i, p := range k.Parameters {
		a := r.Axes[i]
		switch {
		case a.Name == "" && p.Optional:
		case a.Name != p.Name:
			out = append(out, fmt.Errorf("%w: %s: parameter %d is %q, not %q", ErrRequest, k.Name, i+1, p.Name, a.Name))
		case !(a.Min >= p.Min && a.Max <= p.Max && a.Min <= a.Max):
			out = append(out, fmt.Errorf("%w: %s: %s from %g to %g must lie within %g to %g", ErrRequest, k.Name, p.Name, a.Min, a.Max, p.Min, p.Max))
		}
	}
	return out
}

// choiceFaults returns what is wrong with the choices of a request.
func choiceFaults(j *Job, k *Kind, r *Request) []error {
	var out []error
	for _, c := range k.Choices {
		soil, isSoil := r.Soils[c.Name]
		word, isWord := r.Words[c.Name]
		switch {
		case c.Soil && isSoil && (soil < 0 || soil >= len(j.Section.Soils)):
			out = append(out, fmt.Errorf("%w: %s: %s is soil %d of %d", ErrRequest, k.Name, c.Name, soil, len(j.Section.Soils)))
		case c.Soil && !isSoil && !c.Optional:
			out = append(out, fmt.Errorf("%w: %s: %s names no soil", ErrRequest, k.Name, c.Name))
		case !c.Soil && isWord && !slices.Contains(c.Values, word):
			out = append(out, fmt.Errorf("%w: %s: %s %q is none of %q", ErrRequest, k.Name, c.Name, word, c.Values))
		}
	}
	return out
}

// combined is several remedies applied as one.
type combined struct {
	parts []part // In the order in which the works are done.
}

// part is one remedy of several, with its share of the parameter vector.
type part struct {
	remedy   Remedy
	order    order
	from, to int
}

// Combine makes one remedy of the remedies of several requests. Its parameter vector is theirs, joined in the order of the requests;
// the works are done cuts first, then fills, then drains, whatever that order. The error is that of NewRemedies.
func Combine(j *Job, requests []Request) (Remedy, error) {
	rs, err := NewRemedies(j, requests)
	if err != nil {
		return nil, err
	}
	c := &combined{}
	at := 0
	for i, r := range rs {
		k, _ := Find(requests[i].Kind)
		n := len(requests[i].Axes)
		c.parts = append(c.parts, part{remedy: r, order: k.order, from: at, to: at + n})
		at += n
	}
	slices.SortStableFunc(c.parts, func(a, b part) int { return int(a.order) - int(b.order) })
	return c, nil
}

// Apply adds the works of all remedies.
func (c *combined) Apply(j *Job, on *Proposal, x []float64) *Proposal {
	for _, p := range c.parts {
		on = p.remedy.Apply(j, on, x[p.from:p.to])
	}
	return on
}

// Apply returns the slope as it is with the works of all requests at sizes xs, one parameter vector a request. The error is that of
// NewRemedies.
func Apply(j *Job, requests []Request, xs [][]float64) (*Proposal, error) {
	r, err := Combine(j, requests)
	if err != nil {
		return nil, err
	}
	return r.Apply(j, Start(j), slices.Concat(xs...)), nil
}
