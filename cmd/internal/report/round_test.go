package report

import (
	"math"
	"math/big"
	"testing"

	"pgregory.net/rapid"
)

func TestRounding(t *testing.T) {
	nan, inf := Number(math.NaN()), Number(math.Inf(1))
	for _, c := range []struct {
		name, got, want string
	}{
		{"fs just short of its target", FactorText(1.2999999), "1.299"},
		{"fs one bit short of its target", FactorText(Number(math.Nextafter(1.3, 0))), "1.299"},
		{"fs at its target", FactorText(1.3), "1.300"},
		{"fs whose binary value lies below its decimals", FactorText(1.001), "1.001"},
		{"fs half way", FactorText(1.0005), "1.000"},
		{"fs below one", FactorText(0.98765), "0.987"},
		{"fs unknown", FactorText(nan), "-"},
		{"fs infinite", FactorText(inf), "-"},
		{"fs negative", FactorText(-0.0001), "-0.001"},
		{"required", RequiredText(1.3), "1.300"},
		{"required as a ratio", RequiredText(1.2 * 1.04301), "1.252"},
		{"required unknown", RequiredText(nan), "-"},
		{"quantity", QuantityText(13.001), "13.01"},
		{"quantity exact", QuantityText(13.48), "13.48"},
		{"quantity with the dust of a sum", QuantityText(0.1 + 0.2), "0.30"},
		{"quantity carried over", QuantityText(9.995), "10.00"},
		{"quantity carried far", QuantityText(99.991), "100.00"},
		{"quantity nothing", QuantityText(0), "0.00"},
		{"quantity tiny", QuantityText(1e-7), "0.01"},
		{"quantity unknown", QuantityText(math.NaN()), "-"},
		{"total", TotalText(1078.2), "1,079"},
		{"total with the dust of a sum", TotalText(1078.0000000000002), "1,078"},
		{"total large", TotalText(1234567), "1,234,567"},
		{"total small", TotalText(12), "12"},
		{"total hundreds", TotalText(999.5), "1,000"},
		{"total negative", TotalText(-123), "-123"},
		{"size of a lattice", SizeText(1.5000000000000002), "1.5"},
		{"size whole", SizeText(4), "4"},
		{"size fine", SizeText(2.085), "2.085"},
		{"permeability", SizeText(1.25e-6), "1.25e-6"},
		{"nothing", SizeText(0), "0"},
	} {
		t.Run(c.name, func(t *testing.T) {
			if c.got != c.want {
				t.Errorf("got %s, want %s", c.got, c.want)
			}
		})
	}
}

// Whatever the number, what is shown errs to the safe side and by less than a unit of the last digit.
func TestRoundingIsSafe(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		v := rapid.Float64Range(-1e6, 1e6).Draw(t, "v")
		decimals := rapid.IntRange(0, 4).Draw(t, "decimals")
		unit := math.Pow(10, -float64(decimals))
		const dust = 1e-9 // The shortest decimals stand for v within a part in 1e16.
		down, up := number(t, floorText(v, decimals)), number(t, ceilText(v, decimals))
		if down > v+dust || v-down >= unit+dust {
			t.Fatalf("%v down to %v", v, down)
		}
		if up < v-dust || up-v >= unit+dust {
			t.Fatalf("%v up to %v", v, up)
		}
	})
}

func number(t *rapid.T, s string) float64 {
	r, ok := new(big.Rat).SetString(s)
	if !ok {
		t.Fatalf("%q is not a number", s)
	}
	f, _ := r.Float64()
	return f
}

// TestCapital checks that names of the user's own get a capital in any alphabet and stay whole.
func TestCapital(t *testing.T) {
	for of, want := range map[string]string{"": "", "toe berm": "Toe berm", "überhöhung": "Überhöhung", "насыпь": "Насыпь", "2 m cut": "2 m cut", "岸": "岸"} {
		if got := Capital(of); got != want {
			t.Errorf("%q becomes %q, want %q", of, got, want)
		}
	}
}
