package pdfreport

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"standfast/cmd/internal/casefile"
	"standfast/cmd/internal/drawing"
	"standfast/cmd/internal/report"
)

// inputs writes what the case says, as it was understood.
func (a *author) inputs() {
	a.chapter("Inputs as understood")
	a.para("Coordinates are offset and level of the case file, in metres. Strengths and unit weights are those in force; nothing was factored.")
	for _, n := range a.f.Case.Notes {
		a.item(sentence(n))
	}
	a.soils()
	a.ground()
	a.waters()
	a.loads()
	a.situations()
	a.limits()
	a.economics()
	a.settings()
}

func (a *author) soils() {
	a.heading("Soils")
	var rows []row
	for _, name := range a.f.SoilOrder {
		s := a.f.Soils[name]
		c, phi := report.SizeText(s.Drained.Cohesion), report.SizeText(s.Drained.Friction)
		if s.PowerLaw != nil {
			c, phi = none, none
		}
		rows = append(rows, cells(name, report.SizeText(s.UnitWeight), report.SizeText(s.SaturatedUnitWeight), c, phi, undrained(s.Undrained), soilWords(&s)))
	}
	a.table([]column{text("soil"), number("γ\nkN/m³"), number("γ sat.\nkN/m³"), number("c′\nkPa"), number("φ′\n°"), text("undrained cu"), text("besides")}, rows)
}

// undrained describes an undrained strength.
func undrained(u *report.Undrained) string {
	if u == nil {
		return none
	}
	switch {
	case len(u.Points) > 0:
		out := make([]string, len(u.Points))
		for i, p := range u.Points {
			out[i] = fmt.Sprintf("%s kPa at (%s, %s)", report.SizeText(p[2]), report.SizeText(p[0]), report.SizeText(p[1]))
		}
		return strings.Join(out, "; ")
	case u.Ratio != nil:
		out := report.SizeText(*u.Ratio) + " σ′v before works"
		if u.Minimum != nil {
			out += ", at least " + report.SizeText(*u.Minimum) + " kPa"
		}
		return out
	}
	out := report.SizeText(u.Strength) + " kPa"
	if u.Gradient != 0 {
		out += " + " + report.SizeText(u.Gradient) + " kPa/m"
		switch {
		case u.DatumY != nil:
			out += " below level " + report.SizeText(float64(*u.DatumY))
		case len(u.Datum) > 0:
			out += " below the line " + line(u.Datum)
		}
	}
	return out
}

// soilWords says what else is known of a soil.
func soilWords(s *report.Soil) string {
	var out []string
	if p := s.PowerLaw; p != nil {
		out = append(out, fmt.Sprintf("strength %s pa (σ′/pa)^%s, pa %s kPa, straight to the origin below %s kPa",
			report.SizeText(p.A), report.SizeText(p.B), report.SizeText(p.Atmospheric), report.SizeText(p.LeastStress)))
	}
	if s.Ru != nil {
		out = append(out, "pore pressure ratio ru "+report.SizeText(*s.Ru))
	}
	if s.FreeDraining {
		out = append(out, "drains freely")
	}
	if s.SlowDraining {
		out = append(out, "drains slowly: fill on it is checked at the end of construction")
	}
	if len(out) == 0 {
		return none
	}
	return strings.Join(out, "; ")
}

func (a *author) ground() {
	a.heading("Ground and strata before works")
	s := a.f.Existing.Section
	var rows []row
	for i, t := range s.Strata {
		top := line(t.Top)
		if i == 0 {
			top = "ground: " + top
		}
		rows = append(rows, cells(fmt.Sprint(i+1), t.Soil, top))
	}
	for _, p := range s.Placed {
		rows = append(rows, cells(none, p.Soil, "body: "+line(p.Outline)))
	}
	if len(s.FirmBase) > 0 {
		rows = append(rows, cells(none, "firm base", line(s.FirmBase)))
	}
	a.table([]column{number("no."), text("soil"), text("top, from left to right (offset, level), m")}, rows)
}

func (a *author) waters() {
	a.heading("Water lines before works")
	var rows []row
	for _, w := range a.f.WaterLines {
		var also []string
		if w.Artesian {
			also = append(also, "artesian: keeps its head where works cut below it")
		}
		if w.Inclined {
			also = append(also, "pressure reduced by cos² of the inclination of the line")
		}
		for _, own := range w.BySoil {
			also = append(also, "in "+own.Soil+": "+line(own.Line))
		}
		for _, p := range w.Points {
			also = append(also, fmt.Sprintf("u %s kPa at (%s, %s)", report.SizeText(p[2]), report.SizeText(p[0]), report.SizeText(p[1])))
		}
		points := line(w.Line)
		if points == "" {
			points = "no line"
		}
		rows = append(rows, cells(w.Name, strings.Join(append([]string{points}, also...), "; ")))
	}
	if len(rows) == 0 {
		a.para("None: the ground is dry.")
		return
	}
	a.table([]column{text("name"), text("points from left to right (offset, level), m")}, rows)
}

