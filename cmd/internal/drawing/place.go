package drawing

import (
	"math"
)

// Costs of a position for a label, in points of distance from its anchor. They are set by eye.
const (
	labelGap     = 2.0  // points kept clear between two labels
	anchorGap    = 4.0  // points between an anchor and the nearest position of its label
	leaderFrom   = 9.0  // points beyond which a label needs a leader line
	leaderCost   = 9.0  // of needing a leader line
	leaderWeight = 30.0 // of each point of a leader line that a label covers
	hitCost      = 14.0 // of each heavy line that a label touches, beside what it covers
	crossCost    = 25.0 // of each heavy line that a leader line crosses
	buriedCost   = 40.0 // of a leader line that starts under another label
	leaderClear  = 2.5  // points between a leader line and other texts
)

// segment is a drawn line that labels should not cover, with the cost of each point of it covered.
type segment struct {
	a, b   xy
	weight float64
}

// placer finds room for labels. It is greedy: what is placed first stands.
type placer struct {
	area   Box   // Labels stay inside.
	taken  []Box // Texts.
	marks  []Box // Marks at anchors, such as that of a water level.
	ink    []segment
	leader [][2]xy
}

// avoid adds lines that labels should not cover; weight is the cost of each point covered.
func (p *placer) avoid(weight float64, lines ...[]xy) {
	for _, l := range lines {
		for i := 0; i+1 < len(l); i++ {
			p.ink = append(p.ink, segment{l[i], l[i+1], weight})
		}
	}
}

// free reports whether nothing that may not be covered stands in b.
func (p *placer) free(b Box) bool {
	if !b.Within(p.area) {
		return false
	}
	g := b.grown(labelGap / 2)
	for _, t := range p.taken {
		if g.Overlaps(t.grown(labelGap / 2)) {
			return false
		}
	}
	for _, m := range p.marks {
		if b.Overlaps(m) {
			return false
		}
	}
	return true
}

// covered returns the cost of the lines under b.
func (p *placer) covered(b Box) float64 {
	g := b.grown(1)
	var cost float64
	for i := range p.ink {
		s := &p.ink[i]
		if max(s.a.X, s.b.X) < g.MinX || min(s.a.X, s.b.X) > g.MaxX || max(s.a.Y, s.b.Y) < g.MinY || min(s.a.Y, s.b.Y) > g.MaxY {
			continue
		}
		long := clippedLength(s.a, s.b, g)
		cost += s.weight * long
		if long > 0 && s.weight >= heavy {
			cost += hitCost
		}
	}
	for _, l := range p.leader {
		cost += leaderWeight * clippedLength(l[0], l[1], g)
	}
	return cost
}

// leaderCosts returns the cost of a leader line from a to b, +Inf if it would run through a text.
func (p *placer) leaderCosts(a, b xy) float64 {
	cost := leaderCost
	for _, t := range p.taken {
		g := t.grown(leaderClear)
		switch {
		case clippedLength(a, b, g) == 0:
		case g.holds(a):
			cost += buriedCost // The anchor itself is under a text: no line avoids that.
		default:
			return math.Inf(1)
		}
	}
	for _, m := range p.marks {
		if clippedLength(a, b, m) > 0 && !m.holds(a) {
			cost += crossCost
		}
	}
	for _, l := range p.leader {
		if crosses(a, b, l[0], l[1]) {
			cost += 4 * crossCost
		}
	}
	for i := range p.ink {
		if s := &p.ink[i]; s.weight >= heavy && crosses(a, b, s.a, s.b) {
			cost += crossCost
		}
	}
	return cost
}

// spot is a place for a label.
type spot struct {
	box    Box
	leader bool // The label stands so far off that it needs a leader line.
}

// side is a direction from an anchor, rad counter-clockwise from the right.
type side float64

// The sides that labels prefer.
const (
	rightOf side = 0
	above   side = math.Pi / 2
	leftOf  side = math.Pi
	below   side = -math.Pi / 2
)

