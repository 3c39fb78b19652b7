package casefile

import (
	"standfast/lem"
	"standfast/remedies"
)

// readSurcharges fills the pressures on the ground.
func (b *builder) readSurcharges(v value) {
	b.uniqueNames(v)
	for _, item := range b.items(v) {
		s := lem.Surcharge{Variable: b.isTrue(b.get(item, "variable"), false)}
		s.Name, _ = b.text(b.get(item, "name"))
		s.Pressure, _ = b.number(b.get(item, "pressure"))
		if to, ok := b.number(b.get(item, "pressure_to")); ok {
			s.Rise = to - s.Pressure
		}
		s.Shear, _ = b.number(b.get(item, "horizontal"))
		var ok bool
		s.FromX, s.ToX, ok = b.fromTo(item)
		if g := b.job.Section.Ground; ok && g != nil && (s.ToX <= g.Left() || s.FromX >= g.Right()) {
			b.addFault(b.get(item, "from"), "", "the surcharge lies beyond the ground, which runs from x = %s to %s", figure(g.Left()), figure(g.Right()))
		}
		b.job.Section.Loads = append(b.job.Section.Loads, s)
	}
}

// readLineLoads fills the forces along lines.
func (b *builder) readLineLoads(v value) {
	b.uniqueNames(v)
	for _, item := range b.items(v) {
		var l lem.LineLoad
		l.Name, _ = b.text(b.get(item, "name"))
		x := b.get(item, "x")
		l.X, _ = b.number(x)
		vertical, horizontal := b.get(item, "vertical"), b.get(item, "horizontal")
		l.Vertical, _ = b.number(vertical)
		l.Horizontal, _ = b.number(horizontal)
		if g := b.job.Section.Ground; b.usable(x) && g != nil && (l.X < g.Left() || l.X > g.Right()) {
			b.addFault(x, "", "the load lies beyond the ground, which runs from x = %s to %s", figure(g.Left()), figure(g.Right()))
		}
		readable := (b.usable(vertical) || !vertical.there()) && (b.usable(horizontal) || !horizontal.there())
		if b.usable(item) && readable && l.Vertical == 0 && l.Horizontal == 0 {
			b.addFault(b.get(item, "name"), "write its `vertical` or `horizontal` force", "the line load has no force")
		}
		b.job.Section.LineLoads = append(b.job.Section.LineLoads, l)
	}
}

// readCrack fills the tension crack.
func (b *builder) readCrack(v value) {
	if !b.usable(v) {
		return
	}
	k := &lem.TensionCrack{}
	k.Depth, _ = b.number(b.get(v, "depth"))
	line, filled, level := b.get(v, "line"), b.get(v, "filled"), b.get(v, "water_level")
	k.Line, _ = b.line(line)
	if b.usable(filled) {
		k.WaterShare, _ = parseShare(filled.node)
	}
	k.WaterLevel, k.HasWaterLevel = b.number(level)
	if filled.there() && level.there() {
		b.addFault(level, "keep one of them", "the water in the crack has both `filled` and `water_level`")
	}
	if g := b.job.Section.Ground; k.Line != nil && g != nil && !belowSomewhere(k.Line, g) {
		b.addFault(line, "write the level of the crack's bottom, not its depth", "the bottom of the crack lies nowhere below the ground")
	}
	b.job.Section.Crack = k
}

// belowSomewhere reports whether a line lies below the ground somewhere between its own ends.
func belowSomewhere(line, ground lem.Profile) bool {
	for _, x := range breaks(line, ground) {
		if line.At(x) < ground.At(x) {
			return true
		}
	}
	return false
}

