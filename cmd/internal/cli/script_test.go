package cli

import (
	"bytes"
	"context"
	"errors"
	"io"
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"
	"time"

	"github.com/rogpeppe/go-internal/testscript"

	"standfast/remedies"
)

func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){"standfast": func() { os.Exit(Main()) }})
}

// TestScripts runs testdata/script; -update is not needed, since the scripts compare no whole outputs. Every script finds the small case
// bank.yaml and the cases of single features, features/*.yaml, in its folder. "rc CODE PROGRAM ARGS" runs a program that must end with that exit code.
func TestScripts(t *testing.T) {
	testscript.Run(t, testscript.Params{
		Dir:                 "testdata/script",
		RequireExplicitExec: true,
		RequireUniqueNames:  true,
		Setup: func(e *testscript.Env) error {
			bank, err := os.ReadFile("testdata/bank.yaml")
			if err != nil {
				return err
			}
			return errors.Join(
				os.WriteFile(filepath.Join(e.WorkDir, "bank.yaml"), bank, 0o644),
				os.CopyFS(filepath.Join(e.WorkDir, "features"), os.DirFS(featureCases)),
			)
		},
		Cmds: map[string]func(*testscript.TestScript, bool, []string){"rc": exitsWith, "pause": pause},
	})
}

func exitsWith(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) < 2 {
		ts.Fatalf("usage: rc CODE PROGRAM ARGS")
	}
	want, err := strconv.Atoi(args[0])
	ts.Check(err)
	got := 0
	var exit *exec.ExitError
	switch err := ts.Exec(args[1], args[2:]...); {
	case errors.As(err, &exit):
		got = exit.ExitCode()
	case err != nil:
		ts.Fatalf("%v", err)
	}
	if got != want {
		ts.Fatalf("%s ended with exit code %d, want %d", strings.Join(args[1:], " "), got, want)
	}
}

// pause waits as long as its argument says.
func pause(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) != 1 {
		ts.Fatalf("usage: pause DURATION")
	}
	d, err := time.ParseDuration(args[0])
	ts.Check(err)
	time.Sleep(d)
}

// An interrupt at any moment ends with its own exit code and leaves nothing behind.
func TestInterrupted(t *testing.T) {
	bank, err := filepath.Abs("testdata/bank.yaml")
	if err != nil {
		t.Fatal(err)
	}
	for _, after := range []time.Duration{0, 20 * time.Millisecond, 100 * time.Millisecond} {
		t.Run(after.String(), func(t *testing.T) {
			t.Chdir(t.TempDir())
			ctx, cancel := context.WithCancel(t.Context())
			defer cancel()
			if after == 0 {
				cancel()
			} else {
				time.AfterFunc(after, cancel)
			}
			var stdout, stderr bytes.Buffer
			code := run(ctx, []string{"compare", bank}, strings.NewReader(""), &stdout, &stderr)
			left, err := os.ReadDir(".")
			if err != nil {
				t.Fatal(err)
			}
			if code == exitOK { // It was done before the interrupt.
				return
			}
			if code != exitInterrupted || stdout.Len() > 0 || !strings.Contains(stderr.String(), "interrupted") {
				t.Errorf("exit code %d, stdout %q, stderr %q", code, stdout.String(), stderr.String())
			}
			if len(left) > 0 {
				t.Errorf("%s was left behind", left[0].Name())
			}
		})
	}
}

// A stream or disk that takes no more is neither the user's fault nor a result.
func TestCannotWrite(t *testing.T) {
	var stderr bytes.Buffer
	code := run(t.Context(), []string{"assess", "testdata/bank.yaml"}, strings.NewReader(""), full{}, &stderr)
	if code != exitOther || !strings.Contains(stderr.String(), "no space") {
		t.Errorf("exit code %d, stderr %q", code, stderr.String())
	}
}

type full struct{}

func (full) Write([]byte) (int, error) { return 0, errors.New("no space left") }

// A folder that was never finished is not put in place, and what stood there stays.
func TestWriteFolderFails(t *testing.T) {
	t.Chdir(t.TempDir())
	broken := []output{{"result.json", func(io.Writer) error { return nil }}, {"b", func(io.Writer) error { return errors.New("no space left") }}}
	if err := writeFolder(t.Context(), "works", broken); err == nil {
		t.Error("no error")
	}
	left, err := os.ReadDir(".")
	if err != nil || len(left) > 0 {
		t.Errorf("left behind: %v, %v", left, err)
	}
}

func TestFileNames(t *testing.T) {
	options := []remedies.Option{{Name: "berm"}, {Name: "my works: no/1"}, {Name: "Berm"}, {Name: "existing"}, {Name: "berm+trench_drains"}}
	want := []string{"berm", "my-works--no-1", "Berm-2", "existing-2", "berm+trench_drains"}
	if got := fileNames(options); !slices.Equal(got, want) {
		t.Errorf("got %q, want %q", got, want)
	}
}

// Progress writes over its own line, whose end it blanks, and leaves it empty.
func TestProgress(t *testing.T) {
	var b bytes.Buffer
	p := &progress{w: &b, start: time.Now()}
	p.show(remedies.Progress{Option: "berm", Done: 1, Total: 3, Share: 0.5})
	p.last = time.Time{}
	p.show(remedies.Progress{Option: "b", Done: 1, Total: 3})
	p.show(remedies.Progress{Option: "too soon"})
	p.finished(&remedies.Option{Title: "b", Status: remedies.Infeasible})
	p.finished(&remedies.Option{Title: "c", Status: remedies.MeetsTarget, Proposal: &remedies.Proposal{}})
	p.write("more")
	p.clear()
	want := "\rsizing berm, 2 of 3, 50 %\rsizing b, 2 of 3, 0 %    \rb: infeasible        \n\rc: meets target, 0.00 m3/m\n\rmore\r    \r"
	if got := b.String(); got != want {
		t.Errorf("got %q, want %q", got, want)
	}
	if newProgress(&b, false).w != nil {
		t.Error("progress goes into a stream that is no terminal")
	}
}

// Time left is told once the pace is known.
func TestTimeLeft(t *testing.T) {
	for _, c := range []struct {
		name    string
		p       remedies.Progress
		elapsed time.Duration
		want    string
	}{
		{"too soon", remedies.Progress{Option: "berm", Done: 1, Total: 2}, time.Second, "sizing berm, 2 of 2, 0 %"},
		{"too little done", remedies.Progress{Option: "berm", Total: 10, Share: 0.1}, time.Minute, "sizing berm, 1 of 10, 10 %"},
		{"half done", remedies.Progress{Option: "berm", Done: 1, Total: 2}, 31 * time.Second, "sizing berm, 2 of 2, 0 %, about 35 s left"},
		{"minutes", remedies.Progress{Option: "berm", Done: 1, Total: 4, Share: 0}, 100 * time.Second, "sizing berm, 2 of 4, 0 %, about 5 min left"},
		{"done", remedies.Progress{Option: "berm", Done: 2, Total: 2}, time.Minute, "sizing berm, 3 of 2, 0 %"},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := progressText(c.p, c.elapsed); got != c.want {
				t.Errorf("got %q, want %q", got, c.want)
			}
		})
	}
}
