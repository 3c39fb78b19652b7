package drawing

import "image/color"

// key is the list of what is drawn.
type key struct{ entries []keyEntry }

// keyEntry is one line of the key: a sample and its meaning.
type keyEntry struct {
	sample func(s *sheet, b Box)
	lines  []string
}

// Measures of the key, points.
const (
	sampleWidth  = 26.0
	sampleHeight = 8.5
	sampleGap    = 5.0
	keyRow       = 2.5 // between entries
	keyColumn    = 12.0
)

// has reports whether the key names txt already.
func (k *key) has(txt string) bool {
	for _, e := range k.entries {
		if e.lines[0] == txt {
			return true
		}
	}
	return false
}

func (k *key) add(txt string, sample func(s *sheet, b Box)) {
	if !k.has(txt) {
		k.entries = append(k.entries, keyEntry{sample, []string{txt}})
	}
}

// addLine names a line drawn with a pen.
func (k *key) addLine(txt string, p pen) {
	k.add(txt, func(s *sheet, b Box) {
		y := b.centre().Y
		s.add(stroke{p, [][]xy{{{b.MinX, y}, {b.MaxX, y}}}})
	})
}

// addHatch names an area by its fill and hatch.
func (k *key) addHatch(txt string, tint color.NRGBA, p pen, angle float64) {
	k.add(txt, func(s *sheet, b Box) {
		rings := [][]xy{b.corners()}
		s.add(fill{tint, rings}, stroke{p, hatch(angle, hatchSpacing, rings)}, boxLine(b))
	})
}

// addTint names an area by its fill.
func (k *key) addTint(txt string, tint color.NRGBA) {
	k.add(txt, func(s *sheet, b Box) { s.add(fill{tint, [][]xy{b.corners()}}, boxLine(b)) })
}

func boxLine(b Box) mark {
	return stroke{strataPen, [][]xy{append(b.corners(), b.corners()[0])}}
}

// height returns the height of an entry, points.
func (e *keyEntry) height() float64 {
	return max(sampleHeight, float64(len(e.lines)-1)*smallFace.lineHeight()+smallFace.ascent()+smallFace.descent()) + keyRow
}

// layOut breaks the entries into columns of a width and returns them with the height that they need.
func (k *key) layOut(columns int, width float64) (cols [][]keyEntry, height float64) {
	var total, tallest float64
	for i := range k.entries {
		e := &k.entries[i]
		e.lines = smallFace.wrap(clean(e.lines[0]), width-sampleWidth-sampleGap-keyColumn, 3)
		total += e.height()
		tallest = max(tallest, e.height())
	}
	room := total/float64(columns) + tallest/2
	for {
		cols, height = nil, 0
		var used float64
		for _, e := range k.entries {
			if len(cols) == 0 || used+e.height() > room {
				cols, used = append(cols, nil), 0
			}
			cols[len(cols)-1] = append(cols[len(cols)-1], e)
			used += e.height()
			height = max(height, used)
		}
		if len(cols) <= columns {
			return cols, height
		}
		room += tallest / 2
	}
}

// draw writes the columns with their upper left corner at left, top.
func (s *sheet) drawKey(cols [][]keyEntry, left, top, width float64) {
	for c, col := range cols {
		x, y := left+float64(c)*width, top
		for i := range col {
			e := &col[i]
			e.sample(s, Box{x, y - sampleHeight, x + sampleWidth, y})
			for j, l := range e.lines {
				s.line(smallFace, inkBlack, x+sampleWidth+sampleGap, y-float64(j)*smallFace.lineHeight(), l)
			}
			y -= e.height()
		}
	}
}
