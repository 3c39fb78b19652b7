package remedies

import (
	"math"

	"standfast/lem"
)

// dry marks a situation without a water line.
const dry = -1

// waterAt returns the water of a job's line before works, with what stands free on the ground.
func waterAt(j *Job, line int, free []lem.FreeWater) lem.Water {
	w := lem.Water{Free: free}
	if line != dry {
		w.Line = j.Waters[line].Line
	}
	if j.Limits.Outfall != nil {
		w.FreeDrainingLevel, w.HasFreeDrainingLevel = *j.Limits.Outfall, true
	}
	return w
}

// eachWater calls f for every water of the proposal with the index of its line: those of the situations, of their variants and of
// the stages. Dry ones are left out.
func (p *Proposal) eachWater(j *Job, f func(line int, w *lem.Water)) {
	for i := range p.Waters {
		if line := j.Situations[i].Water; line != dry {
			f(line, &p.Waters[i])
		}
	}
	for i := range p.variants {
		if line := j.Situations[p.variants[i].situation].Water; line != dry {
			f(line, &p.variants[i].water)
		}
	}
	if j.Stage.Given && j.Stage.Water != dry {
		f(j.Stage.Water, &p.stageWater)
	}
}

// clipWater lowers every line that is not artesian to the ground where the works have cut below it.
func (p *Proposal) clipWater(j *Job, cut []run) {
	p.eachWater(j, func(line int, w *lem.Water) {
		for _, r := range cut {
			h, _ := highest(w.Line, p.Section.Ground, r.from, r.to)
			switch {
			case h <= sameLevel:
			case j.Waters[line].Artesian:
				p.note("water line %q is artesian and keeps its head above the new ground", j.Waters[line].Name)
			default:
				w.Line = spliced(w.Line, p.Section.Ground, r.from, r.to, lower)
				p.note("water line %q is lowered to the new ground where the works cut below it", j.Waters[line].Name)
			}
		}
	})
}

// LoweredLine returns the piezometric line with what drains lower it by at their invert: the line itself outside the drains and
// where there are none. It is nil in dry ground.
func LoweredLine(w *lem.Water) lem.Profile {
	if w.Line == nil || w.Drains == nil {
		return w.Line
	}
	d := w.Drains
	ratio := make(lem.Profile, len(d.Invert))
	for i, p := range d.Invert {
		ratio[i] = lem.Point{X: p.X, Y: d.Ratio[i]}
	}
	from, to := d.Invert.Left(), d.Invert.Right()
	var out path
	for _, p := range pieces(w.Line, d.Invert, math.Min(from, w.Line.Left()), math.Max(to, w.Line.Right()), from, to) {
		y0, y1 := p.a0, p.a1
		if p.x0 >= from && p.x1 <= to && p.gap() > 0 {
			y0 -= levelRight(ratio, p.x0) * (p.a0 - p.b0)
			y1 -= levelLeft(ratio, p.x1) * (p.a1 - p.b1)
		}
		out.add(p.x0, y0)
		out.add(p.x1, y1)
	}
	return lem.Profile(out)
}
