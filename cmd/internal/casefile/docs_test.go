package casefile

import (
	"encoding/json"
	"fmt"
	"os"
	"regexp"
	"slices"
	"strings"
	"testing"
)

const reference = root + "/docs/case-file.md"

// eachKey calls f for every key below the shape, with the keys down to it. Items of a list are `[]`, the user's own names `NAME`.
func eachKey(s *shape, path string, f func(path string, fd field)) {
	switch s.kind {
	case objectKind:
		for _, fd := range s.fields {
			at := fd.key
			if path != "" {
				at = path + "." + fd.key
			}
			f(at, fd)
			eachKey(fd.shape, at, f)
		}
	case listKind:
		eachKey(s.elem, path+"[]", f)
	case namedKind:
		eachKey(s.elem, path+".NAME", f)
	case eitherKind:
		for _, c := range s.choices {
			eachKey(c, path, f)
		}
	case textKind, numberKind, booleanKind, wordKind, shareKind, sizeKind, tupleKind:
	}
}

// keyTable returns the reference table of some keys at the top and all below them, in Markdown.
func keyTable(tops []string) string {
	var b strings.Builder
	b.WriteString("| Key | Value | Unit | Without it | What it means | Example |\n|---|---|---|---|---|---|\n")
	eachKey(caseShape(), "", func(path string, f field) {
		first := strings.FieldsFunc(path, func(r rune) bool { return r == '.' || r == '[' })[0]
		if !slices.Contains(tops, first) || strings.HasPrefix(path, "trials[].works.") {
			return
		}
		without := f.standard
		if f.required {
			without = "**required**"
		}
		fmt.Fprintf(&b, "| `%s` | %s | %s | %s | %s | `%s` |\n", path, valueText(f.shape), f.shape.unit, without, f.meaning, f.example)
	})
	return strings.ReplaceAll(b.String(), "|  |", "| |")
}

// valueText says in a few words what a value is.
func valueText(s *shape) string {
	switch s.kind {
	case numberKind:
		return limitedText("number", s.bounds)
	case sizeKind:
		return limitedText("number or range", s.bounds)
	case objectKind:
		return "mapping"
	case namedKind:
		return "names with " + valueText(s.elem)
	case listKind:
		if s.elem.kind == tupleKind {
			return "list of " + s.elem.tupleText()
		}
		if s.elem.kind == numberKind && s.min == s.max {
			return limitedText(fmt.Sprintf("list of %d numbers", s.min), s.elem.bounds)
		}
		return "list of " + valueText(s.elem)
	case eitherKind:
		var all []string
		for _, c := range s.choices {
			all = append(all, valueText(c))
		}
		return strings.Join(all, ", or ")
	case textKind, booleanKind, wordKind, shareKind, tupleKind:
	}
	return s.String()
}

func limitedText(what string, b bounds) string {
	if b.min <= -numberLimit && b.max >= numberLimit {
		return what
	}
	return what + ", " + b.String()
}

var tableRule = regexp.MustCompile(`(?s)<!-- keys of ([a-z_ ]+), generated from the table of keys -->\n.*?<!-- end -->`)

// TestReferenceTables compares the tables of docs/case-file.md with the keys that are read, or rewrites them with -update.
func TestReferenceTables(t *testing.T) {
	doc, err := os.ReadFile(reference)
	if err != nil {
		t.Fatal(err)
	}
	golden(t, reference, tableRule.ReplaceAllStringFunc(string(doc), func(old string) string {
		tops := tableRule.FindStringSubmatch(old)[1]
		return fmt.Sprintf("<!-- keys of %s, generated from the table of keys -->\n%s<!-- end -->", tops, keyTable(strings.Fields(tops)))
	}))
}

