package report

import (
	"standfast/remedies"
)

// Economics are the user's own rates and factors. What is null or missing was left blank: what needs it is then not known.
type Economics struct {
	Currency   string                 `json:"currency"`                            // Unit of the rates; empty if none is named.
	StripDepth *float64               `json:"strip_depth_m" jsonschema:"nullable"` // Topsoil stripped under the works, m.
	BenchStep  *float64               `json:"bench_step_m" jsonschema:"nullable"`  // Height of the steps cut into a face before it is filled, m.
	LorryLoad  *float64               `json:"lorry_load_m3" jsonschema:"nullable"` // Loose volume of a lorry load, m3.
	Soils      map[string]SoilFactors `json:"soils"`                               // Factors by soil.
	Stone      SoilFactors            `json:"stone"`                               // Factors of the stone in trench drains.
	Rates      map[string]float64     `json:"rates"`                               // Money per unit, by work.
	Carbon     map[string]float64     `json:"carbon_kg"`                           // kg CO2 equivalent per unit, by work.
}

// SoilFactors say how the volume of a soil changes, and what it costs as imported fill.
type SoilFactors struct {
	Bulking      *float64 `json:"bulking" jsonschema:"nullable"`                    // Loose over bank volume.
	Shrinkage    *float64 `json:"shrinkage" jsonschema:"nullable"`                  // Compacted over bank volume.
	ImportRate   *float64 `json:"import_rate,omitempty" jsonschema:"nullable"`      // Money per compacted m3, in place of the rate of import.
	ImportCarbon *float64 `json:"import_carbon_kg,omitempty" jsonschema:"nullable"` // kg CO2 equivalent per compacted m3, in place of the carbon of import.
}

// OnSiteFill is material of the site that may serve as fill.
type OnSiteFill struct {
	Name   string   `json:"name"`                            // Name.
	CutOf  string   `json:"cut_of"`                          // Soil whose cut it is; empty: a stockpile.
	Serves []string `json:"serves"`                          // Soils that it may be placed as.
	Share  float64  `json:"share"`                           // Share of the cut that is fit for use, 0 to 1.
	Volume *float64 `json:"volume_m3" jsonschema:"nullable"` // Most that there is, compacted m3 for the whole length; null: no limit.
}

// BillItem is a line of the bill of quantities.
type BillItem struct {
	Work     string  `json:"work"`        // Name of the work, as a rate of the case file has it.
	Soil     string  `json:"soil"`        // Soil; empty if the work has none.
	Unit     string  `json:"unit"`        // Unit of the amounts.
	PerMetre *Number `json:"per_metre"`   // Per metre run; null: a factor that it needs is blank.
	Total    *Number `json:"total"`       // For the whole length.
	Loose    *Number `json:"loose_m3"`    // Loose volume, m3; null: no volume, or the bulking or shrinkage is blank.
	Loads    *Number `json:"lorry_loads"` // Whole lorry loads in or out; null: not known, or nothing is brought or taken away.
	Cost     *Number `json:"cost"`        // For the whole length; null: its rate is blank.
	Carbon   *Number `json:"carbon_kg"`   // kg CO2 equivalent for the whole length; null: its factor is blank.
}

// given returns a value, and nil for 0, which stands for blank.
func given(v float64) *float64 {
	if v == 0 {
		return nil
	}
	return &v
}

// orZero returns a value, and 0 for none.
func orZero(v *float64) float64 {
	if v == nil {
		return 0
	}
	return *v
}

// ifKnown returns a number, and nil if it is not known.
func ifKnown(v float64) *Number {
	n := Number(v)
	if !n.Known() {
		return nil
	}
	return &n
}

func (b *builder) economics() Economics {
	e := &b.job.Economics
	out := Economics{
		Currency: e.Currency, StripDepth: given(e.StripDepth), BenchStep: given(e.BenchStep), LorryLoad: given(e.LorryLoad),
		Soils: map[string]SoilFactors{}, Stone: factorsOf(e.Stone), Rates: byWork(e.Cost.Work), Carbon: byWork(e.Carbon.Work),
	}
	for i, name := range b.soils {
		var f SoilFactors
		if i < len(e.Soils) {
			f = factorsOf(e.Soils[i])
		}
		if v, ok := e.Cost.Import[i]; ok {
			f.ImportRate = &v
		}
		if v, ok := e.Carbon.Import[i]; ok {
			f.ImportCarbon = &v
		}
		if f != (SoilFactors{}) {
			out.Soils[name] = f
		}
	}
	return out
}

