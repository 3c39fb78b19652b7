package report

// Section is a cross-section as analysed. The tops of the strata are those of the ground before works and are not clipped: Ground
// clips them. Placed bodies are painted over the strata in order, and Ground already includes them. Every line is held level beyond its
// ends.
type Section struct {
	GroundBefore []Point          `json:"ground_before"`           // Ground before works, from left to right.
	Ground       []Point          `json:"ground"`                  // Ground in force, from left to right.
	Strata       []Stratum        `json:"strata"`                  // From the surface down; the first top is the ground before works.
	Placed       []Body           `json:"placed"`                  // Fill and exchanged ground, later over earlier.
	Surcharges   []Surcharge      `json:"surcharges"`              // Pressures on the ground.
	LineLoads    []LineLoad       `json:"line_loads,omitempty"`    // Permanent forces along lines on the ground.
	Restraints   []Restraint      `json:"restraints,omitempty"`    // Rows of structural elements that hold slips back.
	Crack        *TensionCrack    `json:"tension_crack,omitempty"` // Tension crack at the head of every slip.
	Known        []KnownSlip      `json:"known_slips,omitempty"`   // Slip surfaces that exist already.
	FirmBase     []Point          `json:"firm_base,omitempty"`     // Line below which no slip passes.
	Water        map[string]Water `json:"water"`                   // By name of the situation or stage.
	// Soils of this section alone, by name: what is left, as a mean over the length, of ground that a hole in panels takes away.
	Soils map[string]Soil `json:"soils,omitempty"`
}

// Restraint is a row of structural elements: a horizontal force against the movement of a slip that crosses x between the two levels. It is part
// of the driving side: it is taken off what drives.
type Restraint struct {
	Name   string  `json:"name"`           // Name.
	X      float64 `json:"x"`              // Where the row stands, m.
	Top    float64 `json:"top_y"`          // Level of its top, m.
	Bottom float64 `json:"bottom_y"`       // Level of its bottom, m.
	Force  float64 `json:"force_kN_per_m"` // Force for a metre run, kN/m.
}

// Stratum is a layer from its top down to the next top below; where a later top lies above, the layer is absent.
type Stratum struct {
	Soil string  `json:"soil"` // Name of the soil.
	Top  []Point `json:"top"`  // Top of the layer, from left to right.
}

// Body is placed material.
type Body struct {
	Soil    string  `json:"soil"`    // Name of the soil.
	Outline []Point `json:"outline"` // Simple outline, clockwise.
}

// Surcharge is a vertical pressure on the ground.
type Surcharge struct {
	Name       string   `json:"name"`                                           // Name.
	FromX      float64  `json:"from_x"`                                         // Left end, m.
	ToX        float64  `json:"to_x"`                                           // Right end, m.
	Pressure   float64  `json:"kPa"`                                            // Downward pressure at from_x, kPa.
	PressureTo *float64 `json:"kPa_to,omitempty"`                               // Downward pressure at to_x, kPa, straight between; absent: the same.
	Horizontal float64  `json:"horizontal_kPa,omitempty"`                       // Horizontal pressure to the right, kPa.
	Kind       string   `json:"kind" jsonschema:"enum=permanent,enum=variable"` // "permanent", or "variable": left out on slips whose FS it would raise.
}

// Water is the pore pressure and free water of a situation: u = gamma_w x vertical depth below the line, unless by_soil or drains say
// otherwise. Where free water stands higher than the line, its level takes the line's place. Undrained soil has no pore pressure of
// its own.
type Water struct {
	Line     []Point `json:"line" jsonschema:"nullable"` // Piezometric line, lowered by drains where there are any; null: dry.
	Inclined bool    `json:"inclined_line,omitempty"`    // True: pressure below every line is reduced by cos^2 of the line's inclination.
	// Points [x, y, u] in m and kPa; when present they hold in place of every line, in all soils but those with ru or a level_y. Points of one x make
	// a vertical: u is linear in level on it and held beyond its ends; between verticals it is linear in x and held beyond the outermost.
	Points    [][3]float64      `json:"points,omitempty"`
	FreeWater []FreeWater       `json:"free_water"`       // Water that stands on the ground and loads it.
	BySoil    map[string]BySoil `json:"by_soil"`          // Soils whose pore pressure does not follow the line.
	Drains    *Drains           `json:"drains,omitempty"` // Drains: the pore pressure that the engine used.
}

