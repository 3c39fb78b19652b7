package lem

import "math"

// crossingMargin is the share of a slice's width within which a boundary is taken to pass through the slice's end.
const crossingMargin = 1e-6

// leastAngle is the least angle of a slice, rad: what an arc cuts off a column by rounding only is left out.
const leastAngle = 1e-10

// sliceCircle cuts a part of a circle into slices of equal angle: never across a column's edge nor across a boundary between layers, however
// short the arc's dip into the next layer, so that the answer converges with the square of the slice width.
func (m *Model) sliceCircle(ws *Workspace, p part, c Point, r float64, target int) {
	ws.n, ws.wet, ws.arc, ws.centre, ws.radius = 0, false, true, c, r
	theta := ws.angle(p.from)
	width := (ws.angle(p.to) - theta) / float64(max(target, MinSlices))
	for i := p.first; i <= p.last; i++ {
		col := &m.cols[i]
		a, b := max(col.x0, p.from), min(col.x1, p.to)
		if b <= a {
			continue
		}
		k := col.first
		if col.last-col.first > 1 {
			m.arcCuts(ws, col, a, b)
			for _, x := range ws.cuts {
				next := ws.angle(x)
				k = m.addArc(ws, col, k, theta, next, width)
				theta = next
			}
		}
		next := ws.angle(b)
		m.addArc(ws, col, k, theta, next, width)
		theta = next
	}
}

// angle returns the angle of the arc at x from the vertical through the centre, positive to the right.
func (ws *Workspace) angle(x float64) float64 {
	return math.Asin(min(max((x-ws.centre.X)/ws.radius, -1), 1))
}

// arcLevel returns the level of the arc at x.
func (ws *Workspace) arcLevel(x float64) float64 {
	dx := x - ws.centre.X
	return ws.centre.Y - math.Sqrt(max(0, ws.radius*ws.radius-dx*dx))
}

// arcCuts lists in ws.cuts, from left to right, where the arc crosses boundaries between layers of a column from x = a to b.
func (m *Model) arcCuts(ws *Workspace, col *column, a, b float64) {
	ws.cuts = ws.cuts[:0]
	c, r := ws.centre, ws.radius
	ya, yb := ws.arcLevel(a), ws.arcLevel(b)
	for k := col.first; k < col.last-1; k++ {
		l := m.layers[k].bottom
		aboveA, aboveB := l.at(a) > ya, l.at(b) > yb
		if aboveA && aboveB { // The arc hangs below its chord, and so below the line.
			continue
		}
		// As for the ground in circleParts.
		e := l.at(c.X) - c.Y
		qa, qb, qc := 1+l.b*l.b, e*l.b, e*e-r*r
		disc, mid := qb*qb-qa*qc, c.X-qb/qa
		if aboveA == aboveB && (disc <= 0 || mid <= a || mid >= b) {
			continue
		}
		half := math.Sqrt(max(disc, 0)) / qa
		if !aboveA { // It goes under on the left.
			ws.cut(mid-half, a, b)
		}
		if !aboveB {
			ws.cut(mid+half, a, b)
		}
	}
}

// cut files x in ws.cuts in ascending order if it lies between a and b.
func (ws *Workspace) cut(x, a, b float64) {
	if x <= a || x >= b {
		return
	}
	ws.cuts = append(ws.cuts, x)
	for i := len(ws.cuts) - 1; i > 0 && ws.cuts[i] < ws.cuts[i-1]; i-- {
		ws.cuts[i], ws.cuts[i-1] = ws.cuts[i-1], ws.cuts[i]
	}
}

// addArc adds the slices over an arc from angle from to angle to, which lies in one layer; it is walked by rotation, half a slice at a time.
// k is where to start looking for the layer; it returns the layer.
func (m *Model) addArc(ws *Workspace, col *column, k int32, from, to, width float64) int32 {
	if to-from <= leastAngle {
		return k
	}
	c, r := ws.centre, ws.radius
	n := max(1, int(math.Ceil((to-from)/width-crossingMargin)))
	delta := (to - from) / float64(n)
	sinHalf, cosHalf := math.Sincos(delta / 2)
	// Area between arc and chord, R^2/2 (delta - sin delta), over the chord: how far the arc lies below it on the average.
	bulge := r * (delta - 2*sinHalf*cosHalf) / (4 * sinHalf)
	sin, cos := math.Sincos(from)
	first := true
	for range n {
		midSin, midCos := sin*cosHalf+cos*sinHalf, cos*cosHalf-sin*sinHalf
		sin, cos = midSin*cosHalf+midCos*sinHalf, midCos*cosHalf-midSin*sinHalf
		s := ws.add()
		s.sin, s.cos = -midSin, midCos
		s.b = 2 * r * sinHalf * midCos
		s.x = c.X + r*cosHalf*midSin
		s.y = c.Y - r*cosHalf*midCos - bulge/midCos
		if first {
			k, first = m.layerAt(col, k, s.x, s.y), false
		}
		ws.wet = m.fill(s, col, &m.layers[k], r*delta) || ws.wet
	}
	return k
}

// layerAt returns the layer of the column at a point, starting from layer k.
func (m *Model) layerAt(col *column, k int32, x, y float64) int32 {
	for k > col.first && y > m.layers[k-1].bottom.at(x) {
		k--
	}
	for k < col.last-1 && y < m.layers[k].bottom.at(x) {
		k++
	}
	return k
}

