package remedies

import (
	"math"
	"reflect"
	"testing"

	"standfast/optimize"
)

// TestChecksSearchedSideBySide searches several checks of one design at once, all of them with skin slips that fail, whose companions are
// evaluated while other checks are still searched: what is found must not depend on how many are at work. `go test -race` sees what they share.
func TestChecksSearchedSideBySide(t *testing.T) {
	j := fencedBerm(75)
	j.MinDepth = 1
	for i := range j.Section.Soils {
		j.Section.Soils[i].Cohesion = 0 // So that the shallowest slips are the lowest.
	}
	j.Situations = nil
	for _, kh := range []float64{0, 0.02, 0.04, 0.06, 0.08, 0.1} {
		j.Situations = append(j.Situations, Situation{Name: "shaken", Water: dry, RequiredFS: 3, DrainsWorking: 1, Kh: kh})
	}
	search := func(workers int) []optimize.Found[Cut] {
		s := Settings{Workers: workers}.resolved()
		z := newSizing(j, &works{name: "existing"}, &s)
		d := z.openProposal(Start(j))
		defer d.Close()
		found, err := d.searchAll(t.Context(), optimize.Effort{Seed: 1}, false)
		if err != nil {
			t.Fatal(err)
		}
		return found
	}
	want := search(1)
	companions := 0
	for _, f := range want {
		if !math.IsInf(f.Margin, 0) && f.Margin < 0 {
			companions++
		}
	}
	if companions < 6 {
		t.Fatalf("%d slips fail: the case no longer shows what it should", companions)
	}
	for range 5 {
		if got := search(len(j.Situations)); !reflect.DeepEqual(got, want) {
			t.Fatal("the slips found depend on the number of workers")
		}
	}
}
