package cli

import (
	"context"
	"path/filepath"

	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// verifyPoints tries to refute what a comparison says of every option with the strengths that an observed slip leaves open. The slips that reject
// cheaper designs there are not written, so that none is evaluated again.
func verifyPoints(ctx context.Context, asked *remedies.Job, file *report.File, s remedies.Settings) ([]verdict, error) {
	if file.BackAnalysis == nil {
		return nil, nil
	}
	var out []verdict
	for i := range file.BackAnalysis.Points {
		p := &file.BackAnalysis.Points[i]
		result, err := report.Rebuild(file.At(p))
		if err != nil {
			return nil, usagef("%s: %s point: %w", filepath.ToSlash(resultName), p.Name, err)
		}
		for k := range result.Options {
			v, err := verifyOption(ctx, asked, result.Job, &result.Options[k], &report.Witnesses{}, s)
			if err != nil {
				return nil, err
			}
			v.Option, v.Point = result.Options[k].Name, p.Name
			out = append(out, v)
		}
	}
	return out, nil
}
