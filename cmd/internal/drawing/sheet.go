package drawing

import (
	"image/color"
	"math"
	"strconv"
	"strings"

	"standfast/lem"
)

// Margin is kept free about a drawing, points.
const Margin = 24.0

// Page measures, points.
const (
	pageWidth  = 842.0 // A4 across.
	pageHeight = 595.0 // A4 across; a sheet grows beyond it only when its texts need more.
	margin     = Margin
	axisLeft   = 38.0 // Room for the numbers and the title of the level axis.
	axisBelow  = 30.0
	tickLength = 3.5
)

// Weights of drawn lines in the search for label positions: the cost of each point covered.
const (
	heaviest = 8.0 // dimension lines: a dimension without its arrows says nothing
	heavy    = 2.5 // ground, slip
	medium   = 0.8 // water, dimensions, loads, limits
	light    = 0.3 // strata
	lighter  = 0.06
)

// view maps section coordinates to the page.
type view struct {
	sx, sy float64 // points per unit
	x0, y0 float64 // coordinates of the frame's lower left corner
	frame  Box
}

func (v view) at(p lem.Point) xy {
	return xy{v.frame.MinX + (p.X-v.x0)*v.sx, v.frame.MinY + (p.Y-v.y0)*v.sy}
}

func (v view) line(ps []lem.Point) []xy {
	out := make([]xy, len(ps))
	for i, p := range ps {
		out[i] = v.at(p)
	}
	return out
}

func (v view) lines(rings [][]lem.Point) [][]xy {
	out := make([][]xy, len(rings))
	for i, r := range rings {
		out[i] = v.line(r)
	}
	return out
}

// sheet is a figure being drawn.
type sheet struct {
	fig      Figure
	view     view
	place    placer
	inside   bool     // What is drawn is cut to the frame.
	unplaced []string // Labels that found no room.
}

// add draws marks, cut to the frame while what is inside it is drawn.
func (s *sheet) add(marks ...mark) {
	for _, m := range marks {
		if s.inside {
			m = clipped(m, s.view.frame)
		}
		s.fig.marks = append(s.fig.marks, m)
	}
}

// stroke draws lines and keeps labels off them.
func (s *sheet) stroke(p pen, weight float64, lines ...[]xy) {
	s.add(stroke{p, lines})
	s.place.avoid(weight, clipLines(lines, s.view.frame)...)
}

// line writes one line of text with its box starting at the left of its upper edge, and records it.
func (s *sheet) line(f face, c color.NRGBA, left, top float64, txt string) Box {
	s.add(text{s: txt, at: xy{left, top - f.ascent()}, font: f, colour: c})
	b := Box{left, top - f.ascent() - f.descent(), left + f.width(txt), top}
	s.fig.Labels = append(s.fig.Labels, Label{txt, b})
	return b
}

// turned writes a line of text that runs upwards, centred at a height, its ascenders at the left edge x.
func (s *sheet) turned(f face, c color.NRGBA, x, middle float64, txt string) {
	w := f.width(txt)
	s.add(text{s: txt, at: xy{x + f.ascent(), middle - w/2}, font: f, colour: c, turned: true})
	s.fig.Labels = append(s.fig.Labels, Label{txt, Box{x, middle - w/2, x + f.ascent() + f.descent(), middle + w/2}})
}

// note is a label before its place is found.
type note struct {
	lines  []string
	font   face
	colour color.NRGBA
	bold   bool // The first line is bold.
	// pointed notes name an area: they have a leader line that ends in it however near they stand.
	pointed bool
	clear   float64 // Kept clear about the anchor beyond the usual gap, points.
}

// noteOf returns a text as a note of at most three lines of a width, points.
func noteOf(f face, c color.NRGBA, width float64, txt string) note {
	return note{lines: f.wrap(clean(txt), width, 3), font: f, colour: c}
}

func (n note) faceOf(i int) face {
	f := n.font
	f.bold = f.bold || n.bold && i == 0
	return f
}

func (n note) size() (w, h float64) {
	for i, l := range n.lines {
		w = max(w, n.faceOf(i).width(l))
	}
	h = float64(len(n.lines)-1)*n.font.lineHeight() + n.font.ascent() + n.font.descent()
	return w, h
}

