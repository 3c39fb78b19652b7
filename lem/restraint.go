package lem

import "errors"

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
	ss := ws.slice[:ws.n]
	held := false
	for _, r := range m.rows {
		for i := range ss {
			s := &ss[i]
			if r.X < s.x-s.b/2 || r.X >= s.x+s.b/2 {
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
			break
		}
	}
	return !held || ws.driving(leftward) > 0
}
