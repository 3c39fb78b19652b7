package cli

import (
	"cmp"
	"math"
	"math/rand/v2"
	"os"
	"slices"
	"testing"

	"standfast/cmd/internal/casefile"
	"standfast/lem"
	"standfast/remedies"
)

// longRun switches on the longer variants of the proofs: every remedy of the demos, more circles.
var longRun = os.Getenv("STANDFAST_LONG") != ""

// flatCase is an invented cutting in which flattening the face, with or without fill at its foot, reaches the target.
const flatCase = `
title: invented cutting for a feasible regrade
length: 50
ground: [[0, 12.2], [20, 12], [34, 4], [60, 3.8]]
ignore_slips_shallower_than: 0.8
soils:
  silty clay: {unit_weight: 19, drained: {cohesion: 2.5, friction: 26}, undrained: {strength: 45}}
  marl: {unit_weight: 20.5, drained: {cohesion: 9, friction: 29}, clay: false}
  sand fill: {unit_weight: 19, drained: {cohesion: 0, friction: 36}, clay: false}
strata:
  - {soil: silty clay, top: ground}
  - {soil: marl, top: [[0, 5], [60, 2]]}
water:
  wet: [[0, 9.5], [20, 8.6], [34, 4], [60, 3.4]]
  summer: [[0, 7.5], [34, 3], [60, 2.8]]
surcharges: [{name: track, from: 8, to: 12, pressure: 5, variable: true}]
situations:
  - {name: wet winter, water: wet, required_fs: 1.25}
  - {name: summer, water: summer, required_fs: 1.4}
stages: {water: summer, required_fs: 1.15}
limits:
  works_between: {left: 6, right: 37.5}
remedies:
  regrade: {fill: sand fill, batter: 1.5 to 3.5 by 0.05, pivot: 0 to 1 by 0.1}
`

// TestNothingCheaper goes through the whole lattice of a remedy without the optimiser. Areas and limits are worked out again from the two
// ground lines alone, and each design that is cheaper than the answer is given to a search of another kind, with more than four times as
// many circles, that knows only the failing slips it found itself. It must fail them all.
func TestNothingCheaper(t *testing.T) {
	demo, err := os.ReadFile("../../../testdata/demo/cutting.yaml")
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		name, kind string
		source     []byte
		designs    int // On the whole lattice.
	}{
		{"berm of the cutting demo", "berm", demo, 26 * 21},
		{"regrade", "regrade", []byte(flatCase), 41 * 11},
	} {
		t.Run(c.name, func(t *testing.T) {
			j, request := jobOf(t, c.source, c.kind)
			s := remedies.Settings{Allowance: remedies.DefaultAllowance}
			result, err := remedies.Study(t.Context(), j, s)
			if err != nil {
				t.Fatal(err)
			}
			o := &result.Options[0]
			if o.Status != remedies.MeetsTarget {
				t.Fatalf("%s: %s", o.Status, o.Reason)
			}
			sweep(t, result.Job, request, o, c.designs)
		})
	}
}

// jobOf reads a case and leaves only one remedy in it.
func jobOf(t *testing.T, source []byte, kind string) (*remedies.Job, remedies.Request) {
	t.Helper()
	read, err := casefile.Parse("case.yaml", source)
	if err != nil {
		t.Fatal(err)
	}
	j := read.Job
	j.Requests = slices.DeleteFunc(j.Requests, func(r remedies.Request) bool { return r.Kind != kind })
	if len(j.Requests) != 1 {
		t.Fatalf("the case asks for %d %ss", len(j.Requests), kind)
	}
	return j, j.Requests[0]
}

