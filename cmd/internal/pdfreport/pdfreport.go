package pdfreport

import (
	"errors"
	"fmt"
	"io"

	"codeberg.org/go-pdf/fpdf"

	"standfast/cmd/internal/drawing"
	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// Name is the name of the file.
const Name = "report.pdf"

// Write writes the report of a result to w. Its error wraps [report.ErrIncomplete] if the result does not hold what drawings need, or is that
// of w.
func Write(w io.Writer, f *report.File) error {
	doc := drawing.NewPDF(pageWidth, pageHeight)
	b, err := layOut(doc, f)
	if err != nil {
		return err
	}
	doc.SetTitle(drawing.Printable(f.Case.Title)+": remedial works", true)
	doc.SetLang("en")
	for _, p := range b.pages {
		orientation := "P"
		size := fpdf.SizeType{Wd: pageWidth, Ht: pageHeight}
		if p.fold {
			orientation, size = "L", fpdf.SizeType{Wd: pageHeight, Ht: foldWidth}
		}
		doc.AddPageFormat(orientation, size)
		for _, m := range p.marks {
			m.draw(doc)
		}
	}
	if err := doc.Output(w); err != nil {
		return fmt.Errorf("pdfreport: %w", err)
	}
	return nil
}

// author writes the parts of a report.
type author struct {
	*book
	f *report.File
	r *remedies.Result // The same, as sections to draw and slips to analyse.

	contentsOn int     // Page that the contents stand on, from 1,
	contentsY  float64 // and how far down.
}

// layOut lays the pages of a report out, measuring with doc.
func layOut(doc *fpdf.Fpdf, f *report.File) (*book, error) {
	r, err := report.Rebuild(f)
	if err != nil {
		return nil, err
	}
	a := &author{book: newBook(doc), f: f, r: r}
	a.front()
	a.inputs()
	if err := a.model(); err != nil {
		return nil, err
	}
	a.methods()
	if err := a.existing(); err != nil {
		return nil, err
	}
	if err := a.comparison(); err != nil {
		return nil, err
	}
	for i := range f.Options {
		if err := a.option(&f.Options[i], &r.Options[i]); err != nil {
			return nil, fmt.Errorf("option %q: %w", f.Options[i].Name, err)
		}
	}
	a.closing()
	a.contents()
	a.frames()
	return a.book, nil
}

// drawn returns a figure unless there is nothing to draw.
func drawn(f *drawing.Figure, err error) (*drawing.Figure, error) {
	if errors.Is(err, drawing.ErrNothingToDraw) {
		return nil, nil
	}
	return f, err
}

// onFold gives a figure a page of its own if there is one.
func (a *author) onFold(f *drawing.Figure, err error) error {
	f, err = drawn(f, err)
	if f != nil {
		a.foldOut(f)
	}
	return err
}

// amid sets a figure between paragraphs under a heading if there is one.
func (a *author) amid(heading string, f *drawing.Figure, err error) error {
	f, err = drawn(f, err)
	if f != nil {
		a.need(f.Height + 2*faceHead.lead())
		a.heading(heading)
		a.inText(f)
	}
	return err
}
