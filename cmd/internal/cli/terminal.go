package cli

import (
	"fmt"
	"io"
	"os"
	"strings"
	"sync"
	"time"
	"unicode/utf8"

	"github.com/spf13/cobra"
	"golang.org/x/term"

	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// terminal returns the file behind a stream if it is a terminal.
func terminal(w io.Writer) (*os.File, bool) {
	f, ok := w.(*os.File)
	return f, ok && term.IsTerminal(int(f.Fd()))
}

// widest is the width beyond which text is not spread: longer lines read badly.
const widest = 120

// lookOf returns how text on a stream is laid out: in the width of a terminal, with colours unless the user wants none.
func lookOf(w io.Writer) report.Look {
	f, ok := terminal(w)
	if !ok {
		return report.Look{}
	}
	look := report.Look{Colour: os.Getenv("NO_COLOR") == "" && os.Getenv("TERM") != "dumb"}
	if width, _, err := term.GetSize(int(f.Fd())); err == nil && width > 0 {
		look.Width = min(width, widest)
	}
	return look
}

func printWarnings(c *cobra.Command, warnings []string) {
	for _, w := range warnings {
		fmt.Fprintf(c.ErrOrStderr(), "standfast: warning: %s\n", w)
	}
}

// progress shows on a terminal how far a study has come, on one line that is written over. It uses no control codes but the carriage
// return.
type progress struct {
	w       io.Writer // nil: shows nothing.
	mu      sync.Mutex
	start   time.Time
	last    time.Time
	written int
}

// betweenShows is the least time between two lines of progress.
const betweenShows = 100 * time.Millisecond

func newProgress(stderr io.Writer, quiet bool) *progress {
	if _, ok := terminal(stderr); !ok || quiet {
		return &progress{}
	}
	return &progress{w: stderr, start: time.Now()}
}

// show may be called by many goroutines.
func (p *progress) show(s remedies.Progress) {
	if p.w == nil {
		return
	}
	p.mu.Lock()
	defer p.mu.Unlock()
	if time.Since(p.last) < betweenShows {
		return
	}
	p.last = time.Now()
	p.write(progressText(s, p.last.Sub(p.start)))
}

// finished leaves a line behind about an option as soon as it is sized: the tables come when all that is asked beside is known too.
func (p *progress) finished(o *remedies.Option) {
	if p.w == nil {
		return
	}
	p.mu.Lock()
	defer p.mu.Unlock()
	line := fmt.Sprintf("%s: %s", o.Title, o.Status)
	if o.Status == remedies.MeetsTarget {
		line += fmt.Sprintf(", %s m3/m", report.QuantityText(o.Proposal.Quantities.Earthworks()))
	}
	p.write(line)
	fmt.Fprintln(p.w)
	p.written = 0
}

// progressText tells how far a study has come after a time, and how long it will go on if it keeps its pace.
func progressText(s remedies.Progress, elapsed time.Duration) string {
	out := fmt.Sprintf("sizing %s, %d of %d, %.0f %%", s.Option, s.Done+1, s.Total, 100*s.Share)
	const (
		tooSoon   = 2 * time.Second // Before this, and before this share of the work, the pace is not known.
		tooLittle = 0.04
	)
	share := (float64(s.Done) + s.Share) / float64(max(s.Total, 1))
	if elapsed < tooSoon || share < tooLittle || share >= 1 {
		return out
	}
	return out + ", about " + roughly(time.Duration(float64(elapsed)*(1-share)/share)) + " left"
}

// roughly returns a time as people say it: seconds by fives up to a minute and a half, then minutes.
func roughly(d time.Duration) string {
	const (
		step = 5 * time.Second
		most = 90 * time.Second
	)
	if d = (d + step - 1) / step * step; d <= most {
		return fmt.Sprintf("%d s", int(d.Seconds()))
	}
	return fmt.Sprintf("%d min", int((d+time.Minute-1)/time.Minute))
}

// write replaces what stands on the line.
func (p *progress) write(line string) {
	n := utf8.RuneCountInString(line)
	fmt.Fprintf(p.w, "\r%s%s", line, strings.Repeat(" ", max(0, p.written-n)))
	p.written = n
}

// clear leaves the line empty.
func (p *progress) clear() {
	if p.w == nil {
		return
	}
	p.mu.Lock()
	defer p.mu.Unlock()
	p.write("")
	fmt.Fprint(p.w, "\r")
}
