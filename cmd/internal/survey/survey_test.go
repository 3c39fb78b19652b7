package survey

import (
	"bytes"
	"fmt"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"standfast/cmd/internal/casefile"
	"standfast/cmd/internal/dxf"
	"standfast/lem"
)

// told is a sketch in a line: ground, strata, waters.
func told(s *casefile.Sketch) string {
	line := func(l lem.Profile) string {
		var out []string
		for _, p := range l {
			out = append(out, fmt.Sprintf("%g,%g", p.X, p.Y))
		}
		return strings.Join(out, " ")
	}
	out := line(s.Ground)
	for _, t := range s.Strata {
		out += " / " + t.Name + ": " + line(t.Line)
	}
	for _, w := range s.Waters {
		out += " ~ " + w.Name + ": " + line(w.Line)
	}
	return out
}

func TestTable(t *testing.T) {
	tests := []struct{ name, src, want, note string }{
		{"two columns", "offset,level\n0,10\n20,5\n", "0,10 20,5", ""},
		{"without names", "0,10\n20,5.5\n", "0,10 20,5.5", "taken as offset and level"},
		{"units, small and capital letters, blanks", "Offset (m), LEVEL_m\r\n 0 , 10 \r\n20,+5.\r\n", "0,10 20,5", ""},
		{"a mark at the start and empty lines", "\xef\xbb\xbf\n x,y\n\n0,1\n,\n2,3\n\n", "0,1 2,3", ""},
		{"semicolons and decimal commas", "chainage;ground\n0;10,5\n20;5,25", "0,10.5 20,5.25", ""},
		{"tabs", "distance\televation\n0\t10,5\n20\t5", "0,10.5 20,5", ""},
		{
			"strata in any order and water", "offset,level,top of deep clay,water,Top of Upper Clay,water_high (m)\n0,10,2,8,6,9\n20,5,1,,4,6\n30,5,1,3,,\n",
			"0,10 20,5 30,5 / Upper Clay: 0,6 20,4 / deep clay: 0,2 20,1 30,1 ~ water: 0,8 30,3 ~ high: 0,9 20,6", "",
		},
		{"other columns", "point,offset,level,remark\n1,0,10,\"fence, old\"\n2,20,5,\"a \"\"b\"\"\"\n", "0,10 20,5", "columns left out: `point`, `remark`"},
		{"from right to left", "offset,level\n20,5\n20,8\n0,10\n", "0,10 20,8 20,5", "turned round"},
		{"a step", "offset,level\n0,10\n5,10\n5,6\n20,6\n", "0,10 5,10 5,6 20,6", ""},
		{"rows without ground", "offset,level,water a\n0,10,9\n10,,7\n20,5,5\n", "0,10 20,5 ~ a: 0,9 10,7 20,5", ""},
	}
	for _, c := range tests {
		t.Run(c.name, func(t *testing.T) {
			s, notes, err := Table("t.csv", []byte(c.src))
			if err != nil {
				t.Fatal(err)
			}
			if got := told(s); got != c.want {
				t.Errorf("got  %s\nwant %s", got, c.want)
			}
			if got := strings.Join(notes, "; "); got != c.note && !strings.Contains(got, c.note) || c.note == "" && got != "" {
				t.Errorf("it says %q, want %q", got, c.note)
			}
		})
	}
}

// checkFaults compares faults as "line:column message".
func checkFaults(t *testing.T, err error, want []string) {
	t.Helper()
	var got []string
	for _, f := range casefile.Faults(err) {
		got = append(got, fmt.Sprintf("%d:%d %s", f.Line, f.Column, f.Message))
	}
	if len(got) != len(want) {
		t.Fatalf("got %q, want %q", got, want)
	}
	for i := range want {
		if !strings.HasPrefix(got[i], want[i]) {
			t.Errorf("got %q, want %q", got[i], want[i])
		}
	}
}

