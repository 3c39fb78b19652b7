package report

import (
	"bytes"
	"encoding/csv"
	"math"
	"strconv"
	"strings"
	"testing"

	"standfast/lem"
)

// workedSlip is a slip of an invented slope with a water line, a surcharge, an earthquake and free water at its foot.
func workedSlip(t *testing.T, method lem.Method) SliceTable {
	t.Helper()
	ground := lem.Profile{{X: 0, Y: 12}, {X: 20, Y: 12}, {X: 45, Y: 2}, {X: 70, Y: 2}}
	s := &lem.Section{
		Ground: ground, Soils: []lem.Soil{{Name: "clay", UnitWeight: 19, Cohesion: 6, Friction: 0.42}}, Strata: []lem.Stratum{{Soil: 0, Top: ground}},
		Loads: []lem.Surcharge{{FromX: 10, ToX: 18, Pressure: 10}},
	}
	sit := &lem.Situation{Kh: 0.05, Water: lem.Water{Line: lem.Profile{{X: 0, Y: 9}, {X: 45, Y: 3}}, Free: []lem.FreeWater{{Level: 3, FromX: 40, ToX: 70}}}}
	var m lem.Model
	if err := m.Compile(s, sit); err != nil {
		t.Fatal(err)
	}
	d, err := m.Detail(&lem.Slip{Centre: lem.Point{X: 36, Y: 24}, Radius: 23.5}, lem.Setting{Method: method, Slices: 12})
	if err != nil {
		t.Fatal(err)
	}
	return SliceTable{Situation: "wet", Soils: []string{"clay"}, Detail: d}
}

// TestSlicesCSV follows F by hand from the columns of the file, by the equations that are printed beside the table.
func TestSlicesCSV(t *testing.T) {
	for _, method := range []lem.Method{lem.Bishop, lem.Spencer, lem.Janbu} {
		t.Run(method.String(), func(t *testing.T) {
			table := workedSlip(t, method)
			var b bytes.Buffer
			if err := WriteSlicesCSV(&b, &table); err != nil {
				t.Fatal(err)
			}
			rows, err := csv.NewReader(&b).ReadAll()
			if err != nil {
				t.Fatal(err)
			}
			at := map[string]int{}
			for i, h := range rows[0] {
				at[strings.Fields(h)[0]+unitOf(h)] = i
			}
			number := func(row []string, column string) float64 {
				i, ok := at[column]
				if !ok {
					t.Fatalf("no column %q in %v", column, rows[0])
				}
				v, err := strconv.ParseFloat(row[i], 64)
				if err != nil {
					t.Fatal(err)
				}
				return v
			}
			n := len(table.Detail.Slices)
			f := table.Detail.F
			var resisting, driving float64
			for _, row := range rows[1 : n+1] {
				sin, cos := math.Sincos(number(row, "alpha(deg)") * math.Pi / 180)
				tan := math.Tan(number(row, "phi(deg)") * math.Pi / 180)
				length, pore := number(row, "l(m)"), number(row, "u(kPa)")
				normal := number(row, "N'(kN)")
				shear := (number(row, "c(kPa)")*length + normal*tan) / f
				if got := number(row, "S(kN)"); math.Abs(got-shear) > 1e-6*shear {
					t.Errorf("S = %v, want %v", got, shear)
				}
				if method == lem.Bishop {
					resisting += shear * f
					arm := 36 - number(row, "x(m)")
					driving += (number(row, "Q(kN)")*arm + number(row, "H(kN)")*(24-number(row, "level(m)H")) + number(row, "K(kN)")*(24-number(row, "level(m)K"))) / 23.5
					continue
				}
				resisting += shear * f * cos
				driving += (normal+pore*length)*sin + number(row, "H(kN)") + number(row, "K(kN)")
			}
			if got := table.Detail.Correction * resisting / driving; math.Abs(got-table.Detail.Result.F) > 1e-5 {
				t.Errorf("F = %.6f by hand, %.6f from the method", got, table.Detail.Result.F)
			}
			if got, err := strconv.ParseFloat(rows[n+2][1], 64); err != nil || math.Abs(got-table.Detail.Result.F) > 1e-5 {
				t.Errorf("the file ends with F = %v (%v), want %v", rows[n+2][1], err, table.Detail.Result.F)
			}
		})
	}
}

// unitOf returns the unit of a heading, and what a level is of.
func unitOf(head string) string {
	unit := ""
	if i := strings.LastIndexByte(head, '('); i >= 0 {
		unit = head[i:]
	}
	if strings.HasPrefix(head, "level of ") {
		unit += head[len("level of ") : len("level of ")+1]
	}
	return unit
}

// TestWriteSlices: the printed table has units, sums, F, and only the columns that say something.
func TestWriteSlices(t *testing.T) {
	table := workedSlip(t, lem.Spencer)
	var b bytes.Buffer
	if err := WriteSlices(&b, []SliceTable{table}, Look{}); err != nil {
		t.Fatal(err)
	}
	out := b.String()
	f := FactorText(Number(table.Detail.Result.F))
	for _, want := range []string{
		"Slices of the critical slip: wet, spencer", "kPa", "deg", "\n sum ", "F = (sum of R)/(sum of D) = ", " = " + f + "; from the method: " + f,
		"free water", "surcharge", "level of H", "Between slices", "thrust", "m-alpha = cos(alpha)",
	} {
		if !strings.Contains(out, want) {
			t.Errorf("no %q in\n%s", want, out)
		}
	}
	if strings.Contains(out, "kv W  ") {
		t.Error("a column of zeros is printed")
	}
}

// TestInfluenceInFile: what the file holds is what the engine found.
func TestInfluenceInFile(t *testing.T) {
	v := &lem.Influence{Load: 10, F: 1.1, Points: []lem.InfluencePoint{
		{X: 1, Ground: 5, Inclination: 0.5, Drained: lem.Change{Formula: -0.1, Placed: -0.11, Removed: math.NaN()}},
		{X: 2, Ground: 4, Drained: lem.Change{Formula: 0.1, Placed: 0.12, Removed: -0.1}},
	}, Neutral: []lem.NeutralPoint{{X: 1.5, Ground: 4.5, Undrained: true, Differences: true, Inclination: 0.1}}}
	f := &File{Existing: Option{Situations: []Answer{{Name: "a"}, {Name: "b"}}}}
	f.SetInfluence([]*lem.Influence{nil, v})
	if f.Existing.Situations[0].Influence != nil {
		t.Error("an influence line where there is none")
	}
	got := f.Existing.Situations[1].Influence
	if got.Points[0].Drained.Removed.Known() || got.Points[0].Drained.Placed != -0.11 || got.Neutral[0].State != undrained || got.Neutral[0].By != "differences" {
		t.Errorf("%+v", got)
	}
	if least, most := got.extremes(); least != "1.00: -0.1100" || most != "2.00: +0.1200" {
		t.Errorf("worst %q, best %q", least, most)
	}
}
