package validation

import (
	"fmt"
	"math"
	"strconv"
	"strings"
)

// Answered is a group with the program's answers.
type Answered struct {
	Title    string
	Outcomes []Outcome
}

// Run answers every check.
func Run() ([]Answered, error) {
	var out []Answered
	for _, g := range Groups() {
		a := Answered{Title: g.Title}
		for i := range g.Checks {
			o, err := g.Checks[i].run()
			if err != nil {
				return nil, err
			}
			a.Outcomes = append(a.Outcomes, o)
		}
		out = append(out, a)
	}
	return out, nil
}

// count returns the number of checks, of those that pass, and of their sources.
func count(groups []Answered) (checks, passed, works int) {
	seen := map[*Work]bool{}
	for _, g := range groups {
		for i := range g.Outcomes {
			o := &g.Outcomes[i]
			checks++
			if o.Pass {
				passed++
			}
			seen[o.Work] = true
		}
	}
	return checks, passed, len(seen)
}

const preamble = `# Validation report

Values from outside the project against what the program computes. Written by

    go test ./cmd/internal/validation -update

from the table of checks in ` + "`cmd/internal/validation`" + `, which that package's tests run: a test fails where a check fails or where this page is not what the
table gives. A value that the program computed is never the value wanted.

How to read it: "published" is the value of the source, or of the formula beside it; "ours" is rounded down for a factor of safety and up for
anything else, four decimals; "difference" is (ours - published)/published, before rounding; "accepted" is the range that passes, with the reason for
its width. Confidence is *exact* for a closed form, *high* where the source gives all inputs and the value, *medium* where something is inferred or read
from a chart. No check of high confidence may fail; of the others at most three, each with its reason and reading low, which is the safe side.
"R" marks a source whose numbers are recalled from memory: get the work before you rely on the row.

Factors of safety of critical slips are searched for with the default search and 30 slices, by the one method that is named. On toe circles of slopes of 60
degrees with friction Spencer's equations often have no answer: Taylor's numbers are met there by Bishop's method, which then governs alone; on steeper
slopes Bishop's method reads up to 9 % below them and Spencer's is compared.
`

const leftOut = `## Published cases that are not here

Left out because the geometry could not be recalled safely, or because the value depends on something that the program does not compute: Fredlund and
Krahn's cases 5 and 6 (piezometric line not recalled); Giam and Donald's problems 2 to 5 (coordinates); Arai and Tagyo's examples 2 and 3 and their
non-circular value of example 1; Chen and Shao's layered example; Spencer's (1967) example (circle not given); the James Bay dyke (berm not recalled); the examples of
EM 1110-2-1902, Appendices F and G, and the drawdown histories of Duncan, Wright and Wong (sections not recalled; multi-stage drawdown strengths are not
implemented); the charts of m and n of Bishop and Morgenstern beyond their anchor. Prandtl's 5.14 cu on a composite slip is met only by the true side forces, not
by any assumption that the methods make, and gates nothing.
`

// Page returns docs/validation.md.
func Page(groups []Answered) string {
	var b strings.Builder
	b.WriteString(preamble)
	checks, passed, works := count(groups)
	fmt.Fprintf(&b, "\n**%d checks from %d sources; %d pass.**\n", checks, works, passed)
	for _, g := range groups {
		fmt.Fprintf(&b, "\n## %s\n\n| case | quantity | source | confidence | published | ours | difference | accepted | pass |\n|---|---|---|---|---|---|---|---|---|\n", g.Title)
		for i := range g.Outcomes {
			o := &g.Outcomes[i]
			pass := "yes"
			if !o.Pass {
				pass = "**no**: " + o.Explained
			}
			fmt.Fprintf(&b, "| %s | %s | %s | %s | %s | %s | %s | %s: %s | %s |\n", o.Case, quantity(o), source(o), o.Confidence,
				short(o.Want), o.text(), percent(o.Difference()), accepted(o), o.Why, pass)
		}
	}
	b.WriteString("\n" + leftOut + "\n## Sources\n\n")
	writeWorks(&b, groups)
	return b.String()
}

// writeWorks lists the sources in the order of their first check.
func writeWorks(b *strings.Builder, groups []Answered) {
	seen := map[*Work]bool{}
	for _, g := range groups {
		for i := range g.Outcomes {
			w := g.Outcomes[i].Work
			if seen[w] {
				continue
			}
			seen[w] = true
			recalled := ""
			if w.Recalled {
				recalled = " (recalled from memory)"
			}
			fmt.Fprintf(b, "* %s: %s%s.\n", w.Name, w.Title, recalled)
		}
	}
}

func quantity(o *Outcome) string {
	if o.Unit == "" {
		return o.What
	}
	return o.What + ", " + o.Unit
}

func source(o *Outcome) string {
	s := o.Work.Name
	if o.Work.Recalled {
		s += " R"
	}
	if o.Place != "" {
		s += "; " + o.Place
	}
	return s
}

// decimals is how far answers are shown.
const decimals = 1e4

// noise is what rounding up does not count, relative.
const noise = 1e-9

// text returns the answer, rounded to the safe side.
func (o *Outcome) text() string {
	v := math.Ceil(o.Got*decimals*(1-noise)) / decimals
	if strings.Contains(o.What, "FS, ") {
		v = math.Floor(o.Got*decimals*(1+noise)) / decimals
	}
	return strconv.FormatFloat(v, 'f', 4, 64)
}

// short writes a number with at most four decimals.
func short(v float64) string {
	return strconv.FormatFloat(math.Round(v*decimals)/decimals, 'f', -1, 64)
}

// accepted returns the accepted range as a deviation, or as a range where it is lopsided.
func accepted(o *Outcome) string {
	low, high := (o.Want-o.Low)/math.Abs(o.Want), (o.High-o.Want)/math.Abs(o.Want)
	if math.Abs(low-high) < noise {
		return "±" + strconv.FormatFloat(100*high, 'g', 3, 64) + " %"
	}
	return short(o.Low) + " to " + short(o.High)
}

// percent writes a difference to a hundredth of a per cent.
func percent(d float64) string {
	s := strconv.FormatFloat(100*d, 'f', 2, 64)
	if d > 0 && s != "0.00" {
		s = "+" + s
	}
	return strings.TrimPrefix(s, "-0.00") + map[bool]string{true: "0.00"}[s == "-0.00"] + " %"
}
