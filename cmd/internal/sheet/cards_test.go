package sheet

import (
	"fmt"
	"html"
	"regexp"
	"strings"
	"testing"

	"standfast/cmd/internal/report"
	"standfast/cmd/internal/sample"
)

// plain is the text of a piece of the page, its words parted by single blanks.
func plain(markup string) string {
	return strings.Join(strings.Fields(html.UnescapeString(regexp.MustCompile(`<[^>]*>`).ReplaceAllString(markup, " "))), " ")
}

// Every card holds what is asked at the table, with the numbers of the result.
func TestCards(t *testing.T) {
	for _, name := range sample.Names {
		f := sample.Result(t, name)
		money, weight, loads := report.Number(4321.2), report.Number(12.345), report.Number(87)
		f.Economics.Currency = "EUR"
		f.Options[0].Totals.Cost, f.Options[0].Totals.Carbon, f.Options[0].Totals.Loads = &money, &weight, &loads
		page := string(written(t, f))
		for i := range f.Options {
			o := &f.Options[i]
			_, card, ok := strings.Cut(page, fmt.Sprintf(`data-option="%d"`, i))
			card, _, closed := strings.Cut(card, "</article>")
			if !ok || !closed {
				t.Fatalf("%s: no card for %s", name, o.Name)
			}
			got := plain(card)
			g, _ := o.Governing()
			q, all := &o.Quantities, func(v float64) string { return report.TotalText(v * f.Case.Length) }
			amount := func(what string, v float64, unit string) string {
				return fmt.Sprintf("%s %s %s %s %s", what, report.QuantityText(v), unit, all(v), unit)
			}
			want := []string{
				title(o.Title), o.Status, o.Dimensions(o.Parameters),
				"FS " + report.FactorText(g.FS) + " against " + required(g.RequiredFS) + " required in " + g.Check + " , the check with the least margin",
				amount("Earthworks", q.Earthworks, "m³"), amount("Cut", q.Cut, "m³"), amount("Fill", q.Fill, "m³"), amount("Import", q.Import, "m³"),
				amount("Disposal", q.Dispose, "m³"), amount("Drains", q.Drain, "m"), "Land taken ", "Key risk " + riskOf(o.Remedies), sentence(o.Reason),
			}
			if i == 0 {
				want = append(want, "Cost 4,322 EUR", "Carbon 13 t", "Lorry loads 87")
			} else {
				want = append(want, "Cost not given", "Carbon not given", "Lorry loads not given")
			}
			for _, w := range want {
				if !strings.Contains(got, w) {
					t.Errorf("%s, %s: the card does not say %q:\n%s", name, o.Name, w, got)
				}
			}
		}
	}
}
