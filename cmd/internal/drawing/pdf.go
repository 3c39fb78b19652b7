package drawing

import (
	"fmt"
	"image"
	"image/color"
	"io"
	"math"
	"time"

	"codeberg.org/go-fonts/liberation/liberationsansbold"
	"codeberg.org/go-fonts/liberation/liberationsansregular"
	"codeberg.org/go-pdf/fpdf"
	"golang.org/x/image/font"
	"gonum.org/v1/plot/vg"

	pfont "gonum.org/v1/plot/font"
)

// PDFFamily is the name under which Liberation Sans is embedded in a document, upright and bold.
const PDFFamily = "sans"

// pdfDate stands in every document: a file holds no time, so that the same drawing gives the same bytes.
var pdfDate = time.Date(2000, 1, 1, 0, 0, 0, 0, time.UTC)

// NewPDF returns a document without pages, in points with y down the page, whose pages have a size, points, unless they are given another. It
// has Liberation Sans as [PDFFamily], no margins, and no time, so that the same contents give the same bytes.
func NewPDF(width, height float64) *fpdf.Fpdf {
	doc := fpdf.NewCustom(&fpdf.InitType{UnitStr: "pt", Size: fpdf.SizeType{Wd: width, Ht: height}})
	doc.SetCreationDate(pdfDate)
	doc.SetModificationDate(pdfDate)
	doc.SetCatalogSort(true)
	doc.SetProducer("standfast", false)
	doc.SetMargins(0, 0, 0)
	doc.SetAutoPageBreak(false, 0)
	addFonts(doc)
	return doc
}

func addFonts(doc *fpdf.Fpdf) {
	doc.AddUTF8FontFromBytes(PDFFamily, "", liberationsansregular.TTF)
	doc.AddUTF8FontFromBytes(PDFFamily, "B", liberationsansbold.TTF)
}

// WritePDF writes the figure as a PDF document of one page, in vectors with its fonts embedded, so that it can be searched in any
// script that Liberation Sans has; the same figure gives the same bytes. It returns the error of w.
func (f *Figure) WritePDF(w io.Writer) error {
	doc := NewPDF(f.Width, f.Height)
	doc.AddPage()
	f.DrawPDF(doc, 0, 0, 1)
	if err := doc.Output(w); err != nil {
		return fmt.Errorf("drawing: %w", err)
	}
	return nil
}

// DrawPDF draws the figure on the page in hand, with its upper left corner at (left, top) in the document's unit, scaled. It embeds
// Liberation Sans in the document as [PDFFamily] and leaves font, colours and line width to be set anew. Errors are kept by the document.
func (f *Figure) DrawPDF(doc *fpdf.Fpdf, left, top, scale float64) {
	addFonts(doc)
	_, height := doc.GetPageSize()
	k := doc.GetConversionRatio()
	c := &pdfCanvas{doc: doc, height: height, k: k}
	c.Push()
	c.matrix(scale, 0, 0, scale, left*k, (height-top)*k-f.Height*scale)
	f.drawOn(c)
	c.Pop()
}

// pdfCanvas draws on a page of an fpdf document. Inside, lengths are points and y runs up, as in PDF itself; fpdf counts down from the
// upper edge in a unit of its own, so every point is turned on its way.
type pdfCanvas struct {
	doc    *fpdf.Fpdf
	height float64 // Of the page, in the document's unit.
	k      float64 // Points to the document's unit.
	state  pdfState
	stack  []pdfState
}

// pdfState is what Push saves.
type pdfState struct {
	colour color.NRGBA
	width  float64   // points
	dash   []float64 // in the document's unit
	offset float64   // in the document's unit
}

// matrix applies a transformation: a point becomes (a x + c y + e, b x + d y + f).
func (c *pdfCanvas) matrix(a, b, cc, d, e, f float64) {
	c.doc.Transform(fpdf.TransformMatrix{A: a, B: b, C: cc, D: d, E: e, F: f})
}

func (c *pdfCanvas) at(p vg.Point) (x, y float64) {
	return float64(p.X) / c.k, c.height - float64(p.Y)/c.k
}

func (c *pdfCanvas) SetLineWidth(w vg.Length) { c.state.width = float64(w) }