// LineLoad is a force along a line on the ground, for a metre run.
type LineLoad struct {
	Name       string  `json:"name"`                // Name.
	X          float64 `json:"x"`                   // Where it acts, m.
	Vertical   float64 `json:"vertical_kN_per_m"`   // Downward force, kN/m.
	Horizontal float64 `json:"horizontal_kN_per_m"` // Force to the right, kN/m.
}

// KnownSlip is a slip surface that exists already: a slip that runs along it finds there this strength in place of the soil's, with the pore
// pressure of the soil, and that of the water line where the soil acts undrained.
type KnownSlip struct {
	Line     []Point `json:"line"`               // From left to right; it ends where its points end.
	Cohesion float64 `json:"cohesion_kPa"`       // Residual cohesion, kPa.
	Friction float64 `json:"friction_angle_deg"` // Residual angle of friction, degrees.
}

// TensionCrack is a vertical crack: coming from its head, a slip ends where it first passes below the bottom of the crack, and a slip that never
// does is none. Water in it pushes in the direction of movement with half its unit weight x depth squared, at a third of its depth.
type TensionCrack struct {
	Depth      float64  `json:"depth_m,omitempty"`       // Depth below the ground, m; absent if line is given.
	Line       []Point  `json:"line,omitempty"`          // Bottom of the crack; beyond its ends and above the ground there is none.
	WaterShare float64  `json:"water_share"`             // Depth of water over depth of the crack, unless water_level_y is given.
	WaterLevel *float64 `json:"water_level_y,omitempty"` // Level of the water, m.
}

// FreeWater stands on the ground up to a level.
type FreeWater struct {
	Level float64 `json:"level"`  // Water level, m.
	FromX float64 `json:"from_x"` // Left end, m.
	ToX   float64 `json:"to_x"`   // Right end, m.
}

// BySoil is the pore pressure of a soil that does not follow the water line. With ru, u = ru x weight of ground and fill above. A
// free-draining soil has u = gamma_w x max(0, level - y), its level being the greater of level_y and of the free water standing at that x;
// where there is neither, it follows the line.
type BySoil struct {
	Ru     *float64 `json:"ru" jsonschema:"nullable"`      // Pore pressure ratio; null: none.
	LevelY *float64 `json:"level_y" jsonschema:"nullable"` // Of a free-draining soil: level of the outfall, m; null: none is named.
	Line   []Point  `json:"line,omitempty"`                // Piezometric line of the soil: perched or artesian water. Drains do not lower it.
}

// Drains lower the pore pressure between the ends of their invert. With L the line before and I the invert at x, H = L - I and R the
// ratio, the head falls by R (L - y) between line and invert, by R H (1 - (I - y)/fade) from the invert down to fade below it, and by
// nothing deeper.
type Drains struct {
	LineBefore []Point   `json:"line_before"` // Piezometric line before drains, from left to right.
	Invert     []Point   `json:"invert"`      // Invert of the drains, from left to right.
	Ratio      []float64 `json:"ratio"`       // R at each point of the invert, linear between.
	Fade       float64   `json:"fade_m"`      // m.
}

// Slip is a slip surface between two points of the ground.
type Slip struct {
	Kind   string  `json:"kind" jsonschema:"enum=circle,enum=polyline"` // "circle" or "polyline".
	Centre *Point  `json:"centre,omitempty"`                            // Of a circle.
	Radius float64 `json:"radius,omitempty"`                            // Of a circle, m.
	Points []Point `json:"points,omitempty"`                            // Of a polyline, from left to right.
	From   Point   `json:"from"`                                        // Left end on the ground.
	To     Point   `json:"to"`                                          // Right end on the ground.
	Crack  float64 `json:"tension_crack_m,omitempty"`                   // Depth of the tension crack at the head, m: from or to is then its mouth, and the slip ends at its bottom.
}
