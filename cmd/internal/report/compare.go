package report

import (
	"fmt"
	"io"
	"strings"

	"github.com/jedib0t/go-pretty/v6/table"
)

// WriteComparison prints what the options come to: the slope as it is, a row an option, the answer in a sentence with what it rests on,
// and the cautions.
func WriteComparison(w io.Writer, f *File, look Look) error {
	p := newPrinter(w, look)
	p.title(f)
	p.existing(f)
	if len(f.Options) > 0 {
		p.options(f)
		p.materials(f)
		p.reasons(f)
		p.handChecks(f)
		p.relaxations(f)
		p.fronts(f)
	}
	p.answer(f)
	p.points(f)
	p.cautions(f.Cautions)
	return p.err
}

func (p *printer) title(f *File) {
	p.para("", fmt.Sprintf("%s, from %s: %s m of works, crest %s, toe %s", f.Case.Title, f.Case.File, SizeText(f.Case.Length),
		pointText(f.Case.Crest), pointText(f.Case.Toe)))
	if f.Settings.DepthOfInterest > 0 {
		p.para("", fmt.Sprintf("Slips nowhere deeper than %s m below ground are left out.", SizeText(f.Settings.DepthOfInterest)))
	}
	for _, n := range f.Case.Notes {
		p.para("Note: ", n)
	}
}

// existing prints the FS of the slope as it is.
func (p *printer) existing(f *File) {
	p.heading("The slope as it is")
	var rows []table.Row
	for _, s := range f.Existing.Situations {
		rows = append(rows, table.Row{s.Name, FactorText(s.FS), RequiredText(Number(s.RequiredFS)), method(s.Found), verdict(s.Found, s.RequiredFS)})
	}
	p.table([]column{{head: "situation", most: 40}, {head: "FS", right: true}, {head: "required", right: true}, {head: "method"}, {}}, rows)
}

func method(f Found) string {
	if f.Method == "" {
		return unknown
	}
	return MethodText(f.Method)
}

func verdict(f Found, required float64) string {
	switch {
	case !f.FS.Known():
		return "no slip converged"
	case float64(f.FS) < required:
		return "short of target"
	case !f.Resolved:
		return "unresolved"
	}
	return "stands"
}

// options prints a row an option.
func (p *printer) options(f *File) {
	p.heading(fmt.Sprintf("Works per metre run, in ascending %s, those that fail last (FS rounded down, quantities up)", f.Objective()))
	var rows []table.Row
	for i := range f.Options {
		o := &f.Options[i]
		q := &o.Quantities
		title := o.Title
		if o.Trial {
			title += " (trial)"
		}
		row := table.Row{title, QuantityText(q.Earthworks), QuantityText(q.Cut), QuantityText(q.Fill), QuantityText(q.Drain)}
		if g, ok := o.Governing(); ok {
			row = append(row, g.Check, FactorText(g.FS), RequiredText(Number(g.RequiredFS)))
		} else {
			row = append(row, unknown, unknown, unknown)
		}
		binds := o.BindsOn
		if binds == "" || o.Status == meetsTarget { // Then the governing check says all there is.
			binds = unknown
		}
		rows = append(rows, append(row, p.status(o.Status), binds))
	}
	p.table([]column{
		{head: "option", most: 16},
		{head: "earthworks\nm3/m", right: true},
		{head: "cut\nm3/m", right: true},
		{head: "fill\nm3/m", right: true},
		{head: "drains\nm/m", right: true},
		{head: "governing check", most: 18},
		{head: "FS", right: true},
		{head: "required", right: true},
		{head: "status", most: 12},
		{head: "what binds", most: 14},
	}, rows)
}

// reasons prints why options do not meet the target, what could not be checked, and what the works change besides.
func (p *printer) reasons(f *File) {
	type remark struct{ lead, body string }
	var remarks []remark
	for i := range f.Options {
		o := &f.Options[i]
		if o.Reason != "" && o.Status != meetsTarget {
			remarks = append(remarks, remark{o.Title + ", " + o.Status + ": ", o.Reason})
		}
		for _, s := range o.Stages {
			if s.Says != "" {
				remarks = append(remarks, remark{o.Title + ": ", s.Name + ": " + s.Says})
			}
		}
		if s := o.CoarsenedText(); s != "" {
			remarks = append(remarks, remark{o.Title + ": ", s})
		}
		for _, n := range o.NotChecked {
			remarks = append(remarks, remark{o.Title + ": ", n})
		}
		for _, n := range o.Notes {
			remarks = append(remarks, remark{o.Title + ": ", n})
		}
	}
	if len(remarks) > 0 {
		p.line("")
	}
	for _, r := range remarks {
		p.para(" ", r.lead+strings.TrimPrefix(r.body, r.lead))
	}
}

// answer prints the recommendation and what it rests on.
func (p *printer) answer(f *File) {
	p.line("")
	p.para("", f.Recommendation())
	o := f.Least()
	if o == nil || o == &f.Existing {
		return
	}
	for _, s := range []string{f.StepLessText(o), o.CertificateText()} {
		if s != "" {
			p.para("", s)
		}
	}
	p.sensitivity(f, o)
}
