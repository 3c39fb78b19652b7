package drawing

import (
	"errors"
	"math"
	"strings"
	"testing"

	"standfast/remedies"
)

func TestSensitivity(t *testing.T) {
	bars := []remedies.Bar{
		{Input: "effective cohesion", Low: 1.2301, High: 1.3999, Base: 1.3109},
		{Input: "water level", Low: 1.41, High: 1.19, Base: 1.3109},
		{Input: "unit weight", Low: 1.3109, High: 1.3109, Base: 1.3109},
		{Input: strings.Repeat("long ", 30), Low: 1.32, High: 1.33, Base: 1.3109},
		{Input: "undrained strength", Low: math.NaN(), High: 1.5, Base: 1.3109},
	}
	f, err := Sensitivity(bars, 511)
	if err != nil {
		t.Fatal(err)
	}
	checkLabels(t, f)
	keep(t, "sensitivity", f)
	got := texts(f)
	for _, want := range []string{"effective cohesion", "low 1.230", "high 1.399", "high 1.190", "low 1.410", "no answer at one end"} {
		if !strings.Contains(got, want) {
			t.Errorf("the drawing does not say %q; it says:\n%s", want, got)
		}
	}
	if strings.Contains(got, "NaN") {
		t.Error("a number that there is not is shown")
	}
	if _, err := Sensitivity(bars[4:], 511); !errors.Is(err, ErrNothingToDraw) {
		t.Errorf("no whole bar gives %v", err)
	}
}