// label puts a note near the anchor where it stands best, with a leader line where it needs one; a note that finds no room is kept
// for the foot.
func (s *sheet) label(n note, prefer side, anchors ...xy) {
	if len(n.lines) == 0 {
		return
	}
	w, h := n.size()
	var sp spot
	var anchor xy
	least := math.Inf(1)
	for _, a := range anchors {
		if found, cost := s.place.find(wish{w, h, a, prefer, n.clear, n.pointed}); cost < least {
			sp, least, anchor = found, cost, a
		}
	}
	if math.IsInf(least, 1) {
		s.unplaced = append(s.unplaced, strings.Join(n.lines, " "))
		return
	}
	s.place.take(sp, anchor)
	if sp.leader {
		s.leader(sp.box, anchor)
	}
	s.write(n, sp.box)
}

func (s *sheet) leader(b Box, anchor xy) {
	const dot = 1.1 // radius of the dot that ends a leader line, points
	s.add(stroke{leaderPen, [][]xy{{b.nearest(anchor), anchor}}})
	ring := make([]xy, 8)
	for i := range ring {
		sin, cos := math.Sincos(float64(i) * math.Pi / 4)
		ring[i] = xy{anchor.X + dot*cos, anchor.Y + dot*sin}
	}
	s.add(fill{leaderPen.colour, [][]xy{ring}})
}

// write sets a note in a box that was found for it, on a pale ground where lines run under it.
func (s *sheet) write(n note, b Box) {
	if s.place.covered(b) > 0 {
		s.add(fill{labelPaper, [][]xy{b.grown(1).corners()}})
	}
	for i, l := range n.lines {
		f := n.faceOf(i)
		left := b.centre().X - f.width(l)/2
		s.add(text{s: l, at: xy{left, b.MaxY - n.font.ascent() - float64(i)*n.font.lineHeight()}, font: f, colour: n.colour})
	}
	s.fig.Labels = append(s.fig.Labels, Label{strings.Join(n.lines, "\n"), b})
}

// axes draws the frame with ticks and numbers on its left and lower sides, the lower ones between offsets lo and hi.
func (s *sheet) axes(xTitle, yTitle string, lo, hi float64) {
	f := s.view.frame
	s.add(stroke{framePen, [][]xy{append(f.corners(), f.corners()[0])}})
	var ticks [][]xy
	h := axisFace.ascent() + axisFace.descent()
	for _, t := range ticksOf(lo, hi, 46/s.view.sx) {
		x := f.MinX + (t.at-s.view.x0)*s.view.sx
		ticks = append(ticks, []xy{{x, f.MinY}, {x, f.MinY - tickLength}}, []xy{{x, f.MaxY}, {x, f.MaxY - tickLength}})
		s.line(axisFace, inkBlack, x-axisFace.width(t.txt)/2, f.MinY-tickLength-1, t.txt)
	}
	for _, t := range ticksOf(s.view.y0, s.view.y0+f.height()/s.view.sy, 24/s.view.sy) {
		y := f.MinY + (t.at-s.view.y0)*s.view.sy
		ticks = append(ticks, []xy{{f.MinX, y}, {f.MinX - tickLength, y}}, []xy{{f.MaxX, y}, {f.MaxX - tickLength, y}})
		s.line(axisFace, inkBlack, f.MinX-tickLength-2-axisFace.width(t.txt), y+h/2, t.txt)
	}
	s.add(stroke{tickPen, ticks})
	s.line(axisFace, inkBlack, f.centre().X-axisFace.width(xTitle)/2, f.MinY-tickLength-3-h, xTitle)
	s.turned(axisFace, inkBlack, f.MinX-axisLeft, f.centre().Y, yTitle)
}

// tick is a number on an axis.
type tick struct {
	at  float64
	txt string
}

// ticksOf returns the ticks between lo and hi that stand at least gap apart, on multiples of 1, 2 or 5.
func ticksOf(lo, hi, gap float64) []tick {
	power := math.Floor(math.Log10(gap))
	step := math.Pow(10, power)
	for _, m := range []float64{1, 2, 5, 10} {
		if m*math.Pow(10, power) >= gap {
			step = m * math.Pow(10, power)
			if m == 10 {
				power++
			}
			break
		}
	}
	decimals := max(0, int(-power))
	var out []tick
	for k := math.Ceil(lo / step); k*step <= hi; k++ {
		// Adding zero turns a negative zero into a plain one.
		out = append(out, tick{k * step, strconv.FormatFloat(k*step+0, 'f', decimals, 64)})
	}
	return out
}
