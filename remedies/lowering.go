package remedies

import (
	"slices"

	"standfast/lem"
	"standfast/optimize"
)

// waterLoweringKind is a plain lowering of the water lines, by whatever means: a what-if, not works.
func waterLoweringKind() Kind {
	return Kind{
		Name:    "water_lowering",
		Title:   "lower water (what-if)",
		Summary: "Every water line lowered by a depth, whatever the means; artesian lines stay.",
		Parameters: []Parameter{
			{
				Name: "lowering", Unit: "m", Meaning: "Depth by which the water lines are lowered.",
				Min: 0, Max: 100, Default: optimize.Axis{Name: "lowering", Min: 0.5, Max: 5, Step: 0.25},
			},
		},
		WhatIf: true,
		Place:  "water",
		order:  orderWater,
		New:    newWaterLowering,
	}
}

type waterLowering struct{}

func newWaterLowering(*Job, *Request) (Remedy, error) { return waterLowering{}, nil }

// Apply lowers the lines of every situation by x[0]. Stages keep their water, which is on the safe side.
func (waterLowering) Apply(j *Job, on *Proposal, x []float64) *Proposal {
	p := on.clone()
	stage := p.stageWater
	p.eachWater(j, func(line int, w *lem.Water) {
		l := &j.Waters[line]
		switch {
		case len(l.Points) > 0:
			p.note("pore pressures at points of %q are not lowered", l.Name)
		case l.Artesian:
			p.note("water line %q is artesian and is not lowered", l.Name)
		default:
			w.Line = shifted(w.Line, -x[0])
		}
		w.BySoil = slices.Clone(w.BySoil)
		for i, own := range l.BySoil {
			if own.Artesian {
				p.note("water line %q is artesian in %s and is not lowered there", l.Name, j.Section.Soils[own.Soil].Name)
				continue
			}
			w.BySoil[i].Line = shifted(w.BySoil[i].Line, -x[0])
		}
	})
	p.stageWater = stage
	p.note("a what-if: water lines lie %s m lower by means that are not designed here", metres(x[0]))
	p.finish(j)
	return p
}
