package casefile

// Greatest counts of what a case file may hold. They are far above any real case and keep every later step quick.
const (
	maxPoints     = 2000
	maxSoils      = 100
	maxStrata     = 100
	maxBodies     = 100
	maxWaters     = 50
	maxSituations = 50
	maxSurcharges = 100
	maxZones      = 100
	maxTrials     = 50
)

// Words with a meaning of their own in place of a name or line.
const (
	wordGround    = "ground"
	wordNone      = "none"
	wordDrained   = "drained"
	wordUndrained = "undrained"
)

func coordinate(key string) field { return field{key: key, shape: number("m", anyNumber())} }

func pointShape() *shape { return tuple(coordinate("x"), coordinate("y")) }

func lineShape() *shape { return list(pointShape(), 2, maxPoints) }

func spanShape() *shape { return tuple(coordinate("from x"), coordinate("to x")) }

func levelNumber() *shape { return number("m", anyNumber()) }

// fromTo returns the two keys that say where along x something is.
func fromTo(of string) []field {
	return []field{
		{key: "from", shape: levelNumber(), required: true, meaning: "Left end x of " + of + ".", example: "20"},
		{key: "to", shape: levelNumber(), required: true, meaning: "Right end x of " + of + ".", example: "29"},
	}
}

// caseShape returns the table of every key of the case file.
func caseShape() *shape {
	return object(
		field{key: "title", shape: text("one line of text"), required: true, meaning: "Name of the site, for every output.", example: "Hollin Bank cutting"},
		field{key: "length", shape: number("m", above(0)), required: true, meaning: "Run of the works along the slope.", example: "80"},
		field{key: "ground", shape: lineShape(), required: true, meaning: "Ground surface from left to right; two points of one x make a vertical step.", example: "[[0, 109.6], [30, 109], [52.5, 100], [75, 99.8]]"},
		field{key: "ground_before", shape: lineShape(), standard: "same as `ground`", meaning: "Ground before works, in the file of a proposed section: `ground` is then the ground after works, and remedies and trials are not allowed.", example: "[[0, 109.6], [30, 109], [52.5, 100], [75, 99.8]]"},
		field{key: "slope", shape: slopeShape(), standard: "deduced from the ground and printed", meaning: "The slope to be remedied, by two points on the ground before works.", example: "{crest: [30, 109], toe: [52.5, 100]}"},
		field{key: "ignore_slips_shallower_than", shape: number("m", atLeast(0)), standard: "0", meaning: "Depth of interest: slips nowhere deeper below the ground than this are left out, and the output says so.", example: "1.0"},
		field{key: "soils", shape: named(soilShape(), 1, maxSoils), required: true, meaning: "Soils and fill materials by name.", example: "{stiff clay: {unit_weight: 19.8, drained: {cohesion: 4, friction: 23}}}"},
		field{key: "strata", shape: list(stratumShape(), 1, maxStrata), required: true, meaning: "Strata from the surface down; where a lower top rises above an upper one, the upper stratum is absent.", example: "[{soil: stiff clay, top: ground}]"},
		field{key: "placed", shape: list(placedShape(), 0, maxBodies), standard: "none", meaning: "Placed or exchanged material, later over earlier, over the strata; clipped to the ground.", example: "[{soil: granular fill, outline: [[48, 100], [50, 102], [54, 102], [58, 100]]}]"},
		field{key: "water", shape: named(waterShape(), 0, maxWaters), standard: "none", meaning: "States of the pore water by name: a piezometric line, or a mapping. Pore pressure is 9.81 kN/m3 x vertical depth below the line; a line above ground is pressure only.", example: "{high: [[0, 107.6], [52.5, 100], [75, 99.3]]}"},
		field{key: "firm_base", shape: lineShape(), standard: "none", meaning: "Line below which no slip passes.", example: "[[0, 92], [75, 91.5]]"},
		field{key: "tension_crack", shape: crackShape(), standard: "none", meaning: "Vertical crack at the head of every slip: coming from its head, a slip ends where it first passes below the bottom of the crack, and slips that do not are left out.", example: "{depth: 2, filled: 50%}"},
		field{key: "surcharges", shape: list(surchargeShape(), 0, maxSurcharges), standard: "none", meaning: "Pressures on the ground.", example: "[{name: farm track, from: 20, to: 29, pressure: 5}]"},
		field{key: "line_loads", shape: list(lineLoadShape(), 0, maxSurcharges), standard: "none", meaning: "Permanent forces on the ground along lines at right angles to the section.", example: "[{name: wall, x: 24, vertical: 40}]"},
		field{key: "restraints", shape: list(restraintShape(), 0, maxSurcharges), standard: "none", meaning: "Rows of structural elements, such as piles, that hold slips back.", example: "[{name: sheet piles, x: 40, top: 104, bottom: 95, force: 48}]"},
		field{key: "situations", shape: list(situationShape(), 1, maxSituations), required: true, meaning: "Design situations; all bind at once.", example: "[{name: normal water, water: high, required_fs: 1.3}]"},
		field{key: "stages", shape: stagesShape(), standard: "stages are not checked, which the output says", meaning: "Settings of construction stages.", example: "{water: summer, required_fs: 1.1}"},
		field{key: "limits", shape: limitsShape(), standard: "no limits", meaning: "Limits of the works.", example: "{works_between: {left: 24, right: 58.5}}"},
		field{key: "on_site_fill", shape: list(onSiteShape(), 0, maxZones), standard: "none: all fill is brought, all cut is taken away", meaning: "Material of the site that may serve as fill.", example: "[{name: cut clay, cut_of: stiff clay, serves: [granular fill], share: 80%}]"},
		field{key: "economics", shape: economicsShape(), standard: "blank: no costs, carbon or lorry loads", meaning: "Rates and factors of your own; whatever is blank is never guessed.", example: "{lorry_load: 10, rates: {cut: 1, import: 3, dispose: 4}}"},
		sideForceField(),
		field{key: "slips", shape: slipsShape(), standard: "everywhere, both directions", meaning: "Which slips are looked at.", example: "{head: [5, 30], direction: rightward}"},
		field{key: "observed_slip", shape: observedShape(), standard: "none", meaning: "A slip that has happened: `standfast backanalyse` finds the strengths that it leaves open, and `standfast compare` sizes with them too.", example: "{line: [[28, 109], [36, 101], [46, 98.5], [54, 100]], situation: high water}"},
		field{key: "known_slips", shape: list(knownSlipShape(), 0, maxBodies), standard: "none", meaning: "Slip surfaces that exist already, with the residual strength on them: a slip that runs along one finds that strength and not the soil's, and every search looks at them.", example: "[{line: [[28, 109], [36, 101], [46, 98.5], [54, 100]], friction: 12}]"},
		field{key: "objective", shape: objectiveShape(), standard: "earthworks", meaning: "What a sizing makes least: cut and fill, or cost or carbon by the rates and factors under `economics`, none of which that it needs may be blank.", example: "cost"},
		field{key: "sensitivity", shape: sensitivityShape(), standard: "nothing is swung", meaning: "How far inputs may be off either way, credible bounds of your own: the factor of safety is searched anew with each at either end, before and after works.", example: "{cohesion: 20%, friction: 2, water: 0.5}"},
		field{key: "remedies", shape: remediesShape(), standard: "none: there is nothing to size", meaning: "Remedies to size. A number is fixed, `a to b by c` is sized, and what is left out has its default.", example: "{berm: {fill: granular fill, height: 0.5 to 3 by 0.1}}"},
		field{key: "combinations", shape: combinationsShape(), standard: "none", meaning: "Remedies of the case that are sized together, besides each alone (and besides every pair with `standfast compare --pairs`). More than two take minutes.", example: "[[berm, trench_drains]]"},
		field{key: "trials", shape: list(trialShape(), 0, maxTrials), standard: "none", meaning: "Works of your own that are only checked.", example: "[{name: first sketch, works: {berm: {fill: granular fill, height: 2, top_width: 5, batter: 2}}}]"},
	)
}

