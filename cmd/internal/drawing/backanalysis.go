package drawing

import (
	"fmt"
	"math"

	"standfast/remedies"
)

// backFrame is the height of the frame of a back-analysis, points.
const backFrame = 340.0

// backPlot is what is drawn of a back-analysis: one number over another.
type backPlot struct {
	xTitle, yTitle string
	x, y           func(p *remedies.BackPoint) float64
	value          func(p *remedies.BackPoint) string
}

func inDegrees(rad float64) float64 { return rad * 180 / math.Pi }

// plotOf returns how the unknown of a back-analysis is drawn: c' over φ′, or FS over the single unknown.
func plotOf(u remedies.Unknown) backPlot {
	fs := func(p *remedies.BackPoint) float64 { return p.FS }
	friction := func(p *remedies.BackPoint) float64 { return inDegrees(p.Friction) }
	const yTitle = "FS of the observed slip"
	switch u {
	case remedies.FrictionAlone:
		return backPlot{"angle of friction φ′, degrees (c′ = 0)", yTitle, friction, fs, func(p *remedies.BackPoint) string {
			return fmt.Sprintf("φ′ %s°", cutShort(friction(p), 2))
		}}
	case remedies.UndrainedCu:
		return backPlot{"undrained strength cu, kPa", yTitle, func(p *remedies.BackPoint) float64 { return p.Strength }, fs, func(p *remedies.BackPoint) string {
			return fmt.Sprintf("cu %s kPa", cutShort(p.Strength, 2))
		}}
	case remedies.PressureRatio:
		return backPlot{"pore pressure ratio ru", yTitle, func(p *remedies.BackPoint) float64 { return p.Ru }, fs, func(p *remedies.BackPoint) string {
			return "ru " + upTo(p.Ru, 3)
		}}
	case remedies.StrengthPair:
	}
	return backPlot{"angle of friction φ′, degrees", "cohesion c′, kPa", friction, func(p *remedies.BackPoint) float64 { return p.Cohesion }, func(p *remedies.BackPoint) string {
		return fmt.Sprintf("c′ %s kPa, φ′ %s°", cutShort(p.Cohesion, 2), cutShort(friction(p), 2))
	}}
}

// BackAnalysis draws the pairs of c' and φ′ with which an observed slip just fails, or its FS over the single unknown, with the low, middle and high
// points marked. It returns ErrNothingToDraw for a curve of fewer than two points.
func BackAnalysis(name, soil string, b *remedies.BackAnalysis, opts Options) (*Figure, error) {
	if len(b.Curve) < 2 {
		return nil, fmt.Errorf("back-analysis of %q: %w", name, ErrNothingToDraw)
	}
	s := layOutBack(name, soil, b, opts, nil)
	if len(s.unplaced) > 0 {
		s = layOutBack(name, soil, b, opts, s.unplaced)
	}
	return &s.fig, nil
}

func layOutBack(name, soil string, b *remedies.BackAnalysis, opts Options, listed []string) *sheet {
	s := &sheet{}
	plot := plotOf(b.Unknown)
	inner := pageWidth - 2*margin
	subject := "Strengths of " + soil + " with which the observed slip just fails (FS = 1)"
	if b.Unknown != remedies.StrengthPair {
		subject = "Back-analysis of the observed slip: what gives it FS = 1 in " + soil
	}
	h := heading{title: name, name: []string{clean(subject)}, lines: []string{
		fmt.Sprintf("%s method; slip from offset %s m to %s m, %s m deep; %.0f %% of it in this soil. One failure gives one equation: what the water is wrong by, the strength takes up.",
			methodName(b.Method), rounded(b.From.X), rounded(b.To.X), rounded(b.Depth), 100*b.Share),
	}}
	foot := footLines(inner, opts, listed)
	footHeight := float64(len(foot)) * cautionFace.lineHeight()
	s.fig.Width = pageWidth
	s.fig.Height = math.Ceil(2*margin + h.height() + backFrame + axisBelow + footHeight + 2*blockGap)
	top := s.fig.Height - margin
	s.drawHeading(h, margin, top, inner)
	frameTop := top - h.height() - blockGap
	frame := Box{margin + axisLeft, frameTop - backFrame, margin + inner, frameTop}
	s.view = backView(frame, b, &plot)
	s.place.area = frame.grown(-3)
	s.drawBack(b, &plot)
	s.axes(plot.xTitle, plot.yTitle, s.view.x0, s.view.x0+frame.width()/s.view.sx)
	for i, l := range foot {
		s.line(cautionFace, inkGrey, margin, margin+footHeight-float64(i)*cautionFace.lineHeight(), l)
	}
	return s
}

// backView fits the curve into the frame; cohesion and friction begin at 0.
func backView(f Box, b *remedies.BackAnalysis, plot *backPlot) view {
	x0, x1, y0, y1 := math.Inf(1), math.Inf(-1), math.Inf(1), math.Inf(-1)
	for i := range b.Curve {
		x, y := plot.x(&b.Curve[i]), plot.y(&b.Curve[i])
		x0, x1, y0, y1 = min(x0, x), max(x1, x), min(y0, y), max(y1, y)
	}
	if b.Unknown == remedies.StrengthPair {
		x0, y0 = 0, 0
	} else {
		y0, y1 = min(y0, 1-b.Margin), max(y1, 1+b.Margin)
	}
	const around = 0.08 // Of the span, kept free at the ends.
	dx, dy := x1-x0, y1-y0
	x1, y1 = x1+around*dx, y1+around*dy
	if b.Unknown != remedies.StrengthPair {
		x0, y0 = x0-around*dx, y0-around*dy
	}
	return view{frame: f, x0: x0, y0: y0, sx: f.width() / (x1 - x0), sy: f.height() / (y1 - y0)}
}

func (s *sheet) drawBack(b *remedies.BackAnalysis, plot *backPlot) {
	style := curveStyles[0]
	f := s.view.frame
	if b.Unknown != remedies.StrengthPair {
		at := s.pagePoint(0, 1).Y
		s.stroke(pen{inkBlack, 1, []float64{12, 4}}, heavy, []xy{{f.MinX, at}, {f.MaxX, at}})
	}
	var line []xy
	for i := range b.Curve {
		line = append(line, s.pagePoint(plot.x(&b.Curve[i]), plot.y(&b.Curve[i])))
	}
	s.stroke(pen{style.colour, 1.4, nil}, heavy, line)
	for _, q := range line {
		s.marker(style, q, 0.6*markerSize)
	}
	for _, p := range []struct {
		name string
		of   *remedies.BackPoint
	}{{"low", &b.Low}, {"middle", &b.Middle}, {"high", &b.High}} {
		at := s.pagePoint(plot.x(p.of), plot.y(p.of))
		s.marker(curveStyle{colour: slipInk, marker: diamondMarker}, at, 1.5*markerSize)
		box := Box{at.X, at.Y, at.X, at.Y}.grown(1.5 * markerSize)
		s.place.avoid(heavy, []xy{{box.MinX, box.MinY}, {box.MaxX, box.MaxY}})
		n := noteOf(strongFace, slipInk, 200, p.name+": "+plot.value(p.of))
		n.clear = 1.5 * markerSize
		s.label(n, rightOf, at)
	}
}