// schemaKeys adds the keys of a JSON Schema with the keys down to them.
func schemaKeys(node map[string]any, path string, add func(string)) {
	if all, ok := node["anyOf"].([]any); ok {
		for _, c := range all {
			schemaKeys(c.(map[string]any), path, add)
		}
	}
	if items, ok := node["items"].(map[string]any); ok {
		schemaKeys(items, path+"[]", add)
	}
	if named, ok := node["additionalProperties"].(map[string]any); ok {
		schemaKeys(named, path+".NAME", add)
	}
	properties, _ := node["properties"].(map[string]any)
	for key, child := range properties {
		at := strings.TrimPrefix(path+"."+key, ".")
		add(at)
		schemaKeys(child.(map[string]any), at, add)
	}
}

// TestReferenceHasEveryKey checks that the reference documents every key of the schema, and no key that there is not.
func TestReferenceHasEveryKey(t *testing.T) {
	doc, err := os.ReadFile(reference)
	if err != nil {
		t.Fatal(err)
	}
	var schema map[string]any
	if err := json.Unmarshal(Schema(), &schema); err != nil {
		t.Fatal(err)
	}
	known := map[string]bool{}
	schemaKeys(schema, "", func(path string) {
		// The works of a trial have the keys of the remedies, where they are documented.
		if at, ok := strings.CutPrefix(path, "trials[].works."); ok {
			path = "remedies." + at
		}
		known[path] = true
	})
	var documented []string
	for _, m := range regexp.MustCompile("(?m)^\\| `([^`]+)` \\|").FindAllStringSubmatch(string(doc), -1) {
		documented = append(documented, m[1])
		if !known[m[1]] {
			t.Errorf("the reference has the key %s, which the schema has not", m[1])
		}
	}
	for key := range known {
		if !slices.Contains(documented, key) {
			t.Errorf("the reference lacks the key %s", key)
		}
	}
	if len(known) < 80 {
		t.Errorf("only %d keys found in the schema", len(known))
	}
}

// TestReferenceExamplesAreRead puts each YAML block of the reference into a small case and reads it.
func TestReferenceExamplesAreRead(t *testing.T) {
	doc, err := os.ReadFile(reference)
	if err != nil {
		t.Fatal(err)
	}
	blocks := regexp.MustCompile("(?s)```yaml\n(.*?)```").FindAllStringSubmatch(string(doc), -1)
	if len(blocks) < 8 {
		t.Fatalf("only %d examples", len(blocks))
	}
	whole := `title: Whole
length: 10
ground: [[0, 109.6], [30, 109], [52.5, 100], [75, 99.8]]
soils:
  stiff clay: {unit_weight: 19, drained: {cohesion: 2, friction: 24}, undrained: {strength: 60}}
  soft alluvium: {unit_weight: 17, drained: {cohesion: 2, friction: 24}, undrained: {strength: 20}}
  granular fill: {unit_weight: 19, drained: {cohesion: 0, friction: 36}, clay: false}
  rockfill: {unit_weight: 20, drained: {cohesion: 0, friction: 40}, free_draining: true}
strata:
  - {soil: stiff clay, top: ground}
  - {soil: soft alluvium, top: [[0, 90], [75, 90]]}
water: {high: [[0, 107], [75, 99]], summer: [[0, 105], [75, 98]]}
situations:
  - {name: high water, water: high, required_fs: 1.2}
`
	for _, m := range blocks {
		src := withKeys(whole, m[1])
		if _, err := Parse("example.yaml", []byte(src)); err != nil {
			t.Errorf("%v\nin the example\n%s", err, m[1])
		}
	}
}

// withKeys returns a case with the keys at the top of part in place of its own.
func withKeys(whole, part string) string {
	key := regexp.MustCompile(`(?m)^([a-z_]+):`)
	for _, k := range key.FindAllStringSubmatch(part, -1) {
		whole = regexp.MustCompile(`(?m)^`+k[1]+`:.*\n(?:[ -].*\n)*`).ReplaceAllString(whole, "")
	}
	return whole + part
}
