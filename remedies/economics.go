package remedies

import "math"

// Economics are the user's own factors. Everything may be left blank: what needs a blank factor is then not known (NaN), never guessed.
type Economics struct {
	Currency   string        // Of the rates, for the outputs.
	Soils      []SoilFactors // By soil; may be shorter than the list of soils.
	Stone      SoilFactors   // Of drain stone.
	Cost       Factors       // Money per unit.
	Carbon     Factors       // kg CO2 equivalent per unit.
	StripDepth float64       // Topsoil stripped under the works, m; 0: blank.
	BenchStep  float64       // Height of the steps cut into a face before it is filled, m; 0: blank.
	LorryLoad  float64       // Loose volume of a lorry load, m3; 0: blank.
}

// SoilFactors say how the volume of a soil changes. Usual bulking: clay 1.2 to 1.4, sand and gravel 1.1 to 1.25, rock 1.4 to 1.7; usual
// shrinkage: clay 0.9 to 1.0, sand 0.9 to 0.95, blasted rock 1.1 to 1.3 (common practice, no source; a site test is better).
type SoilFactors struct {
	Bulking   float64 // Loose over bank volume; 0: blank.
	Shrinkage float64 // Compacted over bank volume; 0: blank.
}

// values returns the factors; NaN where they are blank.
func (f SoilFactors) values() (bulking, shrinkage float64) {
	bulking, shrinkage = f.Bulking, f.Shrinkage
	if bulking == 0 {
		bulking = math.NaN()
	}
	if shrinkage == 0 {
		shrinkage = math.NaN()
	}
	return bulking, shrinkage
}

// Factors are amounts per unit of work, in the unit of [Work.Unit]. Works that are missing are blank.
type Factors struct {
	Work   map[Work]float64
	Import map[int]float64 // Of imported fill by soil, instead of Work[Import].
}

// of returns the factor of a work on a soil; NaN if it is blank.
func (f *Factors) of(w Work, soil int) float64 {
	if w == Import {
		if v, ok := f.Import[soil]; ok {
			return v
		}
	}
	if v, ok := f.Work[w]; ok {
		return v
	}
	return math.NaN()
}

// Blank reports whether no factor is given at all.
func (f *Factors) Blank() bool { return len(f.Work) == 0 && len(f.Import) == 0 }

// soil returns the factors of a soil; NaN where they are blank.
func (e *Economics) soil(i int) (bulking, shrinkage float64) {
	bulking, shrinkage = math.NaN(), math.NaN()
	if i < 0 || i >= len(e.Soils) {
		return bulking, shrinkage
	}
	return e.Soils[i].values()
}

// Work is a kind of work that a bill of quantities lists and that may have a rate.
type Work uint8

// The works.
const (
	Strip        Work = iota // Stripping topsoil, m2.
	Excavate                 // Cut, bank m3.
	TrenchDig                // Digging trench drains, bank m3.
	Benching                 // Cutting steps into a face to be filled, and filling them again, bank m3.
	Place                    // Placing fill won on the site, compacted m3.
	Import                   // Bringing and placing fill, compacted m3.
	Stone                    // Stone in trench drains, compacted m3.
	Dispose                  // Taking away what is not used again, bank m3.
	TrenchDrain              // Trench drain complete but for dig and stone, m.
	DrilledDrain             // Drilled drain, m.
	PipedDrain               // Toe drain or interceptor, m.
	Element                  // Piles or nails, m.
	numWorks
)

// workNames are the keys of rates in the case file; workUnits are their units.
var (
	workNames = [numWorks]string{
		"strip", "cut", "trench_dig", "benching", "place", "import", "stone", "dispose", "trench_drain", "drilled_drain", "piped_drain", "element",
	}
	workUnits = [numWorks]string{"m2", "m3", "m3", "m3", "m3", "m3", "m3", "m3", "m", "m", "m", "m"}
)

// Works returns all works in the order of a bill.
func Works() []Work {
	out := make([]Work, numWorks)
	for i := range out {
		out[i] = Work(i)
	}
	return out
}

// String returns the name of a work, as in case and result files.
func (w Work) String() string {
	if w < numWorks {
		return workNames[w]
	}
	return "unknown"
}

// Unit returns the unit that a work is measured in.
func (w Work) Unit() string {
	if w < numWorks {
		return workUnits[w]
	}
	return ""
}