func slopeShape() *shape {
	return object(
		field{key: "crest", shape: pointShape(), required: true, meaning: "Top of the slope.", example: "[30, 109]"},
		field{key: "toe", shape: pointShape(), required: true, meaning: "Foot of the slope.", example: "[52.5, 100]"},
	)
}

func soilShape() *shape {
	weight := above(0).upTo(100).orElse("unit weights are in kN/m3: most soils have 15 to 22")
	return object(
		field{key: "unit_weight", shape: number("kN/m3", weight), required: true, meaning: "Bulk unit weight above the water line.", example: "19"},
		field{key: "saturated_unit_weight", shape: number("kN/m3", weight), standard: "same as `unit_weight`", meaning: "Unit weight below the water line.", example: "19.8"},
		field{key: "drained", shape: drainedShape(), standard: "this or `power_law` is required, unless every situation takes the undrained strength and there are no stages", meaning: "Effective strength.", example: "{cohesion: 3, friction: 23}"},
		field{key: "power_law", shape: powerLawShape(), standard: "`drained` holds", meaning: "Curved effective strength a x pa x (sigma'/pa)^b in place of `drained`, with pa = 101.325 kPa.", example: "{a: 0.9, b: 0.8}"},
		field{key: "undrained", shape: undrainedShape(), standard: "none", meaning: "Undrained strength, fixed from the ground before works.", example: "{strength: 35}"},
		field{key: "ru", shape: number("", within(0, 1)), standard: "pore pressure comes from the water line", meaning: "Pore pressure as a ratio to the weight of soil above, in place of any water line.", example: "0.25"},
		field{key: "free_draining", shape: boolean(), standard: "false", meaning: "Pore pressure only below the drain outfall or free water, where one is given.", example: "true"},
		field{key: "clay", shape: boolean(), standard: "true, or false if `free_draining`", meaning: "Drains slowly: fill on it is checked at the end of construction with its undrained strength.", example: "false"},
	)
}

