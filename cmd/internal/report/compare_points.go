package report

import (
	"github.com/jedib0t/go-pretty/v6/table"
)

// points prints what every option comes to with each of the strengths that the observed slip allows.
func (p *printer) points(f *File) {
	a := f.BackAnalysis
	if a == nil {
		return
	}
	if len(a.Points) > 0 {
		columns := []column{{head: "option", most: 24}}
		for i := range a.Points {
			s := &a.Points[i]
			cohesion, friction := s.Strengths()
			columns = append(columns, column{head: s.Name + " point\n" + cohesion + "\n" + friction, right: true})
		}
		var rows []table.Row
		for _, r := range f.RankingRows() {
			row := table.Row{r.Title}
			for _, c := range r.Cells {
				row = append(row, c)
			}
			rows = append(rows, row)
		}
		p.heading(f.PointsHeading())
		p.table(columns, rows)
	} else {
		p.line("")
	}
	for _, s := range f.RankingTexts() {
		p.para("", s)
	}
}
