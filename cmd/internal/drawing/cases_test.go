package drawing

import (
	"fmt"
	"math"

	"standfast/lem"
	"standfast/remedies"
)

// The sections of this file are invented. Their factors of safety and slips were not computed: they are there to be drawn.

// drawn is a case with one of its options.
type drawn struct {
	job *remedies.Job
	opt *remedies.Option
}

const degree = math.Pi / 180

func soil(name string, gamma, c, phi, cu float64) lem.Soil {
	s := lem.Soil{Name: name, UnitWeight: gamma, Cohesion: c, Friction: phi * degree}
	if cu > 0 {
		s.Undrained = &lem.UndrainedStrength{Strength: cu}
	}
	return s
}

// cutting is a clay cutting 8 m high that faces right.
func cutting() *remedies.Job {
	ground := lem.Profile{{X: 0, Y: 58.4}, {X: 26, Y: 58}, {X: 46, Y: 50}, {X: 72, Y: 49.7}}
	depth, outfall := 1.0, 49.4
	return &remedies.Job{
		Title: "Harrow Lane cutting, invented", Length: 60,
		Section: lem.Section{
			Ground: ground,
			Soils: []lem.Soil{
				soil("weathered clay", 18.5, 2, 24, 40), soil("stiff clay", 19.5, 5, 24, 75), soil("siltstone", 21, 25, 30, 0),
				soil("granular fill", 19.5, 0, 36, 0),
			},
			Strata: []lem.Stratum{
				{Soil: 0, Top: ground},
				{Soil: 1, Top: lem.Profile{{X: 0, Y: 55.2}, {X: 26, Y: 54.6}, {X: 46, Y: 47.6}, {X: 72, Y: 47.2}}},
				{Soil: 2, Top: lem.Profile{{X: 0, Y: 45}, {X: 72, Y: 44.4}}},
			},
			Loads: []lem.Surcharge{{Name: "haul road", FromX: 12, ToX: 20, Pressure: 10}},
		},
		Crest: lem.Point{X: 26, Y: 58}, Toe: lem.Point{X: 46, Y: 50},
		Waters: []remedies.WaterLine{
			{Name: "winter", Line: lem.Profile{{X: 0, Y: 56.6}, {X: 24, Y: 55.8}, {X: 36, Y: 53.1}, {X: 46, Y: 50}, {X: 72, Y: 49.2}}},
			{Name: "summer", Line: lem.Profile{{X: 0, Y: 54.4}, {X: 24, Y: 53.6}, {X: 36, Y: 51.4}, {X: 46, Y: 49.3}, {X: 72, Y: 48.4}}},
		},
		Situations: []remedies.Situation{
			{Name: "winter water", Water: 0, RequiredFS: 1.25},
			{Name: "summer water", Water: 1, RequiredFS: 1.35},
		},
		Stage: remedies.StageSettings{Given: true, Water: 1, RequiredFS: 1.1},
		Limits: remedies.Limits{
			Left:      &remedies.Fence{Name: "garden fence", X: 22},
			Right:     &remedies.Fence{Name: "highway boundary", X: 55},
			KeepClear: []remedies.KeepClear{{Name: "water main", FromX: 55, ToX: 58, NoDig: true, NoLoad: true, DigBelow: &depth}},
			Outfall:   &outfall,
		},
		MinDepth: 1,
		Requests: nil,
	}
}

func circleOutcome(name string, i int, required, fs float64, c lem.Point, r float64, g lem.Profile, w lem.Water, from, to float64) remedies.Outcome {
	arc := func(x float64) lem.Point {
		return lem.Point{X: x, Y: c.Y - math.Sqrt(math.Max(0, r*r-(x-c.X)*(x-c.X)))}
	}
	// The ends are moved from the given guesses along the arc to where it meets the ground.
	meet := func(x, outwards float64) float64 {
		inside := arc(x).Y < g.At(x)
		if !inside {
			outwards = -outwards
		}
		for (arc(x).Y < g.At(x)) == inside {
			x += outwards
		}
		return x
	}
	from, to = meet(from, -0.01), meet(to, 0.01)
	return remedies.Outcome{
		Check: remedies.Check{Name: name, SituationI: i, Required: required, Situation: lem.Situation{Name: name, Water: w}},
		FS:    fs, Method: lem.Bishop, Slip: lem.Slip{Kind: lem.Circle, Centre: c, Radius: r},
		From: arc(from), To: arc(to), Resolved: true,
	}
}