func drainedShape() *shape {
	return object(
		field{key: "cohesion", shape: number("kPa", atLeast(0)), required: true, meaning: "Effective cohesion c'.", example: "3"},
		field{key: "friction", shape: number("degrees", atLeast(0).below(90)), required: true, meaning: "Effective angle of friction phi'.", example: "23"},
	)
}

func powerLawShape() *shape {
	return object(
		field{key: "a", shape: number("", above(0).upTo(10)), required: true, meaning: "Shear strength over effective normal stress at a normal stress of 101.325 kPa.", example: "0.9"},
		field{key: "b", shape: number("", above(0).upTo(1)), required: true, meaning: "Exponent: 1 is a straight envelope, less is curved.", example: "0.8"},
	)
}

func undrainedShape() *shape {
	return object(
		field{key: "strength", shape: number("kPa", atLeast(0)), standard: "this, `points` or `ratio` is required", meaning: "Undrained strength cu, at the line `below` if there is a gradient.", example: "35"},
		field{key: "gradient", shape: number("kPa/m", within(-1000, 1000)), standard: "0", meaning: "Increase of cu for every metre of depth below the line `below`.", example: "1.5"},
		field{key: "below", shape: either(text("`ground`, the soil of a stratum, or a list of points"), lineShape()), standard: "required with a gradient", meaning: "Line that depth is measured from: `ground` (before works), the soil of a stratum for its top, or points.", example: "ground"},
		field{key: "points", shape: list(tuple(coordinate("x"), coordinate("y"), field{key: "cu", shape: number("kPa", atLeast(0))}), 1, maxPoints), standard: "this, `strength` or `ratio` is required", meaning: "cu at points. Points of one x make a vertical: linear in level on it, and linear in x between verticals; held beyond their ends.", example: "[[23, 8, 28.5], [33, 8, 22.5]]"},
		field{key: "ratio", shape: number("", above(0).upTo(2)), standard: "this, `strength` or `points` is required", meaning: "cu as a ratio to the effective vertical stress before works: of the strata under the ground before works and `water_before`, without surcharge.", example: "0.25"},
		field{key: "minimum", shape: number("kPa", atLeast(0)), standard: "0", meaning: "Least cu of a strength by `ratio`, such as in a crust; it is the strength of fill of this soil.", example: "8"},
		field{key: "water_before", shape: either(text("the name of a water line, `none`, or a list of points"), lineShape()), standard: "required with a ratio", meaning: "Water before works that the stress is of: the line of a name under `water`, `none`, or points.", example: "normal"},
	).exactlyOne("strength", "points", "ratio")
}