func factorsOf(f remedies.SoilFactors) SoilFactors {
	return SoilFactors{Bulking: given(f.Bulking), Shrinkage: given(f.Shrinkage)}
}

func byWork(factors map[remedies.Work]float64) map[string]float64 {
	out := make(map[string]float64, len(factors))
	for w, v := range factors {
		out[w.String()] = v
	}
	return out
}

func (b *builder) onSite() []OnSiteFill {
	out := make([]OnSiteFill, len(b.job.OnSite))
	for i, f := range b.job.OnSite {
		out[i] = OnSiteFill{Name: f.Name, Serves: []string{}, Share: f.Share, Volume: f.Volume}
		if f.Cut >= 0 {
			out[i].CutOf = b.soils[f.Cut]
		}
		for _, s := range f.Serves {
			out[i].Serves = append(out[i].Serves, b.soils[s])
		}
	}
	return out
}

// bill lists the works, measured and priced.
func (b *builder) bill(bill *remedies.Bill) []BillItem {
	out := make([]BillItem, len(bill.Items))
	for i, it := range bill.Items {
		out[i] = BillItem{
			Work: it.Work.String(), Unit: it.Work.Unit(), PerMetre: ifKnown(it.PerMetre), Total: ifKnown(it.Total), Loose: ifKnown(it.Loose),
			Loads: ifKnown(it.Loads), Cost: ifKnown(it.Cost), Carbon: ifKnown(it.Carbon),
		}
		if it.Soil >= 0 {
			out[i].Soil = b.soils[it.Soil]
		}
	}
	return out
}

func (b *rebuilder) economics() remedies.Economics {
	e := &b.file.Economics
	out := remedies.Economics{
		Currency: e.Currency, StripDepth: orZero(e.StripDepth), BenchStep: orZero(e.BenchStep), LorryLoad: orZero(e.LorryLoad),
		Stone: e.Stone.rebuilt(), Cost: remedies.Factors{Work: rebuiltWork(e.Rates)}, Carbon: remedies.Factors{Work: rebuiltWork(e.Carbon)},
	}
	for i, name := range b.file.SoilOrder {
		f, ok := e.Soils[name]
		if !ok {
			continue
		}
		for len(out.Soils) <= i {
			out.Soils = append(out.Soils, remedies.SoilFactors{})
		}
		out.Soils[i] = f.rebuilt()
		addImport(&out.Cost, i, f.ImportRate)
		addImport(&out.Carbon, i, f.ImportCarbon)
	}
	return out
}

func (f *SoilFactors) rebuilt() remedies.SoilFactors {
	return remedies.SoilFactors{Bulking: orZero(f.Bulking), Shrinkage: orZero(f.Shrinkage)}
}

func addImport(f *remedies.Factors, soil int, v *float64) {
	if v == nil {
		return
	}
	if f.Import == nil {
		f.Import = map[int]float64{}
	}
	f.Import[soil] = *v
}

// rebuiltWork returns factors by work; nil if none is given.
func rebuiltWork(factors map[string]float64) map[remedies.Work]float64 {
	var out map[remedies.Work]float64
	for _, w := range remedies.Works() {
		if v, ok := factors[w.String()]; ok {
			if out == nil {
				out = map[remedies.Work]float64{}
			}
			out[w] = v
		}
	}
	return out
}

func (b *rebuilder) onSite() []remedies.OnSiteFill {
	var out []remedies.OnSiteFill
	for _, f := range b.file.OnSite {
		r := remedies.OnSiteFill{Name: f.Name, Cut: -1, Share: f.Share, Volume: f.Volume}
		if f.CutOf != "" {
			r.Cut = b.soilIndex(f.CutOf)
		}
		for _, s := range f.Serves {
			r.Serves = append(r.Serves, b.soilIndex(s))
		}
		out = append(out, r)
	}
	return out
}
