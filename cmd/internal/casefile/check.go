package casefile

import (
	"fmt"
	"strconv"
	"strings"
	"unicode"

	"go.yaml.in/yaml/v4"
)

// check records every fault in which the value differs from the shape, and marks the nodes that cannot be used.
func (r *reader) check(s *shape, v value) {
	if !r.checkPlain(v) {
		return
	}
	if v.empty() {
		r.checkEmpty(s, v)
		return
	}
	switch s.kind {
	case textKind:
		r.checkText(s, v)
	case numberKind, booleanKind, wordKind, shareKind, sizeKind:
		r.checkScalar(s, v)
	case tupleKind:
		r.checkTuple(s, v)
	case listKind:
		r.checkList(s, v)
	case namedKind:
		r.checkNamed(s, v)
	case objectKind:
		if r.isKind(s, v, yaml.MappingNode) {
			r.checkObject(s, v)
		}
	case eitherKind:
		r.checkEither(s, v)
	}
}

// checkPlain refuses the parts of YAML that a case file has no use for: anchors, aliases and tags. Aliases can make a small file huge.
func (r *reader) checkPlain(v value) bool {
	switch {
	case v.node.Kind == yaml.AliasNode:
		r.reject(v, "write the value out", "`*%s`: the case file has no aliases", clip(v.node.Value))
	case v.node.Anchor != "":
		r.reject(v, "take it out, or put the text in quotes", "`&%s`: the case file has no anchors", clip(v.node.Anchor))
	case v.node.Style&yaml.TaggedStyle != 0:
		r.reject(v, "take it out, or put the text in quotes", "`%s`: the case file has no tags", clip(v.node.Tag))
	default:
		return true
	}
	return false
}

// checkEmpty deals with a key that has nothing behind it: legal for an object that may be left empty, if no key of it is required.
func (r *reader) checkEmpty(s *shape, v value) {
	if !s.nullable {
		r.reject(v, written(s, v), "is empty")
		return
	}
	r.checkKeys(s, v, nil)
}

// isKind rejects a value that is not a scalar, list or mapping as the shape wants it.
func (r *reader) isKind(s *shape, v value, k yaml.Kind) bool {
	if v.node.Kind == k {
		return true
	}
	r.wrongType(s, v)
	return false
}

func (r *reader) wrongType(s *shape, v value) {
	is := "a single value"
	if v.node.Kind == yaml.SequenceNode {
		is = "a list"
	}
	if v.node.Kind == yaml.MappingNode {
		is = "a mapping"
	}
	r.reject(v, written(s, v), "%s does not fit here", is)
}

// written says what to write at a value, with its example if it has one.
func written(s *shape, v value) string {
	if v.example == "" {
		return "write " + s.String()
	}
	return "write " + s.String() + ", such as " + v.example
}

func (r *reader) checkText(s *shape, v value) {
	if !r.isKind(s, v, yaml.ScalarNode) {
		return
	}
	if message := badName(v.node.Value); message != "" {
		r.reject(v, "write "+s.String(), "%s", message)
	}
}

// maxName bounds the characters of a name or title; longer ones fit in no table or drawing.
const maxName = 120

// badName tells what is wrong with a text; "" if nothing is.
func badName(text string) string {
	switch {
	case strings.TrimSpace(text) == "":
		return "is empty"
	case strings.IndexFunc(text, breaksLine) >= 0:
		return "holds a line break or another control character"
	case len([]rune(text)) > maxName:
		return fmt.Sprintf("is longer than %d characters", maxName)
	}
	return ""
}

// breaksLine reports whether a character may start a new line or do other mischief in a line of text.
func breaksLine(c rune) bool { return unicode.IsControl(c) || unicode.In(c, unicode.Zl, unicode.Zp) }

// checkScalar checks a value that is a number or one of a few words.
func (r *reader) checkScalar(s *shape, v value) {
	if !r.isKind(s, v, yaml.ScalarNode) {
		return
	}
	var p *problem
	switch s.kind { //nolint:exhaustive // the other kinds are not scalars
	case numberKind:
		p = checkNumber(s, v.node)
	case shareKind:
		_, p = parseShare(v.node)
	case sizeKind:
		p = checkSize(s, v.node)
	case booleanKind:
		p = checkWord(v.node, []string{"true", "false"})
	case wordKind:
		p = checkWord(v.node, s.words)
	}
	if p == nil {
		return
	}
	if p.suggestion == "" && !p.complete {
		p.suggestion = "write " + s.String()
	}
	r.reject(v, p.suggestion, "%s", p.message)
}

