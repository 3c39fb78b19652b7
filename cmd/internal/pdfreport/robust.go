package pdfreport

import (
	"fmt"

	"standfast/cmd/internal/drawing"
	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// handChecks writes the closed forms that are told beside the checks.
func (a *author) handChecks(o *report.Option) {
	if len(o.HandChecks) == 0 {
		return
	}
	var rows []row
	for _, h := range o.HandChecks {
		asked := none
		if h.RequiredFS.Known() {
			asked = required(float64(h.RequiredFS))
		}
		rows = append(rows, cells(h.Name, factor(h.FS), asked, raised(h.Working), h.Source))
	}
	a.heading("Closed forms, for a check by hand")
	a.table([]column{text("check"), number("FS"), number("held against"), text("numbers"), text("source")}, rows)
}

// sensitivity draws and lists how the least margin swings with the inputs.
func (a *author) sensitivity(o *report.Option, r *remedies.Option) error {
	if len(o.Sensitivity) == 0 {
		return nil
	}
	figure, err := drawing.Sensitivity(r.Sensitivity, a.width())
	if err := a.amid("How sure: FS of the check with the least margin, one input at either end of its swing", figure, err); err != nil {
		return err
	}
	var rows []row
	for _, b := range o.Sensitivity {
		rows = append(rows, cells(b.Input, factor(b.Low.FS), swungAt(&b.Low), factor(b.High.FS), swungAt(&b.High)))
	}
	a.table([]column{text("input"), number("FS low"), text("in"), number("FS high"), text("in")}, rows)
	a.note("Critical slips were searched anew at each end, and not audited. The swings are those of the case.")
	return nil
}

// swungAt names the check with the least margin at one end of a swing, and what it asks where it falls short.
func swungAt(s *report.Swung) string {
	if s.FS.Known() && s.FS < s.RequiredFS {
		return fmt.Sprintf("%s: short of %s", s.Check, required(float64(s.RequiredFS)))
	}
	return s.Check
}

// shortSwings tells which inputs undo an answer within their swing.
func (a *author) shortSwings(o *report.Option) {
	for _, b := range o.Sensitivity {
		for _, end := range []struct {
			name string
			s    *report.Swung
		}{{"low", &b.Low}, {"high", &b.High}} {
			if end.s.FS.Known() && end.s.FS < end.s.RequiredFS {
				a.item(fmt.Sprintf("With %s %s, %s reaches FS %s of the %s required in %s.",
					b.Input, end.name, o.Title, report.FactorText(end.s.FS), required(float64(end.s.RequiredFS)), end.s.Check))
			}
		}
	}
}
