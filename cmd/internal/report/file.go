package report

// Format names the layout of result.json. It changes only when a program that reads the file would have to change.
const Format = "standfast-result/1"

// File is result.json: the whole answer to a case, complete enough to analyse every option and stage again from it alone.
type File struct {
	Format     string          `json:"format" jsonschema:"enum=standfast-result/1"` // Name of this layout, "standfast-result/1".
	Case       Case            `json:"case"`                                        // What was asked.
	Program    Program         `json:"program"`                                     // What answered.
	Settings   Settings        `json:"settings"`                                    // Settings in force, after defaults and command-line flags.
	Soils      map[string]Soil `json:"soils"`                                       // Every soil of the case by name.
	SoilOrder  []string        `json:"soil_order"`                                  // Names of the soils in the order of the case.
	WaterLines []WaterLine     `json:"water_lines"`                                 // Piezometric lines before works.
	Limits     SiteLimits      `json:"limits"`                                      // Limits of the works.
	OnSite     []OnSiteFill    `json:"on_site_fill"`                                // Material of the site that may serve as fill.
	Economics  Economics       `json:"economics"`                                   // Rates and factors of the user's own.
	// What every construction stage must stand; null: the case has no stage settings and stages were not checked.
	StageSettings *StageSettings `json:"stage_settings" jsonschema:"nullable"`
	Situations    []Situation    `json:"situations"` // Design situations, with the variants that single options add.
	Existing      Option         `json:"existing"`   // The slope as it is.
	Options       []Option       `json:"options"`    // In ascending order of the objective of the settings; what-ifs behind them, those that fail last.
	// Name of the answer, whatever the objective: of the options that meet the target the one with the least earthworks, or that with the least
	// cost or carbon if the objective of the settings is that; "existing" if nothing is needed, null if nothing meets it.
	LeastEarthworks *string `json:"least_earthworks" jsonschema:"nullable"`
	// What the observed slip of the case leaves open; absent: none was observed, or it was left out.
	BackAnalysis *BackAnalysis `json:"back_analysis,omitempty"`
	Cautions     []string      `json:"cautions"` // What the reader must bear in mind.
	Files        []string      `json:"files"`    // Names of the files written to the same folder, this one included.
}

// Case says which case was read.
type Case struct {
	Title  string   `json:"title"`    // Title of the case.
	File   string   `json:"file"`     // Name of the case file, without its folder.
	SHA256 string   `json:"sha256"`   // SHA-256 of the case file's bytes, in hexadecimal.
	Length float64  `json:"length_m"` // Run of the works along the slope, m.
	Crest  Point    `json:"crest"`    // Crest of the slope before works.
	Toe    Point    `json:"toe"`      // Toe of the slope before works.
	Notes  []string `json:"notes"`    // What was deduced or assumed when the case was read.
	Source string   `json:"source"`   // The case file itself, so that the result can be checked from this file alone.
}

// Program names the program that wrote the file.
type Program struct {
	Version string `json:"version"` // Version of the program.
}

// Settings are the settings in force.
type Settings struct {
	// What sizings make least: "earthworks", m3 per metre run, or "cost" or "carbon" (kg) for the whole length.
	Objective       string       `json:"objective" jsonschema:"enum=earthworks,enum=cost,enum=carbon"`
	Seed            uint64       `json:"seed"`                                                    // Of the searches.
	DepthOfInterest float64      `json:"depth_of_interest_m"`                                     // Slips nowhere deeper below ground than this are left out, m.
	Allowance       float64      `json:"search_allowance"`                                        // FS by which an answer exceeds the requirement, for the search being finite.
	Slices          int          `json:"slices"`                                                  // Target number of slices of a slip in a search.
	GammaW          float64      `json:"gamma_w_kN_m3"`                                           // Unit weight of water, kN/m3.
	Direction       string       `json:"direction" jsonschema:"enum=either,enum=left,enum=right"` // Movement that searches look at: "either", "left" or "right".
	SearchRanges    SearchRanges `json:"search_ranges"`                                           // Where a slip may leave the ground.
	SideForce       SideForce    `json:"side_force_function"`                                     // Of Morgenstern-Price's method.
	Overrides       []string     `json:"overrides"`                                               // Command-line flags that changed what the case file asks.
}

// SearchRanges limit where a slip may leave the ground.
type SearchRanges struct {
	Head *[2]float64 `json:"head" jsonschema:"nullable"` // At its head: from x to x, m; null: everywhere.
	Exit *[2]float64 `json:"exit" jsonschema:"nullable"` // At its toe: from x to x, m; null: everywhere.
}

