package cli

import (
	"math"
	"math/rand/v2"
	"os"
	"runtime/debug"
	"slices"
	"strings"
	"sync"
	"testing"

	"standfast/lem"
	"standfast/optimize"
	"standfast/remedies"
)

// The pair of the random search, on the cutting of the twins, with its sizes: those of the long run are fine. Earthworks rise with each of them.
var (
	pairKinds   = []string{"berm", "trench_drains"}
	pairTargets = []string{"winter=1.25", "drains worn=1.2"}
	pairSizes   = []pairSize{
		{0, optimize.Axis{Name: "height", Min: 0.5, Max: 3, Step: 0.1}},
		{0, optimize.Axis{Name: "top_width", Min: 3, Max: 6, Step: 0.2}},
		{1, optimize.Axis{Name: "depth", Min: 1, Max: 4, Step: 0.1}},
	}
)

// pairSize is a size that is drawn: the remedy of the pair that it belongs to, and its lattice.
type pairSize struct {
	remedy int
	axis   optimize.Axis
}

// TestRandomPairs sizes berm and trench drains together and then draws designs with continuous sizes, half of them from all of the ranges, half
// from a box about the answer. A lattice leaves room below its answer: between its points a design may well be cheaper by less than a step. So a
// draw counts as cheaper where the next lattice design that is at least as large in every size is still cheaper than the answer; since earthworks
// rise with every size, it is cheaper then by what separates the two at least. That lattice design has a witness; nothing says that the smaller
// one fails as well, for F need not rise with the size of works, and that is what is tried. Each draw is put to the slips of the certificate,
// the one that failed the draw before first, each evaluated on the section of the draw itself. What no slip fails is searched in full as works
// of the user's own are; one that stands then refutes the sizing.
func TestRandomPairs(t *testing.T) {
	draws, coarser := 5000, 2
	if longRun {
		draws, coarser = 1_000_000, 1
	}
	p := newPairing(t, coarser)
	defer debug.SetGCPercent(debug.SetGCPercent(400)) // Draws leave much behind.
	var wg sync.WaitGroup
	const workers = 2
	found := make([]pairDraws, workers)
	for i := range workers {
		wg.Go(func() { found[i] = p.draw(rand.New(rand.NewPCG(11, uint64(i))), draws/workers) })
	}
	wg.Wait()
	var all pairDraws
	for _, f := range found {
		all.near += f.near
		all.failed += f.failed
		all.evaluated += f.evaluated
		all.survivors = append(all.survivors, f.survivors...)
	}
	t.Logf("%v, %.3f m3/m: %d draws, %d of them near, %d failed by the slips known, %d evaluations; %d searched in full", p.option.Parameters, p.cost, draws, all.near,
		all.failed, all.evaluated, len(all.survivors))
	if all.near != draws/2 || all.failed+len(all.survivors) != draws {
		t.Errorf("%d draws, %d near, %d failed, %d searched", draws, all.near, all.failed, len(all.survivors))
	}
	if len(all.survivors) > draws/200 {
		t.Fatalf("%d of %d designs pass all slips of the certificate", len(all.survivors), draws)
	}
	p.search(t, all.survivors)
}

// pairing is the pair with its answer.
type pairing struct {
	job      *remedies.Job
	requests []remedies.Request
	option   *remedies.Option
	works    remedies.Remedy
	answer   []float64 // Sizes of the answer.
	at       []int     // Places of the sizes in the parameter vector of the pair.
	whole    []float64 // The parameter vector, with what is fixed.
	axes     []optimize.Axis
	cost     float64
	costs    sync.Map // Of lattice designs, by their place.
}

// newPairing sizes the pair on the lattice, or on one that is coarser by a factor.
func newPairing(t *testing.T, coarser int) *pairing {
	t.Helper()
	source, err := os.ReadFile("testdata/twins/cutting.yaml")
	if err != nil {
		t.Fatal(err)
	}
	j, _ := jobOf(t, source, pairKinds[0])
	drains, _ := jobOf(t, source, pairKinds[1])
	j.Requests = append(j.Requests, drains.Requests...)
	j.Combinations = [][]string{pairKinds}
	if err := applyTargets(j, pairTargets); err != nil {
		t.Fatal(err)
	}
	p := &pairing{}
	for _, s := range pairSizes {
		s.axis.Step *= float64(coarser)
		axes := j.Requests[s.remedy].Axes
		axes[slices.IndexFunc(axes, func(a optimize.Axis) bool { return a.Name == s.axis.Name })] = s.axis
		p.axes = append(p.axes, s.axis)
	}
	for i := range j.Requests[1].Axes { // All else of the drains is fixed.
		if a := &j.Requests[1].Axes[i]; a.Name == "spacing" {
			a.Min, a.Max, a.Step = 9, 9, 0
		}
	}
	r, err := remedies.Study(t.Context(), j, remedies.Settings{})
	if err != nil {
		t.Fatal(err)
	}
	p.job, p.requests = r.Job, j.Requests
	for i := range r.Options {
		if len(r.Options[i].Remedies) == 2 {
			p.option = &r.Options[i]
		}
	}
	if o := p.option; o.Status != remedies.MeetsTarget || o.Certificate.Coarsened || o.Certificate.UnresolvedDesigns > 0 {
		t.Fatalf("%s: %s; %+v", o.Status, o.Reason, o.Certificate.UnresolvedDesigns)
	}
	p.cost = p.option.Proposal.Quantities.Earthworks()
	if p.works, err = remedies.Combine(p.job, p.requests); err != nil {
		t.Fatal(err)
	}
	for i := range p.requests {
		p.whole = append(p.whole, p.requests[i].Fixed()...)
	}
	for _, s := range pairSizes {
		name, offset := pairKinds[s.remedy]+"."+s.axis.Name, s.remedy*len(p.requests[0].Axes)
		p.at = append(p.at, offset+slices.IndexFunc(p.requests[s.remedy].Axes, func(a optimize.Axis) bool { return a.Name == s.axis.Name }))
		for _, v := range p.option.Parameters {
			if v.Name == name {
				p.answer = append(p.answer, v.Value)
			}
		}
	}
	return p
}

