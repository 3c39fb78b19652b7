package drawing

import (
	"cmp"
	"fmt"
	"image/color"
	"math"
	"slices"
	"strings"

	"standfast/remedies"
)

// curveStyle is how a curve is drawn: no two differ in colour alone.
type curveStyle struct {
	colour color.NRGBA
	dash   []float64
	marker []xy // Outline of the marker, unit size.
	hollow bool
}

// Markers of curves, as outlines of unit size.
var (
	roundMarker    = polygon(12, 0)
	squareMarker   = polygon(4, quarterTurn/2)
	diamondMarker  = polygon(4, 0)
	triangleMarker = polygon(3, quarterTurn)
	invertMarker   = polygon(3, -quarterTurn)
	hexMarker      = polygon(6, 0)
)

// curveStyles differ in colour, lightness, dash and marker; with more curves than styles they start again.
var curveStyles = []curveStyle{
	{rgb(0x12355b), nil, roundMarker, false},
	{rgb(0xb4531a), []float64{7, 3}, squareMarker, false},
	{rgb(0x2b8a74), []float64{2, 2}, triangleMarker, false},
	{rgb(0x86405f), []float64{8, 2.5, 2, 2.5}, diamondMarker, false},
	{rgb(0x5b5b5b), []float64{4, 2}, invertMarker, true},
	{rgb(0xa8821a), []float64{10, 3}, roundMarker, true},
	{rgb(0x4a68b0), []float64{1.5, 3}, squareMarker, true},
	{rgb(0x3d6321), []float64{6, 2, 2, 2, 2, 2}, hexMarker, true},
}

func polygon(n int, start float64) []xy {
	out := make([]xy, n)
	for i := range out {
		s, c := math.Sincos(start + 2*math.Pi*float64(i)/float64(n))
		out[i] = xy{c, s}
	}
	return out
}

// curve is one option's trade-off, ready to draw.
type curve struct {
	name   string
	points []curvePoint
	style  curveStyle
}

type curvePoint struct {
	earthworks, fs float64
	sized          bool // The design of the option itself.
}

// sameTarget is the difference below which two required FS are one, so that curves share an axis of FS.
const sameTarget = 1e-9

// Tradeoff draws the factor of safety reached against the earthworks that it takes, m3 per metre run, one curve an option with the
// target marked. Where the situations that govern the options ask for different factors, the axis is the share of what is
// asked. It returns ErrNothingToDraw if no option has a curve.
func Tradeoff(name string, options []remedies.Option, opts Options) (*Figure, error) {
	curves, target, share := gatherCurves(options)
	if len(curves) == 0 {
		return nil, fmt.Errorf("trade-off of %q: %w", name, ErrNothingToDraw)
	}
	s := layOutTradeoff(name, curves, target, share, opts, nil)
	if len(s.unplaced) > 0 {
		s = layOutTradeoff(name, curves, target, share, opts, s.unplaced)
	}
	return &s.fig, nil
}

// gatherCurves returns the curves, the target on their axis, and whether the axis is the share of the required FS.
func gatherCurves(options []remedies.Option) (curves []curve, target float64, share bool) {
	target = math.NaN()
	for i := range options {
		for _, t := range options[i].Tradeoff {
			base := t.RequiredFS - t.Shift
			if math.IsNaN(target) {
				target = base
			}
			share = share || math.Abs(base-target) > sameTarget
		}
	}
	for i := range options {
		o := &options[i]
		c := curve{name: curveName(o), style: curveStyles[len(curves)%len(curveStyles)]}
		for _, t := range o.Tradeoff {
			fs := reached(o, &t)
			if share {
				fs /= t.RequiredFS - t.Shift
			}
			if !math.IsNaN(fs) && !math.IsInf(fs, 0) && !math.IsNaN(t.Earthworks) {
				c.points = append(c.points, curvePoint{t.Earthworks, fs, t.Shift == 0 && o.Status == remedies.MeetsTarget})
			}
		}
		if len(c.points) == 0 {
			continue
		}
		slices.SortStableFunc(c.points, func(a, b curvePoint) int {
			return cmp.Or(cmp.Compare(a.earthworks, b.earthworks), cmp.Compare(a.fs, b.fs))
		})
		curves = append(curves, c)
	}
	if share {
		target = 1
	}
	return curves, target, share
}

