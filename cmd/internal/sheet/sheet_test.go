package sheet

import (
	"bytes"
	"encoding/json"
	"regexp"
	"strings"
	"testing"

	"standfast/cmd/internal/report"
	"standfast/cmd/internal/sample"
	"standfast/remedies"
)

func written(t testing.TB, f *report.File) []byte {
	t.Helper()
	var b bytes.Buffer
	if err := Write(&b, f); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

// The same result gives the same bytes, also when it was written and read in between, and they are few.
func TestSameBytes(t *testing.T) {
	const most = 1 << 20
	sample.SameBytes(t, written, most)
}

// No text of a case can end its element or be run.
func TestHostileTexts(t *testing.T) {
	const evil = `</script><script>alert(1)</script><b>"'&`
	f := sample.Result(t, "cutting")
	f.Case.Title = evil
	f.Options[0].Title = evil
	f.Options[0].Reason = evil
	f.Situations[0].Name = evil
	f.Existing.Section.Surcharges[0].Name = evil
	page := written(t, f)
	if n := bytes.Count(page, []byte("<script")); n != 2 {
		t.Errorf("%d script elements, want 2", n)
	}
	if bytes.Contains(page, []byte("<b>")) {
		t.Error("a text of the case was written as markup")
	}
}

// The page names nothing that lies outside it, and its content policy allows its own style and script alone.
func TestSelfContained(t *testing.T) {
	page := string(written(t, sample.Result(t, "cutting")))
	if m := regexp.MustCompile(`(?i)(src|href)="[^#d]|@import|url\(["']?(https?:|//)`).FindString(page); m != "" {
		t.Errorf("the page refers to something outside it: %q", m)
	}
	for _, want := range []string{"default-src &#39;none&#39;", "script-src &#39;sha256-", "style-src &#39;sha256-"} {
		if !strings.Contains(page, want) {
			t.Errorf("the content policy lacks %s", want)
		}
	}
	if strings.Contains(page, "unsafe") || strings.Contains(page, `style="`) {
		t.Error("the page needs more than its policy should allow")
	}
}

// Whatever compare can come to gives a page: nothing needed, nothing that meets, an option without an FS.
func TestEveryOutcome(t *testing.T) {
	for _, c := range []struct {
		name   string
		change func(f *report.File)
		want   string
	}{
		{"nothing needed", func(f *report.File) {
			least := "existing"
			f.Options, f.LeastEarthworks = nil, &least
		}, "Nothing is needed"},
		{"nothing meets", func(f *report.File) { f.Options, f.LeastEarthworks = f.Options[2:], nil }, "Nothing meets the target"},
		{"least cost", func(f *report.File) { f.Settings.Objective = "cost"; f.Options[0].Totals.Cost = cost(4321) }, `<span class="best">least cost</span>`},
		{"answer by cost", func(f *report.File) { f.Settings.Objective = "cost"; f.Options[0].Totals.Cost = cost(4321) }, "Least cost: toe berm, 4,321"},
		{"no option sized", func(f *report.File) { f.Options, f.LeastEarthworks = nil, nil }, "No options were sized"},
		{"an option without an FS", func(f *report.File) {
			o := &f.Options[0]
			o.Status = "unresolved"
			for i := range o.Situations {
				o.Situations[i].Found = report.Found{FS: unknownFS(t)}
			}
		}, "unresolved"},
		{"an observed slip", slipped, "<td>infeasible</td>"},
		{"its strengths", slipped, "High point <span class=\"asked-line\">c&#39; 11.25 kPa, phi&#39; 13.40 degrees</span>"},
		{"a slip without an answer", func(f *report.File) { f.BackAnalysis = &report.BackAnalysis{Reason: "too strong"} }, "nothing was sized for it: too strong."},
	} {
		t.Run(c.name, func(t *testing.T) {
			f := sample.Result(t, "cutting")
			c.change(f)
			if page := string(written(t, f)); !strings.Contains(page, c.want) {
				t.Errorf("the page does not say %q", c.want)
			}
		})
	}
}

// slipped adds what the observed slip leaves open to a result: its first option at two points, and nothing at the third.
func slipped(f *report.File) {
	least, no := f.Options[0].Name, false
	point := func(name string, cohesion, friction float64, least *string, options []report.Option) report.Sized {
		return report.Sized{Name: name, Cohesion: cohesion, Friction: friction, FS: 1, Existing: f.Existing, Options: options, Least: least}
	}
	short := append([]report.Option(nil), f.Options...)
	short[0].Status = "infeasible"
	f.BackAnalysis = &report.BackAnalysis{
		Soil: "stiff clay", Share: 1, Situation: "high water", Method: "bishop", AsGiven: 1.05, SameLeast: &no, SameOrder: &no,
		Points: []report.Sized{point("low", 0, 25.5, &least, f.Options), point("middle", 5.625, 19.7, &least, f.Options), point("high", 11.25, 13.4, nil, short)},
	}
}

func unknownFS(t *testing.T) report.Number {
	var n report.Number
	if err := json.Unmarshal([]byte("null"), &n); err != nil {
		t.Fatal(err)
	}
	return n
}

// Every remedy that can be asked for has its key risk.
func TestEveryRemedyHasItsRisk(t *testing.T) {
	for _, k := range remedies.Catalogue() {
		if risks[k.Name] == "" {
			t.Errorf("%s has no key risk in risks.go", k.Name)
		}
	}
	if got, want := riskOf([]string{"berm", "regrade"}), risks["berm"]+" "+risks["regrade"]; got != want {
		t.Errorf("risk of a pair: %q", got)
	}
}

func BenchmarkWrite(b *testing.B) {
	f := sample.Result(b, "cutting")
	b.ReportAllocs()
	for b.Loop() {
		written(b, f)
	}
}
