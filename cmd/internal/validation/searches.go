package validation

import (
	"math"

	"standfast/lem"
)

// giamGround is the slope of Giam and Donald, problems 1; the base of their sections is level at 20 m.
func giamGround() lem.Profile {
	return lem.Profile{{X: 20, Y: 25}, {X: 30, Y: 25}, {X: 50, Y: 35}, {X: 70, Y: 35}}
}

func giamUniform(cohesion, friction float64) *lem.Section {
	s := uniform(giamGround(), lem.Soil{UnitWeight: 20, Cohesion: cohesion, Friction: friction * degree})
	s.FirmBase = level(20)
	return s
}

func giamLayered() *lem.Section {
	g := giamGround()
	return &lem.Section{
		Ground: g, FirmBase: level(20),
		Soils: []lem.Soil{
			{UnitWeight: 19.5, Friction: 38 * degree},
			{UnitWeight: 19.5, Cohesion: 5.3, Friction: 23 * degree},
			{UnitWeight: 19.5, Cohesion: 7.2, Friction: 20 * degree},
		},
		Strata: []lem.Stratum{
			{Soil: 0, Top: g},
			{Soil: 1, Top: lem.Profile{{X: 20, Y: 25}, {X: 30, Y: 25}, {X: 40, Y: 27}, {X: 50, Y: 29}, {X: 54, Y: 31}, {X: 70, Y: 31}}},
			{Soil: 2, Top: lem.Profile{{X: 20, Y: 25}, {X: 30, Y: 25}, {X: 40, Y: 27}, {X: 52, Y: 24}, {X: 70, Y: 24}}},
		},
	}
}

// search is a check on the lowest FS on circles.
func search(name string, s *lem.Section, sit lem.Situation, method lem.Method, work *Work, place string, confidence Confidence, want float64) Check {
	return Check{Case: name, What: fsBy(method), Work: work, Place: place, Confidence: confidence, Want: want, Run: critical(s, sit, method, lem.SearchOptions{})}
}

func giamChecks() []Check {
	cracked := giamUniform(32, 10)
	cracked.Crack = &lem.TensionCrack{Depth: 2 * 32 / (20 * math.Tan(40*degree))}
	const returns = "scatter of the answers that the referees had"
	quake := lem.Situation{Kh: 0.15}
	return []Check{
		search("homogeneous", giamUniform(3, 19.6), lem.Situation{}, lem.Bishop, giam, "problem 1(a), referee", High, 1.00).between(0.98, 1.00, returns+": mean 0.991"),
		search("tension crack 3.81 m, dry", cracked, lem.Situation{}, lem.Bishop, giam, "problem 1(b), referee 1.65 to 1.70", High, 1.65).between(1.64, 1.70, returns),
		search("tension crack 3.81 m, dry", cracked, lem.Situation{}, lem.Spencer, giam, "problem 1(b), referee 1.65 to 1.70", High, 1.65).between(1.64, 1.70, returns),
		search("three layers", giamLayered(), lem.Situation{}, lem.Bishop, giam, "problem 1(c), referee", High, 1.39).within(0.011, returns),
		search("three layers", giamLayered(), lem.Situation{}, lem.Spencer, giam, "problem 1(c), referee", High, 1.39).within(0.015, returns),
		search("three layers, kh 0.15", giamLayered(), quake, lem.Bishop, giam, "problem 1(d), referee", High, 1.00).within(0.02, returns),
		search("three layers, kh 0.15", giamLayered(), quake, lem.Spencer, giam, "problem 1(d), referee", High, 1.00).within(0.02, returns),
	}
}

// slope21 is a slope 1V:2H, 10 m high, over a firm base at a level above the toe.
func slope21(soil lem.Soil, base float64) *lem.Section {
	s := uniform(face(10, math.Atan(0.5), 30), soil)
	s.FirmBase = level(base)
	return s
}