// sweep checks the answer against every design of the lattice.
func sweep(t *testing.T, j *remedies.Job, r remedies.Request, o *remedies.Option, designs int) {
	t.Helper()
	limit := remedies.DefaultAllowance
	h := &hunter{j: j, rng: rand.New(rand.NewPCG(7, 11))}
	best := worksArea(j.Section.Ground, o.Proposal.Section.Ground)
	if q := o.Proposal.Quantities.Earthworks(); math.Abs(q-best) > 1e-6 {
		t.Errorf("earthworks of the answer are %.6f, by the two grounds %.6f", q, best)
	}
	if low, slip := h.lowest(o.Proposal, math.Inf(-1)); low < 0 {
		t.Errorf("the answer fails by %.4f on %+v", -low, slip)
	}
	all, forbidden, cheaper, rescued := 0, 0, 0, 0
	for x := range lattice(r) {
		all++
		p, err := remedies.Apply(j, []remedies.Request{r}, [][]float64{x})
		if err != nil {
			t.Fatal(err)
		}
		broken := breaksLimits(j, p.Section.Ground)
		if impossible := slices.ContainsFunc(p.Violations, func(v remedies.Violation) bool { return v.Geometry }); impossible {
			forbidden++
			continue
		}
		if broken != (len(p.Violations) > 0) {
			t.Errorf("design %v: breaks limits by the ground alone: %t, by the program: %v", x, broken, p.Violations)
		}
		if broken {
			forbidden++
			continue
		}
		if worksArea(j.Section.Ground, p.Section.Ground) > best-1e-6 {
			continue
		}
		cheaper++
		if low, _ := h.lowest(p, limit); low < limit {
			continue
		}
		if h.poolFails(p, o.Certificate.Pool, limit) { // A slip that the program knows and the hunt missed.
			rescued++
			continue
		}
		t.Errorf("design %v is cheaper, and no slip below the target was found", x)
	}
	t.Logf("%v: %d designs, %d forbidden, %d cheaper than %.3f m3/m; %d slips known, %d circles tried", o.Parameters, all, forbidden, cheaper, best, len(h.known), h.spent)
	if all != designs || cheaper == 0 {
		t.Errorf("%d designs swept, %d of them cheaper; the lattice has %d", all, cheaper, designs)
	}
	if rescued > cheaper/50 {
		t.Errorf("%d of %d designs were failed by the program's slips only: the hunt is too weak to show anything", rescued, cheaper)
	}
	if c := o.Certificate; c.CheaperDesigns != cheaper || c.Forbidden != forbidden || c.Witnessed != cheaper {
		t.Errorf("the certificate counts %d cheaper designs, %d witnessed, %d forbidden", c.CheaperDesigns, c.Witnessed, c.Forbidden)
	}
}

// lattice yields every design of a request, NaN for absent parameters.
func lattice(r remedies.Request) func(func([]float64) bool) {
	return func(yield func([]float64) bool) {
		x := make([]float64, len(r.Axes))
		var fill func(int) bool
		fill = func(i int) bool {
			if i == len(x) {
				return yield(slices.Clone(x))
			}
			a := r.Axes[i]
			if a.Name == "" {
				x[i] = math.NaN()
				return fill(i + 1)
			}
			for k := 0; ; k++ {
				x[i] = a.Min + float64(k)*a.Step
				if x[i] > a.Max+1e-9 {
					return true
				}
				if !fill(i + 1) {
					return false
				}
				if a.Step == 0 {
					return true
				}
			}
		}
		fill(0)
	}
}

// worksArea returns cut plus fill between two grounds, by the trapezium rule on every interval in which both are straight and do not cross.
func worksArea(before, after lem.Profile) float64 {
	var area float64
	xs := breaks(before, after)
	for i := 1; i < len(xs); i++ {
		a, b := after.At(xs[i-1])-before.At(xs[i-1]), after.At(xs[i])-before.At(xs[i])
		width := xs[i] - xs[i-1]
		if a*b < 0 {
			area += width * (a*a + b*b) / (2 * (math.Abs(a) + math.Abs(b)))
			continue
		}
		area += width * math.Abs(a+b) / 2
	}
	return area
}

// breaks returns the x of all points of two lines in order.
func breaks(lines ...lem.Profile) []float64 {
	var xs []float64
	for _, l := range lines {
		for _, p := range l {
			xs = append(xs, p.X)
		}
	}
	slices.Sort(xs)
	return slices.Compact(xs)
}

// breaksLimits reports whether a new ground breaks a limit of the site, from the ground alone, looked at every centimetre and at every
// point of the lines.
func breaksLimits(j *remedies.Job, after lem.Profile) bool {
	const same = 1e-5 // m.
	l := &j.Limits
	xs := breaks(j.Section.Ground, after)
	for x := after.Left(); x < after.Right(); x += 0.01 {
		xs = append(xs, x)
	}
	slices.Sort(xs)
	first, last := math.Inf(1), math.Inf(-1)
	broken := false
	for i, x := range xs {
		rise := after.At(x) - j.Section.Ground.At(x)
		if math.Abs(rise) > same { // The works begin and end between two stations, at the points of the new ground.
			first, last = min(first, xs[max(i-1, 0)]), max(last, xs[min(i+1, len(xs)-1)])
		}
		for _, k := range l.KeepClear {
			if x > k.FromX && x < k.ToX && (k.NoLoad && rise > same || k.NoDig && k.DigBelow == nil && rise < -same) {
				broken = true
			}
		}
		for _, m := range l.MaxLevels {
			if x > m.FromX && x < m.ToX && rise > same && after.At(x) > m.Level+same {
				broken = true
			}
		}
	}
	return broken || l.Left != nil && first < l.Left.X-same || l.Right != nil && last > l.Right.X+same
}

// hunter looks for slips that fail a design, by chance: circles through two random points of the ground, then small random changes of the
// best ones. It shares nothing with the program's searches but the evaluation of one slip.
type hunter struct {
	j     *remedies.Job
	rng   *rand.Rand
	ws    lem.Workspace
	known []knownSlip // Slips that failed a design, the latest last.
	spent int
}

type knownSlip struct {
	check int
	slip  lem.Slip
	how   lem.Setting
}

