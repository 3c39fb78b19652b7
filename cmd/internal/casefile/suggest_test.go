package casefile

import (
	"testing"

	"pgregory.net/rapid"
)

func TestNearest(t *testing.T) {
	keys := []string{"cohesion", "friction", "unit_weight", "top_width", "dig", "rightward"}
	cases := []struct{ word, want string }{
		{"frictoin", "friction"},
		{"Friction", "friction"},
		{"unit weight", "unit_weight"},
		{"unit-wieght", "unit_weight"},
		{"right", "rightward"},
		{"digging", "dig"},
		{"dog", "dig"},
		{"di", "dig"},
		{"strength", ""},
		{"", ""},
		{"x", ""},
	}
	for _, c := range cases {
		if got := nearest(c.word, keys); got != c.want {
			t.Errorf("nearest(%q) = %q, want %q", c.word, got, c.want)
		}
	}
}

// slowDistance is the same distance by its definition, without a table.
func slowDistance(a, b []rune) int {
	if len(a) == 0 || len(b) == 0 {
		return len(a) + len(b)
	}
	change := slowDistance(a[1:], b[1:])
	if a[0] != b[0] {
		change++
	}
	d := min(change, slowDistance(a[1:], b)+1, slowDistance(a, b[1:])+1)
	if len(a) > 1 && len(b) > 1 && a[0] == b[1] && a[1] == b[0] {
		d = min(d, slowDistance(a[2:], b[2:])+1)
	}
	return d
}

func TestEditDistanceAgainstItsDefinition(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		letters := rapid.StringOfN(rapid.RuneFrom([]rune("abé")), 0, 6, -1)
		a, b := letters.Draw(t, "a"), letters.Draw(t, "b")
		if got, want := editDistance(a, b), slowDistance([]rune(a), []rune(b)); got != want {
			t.Fatalf("distance of %q and %q is %d, want %d", a, b, got, want)
		}
	})
}

func TestOrList(t *testing.T) {
	for want, words := range map[string][]string{"": nil, "`a`": {"a"}, "`a` or `b`": {"a", "b"}, "`a`, `b` or `c`": {"a", "b", "c"}} {
		if got := orList(words); got != want {
			t.Errorf("%q, want %q", got, want)
		}
	}
}
