package validation

import (
	"fmt"

	"standfast/lem"
)

// number is Taylor's stability number c/(F gamma H) of a slope, by search with Bishop's method.
func number(beta, depth float64, soil lem.Soil) answer {
	const height, gamma = 10.0, 20.0
	soil.UnitWeight = gamma
	s := uniform(face(height, beta*degree, 40), soil)
	if depth > 0 {
		s.FirmBase = level(height * (1 - depth))
	}
	lowest := critical(s, lem.Situation{}, lem.Bishop, lem.SearchOptions{})
	return func() (float64, error) {
		f, err := lowest()
		return soil.Cohesion / (f * gamma * height), err
	}
}

func undrainedNumbers() []Check {
	var out []Check
	for _, r := range []struct {
		beta, depth, want, tol float64
		why                    string
	}{
		{90, 0, 0.261, 0.005, "printed to 0.001"},
		{75, 0, 0.219, 0.005, "printed to 0.001"},
		{60, 0, 0.191, 0.008, "printed to 0.001"},
		{53, 0, 0.181, 0.008, "printed to 0.001"},
		{30, 1.5, 0.164, 0.0125, "read from the chart to 0.002"},
		{30, 2, 0.172, 0.0125, "read from the chart to 0.002"},
		{45, 1.5, 0.174, 0.0125, "read from the chart to 0.002"},
	} {
		name := fmt.Sprintf("undrained slope of %v degrees", r.beta)
		if r.depth > 0 {
			name += fmt.Sprintf(", firm base at D %v", r.depth)
		}
		c := Check{Case: name, What: "c/(F gamma H), bishop", Work: taylor, Place: "phi = 0", Confidence: High, Want: r.want, Run: number(r.beta, r.depth, lem.Soil{Cohesion: 40})}
		out = append(out, c.within(r.tol, r.why))
	}
	return out
}

// frictionalNumbers are toe circles in soil with cohesion and friction; Taylor divides both by F, so that F is 1 with his number. Bishop's method
// reads up to 9 % below the friction circle on slopes steeper than 60 degrees, which Spencer's does not; on toe circles of slopes of 60 degrees
// Spencer's equations often have no answer, so that Bishop's alone governs there.
func frictionalNumbers() []Check {
	slopes := [...]float64{90, 75, 60, 45, 30, 15}
	rows := []struct {
		phi  float64
		want [len(slopes)]float64 // 0: no number.
	}{
		{5, [...]float64{.239, .195, .162, .136, .110, .070}},
		{10, [...]float64{.218, .173, .138, .108, .075, .023}},
		{15, [...]float64{.199, .152, .116, .083, .046, 0}},
		{20, [...]float64{.182, .134, .097, .062, .025, 0}},
		{25, [...]float64{.166, .117, .079, .044, .009, 0}},
	}
	var out []Check
	for _, r := range rows {
		for i, beta := range slopes {
			n := r.want[i]
			if n == 0 {
				continue
			}
			confidence := Medium
			methods := []lem.Method{lem.Spencer}
			switch beta {
			case 60:
				methods = []lem.Method{lem.Bishop}
			case 45, 30:
				methods = []lem.Method{lem.Bishop, lem.Spencer}
			}
			if beta <= 60 && beta >= 30 && r.phi <= 20 {
				confidence = High
			}
			for _, method := range methods {
				const height, gamma = 10.0, 20.0
				s := uniform(face(height, beta*degree, 25), lem.Soil{UnitWeight: gamma, Cohesion: n * gamma * height, Friction: r.phi * degree})
				name := fmt.Sprintf("slope of %v degrees, phi %v, c/(gamma H) %.3f", beta, r.phi, n)
				c := search(name, s, lem.Situation{}, method, taylor, "friction circle", confidence, 1)
				out = append(out, c.within(0.02+0.0005/n, "2 % between the methods, and the number is printed to 0.001"))
			}
		}
	}
	return out
}

func chartChecks() []Check { return append(undrainedNumbers(), frictionalNumbers()...) }
