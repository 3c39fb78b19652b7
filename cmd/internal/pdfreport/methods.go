package pdfreport

import (
	"fmt"

	"standfast/cmd/internal/report"
)

// methods writes how the numbers were found and where they hold.
func (a *author) methods() {
	s := &a.f.Settings
	a.chapter("Methods and limits of validity")
	a.heading("Factor of safety")
	a.item("Limit equilibrium of a sliding body in slices, two-dimensional, for a metre run. The factor of safety (FS) is the shear strength available along the slip over that needed for equilibrium, the same in every slice.")
	a.item("The lowest converged and admissible value governs: of Bishop's simplified (1955) and Spencer's method (1967) on circles, of Spencer's and of Morgenstern and Price's method (1965) on slips of other shapes. The ordinary method (Fellenius 1936) and Janbu's simplified method (1954, with f0 1973) stand beside them for comparison.")
	a.item("Morgenstern and Price's method takes the side forces as lambda times a function along the slip from head to exit, in the case: " + s.SideForce.String() + ".")
	a.item("An answer is inadmissible and does not count where m-alpha is too small at the exit, the drag between slices is reversed, the base pulls more than it presses, or the line of thrust runs far outside the body. An FS that did not converge is not shown anywhere.")
	a.heading("Pore pressure and strength")
	a.item(fmt.Sprintf("Pore pressure is %s kN/m³ times the vertical depth below the water line, or follows what the soil or the case gives in its place. Free water loads the ground and sets the head below it.", report.SizeText(s.GammaW)))
	a.item("Soil that acts undrained has the strength cu without friction and no pore pressure of its own. Undrained strength is that of the ground before works: what consolidation under new fill would add is not counted.")
	a.item("Water lines are drawn down to the new ground where works cut below them, unless they are artesian. Whether a line follows a cut in time, and how far drains lower it, rests on the permeability, which is not analysed here.")
	a.heading("Search for slips")
	a.item("Circles and polylines from a global sweep, then descents from every basin found, in every situation and stage. The search is finite: an answer must exceed what is required by the allowance, and is searched again by an audit with another sampler and seed, and finer slices.")
	a.item(fmt.Sprintf("Slips nowhere deeper than %s m below the ground in force are left out. Shallower ones, such as ravelling and erosion of a face, are dealt with by its batter, facing and drainage.", report.SizeText(s.DepthOfInterest)))
	a.item("A check is unresolved, and not passed, where a trial that no governing method could solve may lie below what is required.")
	a.heading("Sizing")
	a.item("Each remedy is sized on a lattice of sizes that can be set out. Designs are looked at in ascending " + a.f.Objective() + " (earthworks are bank cut plus compacted fill, never netted); one is rejected as soon as a slip below what is required is known, and accepted only after a full search of every situation and stage and the audit.")
	a.item("The certificate lists a slip for every cheaper design that was rejected; witnesses.json holds them all, and verify evaluates them again. It says least on this lattice, for this remedy and these methods. It does not say that no smaller works could do.")
	a.heading("Where the results hold")
	for _, l := range []string{
		"Sections that vary little along the slope; support by the sides of a narrow slip is not counted.",
		"Ground that fails along a surface at once. Progressive failure, liquefaction, toppling and flow are not looked at.",
		"Strength only: movements, settlement, and what they do to neighbouring structures are not worked out.",
		"An earthquake, where the case has one, acts as a constant share of the weight.",
		"Works as drawn. Stability of trenches while they are open, bearing of plant, filters, surface water and erosion need their own design.",
	} {
		a.item(l)
	}
	a.heading("How to read the slice tables")
	for _, l := range report.SliceLegend() {
		a.indented(faceTable, ink, 11, "–", l)
	}
}
