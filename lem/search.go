package lem

import (
	"context"
	"math"
	"slices"
)

// Search constants: how many trials the default effort spends, and what counts as the same basin. docs/theory.md tells how they were set.
const (
	trialsPerPair   = 24   // Trials for each pair of head and exit zones, ByDaylight,
	tangentsPerPair = 2    // and for each boundary between soils that they may touch.
	trialsByCentre  = 9000 // Trials in all, ByCentre.
	startsUpTo      = 2.0  // Cells up to this multiple of the lowest F are descended from,
	polishUpTo      = 1.10 // basins up to this multiple are polished with every further method.
	sameBasinPlace  = 0.01 // Ends closer than this share of the width and
	sameBasinDepth  = 0.05 // depths closer than this share make the same basin.
	roundsOfDescent = 4    // A descent starts again from where it ended until that gains nothing, at most so often.
)

// Search finds the critical circles: a stratified low-discrepancy sweep over where a slip leaves the ground at head and exit and how deep it
// goes, then a descent from every cell of the sweep that is lower than its neighbours, then again with every further governing method.
// It is deterministic. The error is that of the context.
func (m *Model) Search(ctx context.Context, o SearchOptions) (Minima, error) {
	s := newSearcher(m, o)
	s.sweep(ctx)
	starts := s.starts()
	for _, st := range starts {
		if ctx.Err() != nil {
			break
		}
		s.found = append(s.found, s.descend(st, s.scale(st)))
	}
	s.found = s.distinct(s.found)
	s.improvePinned(ctx)
	s.tryKnown()
	if s.o.Polylines && ctx.Err() == nil {
		s.searchPolylines(ctx)
	}
	s.polish(ctx)
	return s.minima(), ctx.Err()
}

// searcher is the state of one search.
type searcher struct {
	m       *Model
	o       SearchOptions
	methods []Method
	setting Setting
	ws      Workspace
	zones   []Range
	cells   map[cell]candidate
	found   []candidate
	extra   []candidate // From the further methods.
	polys   []candidate // Polylines.
	known   []candidate // Known slip surfaces.
	unres   []Minimum
	failed  int
	barred  int
	lowest  float64
}

// vector is a trial in the parameters of the sampler.
type vector [3]float64

// candidate is a trial with its answer.
type candidate struct {
	p       vector
	slip    Slip
	setting Setting
	r       Result
}

// cell is a stratum of the search: zones of head and exit, class of depth, direction of movement.
type cell struct {
	head, exit, depth int
	leftward          bool
}

func newSearcher(m *Model, o SearchOptions) *searcher {
	s := &searcher{m: m, o: o, methods: o.Methods, cells: map[cell]candidate{}, lowest: math.Inf(1)}
	if len(s.methods) == 0 {
		s.methods = GoverningMethods(Circle)
	}
	if s.o.Slices == 0 {
		s.o.Slices = DefaultSlices
	}
	if s.o.Effort == 0 {
		s.o.Effort = 1
	}
	s.setting = Setting{Method: s.methods[0], Slices: s.o.Slices, MinDepth: o.MinDepth, Window: o.Window, SideForce: o.SideForce}
	s.zones = m.zones()
	return s
}

// try evaluates the slip of a vector with the setting in force. A trial outside the ranges, or without an answer, has F = +Inf.
func (s *searcher) try(p vector) candidate {
	c := candidate{p: p, setting: s.setting}
	slip, ok := s.build(&c.p)
	if !ok {
		c.r.F = math.Inf(1)
		return c
	}
	c.slip = slip
	c.r = s.m.FS(&s.ws, &slip, s.setting)
	switch c.r.Status {
	case Converged:
		return c
	case NotConverged:
		if s.setting.Method == s.methods[0] {
			s.keepUnresolved(&c)
		}
	case Inadmissible:
		s.barred++
	case Missed:
	}
	c.r.F = math.Inf(1)
	return c
}

// keepUnresolved files a trial that the first method could not solve: with the answer of a further method if one has it, else among the
// unresolved.
func (s *searcher) keepUnresolved(c *candidate) {
	if math.IsNaN(c.r.Screen) {
		return
	}
	for _, method := range s.methods[1:] {
		o := *c
		o.setting.Method = method
		if o.r = s.m.FS(&s.ws, &o.slip, o.setting); o.r.Status == Converged {
			s.extra = append(s.extra, o)
			return
		}
	}
	s.failed++
	s.unres = append(s.unres, Minimum{c.slip, c.setting, c.r})
	if len(s.unres) >= 8*MaxUnresolved {
		s.trimUnresolved()
	}
}

