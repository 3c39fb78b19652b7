package pdfreport

import (
	"fmt"

	"standfast/cmd/internal/drawing"
	"standfast/cmd/internal/report"
)

// front writes the title page, and leaves room for the contents: on it where there is enough, else on a page of their own.
func (a *author) front() {
	a.part = ""
	a.turn(false)
	a.y = 74
	a.put(faceHead, inkSoft, a.left(), a.y, "Sizing of remedial works for a slope")
	a.y += 22
	for _, l := range a.wrap(faceTitle, a.f.Case.Title, a.width()) {
		a.put(faceTitle, ink, a.left(), a.y, l)
		a.y += faceTitle.lead()
	}
	a.y += 8
	a.rule(a.left(), a.right(), a.y, 1.4, ink)
	a.y += 14
	a.answer()
	a.titleBlock()
	a.revisions()
	a.checker()
	const others = 6 // Parts beside the options.
	if a.rows((others+len(a.f.Options)+1)/2) > contentFoot-a.y {
		a.turn(false)
	}
	a.contentsOn, a.contentsY = len(a.pages), a.y
}

// rows returns what so many rows of the contents take with their heading.
func (a *author) rows(n int) float64 { return contentsHead + contentsLead*float64(n) }

// Measures of the contents, points.
const (
	contentsHead = 34.0
	contentsLead = 14.0
)

// answer writes the result of the sizing on a tinted ground.
func (a *author) answer() {
	const pad = 9.0
	face := face{10.5, false}
	lines := a.wrap(face, cubic(a.f.Recommendation()), a.width()-2*pad)
	h := faceStrong.lead() + float64(len(lines))*face.lead() + 2*pad
	a.add(fillMark{a.left(), a.y, a.width(), h, tint})
	y := a.y + pad
	a.put(faceStrong, ink, a.left()+pad, y, "Answer")
	y += faceStrong.lead() + 1
	for _, l := range lines {
		a.put(face, ink, a.left()+pad, y, l)
		y += face.lead()
	}
	a.y += h + 14
}

// titleBlock writes what the report was made from.
func (a *author) titleBlock() {
	f := a.f
	rows := []row{
		cells("Case file", f.Case.File),
		cells("SHA-256 of the case file", f.Case.SHA256),
		cells("Program", "standfast "+f.Program.Version),
		cells("Length of the works", report.SizeText(f.Case.Length)+" m"),
		cells("Slope before works", fmt.Sprintf("crest %s, toe %s, %s m high", at(f.Case.Crest), at(f.Case.Toe), report.SizeText(f.Case.Crest[1]-f.Case.Toe[1]))),
		cells("Options looked at", optionCount(f)),
		cells("Seed of the searches", fmt.Sprint(f.Settings.Seed)),
	}
	a.table([]column{text("Made from"), text("")}, rows)
}

func optionCount(f *report.File) string {
	meets := 0
	for i := range f.Options {
		if f.Options[i].Status == meetsTarget {
			meets++
		}
	}
	return fmt.Sprintf("%d; meeting the target: %d", len(f.Options), meets)
}

// revisions leaves room for the record of revisions.
func (a *author) revisions() {
	a.heading("Revisions")
	a.form([]string{"Revision", "Date", "What changed", "Made by", "Checked by"}, []float64{0.11, 0.15, 0.42, 0.16, 0.16}, 4)
}

// checker leaves room for the checker's statement.
func (a *author) checker() {
	a.heading("Check")
	a.para("Ground and water model, situations, required factors of safety, limits, governing slips and quantities of this report have been checked against " +
		"the site and its records. What was not accepted is listed on a sheet of its own.")
	a.form([]string{"", "Name", "Organisation", "Signature", "Date"}, []float64{0.14, 0.24, 0.26, 0.21, 0.15}, 3, "Designer", "Checker", "Approver")
}

// form draws an empty table to be filled in by hand; lead are the words in its first column.
func (a *author) form(heads []string, shares []float64, rows int, lead ...string) {
	const high = 19.0
	a.need(16 + high*float64(rows))
	top := a.y
	x := a.left()
	for i, h := range heads {
		a.put(face{faceSmall.size, true}, inkSoft, x+3, top+4, h)
		a.add(lineMark{x, top, x, top + high*float64(rows) + 16, 0.4, rule})
		x += shares[i] * a.width()
	}
	a.add(lineMark{a.right(), top, a.right(), top + high*float64(rows) + 16, 0.4, rule})
	a.rule(a.left(), a.right(), top, 0.4, rule)
	for k := 0; k <= rows; k++ {
		y := top + 16 + high*float64(k)
		a.rule(a.left(), a.right(), y, 0.4, rule)
		if k < len(lead) {
			a.put(faceTable, ink, a.left()+3, y+5, lead[k])
		}
	}
	a.y = top + 16 + high*float64(rows) + 6
}

// contents writes the contents in two columns, once all pages are known; parts that there is no room for are left out.
func (a *author) contents() {
	all := a.pages
	a.pages = all[:a.contentsOn]
	defer func() { a.pages = all }()
	a.y = a.contentsY + 10
	a.put(faceHead, ink, a.left(), a.y, "Contents")
	top := a.contentsY + contentsHead
	const apart = 24.0
	width := (a.width() - apart) / 2
	each := min((len(a.parts)+1)/2, int((contentFoot-top)/contentsLead))
	for i, e := range a.parts[:min(len(a.parts), 2*each)] {
		x, y := a.left()+float64(i/each)*(width+apart), top+float64(i%each)*contentsLead
		a.put(faceBody, ink, x, y, a.fit(faceBody, e.name, width-30))
		a.putRight(faceBody, ink, x+width, y, fmt.Sprint(e.page))
		a.rule(x, x+width, y+faceBody.ascent()+faceBody.descent()+0.6, 0.3, ruleThi)
		a.add(linkMark{x, y, width, contentsLead, e.page})
	}
}

// frames writes the running heads and feet.
func (a *author) frames() {
	all := a.pages
	defer func() { a.pages = all }()
	for i := range all {
		a.pages = all[:i+1]
		if i > 0 {
			a.put(faceSmall, inkSoft, a.left(), 36, a.fit(faceSmall, a.page().part, 0.45*a.width()))
			a.putRight(faceSmall, inkSoft, a.right(), 36, a.fit(faceSmall, a.f.Case.Title, 0.5*a.width()))
			a.rule(a.left(), a.right(), 48, 0.4, ruleThi)
		}
		const foot = 807.0
		a.rule(a.left(), a.right(), foot-4, 0.4, ruleThi)
		a.put(faceSmall, inkSoft, a.left(), foot, a.fit(faceSmall, fmt.Sprintf("standfast %s, case %s. Preliminary sizing aid, for use by a competent engineer.",
			a.f.Program.Version, short(a.f.Case.SHA256)), a.width()-80))
		a.putRight(faceSmall, inkSoft, a.right(), foot, fmt.Sprintf("page %d of %d", i+1, len(all)))
	}
}

// short is the beginning of a hash, long enough to tell two cases apart.
func short(hash string) string { return hash[:min(len(hash), 12)] }

// fit shortens a text to a width, marking the cut.
func (b *book) fit(f face, s string, width float64) string {
	s = drawing.Printable(s)
	if b.measure(f, s) <= width {
		return s
	}
	const cut = "…"
	return s[:b.fits(f, s, width-b.measure(f, cut))] + cut
}
