package drawing

import (
	"math"
	"strings"

	"standfast/lem"
)

// soilWords names a soil with its parameters.
func (p *picture) soilWords(i int) string {
	c := &p.sec.Soils[i]
	words := []string{"γ " + number(c.UnitWeight, 1) + " kN/m³"}
	if c.SaturatedUnitWeight != 0 && c.SaturatedUnitWeight != c.UnitWeight {
		words[0] += " (" + number(c.SaturatedUnitWeight, 1) + " saturated)"
	}
	words = append(words, drainedWords(c)...)
	if c.Undrained != nil {
		words = append(words, undrainedWords(c.Undrained))
	}
	if c.HasRu {
		words = append(words, "ru "+number(c.Ru, 2))
	}
	if c.FreeDraining {
		words = append(words, "free-draining")
	}
	const unbroken = 16 // Letters of the longest part that is not broken between lines.
	for i, w := range words {
		if len(w) <= unbroken {
			words[i] = strings.ReplaceAll(w, " ", string(noBreak))
		}
	}
	return c.Name + ": " + strings.Join(words, ", ")
}

func drainedWords(c *lem.Soil) []string {
	if l := c.PowerLaw; l != nil {
		return []string{"τ = " + number(l.A, 0) + " pa (σ′/pa)^" + number(l.B, 0), "pa " + number(lem.AtmosphericPressure, 0) + " kPa"}
	}
	return []string{"c′ " + number(c.Cohesion, 0) + " kPa", "φ′ " + number(c.Friction*180/math.Pi, 0) + "°"}
}

func undrainedWords(u *lem.UndrainedStrength) string {
	switch {
	case len(u.Points) > 0:
		return "cu at points"
	case u.Ratio != 0 && u.Minimum > 0:
		return "cu " + number(u.Ratio, 0) + " σ′v before works, at least " + number(u.Minimum, 0) + " kPa"
	case u.Ratio != 0:
		return "cu " + number(u.Ratio, 0) + " σ′v before works"
	case u.Gradient != 0:
		return "cu " + number(u.Strength, 0) + " + " + number(u.Gradient, 1) + " kPa/m"
	}
	return "cu " + number(u.Strength, 0) + " kPa"
}
