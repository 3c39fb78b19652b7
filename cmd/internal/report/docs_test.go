package report

import (
	"bytes"
	"fmt"
	"maps"
	"os"
	"slices"
	"strings"
	"testing"

	reflector "github.com/invopop/jsonschema"
)

// The tables of fields in docs/outputs.md are made from the declarations and comments, like the schema.
func TestDocsAreCurrent(t *testing.T) {
	const path, begin, end = "../../../docs/outputs.md", "<!-- fields: begin -->\n", "<!-- fields: end -->\n"
	doc, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	head, rest, ok1 := bytes.Cut(doc, []byte(begin))
	_, tail, ok2 := bytes.Cut(rest, []byte(end))
	if !ok1 || !ok2 {
		t.Fatalf("%s has lost its markers", path)
	}
	want := slices.Concat(head, []byte(begin), fieldTables(t), []byte(end), tail)
	if *update {
		if err := os.WriteFile(path, want, 0o644); err != nil {
			t.Fatal(err)
		}
		return
	}
	if !bytes.Equal(doc, want) {
		t.Errorf("%s is not current; run go test ./cmd/internal/report -update and look at the difference", path)
	}
}

// fieldTables returns a table for each type of result.json and of witnesses.json.
func fieldTables(t *testing.T) []byte {
	var b bytes.Buffer
	for _, part := range []struct {
		title string
		root  any
		first string
	}{{"result.json", &File{}, "File"}, {"witnesses.json", &Witnesses{}, "Witnesses"}} {
		fmt.Fprintf(&b, "\n### %s\n", part.title)
		defs := generate(t, part.root).Definitions
		names := slices.Sorted(maps.Keys(defs))
		names = slices.DeleteFunc(names, func(n string) bool { return n == part.first || defs[n].Properties == nil })
		for _, name := range append([]string{part.first}, names...) {
			writeTable(t, &b, name, defs[name])
		}
	}
	b.WriteByte('\n')
	return b.Bytes()
}

func writeTable(t *testing.T, b *bytes.Buffer, name string, def *reflector.Schema) {
	fmt.Fprintf(b, "\n#### %s\n\n%s\n\n| field | type | meaning |\n|---|---|---|\n", name, oneLine(def.Description))
	for p := def.Properties.Oldest(); p != nil; p = p.Next() {
		meaning := describe(p.Value)
		if meaning == "" {
			t.Errorf("%s.%s has no comment", name, p.Key)
		}
		fmt.Fprintf(b, "| `%s` | %s | %s |\n", p.Key, typeOf(p.Value), meaning)
	}
}

// describe returns the comment of a field, which for one that may be null stands at its first alternative.
func describe(s *reflector.Schema) string {
	if s.Description == "" && len(s.OneOf) > 0 {
		return oneLine(s.OneOf[0].Description)
	}
	return oneLine(s.Description)
}

func oneLine(s string) string { return strings.Join(strings.Fields(s), " ") }

// typeOf names the type of a field for people.
func typeOf(s *reflector.Schema) string {
	switch {
	case len(s.OneOf) > 0:
		var parts []string
		for _, o := range s.OneOf {
			parts = append(parts, typeOf(o))
		}
		return strings.Join(parts, " or ")
	case s.Ref != "":
		name := strings.TrimPrefix(s.Ref, "#/$defs/")
		if name == "Point" {
			return "[x, y]"
		}
		return fmt.Sprintf("[%s](#%s)", name, strings.ToLower(name))
	case s.Type == "array" && s.MaxItems != nil:
		return fmt.Sprintf("list of %d numbers", *s.MaxItems)
	case s.Type == "array":
		return "list of " + typeOf(s.Items)
	case s.Type == "object" && s.AdditionalProperties != nil:
		return "object of " + typeOf(s.AdditionalProperties) + " by name"
	case len(s.Enum) > 0 && len(s.Enum) < 3:
		var words []string
		for _, w := range s.Enum {
			words = append(words, fmt.Sprintf("%q", w))
		}
		return strings.Join(words, " or ")
	}
	return s.Type
}
