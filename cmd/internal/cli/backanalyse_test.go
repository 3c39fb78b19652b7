package cli

import (
	"bytes"
	"context"
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"testing"

	"standfast/cmd/internal/report"
)

// backanalysed runs `backanalyse --json` and returns what it prints.
func backanalysed(t *testing.T, args ...string) *report.BackFile {
	t.Helper()
	var out, errs bytes.Buffer
	if code := run(context.Background(), append([]string{"backanalyse", "--json", "--out", t.TempDir()}, args...), nil, &out, &errs); code != 0 {
		t.Fatalf("%v: exit code %d: %s", args, code, &errs)
	}
	var f report.BackFile
	if err := json.Unmarshal(out.Bytes(), &f); err != nil {
		t.Fatal(err)
	}
	return &f
}

// TestBackanalysedCases: every case that is written back gives the observed slip the FS that it was written for, whatever was looked for.
func TestBackanalysedCases(t *testing.T) {
	const six = 2e-5 // Strengths are written with six digits.
	path := filepath.Join(featureCases, "observed.yaml")
	for _, find := range []string{"strength", "friction", "cu", "ru"} {
		for _, method := range []string{"spencer", "morgenstern-price"} {
			folder := t.TempDir()
			f := backanalysed(t, path, "--find", find, "--method", method, "--write", folder)
			if f.Soil != "clay" || f.Situation != "wet season" || len(f.Curve) < 10 {
				t.Errorf("%s: soil %s, situation %s, %d points", find, f.Soil, f.Situation, len(f.Curve))
			}
			for name, p := range map[string]report.BackPoint{"low": f.Low, "middle": f.Middle, "high": f.High} {
				args := []string{filepath.Join(folder, "observed-"+name+".yaml"), "--method", method}
				if find == "cu" { // What a case says of cu counts in an undrained situation only.
					src, err := os.ReadFile(args[0])
					if err != nil {
						t.Fatal(err)
					}
					src = bytes.Replace(src, []byte("wet season, water: wet,"), []byte("wet season, water: wet, strength: {clay: undrained},"), 1)
					if err := os.WriteFile(args[0], src, 0o644); err != nil {
						t.Fatal(err)
					}
				}
				again := backanalysed(t, args...)
				if math.Abs(float64(again.AsGiven-p.FS)) > six {
					t.Errorf("%s by %s, %s: FS %.6f in the case written, %.6f in the analysis", find, method, name, float64(again.AsGiven), float64(p.FS))
				}
			}
		}
	}
}
