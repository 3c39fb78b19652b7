package pdfreport

import (
	"strings"
	"unicode/utf8"

	"codeberg.org/go-pdf/fpdf"

	"standfast/cmd/internal/drawing"
)

// book is a report being laid out.
type book struct {
	doc   *fpdf.Fpdf // Only measures while pages are laid out.
	pages []*page
	y     float64 // Where the next thing stands on the last page.
	part  string
	parts []entry
	last  headed // The heading written last.
}

// headed is a heading with where it stands, so that it can follow what it belongs to on to the next page.
type headed struct {
	name         string
	page         int     // From 1.
	marks, texts int     // On its page before it.
	from, to     float64 // y.
}

// entry is a line of the contents.
type entry struct {
	name string
	page int // From 1.
}

func newBook(doc *fpdf.Fpdf) *book { return &book{doc: doc} }

// page returns the page in hand.
func (b *book) page() *page { return b.pages[len(b.pages)-1] }

// turn begins a page.
func (b *book) turn(fold bool) {
	b.pages = append(b.pages, &page{fold: fold, part: b.part})
	b.y = contentTop
}

// upright makes sure that a page of text is in hand.
func (b *book) upright() {
	if len(b.pages) == 0 || b.page().fold {
		b.turn(false)
	}
}

// need begins a page of the same size if less than h is left on this one; a page that has nothing on it yet stays.
func (b *book) need(h float64) {
	if b.y+h > contentFoot && b.y > contentTop {
		b.turn(b.page().fold)
	}
}

func (b *book) left() float64  { return margin }
func (b *book) right() float64 { return b.page().width() - margin }
func (b *book) width() float64 { return b.right() - b.left() }

// chapter begins a part of the report on a new page of text.
func (b *book) chapter(name string) {
	b.part = name
	b.turn(false)
	b.parts = append(b.parts, entry{name, len(b.pages)})
	b.add(bookmark{drawing.Printable(name), 0, b.y})
	for _, l := range b.wrap(faceChapter, name, b.width()) {
		b.put(faceChapter, ink, b.left(), b.y, l)
		b.y += faceChapter.lead()
	}
	b.y += 4
	b.rule(b.left(), b.right(), b.y, 0.8, rule)
	b.y += 9
}

// heading writes a heading that does not stand alone at the foot of a page.
func (b *book) heading(name string) {
	b.upright()
	b.headingHere(name)
}

// headingHere writes a heading on the page in hand, whatever its size.
func (b *book) headingHere(name string) {
	const follows = 46.0
	from := b.y
	if b.y > contentTop {
		b.y += 6
	}
	b.need(faceHead.lead() + follows)
	p := b.page()
	h := headed{name: name, page: len(b.pages), marks: len(p.marks), texts: len(p.texts), from: min(from, b.y)}
	for _, l := range b.wrap(faceHead, name, b.width()) {
		b.put(faceHead, ink, b.left(), b.y, l)
		b.y += faceHead.lead()
	}
	b.y += 3
	h.to = b.y
	b.last = h
}

// together makes room for what is h high and stays in one piece, on the next page with the heading right above it if it must. What stands at the
// top of a page already has all the room that there is.
func (b *book) together(h float64) {
	if b.y+h <= contentFoot || b.y <= contentTop {
		return
	}
	l := b.last
	if l.page != len(b.pages) || l.to != b.y {
		b.turn(b.page().fold)
		return
	}
	if l.from <= contentTop {
		return
	}
	p := b.page()
	p.marks, p.texts = p.marks[:l.marks], p.texts[:l.texts]
	b.turn(p.fold)
	b.headingHere(l.name)
}

// para writes a paragraph.
func (b *book) para(s string) { b.indented(faceBody, ink, 0, "", s) }

// note writes a paragraph in small type.
func (b *book) note(s string) { b.indented(faceSmall, inkSoft, 0, "", s) }

// item writes a paragraph behind a mark.
func (b *book) item(s string) { b.indented(faceBody, ink, 11, "–", s) }

