package drawing

import (
	"bytes"
	"image/color"
	"image/png"
	"io"
	"strings"

	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/vgimg"
	"gonum.org/v1/plot/vg/vgsvg"
)

// dpi is the resolution of PNG files: an A4 sheet prints sharply and a file stays near 200 kB.
const dpi = 150

// Figure is a finished drawing.
type Figure struct {
	Width, Height float64 // Size of the page, points of 1/72 inch.
	Labels        []Label // Every text drawn, in drawing order.
	marks         []mark
}

// Label is a text of a drawing with the box that it fills.
type Label struct {
	Text string // Lines are separated by "\n".
	Box  Box
}

// Box is an upright rectangle in page coordinates, points.
type Box struct{ MinX, MinY, MaxX, MaxY float64 }

// Overlaps reports whether the interiors of b and o meet.
func (b Box) Overlaps(o Box) bool {
	return b.MinX < o.MaxX && o.MinX < b.MaxX && b.MinY < o.MaxY && o.MinY < b.MaxY
}

// Within reports whether b lies inside o, touching edges allowed.
func (b Box) Within(o Box) bool {
	return b.MinX >= o.MinX && b.MaxX <= o.MaxX && b.MinY >= o.MinY && b.MaxY <= o.MaxY
}

func (b Box) holds(p xy) bool     { return (Box{p.X, p.Y, p.X, p.Y}).Within(b) }
func (b Box) grown(d float64) Box { return Box{b.MinX - d, b.MinY - d, b.MaxX + d, b.MaxY + d} }
func (b Box) width() float64      { return b.MaxX - b.MinX }
func (b Box) height() float64     { return b.MaxY - b.MinY }
func (b Box) centre() xy          { return xy{(b.MinX + b.MaxX) / 2, (b.MinY + b.MaxY) / 2} }

// nearest returns the point of b nearest to p.
func (b Box) nearest(p xy) xy {
	return xy{min(max(p.X, b.MinX), b.MaxX), min(max(p.Y, b.MinY), b.MaxY)}
}

func (b Box) corners() []xy {
	return []xy{{b.MinX, b.MinY}, {b.MaxX, b.MinY}, {b.MaxX, b.MaxY}, {b.MinX, b.MaxY}}
}

// Page returns the whole page as a box.
func (f *Figure) Page() Box { return Box{0, 0, f.Width, f.Height} }

// WriteSVG writes the figure as an SVG document; the same figure gives the same bytes. Texts name Liberation Sans and fall back
// on faces of the same widths. It returns the error of w.
func (f *Figure) WriteSVG(w io.Writer) error {
	c := vgsvg.New(vg.Length(f.Width), vg.Length(f.Height))
	fill{colour: paper, rings: [][]xy{f.Page().corners()}}.draw(c) // An image is white from the start.
	f.drawOn(c)
	var b bytes.Buffer
	if _, err := c.WriteTo(&b); err != nil {
		return err
	}
	out := bytes.ReplaceAll(b.Bytes(), []byte("font-family:Liberation Sans;"),
		[]byte("font-family:'Liberation Sans',Arial,Helvetica,sans-serif;"))
	_, err := w.Write(out)
	return err
}

// WritePNG writes the figure as a PNG image of 150 dots per inch; the same figure gives the same bytes. It returns the error of w.
func (f *Figure) WritePNG(w io.Writer) error {
	c := vgimg.NewWith(vgimg.UseWH(vg.Length(f.Width), vg.Length(f.Height)), vgimg.UseDPI(dpi))
	f.drawOn(c)
	e := png.Encoder{CompressionLevel: png.BestSpeed}
	return e.Encode(w, c.Image())
}

func (f *Figure) drawOn(c vg.Canvas) {
	for _, m := range f.marks {
		m.draw(c)
	}
}

// xy is a point of the page, points of 1/72 inch.
type xy struct{ X, Y float64 }

func (p xy) vg() vg.Point { return vg.Point{X: vg.Length(p.X), Y: vg.Length(p.Y)} }

// mark is one thing drawn.
type mark interface{ draw(c vg.Canvas) }

// pen says how a line is drawn.
type pen struct {
	colour color.NRGBA
	width  float64   // points
	dash   []float64 // lengths drawn and left out, points; nil: solid
}

// stroke is a set of open polylines drawn with one pen.
type stroke struct {
	pen   pen
	lines [][]xy
}

func (s stroke) draw(c vg.Canvas) {
	dash := make([]vg.Length, len(s.pen.dash))
	for i, d := range s.pen.dash {
		dash[i] = vg.Length(d)
	}
	c.SetColor(s.pen.colour)
	c.SetLineWidth(vg.Length(s.pen.width))
	c.SetLineDash(dash, 0)
	var p vg.Path
	for _, l := range s.lines {
		p = appendPath(p, l)
	}
	if len(p) > 0 {
		c.Stroke(p)
	}
}

// fill is a set of polygons filled with one colour.
type fill struct {
	colour color.NRGBA
	rings  [][]xy
}

func (f fill) draw(c vg.Canvas) {
	c.SetColor(f.colour)
	for _, r := range f.rings {
		if len(r) > 2 {
			p := appendPath(nil, r)
			p.Close()
			c.Fill(p)
		}
	}
}

func appendPath(p vg.Path, l []xy) vg.Path {
	for i, q := range l {
		if i == 0 {
			p.Move(q.vg())
		} else {
			p.Line(q.vg())
		}
	}
	return p
}

// text is one line of text with its baseline starting at a point; turned text runs upwards.
type text struct {
	s      string
	at     xy
	font   face
	colour color.NRGBA
	turned bool
}

func (t text) draw(c vg.Canvas) {
	c.SetColor(t.colour)
	if !t.turned {
		t.fill(c, t.at)
		return
	}
	c.Push()
	c.Translate(t.at.vg())
	c.Rotate(quarterTurn)
	t.fill(c, xy{})
	c.Pop()
}

// fill sets the text with its baseline starting at a point. In an image it is set word by word: kerning in whole pixels would close up the blanks
// beside letters such as A and T.
func (t text) fill(c vg.Canvas, at xy) {
	if _, image := c.(*vgimg.Canvas); !image {
		c.FillString(t.font.vg(), at.vg(), t.s)
		return
	}
	blank := t.font.width(" ")
	for i, word := range strings.Split(t.s, " ") {
		if i > 0 {
			at.X += blank
		}
		c.FillString(t.font.vg(), at.vg(), word)
		at.X += t.font.width(word)
	}
}
