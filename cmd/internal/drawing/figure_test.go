package drawing

import (
	"flag"
	"os"
	"path/filepath"
	"testing"
)

// pictures names a folder that every drawing of the tests is written to, to be looked at.
var pictures = flag.String("pictures", "", "folder to write the drawings of the tests to")

func keep(t *testing.T, name string, f *Figure) {
	t.Helper()
	if *pictures == "" {
		return
	}
	for ext, write := range map[string]func(*os.File) error{
		".png": func(w *os.File) error { return f.WritePNG(w) }, ".svg": func(w *os.File) error { return f.WriteSVG(w) },
		".pdf": func(w *os.File) error { return f.WritePDF(w) },
	} {
		w, err := os.Create(filepath.Join(*pictures, name+ext))
		if err != nil {
			t.Fatal(err)
		}
		if err := write(w); err != nil {
			t.Fatal(err)
		}
		if err := w.Close(); err != nil {
			t.Fatal(err)
		}
	}
}

// checkLabels fails if two texts overlap or one leaves the page.
func checkLabels(t interface{ Errorf(string, ...any) }, f *Figure) {
	for i, a := range f.Labels {
		if !a.Box.Within(f.Page()) {
			t.Errorf("%q leaves the page: %+v", a.Text, a.Box)
		}
		for _, b := range f.Labels[:i] {
			if a.Box.Overlaps(b.Box) {
				t.Errorf("%q %+v overlaps %q %+v", a.Text, a.Box, b.Text, b.Box)
			}
		}
	}
}

func TestSectionLabels(t *testing.T) {
	for name, d := range cases() {
		t.Run(name, func(t *testing.T) {
			f, err := Section(d.job, d.opt, Options{})
			if err != nil {
				t.Fatal(err)
			}
			checkLabels(t, f)
			keep(t, "section-"+name, f)
		})
	}
}

func TestTradeoffLabels(t *testing.T) {
	for name, differing := range map[string]bool{"one target": false, "two targets": true} {
		t.Run(name, func(t *testing.T) {
			f, err := Tradeoff("Harrow Lane cutting, invented", tradeoffs(differing), Options{})
			if err != nil {
				t.Fatal(err)
			}
			checkLabels(t, f)
			keep(t, "tradeoff-"+name[:3], f)
		})
	}
}
