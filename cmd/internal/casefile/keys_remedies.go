package casefile

import (
	"fmt"
	"math"
	"strings"

	"standfast/remedies"
)

// remediesShape returns the keys of the remedies to size, made from the catalogue.
func remediesShape() *shape { return worksShape(true) }

func trialShape() *shape {
	return object(
		field{key: "name", shape: text("a name"), required: true, meaning: "Name for the outputs.", example: "first sketch"},
		field{key: "works", shape: worksShape(false), required: true, meaning: "Works in the order in which they are built, every size a number.", example: "{berm: {fill: granular fill, height: 2, top_width: 5, batter: 2}}"},
	)
}

// worksShape returns the remedies by name; sizes are numbers or ranges if they are to be sized, and numbers alone if not.
func worksShape(toSize bool) *shape {
	s := object()
	for _, k := range remedies.Catalogue() {
		f := field{key: k.Name, shape: kindShape(k, toSize), standard: "not considered", meaning: k.Summary}
		f.example = kindExample(f.shape)
		if k.WhatIf {
			f.meaning += " A what-if: listed last, never the answer."
		}
		s.fields = append(s.fields, f)
	}
	return s
}

// kindShape returns the keys of one remedy: its choices, then its parameters.
func kindShape(k remedies.Kind, toSize bool) *shape {
	s := object()
	s.nullable = true
	for _, c := range k.Choices {
		s.fields = append(s.fields, choiceField(c))
	}
	for _, p := range k.Parameters {
		s.fields = append(s.fields, parameterField(p, toSize))
	}
	return s
}

// kindExample returns the settings of a remedy that have to be given, and its first size besides if that leaves nothing.
func kindExample(s *shape) string {
	var given []string
	for _, f := range s.fields {
		if f.required {
			given = append(given, f.key+": "+f.example)
		}
	}
	for _, f := range s.fields {
		if len(given) == 0 && f.shape.kind == sizeKind {
			given = append(given, f.key+": "+f.standard)
		}
	}
	return "{" + strings.Join(given, ", ") + "}"
}

func choiceField(c remedies.Choice) field {
	f := field{key: c.Name, meaning: c.Meaning}
	switch {
	case !c.Soil:
		f.shape, f.standard, f.example = word(c.Values...), c.Values[0], c.Values[0]
	case c.Optional:
		f.shape, f.standard, f.example = text("the name of a soil"), "none", "granular fill"
	default:
		f.shape, f.required, f.example = text("the name of a soil"), true, "granular fill"
	}
	return f
}

func parameterField(p remedies.Parameter, toSize bool) field {
	b := bounds{min: max(p.Min, -numberLimit), max: min(p.Max, numberLimit)}
	f := field{key: p.Name, meaning: p.Meaning, example: figure(parameterExample(p))}
	unit := p.Unit
	if unit == "1" {
		unit = ""
	}
	if toSize {
		f.shape = sized(unit, b)
	} else {
		f.shape = number(unit, b)
	}
	switch {
	case p.Optional:
		f.standard = wordNone
	case toSize:
		f.standard = sizeText(size{p.Default.Min, p.Default.Max, p.Default.Step})
	case p.Default.Step == 0:
		f.standard = figure(p.Default.Min)
	default:
		f.required = true
	}
	return f
}

// parameterExample returns a value in the middle of what makes sense for the parameter.
func parameterExample(p remedies.Parameter) float64 {
	if p.Optional {
		return (p.Min + p.Max) / 2
	}
	steps := math.Floor((p.Default.Max - p.Default.Min) / 2 / max(p.Default.Step, math.SmallestNonzeroFloat64))
	if p.Default.Step == 0 {
		steps = 0
	}
	return p.Default.Min + steps*p.Default.Step
}

// sizeText returns a size as it stands in a file.
func sizeText(z size) string {
	if z.step == 0 {
		return figure(z.min)
	}
	return fmt.Sprintf("%s to %s by %s", figure(z.min), figure(z.max), figure(z.step))
}

// kindNames returns the names of the catalogue.
func kindNames() []string {
	var names []string
	for _, k := range remedies.Catalogue() {
		names = append(names, k.Name)
	}
	return names
}
