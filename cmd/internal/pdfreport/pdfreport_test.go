package pdfreport

import (
	"bytes"
	"encoding/json"
	"math"
	"os"
	"regexp"
	"strings"
	"testing"

	"standfast/cmd/internal/drawing"
	"standfast/cmd/internal/report"
	"standfast/cmd/internal/sample"
)

func written(t testing.TB, f *report.File) []byte {
	t.Helper()
	var b bytes.Buffer
	if err := Write(&b, f); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

func laidOut(t testing.TB, f *report.File) *book {
	t.Helper()
	b, err := layOut(drawing.NewPDF(pageWidth, pageHeight), f)
	if err != nil {
		t.Fatal(err)
	}
	return b
}

// said is all the text of a report, in reading order.
func said(b *book) string {
	var out []string
	for _, p := range b.pages {
		for _, s := range p.texts {
			out = append(out, s.text)
		}
	}
	return strings.ReplaceAll(strings.Join(out, " "), noBreak, " ")
}

// standing fails if a text leaves its page or stands in another.
func standing(t *testing.T, b *book) {
	t.Helper()
	for i, p := range b.pages {
		paper := drawing.Box{MinX: margin - 1, MinY: 30, MaxX: p.width() - margin + 1, MaxY: pageHeight - 20}
		for k, s := range p.texts {
			if !s.box.Within(paper) {
				t.Errorf("page %d: %q leaves the page: %+v", i+1, s.text, s.box)
			}
			for _, o := range p.texts[:k] {
				if s.box.Overlaps(o.box) {
					t.Errorf("page %d: %q %+v stands in %q %+v", i+1, s.text, s.box, o.text, o.box)
				}
			}
		}
	}
}

func TestTextsOfDemosStandFree(t *testing.T) {
	for _, name := range sample.Names {
		t.Run(name, func(t *testing.T) { standing(t, laidOut(t, sample.Result(t, name))) })
	}
}

// Whatever stands in a case, no text leaves its page or stands in another: long names without blanks, runes that the font lacks, many options.
func TestTextsOfAnyCaseStandFree(t *testing.T) {
	long := strings.Repeat("Wmeasured", 14)
	for _, c := range []struct {
		name   string
		change func(f *report.File)
		want   []string
	}{
		{"long names", func(f *report.File) {
			f.Case.Title, f.Case.File, f.Program.Version = long+" "+long, long, long
			f.Options[0].Title, f.Options[0].Reason = long, long
			f.Case.Notes = []string{long + long}
			f.Existing.Section.Surcharges[0].Name = long
			f.Limits.KeepClear[0].Name = long
		}, nil},
		{"other scripts", func(f *report.File) {
			f.Case.Title = "Łódź φ′ ≥ 1.25 \U0001f600\x01 滑坡"
			f.Options[0].Title = "\U0001f600"
		}, []string{"Łódź φ′ ≥ 1.25 ?"}},
		{"many options", func(f *report.File) {
			for len(f.Options) < 20 {
				f.Options = append(f.Options, f.Options[1])
			}
		}, nil},
		{"all that a result may hold", func(f *report.File) {
			n := func(v float64) *float64 { return &v }
			money, weight := report.Number(1234.5), report.Number(56.789)
			f.Economics = report.Economics{
				Currency: "EUR", StripDepth: n(0.3), LorryLoad: n(10), Rates: map[string]float64{"cut": 1, "import": 3},
				Carbon: map[string]float64{"cut": 2}, Soils: map[string]report.SoilFactors{"stiff clay": {Bulking: n(1.3), ImportRate: n(5)}},
			}
			f.OnSite = []report.OnSiteFill{{Name: "cut clay", CutOf: "stiff clay", Serves: []string{"granular fill"}, Share: 0.8, Volume: n(1200)}}
			f.Limits.Overhead = []report.Overhead{{Name: "line", FromX: 30, ToX: 40, Level: 115, Clearance: 2}}
			f.Limits.Permanent, f.Limits.MinBench, f.Limits.MaxImport = n(2), n(3), n(2000)
			o := &f.Options[0]
			o.Totals.Cost, o.Totals.Carbon, o.Totals.Loads = &money, &weight, &weight
			o.Bill = []report.BillItem{{Work: "import", Soil: "granular fill", Unit: "m3", PerMetre: &weight, Total: &money, Cost: &money, Carbon: &weight}, {Work: "strip", Unit: "m2"}}
			o.HandChecks = []report.HandCheck{{Name: "bearing under the fill", FS: 3.8449, RequiredFS: 1.1, Working: "5.14 x 35 kPa over 46.8 kPa", Source: "Prandtl (1921)"}}
			o.Relaxations = []report.Relaxation{{Limit: "toe fence", Change: "moved 1.00 m outwards", Saves: 1.239, Parameters: o.Parameters}}
			o.Sensitivity = []report.Bar{{
				Input: "water level", Base: report.Swung{FS: 1.3069, Check: "normal water", RequiredFS: 1.3}, Low: report.Swung{FS: 1.4009, Check: "normal water", RequiredFS: 1.3},
				High: report.Swung{FS: 1.2019, Check: "normal water", RequiredFS: 1.3},
			}, {Input: "unit weight", Base: report.Swung{FS: 1.3}, Low: report.Swung{FS: report.Number(math.NaN())}, High: report.Swung{FS: 1.3}}}
			o.Stages[0].Advisory, o.Stages[0].RequiredFS, o.Stages[0].Says = true, 0, "as if open along the whole length"
		}, []string{
			"1,235", "56.79", "3.844", "low 1.400", "high 1.201", "no answer at one end", "saves 1.23 m³", "short of 1.30", "told only", "80 % of the cut of stiff clay",
			"stays 2 m clear of level 115 m", "steepest face that stays 1V:2H", "as if open along the whole length",
		}},
		{"an observed slip", slipped, []string{
			"Is the choice the same whatever the observed slip leaves open?", "The choice does not hold at every point.", "at the high point (c' 11.25 kPa, phi' 13.40 degrees): nothing meets",
			"low point c' 0.00 kPa phi' 25.50 degrees", "infeasible",
		}},
		{"a slip without an answer", func(f *report.File) { f.BackAnalysis = &report.BackAnalysis{Reason: "too strong"} }, []string{"nothing was sized for it: too strong."}},
		{"wide numbers", func(f *report.File) {
			f.Options[0].Quantities.Earthworks, f.Options[0].Totals.Earthworks = 123456789.123, 9876543210.5
		}, []string{"123456789.13", "9,876,543,211"}},
	} {
		t.Run(c.name, func(t *testing.T) {
			f, text := cuttingWith(t, c.change)
			for _, want := range c.want {
				if !strings.Contains(text, want) {
					t.Errorf("the report does not say %q", want)
				}
			}
			if strings.Contains(text, "NaN") {
				t.Error("a number that there is not is shown")
			}
			written(t, f)
		})
	}
}

// cuttingWith returns the result of the cutting with a change, and what its report, which must stand, says.
func cuttingWith(t *testing.T, change func(*report.File)) (f *report.File, text string) {
	t.Helper()
	f = sample.Result(t, "cutting")
	change(f)
	b := laidOut(t, f)
	standing(t, b)
	return f, said(b)
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

// The same result gives the same bytes, also when it was written and read in between, and they are few.
func TestSameBytes(t *testing.T) {
	const most = 2 << 20
	sample.SameBytes(t, written, most)
}

// The numbers of the result are found in the document by a program that reads such documents.
func TestDocumentSaysWhatTheResultSays(t *testing.T) {
	for _, name := range sample.Names {
		t.Run(name, func(t *testing.T) {
			f := sample.Result(t, name)
			got := sample.PDFText(t, written(t, f))
			want := []string{
				f.Case.Title, f.Case.SHA256, "standfast " + f.Program.Version, "Inputs as understood", "Methods and limits of validity",
				"The slope as it is", "Options compared", "What would change the answer", "φ′", "kN/m³",
			}
			for _, c := range f.Cautions {
				want = append(want, strings.Fields(c)[0])
			}
			for name := range f.Soils {
				want = append(want, name)
			}
			for i := range f.Options {
				o := &f.Options[i]
				want = append(want, "Option: "+report.Capital(o.Title), report.QuantityText(o.Quantities.Earthworks), o.Status)
				for k := range o.Situations {
					want = append(want, report.FactorText(o.Situations[k].FS))
				}
				for k := range o.Stages {
					want = append(want, o.Stages[k].Name, report.FactorText(o.Stages[k].FS))
				}
			}
			for i := range f.Existing.Situations {
				want = append(want, report.FactorText(f.Existing.Situations[i].FS))
			}
			for _, w := range want {
				if !strings.Contains(got, w) {
					t.Errorf("the document does not say %q", w)
				}
			}
		})
	}
}

// Every slice table closes at the FS of the check that it is for.
func TestSliceTablesCloseAtTheAnswer(t *testing.T) {
	for _, name := range sample.Names {
		f := sample.Result(t, name)
		text := said(laidOut(t, f))
		tables := regexp.MustCompile(`Slice table of the governing slip: .*? = ([0-9.]+); from the method: ([0-9.]+)`).FindAllStringSubmatch(text, -1)
		var want []string
		for _, o := range append([]report.Option{f.Existing}, f.Options...) {
			g, ok := o.Governing()
			if !ok || !g.FS.Known() {
				t.Fatalf("%s: no FS", o.Name)
			}
			want = append(want, report.FactorText(g.FS))
		}
		if len(tables) != len(want) {
			t.Fatalf("%s: %d slice tables, want %d", name, len(tables), len(want))
		}
		for i, m := range tables {
			if m[1] != want[i] || m[2] != want[i] {
				t.Errorf("%s: slice table %d closes at %s (%s), want %s", name, i, m[1], m[2], want[i])
			}
		}
	}
}

// Whatever compare can come to gives a report, and an FS that there is not is not shown.
func TestEveryOutcome(t *testing.T) {
	for _, c := range []struct {
		name      string
		change    func(f *report.File)
		want, not string
	}{
		{"nothing needed", func(f *report.File) {
			least := "existing"
			f.Options, f.LeastEarthworks = nil, &least
		}, "Nothing is needed", "Options compared"},
		{"nothing meets", func(f *report.File) { f.Options, f.LeastEarthworks = f.Options[2:], nil }, "Nothing meets the target", "Least earthworks:"},
		{"an option without an FS", func(f *report.File) {
			o := &f.Options[0]
			o.Status = "unresolved"
			for i := range o.Situations {
				o.Situations[i].Found = report.Found{FS: report.Number(math.NaN())}
			}
		}, "no slip converged", "NaN"},
		{"a lattice too large", func(f *report.File) {
			c := f.Options[0].Certificate
			c.Coarsened, c.Axes[0].StepAsked, c.Axes[0].Step = true, 0.05, 0.1
		}, "has more than 200,000 designs and was coarsened: height by 0.1 instead of 0.05", "NaN"},
		{"least cost", func(f *report.File) {
			v := report.Number(4321)
			f.Settings.Objective, f.Options[0].Totals.Cost = "cost", &v
		}, "in all, in ascending cost; those", "east earthworks"},
		{"earthworks against drain", func(f *report.File) {
			o := &f.Options[0]
			point := report.FrontPoint{Drain: 2.5, Earthworks: 7.001, Answer: true, Check: "high water", FS: 1.2159, RequiredFS: 1.2, Parameters: o.Parameters}
			other := point
			other.Drain, other.Earthworks, other.Answer = 1.25, 11.5, false
			o.Front = &report.Front{Points: []report.FrontPoint{point, other}}
		}, "this, 1", "of one and no more of the other than these"},
		{"a situation told only", func(f *report.File) { f.Options[0].Situations[1].RequiredFS = 0 }, "told only", "NaN"},
		{"no stage settings", func(f *report.File) { f.StageSettings = nil }, "construction stages were not checked", "NaN"},
		{"case of another version", func(f *report.File) { f.Case.Source = "" }, "Thornbeck", "Back-analysis"},
		{"an observed slip", func(f *report.File) {
			f.Case.Source += "\nobserved_slip:\n  line: [[28, 109.04], [36, 101], [46, 98.5], [54, 99.98]]\n  situation: high water\n"
		}, "Back-analysis of the observed slip", "No answer"},
	} {
		t.Run(c.name, func(t *testing.T) {
			_, text := cuttingWith(t, c.change)
			if !strings.Contains(text, c.want) {
				t.Errorf("the report does not say %q", c.want)
			}
			if strings.Contains(text, c.not) {
				t.Errorf("the report says %q", c.not)
			}
		})
	}
}

// A result that lacks what drawings need is refused.
func TestIncomplete(t *testing.T) {
	f := sample.Result(t, "cutting")
	f.Existing.Section = nil
	if err := Write(&bytes.Buffer{}, f); err == nil || !strings.Contains(err.Error(), "run compare again") {
		t.Errorf("an incomplete result gives %v", err)
	}
}

func TestRounding(t *testing.T) {
	for _, c := range []struct{ name, got, want string }{
		{"required up", required(1.2341), "1.235"},
		{"required without a last zero", required(1.30), "1.30"},
		{"nothing required", required(0), none},
		{"asked without the noise of a sum", asked(&report.TradePoint{RequiredFS: 1.3 + 0.05 + 0.05 + 1e-15}), "1.40"},
		{"factor down", factor(1.2999), "1.299"},
		{"no factor", factor(report.Number(math.NaN())), "none"},
	} {
		if c.got != c.want {
			t.Errorf("%s: %s, want %s", c.name, c.got, c.want)
		}
	}
}

// A rebuilt file gives the same report as one that holds more than it needs: the report reads nothing else than result.json.
func TestUnknownFieldsDoNoHarm(t *testing.T) {
	raw, err := os.ReadFile(sample.Path("cutting"))
	if err != nil {
		t.Fatal(err)
	}
	var m map[string]any
	if err := json.Unmarshal(raw, &m); err != nil {
		t.Fatal(err)
	}
	m["later"] = "field"
	more, err := json.Marshal(m)
	if err != nil {
		t.Fatal(err)
	}
	f, err := report.Decode(bytes.NewReader(more))
	if err != nil {
		t.Fatal(err)
	}
	if !bytes.Equal(written(t, f), written(t, sample.Result(t, "cutting"))) {
		t.Error("a later field changes the report")
	}
}

func BenchmarkWrite(b *testing.B) {
	f := sample.Result(b, "cutting")
	b.ReportAllocs()
	for b.Loop() {
		written(b, f)
	}
}
