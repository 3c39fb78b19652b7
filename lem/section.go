package lem

// Section is a cross-section: what stands there, without water. Strata are listed from the surface down; where a lower
// stratum's top lies above an upper one's, the upper stratum is absent (it pinches out).
type Section struct {
	Ground Profile     // Ground surface in force (after works); it clips everything.
	Soils  []Soil      // Indexed by Stratum.Soil and Body.Soil.
	Strata []Stratum   // From the surface down; Strata[0].Top is the ground before works.
	Placed []Body      // Painted over the strata in order; clipped to Ground.
	Loads  []Surcharge // Pressures on the ground.
	// LineLoads are forces along lines on the ground.
	LineLoads []LineLoad
	// Restraints hold slips back that pass across them.
	Restraints []Restraint
	// Crack, when not nil, is the tension crack in which a slip ends at its head.
	Crack *TensionCrack
	// FirmBase, when not nil, is a line below which no slip passes.
	FirmBase Profile
	// Known are slip surfaces that exist already, with a strength of their own.
	Known []KnownSlip
}

// KnownSlip is a slip surface that exists already: a slip that runs along it finds there not the strength of the soil but that of the sheared
// surface, with the pore pressure of the soil, and that of the water line where the soil acts undrained. A search always looks at it and at
// slips that share parts of it.
type KnownSlip struct {
	Line     Profile // From its head or toe on the left to the other end; not held level beyond its ends.
	Cohesion float64 // Residual cohesion, kPa.
	Friction float64 // Residual angle of friction, rad.
}

// GroundBefore returns the ground before works: the top of the first stratum.
func (s *Section) GroundBefore() Profile { return s.Strata[0].Top }

// Stratum is a layer of one soil from its top down to the next stratum that lies below.
type Stratum struct {
	Soil int // Index into Section.Soils.
	Top  Profile
}

// Body is placed or exchanged material: a simple outline, clockwise.
type Body struct {
	Soil    int // Index into Section.Soils.
	Outline []Point
}

// Surcharge is a pressure on the ground between FromX and ToX, per horizontal area.
type Surcharge struct {
	Name       string
	FromX, ToX float64 // m, FromX < ToX.
	Pressure   float64 // At FromX, kPa, positive downwards.
	Rise       float64 // Pressure at ToX less that at FromX, kPa; straight between. 0: uniform.
	Shear      float64 // Horizontal pressure, kPa, positive to the right; uniform.
	Variable   bool    // Left out on slips whose FS it would raise; takes no earthquake force.
}

// Water is the pore pressure and free water of one situation.
type Water struct {
	Line Profile // Piezometric line; u = GammaW x vertical depth below it. nil: dry. It may lie above ground.
	Free []FreeWater
	// BySoil are piezometric lines that hold in one soil instead of Line: perched or artesian water. Drains do not lower them. Where free water
	// stands on the soil itself, the head in it is at least the water's level.
	BySoil []SoilWater
	// InclinedLine: u = GammaW h cos^2(beta) below every line, h being the vertical depth below it and beta its inclination there: seepage
	// parallel to the line, with equipotentials at right angles to it (infinite slope; Skempton and DeLory 1957).
	InclinedLine bool
	// Points are pore pressures that are known. Where there are any they hold instead of all lines, in all soils but those with ru and
	// free-draining ones whose level is known; saturated weight still follows the lines. Drains do not lower them.
	Points []PressurePoint
	// Drains, when not nil, lower the pore pressure below Line.
	Drains *Drawdown
	// FreeDrainingLevel, when HasFreeDrainingLevel, is the level to which free-draining soils fill, m; without it, and
	// without free water, the water line runs through them.
	FreeDrainingLevel    float64
	HasFreeDrainingLevel bool
}

// SoilWater is the piezometric line of one soil.
type SoilWater struct {
	Soil int // Index into Section.Soils.
	Line Profile
}

// PressurePoint is a pore pressure known at a point, kPa. Points are interpolated like those of [StrengthPoint]: the pressure is held above the
// highest and below the lowest point of a vertical, so that a point with pressure 0 belongs at the water table. Suction counts as 0.
type PressurePoint struct{ X, Y, Pressure float64 }

// FreeWater stands on the ground up to Level between FromX and ToX. It alone loads the face.
type FreeWater struct{ Level, FromX, ToX float64 }

// Drawdown lowers pore pressures by drains whose invert is a line across part of the section.
//
// With L(x) the piezometric line, I(x) the invert, H = L - I and R the ratio lowered, the piezometric head falls by
//
//	R (L - y)                between line and invert (the whole fall R H is reached at the invert),
//	R H (1 - (I - y)/Fade)   from the invert down to Fade below it,
//	0                        deeper.
//
// The head between drains is nowhere above (1-R)(L-y) over the invert when R is the ratio at the invert (series solution of
// the Laplace equation between drains), so the first line is on the safe side. Outside the invert's x-range nothing is lowered.
type Drawdown struct {
	Invert Profile
	Ratio  []float64 // R at each point of Invert, linear between, 0 to 1.
	Fade   float64   // m, > 0.
}

// Situation is the state in which a section is analysed: water by value, strength, earthquake.
type Situation struct {
	Name      string
	Water     Water
	Undrained []bool  // By soil: true uses Soil.Undrained, false the effective strength. nil: all drained.
	Kh        float64 // Horizontal pseudo-static coefficient, outward, on the weight of ground and permanent surcharge.
	Kv        float64 // Vertical pseudo-static coefficient, positive downward, on the same weight; greater than -1.
}
