package lem

import "math"

// FS evaluates a slip: every part of it below the ground that is deep enough is a slip of its own, and the one with the lowest F counts.
// It does not allocate once the workspace has grown. Bishop is for circles: on a polyline it is Inadmissible.
func (m *Model) FS(ws *Workspace, s *Slip, o Setting) Result {
	r, _ := m.lowest(ws, s, &o)
	return r
}

// lowest returns the result of the part that counts, and that part.
func (m *Model) lowest(ws *Workspace, s *Slip, o *Setting) (best Result, at part) {
	best = Result{F: math.NaN(), Screen: math.NaN(), Status: Missed}
	var cut bool
	if s.Kind == Circle {
		cut = m.circleParts(ws, s.Centre, s.Radius)
	} else {
		cut = m.polylineParts(ws, s)
	}
	if cut {
		best.Status, best.Reason = Inadmissible, NotDaylighting
	}
	if o.Method == Bishop && s.Kind != Circle {
		best.Status, best.Reason = Inadmissible, CirclesOnly
		return best, part{}
	}
	for i := 0; i < len(ws.parts); i++ {
		p := ws.parts[i]
		if p.from < m.left || p.to > m.right { // Out there nobody has said what the ground is.
			if best.Status == Missed {
				best.Status, best.Reason = Inadmissible, NotDaylighting
			}
			continue
		}
		depth, clear := m.depthOf(s, p)
		if depth < o.MinDepth || depth <= stepWidth*(m.right-m.left) { // A sliver no deeper than a drawn-out step is wide is rounding.
			continue
		}
		r := Result{F: math.NaN(), Screen: math.NaN(), Status: Inadmissible, Reason: BelowFirmBase, Depth: depth}
		if clear {
			m.slicePart(ws, p, s, o)
			if m.crack != nil && !m.shorten(ws, &p, s, o, &r) {
				continue
			}
			m.ends(&r, p)
			m.solve(ws, o, &r)
			if r.Status != Missed && !o.Window.admits(&r) {
				continue
			}
		}
		if lower(&r, &best) {
			best, at = r, p
		}
	}
	return best, at
}

// slicePart cuts a part of a slip into slices.
func (m *Model) slicePart(ws *Workspace, p part, s *Slip, o *Setting) {
	target := o.Slices
	if target == 0 {
		target = DefaultSlices
	}
	if s.Kind == Circle {
		m.sliceCircle(ws, p, s.Centre, s.Radius, target)
	} else {
		m.slicePolyline(ws, p, s, target)
	}
}

// depthOf returns the greatest depth of a part and whether it clears the firm base.
func (m *Model) depthOf(s *Slip, p part) (depth float64, clear bool) {
	if s.Kind == Circle {
		return m.circleDepth(p, s.Centre, s.Radius), !m.firm || m.circleClearsBase(p, s.Centre, s.Radius)
	}
	return m.polylineDepth(p, s)
}

func (m *Model) ends(r *Result, p part) {
	r.From = Point{p.from, m.cols[p.first].ground.at(p.from)}
	r.To = Point{p.to, m.cols[p.last].ground.at(p.to)}
}

// lower reports whether result a counts before b for the slip: the lowest F, and above all a part that could not be solved and whose screen
// lies below that.
func lower(a, b *Result) bool {
	rank := func(r *Result) float64 {
		switch r.Status {
		case Converged:
			return r.F
		case NotConverged:
			if math.IsNaN(r.Screen) {
				return math.MaxFloat64 / 2
			}
			return r.Screen
		case Inadmissible:
			return math.MaxFloat64
		case Missed:
		}
		return math.Inf(1)
	}
	return rank(a) < rank(b)
}

// solve finds F of the slices in the workspace, with variable surcharges only where they lower it. It reports whether they count.
func (m *Model) solve(ws *Workspace, o *Setting, r *Result) (loaded bool) {
	ws.trial++
	r.Slices = ws.n
	if !m.begin(ws, o, r) {
		r.Status = Missed
		return false
	}
	m.answer(ws, o.Method, r)
	if len(m.varied) == 0 || r.Status != Converged || !ws.addVariable(m.varied, r.F, r.Leftward) {
		return false
	}
	without := *r
	m.answer(ws, o.Method, r)
	if r.Status == Converged && without.F < r.F {
		r.F, r.Lambda = without.F, without.Lambda
		return false
	}
	return true
}

