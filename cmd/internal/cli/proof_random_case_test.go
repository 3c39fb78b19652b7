package cli

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strconv"
	"strings"
)

// randomSite draws an invented case and writes it as a case file, as it is or reflected about x = 0. What is drawn does not depend on which of
// the two is written.
type randomSite struct {
	rng      *rand.Rand
	mirrored bool
	b        strings.Builder

	height, batter, crestX, toeX, width, crestY, toeY float64
	strata                                            []string // Soils of the strata from the surface down.
	cu                                                bool     // Every clay has an undrained strength.
	interest                                          float64  // Depth of interest, m.
	easy                                              bool     // Little is asked and few limits are set.
	level                                             bool     // The lower strata are level.
}

// randomCase returns the case file of a seed.
func randomCase(seed uint64, mirrored bool) string {
	s := &randomSite{rng: rand.New(rand.NewPCG(2026, seed)), mirrored: mirrored}
	fmt.Fprintf(&s.b, "title: invented random site %d\nlength: %s\n", seed, num(s.between(10, 80, 5)))
	s.easy, s.level = s.chance(0.5), s.chance(0.3)
	s.drawGround()
	s.drawSoils()
	s.drawStrata()
	s.drawWater()
	s.drawLoads()
	s.drawSituations()
	s.drawLimits()
	s.drawRemedies()
	return s.b.String()
}

// between draws a multiple of step from a to b.
func (s *randomSite) between(a, b, step float64) float64 {
	n := int(math.Floor((b-a)/step + 1e-9))
	return math.Round((a+float64(s.rng.IntN(n+1))*step)*1e4) / 1e4
}

func (s *randomSite) chance(p float64) bool { return s.rng.Float64() < p }

// num prints a number to the centimetre.
func num(v float64) string {
	if v = math.Round(v*100) / 100; v == 0 {
		v = 0 // No "-0".
	}
	return strconv.FormatFloat(v, 'f', -1, 64)
}

// x prints an x.
func (s *randomSite) x(v float64) string {
	if s.mirrored {
		v = -v
	}
	return num(v)
}

// point prints a point.
func (s *randomSite) point(x, y float64) string { return "[" + s.x(x) + ", " + num(y) + "]" }

// line prints points given as x and y in turn.
func (s *randomSite) line(xy ...float64) string {
	var points []string
	for i := 0; i < len(xy); i += 2 {
		at := i
		if s.mirrored {
			at = len(xy) - 2 - i
		}
		points = append(points, s.point(xy[at], xy[at+1]))
	}
	return "[" + strings.Join(points, ", ") + "]"
}

// span prints the ends of a range of x.
func (s *randomSite) span(from, to float64) string {
	if s.mirrored {
		from, to = to, from
	}
	return "from: " + s.x(from) + ", to: " + s.x(to)
}

func (s *randomSite) printf(format string, args ...any) { fmt.Fprintf(&s.b, format, args...) }

// drawGround draws a slope that descends to the right, with level ground or nearly so above and below it.
func (s *randomSite) drawGround() {
	s.height, s.batter = s.between(4, 12, 0.1), s.between(1.3, 3.4, 0.05)
	s.toeY = s.between(5, 60, 0.5)
	s.crestY = s.toeY + s.height
	s.crestX = math.Ceil(s.height*s.between(1.5, 2.3, 0.1)) + 4
	s.toeX = s.crestX + math.Round(s.height*s.batter*100)/100
	s.width = math.Ceil(s.toeX + s.height*s.between(1.4, 2.1, 0.1) + 5)
	ground := []float64{0, s.crestY + s.between(-0.3, 0.6, 0.1), s.crestX, s.crestY}
	bent := s.chance(0.3)
	if bent {
		share, off := s.between(0.3, 0.7, 0.05), s.between(-0.1, 0.1, 0.01)*s.height
		ground = append(ground, s.crestX+share*(s.toeX-s.crestX), s.crestY-share*s.height+off)
	}
	ground = append(ground, s.toeX, s.toeY, s.width, s.toeY+s.between(-0.5, 0.2, 0.1))
	s.printf("ground: %s\n", s.line(ground...))
	if s.chance(0.5) || bent {
		s.printf("slope: {crest: %s, toe: %s}\n", s.point(s.crestX, s.crestY), s.point(s.toeX, s.toeY))
	}
	s.interest = s.between(0, 1.5, 0.25)
	s.printf("ignore_slips_shallower_than: %s\n", num(s.interest))
}

// drawSoils draws as many soils as there are strata, and the fills.
func (s *randomSite) drawSoils() {
	s.cu = s.chance(0.85)
	s.printf("soils:\n")
	for i := range 1 + s.rng.IntN(3) {
		name := []string{"upper", "middle", "lower"}[i]
		gamma := s.between(17, 20.5, 0.1)
		more := s.between(0, 2, 0.2) // Stronger with depth.
		s.strata = append(s.strata, name)
		switch k := s.rng.Float64(); {
		case k < 0.6:
			s.printf("  %s: {unit_weight: %s, drained: {cohesion: %s, friction: %s}%s%s}\n", name, num(gamma),
				num(s.between(0.5, 8, 0.25)+float64(i)*more), num(s.between(20, 30, 0.5)+float64(i)*more), s.undrained(), s.ratio(i))
		case k < 0.88:
			s.printf("  %s: {unit_weight: %s, saturated_unit_weight: %s, drained: {cohesion: %s, friction: %s}, clay: false}\n", name, num(gamma), num(gamma+0.8),
				num(s.between(0, 1.5, 0.25)+float64(i)*more), num(s.between(29, 36, 0.5)))
		default:
			s.printf("  %s: {unit_weight: %s, power_law: {a: %s, b: %s}, clay: false}\n", name, num(gamma), num(s.between(0.6, 0.9, 0.02)), num(s.between(0.78, 0.95, 0.01)))
		}
	}
	s.printf("  granular fill: {unit_weight: 19.5, drained: {cohesion: 0, friction: %s}, clay: false}\n", num(s.between(33, 38, 0.5)))
	s.printf("  rockfill: {unit_weight: 20, drained: {cohesion: 0, friction: 41}, free_draining: true}\n")
	s.printf("  light fill: {unit_weight: %s, drained: {cohesion: 0, friction: 36}, free_draining: true}\n", num(s.between(3, 9, 0.5)))
}

