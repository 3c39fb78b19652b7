package validation

import (
	"math"

	"standfast/lem"
)

// row is a slice as a book prints it, from the toe to the head.
type row struct {
	width, length float64 // m; length 0: width/cos(alpha).
	weight        float64 // kN/m.
	sin           float64 // Of alpha.
	pore          float64 // kPa; 0 if ru is given.
	ru            float64
	soil          int
}

// table is a calculation by slices on an arc.
type table struct {
	soils []lem.Soil
	rows  []row
	arcs  []float64 // By soil: length of the arc that its cohesion acts on, m; nil: on the base of every slice.
}

// solve is F of the table.
func (t table) solve(method lem.Method) answer {
	return func() (float64, error) {
		base := make([]float64, len(t.soils)) // Length of all bases in each soil.
		for _, r := range t.rows {
			base[r.soil] += r.chord()
		}
		var slices []lem.TableSlice
		for _, r := range t.rows {
			soil := &t.soils[r.soil]
			s := lem.TableSlice{
				Width: r.width, Length: r.chord(), Inclination: math.Asin(r.sin), Weight: r.weight, Pore: r.pore + r.ru*r.weight/r.width,
				Cohesion: soil.Cohesion, Friction: soil.Friction,
			}
			if t.arcs != nil {
				s.Arc = r.chord() * t.arcs[r.soil] / base[r.soil]
			}
			slices = append(slices, s)
		}
		f, ok := lem.SolveTable(method, slices)
		if !ok {
			return 0, errNoAnswer
		}
		return f, nil
	}
}

func (r row) chord() float64 {
	if r.length > 0 {
		return r.length
	}
	return r.width / math.Sqrt(1-r.sin*r.sin)
}

func sine(deg float64) float64 { return math.Sin(deg * degree) }

// smith56 is a circle with a pore pressure for every slice; the first may be left dry, as in the printed column.
func smith56(first float64) table {
	return table{
		soils: []lem.Soil{{Cohesion: 12, Friction: 20 * degree}}, arcs: []float64{9.15 * 89 * degree},
		rows: []row{
			{width: 2.35, weight: 42.9, sin: sine(-10), ru: first},
			{width: 2.35, weight: 110.1, sin: sine(4), ru: 0.410},
			{width: 2.35, weight: 149.8, sin: sine(20), ru: 0.376},
			{width: 2.35, weight: 157.9, sin: sine(35), ru: 0.295},
			{width: 2.35, weight: 78.5, sin: sine(57), ru: 0.072},
		},
	}
}

// smith57 is one circle with a uniform pore pressure ratio.
func smith57(ru float64) table {
	t := table{soils: []lem.Soil{{Cohesion: 10, Friction: 35 * degree}}, arcs: []float64{9.15 * 89 * degree}}
	for i, w := range []float64{50.4, 155.2, 201.6, 136.1} {
		t.rows = append(t.rows, row{width: 3.15, weight: w, sin: []float64{0.113, 0.334, 0.559, 0.783}[i], ru: ru})
	}
	return t
}

// smith53 is a circle analysed in total stresses: shallow in one layer, or deep across two.
func smith53(deep bool) table {
	upper := lem.Soil{Cohesion: 20, Friction: 20 * degree}
	if !deep {
		return table{
			soils: []lem.Soil{upper}, arcs: []float64{10.7 * 76 * degree},
			rows: []row{
				{width: 2, weight: 71.4, sin: sine(-5.9)},
				{width: 2, weight: 167.9, sin: sine(14.5)},
				{width: 2, weight: 223.9, sin: sine(31.3)},
				{width: 2, weight: 148.6, sin: sine(45.7)},
			},
		}
	}
	return table{
		soils: []lem.Soil{upper, {Cohesion: 75, Friction: 7 * degree}}, arcs: []float64{9.15 * 45 * degree, 9.15 * 85 * degree},
		rows: []row{
			{width: 3, weight: 71.4, sin: sine(-31), soil: 1},
			{width: 3, weight: 187.2, sin: sine(-10), soil: 1},
			{width: 3, weight: 320.4, sin: sine(9), soil: 1},
			{width: 3, weight: 370.6, sin: sine(30), soil: 1},
			{width: 3, weight: 276.0, sin: sine(54)},
		},
	}
}

