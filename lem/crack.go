package lem

import (
	"errors"
	"fmt"
	"math"
)

// TensionCrack is a vertical crack at the head of every slip: coming from its head, the slip ends where it first passes below the bottom of the
// crack, and the ground between there and where it would have daylighted takes no part. A slip nowhere below that bottom is Missed.
// Water in the crack pushes in the direction of movement with 1/2 GammaW hw^2 at a third of its depth hw.
type TensionCrack struct {
	Depth float64 // m below ground, everywhere; not used when Line is given.
	// Line is the bottom of the crack, m. Unlike other lines it does not run on: beyond its ends, and where it lies above the ground, there is
	// no crack. A slip whose head lies above Line ends where Line does, at the latest.
	Line Profile
	// WaterShare is the depth of water over the depth of the crack, 0 (dry) to 1 (full); not used when HasWaterLevel.
	WaterShare float64
	// WaterLevel, when HasWaterLevel, is the level of the water, m; the crack is full below ground and dry above its bottom at most.
	WaterLevel    float64
	HasWaterLevel bool
}

// ErrBadCrack says that a tension crack is not well formed.
var ErrBadCrack = errors.New("lem: tension crack needs a depth above 0 or a line, and a share of water from 0 to 1")

func (k *TensionCrack) check() error {
	if k == nil {
		return nil
	}
	if len(k.Line) < 2 && !(k.Depth > 0) || math.IsInf(k.Depth, 0) {
		return fmt.Errorf("%w: depth %g, line of %d points", ErrBadCrack, k.Depth, len(k.Line))
	}
	if !k.HasWaterLevel && !(k.WaterShare >= 0 && k.WaterShare <= 1) {
		return fmt.Errorf("%w: share %g", ErrBadCrack, k.WaterShare)
	}
	if math.IsNaN(k.WaterLevel) || math.IsInf(k.WaterLevel, 0) {
		return ErrNotFinite
	}
	return nil
}

// crackWater is what a model keeps of a tension crack, besides its bottom.
type crackWater struct {
	share, level float64
	byLevel      bool
}

func crackWaterOf(k *TensionCrack) *crackWater {
	if k == nil {
		return nil
	}
	return &crackWater{k.WaterShare, k.WaterLevel, k.HasWaterLevel}
}

// depth returns the depth of water in a crack between two levels.
func (w *crackWater) depth(bottom, top float64) float64 {
	if w.byLevel {
		return min(max(w.level-bottom, 0), top-bottom)
	}
	return w.share * (top - bottom)
}

// noCrack is the bottom of the crack where there is none: every slip is below it.
var noCrack = line{a: math.Inf(1)}

// crackOver returns the bottom of the crack over a column.
func (d *draught) crackOver(c *column) line {
	k := d.s.Crack
	switch {
	case k == nil:
		return noCrack
	case len(k.Line) == 0:
		return line{c.ground.a - k.Depth, c.ground.b}
	}
	if xm := (c.x0 + c.x1) / 2; xm < k.Line.Left() || xm > k.Line.Right() {
		return noCrack
	}
	return lineOver(d.crack, c.x0, c.x1)
}

// shorten cuts a part of a slip, whose slices are in the workspace, off at the tension crack and slices it again. It reports whether anything is
// left that moves the same way.
func (m *Model) shorten(ws *Workspace, p *part, s *Slip, o *Setting, r *Result) bool {
	before, _ := ws.turning()
	leftward := before < 0
	var x float64
	var col int
	var ok bool
	if s.Kind == Circle {
		x, col, ok = m.crackOnCircle(*p, s.Centre, s.Radius, leftward)
	} else {
		x, col, ok = m.crackOnPolyline(*p, s, leftward)
	}
	if !ok {
		return false
	}
	if leftward {
		p.to, p.last = x, col
	} else {
		p.from, p.first = x, col
	}
	if r.Depth, _ = m.depthOf(s, *p); r.Depth < o.MinDepth || !(p.to-p.from > stepWidth*(m.right-m.left)) {
		return false
	}
	m.slicePart(ws, *p, s, o)
	y := s.levelAt(x)
	ground := m.cols[col].ground.at(x)
	if r.Crack = ground - y; r.Crack <= stepWidth*(m.right-m.left) { // Rounding: it daylights as it would without.
		r.Crack = 0
	}
	after, _ := ws.turning()
	return after != 0 && after < 0 == leftward
}

