package exchange

import (
	"bytes"
	"encoding/csv"
	"errors"
	"flag"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"

	"github.com/xuri/excelize/v2"

	"standfast/cmd/internal/report"
)

// kept names a folder that the files of the tests are written to, to be looked at.
var kept = flag.String("kept", "", "folder to write the files of the tests to")

// sample is an invented result: a berm, drains with a trench, a what-if without earthworks, and names that no sheet likes.
func sample() *report.File {
	before := []report.Point{{0, 58.4}, {26, 58}, {46, 50}, {72, 49.7}}
	invert := []report.Point{{30, 54}, {32, 53.2}, {35, 52}, {40, 50}, {43, 49.25}, {46, 48.5}} // Straight but for the point at 40.
	section := func(ground []report.Point) *report.Section {
		return &report.Section{GroundBefore: before, Ground: ground, Water: map[string]report.Water{}}
	}
	f := &report.File{Case: report.Case{Title: "=1+1 Harrow Lane, invented Łódź", File: "harrow.yaml", Length: 60}}
	berm := report.Option{
		Name: "berm", Title: "toe berm", Status: "meets target", Order: []string{"height"},
		Parameters: map[string]report.Parameter{"height": {Value: 2.5, Unit: "m"}},
		Quantities: report.Quantities{
			Cut: 1.75, Fill: 12.8999, Earthworks: 14.6499, Import: 12.8999, Dispose: 1.75, Strip: 13.31,
			CutBySoil: map[string]float64{"weathered clay": 1.25, "=HYPERLINK(\"x\")": 0.5}, FillBySoil: map[string]float64{"granular fill": 12.8999},
		},
		Section: section([]report.Point{{0, 58.4}, {26, 58}, {39.75, 52.5}, {45.25, 52.5}, {50.327, 49.95}, {72, 49.7}}),
	}
	drains := report.Option{
		Name: "trench_drains+a/very*long?name'that[no]sheet:can\\hold", Title: "trench drains", Status: "infeasible",
		Quantities: report.Quantities{Cut: 1.1, Fill: 1.1, Earthworks: 2.2, Import: 1.1, Dispose: 1.1, TrenchDig: 1.1, Stone: 1.1, Drain: 0.25},
		Section:    section(before),
	}
	drains.Section.Water["winter"] = report.Water{Drains: &report.Drains{Invert: invert, Ratio: []float64{0.6, 0.6, 0.6, 0.6, 0.6, 0.6}}}
	lower := report.Option{Name: "BERM", Title: "lower water", Status: "unresolved", WhatIf: true, Section: section(before)}
	f.Options = []report.Option{berm, drains, lower}
	for i := range f.Options {
		q, t := &f.Options[i].Quantities, &f.Options[i].Totals
		for _, c := range []struct {
			total    *float64
			perMetre float64
		}{
			{&t.Cut, q.Cut},
			{&t.Fill, q.Fill},
			{&t.Earthworks, q.Earthworks},
			{&t.Import, q.Import},
			{&t.Dispose, q.Dispose},
			{&t.Drain, q.Drain},
			{&t.Strip, q.Strip},
		} {
			*c.total = c.perMetre * f.Case.Length
		}
	}
	return f
}

func book1(t *testing.T, f *report.File) ([]byte, *excelize.File) {
	t.Helper()
	var b bytes.Buffer
	if err := WriteQuantities(&b, f); err != nil {
		t.Fatal(err)
	}
	x, err := excelize.OpenReader(bytes.NewReader(b.Bytes()))
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() {
		if err := x.Close(); err != nil {
			t.Error(err)
		}
	})
	return b.Bytes(), x
}

// calc evaluates a cell.
func calc(t *testing.T, x *excelize.File, sheet, cell string) float64 {
	t.Helper()
	s, err := x.CalcCellValue(sheet, cell, excelize.Options{RawCellValue: true})
	if err != nil {
		t.Fatalf("%s!%s: %v", sheet, cell, err)
	}
	v, err := strconv.ParseFloat(s, 64)
	if err != nil {
		t.Fatalf("%s!%s is %q", sheet, cell, s)
	}
	return v
}

