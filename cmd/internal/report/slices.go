package report

import (
	"encoding/csv"
	"fmt"
	"io"
	"math"
	"slices"
	"strconv"

	"github.com/jedib0t/go-pretty/v6/table"

	"standfast/lem"
)

// SliceTable is the slice table of the governing slip of a situation.
type SliceTable struct {
	Situation string
	Soils     []string // Names, by index.
	Detail    lem.Detail
}

// sliceColumn is a column of the slice table.
type sliceColumn struct {
	head, unit string
	decimals   int
	of         func(s *lem.SliceRow) float64
	optional   bool // Left out on the screen where it is zero throughout.
	summed     bool
}

func degreesOf(rad float64) float64 { return rad * 180 / math.Pi }

// sliceColumns are the numbers of the slice table, left to right.
var sliceColumns = []sliceColumn{
	{"x", "m", 2, func(s *lem.SliceRow) float64 { return s.X }, false, false},
	{"b", "m", 3, func(s *lem.SliceRow) float64 { return s.Width }, false, true},
	{"ground", "m", 2, func(s *lem.SliceRow) float64 { return s.Ground }, false, false},
	{"base", "m", 2, func(s *lem.SliceRow) float64 { return s.Base }, false, false},
	{"alpha", "deg", 2, func(s *lem.SliceRow) float64 { return degreesOf(s.Inclination) }, false, false},
	{"l", "m", 3, func(s *lem.SliceRow) float64 { return s.Length }, false, true},
	{"W", "kN", 2, func(s *lem.SliceRow) float64 { return s.Weight }, false, true},
	{"surcharge", "kN", 2, func(s *lem.SliceRow) float64 { return s.Surcharge }, true, true},
	{"free water", "kN", 2, func(s *lem.SliceRow) float64 { return s.Water }, true, true},
	{"kv W", "kN", 2, func(s *lem.SliceRow) float64 { return s.QuakeVertical }, true, true},
	{"Q", "kN", 2, func(s *lem.SliceRow) float64 { return s.Vertical }, false, true},
	{"H", "kN", 2, func(s *lem.SliceRow) float64 { return s.Push }, true, true},
	{"level of H", "m", 2, func(s *lem.SliceRow) float64 { return s.PushLevel }, true, false},
	{"K", "kN", 2, func(s *lem.SliceRow) float64 { return s.Quake }, true, true},
	{"level of K", "m", 2, func(s *lem.SliceRow) float64 { return s.QuakeLevel }, true, false},
	{"u", "kPa", 2, func(s *lem.SliceRow) float64 { return s.Pore }, false, false},
	{"c", "kPa", 2, func(s *lem.SliceRow) float64 { return s.Cohesion }, false, false},
	{"phi", "deg", 2, func(s *lem.SliceRow) float64 { return degreesOf(math.Atan(s.TanFriction)) }, false, false},
	{"m-alpha", "", 4, func(s *lem.SliceRow) float64 { return s.MAlpha }, false, false},
	{"N'", "kN", 2, func(s *lem.SliceRow) float64 { return s.Normal }, false, false},
	{"S", "kN", 2, func(s *lem.SliceRow) float64 { return s.Shear }, false, true},
	{"R", "kN", 3, func(s *lem.SliceRow) float64 { return s.Resisting }, false, true},
	{"D", "kN", 3, func(s *lem.SliceRow) float64 { return s.Driving }, false, true},
}

// nothing is below what any force or length of a slice table shows.
const nothing = 1e-9

// shown returns the columns that say something on this slip.
func (t *SliceTable) shown() []sliceColumn {
	return slices.DeleteFunc(slices.Clone(sliceColumns), func(c sliceColumn) bool {
		return c.optional && !slices.ContainsFunc(t.Detail.Slices, func(s lem.SliceRow) bool { return math.Abs(c.of(&s)) > nothing })
	})
}

func (c *sliceColumn) title() string {
	if c.unit == "" {
		return c.head
	}
	return c.head + "\n" + c.unit
}

func (c *sliceColumn) sum(rows []lem.SliceRow) float64 {
	var total float64
	for i := range rows {
		total += c.of(&rows[i])
	}
	return total
}

