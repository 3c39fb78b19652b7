package report

import (
	"bytes"
	"math"
	"strings"
	"testing"

	"github.com/santhosh-tekuri/jsonschema/v6"

	"standfast/lem"
	"standfast/remedies"
)

// slippedSample is the sample with an observed slip: the berm is least at the low point, the drains at the middle one, and nothing meets the
// target at the high one.
func slippedSample() (*remedies.Result, Source) {
	r, src := sample()
	r.Job.Observed = &remedies.Observed{Slip: lem.Slip{Kind: lem.Circle, Centre: lem.Point{X: 48, Y: 120}, Radius: 20.5}, Situation: 1}
	berm, drains := r.Options[0], r.Options[1]
	short := berm
	short.Status, short.Reason = remedies.Infeasible, "too short"
	short.Situations, short.Stages = outcomes(r.Job, berm.Proposal, 1.21, 1.1, 1.15)
	point := func(name, least string, cohesion, degrees float64, options ...remedies.Option) remedies.SizedPoint {
		return remedies.SizedPoint{
			Name: name, Strength: remedies.BackPoint{Cohesion: cohesion, Friction: degrees * math.Pi / 180, FS: 1}, Existing: r.Existing, Options: options, Least: least,
		}
	}
	r.Points = &remedies.Points{
		Back: &remedies.BackAnalysis{Share: 1, Situation: 1, Method: lem.Bishop, AsGiven: 1.08, From: lem.Point{X: 30.75, Y: 108.7}, To: lem.Point{X: 52.9, Y: 100}, Depth: 3.879},
		Sized: []remedies.SizedPoint{
			point("low", "berm", 0, 26.119, berm, drains),
			point("middle", "trench_drains", 2.505, 20, drains, berm),
			point("high", "", 5, 14, short),
		},
	}
	r.Points.Sized[0].Chosen, r.Points.Sized[2].Chosen = &berm, &short
	return r, src
}

// TestBackAnalysisComesBack: what is written fits the schema and is read back as it was.
func TestBackAnalysisComesBack(t *testing.T) {
	f := New(slippedSample())
	text := encoded(t, f)
	doc, err := jsonschema.UnmarshalJSON(strings.NewReader(text))
	if err != nil {
		t.Fatal(err)
	}
	if err := compiled(t).Validate(doc); err != nil {
		t.Error(err)
	}
	back, err := Decode(strings.NewReader(text))
	if err != nil {
		t.Fatal(err)
	}
	if encoded(t, back) != text {
		t.Error("the file is not written as it was read")
	}
	if _, err := Rebuild(back); err != nil {
		t.Error(err)
	}
	if *f.BackAnalysis.SameLeast || *f.BackAnalysis.SameOrder {
		t.Error("the choice is said to be the same at all points")
	}
	if s := encoded(t, New(sample())); strings.Contains(s, "back_analysis") {
		t.Error("a case without an observed slip has a back-analysis")
	}
}

