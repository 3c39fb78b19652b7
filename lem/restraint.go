package lem

import (
	"errors"
	"math"
)

// Restraint is a row of structural elements, such as piles or nails, that holds back whatever slips across it: a horizontal force against the
// movement where the slip passes it at X between Bottom and Top. The force acts as it is given, whatever F is, and is not that of the soil: it
// lessens what drives. A slip that it holds back altogether is Missed.
type Restraint struct {
	Name        string
	X           float64 // m.
	Top, Bottom float64 // Levels between which it can hold a slip, m.
	Force       float64 // kN per metre run, positive.
}

// ErrBadRestraint says that a restraint is not well formed.
var ErrBadRestraint = errors.New("lem: restraint needs a top above its bottom and a force of at least 0")

func checkRestraints(rs []Restraint) error {
	for _, r := range rs {
		if err := finite([]Point{{r.X, r.Top}, {r.Bottom, r.Force}}); err != nil {
			return err
		}
		if !(r.Top > r.Bottom && r.Force >= 0) {
			return ErrBadRestraint
		}
	}
	return nil
}

// restrain adds the forces of the restraints that the slip crosses, and reports whether anything is left that drives it.
func (m *Model) restrain(ws *Workspace, leftward bool) bool {
	held := false
	for _, r := range m.rows {
		s := m.sliceAt(ws, r.X, leftward)
		if s == nil {
			continue
		}
		fall := s.sin / s.cos
		if leftward {
			fall = -fall
		}
		if y := s.y - (r.X-s.x)*fall; y >= r.Bottom && y <= r.Top {
			s.push(-r.Force, y)
			held = true
		}
	}
	return !held || ws.driving(leftward) > 0
}

// sliceAt returns the slice at x; where several meet, as at a vertical step of the ground, which is drawn out, it is the widest, and of equals the
// uphill one, so that a mirror image has the same. It is nil beyond the slip.
func (m *Model) sliceAt(ws *Workspace, x float64, leftward bool) *slice {
	var best *slice
	near := stepWidth * (m.right - m.left)
	for i := range ws.n {
		s := &ws.slice[ws.fromHead(i, leftward)]
		if math.Abs(x-s.x) <= s.b/2+near && (best == nil || s.b > best.b) {
			best = s
		}
	}
	return best
}