func (s *searcher) trimUnresolved() {
	slices.SortStableFunc(s.unres, func(a, b Minimum) int {
		switch {
		case a.Result.Screen < b.Result.Screen:
			return -1
		case a.Result.Screen > b.Result.Screen:
			return 1
		}
		return 0
	})
	s.unres = s.unres[:min(len(s.unres), MaxUnresolved)]
}

// note files a trial of the sweep in its cell.
func (s *searcher) note(c candidate) {
	if math.IsInf(c.r.F, 1) {
		return
	}
	s.lowest = min(s.lowest, c.r.F)
	head, exit := c.r.ends()
	k := cell{s.zoneOf(head), s.zoneOf(exit), depthClass(&c.r), c.r.Leftward}
	if best, ok := s.cells[k]; !ok || c.r.F < best.r.F {
		s.cells[k] = c
	}
}

// depthClass tells shallow, middling and deep slips apart by depth over length.
func depthClass(r *Result) int {
	switch share := r.Depth / (r.To.X - r.From.X); {
	case share < 0.12:
		return 0
	case share < 0.28:
		return 1
	}
	return 2
}

// starts returns the cells lower than all their neighbours, ascending in F.
func (s *searcher) starts() []candidate {
	var out []candidate
	for k, c := range s.cells {
		if c.r.F > startsUpTo*s.lowest && c.r.F > s.o.Below {
			continue
		}
		if s.lowestAround(k, c.r.F) {
			out = append(out, c)
		}
	}
	slices.SortFunc(out, compareCandidates)
	return out
}

// lowestAround reports whether the cells that share a side with a cell have no lower F.
func (s *searcher) lowestAround(k cell, f float64) bool {
	for _, d := range [...][3]int{{1, 0, 0}, {-1, 0, 0}, {0, 1, 0}, {0, -1, 0}, {0, 0, 1}, {0, 0, -1}} {
		n := cell{k.head + d[0], k.exit + d[1], k.depth + d[2], k.leftward}
		if s.apart(k.head, n.head) || s.apart(k.exit, n.exit) {
			continue
		}
		if o, ok := s.cells[n]; ok && o.r.F < f {
			return false
		}
	}
	return true
}

func compareCandidates(a, b candidate) int {
	ka := [...]float64{a.r.F, a.r.From.X, a.r.To.X, a.r.Depth, float64(a.setting.Method)}
	kb := [...]float64{b.r.F, b.r.From.X, b.r.To.X, b.r.Depth, float64(b.setting.Method)}
	return slices.Compare(ka[:], kb[:])
}

// distinct sorts candidates and leaves out those in the basin of a lower one.
func (s *searcher) distinct(cs []candidate) []candidate {
	slices.SortFunc(cs, compareCandidates)
	var out []candidate
	for _, c := range cs {
		if math.IsInf(c.r.F, 1) {
			continue
		}
		same := slices.ContainsFunc(out, func(o candidate) bool { return s.sameBasin(&o.r, &c.r) })
		if !same {
			out = append(out, c)
		}
	}
	return out
}

// sameBasin reports whether two answers are close in place, depth and direction.
func (s *searcher) sameBasin(a, b *Result) bool {
	width := s.m.right - s.m.left
	return a.Leftward == b.Leftward &&
		math.Abs(a.From.X-b.From.X) < sameBasinPlace*width &&
		math.Abs(a.To.X-b.To.X) < sameBasinPlace*width &&
		math.Abs(a.Depth-b.Depth) < sameBasinDepth*a.Depth
}

// polish descends with every further method from the basins that matter.
func (s *searcher) polish(ctx context.Context) {
	if len(s.found) == 0 {
		return
	}
	limit := max(polishUpTo*s.found[0].r.F, s.o.Below*polishUpTo)
	first := s.setting
	for _, method := range s.methods[1:] {
		s.setting.Method = method
		var polished []candidate
		for _, c := range s.found {
			if c.r.F > limit || ctx.Err() != nil {
				break
			}
			scale := s.scale(c)
			for i := range scale {
				scale[i] /= 8
			}
			polished = append(polished, s.descendPinned(s.descend(s.try(c.p), scale)))
		}
		s.extra = append(s.extra, s.distinct(polished)...)
	}
	s.setting = first
}

func (s *searcher) minima() Minima {
	all := slices.Concat(s.found, s.distinct(s.extra), s.polys, s.known)
	slices.SortFunc(all, compareCandidates)
	out := Minima{Trials: s.ws.trial, NotConverged: s.failed, InadmissibleCut: s.barred}
	for _, c := range all {
		out.Basins = append(out.Basins, Minimum{c.slip, c.setting, c.r})
	}
	s.trimUnresolved()
	for _, u := range s.unres {
		if len(out.Basins) == 0 || u.Result.Screen < out.Basins[0].Result.F {
			out.Unresolved = append(out.Unresolved, u)
		}
	}
	return out
}