func griffithsChecks() []Check {
	soil := lem.Soil{UnitWeight: 20, Cohesion: 10, Friction: 20 * degree}
	drowned := lem.Soil{UnitWeight: 20, Cohesion: 0.05 * (20 - lem.GammaW) * 10, Friction: 20 * degree}
	pool := lem.Situation{Water: lem.Water{Free: []lem.FreeWater{{Level: 12, FromX: -200, ToX: 200}}}}
	factored := lem.Soil{UnitWeight: 20, Cohesion: 10 / 1.25, Friction: math.Atan(math.Tan(20*degree) / 1.25)}
	strong := slope21(lem.Soil{UnitWeight: 20, Cohesion: 50}, -10)
	strong.Soils = append(strong.Soils, lem.Soil{UnitWeight: 20, Cohesion: 125})
	strong.Strata = append(strong.Strata, lem.Stratum{Soil: 1, Top: level(0)})
	const chart = "the chart is read to 0.5 %"
	return []Check{
		search("2:1 slope, c'/(gamma H) 0.05, phi' 20, firm base at the toe", slope21(soil, 0), lem.Situation{}, lem.Bishop, bishopM, "anchor of Griffiths and Lane's Example 1", High, 1.380).within(0.005, chart),
		search("the same, under still water", slope21(drowned, 0), pool, lem.Bishop, bishopM, "by the identity of submerged slopes", High, 1.380).within(0.005, chart),
		search("the same, firm base 5 m deeper", slope21(soil, -5), lem.Situation{}, lem.Bishop, griff, "Example 2: practically unchanged", High, 1.38).within(0.015, "finite elements give 1.4 for both"),
		search("strengths divided by the partial factor 1.25: over-design factor", slope21(factored, 0), lem.Situation{}, lem.Bishop, euro, "Table A.4; F of Bishop and Morgenstern over 1.25", High, 1.380/1.25).within(0.005, chart),
		search("2:1 slope, cu/(gamma H) 0.25, firm base at D 2", slope21(lem.Soil{UnitWeight: 20, Cohesion: 50}, -10), lem.Situation{}, lem.Bishop, griff, "Example 3, with Taylor's base circle", High, 1.47).within(0.0125, "read from a chart"),
		search("the same on a foundation 2.5 times as strong", strong, lem.Situation{}, lem.Bishop, griff, "Example 4: about 2.1, Taylor's toe circle", Medium, 2.1).within(0.05, "printed to 0.1, by finite elements"),
	}
}

func yamagamiChecks() []Check {
	s := uniform(lem.Profile{{X: -20, Y: 0}, {X: 0, Y: 0}, {X: 10, Y: 5}, {X: 60, Y: 5}}, lem.Soil{UnitWeight: 17.64, Cohesion: 9.8, Friction: 10 * degree})
	const name = "2:1 slope 5 m high, c' 9.8, phi' 10"
	free := search(name+", polylines", s, lem.Situation{}, lem.Spencer, yamagami, "non-circular: 1.339 by descent, 1.327 by random walk", Medium, 1.327)
	free.Run = critical(s, lem.Situation{}, lem.Spencer, lem.SearchOptions{Polylines: true})
	return []Check{
		search(name, s, lem.Situation{}, lem.Ordinary, yamagami, "circular", High, 1.282).within(0.006, "their search was coarse"),
		search(name, s, lem.Situation{}, lem.Bishop, yamagami, "circular", High, 1.348).within(0.006, "their search was coarse"),
		free.between(1.310, 1.339, "from a little below the lowest to the highest of theirs"),
	}
}

func araiChecks() []Check {
	s := uniform(lem.Profile{{X: -60, Y: 0}, {X: 0, Y: 0}, {X: 30, Y: 20}, {X: 120, Y: 20}}, lem.Soil{UnitWeight: 18.82, Cohesion: 41.65, Friction: 15 * degree})
	return []Check{
		search("1.5:1 slope 20 m high, c' 41.65, phi' 15", s, lem.Situation{}, lem.Bishop, arai, "Example 1, circular", Medium, 1.451).
			between(1.380, 1.451, "an upper bound: their search by hand stopped short of the minimum"),
	}
}

// drawdownCheck is a slope from which a full reservoir is drawn down at once, with pore pressures that stay.
func drawdownCheck() Check {
	const height, batter = 10.0, 3.0
	beta := math.Atan(1 / batter)
	s := uniform(face(height, beta, 40), lem.Soil{UnitWeight: 2 * lem.GammaW, Cohesion: 0.025 * 2 * lem.GammaW * height, Friction: 30 * degree})
	s.FirmBase = level(0)
	drawn := lem.Situation{Water: lem.Water{Line: s.Ground}}
	return search("3:1 slope, c'/(gamma H) 0.025, phi' 30, drawn down from crest to toe", s, drawn, lem.Bishop, morg, "chart", Medium, 1.20).within(0.02, "read from a chart")
}

func searchChecks() []Check {
	out := giamChecks()
	out = append(out, griffithsChecks()...)
	out = append(out, yamagamiChecks()...)
	out = append(out, araiChecks()...)
	s, _ := craigCutting()
	s.FirmBase = level(-24) // D = 4: deep enough that Ns is 0.18.
	out = append(out, search("undrained cutting, lowest circle", s, lem.Situation{}, lem.Bishop, craig, "Example 9.1, by Taylor's number 0.18", High, 2.37).within(0.015, "the number is printed to two figures"))
	return append(out, drawdownCheck())
}
