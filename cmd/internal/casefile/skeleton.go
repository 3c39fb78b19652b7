package casefile

import (
	"encoding/json"
	"fmt"
	"regexp"
	"slices"
	"strings"

	"standfast/lem"
)

// NamedLine is a line of a survey under its name.
type NamedLine struct {
	Name string
	Line lem.Profile
}

// Sketch is what a survey knows of a case: lines, and no strengths.
type Sketch struct {
	Title  string
	Source string // Name of the file that it comes from.
	Ground lem.Profile
	Strata []NamedLine // Tops of the strata below the uppermost, from the surface down, each named after its soil.
	Waters []NamedLine // Piezometric lines.
}

// Limits of a sketch, which are those of a case file.
const (
	MaxLinePoints = maxPoints
	MaxStrata     = maxStrata - 1 // Besides the uppermost.
	MaxWaters     = maxWaters
	MaxCoordinate = numberLimit // m.
)

// surfaceSoil is the name of the uppermost soil, which a survey does not know.
const surfaceSoil = "surface soil"

// Skeleton returns a commented case file with the lines of a sketch. Everything else that a case must have stands in it as an empty key, so
// that [Parse] says line by line what is still to be filled in, and reads it once that is done.
func Skeleton(s *Sketch) []byte {
	var b strings.Builder
	say := func(format string, args ...any) { fmt.Fprintf(&b, format+"\n", args...) }
	say("# A case made from %s: the lines were taken over, everything else is yours to give.", oneLine(s.Source))
	say("# Fill in what is empty. `standfast draw` on this file lists what is missing, and draws the section when nothing is.")
	say("#")
	say("# Units: m, kN/m3, kPa, degrees. x runs to the right, y up. Every key stands in docs/case-file.md.")
	say("")
	say("title: %s", scalar(plainName(s.Title, "survey")))
	say("length:                           # run of the works along the slope, m")
	say("")
	say("ground:%s", lineText(s.Ground, 1))
	say("# Crest and toe are deduced from the ground and printed. Name them if another slope is meant:")
	say("# slope: {crest: [20, 56], toe: [32, 50]}")
	say("")
	say("# Slips nowhere deeper than this are left out, m.")
	say("ignore_slips_shallower_than: 1.0")
	soils := soilNames(s.Strata)
	say("")
	say("soils:")
	for i, name := range soils {
		if !slices.Contains(soils[:i], name) {
			writeSoil(say, name, i == 0)
		}
	}
	say("")
	say("# From the surface down. A lower top above an upper one means that the upper stratum is absent there.")
	say("strata:")
	say("  - soil: %s%s", scalar(soils[0]), strings.Repeat(" ", 4)+"# the uppermost: give it its own name here and under soils")
	say("    top: ground")
	for i, t := range s.Strata {
		say("  - soil: %s", scalar(soils[i+1]))
		say("    top:%s", lineText(t.Line, 3))
	}
	writeWaters(say, s.Waters)
	say("")
	say("# Construction stages: the water during works, and what every stage must reach.")
	say("# stages: {water: none, required_fs: 1.1}")
	say("")
	say("# What to size. Fill needs a soil of its own, such as a granular fill: then `berm: {fill: granular fill}`.")
	say("remedies:")
	say("  regrade:")
	say("  unload:")
	return []byte(b.String())
}

// writeSoil writes a soil with its strengths left empty; the first says what they are.
func writeSoil(say func(string, ...any), name string, first bool) {
	say("  %s:", scalar(name))
	if !first {
		say("    unit_weight:")
		say("    drained:")
		say("      cohesion:")
		say("      friction:")
		return
	}
	say("    unit_weight:                  # kN/m3")
	say("    drained:                      # effective strength")
	say("      cohesion:                   # c', kPa")
	say("      friction:                   # phi', degrees")
	say("    # undrained: {strength: 40}   # cu, kPa, of clay that fill is placed on")
}

