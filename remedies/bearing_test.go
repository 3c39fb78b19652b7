package remedies

import (
	"math"
	"strings"
	"testing"

	"standfast/lem"
)

// TestBearing checks 5.14 cu over the pressure by hand: 2 m of fill of 19.5 kN/m3 with plant of 10 kPa on clay with cu 35 kPa.
func TestBearing(t *testing.T) {
	j := cutting()
	j.Stage.Plant = 10
	p := apply(t, j, request("berm", fillOf(sandFill), 2, 6, 2))
	if len(p.HandChecks) != 1 || p.HandChecks[0].Name != Bearing {
		t.Fatalf("hand checks %+v", p.HandChecks)
	}
	h := p.HandChecks[0]
	near(t, "FS", h.FS, (2+math.Pi)*35/(2*19.5+10), 1e-9)
	near(t, "required", h.Required, 1.1, 0)
	if h.Source == "" || !strings.Contains(h.Working, "35 kPa (lowest cu given for clay) over 49.0 kPa") {
		t.Errorf("%+v", h)
	}
	if hs := apply(t, j, request("regrade", nil, 3, 0)).HandChecks; len(hs) != 0 {
		t.Errorf("a cut has hand checks %+v", hs)
	}
	two := apply(t, j, request("berm", fillOf(sandFill), 2, 6, 2), request("regrade", nil, 3, 0))
	if len(two.HandChecks) != 1 {
		t.Errorf("hand checks %+v", two.HandChecks)
	}
	for name, u := range map[string]*lem.UndrainedStrength{
		"points":   {Points: []lem.StrengthPoint{{Strength: 30}, {Strength: 20}}},
		"ratio":    {Ratio: 0.3, Minimum: 20, Strength: 99},
		"gradient": {Strength: 20, Gradient: 2},
	} {
		near(t, name, leastStrength(u), 20, 0)
	}
}

// TestBlanket checks a berm 2.5 m high and 6 m wide on a blanket 0.4 m thick, measured vertically: along the whole base but for the feet,
// where the fill is thinner than that.
func TestBlanket(t *testing.T) {
	soils := map[string]int{"fill": sandFill, "blanket_fill": rockfill}
	for facing, j := range map[string]*Job{"right": cutting(), "left": mirrorJob(cutting())} {
		t.Run(facing, func(t *testing.T) {
			p := apply(t, j, request("berm", soils, 2.5, 6, 2, 0.4))
			base := 57.25 - 46.25
			want := 0.4*base - 0.4*0.8/2 - 0.4*1/2 // triangles at 1V:2H on level ground and at the level top on the face 1V:2.5H
			near(t, "blanket", p.Quantities.Fill[rockfill], want, 1e-9)
			near(t, "total", p.Quantities.TotalFill(), 2.5*6+0.5*(2-2.5)*6.25, 1e-9)
			if s := p.Section.SoilAt(j.Facing()*50, 101.2); s != rockfill { // the face is at 101.0 there
				t.Errorf("soil %d on the face", s)
			}
			if s := p.Section.SoilAt(j.Facing()*50, 101.6); s != sandFill {
				t.Errorf("soil %d above the blanket", s)
			}
		})
	}
	for want, r := range map[string]Request{
		"needs its thickness": request("berm", soils, 2, 6, 2),
		"and its soil":        request("berm", fillOf(sandFill), 2, 6, 2, 0.4),
		"not free-draining":   request("berm", map[string]int{"fill": sandFill, "blanket_fill": clay}, 2, 6, 2, 0.4),
	} {
		if _, err := NewRemedies(cutting(), []Request{r}); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("error %v, want %q", err, want)
		}
	}
}
