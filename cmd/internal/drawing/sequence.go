package drawing

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"standfast/lem"
	"standfast/remedies"
)

// Measures of the strip of construction, points.
const (
	panelsAcross = 3    // At most; four stand two by two.
	panelGap     = 14.0 // Between panels, side by side and above each other.
	panelHead    = 2.0  // Lines of the name of a panel.
	panelFoot    = 2.0  // Lines of its answer.
	panelSpare   = 0.06 // Of the height of what is shown, kept free above and below it.
	leastPanel   = 46.0 // Least height of the picture in a panel.
)

// panel is a state of the ground on the way to the finished works.
type panel struct {
	name    string
	section *lem.Section
	outcome *remedies.Outcome // nil: no answer to show.
}

// Sequence draws the construction of an option as a strip of small sections at one scale, each with its FS: the slope as it is, every stage in
// order, and the finished works, as wide as given, points. It returns ErrNothingToDraw for an option without works.
func Sequence(existing, o *remedies.Option, j *remedies.Job, width float64) (*Figure, error) {
	if o.Proposal == nil || existing.Proposal == nil || !drawable(&o.Proposal.Section) || !drawable(&existing.Proposal.Section) {
		return nil, fmt.Errorf("construction of %q: %w", o.Name, ErrNothingToDraw)
	}
	panels := []panel{{"as it is", &existing.Proposal.Section, existing.Governing()}}
	for i := range o.Stages {
		c := &o.Stages[i].Check
		section := c.Section
		if section == nil || !drawable(section) { // Then it is that of the finished works.
			section = &o.Proposal.Section
		}
		panels = append(panels, panel{checkName(c), section, &o.Stages[i]})
	}
	finished := remedies.Option{Situations: o.Situations}
	panels = append(panels, panel{"works complete", &o.Proposal.Section, finished.Governing()})
	p := picture{job: j, opt: o, sec: &o.Proposal.Section}
	p.frame(panels)
	return layOutSequence(&p, panels, width), nil
}

// frame sets the window to what the panels show: the slope, the works and the slips, with the ground beside them.
func (p *picture) frame(panels []panel) {
	var xs, ys []float64
	see := func(ps ...lem.Point) {
		for _, q := range ps {
			xs, ys = append(xs, q.X), append(ys, q.Y)
		}
	}
	see(p.job.Crest, p.job.Toe)
	for _, q := range panels {
		for _, s := range spans(q.section.Ground, q.section.GroundBefore()) {
			if math.Abs(s.a0-s.b0)+math.Abs(s.a1-s.b1) > thinnest {
				see(lem.Point{X: s.x0, Y: s.a0}, lem.Point{X: s.x1, Y: s.a1})
			}
		}
		if q.outcome != nil && !math.IsNaN(q.outcome.FS) {
			see(slipLine(q.outcome)...)
		}
	}
	const beside = 0.12 // Of what is shown, on each side.
	g := p.sec.GroundBefore()
	lo, hi := slices.Min(xs), slices.Max(xs)
	p.x0, p.x1 = max(lo-beside*(hi-lo), g.Left()), min(hi+beside*(hi-lo), g.Right())
	for _, q := range panels {
		for _, v := range crop(q.section.Ground, p.x0, p.x1) {
			ys = append(ys, v.Y)
		}
	}
	p.lo, p.hi = slices.Min(ys), slices.Max(ys)
}

func layOutSequence(p *picture, panels []panel, width float64) *Figure {
	s := &sheet{}
	across := min(panelsAcross, len(panels))
	if len(panels) == panelsAcross+1 {
		across = 2
	}
	rows := (len(panels) + across - 1) / across
	w := (width - panelGap*float64(across-1)) / float64(across)
	tall := max(leastPanel, w*(p.hi-p.lo)*(1+2*panelSpare)/(p.x1-p.x0))
	line := smallFace.lineHeight()
	whole := tall + (panelHead+panelFoot)*line + 4
	s.fig.Width, s.fig.Height = width, float64(rows)*whole+float64(rows-1)*panelGap
	for i := range panels {
		left := float64(i%across) * (w + panelGap)
		top := s.fig.Height - float64(i/across)*(whole+panelGap)
		s.panel(p, &panels[i], i+1, Box{left, top - panelHead*line - 2 - tall, left + w, top - panelHead*line - 2})
	}
	return &s.fig
}

