package drawing

import (
	"slices"
	"strings"

	"standfast/lem"
	"standfast/remedies"
)

// waterDrawn is a water line of the picture.
type waterDrawn struct {
	name string
	line lem.Profile
	pen  pen
	what string // In the key.
}

// freeDrawn is free water of the picture.
type freeDrawn struct {
	lem.FreeWater
	name string
}

// waterChanged reports whether the works change a water line of a situation.
func (p *picture) waterChanged() bool {
	for i, w := range p.opt.Proposal.Waters {
		if i >= len(p.job.Situations) {
			break
		}
		var before lem.Profile
		if at := p.job.Situations[i].Water; at >= 0 && at < len(p.job.Waters) {
			before = p.job.Waters[at].Line
		}
		if w.Drains != nil || !same(before, w.Line) {
			return true
		}
	}
	return false
}

// gatherWater chooses the water to draw: every line as read, or the governing situation's before and after works with the others
// lightly.
func (p *picture) gatherWater() {
	if !p.works {
		p.gatherWaterAsRead()
		return
	}
	w, name := p.governingWater()
	line, drains := w.Line, w.Drains
	p.drains = drains
	p.addPressures(w.Points)
	at := p.waterBefore()
	if at >= 0 {
		w := p.job.Waters[at]
		if same(crop(w.Line, p.x0, p.x1), p.cropLine(line)) {
			p.addWater(w.Name+" water", line, waterPen, "water line, before and after works")
		} else {
			p.addWater(w.Name+" water before works", w.Line, waterOldPen, "water line before works")
			p.addWater(w.Name+" water after works", line, waterPen, "water line after works")
		}
	} else {
		p.addWater(name, line, waterPen, "water line after works")
	}
	if drains != nil && len(line) > 0 {
		if l := cropInside(lowered(line, drains), p.x0, p.x1); l != nil && len(drains.Invert) > 1 {
			p.waters = append(p.waters, waterDrawn{"head at drain invert", l, headPen, "head left at the invert of drains"})
		}
	}
	for _, own := range w.BySoil {
		p.addWater("water in "+p.sec.Soils[own.Soil].Name, own.Line, waterSoilPen, "water line of one soil")
	}
	p.addFree(name, w.Free)
	for i, w := range p.opt.Proposal.Waters {
		if i < len(p.job.Situations) {
			p.addWater(p.job.Situations[i].Name, w.Line, waterOtherPen, "water line after works, other situations")
		}
	}
}

func (p *picture) gatherWaterAsRead() {
	for i, w := range p.job.Waters {
		pn, what := waterPen, "water line"
		if p.gov != nil && p.waterBefore() != i {
			pn, what = waterOtherPen, "water line, other situations"
		}
		if k := p.drawnWater(w.Line); k >= 0 {
			p.waters[k].name = strings.TrimSuffix(p.waters[k].name, " water") + ", " + waterName(&w) + " water"
			if pn.colour == waterInk {
				p.waters[k].pen, p.waters[k].what = pn, what
			}
		} else {
			p.addWater(waterName(&w)+" water", w.Line, pn, what)
		}
		for _, own := range w.BySoil {
			p.addWater(w.Name+" water in "+p.sec.Soils[own.Soil].Name, own.Line, waterSoilPen, "water line of one soil")
		}
		p.addPressures(w.Points)
	}
	for _, s := range p.job.Situations {
		p.addFree(s.Name, s.Free)
	}
}

// waterName names a water line with what sets it apart.
func waterName(w *remedies.WaterLine) string {
	if w.Inclined {
		return w.Name + " (inclined)"
	}
	return w.Name
}

func (p *picture) addPressures(list []lem.PressurePoint) {
	for _, q := range list {
		if p.inWindow(q.X) && !slices.Contains(p.known, q) {
			p.known = append(p.known, q)
		}
	}
}

// waterBefore returns the index of the water line of the governing situation, the first situation's if none governs; -1: dry.
func (p *picture) waterBefore() int {
	at := -1
	switch {
	case p.gov != nil && p.gov.Check.SituationI < 0:
		at = p.job.Stage.Water
	case p.gov != nil && p.gov.Check.SituationI < len(p.job.Situations):
		at = p.job.Situations[p.gov.Check.SituationI].Water
	case len(p.job.Situations) > 0:
		at = p.job.Situations[0].Water
	}
	if at >= len(p.job.Waters) {
		return -1
	}
	return at
}

