package sheet

import (
	"testing"

	"standfast/cmd/internal/report"
)

// Strengths that no number alone tells are told in words, never as nothing.
func TestStrengthWords(t *testing.T) {
	ratio, least := 0.3, 25.0
	for _, c := range []struct{ name, got, want string }{
		{"drained", drainedWords(&report.Soil{Drained: report.Drained{Cohesion: 3, Friction: 23.5}}), "c′ 3 kPa, φ′ 23.5°"},
		{"power law", drainedWords(&report.Soil{PowerLaw: &report.PowerLaw{A: 0.85, B: 0.8, Atmospheric: 101.325}}), "τ = 0.85 pa (σ′/pa)^0.8, pa 101.325 kPa"},
		{"none", undrainedWords(nil), ""},
		{"uniform", undrainedWords(&report.Undrained{Strength: 35}), "cu 35 kPa"},
		{"rising", undrainedWords(&report.Undrained{Strength: 20, Gradient: 1.5}), "cu 20 kPa + 1.5 kPa/m"},
		{"points", undrainedWords(&report.Undrained{Points: [][3]float64{{0, 0, 30}}}), "cu by position"},
		{"ratio", undrainedWords(&report.Undrained{Ratio: &ratio, Minimum: &least}), "cu 0.3 σ′v before works, at least 25 kPa"},
		{"ratio alone", undrainedWords(&report.Undrained{Ratio: &ratio}), "cu 0.3 σ′v before works"},
	} {
		if c.got != c.want {
			t.Errorf("%s: %q, want %q", c.name, c.got, c.want)
		}
	}
}
