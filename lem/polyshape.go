package lem

import "math"

// Rules for the shape of trial polylines. They are concave upwards: seen in the direction of movement the base is steepest at the head and
// turns up towards the exit, so that the body can move without a corner that sticks.
const (
	steepestHead  = 80 * math.Pi / 180 // The head may not be steeper.
	exitAllowance = 15 * math.Pi / 180 // The exit may not rise more steeply than Rankine's passive wedge, 45 degrees - phi/2, and this.
	// In a concave slip every part rises against its uphill neighbour and is dragged down by it: lambda is positive. The equations of
	// force and moment have further roots with lambda below 0 and a low F, which no slip can follow: a descent that may go to -0.1 bends trials
	// into deep wedges until they reach that, and brought F of undrained banks down to half of that of the circle.
	leastLambda   = -closureTol
	turnTol       = 1e-6 // A bend to the wrong side of less than this, as a difference of slope, is rounding.
	shortestPiece = 2e-3 // Nodes of a trial stay this share of its length apart.
	mostDeepening = 1.6  // A trial shallower than the depth of interest is deepened by at most this factor.
	polyOvershoot = 1e-3 // It is brought to within this share below the depth of interest.
	deepenings    = 3    // It takes more than one where the ground bends over a piece.
	circlePieces  = 7    // Straight pieces for a whole circle.
	arcPiece      = 0.13 // Greatest angle of the pieces of the arcs of a composite slip, rad: F within 0.1 % of the arc,
	arcPieces     = 12   // and the most of them to an arc.
)

// concave reports whether the nodes bend to the right side only.
func concave(nodes []Point) bool {
	for i := 2; i < len(nodes); i++ {
		a, b, c := nodes[i-2], nodes[i-1], nodes[i]
		if (c.Y-b.Y)/(c.X-b.X) < (b.Y-a.Y)/(b.X-a.X)-turnTol {
			return false
		}
	}
	return true
}

// bow makes nodes concave upwards: those above the lower convex hull are put down onto it. stack is memory to use.
func bow(nodes []Point, stack []int) []int {
	stack = stack[:0]
	for i, p := range nodes {
		for n := len(stack); n >= 2; n-- {
			a, b := nodes[stack[n-2]], nodes[stack[n-1]]
			if (b.X-a.X)*(p.Y-a.Y)-(b.Y-a.Y)*(p.X-a.X) > 0 {
				break
			}
			stack = stack[:n-1]
		}
		stack = append(stack, i)
	}
	for k := 0; k+1 < len(stack); k++ {
		a, b := nodes[stack[k]], nodes[stack[k+1]]
		for i := stack[k] + 1; i < stack[k+1]; i++ {
			nodes[i].Y = a.Y + (b.Y-a.Y)*(nodes[i].X-a.X)/(b.X-a.X)
		}
	}
	return stack
}

// groundAt returns the level of the ground at x, m.
func (m *Model) groundAt(x float64) float64 { return m.cols[m.columnAt(x)].ground.at(x) }

// appendArc appends the nodes inside an arc of a circle between two angles, by equal angles. They lie a little outside the circle, so that the
// pieces lie on it on the average: R (1 + delta^2/12) takes away the mean distance of the chord from the arc.
func appendArc(dst []Point, c Point, r, from, to float64, pieces int) []Point {
	d := (to - from) / float64(pieces)
	r *= 1 + d*d/12
	for i := 1; i < pieces; i++ {
		sin, cos := math.Sincos(from + d*float64(i))
		dst = append(dst, Point{c.X + r*sin, c.Y - r*cos})
	}
	return dst
}

// inscribed appends the polyline that stands for the part of a circle between two points of it: so many pieces, fewer where they would be
// shorter than an angle.
func inscribed(dst []Point, c Point, r float64, from, to Point, most int, piece float64) []Point {
	angle := func(p Point) float64 { return math.Asin(min(max((p.X-c.X)/r, -1), 1)) }
	a, b := angle(from), angle(to)
	dst = append(dst, from)
	dst = appendArc(dst, c, r, a, b, min(most, int(math.Ceil((b-a)/piece))))
	return append(dst, to)
}

