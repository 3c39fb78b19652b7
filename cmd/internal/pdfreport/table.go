package pdfreport

import "strings"

// column is a column of a table.
type column struct {
	head  string // Lines are parted by "\n".
	right bool   // Numbers stand to the right, and are not broken.
}

// row is a row of a table.
type row struct {
	cells []string
	bold  bool
	inks  map[int]colour // Of cells that differ.
}

func cells(s ...string) row { return row{cells: s} }

// text and number are columns by what stands in them.
func text(head string) column   { return column{head: head} }
func number(head string) column { return column{head: head, right: true} }

// cellGap is kept between columns, points.
const cellGap = 7.0

// style is how a table is set.
type style struct {
	font         face
	above, below float64 // Between text and the rules of its row, points.
	every        int     // A rule stands below so many rows.
}

var (
	roomy = style{faceTable, 1.3, 1.7, 1}
	dense = style{face{6.9, false}, 0.3, 0.5, 5} // So that the slices of most slips stand on one page.
)

// table writes a table as wide as the page, its head again on every page that it runs on to.
func (b *book) table(columns []column, rows []row) {
	b.upright()
	b.tableIn(roomy, columns, rows, b.left(), b.width())
	b.y += 5
}

// tableIn writes a table at the left x in a width.
func (b *book) tableIn(s style, columns []column, rows []row, x, width float64) {
	widths, need := b.widths(s.font, columns, rows, width)
	if need > 1 { // Too much for this type size.
		s.font.size /= need
		widths, _ = b.widths(s.font, columns, rows, width)
	}
	head := make([][]string, len(columns))
	strong := style{face{s.font.size, true}, s.above, s.below, 1}
	for i, c := range columns {
		for _, l := range strings.Split(c.head, "\n") {
			head[i] = append(head[i], b.wrap(strong.font, l, widths[i])...)
		}
	}
	writeHead := func() {
		b.tableRow(strong, columns, head, widths, x, row{})
		b.rule(x, x+width, b.y-0.4, 0.7, rule)
	}
	b.together(strong.height(head) + b.whole(s, rows, widths))
	writeHead()
	for i := range rows {
		r := &rows[i]
		rs := s
		rs.font.bold = s.font.bold || r.bold
		lines := b.broken(rs.font, *r, widths)
		if b.y+rs.height(lines) > contentFoot {
			b.turn(b.page().fold)
			writeHead()
		}
		b.tableRow(rs, columns, lines, widths, x, *r)
		if (i+1)%s.every == 0 || i == len(rows)-1 {
			b.rule(x, x+width, b.y-0.4, 0.35, ruleThi)
		}
	}
}

// wholeRows is the number of rows up to which a table is not parted between pages.
const wholeRows = 8

// whole returns the height of the rows that stay with the head of their table: all of a short table, the first two of a long one.
func (b *book) whole(s style, rows []row, widths []float64) float64 {
	if len(rows) > wholeRows {
		rows = rows[:2]
	}
	var h float64
	for i := range rows {
		h += s.height(b.broken(s.font, rows[i], widths))
	}
	return h
}

// broken returns the lines of the cells of a row.
func (b *book) broken(f face, r row, widths []float64) [][]string {
	out := make([][]string, len(r.cells))
	for i, c := range r.cells {
		out[i] = b.wrap(f, c, widths[i])
	}
	return out
}

// height returns the height of a row of cells.
func (s *style) height(lines [][]string) float64 {
	most := 1
	for _, l := range lines {
		most = max(most, len(l))
	}
	return s.above + float64(most)*s.font.lead() + s.below
}

// tableRow writes a row and moves on.
func (b *book) tableRow(s style, columns []column, lines [][]string, widths []float64, x float64, r row) {
	for i, cell := range lines {
		c := ink
		if own, ok := r.inks[i]; ok {
			c = own
		}
		for k, l := range cell {
			y := b.y + s.above + float64(k)*s.font.lead()
			if columns[i].right {
				b.putRight(s.font, c, x+widths[i], y, l)
			} else {
				b.put(s.font, c, x, y, l)
			}
		}
		x += widths[i] + cellGap
	}
	b.y += s.height(lines)
}

// widths shares a width out among columns: numbers have the room that they need, texts share the rest by what they would take, none less than
// its longest word. need is what the least widths take, over what there is; above 1 they are cut.
func (b *book) widths(f face, columns []column, rows []row, width float64) (widths []float64, need float64) {
	n := len(columns)
	full, least := make([]float64, n), make([]float64, n)
	strong := face{f.size, true}
	for i, c := range columns {
		see := func(f face, s string, whole bool) {
			full[i] = max(full[i], b.measure(f, s))
			for _, word := range words(s) {
				least[i] = max(least[i], b.measure(f, word))
			}
			if whole {
				least[i] = full[i]
			}
		}
		for _, l := range strings.Split(c.head, "\n") {
			see(strong, l, c.right)
		}
		for k := range rows {
			rf := f
			rf.bold = rf.bold || rows[k].bold
			see(rf, rows[k].cells[i], c.right)
		}
	}
	width -= cellGap * float64(n-1)
	for _, w := range least {
		need += w / width
	}
	return shared(full, least, width), need
}

// shared gives every column its least width and shares the rest by what the columns lack, or what is left over among them.
func shared(full, least []float64, width float64) []float64 {
	var need, want float64
	for i := range full {
		need += least[i]
		want += full[i]
	}
	out := make([]float64, len(full))
	for i := range out {
		switch {
		case need >= width:
			out[i] = least[i] * width / need
		case want > width:
			out[i] = least[i] + (full[i]-least[i])*(width-need)/(want-need)
		default:
			out[i] = full[i] + (width-want)*full[i]/want
		}
	}
	return out
}