func stratumShape() *shape {
	return object(
		field{key: "soil", shape: text("the name of a soil"), required: true, meaning: "Name of a soil.", example: "stiff clay"},
		field{key: "top", shape: either(word(wordGround), lineShape()), required: true, meaning: "Top of the stratum from left to right; `ground` for the first stratum.", example: "[[0, 106.1], [75, 97.3]]"},
	)
}

func placedShape() *shape {
	return object(
		field{key: "soil", shape: text("the name of a soil"), required: true, meaning: "Name of a soil.", example: "granular fill"},
		field{key: "outline", shape: list(pointShape(), 3, maxPoints), required: true, meaning: "Corners in order, in either direction.", example: "[[48, 100], [50, 102], [54, 102], [58, 100]]"},
	)
}

func waterShape() *shape {
	return either(lineShape(), object(
		field{key: "line", shape: lineShape(), standard: "dry, but for `by_soil` and `points`", meaning: "Points of the line.", example: "[[0, 107.6], [75, 99.3]]"},
		artesianField(),
		field{key: "by_soil", shape: named(either(lineShape(), object(
			field{key: "line", shape: lineShape(), required: true, meaning: "Points of the line.", example: "[[0, 104], [75, 102]]"},
			artesianField(),
		)), 1, maxSoils), standard: "none", meaning: "Lines that hold in one soil in place of `line`, by the name of the soil: perched or artesian water. Drains do not lower them.", example: "{gravel: {line: [[0, 104], [75, 102]], artesian: true}}"},
		field{key: "points", shape: list(tuple(coordinate("x"), coordinate("y"), field{key: "u", shape: number("kPa", atLeast(0))}), 1, maxPoints), standard: "none", meaning: "Known pore pressures, in place of all lines in every soil but those with `ru` and free-draining ones with a known level. Points of one x make a vertical: linear in level on it, linear in x between verticals, held beyond their ends; give 0 at the water table. Neither drains nor cuts change them.", example: "[[20, 105, 0], [20, 95, 80]]"},
		field{key: "inclined", shape: boolean(), standard: "false", meaning: "Pore pressure below every line is 9.81 kN/m3 x depth x cos^2 of the inclination of the line: seepage parallel to it.", example: "true"},
	))
}

func artesianField() field {
	return field{key: "artesian", shape: boolean(), standard: "false", meaning: "Keeps its head where works cut below it; any other line is clipped to the new ground.", example: "true"}
}

func crackShape() *shape {
	return object(
		field{key: "depth", shape: number("m", above(0).upTo(100)), standard: "this or `line` is required", meaning: "Depth below the ground, everywhere.", example: "2"},
		field{key: "line", shape: lineShape(), standard: "this or `depth` is required", meaning: "Bottom of the crack; beyond its ends and where it lies above the ground there is no crack.", example: "[[0, 107], [30, 106.5]]"},
		field{key: "filled", shape: share(), standard: "0%: dry", meaning: "Depth of water over the depth of the crack.", example: "50%"},
		field{key: "water_level", shape: levelNumber(), standard: "`filled` holds", meaning: "Level of the water in the crack, in place of `filled`.", example: "108"},
	).exactlyOne("depth", "line")
}

