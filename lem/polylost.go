package lem

import (
	"math"
	"slices"
)

// nudges are the changes with which a trial that did not converge is tried again: a direction of shift and by how much, as a share of the
// length, or of the depth where it bends.
var nudges = [...]struct {
	dir int
	by  float64
}{{4, 0.01}, {4, -0.01}, {1, 0.01}, {0, -0.01}, {5, 0.02}, {6, 0.02}, {5, -0.02}, {6, -0.02}}

// keepLost keeps a trial that did not converge if its screen is among the lowest.
func (p *polySearch) keepLost(t *polyTrial) {
	if math.IsNaN(t.r.Screen) || t.r.Screen >= p.bound() {
		return
	}
	if t.r.Screen = p.screen(t); t.r.Screen >= p.bound() {
		return
	}
	if len(p.lost) < MaxUnresolved {
		p.lost = append(p.lost, t.clone())
		return
	}
	worst := slices.MaxFunc(p.lost, compareScreens)
	if t.r.Screen >= worst.r.Screen {
		return
	}
	for i := range p.lost {
		if p.lost[i].r.Screen == worst.r.Screen {
			p.lost[i].set(t)
			return
		}
	}
}

// screen returns the F by which a trial without an answer is suspected: that of the Ordinary method or, where higher, of Janbu without f0. On a
// sharply bent line the Ordinary method leaves nearly all of the weight off the base that rises to the exit, and its F says nothing; Janbu's is
// at or below that of the rigorous methods (Janbu 1973: f0 from 1.00 to about 1.13; recalled from memory).
func (p *polySearch) screen(t *polyTrial) float64 {
	slip, setting := Slip{Kind: Polyline, Nodes: t.nodes}, p.setting
	setting.Method = JanbuPlain
	if r := p.s.m.FS(&p.s.ws, &slip, setting); r.Status == Converged {
		return max(t.r.Screen, r.F)
	}
	return t.r.Screen
}

func compareScreens(a, b polyTrial) int {
	switch {
	case a.r.Screen < b.r.Screen:
		return -1
	case a.r.Screen > b.r.Screen:
		return 1
	}
	return 0
}

// resolve tries the lost trials again: with every method, and nudged a little. The equations of a sharply bent line may have no answer where
// its neighbours have one, and the neighbour stands for it. What has no answer even so is unresolved. It returns the answers.
func (p *polySearch) resolve(methods []Method) (found []candidate) {
	lost := p.lost
	p.lost = nil
	failed := p.s.failed
	slices.SortStableFunc(lost, compareScreens)
	first := p.setting
	for i := range lost {
		n, ok := p.answered(&lost[i], methods)
		if !ok {
			p.s.unres = append(p.s.unres, Minimum{Slip{Kind: Polyline, Nodes: lost[i].nodes}, first, lost[i].r})
		}
		found = append(found, candidatesOf([]polyTrial{n}, p.setting)...)
		p.setting = first
	}
	p.s.failed = failed
	p.lost = nil
	return found
}

// answered looks for an answer of a lost trial or a close neighbour, admissible or not, with the method that it leaves in force.
func (p *polySearch) answered(t *polyTrial, methods []Method) (n polyTrial, ok bool) {
	length := t.nodes[len(t.nodes)-1].X - t.nodes[0].X
	depth := t.r.Depth
	for k := -1; k < len(nudges); k++ {
		for _, method := range methods {
			n.set(t)
			if k >= 0 {
				by := nudges[k].by * length
				if nudges[k].dir >= 4 {
					by = nudges[k].by * depth
				}
				if p.shift(n.nodes, nudges[k].dir, by); !p.mend(n.nodes) {
					continue
				}
			}
			p.setting.Method = method
			if p.try(&n); n.r.Status == Converged || n.r.Status == Inadmissible {
				return n, true
			}
		}
	}
	n.r.F = math.Inf(1)
	return n, false
}
