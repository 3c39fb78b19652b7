package remedies_test

import (
	"math"
	"reflect"
	"slices"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/google/go-cmp/cmp/cmpopts"

	"standfast/lem"
	"standfast/optimize"
	"standfast/remedies"
)

// bankCase says how the invented bank of these tests is drawn: with every length multiplied, reflected about x = 0, with other targets
// and sizes.
type bankCase struct {
	scale    float64 // Of lengths, cohesion and surcharge; unit weights stay.
	mirrored bool
	raise    float64       // Added to the required FS.
	height   optimize.Axis // Sizes of the berm before scaling; the zero value takes 0.5 to 3 by 0.5,
	width    optimize.Axis // and 2 to 6 by 1.
}

const degree = math.Pi / 180

// job returns an invented clay bank, 6 m high at 1V:2H, with a berm to be sized.
func (b bankCase) job() *remedies.Job {
	k := b.scale
	if k == 0 {
		k = 1
	}
	sense := 1.0
	if b.mirrored {
		sense = -1
	}
	line := func(xy ...float64) lem.Profile {
		var p lem.Profile
		for i := 0; i < len(xy); i += 2 {
			p = append(p, lem.Point{X: sense * k * xy[i], Y: k * xy[i+1]})
		}
		if b.mirrored {
			slices.Reverse(p)
		}
		return p
	}
	axis := func(name string, a, otherwise optimize.Axis, f float64) optimize.Axis {
		if a == (optimize.Axis{}) {
			a = otherwise
		}
		return optimize.Axis{Name: name, Min: a.Min * f, Max: a.Max * f, Step: a.Step * f}
	}
	ground := line(0, 16.2, 20, 16, 32, 10, 60, 9.8)
	kind, _ := remedies.Find("berm")
	berm := remedies.DefaultRequest(&kind)
	berm.Soils["fill"] = 1
	berm.Axes[0] = axis("height", b.height, optimize.Axis{Min: 0.5, Max: 3, Step: 0.5}, k)
	berm.Axes[1] = axis("top_width", b.width, optimize.Axis{Min: 2, Max: 6, Step: 1}, k)
	from, to := sense*k*8, sense*k*12
	return &remedies.Job{
		Title: "invented bank", Length: 10,
		Section: lem.Section{
			Ground: ground,
			Soils: []lem.Soil{
				{Name: "clay", UnitWeight: 19, Cohesion: 2.5 * k, Friction: 24 * degree, Undrained: &lem.UndrainedStrength{Strength: 30 * k}},
				{Name: "sand fill", UnitWeight: 19.5, Friction: 36 * degree},
				{Name: "marl", UnitWeight: 20.5, Cohesion: 20 * k, Friction: 28 * degree},
			},
			Strata: []lem.Stratum{{Soil: 0, Top: ground}, {Soil: 2, Top: line(0, 8, 60, 6)}},
			Loads:  []lem.Surcharge{{Name: "track", FromX: min(from, to), ToX: max(from, to), Pressure: 5 * k}},
		},
		Crest: lem.Point{X: sense * k * 20, Y: k * 16}, Toe: lem.Point{X: sense * k * 32, Y: k * 10},
		Clay:   []bool{true, false, false},
		Waters: []remedies.WaterLine{{Name: "wet", Line: line(0, 14, 20, 13.2, 32, 9.9, 60, 9.5)}},
		Situations: []remedies.Situation{
			{Name: "wet", Water: 0, RequiredFS: 1.2 + b.raise, DrainsWorking: 1},
		},
		Stage:    remedies.StageSettings{Given: true, Water: 0, RequiredFS: 1.1},
		MinDepth: k,
		Requests: []remedies.Request{berm},
	}
}

