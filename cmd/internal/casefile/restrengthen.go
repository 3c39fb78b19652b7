package casefile

import (
	"bytes"
	"errors"
	"fmt"
	"sort"
	"strconv"
	"strings"

	"go.yaml.in/yaml/v4"
)

// SoilChange is what a back-analysis found for a soil. What is nil stays as it is.
type SoilChange struct {
	Soil     string
	Cohesion *float64 // c', kPa.
	Friction *float64 // phi', degrees.
	Strength *float64 // cu, kPa.
	Ru       *float64
}

// ErrNoPlace says that a soil of a case file has no place for a change.
var ErrNoPlace = errors.New("casefile: the change has no place")

// WithSoil returns a case file with the strength or pore pressure ratio of one soil changed, all else kept letter by letter, under a remark. The
// error wraps ErrNoPlace where the soil states its strength in another way than the change.
func WithSoil(src []byte, change *SoilChange, remark string) ([]byte, error) {
	src = bytes.TrimPrefix(src, []byte("\xef\xbb\xbf"))
	var document yaml.Node
	if err := yaml.Load(src, &document); err != nil {
		return nil, fmt.Errorf("casefile: %w", err)
	}
	if len(document.Content) == 0 {
		return nil, fmt.Errorf("%w: the file is empty", ErrNoPlace)
	}
	soil := child(child(document.Content[0], "soils"), change.Soil)
	if soil == nil || len(soil.Content) < 2 {
		return nil, fmt.Errorf("%w: no soil named %s", ErrNoPlace, change.Soil)
	}
	e := &editor{lines: strings.SplitAfter(string(src), "\n")}
	for _, c := range []struct {
		within, key string
		to          *float64
	}{{"drained", "cohesion", change.Cohesion}, {"drained", "friction", change.Friction}, {"undrained", "strength", change.Strength}} {
		if c.to == nil {
			continue
		}
		at := child(child(soil, c.within), c.key)
		if at == nil || at.Kind != yaml.ScalarNode {
			return nil, fmt.Errorf("%w: the soil %s has no %s.%s to be replaced; give it one", ErrNoPlace, change.Soil, c.within, c.key)
		}
		e.replace(at, *c.to)
	}
	if change.Ru != nil {
		if at := child(soil, "ru"); at != nil {
			e.replace(at, *change.Ru)
		} else {
			e.insert(soil, "ru", *change.Ru)
		}
	}
	return []byte(comment(remark) + e.text()), nil
}

// child returns the value of a key of a mapping; nil if there is none.
func child(n *yaml.Node, key string) *yaml.Node {
	if n == nil || n.Kind != yaml.MappingNode {
		return nil
	}
	for i := 0; i+1 < len(n.Content); i += 2 {
		if n.Content[i].Value == key {
			return n.Content[i+1]
		}
	}
	return nil
}

// comment writes a remark as lines of comment.
func comment(remark string) string {
	var b strings.Builder
	for _, l := range strings.Split(remark, "\n") {
		b.WriteString("# " + strings.Map(func(r rune) rune {
			if breaksLine(r) {
				return '?'
			}
			return r
		}, l) + "\n")
	}
	return b.String()
}

// editor changes pieces of a text by line and column.
type editor struct {
	lines []string
	edits []edit
}

// edit puts a text in the place of some characters of a line.
type edit struct {
	line, column, length int // line and column from 0.
	to                   string
}

func (e *editor) replace(n *yaml.Node, to float64) {
	e.edits = append(e.edits, edit{n.Line - 1, n.Column - 1, len([]rune(n.Value)), shortNumber(to)})
}

// insert adds a key at the start of a mapping, in its own style.
func (e *editor) insert(mapping *yaml.Node, key string, to float64) {
	first := mapping.Content[0]
	text := key + ": " + shortNumber(to)
	if mapping.Style&yaml.FlowStyle != 0 {
		text += ", "
	} else {
		text += "\n" + strings.Repeat(" ", first.Column-1)
	}
	e.edits = append(e.edits, edit{first.Line - 1, first.Column - 1, 0, text})
}

// text returns the text with all edits made.
func (e *editor) text() string {
	sort.SliceStable(e.edits, func(i, j int) bool { return e.edits[i].column > e.edits[j].column }) // Later columns first, so that the earlier stay.
	for _, d := range e.edits {
		line := []rune(e.lines[d.line])
		e.lines[d.line] = string(line[:d.column]) + d.to + string(line[d.column+d.length:])
	}
	return strings.Join(e.lines, "")
}

// shortNumber writes a number with six significant digits, never with an exponent.
func shortNumber(v float64) string {
	const digits = 6
	short, err := strconv.ParseFloat(strconv.FormatFloat(v, 'g', digits, 64), 64)
	if err != nil {
		short = v
	}
	return strconv.FormatFloat(short, 'f', -1, 64)
}
