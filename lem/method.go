package lem

import "math"

// Method is a published method of slices.
type Method uint8

// The methods. Bishop, Spencer and MorgensternPrice can govern, see [GoverningMethods]; the others are printed beside them.
const (
	Ordinary         Method = iota // Fellenius (1936).
	Bishop                         // Bishop (1955), simplified; circles only.
	Spencer                        // Spencer (1967).
	MorgensternPrice               // Morgenstern and Price (1965), with Setting.SideForce.
	JanbuPlain                     // Janbu (1954), simplified, without the correction factor f0.
	Janbu                          // Janbu (1973), simplified, with the correction factor f0.
	numMethods
)

var methodNames = [numMethods]string{
	"ordinary", "bishop", "spencer", "morgenstern-price", "janbu simplified (uncorrected)", "janbu simplified",
}

// String returns the method's name in lower case, as in result files.
func (m Method) String() string {
	if m < numMethods {
		return methodNames[m]
	}
	return "unknown"
}

// Methods returns every method, in the order in which they are listed.
func Methods() []Method {
	out := make([]Method, numMethods)
	for i := range out {
		out[i] = Method(i)
	}
	return out
}

// MethodNamed returns the method of that name and reports whether there is one.
func MethodNamed(name string) (Method, bool) {
	for i, n := range methodNames {
		if n == name {
			return Method(i), true
		}
	}
	return 0, false
}

// GoverningMethods returns the methods whose lowest FS governs slips of a kind: they close moments, and all forces but for Bishop, whose
// error on circles is small (Whitman and Bailey 1967). Ordinary and Janbu are for comparison.
func GoverningMethods(kind SlipKind) []Method {
	if kind == Circle {
		return []Method{Bishop, Spencer}
	}
	return []Method{Spencer, MorgensternPrice}
}

// SideShape names the shape of a side-force function.
type SideShape uint8

// The shapes of side-force functions.
const (
	HalfSine SideShape = iota // sin(pi s).
	Constant                  // 1: Spencer's assumption.
	Given                     // Straight between SideForce.Ordinates.
)

// SideOrdinates is the number of ordinates of a given side-force function.
const SideOrdinates = 11

// SideForce is the side-force function f(s) of Morgenstern and Price: X = lambda f(s) E, where E and X are the horizontal and vertical forces
// between slices and s is the horizontal distance from the head over that from head to exit. The zero value is a half sine.
type SideForce struct {
	Shape SideShape
	// Ordinates, of a Given function, are f at s = 0, 0.1 ... 1, from the head to the exit. Only their ratios matter. A function that is 0
	// everywhere leaves nothing to close moments with: NotConverged.
	Ordinates [SideOrdinates]float64
}

// At returns f at the relative position s, 0 at the head to 1 at the exit.
func (f *SideForce) At(s float64) float64 {
	switch f.Shape {
	case HalfSine:
		return math.Sin(math.Pi * s)
	case Constant:
	case Given:
		t := min(max(s, 0), 1) * (SideOrdinates - 1)
		i := min(int(t), SideOrdinates-2)
		return f.Ordinates[i] + (f.Ordinates[i+1]-f.Ordinates[i])*(t-float64(i))
	}
	return 1
}