// Soil is a material.
type Soil struct {
	UnitWeight          float64    `json:"unit_weight_kN_m3"`               // Above the water line, kN/m3.
	SaturatedUnitWeight float64    `json:"saturated_unit_weight_kN_m3"`     // Below the water line, kN/m3.
	Drained             Drained    `json:"drained"`                         // Effective strength; zeros where power_law holds instead.
	PowerLaw            *PowerLaw  `json:"power_law,omitempty"`             // Curved effective strength, in place of drained.
	Undrained           *Undrained `json:"undrained" jsonschema:"nullable"` // Undrained strength; null: none given.
	// Pore pressure as a ratio to the weight of ground and fill above (no surcharge), used instead of any water line; null: none given.
	Ru           *float64 `json:"ru" jsonschema:"nullable"`
	FreeDraining bool     `json:"free_draining"` // Pore pressure only below the outfall or below free water; see the water's by_soil.
	SlowDraining bool     `json:"slow_draining"` // Fill on this soil is checked at the end of construction.
}

// Drained is an effective strength c' + sigma' tan(phi').
type Drained struct {
	Cohesion float64 `json:"cohesion_kPa"`       // Effective cohesion c', kPa.
	Friction float64 `json:"friction_angle_deg"` // Effective angle of friction phi', degrees.
}

// PowerLaw is an effective strength a pa (sigma'/pa)^b on a normal stress sigma', straight to the origin below least_stress.
type PowerLaw struct {
	A           float64 `json:"a"`                        // Shear strength over normal stress at a stress of pa.
	B           float64 `json:"b"`                        // Exponent.
	Atmospheric float64 `json:"atmospheric_pressure_kPa"` // Pressure pa, kPa.
	LeastStress float64 `json:"least_stress_kPa"`         // Normal stress below which the chord to the origin holds, kPa.
}

// Undrained is a strength cu that is fixed from the ground before works: cu = strength + gradient x max(0, datum - y), or from points, or by
// ratio.
type Undrained struct {
	Strength float64 `json:"strength_kPa"`       // cu at and above the datum, kPa.
	Gradient float64 `json:"gradient_kPa_per_m"` // Increase of cu per metre below the datum, kPa/m.
	DatumY   *Number `json:"datum_y"`            // Level of the datum, m; null if it is not level or there is none.
	Datum    []Point `json:"datum,omitempty"`    // Line that depth is measured from, if it is not level.
	// Points [x, y, cu] in m and kPa; when present nothing else here is used. Points of one x make a vertical: cu is linear in level on
	// it and held beyond its ends; between verticals it is linear in x and held beyond the outermost.
	Points [][3]float64 `json:"points,omitempty"`
	// Ratio: when present, cu = max(minimum, ratio x effective vertical stress), of the strata under the ground before works and the water
	// below water_before, without surcharge; saturated unit weights below that line.
	Ratio       *float64 `json:"ratio,omitempty"`
	Minimum     *float64 `json:"minimum_kPa,omitempty"`  // Least cu of a strength by ratio, kPa.
	WaterBefore []Point  `json:"water_before,omitempty"` // Water line before works of a strength by ratio; absent: dry.
}

// Situation is a state of the ground with the FS required in it.
type Situation struct {
	Name          string   `json:"name"`                             // Name, as in the situations and the water of an option.
	RequiredFS    float64  `json:"required_fs"`                      // FS required.
	Strength      Strength `json:"strength"`                         // "drained", "undrained", or one of these words for every soil.
	WaterLine     string   `json:"water_line"`                       // Name of its water line before works; empty: dry.
	Kh            float64  `json:"kh"`                               // Horizontal pseudo-static coefficient, outward.
	Kv            float64  `json:"kv"`                               // Vertical pseudo-static coefficient, positive downwards, on ground and permanent loads.
	DrainsWorking *Number  `json:"drains_working"`                   // Share of the drains' effect that counts, 0 to 1; null in a variant.
	AppliesTo     []string `json:"applies_to" jsonschema:"nullable"` // Names of the options that it is checked for; null: all.
	VariantOf     string   `json:"variant_of,omitempty"`             // Of a variant: the design situation that it belongs to.
	Variant       string   `json:"variant,omitempty"`                // Of a variant: what is different.
}

