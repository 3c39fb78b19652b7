package lem

import "math"

// crossingMargin is the share of a slice's width within which a boundary is taken to pass through the slice's end.
const crossingMargin = 1e-6

// leastAngle is the least angle of a slice, rad: what an arc cuts off a column by rounding only is left out.
const leastAngle = 1e-10

// seriesUpTo is the angle, rad, up to which the series of sine and cosine, cut off as they are in smallSincos, are exact to rounding.
const seriesUpTo = 0.1

// sliceCircle cuts a part of a circle into slices of equal angle: never across a column's edge nor across a boundary between layers, however
// short the arc's dip into the next layer, so that the answer converges with the square of the slice width. First the stretches between such
// cuts, whose angles do not wait for each other, then the slices.
func (m *Model) sliceCircle(ws *Workspace, p part, c Point, r float64, target int) {
	ws.n, ws.wet, ws.arc, ws.centre, ws.radius = 0, false, true, c, r
	ws.reaches = ws.reaches[:0]
	curvature := 1 / r
	at := bearingOf(p.from, c.X, curvature)
	for i := p.first; i <= p.last; i++ {
		col := &m.cols[i]
		a, b := max(col.x0, p.from), min(col.x1, p.to)
		if b <= a {
			continue
		}
		next := bearingOf(b, c.X, curvature)
		if col.last-col.first > 1 {
			m.arcCuts(ws, col, a, b, c.Y-r*at.cos, c.Y-r*next.cos)
			for _, x := range ws.cuts {
				mid := bearingOf(x, c.X, curvature)
				ws.reaches = append(ws.reaches, reach{i, at, at.angleTo(mid)})
				at = mid
			}
		}
		ws.reaches = append(ws.reaches, reach{i, at, at.angleTo(next)})
		at = next
	}
	var angle float64
	for i := range ws.reaches {
		angle += ws.reaches[i].angle
	}
	perWidth := float64(max(target, MinSlices)) / angle
	k, before := int32(0), -1
	for i := range ws.reaches {
		reach := &ws.reaches[i]
		col := &m.cols[reach.column]
		if reach.column != before {
			k, before = col.first, reach.column
		}
		if reach.angle > leastAngle {
			k = m.addArc(ws, col, k, reach, perWidth)
		}
	}
}

// reach is a stretch of an arc in one column and one layer: from a bearing over an angle, rad.
type reach struct {
	column int
	from   bearing
	angle  float64
}

// bearing is the angle of a point of an arc from the vertical through the centre, positive to the right, by its sine and cosine.
type bearing struct{ sin, cos float64 }

// bearingOf returns the bearing of the point at x of an arc about a centre with the given x.
func bearingOf(x, centre, curvature float64) bearing {
	s := min(max((x-centre)*curvature, -1), 1)
	return bearing{s, math.Sqrt((1 - s) * (1 + s))}
}

// angleTo returns the angle from one bearing to another further right.
func (b bearing) angleTo(to bearing) float64 {
	sin, cos := to.sin*b.cos-b.sin*to.cos, to.cos*b.cos+to.sin*b.sin
	if sin > cos {
		return math.Atan2(sin, cos)
	}
	return 2 * math.Atan(sin/(1+cos)) // Of so small a tangent it costs little.
}

// arcCuts lists in ws.cuts, from left to right, where the arc crosses boundaries between layers of a column from x = a to b; ya and yb are its levels
// there.
func (m *Model) arcCuts(ws *Workspace, col *column, a, b, ya, yb float64) {
	ws.cuts = ws.cuts[:0]
	c, r := ws.centre, ws.radius
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

// addArc adds the slices over a reach of the arc; it is walked by rotation from middle to middle. k is where to start looking for the layer; it
// returns the layer.
func (m *Model) addArc(ws *Workspace, col *column, k int32, over *reach, perWidth float64) int32 {
	c, r := ws.centre, ws.radius
	n := max(1, int(math.Ceil(over.angle*perWidth-crossingMargin)))
	delta := over.angle / float64(n)
	sinHalf, cosHalf := smallSincos(delta / 2)
	sinDelta, cosDelta := 2*sinHalf*cosHalf, 1-2*sinHalf*sinHalf
	// Area between arc and chord, R^2/2 (delta - sin delta), over the chord: how far the arc lies below it on the average.
	bulge := r * (delta - sinDelta) / (4 * sinHalf)
	length, chord, apothem := r*delta, 2*r*sinHalf, r*cosHalf
	sin, cos := over.from.sin*cosHalf+over.from.cos*sinHalf, over.from.cos*cosHalf-over.from.sin*sinHalf
	k = m.layerAt(col, k, c.X+apothem*sin, c.Y-apothem*cos-bulge/cos)
	l := &m.layers[k]
	wet := false
	for range n {
		s := ws.add()
		s.sin, s.cos = -sin, cos
		s.b = chord * cos
		s.x = c.X + apothem*sin
		s.y = c.Y - apothem*cos - bulge/cos
		wet = m.fill(s, col, l, length) || wet
		sin, cos = sin*cosDelta+cos*sinDelta, cos*cosDelta-sin*sinDelta
	}
	ws.wet = ws.wet || wet
	return k
}

// smallSincos returns sine and cosine of an angle, by their series where it is small.
func smallSincos(x float64) (sin, cos float64) {
	if x > seriesUpTo {
		return math.Sincos(x)
	}
	q := x * x
	sin = x * (1 - q*(1.0/6-q*(1.0/120-q*(1.0/5040-q*(1.0/362880)))))
	cos = 1 - q*(0.5-q*(1.0/24-q*(1.0/720-q*(1.0/40320))))
	return sin, cos
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
	if l.plain {
		m.fillPlain(s, col, l, length)
		return false
	}
	return m.fillAny(s, col, l, length)
}

// fillPlain is fillAny without what hardly any section has, for speed: searches spend half of their time here.
func (m *Model) fillPlain(s *slice, col *column, l *layer, length float64) {
	soil := (l.sigma + l.slope*s.x - l.gamma*s.y + col.pressure.at(s.x)) * s.b
	q := soil * m.vert
	var ul float64
	if l.pore == poreLine {
		ul = l.unit * max(0, col.water.at(s.x)-s.y) * length
	}
	cl := l.c * length
	s.soilW, s.q, s.h, s.k = soil, q, 0, 0
	s.variable, s.ground = col.variable, col.ground.at(s.x)
	s.tan, s.cl, s.ul = l.tan, cl, ul
	s.frees = cl*s.cos + (q-ul*s.cos)*l.tan
}

// fillAny is fill for all that a section may have.
func (m *Model) fillAny(s *slice, col *column, l *layer, length float64) (wet bool) {
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
		head := col.water.at(s.x)
		if col.fade != 0 {
			head = col.drained(head, s.x, s.y)
		}
		u = l.unit * max(0, head-s.y)
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

// drained returns the level of the piezometric head at a point over which drains lower the head from level w: see Drawdown.
func (col *column) drained(w, x, y float64) float64 {
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