func (d drawn) water(i int) lem.Water { return lem.Water{Line: d.job.Waters[i].Line} }

func existingCutting() drawn {
	d := drawn{job: cutting()}
	g := d.job.Section.Ground
	d.opt = &remedies.Option{
		Name: "existing", Status: remedies.Existing,
		Proposal: &remedies.Proposal{Section: d.job.Section, Waters: []lem.Water{d.water(0), d.water(1)}},
		Situations: []remedies.Outcome{
			circleOutcome("winter water", 0, 1.25, 1.0299, lem.Point{X: 43.4, Y: 69}, 20.2, g, d.water(0), 26.6, 48),
			circleOutcome("summer water", 1, 1.35, 1.221, lem.Point{X: 43.4, Y: 69}, 20.2, g, d.water(1), 26.6, 48),
		},
	}
	return d
}

// berm adds a berm in the fill of the last soil at the toe of the cutting.
func berm(d drawn, height, width, batter float64) drawn {
	toe, crest := d.job.Toe, d.job.Crest
	face := (toe.X - crest.X) / (crest.Y - toe.Y)
	level := toe.Y + height
	inner := lem.Point{X: toe.X - face*height, Y: level}
	outer := lem.Point{X: inner.X + width, Y: level}
	// The outer face meets the ground beyond the toe, which falls gently.
	fall := (toe.Y - d.job.Section.Ground[3].Y) / (d.job.Section.Ground[3].X - toe.X)
	run := (height + fall*(outer.X-toe.X)) / (1/batter - fall)
	foot := lem.Point{X: outer.X + run, Y: level - run/batter}
	sec := d.job.Section
	sec.Ground = lem.Profile{sec.Ground[0], sec.Ground[1], inner, outer, foot, sec.Ground[3]}
	sec.Placed = []lem.Body{{Soil: len(sec.Soils) - 1, Outline: []lem.Point{inner, outer, foot, toe}}}
	g := sec.Ground
	q := remedies.Quantities{Fill: make([]float64, len(sec.Soils)), Cut: make([]float64, len(sec.Soils))}
	q.Fill[len(sec.Soils)-1] = 12.8999
	d.opt = &remedies.Option{
		Name: "berm", Title: "toe berm", Status: remedies.MeetsTarget,
		Parameters: []remedies.Value{
			{Name: "height", Unit: "m", Value: height}, {Name: "top_width", Unit: "m", Value: width}, {Name: "batter", Unit: "1V:nH", Value: batter},
		},
		Proposal: &remedies.Proposal{
			Section: sec, Waters: []lem.Water{d.water(0), d.water(1)}, Quantities: q,
			Dimensions: []remedies.Dimension{
				{From: inner, To: outer, Label: fmt.Sprintf("top width %.2f m", width)},
				{From: lem.Point{X: outer.X, Y: toe.Y}, To: outer, Label: fmt.Sprintf("height %.2f m", height)},
				{From: outer, To: foot, Label: fmt.Sprintf("1V:%.1fH", batter), Batter: true},
			},
		},
		Situations: []remedies.Outcome{
			circleOutcome("winter water", 0, 1.25, 1.2551, lem.Point{X: 44.6, Y: 71}, 24, g, d.water(0), 25, 55),
			circleOutcome("summer water", 1, 1.35, 1.366, lem.Point{X: 44.6, Y: 71}, 24, g, d.water(1), 25, 55),
		},
		Stages: []remedies.Outcome{
			circleOutcome("end of construction", -1, 1.1, 1.42, lem.Point{X: 44.6, Y: 71}, 24, g, d.water(1), 25, 55),
		},
	}
	d.opt.Stages[0].Check.Stage = true
	return d
}

func cuttingWithBerm() drawn { return berm(drawn{job: cutting()}, 2.5, 5.5, 2) }

