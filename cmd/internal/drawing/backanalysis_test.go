package drawing

import (
	"errors"
	"strings"
	"testing"

	"standfast/lem"
	"standfast/remedies"
)

func TestBackAnalysisLabels(t *testing.T) {
	j := cutting()
	slip := &remedies.Observed{Slip: lem.Slip{Centre: lem.Point{X: 42, Y: 70}, Radius: 22}}
	for _, u := range remedies.Unknowns() {
		t.Run(u.String(), func(t *testing.T) {
			b, err := remedies.BackAnalyse(j, slip, remedies.BackSettings{Unknown: u})
			if errors.Is(err, remedies.ErrNoBackAnalysis) && u == remedies.PressureRatio {
				t.Skip("the slip is too weak for that")
			}
			if err != nil {
				t.Fatal(err)
			}
			f, err := BackAnalysis("Harrow Lane cutting, invented", "stiff clay", b, Options{})
			if err != nil {
				t.Fatal(err)
			}
			checkLabels(t, f)
			keep(t, "backanalysis-"+u.String(), f)
			for _, want := range []string{"low: ", "middle: ", "high: ", "stiff clay"} {
				found := false
				for _, l := range f.Labels {
					found = found || strings.Contains(l.Text, want)
				}
				if !found {
					t.Errorf("%q is not on the drawing", want)
				}
			}
		})
	}
	if _, err := BackAnalysis("", "", &remedies.BackAnalysis{}, Options{}); !errors.Is(err, ErrNothingToDraw) {
		t.Errorf("nothing to draw gives %v", err)
	}
}