// begin makes the slices in the workspace ready to be solved. It reports whether anything drives them.
func (m *Model) begin(ws *Workspace, o *Setting, r *Result) bool {
	if !ws.orient(r) {
		return false
	}
	if m.sheared || r.Crack > 0 {
		m.pushes(ws, r)
	}
	if len(m.rows) > 0 && !m.restrain(ws, r.Leftward) {
		return false
	}
	if o.Method == MorgensternPrice {
		ws.sideForce = o.SideForce
	}
	return true
}

// answer solves the slices in the workspace by a method.
func (m *Model) answer(ws *Workspace, method Method, r *Result) {
	if m.curved {
		ws.settle(method, r)
		return
	}
	ws.method(method, r)
}

// method solves the slices in the workspace by a method; ws.answer keeps the F at which its equations close.
func (ws *Workspace) method(method Method, r *Result) {
	f, st := math.NaN(), NotConverged
	r.Reason = Admissible
	correction := 1.0
	switch method {
	case Ordinary:
		f, st = ws.ordinary(r.Leftward)
	case Bishop:
		f, st = ws.bishop(r.Leftward)
	case Spencer:
		f, r.Lambda, r.Reason, st = ws.morgensternPrice(&SideForce{Shape: Constant}, r.Leftward)
	case MorgensternPrice:
		f, r.Lambda, r.Reason, st = ws.morgensternPrice(&ws.sideForce, r.Leftward)
	case Janbu:
		f, st = ws.janbu()
		correction = ws.janbuCorrection(r.Leftward)
	case JanbuPlain:
		f, st = ws.janbu()
	case numMethods:
	}
	if st == Converged && !(f > 0 && f < math.MaxFloat64) {
		st = NotConverged
	}
	if st == Inadmissible && r.Reason == Admissible {
		r.Reason = SmallMAlpha
	}
	ws.answer = f
	r.F, r.Status = f*correction, st
	if st != Converged {
		r.F = math.NaN()
	}
	if st == NotConverged {
		if f, ok := ws.ordinary(r.Leftward); ok == Converged && f > 0 {
			r.Screen = f
		}
	}
}

// levelShare is the share of the moments of single slices below which their sum is taken to be rounding: the ground is level there.
const levelShare = 1e-9

// orient turns the signs of the slices to the direction in which the weight drives the slip, and reports whether it drives it at all.
func (ws *Workspace) orient(r *Result) bool {
	d, sum := ws.turning()
	r.Leftward = d < 0
	if r.Leftward {
		ss := ws.slice[:ws.n]
		for i := range ss {
			ss[i].sin, ss[i].h = -ss[i].sin, -ss[i].h
		}
	}
	return math.Abs(d) > levelShare*sum
}

// turning returns what drives the slices, not yet oriented, to the right, and the sum of its absolute parts: for an arc the moment of the
// vertical loads about the centre, for a polyline the horizontal thrust that its bases would have to take without any friction, sum(Q
// tan(alpha)). A line that this does not drive cannot slide that way at any F, however much of it is steep.
func (ws *Workspace) turning() (d, sum float64) {
	ss := ws.slice[:ws.n]
	for i := range ss {
		t := ws.centre.X - ss[i].x
		if !ws.arc {
			t = ss[i].sin / ss[i].cos
		}
		t *= ss[i].q
		d += t
		sum += math.Abs(t)
	}
	return d, sum
}

// driving returns what the resistance is compared with, kN: for an arc the overturning moment of all loads about the centre over the
// radius, for a polyline the sum of the loads along the base.
func (ws *Workspace) driving(leftward bool) float64 {
	var d float64
	for i := range ws.slice[:ws.n] {
		d += ws.drive(&ws.slice[i], leftward)
	}
	return d / ws.lever()
}

// lever is what drive is to be divided by: the radius of an arc, 1 for a polyline.
func (ws *Workspace) lever() float64 {
	if ws.arc {
		return ws.radius
	}
	return 1
}

// drive returns the part of one slice in driving, times the lever.
func (ws *Workspace) drive(s *slice, leftward bool) float64 {
	if !ws.arc {
		return s.q*s.sin + (s.h+s.k)*s.cos
	}
	d := s.q * (ws.centre.X - s.x)
	if leftward {
		d = -d
	}
	if s.h != 0 || s.k != 0 {
		d += s.h*(ws.centre.Y-s.hy) + s.k*(ws.centre.Y-s.ky)
	}
	return d
}
