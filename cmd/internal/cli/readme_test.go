package cli

import (
	"bytes"
	"context"
	"os"
	"path/filepath"
	"strings"
	"testing"
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