// panel draws one state in its frame, its name above and its answer below.
func (s *sheet) panel(p *picture, q *panel, number int, f Box) {
	bold := smallFace
	bold.bold = true
	line := smallFace.lineHeight()
	name := bold.wrap(clean(fmt.Sprintf("%d %s", number, q.name)), f.width(), int(panelHead))
	for i, l := range name {
		s.line(bold, inkBlack, f.MinX, f.MaxY+2+float64(len(name)-i)*line, l)
	}
	ink := inkBlack
	if q.outcome != nil && !(q.outcome.FS >= q.outcome.Check.Required) {
		ink = badInk
	}
	for i, l := range smallFace.wrap(clean(q.answer()), f.width(), int(panelFoot)) {
		s.line(smallFace, ink, f.MinX, f.MinY-2-float64(i)*line, l)
	}
	scale := min(f.width()/(p.x1-p.x0), f.height()/((p.hi-p.lo)*(1+2*panelSpare)))
	s.view = view{
		sx: scale, sy: scale, frame: f,
		x0: (p.x0+p.x1)/2 - f.width()/2/scale, y0: (p.lo+p.hi)/2 - f.height()/2/scale,
	}
	s.inside = true
	s.state(p, q)
	s.inside = false
	s.add(stroke{tickPen, [][]xy{append(f.corners(), f.corners()[0])}})
}

// state draws the ground of a panel with cut, fill, water and the slip that governs it.
func (s *sheet) state(p *picture, q *panel) {
	before, ground := crop(q.section.GroundBefore(), p.x0, p.x1), crop(q.section.Ground, p.x0, p.x1)
	s.add(fill{soilTint(0), s.view.lines([][]lem.Point{under(ground, s.view.y0-1)})})
	const apart = 3.4 // Points between the lines of a hatch.
	below := [][]xy{s.view.line(under(ground, s.view.y0-1))}
	added := q.section.Placed[min(len(p.job.Section.Placed), len(q.section.Placed)):]
	for _, b := range added {
		ring := [][]xy{s.view.line(b.Outline)}
		if b.Soil >= len(p.job.Section.Soils) { // What a hole in panels leaves, as a mean along the works.
			s.add(fill{soilTint(0), ring}, stroke{cutPen, hatch(cutHatchAngle, 2*apart, ring, below)})
			continue
		}
		s.add(fill{soilTint(b.Soil), ring}, stroke{fillPen, hatch(fillHatchAngle, apart, ring, below)})
	}
	common := lower(before, ground)
	if cuts := s.view.lines(between(before, common)); len(cuts) > 0 {
		s.add(stroke{cutPen, hatch(cutHatchAngle, apart, cuts)})
	}
	if fills := s.view.lines(between(ground, common)); len(fills) > 0 && len(added) == 0 {
		s.add(stroke{fillPen, hatch(fillHatchAngle, apart, fills)})
	}
	for _, t := range q.section.Strata[1:] {
		s.add(stroke{strataPen, [][]xy{s.view.line(lower(crop(t.Top, p.x0, p.x1), ground))}})
	}
	if !same(before, ground) {
		s.add(stroke{pen{inkGrey, 0.6, []float64{4, 2}}, [][]xy{s.view.line(before)}})
	}
	for _, r := range q.section.Restraints {
		s.add(stroke{pen{inkBlack, 1.8, nil}, [][]xy{s.view.line([]lem.Point{{X: r.X, Y: r.Top}, {X: r.X, Y: r.Bottom}})}})
	}
	if o := q.outcome; o != nil {
		s.panelWater(p, &o.Check.Situation.Water)
		if !math.IsNaN(o.FS) {
			s.add(stroke{pen{slipInk, 1.1, nil}, [][]xy{s.view.line(slipLine(o))}})
		}
	}
	s.add(stroke{pen{inkBlack, 1.2, nil}, [][]xy{s.view.line(ground)}})
}

// panelWater draws the water line, lowered by drains where there are any, and their invert.
func (s *sheet) panelWater(p *picture, w *lem.Water) {
	line := w.Line
	if w.Drains != nil {
		line = remedies.LoweredLine(w)
		s.add(stroke{pen{waterInk, 0.6, []float64{4, 1.5, 1, 1.5}}, [][]xy{s.view.line(cropInside(w.Drains.Invert, p.x0, p.x1))}})
	}
	s.add(stroke{pen{waterInk, 0.7, nil}, [][]xy{s.view.line(cropInside(line, p.x0, p.x1))}})
}

// answer is the FS of a panel in words.
func (q *panel) answer() string {
	o := q.outcome
	switch {
	case o == nil:
		return "not checked"
	case math.IsNaN(o.FS):
		return "no slip converged in " + o.Check.Label()
	}
	out := "FS " + fsDown(o.FS) + " (" + methodName(o.Method) + ")"
	if !o.Check.Stage {
		out += " in " + o.Check.Label()
	}
	switch {
	case o.Check.Required > 0:
		out += ", required " + requiredUp(o.Check.Required)
	default:
		out += ", told only"
	}
	if !o.Resolved {
		out += "; unresolved"
	}
	return strings.ReplaceAll(out, "FS ", "FS"+string(noBreak))
}
