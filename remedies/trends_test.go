package remedies

import (
	"math"
	"testing"

	"standfast/lem"
)

// hutchinson names the source of the trends.
const hutchinson = "Hutchinson (1977) Bull. IAEG 16, 131-155, and (1984) Can. Geotech. J. 21(2), 363-370; recalled from memory"

// drainedClay returns the cutting in clay alone, drained, with the water line of a wet season, and its lowest deep circle by Bishop's method.
func drainedClay(t *testing.T) (*Job, *lem.Slip, lem.Result) {
	t.Helper()
	j := cutting()
	j.Section.Strata = j.Section.Strata[:1]
	j.Situations, j.Stage = j.Situations[:1], StageSettings{}
	minima := search(t, j, Start(j), 5)
	b := &minima.Basins[0]
	return j, &b.Slip, b.Result
}

// search returns the lowest circles of the first situation, deeper than so much.
func search(t *testing.T, j *Job, p *Proposal, deeper float64) lem.Minima {
	t.Helper()
	m := modelOf(t, j, p)
	minima, err := m.Search(t.Context(), lem.SearchOptions{MinDepth: deeper, Methods: []lem.Method{lem.Bishop}})
	if err != nil {
		t.Fatal(err)
	}
	return minima
}

// modelOf compiles the first situation of a proposal.
func modelOf(t *testing.T, j *Job, p *Proposal) *lem.Model {
	t.Helper()
	c := Checks(j, p)[0]
	m := new(lem.Model)
	if err := m.Compile(c.Section, &c.Situation); err != nil {
		t.Fatal(err)
	}
	return m
}

// fixedFS returns FS of a slip by Bishop's method with works.
func fixedFS(t *testing.T, j *Job, p *Proposal, s *lem.Slip) float64 {
	t.Helper()
	r := modelOf(t, j, p).FS(new(lem.Workspace), s, lem.Setting{Method: lem.Bishop, Slices: 200})
	if r.Status != lem.Converged {
		t.Fatal(r.Status)
	}
	return r.F
}

// TestNeutralPoint: a small load placed on a typical circle lowers F uphill of the point where tan(alpha) = tan(phi)/F and raises it downhill of it.
func TestNeutralPoint(t *testing.T) {
	j, slip, r := drainedClay(t)
	bare := fixedFS(t, j, Start(j), slip)
	tan := math.Tan(j.Section.Soils[clay].Friction) / bare
	neutral := slip.Centre.X - slip.Radius*tan/math.Sqrt(1+tan*tan) // The slip moves to the right: its base falls to the right where x is below the centre's.
	if !(r.From.X+2 < neutral && neutral < r.To.X-2) {
		t.Fatalf("neutral point at x = %.2f, slip from %.2f to %.2f", neutral, r.From.X, r.To.X)
	}
	with := func(x float64) float64 { // A strip of 0.5 m.
		loaded := *j
		loaded.Section.Loads = []lem.Surcharge{{FromX: x - 0.25, ToX: x + 0.25, Pressure: 2}}
		return fixedFS(t, &loaded, Start(&loaded), slip) - bare
	}
	for _, off := range []float64{-6, -3, -1.5, 1.5, 3, 6} {
		if d := with(neutral + off); (d > 0) != (off > 0) {
			t.Errorf("a load %+.1f m downhill of the neutral point changes F by %+.6f (%s)", off, d, hutchinson)
		}
	}
	if at, uphill := with(neutral), with(neutral-6); !(math.Abs(at) < 0.1*math.Abs(uphill)) {
		t.Errorf("a load at the neutral point changes F by %+.6f, 6 m uphill of it by %+.6f (%s)", at, uphill, hutchinson)
	}
}

// TestToeBeatsHead: on a typical circle fill at the toe raises F more than a cut of the same volume at the head, and both raise it.
func TestToeBeatsHead(t *testing.T) {
	j, slip, _ := drainedClay(t)
	bare := fixedFS(t, j, Start(j), slip)
	for _, height := range []float64{1.5, 2.5} {
		berm := apply(t, j, request("berm", fillOf(sandFill), height, 4, 2))
		var head *Proposal
		low, high := 0.0, 40.0
		for range 40 { // The width of platform whose cut is as large as the berm.
			width := (low + high) / 2
			head = apply(t, j, request("unload", nil, 1.5, width, 2))
			if head.Quantities.Earthworks() < berm.Quantities.Earthworks() {
				low = width
			} else {
				high = width
			}
		}
		near(t, "volume", head.Quantities.Earthworks(), berm.Quantities.Earthworks(), 1e-6)
		toe, off := fixedFS(t, j, berm, slip), fixedFS(t, j, head, slip)
		t.Logf("%.2f m3/m: F %.4f, with fill at the toe %.4f, with the head cut %.4f", head.Quantities.Earthworks(), bare, toe, off)
		if !(toe > off && off > bare) {
			t.Errorf("%.2f m3/m: F %.4f, with fill at the toe %.4f, with the head cut %.4f (%s)", head.Quantities.Earthworks(), bare, toe, off, hutchinson)
		}
	}
}

// TestFlatteningUnderWater: under a water line at the face, which goes down with it, flattening gains little: on an endless slope without cohesion
// the share 1 - gamma_w/gamma of what it gains on a dry one (closed form), and not much more here, where drains without any earthworks gain more.
func TestFlatteningUnderWater(t *testing.T) {
	j, _, _ := drainedClay(t)
	j.Waters[0].Line = append(lem.Profile{{X: 0, Y: 108}}, j.Section.Ground[1:]...)
	j.Situations[0].Water = 0
	gain := func(j *Job, p *Proposal) float64 {
		return search(t, j, p, 2).Basins[0].Result.F - search(t, j, Start(j), 2).Basins[0].Result.F
	}
	dry := *j
	dry.Situations = []Situation{{Name: "dry", Water: -1, RequiredFS: 1.3, DrainsWorking: 1}}
	flatter := request("regrade", nil, 3, 0)
	inWater, inDry := gain(j, apply(t, j, flatter)), gain(&dry, apply(t, &dry, flatter))
	drained := gain(j, apply(t, j, request("trench_drains", nil, 3, 6, 0.6, 0.7)))
	t.Logf("flattening gains %.4f under water, %.4f dry; drains %.4f", inWater, inDry, drained)
	if share := 1 - lem.GammaW/j.Section.Soils[clay].UnitWeight; !(inWater > 0 && inWater < (share+0.1)*inDry && drained > inWater) {
		t.Errorf("flattening gains %.4f under water and %.4f on a dry slope, drains %.4f (%s)", inWater, inDry, drained, hutchinson)
	}
}
