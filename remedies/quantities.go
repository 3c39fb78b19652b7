package remedies

// Quantities are amounts per metre run of the works: m3/m unless said otherwise. Cut is bank volume, fill compacted volume; they
// are never netted.
type Quantities struct {
	Cut       []float64 // Bank cut by soil, measured from the ground before works; a trench's dig is not in it.
	Fill      []float64 // Compacted fill by soil placed; a trench's stone is not in it.
	TrenchDig float64   // Bank dig of trench drains.
	Stone     float64   // Stone in trench drains.
	Drain     float64   // Length of drain, m per m run.
	Strip     float64   // Area of existing ground stripped under fill and cut, m2 per m run; counted apart from earthworks.
}

// TotalCut returns the bank cut of all soils with the dig of trenches, m3/m.
func (q *Quantities) TotalCut() float64 { return sum(q.Cut) + q.TrenchDig }

// TotalFill returns the compacted fill of all soils with the stone of trenches, m3/m.
func (q *Quantities) TotalFill() float64 { return sum(q.Fill) + q.Stone }

// Earthworks returns cut plus fill, m3/m: what a sizing makes least.
func (q *Quantities) Earthworks() float64 { return q.TotalCut() + q.TotalFill() }

func sum(v []float64) float64 {
	var t float64
	for _, a := range v {
		t += a
	}
	return t
}
