package casefile

import (
	"fmt"
	"strings"

	"go.yaml.in/yaml/v4"

	"standfast/lem"
)

// value is a place in the node tree: a node with the key that names it and the keys down to it.
type value struct {
	node *yaml.Node // nil: the key is absent.
	key  *yaml.Node // nil in a list and at the top.
	path string
	// example is how the value may be written in full; "" where it has no key of its own.
	example string
}

// there reports whether the file holds the value.
func (v value) there() bool { return v.node != nil }

// empty reports whether the value is left empty.
func (v value) empty() bool { return v.node.Kind == yaml.ScalarNode && v.node.ShortTag() == "!!null" }

// reader collects the faults of one file and gives access to what has none.
type reader struct {
	file   string
	lines  []string
	faults []*Fault
	bad    map[*yaml.Node]bool // Nodes that cannot be used: a fault is recorded for each.
	notes  []string
	warned []string
}

// addFault records a fault at the value: at its key when the value is a mapping or empty, since its own place tells nothing then.
func (r *reader) addFault(v value, suggestion, format string, args ...any) {
	at := v.node
	if v.key != nil && (at == nil || at.Kind == yaml.MappingNode || v.empty()) {
		at = v.key
	}
	r.faultAt(at, v.path, suggestion, format, args...)
}

// reject records a fault and marks the value as one that cannot be used.
func (r *reader) reject(v value, suggestion, format string, args ...any) {
	r.addFault(v, suggestion, format, args...)
	r.bad[v.node] = true
}

func (r *reader) faultAt(at *yaml.Node, path, suggestion, format string, args ...any) {
	f := &Fault{File: r.file, Path: path, Message: fmt.Sprintf(format, args...), Suggestion: suggestion}
	if at != nil && at.Line > 0 {
		f.Line, f.Column, f.LineText = at.Line, at.Column, r.line(at.Line)
	}
	r.faults = append(r.faults, f)
}

// maxLineShown is the number of characters of an offending line that are shown.
const maxLineShown = 240

// line returns the text of a line, from 1; "" if there is none.
func (r *reader) line(n int) string {
	if n < 1 || n > len(r.lines) {
		return ""
	}
	text := []rune(strings.TrimRight(r.lines[n-1], "\r"))
	return string(text[:min(len(text), maxLineShown)])
}

func (r *reader) note(format string, args ...any) {
	r.notes = append(r.notes, fmt.Sprintf(format, args...))
}

// warn records something legal that is probably not meant, with its line.
func (r *reader) warn(v value, format string, args ...any) {
	r.warned = append(r.warned, fmt.Sprintf("%s:%d: %s: %s", r.file, v.node.Line, v.path, fmt.Sprintf(format, args...)))
}

// usable reports whether the value is there and has no fault of its own.
func (r *reader) usable(v value) bool { return v.there() && !r.bad[v.node] }

// get returns the value under key, absent if there is none or if v is not a mapping.
func (r *reader) get(v value, key string) value {
	for _, e := range r.entries(v) {
		if e.key.Value == key {
			return e
		}
	}
	return value{path: join(v.path, key)}
}

// entries returns the values of a mapping in the order of the file, each key once.
func (r *reader) entries(v value) []value {
	if !r.usable(v) || v.node.Kind != yaml.MappingNode {
		return nil
	}
	var all []value
	for i := 0; i+1 < len(v.node.Content); i += 2 {
		if k := v.node.Content[i]; !r.bad[k] {
			all = append(all, value{node: v.node.Content[i+1], key: k, path: join(v.path, k.Value)})
		}
	}
	return all
}

// items returns the values of a list.
func (r *reader) items(v value) []value {
	if !r.usable(v) || v.node.Kind != yaml.SequenceNode {
		return nil
	}
	all := make([]value, len(v.node.Content))
	for i, n := range v.node.Content {
		all[i] = value{node: n, path: fmt.Sprintf("%s[%d]", v.path, i+1)}
	}
	return all
}

// text returns a text and reports whether it is there and usable.
func (r *reader) text(v value) (string, bool) {
	if !r.usable(v) || v.node.Kind != yaml.ScalarNode {
		return "", false
	}
	return strings.TrimSpace(v.node.Value), true
}

// number returns a number and reports whether it is there and usable; 0 if not.
func (r *reader) number(v value) (float64, bool) {
	if !r.usable(v) || v.node.Kind != yaml.ScalarNode {
		return 0, false
	}
	x, p := parseNumber(v.node)
	return x, p == nil
}

// isTrue reports whether the value is there and says true; without it, it is what holds without it.
func (r *reader) isTrue(v value, standard bool) bool {
	if s, ok := r.text(v); ok {
		return s == "true"
	}
	return standard
}

// numbers returns a list of numbers and reports whether all of them are usable.
func (r *reader) numbers(v value) ([]float64, bool) {
	if !r.usable(v) || v.node.Kind != yaml.SequenceNode {
		return nil, false
	}
	var all []float64
	for _, item := range r.items(v) {
		x, ok := r.number(item)
		if !ok {
			return nil, false
		}
		all = append(all, x)
	}
	return all, true
}

// point returns a point and reports whether it is there and usable.
func (r *reader) point(v value) (lem.Point, bool) {
	xy, ok := r.numbers(v)
	if !ok || len(xy) != 2 {
		return lem.Point{}, false
	}
	return lem.Point{X: xy[0], Y: xy[1]}, true
}

// points returns a list of points and reports whether all of them are usable.
func (r *reader) points(v value) ([]lem.Point, bool) {
	var all []lem.Point
	for _, item := range r.items(v) {
		p, ok := r.point(item)
		if !ok {
			return nil, false
		}
		all = append(all, p)
	}
	return all, len(all) > 0
}

// join returns the path one key further down.
func join(path, key string) string {
	if path == "" {
		return clip(key)
	}
	return path + "." + clip(key)
}
