package exchange

import (
	"fmt"

	"github.com/xuri/excelize/v2"

	"standfast/cmd/internal/report"
)

// styles are the styles of cells.
type styles struct {
	title, head, headRight, strong, wrapped int
	number, whole, blank, money             int
	strongNumber, strongWhole, strongMoney  int
}

// Number formats: amounts with three decimals, whole lengths with none, money with two.
var (
	formatNumber = "#,##0.000"
	formatWhole  = "#,##0"
	formatMoney  = "#,##0.00"
)

func (b *book) addStyles() {
	const family = "Calibri" // The face of plain cells; one that is not there is replaced by a like one.
	bold := &excelize.Font{Bold: true, Family: family, Size: 11}
	line := []excelize.Border{{Type: "top", Style: 1, Color: "161616"}}
	under := []excelize.Border{{Type: "bottom", Style: 1, Color: "161616"}}
	wrap := &excelize.Alignment{WrapText: true, Vertical: "top"}
	tint := excelize.Fill{Type: "pattern", Pattern: 1, Color: []string{"FFF4D6"}}
	for _, s := range []struct {
		id    *int
		style excelize.Style
	}{
		{&b.styles.title, excelize.Style{Font: &excelize.Font{Bold: true, Family: family, Size: 14}}},
		{&b.styles.head, excelize.Style{Font: bold, Border: under, Alignment: wrap}},
		{&b.styles.headRight, excelize.Style{Font: bold, Border: under, Alignment: &excelize.Alignment{WrapText: true, Vertical: "top", Horizontal: "right"}}},
		{&b.styles.strong, excelize.Style{Font: bold, Border: line}},
		{&b.styles.wrapped, excelize.Style{Alignment: wrap}},
		{&b.styles.number, excelize.Style{CustomNumFmt: &formatNumber}},
		{&b.styles.whole, excelize.Style{CustomNumFmt: &formatWhole}},
		{&b.styles.blank, excelize.Style{CustomNumFmt: &formatMoney, Fill: tint}},
		{&b.styles.money, excelize.Style{CustomNumFmt: &formatMoney}},
		{&b.styles.strongNumber, excelize.Style{CustomNumFmt: &formatNumber, Font: bold, Border: line}},
		{&b.styles.strongWhole, excelize.Style{CustomNumFmt: &formatWhole, Font: bold, Border: line}},
		{&b.styles.strongMoney, excelize.Style{CustomNumFmt: &formatMoney, Font: bold, Border: line}},
	} {
		id, err := b.file.NewStyle(&s.style)
		b.keep(err)
		*s.id = id
	}
}

// at returns the name of a cell.
func (b *book) at(column, row int) string {
	name, err := excelize.CoordinatesToCellName(column, row)
	b.keep(err)
	return name
}

// write puts a text in a cell, whatever it begins with: it never becomes a formula.
func (b *book) write(sheet string, column, row, style int, s string) {
	cell := b.at(column, row)
	b.keep(b.file.SetCellStr(sheet, cell, clean(s)))
	b.keep(b.file.SetCellStyle(sheet, cell, cell, style))
}

// calculate puts a formula in a cell, with the value that it has for programs that cannot calculate.
func (b *book) calculate(sheet string, column, row, style int, value float64, formula string) {
	cell := b.at(column, row)
	b.keep(b.file.SetCellValue(sheet, cell, value))
	b.keep(b.file.SetCellFormula(sheet, cell, formula))
	b.keep(b.file.SetCellStyle(sheet, cell, cell, style))
}

// layOut sets the widths of columns and the print of a sheet: as wide as a page.
func (b *book) layOut(sheet, orientation string, widths []float64) {
	for i, w := range widths {
		column, err := excelize.ColumnNumberToName(i + 1)
		b.keep(err)
		b.keep(b.file.SetColWidth(sheet, column, column, w))
	}
	const a4 = 9
	size, wide, tall, fit := a4, 1, 0, true
	b.keep(b.file.SetPageLayout(sheet, &excelize.PageLayoutOptions{Size: &size, Orientation: &orientation, FitToWidth: &wide, FitToHeight: &tall}))
	b.keep(b.file.SetSheetProps(sheet, &excelize.SheetPropsOptions{FitToPage: &fit}))
}

// headRow writes the head of a table: words over columns of text, then over columns of numbers.
func (b *book) headRow(sheet string, texts, numbers []string) {
	const twoLines = 31.0 // points
	for i, h := range texts {
		b.write(sheet, 1+i, rowHead, b.styles.head, h)
	}
	for i, h := range numbers {
		b.write(sheet, 1+len(texts)+i, rowHead, b.styles.headRight, h)
	}
	b.keep(b.file.SetRowHeight(sheet, rowHead, twoLines))
}

