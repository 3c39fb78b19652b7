package remedies

import (
	"fmt"

	"standfast/lem"
	"standfast/optimize"
)

// Places of the parameters of a shear key.
const (
	shearDepth = iota
	shearWidth
	shearPosition
	shearSides
	shearPanel
	shearSpacing
)

// shearKeyKind is a body of stronger fill across the slip.
func shearKeyKind() Kind {
	return Kind{
		Name:    "shear_key",
		Title:   "shear key",
		Summary: "A trench across the slip, filled with compacted fill or rock up to the ground as it was.",
		Parameters: []Parameter{
			{
				// 1 m to 3 m below the slip is usual (common practice, no source).
				Name: "depth", Unit: "m", Meaning: "Depth of the bottom below the ground before works, at the middle of the key.",
				Min: 0.1, Max: 30, Default: optimize.Axis{Name: "depth", Min: 2, Max: 6, Step: 0.25},
			},
			{
				// 2 m to 5 m is usual (common practice, no source).
				Name: "width", Unit: "m", Meaning: "Width of the bottom.",
				Min: 0.1, Max: 50, Default: optimize.Axis{Name: "width", Min: 2, Max: 5, Step: 0.5},
			},
			{
				Name: "position", Unit: "m", Meaning: "Distance of the middle of the key from the toe, up the slope; negative: beyond the toe.",
				Min: -100, Max: 200, Default: optimize.Axis{Name: "position"},
			},
			keySidesParameter("side_batter"),
			panelParameter("panel", "Length of one panel that is dug at a time; the key is open along its whole length if not given."),
			panelParameter("panel_spacing", "Spacing of panels that are open at one time, centre to centre; needed with panel."),
		},
		Choices: []Choice{{Name: "fill", Soil: true, Meaning: "Soil of the key."}},
		Place:   "slip",
		order:   orderExchange,
		New:     newShearKey,
	}
}

// newShearKey makes the remedy.
func newShearKey(j *Job, r *Request) (Remedy, error) {
	if err := panelFault(r, shearPanel, shearSpacing); err != nil {
		return nil, err
	}
	soil := r.soil("fill")
	for _, s := range j.Section.Strata {
		if s.Soil == soil {
			return nil, fmt.Errorf("%w: shear_key: fill %q is the ground itself: name a stronger fill", ErrRequest, j.Section.Soils[soil].Name)
		}
	}
	return &shearKey{soil: soil}, nil
}

type shearKey struct{ soil int }

// ShearKeyOpen is the stage in which the shear key is dug and not filled yet.
const ShearKeyOpen = "shear key open"

// Apply digs and fills the key.
func (k *shearKey) Apply(j *Job, on *Proposal, x []float64) *Proposal {
	p := on.clone()
	f := slopeOf(j, on)
	const noun = "shear key"
	centre := f.toe.X - x[shearPosition]
	h := hole{centre: centre, bottom: f.before.At(centre) - x[shearDepth], width: x[shearWidth], batter: given(x[shearSides], keySideBatter)}
	sh := h.shape(f, noun)
	if sh.line != nil {
		sh.dims = append(sh.dims, lengthDim("depth of shear key", lem.Point{X: centre, Y: f.before.At(centre)}, lem.Point{X: centre, Y: h.bottom}))
	}
	sh = sh.own(f)
	p.Violations = append(p.Violations, sh.faults...)
	if sh.line != nil {
		p.refill(j, &sh, f.mirrored, k.soil, noun)
	}
	p.addHole(j, ShearKeyOpen, &sh, panelsOf(x[shearPanel], x[shearSpacing]))
	p.finish(j)
	return p
}
