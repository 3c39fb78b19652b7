package drawing

import (
	"fmt"
	"io"
	"math"
	"strings"

	"standfast/cmd/internal/dxf"
	"standfast/lem"
	"standfast/remedies"
)

// Layers of a section as DXF.
const (
	layerExisting = "EXISTING"
	layerProposed = "PROPOSED"
	layerStrata   = "STRATA"
	layerWater    = "WATER"
	layerDrains   = "DRAINS"
	layerSlips    = "SLIPS"
	layerLimits   = "LIMITS"
	layerLoads    = "LOADS"
	layerHolding  = "RESTRAINTS"
	layerCut      = "CUT"
	layerFill     = "FILL"
	layerText     = "TEXT"
)

// dxfLayers are the layers with colours by index that differ on a dark screen and in print.
var dxfLayers = []dxf.Layer{
	{Name: layerExisting, Colour: 8, Line: dxf.Dashed},
	{Name: layerProposed, Colour: 7, Line: dxf.Solid},
	{Name: layerStrata, Colour: 33, Line: dxf.Solid},
	{Name: layerWater, Colour: 150, Line: dxf.Solid},
	{Name: layerDrains, Colour: 160, Line: dxf.DashDot},
	{Name: layerSlips, Colour: 220, Line: dxf.Solid},
	{Name: layerLimits, Colour: 43, Line: dxf.DashDot},
	{Name: layerLoads, Colour: 203, Line: dxf.Solid},
	{Name: layerHolding, Colour: 7, Line: dxf.Solid},
	{Name: layerCut, Colour: 32, Line: dxf.Solid},
	{Name: layerFill, Colour: 106, Line: dxf.Solid},
	{Name: layerText, Colour: 7, Line: dxf.Solid},
}

// Measures of a section as DXF, in shares of its span.
const (
	dxfText  = 1.0 / 190 // Height of capitals.
	dxfDash  = 1.0 / 90
	dxfHatch = 1.0 / 180
)

const (
	capitals  = 0.716 // Height of capitals as a share of the type size, Liberation Sans.
	dxfBelow  = 40.0  // Room for labels below the section, points of the sheet.
	spanRatio = 20.0  // Heights of the slope beyond which a longer section has no larger texts.
	leastSpan = 0.05  // Share of the section below which texts and hatches get no smaller, so that their number stays within bounds.
)

// span is the length that texts, dashes and hatches are sized by, m.
func (p *picture) span() float64 {
	whole := p.x1 - p.x0
	return max(min(whole, spanRatio*p.job.Height()), leastSpan*whole)
}

// SectionDXF writes a cross-section as a DXF drawing (release 12) in real coordinates: metres, offset across and level up, the whole length
// of the section. It shows what [Section] shows, and the slip of every situation and stage; circular slips are true arcs. The same section
// gives the same bytes. It returns ErrNothingToDraw for a section without ground, or the error of w.
func SectionDXF(w io.Writer, j *remedies.Job, o *remedies.Option) error {
	p := picture{job: j, opt: o, sec: &j.Section, whole: true}
	if o != nil && o.Proposal != nil {
		p.sec = &o.Proposal.Section
	}
	if !drawable(p.sec) {
		return fmt.Errorf("section of %q: %w", j.Title, ErrNothingToDraw)
	}
	p.gather()
	d := &board{picture: &p, scale: dxfText * p.span() / (capitals * bodyFace.size)}
	d.out.Layers, d.out.Dash = dxfLayers, dxfDash*p.span()
	d.draw()
	return d.out.Write(w)
}

// board is a section being drawn in real coordinates. Labels are laid out on a sheet of the same section, whose points are scale metres.
type board struct {
	*picture
	scale float64
	sheet sheet
	out   dxf.Drawing
}

func (d *board) draw() {
	frame := Box{0, 0, (d.x1 - d.x0) / d.scale, (d.hi-d.lo)/d.scale + dxfBelow + d.sky()}
	d.sheet.view = view{sx: 1 / d.scale, sy: 1 / d.scale, x0: d.x0, y0: d.lo - dxfBelow*d.scale, frame: frame}
	d.sheet.place.area, d.sheet.inside = frame, true
	d.drawGround()
	d.drawHatches()
	d.drawWaterLines()
	d.drawSlips()
	d.marks(layerLimits, d.drawLimits)
	d.marks(layerLoads, d.drawLoads)
	d.marks(layerHolding, d.drawRestraints)
	d.marks(layerSlips, d.drawSurfaces)
	d.marks(layerWater, d.drawPressures)
	d.marks("", d.drawLines) // Labels keep off the lines, which are drawn already.
	d.marks("", d.drawSlip)
	d.tagSlips()
	d.marks(layerText, d.label)
	d.notes()
}

