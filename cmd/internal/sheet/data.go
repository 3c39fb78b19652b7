package sheet

import "standfast/cmd/internal/report"

// data is what the script of the page is given. Coordinates are the case's own, m, to a tenth of a millimetre; polylines stand once in
// Lines and are named by their index.
type data struct {
	View      view          `json:"view"`
	Lines     [][]xy        `json:"lines"`
	Before    int           `json:"before"` // Ground before works, a line.
	Strata    []stratum     `json:"strata"`
	Soils     []soil        `json:"soils"`
	Loads     []load        `json:"loads"`
	Forces    []force       `json:"forces"`
	Known     []int         `json:"known"` // Slip surfaces that exist already, lines.
	Limits    []limit       `json:"limits"`
	Length    float64       `json:"length"` // Of the works, m.
	Rows      []row         `json:"rows"`   // Situations with their variants, then stages.
	Stops     []target      `json:"stops"`  // Of the slider, ascending.
	Specified int           `json:"specified"`
	Existing  design        `json:"existing"`
	Options   []optionDrawn `json:"options"`
}

// xy is a point, m.
type xy [2]float64

// view is the part of the section that every figure shows.
type view struct {
	X0 float64 `json:"x0"`
	X1 float64 `json:"x1"`
	Y0 float64 `json:"y0"`
	Y1 float64 `json:"y1"`
}

type stratum struct {
	Soil int `json:"soil"`
	Top  int `json:"top"`
}

type soil struct {
	Name string `json:"name"`
	Tint int    `json:"tint"`
}

type load struct {
	Name  string  `json:"name"`
	From  float64 `json:"from"`
	To    float64 `json:"to"`
	Start float64 `json:"start"` // Pressure at From, as a share of the greater of the two.
	End   float64 `json:"end"`   // Pressure at To, likewise.
}

// row is a check of the matrix.
type row struct {
	Name   string `json:"name"`
	Parent int    `json:"parent"` // Of a variant: the row of its situation; -1: none.
	Stage  bool   `json:"stage"`

	required float64
}

// target is one stop of the slider.
type target struct {
	Short    string   `json:"short"`    // The required FS in a word or two.
	Long     string   `json:"long"`     // The required FS of every situation.
	Required []string `json:"required"` // By row.
	Answer   string   `json:"answer"`   // What comes out, in a sentence.
	Existing string   `json:"existing"` // Marks of the slope as it is, by row.
	Least    int      `json:"least"`    // Option with the least of what was made least of those that meet; -1: none.
}

// optionDrawn is an option with the designs that the slider chooses among.
type optionDrawn struct {
	Designs []design `json:"designs"` // The first is the option as specified.
	Stops   []stop   `json:"stops"`   // By stop of the slider.
}

// stop is what an option comes to at one stop of the slider.
type stop struct {
	Design int    `json:"design"` // -1: no works.
	State  string `json:"state"`  // One of the states.
	Status string `json:"status"` // In a word or two.
	Note   string `json:"note"`   // Why, in a sentence.
	Marks  string `json:"marks"`  // By row.
}

// States of an option at a stop.
const (
	stateMeets   = "meets"   // The design shown reaches the target.
	stateShort   = "short"   // No design does; the nearest is shown.
	stateNothing = "nothing" // The slope as it is does.
	stateOpen    = "open"    // It could not be judged.
)

// Marks of a check at a stop.
const (
	markPass = 'p'
	markFail = 'f'
	markOpen = 'u'
	markNone = '-'
)

// design is a set of works with its section and its numbers.
type design struct {
	Ground    int               `json:"ground"`
	Placed    []placed          `json:"placed"`
	Posts     []post            `json:"posts"`
	Answers   []*answer         `json:"answers"` // By row; null: not checked.
	Governing int               `json:"governing"`
	Texts     map[string]string `json:"texts"` // By the data-text of the elements that they stand in.
	Cut       float64           `json:"cut"`   // m3/m, for the bars.
	Fill      float64           `json:"fill"`

	required []float64 // By row: as specified, without any shift.
	fs       []report.Number
	resolved []bool
	margin   report.Number // Least margin over the checks.
	works    float64       // Of what was made least: earthworks, m3/m, or cost or carbon of the whole length.
	shift    float64       // Of the target that it was sized for.
}

// placed is a body.
type placed struct {
	Soil    int  `json:"soil"`
	Outline int  `json:"outline"`
	Works   bool `json:"works"` // Part of the works, not there before.
}

// answer is what was found in one check.
type answer struct {
	FS     string `json:"fs"`
	Method string `json:"method"`
	Slip   *slip  `json:"slip"`
	Water  *water `json:"water"`
	Ground int    `json:"ground"` // Of a stage whose ground is another than that of the finished works; -1: the same.
}

// slip is a circle from end to end, or a line.
type slip struct {
	From   xy      `json:"from"`
	To     xy      `json:"to"`
	Centre *xy     `json:"centre,omitempty"`
	Radius float64 `json:"radius,omitempty"`
	Line   []xy    `json:"line,omitempty"`
}

// water is the water of a check.
type water struct {
	Line   int         `json:"line"`   // -1: dry.
	Head   int         `json:"head"`   // Head left at the invert of drains; -1: no drains.
	Invert int         `json:"invert"` // Invert of drains; -1: no drains.
	Free   []freeWater `json:"free"`
}

type freeWater struct {
	Level float64 `json:"level"`
	From  float64 `json:"from"`
	To    float64 `json:"to"`
}
