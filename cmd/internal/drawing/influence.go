package drawing

import (
	"fmt"
	"math"

	"standfast/lem"
	"standfast/remedies"
)

// Measures of the drawing of an influence line, points.
const (
	influenceFrame = 250.0 // Height of the frame with the lines.
	groundFrame    = 130.0 // Height of the frame with the ground below it.
	framesApart    = 12.0
)

// influenceLine is one line of the drawing.
type influenceLine struct {
	name  string
	style curveStyle
	of    func(p *lem.InfluencePoint) float64
	// marked lines are drawn as markers alone: they are calculated slice by slice.
	marked bool
}

// influenceLines are the lines, the formula as lines and the method itself as markers.
var influenceLines = []influenceLine{
	{"drained, by formula", curveStyle{rgb(0x12355b), nil, roundMarker, false}, func(p *lem.InfluencePoint) float64 { return p.Drained.Formula }, false},
	{"undrained, by formula", curveStyle{rgb(0xb4531a), []float64{7, 3}, squareMarker, false}, func(p *lem.InfluencePoint) float64 { return p.Undrained.Formula }, false},
	{"drained, load placed, by the method", curveStyle{rgb(0x12355b), nil, roundMarker, true}, func(p *lem.InfluencePoint) float64 { return p.Drained.Placed }, true},
	{"undrained, load placed, by the method", curveStyle{rgb(0xb4531a), nil, squareMarker, true}, func(p *lem.InfluencePoint) float64 { return p.Undrained.Placed }, true},
}

// Influence draws what loads on the ground do to the FS of the governing slip of a check, over the ground with that slip, with the neutral points
// marked. It returns ErrNothingToDraw for a line without points.
func Influence(name string, o *remedies.Outcome, v *lem.Influence, opts Options) (*Figure, error) {
	if len(v.Points) == 0 || o.Check.Section == nil || !drawable(o.Check.Section) {
		return nil, fmt.Errorf("influence line of %q: %w", o.Check.Label(), ErrNothingToDraw)
	}
	s := layOutInfluence(name, o, v, opts, nil)
	if len(s.unplaced) > 0 {
		s = layOutInfluence(name, o, v, opts, s.unplaced)
	}
	return &s.fig, nil
}

func layOutInfluence(name string, o *remedies.Outcome, v *lem.Influence, opts Options, listed []string) *sheet {
	s := &sheet{}
	inner := pageWidth - 2*margin
	h := heading{title: name, name: []string{fmt.Sprintf("Influence of load on the critical slip: change of FS by %s kN per metre run placed on the ground", number(v.Load, 0))}, lines: []string{
		fmt.Sprintf("%s: FS %s (%s). A load removed changes FS by as much the other way, nearly. Where a line is above zero fill helps and a cut harms.", title(clean(o.Check.Label())), fsDown(o.FS), methodName(o.Method)),
		"Drained: in the long term. Undrained: at once, the ground taking the load up in pore pressure. The slip is held fixed: with works in place another may govern.",
	}}
	foot := footLines(inner, opts, listed)
	footHeight := float64(len(foot)) * cautionFace.lineHeight()
	s.fig.Width = pageWidth
	keyHeight := smallFace.lineHeight() + 4
	s.fig.Height = math.Ceil(2*margin + h.height() + keyHeight + influenceFrame + framesApart + groundFrame + axisBelow + footHeight + 2*blockGap)
	top := s.fig.Height - margin
	s.drawHeading(h, margin, top, inner)
	left, right := margin+axisLeft+8, margin+inner
	s.influenceKey(left, top-h.height()-blockGap, (right-left)/float64(len(influenceLines)))
	upper := Box{left, top - h.height() - blockGap - keyHeight - influenceFrame, right, top - h.height() - blockGap - keyHeight}
	lower := Box{left, upper.MinY - framesApart - groundFrame, right, upper.MinY - framesApart}
	x0, x1 := influenceWidth(o)
	s.drawInfluence(v, upper, x0, x1)
	s.drawLoaded(o, v, lower, x0, x1)
	for i, l := range foot {
		s.line(cautionFace, inkGrey, margin, margin+footHeight-float64(i)*cautionFace.lineHeight(), l)
	}
	return s
}

// influenceWidth returns the range of x shown: the slip with a part of its length on both sides.
func influenceWidth(o *remedies.Outcome) (x0, x1 float64) {
	const beside = 0.12
	pad := beside * (o.To.X - o.From.X)
	g := o.Check.Section.Ground
	return max(o.From.X-pad, g.Left()), min(o.To.X+pad, g.Right())
}

// drawInfluence draws the lines in the upper frame.
func (s *sheet) drawInfluence(v *lem.Influence, f Box, x0, x1 float64) {
	lo, hi := 0.0, 0.0
	for i := range v.Points {
		for _, l := range influenceLines {
			if y := l.of(&v.Points[i]); !math.IsNaN(y) {
				lo, hi = min(lo, y), max(hi, y)
			}
		}
	}
	const around = 0.15 // Of the span, kept free above and below.
	span := hi - lo
	if span == 0 {
		span = 1
	}
	lo, hi = lo-around*span, hi+around*span
	s.view = view{frame: f, x0: x0, y0: lo, sx: f.width() / (x1 - x0), sy: f.height() / (hi - lo)}
	s.place.area = f.grown(-3)
	s.stroke(pen{inkBlack, 1.0, nil}, heavy, []xy{s.pagePoint(x0, 0), s.pagePoint(x1, 0)})
	for _, l := range influenceLines {
		s.drawLine(v, &l)
	}
	for _, n := range v.Neutral {
		s.neutral(n, f)
	}
	s.influenceAxis(f, lo, hi)
}

