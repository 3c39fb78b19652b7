package remedies

import (
	"fmt"
	"math"

	"standfast/optimize"
)

// Places of the parameters of a buttress's key, behind those of the buttress.
const (
	keyDepth = iota + 3
	keyWidth
	keyOffset
	keySides
	keyPanel
	keySpacing
)

// buttressKind is a buttress of free-draining rockfill at the toe.
func buttressKind() Kind {
	return Kind{
		Name:    "buttress",
		Title:   "rockfill toe buttress",
		Summary: "Free-draining rockfill with a level top placed against the toe of the slope, with or without a key below it.",
		Parameters: []Parameter{
			{
				// 2 m to 6 m is usual (common practice, no source).
				Name: "height", Unit: "m", Meaning: "Height of the level top above the toe.",
				Min: 0.1, Max: 50, Default: optimize.Axis{Name: "height", Min: 1, Max: 6, Step: 0.1},
			},
			{
				// 2 m to 4 m is usual (common practice, no source).
				Name: "top_width", Unit: "m", Meaning: "Width of the top from where it meets the face of the slope to its outer edge.",
				Min: 0.1, Max: 200, Default: optimize.Axis{Name: "top_width", Min: 2, Max: 6, Step: 0.25},
			},
			{
				// 1V:1.5H to 1V:2H is usual for rockfill (common practice, no source).
				Name: "batter", Unit: "1V:nH", Meaning: "Batter of the outer face: n in 1 vertical to n horizontal.",
				Min: 0.1, Max: 20, Default: optimize.Axis{Name: "batter", Min: 1.5, Max: 1.5},
			},
			{
				// 1 m to 3 m below the slip is usual (common practice, no source).
				Name: "key_depth", Unit: "m", Optional: true, Meaning: "Depth of the bottom of a key of rockfill below the toe; no key if not given.",
				Min: 0.1, Max: 20,
			},
			{
				// 2 m to 5 m is usual (common practice, no source).
				Name: "key_width", Unit: "m", Optional: true, Meaning: "Width of the bottom of the key; needed with a key.",
				Min: 0.1, Max: 50,
			},
			{
				Name: "key_offset", Unit: "m", Optional: true, Meaning: "Distance of the middle of the key from the toe, outward; 0 if not given.",
				Min: -100, Max: 100,
			},
			keySidesParameter("key_batter"),
			panelParameter("key_panel", "Length of one panel of the key that is dug at a time; the key is open along its whole length if not given."),
			panelParameter("key_spacing", "Spacing of panels that are open at one time, centre to centre; needed with key_panel."),
		},
		Choices: []Choice{{Name: "fill", Soil: true, Meaning: "Soil of the rockfill; it must be free-draining."}},
		Place:   "toe",
		order:   orderFill,
		New:     newButtress,
	}
}

// newButtress makes the remedy; its fill must drain freely, since nothing else carries water away from its back.
func newButtress(j *Job, r *Request) (Remedy, error) {
	soil := r.soil("fill")
	if !j.Section.Soils[soil].FreeDraining {
		return nil, fmt.Errorf("%w: buttress: fill %q is not free-draining: choose a free-draining rockfill, or a berm", ErrRequest, j.Section.Soils[soil].Name)
	}
	works := &earthworks{noun: "buttress", soil: soil, fills: true, shape: bermShape("buttress")}
	if !r.has(keyDepth) {
		for i := keyWidth; i <= keySpacing; i++ {
			if r.has(i) {
				return nil, fmt.Errorf("%w: buttress: %s needs a key: give key_depth", ErrRequest, r.Axes[i].Name)
			}
		}
		return works, nil
	}
	if !r.has(keyWidth) {
		return nil, fmt.Errorf("%w: buttress: the key needs a width: give key_width", ErrRequest)
	}
	if err := panelFault(r, keyPanel, keySpacing); err != nil {
		return nil, err
	}
	return &keyedButtress{works}, nil
}

// keyedButtress is a buttress over a key of the same rockfill.
type keyedButtress struct{ works *earthworks }

// Apply digs and fills the key, then places the buttress over it.
func (b *keyedButtress) Apply(j *Job, on *Proposal, x []float64) *Proposal {
	p := on.clone()
	f := slopeOf(j, on)
	const noun = "key"
	key := hole{
		centre: f.toe.X + given(x[keyOffset], 0), bottom: f.toe.Y - x[keyDepth],
		width: x[keyWidth], batter: given(x[keySides], keySideBatter),
	}
	sh := key.shape(f, noun)
	sh = sh.own(f)
	p.Violations = append(p.Violations, sh.faults...)
	if sh.line != nil {
		p.refill(j, &sh, f.mirrored, b.works.soil, noun)
	}
	p.addHole(j, KeyOpen, &sh, panelsOf(x[keyPanel], x[keySpacing]))
	return b.works.Apply(j, p, x)
}

// KeyOpen is the stage in which the key of a buttress is dug and not filled yet.
const KeyOpen = "key open"

// keySideBatter is the batter of the sides of an open key, n of 1V:nH, if none is given (common practice, no source).
const keySideBatter = 0.5

// keySidesParameter is the batter of the sides of a hole.
func keySidesParameter(name string) Parameter {
	return Parameter{
		Name: name, Unit: "1V:nH", Optional: true, Meaning: "Batter of the sides while the hole is open; 0.5 if not given.",
		Min: 0.05, Max: 5,
	}
}

// panelParameter is a length of panels. Panels of 3 m to 6 m are usual, open for less than a shift (common practice, no source).
func panelParameter(name, meaning string) Parameter {
	return Parameter{Name: name, Unit: "m", Optional: true, Meaning: meaning, Min: 0.5, Max: 200}
}

// panelFault says what is wrong with the panels of a request.
func panelFault(r *Request, open, spacing int) error {
	switch {
	case r.has(open) != r.has(spacing):
		return fmt.Errorf("%w: %s: panels need their length and their spacing: give panel and panel_spacing", ErrRequest, r.Kind)
	case r.has(open) && r.Axes[open].Max >= r.Axes[spacing].Min:
		return fmt.Errorf("%w: %s: panels %g m long leave no ground between them at a spacing of %g m: give a panel_spacing greater than panel", ErrRequest, r.Kind, r.Axes[open].Max, r.Axes[spacing].Min)
	}
	return nil
}

// panelsOf returns the panels of two parameters; nil if they are absent.
func panelsOf(open, spacing float64) *Panels {
	if math.IsNaN(open) {
		return nil
	}
	return &Panels{Open: open, Spacing: spacing}
}

// given returns an optional parameter or what holds without it.
func given(x, otherwise float64) float64 {
	if math.IsNaN(x) {
		return otherwise
	}
	return x
}