func lineLoadShape() *shape {
	return object(
		field{key: "name", shape: text("a name"), required: true, meaning: "Name for the outputs.", example: "retaining wall"},
		field{key: "x", shape: levelNumber(), required: true, meaning: "Where it acts.", example: "24"},
		field{key: "vertical", shape: number("kN/m", anyNumber()), standard: "0", meaning: "Vertical force, downwards.", example: "40"},
		field{key: "horizontal", shape: number("kN/m", anyNumber()), standard: "0", meaning: "Horizontal force, to the right.", example: "10"},
	)
}

func surchargeShape() *shape {
	return object(append(append([]field{
		{key: "name", shape: text("a name"), required: true, meaning: "Name for the outputs.", example: "farm track"},
	}, fromTo("the loaded strip")...),
		field{key: "pressure", shape: number("kPa", atLeast(0)), required: true, meaning: "Vertical pressure, downwards; at `from` if there is a `pressure_to`.", example: "5"},
		field{key: "pressure_to", shape: number("kPa", atLeast(0)), standard: "same as `pressure`", meaning: "Vertical pressure at `to`; straight between.", example: "20"},
		field{key: "horizontal", shape: number("kPa", anyNumber()), standard: "0", meaning: "Horizontal pressure, to the right, over the whole strip.", example: "2"},
		field{key: "variable", shape: boolean(), standard: "false", meaning: "Comes and goes: left out on slips whose FS it would raise, and takes no earthquake force.", example: "true"},
	)...)
}

func situationShape() *shape {
	fs := above(0).upTo(10)
	return object(
		field{key: "name", shape: text("a name"), required: true, meaning: "Name for the outputs.", example: "high water"},
		field{key: "water", shape: text("the name of a water line, or `none`"), required: true, meaning: "Name of a water line, or `none`.", example: "high"},
		field{key: "strength", shape: either(word(wordDrained, wordUndrained), named(word(wordDrained, wordUndrained), 1, maxSoils)), standard: "drained", meaning: "`drained`; `undrained`: cu for every soil that is clay, the others drained; or one of the two by soil, the others drained.", example: "{soft alluvium: undrained}"},
		field{key: "kh", shape: number("", within(0, 1)), standard: "0", meaning: "Horizontal pseudo-static coefficient, outward.", example: "0.08"},
		field{key: "kv", shape: number("", within(-0.5, 0.5)), standard: "0", meaning: "Vertical pseudo-static coefficient, positive downwards, on ground and permanent loads.", example: "-0.04"},
		field{key: "required_fs", shape: number("", fs), standard: "this or `required_ratio` is required", meaning: "Required factor of safety.", example: "1.3"},
		field{key: "required_ratio", shape: number("", fs), standard: "this or `required_fs` is required", meaning: "Required factor of safety as a ratio to that of the slope as it is in this situation.", example: "1.25"},
		field{key: "free_water", shape: list(freeWaterShape(), 0, maxZones), standard: "none", meaning: "Water standing on the ground; it alone loads the face.", example: "[{level: 101, from: 52, to: 75}]"},
		field{key: "drains_working", shape: share(), standard: "100%", meaning: "Share of the drains' effect that counts.", example: "50%"},
		field{key: "drains", shape: drainsShape(), standard: "none", meaning: "Lowering by the drains of a proposed section, which names `ground_before`.", example: "{invert: [[30, 104], [50, 97]], ratio: [0.7, 0.7], fade: 2}"},
	).exactlyOne("required_fs", "required_ratio")
}

func freeWaterShape() *shape {
	return object(append([]field{
		{key: "level", shape: levelNumber(), required: true, meaning: "Level of the water.", example: "101"},
	}, fromTo("the water")...)...)
}

