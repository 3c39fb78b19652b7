package remedies

import (
	"math"
	"strings"
	"testing"

	"standfast/lem"
)

// TestLightweightFill checks dig, refill and strip by hand: the platform of an unloading, 12 m3/m less the triangle outside the face, filled up again.
func TestLightweightFill(t *testing.T) {
	for facing, j := range map[string]*Job{"right": cutting(), "left": mirrorJob(cutting())} {
		t.Run(facing, func(t *testing.T) {
			j.Waters[0].Line = shifted(j.Waters[0].Line, -4) // below the light fill
			j.Waters[1].Line = shifted(j.Waters[1].Line, -9)
			p := apply(t, j, request("lightweight_fill", fillOf(lightFill), 2, 6.5, 2))
			if len(p.Violations) > 0 {
				t.Fatal(p.Violations)
			}
			near(t, "dig", p.Quantities.TotalCut(), 12, 1e-9)
			near(t, "refill", p.Quantities.Fill[lightFill], 12, 1e-9)
			near(t, "strip", p.Quantities.Strip, 5.5+2*math.Sqrt(1+2.5*2.5), 1e-9)
			samePoints(t, p.Section.Ground, j.Section.Ground)
			if s := p.Section.SoilAt(j.Crest.X, 108); s != lightFill {
				t.Errorf("soil %d at the crest", s)
			}
			open := find(t, p, HeadOpen)
			near(t, "excavation", open.Section.Ground.At(j.Crest.X), 107, 1e-9)
			if len(p.Stages) != 1 || open.Required != 1.1 {
				t.Errorf("stages %v", labels(p.Stages))
			}
		})
	}
}

// TestLightFillWeighsLess checks the total weight on a fixed slip: the resisting and driving forces change by what the exchange takes off.
func TestLightFillWeighsLess(t *testing.T) {
	j := cutting()
	j.Situations = j.Situations[3:] // dry
	slip := circleThrough(lem.Point{X: 20, Y: 109}, lem.Point{X: 50, Y: 101}, 12)
	weight := func(p *Proposal) float64 {
		c := Checks(j, p)[0]
		var m lem.Model
		if err := m.Compile(c.Section, &c.Situation); err != nil {
			t.Fatal(err)
		}
		d, err := m.Detail(&slip, lem.Setting{Method: lem.Bishop, Slices: 200})
		if err != nil {
			t.Fatal(err)
		}
		var sum float64
		for _, r := range d.Slices {
			sum += r.Weight
		}
		return sum
	}
	before, after := weight(Start(j)), weight(apply(t, j, request("lightweight_fill", fillOf(lightFill), 2, 6.5, 2)))
	near(t, "weight taken off", before-after, 12*(19-6), 0.01*12*(19-6))
}

// TestFlotation checks the balance of water pressure and weight at the bottom of the light fill, on either side: 2 m deep, 6 kN/m3, lifted by
// a head of 2*6/9.81 = 1.223 m.
func TestFlotation(t *testing.T) {
	for _, head := range []float64{1.22, 1.23} {
		j := cutting()
		j.Waters = j.Waters[:1]
		j.Situations = j.Situations[:2]
		j.Waters[0].Line = lem.Profile{{X: 0, Y: 107 + head}, {X: 33, Y: 107 + head}, {X: 34, Y: 105}, {X: 80, Y: 99}}
		p := apply(t, j, request("lightweight_fill", fillOf(lightFill), 2, 6.5, 2))
		lifted := false
		for _, v := range p.Violations {
			lifted = lifted || v.Limit == limitFloat
		}
		// Over the face, where the fill is thinner, it is lifted at once: the line must dive in front of it.
		if lifted != (head > 1.225) && head < 1.225 {
			for _, v := range p.Violations {
				if !strings.Contains(v.Detail, "x = 3") { // in front of the crest
					t.Errorf("head %g: violations %+v", head, p.Violations)
				}
			}
		}
		if head > 1.225 && !lifted {
			t.Errorf("head %g does not lift the fill", head)
		}
	}
}

// TestShearKey checks dig and refill by hand: level ground 10 m behind the crest, bottom 3 m wide and 4 m deep, sides 1V:0.5H: 3*4 + 0.5*16.
func TestShearKey(t *testing.T) {
	j := cutting()
	p := apply(t, j, request("shear_key", fillOf(rockfill), 4, 3, 32.5))
	if len(p.Violations) > 0 {
		t.Fatal(p.Violations)
	}
	near(t, "dig", p.Quantities.TotalCut(), 20, 1e-9)
	near(t, "refill", p.Quantities.Fill[rockfill], 20, 1e-9)
	near(t, "stiff clay dug", p.Quantities.Cut[stiffClay], soilBelow(j, 20, 105), 0.02)
	near(t, "strip", p.Quantities.Strip, 7, 1e-9)
	samePoints(t, p.Section.Ground, j.Section.Ground)
	near(t, "open", find(t, p, ShearKeyOpen).Section.Ground.At(20), 105, 1e-9)
	q := apply(t, j, request("shear_key", fillOf(rockfill), 4, 3, 32.5, 0.5, 4, 12))
	if got := strings.Join(labels(q.Stages), "; "); got != "shear key open, in panels; shear key open, plane strain" {
		t.Error(got)
	}
	if v := apply(t, j, request("shear_key", fillOf(rockfill), 4, 3, -40)).Violations; len(v) != 1 || !v[0].Geometry {
		t.Errorf("violations %+v", v)
	}
}

// soilBelow returns the part of the key about x that lies below the top of the stiff clay: columns 1 mm wide.
func soilBelow(j *Job, centre, bottom float64) float64 {
	var area float64
	const dx = 0.001
	for x := centre - 4; x < centre+4; x += dx {
		floor := bottom + max(0, math.Abs(x-centre)-1.5)/0.5
		area += dx * max(0, j.Section.Strata[1].Top.At(x)-floor)
	}
	return area
}

// TestExchangeFaults lists requests that make no sense.
func TestExchangeFaults(t *testing.T) {
	for want, r := range map[string]Request{
		"is not lighter than the ground":    request("lightweight_fill", fillOf(sandFill), 2, 6.5, 2),
		"is the ground itself":              request("shear_key", fillOf(clay), 4, 3, 0),
		"their length and their spacing":    request("shear_key", fillOf(rockfill), 4, 3, 0, nan, 3),
		"panels 5 m long leave no ground b": request("shear_key", fillOf(rockfill), 4, 3, 0, nan, 5, 5),
	} {
		if _, err := NewRemedies(cutting(), []Request{r}); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("error %v, want %q", err, want)
		}
	}
}
