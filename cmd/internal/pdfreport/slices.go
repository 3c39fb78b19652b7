package pdfreport

import (
	"errors"
	"fmt"
	"math"

	"standfast/cmd/internal/report"
	"standfast/lem"
	"standfast/remedies"
)

// finer are the slices tried for a slice table, over those of a search. An audit has twice as many.
var finer = []float64{1, 1.25, 1.5, 1.75, 2}

// sameFactor reports whether two factors of safety are printed alike.
func sameFactor(f, g float64) bool {
	return report.FactorText(report.Number(f)) == report.FactorText(report.Number(g))
}

// setting returns how the governing slip of a check was found.
func (a *author) setting(o *remedies.Outcome, slices int) lem.Setting {
	j := a.r.Job
	window := lem.Window{Direction: j.Direction, Head: j.Head, Toe: j.Exit}
	return lem.Setting{Method: o.Method, Slices: slices, MinDepth: j.MinDepth, Window: window, SideForce: j.SideForce}
}

// working analyses the governing slip of a check again: with the fewest slices that give the FS as
// printed, or with those of an audit.
func (a *author) working(m *lem.Model, o *remedies.Outcome) (lem.Detail, error) {
	if err := m.Compile(o.Check.Section, &o.Check.Situation); err != nil {
		return lem.Detail{}, err
	}
	var d lem.Detail
	for _, share := range finer {
		var err error
		d, err = m.Detail(&o.Slip, a.setting(o, int(share*float64(a.f.Settings.Slices))))
		if err != nil || sameFactor(d.Result.F, o.FS) {
			return d, err
		}
	}
	return d, nil
}

// slices writes the slice table of the governing slip on a page that folds out.
func (a *author) slices(o *remedies.Outcome) error {
	if o == nil || math.IsNaN(o.FS) {
		a.para("There is no slice table: no slip converged.")
		return nil
	}
	var m lem.Model
	d, err := a.working(&m, o)
	if errors.Is(err, lem.ErrNoWorking) {
		a.para("There is no slice table: " + err.Error() + ".")
		return nil
	}
	if err != nil {
		return fmt.Errorf("slice table: %w", err)
	}
	t := report.SliceTable{Situation: o.Check.Label(), Detail: d}
	for i := range o.Check.Section.Soils {
		t.Soils = append(t.Soils, o.Check.Section.Soils[i].Name)
	}
	a.turn(true)
	a.headingHere(fmt.Sprintf("Slice table of the governing slip: %s, %s, %d slices", o.Check.Label(), method(d.Setting.Method.String()), len(d.Slices)))
	for _, l := range t.Closing() {
		a.line(l)
	}
	if !sameFactor(d.Result.F, o.FS) {
		a.line(fmt.Sprintf("The search found FS %s on this slip, with other slices.", report.FactorText(report.Number(o.FS))))
	}
	a.slipPoints(o)
	a.y += 6
	a.sliceTables(&t)
	return nil
}

// sliceTables writes the slices, and the forces between them beside or behind them.
func (a *author) sliceTables(t *report.SliceTable) {
	const apart = 26.0
	head, rows := t.Rows()
	slices, sliceRows := asTable(head, rows, 1)
	sliceRows[len(sliceRows)-1].bold = true
	head, rows = t.Sides()
	if len(rows) == 0 {
		a.tableIn(dense, slices, sliceRows, a.left(), a.width())
		return
	}
	sides, sideRows := asTable(head, rows, 0)
	share := float64(len(slices)+1) / float64(len(slices)+1+len(sides))
	width := (a.width() - apart) * share
	top, pages := a.y, len(a.pages)
	a.tableIn(dense, slices, sliceRows, a.left(), width)
	if len(a.pages) == pages {
		a.y = top
	} else {
		a.turn(true)
	}
	a.tableIn(dense, sides, sideRows, a.left()+width+apart, a.width()-apart-width)
}

// asTable turns heads and rows of text into a table whose last columns are words.
func asTable(head []string, cells [][]string, words int) ([]column, []row) {
	columns := make([]column, len(head))
	for i, h := range head {
		columns[i] = column{head: h, right: i < len(head)-words}
	}
	rows := make([]row, len(cells))
	for i, c := range cells {
		rows[i] = row{cells: c}
	}
	return columns, rows
}

// line writes a line of small type on the page in hand, whatever its size.
func (a *author) line(s string) {
	for _, l := range a.wrap(faceTable, s, a.width()) {
		a.need(faceTable.lead())
		a.put(faceTable, ink, a.left(), a.y, l)
		a.y += faceTable.lead()
	}
}

// slipPoints writes where a slip runs.
func (a *author) slipPoints(o *remedies.Outcome) {
	s := report.SlipOf(o)
	words := "Slip, m: " + s.String() + "."
	if len(s.Points) > 0 {
		words += " Points:"
		for _, p := range s.Points {
			words += fmt.Sprintf(" (%.3f, %.3f)", p[0], p[1])
		}
	}
	a.line(words)
}
