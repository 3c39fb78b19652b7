package pdfreport

import (
	"codeberg.org/go-pdf/fpdf"

	"standfast/cmd/internal/drawing"
)

// Sizes of pages, points: A4 upright, and A3 across, which is as high.
const (
	pageHeight  = 841.89
	pageWidth   = 595.28
	foldWidth   = 1190.55
	margin      = 42.0
	contentTop  = 66.0  // Below the running head.
	contentFoot = 796.0 // Above the running foot.
)

// colour is red, green, blue.
type colour [3]int

// Inks. They differ in lightness as well as hue, and verdicts are words too.
var (
	ink     = colour{0x16, 0x16, 0x16}
	inkSoft = colour{0x55, 0x55, 0x55}
	inkGood = colour{0x1d, 0x5f, 0x57}
	inkBad  = colour{0x9c, 0x0f, 0x45}
	rule    = colour{0x8a, 0x8a, 0x8a}
	ruleThi = colour{0xcf, 0xcf, 0xcf}
	tint    = colour{0xee, 0xf1, 0xf0}
)

// face is a type size of Liberation Sans, points.
type face struct {
	size float64
	bold bool
}

// ascent, descent and lead are those of Liberation Sans.
func (f face) ascent() float64  { return 0.905 * f.size }
func (f face) descent() float64 { return 0.212 * f.size }
func (f face) lead() float64    { return 1.24 * f.size }

// Type sizes.
var (
	faceTitle   = face{21, true}
	faceChapter = face{14.5, true}
	faceHead    = face{10.5, true}
	faceBody    = face{9, false}
	faceStrong  = face{9, true}
	faceTable   = face{7.9, false}
	faceSmall   = face{7.2, false}
)

// placed is a text with the box that it fills; boxes count down the page.
type placed struct {
	text string
	box  drawing.Box
}

// page is a page laid out.
type page struct {
	fold  bool   // A3 across.
	part  string // Of the report that it belongs to, for the running head.
	marks []mark
	texts []placed
}

func (p *page) width() float64 {
	if p.fold {
		return foldWidth
	}
	return pageWidth
}

// mark is one thing drawn on a page.
type mark interface{ draw(doc *fpdf.Fpdf) }

type textMark struct {
	x, base float64 // Where the baseline starts.
	font    face
	ink     colour
	s       string
}

func (m textMark) draw(doc *fpdf.Fpdf) {
	setFont(doc, m.font)
	doc.SetTextColor(m.ink[0], m.ink[1], m.ink[2])
	doc.Text(m.x, m.base, m.s)
}

type lineMark struct {
	x0, y0, x1, y1, width float64
	ink                   colour
}

func (m lineMark) draw(doc *fpdf.Fpdf) {
	doc.SetDashPattern(nil, 0)
	doc.SetDrawColor(m.ink[0], m.ink[1], m.ink[2])
	doc.SetLineWidth(m.width)
	doc.Line(m.x0, m.y0, m.x1, m.y1)
}

type fillMark struct {
	x, y, w, h float64
	ink        colour
}

func (m fillMark) draw(doc *fpdf.Fpdf) {
	doc.SetFillColor(m.ink[0], m.ink[1], m.ink[2])
	doc.Rect(m.x, m.y, m.w, m.h, "F")
}

type figureMark struct {
	figure           *drawing.Figure
	left, top, scale float64
}

func (m figureMark) draw(doc *fpdf.Fpdf) { m.figure.DrawPDF(doc, m.left, m.top, m.scale) }

// bookmark is an entry of the outline that a reader shows beside the pages.
type bookmark struct {
	name  string
	level int
	y     float64
}

func (m bookmark) draw(doc *fpdf.Fpdf) { doc.Bookmark(m.name, m.level, m.y) }

func setFont(doc *fpdf.Fpdf, f face) {
	style := ""
	if f.bold {
		style = "B"
	}
	doc.SetFont(drawing.PDFFamily, style, f.size)
}

// linkMark makes an area lead to a page.
type linkMark struct {
	x, y, w, h float64
	page       int
}

func (m linkMark) draw(doc *fpdf.Fpdf) {
	link := doc.AddLink()
	doc.SetLink(link, 0, m.page)
	doc.Link(m.x, m.y, m.w, m.h, link)
}
