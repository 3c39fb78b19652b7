package casefile

import (
	"flag"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
)

// update rewrites the golden files: `go test ./cmd/internal/casefile -update`. Read the difference before committing it.
var update = flag.Bool("update", false, "rewrite golden files and generated parts of the docs")

// root is the top of the project.
const root = "../../.."

// golden compares got with the file at path, or rewrites the file.
func golden(t *testing.T, path, got string) {
	t.Helper()
	if *update {
		if err := os.WriteFile(path, []byte(got), 0o600); err != nil {
			t.Fatal(err)
		}
		return
	}
	want, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	if diff := cmp.Diff(string(want), got); diff != "" {
		t.Errorf("%s differs (-want +got):\n%s", path, diff)
	}
}

// boundRule matches messages that tell what would be right themselves: by the bounds of a value.
var boundRule = regexp.MustCompile(`it must be |at most \d+ |lies beyond the ground, which runs from `)

// placeless matches messages of what stands nowhere in the file.
var placeless = regexp.MustCompile("^the key `.*` is missing$|^the file is empty$")

// TestFaultyCases reads each faulty case and compares all of its messages with those that were read and approved.
func TestFaultyCases(t *testing.T) {
	files, err := filepath.Glob(root + "/testdata/cases/*.yaml")
	if err != nil || len(files) == 0 {
		t.Fatal("no faulty cases found", err)
	}
	for _, path := range files {
		name := filepath.Base(path)
		t.Run(name, func(t *testing.T) {
			src, err := os.ReadFile(path)
			if err != nil {
				t.Fatal(err)
			}
			_, err = Parse(name, src)
			if err == nil {
				t.Fatal("no fault found")
			}
			for _, f := range Faults(err) {
				if (f.Line == 0) != (f.Path == "" && placeless.MatchString(f.Message)) || (f.LineText == "") != (f.Line == 0) {
					t.Errorf("no line: %v", f)
				}
				if f.Suggestion == "" && !boundRule.MatchString(f.Message) {
					t.Errorf("it does not say what would be right: %v", f)
				}
			}
			golden(t, strings.TrimSuffix(path, ".yaml")+".txt", err.Error()+"\n")
		})
	}
}
