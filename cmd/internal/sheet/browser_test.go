package sheet

import (
	"context"
	_ "embed"
	"encoding/json"
	"fmt"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"strings"
	"sync"
	"testing"
	"time"

	"github.com/chromedp/cdproto/emulation"
	"github.com/chromedp/cdproto/input"
	browserlog "github.com/chromedp/cdproto/log"
	"github.com/chromedp/cdproto/network"
	"github.com/chromedp/cdproto/runtime"
	"github.com/chromedp/chromedp"
	"github.com/chromedp/chromedp/kb"

	"standfast/cmd/internal/report"
	"standfast/cmd/internal/sample"
)

//go:embed testdata/look.js
var look string

// browserTime is what all browser tests together may take at the most.
const browserTime = 3 * time.Minute

// tab is a page of a real browser that keeps what must not happen in it.
type tab struct {
	t   *testing.T
	ctx context.Context

	mu       sync.Mutex
	requests []string // All but that for the page itself.
	errors   []string
}

// newTab starts a browser. Without one the test is skipped, or fails if STANDFAST_BROWSER is "required".
func newTab(t *testing.T) *tab {
	t.Helper()
	var path string
	for _, name := range []string{"chromium", "chromium-browser", "google-chrome", "chrome", "headless-shell"} {
		if p, err := exec.LookPath(name); err == nil {
			path = p
			break
		}
	}
	switch {
	case path == "" && os.Getenv("STANDFAST_BROWSER") == "required":
		t.Fatal("no browser, and STANDFAST_BROWSER=required")
	case path == "":
		t.Skip("no browser")
	case testing.Short():
		t.Skip("short")
	}
	options := append(chromedp.DefaultExecAllocatorOptions[:], chromedp.ExecPath(path), chromedp.NoSandbox, chromedp.DisableGPU,
		chromedp.Flag("disable-background-networking", true))
	parent, stop := context.WithTimeout(t.Context(), browserTime)
	t.Cleanup(stop)
	allocator, stop := chromedp.NewExecAllocator(parent, options...)
	t.Cleanup(stop)
	b := &tab{t: t}
	ctx, stop := chromedp.NewContext(allocator, chromedp.WithListener(b.listen))
	t.Cleanup(stop)
	b.ctx = ctx
	if _, err := chromedp.Call(ctx, network.Enable, network.EnableParams{}); err != nil {
		t.Fatal(err)
	}
	return b
}

func (b *tab) listen(ev any) {
	b.mu.Lock()
	defer b.mu.Unlock()
	switch e := ev.(type) {
	case *network.EventRequestWillBeSent:
		if !strings.HasPrefix(e.Request.URL, "data:") && !strings.HasSuffix(e.Request.URL, "/"+Name) {
			b.requests = append(b.requests, e.Request.URL)
		}
	case *runtime.EventExceptionThrown:
		b.errors = append(b.errors, e.ExceptionDetails.Text)
	case *runtime.EventConsoleAPICalled:
		b.errors = append(b.errors, fmt.Sprintf("console.%s", e.Type))
	case *browserlog.EventEntryAdded: // Such as what the content policy forbade.
		b.errors = append(b.errors, e.Entry.Text)
	}
}

// quiet fails the test if the page asked for anything or complained.
func (b *tab) quiet(t *testing.T) {
	t.Helper()
	b.mu.Lock()
	defer b.mu.Unlock()
	if len(b.requests)+len(b.errors) > 0 {
		t.Errorf("requests %q, errors %q", b.requests, b.errors)
	}
}

func (b *tab) do(t *testing.T, steps ...chromedp.Action[chromedp.Void]) {
	t.Helper()
	if err := chromedp.Do(b.ctx, steps...); err != nil {
		t.Fatal(err)
	}
}

// run evaluates a script.
func (b *tab) run(t *testing.T, script string) {
	t.Helper()
	b.do(t, chromedp.Evaluate[chromedp.Void](script+"; undefined"))
}

// ask evaluates an expression.
func ask[T any](t *testing.T, b *tab, expression string) T {
	t.Helper()
	raw, err := chromedp.Run(b.ctx, chromedp.Evaluate[string]("JSON.stringify("+expression+")"))
	if err != nil {
		t.Fatalf("%s: %v", expression, err)
	}
	var v T
	if err := json.Unmarshal([]byte(raw), &v); err != nil {
		t.Fatalf("%s: %v", expression, err)
	}
	return v
}