// readSituations fills the design situations.
func (b *builder) readSituations(v value) {
	b.uniqueNames(v)
	for _, item := range b.items(v) {
		s := remedies.Situation{Water: b.waterRef(b.get(item, "water"))}
		s.Name, _ = b.text(b.get(item, "name"))
		s.Free = b.freeWater(b.get(item, "free_water"))
		s.Undrained = b.undrainedSoils(b.get(item, "strength"))
		s.Kh, _ = b.number(b.get(item, "kh"))
		s.Kv, _ = b.number(b.get(item, "kv"))
		s.RequiredFS, _ = b.number(b.get(item, "required_fs"))
		s.RatioToExisting, _ = b.number(b.get(item, "required_ratio"))
		s.DrainsWorking = 1
		if share := b.get(item, "drains_working"); b.usable(share) {
			s.DrainsWorking, _ = parseShare(share.node)
		}
		s.Drains = b.drawdown(b.get(item, "drains"))
		b.job.Situations = append(b.job.Situations, s)
	}
}

// undrainedSoils returns which soils take their undrained strength; nil if none does.
func (b *builder) undrainedSoils(v value) []bool {
	which := make([]bool, len(b.job.Section.Soils))
	switch word, isWord := b.text(v); {
	case !b.usable(v) || isWord && word == wordDrained:
		return nil
	case isWord:
		b.undrainedClays(v, which)
	default:
		b.undrainedBySoil(v, which)
	}
	for _, u := range which {
		if u {
			return which
		}
	}
	return nil
}

// undrainedClays marks every clay; each must have an undrained strength, if it stands in the ground.
func (b *builder) undrainedClays(v value, which []bool) {
	for i, s := range b.job.Section.Soils {
		switch {
		case s.Undrained != nil:
			which[i] = b.job.Clay[i]
		case b.job.Clay[i] && b.inGround(i) && !b.get(b.soilValues[i], "undrained").there():
			b.addFault(v, "give it `undrained: {strength: …}` or `clay: false`, or write the strength by soil: `strength: {soft clay: undrained}`",
				"the clay `%s` has no undrained strength", clip(s.Name))
		}
	}
}

// inGround reports whether a soil is that of a stratum or a placed body.
func (b *builder) inGround(soil int) bool {
	for _, s := range b.job.Section.Strata {
		if s.Soil == soil {
			return true
		}
	}
	for _, p := range b.job.Section.Placed {
		if p.Soil == soil {
			return true
		}
	}
	return false
}

// undrainedBySoil marks the soils that a mapping names as undrained.
func (b *builder) undrainedBySoil(v value, which []bool) {
	for _, e := range b.entries(v) {
		name := e.key.Value
		i, ok := b.soils.index[name]
		if !ok {
			if b.soils.known {
				b.faultAt(e.key, v.path, didYouMean(name, b.soils.all), "there is no soil named `%s`", clip(name))
			}
			continue
		}
		if word, ok := b.text(e); !ok || word != wordUndrained {
			continue
		}
		if !b.get(b.soilValues[i], "undrained").there() {
			b.addFault(e, "give the soil `undrained: {strength: …}`", "the soil `%s` has no undrained strength", clip(name))
			continue
		}
		which[i] = true
	}
}

// readStages fills the settings of construction stages.
func (b *builder) readStages(v value) {
	if !v.there() {
		return
	}
	fs, _ := b.number(b.get(v, "required_fs"))
	plant, _ := b.number(b.get(v, "plant"))
	b.job.Stage = remedies.StageSettings{Given: true, Water: b.waterRef(b.get(v, "water")), RequiredFS: fs, Plant: plant}
}

// readSlips fills which slips are looked at.
func (b *builder) readSlips(v value) {
	b.job.Head = b.daylight(b.get(v, "head"))
	b.job.Exit = b.daylight(b.get(v, "toe"))
	switch word, _ := b.text(b.get(v, "direction")); word {
	case "leftward":
		b.job.Direction = lem.LeftwardOnly
	case "rightward":
		b.job.Direction = lem.RightwardOnly
	}
}

// daylight returns a range in which slips may leave the ground.
func (b *builder) daylight(v value) lem.Range {
	x, ok := b.span(v)
	if g := b.job.Section.Ground; ok && g != nil && (x.To <= g.Left() || x.From >= g.Right()) {
		b.addFault(v, "", "the range lies beyond the ground, which runs from x = %s to %s", figure(g.Left()), figure(g.Right()))
	}
	return x
}
