package drawing

import (
	"standfast/lem"
	"standfast/remedies"
)

// mirrored reflects a case about x = 0 and moves it right again.
func mirrored(d drawn) drawn {
	const shift = 72
	pt := func(p lem.Point) lem.Point { return lem.Point{X: shift - p.X, Y: p.Y} }
	prof := func(p lem.Profile) lem.Profile {
		out := p.Mirror()
		for i := range out {
			out[i].X += shift
		}
		return out
	}
	section := func(s lem.Section) lem.Section {
		s.Ground = prof(s.Ground)
		st := make([]lem.Stratum, len(s.Strata))
		for i, t := range s.Strata {
			st[i] = lem.Stratum{Soil: t.Soil, Top: prof(t.Top)}
		}
		pl := make([]lem.Body, len(s.Placed))
		for i, b := range s.Placed {
			pl[i].Soil = b.Soil
			for k := len(b.Outline) - 1; k >= 0; k-- {
				pl[i].Outline = append(pl[i].Outline, pt(b.Outline[k]))
			}
		}
		ld := make([]lem.Surcharge, len(s.Loads))
		for i, l := range s.Loads {
			l.FromX, l.ToX = shift-l.ToX, shift-l.FromX
			ld[i] = l
		}
		s.Strata, s.Placed, s.Loads = st, pl, ld
		return s
	}
	j := *d.job
	j.Section, j.Crest, j.Toe = section(j.Section), pt(j.Crest), pt(j.Toe)
	j.Waters = append([]remedies.WaterLine(nil), j.Waters...)
	for i := range j.Waters {
		j.Waters[i].Line = prof(j.Waters[i].Line)
	}
	l, r := *j.Limits.Right, *j.Limits.Left
	l.X, r.X = shift-l.X, shift-r.X
	j.Limits.Left, j.Limits.Right = &l, &r
	j.Limits.KeepClear = append([]remedies.KeepClear(nil), j.Limits.KeepClear...)
	for i := range j.Limits.KeepClear {
		k := &j.Limits.KeepClear[i]
		k.FromX, k.ToX = shift-k.ToX, shift-k.FromX
	}
	o := *d.opt
	q := *o.Proposal
	q.Section = section(q.Section)
	q.Waters = append([]lem.Water(nil), q.Waters...)
	for i := range q.Waters {
		q.Waters[i].Line = prof(q.Waters[i].Line)
	}
	q.Dimensions = append([]remedies.Dimension(nil), q.Dimensions...)
	for i := range q.Dimensions {
		q.Dimensions[i].From, q.Dimensions[i].To = pt(q.Dimensions[i].From), pt(q.Dimensions[i].To)
	}
	flip := func(list []remedies.Outcome) []remedies.Outcome {
		list = append([]remedies.Outcome(nil), list...)
		for i := range list {
			c := &list[i]
			c.Slip.Centre, c.From, c.To = pt(c.Slip.Centre), pt(c.To), pt(c.From)
			c.Check.Situation.Water.Line = prof(c.Check.Situation.Water.Line)
		}
		return list
	}
	o.Proposal, o.Situations, o.Stages = &q, flip(o.Situations), flip(o.Stages)
	return drawn{&j, &o}
}
