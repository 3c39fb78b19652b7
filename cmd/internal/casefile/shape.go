package casefile

import (
	"fmt"
	"math"
	"strconv"
	"strings"
)

// kind tells what sort of value a shape allows.
type kind uint8

// The kinds of value.
const (
	textKind    kind = iota // One line of text.
	numberKind              // A finite number within bounds.
	booleanKind             // true or false.
	wordKind                // One of a few words.
	shareKind               // 0.5 or 50%.
	sizeKind                // A number, or a range "a to b by c".
	tupleKind               // A list of so many numbers, such as [x, y].
	listKind                // A list of values of one shape.
	namedKind               // A mapping from the user's own names to values of one shape.
	objectKind              // A mapping with known keys.
	eitherKind              // One of several shapes, told apart by being scalar, list or mapping.
)

// shape says what a value of the case file may be. Checking, the JSON Schema and the reference in docs/case-file.md all read it.
type shape struct {
	kind     kind
	unit     string   // Of a number or size; "" for a ratio.
	bounds   bounds   // Of a number or size.
	words    []string // Of a word.
	what     string   // Of a text: what it is, such as "the name of a soil".
	parts    []field  // Of a tuple: its numbers, with the names used in messages.
	elem     *shape   // Of a list or of named values.
	min, max int      // Number of items of a list or of named values.
	fields   []field  // Of an object.
	oneOf    []string // Of an object: exactly one of these keys must be there.
	choices  []*shape // Of an either.
	nullable bool     // May be left empty, which stands for a mapping without keys.
}

// field is a key of an object with what it means.
type field struct {
	key      string
	shape    *shape
	required bool
	standard string // What holds without the key, in words; "" if required.
	meaning  string // One sentence.
	example  string // A value as it stands in a file.
}

// bounds are the values that a number may have.
type bounds struct {
	min, max         float64
	openMin, openMax bool   // True: the bound itself is not allowed.
	hint             string // What may be behind a value outside, shown with the fault.
}

// numberLimit bounds every number of the file, so that no arithmetic on it can overflow; coordinates further out lose their decimals.
const numberLimit = 1e6

func anyNumber() bounds {
	return bounds{min: -numberLimit, max: numberLimit, hint: "take the same round number off all coordinates"}
}
func atLeast(lo float64) bounds    { return bounds{min: lo, max: numberLimit} }
func above(lo float64) bounds      { return bounds{min: lo, max: numberLimit, openMin: true} }
func within(lo, hi float64) bounds { return bounds{min: lo, max: hi} }
func (b bounds) below(hi float64) bounds {
	b.max, b.openMax = hi, true
	return b
}

func (b bounds) upTo(hi float64) bounds {
	b.max = hi
	return b
}

func (b bounds) orElse(hint string) bounds {
	b.hint = hint
	return b
}

// holds reports whether x is within the bounds.
func (b bounds) holds(x float64) bool {
	return (x > b.min || x == b.min && !b.openMin) && (x < b.max || x == b.max && !b.openMax)
}

// String returns the bounds in words: "at least 0 and below 90".
func (b bounds) String() string {
	if !b.openMin && !b.openMax && b.min == -b.max {
		return "between " + figure(b.min) + " and " + figure(b.max)
	}
	lo, hi := "at least ", "at most "
	if b.openMin {
		lo = "above "
	}
	if b.openMax {
		hi = "below "
	}
	var s []string
	if b.min > -numberLimit {
		s = append(s, lo+figure(b.min))
	}
	if b.max < numberLimit || b.min == -numberLimit {
		s = append(s, hi+figure(b.max))
	}
	return strings.Join(s, " and ")
}

// figure returns a number as people write it.
func figure(x float64) string {
	if x == math.Trunc(x) && math.Abs(x) <= numberLimit {
		return strconv.FormatFloat(x, 'f', -1, 64)
	}
	return strconv.FormatFloat(x, 'g', -1, 64)
}

// Constructors of shapes, so that the table of keys reads as a table.

func text(what string) *shape             { return &shape{kind: textKind, what: what} }
func number(unit string, b bounds) *shape { return &shape{kind: numberKind, unit: unit, bounds: b} }
func boolean() *shape                     { return &shape{kind: booleanKind} }
func word(words ...string) *shape         { return &shape{kind: wordKind, words: words} }
func share() *shape                       { return &shape{kind: shareKind} }
func sized(unit string, b bounds) *shape  { return &shape{kind: sizeKind, unit: unit, bounds: b} }
func tuple(parts ...field) *shape         { return &shape{kind: tupleKind, parts: parts} }
func list(elem *shape, least, most int) *shape {
	return &shape{kind: listKind, elem: elem, min: least, max: most}
}

func named(elem *shape, least, most int) *shape {
	return &shape{kind: namedKind, elem: elem, min: least, max: most}
}

func object(fields ...field) *shape { return &shape{kind: objectKind, fields: fields} }

func either(choices ...*shape) *shape             { return &shape{kind: eitherKind, choices: choices} }
func (s *shape) exactlyOne(keys ...string) *shape { s.oneOf = keys; return s }

// String says what a value of the shape looks like: "a number in kPa".
func (s *shape) String() string {
	switch s.kind {
	case textKind:
		return s.what
	case numberKind:
		return numberText(s.unit)
	case booleanKind:
		return "`true` or `false`"
	case wordKind:
		return orList(s.words)
	case shareKind:
		return "a share such as 50% or 0.5"
	case sizeKind:
		return "a number or a range such as `2 to 4 by 0.1`"
	case tupleKind:
		return s.tupleText()
	case listKind:
		return s.listText()
	case namedKind:
		return "names, each with " + s.elem.String()
	case objectKind:
		return "a mapping with the " + plural(len(s.fields), "key", "keys") + " " + strings.Join(s.keys(), ", ")
	case eitherKind:
		var all []string
		for _, c := range s.choices {
			all = append(all, c.String())
		}
		return strings.Join(all, ", or ")
	}
	return ""
}

// batterUnit is the unit of a batter.
const batterUnit = "1V:nH"

// numberText says what a number in a unit is.
func numberText(unit string) string {
	of, perUnit := strings.CutPrefix(unit, "1/")
	switch {
	case unit == "":
		return "a number"
	case unit == batterUnit:
		return "the n of " + batterUnit
	case perUnit:
		return "a number per " + of
	}
	return "a number in " + unit
}

func (s *shape) tupleText() string {
	var names []string
	for _, p := range s.parts {
		names = append(names, p.key)
	}
	return "[" + strings.Join(names, ", ") + "]"
}

func (s *shape) listText() string {
	if s.elem.kind == tupleKind {
		return "a list of points " + s.elem.tupleText()
	}
	return "a list with " + s.elem.String()
}

// keys returns the keys of an object in their order.
func (s *shape) keys() []string {
	keys := make([]string, len(s.fields))
	for i, f := range s.fields {
		keys[i] = f.key
	}
	return keys
}

// field returns the field of that key; nil if the object has none.
func (s *shape) field(key string) *field {
	for i := range s.fields {
		if s.fields[i].key == key {
			return &s.fields[i]
		}
	}
	return nil
}

func plural(n int, one, many string) string {
	if n == 1 {
		return one
	}
	return many
}

// counted returns "1 point" or "3 points".
func counted(n int, one, many string) string { return fmt.Sprintf("%d %s", n, plural(n, one, many)) }
