package exchange

import (
	"fmt"
	"io"
	"maps"
	"math"
	"slices"
	"strings"
	"unicode/utf8"

	"github.com/xuri/excelize/v2"

	"standfast/cmd/internal/report"
)

// summaryName is the name of the first sheet of a workbook.
const summaryName = "Summary"

// WriteQuantities writes the quantities of every option as an XLSX workbook: a summary and a sheet an option, with a column left blank for
// the user's rates. Amounts per metre run are numbers; every total, every whole length and every amount is a formula. The same result gives
// the same bytes. It returns the error of w.
func WriteQuantities(w io.Writer, f *report.File) error {
	b, err := newBook(f)
	if err != nil {
		return fmt.Errorf("exchange: %w", err)
	}
	defer b.file.Close() //nolint:errcheck // nothing is kept on disk
	if _, err := b.file.WriteTo(w); err != nil {
		return fmt.Errorf("exchange: %w", err)
	}
	return nil
}

// book is a workbook being filled. The first error stays.
type book struct {
	file   *excelize.File
	result *report.File
	styles styles
	err    error
}

func newBook(f *report.File) (*book, error) {
	b := &book{file: excelize.NewFile(), result: f}
	b.keep(b.file.SetDocProps(&excelize.DocProperties{
		Creator: "standfast", LastModifiedBy: "standfast", Title: "Quantities: " + clean(f.Case.Title),
		Created: bookDate, Modified: bookDate,
	}))
	recalculate := true // The values kept beside the formulas are for programs that cannot calculate.
	b.keep(b.file.SetCalcProps(&excelize.CalcPropsOptions{FullCalcOnLoad: &recalculate}))
	b.keep(b.file.SetSheetName("Sheet1", summaryName))
	b.addStyles()
	names := sheetNames(f.Options)
	sheets := make([]*page, len(f.Options))
	for i := range f.Options {
		_, err := b.file.NewSheet(names[i])
		b.keep(err)
		sheets[i] = b.optionSheet(names[i], &f.Options[i])
	}
	b.summary(sheets)
	return b, b.err
}

// bookDate stands in every workbook: a file holds no time, so that the same result gives the same bytes.
const bookDate = "2000-01-01T00:00:00Z"

func (b *book) keep(err error) {
	if b.err == nil {
		b.err = err
	}
}

// clean replaces what a workbook cannot hold.
func clean(s string) string {
	return strings.Map(func(r rune) rune {
		if r < ' ' || r == utf8.RuneError || r == 0xfffe || r == 0xffff {
			return ' '
		}
		return r
	}, s)
}

// sheetNames returns a name for the sheet of each option: its own without what a sheet's name cannot hold, and told apart by a number
// where two would be the same.
func sheetNames(options []report.Option) []string {
	const longest = 31
	names := make([]string, len(options))
	taken := map[string]bool{strings.ToLower(summaryName): true, "history": true}
	for i := range options {
		base := strings.Map(func(r rune) rune {
			if r > 0xffff || strings.ContainsRune(`[]:*?/\'`, r) {
				return '-'
			}
			return r
		}, clean(options[i].Name))
		name := cut(base, longest)
		for n := 2; taken[strings.ToLower(name)]; n++ {
			end := fmt.Sprintf(" %d", n)
			name = cut(base, longest-len(end)) + end
		}
		taken[strings.ToLower(name)] = true
		names[i] = name
	}
	return names
}

func cut(s string, n int) string {
	r := []rune(s)
	return string(r[:min(n, len(r))])
}

// Columns of an option's sheet.
const (
	colItem = iota + 1
	colUnit
	colPerMetre
	colWhole
	colRounded
	colRate
	colAmount
)

// Rows of an option's sheet.
const (
	rowTitle = iota + 1
	rowOption
	rowStatus
	rowLength
	rowHead = iota + 2
	rowFirst
)

// page is a sheet of an option, with the rows that the summary refers to.
type page struct {
	*book
	sheet  string
	option *report.Option
	row    int // Next row to fill.
	totals map[total]int
	rated  []string // Cells of the amounts.
}

// total is a row that the summary repeats.
type total uint8

const (
	totalCut total = iota
	totalFill
	totalEarthworks
	totalImport
	totalDispose
	totalDrain
	totalStrip
	totalAmount
)

func (b *book) optionSheet(name string, o *report.Option) *page {
	p := &page{book: b, sheet: name, option: o, row: rowFirst, totals: map[total]int{}}
	p.head()
	q := &o.Quantities
	cuts := p.items("Cut", q.CutBySoil, "m³", item{"dig of trenches", q.TrenchDig})
	p.sum(totalCut, "Cut, bank measure", "m³", cuts)
	fills := p.items("Fill", q.FillBySoil, "m³", item{"stone in trenches", q.Stone})
	p.sum(totalFill, "Fill, compacted", "m³", fills)
	p.plus(totalEarthworks, "Earthworks: cut and fill", p.totals[totalCut], p.totals[totalFill])
	p.haul(totalImport, "Brought in", "all fill", q.Import, q.Fill, p.totals[totalFill])
	p.haul(totalDispose, "Taken away", "all cut", q.Dispose, q.Cut, p.totals[totalCut])
	p.single(totalDrain, "Drains", "m", q.Drain)
	p.single(totalStrip, "Ground stripped", "m²", q.Strip)
	p.amount()
	p.foot()
	return p
}