func (p *page) text(column, style int, s string) { p.write(p.sheet, column, p.row, style, s) }

func (p *page) words(name, unit string) {
	p.text(colItem, p.styles.wrapped, name)
	p.text(colUnit, p.styles.wrapped, unit)
}

func (p *page) number(column int, v float64) {
	cell := p.at(column, p.row)
	p.keep(p.file.SetCellValue(p.sheet, cell, v))
	p.keep(p.file.SetCellStyle(p.sheet, cell, cell, p.styles.number))
}

func (p *page) formula(column, style int, value float64, format string, args ...any) {
	p.calculate(p.sheet, column, p.row, style, value, fmt.Sprintf(format, args...))
}

// head writes what stands above the table.
func (p *page) head() {
	o := p.option
	p.write(p.sheet, colItem, rowTitle, p.styles.title, p.result.Case.Title)
	p.write(p.sheet, colItem, rowOption, p.styles.title, o.Title+sizes(o))
	p.write(p.sheet, colItem, rowStatus, 0, "Status: "+statusText(o))
	p.write(p.sheet, colItem, rowLength, 0, "Length of the works")
	p.write(p.sheet, colUnit, rowLength, 0, "m")
	p.keep(p.file.SetCellValue(p.sheet, p.at(colPerMetre, rowLength), p.result.Case.Length))
	p.headRow(p.sheet, []string{"item", "unit"}, []string{"per metre run", "whole length", "whole length, rounded up", "rate (yours)", "amount"})
	p.layOut(p.sheet, "portrait", []float64{34, 7, 14, 14, 14, 13, 14})
}

func sizes(o *report.Option) string {
	if s := o.Dimensions(o.Parameters); s != "" {
		return ": " + s
	}
	return ""
}

func statusText(o *report.Option) string {
	s := o.Status
	if o.WhatIf {
		s += " (a what-if, no works)"
	}
	return s
}

// foot writes what must be known of the amounts.
func (p *page) foot() {
	p.row++
	for _, s := range []string{
		"Cut is bank volume, fill compacted volume; they are never netted. Cut is used as fill only where the case says so.",
		"Import and disposal are part of fill and cut, again, for a haulage rate of their own: price each only once.",
		"Existing ground stripped is not in the earthworks.",
		report.Cautions()[0],
	} {
		p.text(colItem, 0, s)
		p.row++
	}
}

// summary writes the first sheet: a row an option that refers to its sheet.
func (b *book) summary(pages []*page) {
	b.write(summaryName, 1, rowTitle, b.styles.title, b.result.Case.Title)
	b.write(summaryName, 1, rowOption, 0, "Quantities over the whole length of the works, from the case "+b.result.Case.File)
	columns := []struct {
		head string
		row  total
	}{
		{"cut, m³", totalCut},
		{"fill, m³", totalFill},
		{"earthworks, m³", totalEarthworks},
		{"brought in, m³", totalImport},
		{"taken away, m³", totalDispose},
		{"drains, m", totalDrain},
		{"stripped, m²", totalStrip},
	}
	var heads []string
	for _, c := range columns {
		heads = append(heads, c.head)
	}
	b.headRow(summaryName, []string{"option", "status"}, append(heads, "amount at your rates"))
	last := 3 + len(columns)
	for k, p := range pages {
		row := rowFirst + k
		b.write(summaryName, 1, row, b.styles.wrapped, p.option.Title+sizes(p.option))
		b.write(summaryName, 2, row, b.styles.wrapped, statusText(p.option))
		t := &p.option.Totals
		values := []float64{t.Cut, t.Fill, t.Earthworks, t.Import, t.Dispose, t.Drain, t.Strip}
		for i, c := range columns {
			b.calculate(summaryName, 3+i, row, b.styles.number, values[i], fmt.Sprintf("'%s'!%s", p.sheet, b.at(colWhole, p.totals[c.row])))
		}
		b.calculate(summaryName, last, row, b.styles.money, 0, fmt.Sprintf("'%s'!%s", p.sheet, b.at(colAmount, p.totals[totalAmount])))
	}
	b.write(summaryName, 1, rowFirst+len(pages)+1, 0, report.Cautions()[0])
	b.layOut(summaryName, "landscape", []float64{44, 16, 13, 13, 15, 15, 15, 12, 13, 16})
}