// indented writes a paragraph, its lines behind a mark.
func (b *book) indented(f face, c colour, indent float64, lead, s string) {
	b.upright()
	for i, l := range b.wrap(f, tied(s), b.width()-indent) {
		b.need(f.lead())
		if i == 0 && lead != "" {
			b.put(f, c, b.left(), b.y, lead)
		}
		b.put(f, c, b.left()+indent, b.y, l)
		b.y += f.lead()
	}
	b.y += 0.35 * f.size
}

// put writes one line of text with its box starting at x, y.
func (b *book) put(f face, c colour, x, y float64, s string) {
	s = drawing.Printable(s)
	if strings.TrimSpace(s) == "" {
		return
	}
	p := b.page()
	p.marks = append(p.marks, textMark{x, y + f.ascent(), f, c, s})
	p.texts = append(p.texts, placed{s, drawing.Box{MinX: x, MinY: y, MaxX: x + b.measure(f, s), MaxY: y + f.ascent() + f.descent()}})
}

// putRight writes one line of text that ends at x.
func (b *book) putRight(f face, c colour, x, y float64, s string) {
	b.put(f, c, x-b.measure(f, s), y, s)
}

func (b *book) add(m mark) { b.page().marks = append(b.page().marks, m) }

func (b *book) rule(x0, x1, y, width float64, c colour) { b.add(lineMark{x0, y, x1, y, width, c}) }

// figure draws a figure with its upper left corner at left, top.
func (b *book) figure(f *drawing.Figure, left, top, scale float64) {
	b.add(figureMark{f, left, top, scale})
	p := b.page()
	for _, l := range f.Labels {
		p.texts = append(p.texts, placed{l.Text, drawing.Box{
			MinX: left + scale*l.Box.MinX, MaxX: left + scale*l.Box.MaxX,
			MinY: top + scale*(f.Height-l.Box.MaxY), MaxY: top + scale*(f.Height-l.Box.MinY),
		}})
	}
}

// foldOut gives a figure an A3 page of its own, as large as it can be.
func (b *book) foldOut(f *drawing.Figure) {
	b.turn(true)
	w, h := f.Width-2*drawing.Margin, f.Height-2*drawing.Margin // The page has margins of its own.
	scale := min(b.width()/w, (contentFoot-contentTop)/h)
	b.figure(f, b.left()+(b.width()-scale*w)/2-scale*drawing.Margin, b.y-scale*drawing.Margin, scale)
	b.y = contentFoot
}

// inText sets a figure between paragraphs at its own size.
func (b *book) inText(f *drawing.Figure) {
	b.upright()
	b.need(f.Height)
	b.figure(f, b.left(), b.y, 1)
	b.y += f.Height + 6
}

// measure returns the width of a line of text, points.
func (b *book) measure(f face, s string) float64 {
	setFont(b.doc, f)
	return b.doc.GetStringWidth(drawing.Printable(s))
}

// wrap breaks s between words into lines of at most a width, and a word that is wider between letters.
func (b *book) wrap(f face, s string, width float64) []string {
	var lines []string
	line := ""
	for _, word := range words(drawing.Printable(s)) {
		if line != "" && b.measure(f, line+" "+word) <= width {
			line += " " + word
			continue
		}
		if line != "" {
			lines = append(lines, line)
		}
		for b.measure(f, word) > width {
			n := b.fits(f, word, width)
			lines, word = append(lines, word[:n]), word[n:]
		}
		line = word
	}
	if line != "" {
		lines = append(lines, line)
	}
	return lines
}

// noBreak is a blank at which no line is broken.
const noBreak = "\u00a0"

// words parts a text at its blanks.
func words(s string) []string {
	return strings.FieldsFunc(s, func(r rune) bool { return r == ' ' || r == '\n' })
}

// fits returns how many bytes of a word, one letter at least, fit into a width.
func (b *book) fits(f face, word string, width float64) int {
	n := 0
	for i, r := range word {
		if end := i + utf8.RuneLen(r); n == 0 || b.measure(f, word[:end]) <= width {
			n = end
			continue
		}
		break
	}
	return n
}
