package report

import (
	"fmt"
	"io"
	"strings"
	"unicode/utf8"

	"github.com/jedib0t/go-pretty/v6/table"
	"github.com/jedib0t/go-pretty/v6/text"
)

// Look says how text is laid out. The zero value is for a file or a pipe.
type Look struct {
	Width  int  // Columns; 0: DefaultWidth.
	Colour bool // For a terminal that shows colours.
}

// DefaultWidth is the width of printed text when nothing says otherwise.
const DefaultWidth = 110

// minWidth is the width below which text is not squeezed further.
const minWidth = 60

// printer writes to w and keeps the first error.
type printer struct {
	w     io.Writer
	look  Look
	width int
	err   error
}

func newPrinter(w io.Writer, look Look) *printer {
	p := &printer{w: w, look: look, width: look.Width}
	if p.width == 0 {
		p.width = DefaultWidth
	}
	p.width = max(p.width, minWidth)
	return p
}

// line writes a line as it is.
func (p *printer) line(s string) {
	if p.err == nil {
		_, p.err = fmt.Fprintln(p.w, strings.TrimRight(s, " "))
	}
}

// para writes text wrapped to the width, its first line behind lead and the others indented as far as lead is wide.
func (p *printer) para(lead, body string) {
	indent := strings.Repeat(" ", utf8.RuneCountInString(lead))
	for i, l := range wrap(body, p.width-len(indent)) {
		if i == 0 {
			p.line(lead + l)
		} else {
			p.line(indent + l)
		}
	}
}

// heading writes a heading behind an empty line.
func (p *printer) heading(s string) {
	p.line("")
	for _, l := range wrap(s, p.width) {
		if p.look.Colour {
			l = text.Colors{text.Bold}.Sprint(l)
		}
		p.line(l)
	}
}

// wrap breaks text between words into lines of at most width characters; a longer word has a line of its own.
func wrap(s string, width int) []string {
	var lines []string
	line := ""
	for _, word := range strings.Fields(s) {
		if line != "" && utf8.RuneCountInString(line)+1+utf8.RuneCountInString(word) > width {
			lines = append(lines, line)
			line = ""
		}
		if line != "" {
			line += " "
		}
		line += word
	}
	return append(lines, line)
}

// column is a column of a printed table.
type column struct {
	head  string
	right bool // Numbers stand to the right.
	most  int  // Width beyond which a cell is broken; 0: none.
}

// table writes rows under a ruled header.
func (p *printer) table(columns []column, rows []table.Row) {
	t := table.NewWriter()
	style := table.StyleDefault
	style.Format.Header = text.FormatDefault
	style.Options = table.Options{SeparateHeader: true}
	style.Box.PaddingLeft, style.Box.PaddingRight = " ", " "
	style.Box.MiddleSeparator, style.Box.MiddleHorizontal = "-", "-"
	t.SetStyle(style)
	head := make(table.Row, len(columns))
	configs := make([]table.ColumnConfig, len(columns))
	for i, c := range columns {
		head[i] = c.head
		configs[i] = table.ColumnConfig{Number: i + 1, WidthMax: c.most, WidthMaxEnforcer: text.WrapSoft, VAlignHeader: text.VAlignBottom}
		if c.right {
			configs[i].Align, configs[i].AlignHeader = text.AlignRight, text.AlignRight
		}
	}
	t.AppendHeader(head)
	t.AppendRows(rows)
	t.SetColumnConfigs(configs)
	for _, l := range strings.Split(t.Render(), "\n") {
		p.line(l)
	}
}

// status returns the word of a status, coloured if the look has colours.
func (p *printer) status(s string) string {
	if !p.look.Colour {
		return s
	}
	switch {
	case strings.HasPrefix(s, "meets"):
		return text.Colors{text.FgGreen}.Sprint(s)
	case strings.HasPrefix(s, "unresolved"):
		return text.Colors{text.FgYellow}.Sprint(s)
	}
	return text.Colors{text.FgRed}.Sprint(s)
}

// cautions closes a report.
func (p *printer) cautions(list []string) {
	p.heading("Cautions")
	for _, c := range list {
		p.para(" - ", c)
	}
}
