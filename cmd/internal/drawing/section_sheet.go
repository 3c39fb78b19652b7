package drawing

import (
	"fmt"
	"image/color"
	"math"
	"slices"
	"strings"

	"standfast/lem"
	"standfast/remedies"
)

// cautions stand at the foot of every drawing.
const cautions = "Preliminary sizing aid for use by a competent engineer. A limit-equilibrium result is only as good as its ground and " +
	"water model; two-dimensional, no deformation. Local codes and licensed practice govern. Temporary works, upkeep of drains and " +
	"monitoring need their own design. A slope that is moving calls for evacuation and monitoring first."

// Measures of the frame of a section, points.
const (
	leastFrame  = 190.0 // height
	skyAbove    = 62.0  // kept free above the ground for labels
	besideFrame = 8.0   // between the ends of the section and the frame
	blockGap    = 9.0   // between title, frame, key and foot
	tableWidth  = 294.0
)

// layOut draws the picture on a sheet. Labels that found no room the last time are listed at the foot.
func (p *picture) layOut(opts Options, listed []string) *sheet {
	s := &sheet{}
	p.key = key{}
	s.fig.Width = pageWidth
	inner := pageWidth - 2*margin
	p.fillKey()

	head := p.heading(inner)
	rows := p.fsRows()
	columns, width := 4, inner/4
	if len(rows) > 0 {
		columns, width = 3, (inner-tableWidth)/3
	}
	cols, keyHeight := p.key.layOut(columns, width)
	stripHeight := max(keyHeight, tableHeight(rows))
	foot := footLines(inner, opts, listed)

	headHeight, footHeight := head.height(), float64(len(foot))*cautionFace.lineHeight()
	rest := 2*margin + headHeight + axisBelow + stripHeight + footHeight + 3*blockGap
	dx, dy := p.x1-p.x0, p.hi-p.lo
	frameWidth := inner - axisLeft
	frameHeight := (frameWidth-2*besideFrame)*dy/dx + p.sky()
	frameHeight = max(leastFrame, min(frameHeight, pageHeight-rest))
	s.fig.Height = math.Ceil(rest + frameHeight)

	top := s.fig.Height - margin
	s.drawHeading(head, margin, top, inner)
	frame := Box{margin + axisLeft, top - headHeight - blockGap - frameHeight, margin + inner, top - headHeight - blockGap}
	s.view = p.viewIn(frame)
	s.place.area = frame.grown(-3)
	p.drawSection(s)
	s.axes("offset, m (equal scales)", "level, m", p.x0, p.x1)
	stripTop := frame.MinY - axisBelow - blockGap
	s.drawKey(cols, margin, stripTop, width)
	s.drawTable(rows, margin+inner-tableWidth, stripTop)
	for i, l := range foot {
		s.line(cautionFace, inkGrey, margin, margin+footHeight-float64(i)*cautionFace.lineHeight(), l)
	}
	return s
}

// viewIn fits the window into a frame at equal scales.
func (p *picture) viewIn(f Box) view {
	dx, dy := p.x1-p.x0, p.hi-p.lo
	scale := min((f.width()-2*besideFrame)/dx, (f.height()-p.sky())/dy)
	spare := f.height() - p.sky() - dy*scale
	return view{
		sx: scale, sy: scale, frame: f,
		x0: (p.x0+p.x1)/2 - f.width()/2/scale,
		y0: p.lo - 0.4*spare/scale,
	}
}

func footLines(width float64, opts Options, listed []string) []string {
	var out []string
	if len(listed) > 0 {
		out = cautionFace.wrap(clean("Also drawn, without room for a label: "+strings.Join(listed, "; ")+"."), width, 12)
	}
	txt := cautions
	if opts.Credit != "" {
		txt += " " + opts.Credit
	}
	return append(out, cautionFace.wrap(clean(txt), width, 5)...)
}

