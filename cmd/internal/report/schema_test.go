package report

import (
	"bytes"
	"encoding/json"
	"flag"
	"os"
	"reflect"
	"strings"
	"testing"

	reflector "github.com/invopop/jsonschema"
	"github.com/santhosh-tekuri/jsonschema/v6"
)

var update = flag.Bool("update", false, "write the schema and the table of fields anew")

// generate makes the schema from the declarations and comments of the package.
func generate(t *testing.T, root any) *reflector.Schema {
	t.Helper()
	r := reflector.Reflector{
		AllowAdditionalProperties: true, // Later versions may add fields.
		Mapper: func(typ reflect.Type) *reflector.Schema {
			switch typ {
			case reflect.TypeFor[Number](), reflect.TypeFor[*Number]():
				return &reflector.Schema{OneOf: []*reflector.Schema{{Type: "number"}, {Type: "null"}}}
			case reflect.TypeFor[Strength]():
				word := &reflector.Schema{Type: "string", Enum: []any{drained, undrained}}
				return &reflector.Schema{OneOf: []*reflector.Schema{word, {Type: "object", AdditionalProperties: word}}}
			}
			return nil
		},
	}
	if err := r.AddGoComments("standfast/cmd/internal/report", "."); err != nil {
		t.Fatal(err)
	}
	s := r.Reflect(root)
	s.ID = ""
	return s
}

// The schema that users get is the one that the declarations make.
func TestSchemaIsCurrent(t *testing.T) {
	raw, err := json.Marshal(generate(t, &File{}))
	if err != nil {
		t.Fatal(err)
	}
	var want bytes.Buffer
	if err := json.Indent(&want, raw, "", " "); err != nil {
		t.Fatal(err)
	}
	want.WriteByte('\n')
	if *update {
		if err := os.WriteFile("result.schema.json", want.Bytes(), 0o644); err != nil {
			t.Fatal(err)
		}
		return
	}
	if !bytes.Equal(want.Bytes(), Schema()) {
		t.Error("result.schema.json is not current; run go test ./cmd/internal/report -update and look at the difference")
	}
}

// compiled returns the validator for result.json.
func compiled(t *testing.T) *jsonschema.Schema {
	t.Helper()
	doc, err := jsonschema.UnmarshalJSON(bytes.NewReader(Schema()))
	if err != nil {
		t.Fatal(err)
	}
	c := jsonschema.NewCompiler()
	if err := c.AddResource("result.schema.json", doc); err != nil {
		t.Fatal(err)
	}
	s, err := c.Compile("result.schema.json")
	if err != nil {
		t.Fatal(err)
	}
	return s
}

func TestResultIsValid(t *testing.T) {
	good := encoded(t, New(sample()))
	for _, c := range []struct {
		name, old, new string
		want           string // Part of the complaint; "" if the file is valid.
	}{
		{name: "as written"},
		{name: "a field more", old: `"seed": 7`, new: `"seed": 7, "later": 1`},
		{name: "word for a number", old: `"fs": 1.30578`, new: `"fs": "1.30578"`, want: "/options/0/situations/0/fs"},
		{name: "unknown status", old: `"status": "meets target"`, new: `"status": "fine"`, want: "/options/0/status"},
		{name: "point of three", old: `"ground": [[0, 109]`, new: `"ground": [[0, 109, 1]`, want: "/existing/section/ground/0"},
		{name: "no format", old: `"format":`, new: `"shape":`, want: "missing property 'format'"},
		{name: "null where something must stand", old: `"slices": 30`, new: `"slices": null`, want: "/settings/slices"},
		{name: "unknown strength", old: `"strength": "drained"`, new: `"strength": "wet"`, want: "/situations/0/strength"},
	} {
		t.Run(c.name, func(t *testing.T) {
			src := strings.Replace(good, c.old, c.new, 1)
			if c.old != "" && src == good {
				t.Fatalf("nothing to replace: %s", c.old)
			}
			doc, err := jsonschema.UnmarshalJSON(strings.NewReader(src))
			if err != nil {
				t.Fatal(err)
			}
			err = compiled(t).Validate(doc)
			switch {
			case c.want == "" && err != nil:
				t.Errorf("valid file refused: %v", err)
			case c.want != "" && (err == nil || !strings.Contains(err.Error(), c.want)):
				t.Errorf("got %v, want a complaint about %s", err, c.want)
			}
		})
	}
}

func encoded(t *testing.T, f *File) string {
	t.Helper()
	var b bytes.Buffer
	if err := f.Encode(&b); err != nil {
		t.Fatal(err)
	}
	return b.String()
}
