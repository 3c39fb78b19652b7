package drawing

import (
	"bytes"
	"os"
	"strings"
	"testing"

	"codeberg.org/go-pdf/fpdf"

	"standfast/cmd/internal/sample"
)

// Every label of a drawing can be found in its PDF, Greek, primes and Polish included.
func TestPDFTexts(t *testing.T) {
	for _, name := range []string{"cutting-berm", "regrade-drains", "embankment-read"} {
		t.Run(name, func(t *testing.T) {
			d := cases()[name]
			d.job.Title = "Łódź φ′ ≥ 1.25, " + d.job.Title
			f, err := Section(d.job, d.opt, Options{})
			if err != nil {
				t.Fatal(err)
			}
			var b bytes.Buffer
			if err := f.WritePDF(&b); err != nil {
				t.Fatal(err)
			}
			got := sample.PDFText(t, b.Bytes())
			for _, l := range f.Labels {
				for _, line := range strings.Split(l.Text, "\n") {
					if want := strings.Join(strings.Fields(line), " "); !strings.Contains(got, want) {
						t.Errorf("%q is not found in the PDF", want)
					}
				}
			}
		})
	}
}

// A figure can stand anywhere on a page of another document in another unit.
func TestDrawPDF(t *testing.T) {
	d := cuttingWithBerm()
	f, err := Section(d.job, d.opt, Options{})
	if err != nil {
		t.Fatal(err)
	}
	doc := fpdf.New("P", "mm", "A4", "")
	doc.AddPage()
	f.DrawPDF(doc, 20, 30, 0.5)
	doc.SetFont(PDFFamily, "", 9)
	doc.Text(20, 20, "before and φ′ after")
	var b bytes.Buffer
	if err := doc.Output(&b); err != nil {
		t.Fatal(err)
	}
	if *pictures != "" {
		if err := os.WriteFile(*pictures+"/placed.pdf", b.Bytes(), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	got := sample.PDFText(t, b.Bytes())
	for _, want := range []string{"before and φ′ after", "top width 5.50 m"} {
		if !strings.Contains(got, want) {
			t.Errorf("%q is not found in the PDF", want)
		}
	}
}

func BenchmarkWritePDF(b *testing.B) {
	d := cuttingWithBerm()
	f, err := Section(d.job, d.opt, Options{})
	if err != nil {
		b.Fatal(err)
	}
	b.ReportAllocs()
	for b.Loop() {
		var out bytes.Buffer
		if err := f.WritePDF(&out); err != nil {
			b.Fatal(err)
		}
	}
}
