package validation

import (
	"flag"
	"os"
	"testing"
)

var update = flag.Bool("update", false, "write docs/validation.md")

const page = "../../../docs/validation.md"

// TestChecks runs the table and holds docs/validation.md to it.
func TestChecks(t *testing.T) {
	groups, err := Run()
	if err != nil {
		t.Fatal(err)
	}
	failed := 0
	for _, g := range groups {
		for i := range g.Outcomes {
			o := &g.Outcomes[i]
			if o.Pass {
				if o.Explained != "" {
					t.Errorf("%s, %s: passes, and its failure is explained", o.Case, o.What)
				}
				continue
			}
			failed++
			if o.Explained == "" || o.Confidence != Medium || o.Got > o.Want {
				t.Errorf("%s, %s: %.5f, want %.5g, accepted %.5g to %.5g (%s, %s)", o.Case, o.What, o.Got, o.Want, o.Low, o.High, o.Work.Name, o.Place)
			}
		}
	}
	const mostFailed = 3
	if failed > mostFailed {
		t.Errorf("%d checks fail, at most %d may", failed, mostFailed)
	}
	got := Page(groups)
	if *update {
		if err := os.WriteFile(page, []byte(got), 0o644); err != nil {
			t.Fatal(err)
		}
		return
	}
	want, err := os.ReadFile(page)
	if err != nil {
		t.Fatal(err)
	}
	if got != string(want) {
		t.Error("docs/validation.md is stale: run go test ./cmd/internal/validation -update and look at the difference")
	}
}

// TestTable holds the table to its own rules: enough checks and sources, each check once, every published value accepted, no range so wide that it says
// nothing.
func TestTable(t *testing.T) {
	const leastChecks, leastWorks, widest = 60, 20, 0.15
	type key struct{ name, what, work string }
	seen := map[key]bool{}
	works := map[*Work]bool{}
	for _, g := range Groups() {
		for _, c := range g.Checks {
			k := key{c.Case, c.What, c.Work.Name}
			if seen[k] {
				t.Errorf("%s, %s: stands twice", c.Case, c.What)
			}
			seen[k], works[c.Work] = true, true
			if !(c.Low <= c.Want && c.Want <= c.High) || c.High-c.Low > 2*widest*c.Want {
				t.Errorf("%s, %s: %v is not within the accepted %v to %v, or that is too wide", c.Case, c.What, c.Want, c.Low, c.High)
			}
			if c.Why == "" || c.Run == nil || c.Explained != "" && c.Confidence != Medium {
				t.Errorf("%s, %s: incomplete", c.Case, c.What)
			}
		}
	}
	if len(seen) < leastChecks || len(works) < leastWorks {
		t.Errorf("%d checks from %d sources, want %d from %d", len(seen), len(works), leastChecks, leastWorks)
	}
}

// TestOutcome checks that a check can fail, and how numbers are shown.
func TestOutcome(t *testing.T) {
	c := Check{What: "FS, bishop", Want: 1.5, Run: func() (float64, error) { return 1.52, nil }}.within(0.01, "")
	o, err := c.run()
	if err != nil || o.Pass {
		t.Errorf("1.52 passes for 1.5 within 1 %%: %+v, %v", o, err)
	}
	o.Got = 1.49996
	if got := o.text(); got != "1.4999" {
		t.Errorf("FS 1.49996 is shown as %s", got)
	}
	o.What, o.Got = "cut", 1.49991
	if got := o.text(); got != "1.5000" {
		t.Errorf("cut 1.49991 is shown as %s", got)
	}
	if got := percent(-1e-9); got != "0.00 %" {
		t.Errorf("no difference is shown as %s", got)
	}
}
