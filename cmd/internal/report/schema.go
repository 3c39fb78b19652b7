package report

import _ "embed" // For the schema.

//go:embed result.schema.json
var schema []byte

// Schema returns the JSON Schema (draft 2020-12) of result.json. It is made from the declarations and comments of [File]; a test keeps
// it so.
func Schema() []byte { return append([]byte(nil), schema...) }