// governingWater returns the water after works in the governing check, the first situation's if none governs, and the check's name.
func (p *picture) governingWater() (w lem.Water, name string) {
	switch {
	case p.gov != nil:
		return p.gov.Check.Situation.Water, p.gov.Check.Name
	case len(p.opt.Proposal.Waters) > 0 && len(p.job.Situations) > 0:
		return p.opt.Proposal.Waters[0], p.job.Situations[0].Name
	}
	return w, name
}

func (p *picture) cropLine(l lem.Profile) lem.Profile {
	if len(l) == 0 {
		return nil
	}
	return crop(l, p.x0, p.x1)
}

// addWater adds a line unless the same line is drawn already.
func (p *picture) addWater(name string, l lem.Profile, pn pen, what string) {
	if c := p.cropLine(l); c != nil && p.drawnWater(l) < 0 {
		p.waters = append(p.waters, waterDrawn{name, c, pn, what})
	}
}

// drawnWater returns which line of the picture is the same as l; -1: none.
func (p *picture) drawnWater(l lem.Profile) int {
	c := p.cropLine(l)
	return slices.IndexFunc(p.waters, func(w waterDrawn) bool { return c != nil && same(w.line, c) })
}

func (p *picture) addFree(name string, list []lem.FreeWater) {
	for _, f := range list {
		f.FromX, f.ToX = max(f.FromX, p.x0), min(f.ToX, p.x1)
		drawn := func(d freeDrawn) bool { return d.FreeWater == f }
		if f.FromX < f.ToX && !slices.ContainsFunc(p.free, drawn) {
			p.free = append(p.free, freeDrawn{f, name})
		}
	}
}

// lowered returns the head that is left at the invert of drains: the line less the ratio of its height above the invert. It is
// the line itself where there is no drain, or where the line runs below the invert.
func lowered(line lem.Profile, d *lem.Drawdown) lem.Profile {
	if len(d.Invert) < 2 {
		return line
	}
	l := crop(line, d.Invert.Left(), d.Invert.Right())
	var out lem.Profile
	for _, s := range spans(l, d.Invert) {
		for _, q := range [][3]float64{{s.x0, s.a0, s.b0}, {s.x1, s.a1, s.b1}} {
			fall := ratioAt(d, q[0]) * max(0, q[1]-q[2])
			out = append(out, lem.Point{X: q[0], Y: q[1] - fall})
		}
	}
	return slices.Compact(out)
}

// ratioAt returns the ratio lowered at x, linear between the points of the invert.
func ratioAt(d *lem.Drawdown, x float64) float64 {
	r := make(lem.Profile, min(len(d.Ratio), len(d.Invert)))
	for i := range r {
		r[i] = lem.Point{X: d.Invert[i].X, Y: d.Ratio[i]}
	}
	if len(r) == 0 {
		return 0
	}
	_, y := limits(r, x)
	return y
}

// drawFree fills free water down to the ground.
func (p *picture) drawFree(s *sheet) {
	for _, f := range p.free {
		s.add(fill{waterFill, s.view.lines(p.wet(f))})
	}
	for _, f := range p.free {
		for _, r := range p.wet(f) {
			x0, x1 := ends(r)
			s.stroke(waterPen, medium, s.view.line([]lem.Point{{X: x0, Y: f.Level}, {X: x1, Y: f.Level}}))
		}
	}
}

// wet returns the areas between the surface of free water and the ground in force.
func (p *picture) wet(f freeDrawn) [][]lem.Point {
	surface := lem.Profile{{X: f.FromX, Y: f.Level}, {X: f.ToX, Y: f.Level}}
	return between(surface, lower(surface, crop(p.ground, f.FromX, f.ToX)))
}

// ends returns the range of x of an outline.
func ends(r []lem.Point) (lo, hi float64) {
	lo, hi = r[0].X, r[0].X
	for _, q := range r {
		lo, hi = min(lo, q.X), max(hi, q.X)
	}
	return lo, hi
}