// apply returns the works at sizes.
func (p *pairing) apply(sizes []float64) *remedies.Proposal {
	x := slices.Clone(p.whole)
	for i, v := range sizes {
		x[p.at[i]] = v
	}
	return p.works.Apply(p.job, remedies.Start(p.job), x)
}

// larger returns the earthworks of the next lattice design that is at least as large, +Inf if the site forbids it.
func (p *pairing) larger(sizes []float64) float64 {
	at, up := 0, make([]float64, len(sizes))
	for i, a := range p.axes {
		k := int(math.Ceil((sizes[i] - a.Min) / a.Step))
		at, up[i] = at*a.Len()+k, a.At(min(k, a.Len()-1))
	}
	if c, ok := p.costs.Load(at); ok {
		return c.(float64)
	}
	c := math.Inf(1)
	if q := p.apply(up); len(q.Violations) == 0 {
		c = q.Quantities.Earthworks()
	}
	p.costs.Store(at, c)
	return c
}

// pairDraws is what came of draws.
type pairDraws struct {
	near, failed, evaluated int
	survivors               [][]float64
}

// nearSteps is the half width of the box about the answer, in steps of the finer lattice.
const nearSteps = 4

// draw draws n designs that are cheaper, every other one near the answer, and puts them to the slips of the certificate.
func (p *pairing) draw(rng *rand.Rand, n int) (d pairDraws) {
	tools := pairTools{cuts: slices.Clone(p.option.Certificate.Pool), models: make([]lem.Model, len(remedies.Checks(p.job, p.option.Proposal)))}
	for i := range n {
		near := i%2 == 1
		sizes := make([]float64, len(p.axes))
		for cheaper := false; !cheaper; cheaper = p.larger(sizes) < p.cost {
			for k, a := range p.axes {
				low, high := a.Min, a.Max
				if reach := nearSteps * pairSizes[k].axis.Step; near {
					low, high = max(low, p.answer[k]-reach), min(high, p.answer[k]+reach)
				}
				sizes[k] = low + (high-low)*rng.Float64()
			}
		}
		if near {
			d.near++
		}
		if p.fails(sizes, &tools) {
			d.failed++
		} else {
			d.survivors = append(d.survivors, sizes)
		}
	}
	d.evaluated = tools.evaluated
	return d
}

// pairTools are what one worker tries designs with: the slips, the one that failed the design before first, and models to compile into.
type pairTools struct {
	cuts      []remedies.Cut
	models    []lem.Model
	ws        lem.Workspace
	evaluated int
}

// fails reports whether a slip fails a design; it then stands first for the next.
func (p *pairing) fails(sizes []float64, w *pairTools) bool {
	checks := remedies.Checks(p.job, p.apply(sizes))
	compiled := make([]bool, len(checks))
	for i := range w.cuts {
		c := w.cuts[i]
		m, check := &w.models[c.Check], &checks[c.Check]
		if !compiled[c.Check] {
			if err := m.Compile(check.Section, &check.Situation); err != nil {
				panic(err)
			}
			compiled[c.Check] = true
		}
		w.evaluated++
		if r := m.FS(&w.ws, &c.Slip, c.Setting); r.Status == lem.Converged && r.F < check.Required+remedies.DefaultAllowance {
			copy(w.cuts[1:i+1], w.cuts[:i])
			w.cuts[0] = c
			return true
		}
	}
	return false
}

// search searches designs in full: none may stand.
func (p *pairing) search(t *testing.T, survivors [][]float64) {
	t.Helper()
	if len(survivors) == 0 {
		return
	}
	j := *p.job
	j.Requests, j.Combinations = nil, nil
	for _, sizes := range survivors {
		trial := remedies.Trial{Name: strings.Join(pairKinds, " and ")}
		for _, r := range p.requests {
			r.Axes = slices.Clone(r.Axes)
			trial.Requests = append(trial.Requests, r)
		}
		for i, s := range pairSizes {
			axes := trial.Requests[s.remedy].Axes
			a := &axes[slices.IndexFunc(axes, func(a optimize.Axis) bool { return a.Name == s.axis.Name })]
			a.Min, a.Max, a.Step = sizes[i], sizes[i], 0
		}
		j.Trials = append(j.Trials, trial)
	}
	r, err := remedies.Study(t.Context(), &j, remedies.Settings{})
	if err != nil {
		t.Fatal(err)
	}
	for i := range r.Options {
		o := &r.Options[i]
		if o.Status != remedies.Fails {
			t.Errorf("%v, %.3f m3/m, is %s, and the answer takes %.3f", o.Parameters, o.Proposal.Quantities.Earthworks(), o.Status, p.cost)
		}
		t.Logf("%v: %s", o.Parameters, o.Reason)
	}
}
