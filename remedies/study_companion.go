package remedies

import (
	"math"

	"standfast/lem"
	"standfast/optimize"
)

// A slip that is just deep enough to be of interest is too shallow on the next design, and then it is no witness against it. Its
// companions run from the same head to the same exit but lie deeper; in cohesionless fill their FS is hardly higher.
const companionBelow = 1.5 // Slips up to this multiple of the depth of interest get companions,

var companionDepths = [...]float64{1.08, 1.25} // deeper by these factors.

// companions returns the companions of a slip that fails in a check, with their margins.
func (d *design) companions(ws *lem.Workspace, check int, b *lem.Minimum) []optimize.Found[Cut] {
	if b.Slip.Kind != lem.Circle || b.Result.Depth > companionBelow*d.z.j.MinDepth {
		return nil
	}
	if b.Result.F >= d.required(check)+d.z.s.Allowance {
		return nil
	}
	var out []optimize.Found[Cut]
	for _, k := range companionDepths {
		slip, ok := deepened(b.Slip, b.Result.From, b.Result.To, k)
		if !ok {
			continue
		}
		c := Cut{uint16(check), b.Setting, slip}
		if m := d.margin(ws, &c); m < d.z.s.Allowance {
			out = append(out, optimize.Found[Cut]{Cut: c, Margin: m})
		}
	}
	return out
}

// deepened returns the circle through the same two points whose arc lies deeper below their chord by a factor.
func deepened(s lem.Slip, from, to lem.Point, factor float64) (lem.Slip, bool) {
	dx, dy := to.X-from.X, to.Y-from.Y
	chord := math.Hypot(dx, dy)
	mid := lem.Point{X: (from.X + to.X) / 2, Y: (from.Y + to.Y) / 2}
	rise := math.Hypot(s.Centre.X-mid.X, s.Centre.Y-mid.Y)
	sagitta := factor * (s.Radius - rise)
	if !(sagitta > 0 && sagitta < chord/2) { // Beyond a half circle the centre changes sides.
		return s, false
	}
	r := (chord*chord/4 + sagitta*sagitta) / (2 * sagitta)
	h := (r - sagitta) / chord
	return lem.Slip{Kind: lem.Circle, Centre: lem.Point{X: mid.X - dy*h, Y: mid.Y + dx*h}, Radius: r}, true
}