func TestTableFaults(t *testing.T) {
	many := "offset,level\n" + strings.Repeat("1,2\n", casefile.MaxLinePoints+1)
	tests := []struct {
		name, src string
		want      []string
	}{
		{"empty", " \n\n", []string{"0:0 the file is empty"}},
		{"no level", "offset,height of tide\n0,1\n", []string{"1:1 no column holds the levels"}},
		{"no offset", "north,level\n0,1\n", []string{"1:1 no column holds the offsets"}},
		{"two levels", "x,y,level\n0,1,1\n", []string{"1:1 2 columns hold the levels"}},
		{"three columns without names", "0,1,2\n", []string{"1:1 the columns have no names"}},
		{"all faults at once", "offset,level\n0,ten\n5,3\nx,4\n6,1,2\n7,inf\n8,0x10\n9,1_0\n", []string{
			"2:3 level: `ten` is not", "4:1 offset: `x` is not", "5:1 has 3 cells", "6:3 level: `inf`", "7:3 level: `0x10`", "8:3 level: `1_0`",
		}},
		{"no offset in a row", "offset,level\n0,1\n,2\n", []string{"3:1 offset: is empty"}},
		{"forth and back", "offset,level\n0,1\n5,2\n4,2\n9,1\n", []string{"4:1 the offset 4 lies left of the row before, 5"}},
		{"back and forth", "offset,level\n9,1\n5,2\n6,2\n0,1\n", []string{"4:1 the offset 6 lies right of the row before, 5"}},
		{"one point", "offset,level\n0,1\n", []string{"1:1 the column `level` holds no line"}},
		{"an upright line", "offset,level\n3,1\n3,2\n", []string{"1:1 the column `level` holds no line"}},
		{"a stratum without points", "offset,level,top of sand\n0,1,\n2,2,\n", []string{"1:1 the column `top of sand` holds no line"}},
		{"far away", "offset,level\n0,1\n532000000,2\n", []string{"3:1 offset: 532000000 is out of bounds"}},
		{"not text", "offset,level\n0,\xff\n", []string{"2:1 a byte that is not text"}},
		{"a picture", "\x89PNG\r\n\x1a\n\x00\x00", []string{"1:1 a byte that is not text"}},
		{"too many points", many, []string{"2002:1 more than 2000 points"}},
		{"too large", strings.Repeat(" ", MaxSize+1), []string{"0:0 the file is larger than 50 MB"}},
	}
	for _, c := range tests {
		t.Run(c.name, func(t *testing.T) {
			s, _, err := Table("t.csv", []byte(c.src))
			if s != nil {
				t.Error("a sketch in spite of faults")
			}
			checkFaults(t, err, c.want)
		})
	}
}

// end parts the lines of a layer.
var end = [2]float64{-1, -1}

