package lem

import (
	"flag"
	"os"
	"testing"
)

// TestMain fixes the seed of the property tests, so that a run of the tests says the same twice; -rapid.seed=0 draws afresh.
func TestMain(m *testing.M) {
	if f := flag.Lookup("rapid.seed"); f != nil {
		if err := f.Value.Set("20240611"); err != nil {
			panic(err)
		}
	}
	os.Exit(m.Run())
}
