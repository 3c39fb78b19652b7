package pdfreport

import (
	"math"
	"regexp"
	"strings"
	"testing"

	"standfast/cmd/internal/report"
	"standfast/cmd/internal/sample"
)

// What a checker needs of every report, and of every option of one, is in the document.
func TestDocumentHoldsWhatACheckerNeeds(t *testing.T) {
	for _, name := range sample.Names {
		t.Run(name, func(t *testing.T) {
			f := sample.Result(t, name)
			f.Case.Source += "\nobserved_slip:\n  line: [[" + observed[name] + "]]\n"
			withSwings(f)
			got := sample.PDFText(t, written(t, f))
			for _, want := range []string{
				// Front.
				f.Case.SHA256, "standfast " + f.Program.Version, "Revision Date What changed Made by Checked by", "Name Organisation Signature Date", "Designer", "Checker",
				// Inputs as understood, ground and water model drawn.
				"Soils", "Ground and strata before works", "Water lines before works", "Design situations", "Limits of the works", "Settings of the searches",
				"Section as read: ground, strata, water, loads and limits", "level, m", "offset, m (equal scales)",
				// Methods and limits.
				"Factor of safety", "Pore pressure and strength", "Search for slips", "Where the results hold", "How to read the slice tables",
				// Existing stability, back-analysis, influence line.
				"Factor of safety by method on the critical slip of each situation", "Section as it is", "Back-analysis of the observed slip",
				"Influence of load on the critical slip", "neutral point, drained",
				// Options compared.
				"Factor of safety of every option in every situation and stage", "Earthworks against the factor of safety reached", "Why options do not meet the target",
				// What it all rests on.
				"Assumptions", "What would change the answer", "Cautions", "moving calls for evacuation",
			} {
				if !strings.Contains(got, want) {
					t.Errorf("the document does not say %q", want)
				}
			}
			for i := range f.Options {
				o := &f.Options[i]
				chapter := chapterOf(t, got, f, i)
				wants := []string{
					"Quantities (rounded up)", "Situations and stages: factor of safety by method on the critical slip", "Critical slips", "Certificate", "lattice of sizes",
					"Construction, from left to right", "1 as it is", "works complete", "Slice table of the governing slip", "F = (sum of R)/(sum of D)",
					"Governing slip: FS", "ground", "water line", strings.ToUpper(o.Title[:1]) + o.Title[1:] + ": ",
				}
				if len(o.Tradeoff) > 1 {
					wants = append(wants, "What another required factor would take")
				}
				if len(o.Sensitivity) > 0 {
					wants = append(wants, "How sure: FS of the check with the least margin", "factor of safety; the upright mark is FS with the inputs as given")
				}
				for _, want := range wants {
					if !strings.Contains(chapter, want) {
						t.Errorf("option %s: the document does not say %q", o.Name, want)
					}
				}
			}
		})
	}
}

// observed are slips that might have been seen in the demos.
var observed = map[string]string{"cutting": "28, 109.04], [36, 101], [46, 98.5], [54, 99.98", "embankment": "19, 16.5], [23, 12.5], [28, 10.3], [33.2, 10"}

// withSwings gives the first option swings of its inputs, which the demos do not ask for.
func withSwings(f *report.File) {
	o := &f.Options[0]
	base := report.Swung{FS: 1.306, Check: o.Situations[0].Name, RequiredFS: report.Number(o.Situations[0].RequiredFS)}
	low, high := base, base
	low.FS, high.FS = 1.21, 1.39
	o.Sensitivity = []report.Bar{{Input: "water level", Base: base, Low: low, High: high}}
}

// chapterOf returns what the document says of an option.
func chapterOf(t *testing.T, text string, f *report.File, i int) string {
	t.Helper()
	start := func(k int) int {
		return strings.Index(text, "Option: "+optionTitle(&f.Options[k])+" "+report.Capital(f.Options[k].Status)+":")
	}
	from, to := start(i), strings.Index(text, "Assumptions and cautions Assumptions")
	if i+1 < len(f.Options) {
		to = start(i + 1)
	}
	if from < 0 || to <= from {
		t.Fatalf("no chapter for %s", f.Options[i].Name)
	}
	return text[from:to]
}

// No page of the demos is empty but for its head and foot, nothing is cut short, and no word is left for one thing or many.
func TestPagesOfTheDemos(t *testing.T) {
	const running = 5 // Texts at head and foot, and a heading.
	wrong := regexp.MustCompile(`\b1 (designs|slips|searches|checks|options) |\b0 designs|\(s\)|…|kN/m3|NaN`)
	for _, name := range sample.Names {
		b := laidOut(t, sample.Result(t, name))
		for i, p := range b.pages {
			if len(p.texts) <= running {
				t.Errorf("%s: page %d holds %d texts", name, i+1, len(p.texts))
			}
		}
		if m := wrong.FindString(said(b)); m != "" {
			t.Errorf("%s: the report says %q", name, m)
		}
	}
}

// What another target would take is not said to be reached where it is not, and a limit is not said to let an option in that it would not.
func TestWhatWouldChangeTheAnswer(t *testing.T) {
	f := sample.Result(t, "cutting")
	o := f.Least()
	last := &o.Tradeoff[len(o.Tradeoff)-1]
	if last.ReachedFS >= last.RequiredFS {
		t.Fatal("the demo reaches every target")
	}
	got := said(laidOut(t, f))
	for _, want := range []string{
		"FS " + asked(last) + ": not reached, the best is " + report.FactorText(last.ReachedFS),
		"Unload the head: held back by crest fence, and within the range given no size reaches the target without it either.",
		"Regrade: held back by crest fence. Moved, it might let this option in.",
	} {
		if !strings.Contains(got, want) {
			t.Errorf("the report does not say %q", want)
		}
	}
}

// A design that was audited is never said to reach more than its audit left, whatever target it was sized for.
func TestReachedIsAudited(t *testing.T) {
	size := map[string]report.Parameter{"height": {Value: 2, Unit: "m"}}
	o := &report.Option{Order: []string{"height"}, Parameters: size}
	o.Situations = []report.Answer{{Name: "wet", RequiredFS: 1.3, Found: report.Found{FS: 1.25}}}
	p := &report.TradePoint{RequiredFS: 1.25, Shift: -0.05, ReachedFS: 1.27, Parameters: size}
	if got := float64(reached(o, p)); math.Abs(got-1.25) > 1e-12 {
		t.Errorf("reached %v, want the 1.25 of the audit", got)
	}
	p.Parameters = map[string]report.Parameter{"height": {Value: 3, Unit: "m"}}
	if got := reached(o, p); got != 1.27 {
		t.Errorf("another design reached %v, want 1.27", got)
	}
}

// A trade-off whose designs all take the same earthworks has no line to draw.
func TestCurved(t *testing.T) {
	point := func(e report.Number) report.TradePoint { return report.TradePoint{Earthworks: e, ReachedFS: 1.2} }
	for _, c := range []struct {
		name   string
		points []report.TradePoint
		want   bool
	}{
		{"none", nil, false},
		{"one", []report.TradePoint{point(3)}, false},
		{"the same twice", []report.TradePoint{point(3), point(3)}, false},
		{"without earthworks", []report.TradePoint{point(0), point(0), point(0)}, false},
		{"two", []report.TradePoint{point(3), point(4)}, true},
	} {
		if got := curved(c.points); got != c.want {
			t.Errorf("%s: %v, want %v", c.name, got, c.want)
		}
	}
}
