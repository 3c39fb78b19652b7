package validation

import (
	"context"
	"errors"
	"fmt"
	"math"

	"standfast/lem"
)

// degree turns degrees into radians.
const degree = math.Pi / 180

// fineSlices is the number of slices where a check is about an equation, not about the default slicing.
const fineSlices = 400

// errNoAnswer says that the engine gave no FS.
var errNoAnswer = errors.New("no answer")

// answer is what the program computes.
type answer = func() (float64, error)

// uniform is a section of one soil.
func uniform(ground lem.Profile, soil lem.Soil) *lem.Section {
	return &lem.Section{Ground: ground, Soils: []lem.Soil{soil}, Strata: []lem.Stratum{{Soil: 0, Top: ground}}}
}

// face is a plane slope of the given height and inclination that falls to the right, its toe at (0,0), with level ground of length run on
// both sides.
func face(height, beta, run float64) lem.Profile {
	back := height / math.Tan(beta)
	return lem.Profile{{X: -back - run, Y: height}, {X: -back, Y: height}, {X: 0, Y: 0}, {X: run, Y: 0}}
}

// level is a level line across everything.
func level(y float64) lem.Profile { return lem.Profile{{X: -1000, Y: y}, {X: 1000, Y: y}} }

// evaluate returns FS of a slip.
func evaluate(s *lem.Section, sit *lem.Situation, slip *lem.Slip, o lem.Setting) (float64, error) {
	var m lem.Model
	if err := m.Compile(s, sit); err != nil {
		return 0, err
	}
	var ws lem.Workspace
	r := m.FS(&ws, slip, o)
	if r.Status != lem.Converged {
		return 0, fmt.Errorf("%w: %s, %s, %s", errNoAnswer, o.Method, r.Status, r.Reason)
	}
	return r.F, nil
}

// fs is the FS of a slip by a method.
func fs(s *lem.Section, sit lem.Situation, slip lem.Slip, o lem.Setting) answer {
	return func() (float64, error) { return evaluate(s, &sit, &slip, o) }
}

// critical is the lowest FS that the default search finds on circles with one method; polylines are searched too if o asks for them.
func critical(s *lem.Section, sit lem.Situation, method lem.Method, o lem.SearchOptions) answer {
	return func() (float64, error) {
		var m lem.Model
		if err := m.Compile(s, &sit); err != nil {
			return 0, err
		}
		o.Methods = []lem.Method{method}
		found, err := m.Search(context.Background(), o)
		if err != nil {
			return 0, err
		}
		if len(found.Basins) == 0 {
			return 0, fmt.Errorf("%w: no slip found", errNoAnswer)
		}
		return found.Basins[0].Result.F, nil
	}
}

// fsBy names a factor of safety by its method.
func fsBy(m lem.Method) string { return "FS, " + m.String() }

// arcThrough returns the circle whose lower arc runs from a to b, a left of b, with half the angle given.
func arcThrough(a, b lem.Point, half float64) lem.Slip {
	dx, dy := b.X-a.X, b.Y-a.Y
	chord := math.Hypot(dx, dy)
	up := chord / 2 / math.Tan(half)
	centre := lem.Point{X: (a.X+b.X)/2 - dy/chord*up, Y: (a.Y+b.Y)/2 + dx/chord*up}
	return lem.Slip{Centre: centre, Radius: chord / 2 / math.Sin(half)}
}