func (d *board) line(layer string, ps []lem.Point, closed bool) {
	out := make([]dxf.Point, len(ps))
	for i, q := range ps {
		out[i] = dxf.Point(q)
	}
	d.out.Polyline(layer, out, closed)
}

func (d *board) drawGround() {
	d.line(layerExisting, d.before, false)
	if d.reshaped {
		d.line(layerProposed, d.ground, false)
	}
	if d.stage != nil {
		d.line(layerProposed, d.stage, false)
	}
	for i, t := range d.tops {
		if i > 0 {
			d.line(layerStrata, t, false)
		}
	}
	for _, b := range d.bodies {
		layer := layerStrata
		if b.added {
			layer = layerProposed
		}
		d.line(layer, b.outline, true)
	}
	if d.sec.FirmBase != nil {
		d.line(layerStrata, crop(d.sec.FirmBase, d.x0, d.x1), false)
	}
}

// drawHatches draws lines across cut and fill: a release 12 drawing has no other hatch.
func (d *board) drawHatches() {
	spacing := dxfHatch * d.span()
	rings := func(list [][]lem.Point) [][]xy {
		out := make([][]xy, len(list))
		for i, r := range list {
			for _, q := range r {
				out[i] = append(out[i], xy(q))
			}
		}
		return out
	}
	put := func(layer string, lines [][]xy) {
		for _, l := range lines {
			d.out.Line(layer, dxf.Point(l[0]), dxf.Point(l[1]))
		}
	}
	if len(d.cuts) > 0 {
		put(layerCut, hatch(cutHatchAngle, spacing, rings(d.cuts)))
	}
	below := rings([][]lem.Point{under(d.ground, d.lo-1)})
	var fills [][]lem.Point
	for _, b := range d.bodies {
		if b.added {
			fills = append(fills, b.outline)
		}
	}
	if fills == nil {
		fills = d.fills
	}
	for _, r := range rings(fills) {
		put(layerFill, hatch(fillHatchAngle, spacing, [][]xy{r}, below))
	}
}

func (d *board) drawWaterLines() {
	for _, w := range d.waters {
		d.line(layerWater, w.line, false)
	}
	for _, f := range d.free {
		for _, r := range d.wet(f) {
			x0, x1 := ends(r)
			d.line(layerWater, []lem.Point{{X: x0, Y: f.Level}, {X: x1, Y: f.Level}}, false)
		}
	}
	if d.drains != nil && len(d.drains.Invert) > 1 {
		d.line(layerDrains, d.drains.Invert, false)
	}
}

// outcomes returns the answers that have a slip to draw.
func (d *board) outcomes() []*remedies.Outcome {
	if d.opt == nil {
		return nil
	}
	var out []*remedies.Outcome
	for _, list := range [][]remedies.Outcome{d.opt.Situations, d.opt.Stages} {
		for i := range list {
			if !math.IsNaN(list[i].FS) {
				out = append(out, &list[i])
			}
		}
	}
	return out
}

func (d *board) drawSlips() {
	for _, o := range d.outcomes() {
		if o.Slip.Kind == lem.Polyline {
			d.line(layerSlips, slipLine(o), false)
			continue
		}
		c := o.Slip.Centre
		a, b := slipFeet(o)
		if left := leftEnd(o); left != a {
			d.line(layerSlips, []lem.Point{left, a}, false)
		}
		if right := rightEnd(o); right != b {
			d.line(layerSlips, []lem.Point{right, b}, false)
		}
		d.out.Arc(layerSlips, dxf.Point(c), o.Slip.Radius, math.Atan2(a.Y-c.Y, a.X-c.X), math.Atan2(b.Y-c.Y, b.X-c.X))
	}
}