// item is an amount per metre run.
type item struct {
	name  string
	value float64
}

// items writes a row for each soil by name and each further item that is not 0, and returns the rows from and to; none if to < from.
func (p *page) items(what string, bySoil map[string]float64, unit string, more ...item) (rows [2]int) {
	rows[0] = p.row
	for _, name := range slices.Sorted(maps.Keys(bySoil)) {
		p.item(what+": "+name, unit, bySoil[name])
	}
	for _, m := range more {
		if m.value != 0 {
			p.item(what+": "+m.name, unit, m.value)
		}
	}
	rows[1] = p.row - 1
	return rows
}

// item writes a row with an amount per metre run that can be priced.
func (p *page) item(name, unit string, value float64) {
	p.words(name, unit)
	p.number(colPerMetre, value)
	p.extend(value)
	p.rate()
	p.row++
}

// extend writes the whole length of the row in hand, as it is and rounded up.
func (p *page) extend(perMetre float64) {
	whole := perMetre * p.result.Case.Length
	p.formula(colWhole, p.styles.number, whole, "%s*%s", p.at(colPerMetre, p.row), p.lengthCell())
	// Up to the next whole number, but for the millionth that adding up floating-point numbers may leave behind. ROUNDUP would do it too,
	// and so it does not everywhere: some programs round whole numbers up by it.
	p.formula(colRounded, p.styles.whole, whole, "ROUND(%s+0.499999,0)", p.at(colWhole, p.row))
}

func (p *page) lengthCell() string { return fmt.Sprintf("$C$%d", rowLength) }

// rate leaves the cell of the rate blank and writes the amount that it will give.
func (p *page) rate() {
	p.keep(p.file.SetCellStyle(p.sheet, p.at(colRate, p.row), p.at(colRate, p.row), p.styles.blank))
	p.text(colAmount, p.styles.money, "")
	rate := p.at(colRate, p.row)
	p.keep(p.file.SetCellFormula(p.sheet, p.at(colAmount, p.row), fmt.Sprintf(`IF(%s="","",%s*%s)`, rate, p.at(colRounded, p.row), rate)))
	p.rated = append(p.rated, p.at(colAmount, p.row))
}

// sum writes the total of rows.
func (p *page) sum(t total, name, unit string, rows [2]int) {
	value := 0.0
	formula := "0"
	if rows[1] >= rows[0] {
		formula = fmt.Sprintf("SUM(%s:%s)", p.at(colPerMetre, rows[0]), p.at(colPerMetre, rows[1]))
		value = map[total]float64{totalCut: p.option.Quantities.Cut, totalFill: p.option.Quantities.Fill}[t]
	}
	p.total(t, name, unit, value, formula)
}

func (p *page) plus(t total, name string, a, b int) {
	p.total(t, name, "m³", p.option.Quantities.Earthworks, p.at(colPerMetre, a)+"+"+p.at(colPerMetre, b))
}

// sameVolume is the relative difference below which two volumes are one.
const sameVolume = 1e-9

// haul writes a row of what is brought or taken away, which can be priced on its own: a formula that repeats the total in a row where it is all
// of that, and an amount where the site serves some of it.
func (p *page) haul(t total, name, all string, value, whole float64, row int) {
	if math.Abs(value-whole) <= sameVolume*whole {
		p.words(name+": "+all, "m³")
		p.formula(colPerMetre, p.styles.number, value, "%s", p.at(colPerMetre, row))
	} else {
		p.words(name+", with what the site serves", "m³")
		p.number(colPerMetre, value)
	}
	p.extend(value)
	p.rate()
	p.totals[t] = p.row
	p.row++
}

// single writes a row of one amount.
func (p *page) single(t total, name, unit string, value float64) {
	p.totals[t] = p.row
	p.item(name, unit, value)
}

func (p *page) total(t total, name, unit string, value float64, formula string) {
	p.words(name, unit)
	p.formula(colPerMetre, p.styles.number, value, "%s", formula)
	p.extend(value)
	p.keep(p.file.SetCellStyle(p.sheet, p.at(colItem, p.row), p.at(colUnit, p.row), p.styles.strong))
	p.keep(p.file.SetCellStyle(p.sheet, p.at(colPerMetre, p.row), p.at(colWhole, p.row), p.styles.strongNumber))
	p.keep(p.file.SetCellStyle(p.sheet, p.at(colRounded, p.row), p.at(colRounded, p.row), p.styles.strongWhole))
	p.totals[t] = p.row
	p.row++
}

// amount writes the sum of all amounts.
func (p *page) amount() {
	p.words("Amount at the rates given", "")
	p.formula(colAmount, p.styles.strongMoney, 0, "SUM(%s)", strings.Join(p.rated, ","))
	p.keep(p.file.SetCellStyle(p.sheet, p.at(colItem, p.row), p.at(colUnit, p.row), p.styles.strong))
	p.totals[totalAmount] = p.row
	p.row++
}
