package drawing

import (
	"errors"
	"strings"
	"testing"

	"standfast/lem"
	"standfast/remedies"
)

// loaded returns a slip of the cutting with its influence line, by the engine.
func loaded(t *testing.T, slip lem.Slip, method lem.Method) (*remedies.Outcome, *lem.Influence) {
	t.Helper()
	j := cutting()
	sit := lem.Situation{Water: lem.Water{Line: j.Waters[0].Line}}
	var m lem.Model
	if err := m.Compile(&j.Section, &sit); err != nil {
		t.Fatal(err)
	}
	o := lem.Setting{Method: method}
	d, err := m.Detail(&slip, o)
	if err != nil {
		t.Fatal(err)
	}
	v, err := m.Influence(&slip, o, 10)
	if err != nil {
		t.Fatal(err)
	}
	return &remedies.Outcome{
		Check: remedies.Check{Name: "winter water", Section: &j.Section, Situation: sit, Required: 1.25},
		FS:    d.Result.F, Method: method, Slip: slip, From: d.Result.From, To: d.Result.To,
	}, &v
}

func TestInfluenceLabels(t *testing.T) {
	slips := map[string]lem.Slip{
		"circle":   {Centre: lem.Point{X: 42, Y: 70}, Radius: 22},
		"polyline": {Kind: lem.Polyline, Nodes: []lem.Point{{X: 22, Y: 58.1}, {X: 27, Y: 53}, {X: 36, Y: 49}, {X: 44, Y: 48.4}, {X: 48, Y: 50}}},
	}
	for name, slip := range slips {
		t.Run(name, func(t *testing.T) {
			o, v := loaded(t, slip, lem.Spencer)
			f, err := Influence("Harrow Lane cutting, invented", o, v, Options{})
			if err != nil {
				t.Fatal(err)
			}
			checkLabels(t, f)
			keep(t, "influence-"+name, f)
			var all []string
			for _, l := range f.Labels {
				all = append(all, l.Text)
			}
			text := strings.Join(all, "\n")
			for _, want := range []string{"neutral point, drained", "neutral point, undrained", "by formula", "by the method", "FS " + fsDown(o.FS)} {
				if !strings.Contains(strings.ReplaceAll(text, "\n", " "), want) {
					t.Errorf("%q is not on the drawing", want)
				}
			}
		})
	}
	if _, err := Influence("", &remedies.Outcome{}, &lem.Influence{}, Options{}); !errors.Is(err, ErrNothingToDraw) {
		t.Errorf("nothing to draw gives %v", err)
	}
}
