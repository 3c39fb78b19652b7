package casefile

import (
	"math"
	"strconv"
	"strings"
	"testing"

	"go.yaml.in/yaml/v4"
	"pgregory.net/rapid"
)

func plain(s string) *yaml.Node { return &yaml.Node{Kind: yaml.ScalarNode, Value: s} }

func TestParseNumber(t *testing.T) {
	cases := []struct {
		text       string
		want       float64
		suggestion string // Of the fault; "-" if there is none.
	}{
		{"12", 12, "-"},
		{"-1.5", -1.5, "-"},
		{"+.5", 0.5, "-"},
		{"2.", 2, "-"},
		{"1.25e-3", 0.00125, "-"},
		{"010", 10, "-"}, // not octal
		{".nan", 0, "write the value"},
		{"-.inf", 0, "write the value"},
		{"1,5", 0, "behind a point: 1.5"},
		{"1:2.5", 0, "only the n of 1V:nH: 2.5"},
		{"1V:2.5H", 0, "only the n of 1V:nH: 2.5"},
		{"5 m", 0, "the number alone: 5"},
		{"19kN/m3", 0, "the number alone: 19"},
		{"30°", 0, "the number alone: 30"},
		{"1_000", 0, "write 1000"},
		{"0x10", 0, "the number alone"},
		{"1e999", 0, ""},
		{"five", 0, ""},
	}
	for _, c := range cases {
		t.Run(c.text, func(t *testing.T) {
			got, p := parseNumber(plain(c.text))
			switch {
			case c.suggestion == "-" && (p != nil || got != c.want):
				t.Errorf("read as %g, %+v, want %g", got, p, c.want)
			case c.suggestion != "-" && (p == nil || !strings.Contains(p.suggestion, c.suggestion)):
				t.Errorf("fault %+v, want %q in its suggestion", p, c.suggestion)
			}
		})
	}
}

func TestParseShare(t *testing.T) {
	for text, want := range map[string]float64{"50%": 0.5, "0%": 0, "100 %": 1, "0.25": 0.25, "12.5%": 0.125} {
		if got, p := parseShare(plain(text)); p != nil || got != want {
			t.Errorf("%s read as %g, %+v", text, got, p)
		}
	}
	for _, text := range []string{"101%", "-1%", "1.5", "half", "%", ".nan"} {
		if _, p := parseShare(plain(text)); p == nil {
			t.Errorf("%s is accepted", text)
		}
	}
}

// TestSizesRoundTrip writes random sizes as a file does and reads them back.
func TestSizesRoundTrip(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		lo := float64(rapid.IntRange(-1000, 1000).Draw(t, "lo")) / 100
		step := float64(rapid.IntRange(1, 100).Draw(t, "step")) / 100
		n := rapid.IntRange(1, maxSizes-1).Draw(t, "n")
		want := size{lo, round9(lo + float64(n)*step), step}
		got, p := parseSize(plain(sizeText(want)))
		if p != nil || got != want {
			t.Fatalf("%s read as %+v, %+v", sizeText(want), got, p)
		}
		if got.count() != float64(n+1) || math.Abs(got.last()-want.max) > 1e-9 {
			t.Fatalf("%s has %g values up to %g, want %d", sizeText(want), got.count(), got.last(), n+1)
		}
	})
}

func TestNumberNodesKeepEveryDigit(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		want := rapid.Float64Range(-numberLimit, numberLimit).Draw(t, "x")
		text := numberNode(want).Value
		got, p := parseNumber(plain(text))
		if p != nil || got != want {
			t.Fatalf("%s written as %s and read as %g, %+v", strconv.FormatFloat(want, 'g', -1, 64), text, got, p)
		}
	})
}
