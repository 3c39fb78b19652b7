package casefile

import (
	"math"

	"standfast/lem"
)

// readSoils fills the soils, but for the undrained strengths, which may hang on the strata.
func (b *builder) readSoils(v value) {
	b.soils.known = b.usable(v)
	for _, e := range b.entries(v) {
		if e.key.Value == wordGround {
			b.faultAt(e.key, v.path, "give the soil another name", "`ground` stands for the ground surface")
		}
		s := lem.Soil{Name: e.key.Value}
		s.UnitWeight, _ = b.number(b.get(e, "unit_weight"))
		saturated := b.get(e, "saturated_unit_weight")
		s.SaturatedUnitWeight, _ = b.number(saturated)
		if s.SaturatedUnitWeight > 0 && s.SaturatedUnitWeight < s.UnitWeight {
			b.addFault(saturated, "a soil is heavier when its voids are full of water", "%s is less than the unit weight above the water line, %s",
				figure(s.SaturatedUnitWeight), figure(s.UnitWeight))
		}
		drained := b.get(e, "drained")
		s.Cohesion, _ = b.number(b.get(drained, "cohesion"))
		degrees, _ := b.number(b.get(drained, "friction"))
		s.Friction = degrees * math.Pi / 180
		b.checkDrained(drained, s)
		s.PowerLaw = b.powerLaw(b.get(e, "power_law"), drained)
		s.Ru, s.HasRu = b.number(b.get(e, "ru"))
		s.FreeDraining = b.isTrue(b.get(e, "free_draining"), false)
		b.soils.add(s.Name)
		b.soilValues = append(b.soilValues, e)
		b.job.Section.Soils = append(b.job.Section.Soils, s)
		b.job.Clay = append(b.job.Clay, b.isTrue(b.get(e, "clay"), !s.FreeDraining))
		b.checkDrainage(e, s)
	}
}

// powerLaw returns the curved strength of a soil; nil without one. It stands in place of the drained strength.
func (b *builder) powerLaw(v, drained value) *lem.PowerLaw {
	if !b.usable(v) {
		return nil
	}
	if drained.there() {
		b.addFault(v, "keep one of them", "the soil has both `drained` and `power_law`")
	}
	p := &lem.PowerLaw{}
	p.A, _ = b.number(b.get(v, "a"))
	p.B, _ = b.number(b.get(v, "b"))
	return p
}

// checkDrained refuses a drained strength of nothing, with which no slope stands.
func (b *builder) checkDrained(v value, s lem.Soil) {
	_, okC := b.number(b.get(v, "cohesion"))
	_, okPhi := b.number(b.get(v, "friction"))
	if okC && okPhi && s.Cohesion == 0 && s.Friction == 0 {
		b.addFault(v, "give a cohesion or a friction; for cu write `undrained: {strength: …}`", "the soil has no strength")
	}
}

// checkDrainage refuses a soil that drains freely and slowly at once.
func (b *builder) checkDrainage(v value, s lem.Soil) {
	if !s.FreeDraining {
		return
	}
	if clay := b.get(v, "clay"); b.isTrue(clay, false) {
		b.addFault(clay, "keep `clay: true` or `free_draining: true`", "a free-draining soil is no clay")
	}
	if ru := b.get(v, "ru"); b.usable(ru) {
		b.addFault(ru, "keep `ru` or `free_draining: true`", "a free-draining soil takes no pore pressure ratio")
	}
}

// readUndrained fills the undrained strengths.
func (b *builder) readUndrained() {
	for i, v := range b.soilValues {
		u := b.get(v, "undrained")
		if !b.usable(u) {
			continue
		}
		s := &lem.UndrainedStrength{}
		s.Strength, _ = b.number(b.get(u, "strength"))
		s.Gradient, _ = b.number(b.get(u, "gradient"))
		s.Points = b.strengthPoints(b.get(u, "points"))
		s.Datum = b.datum(b.get(u, "below"))
		b.checkGradient(u, s)
		b.readRatio(u, s)
		b.job.Section.Soils[i].Undrained = s
	}
}

