package casefile

import "standfast/remedies"

// onSiteShape returns the keys of one material of the site that may serve as fill.
func onSiteShape() *shape {
	return object(
		field{key: "name", shape: text("a name"), required: true, meaning: "Name for the outputs.", example: "cut clay"},
		field{key: "cut_of", shape: text("the name of a soil"), standard: "a stockpile", meaning: "Soil whose cut it is; its `shrinkage` must be given under `economics`, or none of it is used.", example: "stiff clay"},
		field{key: "serves", shape: list(text("the name of a soil"), 1, maxSoils), required: true, meaning: "Fill soils that it may be placed as.", example: "[granular fill]"},
		field{key: "share", shape: share(), standard: "100%", meaning: "Share of the cut that is fit for use.", example: "80%"},
		field{key: "volume", shape: number("m3", atLeast(0)), standard: "no limit", meaning: "Most that there is, compacted, for the whole length.", example: "1200"},
	)
}

// economicsShape returns the keys of the user's own rates and factors.
func economicsShape() *shape {
	return object(
		field{key: "currency", shape: text("a name"), standard: "none", meaning: "Unit of the rates, for the outputs.", example: "EUR"},
		field{key: "strip_depth", shape: number("m", above(0).upTo(5)), standard: "topsoil is measured by area alone", meaning: "Topsoil stripped under the works. With it the stripped ground is a construction stage, fill makes up for it, and topsoil is no fill.", example: "0.3"},
		field{key: "bench_step", shape: number("m", above(0).upTo(5)), standard: "benching is not measured", meaning: "Height of the steps cut into a face steeper than 1V:5H before it is filled.", example: "0.5"},
		field{key: "lorry_load", shape: number("m3", above(0).upTo(100)), standard: "lorry loads are not counted", meaning: "Loose volume of a lorry load.", example: "10"},
		field{key: "soils", shape: named(soilFactorsShape(), 1, maxSoils), standard: "loose volumes are not known, and no cut is used as fill", meaning: "Factors by soil.", example: "{stiff clay: {bulking: 1.3, shrinkage: 0.9}}"},
		field{key: "stone", shape: object(volumeFactors()...), standard: "not known", meaning: "Factors of the stone in trench drains.", example: "{bulking: 1.4, shrinkage: 1.2}"},
		field{key: "rates", shape: object(workFields("Rate")...), standard: "costs are not worked out", meaning: "Rates, in the currency per unit of work.", example: "{cut: 1, import: 3, dispose: 4}"},
		field{key: "carbon", shape: object(workFields("Carbon, kg CO2 equivalent,")...), standard: "carbon is not worked out", meaning: "Carbon factors, kg CO2 equivalent per unit of work.", example: "{cut: 2, import: 12, dispose: 8}"},
	)
}

func volumeFactors() []field {
	return []field{
		{key: "bulking", shape: number("", above(0).upTo(5)), standard: "not known", meaning: "Loose over bank volume.", example: "1.3"},
		{key: "shrinkage", shape: number("", above(0).upTo(5)), standard: "not known", meaning: "Compacted over bank volume.", example: "0.9"},
	}
}

func soilFactorsShape() *shape {
	return object(append(volumeFactors(),
		field{key: "import_rate", shape: number("1/m3", atLeast(0)), standard: "the rate of `import`", meaning: "Rate of this soil as imported fill, in the currency per compacted m3.", example: "5"},
		field{key: "import_carbon", shape: number("kg/m3", atLeast(0)), standard: "the carbon of `import`", meaning: "Carbon of this soil as imported fill, kg CO2 equivalent per compacted m3.", example: "15"},
	)...)
}

// workFields returns a key for each work that may have a rate.
func workFields(what string) []field {
	var out []field
	for _, w := range remedies.Works() {
		out = append(out, field{key: w.String(), shape: number("1/"+w.Unit(), atLeast(0)), standard: "blank", meaning: what + " of " + workMeaning(w) + ", per " + w.Unit() + ".", example: "2"})
	}
	return out
}

// workMeaning describes a work.
func workMeaning(w remedies.Work) string {
	return map[remedies.Work]string{
		remedies.Strip:        "stripping topsoil",
		remedies.Excavate:     "cut, bank volume",
		remedies.TrenchDig:    "digging trench drains, bank volume",
		remedies.Benching:     "cutting steps into a face and filling them again",
		remedies.Place:        "placing fill won on the site, compacted volume",
		remedies.Import:       "bringing and placing fill, compacted volume",
		remedies.Stone:        "stone in trench drains, compacted volume",
		remedies.Dispose:      "taking away what is not used again, bank volume",
		remedies.TrenchDrain:  "trench drain, but for dig and stone",
		remedies.DrilledDrain: "drilled drain",
		remedies.PipedDrain:   "toe drain or interceptor",
		remedies.Element:      "piles or nails",
	}[w]
}

// formLimits returns the limits on faces, widths and import.
func formLimits() []field {
	batter := number(batterUnit, above(0).upTo(20))
	return []field{
		{key: "overhead", shape: list(overheadShape(), 0, maxZones), standard: "none", meaning: "Lines and structures above the ground that works must stay clear of.", example: "[{name: power line, from: 33, to: 45, level: 116, clearance: 6}]"},
		{key: "steepest_batters", shape: object(
			field{key: "permanent", shape: batter, standard: "no limit", meaning: "Steepest face that stays, such as for mowing: n of 1V:nH; rockfill is not held to it.", example: "3"},
			field{key: "temporary", shape: batter, standard: "no limit", meaning: "Steepest face that stands open during construction: n of 1V:nH.", example: "1"},
		), standard: "no limits", meaning: "Steepest faces allowed.", example: "{permanent: 2.5, temporary: 0.5}"},
		{key: "minimum_bench_width", shape: number("m", above(0)), standard: "no limit", meaning: "Least width of a bench.", example: "3"},
		{key: "minimum_haul_width", shape: number("m", above(0)), standard: "no limit", meaning: "Least width of a berm, buttress or platform, which plant travels on.", example: "4"},
		{key: "maximum_import", shape: number("m3", atLeast(0)), standard: "no limit", meaning: "Most fill and stone brought to the site, compacted, for the whole length.", example: "500"},
	}
}

func overheadShape() *shape {
	return object(append(append([]field{
		{key: "name", shape: text("a name"), required: true, meaning: "Name for the outputs.", example: "power line"},
	}, fromTo("it")...),
		field{key: "level", shape: levelNumber(), required: true, meaning: "Level of its lowest part.", example: "116"},
		field{key: "clearance", shape: number("m", atLeast(0)), required: true, meaning: "Clearance between it and the ground after works.", example: "6"},
	)...)
}
