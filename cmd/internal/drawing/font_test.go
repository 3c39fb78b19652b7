package drawing

import (
	"math"
	"strings"
	"testing"
)

// TestWidth checks advances against the published ones of Arial, which Liberation Sans shares (in 2048ths of the type size).
func TestWidth(t *testing.T) {
	tests := []struct {
		name, s string
		want    float64
		source  string
	}{
		{"digits", "0123456789", 10 * 1139, "Arial, recalled from memory"},
		{"wide and narrow", "mi", 1706 + 455, "Arial, recalled from memory"},
		{"blank", " ", 569, "Arial, recalled from memory"},
	}
	for _, c := range tests {
		t.Run(c.name, func(t *testing.T) {
			if got := (face{2048, false}).width(c.s); math.Abs(got-c.want) > 2 {
				t.Errorf("%q is %g wide, want %g (%s)", c.s, got, c.want, c.source)
			}
		})
	}
}

func TestWrap(t *testing.T) {
	f := face{10, false}
	tests := []struct {
		name, s string
		width   float64
		lines   int
		want    string
	}{
		{"short", "one two", 100, 3, "one two"},
		{"broken at blanks", "weathered clay", 50, 3, "weathered|clay"},
		{"kept together", "friction 23\u00a0deg", 50, 3, "friction|23\u00a0deg"},
		{"cut short", "one two three four five", 30, 2, "one|two…"},
		{"a word too long", "abcdefghijklmnopqrstuvw xyz", 40, 3, "abcde…|xyz"},
		{"nothing", "", 40, 3, ""},
	}
	for _, c := range tests {
		t.Run(c.name, func(t *testing.T) {
			got := f.wrap(c.s, c.width, c.lines)
			if s := strings.Join(got, "|"); s != c.want {
				t.Errorf("got %q, want %q", s, c.want)
			}
			for _, l := range got {
				if f.width(l) > c.width {
					t.Errorf("%q is wider than %g", l, c.width)
				}
			}
		})
	}
}

func TestClean(t *testing.T) {
	if got := clean("φ′ in\tŁódź\n\x00\xff\U0001f600\u00a0γ"); got != "φ′ in Łódź  ??\u00a0γ" {
		t.Errorf("got %q", got)
	}
}
