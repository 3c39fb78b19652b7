package remedies

import (
	"standfast/lem"
	"standfast/optimize"
)

// Places of the parameters of a row of elements.
const (
	elementCapacity = iota
	elementSpacing
	elementPosition
	elementLength
)

// elementsKind is a row of piles or nails, to compare earthworks with.
func elementsKind() Kind {
	return Kind{
		Name:    "piles_or_nails",
		Title:   "row of piles or nails",
		Summary: "A row of piles or soil nails across the slip, as a horizontal resisting force; no earthworks.",
		Parameters: []Parameter{
			{
				Name: "capacity", Unit: "kN", Meaning: "Horizontal resistance of one element against the moving ground, as its own design gives it.",
				Min: 1, Max: 5000, Default: optimize.Axis{Name: "capacity", Min: 50, Max: 500, Step: 25},
			},
			{
				// 1 m to 2 m for nails, 2 to 4 diameters for piles is usual (common practice, no source).
				Name: "spacing", Unit: "m", Meaning: "Spacing of the elements along the slope.",
				Min: 0.3, Max: 20, Default: optimize.Axis{Name: "spacing", Min: 2, Max: 2},
			},
			{
				Name: "position", Unit: "m", Meaning: "Distance of the row from the toe, up the slope.",
				Min: -100, Max: 200, Default: optimize.Axis{Name: "position", Min: 3, Max: 3},
			},
			{
				Name: "length", Unit: "m", Meaning: "Length of an element below the ground; slips that pass below it are not held.",
				Min: 0.5, Max: 60, Default: optimize.Axis{Name: "length", Min: 8, Max: 8},
			},
		},
		WhatIf: true,
		Place:  "slip",
		order:  orderElements,
		New:    func(*Job, *Request) (Remedy, error) { return elements{}, nil },
	}
}

type elements struct{}

// Apply sets the row in the ground in force. Stages are those of other works; a row has none of its own.
func (elements) Apply(j *Job, on *Proposal, x []float64) *Proposal {
	p := on.clone()
	f := slopeOf(j, on)
	const noun = "row of piles or nails"
	at := f.toe.X - x[elementPosition]
	if at <= f.before.Left() || at >= f.before.Right() {
		p.geometry("ground within the section", max(f.before.Left()-at, at-f.before.Right()), "%s at x = %s m lies outside the section", noun, metres(f.x(at)))
		p.finish(j)
		return p
	}
	own := f.x(at)
	top := p.Section.Ground.At(own)
	toe := lem.Point{X: own, Y: top - x[elementLength]}
	p.Section.Restraints = append(p.Section.Restraints[:len(p.Section.Restraints):len(p.Section.Restraints)], lem.Restraint{
		Name: "piles or nails", X: own, Top: top, Bottom: toe.Y, Force: x[elementCapacity] / x[elementSpacing],
	})
	p.Quantities.Elements += 1 / x[elementSpacing]
	p.Quantities.ElementsM += x[elementLength] / x[elementSpacing]
	p.checkSpan(j, own, own, noun, noun)
	p.checkDig(j, lem.Profile{{X: own - limitSlack, Y: toe.Y}, {X: own + limitSlack, Y: toe.Y}}, own-limitSlack, own+limitSlack, "pile or nail")
	p.Dimensions = append(p.Dimensions, lengthDim("length", lem.Point{X: own, Y: top}, toe))
	p.note("row of piles or nails: a comparator; its capacity, its bond beyond the slip and the ground's flow between elements need their own structural design")
	p.finish(j)
	return p
}