// checkGradient holds the keys of an undrained strength against each other.
func (b *builder) checkGradient(u value, s *lem.UndrainedStrength) {
	gradient, below := b.get(u, "gradient"), b.get(u, "below")
	points, ratio := b.get(u, "points").there(), b.get(u, "ratio").there()
	switch {
	case ratio && gradient.there():
		b.addFault(gradient, "take it out", "a strength by `ratio` has no gradient")
	case ratio && below.there():
		b.addFault(below, "take it out", "a strength by `ratio` needs no line")
	case ratio:
	case points && gradient.there():
		b.addFault(gradient, "take it out", "a strength at points has no gradient")
	case points && below.there():
		b.addFault(below, "take it out", "a strength at points needs no line")
	case s.Gradient != 0 && !below.there():
		b.addFault(gradient, "write `below: ground`, the soil of a stratum, or points", "a gradient needs the line `below` which depth is measured")
	case s.Gradient < 0:
		b.addFault(gradient, "give the strength at points if it falls with depth", "the strength would fall with depth to less than nothing")
	case !points && s.Strength == 0 && s.Gradient == 0 && b.usable(b.get(u, "strength")):
		b.addFault(u, "give a strength above 0", "the soil has no strength")
	}
}

// readRatio fills a strength by ratio to the effective vertical stress before works.
func (b *builder) readRatio(u value, s *lem.UndrainedStrength) {
	ratio, minimum, water := b.get(u, "ratio"), b.get(u, "minimum"), b.get(u, "water_before")
	s.Ratio, _ = b.number(ratio)
	s.Minimum, _ = b.number(minimum)
	switch {
	case !ratio.there():
		for _, v := range []value{minimum, water} {
			if v.there() {
				b.addFault(v, "take it out, or give the strength by `ratio`", "only a strength by `ratio` has a `%s`", v.key.Value)
			}
		}
	case !water.there():
		b.addFault(ratio, "write `water_before:` with the name of a water line, `none`, or points", "a ratio to effective stress needs the water before works")
	default:
		s.WaterBefore = b.waterBefore(water)
	}
}

// waterBefore returns the line of the water before works; nil if that is none.
func (b *builder) waterBefore(v value) lem.Profile {
	if _, isName := b.text(v); !isName {
		line, _ := b.line(v)
		return line
	}
	i := b.waterRef(v)
	if i < 0 || i >= len(b.job.Waters) {
		return nil
	}
	w := &b.job.Waters[i]
	if w.Line == nil || len(w.BySoil) > 0 || len(w.Points) > 0 || w.Inclined {
		b.addFault(v, "write the line as points", "`%s` is more than a line", clip(w.Name))
	}
	return w.Line
}

// strengthPoints returns undrained strengths at points; nil without any.
func (b *builder) strengthPoints(v value) []lem.StrengthPoint {
	var points []lem.StrengthPoint
	for _, x := range b.valuesAtPoints(v, "strength") {
		points = append(points, lem.StrengthPoint{X: x[0], Y: x[1], Strength: x[2]})
	}
	return points
}

// datum returns the line that depth is measured from; nil without one.
func (b *builder) datum(v value) lem.Profile {
	if !b.usable(v) {
		return nil
	}
	name, isName := b.text(v)
	if !isName {
		line, _ := b.line(v)
		return line
	}
	if name == wordGround {
		return b.before
	}
	var top lem.Profile
	for _, s := range b.job.Section.Strata {
		if b.job.Section.Soils[s.Soil].Name != name {
			continue
		}
		if top != nil {
			b.addFault(v, "write the line as points", "`%s` has more than one stratum", clip(name))
			return nil
		}
		top = s.Top
	}
	if top == nil && b.soils.known {
		b.addFault(v, didYouMean(name, append([]string{wordGround}, b.stratumNames()...)), "there is no stratum of a soil `%s`", clip(name))
	}
	return top
}

// stratumNames returns the soils of the strata from the surface down.
func (b *builder) stratumNames() []string {
	var all []string
	for _, s := range b.job.Section.Strata {
		all = append(all, b.job.Section.Soils[s.Soil].Name)
	}
	return all
}

// checkStrengths records a fault for each soil without a drained strength that something asks for. A case that is undrained
// throughout can do without.
func (b *builder) checkStrengths() {
	for i, v := range b.soilValues {
		if b.get(v, "drained").there() || b.get(v, "power_law").there() {
			continue
		}
		if user := b.drainedUser(i); user != "" {
			b.addFault(v, "write `drained: {cohesion: 3, friction: 23}` with its effective strength", "the key `drained` is missing, and %s takes the drained strength", user)
		}
	}
}

// drainedUser returns what takes the drained strength of a soil; "" if nothing does.
func (b *builder) drainedUser(soil int) string {
	if b.job.Stage.Given {
		return "a construction stage"
	}
	for _, s := range b.job.Situations {
		if s.Undrained == nil || !s.Undrained[soil] {
			return "the situation `" + s.Name + "`"
		}
	}
	return ""
}