// turnCost is the cost of standing on the side opposite to the one preferred.
const turnCost = 8.0

// rings are the distances of the positions tried about an anchor, points.
var rings = []float64{0, 5, 12, 22, 34, 50, 70, 95, 125, 160}

// directions is the number of directions tried at each distance.
const directions = 16

// wish is what a label asks for.
type wish struct {
	w, h    float64 // Its size, points.
	anchor  xy
	prefer  side
	clear   float64 // Kept clear about the anchor beyond the usual gap, points.
	pointed bool    // The label has a leader line however near it stands.
}

// find returns the best room for a label near its anchor and its cost, +Inf if there is none.
func (p *placer) find(l wish) (spot, float64) {
	best, least := spot{}, math.Inf(1)
	try := func(b Box) {
		if !p.free(b) {
			return
		}
		if cost, s := p.cost(b, l, least); cost < least {
			best, least = s, cost
		}
	}
	for _, d := range rings {
		if d > least {
			break
		}
		for k := range directions {
			try(around(l.w, l.h, l.anchor, anchorGap+l.clear+d, 2*math.Pi*float64(k)/directions))
		}
	}
	if math.IsInf(least, 1) {
		p.sweep(l.w, l.h, try)
	}
	return best, least
}

// cost returns the cost of a free box for a label; it may stop early with a cost above the limit.
func (p *placer) cost(b Box, l wish, limit float64) (float64, spot) {
	s := spot{box: b}
	near := b.nearest(l.anchor)
	d := math.Hypot(near.X-l.anchor.X, near.Y-l.anchor.Y)
	c := b.centre()
	turn := math.Atan2(c.Y-l.anchor.Y, c.X-l.anchor.X) - float64(l.prefer)
	cost := d + turnCost*(1-math.Cos(turn))/2
	s.leader = l.pointed || d > leaderFrom+l.clear
	if cost >= limit {
		return cost, s
	}
	if s.leader {
		cost += p.leaderCosts(l.anchor, near)
	}
	if cost >= limit {
		return cost, s
	}
	return cost + p.covered(b), s
}

// sweep tries boxes all over the area.
func (p *placer) sweep(w, h float64, try func(Box)) {
	dx, dy := max(w/4, 6), max(h/2, 5)
	for x := p.area.MinX; x+w <= p.area.MaxX; x += dx {
		for y := p.area.MinY; y+h <= p.area.MaxY; y += dy {
			try(Box{x, y, x + w, y + h})
		}
	}
}

// take keeps a spot from other labels.
func (p *placer) take(s spot, anchor xy) {
	p.taken = append(p.taken, s.box)
	if s.leader {
		p.leader = append(p.leader, [2]xy{anchor, s.box.nearest(anchor)})
	}
}

// around returns the box of w by h that stands off from the anchor by gap in a direction.
func around(w, h float64, anchor xy, gap, angle float64) Box {
	s, c := math.Sincos(angle)
	// The box's centre moves on a rectangle about the anchor, so that its nearest edge keeps the gap.
	k := 1 / max(math.Abs(c), math.Abs(s))
	x := anchor.X + c*gap + c*k*w/2
	y := anchor.Y + s*gap + s*k*h/2
	return Box{x - w/2, y - h/2, x + w/2, y + h/2}
}

// clippedLength returns how much of the line from a to b lies inside the box, points.
func clippedLength(a, b xy, box Box) float64 {
	p, q, ok := clipSegment(a, b, box)
	if !ok {
		return 0
	}
	return math.Hypot(q.X-p.X, q.Y-p.Y)
}

// crosses reports whether the lines a-b and c-d cross at an inner point of both.
func crosses(a, b, c, d xy) bool {
	turn := func(p, q, r xy) float64 { return (q.X-p.X)*(r.Y-p.Y) - (q.Y-p.Y)*(r.X-p.X) }
	return turn(a, b, c)*turn(a, b, d) < 0 && turn(c, d, a)*turn(c, d, b) < 0
}