// writeWaters writes the water lines and a situation for each; without any, a dry situation.
func writeWaters(say func(string, ...any), waters []NamedLine) {
	names := make([]string, len(waters))
	taken := map[string]bool{wordNone: true}
	for i, w := range waters {
		names[i] = free(plainName(w.Name, "water"), taken)
	}
	say("")
	if len(waters) > 0 {
		say("# Piezometric lines by name.")
		say("water:")
		for i, w := range waters {
			say("  %s:%s", scalar(names[i]), lineText(w.Line, 2))
		}
		say("")
	} else {
		say("# Piezometric lines by name: the survey has none.")
		say("# water: {high: [[0, 54.8], [55, 49.5]]}")
		say("")
		names = []string{wordNone}
	}
	say("# What the slope must stand. All of them bind at once.")
	say("situations:")
	titles := map[string]bool{}
	for _, name := range names {
		title := name + " water"
		if strings.Contains(strings.ToLower(name), "water") {
			title = name
		}
		if len(waters) == 0 {
			title = "dry"
		}
		say("  - name: %s", scalar(free(plainName(title, "situation"), titles)))
		say("    water: %s", scalar(name))
		say("    required_fs:")
	}
}

// soilNames returns the soil of each stratum, the uppermost first. Strata may share one.
func soilNames(strata []NamedLine) []string {
	out := []string{surfaceSoil}
	for i, t := range strata {
		name := plainName(t.Name, fmt.Sprintf("soil %d", i+2))
		if name == wordGround || name == surfaceSoil {
			name += " below"
		}
		out = append(out, name)
	}
	return out
}

// free returns the name, with a number where it is taken already, and takes it.
func free(name string, taken map[string]bool) string {
	out := name
	for n := 2; taken[out]; n++ {
		end := fmt.Sprintf(" %d", n)
		r := []rune(name)
		out = string(r[:min(len(r), maxName-len(end))]) + end
	}
	taken[out] = true
	return out
}

// plainName returns a text as a name that a case file may hold, or the other if nothing is left of it.
func plainName(s, otherwise string) string {
	const room = 10 // Characters left for what is put behind a name.
	r := []rune(oneLine(s))
	if s = strings.TrimSpace(string(r[:min(len(r), maxName-room)])); s == "" {
		return otherwise
	}
	return s
}

// oneLine replaces what breaks a line by blanks, and bytes that are no text.
func oneLine(s string) string {
	return strings.TrimSpace(strings.Map(func(c rune) rune {
		if breaksLine(c) || c == '\ufeff' {
			return ' '
		}
		return c
	}, strings.ToValidUTF8(s, "?")))
}

var (
	plainScalar    = regexp.MustCompile(`^[A-Za-z][A-Za-z0-9 _./()-]*$`)
	reservedScalar = regexp.MustCompile(`(?i)^(true|false|yes|no|on|off|null|y|n)$`)
)

// scalar returns a text as YAML: in quotes unless it needs none.
func scalar(s string) string {
	if plainScalar.MatchString(s) && !reservedScalar.MatchString(s) {
		return s
	}
	quoted, err := json.Marshal(s)
	if err != nil {
		panic("casefile: a text is not JSON: " + err.Error()) // Every string is.
	}
	return string(quoted)
}

// lineText returns the points of a line as YAML, in further lines where one is too short for them.
func lineText(line lem.Profile, depth int) string {
	var parts []string
	for _, p := range line {
		parts = append(parts, "["+figure(p.X)+", "+figure(p.Y)+"]")
	}
	if all := strings.Join(parts, ", "); len(all) < lineWidth-2*depth-20 {
		return " [" + all + "]"
	}
	indent := strings.Repeat("  ", depth)
	out, width := " [\n"+indent, 0
	for i, p := range parts {
		if i+1 < len(parts) {
			p += ","
		}
		if width > 0 && width+len(p)+1 > lineWidth-len(indent) {
			out, width = out+"\n"+indent, 0
		}
		if width > 0 {
			out, width = out+" ", width+1
		}
		out, width = out+p, width+len(p)
	}
	return out + "\n" + strings.Repeat("  ", depth-1) + "]"
}
