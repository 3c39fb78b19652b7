package sheet

import (
	"math"

	"standfast/cmd/internal/report"
)

// Room about what matters, in parts of its width and height.
const (
	besideView = 0.05
	belowView  = 0.10
	aboveView  = 0.16 // Surcharges and labels stand there.
)

// chooseView finds the part of the section that shows crest, toe, all works and all governing slips, the same for every figure.
func (b *builder) chooseView() {
	d := &b.m.Data
	before := d.Lines[d.Before]
	left, right := before[0][0], before[len(before)-1][0]
	x0, x1 := math.Inf(1), math.Inf(-1)
	y0, y1 := math.Inf(1), math.Inf(-1)
	see := func(x, y float64) {
		if x >= left && x <= right {
			x0, x1 = min(x0, x), max(x1, x)
		}
		y0, y1 = min(y0, y), max(y1, y)
	}
	for _, p := range [][2]float64{b.f.Case.Crest, b.f.Case.Toe} {
		see(p[0], p[1])
	}
	b.seeLimits(see)
	all := []*design{&d.Existing}
	for i := range d.Options {
		for k := range d.Options[i].Designs {
			all = append(all, &d.Options[i].Designs[k])
		}
	}
	for _, w := range all {
		b.seeDesign(w, see)
	}
	pad := besideView * (x1 - x0)
	x0, x1 = max(left, x0-pad), min(right, x1+pad)
	for _, w := range all { // Ground within the window.
		for _, p := range d.Lines[w.Ground] {
			if p[0] >= x0 && p[0] <= x1 {
				y0, y1 = min(y0, p[1]), max(y1, p[1])
			}
		}
	}
	high := y1 - y0
	d.View = view{X0: x0, X1: x1, Y0: y0 - belowView*high, Y1: y1 + aboveView*high}
}

// seeDesign shows what a design changes and the slips that it was judged by.
func (b *builder) seeDesign(w *design, see func(x, y float64)) {
	d := &b.m.Data
	before, ground := points(d.Lines[d.Existing.Ground]), points(d.Lines[w.Ground])
	xs := breaks(ground, before)
	for i := 1; i < len(xs); i++ {
		if changed(ground, before, xs[i-1]) || changed(ground, before, xs[i]) {
			see(xs[i-1], levelAt(ground, xs[i-1]))
			see(xs[i], levelAt(ground, xs[i]))
		}
	}
	for _, p := range w.Placed {
		for _, q := range d.Lines[p.Outline] {
			if p.Works {
				see(q[0], q[1])
			}
		}
	}
	for _, a := range w.Answers {
		if a == nil || a.Slip == nil {
			continue
		}
		s := a.Slip
		see(s.From[0], s.From[1])
		see(s.To[0], s.To[1])
		if s.Centre != nil && s.Centre[0] > s.From[0] && s.Centre[0] < s.To[0] {
			see(s.Centre[0], s.Centre[1]-s.Radius)
		}
		for _, q := range s.Line {
			see(q[0], q[1])
		}
	}
}

// points turns a drawn line back into one of the result's.
func points(line []xy) []report.Point {
	out := make([]report.Point, len(line))
	for i, p := range line {
		out[i] = report.Point(p)
	}
	return out
}