// addBase adds the slice over a chord from (x0,y0) to (x1,y1) in one column, cut where it crosses from layer to layer. It returns the
// layer at the right end.
func (m *Model) addBase(ws *Workspace, col *column, k int32, x0, y0, x1, y1 float64) int32 {
	if col.last-col.first == 1 {
		m.addSlice(ws, col, col.first, x0, y0, x1, y1)
		return k
	}
	slope := (y1 - y0) / (x1 - x0)
	inset := (x1 - x0) * crossingMargin
	kl := m.layerAt(col, k, x0+inset, y0+slope*inset)
	kr := m.layerAt(col, kl, x1-inset, y1-slope*inset)
	for kl != kr {
		edge, next := m.layers[kl].bottom, kl+1 // The boundary that is crossed on the way to kr.
		if kr < kl {
			edge, next = m.layers[kl-1].bottom, kl-1
		}
		xc := (edge.a - y0 + slope*x0) / (slope - edge.b)
		if xc > x0+inset && xc < x1-inset {
			yc := y0 + slope*(xc-x0)
			m.addSlice(ws, col, kl, x0, y0, xc, yc)
			x0, y0 = xc, yc
		}
		kl = next
	}
	m.addSlice(ws, col, kr, x0, y0, x1, y1)
	return kr
}

// addSlice adds one slice over a chord whose base lies in layer k of the column.
func (m *Model) addSlice(ws *Workspace, col *column, k int32, x0, y0, x1, y1 float64) {
	s := ws.add()
	b, dy := x1-x0, y1-y0
	length := math.Sqrt(b*b + dy*dy)
	s.x, s.y, s.b = (x0+x1)/2, (y0+y1)/2, b
	s.cos, s.sin = b/length, -dy/length
	ws.wet = m.fill(s, col, &m.layers[k], length) || ws.wet
}

// fill works out the forces on a slice whose geometry is set and whose base, of the given length, lies in layer l of the column. It reports whether
// free water loads the slice.
func (m *Model) fill(s *slice, col *column, l *layer, length float64) (wet bool) {
	b := s.b
	weight := l.sigma + l.slope*s.x - l.gamma*s.y
	pressure := col.pressure.at(s.x)
	s.soilW = (weight + pressure) * b
	s.q, s.h, s.k = s.soilW*m.vert, 0, 0
	s.variable = col.variable
	s.ground = col.ground.at(s.x)
	if m.pooled {
		wet = s.press(col.free, col.ground.b)
	}
	var u float64
	switch l.pore {
	case poreNone:
	case poreLine:
		u = l.unit * max(0, col.head(s.x, s.y)-s.y)
	case poreRu:
		u = l.ru * weight
	case poreOwn:
		u = l.unit * max(0, l.head.at(s.x)-s.y)
	case porePoints:
		u = max(0, interpolated(m.points, s.x, s.y))
	}
	c, tan := l.c, l.tan
	switch l.kind {
	case strengthConstant:
	case strengthGradient:
		c += l.gradient * max(0, l.datum.at(s.x)-s.y)
	case strengthPoints:
		c = interpolated(m.soils[l.soil].verticals, s.x, s.y)
	case strengthRatio:
		c = max(c, l.datum.at(s.x)-l.gradient*s.y)
	case strengthCurved: // At a first guess of the normal stress.
		c, tan = l.curve.tangent((weight + pressure - u) * s.cos * s.cos)
	}
	if m.curved {
		s.length, s.curve = length, l.curve
	}
	if m.sheared {
		s.shear = col.shear
	}
	s.tan = tan
	s.cl, s.ul = c*length, u*length
	s.frees = s.cl*s.cos + (s.q-s.ul*s.cos)*tan
	if m.kh != 0 {
		s.k = m.kh * s.soilW
		s.ky = m.weightLevel(col, l, s, weight)
	}
	return wet
}

// press puts free water on the ground over a slice, which has the given slope, and reports whether there is any. On a vertical face, drawn out to a slope that only part of may
// stand in water, the push must act at its own level, a third of the depth above the foot.
func (s *slice) press(free, slope float64) bool {
	half := math.Abs(slope) * s.b / 2
	deep, shallow := free-(s.ground-half), max(0, free-(s.ground+half))
	if !(deep > 0) {
		return false
	}
	wet := s.b
	if shallow == 0 && half > 0 {
		wet = deep / math.Abs(slope)
	}
	p := GammaW * (deep + shallow) / 2 * wet
	s.q += p
	s.h = p * slope
	s.hy = free - 2.0/3*(deep*deep+deep*shallow+shallow*shallow)/(deep+shallow)
	return true
}

// head returns the level of the piezometric head at a point, drains counted: see Drawdown.
func (col *column) head(x, y float64) float64 {
	w := col.water.at(x)
	if col.fade == 0 {
		return w
	}
	inv := col.invert.at(x)
	if inv >= w {
		return w
	}
	r := col.ratio.at(x)
	switch {
	case y >= inv:
		return w - r*(w-y)
	case y > inv-col.fade:
		return w - r*(w-inv)*(1-(inv-y)/col.fade)
	}
	return w
}

// weightLevel returns the level at which the earthquake force on a slice acts: the centroid of soil and permanent surcharge. base is the
// layer that the base lies in.
func (m *Model) weightLevel(col *column, base *layer, s *slice, weight float64) float64 {
	top := s.ground
	pressure := col.pressure.at(s.x)
	moment := pressure * top
	for i := col.first; i < col.last; i++ {
		l := &m.layers[i]
		bottom := s.y
		if l != base {
			bottom = l.bottom.at(s.x)
		}
		moment += l.gamma * (top - bottom) * (top + bottom) / 2
		top = bottom
		if l == base {
			break
		}
	}
	if total := weight + pressure; total > 0 {
		return moment / total
	}
	return s.y
}
