package dxf

import (
	"bytes"
	"errors"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// sample is a drawing with every entity.
func sample() *Drawing {
	d := &Drawing{
		Layers: []Layer{{"WATER", 5, Dashed}, {"EXISTING", 8, Solid}, {"SLIPS", 1, DashDot}, {"TEXT", 7, Solid}},
		Dash:   0.5,
	}
	d.Polyline("EXISTING", []Point{{0, 109.6}, {30, 109}, {52.5, 100}, {75, 99.8}}, false)
	d.Polyline("EXISTING", []Point{{1, 1}, {2, 1}, {2, 2}}, true)
	d.Polyline("EXISTING", []Point{{1, 1}}, false)
	d.Line("WATER", Point{0, 107.6}, Point{75, 99.3})
	d.Arc("SLIPS", Point{48, 120}, 20.5, math.Pi*1.2, -math.Pi*0.4)
	d.Text("TEXT", Point{1, 2}, 0.5, 0, "φ′ 23° 50 % \\U+0041 Łódź \U0001f600\n")
	return d
}

func written(t testing.TB, d *Drawing) []byte {
	t.Helper()
	var b bytes.Buffer
	if err := d.Write(&b); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

func TestWriteIsPlain(t *testing.T) {
	got := written(t, sample())
	if !bytes.Equal(got, written(t, sample())) {
		t.Error("the bytes differ from run to run")
	}
	for i, c := range got {
		if c >= 0x80 {
			t.Fatalf("byte %d is not ASCII", i)
		}
		if c == '\n' && got[i-1] != '\r' {
			t.Fatalf("byte %d ends a line without a carriage return", i)
		}
	}
	text := string(got)
	for _, want := range []string{
		"AC1009", "\\U+03C6\\U+2032 23\\U+00B0 50 \\U+0025 \\U+005CU+0041 \\U+0141\\U+00F3d\\U+017A ? ", " 50\r\n216.0\r\n 51\r\n288.0\r\n",
	} {
		if !strings.Contains(text, want) {
			t.Errorf("the file does not hold %q", want)
		}
	}
	var last int
	for _, name := range []string{"0", "EXISTING", "SLIPS", "TEXT", "WATER"} {
		at := strings.Index(text, "LAYER\r\n  2\r\n"+name+"\r\n")
		if at < last {
			t.Errorf("layer %s is not in the order of names", name)
		}
		last = at
	}
}

func TestWriteFails(t *testing.T) {
	if err := sample().Write(full{}); err == nil {
		t.Error("no error")
	}
}

type full struct{}

func (full) Write([]byte) (int, error) { return 0, errors.New("no space left") }

func TestReadBack(t *testing.T) {
	f, err := Read(written(t, sample()))
	if err != nil {
		t.Fatal(err)
	}
	if len(f.Polylines) != 3 || len(f.Left) != 2 {
		t.Fatalf("read %d lines and left %v", len(f.Polylines), f.Left)
	}
	if p := f.Polylines[0]; p.Layer != "EXISTING" || len(p.Points) != 4 || p.Points[2] != (Point{52.5, 100}) || p.Closed {
		t.Errorf("read %+v", p)
	}
	if !f.Polylines[1].Closed {
		t.Error("the closed polyline is open")
	}
	if p := f.Polylines[2]; p.Layer != "WATER" || len(p.Points) != 2 || p.Points[1] != (Point{75, 99.3}) {
		t.Errorf("read %+v", p)
	}
}

// What is written is read back, to the micrometre that is written.
func TestReadBackAny(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		var d Drawing
		var want [][]Point
		coordinate := rapid.Float64Range(-1e6, 1e6)
		for range rapid.IntRange(0, 5).Draw(t, "lines") {
			var l []Point
			for range rapid.IntRange(2, 6).Draw(t, "points") {
				l = append(l, Point{coordinate.Draw(t, "x"), coordinate.Draw(t, "y")})
			}
			want = append(want, l)
			d.Polyline("L", l, false)
		}
		var b bytes.Buffer
		if err := d.Write(&b); err != nil {
			t.Fatal(err)
		}
		f, err := Read(b.Bytes())
		if err != nil || len(f.Polylines) != len(want) {
			t.Fatalf("read %v, %v", f, err)
		}
		for i, l := range want {
			for k, p := range l {
				q := f.Polylines[i].Points[k]
				if math.Abs(p.X-q.X) > 0.6e-6 || math.Abs(p.Y-q.Y) > 0.6e-6 {
					t.Fatalf("%v was read back as %v", p, q)
				}
			}
		}
	})
}

// pairs joins group codes and values to the entities of a drawing.
func pairs(list ...string) string {
	return "0\nSECTION\n2\nENTITIES\n" + strings.Join(list, "\n") + "\n0\nENDSEC\n0\nEOF\n"
}