// The formulas of the workbook come to the totals of the result.
func TestFormulasAreTotals(t *testing.T) {
	const tol = 1e-12 // relative
	f := sample()
	raw, x := book1(t, f)
	if *kept != "" {
		if err := os.WriteFile(filepath.Join(*kept, "quantities.xlsx"), raw, 0o644); err != nil {
			t.Fatal(err)
		}
	}
	names := sheetNames(f.Options)
	for i, o := range f.Options {
		t.Run(o.Title, func(t *testing.T) {
			want := map[string]float64{
				"Cut, bank measure": o.Totals.Cut, "Fill, compacted": o.Totals.Fill, "Earthworks: cut and fill": o.Totals.Earthworks,
				"Brought in: all fill": o.Totals.Import, "Taken away: all cut": o.Totals.Dispose, "Drains": o.Totals.Drain, "Ground stripped": o.Totals.Strip,
			}
			rows, err := x.GetRows(names[i])
			if err != nil {
				t.Fatal(err)
			}
			for r, row := range rows {
				if len(row) == 0 {
					continue
				}
				total, ok := want[row[0]]
				if !ok {
					continue
				}
				delete(want, row[0])
				if got := calc(t, x, names[i], fmt.Sprintf("D%d", r+1)); math.Abs(got-total) > tol*total {
					t.Errorf("%s: the formula comes to %v, the result says %v", row[0], got, total)
				}
				if got := calc(t, x, names[i], fmt.Sprintf("E%d", r+1)); got != math.Ceil(total-1e-6) {
					t.Errorf("%s: rounded up to %v from %v", row[0], got, total)
				}
			}
			if len(want) > 0 {
				t.Errorf("no row for %v", want)
			}
			sums := []float64{o.Totals.Cut, o.Totals.Fill, o.Totals.Earthworks, o.Totals.Import, o.Totals.Dispose, o.Totals.Drain, o.Totals.Strip}
			for c, total := range sums {
				cell, err := excelize.CoordinatesToCellName(3+c, rowFirst+i)
				if err != nil {
					t.Fatal(err)
				}
				if got := calc(t, x, summaryName, cell); math.Abs(got-total) > tol*total {
					t.Errorf("summary %s: the formula comes to %v, the result says %v", cell, got, total)
				}
			}
		})
	}
}

// Amounts follow the user's rates, and without any there is none.
func TestRates(t *testing.T) {
	_, x := book1(t, sample())
	rows, err := x.GetRows("berm")
	if err != nil {
		t.Fatal(err)
	}
	at := slices.IndexFunc(rows, func(r []string) bool { return len(r) > 0 && r[0] == "Fill: granular fill" }) + 1
	end := slices.IndexFunc(rows, func(r []string) bool { return len(r) > 0 && r[0] == "Amount at the rates given" }) + 1
	if got := calc(t, x, "berm", fmt.Sprintf("G%d", end)); got != 0 {
		t.Errorf("without rates the amount is %v", got)
	}
	if v, err := x.GetCellValue("berm", fmt.Sprintf("F%d", at)); v != "" || err != nil {
		t.Errorf("the rate is not blank: %q, %v", v, err)
	}
	if err := x.SetCellValue("berm", fmt.Sprintf("F%d", at), 20); err != nil {
		t.Fatal(err)
	}
	const want = 774 * 20 // 12.8999 m3/m over 60 m, rounded up
	if got := calc(t, x, "berm", fmt.Sprintf("G%d", end)); got != want {
		t.Errorf("the amount is %v, want %v", got, want)
	}
}

// Only amounts per metre run and the length are numbers; a name never becomes a formula.
func TestWhatIsAFormula(t *testing.T) {
	f := sample()
	_, x := book1(t, f)
	for _, sheet := range x.GetSheetList() {
		rows, err := x.GetRows(sheet)
		if err != nil {
			t.Fatal(err)
		}
		for r := range rows {
			for c := 1; c <= 10; c++ {
				cell, err := excelize.CoordinatesToCellName(c, r+1)
				if err != nil {
					t.Fatal(err)
				}
				formula, err := x.GetCellFormula(sheet, cell)
				if err != nil {
					t.Fatal(err)
				}
				if strings.Contains(formula, "HYPERLINK") || formula != "" && c <= 2 {
					t.Errorf("%s!%s holds the formula %q", sheet, cell, formula)
				}
				kind, err := x.GetCellType(sheet, cell)
				if err != nil {
					t.Fatal(err)
				}
				number := formula == "" && kind == excelize.CellTypeUnset && rows[r] != nil && c-1 < len(rows[r]) && rows[r][c-1] != ""
				if number && (sheet == summaryName || c != colPerMetre) {
					t.Errorf("%s!%s is a pasted number: %s", sheet, cell, rows[r][c-1])
				}
			}
		}
	}
}

func TestWorkbookIsTheSameEachTime(t *testing.T) {
	a, _ := book1(t, sample())
	b, _ := book1(t, sample())
	if !bytes.Equal(a, b) {
		t.Error("the bytes differ from run to run")
	}
	if err := WriteQuantities(full{}, sample()); err == nil {
		t.Error("a full disk goes unnoticed")
	}
}

type full struct{}

func (full) Write([]byte) (int, error) { return 0, errors.New("no space left") }

