package casefile

import (
	"encoding/json"
	"fmt"
)

// Schema returns the JSON Schema (draft 2020-12) of the case file, for editors that check while one types. It holds what the table of
// keys holds; what joins two keys, such as a name that must exist, only [Parse] checks.
func Schema() []byte {
	root := caseShape().schema()
	root["$schema"] = "https://json-schema.org/draft/2020-12/schema"
	root["title"] = "standfast case file"
	out, err := json.MarshalIndent(root, "", "  ")
	if err != nil {
		panic("casefile: the schema is not JSON: " + err.Error()) // a programmer's error: the table holds a value that JSON has not
	}
	return append(out, '\n')
}

// schema returns the JSON Schema of the shape.
func (s *shape) schema() map[string]any {
	switch s.kind {
	case textKind:
		return map[string]any{"type": []string{"string", "number", "boolean"}, "maxLength": maxName}
	case numberKind:
		return s.numberSchema()
	case booleanKind:
		return map[string]any{"type": "boolean"}
	case wordKind:
		return map[string]any{"enum": s.words}
	case shareKind:
		return anyOf(map[string]any{"type": "number", "minimum": 0, "maximum": 1}, pattern(`^`+numberPattern+` ?%$`))
	case sizeKind:
		return anyOf(s.numberSchema(), pattern(rangeRule.String()))
	case tupleKind:
		return s.tupleSchema()
	case listKind:
		return map[string]any{"type": "array", "items": s.elem.schema(), "minItems": s.min, "maxItems": s.max}
	case namedKind:
		return map[string]any{
			"type": "object", "additionalProperties": s.elem.schema(),
			"propertyNames": map[string]any{"minLength": 1, "maxLength": maxName},
			"minProperties": s.min, "maxProperties": s.max,
		}
	case objectKind:
		return s.objectSchema()
	case eitherKind:
		var all []map[string]any
		for _, c := range s.choices {
			all = append(all, c.schema())
		}
		return anyOf(all...)
	}
	return nil
}

func anyOf(choices ...map[string]any) map[string]any { return map[string]any{"anyOf": choices} }

func pattern(rule string) map[string]any { return map[string]any{"type": "string", "pattern": rule} }

func (s *shape) numberSchema() map[string]any {
	lo, hi := "minimum", "maximum"
	if s.bounds.openMin {
		lo = "exclusiveMinimum"
	}
	if s.bounds.openMax {
		hi = "exclusiveMaximum"
	}
	return map[string]any{"type": "number", lo: s.bounds.min, hi: s.bounds.max}
}

func (s *shape) tupleSchema() map[string]any {
	var parts []any
	for _, p := range s.parts {
		part := p.shape.schema()
		part["description"] = p.key
		parts = append(parts, part)
	}
	return map[string]any{"type": "array", "prefixItems": parts, "items": false, "minItems": len(parts)}
}

func (s *shape) objectSchema() map[string]any {
	properties := map[string]any{}
	required := []string{}
	for _, f := range s.fields {
		p := f.shape.schema()
		p["description"] = f.description()
		properties[f.key] = p
		if f.required {
			required = append(required, f.key)
		}
	}
	out := map[string]any{"type": "object", "properties": properties, "additionalProperties": false}
	if len(required) > 0 {
		out["required"] = required
	}
	if len(s.oneOf) > 0 {
		var each []map[string]any
		for _, key := range s.oneOf {
			each = append(each, map[string]any{"required": []string{key}})
		}
		out["oneOf"] = each
	}
	if s.nullable && len(required) == 0 {
		out["type"] = []string{"object", "null"}
	}
	return out
}

// description returns what the key means, with unit and default.
func (f *field) description() string {
	text := f.meaning
	if f.shape.unit != "" {
		text += fmt.Sprintf(" Unit: %s.", f.shape.unit)
	}
	if !f.required {
		text += fmt.Sprintf(" Without it: %s.", f.standard)
	}
	return text
}
