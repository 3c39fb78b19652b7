package report

import (
	"bytes"
	"encoding/json"
	"errors"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"unicode/utf8"

	"github.com/google/go-cmp/cmp"
	"pgregory.net/rapid"

	"standfast/remedies"
)

func TestReadBack(t *testing.T) {
	r, src := sample()
	want := encoded(t, New(r, src))
	path := filepath.Join(t.TempDir(), "result.json")
	if err := os.WriteFile(path, []byte(want), 0o644); err != nil {
		t.Fatal(err)
	}
	f, err := Read(path)
	if err != nil {
		t.Fatal(err)
	}
	if diff := cmp.Diff(want, encoded(t, f)); diff != "" {
		t.Errorf("read back and written again (-want +got):\n%s", diff)
	}
	if fs := f.Options[3].Situations[1].FS; !math.IsNaN(float64(fs)) {
		t.Errorf("null read as %v, want NaN", fs)
	}
	if got := f.Situations[2].Strength.Of("clay"); got != undrained {
		t.Errorf("clay acts %s in the wet spring, want undrained", got)
	}
}

func TestReadRefuses(t *testing.T) {
	for _, c := range []struct{ name, src string }{
		{"nothing", ""},
		{"no object", "[1, 2]"},
		{"another program's", `{"format": "other/1"}`},
		{"a later layout", `{"format": "standfast-result/2"}`},
		{"a wrong type", `{"format": "standfast-result/1", "options": 3}`},
	} {
		t.Run(c.name, func(t *testing.T) {
			if _, err := Decode(strings.NewReader(c.src)); !errors.Is(err, ErrFormat) {
				t.Errorf("got %v, want ErrFormat", err)
			}
		})
	}
}

// The bytes hold nothing of how the answer came about: neither the number of workers nor the order of maps.
func TestSameBytes(t *testing.T) {
	r, src := sample()
	one := encoded(t, New(r, src))
	for workers := range 8 {
		r, src := sample()
		r.Settings.Workers = workers
		if encoded(t, New(r, src)) != one {
			t.Fatal("bytes differ")
		}
	}
}

// Laying out changes blanks only, and no line that holds more than one value is longer than the width.
func TestLayOut(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		raw, err := json.Marshal(anyValue(t, 4))
		if err != nil {
			t.Fatal(err)
		}
		var out, back bytes.Buffer
		layOut(&out, raw, 0, 0)
		if err := json.Compact(&back, out.Bytes()); err != nil {
			t.Fatalf("%v in %s", err, out.String())
		}
		if !bytes.Equal(raw, back.Bytes()) {
			t.Fatalf("%s came back as %s", raw, back.String())
		}
	})
}

func anyValue(t *rapid.T, depth int) any {
	kind := rapid.IntRange(0, 4).Draw(t, "kind")
	if depth == 0 {
		kind %= 3
	}
	switch kind {
	case 0:
		return rapid.Float64Range(-1e9, 1e9).Draw(t, "number")
	case 1:
		return rapid.String().Draw(t, "text")
	case 2:
		return nil
	case 3:
		out := make([]any, rapid.IntRange(0, 5).Draw(t, "length"))
		for i := range out {
			out[i] = anyValue(t, depth-1)
		}
		return out
	}
	out := map[string]any{}
	for range rapid.IntRange(0, 5).Draw(t, "size") {
		out[rapid.StringN(0, 12, -1).Draw(t, "key")] = anyValue(t, depth-1)
	}
	return out
}

func TestComparisonText(t *testing.T) {
	text := comparison(t, Look{})
	for _, want := range []string{
		" normal water  1.150     1.300  Bishop  short of target",
		"toe berm ", "  5.44  ", " 1.305 ",
		"trench drains: end of construction: no cu given", " trench drains: effectiveness as given",
		"regrade, infeasible: no batter within the limits reaches 1.300",
		"Least earthworks: toe berm, 5.44 m3 per metre run (435 m3 over 80 m): height 1.5 m, top width 4 m, batter 1V:2H.",
		"A step less fails: height 1.4 m gives FS 1.298 in normal water, 1.300 required;",
		"top width 3.75 m gives FS 1.302 in normal water, within the search allowance 0.005 of the 1.300 required;",
		"batter 1V:1.9H breaks steepest batter.",
		"least on this lattice, for this remedy and these methods (Bishop and Spencer on circles, Spencer and Morgenstern-Price on non-circular slips); no slip below target found in 63 searches",
		"A slope that is moving calls for evacuation and monitoring first.",
	} {
		if !strings.Contains(unwrapped(text), unwrapped(want)) {
			t.Errorf("missing: %s\nin:\n%s", want, text)
		}
	}
	for _, never := range []string{"1.306", "NaN", "Inf", "For the whole length of", "How sure", "\x1b", "drains: trench drains:"} {
		if strings.Contains(text, never) {
			t.Errorf("%q is shown in:\n%s", never, text)
		}
	}
}