// regradeWithDrains cuts the upper half of the cutting back, fills the lower and drains it.
func regradeWithDrains() drawn {
	d := drawn{job: cutting()}
	sec := d.job.Section
	a, b := lem.Point{X: 23, Y: 58.046}, lem.Point{X: 49, Y: 49.965}
	sec.Ground = lem.Profile{sec.Ground[0], a, b, sec.Ground[3]}
	sec.Placed = []lem.Body{{Soil: 3, Outline: []lem.Point{{X: 36, Y: 54}, b, {X: 46, Y: 50}}}}
	w := []lem.Water{d.water(0), d.water(1)}
	for i := range w {
		w[i].Drains = &lem.Drawdown{
			Invert: lem.Profile{{X: 28, Y: 53.5}, {X: 38, Y: 50.8}, {X: 46.5, Y: 47.6}}, Ratio: []float64{0.6, 0.6, 0.6}, Fade: 3,
		}
	}
	d.opt = &remedies.Option{
		Name: "regrade+drains", Title: "regrade with trench drains", Status: remedies.Infeasible,
		Reason: "best FS 1.212 where 1.250 is required in winter water; the garden fence binds",
		Parameters: []remedies.Value{
			{Name: "batter", Unit: "1V:nH", Value: 3.2}, {Name: "pivot", Unit: "1", Value: 0.5}, {Name: "depth", Unit: "m", Value: 3},
		},
		Proposal: &remedies.Proposal{
			Section: sec, Waters: w,
			Quantities: remedies.Quantities{Cut: []float64{6.2, 0, 0, 0}, Fill: []float64{0, 0, 0, 5.9}, TrenchDig: 1.1, Stone: 1.1, Drain: 0.25},
			Dimensions: []remedies.Dimension{
				{From: a, To: b, Label: "1V:3.2H", Batter: true},
				{From: lem.Point{X: 38, Y: 53.3}, To: lem.Point{X: 38, Y: 50.8}, Label: "drain depth 3.00 m"},
			},
		},
		Situations: []remedies.Outcome{
			circleOutcome("winter water", 0, 1.25, 1.212, lem.Point{X: 45, Y: 72}, 24.3, sec.Ground, w[0], 24, 50),
			circleOutcome("summer water", 1, 1.35, 1.41, lem.Point{X: 45, Y: 72}, 24.3, sec.Ground, w[1], 24, 50),
		},
	}
	d.opt.Situations[0].Check.Note = "midspan between drains"
	return d
}

