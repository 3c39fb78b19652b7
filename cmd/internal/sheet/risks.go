package sheet

import "strings"

// risks holds by kind of remedy what most often goes wrong with it (common practice, no source).
var risks = map[string]string{
	"regrade":          "Takes land at the crest, and gains little where the water stays up: cutting towards a fixed water line brings almost nothing. Surface water must be led away from the new face.",
	"unload":           "The ground above the platform must not be steepened, and the platform must not hold water. It loads nothing at the toe, so a slip that is low down hardly notices it.",
	"berm":             "Loads the ground beneath at once: soft clay may fail while it is built. Fill over seepage dams the water unless a drainage blanket leads it out.",
	"buttress":         "Works only as long as its outlet and filter stay open. Digging its seat takes support from the toe, so it is built in short panels in dry weather.",
	"trench_drains":    "The gain fades when drains clog, and comes slowly in clay. Trenches need support while open, and an outfall that is kept clear for good.",
	"lightweight_fill": "Light fill floats when the ground floods, and may burn or settle. While the head is dug out, its back face must stand.",
	"shear_key":        "The open trench takes support from the slope until it is filled, so it is dug in short panels, the least critical end first.",
	"drilled_drains":   "Drains silt up and must be flushed; they help only where they meet the water. Their outlets must stay open and be looked after for good.",
	"toe_drain":        "A trench along the toe takes support from the slope while it is open. It reaches only the water near the toe, and its outfall must stay free.",
	"interceptor":      "Cuts off only water that comes from behind the crest; pressure from below stays. Its ditch must be kept clear and watertight on the slope's side.",
	"piles_or_nails":   "Shows only what a row of that capacity would bring: the elements, their heads and the ground between them need their own design.",
	"water_lowering":   "Shows only what lower water would bring: how to lower it, and keep it lowered, is not designed here.",
}

// riskOf returns the key risk of the remedies of an option.
func riskOf(kinds []string) string {
	var out []string
	for _, k := range kinds {
		if r := risks[k]; r != "" {
			out = append(out, r)
		}
	}
	if len(out) == 0 {
		return "Not on record; ask the designer."
	}
	return strings.Join(out, " ")
}
