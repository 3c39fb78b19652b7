package lem

import (
	"math"
	"slices"
	"sort"
)

// Zones of the ground, as shares of its width.
const (
	longestZone  = 1.0 / 14 // A longer stretch is split.
	shortestZone = 1.0 / 200
)

// zones splits the ground into stretches in which slips may daylight: at every bend of the ground, so that the face, the top and the toe of
// a fill have zones of their own, and long stretches into equal parts.
func (m *Model) zones() []Range {
	width := m.right - m.left
	var zs []Range
	add := func(a, b float64) {
		n := max(1, int(math.Ceil((b-a)/(longestZone*width)-1e-9)))
		for i := range n {
			zs = append(zs, Range{a + (b-a)*float64(i)/float64(n), a + (b-a)*float64(i+1)/float64(n)})
		}
	}
	from, slope, begun := 0.0, 0.0, false
	for i := range m.cols {
		c := &m.cols[i]
		if c.x1 <= m.left || c.x0 >= m.right {
			continue
		}
		if !begun {
			from, slope, begun = m.left, c.ground.b, true
			continue
		}
		if math.Abs(c.ground.b-slope) > 1e-6 && c.x0-from > shortestZone*width {
			add(from, c.x0)
			from, slope = c.x0, c.ground.b
		} else if c.x0-from <= shortestZone*width {
			slope = c.ground.b
		}
	}
	if m.right-from > 0 {
		add(from, m.right)
	}
	return splitAt(zs, m.jumps)
}

// splitAt splits zones at the given x, ascending.
func splitAt(zs []Range, xs []float64) []Range {
	for _, x := range xs {
		for i, z := range zs {
			if z.From < x && x < z.To {
				zs = slices.Insert(zs, i+1, Range{x, z.To})
				zs[i].To = x
				break
			}
		}
	}
	return zs
}

// apart reports whether F jumps between two neighbouring zones, so that neither tells anything about the other.
func (s *searcher) apart(a, b int) bool {
	i := max(a, b)
	return a != b && i < len(s.zones) && slices.Contains(s.m.jumps, s.zones[i].From)
}

// zoneOf returns the zone that holds x, the outermost ones beyond the ends.
func (s *searcher) zoneOf(x float64) int {
	i := sort.Search(len(s.zones), func(k int) bool { return s.zones[k].To > x })
	return min(i, len(s.zones)-1)
}

// sequence is a low-discrepancy sequence in three dimensions: multiples of the inverse powers of the root of g^4 = g + 1 (the generalised
// golden ratio), modulo 1, shifted by the seed.
type sequence struct{ shift vector }

var sequenceStep = func() vector {
	const g = 1.22074408460575947536
	return vector{1 / g, 1 / (g * g), 1 / (g * g * g)}
}()

func sequenceOf(seed uint64) sequence {
	var q sequence
	h := seed
	for i := range q.shift { // splitmix64 (Steele, Lea and Flood 2014).
		h += 0x9E3779B97F4A7C15
		z := h
		z = (z ^ (z >> 30)) * 0xBF58476D1CE4E5B9
		z = (z ^ (z >> 27)) * 0x94D049BB133111EB
		q.shift[i] = float64((z^(z>>31))>>11) / (1 << 53)
	}
	return q
}

func (q sequence) at(k int) vector {
	var v vector
	for i := range v {
		t := q.shift[i] + float64(k)*sequenceStep[i]
		v[i] = t - math.Floor(t)
	}
	return v
}

// sequence4 is the like of sequence in four dimensions: of the root of g^5 = g + 1.
type sequence4 struct{ shift [4]float64 }

var sequence4Step = func() [4]float64 {
	const g = 1.16730397826141868425
	return [4]float64{1 / g, 1 / (g * g), 1 / (g * g * g), 1 / (g * g * g * g)}
}()

func sequence4Of(seed uint64) sequence4 {
	a, b := sequenceOf(seed), sequenceOf(^seed)
	return sequence4{[4]float64{a.shift[0], a.shift[1], a.shift[2], b.shift[0]}}
}

func (q sequence4) at(k int) [4]float64 {
	var v [4]float64
	for i := range v {
		t := q.shift[i] + float64(k)*sequence4Step[i]
		v[i] = t - math.Floor(t)
	}
	return v
}