// open shows the sheet of a result on a screen of that size.
func (b *tab) open(t *testing.T, f *report.File, width, height int64, media string) {
	t.Helper()
	path := filepath.Join(t.TempDir(), Name)
	if err := os.WriteFile(path, written(t, f), 0o600); err != nil {
		t.Fatal(err)
	}
	if _, err := chromedp.Call(b.ctx, emulation.SetEmulatedMedia, emulation.SetEmulatedMediaParams{Media: media}); err != nil {
		t.Fatal(err)
	}
	b.do(t, chromedp.EmulateViewport(width, height), chromedp.Navigate("file://"+filepath.ToSlash(path)))
	b.run(t, look)
	if media == "print" {
		b.run(t, `window.dispatchEvent(new Event("beforeprint"))`)
	}
}

// none fails the test if a list is not empty.
func none(t *testing.T, what string, list []string) {
	t.Helper()
	if len(list) > 0 {
		t.Errorf("%s: %q", what, list)
	}
}

type shown struct {
	Texts                                map[string]string
	Ground, State, Status, Note, Readout string
	Ghost                                int
}

func cardOf(t *testing.T, b *tab, i int) shown {
	t.Helper()
	return ask[shown](t, b, fmt.Sprintf("look.card(%d)", i))
}

func TestInBrowser(t *testing.T) {
	b := newTab(t)
	t.Run("sizes", func(t *testing.T) { testSizes(t, b) })
	t.Run("target", func(t *testing.T) { testTarget(t, b) })
	t.Run("keyboard", func(t *testing.T) { testKeyboard(t, b) })
	t.Run("layers", func(t *testing.T) { testLayers(t, b) })
	t.Run("paper", func(t *testing.T) { testPaper(t, b) })
	t.Run("stillness", func(t *testing.T) { testStillness(t, b) })
}

// At every size: no two texts overlap, none is cut off, all can be read, and nothing moves when the target does.
func testSizes(t *testing.T, b *tab) {
	for _, name := range sample.Names {
		f := sample.Result(t, name)
		for _, size := range []struct {
			name          string
			width, height int64
			media         string
			long          bool
		}{
			{"phone", 390, 844, "screen", false},
			{"small phone", 320, 568, "screen", true},
			{"tablet", 820, 1180, "screen", true},
			{"laptop", 1366, 768, "screen", false},
			{"wide screen", 1920, 1080, "screen", true},
			{"A3 landscape", 1512, 1047, "print", false}, // Paper less margins of 10 mm at 96 pixels an inch.
			{"A4 landscape", 1047, 718, "print", true},
			{"A4 portrait", 718, 1047, "print", true},
		} {
			t.Run(name+" on "+size.name, func(t *testing.T) {
				if size.long && os.Getenv("STANDFAST_LONG") == "" {
					t.Skip("only with STANDFAST_LONG=1")
				}
				b.open(t, f, size.width, size.height, size.media)
				d := newModel(f).Data
				for _, stop := range []int{d.Specified, 0, len(d.Stops) - 1} {
					b.run(t, fmt.Sprintf("look.moveTo(%d)", stop))
					none(t, "overlap", ask[[]string](t, b, "look.overlaps()"))
					none(t, "cut off", ask[[]string](t, b, "look.clipped()"))
					none(t, "faint", ask[[]string](t, b, "look.faint()"))
				}
				if n := ask[int](t, b, `document.querySelectorAll(".fs-name").length`); n < len(f.Options) {
					t.Errorf("%d FS labels on %d figures", n, len(f.Options)+1)
				}
				if size.media == "screen" {
					if moved := ask[[]int](t, b, "look.shifts()"); len(moved) > 0 {
						t.Errorf("the page moves at the stops %v", moved)
					}
				}
				b.quiet(t)
			})
		}
	}
}