// drawn returns a DXF with lines on layers.
func drawn(t *testing.T, lines map[string][][2]float64) []byte {
	t.Helper()
	var d dxf.Drawing
	var layers []string
	for l := range lines {
		layers = append(layers, l)
	}
	slices.Sort(layers)
	for _, l := range layers {
		var points []dxf.Point
		for _, p := range append(lines[l], end) {
			if p == end {
				d.Polyline(l, points, false)
				points = nil
				continue
			}
			points = append(points, dxf.Point{X: p[0], Y: p[1]})
		}
	}
	var b bytes.Buffer
	if err := d.Write(&b); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

func TestDrawing(t *testing.T) {
	src := drawn(t, map[string][][2]float64{
		"GROUND": {{5, 10}, {5, 6}, end, {5, 6}, {20, 6.0004}, {20, 6.0004}, end, {5, 10}, {0, 10}, end, {50, 6}, {20, 6}},
		"CLAY":   {{0, 2}, {50, 1}, end, {50, 3}, {0, 4}},
		"GWL":    {{0, 8}, {50, 5}},
		"TITLE":  {{0, 0}, {1, 1}},
	})
	tests := []struct {
		name string
		m    Mapping
		want string
	}{
		{"ground alone, joined", Mapping{Ground: "ground"}, "0,10 5,10 5,6 20,6.0004 50,6"},
		{
			"with names",
			Mapping{Ground: "GROUND", Strata: []Layer{{"CLAY", "stiff clay"}}, Waters: []Layer{{"GWL", "high"}}},
			"0,10 5,10 5,6 20,6.0004 50,6 / stiff clay 1: 0,4 50,3 / stiff clay 2: 0,2 50,1 ~ high: 0,8 50,5",
		},
		{"names of layers and a scale", Mapping{Ground: "GROUND", Waters: []Layer{{"GWL", ""}}, Scale: 0.1}, "0,1 0.5,1 0.5,0.6 2,0.60004 5,0.6 ~ GWL: 0,0.8 5,0.5"},
	}
	for _, c := range tests {
		t.Run(c.name, func(t *testing.T) {
			s, _, err := Drawing("d.dxf", src, c.m)
			if err != nil {
				t.Fatal(err)
			}
			if got := told(s); got != c.want {
				t.Errorf("got  %s\nwant %s", got, c.want)
			}
		})
	}
}

func TestDrawingFaults(t *testing.T) {
	src := drawn(t, map[string][][2]float64{
		"GAP": {{0, 10}, {5, 10}, end, {6, 10}, {9, 9}}, "BACK": {{0, 1}, {5, 2}, {4, 3}, {9, 9}}, "UP": {{1, 1}, {1, 2}}, "FAR": {{0, 0}, {532e6, 0}},
		"G": {{0, 1}, {9, 1}},
	})
	inches := bytes.Replace(src, []byte("  9\r\n$EXTMIN"), []byte("  9\r\n$INSUNITS\r\n 70\r\n1\r\n  9\r\n$EXTMIN"), 1)
	millimetres := bytes.Replace(src, []byte("  9\r\n$EXTMIN"), []byte("  9\r\n$INSUNITS\r\n 70\r\n4\r\n  9\r\n$EXTMIN"), 1)
	at := func(layer string) string { // The line on which the first polyline of a layer starts.
		i := bytes.Index(src, []byte("POLYLINE\r\n  8\r\n"+layer))
		return fmt.Sprint(bytes.Count(src[:i], []byte("\n"))+1) + ":1 "
	}
	tests := []struct {
		name string
		src  []byte
		m    Mapping
		want []string
		hint string
	}{
		{"no ground named", src, Mapping{}, []string{"0:0 which layer is the ground"}, "layers with lines: BACK (1), FAR (1), G (1), GAP (2), UP (1)"},
		{"no such layer", src, Mapping{Ground: "GRND"}, []string{`0:0 the layer "GRND" holds no line`}, "GAP (2)"},
		{"lines that do not meet", src, Mapping{Ground: "GAP"}, []string{`0:0 the layer "GAP" of the ground holds 2 lines that do not meet, such as at (5, 10) and (6, 10)`}, "join them"},
		{"an overhang", src, Mapping{Ground: "BACK"}, []string{at("BACK") + `the line on layer "BACK" runs back from x = 5 to 4`}, "left to right"},
		{"upright", src, Mapping{Ground: "UP"}, []string{at("UP") + `the line on layer "UP" is upright`}, ""},
		{"far away", src, Mapping{Ground: "FAR"}, []string{at("FAR") + `the point (5.32e+08, 0) on layer "FAR" is out of bounds`}, "--scale"},
		{"millimetres", millimetres, Mapping{Ground: "G"}, []string{"0:0 the drawing says that it is in millimetres"}, "--scale 0.001"},
		{"inches", inches, Mapping{Ground: "G"}, []string{"0:0 the drawing says that it is not in metres (unit code 1)"}, "--scale"},
		{"no drawing", []byte("offset,level\n"), Mapping{Ground: "G"}, []string{`1:1 "offset,level" is no group code`}, ""},
		{"too large", make([]byte, MaxSize+1), Mapping{Ground: "G"}, []string{"0:0 the file is larger than 50 MB"}, ""},
	}
	for _, c := range tests {
		t.Run(c.name, func(t *testing.T) {
			s, _, err := Drawing("d.dxf", c.src, c.m)
			if s != nil {
				t.Error("a sketch in spite of faults")
			}
			checkFaults(t, err, c.want)
			if got := casefile.Faults(err)[0].Suggestion; !strings.Contains(got, c.hint) {
				t.Errorf("it suggests %q, want %q", got, c.hint)
			}
		})
	}
	if _, _, err := Drawing("d.dxf", millimetres, Mapping{Ground: "G", Scale: 1}); err != nil {
		t.Errorf("with a scale given: %v", err)
	}
}

// Pieces of a line come together again however they are cut, turned and shuffled.
func TestChains(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		want := lem.Profile{{X: 0, Y: 10}}
		for range rapid.IntRange(1, 12).Draw(t, "points") {
			last := want[len(want)-1]
			want = append(want, lem.Point{
				X: last.X + float64(rapid.IntRange(1, 5).Draw(t, "dx")), Y: last.Y + float64(rapid.IntRange(-3, 3).Draw(t, "dy")),
			})
		}
		var pieces []piece
		for start := 0; start+1 < len(want); {
			end := rapid.IntRange(start+1, len(want)-1).Draw(t, "cut")
			p := piece{points: slices.Clone([]lem.Point(want[start : end+1]))}
			if rapid.Bool().Draw(t, "turned") {
				slices.Reverse(p.points)
			}
			pieces = append(pieces, p)
			start = end
		}
		pieces = rapid.Permutation(pieces).Draw(t, "order")
		got := chains(pieces)
		d := &drawingReader{}
		if len(got) != 1 {
			t.Fatalf("%d lines", len(got))
		}
		if line, ok := d.profile("L", got[0]); !ok || !slices.Equal(line, want) {
			t.Fatalf("got %v, want %v", line, want)
		}
	})
}