// Option is a remedy, the user's own trial works, or the slope as it is, with its answer.
type Option struct {
	Name     string   `json:"name"`                                                                                           // Name, unique in the file.
	Title    string   `json:"title"`                                                                                          // Name for people.
	Remedies []string `json:"remedies"`                                                                                       // Remedies applied, in order.
	Status   string   `json:"status" jsonschema:"enum=meets target,enum=infeasible,enum=unresolved,enum=existing,enum=fails"` // "meets target", "infeasible", "unresolved", "existing", or "fails" for trial works.
	Reason   string   `json:"reason"`                                                                                         // Why the status is what it is.
	BindsOn  string   `json:"binds_on"`                                                                                       // The limit, situation or stage that binds; empty if none does.
	WhatIf   bool     `json:"what_if"`                                                                                        // Shows what could be; never the answer.
	Trial    bool     `json:"trial"`                                                                                          // The user's own works, only checked.
	Broken   []Limit  `json:"limits_broken"`                                                                                  // Limits of the site that the works shown break.

	Parameters map[string]Parameter `json:"parameters"`      // Dimensions found, by name.
	Order      []string             `json:"parameter_order"` // Names of the parameters in the order of the remedy.
	Measured   []Dimension          `json:"dimensions"`      // What a drawing of the works dimensions.
	Quantities Quantities           `json:"quantities"`      // Per metre run of the works.
	Totals     Totals               `json:"totals"`          // For the whole length of the works.
	Bill       []BillItem           `json:"bill"`            // The works by kind and soil, measured, and priced where there are rates.

	Situations  []Answer     `json:"situations"`                        // Answers to the design situations; a variant follows its situation.
	Stages      []Stage      `json:"stages"`                            // Answers to the construction stages.
	StepLess    []StepLess   `json:"step_less"`                         // Why one step less of each parameter fails.
	Relaxations []Relaxation `json:"relaxations"`                       // What moving a limit that forbids a cheaper design would save.
	Sensitivity []Bar        `json:"sensitivity"`                       // How the least FS swings with the inputs.
	HandChecks  []HandCheck  `json:"hand_checks"`                       // Closed forms told beside the checks.
	NotChecked  []string     `json:"not_checked"`                       // Checks that could not be made, with the reason.
	Notes       []string     `json:"notes"`                             // What the works changed besides, such as a water line cut down to the new ground.
	Certificate *Certificate `json:"certificate" jsonschema:"nullable"` // What the answer rests on; null if nothing was sized.
	Section     *Section     `json:"section"`                           // The section after works.
	Tradeoff    []TradePoint `json:"tradeoff"`                          // The works against the FS asked for.
	// Earthworks against metres of drain, of remedies sized together that meet the target, drains among them whose length or spacing is sized; null:
	// none.
	Front *Front `json:"front" jsonschema:"nullable"`
}

// Limit is a limit of the site that a design breaks.
type Limit struct {
	Name   string  `json:"name"`   // Name of the limit.
	Detail string  `json:"detail"` // What breaks it.
	By     float64 `json:"by_m"`   // How far beyond, m.
}

// Parameter is a dimension of the works.
type Parameter struct {
	Value Number `json:"value"` // In its unit; null if the works have none.
	Unit  string `json:"unit"`  // "m", "1" for a ratio, "1V:nH" for a batter n.
}

// Quantities are amounts per metre run: cut is bank volume, fill compacted volume, never netted.
type Quantities struct {
	Cut        float64            `json:"cut_m3_per_m"`                // Bank cut with the dig of trenches, m3/m.
	Fill       float64            `json:"fill_m3_per_m"`               // Compacted fill with the stone of trenches, m3/m.
	Earthworks float64            `json:"earthworks_m3_per_m"`         // Cut plus fill, m3/m: what a sizing makes least unless the objective is cost or carbon.
	Import     float64            `json:"import_m3_per_m"`             // Fill and stone brought to the site, m3/m compacted; see on_site_fill.
	Dispose    float64            `json:"dispose_m3_per_m"`            // Cut that is not used again, m3/m bank.
	Drain      float64            `json:"drain_m_per_m"`               // Length of drain, m/m.
	Strip      float64            `json:"strip_m2_per_m"`              // Existing ground stripped, m2/m; not in the earthworks.
	TrenchDig  float64            `json:"trench_dig_m3_per_m"`         // Dig of trenches, in the cut, m3/m.
	Stone      float64            `json:"stone_m3_per_m"`              // Stone in trenches, in the fill, m3/m.
	CutBySoil  map[string]float64 `json:"cut_by_soil_m3_per_m"`        // Bank cut by soil without trenches, m3/m.
	FillBySoil map[string]float64 `json:"fill_by_soil_m3_per_m"`       // Compacted fill by soil without trenches, m3/m.
	DigBySoil  map[string]float64 `json:"trench_dig_by_soil_m3_per_m"` // Dig of trenches by soil, m3/m.
	Topsoil    map[string]float64 `json:"topsoil_by_soil_m3_per_m"`    // Part of the cut within the strip depth, which is no fill, m3/m.
	FillBase   map[string]float64 `json:"fill_base_by_soil_m"`         // Horizontal width of ground under fill, by soil placed, m.
	FaceRun    float64            `json:"face_run_m"`                  // Horizontal width of ground steeper than 1V:5H under fill, m.
	Drilled    float64            `json:"drilled_m_per_m"`             // Part of the drains that is drilled from the face, m/m.
	Piped      float64            `json:"piped_m_per_m"`               // Part of the drains that is a toe drain or an interceptor, m/m.
	Elements   float64            `json:"elements_per_m"`              // Structural elements, number for a metre run.
	ElementsM  float64            `json:"elements_m_per_m"`            // Their length, m/m.
}

