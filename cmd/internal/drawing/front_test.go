package drawing

import (
	"errors"
	"fmt"
	"strings"
	"testing"

	"standfast/remedies"
)

// drained is an invented option with a front of so many points that lie so far apart.
func drained(points int, apart float64, whole bool) *remedies.Option {
	o := &remedies.Option{Name: "berm+drilled_drains", Title: "toe berm with drilled drains", Status: remedies.MeetsTarget, Front: &remedies.Front{Whole: whole}}
	for i := range points {
		k := float64(i)
		o.Front.Points = append(o.Front.Points, remedies.FrontPoint{
			Drain: 2.5 - 2*apart*k, Earthworks: 6.001 + 3*apart*k*k, Answer: i == 0,
			Parameters: []remedies.Value{{Name: "berm.height", Unit: "m", Value: 1 + 0.1*k}, {Name: "berm.batter", Unit: "1V:nH", Value: 2}, {Name: "drilled_drains.permeability", Unit: "m/s", Value: 1e-6}},
		})
	}
	return o
}

// TestFront draws fronts of every size: no label is lost or covers another, and each point is listed with the dimensions that set it apart.
func TestFront(t *testing.T) {
	for _, c := range []struct {
		points int
		apart  float64
		whole  bool
	}{{2, 0.3, true}, {4, 0.1, true}, {11, 0.05, false}, {11, 0.0001, false}} {
		o := drained(c.points, c.apart, c.whole)
		f, err := Front("Harrow Lane cutting, invented", o, Options{})
		if err != nil {
			t.Fatal(err)
		}
		checkLabels(t, f)
		keep(t, fmt.Sprintf("front-%d-%g", c.points, c.apart), f)
		got := texts(f)
		for _, want := range []string{"1: drains 2.50 m/m, earthworks 6.01 m³/m, berm height 1.00 m", fmt.Sprintf("%d: drains ", c.points), "Ringed:"} {
			if !strings.Contains(got, want) {
				t.Errorf("the front does not say %q; it says:\n%s", want, got)
			}
		}
		if strings.Contains(got, "batter") || strings.Contains(got, "permeability") || strings.Contains(got, "may be more") == c.whole {
			t.Errorf("the front of %d points says:\n%s", c.points, got)
		}
		plot, err := FrontPlot(o, 511, 200)
		if err != nil {
			t.Fatal(err)
		}
		checkLabels(t, plot)
	}
	for _, o := range []*remedies.Option{{Name: "berm"}, drained(1, 1, true)} {
		if _, err := Front("empty", o, Options{}); !errors.Is(err, ErrNothingToDraw) {
			t.Errorf("no front gives %v", err)
		}
		if _, err := FrontPlot(o, 511, 200); !errors.Is(err, ErrNothingToDraw) {
			t.Errorf("no front gives %v", err)
		}
	}
}
