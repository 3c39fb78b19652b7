package sheet

import (
	"regexp"
	"strings"
	"testing"

	"github.com/chromedp/cdproto/emulation"
	"github.com/chromedp/chromedp"

	"standfast/cmd/internal/sample"
)

var pdfPage = regexp.MustCompile(`/Type\s*/Page[^s]`)

// The sheet prints on A3 and A4, in few pages, with no card torn apart.
func testPaper(t *testing.T, b *tab) {
	for _, name := range sample.Names {
		for _, c := range []struct {
			name      string
			paper     chromedp.PaperSize
			landscape bool
			most      int // Pages.
		}{
			{"A3 landscape", chromedp.PaperA3, true, 2},
			{"A4 landscape", chromedp.PaperA4, true, 4},
			{"A4 portrait", chromedp.PaperA4, false, 5},
		} {
			t.Run(name+" on "+c.name, func(t *testing.T) {
				b.open(t, sample.Result(t, name), 1366, 768, "")
				options := []chromedp.PDFOption{chromedp.PDFPaper(c.paper), chromedp.PDFPrintBackground(), chromedp.PDFMargin(0.394)}
				if c.landscape {
					options = append(options, chromedp.PDFLandscape())
				}
				pdf, err := chromedp.Run(b.ctx, chromedp.PrintToPDF(options...))
				if err != nil {
					t.Fatal(err)
				}
				if n := len(pdfPage.FindAll(pdf, -1)); n < 1 || n > c.most {
					t.Errorf("%d pages, want at most %d", n, c.most)
				}
				if got := ask[int](t, b, `document.querySelector('[data-figure="0"] svg').viewBox.baseVal.width - document.querySelector('[data-figure="0"]').clientWidth`); got != 0 {
					t.Errorf("after printing the figures are %d pixels off the screen's width", got)
				}
			})
		}
	}
	b.open(t, sample.Result(t, "cutting"), 1512, 1047, "print")
	if high := ask[float64](t, b, `Math.max(...[...document.querySelectorAll(".card")].map(e => e.offsetHeight))`); high > 718 {
		t.Errorf("a card is %v pixels high: it does not fit on A4 landscape", high)
	}
	b.run(t, "look.moveTo(0)")
	if got := ask[string](t, b, `document.querySelector(".printed-target").innerText`); !strings.Contains(got, "not the specified target") {
		t.Errorf("printed for another target: %q", got)
	}
	b.quiet(t)
}

// Who asks for reduced motion gets none.
func testStillness(t *testing.T, b *tab) {
	b.open(t, sample.Result(t, "cutting"), 1366, 768, "screen")
	_, err := chromedp.Call(b.ctx, emulation.SetEmulatedMedia, emulation.SetEmulatedMediaParams{
		Features: []*emulation.MediaFeature{{Name: "prefers-reduced-motion", Value: "reduce"}},
	})
	if err != nil {
		t.Fatal(err)
	}
	moving := ask[int](t, b, `[...document.querySelectorAll("*")].filter(e => { const s = getComputedStyle(e); return s.transitionDuration !== "0s" || s.animationName !== "none" }).length`)
	if moving != 0 {
		t.Errorf("%d elements move", moving)
	}
}
