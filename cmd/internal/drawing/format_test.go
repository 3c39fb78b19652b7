package drawing

import (
	"testing"

	"standfast/remedies"
)

func TestRounding(t *testing.T) {
	tests := []struct{ name, got, want string }{
		{"FS that is three decimals already", fsDown(1.305), "1.305"},
		{"FS just below", fsDown(1.2999999999), "1.299"},
		{"FS with more decimals", fsDown(1.2509), "1.250"},
		{"FS of whole number", fsDown(2), "2.000"},
		{"FS of few decimals", fsDown(0.9), "0.900"},
		{"quantity of two decimals", quantityUp(12.9), "12.90"},
		{"quantity with more decimals", quantityUp(12.9001), "12.91"},
		{"quantity with the noise of a sum", quantityUp(0.1 + 0.2), "0.30"},
		{"no quantity", quantityUp(0), "0.00"},
		{"required FS of two decimals", requiredUp(1.3), "1.30"},
		{"required FS that a ratio gives", requiredUp(1.23411), "1.235"},
		{"required FS with the noise of a product", requiredUp(1.1 * 1.1), "1.21"},
		{"number with least decimals", number(2.5, 2), "2.50"},
		{"number keeps what it needs", number(0.125, 2), "0.125"},
		{"number without decimals", number(30, 0), "30"},
		{"name in another alphabet", title("überhöhung"), "Überhöhung"},
		{"name without letters", title(""), ""},
		{"permeability", value(remedies.Value{Name: "drilled_drains.permeability", Unit: "m/s", Value: 1e-6}), "drilled drains permeability 1e-6 m/s"},
	}
	for _, c := range tests {
		t.Run(c.name, func(t *testing.T) {
			if c.got != c.want {
				t.Errorf("got %s, want %s", c.got, c.want)
			}
		})
	}
}
