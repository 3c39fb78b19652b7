package drawing

import (
	"math"
	"strings"
	"sync"
	"unicode"

	"codeberg.org/go-fonts/liberation/liberationsansbold"
	"codeberg.org/go-fonts/liberation/liberationsansregular"
	"golang.org/x/image/font/opentype"
	"golang.org/x/image/font/sfnt"
	"gonum.org/v1/plot/font"

	xfont "golang.org/x/image/font"
)

const quarterTurn = math.Pi / 2

// leading is the distance between baselines as a multiple of the type size; Liberation Sans needs 1.12.
const leading = 1.17

// face is a type size of Liberation Sans, points.
type face struct {
	size float64
	bold bool
}

var faces = sync.OnceValue(func() [2]*opentype.Font {
	var out [2]*opentype.Font
	for i, ttf := range [][]byte{liberationsansregular.TTF, liberationsansbold.TTF} {
		f, err := opentype.Parse(ttf)
		if err != nil {
			panic("drawing: the built-in font cannot be read: " + err.Error())
		}
		out[i] = f
	}
	return out
})

func (f face) vg() font.Face {
	out := font.Face{
		Font: font.Font{Typeface: "Liberation", Variant: "Sans", Size: font.Length(f.size)},
		Face: faces()[0],
	}
	if f.bold {
		out.Font.Weight = xfont.WeightBold
		out.Face = faces()[1]
	}
	return out
}

// width returns the width of a line of text, points.
func (f face) width(s string) float64 {
	v := f.vg()
	return float64(v.Width(s))
}

// ascent and descent are those of Liberation Sans, as shares of the type size.
func (f face) ascent() float64  { return 0.905 * f.size }
func (f face) descent() float64 { return 0.212 * f.size }

// lineHeight is the distance between the baselines of two lines, points.
func (f face) lineHeight() float64 { return leading * f.size }

// noBreak is a blank at which no line is broken.
const noBreak = '\u00a0'

// Printable returns a text with what cannot be set in Liberation Sans replaced, as drawings show it.
func Printable(s string) string { return clean(s) }

// clean replaces what cannot be set in the font or written to XML, so that a text drawn has the width that was measured.
func clean(s string) string {
	if !strings.ContainsFunc(s, func(r rune) bool { return r < ' ' || r > '~' }) { // The font has all of ASCII.
		return s
	}
	var buf sfnt.Buffer
	f := faces()[0]
	return strings.Map(func(r rune) rune {
		if r == noBreak {
			return r
		}
		if unicode.IsSpace(r) || unicode.IsControl(r) {
			return ' '
		}
		if i, err := f.GlyphIndex(&buf, r); err != nil || i == 0 {
			return '?'
		}
		return r
	}, strings.ToValidUTF8(s, "?"))
}

// ellipsis marks a text that was cut short.
const ellipsis = "…"

// fit shortens s to a width, points, marking the cut.
func (f face) fit(s string, width float64) string {
	if f.width(s) <= width {
		return s
	}
	r := []rune(s)
	lo, hi := 0, len(r) // The first lo runes fit, the first hi do not.
	for hi-lo > 1 {
		if m := (lo + hi) / 2; f.width(string(r[:m])+ellipsis) <= width {
			lo = m
		} else {
			hi = m
		}
	}
	return strings.TrimRight(string(r[:lo]), " ") + ellipsis
}

// wrap breaks s at blanks into lines of at most width, points, and shortens what does not fit into maxLines.
func (f face) wrap(s string, width float64, maxLines int) []string {
	words := strings.FieldsFunc(s, func(r rune) bool { return r == ' ' })
	var lines []string
	for len(words) > 0 && len(lines) < maxLines-1 {
		n := 1
		for n < len(words) && f.width(strings.Join(words[:n+1], " ")) <= width {
			n++
		}
		if n == len(words) {
			break
		}
		lines = append(lines, f.fit(strings.Join(words[:n], " "), width))
		words = words[n:]
	}
	if len(words) > 0 {
		lines = append(lines, f.fit(strings.Join(words, " "), width))
	}
	return lines
}