// embankment faces left, stands in a flood and is unloaded.
func embankment() drawn {
	ground := lem.Profile{{X: 0, Y: 7.9}, {X: 9, Y: 7.4}, {X: 12, Y: 6.1}, {X: 15, Y: 6.1}, {X: 18, Y: 8}, {X: 26, Y: 8.1}, {X: 40, Y: 15}, {X: 62, Y: 15}}
	g2 := ground[:7:7]
	g2 = append(g2[:6:6], lem.Point{X: 36.35, Y: 13.2}, lem.Point{X: 41, Y: 13.2}, lem.Point{X: 44.6, Y: 15}, lem.Point{X: 62, Y: 15})
	j := &remedies.Job{
		Title: "Mill Leat embankment, invented", Length: 45,
		Section: lem.Section{
			Ground: ground,
			Soils:  []lem.Soil{soil("clay fill", 18.5, 2, 25, 0), soil("crust", 17.5, 3, 26, 30), soil("soft alluvium", 16.5, 1, 24, 22), soil("river gravel", 20, 0, 37, 0)},
			Strata: []lem.Stratum{
				{Soil: 0, Top: ground},
				{Soil: 1, Top: lem.Profile{{X: 0, Y: 7.9}, {X: 9, Y: 7.4}, {X: 12, Y: 6.1}, {X: 15, Y: 6.1}, {X: 18, Y: 8}, {X: 26, Y: 8.1}, {X: 62, Y: 8.3}}},
				{Soil: 2, Top: lem.Profile{{X: 0, Y: 6.8}, {X: 62, Y: 7}}},
				{Soil: 3, Top: lem.Profile{{X: 0, Y: 3.8}, {X: 62, Y: 4}}},
			},
			Loads: []lem.Surcharge{
				{Name: "traffic", FromX: 45, ToX: 60, Pressure: 10, Variable: true}, {Name: "barrier", FromX: 44.6, ToX: 46, Pressure: 4},
			},
		},
		Crest: lem.Point{X: 40, Y: 15}, Toe: lem.Point{X: 26, Y: 8.1},
		Waters: []remedies.WaterLine{
			{Name: "normal", Line: lem.Profile{{X: 0, Y: 7}, {X: 15, Y: 7}, {X: 26, Y: 7.8}, {X: 33, Y: 9}, {X: 62, Y: 10.6}}},
			{Name: "flood", Line: lem.Profile{{X: 0, Y: 8.9}, {X: 27.6, Y: 8.9}, {X: 33, Y: 9.9}, {X: 62, Y: 11.6}}},
		},
		Situations: []remedies.Situation{
			{Name: "normal river", Water: 0, Free: []lem.FreeWater{{Level: 7, FromX: 9, ToX: 17}}, RequiredFS: 1.3},
			{Name: "flood", Water: 1, Free: []lem.FreeWater{{Level: 8.9, FromX: 0, ToX: 28}}, RequiredFS: 1.2},
		},
		Limits: remedies.Limits{
			Left:      &remedies.Fence{Name: "left limit", X: 18},
			KeepClear: []remedies.KeepClear{{Name: "brook", FromX: 9, ToX: 18, NoDig: true, NoLoad: true}, {Name: "overhead line", FromX: 47, ToX: 52, NoLoad: true}},
			MaxLevels: []remedies.MaxLevel{{Name: "overhead line", FromX: 30, ToX: 52, Level: 17.5}},
		},
		Head: lem.Range{From: 34, To: 60}, Exit: lem.Range{From: 18, To: 36},
	}
	d := drawn{job: j}
	sec := j.Section
	sec.Ground = g2
	w := []lem.Water{d.water(0), d.water(1)}
	w[0].Free, w[1].Free = j.Situations[0].Free, j.Situations[1].Free
	d.opt = &remedies.Option{
		Name: "unload", Title: "unloading of the head", Status: remedies.Fails, Reason: "FS 1.148 in flood where 1.200 is required",
		Parameters: []remedies.Value{{Name: "depth", Unit: "m", Value: 1.8}, {Name: "width", Unit: "m", Value: 4.65}, {Name: "batter", Unit: "1V:nH", Value: 2}},
		Proposal: &remedies.Proposal{
			Section: sec, Waters: w, Quantities: remedies.Quantities{Cut: []float64{11.4, 0, 0, 0}, Fill: make([]float64, 4)},
			Dimensions: []remedies.Dimension{
				{From: g2[6], To: g2[7], Label: "width 4.65 m"},
				{From: lem.Point{X: 41, Y: 15}, To: g2[7], Label: "depth 1.80 m"},
				{From: g2[7], To: g2[8], Label: "1V:2.0H", Batter: true},
			},
		},
		Situations: []remedies.Outcome{
			circleOutcome("normal river", 0, 1.3, 1.3201, lem.Point{X: 27.5, Y: 24}, 17.9, g2, w[0], 20, 44),
			circleOutcome("flood", 1, 1.2, 1.1489, lem.Point{X: 27.5, Y: 24}, 17.9, g2, w[1], 20, 43.5),
		},
	}
	d.opt.Situations[1].Method = lem.Spencer
	return d
}

