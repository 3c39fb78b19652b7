package sheet

import (
	"bytes"
	"flag"
	"os"
	"testing"

	"github.com/evanw/esbuild/pkg/api"
)

var update = flag.Bool("update", false, "bundle the script and the style anew")

// The script and the style in the page are those that their sources make.
func TestBundleIsCurrent(t *testing.T) {
	for _, c := range []struct{ source, bundle string }{
		{"ui/sheet.ts", "ui/dist/sheet.js"},
		{"ui/sheet.css", "ui/dist/sheet.css"},
	} {
		t.Run(c.source, func(t *testing.T) {
			r := api.Build(api.BuildOptions{
				EntryPoints: []string{c.source}, Bundle: true, MinifyWhitespace: true, MinifyIdentifiers: true, MinifySyntax: true,
				Format: api.FormatIIFE, Target: api.ES2022, Charset: api.CharsetASCII, LegalComments: api.LegalCommentsNone,
			})
			for _, m := range append(r.Errors, r.Warnings...) {
				t.Errorf("%s: %+v", m.Text, m.Location)
			}
			if t.Failed() {
				return
			}
			want := r.OutputFiles[0].Contents
			if *update {
				if err := os.WriteFile(c.bundle, want, 0o644); err != nil {
					t.Fatal(err)
				}
				return
			}
			got, err := os.ReadFile(c.bundle)
			if err != nil {
				t.Fatal(err)
			}
			if !bytes.Equal(got, want) {
				t.Errorf("%s is older than its sources; run go generate ./cmd/internal/sheet", c.bundle)
			}
		})
	}
}
