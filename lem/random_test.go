package lem

import (
	"math"

	"pgregory.net/rapid"
)

// between draws a number to two decimals, so that equal levels and vertices in common come up.
func between(t *rapid.T, lo, hi float64, label string) float64 {
	return math.Round(rapid.Float64Range(lo, hi).Draw(t, label)*100) / 100
}

// drawGround draws a slope that falls to the right about x = 0, with a bench, steep or vertical steps.
func drawGround(t *rapid.T) Profile {
	height := between(t, 4, 14, "height")
	batter := between(t, 1, 3.5, "batter")
	toe := height * batter
	p := Profile{{-30, height}, {0, height}}
	switch rapid.IntRange(0, 3).Draw(t, "shape") {
	case 0: // Plane face.
		p = append(p, Point{toe, 0})
	case 1: // Bench at half height.
		p = append(p, Point{toe / 2, height / 2}, Point{toe/2 + 3, height / 2}, Point{toe + 3, 0})
	case 2: // Vertical step at the toe.
		wall := between(t, 0.5, 2, "wall")
		x := (height - wall) * batter
		p = append(p, Point{x, wall}, Point{x, 0})
	default: // Vertical step in the face, rising ground beyond.
		x := toe / 2
		p = append(p, Point{x, height / 2}, Point{x, height/2 - 1}, Point{x + (height/2-1)*batter, 0}, Point{x + 25, 1})
	}
	return append(p, Point{p[len(p)-1].X + 30, p[len(p)-1].Y})
}

func drawSoil(t *rapid.T, label string) Soil {
	s := Soil{
		Name: label, UnitWeight: between(t, 16, 21, label+" weight"),
		Cohesion: between(t, 0, 20, label+" cohesion"), Friction: between(t, 12, 38, label+" friction") * degree,
		Undrained: &UndrainedStrength{Strength: between(t, 15, 60, label+" cu")},
	}
	switch rapid.IntRange(0, 5).Draw(t, label+" kind") {
	case 0:
		s.SaturatedUnitWeight = s.UnitWeight + 1.5
	case 1:
		s.HasRu, s.Ru = true, between(t, 0, 0.5, label+" ru")
	case 2:
		s.Undrained.Gradient, s.Undrained.Datum = between(t, 0, 3, label+" gradient"), Profile{{-40, 6}, {40, 2}}
	}
	return s
}

// drawSection draws a layered section, its water and its loads. Strata may pinch out and outcrop; bodies may overlap.
func drawSection(t *rapid.T) (*Section, *Situation) {
	g := drawGround(t)
	s := &Section{Ground: g, Strata: []Stratum{{Soil: 0, Top: g}}}
	sit := &Situation{}
	for i := range rapid.IntRange(1, 4).Draw(t, "soils") {
		s.Soils = append(s.Soils, drawSoil(t, string(rune('a'+i))))
		sit.Undrained = append(sit.Undrained, rapid.IntRange(0, 4).Draw(t, "undrained") == 0)
	}
	for range rapid.IntRange(0, 3).Draw(t, "strata") {
		top := Profile{{-40, between(t, -6, 12, "top left")}, {between(t, 0, 20, "top x"), between(t, -6, 10, "top")}, {60, between(t, -8, 3, "top right")}}
		s.Strata = append(s.Strata, Stratum{rapid.IntRange(0, len(s.Soils)-1).Draw(t, "soil"), top})
	}
	for range rapid.IntRange(0, 2).Draw(t, "bodies") {
		x, y := between(t, -10, 25, "body x"), between(t, -3, 8, "body y")
		w, h, in := between(t, 1, 12, "body width"), between(t, 0.5, 5, "body height"), between(t, 0, 0.4, "body batter")
		s.Placed = append(s.Placed, Body{rapid.IntRange(0, len(s.Soils)-1).Draw(t, "body soil"), []Point{{x, y}, {x + in*w, y + h}, {x + w, y + h}, {x + w, y}}})
	}
	drawWater(t, g, sit)
	if rapid.Bool().Draw(t, "loaded") {
		x := between(t, -15, 10, "load x")
		s.Loads = []Surcharge{{FromX: x, ToX: x + between(t, 1, 10, "load width"), Pressure: between(t, 5, 40, "pressure")}}
	}
	if rapid.IntRange(0, 3).Draw(t, "quake") == 0 {
		sit.Kh = between(t, 0.02, 0.15, "kh")
	}
	return s, sit
}

func drawWater(t *rapid.T, g Profile, sit *Situation) {
	crest := g[0].Y
	switch rapid.IntRange(0, 4).Draw(t, "water") {
	case 0:
		return
	case 1: // Standing at the toe and in the ground.
		level := between(t, 0.2, crest-0.5, "pool")
		sit.Water.Free = []FreeWater{{level, 0, 200}}
		sit.Water.Line = Profile{{-40, level + 1}, {0, level}, {60, level}}
		return
	default:
		sit.Water.Line = Profile{{-40, between(t, 0, crest, "line left")}, {5, between(t, -2, crest-1, "line")}, {60, between(t, -3, 0.5, "line right")}}
	}
	if rapid.Bool().Draw(t, "drained") {
		y := between(t, -4, 4, "invert")
		sit.Water.Drains = &Drawdown{
			Invert: Profile{{between(t, -10, 0, "drain from"), y + 2}, {between(t, 5, 25, "drain to"), y}},
			Ratio:  []float64{between(t, 0, 1, "ratio"), between(t, 0, 1, "ratio")}, Fade: between(t, 1, 5, "fade"),
		}
	}
}

// drawCircle draws an arc through two points of the ground, one on top and one about the toe, but through no vertex: whether an arc that
// touches one is cut there is a matter of rounding.
func drawCircle(t *rapid.T, s *Section) Slip {
	right := s.Ground.Right() - 30
	x0, x1 := between(t, -20, right*0.45, "head")+0.0037, between(t, right*0.5, right+15, "exit")+0.0041
	a, b := Point{x0, s.Ground.At(x0)}, Point{x1, s.Ground.At(x1)}
	half := between(t, 0.25, 1.2, "half angle")
	chord := math.Hypot(b.X-a.X, b.Y-a.Y)
	r := chord / (2 * math.Sin(half))
	h := r * math.Cos(half) / chord
	return Slip{Centre: Point{(a.X+b.X)/2 - (b.Y-a.Y)*h, (a.Y+b.Y)/2 + (b.X-a.X)*h}, Radius: r}
}
