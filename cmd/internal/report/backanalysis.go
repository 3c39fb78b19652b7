package report

import (
	"fmt"
	"io"

	"github.com/jedib0t/go-pretty/v6/table"

	"standfast/lem"
	"standfast/remedies"
)

// BackFormat names the layout of what backanalyse prints as JSON.
const BackFormat = "standfast-backanalysis/1"

// BackFile is the answer of a back-analysis.
type BackFile struct {
	Format    string      `json:"format"`
	Case      BackCase    `json:"case"`
	Find      string      `json:"find"`      // "strength", "friction", "cu" or "ru".
	Soil      string      `json:"soil"`      // The soil looked into.
	Share     float64     `json:"share"`     // Of the length of the slip that runs in it.
	Situation string      `json:"situation"` // State at failure.
	Method    string      `json:"method"`
	SideForce *SideForce  `json:"side_force_function,omitempty"` // Of Morgenstern-Price's method; other methods have none.
	Slip      *Slip       `json:"slip"`
	Depth     float64     `json:"slip_depth_m"`
	AsGiven   Number      `json:"fs_as_given"` // FS of the observed slip with the strengths of the case; null without an answer.
	Curve     []BackPoint `json:"curve"`       // Pairs at FS = 1 from the least cohesion up, or FS over the single unknown.
	Low       BackPoint   `json:"low"`
	Middle    BackPoint   `json:"middle"`
	High      BackPoint   `json:"high"`
	Margin    float64     `json:"fs_margin"` // Of a single unknown: low and high stand at FS 1 less and plus this; of pairs 0.
	Bend      Number      `json:"bend"`      // Greatest distance of c' over tan(phi') from a straight line, over the greatest c'; null for one unknown.
	Cautions  []string    `json:"cautions"`
}

// BackCase says which case was read.
type BackCase struct {
	Title  string `json:"title"`
	File   string `json:"file"`
	SHA256 string `json:"sha256"`
}

// BackPoint is a strength or a pore pressure ratio, and the FS of the observed slip with it. What is not looked for is null.
type BackPoint struct {
	Cohesion *float64 `json:"cohesion_kPa"`
	Friction *float64 `json:"friction_angle_deg"`
	Strength *float64 `json:"undrained_strength_kPa"`
	Ru       *float64 `json:"ru"`
	FS       Number   `json:"fs"`
}

// NewBack lays out the answer of a back-analysis.
func NewBack(j *remedies.Job, b *remedies.BackAnalysis, src Source) *BackFile {
	point := func(p *remedies.BackPoint) BackPoint { return backPoint(b.Unknown, p) }
	f := &BackFile{
		Format: BackFormat, Case: BackCase{j.Title, src.File, src.SHA256}, Find: b.Unknown.String(), Soil: j.Section.Soils[b.Soil].Name, Share: b.Share,
		Situation: j.Situations[b.Situation].Name, Method: b.Method.String(), Slip: slipOf(&j.Observed.Slip, b.From, b.To), Depth: b.Depth,
		AsGiven: Number(b.AsGiven), Low: point(&b.Low), Middle: point(&b.Middle), High: point(&b.High), Margin: b.Margin, Bend: Number(b.Bend),
		Cautions: append(BackCautions(), Cautions()...),
	}
	if b.Method == lem.MorgensternPrice {
		side := sideForceOf(&j.SideForce)
		f.SideForce = &side
	}
	for i := range b.Curve {
		f.Curve = append(f.Curve, point(&b.Curve[i]))
	}
	return f
}

func backPoint(u remedies.Unknown, p *remedies.BackPoint) BackPoint {
	out := BackPoint{FS: Number(p.FS)}
	phi := degreesOf(p.Friction)
	switch u {
	case remedies.StrengthPair, remedies.FrictionAlone:
		out.Cohesion, out.Friction = &p.Cohesion, &phi
	case remedies.UndrainedCu:
		out.Strength = &p.Strength
	case remedies.PressureRatio:
		out.Ru = &p.Ru
	}
	return out
}

// BackCautions are what a reader of a back-analysis must bear in mind besides.
func BackCautions() []string {
	return []string{
		"One failure gives one equation: whatever the water at failure, the slip or the model is wrong by is taken up by the strength found.",
		"A narrow slip has support at its sides that a section does not see: the strength found is then too high.",
		"Use laboratory tests, residual where the ground has slipped before, to choose on the curve; size with the low, the middle and the high point, since the order of the remedies may change.",
	}
}

