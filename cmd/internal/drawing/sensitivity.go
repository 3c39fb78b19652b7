package drawing

import (
	"fmt"
	"math"

	"standfast/remedies"
)

// Measures of the drawing of swings, points.
const (
	swingRow   = 20.0
	swingBar   = 9.0
	swingName  = 150.0 // Most room for the name of an input.
	swingBelow = 28.0  // Axis with its title.
)

// Sensitivity draws how the FS of the check with the least margin swings with each input: a bar from its value with the input low to that with it
// high, about the value as given, as wide as given, points. An end without an answer is left out. It returns ErrNothingToDraw if no bar has
// both ends.
func Sensitivity(bars []remedies.Bar, width float64) (*Figure, error) {
	lo, hi := math.Inf(1), math.Inf(-1)
	for i := range bars {
		if b := &bars[i]; whole(b) {
			lo, hi = min(lo, b.Low, b.High, b.Base), max(hi, b.Low, b.High, b.Base)
		}
	}
	if math.IsInf(lo, 1) {
		return nil, fmt.Errorf("sensitivity: %w", ErrNothingToDraw)
	}
	s := &sheet{fig: Figure{Width: width, Height: swingRow*float64(len(bars)) + swingBelow}}
	span := max(hi-lo, 0.01)
	const beside = 0.14 // Of the span, kept free at the ends for their values.
	lo, hi = lo-beside*span, hi+beside*span
	f := Box{swingName, swingBelow, width - 9, s.fig.Height}
	s.view = view{frame: f, x0: lo, sx: f.width() / (hi - lo), sy: 1}
	for i := range bars {
		s.swing(&bars[i], f.MaxY-swingRow*(float64(i)+0.5))
	}
	s.swingAxis(f, lo, hi)
	return &s.fig, nil
}

// whole reports whether a bar has both ends and its middle.
func whole(b *remedies.Bar) bool { return !math.IsNaN(b.Low + b.High + b.Base) }

// swing draws one bar about the height y, with its name on the left and its values at its ends.
func (s *sheet) swing(b *remedies.Bar, y float64) {
	h := (smallFace.ascent() + smallFace.descent()) / 2
	s.line(smallFace, inkBlack, 0, y+h, smallFace.fit(clean(b.Input), swingName-8))
	if !whole(b) {
		s.line(smallFace, inkGrey, s.view.frame.MinX+6, y+h, "no answer at one end")
		return
	}
	x := func(fs float64) float64 { return s.pagePoint(fs, 0).X }
	for _, end := range []float64{b.Low, b.High} {
		left, right := min(x(end), x(b.Base)), max(x(end), x(b.Base))
		colour := waterLight
		if end < b.Base {
			colour = cutInk
		}
		s.add(fill{colour, [][]xy{{{left, y - swingBar/2}, {right, y - swingBar/2}, {right, y + swingBar/2}, {left, y + swingBar/2}}}})
	}
	low, high := "low "+fsDown(b.Low), "high "+fsDown(b.High)
	if b.Low > b.High {
		low, high = high, low
	}
	least, most := min(b.Low, b.High, b.Base), max(b.Low, b.High, b.Base)
	s.line(smallFace, inkBlack, x(least)-3-smallFace.width(low), y+h, low)
	s.line(smallFace, inkBlack, x(most)+3, y+h, high)
	s.add(stroke{pen{inkBlack, 1, nil}, [][]xy{{{x(b.Base), y - swingRow/2}, {x(b.Base), y + swingRow/2}}}})
}

// swingAxis draws the axis of FS below the bars.
func (s *sheet) swingAxis(f Box, lo, hi float64) {
	var ticks [][]xy
	for _, t := range ticksOf(lo, hi, 46/s.view.sx) {
		x := s.pagePoint(t.at, 0).X
		ticks = append(ticks, []xy{{x, f.MinY}, {x, f.MinY - tickLength}})
		s.line(axisFace, inkBlack, x-axisFace.width(t.txt)/2, f.MinY-tickLength-1, t.txt)
	}
	s.add(stroke{tickPen, append(ticks, []xy{{f.MinX, f.MinY}, {f.MaxX, f.MinY}})})
	const title = "factor of safety; the upright mark is FS with the inputs as given"
	s.line(axisFace, inkBlack, f.centre().X-axisFace.width(title)/2, f.MinY-tickLength-2-axisFace.lineHeight(), title)
}
