package report

import (
	"fmt"

	"standfast/lem"
	"standfast/remedies"
)

// section lays out a section without its water.
func (b *builder) section(s *lem.Section) *Section {
	out := &Section{
		GroundBefore: points(s.GroundBefore()), Ground: points(s.Ground), FirmBase: points(s.FirmBase),
		Strata: make([]Stratum, len(s.Strata)), Placed: make([]Body, len(s.Placed)), Surcharges: make([]Surcharge, len(s.Loads)),
		Water: map[string]Water{},
	}
	for i, st := range s.Strata {
		out.Strata[i] = Stratum{Soil: s.Soils[st.Soil].Name, Top: points(st.Top)}
	}
	for i, p := range s.Placed {
		out.Placed[i] = Body{Soil: s.Soils[p.Soil].Name, Outline: points(p.Outline)}
	}
	for i, l := range s.Loads {
		out.Surcharges[i] = Surcharge{Name: l.Name, FromX: l.FromX, ToX: l.ToX, Pressure: l.Pressure, Horizontal: l.Shear, Kind: "permanent"}
		if l.Variable {
			out.Surcharges[i].Kind = "variable"
		}
		if to := l.Pressure + l.Rise; l.Rise != 0 {
			out.Surcharges[i].PressureTo = &to
		}
	}
	for _, l := range s.LineLoads {
		out.LineLoads = append(out.LineLoads, LineLoad(l))
	}
	for _, r := range s.Restraints {
		out.Restraints = append(out.Restraints, Restraint(r))
	}
	for _, k := range s.Known {
		out.Known = append(out.Known, KnownSlip{Line: points(k.Line), Cohesion: k.Cohesion, Friction: degrees(k.Friction)})
	}
	out.Crack = crackOf(s.Crack)
	if n := len(b.soils); len(s.Soils) > n {
		own := builder{job: &remedies.Job{Section: lem.Section{Soils: s.Soils[n:]}}, soils: soilNames(s.Soils[n:])}
		out.Soils = own.soilTable()
	}
	return out
}

func crackOf(k *lem.TensionCrack) *TensionCrack {
	if k == nil {
		return nil
	}
	out := &TensionCrack{Line: points(k.Line), WaterShare: k.WaterShare}
	if len(k.Line) == 0 {
		out.Depth = k.Depth
	}
	if k.HasWaterLevel {
		out.WaterShare, out.WaterLevel = 0, &k.WaterLevel
	}
	return out
}

// water lays out the water of a situation in a section with these soils.
func water(w *lem.Water, soils []lem.Soil) Water {
	out := Water{Line: points(w.Line), Inclined: w.InclinedLine, FreeWater: make([]FreeWater, len(w.Free)), BySoil: map[string]BySoil{}}
	for _, p := range w.Points {
		out.Points = append(out.Points, [3]float64{p.X, p.Y, p.Pressure})
	}
	for _, own := range w.BySoil {
		out.BySoil[soils[own.Soil].Name] = BySoil{Line: points(own.Line)}
	}
	for i, f := range w.Free {
		out.FreeWater[i] = FreeWater(f)
	}
	for i := range soils {
		s := &soils[i]
		switch {
		case s.HasRu:
			out.BySoil[s.Name] = BySoil{Ru: &s.Ru}
		case s.FreeDraining:
			var by BySoil
			if w.HasFreeDrainingLevel {
				by.LevelY = &w.FreeDrainingLevel
			}
			out.BySoil[s.Name] = by
		}
	}
	if d := w.Drains; d != nil {
		out.Line = points(remedies.LoweredLine(w))
		out.Drains = &Drains{
			LineBefore: points(w.Line), Invert: points(d.Invert), Ratio: append([]float64{}, d.Ratio...), Fade: d.Fade,
		}
	}
	return out
}

// found lays out what a search found in a check.
func found(o *remedies.Outcome) Found {
	out := Found{FS: Number(o.FS), Resolved: o.Resolved, FSByMethod: make(map[string]Number, len(o.ByMethod)), Depth: nan}
	for m, fs := range o.ByMethod {
		if Number(fs).Known() {
			out.FSByMethod[m.String()] = Number(fs)
		}
	}
	if out.FS.Known() {
		out.Method = o.Method.String()
		out.Slip = slipOf(&o.Slip, o.From, o.To)
		out.Slip.Crack = o.Crack
		out.Depth = Number(o.Depth)
	}
	return out
}

// SlipOf returns the governing slip of an outcome.
func SlipOf(o *remedies.Outcome) *Slip { return slipOf(&o.Slip, o.From, o.To) }

// String describes the slip for people, in m.
func (s *Slip) String() string {
	ends := fmt.Sprintf("from (%.2f, %.2f) to (%.2f, %.2f)", s.From[0], s.From[1], s.To[0], s.To[1])
	if s.Centre != nil {
		return fmt.Sprintf("circle about (%.2f, %.2f), radius %.2f, %s", s.Centre[0], s.Centre[1], s.Radius, ends)
	}
	return fmt.Sprintf("polyline of %d points %s", len(s.Points), ends)
}

func slipOf(s *lem.Slip, from, to lem.Point) *Slip {
	out := &Slip{From: point(from), To: point(to)}
	switch s.Kind {
	case lem.Circle:
		centre := point(s.Centre)
		out.Kind, out.Centre, out.Radius = "circle", &centre, s.Radius
	case lem.Polyline:
		out.Kind, out.Points = "polyline", points(s.Nodes)
	}
	return out
}
