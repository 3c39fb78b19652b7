package lem

import (
	"math"
	"slices"
	"testing"
)

// row is one slice of a published hand calculation.
type row struct {
	width  float64 // b, m.
	length float64 // Of the base as printed, m; 0: b/cos(alpha).
	depth  float64 // Mean height z, m.
	weight float64 // W as printed, kN/m; 0 if not printed.
	sin    float64 // Of the base's inclination alpha.
	pore   float64 // u at the base, kPa; 0 if ru is given.
	ru     float64
	soil   int
}

func (r row) chord() float64 {
	if r.length > 0 {
		return r.length
	}
	return r.width / math.Sqrt(1-r.sin*r.sin)
}

// handTable is a published calculation by slices on an arc.
type handTable struct {
	name, source string
	soils        []Soil
	rows         []row   // From the toe to the head, as the books print them.
	arc          float64 // Length of the arc when cohesion acts on it as a whole, m; 0: on b/cos(alpha) slice by slice.
}

const (
	smith = "I. Smith, Smith's Elements of Soil Mechanics (Blackwell 2006), author's worksheet, "
	craig = "Craig, Soil Mechanics, ch. 9, recalled from memory, "
)

func sine(deg float64) float64 { return math.Sin(deg * degree) }

// smith56 is a circle with a pore pressure for every slice.
func smith56() handTable {
	return handTable{
		name: "Smith 5.6", source: smith + "Example 5.6", arc: 9.15 * 89 * degree,
		soils: []Soil{{UnitWeight: 19.2, Cohesion: 12, Friction: 20 * degree}},
		rows: []row{
			{width: 2.35, depth: 0.95, weight: 42.9, sin: sine(-10), ru: 0.352},
			{width: 2.35, depth: 2.44, weight: 110.1, sin: sine(4), ru: 0.410},
			{width: 2.35, depth: 3.32, weight: 149.8, sin: sine(20), ru: 0.376},
			{width: 2.35, depth: 3.50, weight: 157.9, sin: sine(35), ru: 0.295},
			{width: 2.35, depth: 1.74, weight: 78.5, sin: sine(57), ru: 0.072},
		},
	}
}

// smith57 is one circle with a uniform pore pressure ratio.
func smith57(ru float64) handTable {
	return handTable{
		name: "Smith 5.7", source: smith + "Example 5.7", arc: 9.15 * 89 * degree,
		soils: []Soil{{UnitWeight: 16, Cohesion: 10, Friction: 35 * degree}},
		rows: []row{
			{width: 3.15, depth: 1.00, weight: 50.4, sin: 0.113, ru: ru},
			{width: 3.15, depth: 3.08, weight: 155.2, sin: 0.334, ru: ru},
			{width: 3.15, depth: 4.00, weight: 201.6, sin: 0.559, ru: ru},
			{width: 3.15, depth: 2.70, weight: 136.1, sin: 0.783, ru: ru},
		},
	}
}

// workspace returns the table's slices in a workspace, as the kernels expect them for a slip that moves to the right.
func (h handTable) workspace() *Workspace {
	ws := &Workspace{}
	var chords float64
	for _, r := range h.rows {
		chords += r.chord()
	}
	x, y := 0.0, 0.0
	for _, r := range slices.Backward(h.rows) {
		soil := h.soils[r.soil]
		w := r.weight
		if w == 0 {
			w = soil.UnitWeight * r.depth * r.width
		}
		cos := math.Sqrt(1 - r.sin*r.sin)
		length := r.chord()
		u := r.pore + r.ru*w/r.width
		arc := length
		if h.arc > 0 {
			arc *= h.arc / chords
		}
		s := slice{b: r.width, sin: r.sin, cos: cos, tan: math.Tan(soil.Friction), q: w, soilW: w, cl: soil.Cohesion * arc, ul: u * length}
		s.x, s.y = x+r.width/2, y-r.width*r.sin/cos/2
		s.ground = s.y + r.depth
		s.frees = soil.Cohesion*r.width + (w-u*r.width)*s.tan
		x, y = x+r.width, y-r.width*r.sin/cos
		ws.slice = append(ws.slice, s)
	}
	ws.n = len(ws.slice)
	return ws
}

// section returns a section that has the table's slices: over every slice the ground runs parallel to the base at height z, so that the
// ground is stepped; beyond the table it drops below the slip.
func (h handTable) section() (*Section, Slip) {
	s := &Section{Soils: []Soil{{Name: "aside", UnitWeight: 1}}}
	slip := Slip{Kind: Polyline}
	x, y := 0.0, 0.0
	slip.Nodes = append(slip.Nodes, Point{})
	for _, r := range slices.Backward(h.rows) {
		soil := h.soils[r.soil]
		if r.ru != 0 || r.pore != 0 {
			w := soil.UnitWeight * r.depth
			soil.HasRu, soil.Ru = true, r.ru+r.pore/w
		}
		s.Soils = append(s.Soils, soil)
		drop := r.width * r.sin / math.Sqrt(1-r.sin*r.sin)
		s.Ground = append(s.Ground, Point{x, y + r.depth}, Point{x + r.width, y - drop + r.depth})
		s.Placed = append(s.Placed, Body{len(s.Soils) - 1, []Point{{x, y + 20}, {x + r.width, y + 20}, {x + r.width, y - 20}, {x, y - 20}}})
		x, y = x+r.width, y-drop
		slip.Nodes = append(slip.Nodes, Point{x, y})
	}
	low := math.Min(0, y) - 30
	s.Ground = append(Profile{{-5, low}, {0, low}}, s.Ground...)
	s.Ground = append(s.Ground, Point{x, low}, Point{x + 5, low})
	s.Strata = []Stratum{{0, s.Ground}}
	return s, slip
}