// craig92 is an effective stress analysis; W and alpha come from the printed h cos(alpha) and h sin(alpha).
func craig92() table {
	t := table{soils: []lem.Soil{{Cohesion: 10, Friction: 29 * degree}}}
	across := [...]float64{.75, 1.80, 2.70, 3.25, 3.45, 3.10, 1.90, .55}
	along := [...]float64{-.15, -.10, .40, 1.00, 1.75, 2.35, 2.25, .95}
	pore := [...]float64{5.9, 11.8, 16.2, 18.1, 17.1, 11.3, 0, 0}
	length := [...]float64{1.55, 1.50, 1.55, 1.60, 1.70, 1.95, 2.35, 2.15}
	for i := range across {
		h := math.Hypot(across[i], along[i])
		t.rows = append(t.rows, row{width: 1.5, length: length[i], weight: 20 * 1.5 * h, sin: along[i] / h, pore: pore[i]})
	}
	return t
}

// straightInRu is F at ru 0.4 read off the straight line between F at 0.2 and 0.6.
func straightInRu() (float64, error) {
	a, err := smith57(0.2).solve(lem.Bishop)()
	if err != nil {
		return 0, err
	}
	b, err := smith57(0.6).solve(lem.Bishop)()
	return (a + b) / 2, err
}

func tableChecks() []Check {
	const printed = "F is printed to 0.01"
	check := func(name string, t table, method lem.Method, want float64, work *Work, place string) Check {
		return Check{Case: name, What: fsBy(method), Work: work, Place: place, Confidence: High, Want: want, Run: t.solve(method)}
	}
	first := check("circle, pore pressure by slice; first slice without ru, as in the printed column", smith56(0), lem.Ordinary, 1.33, smith, "Example 5.6, conventional")
	exact := check("circle, pore pressure by slice", smith56(0.352), lem.Ordinary, 1.306, algebra, "sum[c' l + W (cos a - ru sec a) tan phi']/sum(W sin a) on the slices of Smith's Example 5.6")
	exact.Confidence = Exact
	line := Check{Case: "F on the straight line in ru from 0.2 to 0.6, at 0.4", What: fsBy(lem.Bishop), Work: bishopM, Place: "F = m - n ru; value of Smith's Example 5.7", Confidence: Medium, Want: 1.13, Run: straightInRu}
	return []Check{
		check("circle, pore pressure by slice", smith56(0.352), lem.Bishop, 1.42, smith, "Example 5.6, rigorous").within(0.005, printed),
		exact.within(0.001, "F is worked out to 0.001"),
		first.within(0.005, printed),
		check("circle, ru 0.2", smith57(0.2), lem.Bishop, 1.46, smith, "Example 5.7").within(0.005, printed),
		check("circle, ru 0.4", smith57(0.4), lem.Bishop, 1.13, smith, "Example 5.7").within(0.005, printed),
		check("circle, ru 0.6", smith57(0.6), lem.Bishop, 0.81, smith, "Example 5.7").within(0.0075, printed),
		line.within(0.005, printed),
		check("shallow circle, total stresses", smith53(false), lem.Ordinary, 1.85, smith, "Example 5.3 (a)").within(0.004, printed),
		check("deep circle across two layers, total stresses", smith53(true), lem.Ordinary, 3.39, smith, "Example 5.3 (b)").within(0.01, "angles are printed to a degree"),
		check("eight slices, effective stresses", craig92(), lem.Ordinary, 1.42, craig, "Example 9.2, Table 9.1").within(0.006, printed),
	}
}
