package lem

import (
	"context"
	"math"
	"slices"
)

// Effort of the search for polylines; docs/theory.md tells how it was set.
const (
	blockTrials   = 160  // Wedge-shaped trials along each rail,
	cutTrials     = 80   // and circles cut off by it.
	trialsPerRail = 6    // Seeds taken from each rail,
	railSeedsUpTo = 1.6  // with F up to this multiple of the lowest.
	circleSeeds   = 8    // Seeds taken from the circles,
	circlesUpTo   = 1.5  // with F up to this multiple of the lowest.
	coarseSeeds   = 14   // Seeds that are descended from,
	coarseUpTo    = 1.25 // with F up to this multiple of the lowest.
	fineSeeds     = 6    // Basins that get more nodes,
	fineUpTo      = 1.06 // with F up to this multiple of the lowest.
	coarseTrials  = 320
	fineTrials    = 1000
	coarseNodes   = 10 // A seed gets nodes up to this number,
	fineNodes     = 15 // and a basin near the lowest up to this.
)

// polyTrial is a trial polyline with its answer. Those of a rail carry the parameters they were made from.
type polyTrial struct {
	nodes  []Point
	r      Result
	family polyFamily
	rail   int
	v      [4]float64
	left   bool // The head is taken to be on the right.
}

// set makes t a copy of o.
func (t *polyTrial) set(o *polyTrial) {
	nodes := append(t.nodes[:0], o.nodes...)
	*t = *o
	t.nodes = nodes
}

func (t *polyTrial) clone() polyTrial {
	c := *t
	c.nodes = slices.Clone(t.nodes)
	return c
}

// polySearch is the state of a search for polylines: seeds along rails and from circles, a descent in the few parameters of a seed, then in its
// nodes.
type polySearch struct {
	s       *searcher
	setting Setting
	rails   []rail
	trial   polyTrial   // Of the moment.
	lost    []polyTrial // Trials that did not converge, some of those with the lowest screens.
	stack   []int
	lowest  float64
}

// searchPolylines files the critical polylines in s.polys, the circles being done.
func (s *searcher) searchPolylines(ctx context.Context) {
	p := &polySearch{s: s, setting: s.setting, lowest: math.Inf(1)}
	methods := s.polyMethods()
	p.setting.Method = methods[0]
	p.rails = s.m.rails(&s.ws)
	seeds := p.fromCircles()
	for i := range p.rails {
		if ctx.Err() != nil {
			return
		}
		seeds = append(seeds, p.alongRail(i)...)
	}
	basins := p.improve(ctx, p.distinct(seeds), p.count(coarseSeeds), coarseUpTo, coarseNodes, coarseTrials)
	basins = p.improve(ctx, basins, p.count(fineSeeds), fineUpTo, fineNodes, fineTrials)
	s.polys = append(s.polys, candidatesOf(basins, p.setting)...)
	for _, method := range methods[1:] {
		p.setting.Method = method
		again := make([]polyTrial, min(len(basins), p.count(fineSeeds)))
		for i := range again {
			again[i] = basins[i].clone()
			p.try(&again[i])
		}
		again = p.distinct(again)
		again = p.improve(ctx, again, len(again), fineUpTo, fineNodes, fineTrials)
		s.polys = append(s.polys, candidatesOf(again, p.setting)...)
	}
	p.setting.Method = methods[0]
	s.polys = append(s.polys, s.distinct(p.resolve(methods))...)
}

// polyMethods lists the methods that polylines are evaluated with.
func (s *searcher) polyMethods() []Method {
	ms := slices.DeleteFunc(slices.Clone(s.o.Methods), func(m Method) bool { return m == Bishop })
	if len(ms) == 0 {
		ms = GoverningMethods(Polyline)
	}
	return ms
}

// candidatesOf returns trials as candidates of the search, without those that have no answer.
func candidatesOf(ts []polyTrial, o Setting) []candidate {
	var out []candidate
	for i := range ts {
		if t := &ts[i]; !math.IsInf(t.r.F, 1) {
			out = append(out, candidate{slip: Slip{Kind: Polyline, Nodes: slices.Clone(t.nodes)}, setting: o, r: t.r})
		}
	}
	return out
}

// count scales a number of seeds with the effort.
func (p *polySearch) count(n int) int { return int(math.Ceil(float64(n) * math.Sqrt(p.s.o.Effort))) }

