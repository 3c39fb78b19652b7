package remedies

import (
	"math"
	"strings"
	"testing"

	"standfast/lem"
)

// levelBase returns the cutting with level stiff clay at 96 under the whole of it and one water line.
func levelBase() *Job {
	j := cutting()
	j.Section.Strata[1].Top = lem.Profile{{X: 0, Y: 96}, {X: 80, Y: 96}}
	j.Waters = j.Waters[:1]
	j.Situations = j.Situations[:2]
	j.Waters[0].Line = lem.Profile{{X: 0, Y: 108}, {X: 26, Y: 106.7}, {X: 30, Y: 106.5}, {X: 52.5, Y: 100}, {X: 80, Y: 99}}
	return j
}

func onStiffClay() map[string]int { return map[string]int{"low_permeability": stiffClay} }

// TestInterceptor checks the water line by Dupuit by hand: drain at x = 26, invert 6 m down at level 103, h from 7 m to 4 m at the toe over
// 26.5 m; no recharge.
func TestInterceptor(t *testing.T) {
	for facing, j := range map[string]*Job{"right": levelBase(), "left": mirrorJob(levelBase())} {
		t.Run(facing, func(t *testing.T) {
			own := j.Facing()
			p := apply(t, j, request("interceptor", onStiffClay(), 6, 4, 0.6, 1e-6, 0))
			if len(p.Violations) > 0 {
				t.Fatal(p.Violations)
			}
			line := p.Waters[0].Line
			near(t, "upstream", line.At(own*20), j.Waters[0].Line.At(own*20), 1e-12)
			near(t, "beyond the toe", line.At(own*60), j.Waters[0].Line.At(own*60), 1e-12)
			for _, x := range []float64{27, 33, 40, 48} {
				want := 96 + math.Sqrt(49-(49-16)*(x-26)/26.5)
				if y := line.At(own * x); y < want-1e-9 || y > want+0.01 {
					t.Errorf("line at x = %g is %g, want %g or a little above", x, y, want)
				}
			}
			half := p.Waters[1].Line.At(own * 40) // Drains work by half.
			near(t, "half working", half, (line.At(own*40)+j.Waters[0].Line.At(own*40))/2, 1e-9)
			near(t, "dig", p.Quantities.TrenchDig, 6*0.6, 1e-9)
			near(t, "stone", p.Quantities.Stone, 6*0.6, 1e-9)
			near(t, "drain", p.Quantities.Piped, 1, 0)
			// K i D = 1e-6 x 0.05 x (106.7 - 103), the line falling 0.05 there.
			if got := strings.Join(p.Notes, "; "); !strings.Contains(got, "interceptor: it must carry about 1.8e-07 m3/s per m") && !strings.Contains(got, "about 1.9e-07 m3/s per m") {
				t.Errorf("notes %q", got)
			}
		})
	}
}

// TestRechargeBelowInterceptor checks that recharge on the slope lifts the line, and never above where it was.
func TestRechargeBelowInterceptor(t *testing.T) {
	j := levelBase()
	dryLine := apply(t, j, request("interceptor", onStiffClay(), 6, 4, 0.6, 1e-6, 0)).Waters[0].Line
	wetLine := apply(t, j, request("interceptor", onStiffClay(), 6, 4, 0.6, 1e-6, 2e-8)).Waters[0].Line
	x := 38.0
	want := 96 + math.Sqrt(49-(49-16)*(x-26)/26.5+0.02*(26.5-(x-26))*(x-26))
	if y := wetLine.At(x); y < math.Min(want, j.Waters[0].Line.At(x))-1e-9 || y > want+0.01 {
		t.Errorf("line %g, want %g", y, want)
	}
	for x := 0.0; x <= 80; x += 0.5 {
		if wetLine.At(x) < dryLine.At(x)-1e-9 || wetLine.At(x) > j.Waters[0].Line.At(x)+1e-9 {
			t.Errorf("x = %g: %g with recharge, %g without, %g before", x, wetLine.At(x), dryLine.At(x), j.Waters[0].Line.At(x))
		}
	}
}

// TestToeDrain checks the water line by hand: drain at the toe, invert 1.5 m down at level 98.5, h from 2.5 m there to 10.5 m at the crest.
func TestToeDrain(t *testing.T) {
	for facing, j := range map[string]*Job{"right": levelBase(), "left": mirrorJob(levelBase())} {
		t.Run(facing, func(t *testing.T) {
			own := j.Facing()
			p := apply(t, j, request("toe_drain", onStiffClay(), 1.5, 0, 0.6, 1e-6, 0))
			if len(p.Violations) > 0 {
				t.Fatal(p.Violations)
			}
			line := p.Waters[0].Line
			near(t, "crest", line.At(own*30), 106.5, 1e-9)
			near(t, "downstream", line.At(own*60), j.Waters[0].Line.At(own*60), 1e-12)
			for _, x := range []float64{49, 51.5} {
				want := 96 + math.Sqrt(6.25+(110.25-6.25)*(52.5-x)/22.5)
				before := j.Waters[0].Line.At(own * x)
				if y := line.At(own * x); y < math.Min(want, before)-1e-9 || y > math.Min(before, want+0.2) {
					t.Errorf("line at x = %g is %g, want %g or a little above", x, y, math.Min(want, before))
				}
			}
			if y := line.At(own * 52.3); y > 99.5 {
				t.Errorf("line at the drain is %g", y)
			}
			near(t, "dig", p.Quantities.TrenchDig, 0.6*1.5+0.3*0.12/2, 1e-9) // half of it under the face
		})
	}
}

func TestPipedDrainFaults(t *testing.T) {
	outfall := 104.0
	sloping := cutting()
	cable := levelBase()
	cable.Limits.KeepClear = []KeepClear{{Name: "cable", FromX: 25, ToX: 27, NoDig: true}}
	low := levelBase()
	low.Limits.Outfall = &outfall
	tests := []struct {
		name   string
		job    *Job
		x      []float64
		limit  string
		detail string
	}{
		{"sloping base", sloping, []float64{6, 4, 0.6, 1e-6, 0}, "assumptions of the interceptor", "is not level flow"},
		{"cable", cable, []float64{6, 4, 0.6, 1e-6, 0}, "cable", "interceptor digs 6.00 m"},
		{"outfall", low, []float64{6, 4, 0.6, 1e-6, 0}, "outfall", "invert of interceptor at level 103.00 m lies below the outfall"},
		{"outside", levelBase(), []float64{6, 40, 0.6, 1e-6, 0}, "ground within the section", "lies outside the section"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			p := apply(t, tt.job, request("interceptor", onStiffClay(), tt.x...))
			if len(p.Violations) != 1 || p.Violations[0].Limit != tt.limit || !strings.Contains(p.Violations[0].Detail, tt.detail) {
				t.Errorf("violations %+v, want %q: %q", p.Violations, tt.limit, tt.detail)
			}
		})
	}
	for want, r := range map[string]Request{
		"give the permeability and the recharge": request("toe_drain", onStiffClay(), 1, 0, 0.6),
		"which is no stratum":                    request("toe_drain", map[string]int{"low_permeability": rockfill}, 1, 0, 0.6, 1e-6, 0),
	} {
		if _, err := NewRemedies(levelBase(), []Request{r}); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("error %v, want %q", err, want)
		}
	}
}
