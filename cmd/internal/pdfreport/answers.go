package pdfreport

import (
	"fmt"
	"strings"

	"standfast/cmd/internal/report"
)

// answer is the answer to a situation or a stage.
type answer struct {
	name     string
	required float64
	found    *report.Found
}

// answersOf lists the answers of an option, situations first.
func answersOf(o *report.Option) []answer {
	var out []answer
	for i := range o.Situations {
		s := &o.Situations[i]
		out = append(out, answer{s.Name, s.RequiredFS, &s.Found})
	}
	for i := range o.Stages {
		s := &o.Stages[i]
		out = append(out, answer{fmt.Sprintf("stage %d: %s", s.Order, s.Name), s.RequiredFS, &s.Found})
	}
	return out
}

// factors writes the FS of every check by every method on its critical slip.
func (a *author) factors(list []answer) {
	found := make([]*report.Found, len(list))
	for i := range list {
		found[i] = list[i].found
	}
	methods := methodsOf(found)
	columns := []column{text("check"), number("required"), number("FS"), text("verdict"), text("governs")}
	for _, m := range methods {
		columns = append(columns, number(strings.ReplaceAll(strings.ReplaceAll(method(m), "-", "-\n"), " ", "\n")))
	}
	var rows []row
	for _, l := range list {
		words, c := verdict(l.found, l.required)
		r := row{cells: []string{l.name, required(l.required), factor(l.found.FS), words, method(l.found.Method)}, inks: map[int]colour{2: c, 3: c}}
		for _, m := range methods {
			cell := none
			if fs, ok := l.found.FSByMethod[m]; ok {
				cell = report.FactorText(fs)
			}
			r.cells = append(r.cells, cell)
		}
		rows = append(rows, r)
	}
	a.table(columns, rows)
}

// slips writes where the critical slips lie.
func (a *author) slips(list []answer) {
	var rows []row
	for _, l := range list {
		s := l.found.Slip
		if s == nil {
			rows = append(rows, cells(l.name, "none converged", "", "", "", "", ""))
			continue
		}
		shape, centre, radius := fmt.Sprintf("polyline of %d points", len(s.Points)), none, none
		if s.Centre != nil {
			shape, centre, radius = "circle", at(*s.Centre), fmt.Sprintf("%.2f", s.Radius)
		}
		rows = append(rows, cells(l.name, shape, centre, radius, at(s.From), at(s.To), fmt.Sprintf("%.2f", float64(l.found.Depth))))
	}
	a.table([]column{text("check"), text("shape"), number("centre"), number("radius\nm"), number("left end"), number("right end"), number("depth\nm")}, rows)
}