func TestReadOthers(t *testing.T) {
	f, err := Read([]byte("0\nSECTION\n2\nHEADER\n9\n$INSUNITS\n70\n4\n0\nENDSEC\n" + pairs(
		"0", "LWPOLYLINE", "5", "2A", "100", "AcDbPolyline", "8", "Survey 1", "90", "3", "70", "1", "43", "0.0",
		"10", "1", "20", "2", "42", "0.5", "10", "3", "20", "4", "10", "5", "20", "6",
		"0", "CIRCLE", "8", "x", "10", "1", "20", "1", "40", "2", "0", "CIRCLE", "0", "LINE", "8", "L", "10", "1", "20", "2", "30", "9", "11", "3", "21", "4",
	)))
	if err != nil {
		t.Fatal(err)
	}
	if f.Units != Millimetres || len(f.Polylines) != 2 || len(f.Left) != 1 || f.Left[0] != "CIRCLE" {
		t.Fatalf("read %+v", f)
	}
	p := f.Polylines[0]
	if p.Layer != "Survey 1" || len(p.Points) != 3 || p.Points[2] != (Point{5, 6}) || !p.Closed || !p.Curved || p.Line != 16 {
		t.Errorf("read %+v", p)
	}
	if l := f.Polylines[1]; len(l.Points) != 2 || l.Points[1] != (Point{3, 4}) {
		t.Errorf("read %+v", l)
	}
}

func TestReadFaults(t *testing.T) {
	tests := []struct {
		name, src string
		line      int
		want      string
	}{
		{"empty", "", 0, "cut short"},
		{"binary", "AutoCAD Binary DXF\r\n\x1a\x00", 0, "binary"},
		{"not a drawing", "offset,level\n0,1\n", 1, "no group code"},
		{"cut short", "0\nSECTION\n2\nENTITIES\n", 4, "cut short"},
		{"half a pair", "0\nSECTION\n2", 3, "without a value"},
		{"no number", pairs("0", "LINE", "8", "L", "10", "abc"), 10, "not a number"},
		{"not finite", pairs("0", "LINE", "8", "L", "10", "NaN"), 10, "not a number"},
		{"no y", pairs("0", "LINE", "8", "L", "10", "1"), 12, "no y"},
		{"x twice", pairs("0", "LWPOLYLINE", "8", "L", "10", "1", "10", "2"), 12, "no y before"},
	}
	for _, c := range tests {
		t.Run(c.name, func(t *testing.T) {
			_, err := Read([]byte(c.src))
			var e *Error
			if !errors.As(err, &e) || e.Line != c.line || !strings.Contains(e.Error(), c.want) {
				t.Errorf("got %v, want line %d and %q", err, c.line, c.want)
			}
		})
	}
}

func FuzzRead(f *testing.F) {
	f.Add(written(f, sample()))
	f.Add([]byte(pairs("0", "LWPOLYLINE", "8", "a", "10", "1", "20", "2")))
	f.Add([]byte("AutoCAD Binary DXF"))
	f.Fuzz(func(t *testing.T, src []byte) {
		file, err := Read(src)
		if err != nil {
			return
		}
		for _, p := range file.Polylines {
			for _, q := range p.Points {
				if math.IsNaN(q.X) || math.IsNaN(q.Y) || math.IsInf(q.X, 0) || math.IsInf(q.Y, 0) {
					t.Fatalf("a point that is not finite: %v", q)
				}
			}
		}
	})
}

// TestOtherReader has a general-purpose library read what is written, without an error or a repair.
func TestOtherReader(t *testing.T) {
	path := filepath.Join(t.TempDir(), "sample.dxf")
	if err := os.WriteFile(path, written(t, sample()), 0o644); err != nil {
		t.Fatal(err)
	}
	got := reread(t, path)
	for _, want := range []string{"AC1009", "POLYLINE EXISTING 4", "POLYLINE EXISTING 3", "LINE WATER", "ARC SLIPS 216 288", "φ′ 23°"} {
		if !strings.Contains(got, want) {
			t.Errorf("the other reader does not find %q in:\n%s", want, got)
		}
	}
}

// reread returns what python3-ezdxf finds in a file, a line an entity; it fails the test if that finds anything wrong. It skips the test
// where the library is not installed, unless the environment says that it must be.
func reread(t *testing.T, path string) string {
	t.Helper()
	const python = "/usr/bin/python3"
	if err := exec.Command(python, "-c", "import ezdxf").Run(); err != nil {
		if os.Getenv("STANDFAST_DXF") == "required" {
			t.Fatal("python3-ezdxf is required and not installed")
		}
		t.Skip("python3-ezdxf is not installed")
	}
	out, err := exec.Command(python, "testdata/reread.py", path).CombinedOutput()
	if err != nil {
		t.Fatalf("%v: %s", err, out)
	}
	return string(out)
}
