package lem

import "math"

// Constants of the descent by directions.
const (
	maxDirections = 96
	stepGrow      = 1.6
	stepShrink    = 0.35
	stepSmallest  = 2e-3 // A direction rests when its step has shrunk to this share of the first.
	sweepGain     = 3e-5 // A sweep that gains less than this share of F is the last.
	bendStep      = 0.12 // First steps: of nodes, as a share of the depth,
	slideStep     = 0.04 // along their pieces and of the ends, as a share of the length.
	endStep       = 0.05
)

// mover is a set of directions in which a trial can be changed, with the step of each.
type mover struct {
	dirs int
	step [maxDirections]float64
	move func(to, from *polyTrial, dir int, by float64) // Sets to to from moved, and evaluates it.
}

// follow goes downhill direction by direction: a step that lowers F is taken and the next one is longer; where neither way lowers it, the vertex
// of the parabola through the three values is tried and the step shortened. A deterministic descent without derivatives, for
// functions with kinks.
func (p *polySearch) follow(t *polyTrial, m *mover, budget int) {
	trial, other := &polyTrial{}, &polyTrial{}
	var smallest [maxDirections]float64
	for d := range m.dirs {
		smallest[d] = m.step[d] * stepSmallest
	}
	used := 0
	for used < budget {
		before, moved := t.r.F, false
		for d := 0; d < m.dirs && used < budget; d++ {
			h := m.step[d]
			if math.Abs(h) < smallest[d] {
				continue
			}
			moved = true
			m.move(trial, t, d, h)
			used++
			if trial.r.F < t.r.F {
				t.set(trial)
				m.step[d] = h * stepGrow
				continue
			}
			m.move(other, t, d, -h)
			used++
			if other.r.F < t.r.F {
				t.set(other)
				m.step[d] = -h * stepGrow
				continue
			}
			m.step[d] = h * stepShrink
			if bend := trial.r.F + other.r.F - 2*t.r.F; bend > 0 && !math.IsInf(bend, 1) {
				by := h * (other.r.F - trial.r.F) / (2 * bend)
				m.move(trial, t, d, by)
				used++
				if trial.r.F < t.r.F {
					t.set(trial)
				}
			}
		}
		if !moved || before-t.r.F <= sweepGain*before && m.small(&smallest) {
			return
		}
	}
}

// small reports whether the steps are all well shrunk.
func (m *mover) small(smallest *[maxDirections]float64) bool {
	for d := range m.dirs {
		if math.Abs(m.step[d]) > 25*smallest[d] {
			return false
		}
	}
	return true
}

// descend improves the nodes of a trial: its ends, bends over the whole length and parts of it, and every node up and down and along the pieces
// beside it.
func (p *polySearch) descend(t *polyTrial, budget int) {
	if math.IsInf(t.r.F, 1) {
		return
	}
	t.family = freeNodes
	n := len(t.nodes)
	length := t.nodes[n-1].X - t.nodes[0].X
	inner := n - 2
	m := mover{dirs: min(4+len(bends)+3*inner, maxDirections)}
	for d := range m.dirs {
		switch {
		case d < 4:
			m.step[d] = endStep * length
		case d < 4+len(bends) || (d-4-len(bends))%3 == 0:
			m.step[d] = bendStep * t.r.Depth
		default:
			m.step[d] = slideStep * length
		}
	}
	m.move = func(to, from *polyTrial, d int, by float64) {
		to.set(from)
		to.r.F = math.Inf(1)
		if p.shift(to.nodes, d, by); p.mend(to.nodes) {
			p.try(to)
			to.trim()
		}
	}
	p.follow(t, &m, budget)
}

// bends are the intervals, as shares of the length, over which a trial is bent as a whole.
var bends = [...][2]float64{{0, 1}, {0, 0.6}, {0.4, 1}, {0, 0.35}, {0.2, 0.55}, {0.45, 0.8}, {0.65, 1}}

// shift moves the nodes in direction d: 0 and 1 move an end, 2 and 3 an end and the rest with it in proportion, then the bends, then for
// every inner node up, along the piece to its left and along that to its right.
func (p *polySearch) shift(nodes []Point, d int, by float64) {
	n := len(nodes)
	x0, length := nodes[0].X, nodes[n-1].X-nodes[0].X
	switch {
	case d == 0:
		nodes[0].X += by
	case d == 1:
		nodes[n-1].X += by
	case d < 4:
		end := (d - 2) * (n - 1)
		dy := p.s.m.groundAt(nodes[end].X+by) - nodes[end].Y
		for i := range nodes {
			w := (nodes[i].X - x0) / length
			if end == 0 {
				w = 1 - w
			}
			nodes[i].X += by * w
			nodes[i].Y += dy * w
		}
	case d < 4+len(bends):
		over := bends[d-4]
		for i := 1; i < n-1; i++ {
			if u := ((nodes[i].X-x0)/length - over[0]) / (over[1] - over[0]); u > 0 && u < 1 {
				nodes[i].Y += by * 4 * u * (1 - u)
			}
		}
	default:
		d -= 4 + len(bends)
		slide(nodes, 1+d/3, d%3, by)
	}
}

// slide moves one inner node: way 0 up, 1 along the piece to its left, 2 along the piece to its right.
func slide(nodes []Point, i, way int, by float64) {
	q := &nodes[i]
	if way == 0 {
		q.Y += by
		return
	}
	a := nodes[i-1]
	if way == 2 {
		a = nodes[i+1]
	}
	slope := (a.Y - q.Y) / (a.X - q.X)
	by /= math.Hypot(1, slope)
	q.X += by
	q.Y += by * slope
}
