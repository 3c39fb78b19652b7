package report

import "standfast/remedies"

// SiteLimits are the limits of the works.
type SiteLimits struct {
	Left      *Fence      `json:"left" jsonschema:"nullable"`                      // Left end of the works; null: no limit.
	Right     *Fence      `json:"right" jsonschema:"nullable"`                     // Right end of the works; null: no limit.
	KeepClear []KeepClear `json:"keep_clear"`                                      // Zones that no dig or no load may enter.
	MaxLevels []MaxLevel  `json:"maximum_levels"`                                  // Greatest levels of the ground after works.
	Outfall   *float64    `json:"drain_outfall_y" jsonschema:"nullable"`           // Lowest level at which a drain can discharge, m; null: none given.
	Overhead  []Overhead  `json:"overhead"`                                        // Lines and structures above the ground that works stay clear of.
	Permanent *float64    `json:"steepest_permanent_batter" jsonschema:"nullable"` // Steepest face that stays: n of 1V:nH; null: no limit.
	Temporary *float64    `json:"steepest_temporary_batter" jsonschema:"nullable"` // Steepest face that stands open during construction: n of 1V:nH; null: no limit.
	MinBench  *float64    `json:"minimum_bench_m" jsonschema:"nullable"`           // Least width of a bench, m; null: no limit.
	MinHaul   *float64    `json:"minimum_haul_m" jsonschema:"nullable"`            // Least width that plant travels on, m; null: no limit.
	MaxImport *float64    `json:"maximum_import_m3" jsonschema:"nullable"`         // Most fill and stone brought, compacted m3 for the whole length; null: no limit.
}

// Overhead is a line or a structure above the ground.
type Overhead struct {
	Name      string  `json:"name"`        // Name.
	FromX     float64 `json:"from_x"`      // Left end, m.
	ToX       float64 `json:"to_x"`        // Right end, m.
	Level     float64 `json:"level"`       // Of its lowest part, m.
	Clearance float64 `json:"clearance_m"` // Between it and the ground after works, m.
}

// Fence is a side limit of the works.
type Fence struct {
	Name string  `json:"name"` // Name.
	X    float64 `json:"x"`    // Where it is, m.
}

// KeepClear is a zone that no dig or no load may enter.
type KeepClear struct {
	Name     string   `json:"name"`                              // Name.
	FromX    float64  `json:"from_x"`                            // Left end, m.
	ToX      float64  `json:"to_x"`                              // Right end, m.
	NoDig    bool     `json:"no_dig"`                            // True: nothing may be dug, but for dig_below_m.
	NoLoad   bool     `json:"no_load"`                           // True: nothing may be placed.
	DigBelow *float64 `json:"dig_below_m" jsonschema:"nullable"` // Depth below the ground before works down to which digging is allowed, m; null: none.
}

// MaxLevel is a greatest level of the ground after works.
type MaxLevel struct {
	Name  string  `json:"name"`   // Name.
	FromX float64 `json:"from_x"` // Left end, m.
	ToX   float64 `json:"to_x"`   // Right end, m.
	Level float64 `json:"level"`  // m.
}

// WaterLine is a piezometric line before works.
type WaterLine struct {
	Name     string       `json:"name"`                       // Name.
	Line     []Point      `json:"line" jsonschema:"nullable"` // From left to right; null: only what follows holds.
	Artesian bool         `json:"artesian"`                   // True: it keeps its head where works cut below it.
	Inclined bool         `json:"inclined_line,omitempty"`    // True: pressure below every line is reduced by cos^2 of the line's inclination.
	BySoil   []SoilLine   `json:"by_soil,omitempty"`          // Lines that hold in one soil in place of the line.
	Points   [][3]float64 `json:"points,omitempty"`           // Known pore pressures [x, y, u] in m and kPa, in place of all lines.
}

// SoilLine is the piezometric line of one soil before works.
type SoilLine struct {
	Soil     string  `json:"soil"`     // Name of the soil.
	Line     []Point `json:"line"`     // From left to right.
	Artesian bool    `json:"artesian"` // Keeps its head where works cut below it.
}

// StageSettings are what every construction stage must stand.
type StageSettings struct {
	WaterLine  string  `json:"water_line"`  // Name of the water line during works; empty: dry.
	RequiredFS float64 `json:"required_fs"` // FS required.
	Plant      float64 `json:"plant_kPa"`   // Pressure of construction plant, kPa; 0: none is counted.
}

// Dimension is a dimension of the works.
type Dimension struct {
	From   Point  `json:"from"`   // Where it is measured from.
	To     Point  `json:"to"`     // Where it is measured to.
	Label  string `json:"label"`  // In words.
	Batter bool   `json:"batter"` // True: the label tells the slope of the line, whose length is not measured.
}

func limitsOf(l *remedies.Limits) SiteLimits {
	out := SiteLimits{
		Left: fenceOf(l.Left), Right: fenceOf(l.Right), KeepClear: make([]KeepClear, len(l.KeepClear)),
		MaxLevels: make([]MaxLevel, len(l.MaxLevels)), Outfall: l.Outfall,
		Overhead: make([]Overhead, len(l.Overhead)), Permanent: given(l.Batters.Permanent), Temporary: given(l.Batters.Temporary),
		MinBench: given(l.MinBench), MinHaul: given(l.MinHaul), MaxImport: l.MaxImport,
	}
	for i, o := range l.Overhead {
		out.Overhead[i] = Overhead(o)
	}
	for i, k := range l.KeepClear {
		out.KeepClear[i] = KeepClear{Name: k.Name, FromX: k.FromX, ToX: k.ToX, NoDig: k.NoDig, NoLoad: k.NoLoad, DigBelow: k.DigBelow}
	}
	for i, m := range l.MaxLevels {
		out.MaxLevels[i] = MaxLevel{Name: m.Name, FromX: m.FromX, ToX: m.ToX, Level: m.Level}
	}
	return out
}

func fenceOf(f *remedies.Fence) *Fence {
	if f == nil {
		return nil
	}
	return &Fence{Name: f.Name, X: f.X}
}

// waterLines lists the water lines of the case.
func (b *builder) waterLines() []WaterLine {
	out := make([]WaterLine, len(b.job.Waters))
	for i, w := range b.job.Waters {
		out[i] = WaterLine{Name: w.Name, Line: points(w.Line), Artesian: w.Artesian, Inclined: w.Inclined}
		for _, own := range w.BySoil {
			out[i].BySoil = append(out[i].BySoil, SoilLine{Soil: b.soils[own.Soil], Line: points(own.Line), Artesian: own.Artesian})
		}
		for _, p := range w.Points {
			out[i].Points = append(out[i].Points, [3]float64{p.X, p.Y, p.Pressure})
		}
	}
	return out
}

// waterName returns the name of a water line by its index; empty for dry ground.
func (b *builder) waterName(i int) string {
	if i < 0 || i >= len(b.job.Waters) {
		return ""
	}
	return b.job.Waters[i].Name
}

func (b *builder) stageSettings() *StageSettings {
	s := &b.job.Stage
	if !s.Given {
		return nil
	}
	return &StageSettings{WaterLine: b.waterName(s.Water), RequiredFS: s.RequiredFS, Plant: s.Plant}
}

func dimensionsOf(list []remedies.Dimension) []Dimension {
	out := make([]Dimension, len(list))
	for i, d := range list {
		out[i] = Dimension{From: point(d.From), To: point(d.To), Label: d.Label, Batter: d.Batter}
	}
	return out
}
