package report

import (
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/google/go-cmp/cmp/cmpopts"

	"standfast/lem"
	"standfast/remedies"
)

// TestHolesAndRowsRebuild writes a section with soils of its own and a row of piles, and turns it back.
func TestHolesAndRowsRebuild(t *testing.T) {
	job := sampleJob()
	key := works(job, "buttress", map[string]int{"fill": 2}, 2, 3, 1.5, 1.5, 3, 2, 0.5, 3, 9)
	row := works(job, "piles_or_nails", nil, 120, 2, 5, 8)
	b := &builder{job: job, soils: soilNames(job.Section.Soils)}
	back := &rebuilder{file: &File{SoilOrder: b.soils, Soils: b.soilTable()}, soils: map[string]int{}}
	for i, name := range b.soils {
		back.soils[name] = i
	}
	sections := 0
	for _, c := range append(key.Stages, remedies.Check{Section: &row.Section}) {
		got := back.section(b.section(c.Section))
		if d := got.Soils[0].Undrained.Datum; d.At(30) != 104 {
			t.Errorf("datum of cu at %g", d.At(30))
		}
		if diff := cmp.Diff(*c.Section, got, cmpopts.IgnoreFields(lem.UndrainedStrength{}, "Datum"), cmpopts.EquateApprox(0, 1e-9), cmpopts.EquateEmpty(), cmpopts.IgnoreFields(lem.Soil{}, "SaturatedUnitWeight")); diff != "" {
			t.Errorf("%s (-written +read):\n%s", c.Label(), diff)
		}
		sections++
	}
	if len(back.errs) > 0 || sections < 4 || len(back.soils) != len(b.soils) {
		t.Errorf("%d sections, soils %v, errors %v", sections, back.soils, back.errs)
	}
}