// levelAt returns the level of a slip at x.
func (s *Slip) levelAt(x float64) float64 {
	if s.Kind == Polyline {
		return polylineAt(s.Nodes, x)
	}
	dx := x - s.Centre.X
	return s.Centre.Y - math.Sqrt(max(0, s.Radius*s.Radius-dx*dx))
}

// uncracked returns the ends on the ground of the part of a circle that an answer is for, as they would be without a crack.
func (m *Model) uncracked(ws *Workspace, s *Slip, r *Result) (from, to Point) {
	if r.Crack > 0 {
		m.circleParts(ws, s.Centre, s.Radius)
		for _, p := range ws.parts {
			if mid := (r.From.X + r.To.X) / 2; p.from < mid && mid < p.to {
				return Point{p.from, m.groundAt(p.from)}, Point{p.to, m.groundAt(p.to)}
			}
		}
	}
	return r.From, r.To
}

// crackOnCircle returns where an arc, coming from its head, first passes below the bottom of the crack, and in which column.
func (m *Model) crackOnCircle(p part, c Point, r float64, leftward bool) (x float64, col int, ok bool) {
	i, end, step := p.first, p.last+1, 1
	if leftward {
		i, end, step = p.last, p.first-1, -1
	}
	for ; i != end; i += step {
		k := &m.cols[i]
		a, b := max(k.x0, p.from), min(k.x1, p.to)
		if b <= a {
			continue
		}
		near := a
		if leftward {
			near = b
		}
		g := k.crack
		if dx := near - c.X; g.at(near) >= c.Y-math.Sqrt(max(0, r*r-dx*dx)) {
			return near, i, true
		}
		// Crossings of the straight bottom and the circle: as in circleParts.
		e := g.at(c.X) - c.Y
		qa, qb, qc := 1+g.b*g.b, e*g.b, e*e-r*r
		disc := qb*qb - qa*qc
		if disc <= 0 {
			continue
		}
		x = c.X + (-qb-math.Sqrt(disc))/qa
		if leftward {
			x = c.X + (-qb+math.Sqrt(disc))/qa
		}
		if x > a && x < b && g.at(x) <= c.Y {
			return x, i, true
		}
	}
	return 0, 0, false
}

// crackOnPolyline is the like of crackOnCircle.
func (m *Model) crackOnPolyline(p part, s *Slip, leftward bool) (x float64, col int, ok bool) {
	for w := m.walk(s.Nodes, p.from, p.to, p.first); w.next(); {
		g := w.at.crack
		d0, d1 := g.at(w.x0)-w.y0, g.at(w.x1)-w.y1 // Depth below the bottom of the crack.
		cross := w.x0 + (w.x1-w.x0)*d0/(d0-d1)
		switch {
		case leftward && d1 >= 0:
			x, col, ok = w.x1, w.col, true
		case leftward && d0 >= 0:
			x, col, ok = cross, w.col, true
		case leftward:
		case d0 >= 0:
			return w.x0, w.col, true
		case d1 >= 0:
			return cross, w.col, true
		}
	}
	return x, col, ok
}

// pushes adds the horizontal forces whose direction hangs on that of the movement: the horizontal part of loads, and the water in the crack.
func (m *Model) pushes(ws *Workspace, r *Result) {
	ss := ws.slice[:ws.n]
	if m.sheared {
		for i := range ss {
			s := &ss[i]
			shear := s.shear * s.b
			if r.Leftward {
				shear = -shear
			}
			if shear != 0 {
				s.push(shear, s.ground)
			}
		}
	}
	if r.Crack <= 0 {
		return
	}
	head := r.From
	if r.Leftward {
		head = r.To
	}
	bottom := head.Y - r.Crack
	if h := m.crack.depth(bottom, head.Y); h > 0 {
		ss[ws.fromHead(0, r.Leftward)].push(GammaW*h*h/2, bottom+h/3)
	}
}
