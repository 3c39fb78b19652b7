package drawing

import (
	"math"
	"testing"

	"standfast/lem"
	"standfast/remedies"
)

// TestSlipLineEndsInCrack draws slips that end in a tension crack: from its mouth straight down to the slip, whichever way they move.
func TestSlipLineEndsInCrack(t *testing.T) {
	const radius, crack = 10.0, 2.0
	foot := lem.Point{X: -6, Y: -8} // On the circle about the origin.
	mouth, toe := lem.Point{X: foot.X, Y: foot.Y + crack}, lem.Point{X: 5, Y: -math.Sqrt(75)}
	nodes := []lem.Point{{X: -9, Y: -6}, foot, {X: 0, Y: -10}, toe}
	flip := func(p lem.Point) lem.Point { return lem.Point{X: -p.X, Y: p.Y} }
	for _, mirror := range []bool{false, true} {
		for _, kind := range []lem.SlipKind{lem.Circle, lem.Polyline} {
			o := &remedies.Outcome{From: mouth, To: toe, Crack: crack, Slip: lem.Slip{Kind: kind, Radius: radius, Nodes: nodes}}
			if mirror {
				o.From, o.To = flip(toe), flip(mouth)
				o.Slip.Nodes = nil
				for i := range nodes {
					o.Slip.Nodes = append(o.Slip.Nodes, flip(nodes[len(nodes)-1-i]))
				}
			}
			line := slipLine(o)
			if mirror {
				for i, j := 0, len(line)-1; i < j; i, j = i+1, j-1 {
					line[i], line[j] = line[j], line[i]
				}
				for i := range line {
					line[i] = flip(line[i])
				}
			}
			if line[0] != mouth || math.Hypot(line[1].X-foot.X, line[1].Y-foot.Y) > 1e-9 || math.Hypot(line[len(line)-1].X-toe.X, line[len(line)-1].Y-toe.Y) > 1e-9 {
				t.Errorf("kind %d, mirrored %v: %v", kind, mirror, line)
			}
			for _, p := range line[1:] {
				if p.X < foot.X-1e-9 || kind == lem.Circle && math.Abs(math.Hypot(p.X, p.Y)-radius) > 1e-9 {
					t.Errorf("kind %d, mirrored %v: %v is off the slip", kind, mirror, p)
				}
			}
		}
	}
}