// readable checks that what was read makes a skeleton that holds it.
func readable(t *testing.T, s *casefile.Sketch) {
	for _, l := range append(append([]casefile.NamedLine{{Name: "ground", Line: s.Ground}}, s.Strata...), s.Waters...) {
		if len(l.Line) < 2 || len(l.Line) > casefile.MaxLinePoints || !slices.IsSortedFunc(l.Line, func(a, b lem.Point) int {
			switch {
			case a.X < b.X:
				return -1
			case a.X > b.X:
				return 1
			}
			return 0
		}) {
			t.Fatalf("%q is no line from left to right: %v", l.Name, l.Line)
		}
	}
	_, err := casefile.Parse("s.yaml", casefile.Skeleton(s))
	for _, f := range casefile.Faults(err) {
		if !strings.Contains(f.Message, "is empty") && !strings.Contains(f.Message, "the key `slope` is missing") {
			t.Fatalf("the skeleton has a fault of its own: %v", f)
		}
	}
}

func FuzzTable(f *testing.F) {
	f.Add([]byte("offset,level,top of clay,water high\n0,10,5,9\n20,5,2,4\n"))
	f.Add([]byte("offset;level\n0;10,5\n\"20\";5\n"))
	f.Add([]byte("0,1\n2,3"))
	f.Fuzz(func(t *testing.T, src []byte) {
		if s, _, err := Table("t.csv", src); err == nil {
			readable(t, s)
		} else if len(casefile.Faults(err)) == 0 {
			t.Fatalf("an error without a place: %v", err)
		}
	})
}

func FuzzDrawing(f *testing.F) {
	var d dxf.Drawing
	d.Polyline("G", []dxf.Point{{X: 0, Y: 10}, {X: 20, Y: 5}}, false)
	d.Line("G", dxf.Point{X: 20, Y: 5}, dxf.Point{X: 30, Y: 5})
	d.Polyline("W", []dxf.Point{{X: 0, Y: 8}, {X: 20, Y: 4}}, false)
	var b bytes.Buffer
	if err := d.Write(&b); err != nil {
		f.Fatal(err)
	}
	f.Add(b.Bytes())
	f.Fuzz(func(t *testing.T, src []byte) {
		m := Mapping{Ground: "G", Strata: []Layer{{"W", "sand"}}, Waters: []Layer{{"W", ""}}}
		if s, _, err := Drawing("d.dxf", src, m); err == nil {
			readable(t, s)
		} else if len(casefile.Faults(err)) == 0 {
			t.Fatalf("an error without a place: %v", err)
		}
	})
}