// The slider moves geometry and numbers to those of a design that was sized; options that cannot get there say why.
func testTarget(t *testing.T, b *tab) {
	f := sample.Result(t, "cutting")
	d := newModel(f).Data
	b.open(t, f, 1366, 768, "screen")
	start := make([]shown, len(f.Options))
	for i := range start {
		start[i] = cardOf(t, b, i)
	}
	moved := 0
	for stop := range d.Stops {
		b.run(t, fmt.Sprintf("look.moveTo(%d)", stop))
		for i := range d.Options {
			want := d.Options[i].Stops[stop]
			w := &d.Existing
			if want.Design >= 0 {
				w = &d.Options[i].Designs[want.Design]
			}
			got := cardOf(t, b, i)
			for _, key := range []string{"dims", "fs", "earth-m", "earth", "cut", "fill", "import", "dispose", "cost", "land", "change"} {
				if got.Texts[key] != w.Texts[key] {
					t.Errorf("stop %d, %s: %s is %q, want %q", stop, f.Options[i].Name, key, got.Texts[key], w.Texts[key])
				}
			}
			if got.State != want.State || got.Status != want.Status || got.Note != want.Note {
				t.Errorf("stop %d, %s: %q %q %q, want %+v", stop, f.Options[i].Name, got.State, got.Status, got.Note, want)
			}
			if want.State == stateShort && want.Note == "" {
				t.Errorf("stop %d, %s: greyed out without a reason", stop, f.Options[i].Name)
			}
			if other := w.Ground != d.Options[i].Designs[0].Ground; other != (got.Ground != start[i].Ground) {
				t.Errorf("stop %d, %s: another ground %v, drawn as another %v", stop, f.Options[i].Name, other, !other)
			} else if other {
				moved++
			}
		}
		for r := range d.Rows {
			want := markWords[d.Options[0].Stops[stop].Marks[r]]
			if got := ask[string](t, b, fmt.Sprintf("look.cell(%d, 0)", r)); !strings.HasSuffix(got, want) {
				t.Errorf("stop %d: %s reads %q, want %s", stop, d.Rows[r].Name, got, want)
			}
		}
	}
	if moved == 0 {
		t.Error("the slider moved no geometry")
	}
	b.do(t, chromedp.Click(chromedp.CSS("#reset")))
	for i := range start {
		if got := cardOf(t, b, i); got.Ground != start[i].Ground || got.Texts["earth"] != start[i].Texts["earth"] || got.Ghost != 0 {
			t.Errorf("%s is not back as specified", f.Options[i].Name)
		}
	}
	b.quiet(t)
}

// Everything works from the keyboard: the slider, and reading off with the arrow keys; and reading off with a pointer.
func testKeyboard(t *testing.T, b *tab) {
	f := sample.Result(t, "cutting")
	d := newModel(f).Data
	b.open(t, f, 1366, 900, "screen")
	reached := map[string]bool{}
	for range 40 {
		b.do(t, chromedp.KeyEvent(kb.Tab))
		reached[ask[string](t, b, `(e => e.id || e.dataset.figure || e.className || e.tagName)(document.activeElement)`)] = true
	}
	for _, want := range []string{"skip", "existing", "less", "target", "more", "water", "slips", "limits", "check", "0", "enlarge", "scroll"} {
		if !reached[want] {
			t.Errorf("the tab key does not reach %s: %v", want, reached)
		}
	}
	b.run(t, `document.querySelector("#target").focus()`)
	b.do(t, chromedp.KeyEvent(strings.Repeat(kb.ArrowLeft, 5)))
	if got, want := ask[string](t, b, `document.querySelector("#short").textContent`), d.Stops[d.Specified-5].Short; got != want {
		t.Errorf("five steps down: %s, want %s", got, want)
	}
	if got := ask[string](t, b, `document.querySelector("#target").getAttribute("aria-valuetext")`); got != d.Stops[d.Specified-5].Long {
		t.Errorf("the slider says %q", got)
	}
	b.run(t, `document.querySelector('[data-figure="0"]').focus()`)
	b.do(t, chromedp.KeyEvent(kb.Home))
	first := cardOf(t, b, 0).Readout
	b.do(t, chromedp.KeyEvent(kb.ArrowRight))
	second := cardOf(t, b, 0).Readout
	if want := fmt.Sprintf("offset %.2f", d.View.X0); !strings.HasPrefix(first, want) || second == first || !strings.Contains(second, "water") {
		t.Errorf("read off %q, then %q", first, second)
	}
	if got := ask[string](t, b, `document.activeElement.getAttribute("aria-valuetext")`); got != second {
		t.Errorf("a screen reader gets %q", got)
	}
	b.do(t, chromedp.KeyEvent(kb.Escape))
	if got := cardOf(t, b, 0).Readout; got != "" {
		t.Errorf("escape leaves %q", got)
	}
	middle := math.Round((d.View.X0 + d.View.X1) / 2)
	b.do(t, chromedp.KeyEvent(strings.Repeat(kb.PageUp, int(math.Round((60-middle)/5)))))
	if got := cardOf(t, b, 0).Readout; !strings.Contains(got, "cable: no dig") {
		t.Errorf("read off where the cable lies: %q", got)
	}
	b.do(t, chromedp.KeyEvent(kb.Escape))
	testPointer(t, b, &d)
	b.quiet(t)
}

