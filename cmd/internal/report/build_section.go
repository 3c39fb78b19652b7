package report

import (
	"math"

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
		out.Surcharges[i] = Surcharge{Name: l.Name, FromX: l.FromX, ToX: l.ToX, Pressure: l.Pressure, Kind: "permanent"}
		if l.Variable {
			out.Surcharges[i].Kind = "variable"
		}
	}
	return out
}

// water lays out the water of a situation in a section with these soils.
func water(w *lem.Water, soils []lem.Soil) Water {
	out := Water{Line: points(w.Line), FreeWater: make([]FreeWater, len(w.Free)), BySoil: map[string]BySoil{}}
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
		out.Line = points(loweredLine(w))
		out.Drains = &Drains{
			LineBefore: points(w.Line), Invert: points(d.Invert), Ratio: append([]float64{}, d.Ratio...), Fade: d.Fade,
		}
	}
	return out
}

// loweredLine returns the piezometric line that stands at the lowered head at the drains' invert.
func loweredLine(w *lem.Water) lem.Profile {
	return w.Line
}

// found lays out what a search found in a check, on the section checked.
func found(o *remedies.Outcome, ground lem.Profile) Found {
	out := Found{FS: Number(o.FS), Resolved: o.Resolved, FSByMethod: make(map[string]Number, len(o.ByMethod)), Depth: nan}
	for m, fs := range o.ByMethod {
		if Number(fs).Known() {
			out.FSByMethod[m.String()] = Number(fs)
		}
	}
	if out.FS.Known() {
		out.Method = o.Method.String()
		out.Slip = slipOf(&o.Slip, o.From, o.To)
		out.Depth = Number(slipDepth(&o.Slip, o.From.X, o.To.X, ground))
	}
	return out
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

// slipDepth returns the greatest vertical depth of a slip below the ground between two x, m.
func slipDepth(s *lem.Slip, from, to float64, ground lem.Profile) float64 {
	depth := 0.0
	at := func(x float64) {
		if x < from || x > to {
			return
		}
		if y, ok := slipLevel(s, x); ok {
			depth = max(depth, ground.At(x)-y)
		}
	}
	for i, p := range ground {
		at(p.X)
		if i > 0 && s.Kind == lem.Circle && p.X > ground[i-1].X {
			// Between breakpoints the depth is greatest where the arc runs parallel to the ground.
			q := ground[i-1]
			grade := (p.Y - q.Y) / (p.X - q.X)
			if x := s.Centre.X + s.Radius*grade/math.Hypot(1, grade); x > q.X && x < p.X {
				at(x)
			}
		}
	}
	for _, p := range s.Nodes {
		at(p.X)
	}
	if s.Kind == lem.Circle { // Level ground beyond the ends of the profile.
		at(s.Centre.X)
	}
	return depth
}

// slipLevel returns the level of a slip at x and reports whether it passes there.
func slipLevel(s *lem.Slip, x float64) (float64, bool) {
	if s.Kind == lem.Circle {
		dx := x - s.Centre.X
		if math.Abs(dx) > s.Radius {
			return 0, false
		}
		return s.Centre.Y - math.Sqrt(s.Radius*s.Radius-dx*dx), true
	}
	n := lem.Profile(s.Nodes)
	if len(n) == 0 || x < n.Left() || x > n.Right() {
		return 0, false
	}
	return n.At(x), true
}
