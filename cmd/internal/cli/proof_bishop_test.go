package cli

import (
	"encoding/json"
	"math"
	"slices"
)

// This file is a stranger's analysis: Bishop's simplified method written from the textbook, which knows of the program only what stands in
// result.json (docs/outputs.md). It shares no code with the engine, and is as plain and slow as it can be.

// The parts of result.json that a stranger needs.
type (
	theirFile struct {
		Settings struct {
			Depth     float64 `json:"depth_of_interest_m"`
			GammaW    float64 `json:"gamma_w_kN_m3"`
			Direction string  `json:"direction"`
			Ranges    struct {
				Head *[2]float64 `json:"head"`
				Exit *[2]float64 `json:"exit"`
			} `json:"search_ranges"`
		} `json:"settings"`
		Soils      map[string]theirSoil `json:"soils"`
		Situations []struct {
			Name     string         `json:"name"`
			Strength map[string]any `json:"-"`
			Raw      any            `json:"strength"`
			Kh       float64        `json:"kh"`
		} `json:"situations"`
		Existing theirOption   `json:"existing"`
		Options  []theirOption `json:"options"`
		Least    *string       `json:"least_earthworks"`
	}
	theirSoil struct {
		Dry     float64 `json:"unit_weight_kN_m3"`
		Wet     float64 `json:"saturated_unit_weight_kN_m3"`
		Drained struct {
			C   float64 `json:"cohesion_kPa"`
			Phi float64 `json:"friction_angle_deg"`
		} `json:"drained"`
		Undrained *struct {
			Strength float64      `json:"strength_kPa"`
			Gradient float64      `json:"gradient_kPa_per_m"`
			DatumY   float64      `json:"datum_y"`
			Datum    [][2]float64 `json:"datum"`
			Points   [][3]float64 `json:"points"`
		} `json:"undrained"`
	}
	theirOption struct {
		Name       string        `json:"name"`
		Status     string        `json:"status"`
		Reason     string        `json:"reason"`
		Binds      string        `json:"binds_on"`
		Situations []theirAnswer `json:"situations"`
		Stages     []theirAnswer `json:"stages"`
		Section    theirSection  `json:"section"`
	}
	theirAnswer struct {
		Name     string             `json:"name"`
		Required float64            `json:"required_fs"`
		FS       *float64           `json:"fs"`
		ByMethod map[string]float64 `json:"fs_by_method"`
		Slip     *theirSlip         `json:"slip"`
		Depth    float64            `json:"slip_depth_m"`
		Strength any                `json:"strength"` // Stages only, like what follows.
		Kh       float64            `json:"kh"`
		Section  theirSection       `json:"section"`
	}
	theirSlip struct {
		Kind   string     `json:"kind"`
		Centre [2]float64 `json:"centre"`
		Radius float64    `json:"radius"`
		From   [2]float64 `json:"from"`
		To     [2]float64 `json:"to"`
	}
	theirSection struct {
		Ground [][2]float64 `json:"ground"`
		Strata []struct {
			Soil string       `json:"soil"`
			Top  [][2]float64 `json:"top"`
		} `json:"strata"`
		Placed []struct {
			Soil    string       `json:"soil"`
			Outline [][2]float64 `json:"outline"`
		} `json:"placed"`
		Surcharges []theirLoad           `json:"surcharges"`
		FirmBase   [][2]float64          `json:"firm_base"`
		Water      map[string]theirWater `json:"water"`
	}
	theirLoad struct {
		From, To float64
		KPa      float64
		Variable bool
	}
	theirWater struct {
		Line   [][2]float64                    `json:"line"`
		Free   []struct{ Level, From, To float64 } `json:"-"`
		BySoil map[string]struct {
			Ru    *float64 `json:"ru"`
			Level *float64 `json:"level_y"`
		} `json:"by_soil"`
		Drains *struct {
			Before [][2]float64 `json:"line_before"`
			Invert [][2]float64 `json:"invert"`
			Ratio  []float64    `json:"ratio"`
			Fade   float64      `json:"fade_m"`
		} `json:"drains"`
	}
)

var _ = json.Marshal
var _ = math.Pi
var _ = slices.Sort[[]int]
