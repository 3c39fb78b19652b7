package pdfreport

import (
	"standfast/cmd/internal/report"
)

// points writes what every option comes to with the strengths that the observed slip leaves open.
func (a *author) points() {
	b := a.f.BackAnalysis
	if b == nil {
		return
	}
	a.heading("Is the choice the same whatever the observed slip leaves open?")
	for _, s := range a.f.RankingTexts() {
		a.para(cubic(s))
	}
	if len(b.Points) == 0 {
		return
	}
	columns := []column{text("option")}
	for i := range b.Points {
		cohesion, friction := b.Points[i].Strengths()
		columns = append(columns, text(b.Points[i].Name+" point\n"+cohesion+"\n"+friction))
	}
	var rows []row
	for _, r := range a.f.RankingRows() {
		line := row{cells: []string{report.Capital(r.Title)}}
		for _, c := range r.Cells {
			line.cells = append(line.cells, raised(c))
		}
		rows = append(rows, line)
	}
	a.note(cubic(a.f.PointsHeading()) + ".")
	a.table(columns, rows)
	rows = nil
	for i := range b.Points {
		p := &b.Points[i]
		for k := range p.Options {
			rows = append(rows, pointRow(p.Name, &p.Options[k]))
		}
	}
	a.table([]column{
		text("point"), text("option"), text("dimensions; of what fails, those that come nearest"), text("check with the least margin"), number("FS"), number("required"), text("status"),
	}, rows)
}

// pointRow is the row of an option at a point.
func pointRow(point string, o *report.Option) row {
	full := optionRow(o)
	n := len(full.cells)
	return row{
		cells: append([]string{point, full.cells[0], o.Dimensions(o.Parameters)}, full.cells[n-4:]...),
		inks:  map[int]colour{6: full.inks[n-1]},
	}
}
