package pdfreport

import (
	"errors"
	"fmt"

	"standfast/cmd/internal/casefile"
	"standfast/cmd/internal/drawing"
	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// back writes the strengths with which an observed slip just fails, if the case has one, and returns their drawing.
func (a *author) back() (*drawing.Figure, error) {
	read, err := casefile.Parse(a.f.Case.File, []byte(a.f.Case.Source))
	if err != nil || read.Job.Observed == nil { // A result of an earlier version may lack the case, or hold one that is read no more.
		return nil, nil
	}
	a.heading("Back-analysis of the observed slip")
	b, err := remedies.BackAnalyse(read.Job, read.Job.Observed, remedies.BackSettings{})
	if errors.Is(err, remedies.ErrNoBackAnalysis) || errors.Is(err, remedies.ErrRequest) {
		a.para("No answer: " + err.Error() + ".")
		return nil, nil
	}
	if err != nil {
		return nil, fmt.Errorf("back-analysis: %w", err)
	}
	f := report.NewBack(read.Job, b, report.Source{File: a.f.Case.File, SHA256: a.f.Case.SHA256})
	a.para(fmt.Sprintf("Slip from %s to %s, %.2f m deep, %.0f %% of it in %s; state at failure: %s; %s. With the strengths of the case its FS is %s. Each pair below gives it FS 1.",
		at(f.Slip.From), at(f.Slip.To), f.Depth, 100*f.Share, f.Soil, f.Situation, method(f.Method), factor(f.AsGiven)))
	var rows []row
	for _, p := range []struct {
		name  string
		point *report.BackPoint
	}{{"low cohesion", &f.Low}, {"middle", &f.Middle}, {"high cohesion", &f.High}} {
		rows = append(rows, cells(p.name, symbols.Replace(p.point.Text())))
	}
	a.table([]column{text("point"), text("strength of " + f.Soil)}, rows)
	for _, c := range report.BackCautions() {
		a.item(c)
	}
	return drawn(drawing.BackAnalysis(a.f.Case.Title, f.Soil, b, drawing.Options{}))
}