// TestRankingIsTold: what flips is said to flip, and what does not is not.
func TestRankingIsTold(t *testing.T) {
	points := func(change func(p *remedies.Points)) *File {
		r, src := slippedSample()
		change(r.Points)
		return New(r, src)
	}
	existing := "existing"
	for _, c := range []struct {
		name   string
		change func(p *remedies.Points)
		want   []string // In this order.
		not    string
	}{
		{"flips", func(*remedies.Points) {}, []string{
			"The choice flips. Least earthworks at the low point (c' 0.00 kPa, phi' 26.11 degrees): toe berm, 5.44 m3/m; at the middle point (c' 2.50 kPa, phi' 20.00 degrees): trench drains, ",
			"at the high point (c' 5.00 kPa, phi' 14.00 degrees): nothing meets the target.",
			"least first, are not the same at all three points: low: toe berm, trench drains; middle: trench drains, toe berm; high: none.",
			"Toe berm, of the size found with the strengths of the case: low point, stands; high point, FS 1.100 of the 1.200 required in wet spring.",
			"The lowest FS found in wet spring, where the observed slip has FS 1, is 1.041 at the low point,",
		}, "is the same at all"},
		{"the same", func(p *remedies.Points) { p.Sized[1], p.Sized[2] = p.Sized[0], p.Sized[0] }, []string{
			"The option with the least earthworks is the same at all three points: toe berm (5.44 m3/m; 5.44 m3/m; 5.44 m3/m). The ranking",
			"The ranking of the options that meet the target is the same",
		}, "flips"},
		{"the same, but not as given", func(p *remedies.Points) { p.Sized[0], p.Sized[2] = p.Sized[1], p.Sized[1] }, []string{
			"is the same at all three points: trench drains (", "With the strengths of the case it is not the least.",
		}, "flips"},
		{"one alone", func(p *remedies.Points) {
			for i := range p.Sized {
				p.Sized[i].Options, p.Sized[i].Least = p.Sized[i].Options[:1], ""
			}
			p.Sized[0].Least = "berm"
			p.Sized[1] = p.Sized[2]
		}, []string{"The choice does not hold at every point. Least earthworks at the low point", "nothing meets"}, "least first"},
		{"nothing", func(p *remedies.Points) { p.Sized[0], p.Sized[1] = p.Sized[2], p.Sized[2] }, []string{"Nothing meets the target at any of the three points."}, "flips"},
		{"nothing needed", func(p *remedies.Points) {
			for i := range p.Sized {
				p.Sized[i].Options, p.Sized[i].Least = nil, existing
			}
		}, []string{"Nothing is needed at any of the three points."}, "flips"},
		{"no answer", func(p *remedies.Points) { *p = remedies.Points{Reason: "too strong"} }, []string{
			"The observed slip has no back-analysis, and nothing was sized for it: too strong.",
		}, "lowest FS"},
	} {
		t.Run(c.name, func(t *testing.T) {
			f := points(c.change)
			got := strings.Join(f.RankingTexts(), " ")
			rest := got
			for _, w := range c.want {
				i := strings.Index(rest, w)
				if i < 0 {
					t.Fatalf("%q\nwant %q in it", got, w)
				}
				rest = rest[i:]
			}
			if strings.Contains(got, c.not) {
				t.Errorf("%q\nwith %q in it", got, c.not)
			}
			var b bytes.Buffer
			if err := WriteComparison(&b, f, Look{}); err != nil || !strings.Contains(b.String(), c.want[0][:40]) {
				t.Errorf("not on the screen: %v\n%s", err, b.String())
			}
		})
	}
}

// TestRankingRows: a row an option, a cell a point, and no number for what does not meet the target. The berm takes 4 x 1.5 + (2 - 2.5) x 1.5^2/2 =
// 5.4375 m3/m (closed form: a trapezium on a straight face).
func TestRankingRows(t *testing.T) {
	r, src := slippedSample()
	r.Points.Sized[2].Options, r.Points.Sized[2].Least = nil, "existing"
	q := &r.Options[1].Proposal.Quantities
	drains := QuantityText(q.Earthworks()) + " m3/m and " + QuantityText(q.Drain) + " m/m of drains"
	rows := New(r, src).RankingRows()
	want := [][]string{
		{"toe berm", "5.44 m3/m", "5.44 m3/m", notNeeded},
		{"trench drains", drains, drains, notNeeded},
		{"regrade", unknown, unknown, notNeeded},
		{"lower water (what-if)", unknown, unknown, notNeeded},
	}
	for i, row := range rows {
		if got := strings.Join(append([]string{row.Title}, row.Cells...), " | "); i >= len(want) || got != strings.Join(want[i], " | ") {
			t.Errorf("row %d: %s", i, got)
		}
	}
	if len(rows) != len(want) {
		t.Errorf("%d rows", len(rows))
	}
}
