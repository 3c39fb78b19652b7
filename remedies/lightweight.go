package remedies

import (
	"fmt"
	"math"

	"standfast/lem"
	"standfast/optimize"
)

// lightweightKind is the exchange of ground at the head for a lighter fill.
func lightweightKind() Kind {
	return Kind{
		Name:    "lightweight_fill",
		Title:   "lightweight fill at the head",
		Summary: "Ground at the head dug out to a level below the crest and replaced by light fill up to the ground as it was.",
		Parameters: []Parameter{
			{
				// 1 m to 4 m is usual (common practice, no source).
				Name: "depth", Unit: "m", Meaning: "Depth of the bottom of the light fill below the level of the crest.",
				Min: 0.1, Max: 50, Default: optimize.Axis{Name: "depth", Min: 0.5, Max: 4, Step: 0.25},
			},
			{
				Name: "width", Unit: "m", Meaning: "Width of the bottom from where it comes out on the face, measured inward.",
				Min: 0, Max: 200, Default: optimize.Axis{Name: "width", Min: 1, Max: 15, Step: 0.5},
			},
			{
				// 1V:1H to 1V:1.5H is usual for a temporary face in clay (common practice, no source).
				Name: "back_batter", Unit: "1V:nH", Meaning: "Batter behind the excavation while it is open: n in 1 vertical to n horizontal.",
				Min: 0.1, Max: 20, Default: optimize.Axis{Name: "back_batter", Min: 1.5, Max: 1.5},
			},
		},
		Choices: []Choice{{Name: "fill", Soil: true, Meaning: "Soil of the light fill."}},
		Place:   "head",
		order:   orderExchange,
		New:     newLightweight,
	}
}

// newLightweight makes the remedy. A fill no lighter than the ground that it replaces would load the head.
func newLightweight(j *Job, r *Request) (Remedy, error) {
	soil := r.soil("fill")
	fill := &j.Section.Soils[soil]
	for i, st := range j.Section.Strata {
		if s := &j.Section.Soils[st.Soil]; i == 0 && s.UnitWeight <= fill.UnitWeight {
			return nil, fmt.Errorf("%w: lightweight_fill: fill %q, %g kN/m3, is not lighter than the ground, %q with %g kN/m3: name a lighter fill", ErrRequest,
				fill.Name, fill.UnitWeight, s.Name, s.UnitWeight)
		}
	}
	return &lightweight{soil: soil}, nil
}

type lightweight struct{ soil int }

// HeadOpen is the stage in which the ground at the head is dug out and not replaced yet.
const HeadOpen = "excavation for lightweight fill open"

// Apply digs the head out and fills it again.
func (l *lightweight) Apply(j *Job, on *Proposal, x []float64) *Proposal {
	p := on.clone()
	f := slopeOf(j, on)
	const noun = "excavation for lightweight fill"
	sh := unloadShape(f, x).own(f)
	p.Violations = append(p.Violations, sh.faults...)
	if sh.line != nil {
		for i := range sh.faces {
			sh.faces[i].temporary = true
		}
		p.refill(j, &sh, f.mirrored, l.soil, noun)
		p.checkFloating(j, &sh, l.soil)
	}
	p.addHole(j, HeadOpen, &sh, nil)
	p.note("lightweight fill: protect it from fire, solvents and water as its maker asks, and spread the load of wheels above it")
	p.finish(j)
	return p
}

// limitFloat names the limit on flotation.
const limitFloat = "flotation of the light fill"

// checkFloating checks that no water line lifts the light fill: the water pressure on its bottom must not exceed its weight (statics).
func (p *Proposal) checkFloating(j *Job, sh *shape, soil int) {
	weight := j.Section.Soils[soil].UnitWeight
	most, name, at := 0.0, "", 0.0
	lifted := func(line int, head lem.Profile, counts func(x, under float64) bool) {
		if head == nil {
			return
		}
		for _, q := range pieces(spliced(head, p.Section.Ground, sh.from(), sh.to(), lower), sh.line, sh.from(), sh.to()) {
			if !counts((q.x0+q.x1)/2, (q.b0+q.b1)/2) {
				continue
			}
			for _, end := range []struct{ x, head, under float64 }{{q.x0, q.a0, q.b0}, {q.x1, q.a1, q.b1}} {
				lift := end.head - end.under - weight/lem.GammaW*(p.Section.Ground.At(end.x)-end.under)
				if lift > most {
					most, name, at = lift, j.Waters[line].Name, end.x
				}
			}
		}
	}
	p.eachWater(j, func(line int, w *lem.Water) {
		lifted(line, w.Line, func(float64, float64) bool { return true })
		for _, own := range w.BySoil { // Water of the soil that the fill lies on.
			lifted(line, own.Line, func(x, under float64) bool { return j.Section.SoilAt(x, under-sameLevel) == own.Soil })
		}
	})
	if most > limitSlack {
		p.violate(limitFloat, most, "water line %q lifts the light fill at x = %s m: its head is %s m more than the weight of the fill", name, metres(at), metres(math.Max(most, 0)))
	}
}