// spaced reports whether x increases from node to node by enough.
func spaced(nodes []Point) bool {
	least := shortestPiece * (nodes[len(nodes)-1].X - nodes[0].X)
	for i := 1; i < len(nodes); i++ {
		if !(nodes[i].X-nodes[i-1].X > least) {
			return false
		}
	}
	return least > 0
}

// mend makes a trial admissible where a small change does it: ends on the ground, concave upwards, clear of the firm base and deep enough. It
// reports whether there is a trial left.
func (p *polySearch) mend(nodes []Point) bool {
	m := p.s.m
	n := len(nodes)
	if !spaced(nodes) || nodes[0].X < m.cols[0].x0 || nodes[n-1].X > m.cols[len(m.cols)-1].x1 {
		return false
	}
	nodes[0].Y, nodes[n-1].Y = m.groundAt(nodes[0].X), m.groundAt(nodes[n-1].X)
	if m.firm {
		for i := 1; i < n-1; i++ {
			nodes[i].Y = max(nodes[i].Y, m.cols[m.columnAt(nodes[i].X)].firm.at(nodes[i].X))
		}
	}
	p.stack = bow(nodes, p.stack)
	return p.s.o.MinDepth <= 0 || p.deepen(nodes)
}

// deepen brings a trial that is somewhat too shallow down to the depth of interest: minima often lie there. It reports whether the trial is deep
// enough in the end.
func (p *polySearch) deepen(nodes []Point) bool {
	m, n := p.s.m, len(nodes)
	least := p.s.o.MinDepth
	for range deepenings {
		depth, _ := m.polylineDepth(m.span(nodes[0].X, nodes[n-1].X), &Slip{Kind: Polyline, Nodes: nodes})
		if depth >= least {
			return true
		}
		factor := least * (1 + polyOvershoot/2) / depth
		if !(factor < mostDeepening) {
			return false
		}
		for i := 1; i < n-1; i++ {
			g := m.groundAt(nodes[i].X)
			nodes[i].Y = g - (g-nodes[i].Y)*factor
		}
		p.stack = bow(nodes, p.stack)
	}
	return false
}

// trim leaves only the part of the nodes that its answer is of, where the ground cuts off more than a piece; the longest pieces are halved to keep
// the number. What is cut off would only stand in the way of the descent. Above a tension crack nothing is cut off.
func (t *polyTrial) trim() {
	n := len(t.nodes)
	from, to := t.r.From, t.r.To
	gap := shortestPiece * (t.nodes[n-1].X - t.nodes[0].X)
	if math.IsInf(t.r.F, 1) || t.r.Crack > 0 || from.X-t.nodes[0].X <= gap && t.nodes[n-1].X-to.X <= gap {
		return
	}
	kept := append(t.nodes[:0:0], from)
	for _, p := range t.nodes {
		if p.X > from.X+gap && p.X < to.X-gap {
			kept = append(kept, p)
		}
	}
	t.nodes = append(t.nodes[:0], insertNodes(append(kept, to), n)...)
}

// sound reports whether head and exit of an answer are no steeper than the rules allow, and the interslice forces those of a slip that moves.
func (m *Model) sound(nodes []Point, r *Result) bool {
	if r.Lambda < leastLambda {
		return false
	}
	left, right := slopeAt(nodes, r.From.X, 1), slopeAt(nodes, r.To.X, -1)
	head, exit, x := -left, right, r.To.X
	if r.Leftward {
		head, exit, x = right, -left, r.From.X
	}
	if head > math.Tan(steepestHead) {
		return false
	}
	if exit <= math.Tan(exitAllowance) { // Flatter than the passive wedge of any soil.
		return true
	}
	c := &m.cols[m.columnAt(x)]
	l := &m.layers[c.first]
	return math.Atan(exit) <= math.Pi/4-math.Atan(l.tan)/2+exitAllowance
}

// slopeAt returns the slope of the piece that starts (side 1) or ends (side -1) at x or holds it.
func slopeAt(nodes []Point, x float64, side int) float64 {
	i := 0
	for i+2 < len(nodes) && (x > nodes[i+1].X || x == nodes[i+1].X && side > 0) {
		i++
	}
	a, b := nodes[i], nodes[i+1]
	return (b.Y - a.Y) / (b.X - a.X)
}