func checkNumber(s *shape, n *yaml.Node) *problem {
	x, p := parseNumber(n)
	switch {
	case p == nil && !s.bounds.holds(x):
		return outside(s, n.Value)
	case p != nil && s.unit == "" && percentRule.MatchString(n.Value):
		if x, err := strconv.ParseFloat(percentRule.FindStringSubmatch(n.Value)[1], 64); err == nil {
			p.suggestion = "write the ratio: " + figure(round9(x/100))
		}
	case p != nil && rangeRule.MatchString(n.Value):
		p.suggestion = "only remedies to be sized have ranges: write one number"
	}
	return p
}

func checkSize(s *shape, n *yaml.Node) *problem {
	z, p := parseSize(n)
	if p != nil {
		return p
	}
	for _, x := range []float64{z.min, z.max} {
		if !s.bounds.holds(x) {
			return outside(s, figure(x))
		}
	}
	return nil
}

func outside(s *shape, value string) *problem {
	unit := ""
	if s.unit != "" {
		unit = " " + s.unit
	}
	return &problem{fmt.Sprintf("%s is out of bounds: it must be %s%s", value, s.bounds, unit), s.bounds.hint, true}
}

func checkWord(n *yaml.Node, words []string) *problem {
	for _, w := range words {
		if n.Value == w {
			return nil
		}
	}
	return &problem{message: fmt.Sprintf("`%s` is not known here", clip(n.Value)), suggestion: didYouMean(n.Value, words)}
}

func (r *reader) checkTuple(s *shape, v value) {
	if !r.isKind(s, v, yaml.SequenceNode) {
		return
	}
	if got, want := len(v.node.Content), len(s.parts); got != want {
		r.reject(v, "write "+s.String()+", with decimals behind a point", "has %s; it needs %d", counted(got, "number", "numbers"), want)
		return
	}
	for i, item := range r.items(v) {
		item.path = join(v.path, s.parts[i].key)
		r.check(s.parts[i].shape, item)
	}
}

func (r *reader) checkList(s *shape, v value) {
	if !r.isKind(s, v, yaml.SequenceNode) {
		return
	}
	if !r.checkCount(s, v, len(v.node.Content)) {
		return
	}
	if s.elem.kind == tupleKind && len(v.node.Content) == len(s.elem.parts) && v.node.Content[0].Kind == yaml.ScalarNode {
		r.reject(v, "put each point in brackets of its own: [[0, 10], [20, 10]]", "is a single point, not a list of points")
		return
	}
	for _, item := range r.items(v) {
		item.example = v.example
		r.check(s.elem, item)
	}
}

// checkCount rejects a list or mapping with too few or too many items.
func (r *reader) checkCount(s *shape, v value, n int) bool {
	one, many := "item", "items"
	switch {
	case s.kind == listKind && s.elem.kind == tupleKind:
		one, many = "point", "points"
	case s.kind == listKind && s.elem.kind == numberKind:
		one, many = "number", "numbers"
	}
	such := ""
	if v.example != "" {
		such = "for example " + v.example
	}
	switch {
	case s.min == s.max && n != s.min:
		r.reject(v, such, "has %s; it needs %d", counted(n, one, many), s.min)
	case n == 0 && s.min > 0:
		r.reject(v, such, "is empty; it needs at least %s", counted(s.min, one, many))
	case n < s.min:
		r.reject(v, such, "has %s; it needs at least %d", counted(n, one, many), s.min)
	case n > s.max:
		r.reject(v, "", "has %s; at most %d are allowed", counted(n, one, many), s.max)
	default:
		return true
	}
	return false
}

func (r *reader) checkNamed(s *shape, v value) {
	if !r.isKind(s, v, yaml.MappingNode) || !r.checkCount(s, v, len(v.node.Content)/2) {
		return
	}
	r.checkDuplicates(v)
	for _, e := range r.entries(v) {
		if message := badName(e.key.Value); message != "" {
			r.faultAt(e.key, v.path, fmt.Sprintf("write a name on one line, of at most %d characters", maxName), "the name \"%s\" %s", clip(e.key.Value), message)
			r.bad[e.key] = true
			continue
		}
		r.check(s.elem, e)
	}
}