// flat is a long flat section with low works in its middle.
func flat() drawn {
	ground := lem.Profile{{X: 0, Y: 24}, {X: 300, Y: 23}, {X: 318, Y: 17}, {X: 620, Y: 15}}
	j := cutting()
	j.Title = "Long Fen section, invented"
	j.Section.Ground = ground
	j.Section.Strata = []lem.Stratum{
		{Soil: 0, Top: ground},
		{Soil: 1, Top: lem.Profile{{X: 0, Y: 20}, {X: 300, Y: 19}, {X: 620, Y: 10}}},
		{Soil: 2, Top: lem.Profile{{X: 0, Y: -12}, {X: 620, Y: -20}}},
	}
	j.Section.Loads = []lem.Surcharge{{Name: "stockpile", FromX: 40, ToX: 296, Pressure: 12}}
	j.Crest, j.Toe = ground[1], ground[2]
	j.Waters = []remedies.WaterLine{{Name: "winter", Line: lem.Profile{{X: 0, Y: 22}, {X: 300, Y: 20}, {X: 318, Y: 16.8}, {X: 620, Y: 14}}}}
	j.Situations = j.Situations[:1]
	j.Stage = remedies.StageSettings{Given: true, Water: -1, RequiredFS: 1.1}
	j.Limits = remedies.Limits{Right: &remedies.Fence{Name: "right limit", X: 330}}
	d := drawn{job: j}
	foot := lem.Point{X: 325, Y: 17 - 2*7.0/302}
	sec := j.Section
	in, out := lem.Point{X: 312, Y: 19}, lem.Point{X: 321, Y: 19}
	sec.Ground = lem.Profile{ground[0], ground[1], in, out, foot, ground[3]}
	sec.Placed = []lem.Body{{Soil: 3, Outline: []lem.Point{in, out, foot, ground[2]}}}
	d.opt = &remedies.Option{
		Name: "berm", Title: "toe berm", Status: remedies.MeetsTarget,
		Proposal: &remedies.Proposal{
			Section: sec, Waters: []lem.Water{d.water(0)}, Quantities: remedies.Quantities{Cut: make([]float64, 4), Fill: []float64{0, 0, 0, 14}},
			Dimensions: []remedies.Dimension{{From: in, To: out, Label: "top width 9.00 m"}, {From: lem.Point{X: 321, Y: 17}, To: out, Label: "height 2.00 m"}},
		},
		Situations: []remedies.Outcome{circleOutcome("winter water", 0, 1.25, 1.27, lem.Point{X: 312, Y: 33}, 18.9, sec.Ground, d.water(0), 297, 322)},
	}
	return d
}

// steep is a high steep face with a polyline slip.
func steep() drawn {
	ground := lem.Profile{{X: 0, Y: 140}, {X: 20, Y: 140}, {X: 20, Y: 132}, {X: 32, Y: 100}, {X: 48, Y: 99}}
	j := cutting()
	j.Title = "Quarry face, invented"
	j.Section.Ground = ground
	j.Section.Strata = []lem.Stratum{
		{Soil: 0, Top: ground}, {Soil: 1, Top: lem.Profile{{X: 0, Y: 131}, {X: 48, Y: 127}}}, {Soil: 2, Top: lem.Profile{{X: 0, Y: 108}, {X: 48, Y: 96}}},
	}
	j.Section.Loads = []lem.Surcharge{{Name: "crane", FromX: 14, ToX: 18, Pressure: 60}}
	j.Crest, j.Toe = ground[1], ground[3]
	j.Waters[0].Line = lem.Profile{{X: 0, Y: 122}, {X: 20, Y: 114}, {X: 32, Y: 100}, {X: 48, Y: 98.5}}
	j.Waters[1].Line = lem.Profile{{X: 0, Y: 112}, {X: 20, Y: 106}, {X: 32, Y: 99}, {X: 48, Y: 98}}
	j.Limits = remedies.Limits{Left: &remedies.Fence{Name: "works yard", X: 4}}
	d := drawn{job: j}
	d.opt = &remedies.Option{
		Name: "existing", Status: remedies.Existing, Proposal: &remedies.Proposal{Section: j.Section},
		Situations: []remedies.Outcome{{
			Check: remedies.Check{Name: "winter water", Required: 1.25, Situation: lem.Situation{Water: d.water(0)}},
			FS:    0.9649, Method: lem.MorgensternPrice, Resolved: true,
			Slip: lem.Slip{Kind: lem.Polyline, Nodes: []lem.Point{{X: 11, Y: 140}, {X: 15, Y: 126}, {X: 24, Y: 106}, {X: 32, Y: 100}}},
			From: lem.Point{X: 11, Y: 140}, To: lem.Point{X: 32, Y: 100},
		}},
	}
	return d
}

