package casefile

import (
	"go.yaml.in/yaml/v4"

	"standfast/lem"
)

// Words for a side-force function.
const (
	wordHalfSine = "half-sine"
	wordConstant = "constant"
)

// sideForceField is the key of the side-force function.
func sideForceField() field {
	return field{
		key: "side_force_function", standard: "half-sine",
		shape:   either(word(wordHalfSine, wordConstant), list(number("", within(0, 10)), lem.SideOrdinates, lem.SideOrdinates)),
		meaning: "Shape f of the forces between slices in Morgenstern-Price's method, vertical over horizontal force = lambda x f: a half sine from head to exit; a constant, which is Spencer's method; or f at eleven places equally far apart, from head to exit, straight between. Only their ratios matter.",
		example: "[0, 0.3, 0.6, 0.8, 0.95, 1, 1, 0.9, 0.7, 0.4, 0.1]",
	}
}

// readSideForce fills the side-force function.
func (b *builder) readSideForce(v value) {
	f := &b.job.SideForce
	if name, ok := b.text(v); ok {
		if name == wordConstant {
			f.Shape = lem.Constant
			b.note("Morgenstern-Price's method takes constant side forces, as Spencer's does, in place of a half sine: `side_force_function`")
		}
		return
	}
	ordinates, ok := b.numbers(v)
	if !ok {
		return
	}
	f.Shape = lem.Given
	copy(f.Ordinates[:], ordinates)
	b.note("Morgenstern-Price's method takes the side forces of the case in place of a half sine: `side_force_function`")
	if f.Ordinates == [lem.SideOrdinates]float64{} {
		b.addFault(v, "write at least one above 0", "a function that is 0 everywhere leaves no forces between slices")
	}
}

// sideForceNode returns a side-force function as the key has it.
func sideForceNode(f *lem.SideForce) *yaml.Node {
	switch f.Shape {
	case lem.Given:
		return numbersNode(f.Ordinates[:]...)
	case lem.Constant:
		return textNode(wordConstant)
	case lem.HalfSine:
	}
	return textNode(wordHalfSine)
}
