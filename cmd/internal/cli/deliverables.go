package cli

import (
	"errors"
	"fmt"
	"io"

	"standfast/cmd/internal/drawing"
	"standfast/cmd/internal/exchange"
	"standfast/cmd/internal/pdfreport"
	"standfast/cmd/internal/report"
	"standfast/cmd/internal/sheet"
	"standfast/remedies"
)

// deliverables returns the files that are made from a result file alone: drawings, setting-out tables and quantities. compare and report
// write the same.
func deliverables(f *report.File) ([]output, error) {
	r, err := report.Rebuild(f)
	if err != nil {
		return nil, err
	}
	out, err := drawSection("section-existing", r.Job, &r.Existing)
	if err != nil {
		return nil, err
	}
	names := fileNames(r.Options)
	for i := range r.Options {
		files, err := drawSection("section-"+names[i], r.Job, &r.Options[i])
		if err != nil {
			return nil, err
		}
		out = append(out, files...)
		if files, err = pictures("front-"+names[i], func() (*drawing.Figure, error) {
			return drawing.Front(r.Job.Title, &r.Options[i], drawing.Options{})
		}); err != nil {
			return nil, err
		}
		out = append(out, files...)
		if o := &f.Options[i]; exchange.HasSettingOut(o) {
			out = append(out, output{"setting-out-" + names[i] + ".csv", func(w io.Writer) error { return exchange.WriteSettingOut(w, o) }})
		}
	}
	files, err := pictures("tradeoff", func() (*drawing.Figure, error) { return drawing.Tradeoff(r.Job.Title, r.Options, drawing.Options{}) })
	if err != nil {
		return nil, err
	}
	out = append(out, files...)
	out = append(out, output{sheet.Name, func(w io.Writer) error { return sheet.Write(w, f) }})
	out = append(out, output{pdfreport.Name, func(w io.Writer) error { return pdfreport.Write(w, f) }})
	if len(f.Options) > 0 {
		out = append(out, output{"quantities.xlsx", func(w io.Writer) error { return exchange.WriteQuantities(w, f) }})
	}
	return out, nil
}

// drawSection returns the drawings of a section in every format; none if there is nothing to draw.
func drawSection(name string, j *remedies.Job, o *remedies.Option) ([]output, error) {
	out, err := pictures(name, func() (*drawing.Figure, error) { return drawing.Section(j, o, drawing.Options{}) })
	if len(out) > 0 {
		out = append(out, output{name + ".dxf", func(w io.Writer) error { return drawing.SectionDXF(w, j, o) }})
	}
	return out, err
}

// pictures returns a figure in every format of pictures; none if there is nothing to draw.
func pictures(name string, draw func() (*drawing.Figure, error)) ([]output, error) {
	figure, err := draw()
	if errors.Is(err, drawing.ErrNothingToDraw) {
		return nil, nil
	}
	if err != nil {
		return nil, fmt.Errorf("drawing %s: %w", name, err)
	}
	return asFiles(name, figure), nil
}

// asFiles returns a figure in every format of pictures.
func asFiles(name string, f *drawing.Figure) []output {
	return []output{{name + ".svg", f.WriteSVG}, {name + ".png", f.WritePNG}, {name + ".pdf", f.WritePDF}}
}
