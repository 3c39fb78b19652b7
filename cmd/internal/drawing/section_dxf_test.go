package drawing

import (
	"bytes"
	"errors"
	"fmt"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"

	"standfast/cmd/internal/dxf"
	"standfast/lem"
	"standfast/remedies"
)

func asDXF(t *testing.T, d drawn) []byte {
	t.Helper()
	var b bytes.Buffer
	if err := SectionDXF(&b, d.job, d.opt); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

// onLayer returns the polylines of a layer.
func onLayer(f *dxf.File, layer string) [][]dxf.Point {
	var out [][]dxf.Point
	for _, p := range f.Polylines {
		if p.Layer == layer {
			out = append(out, p.Points)
		}
	}
	return out
}

// The lines of a DXF are the section's own, in its own coordinates and over its whole length.
func TestDXFGeometry(t *testing.T) {
	const tol = 1e-6 // m, what is written
	for name, d := range cases() {
		t.Run(name, func(t *testing.T) {
			f, err := dxf.Read(asDXF(t, d))
			if err != nil {
				t.Fatal(err)
			}
			sec := &d.job.Section
			if d.opt != nil {
				sec = &d.opt.Proposal.Section
			}
			check := func(layer string, want lem.Profile) {
				for _, l := range onLayer(f, layer) {
					same := len(l) == len(want)
					for i := 0; same && i < len(l); i++ {
						same = math.Hypot(l[i].X-want[i].X, l[i].Y-want[i].Y) < tol
					}
					if same {
						return
					}
				}
				t.Errorf("layer %s does not hold %v", layer, want)
			}
			check(layerExisting, sec.GroundBefore())
			if !same(sec.Ground, sec.GroundBefore()) {
				check(layerProposed, sec.Ground)
			}
			for _, w := range d.job.Waters[:1] {
				if d.opt == nil || d.opt.Status == remedies.Existing {
					check(layerWater, w.Line)
				}
			}
		})
	}
}

// Texts of a DXF lie apart, like those of the other drawings.
func TestDXFLabels(t *testing.T) {
	for name, d := range cases() {
		t.Run(name, func(t *testing.T) {
			p := picture{job: d.job, opt: d.opt, sec: &d.job.Section, whole: true}
			if d.opt != nil {
				p.sec = &d.opt.Proposal.Section
			}
			p.gather()
			b := &board{picture: &p, scale: dxfText * p.span() / (capitals * bodyFace.size)}
			b.draw()
			s := b.sheet.fig
			for i, l := range s.Labels {
				if !l.Box.Within(b.sheet.view.frame) {
					t.Errorf("%q leaves the frame", l.Text)
				}
				for _, o := range s.Labels[:i] {
					if l.Box.Overlaps(o.Box) {
						t.Errorf("%q overlaps %q", l.Text, o.Text)
					}
				}
			}
		})
	}
}

// A general-purpose library reads every section without an error or a repair, and finds what must be there.
func TestDXFOtherReader(t *testing.T) {
	const python = "/usr/bin/python3"
	if err := exec.Command(python, "-c", "import ezdxf").Run(); err != nil {
		if os.Getenv("STANDFAST_DXF") == "required" {
			t.Fatal("python3-ezdxf is required and not installed")
		}
		t.Skip("python3-ezdxf is not installed")
	}
	want := map[string][]string{
		"cutting-berm":   {"POLYLINE EXISTING 4 0,58.4 26,58 46,50 72,49.7", "POLYLINE PROPOSED 6", "ARC SLIPS", "LINE FILL", "TEXT TEXT top width 5.50 m", "TEXT TEXT FS 1.255 (Bishop)"},
		"regrade-drains": {"POLYLINE DRAINS 3", "LINE CUT", "TEXT TEXT Slip 1, winter water (midspan between drains): FS 1.212 (Bishop), required 1.25"},
		"steep":          {"POLYLINE SLIPS 4 11,140 15,126 24,106 32,100"},
		"crowded":        {"TEXT TEXT peat"},
	}
	folder := t.TempDir()
	if *pictures != "" {
		folder = *pictures
	}
	var paths []string
	for name, d := range cases() {
		path := filepath.Join(folder, name+".dxf")
		if err := os.WriteFile(path, asDXF(t, d), 0o644); err != nil {
			t.Fatal(err)
		}
		paths = append(paths, path)
	}
	out, err := exec.Command(python, append([]string{"../dxf/testdata/reread.py"}, paths...)...).CombinedOutput()
	if err != nil {
		t.Fatalf("%v: %s", err, out)
	}
	found := map[string]string{}
	for _, part := range strings.Split(string(out), "FILE ")[1:] {
		path, text, _ := strings.Cut(part, "\n")
		found[strings.TrimSuffix(filepath.Base(path), ".dxf")] = text
	}
	for name := range cases() {
		for _, w := range append(want[name], "TEXT TEXT Units: metres", "POLYLINE EXISTING") {
			if !strings.Contains(found[name], w) {
				t.Errorf("%s: the other reader does not find %q in:\n%s", name, w, found[name])
			}
		}
	}
}

// Lines in no part of which a label stands come out whole, others in parts.
func TestOutside(t *testing.T) {
	b := Box{1, 1, 3, 2}
	tests := []struct {
		name string
		line []xy
		want string
	}{
		{"beside", []xy{{0, 0}, {4, 0}}, "[[{0 0} {4 0}]]"},
		{"through", []xy{{0, 1.5}, {4, 1.5}}, "[[{0 1.5} {1 1.5}] [{3 1.5} {4 1.5}]]"},
		{"into", []xy{{0, 1.5}, {2, 1.5}}, "[[{0 1.5} {1 1.5}]]"},
		{"out of", []xy{{2, 1.5}, {4, 1.5}}, "[[{3 1.5} {4 1.5}]]"},
		{"inside", []xy{{2, 1.5}, {2.5, 1.5}}, "[]"},
		{"through a corner of the line", []xy{{0, 1.5}, {2, 1.5}, {2, 5}, {0, 5}}, "[[{0 1.5} {1 1.5}] [{2 2} {2 5} {0 5}]]"},
	}
	for _, c := range tests {
		t.Run(c.name, func(t *testing.T) {
			if got := fmt.Sprint(outside(c.line, b)); got != c.want {
				t.Errorf("got %s, want %s", got, c.want)
			}
		})
	}
}

// The reference of outputs names every layer.
func TestDXFLayersAreDocumented(t *testing.T) {
	doc, err := os.ReadFile("../../../docs/outputs.md")
	if err != nil {
		t.Fatal(err)
	}
	for _, l := range dxfLayers {
		if !bytes.Contains(doc, []byte("`"+l.Name+"`")) {
			t.Errorf("docs/outputs.md does not name the layer %s", l.Name)
		}
	}
}

func TestDXFIsTheSameEachTime(t *testing.T) {
	if !bytes.Equal(asDXF(t, cuttingWithBerm()), asDXF(t, cuttingWithBerm())) {
		t.Error("the bytes differ from run to run")
	}
	if err := SectionDXF(&bytes.Buffer{}, &remedies.Job{Title: "empty"}, nil); !errors.Is(err, ErrNothingToDraw) {
		t.Errorf("an empty section gives %v", err)
	}
}
