package survey

import (
	"bytes"
	"math"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"unicode/utf8"

	"standfast/cmd/internal/casefile"
	"standfast/lem"
)

// Table reads a table of offset and level from CSV. Its first row names the columns: offset and level, and any number of tops of strata
// ("top of stiff clay") and water lines ("water high"); without names there are two columns, offset and level. A cell may be empty: the line
// has no point there then. Commas, semicolons and tabs part the cells; with semicolons and tabs decimals may stand behind a comma. It
// returns what it says besides, such as columns that it left out.
func Table(file string, src []byte) (*casefile.Sketch, []string, error) {
	t := &tableReader{faults: faults{file: file}}
	if !t.checkSize(src) {
		return nil, nil, t.err()
	}
	src = bytes.TrimPrefix(src, []byte("\xef\xbb\xbf"))
	t.rest = src
	t.separator = separatorOf(src)
	if t.head() {
		t.body()
	}
	s := t.sketch()
	if len(t.list) > 0 {
		return nil, nil, t.err()
	}
	return s, t.notes, nil
}

// tableReader reads a table row by row.
type tableReader struct {
	faults
	rest      []byte
	separator string
	line      int
	text      string // Line in hand.
	columns   []column
	held      bool // The line in hand is to be read again, as values.
	headLine  int
	headText  string
	offsets   []float64
	lines     []int // Of the offsets.
	texts     []string
	notes     []string
}

// column is a column of the table.
type column struct {
	kind   kind
	name   string
	title  string // As it is written.
	points []int  // Rows that have a value.
	values []float64
}

// kind is what a column holds.
type kind uint8

const (
	ignored kind = iota
	offsetColumn
	levelColumn
	stratumColumn
	waterColumn
)

// separatorOf returns what parts the cells: what stands most often in the first line.
func separatorOf(src []byte) string {
	for len(src) > 0 {
		line, rest, _ := bytes.Cut(src, []byte("\n"))
		if len(bytes.TrimSpace(line)) == 0 {
			src = rest
			continue
		}
		best, most := ",", 0
		for _, s := range []string{";", "\t", ","} {
			if n := bytes.Count(line, []byte(s)); n > most {
				best, most = s, n
			}
		}
		return best
	}
	return ","
}

// next reads the next line that is not empty.
func (t *tableReader) next() bool {
	if t.held {
		t.held = false
		return true
	}
	for len(t.rest) > 0 {
		line, rest, _ := bytes.Cut(t.rest, []byte("\n"))
		t.rest = rest
		t.line++
		t.text = string(line)
		if !utf8.Valid(line) || bytes.IndexByte(line, 0) >= 0 {
			t.add(t.line, t.text, "save the file as plain text in UTF-8", "a byte that is not text")
			t.rest = nil
			return false
		}
		if strings.Trim(t.text, " \r\t;,\"") != "" {
			return true
		}
	}
	return false
}

// cells parts the line in hand. Quotes about a cell are taken off; a separator in them parts nothing.
func (t *tableReader) cells() []string {
	var out []string
	for rest := strings.TrimRight(t.text, "\r"); ; {
		var cell, more string
		found := false
		if inner, ok := strings.CutPrefix(strings.TrimLeft(rest, " "), `"`); ok {
			if end := strings.Index(inner, `"`+t.separator); end >= 0 {
				cell, more, found = inner[:end], inner[end+1+len(t.separator):], true
			} else {
				cell = strings.TrimSuffix(strings.TrimRight(inner, " "), `"`)
			}
			cell = strings.ReplaceAll(cell, `""`, `"`)
		} else {
			cell, more, found = strings.Cut(rest, t.separator)
		}
		out = append(out, strings.TrimSpace(cell))
		if !found {
			return out
		}
		rest = more
	}
}

// maxColumns bounds the columns of a table; far fewer make sense.
const maxColumns = 200

