package casefile

import (
	"standfast/lem"
	"standfast/remedies"
)

// readWaters fills the water lines.
func (b *builder) readWaters(v value) {
	b.waters.known = !v.there() || b.usable(v)
	for _, e := range b.entries(v) {
		name := e.key.Value
		if name == wordNone {
			b.faultAt(e.key, v.path, "give the line another name", "`none` stands for no water")
			continue
		}
		w := remedies.WaterLine{Name: name}
		at := e
		if inner := b.get(e, "line"); inner.there() {
			at = inner
			w.Artesian = b.isTrue(b.get(e, "artesian"), false)
		}
		w.Line, _ = b.line(at)
		b.waters.add(name)
		b.job.Waters = append(b.job.Waters, w)
	}
}

// waterRef returns the index of the water line that the value names, -1 for `none`.
func (b *builder) waterRef(v value) int {
	if name, ok := b.text(v); ok && name == wordNone {
		return -1
	}
	if name, ok := b.text(v); ok && b.waters.known && len(b.waters.all) == 0 {
		b.addFault(v, "write the line under `water` at the top level, or `none`", "there is no water line named `%s`", clip(name))
		return -1
	}
	known := b.waters
	known.all = append(append([]string{}, b.waters.all...), wordNone)
	i, _ := b.ref(&known, v)
	return i
}

// freeWater returns the water that stands on the ground in a situation.
func (b *builder) freeWater(v value) []lem.FreeWater {
	var all []lem.FreeWater
	for _, item := range b.items(v) {
		level, ok := b.number(b.get(item, "level"))
		from, to, okSpan := b.fromTo(item)
		if !ok || !okSpan {
			continue
		}
		if b.job.Section.Ground != nil && lowest(b.job.Section.Ground, from, to) >= level {
			b.warn(b.get(item, "level"), "all ground from x = %s to %s lies above the water level", figure(from), figure(to))
		}
		all = append(all, lem.FreeWater{Level: level, FromX: from, ToX: to})
	}
	return all
}

// lowest returns the lowest level of a profile from x = from to x = to.
func lowest(p lem.Profile, from, to float64) float64 {
	lo := min(p.At(from), p.At(to))
	for _, a := range p {
		if a.X >= from && a.X <= to {
			lo = min(lo, a.Y)
		}
	}
	return lo
}

// drawdown returns the lowering by the drains of a proposed section; nil without any.
func (b *builder) drawdown(v value) *lem.Drawdown {
	if !b.usable(v) {
		return nil
	}
	if !b.finished {
		b.addFault(v, "lower the water line itself, or size drains under `remedies`", "`drains` belong in the file of a proposed section, with `ground_before`")
	}
	var d lem.Drawdown
	d.Invert, _ = b.line(b.get(v, "invert"))
	ratio := b.get(v, "ratio")
	d.Ratio, _ = b.numbers(ratio)
	d.Fade, _ = b.number(b.get(v, "fade"))
	if d.Ratio != nil && d.Invert != nil && len(d.Ratio) != len(d.Invert) {
		b.addFault(ratio, "write one for each point of the invert", "has %s for %s of the invert",
			counted(len(d.Ratio), "ratio", "ratios"), counted(len(d.Invert), "point", "points"))
	}
	return &d
}