func comparison(t *testing.T, look Look) string {
	t.Helper()
	var b bytes.Buffer
	if err := WriteComparison(&b, New(sample()), look); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

func unwrapped(s string) string { return strings.Join(strings.Fields(s), " ") }

func TestWidth(t *testing.T) {
	const widest = 120 // Of a table, which no width squeezes.
	for _, width := range []int{60, 80, 110} {
		for _, l := range strings.Split(comparison(t, Look{Width: width}), "\n") {
			n := utf8.RuneCountInString(l)
			if n > widest || n > width && !strings.Contains(l, "  ") && !strings.HasPrefix(l, "-") {
				t.Errorf("width %d: a line of %d: %s", width, n, l)
			}
		}
	}
}

func TestColour(t *testing.T) {
	t.Setenv("NO_COLOR", "")
	coloured := comparison(t, Look{Colour: true})
	if !strings.Contains(coloured, "\x1b[") {
		t.Skip("the terminal library has switched colours off in this environment")
	}
	if strings.Contains(comparison(t, Look{}), "\x1b[") {
		t.Error("colours in a pipe")
	}
}

func TestRecommendation(t *testing.T) {
	for _, c := range []struct {
		name   string
		change func(r *remedies.Result)
		want   string
	}{
		{"least", func(*remedies.Result) {}, "Least earthworks: toe berm, 5.44 m3"},
		{"nothing needed", func(r *remedies.Result) { r.Least = "existing" }, "Nothing is needed"},
		{
			"nothing meets it",
			func(r *remedies.Result) { r.Least, r.Options = "", r.Options[2:] },
			"Nothing meets the target. Nearest: regrade, which reaches FS 1.248 of the 1.300 required in normal water; what binds: crest fence.",
		},
		{"nothing asked", func(r *remedies.Result) { r.Least, r.Options = "", nil }, "Nothing meets the target."},
	} {
		t.Run(c.name, func(t *testing.T) {
			r, src := sample()
			c.change(r)
			if got := New(r, src).Recommendation(); !strings.HasPrefix(got, c.want) {
				t.Errorf("got %s, want %s", got, c.want)
			}
		})
	}
}

func TestAssessmentText(t *testing.T) {
	var b bytes.Buffer
	if err := WriteAssessment(&b, New(sample()), Look{}); err != nil {
		t.Fatal(err)
	}
	for _, want := range []string{
		"normal water 1.150 1.300 Bishop 1.050 1.150 1.154 short of target",
		"wet spring (48.00, 120.00) 20.50 (30.75, 108.70) (52.90, 100.00) 3.88",
		"Cautions",
	} {
		if !strings.Contains(unwrapped(b.String()), want) {
			t.Errorf("missing: %s\nin:\n%s", want, b.String())
		}
	}
}

func TestWitnesses(t *testing.T) {
	var b bytes.Buffer
	if err := NewWitnesses(sample()).Encode(&b); err != nil {
		t.Fatal(err)
	}
	var w Witnesses
	if err := json.Unmarshal(b.Bytes(), &w); err != nil {
		t.Fatal(err)
	}
	berm, ok := w.Options["berm"]
	if len(w.Options) != 1 || !ok {
		t.Fatalf("options %v, want the berm alone", w.Options)
	}
	if got := berm.Pool[1].Check; got != "end of construction" {
		t.Errorf("second cut belongs to %q, want the stage", got)
	}
	if d := berm.Designs[1]; d.Cut != 1 || d.Earthworks != 5.06 || d.X[1] != 3.75 || d.X[3].Known() {
		t.Errorf("second design is %+v", d)
	}
}

// Another list of files changes nothing else, not even a field that only a later version knows.
func TestEncodeWithFiles(t *testing.T) {
	good := encoded(t, New(sample()))
	newer := strings.Replace(good, `"program": {`, `"later": {"files": ["x"], "n": 1.50}, "program": {`, 1)
	var b bytes.Buffer
	if err := EncodeWithFiles(&b, []byte(newer), []string{"result.json", "a b.pdf"}); err != nil {
		t.Fatal(err)
	}
	for _, want := range []string{`"files": ["result.json", "a b.pdf"]`, `"later": {"files": ["x"], "n": 1.50}`} {
		if !strings.Contains(b.String(), want) {
			t.Errorf("there is no %s in what was written", want)
		}
	}
	b.Reset()
	if err := EncodeWithFiles(&b, []byte(good), []string{"result.json", "witnesses.json"}); err != nil || b.String() != good {
		t.Errorf("the same list of files changes the file: %v", err)
	}
	if err := EncodeWithFiles(&b, []byte("[]"), nil); !errors.Is(err, ErrFormat) {
		t.Errorf("a file that is no result gives %v", err)
	}
}