// crowded has long names and many strata, waters, loads and limits.
func crowded() drawn {
	d := cuttingWithBerm()
	j := d.job
	j.Title = "A cutting with a very long title that describes the site, the chainage, the client, the date of survey and several other things besides, invented"
	names := []string{
		"made ground of brick, ash and clay", "reworked glacial clay with sand lenses", "laminated silty clay", "peat", "sand", "firm to stiff fissured grey-brown clay",
		"an exceptionally long soil name that nobody should use but somebody will, with a Łódź and a φ′ in it", "gravel", "weathered siltstone", "mudstone",
	}
	j.Section.Soils, j.Section.Strata = nil, nil
	for i, n := range names {
		s := soil(n, 17+float64(i)/3, float64(i), 20+float64(i), 20+4*float64(i))
		s.HasRu, s.Ru = i == 2, 0.2
		j.Section.Soils = append(j.Section.Soils, s)
		down := float64(i) * 0.9
		top := make(lem.Profile, 0, 4)
		for _, q := range j.Section.Ground {
			top = append(top, lem.Point{X: q.X, Y: q.Y - down - math.Max(0, (q.X-30)*0.02*float64(i%3))})
		}
		j.Section.Strata = append(j.Section.Strata, lem.Stratum{Soil: i, Top: top})
	}
	j.Section.Loads = nil
	for i := range 6 {
		x := float64(i) * 3.5
		j.Section.Loads = append(j.Section.Loads, lem.Surcharge{Name: fmt.Sprintf("temporary store number %d", i+1), FromX: x, ToX: x + 5, Pressure: 5 + float64(i), Variable: i%2 == 0})
	}
	for i := range 5 {
		l := make(lem.Profile, 0, 5)
		for _, q := range j.Waters[0].Line {
			l = append(l, lem.Point{X: q.X, Y: q.Y - 0.7*float64(i+1)})
		}
		j.Waters = append(j.Waters, remedies.WaterLine{Name: fmt.Sprintf("piezometric line measured in month %d", i+3), Line: l})
		j.Situations = append(j.Situations, remedies.Situation{Name: fmt.Sprintf("month %d with drains clogged and traffic on the road", i+3), Water: len(j.Waters) - 1, RequiredFS: 1.2})
	}
	for i := range 4 {
		j.Limits.KeepClear = append(j.Limits.KeepClear, remedies.KeepClear{Name: fmt.Sprintf("fibre cable %d of the regional network operator", i+1), FromX: 56 + 3*float64(i), ToX: 58 + 3*float64(i), NoDig: true})
	}
	sec := d.opt.Proposal.Section
	j.Section.Soils = append(j.Section.Soils, soil("granular fill", 20, 0, 36, 0))
	sec.Soils = j.Section.Soils
	sec.Strata, sec.Loads = j.Section.Strata, j.Section.Loads
	sec.Placed = []lem.Body{{Soil: len(sec.Soils) - 1, Outline: sec.Placed[0].Outline}}
	d.opt.Proposal.Section = sec
	for i := 2; i < len(j.Waters); i++ {
		d.opt.Proposal.Waters = append(d.opt.Proposal.Waters, d.water(i))
		o := d.opt.Situations[0]
		o.Check.Name, o.FS, o.Check.SituationI = j.Situations[i].Name, 1.3+float64(i)/100, i
		d.opt.Situations = append(d.opt.Situations, o)
	}
	for i := range 8 {
		o := d.opt.Stages[0]
		o.Check.Name = fmt.Sprintf("stage of construction number %d", i+1)
		d.opt.Stages = append(d.opt.Stages, o)
	}
	return d
}

// asRead drops the option.
func asRead(d drawn) drawn { return drawn{job: d.job} }

// cases are all sections that the tests draw, by name.
func cases() map[string]drawn {
	return map[string]drawn{
		"cutting-existing": existingCutting(), "cutting-read": asRead(existingCutting()), "cutting-berm": cuttingWithBerm(),
		"cutting-berm-left": mirrored(cuttingWithBerm()), "regrade-drains": regradeWithDrains(), "embankment": embankment(),
		"embankment-read": asRead(embankment()), "flat": flat(), "flat-read": asRead(flat()), "steep": steep(), "crowded": crowded(),
		"crowded-read": asRead(crowded()),
	}
}
