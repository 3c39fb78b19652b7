package drawing

import (
	"errors"
	"math"
	"strings"
	"testing"

	"standfast/lem"
	"standfast/remedies"
)

// construction draws the strip of a case; the slope as it is has no answer there.
func construction(t *testing.T, d drawn, width float64) *Figure {
	t.Helper()
	existing := remedies.Option{Name: "existing", Status: remedies.Existing, Proposal: remedies.Start(d.job)}
	f, err := Sequence(&existing, d.opt, d.job, width)
	if err != nil {
		t.Fatal(err)
	}
	return f
}

func TestSequenceLabels(t *testing.T) {
	for name, d := range cases() {
		if d.opt == nil || d.opt.Proposal == nil {
			continue
		}
		t.Run(name, func(t *testing.T) {
			f := construction(t, d, 511)
			checkLabels(t, f)
			keep(t, "sequence-"+name, f)
			for _, m := range f.marks {
				s, ok := m.(stroke)
				if !ok {
					continue
				}
				for _, l := range s.lines {
					for _, q := range l {
						if !f.Page().grown(1e-6).holds(q) {
							t.Fatalf("a line leaves the page: %v", q)
						}
					}
				}
			}
		})
	}
}

func TestWhatASequenceSays(t *testing.T) {
	got := texts(construction(t, cuttingWithBerm(), 511))
	for _, want := range []string{"1 as it is", "not checked", "2 end of construction", "3 works complete", "FS 1.255 (Bishop) in winter water, required 1.25"} {
		if !strings.Contains(got, want) {
			t.Errorf("the strip does not say %q; it says:\n%s", want, got)
		}
	}
	d := cuttingWithBerm()
	for i := range d.opt.Stages {
		d.opt.Stages[i].FS = math.NaN()
	}
	if got := texts(construction(t, d, 511)); strings.Contains(got, "NaN") || !strings.Contains(got, "no slip converged") {
		t.Errorf("a stage without an FS gives:\n%s", got)
	}
}

func TestNoSequence(t *testing.T) {
	if _, err := Sequence(&remedies.Option{}, &remedies.Option{Name: "none"}, cutting(), 511); !errors.Is(err, ErrNothingToDraw) {
		t.Errorf("an option without works gives %v", err)
	}
}

func TestTradeoffPlotLabels(t *testing.T) {
	for _, size := range []struct{ width, height float64 }{{511, 200}, {511, 290}, {300, 120}} {
		f, err := TradeoffPlot(tradeoffs(true), size.width, size.height)
		if err != nil {
			t.Fatal(err)
		}
		checkLabels(t, f)
	}
	if _, err := TradeoffPlot([]remedies.Option{{Name: "berm"}}, 511, 200); !errors.Is(err, ErrNothingToDraw) {
		t.Errorf("options without curves give %v", err)
	}
}

// Exchanged ground is hatched as fill, a hole in panels, which its stage has as a mean along the works, as cut; a restraint is drawn.
func TestBodiesInASequence(t *testing.T) {
	d := cuttingWithBerm()
	full := construction(t, d, 400)
	if len(strokesOf(full, fillPen)) == 0 || len(strokesOf(full, cutPen)) != 0 {
		t.Error("the berm is not hatched as fill alone")
	}
	stage := d.opt.Proposal.Section
	stage.Soils = append(append([]lem.Soil{}, stage.Soils...), soil("clay between holes", 12, 1, 20, 0))
	stage.Placed = []lem.Body{{Soil: len(stage.Soils) - 1, Outline: stage.Placed[0].Outline}}
	stage.Restraints = []lem.Restraint{{Name: "piles", X: 45, Top: 51, Bottom: 46, Force: 10}}
	d.opt.Stages[0].Check.Section = &stage
	open := construction(t, d, 400)
	if len(strokesOf(open, cutPen)) == 0 {
		t.Error("a hole in panels is not hatched as cut")
	}
	if n := len(strokesOf(open, pen{inkBlack, 1.8, nil})); n != 1 {
		t.Errorf("%d restraints drawn, want 1", n)
	}
}