// influenceKey names the lines in a row, each in a width.
func (s *sheet) influenceKey(left, top, width float64) {
	for i := range influenceLines {
		l := &influenceLines[i]
		x, y := left+float64(i)*width, top-smallFace.lineHeight()/2
		if l.marked {
			s.marker(l.style, xy{x + sampleWidth/2, y}, markerSize)
		} else {
			s.add(stroke{pen{l.style.colour, 1.3, l.style.dash}, [][]xy{{{x, y}, {x + sampleWidth, y}}}})
		}
		s.line(smallFace, inkBlack, x+sampleWidth+sampleGap, top, l.name)
	}
}

// drawLine draws one line, parted where it has no answer.
func (s *sheet) drawLine(v *lem.Influence, l *influenceLine) {
	var run []xy
	flush := func() {
		if len(run) > 1 && !l.marked {
			s.stroke(pen{l.style.colour, 1.3, l.style.dash}, heavy, run)
		}
		run = nil
	}
	for i := range v.Points {
		y := l.of(&v.Points[i])
		if math.IsNaN(y) {
			flush()
			continue
		}
		at := s.pagePoint(v.Points[i].X, y)
		run = append(run, at)
		if l.marked {
			s.marker(l.style, at, 0.7*markerSize)
		}
	}
	flush()
}

// neutral marks a neutral point on the zero line and names those of the formula, which differ little from those of the method.
func (s *sheet) neutral(n lem.NeutralPoint, f Box) {
	style, word := influenceLines[0].style, "drained"
	if n.Undrained {
		style, word = influenceLines[1].style, "undrained"
	}
	at := s.pagePoint(n.X, 0)
	if n.Differences {
		s.marker(curveStyle{colour: style.colour, marker: diamondMarker, hollow: true}, at, markerSize)
		return
	}
	s.add(stroke{pen{style.colour, 0.8, []float64{2, 2}}, [][]xy{{{at.X, f.MinY}, {at.X, f.MaxY}}}})
	s.marker(curveStyle{colour: style.colour, marker: diamondMarker}, at, 1.2*markerSize)
	note := noteOf(strongFace, style.colour, 150, fmt.Sprintf("neutral point, %s: offset %s m", word, rounded(n.X)))
	note.clear = markerSize
	prefer := above
	if n.Undrained {
		prefer = below
	}
	s.label(note, prefer, at)
}

// influenceAxis draws the frame of the lines and the numbers on its left side, which need more decimals than those of a section.
func (s *sheet) influenceAxis(f Box, lo, hi float64) {
	s.add(stroke{framePen, [][]xy{append(f.corners(), f.corners()[0])}})
	h := axisFace.ascent() + axisFace.descent()
	var ticks [][]xy
	for _, t := range ticksOf(lo, hi, 24/s.view.sy) {
		y := f.MinY + (t.at-lo)*s.view.sy
		ticks = append(ticks, []xy{{f.MinX, y}, {f.MinX - tickLength, y}}, []xy{{f.MaxX, y}, {f.MaxX - tickLength, y}})
		s.line(axisFace, inkBlack, f.MinX-tickLength-2-axisFace.width(t.txt), y+h/2, t.txt)
	}
	s.add(stroke{tickPen, ticks})
	s.turned(axisFace, inkBlack, margin, f.centre().Y, "change of FS")
}

// drawLoaded draws the ground with the slip in the lower frame, at equal scales where they fit.
func (s *sheet) drawLoaded(o *remedies.Outcome, v *lem.Influence, f Box, x0, x1 float64) {
	ground, slip := crop(o.Check.Section.Ground, x0, x1), slipLine(o)
	lo, hi := math.Inf(1), math.Inf(-1)
	for _, line := range [][]lem.Point{ground, slip} {
		for _, p := range line {
			lo, hi = min(lo, p.Y), max(hi, p.Y)
		}
	}
	const around = 0.1
	pad := around * (hi - lo)
	lo, hi = lo-pad, hi+pad
	sx := f.width() / (x1 - x0)
	sy := min(sx, f.height()/(hi-lo))
	s.view = view{frame: f, x0: x0, y0: (lo+hi)/2 - f.height()/2/sy, sx: sx, sy: sy}
	s.place = placer{area: f.grown(-3)}
	s.inside = true
	s.stroke(groundPen, heavy, s.view.line(ground))
	s.stroke(slipPen, heavy, s.view.line(slip))
	for _, n := range v.Neutral {
		if n.Differences {
			continue
		}
		style := influenceLines[0].style
		if n.Undrained {
			style = influenceLines[1].style
		}
		at := s.view.at(lem.Point{X: n.X, Y: n.Ground})
		s.add(stroke{pen{style.colour, 0.8, []float64{2, 2}}, [][]xy{{at, {at.X, f.MaxY}}}})
		s.marker(curveStyle{colour: style.colour, marker: diamondMarker}, at, 1.2*markerSize)
	}
	s.inside = false
	words := "offset, m (equal scales)"
	if sy < sx {
		words = "offset, m (heights drawn smaller)"
	}
	s.axes(words, "level, m", x0, x1)
}
