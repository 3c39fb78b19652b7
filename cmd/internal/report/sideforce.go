package report

import (
	"fmt"
	"slices"
	"strconv"
	"strings"

	"standfast/lem"
)

// SideForce is the side-force function f of Morgenstern-Price's method: vertical over horizontal force between slices is lambda x f.
type SideForce struct {
	// "half-sine": sin(pi s), with s = 0 at the head of a slip to 1 at its exit, horizontally; "constant": 1; "given": by the ordinates.
	Function  string    `json:"function" jsonschema:"enum=half-sine,enum=constant,enum=given"`
	Ordinates []float64 `json:"ordinates,omitempty"` // Of a given function: f at s = 0, 0.1 ... 1, straight between.
}

// sideFunctions are the names of the functions, by shape.
var sideFunctions = [...]string{lem.HalfSine: "half-sine", lem.Constant: "constant", lem.Given: "given"}

func sideForceOf(f *lem.SideForce) SideForce {
	out := SideForce{Function: sideFunctions[f.Shape]}
	if f.Shape == lem.Given {
		out.Ordinates = slices.Clone(f.Ordinates[:])
	}
	return out
}

// Engine returns the function as package lem has it; one without a name, of an earlier version, is a half sine. Its error wraps [ErrFormat].
func (f *SideForce) Engine() (lem.SideForce, error) {
	var out lem.SideForce
	if f.Function == "" {
		return out, nil
	}
	i := slices.Index(sideFunctions[:], f.Function)
	if i < 0 {
		return out, fmt.Errorf("%w: there is no side-force function %q", ErrFormat, f.Function)
	}
	out.Shape = lem.SideShape(i)
	if out.Shape == lem.Given {
		if len(f.Ordinates) != lem.SideOrdinates {
			return out, fmt.Errorf("%w: a side-force function has %d ordinates, not %d", ErrFormat, len(f.Ordinates), lem.SideOrdinates)
		}
		copy(out.Ordinates[:], f.Ordinates)
	}
	return out, nil
}

// String returns the function in words: "half-sine", "constant", "given: 0, 0.5, ...".
func (f *SideForce) String() string {
	switch {
	case f.Function == "":
		return sideFunctions[lem.HalfSine]
	case len(f.Ordinates) == 0:
		return f.Function
	}
	var all []string
	for _, v := range f.Ordinates {
		all = append(all, strconv.FormatFloat(v, 'g', -1, 64))
	}
	return f.Function + ": " + strings.Join(all, ", ")
}
