package optimize

import (
	"fmt"
	"math"
)

const (
	// decimals is the scale to which lattice values are rounded: nine decimals, so that 0.1 steps print as 0.1 steps.
	decimals = 1e9
	// largestValue keeps value*decimals below 2^53, where rounding to nine decimals is exact.
	largestValue = 1e6
	// smallestStep keeps neighbouring lattice values apart by far more than the rounding.
	smallestStep = 1e-6
	// lengthSlack, in steps, forgives the float dust in (Max-Min)/Step when points are counted.
	lengthSlack = 1e-6
)

// An Axis is one parameter of the lattice: Min, Min+Step, ... up to Max. An axis with Step 0 is fixed at Min and
// needs Max equal to Min. Values must lie within 1e6 in size and steps must be at least 1e-6.
type Axis struct {
	Name           string
	Min, Max, Step float64 // in the parameter's own unit
}

// Len returns the number of lattice points on the axis, at least 1 for a valid axis.
func (a Axis) Len() int {
	if a.Step == 0 {
		return 1
	}
	return int(math.Floor((a.Max-a.Min)/a.Step+lengthSlack)) + 1
}

// At returns lattice point i, 0 <= i < Len, rounded to nine decimals.
func (a Axis) At(i int) float64 {
	return math.Round((a.Min+float64(i)*a.Step)*decimals) / decimals
}

// faults returns what is wrong with the axis, one error a fault.
func (a Axis) faults(index int) []error {
	var out []error
	bad := func(format string, args ...any) {
		out = append(out, fmt.Errorf("axis %d (%s): %s", index, a.Name, fmt.Sprintf(format, args...)))
	}
	for _, v := range []struct {
		name  string
		value float64
	}{{"min", a.Min}, {"max", a.Max}} {
		if !(math.Abs(v.value) <= largestValue) {
			bad("%s %g is not within %g of zero", v.name, v.value, largestValue)
		}
	}
	if a.Max < a.Min {
		bad("max %g is below min %g", a.Max, a.Min)
	}
	switch {
	case a.Step == 0 && a.Max > a.Min:
		bad("step 0 needs max %g equal to min %g", a.Max, a.Min)
	case a.Step != 0 && !(a.Step >= smallestStep && a.Step <= largestValue):
		bad("step %g is neither 0 nor within %g to %g", a.Step, smallestStep, largestValue)
	}
	return out
}

// Point returns the parameters of the design with the given lattice index, as in Witness.Index. The last axis varies
// fastest.
func Point(axes []Axis, index int) []float64 {
	x := make([]float64, len(axes))
	pointTo(x, axes, index)
	return x
}

func pointTo(dst []float64, axes []Axis, index int) {
	for k := len(axes) - 1; k >= 0; k-- {
		n := axes[k].Len()
		dst[k] = axes[k].At(index % n)
		index /= n
	}
}

// latticeSize returns the number of lattice points, as a float since it may exceed any integer.
func latticeSize(axes []Axis) float64 {
	size := 1.0
	for _, a := range axes {
		size *= float64(a.Len())
	}
	return size
}

// coarsen returns the axes with steps doubled, the longest axis (the first of equals) each time, until the lattice
// holds at most limit designs. Each doubled axis is a subset of the old one that keeps Min.
func coarsen(axes []Axis, limit int) (out []Axis, coarsened bool) {
	out = append([]Axis(nil), axes...)
	for latticeSize(out) > float64(limit) {
		longest := 0
		for k := range out {
			if out[k].Len() > out[longest].Len() {
				longest = k
			}
		}
		out[longest].Step *= 2
		coarsened = true
	}
	return out, coarsened
}
