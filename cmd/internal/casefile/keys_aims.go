package casefile

import "standfast/remedies"

// maxCombinations is the greatest number of combinations of a case: each is a sizing of its own, and takes minutes.
const maxCombinations = 20

// objectiveShape returns what a sizing may make least.
func objectiveShape() *shape { return word(remedies.Objectives()...) }

// combinationsShape returns lists of remedies that are sized together.
func combinationsShape() *shape {
	return list(list(text("the name of a remedy"), 2, len(remedies.Catalogue())), 0, maxCombinations)
}

// sensitivityShape returns the keys of how far inputs may be off.
func sensitivityShape() *shape {
	swung := func(key, of, example string) field {
		return field{key: key, shape: share(), standard: "not swung", meaning: "Share by which " + of + " may be off either way.", example: example}
	}
	return object(
		swung("cohesion", "every effective cohesion", "20%"),
		field{key: "friction", shape: number("degrees", above(0).upTo(20)), standard: "not swung", meaning: "By this every effective angle of friction may be off either way.", example: "2"},
		swung("undrained", "every undrained strength", "20%"),
		swung("unit_weight", "every unit weight", "5%"),
		field{key: "water", shape: number("m", above(0).upTo(20)), standard: "not swung", meaning: "By this every water line may lie higher or lower.", example: "0.5"},
		swung("drains", "the lowering by drains", "30%"),
	)
}

// knownSlipShape returns the keys of one slip surface that exists already.
func knownSlipShape() *shape {
	return object(
		field{key: "line", shape: lineShape(), required: true, meaning: "Points of the surface from left to right, no two above each other; it ends where they end.", example: "[[28, 109], [36, 101], [46, 98.5], [54, 100]]"},
		field{key: "cohesion", shape: number("kPa", atLeast(0)), standard: "0", meaning: "Residual cohesion on it.", example: "0"},
		field{key: "friction", shape: number("degrees", atLeast(0).below(90)), required: true, meaning: "Residual angle of friction on it.", example: "12"},
	)
}
