package casefile

import (
	"os"
	"path/filepath"
	"testing"
)

// FuzzParse checks that no file makes the reader panic, that every fault has a message, and that what is read can be written and read
// again.
func FuzzParse(f *testing.F) {
	for _, glob := range []string{root + "/testdata/demo/*.yaml", root + "/testdata/cases/*.yaml", "starter.yaml"} {
		files, err := filepath.Glob(glob)
		if err != nil || len(files) == 0 {
			f.Fatalf("no seeds at %s: %v", glob, err)
		}
		for _, path := range files {
			src, err := os.ReadFile(path)
			if err != nil {
				f.Fatal(err)
			}
			f.Add(src)
		}
	}
	f.Add([]byte(small))
	f.Add([]byte("? [a]\n: {b: *c}\n"))
	f.Fuzz(func(t *testing.T, src []byte) {
		c, err := Parse("fuzz.yaml", src)
		if err != nil {
			for _, fault := range Faults(err) {
				if fault.Message == "" || fault.Line < 0 {
					t.Errorf("a fault without words or place: %+v", fault)
				}
			}
			return
		}
		if c.Job == nil || len(c.Job.Section.Strata) == 0 || len(c.Job.Situations) == 0 {
			t.Errorf("read without a fault, but not whole: %+v", c)
		}
	})
}