func (a *author) loads() {
	s := a.f.Existing.Section
	var rows []row
	for _, l := range s.Surcharges {
		size := report.SizeText(l.Pressure) + " kPa"
		if l.PressureTo != nil {
			size += " to " + report.SizeText(*l.PressureTo) + " kPa"
		}
		if l.Horizontal != 0 {
			size += ", " + report.SizeText(math.Abs(l.Horizontal)) + " kPa to the " + sideways(l.Horizontal)
		}
		rows = append(rows, cells(l.Name, l.Kind, size, span(l.FromX, l.ToX)))
	}
	for _, l := range s.LineLoads {
		rows = append(rows, cells(l.Name, "line load", forceWords(&l), report.SizeText(l.X)))
	}
	for _, r := range s.Restraints {
		rows = append(rows, cells(r.Name, "row of elements", fmt.Sprintf("%s kN/m between levels %s and %s", report.SizeText(r.Force), report.SizeText(r.Bottom), report.SizeText(r.Top)), report.SizeText(r.X)))
	}
	for _, k := range s.Known {
		strength := fmt.Sprintf("c′ %s kPa, φ′ %s° on it; ", report.SizeText(k.Cohesion), report.SizeText(k.Friction))
		rows = append(rows, cells("slip surface", "exists already", strength+line(k.Line), span(k.Line[0][0], k.Line[len(k.Line)-1][0])))
	}
	if k := s.Crack; k != nil {
		rows = append(rows, cells("tension crack", "at the head of every slip", crackWords(k), none))
	}
	if len(rows) == 0 {
		return
	}
	a.heading("Loads, what holds, and what has moved")
	a.table([]column{text("name"), text("kind"), text("size"), text("offset, m")}, rows)
}

// forceWords says how large a line load is, and whereto.
func forceWords(l *report.LineLoad) string {
	var out []string
	switch {
	case l.Vertical > 0:
		out = append(out, report.SizeText(l.Vertical)+" kN/m down")
	case l.Vertical < 0:
		out = append(out, report.SizeText(-l.Vertical)+" kN/m up")
	}
	if l.Horizontal != 0 {
		out = append(out, report.SizeText(math.Abs(l.Horizontal))+" kN/m to the "+sideways(l.Horizontal))
	}
	return strings.Join(out, ", ")
}

// sideways names the direction of a horizontal force.
func sideways(v float64) string {
	if v < 0 {
		return "left"
	}
	return "right"
}

func crackWords(k *report.TensionCrack) string {
	out := report.SizeText(k.Depth) + " m deep"
	if len(k.Line) > 0 {
		out = "down to " + line(k.Line)
	}
	if k.WaterLevel != nil {
		return out + ", water to level " + report.SizeText(*k.WaterLevel)
	}
	return out + ", water over " + report.SizeText(100*k.WaterShare) + " % of it"
}

func span(from, to float64) string { return report.SizeText(from) + " to " + report.SizeText(to) }

func (a *author) situations() {
	a.heading("Design situations")
	var rows []row
	for _, s := range a.f.Situations {
		name := s.Name
		water := s.WaterLine
		if water == "" {
			water = "dry"
		}
		drains := none
		if s.DrainsWorking != nil && s.DrainsWorking.Known() {
			drains = report.SizeText(100*float64(*s.DrainsWorking)) + " %"
		}
		applies := "all"
		if s.AppliesTo != nil {
			applies = strings.Join(a.titles(s.AppliesTo), ", ")
		}
		rows = append(rows, cells(name, required(s.RequiredFS), strength(s.Strength, a.f.SoilOrder), water, report.SizeText(s.Kh), report.SizeText(s.Kv), drains, applies))
	}
	if s := a.f.StageSettings; s != nil {
		water := s.WaterLine
		if water == "" {
			water = "dry"
		}
		rows = append(rows, cells("construction stages", required(s.RequiredFS), "by stage", water, none, none, none, "all"))
	}
	a.table([]column{text("situation"), number("required\nFS"), text("strength"), text("water line"), number("kh"), number("kv"), number("drains'\neffect"), text("checked for")}, rows)
	if a.f.StageSettings == nil {
		a.para("The case has no stage settings: construction stages were not checked.")
	}
}

