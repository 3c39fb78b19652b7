package remedies

import (
	"fmt"
	"math"
	"slices"

	"standfast/lem"
)

// dry marks a situation without a water line.
const dry = -1

// waterAt returns the water of a job's line before works, with what stands free on the ground.
func waterAt(j *Job, line int, free []lem.FreeWater) lem.Water {
	w := lem.Water{Free: free}
	if line != dry {
		l := &j.Waters[line]
		w.Line, w.Points, w.InclinedLine = l.Line, l.Points, l.Inclined
		for _, own := range l.BySoil {
			w.BySoil = append(w.BySoil, lem.SoilWater{Soil: own.Soil, Line: own.Line})
		}
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
		l := &j.Waters[line]
		w.BySoil = slices.Clone(w.BySoil)
		for _, r := range cut {
			w.Line = p.clipLine(fmt.Sprintf("water line %q", l.Name), w.Line, l.Artesian, r)
			for i, own := range l.BySoil {
				name := fmt.Sprintf("water line %q in %s", l.Name, j.Section.Soils[own.Soil].Name)
				w.BySoil[i].Line = p.clipLine(name, w.BySoil[i].Line, own.Artesian, r)
			}
			if len(l.Points) > 0 {
				p.note("pore pressures at points of %q stay as they are where the works cut", l.Name)
			}
		}
	})
}

// clipLine returns a water line lowered to the new ground over a cut, unless it is artesian; there may be none.
func (p *Proposal) clipLine(name string, line lem.Profile, artesian bool, cut run) lem.Profile {
	if line == nil {
		return nil
	}
	switch h, _ := highest(line, p.Section.Ground, cut.from, cut.to); {
	case h <= sameLevel:
	case artesian:
		p.note("%s is artesian and keeps its head above the new ground", name)
	default:
		p.note("%s is lowered to the new ground where the works cut below it", name)
		return spliced(line, p.Section.Ground, cut.from, cut.to, lower)
	}
	return line
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
