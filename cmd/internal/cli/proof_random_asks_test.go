package cli

import (
	"fmt"
	"math"
	"strings"
)

// drawSituations draws one to three situations and, half of the time, stages. Most targets are ratios to the slope as it is, so that cases with
// and without an answer both come out.
func (s *randomSite) drawSituations() {
	hard := s.between(1.04, 1.3, 0.02)
	if s.easy {
		hard = s.between(1.02, 1.08, 0.01)
	}
	kinds := []string{"water: wet", "water: summer", "water: none", "water: summer, kh: 0.05", "water: wet, drains_working: 50%"}
	if s.cu {
		kinds = append(kinds, "water: wet, strength: undrained")
	}
	flood, free := s.between(0.3, 2, 0.1), s.chance(0.15)
	s.rng.Shuffle(len(kinds), func(i, k int) { kinds[i], kinds[k] = kinds[k], kinds[i] })
	s.printf("situations:\n")
	for i, kind := range kinds[:[]int{1, 1, 1, 1, 1, 1, 2, 3}[s.rng.IntN(8)]] {
		required := "required_ratio: " + num(max(1.01, hard-s.between(0, 0.06, 0.02)))
		if fs := s.between(1, 1.3, 0.05); s.chance(0.25) && !s.easy {
			required = "required_fs: " + num(fs)
		}
		if free && i == 0 {
			kind += fmt.Sprintf(", free_water: [{level: %s, %s}]", num(s.toeY+flood), s.span(s.toeX-s.batter*flood-1, s.width))
		}
		s.printf("  - {name: situation %d, %s, %s}\n", i+1, kind, required)
	}
	if fs, plant := s.between(0.5, 1, 0.05), s.between(0, 15, 5); s.chance(0.3) {
		s.printf("stages: {water: summer, required_fs: %s, plant: %s}\n", num(fs), num(plant))
	}
}

// drawLimits draws fences, a zone to keep clear, levels and batters.
func (s *randomSite) drawLimits() {
	var out []string
	behind, beyond := s.crestX-s.between(0.5, 8, 0.5), s.toeX+s.between(0.5, 9, 0.5)
	if s.chance(0.5) && !s.easy {
		left, right := behind, beyond
		names := [2]string{"crest fence", "toe fence"}
		if s.mirrored {
			left, right = beyond, behind
			names = [2]string{"toe fence", "crest fence"}
		}
		out = append(out, fmt.Sprintf("works_between: {left: {x: %s, name: %s}, right: {x: %s, name: %s}}", s.x(left), names[0], s.x(right), names[1]))
	}
	at, forbid := s.toeX+s.between(-3, 6, 0.5), []string{"dig", "load", "dig, load"}[s.rng.IntN(3)]
	if wide := s.between(0.5, 2, 0.5); s.chance(0.25) && !s.easy {
		out = append(out, fmt.Sprintf("keep_clear: [{name: cable, %s, forbid: [%s]}]", s.span(at, at+wide), forbid))
	}
	if level := s.toeY + s.between(1, 4, 0.5); s.chance(0.15) {
		out = append(out, fmt.Sprintf("maximum_levels: [{name: overhead line, %s, level: %s}]", s.span(s.toeX-4, s.width), num(level)))
	}
	if n := s.between(1.5, 3, 0.25); s.chance(0.15) {
		out = append(out, fmt.Sprintf("steepest_batters: {permanent: %s, temporary: 0.5}", num(n)))
	}
	if most := s.between(50, 1000, 50); s.chance(0.08) {
		out = append(out, fmt.Sprintf("maximum_import: %s", num(most)))
	}
	if level := s.toeY - s.between(0, 1.5, 0.25); s.chance(0.3) {
		out = append(out, "drain_outfall: "+num(level))
	}
	if len(out) > 0 {
		s.printf("limits:\n  %s\n", strings.Join(out, "\n  "))
	}
	if depth := s.between(0.1, 0.4, 0.1); s.chance(0.12) {
		s.printf("economics: {strip_depth: %s}\n", num(depth))
	}
}

// steps prints a range of n sizes.
func steps(from, step float64, n int) string {
	if n == 1 {
		return num(from)
	}
	return fmt.Sprintf("%s to %s by %s", num(from), num(from+step*float64(n-1)), num(step))
}

// drawRemedies draws one or two remedies on small lattices, now and then together or with works of the user's own.
func (s *randomSite) drawRemedies() {
	draw := []struct {
		name string
		keys func() string
	}{
		{"regrade", s.regrade},
		{"regrade", s.regrade},
		{"unload", s.unload},
		{"unload", s.unload},
		{"berm", s.berm},
		{"berm", s.berm},
		{"berm", s.berm},
		{"buttress", s.buttress},
		{"buttress", s.buttress},
		{"trench_drains", s.trenches},
		{"drilled_drains", s.drilled},
		{"shear_key", s.shearKey},
		{"lightweight_fill", s.lightweight},
		{"piles_or_nails", s.piles},
		{"water_lowering", s.lowering},
		{"toe_drain", s.toeDrain},
		{"interceptor", s.interceptor},
	}
	if !s.level { // These need a level base.
		draw = draw[:len(draw)-2]
	}
	s.printf("remedies:\n")
	first, second := draw[s.rng.IntN(len(draw))], draw[s.rng.IntN(len(draw))]
	s.printf("  %s: {%s}\n", first.name, first.keys())
	if keys := second.keys(); s.chance(0.25) && second.name != first.name {
		s.printf("  %s: {%s}\n", second.name, keys)
		if s.chance(0.1) && first.name == "berm" && (second.name == "unload" || second.name == "trench_drains") {
			s.printf("combinations: [[%s, %s]]\n", first.name, second.name)
		}
	}
	if works := s.between(0.5, 2, 0.5); s.chance(0.1) {
		s.printf("trials: [{name: sketch, works: {berm: {fill: granular fill, height: %s, top_width: 3, batter: 2}}}]\n", num(works))
	}
}

