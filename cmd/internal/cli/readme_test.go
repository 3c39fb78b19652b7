package cli

import (
	"bytes"
	"context"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"standfast/cmd/internal/drawing"
	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// elision stands in the README's session for lines left out.
const elision = "[...]"

// TestReadmeSession replays the terminal session of the README on a copy of the demo: what a newcomer reads there is what comes.
func TestReadmeSession(t *testing.T) {
	root := filepath.Join("..", "..", "..")
	readme, err := os.ReadFile(filepath.Join(root, "README.md"))
	if err != nil {
		t.Fatal(err)
	}
	_, rest, ok := strings.Cut(string(readme), "```console\n$ go run ./cmd/standfast ")
	session, _, closed := strings.Cut(rest, "\n```")
	if !ok || !closed {
		t.Fatal("the README has no terminal session")
	}
	command, want, _ := strings.Cut(session, "\n")
	args := strings.Fields(command)
	demo, err := os.ReadFile(filepath.Join(root, filepath.FromSlash(args[1])))
	if err != nil {
		t.Fatal(err)
	}
	dir := t.TempDir()
	t.Chdir(dir)
	if err := os.MkdirAll(filepath.Dir(args[1]), 0o755); err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(args[1], demo, 0o644); err != nil {
		t.Fatal(err)
	}
	var stdout, stderr bytes.Buffer
	if code := run(context.Background(), args, nil, &stdout, &stderr); code != exitOK {
		t.Fatalf("exit code %d: %s", code, &stderr)
	}
	labelsHaveRoom(t, filepath.Join(dir, caseName(args[1])+"-works"))
	at := 0
	got := strings.Split(strings.TrimRight(stdout.String(), "\n"), "\n")
	skipping := false
	for n, line := range strings.Split(want, "\n") {
		if line == elision {
			skipping = true
			continue
		}
		for skipping && at < len(got) && strings.TrimRight(got[at], " ") != line {
			at++
		}
		if at >= len(got) || strings.TrimRight(got[at], " ") != line {
			t.Fatalf("session line %d: the README has\n%s\nThe program printed:\n%s", n+2, line, stdout.String())
		}
		at, skipping = at+1, false
	}
	if at < len(got) && !skipping {
		t.Fatalf("the session ends before the program does, which goes on:\n%s", strings.Join(got[at:], "\n"))
	}
}

// labelsHaveRoom checks that no two labels of any drawing of a finished comparison overlap, and that none leaves its page.
func labelsHaveRoom(t *testing.T, folder string) {
	t.Helper()
	file, err := report.Read(filepath.Join(folder, resultName))
	if err != nil {
		t.Fatal(err)
	}
	result, err := report.Rebuild(file)
	if err != nil {
		t.Fatal(err)
	}
	options := append([]remedies.Option{result.Existing}, result.Options...)
	for i := range options {
		f, err := drawing.Section(result.Job, &options[i], drawing.Options{})
		if err != nil {
			t.Fatal(err)
		}
		figureHasRoom(t, options[i].Name, f)
	}
	f, err := drawing.Tradeoff(result.Job.Title, result.Options, drawing.Options{})
	if err != nil {
		t.Fatal(err)
	}
	figureHasRoom(t, "trade-off", f)
}

func figureHasRoom(t *testing.T, name string, f *drawing.Figure) {
	t.Helper()
	if len(f.Labels) < 10 {
		t.Errorf("%s: %d labels only", name, len(f.Labels))
	}
	for i, a := range f.Labels {
		if !a.Box.Within(f.Page()) {
			t.Errorf("%s: %q leaves the page", name, a.Text)
		}
		for _, b := range f.Labels[:i] {
			if a.Box.Overlaps(b.Box) {
				t.Errorf("%s: %q and %q overlap", name, a.Text, b.Text)
			}
		}
	}
}

// TestDrawingsOfTheEmbankment looks at the labels of the other demo's drawings.
func TestDrawingsOfTheEmbankment(t *testing.T) {
	if os.Getenv("STANDFAST_LONG") == "" {
		t.Skip("STANDFAST_LONG=1 sizes the embankment demo for it")
	}
	out := filepath.Join(t.TempDir(), "works")
	if code := compareTo(t.Context(), t, filepath.Join(demoFolder, "embankment.yaml"), out); code != exitOK {
		t.Fatalf("exit code %d", code)
	}
	labelsHaveRoom(t, out)
}
