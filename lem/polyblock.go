package lem

import (
	"math"
	"slices"
)

// polyFamily tells how a trial polyline is made.
type polyFamily uint8

const (
	freeNodes polyFamily = iota // Nodes of their own.
	wedges                      // A straight head, along a rail, a straight exit.
	cutCircle                   // A circle cut off by a rail.
)

// Ranges of the inclination of wedges, rad; about Rankine's 45 degrees + phi/2 and 45 degrees - phi/2.
const (
	headFlattest, headSteepest = 30 * math.Pi / 180, 78 * math.Pi / 180
	exitFlattest, exitSteepest = 2 * math.Pi / 180, 52 * math.Pi / 180
	snapToEnds                 = 0.08 // Share of trials that leave a rail at one of its ends.
	railStep                   = 0.10 // First step of the descent in the parameters of a rail's trial, in their range.
	railSweeps                 = 10
)

// alongRail returns the lowest distinct slips along a rail, each descended in its few parameters.
func (p *polySearch) alongRail(k int) []polyTrial {
	var ts []polyTrial
	q := sequence4Of(p.s.o.Seed + uint64(k))
	for _, f := range [...]struct {
		family polyFamily
		n      int
	}{{wedges, blockTrials}, {cutCircle, cutTrials}} {
		for i := range int(math.Ceil(float64(f.n) * p.s.o.Effort)) {
			t := &p.trial
			t.family, t.rail, t.v = f.family, k, q.at(i)
			for j := range 2 {
				t.v[j] = min(max((1+2*snapToEnds)*t.v[j]-snapToEnds, 0), 1)
			}
			if t.v[0] > t.v[1] {
				t.v[0], t.v[1] = t.v[1], t.v[0]
			}
			t.left = p.headOnRight(t, i)
			if p.build(t); !math.IsInf(t.r.F, 1) {
				ts = append(ts, t.clone())
			}
		}
	}
	ts = p.distinct(ts)
	for i := range ts {
		if i >= p.count(trialsPerRail) || ts[i].r.F > max(railSeedsUpTo*p.bound(), p.s.o.Below) {
			ts = ts[:i]
			break
		}
		p.descendRail(&ts[i])
	}
	return ts
}

// bound is the lowest F so far, circles included.
func (p *polySearch) bound() float64 {
	f := p.lowest
	if len(p.s.found) > 0 {
		f = min(f, p.s.found[0].r.F)
	}
	return f
}

// ends returns where a trial joins its rail and where it leaves it.
func (p *polySearch) ends(t *polyTrial) (a, b Point) {
	r := &p.rails[t.rail]
	from, to := max(r.from(), p.s.m.left), min(r.to(), p.s.m.right)
	return r.at(from + t.v[0]*(to-from)), r.at(from + t.v[1]*(to-from))
}

// headOnRight guesses on which side of the rail the head is: that of the higher ground; if both are level, either in turn.
func (p *polySearch) headOnRight(t *polyTrial, i int) bool {
	a, b := p.ends(t)
	ga, gb := p.s.m.groundAt(a.X), p.s.m.groundAt(b.X)
	if ga == gb {
		return i%2 == 0
	}
	return gb > ga
}

// build makes the nodes of a rail's trial from its parameters and evaluates them.
func (p *polySearch) build(t *polyTrial) {
	t.r.F = math.Inf(1)
	a, b := p.ends(t)
	t.nodes = t.nodes[:0]
	ok := b.X > a.X
	if ok && t.family == wedges {
		ok = p.buildWedges(t, a, b)
	} else if ok {
		ok = p.buildCut(t, a, b)
	}
	if !ok || !spaced(t.nodes) || !p.turnsUp(t, a, b) {
		return
	}
	if p.s.o.MinDepth > 0 && concave(t.nodes) && !p.deepen(t.nodes) {
		return
	}
	p.try(t)
}

// turnsUp reports whether the slip is concave upwards where it joins and where it leaves the rail. The rail itself may bend as it does.
func (p *polySearch) turnsUp(t *polyTrial, a, b Point) bool {
	for i := 1; i+1 < len(t.nodes); i++ {
		if q := t.nodes[i]; (q == a || q == b) && !concave(t.nodes[i-1:i+2]) {
			return false
		}
	}
	return true
}

// buildWedges makes a straight head at one end of the stretch of rail and a straight exit at the other.
func (p *polySearch) buildWedges(t *polyTrial, a, b Point) bool {
	head := headFlattest + t.v[2]*(headSteepest-headFlattest)
	exit := exitFlattest + t.v[3]*(exitSteepest-exitFlattest)
	left, right := head, exit
	if t.left {
		left, right = exit, head
	}
	from, ok := p.s.m.daylight(a, Point{a.X + 1, a.Y - math.Tan(left)})
	if !ok {
		return false
	}
	to, ok := p.s.m.daylight(b, Point{b.X - 1, b.Y - math.Tan(right)})
	if !ok {
		return false
	}
	p.join(t, from, a, b, to)
	return true
}

// join sets the nodes: from the ground down to the rail, along it, and up again. No wedge where the rail itself comes to the ground.
func (p *polySearch) join(t *polyTrial, from float64, a, b Point, to float64) {
	m := p.s.m
	if from < a.X {
		t.nodes = append(t.nodes, Point{from, m.groundAt(from)})
	}
	t.nodes = append(t.nodes, a)
	t.nodes = p.rails[t.rail].appendBetween(t.nodes, a.X, b.X)
	t.nodes = append(t.nodes, b)
	if to > b.X {
		t.nodes = append(t.nodes, Point{to, m.groundAt(to)})
	}
}

// buildCut makes the circle through both ends of the stretch of rail, with the rail instead of the arc between them.
func (p *polySearch) buildCut(t *polyTrial, a, b Point) bool {
	c, r := arcThrough(a, b, flattest+t.v[2]*(roundest-flattest))
	p.s.m.circleParts(&p.s.ws, c, r)
	k := slices.IndexFunc(p.s.ws.parts, func(q part) bool { return q.from <= a.X && q.to >= b.X })
	if k < 0 {
		return false
	}
	p.composite(t, c, r, p.s.ws.parts[k], a, b)
	return true
}

// composite sets the nodes of a circle that a rail cuts off between two of its points.
func (p *polySearch) composite(t *polyTrial, c Point, r float64, over part, a, b Point) {
	m := p.s.m
	from, to := Point{over.from, m.groundAt(over.from)}, Point{over.to, m.groundAt(over.to)}
	t.nodes = inscribed(t.nodes, c, r, from, a, arcPieces, arcPiece)
	t.nodes = p.rails[t.rail].appendBetween(t.nodes, a.X, b.X)
	t.nodes = inscribed(t.nodes, c, r, b, to, arcPieces, arcPiece)
}

// descendRail improves a trial of a rail in its parameters, one after the other, with steps that grow on success and shrink on failure.
func (p *polySearch) descendRail(t *polyTrial) {
	dims := 4
	if t.family == cutCircle {
		dims = 3
	}
	m := mover{dirs: dims}
	for i := range dims {
		m.step[i] = railStep
	}
	m.move = func(to, from *polyTrial, d int, by float64) {
		to.set(from)
		to.v[d] = min(max(to.v[d]+by, 0), 1)
		p.build(to)
	}
	p.follow(t, &m, railSweeps*3*dims)
}