func (s *randomSite) regrade() string {
	out := fmt.Sprintf("batter: %s", steps(math.Ceil(s.batter*10)/10+0.2, s.between(0.2, 0.3, 0.1), 3+s.rng.IntN(4)))
	if pivots := 1 + s.rng.IntN(3); s.chance(0.3) {
		out += ", fill: granular fill, pivot: " + steps(0, 0.2, pivots)
	}
	if wide := s.between(1.5, 3, 0.5); s.chance(0.15) {
		out += ", benches: 1, bench_width: " + num(wide)
	}
	return out
}

func (s *randomSite) unload() string {
	return fmt.Sprintf("depth: %s, width: %s, back_batter: %s", steps(0.5, 0.5, 2+s.rng.IntN(4)), steps(1, 3, 1+s.rng.IntN(3)), num(s.between(1.5, 2.5, 0.5)))
}

func (s *randomSite) berm() string {
	return fmt.Sprintf("fill: granular fill, height: %s, top_width: %s, batter: %s",
		steps(0.5, s.between(0.4, 0.8, 0.1), 3+s.rng.IntN(4)), steps(s.between(1, 3, 0.5), 1.5, 1+s.rng.IntN(2)), num(s.between(1.5, 2.5, 0.25)))
}

func (s *randomSite) buttress() string {
	out := fmt.Sprintf("fill: rockfill, height: %s, top_width: %s, batter: 1.5", steps(1, 0.5, 2+s.rng.IntN(4)), steps(2, 1, 1+s.rng.IntN(2)))
	depth, panels := s.between(0.5, 2, 0.5), s.chance(0.5)
	if s.chance(0.3) {
		out += fmt.Sprintf(", key_depth: %s, key_width: 2", num(depth))
		if panels {
			out += ", key_panel: 4, key_spacing: 16"
		}
	}
	return out
}

func (s *randomSite) trenches() string {
	out := fmt.Sprintf("depth: %s, spacing: %s, width: 0.6", steps(1.5, 0.5, 2+s.rng.IntN(4)), steps(s.between(4, 8, 1), 2, 1+s.rng.IntN(2)))
	share := s.between(0.4, 0.8, 0.05)
	if len(s.strata) > 1 && s.chance(0.4) {
		return out + ", low_permeability: " + s.strata[1]
	}
	return out + ", effectiveness: " + num(share)
}

func (s *randomSite) drilled() string {
	return fmt.Sprintf("length: %s, spacing: %s, rise: %s, permeability: 1e-6, recharge: %se-9, depth_below: %s",
		steps(8, 3, 1+s.rng.IntN(3)), steps(4, 2, 1+s.rng.IntN(3)), num(s.between(2, 8, 1)), num(s.between(1, 9, 1)), num(s.between(0, 4, 1)))
}

func (s *randomSite) shearKey() string {
	out := fmt.Sprintf("fill: rockfill, depth: %s, width: %s, position: %s", steps(1.5, 0.5, 2+s.rng.IntN(5)), steps(2, 1, 1+s.rng.IntN(2)), num(s.between(-2, 4, 0.5)))
	if s.chance(0.5) {
		out += ", panel: 4, panel_spacing: 12"
	}
	return out
}

func (s *randomSite) lightweight() string {
	return fmt.Sprintf("fill: light fill, depth: %s, width: %s", steps(0.5, 0.5, 2+s.rng.IntN(5)), steps(2, 2, 1+s.rng.IntN(4)))
}

func (s *randomSite) toeDrain() string {
	return fmt.Sprintf("low_permeability: %s, depth: %s, permeability: 1e-5, recharge: %se-8", s.strata[len(s.strata)-1], steps(0.6, 0.2, 2+s.rng.IntN(6)), num(s.between(0, 4, 1)))
}

func (s *randomSite) interceptor() string {
	return fmt.Sprintf("low_permeability: %s, depth: %s, setback: %s, permeability: 1e-5, recharge: %se-8",
		s.strata[len(s.strata)-1], steps(1, 0.5, 2+s.rng.IntN(6)), num(s.between(1, 4, 0.5)), num(s.between(0, 4, 1)))
}

func (s *randomSite) piles() string {
	return fmt.Sprintf("capacity: %s, position: %s", steps(50, 50, 3+s.rng.IntN(6)), num(s.between(0, 5, 0.5)))
}

func (s *randomSite) lowering() string { return "lowering: " + steps(0.5, 0.5, 2+s.rng.IntN(7)) }