// head reads the names of the columns and reports whether the rows can be read.
func (t *tableReader) head() bool {
	if !t.next() {
		if len(t.list) == 0 {
			t.add(0, "", "write a row of names, `offset,level`, and a row a point", "the file is empty")
		}
		return false
	}
	t.headLine, t.headText = t.line, t.text
	names := t.cells()
	if len(names) > maxColumns {
		t.add(t.line, t.text, "", "has %d columns; at most %d are read", len(names), maxColumns)
		return false
	}
	if _, err := t.number(names[0]); err == "" {
		if len(names) != 2 {
			t.add(t.line, t.text, "write a first row that names the columns, such as `offset,level,top of stiff clay,water high`",
				"the columns have no names, and there are %d of them", len(names))
			return false
		}
		t.columns = []column{{kind: offsetColumn, title: "offset"}, {kind: levelColumn, title: "level"}}
		t.notes = append(t.notes, "the columns have no names: taken as offset and level")
		t.held = true
		return true
	}
	var left []string
	for _, n := range names {
		c := columnOf(n)
		if c.kind == ignored && n != "" {
			left = append(left, "`"+shown(n)+"`")
		}
		t.columns = append(t.columns, c)
	}
	if len(left) > 0 {
		t.notes = append(t.notes, "columns left out: "+strings.Join(left, ", "))
	}
	return t.checkColumns()
}

// unitEnd is a unit behind the name of a column: "offset (m)", "level_m".
var unitEnd = regexp.MustCompile(`(?i)[ _]*(\(m\)|\[m\]|[ _]m)$`)

// Names of columns, in small letters without a unit.
var (
	offsetNames = []string{"offset", "x", "distance", "chainage", "dist"}
	levelNames  = []string{"level", "y", "z", "elevation", "height", "ground", "ground level"}
)

func columnOf(title string) column {
	c := column{title: title}
	plain := strings.Join(strings.Fields(strings.ReplaceAll(unitEnd.ReplaceAllString(title, ""), "_", " ")), " ")
	low := strings.ToLower(plain)
	name := func(prefix string) (string, bool) {
		if !strings.HasPrefix(low, prefix) || len(low) != len(plain) {
			return "", false
		}
		return strings.Trim(plain[len(prefix):], " :"), true
	}
	switch {
	case slices.Contains(offsetNames, low):
		c.kind = offsetColumn
	case slices.Contains(levelNames, low):
		c.kind = levelColumn
	default:
		for _, prefix := range []string{"top of ", "stratum ", "top "} {
			if n, ok := name(prefix); ok && n != "" {
				c.kind, c.name = stratumColumn, n
				return c
			}
		}
		if n, ok := name("water"); ok {
			c.kind, c.name = waterColumn, strings.TrimPrefix(n, "line ")
			if n == "" {
				c.name = "water"
			}
		}
	}
	return c
}

// checkColumns refuses a table without offsets or levels, or with two of them.
func (t *tableReader) checkColumns() bool {
	for _, k := range []struct {
		kind  kind
		what  string
		names []string
	}{{offsetColumn, "offsets", offsetNames}, {levelColumn, "levels of the ground", levelNames}} {
		n := 0
		for _, c := range t.columns {
			if c.kind == k.kind {
				n++
			}
		}
		switch {
		case n == 0:
			t.add(t.line, t.text, "name it `"+strings.Join(k.names, "`, `")+"`", "no column holds the %s", k.what)
		case n > 1:
			t.add(t.line, t.text, "keep the name for one of them", "%d columns hold the %s", n, k.what)
		}
	}
	if len(t.byKind(stratumColumn)) > casefile.MaxStrata || len(t.byKind(waterColumn)) > casefile.MaxWaters {
		t.add(t.line, t.text, "", "has more strata or water lines than a case may have: %d and %d", casefile.MaxStrata, casefile.MaxWaters)
	}
	return len(t.list) == 0
}

func (t *tableReader) byKind(k kind) []*column {
	var out []*column
	for i := range t.columns {
		if t.columns[i].kind == k {
			out = append(out, &t.columns[i])
		}
	}
	return out
}

// body reads the rows of points.
func (t *tableReader) body() {
	for !t.full() && t.next() {
		cells := t.cells()
		if len(cells) > len(t.columns) && strings.Join(cells[len(t.columns):], "") != "" {
			t.add(t.line, t.text, "write decimals behind a point; part cells as the first row does", "has %d cells, and the first row has %d", len(cells), len(t.columns))
			continue
		}
		if len(t.offsets) == casefile.MaxLinePoints {
			t.add(t.line, t.text, "keep the points at which the ground changes slope", "more than %d points", casefile.MaxLinePoints)
			return
		}
		t.row(cells)
	}
}

