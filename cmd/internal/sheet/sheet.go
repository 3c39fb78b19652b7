package sheet

import (
	"bytes"
	"crypto/sha256"
	_ "embed" // For the page, its style and its script.
	"encoding/base64"
	"encoding/json"
	"fmt"
	"html/template"
	"io"

	"standfast/cmd/internal/report"
)

// Name is the name of the sheet in a folder of results.
const Name = "sheet.html"

//go:embed page.html
var pageSource string

//go:embed ui/dist/sheet.css
var style string

//go:embed ui/dist/sheet.js
var script string

var page = template.Must(template.New(Name).Funcs(template.FuncMap{
	"size":     report.SizeText,
	"last":     func(stops []target) int { return len(stops) - 1 },
	"word":     func(mark string) string { return markWords[mark[0]] },
	"required": requiredOf,
}).Parse(pageSource))

// markWords say what the marks of checks mean.
var markWords = map[byte]string{markPass: "passes", markFail: "falls short", markOpen: "unresolved", markNone: "not checked"}

// requiredOf returns the FS required in the governing check of a design, as specified.
func requiredOf(d *document, w *design) string {
	if w.Governing < 0 {
		return "-"
	}
	return d.model.Data.Stops[d.model.Data.Specified].Required[w.Governing]
}

// document is what the page is filled from.
type document struct {
	*model
	Policy string
	Style  template.CSS
	Script template.JS
	JSON   template.JS
}

// Write writes the sheet of a result; the same result gives the same bytes. It returns the error of w.
func Write(w io.Writer, f *report.File) error {
	m := newModel(f)
	data, err := json.Marshal(&m.Data) // Escapes <, > and &, so that no text of the case can end the element.
	if err != nil {
		return fmt.Errorf("sheet: %w", err)
	}
	d := document{
		model: m,
		Policy: fmt.Sprintf("default-src 'none'; script-src '%s'; style-src '%s'; img-src data:; base-uri 'none'; form-action 'none'",
			digest(script), digest(style)),
		Style:  template.CSS(style),
		Script: template.JS(script),
		JSON:   template.JS(data),
	}
	var b bytes.Buffer
	if err := page.Execute(&b, &d); err != nil {
		return fmt.Errorf("sheet: %w", err)
	}
	_, err = b.WriteTo(w)
	return err
}

// digest returns the source expression that allows an inline text in a content policy.
func digest(text string) string {
	sum := sha256.Sum256([]byte(text))
	return "sha256-" + base64.StdEncoding.EncodeToString(sum[:])
}