// The hunt's effort for each check: a search of the program makes about 5000 evaluations.
const (
	huntCircles  = 20000
	huntBest     = 10
	huntChanges  = 300
	huntShrink   = 0.985
	huntSlices   = 40
	huntFlattest = 0.02
)

// lowest returns the lowest margin found over all checks of a design and its slip; it stops at the first below enough.
func (h *hunter) lowest(p *remedies.Proposal, enough float64) (float64, knownSlip) {
	checks := remedies.Checks(h.j, p)
	models := make([]lem.Model, len(checks))
	for i := range checks {
		if err := models[i].Compile(checks[i].Section, &checks[i].Situation); err != nil {
			panic(err)
		}
	}
	margin := func(k *knownSlip) float64 {
		h.spent++
		if r := models[k.check].FS(&h.ws, &k.slip, k.how); r.Status == lem.Converged {
			return r.F - checks[k.check].Required
		}
		return math.Inf(1)
	}
	least, at := math.Inf(1), knownSlip{}
	for i := len(h.known) - 1; i >= 0; i-- {
		if m := margin(&h.known[i]); m < least {
			if least, at = m, h.known[i]; least < enough {
				return least, at
			}
		}
	}
	for i := range checks {
		if m, k := h.check(i, p.Section.Ground, margin, enough); m < least {
			if least, at = m, k; least < enough {
				h.known = append(h.known, at)
				return least, at
			}
		}
	}
	return least, at
}

// check hunts in one check.
func (h *hunter) check(i int, ground lem.Profile, margin func(*knownSlip) float64, enough float64) (float64, knownSlip) {
	type trial struct {
		v [3]float64 // Where it leaves the ground, twice, and half of its angle.
		m float64
		k knownSlip
	}
	how := lem.Setting{Method: lem.Bishop, Slices: huntSlices, MinDepth: h.j.MinDepth, Window: lem.Window{Direction: h.j.Direction, Head: h.j.Head, Toe: h.j.Exit}}
	try := func(v [3]float64, method lem.Method) trial {
		out := trial{v: v, m: math.Inf(1), k: knownSlip{check: i, how: how}}
		out.k.how.Method = method
		if v[2] < huntFlattest || v[2] > math.Pi/2 || v[0] == v[1] {
			return out
		}
		out.k.slip = arcThrough(ground, v)
		out.m = margin(&out.k)
		return out
	}
	var best []trial
	left, width := ground.Left(), ground.Right()-ground.Left()
	for range huntCircles {
		half := h.rng.Float64()
		t := try([3]float64{left + width*h.rng.Float64(), left + width*h.rng.Float64(), half * half * math.Pi / 2}, lem.Bishop)
		if t.m < enough {
			return t.m, t.k
		}
		if len(best) < huntBest || t.m < best[len(best)-1].m {
			best = append(best, t)
			slices.SortFunc(best, func(a, b trial) int { return cmp.Compare(a.m, b.m) })
			best = best[:min(len(best), huntBest)]
		}
	}
	lowest := best[0]
	for _, method := range []lem.Method{lem.Bishop, lem.Spencer} {
		for _, b := range best {
			b = try(b.v, method)
			for step := 0.1; step > 0.1*math.Pow(huntShrink, huntChanges); step *= huntShrink {
				n := h.rng.NormFloat64
				t := try([3]float64{b.v[0] + step*n()*width/10, b.v[1] + step*n()*width/10, b.v[2] + step*n()}, method)
				if t.m < b.m {
					b = t
				}
				if t.m < enough {
					return t.m, t.k
				}
			}
			if b.m < lowest.m {
				lowest = b
			}
		}
	}
	return lowest.m, lowest.k
}

// arcThrough returns the circle through the ground at v[0] and v[1] whose lower arc between them has the half angle v[2].
func arcThrough(ground lem.Profile, v [3]float64) lem.Slip {
	x0, x1 := min(v[0], v[1]), max(v[0], v[1])
	y0, y1 := ground.At(x0), ground.At(x1)
	chord := math.Hypot(x1-x0, y1-y0)
	up := chord / 2 / math.Tan(v[2])
	return lem.Slip{
		Kind: lem.Circle, Radius: chord / 2 / math.Sin(v[2]),
		Centre: lem.Point{X: (x0+x1)/2 - (y1-y0)/chord*up, Y: (y0+y1)/2 + (x1-x0)/chord*up},
	}
}

// poolFails reports whether a slip of the program's pool fails a design.
func (h *hunter) poolFails(p *remedies.Proposal, pool []remedies.Cut, limit float64) bool {
	checks := remedies.Checks(h.j, p)
	for _, c := range pool {
		var m lem.Model
		if err := m.Compile(checks[c.Check].Section, &checks[c.Check].Situation); err != nil {
			panic(err)
		}
		if r := m.FS(&h.ws, &c.Slip, c.Setting); r.Status == lem.Converged && r.F < checks[c.Check].Required+limit {
			h.known = append(h.known, knownSlip{int(c.Check), c.Slip, c.Setting})
			return true
		}
	}
	return false
}