// titles turns names of options into their titles.
func (a *author) titles(names []string) []string {
	out := make([]string, len(names))
	for i, n := range names {
		out[i] = n
		if k := slices.IndexFunc(a.f.Options, func(o report.Option) bool { return o.Name == n }); k >= 0 {
			out[i] = a.f.Options[k].Title
		}
	}
	return out
}

func (a *author) limits() {
	l := &a.f.Limits
	var rows []row
	for _, side := range []struct {
		words string
		fence *report.Fence
	}{{"works stay right of it", l.Left}, {"works stay left of it", l.Right}} {
		if side.fence != nil {
			rows = append(rows, cells(side.fence.Name, side.words, report.SizeText(side.fence.X)))
		}
	}
	for _, k := range l.KeepClear {
		rows = append(rows, cells(k.Name, forbidden(&k), span(k.FromX, k.ToX)))
	}
	for _, m := range l.MaxLevels {
		rows = append(rows, cells(m.Name, "ground after works no higher than level "+report.SizeText(m.Level)+" m", span(m.FromX, m.ToX)))
	}
	for _, o := range l.Overhead {
		rows = append(rows, cells(o.Name, fmt.Sprintf("ground after works stays %s m clear of level %s m", report.SizeText(o.Clearance), report.SizeText(o.Level)), span(o.FromX, o.ToX)))
	}
	for _, n := range []struct {
		name, words, unit string
		value             *float64
	}{
		{"steepest face that stays", "1V:", "H", l.Permanent},
		{"steepest face during construction", "1V:", "H", l.Temporary},
		{"least width of a bench", "", " m", l.MinBench},
		{"least width that plant travels on", "", " m", l.MinHaul},
		{"most fill and stone brought", "", " m³ compacted, for the whole length", l.MaxImport},
	} {
		if n.value != nil {
			rows = append(rows, cells(n.name, n.words+report.SizeText(*n.value)+n.unit, none))
		}
	}
	if l.Outfall != nil {
		rows = append(rows, cells("drain outfall", "drains discharge at level "+report.SizeText(*l.Outfall)+" m or above", none))
	}
	if len(rows) == 0 {
		return
	}
	a.heading("Limits of the works")
	a.table([]column{text("limit"), text("what it asks"), text("offset, m")}, rows)
}

// forbidden says what a keep-clear zone forbids.
func forbidden(k *report.KeepClear) string {
	var out []string
	switch {
	case k.NoDig && k.DigBelow != nil:
		out = append(out, "no dig deeper than "+report.SizeText(*k.DigBelow)+" m")
	case k.NoDig:
		out = append(out, "no dig")
	}
	if k.NoLoad {
		out = append(out, "no load")
	}
	return strings.Join(out, ", ")
}

func (a *author) settings() {
	s := &a.f.Settings
	a.heading("Settings of the searches")
	movement := map[string]string{"either": "in both directions", "left": "to the left", "right": "to the right"}[s.Direction]
	ranges := func(r *[2]float64) string {
		if r == nil {
			return "everywhere"
		}
		return "offset " + span(r[0], r[1]) + " m"
	}
	rows := []row{
		cells("what sizings make least", a.f.Objective()),
		cells("depth of interest: slips nowhere deeper below the ground are left out", report.SizeText(s.DepthOfInterest)+" m"),
		cells("movement looked at", movement),
		cells("slices of a slip in a search; twice as many in an audit", fmt.Sprint(s.Slices)),
		cells("FS by which an answer exceeds what is required, for the search being finite", report.SizeText(s.Allowance)),
		cells("side-force function of Morgenstern-Price", s.SideForce.String()),
		cells("unit weight of water", report.SizeText(s.GammaW)+" kN/m³"),
	}
	if r := s.SearchRanges; r.Head != nil || r.Exit != nil {
		rows = append(rows, cells("slips start at their head", ranges(r.Head)), cells("slips leave at their toe", ranges(r.Exit)))
	}
	a.table([]column{text("setting"), text("value")}, rows)
	for _, o := range s.Overrides {
		a.item("Changed on the command line: " + o + ".")
	}
}

// model draws the ground and water model.
func (a *author) model() error {
	job := *a.r.Job
	if read, err := casefile.Parse(a.f.Case.File, []byte(a.f.Case.Source)); err == nil { // A result of an earlier version may lack the case.
		job.Observed = read.Job.Observed
	}
	figure, err := drawing.Section(&job, nil, drawing.Options{})
	return a.onFold(figure, err)
}