// TestPublishedHandTables solves published slice tables with the kernels.
func TestPublishedHandTables(t *testing.T) {
	unprinted := smith56()
	unprinted.rows[0].ru = 0
	shallow := handTable{
		source: smith + "Example 5.3 (a)", arc: 10.7 * 76 * degree,
		soils: []Soil{{UnitWeight: 19.3, Cohesion: 20, Friction: 20 * degree}},
		rows: []row{
			{width: 2, weight: 71.4, sin: sine(-5.9)},
			{width: 2, weight: 167.9, sin: sine(14.5)},
			{width: 2, weight: 223.9, sin: sine(31.3)},
			{width: 2, weight: 148.6, sin: sine(45.7)},
		},
	}
	tests := []struct {
		name   string
		table  handTable
		method Method
		want   float64
		tol    float64 // Relative.
		source string
	}{
		{"Smith 5.6 Bishop", smith56(), Bishop, 1.42, 0.005, smith + "Example 5.6: rigorous F"},
		{"Smith 5.6 ordinary", smith56(), Ordinary, 1.306, 0.002, "closed form of the method on the printed slices; the worksheet's 1.33 leaves out ru of the first slice"},
		{"Smith 5.6 ordinary as printed", unprinted, Ordinary, 1.33, 0.005, smith + "Example 5.6: conventional F, first slice without ru as in the printed column"},
		{"Smith 5.7 ru 0.2", smith57(0.2), Bishop, 1.46, 0.005, smith + "Example 5.7"},
		{"Smith 5.7 ru 0.4", smith57(0.4), Bishop, 1.13, 0.005, smith + "Example 5.7"},
		{"Smith 5.7 ru 0.6", smith57(0.6), Bishop, 0.81, 0.0075, smith + "Example 5.7 (printed to 0.01)"},
		{"Smith 5.3a", shallow, Ordinary, 1.85, 0.004, shallow.source},
		{"Craig 9.2", craig92(), Ordinary, 1.42, 0.006, craig + "Example 9.2"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			var r Result
			tt.table.workspace().method(tt.method, &r)
			if r.Status != Converged || !within(r.F, tt.want, tt.tol) {
				t.Errorf("F = %.4f (%v), want %.3f within %.2g (%s)", r.F, r.Status, tt.want, tt.tol, tt.source)
			}
		})
	}
}

// TestSmithDeepCircle checks Smith's Example 5.3 (b): the base crosses two layers, and the cohesion acts on an arc of 45 degrees in the upper
// and of 85 degrees in the lower one.
func TestSmithDeepCircle(t *testing.T) {
	const radius, source = 9.15, smith + "Example 5.3 (b)"
	upper := Soil{UnitWeight: 19.3, Cohesion: 20, Friction: 20 * degree}
	lower := Soil{UnitWeight: 19.3, Cohesion: 75, Friction: 7 * degree}
	h := handTable{soils: []Soil{upper, lower}, rows: []row{
		{width: 3, weight: 71.4, sin: sine(-31), soil: 1},
		{width: 3, weight: 187.2, sin: sine(-10), soil: 1},
		{width: 3, weight: 320.4, sin: sine(9), soil: 1},
		{width: 3, weight: 370.6, sin: sine(30), soil: 1},
		{width: 3, weight: 276.0, sin: sine(54), soil: 0},
	}}
	ws := h.workspace()
	for i := range ws.slice { // The arcs as printed instead of b/cos(alpha).
		ws.slice[i].cl = lower.Cohesion * radius * 85 * degree / 4
		if i == 0 { // The head.
			ws.slice[i].cl = upper.Cohesion * radius * 45 * degree
		}
	}
	var frictional, cohesive, driving float64
	for i := range ws.slice {
		s := &ws.slice[i]
		frictional += s.q * s.cos * s.tan
		cohesive += s.cl
		driving += s.q * s.sin
	}
	var r Result
	ws.method(Ordinary, &r)
	for _, c := range []struct {
		name           string
		got, want, tol float64
	}{
		{"sum N tan(phi)", frictional, 167.29, 0.002}, // The printed angles are rounded to a degree.
		{"c R theta", cohesive, 1161.80, 0.001},
		{"sum T", driving, 392, 0.01},
		{"F", r.F, 3.39, 0.01},
	} {
		if !within(c.got, c.want, c.tol) {
			t.Errorf("%s = %.3f, want %.2f within %.2g (%s)", c.name, c.got, c.want, c.tol, source)
		}
	}
}