func drainsShape() *shape {
	return object(
		field{key: "invert", shape: lineShape(), required: true, meaning: "Line of the drains' invert.", example: "[[30, 104], [50, 97]]"},
		field{key: "ratio", shape: list(number("", within(0, 1)), 2, maxPoints), required: true, meaning: "Share of the head above the invert that is lowered, at each point of the invert.", example: "[0.7, 0.7]"},
		field{key: "fade", shape: number("m", above(0)), required: true, meaning: "Depth below the invert in which the lowering dies out.", example: "2"},
	)
}

func stagesShape() *shape {
	return object(
		field{key: "water", shape: text("the name of a water line, or `none`"), required: true, meaning: "Name of the water line during works, or `none`.", example: "summer"},
		field{key: "required_fs", shape: number("", above(0).upTo(10)), required: true, meaning: "Required factor of safety in every stage.", example: "1.1"},
		field{key: "plant", shape: number("kPa", within(0, 200)), standard: "0", meaning: "Pressure of construction plant on the levels of the works, and on both sides of an open hole; 10 to 20 kPa is usual. It is left out where it would help.", example: "15"},
	)
}

func limitsShape() *shape {
	return object(append([]field{
		{key: "works_between", shape: worksBetweenShape(), standard: "no side limits", meaning: "Side limits of the works.", example: "{left: {x: 24, name: crest fence}, right: 58.5}"},
		{key: "keep_clear", shape: list(keepClearShape(), 0, maxZones), standard: "none", meaning: "Zones that no dig or no load may enter.", example: "[{name: cable, from: 58.5, to: 61.5, forbid: [dig]}]"},
		{key: "maximum_levels", shape: list(maximumLevelShape(), 0, maxZones), standard: "none", meaning: "Greatest levels of the ground after works.", example: "[{name: overhead line, from: 33, to: 45, level: 14}]"},
		{key: "drain_outfall", shape: levelNumber(), standard: "none given", meaning: "Lowest level at which a drain can discharge.", example: "99.4"},
	}, formLimits()...)...)
}

func worksBetweenShape() *shape {
	fence := either(levelNumber(), object(
		field{key: "x", shape: levelNumber(), required: true, meaning: "Where the limit is.", example: "24"},
		field{key: "name", shape: text("a name"), standard: "left limit, right limit", meaning: "Name for the outputs.", example: "crest fence"},
	))
	return object(
		field{key: "left", shape: fence, standard: "no limit", meaning: "Left limit: x, or x with a name.", example: "24"},
		field{key: "right", shape: fence, standard: "no limit", meaning: "Right limit: x, or x with a name.", example: "58.5"},
	)
}

func keepClearShape() *shape {
	return object(append(append([]field{
		{key: "name", shape: text("a name"), required: true, meaning: "Name for the outputs.", example: "cable"},
	}, fromTo("the zone")...),
		field{key: "forbid", shape: list(word("dig", "load"), 1, 2), required: true, meaning: "What may not enter: `dig`, `load` or both.", example: "[dig, load]"},
		field{key: "dig_allowed_to_depth", shape: number("m", atLeast(0)), standard: "no dig at all", meaning: "Depth below the ground before works down to which digging is still allowed.", example: "0.3"},
	)...)
}

func maximumLevelShape() *shape {
	return object(append(append([]field{
		{key: "name", shape: text("a name"), required: true, meaning: "Name for the outputs.", example: "overhead line"},
	}, fromTo("the zone")...),
		field{key: "level", shape: levelNumber(), required: true, meaning: "Greatest level of the ground after works.", example: "14"},
	)...)
}

func slipsShape() *shape {
	return object(
		field{key: "head", shape: spanShape(), standard: "everywhere", meaning: "Range of x in which a slip may leave the ground at its head.", example: "[5, 30]"},
		field{key: "toe", shape: spanShape(), standard: "everywhere", meaning: "Range of x in which a slip may leave the ground at its toe.", example: "[44, 70]"},
		field{key: "direction", shape: word("either", "leftward", "rightward"), standard: "either", meaning: "Movement that searches look at.", example: "rightward"},
	)
}
