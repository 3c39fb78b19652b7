package remedies

import "math"

// Item is a line of a bill of quantities.
type Item struct {
	Work     Work
	Soil     int     // Index into Section.Soils; -1: of no soil.
	PerMetre float64 // In the unit of the work, per m run; NaN: it needs a factor that is blank.
	Total    float64 // For the whole length.
	Loose    float64 // Loose volume of it, m3 for the whole length; NaN: not known or no volume.
	Loads    float64 // Lorry loads of what is brought or taken away, whole loads; NaN: not known or none of that.
	Cost     float64 // For the whole length; NaN: its rate is blank.
	Carbon   float64 // kg CO2 equivalent for the whole length; NaN: its factor is blank.
}

// Bill is the quantities of works, priced where the user gave rates.
type Bill struct {
	Length  float64 // m.
	Items   []Item  // In the order of [Works], only what there is.
	Balance Balance
	Loads   float64 // Lorry loads in and out, whole loads; NaN: a factor that they need is blank.
	Cost    float64 // NaN: no rates are given, or one that is needed is blank.
	Carbon  float64 // Likewise.
}

// BillOf measures and prices the works of quantities q. Rates are the user's; the bill never fills one in.
func BillOf(j *Job, q *Quantities) Bill {
	b := Bill{Length: j.Length, Balance: BalanceOf(j, q)}
	b.bySoil(j, Excavate, q.Cut)
	b.bySoil(j, TrenchDig, q.Dig)
	b.bySoil(j, Place, b.Balance.Reused)
	b.bySoil(j, Import, b.Balance.Import)
	b.bySoil(j, Dispose, b.Balance.Dispose)
	b.add(j, Strip, noSoil, q.Strip)
	if q.FaceRun > 0 {
		step := j.Economics.BenchStep
		if step == 0 {
			step = math.NaN()
		}
		b.add(j, Benching, noSoil, BenchingVolume(q.FaceRun, step))
	}
	b.add(j, Stone, noSoil, q.Stone)
	b.add(j, TrenchDrain, noSoil, q.Drain-q.Drilled-q.Piped)
	b.add(j, DrilledDrain, noSoil, q.Drilled)
	b.add(j, PipedDrain, noSoil, q.Piped)
	b.add(j, Element, noSoil, q.ElementsM)
	b.sort()
	b.total(j)
	return b
}

// Cost returns what the works of quantities q cost for the whole length; NaN if a rate that it needs is blank.
func Cost(j *Job, q *Quantities) float64 { b := BillOf(j, q); return b.Cost }

// Carbon returns the carbon of the works of quantities q for the whole length, kg CO2 equivalent; NaN if a factor that it needs is blank.
func Carbon(j *Job, q *Quantities) float64 { b := BillOf(j, q); return b.Carbon }

// BenchingVolume returns the volume of steps of a height, m, cut into a face, m3/m: on a horizontal width run of the face each step takes a
// triangle of that height, so that the volume is run step/2 whatever the batter (plane geometry).
func BenchingVolume(run, step float64) float64 { return run * step / 2 }

func (b *Bill) bySoil(j *Job, w Work, amounts []float64) {
	for i, a := range amounts {
		b.add(j, w, i, a)
	}
}

// least is an amount too small to be a line of the bill: rounding.
const least = 1e-9

// add appends an item unless there is none of it.
func (b *Bill) add(j *Job, w Work, soil int, perMetre float64) {
	if perMetre <= least {
		return
	}
	e := &j.Economics
	it := Item{Work: w, Soil: soil, PerMetre: perMetre, Total: perMetre * j.Length, Loose: math.NaN(), Loads: math.NaN()}
	bulking, shrinkage := e.soil(soil)
	switch w { //nolint:exhaustive // the other works move no volume by themselves
	case Excavate, TrenchDig, Dispose:
		it.Loose = it.Total * bulking
	case Stone:
		bulking, shrinkage = e.Stone.values()
		it.Loose = it.Total / shrinkage * bulking
	case Place, Import:
		it.Loose = it.Total / shrinkage * bulking
	}
	if w.hauled() && e.LorryLoad > 0 {
		it.Loads = math.Ceil(it.Loose/e.LorryLoad - least)
	}
	it.Cost = it.Total * e.Cost.of(w, soil)
	it.Carbon = it.Total * e.Carbon.of(w, soil)
	b.Items = append(b.Items, it)
}

// hauled reports whether a work brings something to the site or takes it away.
func (w Work) hauled() bool { return w == Import || w == Stone || w == Dispose }

// sort brings the items into the order of the works, soils in their own order within.
func (b *Bill) sort() {
	sorted := make([]Item, 0, len(b.Items))
	for w := range numWorks {
		for _, it := range b.Items {
			if it.Work == w {
				sorted = append(sorted, it)
			}
		}
	}
	b.Items = sorted
}

// total adds up what is known of all items or not at all.
func (b *Bill) total(j *Job) {
	if j.Economics.Cost.Blank() {
		b.Cost = math.NaN()
	}
	if j.Economics.Carbon.Blank() {
		b.Carbon = math.NaN()
	}
	if j.Economics.LorryLoad == 0 {
		b.Loads = math.NaN()
	}
	for _, it := range b.Items {
		b.Cost += it.Cost
		b.Carbon += it.Carbon
		if it.Work.hauled() {
			b.Loads += it.Loads
		}
	}
}
