// Package sample gives the tests of what is written for people the results of the demo cases, and reads documents as other programs do.
package sample

import (
	"bytes"
	"os"
	"os/exec"
	"path/filepath"
	"runtime"
	"strings"
	"testing"

	"standfast/cmd/internal/report"
)

// Names are the demo cases.
var Names = []string{"cutting", "embankment"}

// Path returns where the result of a demo case is kept: result.json as compare once wrote it for testdata/demo. Fields may have been added since; a
// result of an earlier version must still give everything that is made of it. Make them anew when an output shows something that they lack.
func Path(name string) string {
	_, here, _, _ := runtime.Caller(0) // The tests run where their sources are.
	return filepath.Join(filepath.Dir(here), "testdata", name+".json")
}

// Result reads the result of a demo case, or fails the test.
func Result(t testing.TB, name string) *report.File {
	t.Helper()
	f, err := report.Read(Path(name))
	if err != nil {
		t.Fatal(err)
	}
	return f
}

// PDFText returns the words of a PDF document as a general-purpose reader finds them, parted by single blanks. Without one the test is skipped, or
// fails if STANDFAST_PDF is "required".
func PDFText(t testing.TB, doc []byte) string {
	t.Helper()
	if _, err := exec.LookPath("pdftotext"); err != nil {
		if os.Getenv("STANDFAST_PDF") == "required" {
			t.Fatal("pdftotext is required and not installed")
		}
		t.Skip("pdftotext is not installed")
	}
	c := exec.Command("pdftotext", "-raw", "-enc", "UTF-8", "-", "-")
	c.Stdin = bytes.NewReader(doc)
	out, err := c.Output()
	if err != nil {
		t.Fatal(err)
	}
	return strings.Join(strings.Fields(string(out)), " ")
}

// SameBytes checks that what is written from the result of each demo case is the same every time, also from a result that was itself written and
// read in between, and has so many bytes at most.
func SameBytes(t *testing.T, written func(testing.TB, *report.File) []byte, most int) {
	t.Helper()
	for _, name := range Names {
		f := Result(t, name)
		first := written(t, f)
		var b bytes.Buffer
		if err := f.Encode(&b); err != nil {
			t.Fatal(err)
		}
		again, err := report.Decode(&b)
		if err != nil {
			t.Fatal(err)
		}
		if !bytes.Equal(first, written(t, f)) || !bytes.Equal(first, written(t, again)) {
			t.Errorf("%s: not the same bytes", name)
		}
		if len(first) > most {
			t.Errorf("%s: %d bytes, more than %d", name, len(first), most)
		}
	}
}