func (c *pdfCanvas) SetLineDash(pattern []vg.Length, offset vg.Length) {
	dash := make([]float64, len(pattern))
	for i, l := range pattern {
		dash[i] = float64(l) / c.k
	}
	c.state.dash, c.state.offset = dash, float64(offset)/c.k
}

func (c *pdfCanvas) SetColor(col color.Color) {
	if col == nil {
		col = color.Black
	}
	c.state.colour = color.NRGBAModel.Convert(col).(color.NRGBA)
}

func (c *pdfCanvas) Rotate(rad float64) {
	sin, cos := math.Sincos(rad)
	c.matrix(cos, sin, -sin, cos, 0, 0)
}

func (c *pdfCanvas) Translate(p vg.Point) { c.matrix(1, 0, 0, 1, float64(p.X), float64(p.Y)) }
func (c *pdfCanvas) Scale(x, y float64)   { c.matrix(x, 0, 0, y, 0, 0) }

func (c *pdfCanvas) Push() {
	c.stack = append(c.stack, c.state)
	c.doc.TransformBegin()
}

func (c *pdfCanvas) Pop() {
	last := len(c.stack) - 1
	c.state, c.stack = c.stack[last], c.stack[:last]
	c.doc.TransformEnd()
	// PDF takes the font back with the rest of the state. fpdf does not know it and would leave out to set the same font again, so it gets another.
	const noSize = 1.0
	c.doc.SetFont(PDFFamily, "", noSize)
}

func (c *pdfCanvas) Stroke(p vg.Path) {
	if c.state.width <= 0 {
		return
	}
	s := &c.state
	c.doc.SetDrawColor(int(s.colour.R), int(s.colour.G), int(s.colour.B))
	c.doc.SetLineWidth(s.width / c.k)
	c.doc.SetDashPattern(s.dash, s.offset)
	c.paint(p, "D")
}

func (c *pdfCanvas) Fill(p vg.Path) {
	s := &c.state
	c.doc.SetFillColor(int(s.colour.R), int(s.colour.G), int(s.colour.B))
	c.paint(p, "F")
}

// paint draws a path in one style, with the opacity of the colour.
func (c *pdfCanvas) paint(p vg.Path, style string) {
	c.withOpacity(func() {
		for i := range p {
			c.component(&p[i])
		}
		c.doc.DrawPath(style)
	})
}

func (c *pdfCanvas) withOpacity(draw func()) {
	const opaque = 0xff
	if c.state.colour.A == opaque {
		draw()
		return
	}
	c.doc.SetAlpha(float64(c.state.colour.A)/opaque, "Normal")
	draw()
	c.doc.SetAlpha(1, "Normal")
}

func (c *pdfCanvas) component(q *vg.PathComp) {
	x, y := c.at(q.Pos)
	switch q.Type {
	case vg.MoveComp:
		c.doc.MoveTo(x, y)
	case vg.LineComp:
		c.doc.LineTo(x, y)
	case vg.ArcComp:
		r := float64(q.Radius) / c.k
		const degree = 180 / math.Pi
		c.doc.ArcTo(x, y, r, r, 0, q.Start*degree, (q.Start+q.Angle)*degree)
	case vg.CurveComp:
		x0, y0 := c.at(q.Control[0])
		if len(q.Control) == 1 {
			c.doc.CurveTo(x0, y0, x, y)
			return
		}
		x1, y1 := c.at(q.Control[1])
		c.doc.CurveBezierCubicTo(x0, y0, x1, y1, x, y)
	case vg.CloseComp:
		c.doc.ClosePath()
	}
}

func (c *pdfCanvas) FillString(f pfont.Face, p vg.Point, s string) {
	if f.Font.Size == 0 {
		return
	}
	style := ""
	if f.Font.Weight == font.WeightBold {
		style = "B"
	}
	c.doc.SetFont(PDFFamily, style, float64(f.Font.Size))
	c.doc.SetTextColor(int(c.state.colour.R), int(c.state.colour.G), int(c.state.colour.B))
	x, y := c.at(p)
	c.withOpacity(func() { c.doc.Text(x, y, s) })
}

// DrawImage panics: drawings are vectors throughout.
func (c *pdfCanvas) DrawImage(vg.Rectangle, image.Image) {
	panic("drawing: a PDF drawing holds no images")
}
