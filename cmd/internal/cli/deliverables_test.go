package cli

import (
	"io"
	"testing"

	"standfast/cmd/internal/casefile"
	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// BenchmarkDeliverables times everything that is written beside the results of the cutting demo; the sizing itself is left out.
func BenchmarkDeliverables(b *testing.B) {
	c, err := casefile.Read("../../../testdata/demo/cutting.yaml")
	if err != nil {
		b.Fatal(err)
	}
	result, err := remedies.Study(b.Context(), c.Job, remedies.Settings{Curves: true})
	if err != nil {
		b.Fatal(err)
	}
	file := report.New(result, report.Source{File: c.File})
	b.ReportAllocs()
	for b.Loop() {
		outputs, err := deliverables(file)
		if err != nil {
			b.Fatal(err)
		}
		for _, o := range outputs {
			if err := o.write(io.Discard); err != nil {
				b.Fatal(err)
			}
		}
	}
}