func (b bankCase) study(t *testing.T, s remedies.Settings) *remedies.Result {
	t.Helper()
	r, err := remedies.Study(t.Context(), b.job(), s)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

// known keeps what berm has worked out.
var known = map[bankCase]*remedies.Option{}

// berm returns the sized berm, which must meet the target.
func (b bankCase) berm(t *testing.T) *remedies.Option {
	t.Helper()
	o := known[b]
	if o == nil {
		o = &b.study(t, remedies.Settings{}).Options[0]
		known[b] = o
	}
	if o.Status != remedies.MeetsTarget {
		t.Fatalf("%+v: %s: %s", b, o.Status, o.Reason)
	}
	return o
}

// TestResultDoesNotDependOnWorkers compares everything that a study returns, certificate and curve included.
func TestResultDoesNotDependOnWorkers(t *testing.T) {
	b := bankCase{height: optimize.Axis{Min: 2, Max: 3, Step: 1}}
	one := b.study(t, remedies.Settings{Workers: 1, Curves: true})
	for _, workers := range []int{2, 7} {
		got := b.study(t, remedies.Settings{Workers: workers, Curves: true})
		got.Settings.Workers = one.Settings.Workers
		if d := cmp.Diff(one, got, cmpopts.EquateNaNs(), cmp.Exporter(func(reflect.Type) bool { return true })); d != "" {
			t.Errorf("with %d workers:\n%s", workers, d)
		}
	}
}

// sameAnswer checks that two berms are the same but for scale: sizes and areas exactly, FS as near as two searches come, and that neither
// answer is a design that the other has a failing slip for.
func sameAnswer(t *testing.T, a, b *remedies.Option, scale float64) {
	t.Helper()
	const searched = 1e-3 // Of F: trials of a search fall otherwise.
	sizes := func(o *remedies.Option, scale float64) (x []float64) {
		for _, v := range o.Parameters {
			if v.Unit == "m" {
				v.Value *= scale
			}
			x = append(x, math.Round(v.Value*1e6)/1e6)
		}
		return x
	}
	want, got := sizes(a, scale), sizes(b, 1)
	for _, c := range []struct {
		answer  []float64
		scale   float64
		against *remedies.Option
	}{{got, 1 / scale, a}, {want, 1, b}} {
		for _, w := range c.against.Certificate.Witnesses {
			x := slices.Clone(w.X)
			for i, v := range c.against.Parameters {
				if v.Unit == "m" {
					x[i] /= c.scale
				}
			}
			if math.Abs(x[0]-c.answer[0])+math.Abs(x[1]-c.answer[1]) < 1e-6 {
				t.Errorf("one answer, %v, is a design that fails in the other study: FS %.4f", c.answer, w.FS)
			}
		}
	}
	if n := a.Certificate.UnresolvedDesigns + b.Certificate.UnresolvedDesigns; n > 0 {
		t.Errorf("%d designs unresolved", n)
	}
	if !slices.Equal(got, want) {
		t.Errorf("sizes are %v, want %v", got, want)
	}
	if got, want := b.Proposal.Quantities.Earthworks(), a.Proposal.Quantities.Earthworks()*scale*scale; math.Abs(got-want) > 1e-6 {
		t.Errorf("earthworks are %v, want %v", got, want)
	}
	sameFS(t, a, b, searched)
}

// sameFS compares FS in all checks of two options, within a share of it.
func sameFS(t *testing.T, a, b *remedies.Option, tol float64) {
	t.Helper()
	if len(a.Situations) != len(b.Situations) || len(a.Stages) != len(b.Stages) || len(a.Stages) == 0 {
		t.Fatal("other checks")
	}
	for i, o := range slices.Concat(a.Situations, a.Stages) {
		if got := slices.Concat(b.Situations, b.Stages)[i].FS; !(math.Abs(got-o.FS) <= tol*o.FS) {
			t.Errorf("%s: FS is %.5f, want %.5f", o.Check.Label(), got, o.FS)
		}
	}
}

// trial returns the bank's berm at fixed sizes, only checked.
func (b bankCase) trial(t *testing.T, height, width float64) *remedies.Option {
	t.Helper()
	b.height, b.width = optimize.Axis{Min: height, Max: height}, optimize.Axis{Min: width, Max: width}
	j := b.job()
	j.Trials, j.Requests = []remedies.Trial{{Name: "fixed", Requests: j.Requests}}, nil
	r, err := remedies.Study(t.Context(), j, remedies.Settings{})
	if err != nil {
		t.Fatal(err)
	}
	return &r.Options[0]
}

// TestMirroredStudy: a mirrored site gets the same works (symmetry).
func TestMirroredStudy(t *testing.T) {
	sameAnswer(t, bankCase{}.berm(t), bankCase{mirrored: true}.berm(t), 1)
	sameFS(t, bankCase{}.trial(t, 2, 4), bankCase{mirrored: true}.trial(t, 2, 4), 1e-3)
}

// TestScaledStudy: with lengths, cohesions and surcharges k times as large, and unit weights as they are, FS stays and areas are k^2 times
// as large (dimensional analysis).
func TestScaledStudy(t *testing.T) {
	sameAnswer(t, bankCase{}.berm(t), bankCase{scale: 3}.berm(t), 3)
	sameFS(t, bankCase{}.trial(t, 2, 4), bankCase{scale: 3}.trial(t, 2, 4), 1e-3)
}

// TestNothingNeeded: where the slope as it is meets the target, it is the answer, with no works.
func TestNothingNeeded(t *testing.T) {
	r := bankCase{raise: -0.6}.study(t, remedies.Settings{})
	if r.Least != r.Existing.Name || r.Existing.Status != remedies.Existing || len(r.Options) != 0 || r.Existing.Proposal.Quantities.Earthworks() != 0 {
		t.Errorf("least %q, existing %s with %v m3/m, %d options", r.Least, r.Existing.Status, r.Existing.Proposal.Quantities.Earthworks(), len(r.Options))
	}
}

// TestOrderOfAnswers: a higher target is never cheaper, and a larger set of sizes never dearer (the feasible set shrinks, or grows). The
// cases are such that the answers differ.
func TestOrderOfAnswers(t *testing.T) {
	cost := func(b bankCase) float64 { return b.berm(t).Proposal.Quantities.Earthworks() }
	asked := cost(bankCase{})
	if less := cost(bankCase{raise: -0.05}); !(less < asked) {
		t.Errorf("earthworks are %.3f m3/m, for a lower target %.3f", asked, less)
	}
	if narrow := cost(bankCase{height: optimize.Axis{Min: 2, Max: 3, Step: 1}}); !(asked < narrow) {
		t.Errorf("earthworks are %.3f m3/m, with fewer sizes to choose from %.3f", asked, narrow)
	}
}

// TestWaterDoesNotMatterUndrained: where all ground acts undrained, lowering the water does nothing (phi = 0: pore pressure carries no
// strength), so that it cannot meet a target that is not met.
func TestWaterDoesNotMatterUndrained(t *testing.T) {
	j := bankCase{}.job()
	j.Section.Soils[0].Undrained.Strength = 20
	j.Situations = []remedies.Situation{{Name: "undrained", Water: 0, Undrained: []bool{true, false, false}, RequiredFS: 1.5, DrainsWorking: 1}}
	kind, _ := remedies.Find("water_lowering")
	j.Requests = []remedies.Request{remedies.DefaultRequest(&kind)}
	r, err := remedies.Study(t.Context(), j, remedies.Settings{})
	if err != nil {
		t.Fatal(err)
	}
	o := &r.Options[0]
	before, after := r.Existing.Situations[0].FS, o.Situations[0].FS
	if o.Status != remedies.Infeasible || math.Abs(after-before) > 1e-3*before || !(before < 1.5) {
		t.Errorf("%s: FS %.5f before, %.5f after", o.Status, before, after)
	}
}
