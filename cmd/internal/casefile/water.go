package casefile

import (
	"go.yaml.in/yaml/v4"

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
		b.waters.add(name)
		b.job.Waters = append(b.job.Waters, b.waterLine(e))
	}
}

// waterLine returns one state of the water.
func (b *builder) waterLine(e value) remedies.WaterLine {
	w := remedies.WaterLine{Name: e.key.Value}
	line, own, points := b.get(e, "line"), b.get(e, "by_soil"), b.get(e, "points")
	w.Line, w.Artesian = b.lineOf(e)
	w.BySoil = b.soilLines(own)
	w.Points = b.pressurePoints(points)
	w.Inclined = b.isTrue(b.get(e, "inclined"), false)
	if !b.usable(e) || e.node.Kind != yaml.MappingNode {
		return w
	}
	if !line.there() && !own.there() && !points.there() {
		b.addFault(e, "write its `line`, lines `by_soil`, or `points`; without water a situation has `water: none`", "holds no water")
	}
	if artesian := b.get(e, "artesian"); artesian.there() && !line.there() {
		b.addFault(artesian, "write it at the line of the soil", "there is no `line` that could be artesian")
	}
	if inclined := b.get(e, "inclined"); w.Inclined && !line.there() && !own.there() {
		b.addFault(inclined, "take it out", "there is no line that could be inclined")
	}
	return w
}

// lineOf returns a line that is written as points or as a mapping, and whether it is artesian.
func (b *builder) lineOf(v value) (line lem.Profile, artesian bool) {
	if inner := b.get(v, "line"); inner.there() {
		artesian = b.isTrue(b.get(v, "artesian"), false)
		v = inner
	}
	line, _ = b.line(v)
	return line, artesian
}

// soilLines returns the lines of single soils.
func (b *builder) soilLines(v value) []remedies.SoilLine {
	var all []remedies.SoilLine
	for _, e := range b.entries(v) {
		name := e.key.Value
		i, ok := b.soils.index[name]
		if !ok {
			if b.soils.known {
				b.faultAt(e.key, v.path, didYouMean(name, b.soils.all), "there is no soil named `%s`", clip(name))
			}
			continue
		}
		switch s := &b.job.Section.Soils[i]; {
		case s.HasRu:
			b.addFault(e, "keep the line or the `ru` of the soil", "the soil `%s` takes its pore pressure from `ru`", clip(name))
		case s.FreeDraining:
			b.addFault(e, "keep the line or `free_draining: true`", "the soil `%s` is free-draining", clip(name))
		}
		l := remedies.SoilLine{Soil: i}
		l.Line, l.Artesian = b.lineOf(e)
		if l.Line != nil {
			all = append(all, l)
		}
	}
	return all
}

// pressurePoints returns known pore pressures; nil without any.
func (b *builder) pressurePoints(v value) []lem.PressurePoint {
	var points []lem.PressurePoint
	for _, x := range b.valuesAtPoints(v, "pressure") {
		points = append(points, lem.PressurePoint{X: x[0], Y: x[1], Pressure: x[2]})
	}
	return points
}

// valuesAtPoints returns a list of [x, y, value]; it records a fault for a second value at one point.
func (b *builder) valuesAtPoints(v value, what string) [][3]float64 {
	var all [][3]float64
	seen := map[lem.Point]bool{}
	for _, item := range b.items(v) {
		x, ok := b.numbers(item)
		if !ok || len(x) != 3 {
			continue
		}
		at := lem.Point{X: x[0], Y: x[1]}
		if seen[at] {
			b.addFault(item, "keep one of them", "a second %s at the same point", what)
		}
		seen[at] = true
		all = append(all, [3]float64{x[0], x[1], x[2]})
	}
	return all
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
