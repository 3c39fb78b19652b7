package cli

import "encoding/json"

// What a stranger reads of result.json to analyse every option and stage again. The types are written from docs/outputs.md and share
// nothing with the program's own.
type (
	theirFile struct {
		Settings struct {
			Depth     float64 `json:"depth_of_interest_m"`
			GammaW    float64 `json:"gamma_w_kN_m3"`
			Direction string
			Ranges    struct{ Head, Exit *[2]float64 } `json:"search_ranges"`
			SideForce struct {
				Function  string
				Ordinates []float64
			} `json:"side_force_function"`
		}
		Soils      map[string]theirSoil
		Situations []struct {
			Name     string
			Required float64 `json:"required_fs"`
			Strength theirStrength
			Kh       float64
		}
		Existing theirOption
		Options  []theirOption
		Least    *string `json:"least_earthworks"`
	}
	theirLine  []theirPoint
	theirPoint [2]float64
	theirSoil  struct {
		Moist   float64 `json:"unit_weight_kN_m3"`
		Wet     float64 `json:"saturated_unit_weight_kN_m3"`
		Drained struct {
			Cohesion float64 `json:"cohesion_kPa"`
			Friction float64 `json:"friction_angle_deg"`
		}
		Undrained *struct {
			Strength float64  `json:"strength_kPa"`
			Gradient float64  `json:"gradient_kPa_per_m"`
			DatumY   *float64 `json:"datum_y"`
			Datum    theirLine
			Points   [][3]float64
		}
	}
	theirOption struct {
		Name       string
		Status     string
		Reason     string
		Binds      string `json:"binds_on"`
		WhatIf     bool   `json:"what_if"`
		Parameters map[string]struct{ Value float64 }
		Earthworks struct {
			Total float64 `json:"earthworks_m3_per_m"`
		} `json:"quantities"`
		Situations []theirAnswer
		Stages     []theirAnswer
		Section    theirSection

		Certificate *struct {
			Searched int `json:"designs_searched"`
			Exchange int `json:"exchange_designs_searched"`
		}
	}
	theirAnswer struct {
		Name     string
		Of       string  `json:"variant_of"` // The situation that it is a variant of.
		Required float64 `json:"required_fs"`
		Advisory bool
		FS       *float64
		ByMethod map[string]float64 `json:"fs_by_method"`
		Slip     *struct {
			Kind     string
			Centre   theirPoint
			Radius   float64
			Points   theirLine
			From, To theirPoint
		}
		Depth    float64       `json:"slip_depth_m"`
		Strength theirStrength // This and the rest: stages only.
		Kh       float64
		Section  theirSection
	}
	theirSection struct {
		Ground theirLine
		Strata []struct {
			Soil string
			Top  theirLine
		}
		Placed []struct {
			Soil    string
			Outline theirLine
		}
		Surcharges []struct {
			From float64 `json:"from_x"`
			To   float64 `json:"to_x"`
			KPa  float64
			Kind string
		}
		FirmBase theirLine            `json:"firm_base"`
		Soils    map[string]theirSoil // Of this section alone.
		Water    map[string]theirWater
	}
	theirWater struct {
		Line theirLine
		Free []struct {
			Level float64
			From  float64 `json:"from_x"`
			To    float64 `json:"to_x"`
		} `json:"free_water"`
		BySoil map[string]struct {
			Ru    *float64
			Level *float64 `json:"level_y"`
		} `json:"by_soil"`
		Drains *struct {
			Before theirLine `json:"line_before"`
			Invert theirLine
			Ratio  []float64
			Fade   float64 `json:"fade_m"`
		}
	}
	// theirStrength is a word for all soils or an object of words by soil.
	theirStrength struct{ value any }
)

func (s *theirStrength) UnmarshalJSON(b []byte) error { return json.Unmarshal(b, &s.value) }

// undrained reports whether a soil acts undrained.
func (s theirStrength) undrained(soil string) bool {
	if words, ok := s.value.(map[string]any); ok {
		return words[soil] == "undrained"
	}
	return s.value == "undrained"
}
