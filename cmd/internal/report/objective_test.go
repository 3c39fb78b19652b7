package report

import (
	"bytes"
	"strings"
	"testing"

	"standfast/remedies"
)

// TestTextsSayWhatWasMadeLeast checks that no text speaks of least earthworks where cost or carbon was made least, that the amount of it stands in
// the answer, and that the name of the answer stands under the same key of the file.
func TestTextsSayWhatWasMadeLeast(t *testing.T) {
	for _, c := range []struct {
		objective remedies.Objective
		want      string
	}{
		{remedies.LeastEarthworks, "toe berm, 5.44 m3 per metre run (435 m3 over 80 m): height 1.5 m"},
		{remedies.LeastCost, " EUR, 5.44 m3 per metre run (435 m3 over 80 m): height 1.5 m"},
		{remedies.LeastCarbon, " t CO2 equivalent, 5.44 m3 per metre run (435 m3 over 80 m): height 1.5 m"},
	} {
		r, src := sample()
		priceSample(r.Job)
		r.Job.Objective = c.objective
		r.Job.Economics.Carbon = r.Job.Economics.Cost // So many kg for each unit: nothing is blank.
		f := New(r, src)
		var b bytes.Buffer
		if err := WriteComparison(&b, f, Look{}); err != nil {
			t.Fatal(err)
		}
		text := unwrapped(b.String())
		for _, want := range []string{c.want, "Least " + c.objective.String() + ": toe berm, ", "in ascending " + c.objective.String() + ", those"} {
			if !strings.Contains(text, want) {
				t.Errorf("%s: missing %q in:\n%s", c.objective, want, b.String())
			}
		}
		if strings.Contains(strings.ToLower(text), "least earthworks") != (c.objective == remedies.LeastEarthworks) {
			t.Errorf("%s: the text speaks of least earthworks:\n%s", c.objective, b.String())
		}
		if f.LeastEarthworks == nil || *f.LeastEarthworks != "berm" {
			t.Errorf("%s: the answer is %v", c.objective, f.LeastEarthworks)
		}
	}
}
