package report

import (
	"bytes"
	"math"
	"strings"
	"testing"

	"standfast/remedies"
)

// TestComparisonBeside: costs, the balance of fill, what a limit costs and how sure the answer is are printed where the case asks for them.
func TestComparisonBeside(t *testing.T) {
	result, src := sample()
	priceSample(result.Job)
	result.Existing.Sensitivity = []remedies.Bar{{Input: "water level", Low: 1.1049, High: 0.9951}}
	berm := &result.Options[0]
	berm.Parameters[0].Name = "berm.height"
	berm.Relaxations = []remedies.Relaxation{
		{Limit: "toe fence", Change: "moved 1.00 m outwards", Saves: 2345.6, Parameters: berm.Parameters},
		{Limit: "crest fence", Change: "moved 1.00 m outwards", Saves: 0.004, Parameters: berm.Parameters},
	}
	berm.Sensitivity = []remedies.Bar{{
		Input: "water level", Low: 1.3599, High: 1.1891, CheckL: "normal water", RequiredL: 1.3, CheckH: "wet spring", RequiredH: 1.2,
	}}
	berm.Certificate.UnresolvedDesigns = 1234
	berm.Stages[0].Check.Advisory, berm.Stages[0].Check.Required, berm.Stages[0].FS = true, 0, 0.93
	berm.Proposal.HandChecks = []remedies.HandCheck{{Name: remedies.Bearing, FS: 3.8459, Required: 1.1, Working: "5.14 x 35 kPa over 46.8 kPa"}}
	var b bytes.Buffer
	if err := WriteComparison(&b, New(result, src), Look{}); err != nil {
		t.Fatal(err)
	}
	text := unwrapped(b.String())
	for _, want := range []string{
		"For the whole length of 80 m (rounded up; - where a rate or factor is blank) import disposal lorry cost option m3 m3 loads EUR",
		"toe berm 395 0 50 3,280 ", "lower water (what-if) 0 0 - - ",
		"Toe berm: moving the toe fence 1.00 m outwards saves 2345 EUR (berm height 1.5 m, top width 4 m, batter 1V:2H; searched, not audited).",
		"Least cost: toe berm, 3,280 EUR, 5.44 m3 per metre run",
		"water level 1.359 1.189 1.104 0.995 high: short of 1.200 in wet spring",
		"least of the designs that could be judged on this lattice",
		"1,234 cheaper designs are unresolved, neither rejected nor accepted",
		"By hand, from closed forms (sources in the report)", "toe berm bearing under the 3.845 1.100 5.14 x 35 kPa over 46.8 kPa",
		"in plane strain the open hole has FS 0.930: it does not stand without support",
	} {
		if !strings.Contains(text, want) {
			t.Errorf("missing: %s\nin:\n%s", want, b.String())
		}
	}
	for _, never := range []string{"crest fence 1.00 m", "0.000", "carbon"} {
		if strings.Contains(text, never) {
			t.Errorf("%q is shown in:\n%s", never, b.String())
		}
	}
}

// TestMethodText: names for people keep their hyphens and their remarks.
func TestMethodText(t *testing.T) {
	for name, want := range map[string]string{
		"morgenstern-price": "Morgenstern-Price", "janbu simplified (uncorrected)": "Janbu simplified (uncorrected)", "": "",
	} {
		if got := MethodText(name); got != want {
			t.Errorf("%q: %q, want %q", name, got, want)
		}
	}
	if got := optional(ifKnown(math.NaN()), TotalText); got != unknown {
		t.Errorf("a cost that is not known is shown as %q", got)
	}
}