// row reads a row of points.
func (t *tableReader) row(cells []string) {
	row := len(t.offsets)
	t.offsets = append(t.offsets, math.NaN())
	t.lines, t.texts = append(t.lines, t.line), append(t.texts, t.text)
	for i := range t.columns {
		c := &t.columns[i]
		if c.kind == ignored || i >= len(cells) || cells[i] == "" && c.kind != offsetColumn {
			continue
		}
		v, wrong := t.number(cells[i])
		if wrong != "" {
			t.addAt(t.line, t.columnOfCell(i), t.text, "", "%s: %s", c.title, wrong)
			continue
		}
		if c.kind == offsetColumn {
			t.offsets[row] = v
			continue
		}
		c.points, c.values = append(c.points, row), append(c.values, v)
	}
}

// columnOfCell returns where a cell of the line in hand starts, from 1, in characters.
func (t *tableReader) columnOfCell(i int) int {
	at, rest := 0, t.text
	for range i {
		before, after, ok := strings.Cut(rest, t.separator)
		if !ok {
			break
		}
		at += len(before) + len(t.separator)
		rest = after
	}
	return utf8.RuneCountInString(t.text[:at]) + 1
}

var (
	numberRule  = regexp.MustCompile(`^[-+]?([0-9]+\.?[0-9]*|\.[0-9]+)([eE][-+]?[0-9]+)?$`)
	decimalRule = regexp.MustCompile(`^[-+]?[0-9]+,[0-9]+$`)
)

// number reads a cell; it returns what is wrong with it, empty if nothing is.
func (t *tableReader) number(s string) (v float64, wrong string) {
	if t.separator != "," && decimalRule.MatchString(s) {
		s = strings.Replace(s, ",", ".", 1)
	}
	if s == "" {
		return 0, "is empty"
	}
	if !numberRule.MatchString(s) {
		return 0, "`" + shown(s) + "` is not a number"
	}
	v, err := strconv.ParseFloat(s, 64)
	if err != nil || math.Abs(v) > casefile.MaxCoordinate {
		return 0, s + " is out of bounds: take the same round number off all coordinates"
	}
	return v + 0, ""
}

// sketch makes the lines of the columns.
func (t *tableReader) sketch() *casefile.Sketch {
	if len(t.list) > 0 {
		return nil
	}
	reversed := t.checkOrder()
	s := &casefile.Sketch{}
	for i := range t.columns {
		c := &t.columns[i]
		if c.kind < levelColumn {
			continue
		}
		line := make(lem.Profile, len(c.points))
		for k, row := range c.points {
			line[k] = lem.Point{X: t.offsets[row], Y: c.values[k]}
		}
		if reversed {
			slices.Reverse(line)
		}
		if len(line) < 2 || line[0].X == line[len(line)-1].X {
			t.add(t.headLine, t.headText, "give it two points of different offsets, or take the column out", "the column `%s` holds no line", shown(c.title))
			continue
		}
		switch c.kind {
		case levelColumn:
			s.Ground = line
		case stratumColumn:
			s.Strata = append(s.Strata, casefile.NamedLine{Name: c.name, Line: line})
		case waterColumn:
			s.Waters = append(s.Waters, casefile.NamedLine{Name: c.name, Line: line})
		case ignored, offsetColumn:
		}
	}
	sortStrata(s)
	return s
}

// checkOrder refuses offsets that run forth and back, and reports whether all of them run from right to left.
func (t *tableReader) checkOrder() (reversed bool) {
	n := len(t.offsets)
	if n == 0 {
		return false
	}
	reversed = t.offsets[n-1] < t.offsets[0]
	if reversed {
		t.notes = append(t.notes, "the rows run from right to left: turned round")
	}
	for i := 1; i < n && !t.full(); i++ {
		a, b := t.offsets[i-1], t.offsets[i]
		if b < a != reversed && b != a {
			way := "left"
			if reversed {
				way = "right"
			}
			t.add(t.lines[i], t.texts[i], "sort the rows by offset", "the offset %v lies %s of the row before, %v", b, way, a)
		}
	}
	return reversed
}
