package remedies

import (
	"reflect"

	"standfast/optimize"
)

// sameAs returns for each check the first check of the design that is the same state of the same ground: two situations that differ in
// their drains only are one where there are none. The first is the one that asks for most, so that nothing that matters to another is left
// unpolished by its search.
func (d *design) sameAs() []int {
	same := make([]int, len(d.checks))
	for i := range same {
		same[i] = i
	}
	for i := range d.checks {
		for k := range d.checks {
			if k == i || !d.alike(i, k) {
				continue
			}
			a, b := d.required(i), d.required(k)
			if b > d.required(same[i]) || b == d.required(same[i]) && k < same[i] && b >= a {
				same[i] = k
			}
		}
	}
	return same
}

// alike reports whether two checks are the same state of the same ground.
func (d *design) alike(i, k int) bool {
	a, b := d.checks[i], d.checks[k]
	if a.Section != b.Section && !reflect.DeepEqual(a.Section, b.Section) {
		return false
	}
	a.Situation.Name, b.Situation.Name = "", ""
	return reflect.DeepEqual(a.Situation, b.Situation)
}

// asFoundIn returns what was found in check k as found in check i, which is alike.
func (d *design) asFoundIn(i, k int, found []optimize.Found[Cut]) []optimize.Found[Cut] {
	out := make([]optimize.Found[Cut], len(found))
	for n, f := range found {
		f.Cut.Check = uint16(i)
		f.Margin += d.required(k) - d.required(i)
		out[n] = f
	}
	return out
}