// WriteSlices prints slice tables, with the sums and F from them.
func WriteSlices(w io.Writer, tables []SliceTable, look Look) error {
	p := newPrinter(w, look)
	for i := range tables {
		p.slices(&tables[i])
	}
	if len(tables) > 0 {
		p.heading("How to read the slice tables")
		for _, l := range sliceLegend {
			p.para(" - ", l)
		}
	}
	return p.err
}

// sliceLegend explains the symbols and the equations of the slice table.
var sliceLegend = []string{
	"x, b: middle and width; ground and base: levels at the middle (on an arc the base is a mean); alpha, l: inclination and length of the base, alpha positive where it falls in the direction of movement; horizontal forces are positive that way.",
	"W: weight of the ground; Q: all vertical load, W with surcharge, free water and kv W; H: push of free water; K: other horizontal forces (earthquake, inclined loads, water in the tension crack); u, c, phi: pore pressure and strength on the base.",
	"m-alpha = cos(alpha) + sin(alpha) tan(phi)/F; S = (c l + N' tan(phi))/F; F = f0 (sum of R)/(sum of D), f0 = 1 but in Janbu's corrected method.",
	"Ordinary: N' = Q cos(alpha) - K sin(alpha) - u l, or (Q - u l cos(alpha)) cos(alpha) - K sin(alpha) where free water loads the slip. Others: N' = [Q + X uphill - X downhill - (c l - u l tan(phi)) sin(alpha)/F]/m-alpha - u l, without X in Bishop's and Janbu's methods.",
	"Ordinary and Bishop: R = c l + N' tan(phi); D = [Q (xc - x) + H (yc - level) + K (yc - level)]/radius on a circle, x in the direction of movement, Q sin(alpha) + (H + K) cos(alpha) on other slips.",
	"Janbu, Spencer and Morgenstern-Price: R = (c l + N' tan(phi)) cos(alpha); D = (N' + u l) sin(alpha) + H + K. E and X are the horizontal and vertical forces between slices, X = lambda f E, thrust the level of E.",
}

func (p *printer) slices(t *SliceTable) {
	d := &t.Detail
	p.heading(fmt.Sprintf("Slices of the critical slip: %s, %s, %d slices", t.Situation, d.Setting.Method, len(d.Slices)))
	head, rows := t.Rows()
	p.numbers(head, rows, 1)
	for _, l := range t.Closing() {
		p.line(l)
	}
	if head, rows := t.Sides(); len(rows) > 0 {
		p.line("")
		p.line("Between slices, from left to right:")
		p.numbers(head, rows, 0)
	}
}

// numbers prints a table of numbers whose last columns are words.
func (p *printer) numbers(head []string, cells [][]string, words int) {
	columns := make([]column, len(head))
	for i, h := range head {
		columns[i] = column{head: h, right: i < len(head)-words}
	}
	rows := make([]table.Row, len(cells))
	for i, c := range cells {
		for _, s := range c {
			rows[i] = append(rows[i], s)
		}
	}
	p.table(columns, rows)
}

// Rows returns the slice table as text: heads with the unit on a second line, a row a slice with its soil last, then the sums. Columns that
// are zero throughout are left out.
func (t *SliceTable) Rows() (head []string, rows [][]string) {
	d := &t.Detail
	shown := t.shown()
	head = []string{"no."}
	sums := []string{"sum"}
	for _, c := range shown {
		head = append(head, c.title())
		cell := ""
		if c.summed {
			cell = strconv.FormatFloat(c.sum(d.Slices), 'f', c.decimals, 64)
		}
		sums = append(sums, cell)
	}
	for i := range d.Slices {
		s := &d.Slices[i]
		row := []string{strconv.Itoa(i + 1)}
		for _, c := range shown {
			row = append(row, strconv.FormatFloat(c.of(s), 'f', c.decimals, 64))
		}
		rows = append(rows, append(row, t.Soils[s.Soil]))
	}
	return append(head, "soil at the base"), append(rows, append(sums, ""))
}

// Closing returns F from the sums, and what else a checker needs: the centre of a circle is printed with the critical slips.
func (t *SliceTable) Closing() []string {
	out := []string{t.closing()}
	if s := slipText(&t.Detail); s != "" {
		out = append(out, s)
	}
	return out
}