// testPointer points at the crest of the slope as it is and reads off its offset and level.
func testPointer(t *testing.T, b *tab, d *data) {
	t.Helper()
	b.run(t, `document.activeElement.blur(); window.scrollTo(0, 0)`)
	const svg = `document.querySelector('[data-figure="existing"] svg')`
	box := ask[struct{ X, Y, Width, Height float64 }](t, b, svg+`.getBoundingClientRect()`)
	ticks := ask[[][2]float64](t, b, `[...document.querySelectorAll('[data-figure="existing"] .axes text')].filter(e => /^\d+$/.test(e.textContent)).map(e => [Number(e.textContent), e.getAttribute("text-anchor") === "middle" ? Number(e.getAttribute("x")) : NaN])`)
	// Two ticks give the scale: offset 30 lies where the drawing says.
	var x30, perMetre float64
	for i, p := range ticks {
		if i > 0 && ticks[i-1][1] > 0 && p[1] > 0 {
			perMetre = (p[1] - ticks[i-1][1]) / (p[0] - ticks[i-1][0])
			x30 = p[1] + (30-p[0])*perMetre
		}
	}
	if perMetre == 0 {
		t.Fatal("no ticks")
	}
	top := 18 + (d.View.Y1-109)*perMetre
	b.do(t, chromedp.MouseEvent(input.DispatchMouseEventTypeMouseMoved, box.X+x30, box.Y+top))
	got := ask[string](t, b, `document.querySelector(".asis .readout").textContent`)
	var x, y, ground float64
	if _, err := fmt.Sscanf(got, "offset %f, level %f, ground %f", &x, &y, &ground); err != nil {
		t.Fatalf("%q: %v", got, err)
	}
	if math.Abs(x-30) > 0.1 || math.Abs(y-109) > 0.1 || math.Abs(ground-109) > 0.05 {
		t.Errorf("pointing at (30, 109) reads %q", got)
	}
}

// Water and slips can be hidden, and another check shown.
func testLayers(t *testing.T, b *tab) {
	f := sample.Result(t, "cutting")
	b.open(t, f, 1366, 900, "screen")
	const visible = `[...document.querySelectorAll(".%s-layer")].filter(e => getComputedStyle(e).display !== "none").length`
	for _, layer := range []struct{ box, class string }{{"water", "water"}, {"slips", "slip"}, {"limits", "limit"}} {
		count := fmt.Sprintf(visible, layer.class)
		if ask[int](t, b, count) == 0 {
			t.Errorf("%s are not shown", layer.box)
		}
		b.do(t, chromedp.Click(chromedp.CSS("#"+layer.box)))
		if n := ask[int](t, b, count); n != 0 {
			t.Errorf("%s: %d are still shown", layer.box, n)
		}
		b.do(t, chromedp.Click(chromedp.CSS("#"+layer.box)))
	}
	const label = `document.querySelector('[data-figure="existing"] .fs-name').textContent`
	before := ask[string](t, b, label)
	d := newModel(f).Data
	row := slices.IndexFunc(d.Rows, func(r row) bool { return r.Name == "high water" })
	b.run(t, fmt.Sprintf(`{ const c = document.querySelector("#check"); c.value = "%d"; c.dispatchEvent(new Event("change")) }`, row))
	if got, want := ask[string](t, b, label), "FS "+d.Existing.Answers[row].FS; got != want || got == before {
		t.Errorf("another check shows %q, want %q", got, want)
	}
	b.run(t, `document.querySelector(".enlarge").click()`)
	if wide := ask[[]float64](t, b, `[...document.querySelectorAll(".card")].slice(0, 2).map(e => e.clientWidth)`); wide[0] < 2*wide[1] {
		t.Errorf("enlarged to %v", wide)
	}
	none(t, "overlap", ask[[]string](t, b, "look.overlaps()"))
	b.quiet(t)
}