// heading is what stands above a drawing.
type heading struct {
	title, status string
	ink           color.NRGBA // of the status
	name          []string    // In heavier type.
	lines         []string
}

func (h *heading) height() float64 {
	return titleFace.lineHeight() + float64(len(h.name))*headFace.lineHeight() + float64(len(h.lines))*bodyFace.lineHeight()
}

func (p *picture) heading(width float64) heading {
	h := heading{title: p.job.Title}
	o := p.opt
	switch {
	case o == nil:
		h.name = []string{"Section as read: ground, strata, water, loads and limits"}
	case o.Status == remedies.Existing:
		h.name, h.status = []string{"Section as it is"}, "existing slope"
		h.ink = inkBlack
	default:
		name := o.Title
		if name == "" {
			name = o.Name
		}
		var values []string
		for _, v := range o.Parameters {
			if !math.IsNaN(v.Value) {
				values = append(values, value(v))
			}
		}
		if len(values) > 0 {
			name += ": " + strings.Join(values, ", ")
		}
		h.status = o.Status.String()
		h.name = headFace.wrap(clean(title(name)), width-headFace.width(h.status)-statusRoom, 3)
		if h.ink = goodInk; o.Status != remedies.MeetsTarget {
			h.ink = badInk
		}
	}
	if p.works && (o.Proposal.Quantities.Earthworks() > 0 || o.Proposal.Quantities.Drain > 0) {
		h.lines = append(h.lines, quantities(&o.Proposal.Quantities))
	}
	if p.gov != nil {
		h.lines = append(h.lines, p.slipWords())
	}
	if o != nil && o.Status != remedies.MeetsTarget && o.Status != remedies.Existing && o.Reason != "" {
		h.lines = append(h.lines, bodyFace.wrap(clean(title(o.Reason)), width, 3)...)
	}
	if g := p.sec.GroundBefore(); p.x0 > g.Left() || p.x1 < g.Right() {
		h.lines = append(h.lines, fmt.Sprintf("Shown from offset %s to %s of a section that runs from %s to %s.",
			metres(p.x0), metres(p.x1), metres(g.Left()), metres(g.Right())))
	}
	return h
}

func quantities(q *remedies.Quantities) string {
	out := "Per metre run: cut " + quantityUp(q.TotalCut()) + " m³, fill " + quantityUp(q.TotalFill()) + " m³, earthworks " +
		quantityUp(q.Earthworks()) + " m³"
	if q.Drain > 0 {
		out += ", drains " + quantityUp(q.Drain) + " m"
	}
	return out + "."
}

// slipWords describes the governing slip.
func (p *picture) slipWords() string {
	g := p.gov
	out := "Governing slip: FS " + fsDown(g.FS) + " (" + methodName(g.Method) + "), " + clean(checkName(&g.Check)) + ", required " +
		requiredUp(g.Check.Required)
	if g.Slip.Kind == lem.Circle {
		return out + "; circle about (" + rounded(g.Slip.Centre.X) + ", " + rounded(g.Slip.Centre.Y) + "), radius " +
			rounded(g.Slip.Radius) + " m."
	}
	return out + "; polyline from offset " + rounded(min(g.From.X, g.To.X)) + " m to " + rounded(max(g.From.X, g.To.X)) + " m."
}

func checkName(c *remedies.Check) string {
	if c.Note == "" || strings.Contains(c.Name, c.Note) {
		return c.Name
	}
	return c.Name + " (" + c.Note + ")"
}

// statusRoom is kept beside the status in the corner of a drawing, points.
const statusRoom = 24.0