// tagSlips numbers the slips, each at another place along it, since the slips of situations often lie upon each other.
func (d *board) tagSlips() {
	list := d.outcomes()
	if len(list) < 2 {
		return
	}
	d.marks(layerText, func(s *sheet) {
		for i, o := range list {
			l := slipLine(o)
			at := l[(i+1)*(len(l)-1)/(len(list)+1)]
			s.label(noteOf(bodyFace, slipInk, 150, fmt.Sprint(i+1)), below, s.view.at(at))
		}
	})
}

// marks draws on the sheet and takes what was drawn over to a layer; texts go to the layer of texts, and areas are left out but for
// arrowheads, which become outlines. Nothing is taken over to a layer without a name.
func (d *board) marks(layer string, draw func(*sheet)) {
	first := len(d.sheet.fig.marks)
	draw(&d.sheet)
	if layer == "" {
		return
	}
	for _, m := range d.sheet.fig.marks[first:] {
		switch v := m.(type) {
		case stroke:
			for _, l := range d.besideLabels(v.lines) {
				d.ring(layer, l, false)
			}
		case fill:
			if v.colour == labelPaper || v.colour == paper {
				continue
			}
			for _, r := range v.rings {
				d.ring(layer, r, true)
			}
		case text:
			turn := 0.0
			if v.turned {
				turn = quarterTurn
			}
			d.out.Text(layerText, d.metres(v.at), v.font.size*capitals*d.scale, turn, v.s)
		}
	}
}

// besideLabels returns the parts of lines that no label stands on: nothing can be painted over in a DXF.
func (d *board) besideLabels(lines [][]xy) [][]xy {
	for _, l := range d.sheet.fig.Labels {
		var out [][]xy
		for _, line := range lines {
			out = append(out, outside(line, l.Box)...)
		}
		lines = out
	}
	return lines
}

// outside cuts what lies in a box out of a line.
func outside(line []xy, b Box) [][]xy {
	var out [][]xy
	part := line[:1:1]
	end := func(next xy) {
		if len(part) > 1 {
			out = append(out, part)
		}
		part = []xy{next}
	}
	for i, q := range line[1:] {
		in, from, ok := clipSegment(line[i], q, b)
		if !ok {
			part = append(part, q)
			continue
		}
		if in != line[i] {
			part = append(part, in)
		}
		end(from)
		if from != q {
			part = append(part, q)
		} else {
			part[0] = q
		}
	}
	end(xy{})
	return out
}

func (d *board) ring(layer string, l []xy, closed bool) {
	out := make([]dxf.Point, len(l))
	for i, q := range l {
		out[i] = d.metres(q)
	}
	d.out.Polyline(layer, out, closed)
}

// metres returns the real coordinates of a point of the sheet.
func (d *board) metres(q xy) dxf.Point {
	v := d.sheet.view
	return dxf.Point{X: v.x0 + (q.X-v.frame.MinX)/v.sx, Y: v.y0 + (q.Y-v.frame.MinY)/v.sy}
}

// notes writes what the heading and the table of a drawing say below the section.
func (d *board) notes() {
	width := d.sheet.view.frame.width()
	h := d.heading(width)
	lines := append([]string{h.title}, h.name...)
	if h.status != "" {
		lines = append(lines, "Status: "+h.status)
	}
	lines = append(lines, h.lines...)
	for i, o := range d.outcomes() {
		name := checkName(&o.Check)
		if o.Check.Stage {
			name = "stage: " + name
		}
		asked := "required " + requiredUp(o.Check.Required)
		if o.Check.Advisory {
			asked = "told only"
		}
		lines = append(lines, fmt.Sprintf("Slip %d, %s: FS %s (%s), %s", i+1, name, fsDown(o.FS), methodName(o.Method), asked))
	}
	if len(d.sheet.unplaced) > 0 {
		lines = append(lines, "Also drawn, without room for a label: "+strings.Join(d.sheet.unplaced, "; ")+".")
	}
	lines = append(lines, "Units: metres; x is the offset, y the level, as in the case file. "+cautions)
	y := 0.0
	for _, l := range lines {
		for _, part := range bodyFace.wrap(clean(l), width, len(l)) {
			y -= bodyFace.lineHeight()
			d.out.Text(layerText, d.metres(xy{0, y}), bodyFace.size*capitals*d.scale, 0, part)
		}
	}
}