// Totals are the quantities over the whole length of the works.
type Totals struct {
	Cut        float64 `json:"cut_m3"`        // Bank cut, m3.
	Fill       float64 `json:"fill_m3"`       // Compacted fill, m3.
	Earthworks float64 `json:"earthworks_m3"` // Cut plus fill, m3.
	Import     float64 `json:"import_m3"`     // Material brought in, m3 compacted.
	Dispose    float64 `json:"dispose_m3"`    // Material taken away, m3 bank.
	Drain      float64 `json:"drain_m"`       // Length of drain, m.
	Strip      float64 `json:"strip_m2"`      // Existing ground stripped, m2.
	Loads      *Number `json:"lorry_loads"`   // Whole lorry loads to bring and to take away; null if the load of a lorry or a factor that it needs is blank.
	Cost       *Number `json:"cost"`          // Cost, in the currency of the rates; null without rates, if one that it needs is blank, or of a what-if.
	Carbon     *Number `json:"carbon_t"`      // Carbon, t CO2 equivalent; null without factors, if one that it needs is blank, or of a what-if.
}

// Answer is the lowest converged, admissible FS found in a design situation.
type Answer struct {
	Name       string  `json:"name"`                 // Name of the situation.
	VariantOf  string  `json:"variant_of,omitempty"` // Of a variant: the design situation that it belongs to.
	Variant    string  `json:"variant,omitempty"`    // Of a variant: what is different.
	RequiredFS float64 `json:"required_fs"`          // FS required; 0 if the check is advisory.
	Advisory   bool    `json:"advisory,omitempty"`   // True: nothing is asked of it; see the stages.
	Found
	Influence *Influence `json:"influence,omitempty"` // Of assess: what loads on the ground do to the FS of the governing slip.
}

// Found is what the search of one check found.
type Found struct {
	FS         Number            `json:"fs"`                         // Governing FS, unrounded; null if nothing converged.
	Method     string            `json:"method"`                     // Method that gave it; empty if none did.
	FSByMethod map[string]Number `json:"fs_by_method"`               // FS by every method on the governing slip; one that did not converge is absent.
	Slip       *Slip             `json:"slip" jsonschema:"nullable"` // Governing slip; null if none.
	Resolved   bool              `json:"resolved"`                   // False: a trial that no governing method could solve may lie below the required FS.
	Depth      Number            `json:"slip_depth_m"`               // Greatest vertical depth of the governing slip below ground, m.
}

// Stage is the answer to a construction stage, with the section it was checked on.
type Stage struct {
	Name       string  `json:"name"`        // Name of the stage, as in the water of its section.
	Order      int     `json:"order"`       // Place in the order of construction, from 1.
	RequiredFS float64 `json:"required_fs"` // FS required; 0 if the check is advisory.
	// True: nothing is asked of it. Its FS is told beside the check that governs, such as that of an open hole in plane strain.
	Advisory bool     `json:"advisory,omitempty"`
	Says     string   `json:"says,omitempty"` // Of an advisory check: what its FS means.
	Strength Strength `json:"strength"`       // "drained", "undrained", or one of these words for every soil.
	Kh       float64  `json:"kh"`             // Horizontal pseudo-static coefficient, outward.
	Found
	Section *Section `json:"section"` // Section of the stage.
}

// StepLess tells why the design with one parameter a step cheaper is not the answer.
type StepLess struct {
	Parameter  string  `json:"parameter"`   // Name of the parameter.
	Value      float64 `json:"value"`       // A step cheaper.
	Check      string  `json:"check"`       // Situation or stage that fails; empty if a limit forbids the design.
	FS         Number  `json:"fs"`          // FS of the slip that rejects it; null if a limit forbids the design.
	RequiredFS Number  `json:"required_fs"` // FS required there; null if a limit forbids the design.
	Limit      string  `json:"limit"`       // Limit that forbids the design; empty if it fails a check.
}

