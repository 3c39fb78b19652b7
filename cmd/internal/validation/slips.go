package validation

import (
	"math"

	"standfast/lem"
)

// fredlundKrahn is the slope of their comparison, in pounds and feet: no water line, so that the units do not matter. With a weak layer the
// circle is cut off by it.
func fredlundKrahn(ru float64, weak bool) (*lem.Section, lem.Slip) {
	ground := lem.Profile{{X: 0, Y: 60}, {X: 60, Y: 60}, {X: 140, Y: 20}, {X: 200, Y: 20}}
	s := uniform(ground, lem.Soil{UnitWeight: 120, Cohesion: 600, Friction: 20 * degree, HasRu: ru > 0, Ru: ru})
	circle := lem.Slip{Centre: lem.Point{X: 120, Y: 90}, Radius: 80}
	if !weak {
		return s, circle
	}
	const seam, thin = 17.0, 0.5 // Level of the horizontal part, ft, inferred; the layer reaches as much above and below it.
	s.Soils = append(s.Soils, lem.Soil{UnitWeight: 120, Friction: 10 * degree, HasRu: ru > 0, Ru: ru})
	s.Strata = append(s.Strata, lem.Stratum{Soil: 1, Top: level(seam + thin/1000)}, lem.Stratum{Soil: 0, Top: level(seam - thin)})
	slip := lem.Slip{Kind: lem.Polyline}
	const pieces = 400
	half := math.Sqrt(circle.Radius*circle.Radius - (circle.Centre.Y-seam)*(circle.Centre.Y-seam))
	at := func(x float64) lem.Point {
		d := x - circle.Centre.X
		return lem.Point{X: x, Y: circle.Centre.Y - math.Sqrt(circle.Radius*circle.Radius-d*d)}
	}
	from, to := circle.Centre.X-math.Sqrt(circle.Radius*circle.Radius-900), circle.Centre.X+math.Sqrt(circle.Radius*circle.Radius-4900)
	for i := range pieces + 1 {
		x := from + (to-from)*float64(i)/pieces
		if math.Abs(x-circle.Centre.X) > half {
			slip.Nodes = append(slip.Nodes, at(x))
			continue
		}
		if n := len(slip.Nodes); n > 0 && slip.Nodes[n-1].Y > seam {
			slip.Nodes = append(slip.Nodes, lem.Point{X: circle.Centre.X - half, Y: seam}, lem.Point{X: circle.Centre.X + half, Y: seam})
		}
	}
	return s, slip
}

func fredlundChecks() []Check {
	rows := []struct {
		number, name string
		ru           float64
		weak         bool
		method       lem.Method
		want, tol    float64
	}{
		{"1", "dry", 0, false, lem.Ordinary, 1.928, 0.005},
		{"1", "dry", 0, false, lem.Bishop, 2.080, 0.005},
		{"1", "dry", 0, false, lem.Spencer, 2.073, 0.005},
		{"1", "dry", 0, false, lem.MorgensternPrice, 2.076, 0.005},
		{"1", "dry", 0, false, lem.Janbu, 2.041, 0.015},
		{"3", "ru 0.25", 0.25, false, lem.Ordinary, 1.607, 0.005},
		{"3", "ru 0.25", 0.25, false, lem.Bishop, 1.766, 0.005},
		{"3", "ru 0.25", 0.25, false, lem.Spencer, 1.761, 0.005},
		{"3", "ru 0.25", 0.25, false, lem.MorgensternPrice, 1.765, 0.005},
		{"3", "ru 0.25", 0.25, false, lem.Janbu, 1.735, 0.015},
		{"2", "weak layer, dry", 0, true, lem.Spencer, 1.373, 0.01},
		{"2", "weak layer, dry", 0, true, lem.MorgensternPrice, 1.378, 0.01},
		{"4", "weak layer, ru 0.25", 0.25, true, lem.Spencer, 1.118, 0.01},
		{"4", "weak layer, ru 0.25", 0.25, true, lem.MorgensternPrice, 1.124, 0.01},
	}
	var out []Check
	for _, r := range rows {
		s, slip := fredlundKrahn(r.ru, r.weak)
		o := lem.Setting{Method: r.method, SideForce: lem.SideForce{Shape: lem.Constant}}
		c := Check{Case: "2:1 slope, " + r.name, What: fsBy(r.method), Work: fredlund, Place: "case " + r.number, Confidence: High, Want: r.want, Run: fs(s, lem.Situation{}, slip, o)}
		why := "printed to 0.001; slices not given"
		switch {
		case r.method == lem.Janbu:
			c.Confidence, why = Medium, "f0 is read from a chart: theirs is about 1.09, the usual fit 1.077"
		case r.weak:
			c.Confidence, why = Medium, "level of the layer inferred as 17 ft"
		}
		out = append(out, c.within(r.tol, why))
	}
	return out
}

