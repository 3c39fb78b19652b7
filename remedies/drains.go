package remedies

import (
	"fmt"
	"slices"

	"standfast/lem"
	"standfast/optimize"
)

// Places of the parameters of trench drains.
const (
	drainDepth = iota
	drainSpacing
	drainWidth
	drainEffectiveness
	drainFrom
	drainTo
)

// trenchDrainsKind is a set of stone-filled trenches that run down the slope.
func trenchDrainsKind() Kind {
	return Kind{
		Name:    "trench_drains",
		Title:   "trench drains",
		Summary: "Stone-filled trenches down the slope that lower the pore pressure between them; the stone adds no strength.",
		Parameters: []Parameter{
			{
				// 1.5 m to 4 m is usual (common practice, no source).
				Name: "depth", Unit: "m", Meaning: "Depth of the trench below the ground before works; the dig stops at the low-permeability soil, if one is named.",
				Min: 0.1, Max: 20, Default: optimize.Axis{Name: "depth", Min: 1.5, Max: 4, Step: 0.25},
			},
			{
				// 3 m to 15 m is usual (common practice, no source).
				Name: "spacing", Unit: "m", Meaning: "Spacing of the trenches along the slope, centre to centre.",
				Min: 0.5, Max: 200, Default: optimize.Axis{Name: "spacing", Min: 3, Max: 15, Step: 0.5},
			},
			{
				// 0.45 m to 0.8 m is usual (common practice, no source).
				Name: "width", Unit: "m", Meaning: "Width of a trench.",
				Min: 0.1, Max: 10, Default: optimize.Axis{Name: "width", Min: 0.6, Max: 0.6},
			},
			{
				Name: "effectiveness", Unit: "1", Optional: true,
				Meaning: "Share by which the head above the invert falls, at the invert and as a mean between drains; without it the drains must reach low_permeability and the share follows from their spacing.",
				Min:     0, Max: 1,
			},
			{
				Name: "from", Unit: "m", Optional: true, Meaning: "x of one end of the trenches; the toe if not given.",
				Min: -1e6, Max: 1e6,
			},
			{
				Name: "to", Unit: "m", Optional: true, Meaning: "x of the other end of the trenches; the crest if not given.",
				Min: -1e6, Max: 1e6,
			},
		},
		Choices: []Choice{
			{Name: "low_permeability", Soil: true, Optional: true, Meaning: "Soil of low permeability that the trenches reach down to; their invert is taken at its top."},
		},
		Place: "water",
		order: orderDrains,
		New:   newTrenchDrains,
	}
}

// newTrenchDrains makes the remedy. How far the head falls must come from somewhere: a given effectiveness, or the series for drains
// that reach down to soil of low permeability.
func newTrenchDrains(j *Job, r *Request) (Remedy, error) {
	soil := r.soil("low_permeability")
	if r.Axes[drainEffectiveness].Name == "" && soil == noSoil {
		return nil, fmt.Errorf("%w: trench_drains: how far the drains lower the water is not known: name the soil that they reach down to under low_permeability, or give an effectiveness", ErrRequest)
	}
	if soil != noSoil && !slices.ContainsFunc(j.Section.Strata, func(s lem.Stratum) bool { return s.Soil == soil }) {
		return nil, fmt.Errorf("%w: trench_drains: low_permeability names %q, which is no stratum of the section: name the soil of a stratum", ErrRequest, j.Section.Soils[soil].Name)
	}
	return &trenchDrains{soil: soil}, nil
}