// reached is the FS of a point: where it is the design that was sized, not more than the audit left of it.
func reached(o *remedies.Option, t *remedies.TradeoffPoint) float64 {
	same := func(a, b remedies.Value) bool {
		return a.Name == b.Name && (a.Value == b.Value || math.IsNaN(a.Value) && math.IsNaN(b.Value))
	}
	g := o.Governing()
	if g == nil || math.IsNaN(g.FS) || !slices.EqualFunc(o.Parameters, t.Parameters, same) {
		return t.Reached
	}
	return min(t.Reached, t.RequiredFS-t.Shift+g.FS-g.Check.Required)
}

// curveName is the direct label of a curve: the option, and what its sized design takes.
func curveName(o *remedies.Option) string {
	name := o.Title
	if name == "" {
		name = o.Name
	}
	switch {
	case o.Status != remedies.MeetsTarget:
		name += " (" + o.Status.String() + ")"
	case o.Proposal != nil:
		name += ", " + quantityUp(o.Proposal.Quantities.Earthworks()) + " m³/m"
	}
	if o.WhatIf && !strings.Contains(name, "what-if") {
		name += " (what-if)"
	}
	return title(name)
}

// markerSize is the half width of a marker, points.
const markerSize = 3.3

// tradeoffFrame is the height of the frame, points.
const tradeoffFrame = 370.0

func layOutTradeoff(name string, curves []curve, target float64, share bool, opts Options, listed []string) *sheet {
	s := &sheet{}
	inner := pageWidth - 2*margin
	h := heading{title: name, name: []string{"Earthworks against the factor of safety reached"}, lines: []string{
		"Earthworks are bank cut plus compacted fill. Ringed: the size that the remedy comes to for what is required.",
	}}
	if share {
		h.lines = append(h.lines, "The remedies are governed by situations that ask for different factors: shown is FS reached over FS required.")
	}
	foot := footLines(inner, opts, listed)
	footHeight := float64(len(foot)) * cautionFace.lineHeight()
	s.fig.Width = pageWidth
	s.fig.Height = math.Ceil(2*margin + h.height() + tradeoffFrame + axisBelow + footHeight + 2*blockGap)
	top := s.fig.Height - margin
	s.drawHeading(h, margin, top, inner)
	frameTop := top - h.height() - blockGap
	frame := Box{margin + axisLeft, frameTop - tradeoffFrame, margin + inner, frameTop}
	s.tradeoff(frame, curves, target, share)
	for i, l := range foot {
		s.line(cautionFace, inkGrey, margin, margin+footHeight-float64(i)*cautionFace.lineHeight(), l)
	}
	return s
}

// tradeoff draws the curves with their axes in a frame.
func (s *sheet) tradeoff(frame Box, curves []curve, target float64, share bool) {
	s.view = tradeoffView(frame, curves, target)
	s.place.area = frame.grown(-3)
	s.drawCurves(curves, target, share)
	yTitle := "factor of safety reached"
	if share {
		yTitle = "FS reached / FS required"
	}
	s.axes("earthworks, m³ per metre run", yTitle, 0, s.view.x0+frame.width()/s.view.sx)
}

// TradeoffPlot draws the curves of [Tradeoff] alone, for the page of a report, in a size of points; names of curves that find no room stand below
// them. It returns ErrNothingToDraw if no option has a curve.
func TradeoffPlot(options []remedies.Option, width, height float64) (*Figure, error) {
	curves, target, share := gatherCurves(options)
	if len(curves) == 0 {
		return nil, fmt.Errorf("trade-off: %w", ErrNothingToDraw)
	}
	s := layOutPlot(curves, target, share, width, height, nil)
	if len(s.unplaced) > 0 {
		s = layOutPlot(curves, target, share, width, height, smallFace.wrap(clean("Without room for a label: "+strings.Join(s.unplaced, "; ")+"."), width, 4))
	}
	return &s.fig, nil
}