// Certificate says what the answer rests on: least on this lattice, for this remedy and these methods; no slip below target found in
// the searches counted. It does not say that none exists.
type Certificate struct {
	Axes               []Axis `json:"axes"`                         // The lattice of sizes.
	Coarsened          bool   `json:"coarsened"`                    // True if the lattice asked for was too large and its steps were doubled.
	Cheaper            int    `json:"cheaper_designs"`              // Designs within the limits cheaper than the answer; all of them if infeasible.
	Witnessed          int    `json:"witnessed"`                    // Of these, designs with a slip that rejects them, listed in witnesses.json.
	Forbidden          int    `json:"forbidden_designs"`            // Designs that a limit or geometry forbids.
	Unresolved         int    `json:"unresolved"`                   // Cheaper designs that could be neither rejected nor accepted.
	ContinuousEstimate Number `json:"continuous_estimate_m3_per_m"` // Earthworks between the sizes of the lattice by the slips that the exchange knew, m3/m: an estimate, not a bound, which may lie above the answer or below it; null if there is none, or if cost or carbon was made least.
	Allowance          Number `json:"search_allowance"`             // FS by which the answer had to exceed the requirement.
	Searches           int    `json:"searches"`                     // One search is one check of one design.
	DesignsSearched    int    `json:"designs_searched"`             // Designs searched in full, in every check, by the exchange and the walk.
	ExchangeDesigns    int    `json:"exchange_designs_searched"`    // Those of them that the exchange searched; the walk searched the others.
	SlipEvaluations    int    `json:"slip_evaluations"`             // Slips evaluated, pool included.
	PoolSize           int    `json:"pool_size"`                    // Slips in the pool of witnesses.json.
	Audit              Audit  `json:"audit"`                        // Independent search of the answer.
}

// Axis is the sizes tried for one parameter.
type Axis struct {
	Name string  `json:"name"` // Name of the parameter.
	Min  float64 `json:"min"`  // Least size.
	Max  float64 `json:"max"`  // Greatest size.
	Step float64 `json:"step"` // Step between sizes; 0: fixed.
	// Step that was asked for, where the lattice asked for was too large; absent where it is the step between sizes.
	StepAsked float64 `json:"step_asked,omitempty"`
}

// Audit is the search of the answer by another sampler and seed.
type Audit struct {
	Methods  []string   `json:"methods"`  // Governing methods used.
	Searches int        `json:"searches"` // One search is one check of one design.
	Lowest   []AuditLow `json:"lowest"`   // Lowest FS by check.
}

// AuditLow is the lowest FS that the audit found in one check.
type AuditLow struct {
	Check      string `json:"check"`       // Situation or stage.
	FS         Number `json:"fs"`          // Lowest FS found.
	Method     string `json:"method"`      // Method that gave it.
	RequiredFS Number `json:"required_fs"` // FS required.
}

// TradePoint is one point of the curve of works against the FS asked for: the least of the objective of the settings.
type TradePoint struct {
	RequiredFS Number               `json:"required_fs"`         // Asked for, in the situation that governs the sized option.
	Shift      float64              `json:"shift"`               // Added to the required FS of every check.
	ReachedFS  Number               `json:"reached_fs"`          // Required FS and the least margin of every check at this design.
	Earthworks Number               `json:"earthworks_m3_per_m"` // Earthworks of the design, m3/m: the least, unless cost or carbon was made least.
	Cost       *Number              `json:"cost"`                // Cost of the design for the whole length; null without rates, if one that it needs is blank, or of a what-if.
	Carbon     *Number              `json:"carbon_t"`            // Carbon of it, t CO2 equivalent; null likewise.
	Loads      *Number              `json:"lorry_loads"`         // Whole lorry loads of it; null if not known.
	Parameters map[string]Parameter `json:"parameters"`          // Dimensions of the design.
	Quantities Quantities           `json:"quantities"`          // Per metre run of the works.
	Ground     []Point              `json:"ground"`              // Ground after these works, from left to right.
	Placed     []Body               `json:"placed"`              // Fill and exchanged ground, as in a section.
	Water      map[string]Water     `json:"water"`               // By name of the check, as in a section.
	Checks     []Answer             `json:"checks"`              // Situations, then stages: searched, not audited; what is required includes the shift.
}
