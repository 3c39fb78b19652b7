package report

import "encoding/json"

// Strength tells which soils act drained and which undrained: one word for all of them, or a word for each.
type Strength struct {
	All    string            // "drained" or "undrained"; empty if the soils differ.
	BySoil map[string]string // When the soils differ: the word of each.
}

// The words of a Strength.
const (
	drained   = "drained"
	undrained = "undrained"
)

// MarshalJSON writes the word, or the object of words by soil.
func (s Strength) MarshalJSON() ([]byte, error) {
	if s.BySoil != nil {
		return json.Marshal(s.BySoil)
	}
	return json.Marshal(s.All)
}

// UnmarshalJSON reads either form.
func (s *Strength) UnmarshalJSON(b []byte) error {
	*s = Strength{}
	if len(b) > 0 && b[0] == '{' {
		return json.Unmarshal(b, &s.BySoil)
	}
	return json.Unmarshal(b, &s.All)
}

// Of returns the word of one soil.
func (s Strength) Of(soil string) string {
	if s.BySoil != nil {
		return s.BySoil[soil]
	}
	return s.All
}

// strengthOf names the strengths of the soils; acting[i] is true where soil i acts undrained.
func strengthOf(names []string, acting []bool) Strength {
	n := 0
	by := make(map[string]string, len(names))
	for i, name := range names {
		by[name] = drained
		if i < len(acting) && acting[i] {
			by[name] = undrained
			n++
		}
	}
	switch n {
	case 0:
		return Strength{All: drained}
	case len(names):
		return Strength{All: undrained}
	}
	return Strength{BySoil: by}
}
