package casefile

import (
	"bytes"
	"encoding/json"
	"fmt"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"github.com/santhosh-tekuri/jsonschema/v6"
	"go.yaml.in/yaml/v4"
)

// compiled returns the schema ready to check with. Compiling also checks it against the meta-schema of draft 2020-12.
func compiled(t *testing.T) *jsonschema.Schema {
	t.Helper()
	doc, err := jsonschema.UnmarshalJSON(bytes.NewReader(Schema()))
	if err != nil {
		t.Fatal(err)
	}
	c := jsonschema.NewCompiler()
	if err := c.AddResource("case.json", doc); err != nil {
		t.Fatal(err)
	}
	s, err := c.Compile("case.json")
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// withTextKeys turns keys that YAML took for numbers into text, as JSON has them.
func withTextKeys(v any) any {
	switch v := v.(type) {
	case map[any]any:
		out := map[string]any{}
		for k, e := range v {
			out[fmt.Sprint(k)] = withTextKeys(e)
		}
		return out
	case map[string]any:
		for k, e := range v {
			v[k] = withTextKeys(e)
		}
	case []any:
		for i, e := range v {
			v[i] = withTextKeys(e)
		}
	}
	return v
}

// asJSON returns a YAML file as the values that JSON has.
func asJSON(t *testing.T, src []byte) any {
	t.Helper()
	var v any
	if err := yaml.Load(src, &v); err != nil {
		t.Fatal(err)
	}
	text, err := json.Marshal(withTextKeys(v))
	if err != nil {
		t.Fatal(err)
	}
	doc, err := jsonschema.UnmarshalJSON(bytes.NewReader(text))
	if err != nil {
		t.Fatal(err)
	}
	return doc
}

func TestGoodCasesFitTheSchema(t *testing.T) {
	s := compiled(t)
	files := map[string][]byte{"starter.yaml": Starter(), "small.yaml": []byte(small)}
	for _, name := range demos {
		src, err := os.ReadFile(root + "/testdata/demo/" + name)
		if err != nil {
			t.Fatal(err)
		}
		files[name] = src
	}
	for name, src := range files {
		if err := s.Validate(asJSON(t, src)); err != nil {
			t.Errorf("%s: %v", name, err)
		}
	}
}

// TestFaultyCasesDoNotFitTheSchema takes every faulty case whose faults a schema can see.
func TestFaultyCasesDoNotFitTheSchema(t *testing.T) {
	s := compiled(t)
	unseen := []string{ // Not one mapping of JSON values, or wrong only by what joins two keys.
		"aliases.yaml", "empty.yaml", "list-not-closed.yaml", "names-and-lists.yaml", "strengths-that-clash.yaml", "vertical-slope.yaml", "proposed-and-sized.yaml", "soils.yaml", "side-forces-nothing.yaml", "tab.yaml", "two-cases.yaml", "two-faces.yaml", "ground-and-strata.yaml", "remedies.yaml", "two-drains.yaml",
	}
	files, err := filepath.Glob(root + "/testdata/cases/*.yaml")
	if err != nil {
		t.Fatal(err)
	}
	checked := 0
	for _, path := range files {
		if slices.Contains(unseen, filepath.Base(path)) {
			continue
		}
		src, err := os.ReadFile(path)
		if err != nil {
			t.Fatal(err)
		}
		checked++
		if err := s.Validate(asJSON(t, src)); err == nil {
			t.Errorf("%s fits", path)
		}
	}
	if checked < 3 {
		t.Errorf("only %d faulty cases checked", checked)
	}
}

// TestSchemaAndReaderAgree changes one value of a good case at a time: schema and reader must both refuse it, or both take it.
func TestSchemaAndReaderAgree(t *testing.T) {
	s := compiled(t)
	soil, dry := "{unit_weight: 19, drained: {cohesion: 2, friction: 24}}", "required_fs: 1.3"
	cases := []struct {
		old, new string
		ok       bool
	}{
		{"title: Small", "title: 2024", true},
		{"title: Small", "title: [a]", false},
		{"title: Small\n", "", false},
		{"length: 10", "length: 0", false},
		{"length: 10", "length: ten", false},
		{"[50, 5]", "[50, 5, 1]", false},
		{"[50, 5]", "[50]", false},
		{"[50, 5]", "[50, 2000000]", false},
		{soil, "{unit_weight: 101, drained: {cohesion: 2, friction: 24}}", false},
		{soil, "{unit_weight: 19, drained: {cohesion: 0, friction: 89.9}}", true},
		{soil, "{unit_weight: 19, drained: {cohesion: 0, friction: 90}}", false},
		{soil, "{unit_weight: 19, drained: {cohesion: 2, friction: 24}, clay: maybe}", false},
		{soil, "{unit_weight: 19, drained: {cohesion: 2, friction: 24}, undrained: {}}", false},
		{soil, "{unit_weight: 19, drained: {cohesion: 2, friction: 24}, undrained: {strength: 9}}", true},
		{soil, "{unit_weight: 19, drained: {cohesion: 2, friction: 24}, undrained: {strength: 9, points: [[0, 0, 1]]}}", false},
		{soil, "{unit_weight: 19, drained: {cohesion: 2, friction: 24}, undrained: {points: [[0, 0, 1]]}}", true},
		{soil, "{unit_weight: 19, drained: {cohesion: 2, friction: 24}, colour: red}", false},
		{"top: ground", "top: grass", false},
		{dry, "required_ratio: 1.3", true},
		{dry, "required_fs: 1.3, required_ratio: 1.3", false},
		{dry, "kh: 0.1", false},
		{dry, dry + ", strength: {clay: drained}", true},
		{dry, dry + ", strength: wet", false},
		{dry, dry + ", drains_working: 50%", true},
		{dry, dry + ", drains_working: 50", false},
		{"situations:", "remedies: {regrade: {batter: 2 to 3 by 0.5}}\nsituations:", true},
		{"situations:", "remedies: {regrade: {batter: 2 to 3}}\nsituations:", false},
		{"situations:", "remedies: {unload: }\nsituations:", true},
		{"situations:", "remedies: {berm: }\nsituations:", false},
		{"situations:", "remedies: {berm: {fill: clay}}\nsituations:", true},
		{"situations:", "remedies: {magic: }\nsituations:", false},
		{"situations:", "trials: [{name: a, works: {regrade: {batter: 2}}}]\nsituations:", true},
		{"situations:", "trials: [{name: a, works: {regrade: {batter: 2 to 3 by 0.5}}}]\nsituations:", false},
		{"situations:", "limits: {works_between: {left: 2, right: {x: 9}}}\nsituations:", true},
		{"situations:", "limits: {works_between: {left: fence}}\nsituations:", false},
		{"situations:", "slips: {direction: up}\nsituations:", false},
	}
	for _, c := range cases {
		if !strings.Contains(small, c.old) {
			t.Fatalf("the small case does not hold %q", c.old)
		}
		src := []byte(strings.Replace(small, c.old, c.new, 1))
		_, readErr := Parse("x.yaml", src)
		schemaErr := s.Validate(asJSON(t, src))
		if (readErr == nil) != c.ok || (schemaErr == nil) != c.ok {
			t.Errorf("%q: want fit %v; reader %v; schema %v", c.new, c.ok, readErr, schemaErr)
		}
	}
}

// TestExamplesFitTheirKeys checks the example of every key against the shape of that key.
func TestExamplesFitTheirKeys(t *testing.T) {
	n := 0
	eachKey(caseShape(), "", func(path string, f field) {
		var doc yaml.Node
		if err := yaml.Load([]byte("example: "+f.example), &doc); err != nil {
			t.Errorf("%s: the example `%s` is not YAML: %v", path, f.example, err)
			return
		}
		r := &reader{bad: map[*yaml.Node]bool{}}
		r.check(f.shape, value{node: doc.Content[0].Content[1], path: path})
		for _, fault := range r.faults {
			t.Errorf("the example of %s: %v", path, fault)
		}
		n++
	})
	if n < 80 {
		t.Errorf("only %d keys", n)
	}
}

func TestStarter(t *testing.T) {
	if lines := bytes.Count(Starter(), []byte("\n")); lines > 80 {
		t.Errorf("the starter case has %d lines", lines)
	}
	c, err := Parse("starter.yaml", Starter())
	if err != nil {
		t.Fatal(err)
	}
	if len(c.Warnings) > 0 || !strings.Contains(c.Job.Title, "invented") {
		t.Errorf("title %q, warnings %q", c.Job.Title, c.Warnings)
	}
	taught := 0
	for _, f := range caseShape().fields {
		if bytes.Contains(Starter(), []byte("\n"+f.key+":")) {
			taught++
		}
	}
	if taught < 13 {
		t.Errorf("the starter case has only %d of the keys at the top", taught)
	}
}
