package validation

import "standfast/remedies"

// volume is a quantity of works on the trial slope: 9 m high, 1V:2.5H.
func volume(of func(*remedies.Quantities) float64, kind string, soils map[string]int, x ...float64) answer {
	return func() (float64, error) {
		p, err := applied(trialJob(4), kind, soils, x...)
		if err != nil {
			return 0, err
		}
		return of(&p.Quantities), nil
	}
}

func volumeChecks() []Check {
	fill := map[string]int{"fill": fillSoil}
	cut := func(q *remedies.Quantities) float64 { return q.TotalCut() }
	placed := func(q *remedies.Quantities) float64 { return q.TotalFill() }
	rows := []struct {
		name, what, place string
		want              float64
		run               answer
	}{
		{"flattened to 1V:3H about the toe", "cut", "(3 - 2.5) H^2/2", 20.25, volume(cut, "regrade", nil, 3, 0)},
		{"flattened to 1V:3H about the crest", "fill", "(3 - 2.5) H^2/2", 20.25, volume(placed, "regrade", fill, 3, 1)},
		{"flattened to 1V:3H about the middle", "cut", "(3 - 2.5) (H/2)^2/2", 5.0625, volume(cut, "regrade", fill, 3, 0.5)},
		{"berm 2.5 m high, 6 m wide, 1V:2H", "fill", "w h + (m - n) h^2/2", 13.4375, volume(placed, "berm", fill, 2.5, 6, 2)},
		{"platform 2 m down, 6.5 m wide, back batter 1V:2H", "cut", "trapezium less the triangle outside the face", 12, volume(cut, "unload", nil, 2, 6.5, 2)},
		{"trenches 4 m deep, 0.5 m wide, 8 m apart, from toe to crest", "dig", "area under the face times width over spacing", 4 * 22.5 * 0.5 / 8, volume(func(q *remedies.Quantities) float64 { return q.TrenchDig }, "trench_drains", map[string]int{"low_permeability": firm}, 4, 8, 0.5)},
	}
	var out []Check
	for _, r := range rows {
		c := Check{Case: "slope 9 m high at 1V:2.5H: " + r.name, What: r.what, Unit: "m3/m", Work: algebra, Place: r.place, Confidence: Exact, Want: r.want, Run: r.run}
		out = append(out, c.within(1e-9, "exact"))
	}
	return out
}