// undrained draws an undrained strength that stands more or less by itself: cu is about gamma H/5.5 at F = 1 (Taylor 1937).
func (s *randomSite) undrained() string {
	cu := s.between(0.9, 2.5, 0.05) * 19 * s.height / 5.5
	gradient := s.between(0, 2, 0.25)
	switch {
	case !s.cu:
		return ""
	case gradient > 1:
		return fmt.Sprintf(", undrained: {strength: %s, gradient: %s, below: ground}", num(cu/2), num(gradient))
	}
	return fmt.Sprintf(", undrained: {strength: %s}", num(cu))
}

// ratio draws a pore pressure ratio; the lowest of several strata has none, since it may have a line of its own.
func (s *randomSite) ratio(stratum int) string {
	if ru := s.between(0.05, 0.3, 0.01); s.chance(0.15) && stratum == 0 {
		return fmt.Sprintf(", ru: %s", num(ru))
	}
	return ""
}

// drawStrata draws straight tops, which may come out on the face.
func (s *randomSite) drawStrata() {
	s.printf("strata:\n  - {soil: %s, top: ground}\n", s.strata[0])
	left, right := s.crestY, s.toeY
	for i, soil := range s.strata {
		if i == 0 {
			left -= s.between(0.3, 0.9, 0.05) * s.height
			right -= s.between(-0.1, 0.6, 0.05) * s.height
			if s.level {
				left = right
			}
			continue
		}
		s.printf("  - {soil: %s, top: %s}\n", soil, s.line(0, left, s.width, right))
		drop := s.between(1, 4, 0.5)
		left, right = left-drop, right-drop
	}
	if depth := s.between(0.5, 3, 0.5); s.chance(0.6) || s.cu { // Clay acts undrained down to something.
		s.printf("firm_base: %s\n", s.line(0, right-depth, s.width, right-depth))
	}
}

// drawWater draws a wet and a dry season's line; now and then the wet one is artesian, inclined, or has a line of its own in the lowest stratum.
func (s *randomSite) drawWater() {
	h := s.height
	back, toe, end := s.between(0.2, 0.7, 0.05)*h, s.between(0, 0.6, 0.1), s.between(0, 1, 0.1)
	lower := s.between(0.2, 1.5, 0.1)
	midX, midY := (s.crestX+s.toeX)/2, (s.crestY+s.toeY)/2-(back+toe)/2
	line := func(d float64) string {
		return s.line(0, s.crestY-back-d, s.crestX, s.crestY-back-0.05*h-d, midX, midY-d, s.toeX, s.toeY-toe-d, s.width, s.toeY-end-d)
	}
	wet := "  wet: " + line(0)
	lowest := s.strata[len(s.strata)-1]
	own := s.line(0, s.crestY-back+s.between(-0.5, 1, 0.1), s.width, s.toeY-end+s.between(0, 1, 0.1))
	switch k := s.rng.Float64(); {
	case k < 0.1:
		wet = fmt.Sprintf("  wet: {line: %s, artesian: true}", line(0))
	case k < 0.17:
		wet = fmt.Sprintf("  wet: {line: %s, inclined: true}", line(0))
	case k < 0.27 && len(s.strata) > 1:
		wet = fmt.Sprintf("  wet: {line: %s, by_soil: {%s: {line: %s, artesian: %t}}}", line(0), lowest, own, k < 0.22)
	case k < 0.30:
		var points []string
		for i := range 6 { // Verticals close together, since pressures are straight in x between them.
			x := s.crestX + float64(i)/5*(s.toeX-s.crestX)
			y := s.crestY - back + float64(i)/5*(s.toeY-toe-s.crestY+back)
			points = append(points, fmt.Sprintf("[%s, %s, 0], [%s, %s, %s]", s.x(x), num(y), s.x(x), num(y-h), num(8*h)))
		}
		wet = fmt.Sprintf("  wet: {points: [%s]}", strings.Join(points, ", "))
	}
	s.printf("water:\n%s\n  summer: %s\n", wet, line(lower))
}

// drawLoads draws a surcharge behind the crest, a line load and a tension crack, each now and then.
func (s *randomSite) drawLoads() {
	to := s.crestX - s.between(0, 4, 0.5)
	from, pressure, variable := to-s.between(2, 6, 0.5), s.between(2, 12, 1), s.chance(0.5)
	if s.chance(0.5) && s.interest > 0 { // F of slivers at the edge of a load has no least value.
		s.printf("surcharges: [{name: track, %s, pressure: %s, variable: %t}]\n", s.span(from, to), num(pressure), variable)
	}
	if at, force := s.crestX-s.between(1, 3, 0.5), s.between(5, 25, 5); s.chance(0.06) && s.interest > 0.5 { // F of slivers at the load has no least value.
		s.printf("line_loads: [{name: garden wall, x: %s, vertical: %s}]\n", s.x(at), num(force))
	}
	if depth := s.between(0.5, 1.5, 0.25); s.chance(0.06) {
		s.printf("tension_crack: {depth: %s}\n", num(depth))
	}
}
