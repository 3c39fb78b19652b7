package validation

import (
	"fmt"
	"math"

	"standfast/lem"
)

// neutralPoint is where the influence line of Fredlund and Krahn's case 1 changes its sign.
func neutralPoint(method lem.Method, undrained, differences bool) answer {
	return func() (float64, error) {
		const load, slices = 500.0, 80 // lb; a slice there weighs some 10 000 lb.
		s, slip := fredlundKrahn(0, false)
		var m lem.Model
		if err := m.Compile(s, &lem.Situation{}); err != nil {
			return 0, err
		}
		v, err := m.Influence(&slip, lem.Setting{Method: method, Slices: slices}, load)
		if err != nil {
			return 0, err
		}
		for _, n := range v.Neutral {
			if n.Undrained == undrained && n.Differences == differences {
				return n.X, nil
			}
		}
		return 0, errNoAnswer
	}
}

func neutralChecks() []Check {
	var out []Check
	for _, b := range []float64{0, 0.25, 0.5, 0.75} {
		want := map[float64]float64{0: 22, 0.25: 16.4, 0.5: 11, 0.75: 5.6}[b]
		c := Check{Case: fmt.Sprintf("neutral angle at mobilised friction 22 degrees, B %v", b), What: "inclination", Unit: "degrees", Work: hutch, Place: "tan a = (1 - B sec^2 a) tan phi/F", Confidence: Exact, Want: want}
		c.Run = func() (float64, error) { return lem.NeutralAngle(22*degree, b) / degree, nil }
		out = append(out, c.between(want-0.05, want+0.05, "worked out to 0.1"))
	}
	for _, r := range []struct {
		method    lem.Method
		published float64
	}{{lem.Ordinary, 1.928}, {lem.Bishop, 2.080}, {lem.Spencer, 2.073}} {
		_, slip := fredlundKrahn(0, false)
		want := slip.Centre.X - slip.Radius*math.Sin(math.Atan(math.Tan(20*degree)/r.published))
		name := fmt.Sprintf("neutral point on Fredlund and Krahn's case 1, drained, F %.3f as they publish", r.published)
		formula := Check{Case: name, What: "x by formula, " + r.method.String(), Unit: "ft", Work: hutch, Place: "where the arc dips at tan phi'/F", Confidence: High, Want: want, Run: neutralPoint(r.method, false, false)}
		loaded := Check{Case: name, What: "x by loading single slices, " + r.method.String(), Unit: "ft", Work: hutch, Place: "where the arc dips at tan phi'/F", Confidence: High, Want: want, Run: neutralPoint(r.method, false, true)}
		out = append(out, formula.within(0.0015, "between slices 1.4 ft wide"), loaded.within(0.012, "the formula is exact for Ordinary and Bishop only, and for a vanishing load"))
	}
	return out
}