// SliceLegend explains the symbols and the equations of slice tables.
func SliceLegend() []string { return append([]string{}, sliceLegend...) }

// closing is F from the sums.
func (t *SliceTable) closing() string {
	d := &t.Detail
	f := d.Correction * d.Resisting / d.Driving
	factor := ""
	if d.Correction != 1 {
		factor = fmt.Sprintf("f0 x (sum of R)/(sum of D) = %.4f x ", d.Correction)
	} else {
		factor = "(sum of R)/(sum of D) = "
	}
	return fmt.Sprintf("F = %s%.3f/%.3f = %s; from the method: %s", factor, d.Resisting, d.Driving, FactorText(Number(f)), FactorText(Number(d.Result.F)))
}

// slipText tells lambda, the least m-alpha and the verdict, as far as the method has them.
func slipText(d *lem.Detail) string {
	switch d.Setting.Method {
	case lem.Spencer, lem.MorgensternPrice:
		return fmt.Sprintf("lambda = %.5f; least m-alpha %.3f; verdict: %s", d.Result.Lambda, d.Verdict.LeastMAlpha, d.Verdict.Reason)
	case lem.Bishop, lem.Janbu, lem.JanbuPlain:
		return fmt.Sprintf("least m-alpha %.3f; verdict: %s", d.Verdict.LeastMAlpha, d.Verdict.Reason)
	case lem.Ordinary:
	}
	return ""
}

// Sides returns the forces between slices as text, from left to right; no rows where the method has none.
func (t *SliceTable) Sides() (head []string, rows [][]string) {
	for i := range t.Detail.Interfaces {
		k := &t.Detail.Interfaces[i]
		thrust := unknown
		if !math.IsNaN(k.Thrust) {
			thrust = fmt.Sprintf("%.2f", k.Thrust)
		}
		rows = append(rows, []string{
			strconv.Itoa(i), fmt.Sprintf("%.2f", k.X), fmt.Sprintf("%.2f", k.Base), fmt.Sprintf("%.2f", k.Ground), fmt.Sprintf("%.4f", k.Side),
			fmt.Sprintf("%.2f", k.E), fmt.Sprintf("%.2f", k.Shear), thrust,
		})
	}
	return []string{"right of", "x\nm", "base\nm", "ground\nm", "f", "E\nkN", "X\nkN", "thrust\nm"}, rows
}

// csvDigits are the significant digits of numbers in the CSV file.
const csvDigits = 10

// WriteSlicesCSV writes a slice table with all columns: one row a slice with the forces on its right side, then the sums, then F.
func WriteSlicesCSV(w io.Writer, t *SliceTable) error {
	d := &t.Detail
	number := func(v float64) string {
		if math.IsNaN(v) {
			return ""
		}
		return strconv.FormatFloat(v, 'g', csvDigits, 64)
	}
	head, sums := []string{"slice", "soil at the base"}, []string{"sum", ""}
	for _, c := range sliceColumns {
		name, sum := c.head, ""
		if c.unit != "" {
			name += " (" + c.unit + ")"
		}
		if c.summed {
			sum = number(c.sum(d.Slices))
		}
		head, sums = append(head, name), append(sums, sum)
	}
	if len(d.Interfaces) > 0 {
		head = append(head, "E on its right (kN)", "X on its right (kN)", "f on its right", "thrust on its right (m)")
		sums = append(sums, "", "", "", "")
	}
	rows := [][]string{head}
	for i := range d.Slices {
		s := &d.Slices[i]
		row := []string{strconv.Itoa(i + 1), t.Soils[s.Soil]}
		for _, c := range sliceColumns {
			row = append(row, number(c.of(s)))
		}
		if len(d.Interfaces) > 0 {
			k := &d.Interfaces[i+1]
			row = append(row, number(k.E), number(k.Shear), number(k.Side), number(k.Thrust))
		}
		rows = append(rows, row)
	}
	last := make([]string, len(head))
	copy(last, []string{"F = f0 (sum of R)/(sum of D)", number(d.Correction * d.Resisting / d.Driving), "f0", number(d.Correction)})
	rows = append(rows, sums, last)
	out := csv.NewWriter(w)
	if err := out.WriteAll(rows); err != nil {
		return fmt.Errorf("slice table of %s: %w", t.Situation, err)
	}
	return nil
}