func (s *sheet) drawHeading(h heading, left, top, width float64) {
	room := width
	if h.status != "" {
		w := headFace.width(h.status)
		b := s.line(headFace, h.ink, left+width-w-5, top-2, h.status).grown(4)
		s.add(stroke{pen{h.ink, 1, nil}, [][]xy{append(b.corners(), b.corners()[0])}})
		room -= w + statusRoom
	}
	s.line(titleFace, inkBlack, left, top, titleFace.fit(clean(h.title), room))
	y := top - titleFace.lineHeight()
	for i, l := range h.name {
		f := optionFace
		f.bold = i == 0
		s.line(f, inkBlack, left, y, f.fit(l, width))
		y -= headFace.lineHeight()
	}
	for _, l := range h.lines {
		s.line(bodyFace, inkBlack, left, y, bodyFace.fit(l, width))
		y -= bodyFace.lineHeight()
	}
}

// tableRow is the height of a row of the table of factors of safety, and tableMost the most rows that it has.
const (
	tableRow  = 9.6
	tableMost = 12
)

// fsRow is a row of the table of factors of safety.
type fsRow struct {
	name                          []string // Its lines.
	required, fs, method, verdict string
	bad                           bool
}

func (r *fsRow) height() float64 {
	return tableRow + float64(len(r.name)-1)*smallFace.lineHeight()
}

// tableHeight returns what the table takes with its head, points.
func tableHeight(rows []fsRow) float64 {
	h := tableRow
	for i := range rows {
		h += rows[i].height()
	}
	return h
}

func (p *picture) fsRows() []fsRow {
	if p.opt == nil {
		return nil
	}
	var rows []fsRow
	for _, o := range slices.Concat(p.opt.Situations, p.opt.Stages) {
		name := checkName(&o.Check)
		if o.Check.Stage {
			name = "stage: " + name
		}
		r := fsRow{name: nameLines(name), required: requiredUp(o.Check.Required), fs: "none", verdict: "unresolved", bad: true}
		if !math.IsNaN(o.FS) {
			r.fs, r.method = fsDown(o.FS), methodName(o.Method)
			switch {
			case o.Check.Advisory:
				r.required, r.verdict, r.bad = "", "told only", false
			case !(o.FS >= o.Check.Required):
				r.verdict = "below"
			case o.Resolved:
				r.verdict, r.bad = "meets", false
			}
		}
		rows = append(rows, r)
	}
	if more := len(rows) - tableMost; more > 0 {
		rows = append(rows[:tableMost-1], fsRow{name: []string{fmt.Sprintf("and %d more, in the result file", more+1)}})
	}
	return rows
}

// nameLines breaks the name of a check for the table.
func nameLines(name string) []string {
	return smallFace.wrap(clean(name), columnRequired-smallFace.width("required")-6, 2)
}

// Right edges of the columns of the table, points from its left edge.
const (
	columnRequired = 152.0
	columnFS       = 182.0
	columnMethod   = 188.0 // left edge
	columnVerdict  = 256.0 // left edge
)

func (s *sheet) drawTable(rows []fsRow, left, top float64) {
	if len(rows) == 0 {
		return
	}
	cell := func(f face, r fsRow, y float64) {
		c := inkBlack
		if r.bad {
			c = badInk
		}
		put := func(x float64, txt string) {
			if txt != "" {
				s.line(f, c, left+x, y, txt)
			}
		}
		for i, l := range r.name {
			s.line(f, c, left, y-float64(i)*f.lineHeight(), l)
		}
		put(columnRequired-f.width(r.required), r.required)
		put(columnFS-f.width(r.fs), r.fs)
		put(columnMethod, f.fit(r.method, columnVerdict-columnMethod-4))
		put(columnVerdict, r.verdict)
	}
	headFace := smallFace
	headFace.bold = true
	cell(headFace, fsRow{name: []string{"situation or stage"}, required: "required", fs: "FS", method: "method", verdict: "verdict"}, top)
	y := top - tableRow
	s.add(stroke{tickPen, [][]xy{{{left, y + 0.8}, {left + tableWidth, y + 0.8}}}})
	for _, r := range rows {
		cell(smallFace, r, y)
		y -= r.height()
	}
}
