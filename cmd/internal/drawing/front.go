package drawing

import (
	"fmt"
	"math"
	"strconv"

	"standfast/remedies"
)

// frontFrame is the height of the frame of a front, points.
const frontFrame = 300.0

// Front draws the earthworks of an option against its metres of drain, both per metre run, a numbered point a design, and lists the designs below.
// It returns ErrNothingToDraw if the option has no front of two points or more.
func Front(name string, o *remedies.Option, opts Options) (*Figure, error) {
	if o.Front == nil || len(o.Front.Points) < 2 {
		return nil, fmt.Errorf("front of %s, %q: %w", o.Name, name, ErrNothingToDraw)
	}
	s := &sheet{}
	inner := pageWidth - 2*margin
	h := heading{title: name, name: []string{title(o.Title) + ": earthworks against metres of drain"}, lines: []string{
		"Each point meets every check with the least earthworks for its drain. Ringed: the design of the option.",
	}}
	if !o.Front.Whole {
		h.lines = append(h.lines, "There may be more such designs between these.")
	}
	var list []string
	for i := range o.Front.Points {
		list = append(list, bodyFace.wrap(clean(frontLine(o.Front, i)), inner, 3)...)
	}
	foot := footLines(inner, opts, nil)
	listHeight, footHeight := float64(len(list))*bodyFace.lineHeight(), float64(len(foot))*cautionFace.lineHeight()
	s.fig.Width = pageWidth
	s.fig.Height = math.Ceil(2*margin + h.height() + frontFrame + axisBelow + listHeight + footHeight + 3*blockGap)
	top := s.fig.Height - margin
	s.drawHeading(h, margin, top, inner)
	frameTop := top - h.height() - blockGap
	s.front(Box{margin + axisLeft, frameTop - frontFrame, margin + inner, frameTop}, o.Front)
	for i, l := range list {
		s.line(bodyFace, inkBlack, margin, margin+footHeight+blockGap+listHeight-float64(i)*bodyFace.lineHeight(), l)
	}
	for i, l := range foot {
		s.line(cautionFace, inkGrey, margin, margin+footHeight-float64(i)*cautionFace.lineHeight(), l)
	}
	return &s.fig, nil
}

// FrontPlot draws the plot of [Front] alone, for the page of a report, in a size of points. It returns ErrNothingToDraw likewise.
func FrontPlot(o *remedies.Option, width, height float64) (*Figure, error) {
	if o.Front == nil || len(o.Front.Points) < 2 {
		return nil, fmt.Errorf("front of %s: %w", o.Name, ErrNothingToDraw)
	}
	s := &sheet{fig: Figure{Width: width, Height: height}}
	const beside = 14.0 // Room for half of the last number on the axis.
	s.front(Box{axisLeft, axisBelow, width - beside, height - 1}, o.Front)
	return &s.fig, nil
}

// frontLine lists a point of a front: its number, its amounts, and the dimensions in which it differs from others.
func frontLine(f *remedies.Front, i int) string {
	p := &f.Points[i]
	words := fmt.Sprintf("%d: drains %s m/m, earthworks %s m³/m", i+1, quantityUp(p.Drain), quantityUp(p.Earthworks))
	for k, v := range p.Parameters {
		for _, q := range f.Points {
			if k < len(q.Parameters) && q.Parameters[k].Value != v.Value {
				words += ", " + value(v)
				break
			}
		}
	}
	return words
}

// front draws the points in a frame, with the steps between them: what a length of drain in between takes with the designs known.
func (s *sheet) front(frame Box, f *remedies.Front) {
	first, end := f.Points[0], f.Points[len(f.Points)-1]
	const (
		beside    = 0.15 // Of the spans kept free on every side.
		leastSpan = 0.1  // m/m and m3/m on the axes
	)
	wide, high := max(first.Drain-end.Drain, leastSpan), max(end.Earthworks-first.Earthworks, leastSpan)
	x0, y0 := max(0, end.Drain-beside*wide), max(0, first.Earthworks-beside*high)
	s.view = view{
		frame: frame, x0: x0, y0: y0,
		sx: frame.width() / (first.Drain + beside*wide - x0), sy: frame.height() / (end.Earthworks + beside*high - y0),
	}
	s.place.area = frame.grown(-3)
	var steps []xy
	for i, p := range f.Points {
		if i > 0 {
			steps = append(steps, s.pagePoint(f.Points[i-1].Drain, p.Earthworks))
		}
		steps = append(steps, s.pagePoint(p.Drain, p.Earthworks))
	}
	last := steps[len(steps)-1]
	s.stroke(pen{inkGrey, 0.7, []float64{2, 2}}, light, steps, []xy{last, {last.X, frame.MaxY}})
	style := curveStyles[0]
	for _, p := range f.Points {
		at := s.pagePoint(p.Drain, p.Earthworks)
		s.marker(style, at, markerSize)
		if p.Answer {
			s.add(stroke{pen{style.colour, 1.2, nil}, [][]xy{ringAbout(at, 2.2*markerSize)}})
		}
		b := Box{at.X, at.Y, at.X, at.Y}.grown(markerSize)
		s.place.avoid(heavy, []xy{{b.MinX, b.MinY}, {b.MaxX, b.MaxY}}, []xy{{b.MinX, b.MaxY}, {b.MaxX, b.MinY}})
	}
	for i, p := range f.Points {
		n := noteOf(strongFace, style.colour, 120, strconv.Itoa(i+1))
		n.clear = 1.5 * markerSize
		s.label(n, rightOf, s.pagePoint(p.Drain, p.Earthworks))
	}
	s.axes("drains, m per metre run", "earthworks, m³ per metre run", x0, x0+frame.width()/s.view.sx)
}
