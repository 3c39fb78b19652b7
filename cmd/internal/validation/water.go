package validation

import (
	"fmt"
	"math"

	"standfast/lem"
	"standfast/optimize"
	"standfast/remedies"
)

// Soils of the slope that works are tried on.
const (
	clay = iota
	firm
	fillSoil
)

// trialJob is a slope 9 m high at 1V:2.5H, its toe at (0, 0), with clay down to a parallel firm layer and water at the surface.
func trialJob(depth float64) *remedies.Job {
	ground := lem.Profile{{X: -60, Y: 9}, {X: -22.5, Y: 9}, {X: 0, Y: 0}, {X: 60, Y: 0}}
	below := make(lem.Profile, len(ground))
	for i, p := range ground {
		below[i] = lem.Point{X: p.X, Y: p.Y - depth}
	}
	return &remedies.Job{
		Title: "trial", Length: 100, Crest: ground[1], Toe: ground[2], Clay: make([]bool, 3),
		Section: lem.Section{
			Ground: ground,
			Soils: []lem.Soil{
				clay: {Name: "clay", UnitWeight: 19, Friction: 25 * degree}, firm: {Name: "firm", UnitWeight: 20, Friction: 30 * degree},
				fillSoil: {Name: "fill", UnitWeight: 20, Friction: 35 * degree},
			},
			Strata: []lem.Stratum{{Soil: clay, Top: ground}, {Soil: firm, Top: below}},
		},
		Waters:     []remedies.WaterLine{{Name: "water", Line: ground}},
		Situations: []remedies.Situation{{Name: "water", RequiredFS: 1.3, DrainsWorking: 1}},
	}
}

// applied returns the works of one remedy with the sizes given; NaN, or sizes that end early, leave parameters out.
func applied(j *remedies.Job, kind string, soils map[string]int, x ...float64) (*remedies.Proposal, error) {
	k, ok := remedies.Find(kind)
	if !ok {
		return nil, fmt.Errorf("no remedy %q", kind)
	}
	r := remedies.DefaultRequest(&k)
	r.Soils = soils
	for i, p := range k.Parameters {
		r.Axes[i] = optimize.Axis{}
		if i < len(x) && !math.IsNaN(x[i]) {
			r.Axes[i] = optimize.Axis{Name: p.Name, Min: x[i], Max: x[i]}
		}
	}
	p, err := remedies.Apply(j, []remedies.Request{r}, [][]float64{r.Fixed()})
	if err == nil && len(p.Violations) > 0 {
		err = fmt.Errorf("%s: %s", kind, p.Violations[0].Detail)
	}
	return p, err
}

// headBetween is the mean pressure head on the base between trenches that reach it, spacing over depth apart, for a depth of 4 m.
func headBetween(ratio float64) answer {
	const depth, width = 4.0, 0.5
	return func() (float64, error) {
		p, err := applied(trialJob(depth), "trench_drains", map[string]int{"low_permeability": firm}, depth, ratio*depth+width, width)
		if err != nil {
			return 0, err
		}
		d := p.Waters[0].Drains
		mid := d.Ratio[len(d.Ratio)/2]
		return depth * (1 - mid), nil
	}
}

// headSeries is the series for it summed as it stands: p/H = (8/pi^3)(S/H) sum over odd n of tanh(n pi H/S)/n^3.
func headSeries(ratio float64) float64 {
	const depth, last = 4.0, 20_001
	var sum float64
	for n := 1.0; n <= last; n += 2 {
		sum += math.Tanh(n*math.Pi/ratio) / (n * n * n)
	}
	return depth * 8 / (math.Pi * math.Pi * math.Pi) * ratio * sum
}

const day = 86400.0 // s

// headMidway is the head midway between drilled drains, above them, m: what they leave of the head above their line.
func headMidway(spacing, radius, below, permeability, recharge float64) answer {
	return func() (float64, error) {
		j := trialJob(20)
		p, err := applied(j, "drilled_drains", nil, 20, spacing, 2, 0.5, 2*radius, 10, permeability, recharge, below)
		if err != nil {
			return 0, err
		}
		for _, c := range remedies.Checks(j, p) {
			d := c.Situation.Water.Drains
			if c.Note == "" || d == nil {
				continue
			}
			lowest := math.Inf(1) // Where the ratio belongs to the head itself; elsewhere it is that of a lower head nearby, which is on the safe side.
			for i, q := range d.Invert {
				lowest = min(lowest, (c.Situation.Water.Line.At(q.X)-q.Y)*(1-d.Ratio[i]))
			}
			return lowest, nil
		}
		return 0, errNoAnswer
	}
}

func value(v float64) answer { return func() (float64, error) { return v, nil } }

func waterChecks() []Check {
	var out []Check
	for _, ratio := range []float64{1, 2, 4} {
		c := Check{
			Case: fmt.Sprintf("trench drains to the base at %v times their depth of 4 m", ratio), What: "mean head on the base", Unit: "m", Work: algebra, Confidence: Exact,
			Place: "Laplace series, (8/pi^3)(S/H) sum tanh(n pi H/S)/n^3, as it stands", Want: headSeries(ratio), Run: headBetween(ratio),
		}
		out = append(out, c.within(1e-6, "the series is summed to 1e-9"))
	}
	half := Check{Case: "the same at 2 times: half of the depth", What: "mean head on the base", Unit: "m", Work: algebra, Place: "f(r) + f(4/r) = 1", Confidence: Exact, Want: 2, Run: headBetween(2)}
	spaced := Check{Case: "drilled drains 65 m apart, 4.8 m above the base, under 1 mm/d, K 0.14 m/d", What: "head midway", Unit: "m", Work: ritzema, Place: "Example 8.1, Hooghoudt's equation", Confidence: Medium, Want: 1, Run: headMidway(65, 0.1, 4.8, 0.14/day, 0.001/day)}
	onBase := Check{Case: "drilled drains 12 m apart on the base, recharge K/25", What: "head midway", Unit: "m", Work: dupuit, Place: "m = (S/2) sqrt(q/K)", Confidence: Exact, Want: 1.2, Run: headMidway(12, 0.05, 0, 1e-6, 4e-8)}
	// Earth dam 60 m high, freeboard 2.5 m, upstream 2.75:1, blanket 120 m wide at the downstream toe; kx = 4 ky halves the horizontal lengths.
	const h, behind = 57.5, 46.156
	focus := Check{Case: "water line in a dam with a blanket drain", What: "height over the focus", Unit: "m", Work: asawa, Place: "y0 = sqrt(h^2 + d^2) - d, answer not printed in the extract", Confidence: Medium, Want: 27.58, Run: value(remedies.BasicParabola(h, behind))}
	flow := Check{Case: "the same, kx 4e-7 and ky 1e-7 m/s", What: "flow", Unit: "mm2/s", Work: asawa, Place: "q = sqrt(kx ky) y0, answer not printed in the extract", Confidence: Medium, Want: 5.52, Run: value(1e6 * math.Sqrt(4e-7*1e-7) * remedies.BasicParabola(h, behind))}
	return append(out,
		half.within(1e-9, "exact"),
		spaced.within(0.02, "d is read from a table"),
		onBase.within(1e-6, "exact"),
		focus.within(0.001, "printed to 0.01"),
		flow.within(0.002, "printed to 0.01"),
	)
}