// craig92 is an effective stress analysis with eight slices; W and alpha come from the printed h cos(alpha) and h sin(alpha).
func craig92() handTable {
	h := handTable{name: "Craig 9.2", source: craig + "Example 9.2", soils: []Soil{{UnitWeight: 20, Cohesion: 10, Friction: 29 * degree}}}
	hcos := [...]float64{.75, 1.80, 2.70, 3.25, 3.45, 3.10, 1.90, .55}
	hsin := [...]float64{-.15, -.10, .40, 1.00, 1.75, 2.35, 2.25, .95}
	pore := [...]float64{5.9, 11.8, 16.2, 18.1, 17.1, 11.3, 0, 0}
	length := [...]float64{1.55, 1.50, 1.55, 1.60, 1.70, 1.95, 2.35, 2.15}
	for i := range hcos {
		z := math.Hypot(hcos[i], hsin[i])
		h.rows = append(h.rows, row{width: 1.5, length: length[i], depth: z, sin: hsin[i] / z, pore: pore[i]})
	}
	return h
}

// TestCraigColumns checks the sums of Craig's table on the same slices.
func TestCraigColumns(t *testing.T) {
	ws := craig92().workspace()
	var normal, driving, lift, length float64
	for i := range ws.slice {
		s := &ws.slice[i]
		normal += s.q * s.cos
		driving += s.q * s.sin
		lift += s.ul
		length += s.cl / 10
	}
	for _, c := range []struct {
		name           string
		got, want, tol float64
	}{
		{"sum W cos(alpha)", normal, 525, 0.002},
		{"sum W sin(alpha)", driving, 254, 0.003},
		{"sum u l", lift, 132.0, 0.005}, // Lengths are printed to 0.05 m.
		{"sum l", length, 14.35, 0.001},
	} {
		if !within(c.got, c.want, c.tol) {
			t.Errorf("%s = %.2f, want %.2f within %.2g (%s)", c.name, c.got, c.want, c.tol, craig+"Table 9.1")
		}
	}
}

// TestSmithNumerators checks m-alpha: the numerator sum[(c b + (W - u b) tan(phi))/m] that Smith prints for every trial F, 207.9 times
// the next F.
func TestSmithNumerators(t *testing.T) {
	ws := smith56().workspace()
	for _, c := range []struct{ trial, want float64 }{{1.50, 297.5}, {1.43, 295.8}, {1.42, 295.6}} {
		var sum float64
		for i := range ws.slice {
			s := &ws.slice[i]
			sum += s.frees / (s.cos + s.sin*s.tan/c.trial)
		}
		if !within(sum, c.want, 0.002) {
			t.Errorf("numerator at F = %.2f is %.1f, want %.1f (%s)", c.trial, sum, c.want, smith+"Example 5.6")
		}
	}
}

// TestSlicesOfStackedSections runs published tables through the whole engine: a stepped section that has the table's slices must give back
// the printed weights, inclinations and pore pressures, and F.
func TestSlicesOfStackedSections(t *testing.T) {
	tests := []struct {
		table  handTable
		method Method
		want   float64
		tol    float64
	}{
		{smith56(), Bishop, 1.42, 0.005},
		{smith57(0.2), Bishop, 1.46, 0.005},
		{smith57(0.4), Bishop, 1.13, 0.005},
		{craig92(), Ordinary, 1.42, 0.03}, // The last slice is printed with l = 2.15 m, b/cos(alpha) is 3.0 m.
	}
	for _, tt := range tests {
		t.Run(tt.table.name, func(t *testing.T) {
			s, slip := tt.table.section()
			m := compiled(t, s, &Situation{})
			var ws Workspace
			r := m.FS(&ws, &slip, Setting{Method: Ordinary, Slices: MinSlices})
			ws.method(tt.method, &r) // Bishop as well: the books' slip is an arc, of which only the slices are printed.
			if r.Status != Converged || !within(r.F, tt.want, tt.tol) {
				t.Errorf("F = %.4f (%v), want %.2f (%s)", r.F, r.Status, tt.want, tt.table.source)
			}
			x := 0.0
			for i, row := range slices.Backward(tt.table.rows) {
				var w, ul, run, drop float64
				for j := range ws.n {
					if sl := &ws.slice[j]; sl.x > x && sl.x < x+row.width {
						w += sl.soilW
						ul += sl.ul
						run += sl.b
						drop += sl.b * sl.sin / sl.cos
					}
				}
				x += row.width
				length := math.Hypot(run, drop)
				printed := row.weight
				if printed == 0 {
					printed = 20 * row.width * row.depth
				}
				u := row.pore + row.ru*printed/row.width
				if !within(w, printed, 0.002) || !within(run, row.width, 1e-4) || math.Abs(drop/length-row.sin) > 1e-4 || math.Abs(ul/length-u) > 0.003*u+1e-9 {
					t.Errorf("slice %d: W %.2f, sin %.4f, u %.3f; want %.2f, %.4f, %.3f (%s)", i+1, w, drop/length, ul/length, printed, row.sin, u, tt.table.source)
				}
			}
		})
	}
}