// checkDuplicates rejects keys that stand twice and keys that are no plain words.
func (r *reader) checkDuplicates(v value) {
	first := map[string]*yaml.Node{}
	for i := 0; i+1 < len(v.node.Content); i += 2 {
		k := v.node.Content[i]
		if k.Kind != yaml.ScalarNode || k.Anchor != "" || k.Style&yaml.TaggedStyle != 0 {
			r.faultAt(k, v.path, "write a plain word", "a key that is not a plain word")
			r.bad[k] = true
			continue
		}
		if before, ok := first[k.Value]; ok {
			r.faultAt(k, v.path, "keep one of the two", "the key `%s` stands twice, first in line %d", clip(k.Value), before.Line)
			r.bad[k] = true
			continue
		}
		first[k.Value] = k
	}
}

// maxUnknown is the number of keys beyond the known ones with which a mapping is looked into at all.
const maxUnknown = 100

func (r *reader) checkObject(s *shape, v value) {
	if n := len(v.node.Content) / 2; n > len(s.fields)+maxUnknown {
		r.reject(v, "write "+s.String(), "has %d keys, and only %d are known here", n, len(s.fields))
		return
	}
	r.checkDuplicates(v)
	r.checkKeys(s, v, r.entries(v))
	for _, e := range r.entries(v) {
		if f := s.field(e.key.Value); f != nil {
			e.example = "`" + f.key + ": " + f.example + "`"
			r.check(f.shape, e)
		}
	}
}

// checkKeys records unknown keys and required keys that are missing.
func (r *reader) checkKeys(s *shape, v value, entries []value) {
	have, meant := map[string]bool{}, map[string]bool{}
	for _, e := range entries {
		have[e.key.Value] = true
		if s.field(e.key.Value) == nil {
			meant[nearest(e.key.Value, s.keys())] = true
			r.unknownKey(s, v, e)
		}
	}
	for _, f := range s.fields {
		if f.required && !have[f.key] && !meant[f.key] {
			r.missing(v, fmt.Sprintf("write `%s: %s` (%s)", f.key, f.example, firstSentence(f.meaning)), "the key `%s` is missing", f.key)
		}
	}
	r.checkOneOf(s, v, have)
}

// unknownKey records a key that the object does not have. A number without a value is what stands behind a decimal comma.
func (r *reader) unknownKey(s *shape, v, e value) {
	r.bad[e.key] = true
	if e.empty() && numberRule.MatchString(e.key.Value) {
		r.faultAt(e.key, v.path, "write decimals behind a point", "a number without a key")
		return
	}
	r.faultAt(e.key, v.path, didYouMean(e.key.Value, s.keys()), "unknown key `%s`", clip(e.key.Value))
}

// missing records that a mapping lacks a key. At the top of the file no line is to blame.
func (r *reader) missing(v value, suggestion, format string, args ...any) {
	if v.path == "" {
		r.faultAt(nil, "", suggestion, format, args...)
		return
	}
	r.addFault(v, suggestion, format, args...)
}

// firstSentence returns a meaning up to its first full stop, as a part of another sentence.
func firstSentence(meaning string) string {
	s, _, _ := strings.Cut(meaning, ". ")
	return strings.TrimSuffix(s, ".")
}

// checkOneOf records a fault unless exactly one of the keys is there.
func (r *reader) checkOneOf(s *shape, v value, have map[string]bool) {
	if len(s.oneOf) == 0 {
		return
	}
	var given []string
	for _, k := range s.oneOf {
		if have[k] {
			given = append(given, k)
		}
	}
	switch {
	case len(given) == 0:
		f := s.field(s.oneOf[0])
		r.missing(v, fmt.Sprintf("write `%s: %s` (%s)", f.key, f.example, firstSentence(f.meaning)), "one of the keys %s is missing", orList(s.oneOf))
	case len(given) > 1:
		r.addFault(v, "keep one of them", "has both %s", andList(given))
	}
}

// checkEither checks against the choice that is written as the value is: as a scalar, list or mapping.
func (r *reader) checkEither(s *shape, v value) {
	for _, c := range s.choices {
		if c.nodeKind() == v.node.Kind {
			r.check(c, v)
			return
		}
	}
	r.wrongType(s, v)
}

// nodeKind returns how a value of the shape is written in YAML.
func (s *shape) nodeKind() yaml.Kind {
	switch s.kind {
	case tupleKind, listKind:
		return yaml.SequenceNode
	case namedKind, objectKind:
		return yaml.MappingNode
	case textKind, numberKind, booleanKind, wordKind, shareKind, sizeKind, eitherKind:
	}
	return yaml.ScalarNode
}
