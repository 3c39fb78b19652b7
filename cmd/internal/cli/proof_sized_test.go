package cli

import (
	"bytes"
	"io"
	"os"
	"strings"
	"testing"

	"standfast/cmd/internal/report"
	"standfast/remedies"
)

// sized sizes a case into a folder and returns what stands in its files. The required FS are those of the case, or the targets.
func sized(t *testing.T, text, out string, whole bool, targets []string) (*report.File, *report.Witnesses) {
	t.Helper()
	path := out + ".yaml"
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
	if whole {
		var stdout, stderr bytes.Buffer
		if code := run(t.Context(), []string{"compare", path, "--out", out, "--jobs", "1"}, strings.NewReader(""), &stdout, &stderr); code != exitOK && code != exitNothingMeets {
			t.Fatalf("compare ends with %d: %s", code, stderr.String())
		}
	} else {
		sizePlainly(t, path, out, targets)
	}
	_, f, err := readResult(out)
	if err != nil {
		t.Fatal(err)
	}
	w, err := readWitnesses(out)
	if err != nil {
		t.Fatal(err)
	}
	return f, w
}

// sizePlainly does what compare does but for curves, moved limits, drawings and reports.
func sizePlainly(t *testing.T, path, out string, targets []string) {
	t.Helper()
	read, err := readCase(path)
	if err != nil {
		t.Fatalf("the reader refuses a random case: %v", err)
	}
	if err := applyTargets(read.Job, targets); err != nil {
		t.Fatal(err)
	}
	result, err := remedies.Study(t.Context(), read.Job, remedies.Settings{Workers: 1})
	if err != nil {
		t.Fatal(err)
	}
	file, witnesses := report.New(result, sourceOf(read, nil)), report.NewWitnesses(result, sourceOf(read, nil))
	if err := report.WriteComparison(io.Discard, file, report.Look{}); err != nil {
		t.Fatal(err)
	}
	if err := writeFolder(t.Context(), out, []output{{resultName, file.Encode}, {witnessesName, witnesses.Encode}}); err != nil {
		t.Fatal(err)
	}
}
