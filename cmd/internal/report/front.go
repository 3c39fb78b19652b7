package report

import (
	"fmt"
	"slices"
	"strings"

	"github.com/jedib0t/go-pretty/v6/table"

	"standfast/remedies"
)

// Front is earthworks against metres of drain of remedies sized together: designs that meet every check, of which none has less of one and no
// more of the other than another. Each is the least earthworks with no more than so much drain, searched and audited.
type Front struct {
	Whole      bool         `json:"whole"`      // Every such design is a point; else there may be more between them.
	Unresolved int          `json:"unresolved"` // Designs that could be neither rejected nor accepted, and might be points.
	Searches   int          `json:"searches"`   // Searches and audits beside those of the certificate; one search is one check of one design.
	Points     []FrontPoint `json:"points"`     // In descending metres of drain; with less drain than the last has, no design was found to meet every check.
}

// FrontPoint is one design of a front.
type FrontPoint struct {
	Drain      Number               `json:"drain_m_per_m"`       // Length of drain, m/m.
	Earthworks Number               `json:"earthworks_m3_per_m"` // Cut plus fill, m3/m.
	Answer     bool                 `json:"answer"`              // True: the design of the option itself.
	Check      string               `json:"check"`               // Situation or stage with the least margin.
	FS         Number               `json:"fs"`                  // Lowest FS found there.
	RequiredFS Number               `json:"required_fs"`         // FS required there.
	Cost       *Number              `json:"cost"`                // Cost of the design for the whole length; null without rates, or if one that it needs is blank.
	Carbon     *Number              `json:"carbon_t"`            // Carbon of it, t CO2 equivalent; null likewise.
	Loads      *Number              `json:"lorry_loads"`         // Whole lorry loads of it; null if not known.
	Parameters map[string]Parameter `json:"parameters"`          // Dimensions of the design.
	Quantities Quantities           `json:"quantities"`          // Per metre run of the works.
}

// front lays out the front of an option; nil if it has none.
func (b *builder) front(o *remedies.Option) *Front {
	f := o.Front
	if f == nil {
		return nil
	}
	out := &Front{Whole: f.Whole, Unresolved: f.Unresolved, Searches: f.Searches, Points: make([]FrontPoint, 0, len(f.Points))}
	for i := range f.Points {
		p := &f.Points[i]
		bill := b.billOf(o, p.Proposal)
		point := FrontPoint{
			Drain: Number(p.Drain), Earthworks: Number(p.Earthworks), Answer: p.Answer, FS: nan, RequiredFS: nan,
			Cost: ifKnown(bill.Cost), Carbon: ifKnown(bill.Carbon / tonne), Loads: ifKnown(bill.Loads),
			Parameters: parametersOf(p.Parameters), Quantities: b.quantities(&p.Proposal.Quantities, &bill),
		}
		if g := p.Governing(); g != nil {
			point.Check, point.FS, point.RequiredFS = g.Check.Label(), Number(g.FS), known(g.Check.Required)
		}
		out.Points = append(out.Points, point)
	}
	return out
}

// frontOf turns a front back.
func frontOf(o *Option) *remedies.Front {
	f := o.Front
	if f == nil {
		return nil
	}
	out := &remedies.Front{Whole: f.Whole, Unresolved: f.Unresolved, Searches: f.Searches}
	for _, p := range f.Points {
		out.Points = append(out.Points, remedies.FrontPoint{
			Drain: float64(p.Drain), Earthworks: float64(p.Earthworks), Answer: p.Answer, Parameters: valuesOf(o.Order, p.Parameters),
		})
	}
	return out
}

// FrontDimensions returns the dimensions of a point of the front in words: those only in which the points differ.
func (o *Option) FrontDimensions(p *FrontPoint) string {
	differing := map[string]Parameter{}
	for name, v := range p.Parameters {
		if slices.ContainsFunc(o.Front.Points, func(q FrontPoint) bool { return q.Parameters[name] != v }) {
			differing[name] = v
		}
	}
	return o.Dimensions(differing)
}

// FrontText says in a few sentences what the points of the front are.
func (o *Option) FrontText() string {
	f := o.Front
	var s []string
	switch {
	case len(f.Points) == 1:
		s = append(s, "More drain than this saves no earthworks.")
	case f.Whole:
		s = append(s, "Of the designs that meet every check none was found with less of one and no more of the other than these.")
	default:
		s = append(s, "Of the designs that meet every check none was found with less of one and no more of the other than any of these; there may be more such designs between them.")
	}
	s = append(s, "With less drain than the last none was found to meet every check. Searched and audited.")
	if !slices.ContainsFunc(f.Points, func(p FrontPoint) bool { return p.Answer }) {
		s = append(s, "The design of the option itself was made least by something else, and is not among them.")
	}
	if f.Unresolved > 0 {
		s = append(s, fmt.Sprintf("Designs that could not be judged, and might come in: %s.", TotalText(float64(f.Unresolved))))
	}
	return strings.Join(s, " ")
}

// fronts prints the front of every option that has one.
func (p *printer) fronts(f *File) {
	for i := range f.Options {
		if o := &f.Options[i]; o.Front != nil {
			p.front(f, o)
		}
	}
}

func (p *printer) front(f *File, o *Option) {
	p.heading(Capital(o.Title) + ": earthworks against metres of drain (FS rounded down, quantities up)")
	columns := []column{{}, {head: "drains\nm/m", right: true}, {head: "earthworks\nm3/m", right: true}}
	priced := slices.ContainsFunc(o.Front.Points, func(q FrontPoint) bool { return q.Cost != nil })
	if priced {
		columns = append(columns, column{head: strings.TrimSpace("cost\n" + f.Economics.Currency), right: true})
	}
	columns = append(columns, column{head: "FS", right: true}, column{head: "required", right: true}, column{head: "in", most: 22}, column{head: "dimensions", most: 34})
	var rows []table.Row
	for i := range o.Front.Points {
		q := &o.Front.Points[i]
		mark := ""
		if q.Answer {
			mark = "answer"
		}
		row := table.Row{mark, QuantityText(float64(q.Drain)), QuantityText(float64(q.Earthworks))}
		if priced {
			row = append(row, optional(q.Cost, TotalText))
		}
		rows = append(rows, append(row, FactorText(q.FS), RequiredText(q.RequiredFS), q.Check, o.FrontDimensions(q)))
	}
	p.table(columns, rows)
	p.para(" ", o.FrontText())
}