func layOutPlot(curves []curve, target float64, share bool, width, height float64, foot []string) *sheet {
	s := &sheet{fig: Figure{Width: width, Height: height}}
	line := smallFace.lineHeight()
	below := float64(len(foot)) * line
	const beside = 9.0 // Room for half of the last number on the axis.
	s.tradeoff(Box{axisLeft, axisBelow + below, width - beside, height - 1}, curves, target, share)
	for i, l := range foot {
		s.line(smallFace, inkGrey, 0, below-float64(i)*line, l)
	}
	return s
}

// tradeoffView fits the curves and the target into the frame, with room at the right for the names of the curves.
func tradeoffView(f Box, curves []curve, target float64) view {
	lo, hi, most := target, target, 0.0
	for _, c := range curves {
		for _, q := range c.points {
			lo, hi, most = min(lo, q.fs), max(hi, q.fs), max(most, q.earthworks)
		}
	}
	const (
		leastSpan = 0.1  // of FS on the axis
		leastWork = 1.0  // m3/m on the axis
		around    = 0.14 // of the span kept free above and below
		beside    = 0.22 // of the span kept free at the right
	)
	span := max(hi-lo, leastSpan)
	lo, hi = lo-around*span, hi+around*span
	most = max(most, leastWork)
	return view{
		frame: f, x0: -0.03 * most, y0: lo,
		sx: f.width() / (most * (1.03 + beside)), sy: f.height() / (hi - lo),
	}
}

// pagePoint maps a point of a curve to the page.
func (s *sheet) pagePoint(earthworks, fs float64) xy {
	v := s.view
	return xy{v.frame.MinX + (earthworks-v.x0)*v.sx, v.frame.MinY + (fs-v.y0)*v.sy}
}

func (s *sheet) drawCurves(curves []curve, target float64, share bool) {
	f := s.view.frame
	grid := pen{inkFaint, 0.4, nil}
	zero := s.pagePoint(0, 0).X
	s.add(stroke{grid, [][]xy{{{zero, f.MinY}, {zero, f.MaxY}}}})
	at := s.pagePoint(0, target).Y
	s.stroke(pen{inkBlack, 1.1, []float64{12, 4}}, heavy, []xy{{f.MinX, at}, {f.MaxX, at}})
	for _, c := range curves {
		var line []xy
		for _, q := range c.points {
			line = append(line, s.pagePoint(q.earthworks, q.fs))
		}
		s.stroke(pen{c.style.colour, 1.3, c.style.dash}, heavy, line)
		for i, q := range line {
			s.marker(c.style, q, markerSize)
			if c.points[i].sized {
				s.add(stroke{pen{c.style.colour, 1.2, nil}, [][]xy{ringAbout(q, 2.2*markerSize)}})
			}
			b := Box{q.X, q.Y, q.X, q.Y}.grown(markerSize)
			s.place.avoid(heavy, []xy{{b.MinX, b.MinY}, {b.MaxX, b.MaxY}}, []xy{{b.MinX, b.MaxY}, {b.MaxX, b.MinY}})
		}
	}
	words := "required FS " + number(target, 2)
	if share {
		words = "required FS"
	}
	s.label(noteOf(strongFace, inkBlack, 150, words), above, xy{f.MaxX - 60, at})
	for _, c := range curves {
		last := c.points[len(c.points)-1]
		n := noteOf(strongFace, c.style.colour, 170, c.name)
		n.clear = markerSize
		s.label(n, rightOf, s.pagePoint(last.earthworks, last.fs))
	}
}

func (s *sheet) marker(st curveStyle, at xy, size float64) {
	ring := make([]xy, len(st.marker))
	for i, q := range st.marker {
		ring[i] = xy{at.X + q.X*size, at.Y + q.Y*size}
	}
	inside := st.colour
	if st.hollow {
		inside = paper
	}
	s.add(fill{inside, [][]xy{ring}}, stroke{pen{st.colour, 0.9, nil}, [][]xy{append(ring, ring[0])}})
}

func ringAbout(at xy, r float64) []xy {
	out := polygon(24, 0)
	for i, q := range out {
		out[i] = xy{at.X + q.X*r, at.Y + q.Y*r}
	}
	return append(out, out[0])
}
