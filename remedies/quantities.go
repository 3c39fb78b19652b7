package remedies

// Quantities are amounts per metre run of the works: m3/m unless said otherwise. Cut is bank volume, fill compacted volume; they
// are never netted.
type Quantities struct {
	Cut       []float64 // Bank cut by soil, measured from the ground before works; a trench's dig is not in it.
	Fill      []float64 // Compacted fill by soil placed; a trench's stone is not in it.
	TrenchDig float64   // Bank dig of trench drains.
	Stone     float64   // Stone in trench drains.
	Drain     float64   // Length of drains of all kinds, m per m run.
	Strip     float64   // Area of existing ground stripped under fill and cut, m2 per m run; counted apart from earthworks.

	Dig       []float64 // Bank dig of trench drains by soil: the parts of TrenchDig.
	Drilled   float64   // Part of Drain that is drilled from the face, m per m run.
	Piped     float64   // Part of Drain that is a toe drain or an interceptor, m per m run.
	Topsoil   []float64 // Part of Cut by soil that lies within the strip depth and is no fill; counted if a strip depth is given.
	FillBase  []float64 // Horizontal width of ground before works under fill, by soil placed, m.
	FaceRun   float64   // Horizontal width of ground steeper than 1V:5H under fill, m: it is benched before it is filled.
	Elements  float64   // Structural elements, number per m run.
	ElementsM float64   // Their length, m per m run.
}

// newQuantities returns no amounts for a number of soils.
func newQuantities(soils int) Quantities {
	all := make([]float64, 5*soils)
	part := func(i int) []float64 { return all[i*soils : (i+1)*soils : (i+1)*soils] }
	return Quantities{Cut: part(0), Fill: part(1), Dig: part(2), Topsoil: part(3), FillBase: part(4)}
}

// clone returns a copy that shares nothing.
func (q *Quantities) clone() Quantities {
	c, n := *q, len(q.Cut)
	fresh := newQuantities(n)
	c.Cut, c.Fill, c.Dig, c.Topsoil, c.FillBase = fresh.Cut, fresh.Fill, fresh.Dig, fresh.Topsoil, fresh.FillBase
	copy(c.Cut, q.Cut)
	copy(c.Fill, q.Fill)
	copy(c.Dig, q.Dig)
	copy(c.Topsoil, q.Topsoil)
	copy(c.FillBase, q.FillBase)
	return c
}

// TotalCut returns the bank cut of all soils with the dig of trenches, m3/m.
func (q *Quantities) TotalCut() float64 { return sum(q.Cut) + q.TrenchDig }

// TotalFill returns the compacted fill of all soils with the stone of trenches, m3/m.
func (q *Quantities) TotalFill() float64 { return sum(q.Fill) + q.Stone }

// Earthworks returns cut plus fill, m3/m: what a sizing makes least unless cost or carbon is asked for.
func (q *Quantities) Earthworks() float64 { return q.TotalCut() + q.TotalFill() }

func sum(v []float64) float64 {
	var t float64
	for _, a := range v {
		t += a
	}
	return t
}