// craigCutting is the undrained cutting; radius, angle and toe as printed fix the circle.
func craigCutting() (*lem.Section, lem.Slip) {
	const radius, theta, height = 12.1, 89.5 * degree, 8.0
	s := uniform(face(height, 45*degree, 60), lem.Soil{UnitWeight: 19, Cohesion: 65})
	chord := 2 * radius * math.Sin(theta/2)
	return s, arcThrough(lem.Point{X: -math.Sqrt(chord*chord - height*height), Y: height}, lem.Point{}, theta/2)
}

// undrainedArc is the exact F = cu R^2 theta/(W d) of an arc in a slope of 30 degrees, with exact area and arm of the sliding mass.
func undrainedArc(slip *lem.Slip, cu, gamma, height float64) float64 {
	c, r := slip.Centre, slip.Radius
	x0, x1 := c.X-math.Sqrt(r*r-(c.Y-height)*(c.Y-height)), c.X+math.Sqrt(r*r-c.Y*c.Y)
	theta := math.Asin((x1-c.X)/r) - math.Asin((x0-c.X)/r)
	crest := -height / math.Tan(30*degree)
	// Moment of the ground above the toe's level, piece by piece, and of the arc below it, which is that of its ends: the integral of
	// (cx - x)(sqrt(R^2 - (x-cx)^2) - cy) dx.
	moment := height * ((crest-x0)*(c.X-(crest+x0)/2) - crest/2*(c.X-crest*2/3))
	at := func(x float64) float64 {
		v := math.Sqrt(r*r - (x-c.X)*(x-c.X))
		return v*v*v/3 + c.Y*(r*r-v*v)/2
	}
	return cu * r * r * theta / (gamma * (moment + at(x1) - at(x0)))
}

func undrainedChecks() []Check {
	const cu, gamma, height = 30.0, 18.0, 10.0
	slip := lem.Slip{Centre: lem.Point{X: -6, Y: 18}, Radius: 24}
	s := uniform(face(height, 30*degree, 60), lem.Soil{UnitWeight: gamma, Undrained: &lem.UndrainedStrength{Strength: cu}})
	var out []Check
	for _, method := range []lem.Method{lem.Ordinary, lem.Bishop, lem.Spencer, lem.MorgensternPrice} {
		wet := lem.Situation{Undrained: []bool{true}, Water: lem.Water{Line: lem.Profile{{X: -100, Y: 9}, {X: 100, Y: 0}}}}
		c := Check{
			Case: "arc in undrained ground, with a water line that must not matter", What: fsBy(method), Work: algebra, Place: "F = cu R^2 theta/(W d)",
			Confidence: Exact, Want: undrainedArc(&slip, cu, gamma, height), Run: fs(s, wet, slip, lem.Setting{Method: method, Slices: fineSlices}),
		}
		out = append(out, c.within(2e-4, "finite slices"))
	}
	return out
}

func slipChecks() []Check {
	out := fredlundChecks()
	s, slip := craigCutting()
	for _, method := range []lem.Method{lem.Ordinary, lem.Bishop} {
		c := Check{Case: "undrained cutting", What: fsBy(method), Work: craig, Place: "Example 9.1", Confidence: High, Want: 2.48, Run: fs(s, lem.Situation{}, slip, lem.Setting{Method: method})}
		out = append(out, c.within(0.015, "area and arm are printed to two figures"))
	}
	return append(out, undrainedChecks()...)
}