func (p *picture) drawWater(s *sheet) {
	for _, w := range slices.Backward(p.waters) { // The governing line last, on top.
		s.stroke(w.pen, medium, s.view.line(w.line))
	}
	if p.drains != nil && len(p.drains.Invert) > 1 {
		s.stroke(invertPen, medium, s.view.line(cropInside(p.drains.Invert, p.x0, p.x1)))
	}
	p.drawPressures(s)
}

// drawPressures marks the points at which a pore pressure is known; those below what is drawn are left out.
func (p *picture) drawPressures(s *sheet) {
	for _, q := range p.known {
		if at := s.view.at(lem.Point{X: q.X, Y: q.Y}); s.view.frame.holds(at) {
			s.stroke(pressurePen, medium, pressureMark(at)...)
		}
	}
}

// pressureMark is an upright cross.
func pressureMark(at xy) [][]xy {
	const half = 2.6
	return [][]xy{{{at.X - half, at.Y}, {at.X + half, at.Y}}, {{at.X, at.Y - half}, {at.X, at.Y + half}}}
}

// samplePressure draws a known pore pressure in the key.
func samplePressure(s *sheet, b Box) { s.add(stroke{pressurePen, pressureMark(b.centre())}) }

// Share of the window's width at which the marks of water lines are looked for, from the head of the slope on.
var markShares = []float64{0.06, 0.14, 0.24, 0.34, 0.9, 0.8, 0.46, 0.7, 0.58}

// freeShares are the shares of a stretch of free water at which its mark stands.
var freeShares = []float64{0.5, 0.25, 0.75, 0.38, 0.62}

// labelWater marks and names the water lines and free water.
func (p *picture) labelWater(s *sheet) {
	type item struct {
		txt string
		at  xy
	}
	var list []item
	for i, f := range p.free {
		if wet := p.wet(f); len(wet) > 0 {
			x0, x1 := ends(wet[len(wet)/2])
			t := freeShares[i%len(freeShares)]
			list = append(list, item{"free water, " + f.name + ", level " + metres(f.Level), s.view.at(lem.Point{X: x0 + t*(x1-x0), Y: f.Level})})
			s.waterMark(list[len(list)-1].at)
		}
	}
	for i, w := range p.waters {
		t := markShares[i%len(markShares)]
		if p.job.Facing() < 0 {
			t = 1 - t
		}
		list = append(list, item{w.name, p.onLine(s, w.line, t)})
		if w.pen.colour == waterInk {
			s.waterMark(list[len(list)-1].at)
		}
	}
	for _, q := range p.known {
		if at := s.view.at(lem.Point{X: q.X, Y: q.Y}); s.place.area.holds(at) && q.Pressure > 0 {
			list = append(list, item{"u " + number(q.Pressure, 0) + " kPa", at})
		}
	}
	for _, n := range list { // All marks stand before the first label looks for room.
		s.label(noteOf(bodyFace, waterInk, 140, n.txt), above, n.at)
	}
	if p.drains != nil && len(p.drains.Invert) > 1 {
		if d := cropInside(p.drains.Invert, p.x0, p.x1); d != nil {
			s.label(noteOf(bodyFace, waterInk, 140, "invert of drains"), below, s.view.at(lem.Point{X: (d.Left() + d.Right()) / 2, Y: d.At((d.Left() + d.Right()) / 2)}))
		}
	}
}

// onLine returns the point of a line at a share of its length.
func (p *picture) onLine(s *sheet, l lem.Profile, share float64) xy {
	x := l.Left() + share*(l.Right()-l.Left())
	return s.view.at(lem.Point{X: x, Y: l.At(x)})
}

// waterMark draws the mark of a water level: a triangle standing on the line and two strokes below it.
func (s *sheet) waterMark(at xy) {
	const half, high = 3.6, 6.2 // points
	tri := []xy{at, {at.X - half, at.Y + high}, {at.X + half, at.Y + high}, at}
	p := pen{waterInk, 0.7, nil}
	s.add(fill{paper, [][]xy{tri}}, stroke{p, [][]xy{
		tri,
		{{at.X - 3, at.Y - 2.2}, {at.X + 3, at.Y - 2.2}},
		{{at.X - 1.6, at.Y - 4.2}, {at.X + 1.6, at.Y - 4.2}},
	}})
	s.place.marks = append(s.place.marks, Box{at.X - half, at.Y - 4.5, at.X + half, at.Y + high})
}
