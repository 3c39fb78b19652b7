package report

import "github.com/jedib0t/go-pretty/v6/table"

// handChecks prints the closed forms that are told beside the searches, for a check by hand.
func (p *printer) handChecks(f *File) {
	var rows []table.Row
	for _, o := range append([]Option{f.Existing}, f.Options...) {
		for _, h := range o.HandChecks {
			asked := unknown
			if h.RequiredFS.Known() && h.RequiredFS > 0 {
				asked = RequiredText(h.RequiredFS)
			}
			rows = append(rows, table.Row{o.Title, h.Name, FactorText(h.FS), asked, h.Working})
		}
	}
	if len(rows) == 0 {
		return
	}
	p.heading("By hand, from closed forms (sources in the report)")
	p.table([]column{
		{head: "option", most: 16}, {head: "check", most: 18}, {head: "FS", right: true}, {head: "held\nagainst", right: true}, {head: "numbers", most: 46},
	}, rows)
}
