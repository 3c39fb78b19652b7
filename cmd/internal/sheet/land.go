package sheet

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"standfast/cmd/internal/report"
)

// extent returns from where to where works reach in plan, and whether there are any: where the ground has changed, bodies were placed, or
// drains lie.
func (b *builder) extent(ground []report.Point, bodies []report.Body, waters map[string]report.Water, drains bool) (x0, x1 float64, any bool) {
	x0, x1 = math.Inf(1), math.Inf(-1)
	see := func(x float64) { x0, x1, any = min(x0, x), max(x1, x), true }
	before := b.f.Existing.Section.Ground
	xs := breaks(ground, before)
	for i := 1; i < len(xs); i++ {
		if changed(ground, before, xs[i-1]) || changed(ground, before, xs[i]) {
			see(xs[i-1])
			see(xs[i])
		}
	}
	for _, body := range bodies[min(len(bodies), len(b.f.Existing.Section.Placed)):] {
		for _, p := range body.Outline {
			see(p[0])
		}
	}
	for _, w := range waters {
		if drains && w.Drains != nil && len(w.Drains.Invert) > 1 {
			see(w.Drains.Invert[0][0])
			see(w.Drains.Invert[len(w.Drains.Invert)-1][0])
		}
	}
	return x0, x1, any
}

// thinnest is the change of level below which ground counts as untouched, m.
const thinnest = 1e-3

// breaks returns where two lines bend, ascending.
func breaks(p, q []report.Point) []float64 {
	var xs []float64
	for _, line := range [][]report.Point{p, q} {
		for _, v := range line {
			xs = append(xs, v[0])
		}
	}
	slices.Sort(xs)
	return slices.Compact(xs)
}

func changed(p, q []report.Point, x float64) bool {
	return math.Abs(levelAt(p, x)-levelAt(q, x)) >= thinnest
}

// levelAt returns the level of a line at x; it is level beyond its ends. At a vertical face it returns the later point's.
func levelAt(line []report.Point, x float64) float64 {
	if x < line[0][0] {
		return line[0][1]
	}
	for i := len(line) - 1; i >= 0; i-- {
		p := line[i]
		if p[0] > x {
			continue
		}
		if i+1 == len(line) || p[0] == x {
			return p[1]
		}
		n := line[i+1]
		return p[1] + (n[1]-p[1])*(x-p[0])/(n[0]-p[0])
	}
	return line[0][1]
}

// landText says how far works reach beyond crest and toe.
func (b *builder) landText(ground []report.Point, bodies []report.Body, waters map[string]report.Water, drains bool) string {
	x0, x1, any := b.extent(ground, bodies, waters, drains)
	crest, toe := b.f.Case.Crest[0], b.f.Case.Toe[0]
	if !any {
		return "none"
	}
	behind, beyond := crest-x0, x1-toe
	if crest > toe {
		behind, beyond = x1-crest, toe-x0
	}
	var parts []string
	for _, p := range []struct {
		width float64
		where string
	}{{behind, "behind the crest"}, {beyond, "beyond the toe"}} {
		if p.width >= thinnest {
			parts = append(parts, fmt.Sprintf("%s m %s (%s m²)", report.QuantityText(p.width), p.where, report.TotalText(p.width*b.f.Case.Length)))
		}
	}
	if len(parts) == 0 {
		return "none beyond crest and toe"
	}
	return strings.Join(parts, ", ")
}
