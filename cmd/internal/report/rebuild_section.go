package report

import (
	"maps"
	"math"
	"slices"

	"standfast/lem"
)

// section turns a section back, with every soil of the case.
func (b *rebuilder) section(s *Section) lem.Section {
	out := lem.Section{Ground: b.line(s.Ground), FirmBase: b.line(s.FirmBase)}
	for _, name := range b.file.SoilOrder {
		out.Soils = append(out.Soils, b.soil(name, b.file.Soils[name]))
	}
	for _, name := range ownSoils(s) {
		b.soils[name] = len(out.Soils)
		defer delete(b.soils, name)
		out.Soils = append(out.Soils, b.soil(name, s.Soils[name]))
	}
	for _, t := range s.Strata {
		out.Strata = append(out.Strata, lem.Stratum{Soil: b.soilIndex(t.Soil), Top: b.line(t.Top)})
	}
	if len(out.Ground) == 0 || len(out.Strata) == 0 || len(out.GroundBefore()) == 0 {
		b.wrong("a section has no ground")
	}
	for _, p := range s.Placed {
		out.Placed = append(out.Placed, lem.Body{Soil: b.soilIndex(p.Soil), Outline: b.points(p.Outline)})
	}
	for _, l := range s.Surcharges {
		load := lem.Surcharge{Name: l.Name, FromX: l.FromX, ToX: l.ToX, Pressure: l.Pressure, Shear: l.Horizontal, Variable: l.Kind == "variable"}
		if l.PressureTo != nil {
			load.Rise = *l.PressureTo - l.Pressure
		}
		out.Loads = append(out.Loads, load)
	}
	for _, l := range s.LineLoads {
		out.LineLoads = append(out.LineLoads, lem.LineLoad(l))
	}
	for _, r := range s.Restraints {
		out.Restraints = append(out.Restraints, lem.Restraint(r))
	}
	for _, k := range s.Known {
		out.Known = append(out.Known, lem.KnownSlip{Line: b.line(k.Line), Cohesion: k.Cohesion, Friction: k.Friction * math.Pi / 180})
	}
	if k := s.Crack; k != nil {
		out.Crack = &lem.TensionCrack{Depth: k.Depth, Line: b.line(k.Line), WaterShare: k.WaterShare}
		if k.WaterLevel != nil {
			out.Crack.WaterLevel, out.Crack.HasWaterLevel = *k.WaterLevel, true
		}
	}
	return out
}

func (b *rebuilder) soilIndex(name string) int {
	i, ok := b.soils[name]
	if !ok {
		b.wrong("there is no soil %q", name)
	}
	return i
}

// ownSoils returns the names of the soils of a section alone, in a fixed order behind those of the case.
func ownSoils(s *Section) []string {
	return slices.Sorted(maps.Keys(s.Soils))
}

func (b *rebuilder) soil(name string, s Soil) lem.Soil {
	out := lem.Soil{
		Name: name, UnitWeight: s.UnitWeight, SaturatedUnitWeight: s.SaturatedUnitWeight, Cohesion: s.Drained.Cohesion,
		Friction: s.Drained.Friction * math.Pi / 180, FreeDraining: s.FreeDraining,
	}
	if s.Ru != nil {
		out.Ru, out.HasRu = *s.Ru, true
	}
	if p := s.PowerLaw; p != nil {
		out.PowerLaw = &lem.PowerLaw{A: p.A, B: p.B}
	}
	if u := s.Undrained; u != nil {
		out.Undrained = &lem.UndrainedStrength{Strength: u.Strength, Gradient: u.Gradient, Datum: b.line(u.Datum)}
		if u.DatumY != nil { // A level line, written as its level.
			out.Undrained.Datum = lem.Profile{{Y: float64(*u.DatumY)}}
		}
		for _, p := range u.Points {
			out.Undrained.Points = append(out.Undrained.Points, lem.StrengthPoint{X: p[0], Y: p[1], Strength: p[2]})
		}
		if u.Ratio != nil {
			out.Undrained.Ratio, out.Undrained.WaterBefore = *u.Ratio, b.line(u.WaterBefore)
		}
		if u.Minimum != nil {
			out.Undrained.Minimum = *u.Minimum
		}
	}
	return out
}

// water turns the water of a check back: its line is that before drains. own names the soils of the section alone.
func (b *rebuilder) water(w Water, own ...string) lem.Water {
	out := lem.Water{Line: b.line(w.Line), InclinedLine: w.Inclined, Points: b.pressures(w.Points)}
	for i, name := range slices.Concat(b.file.SoilOrder, own) {
		if line := w.BySoil[name].Line; line != nil {
			out.BySoil = append(out.BySoil, lem.SoilWater{Soil: i, Line: b.line(line)})
		}
		if level := w.BySoil[name].LevelY; level != nil { // One level for all free-draining soils.
			out.FreeDrainingLevel, out.HasFreeDrainingLevel = *level, true
		}
	}
	for _, f := range w.FreeWater {
		out.Free = append(out.Free, lem.FreeWater{Level: f.Level, FromX: f.FromX, ToX: f.ToX})
	}
	if d := w.Drains; d != nil {
		out.Line = b.line(d.LineBefore)
		out.Drains = &lem.Drawdown{Invert: b.line(d.Invert), Ratio: d.Ratio, Fade: d.Fade}
		if len(d.Ratio) != len(d.Invert) {
			b.wrong("drains have %d points and %d ratios", len(d.Invert), len(d.Ratio))
		}
	}
	return out
}