// try evaluates the nodes of a trial; without an admissible answer its F is +Inf. The reason goes into the counts.
func (p *polySearch) try(t *polyTrial) {
	slip := Slip{Kind: Polyline, Nodes: t.nodes}
	t.r = p.s.m.FS(&p.s.ws, &slip, p.setting)
	switch t.r.Status {
	case Converged:
		if p.s.m.sound(t.nodes, &t.r) {
			p.lowest = min(p.lowest, t.r.F)
			return
		}
		p.s.barred++
	case NotConverged:
		if !p.s.m.sound(t.nodes, &t.r) { // Its shape alone bars it: it needs no answer.
			p.s.barred++
			break
		}
		p.s.failed++
		p.keepLost(t)
	case Inadmissible:
		p.s.barred++
	case Missed:
	}
	t.r.F = math.Inf(1)
}

// fromCircles returns the polylines inscribed in the circles near the lowest.
func (p *polySearch) fromCircles() []polyTrial {
	var out []polyTrial
	circles := slices.Clone(p.s.found)
	slices.SortFunc(circles, compareCandidates)
	for _, c := range circles[:min(len(circles), p.count(circleSeeds))] {
		if c.r.F > max(circlesUpTo*circles[0].r.F, p.s.o.Below) {
			break
		}
		from, to := p.s.m.uncracked(&p.s.ws, &c.slip, &c.r)
		t := polyTrial{nodes: inscribed(nil, c.slip.Centre, c.slip.Radius, from, to, circlePieces, flattest)}
		if !p.mend(t.nodes) {
			continue
		}
		if p.try(&t); !math.IsInf(t.r.F, 1) {
			out = append(out, t)
		}
	}
	return out
}

// distinct sorts trials and leaves out those in the basin of a lower one.
func (p *polySearch) distinct(ts []polyTrial) []polyTrial {
	slices.SortStableFunc(ts, func(a, b polyTrial) int {
		return compareCandidates(candidate{r: a.r}, candidate{r: b.r})
	})
	var out []polyTrial
	for i := range ts {
		same := func(o polyTrial) bool { return p.s.sameBasin(&o.r, &ts[i].r) }
		if !math.IsInf(ts[i].r.F, 1) && !slices.ContainsFunc(out, same) {
			out = append(out, ts[i])
		}
	}
	return out
}

// improve descends from the lowest of the trials, sorted, in their nodes; the others stay as they are.
func (p *polySearch) improve(ctx context.Context, ts []polyTrial, most int, upTo float64, nodes, budget int) []polyTrial {
	out := make([]polyTrial, 0, len(ts))
	for i := range ts {
		t := ts[i].clone()
		if i < most && t.r.F <= max(upTo*ts[0].r.F, p.s.o.Below) && concave(t.nodes) && ctx.Err() == nil {
			t.trim()
			t.nodes = insertNodes(thinNodes(t.nodes, nodes), nodes)
			p.try(&t)
			p.descend(&t, budget)
			if !(t.r.F < ts[i].r.F) { // Fewer nodes may have cost more than the descent gained.
				t = ts[i].clone()
			}
		}
		out = append(out, t)
	}
	return p.distinct(out)
}

// thinNodes leaves out nodes that do not bend the line, and then those that bend it least until there are at most so many.
func thinNodes(nodes []Point, most int) []Point {
	const tol = hairShare / 10
	length := nodes[len(nodes)-1].X - nodes[0].X
	for len(nodes) > 2 {
		k, least := 0, math.Inf(1)
		for i := 1; i+1 < len(nodes); i++ {
			a, p, b := nodes[i-1], nodes[i], nodes[i+1]
			if area := math.Abs((p.X-a.X)*(b.Y-a.Y) - (p.Y-a.Y)*(b.X-a.X)); area < least {
				k, least = i, area
			}
		}
		if len(nodes) <= most && least > tol*length*(nodes[k+1].X-nodes[k-1].X) {
			break
		}
		nodes = slices.Delete(nodes, k, k+1)
	}
	return nodes
}

// insertNodes halves the longest pieces until there are so many nodes.
func insertNodes(nodes []Point, n int) []Point {
	for len(nodes) < n {
		k, longest := 0, 0.0
		for i := 1; i < len(nodes); i++ {
			if d := math.Hypot(nodes[i].X-nodes[i-1].X, nodes[i].Y-nodes[i-1].Y); d > longest {
				k, longest = i, d
			}
		}
		a, b := nodes[k-1], nodes[k]
		nodes = slices.Insert(nodes, k, Point{(a.X + b.X) / 2, (a.Y + b.Y) / 2})
	}
	return nodes
}