// shownTol is what the FS of a root may lie below 1 by without being shown so.
const shownTol = 1e-6

// WriteBack prints a back-analysis.
func WriteBack(w io.Writer, f *BackFile, look Look) error {
	p := newPrinter(w, look)
	p.para("", fmt.Sprintf("%s, from %s: back-analysis of the observed slip", f.Case.Title, f.Case.File))
	method := f.Method
	if f.SideForce != nil {
		method += ", side-force function " + f.SideForce.String()
	}
	p.para("", fmt.Sprintf("Slip from (%.2f, %.2f) to (%.2f, %.2f), %.2f m deep; %.0f %% of it runs in %s. State at failure: %s. Method: %s.",
		f.Slip.From[0], f.Slip.From[1], f.Slip.To[0], f.Slip.To[1], f.Depth, 100*f.Share, f.Soil, f.Situation, method))
	p.para("", "FS with the strengths of the case: "+FactorText(f.AsGiven)+".")
	p.heading(f.heading())
	p.backTable(f, f.Curve, nil)
	p.heading("Points to go on with")
	p.backTable(f, []BackPoint{f.Low, f.Middle, f.High}, []string{"low", "middle", "high"})
	switch {
	case f.Margin > 0:
		p.para("", fmt.Sprintf("Low and high stand at FS %.2f and %.2f: a slip that has happened may be calculated at so much from 1.", 1-f.Margin, 1+f.Margin))
	case f.Bend.Known():
		p.para("", fmt.Sprintf("Between its ends c' leaves the straight line over tan(phi') by at most %s %% of the greatest c'.", ceilText(100*float64(f.Bend), 1)))
	}
	p.cautions(f.Cautions)
	return p.err
}

func (f *BackFile) heading() string {
	return map[string]string{
		remedies.StrengthPair.String():  "Cohesion and friction of " + f.Soil + " that give FS 1",
		remedies.FrictionAlone.String(): "FS over the angle of friction of " + f.Soil + ", c' = 0",
		remedies.UndrainedCu.String():   "FS over the undrained strength of " + f.Soil,
		remedies.PressureRatio.String(): "FS over the pore pressure ratio of " + f.Soil + ", strength as given",
	}[f.Find]
}

// backTable prints points: strengths rounded down, pore pressure ratios up.
func (p *printer) backTable(f *BackFile, points []BackPoint, names []string) {
	var columns []column
	if names != nil {
		columns = append(columns, column{head: "point"})
	}
	right := func(head string) { columns = append(columns, column{head: head, right: true}) }
	switch f.Find {
	case remedies.UndrainedCu.String():
		right("cu, kPa")
	case remedies.PressureRatio.String():
		right("ru")
	default:
		right("c', kPa")
		right("phi', deg")
	}
	right("FS")
	var rows []table.Row
	for i, q := range points {
		var row table.Row
		if names != nil {
			row = append(row, names[i])
		}
		for _, v := range []*float64{q.Cohesion, q.Friction, q.Strength} {
			if v != nil {
				row = append(row, strengthText(*v))
			}
		}
		if q.Ru != nil {
			row = append(row, ratioText(*q.Ru))
		}
		rows = append(rows, append(row, FactorText(q.FS+shownTol)))
	}
	p.table(columns, rows)
}

// Text says in one line what a point is: strengths rounded down, a pore pressure ratio up.
func (q *BackPoint) Text() string {
	switch {
	case q.Friction != nil:
		return fmt.Sprintf("c' %s kPa, phi' %s degrees", strengthText(*q.Cohesion), strengthText(*q.Friction))
	case q.Strength != nil:
		return fmt.Sprintf("cu %s kPa", strengthText(*q.Strength))
	}
	return "ru " + ratioText(*q.Ru)
}

// strengthText returns a strength that was found, rounded down to two decimals but for what closing an equation leaves behind.
func strengthText(v float64) string { return floorText(v*(1+shownTol), 2) }

// ratioText returns a pore pressure ratio that was found, rounded up likewise to three decimals.
func ratioText(v float64) string { return ceilText(v*(1-shownTol), 3) }

// MethodNamed returns the governing method of that name and reports whether there is one.
func MethodNamed(name string) (lem.Method, bool) {
	for _, m := range BackMethods() {
		if m.String() == name {
			return m, true
		}
	}
	return 0, false
}

// BackMethods are the methods that a back-analysis may go by.
func BackMethods() []lem.Method { return []lem.Method{lem.Bishop, lem.Spencer, lem.MorgensternPrice} }