func TestSheetNames(t *testing.T) {
	options := []report.Option{{Name: "berm"}, {Name: "Berm"}, {Name: "summary"}, {Name: strings.Repeat("x", 40)}, {Name: strings.Repeat("x", 40)}, {Name: "a/b'c:d"}}
	want := []string{"berm", "Berm 2", "summary 2", strings.Repeat("x", 31), strings.Repeat("x", 29) + " 2", "a-b-c-d"}
	if got := sheetNames(options); !slices.Equal(got, want) {
		t.Errorf("got %q, want %q", got, want)
	}
}

func table(t *testing.T, o *report.Option) [][]string {
	t.Helper()
	var b bytes.Buffer
	if err := WriteSettingOut(&b, o); err != nil {
		t.Fatal(err)
	}
	rows, err := csv.NewReader(&b).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	return rows
}

func TestSettingOut(t *testing.T) {
	f := sample()
	step := report.Option{Section: &report.Section{
		GroundBefore: []report.Point{{0, 10}, {5, 10}, {5, 6}, {20, 6}}, Ground: []report.Point{{0, 10}, {5, 10}, {9, 8}, {9, 6.5}, {12, 6}, {20, 6}},
	}}
	// Levels between points are worked out by hand.
	tests := []struct {
		name string
		o    *report.Option
		want []string
	}{
		{"berm", &f.Options[0], []string{
			"offset_m|level_m|existing_level_m|change_m|drain_invert_m|description",
			"0.000|58.400|58.400|0.000||ground unchanged",
			"26.000|58.000|58.000|0.000||ground unchanged",
			"39.750|52.500|52.500|0.000||works start, then level",
			"45.250|52.500|50.300|2.200||change of slope, then 1V:1.99H down",
			"46.000|52.123|50.000|2.123||on the slope, then 1V:1.99H down",
			"50.327|49.950|49.950|0.000||works end",
			"72.000|49.700|49.700|0.000||ground unchanged",
		}},
		{"drains", &f.Options[1], []string{
			"offset_m|level_m|existing_level_m|change_m|drain_invert_m|description",
			"0.000|58.400|58.400|0.000||ground unchanged",
			"26.000|58.000|58.000|0.000||ground unchanged",
			"30.000|56.400|56.400|0.000|54.000|ground unchanged; drain from here",
			"40.000|52.400|52.400|0.000|50.000|ground unchanged; change of slope of the drain",
			"46.000|50.000|50.000|0.000|48.500|ground unchanged; drain to here",
			"72.000|49.700|49.700|0.000||ground unchanged",
		}},
		{"steps", &step, []string{
			"offset_m|level_m|existing_level_m|change_m|drain_invert_m|description",
			"0.000|10.000|10.000|0.000||ground unchanged",
			"5.000|10.000|6.000|4.000||works start, then 1V:2.00H down",
			"9.000|8.000|6.000|2.000||change of slope, then vertical down",
			"9.000|6.500|6.000|0.500||change of slope, then 1V:6.00H down",
			"12.000|6.000|6.000|0.000||works end",
			"20.000|6.000|6.000|0.000||ground unchanged",
		}},
	}
	for _, c := range tests {
		t.Run(c.name, func(t *testing.T) {
			var got []string
			for _, r := range table(t, c.o) {
				got = append(got, strings.Join(r, "|"))
			}
			if !slices.Equal(got, c.want) {
				t.Errorf("got\n%s\nwant\n%s", strings.Join(got, "\n"), strings.Join(c.want, "\n"))
			}
		})
	}
	if err := WriteSettingOut(full{}, &f.Options[0]); err == nil {
		t.Error("a full disk goes unnoticed")
	}
	if HasSettingOut(&f.Options[2]) || !HasSettingOut(&f.Options[1]) {
		t.Error("works and no works are mixed up")
	}
}

func BenchmarkWriteQuantities(b *testing.B) {
	f := sample()
	b.ReportAllocs()
	for b.Loop() {
		if err := WriteQuantities(&bytes.Buffer{}, f); err != nil {
			b.Fatal(err)
		}
	}
}

// Where the site serves some of the fill, what is brought and taken away is an amount of its own.
func TestHaulOfReuse(t *testing.T) {
	f := sample()
	o := &f.Options[0]
	o.Quantities.Import, o.Quantities.Dispose = 10.5, 0.25
	_, x := book1(t, f)
	rows, err := x.GetRows(sheetNames(f.Options)[0])
	if err != nil {
		t.Fatal(err)
	}
	want := map[string]float64{"Brought in, with what the site serves": 10.5 * 60, "Taken away, with what the site serves": 0.25 * 60}
	for r, row := range rows {
		if len(row) == 0 {
			continue
		}
		if total, ok := want[row[0]]; ok {
			delete(want, row[0])
			if got := calc(t, x, sheetNames(f.Options)[0], fmt.Sprintf("D%d", r+1)); math.Abs(got-total) > 1e-9 {
				t.Errorf("%s: %v, want %v", row[0], got, total)
			}
		}
	}
	if len(want) > 0 {
		t.Errorf("no row for %v", want)
	}
}
