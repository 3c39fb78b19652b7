package lem

// GammaW is the unit weight of water, kN/m3 (fresh water at 10 degrees C, rounded; common practice, no source).
const GammaW = 9.81

// Soil is a material of a stratum or of a placed body.
type Soil struct {
	Name                string
	UnitWeight          float64 // Bulk unit weight above the water line, kN/m3.
	SaturatedUnitWeight float64 // Unit weight below the water line, kN/m3; 0 means the same as UnitWeight.
	Cohesion            float64 // Effective cohesion c', kPa.
	Friction            float64 // Effective angle of friction phi', rad.
	Undrained           *UndrainedStrength
	PowerLaw            *PowerLaw // When not nil, the effective strength instead of Cohesion and Friction.
	Ru                  float64   // Pore pressure as a ratio to the weight of soil above; used instead of any water line when HasRu.
	HasRu               bool
	FreeDraining        bool // Pore pressure only below Water.FreeDrainingLevel or below free water.
}

// UndrainedStrength is cu, fixed from the ground and water before works whatever is placed or cut.
type UndrainedStrength struct {
	Strength float64         // cu at the datum, kPa.
	Gradient float64         // Increase of cu per metre of depth below Datum, kPa/m; no decrease above it.
	Datum    Profile         // Line that depth is measured from; needed when Gradient is not 0.
	Points   []StrengthPoint // When present, cu is interpolated between these and the other fields are not used.
	// Ratio, when not 0, makes cu = max(Minimum, Ratio x effective vertical stress before works), whatever is placed or cut; Strength and
	// Gradient are then not used. The stress is that of the ground before works, of its strata and of WaterBefore, without surcharge.
	Ratio       float64
	Minimum     float64 // kPa.
	WaterBefore Profile // Piezometric line before works; nil: dry.
}

// StrengthPoint is an undrained strength known at a point. Points of one x make a vertical: cu is linear in level on it and held
// beyond its ends; between two verticals it is linear in x, and held beyond the outermost.
type StrengthPoint struct{ X, Y, Strength float64 }
