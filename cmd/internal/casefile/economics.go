package casefile

import "standfast/remedies"

// readOnSite fills the materials of the site that may serve as fill.
func (b *builder) readOnSite(v value) {
	b.uniqueNames(v)
	for _, item := range b.items(v) {
		f := remedies.OnSiteFill{Cut: -1, Share: 1}
		f.Name, _ = b.text(b.get(item, "name"))
		if cut := b.get(item, "cut_of"); cut.there() {
			if i, ok := b.ref(&b.soils, cut); ok {
				f.Cut = i
			}
		}
		for _, s := range b.items(b.get(item, "serves")) {
			if i, ok := b.ref(&b.soils, s); ok {
				f.Serves = append(f.Serves, i)
			}
		}
		share := b.get(item, "share")
		if b.usable(share) {
			f.Share, _ = parseShare(share.node)
			if !b.get(item, "cut_of").there() {
				b.addFault(share, "give the `volume` of a stockpile", "means nothing without `cut_of`")
			}
		}
		if volume, ok := b.number(b.get(item, "volume")); ok {
			f.Volume = &volume
		}
		b.job.OnSite = append(b.job.OnSite, f)
	}
}

// readEconomics fills the user's own rates and factors.
func (b *builder) readEconomics(v value) {
	e := &b.job.Economics
	e.Currency, _ = b.text(b.get(v, "currency"))
	e.StripDepth, _ = b.number(b.get(v, "strip_depth"))
	e.BenchStep, _ = b.number(b.get(v, "bench_step"))
	e.LorryLoad, _ = b.number(b.get(v, "lorry_load"))
	e.Stone = b.volumeFactors(b.get(v, "stone"))
	e.Cost.Work = b.workFactors(b.get(v, "rates"))
	e.Carbon.Work = b.workFactors(b.get(v, "carbon"))
	for _, entry := range b.entries(b.get(v, "soils")) {
		i, ok := b.soils.index[entry.key.Value]
		if !ok {
			if b.soils.known {
				b.faultAt(entry.key, join(v.path, "soils"), didYouMean(entry.key.Value, b.soils.all), "there is no soil named `%s`", clip(entry.key.Value))
			}
			continue
		}
		for len(e.Soils) <= i {
			e.Soils = append(e.Soils, remedies.SoilFactors{})
		}
		e.Soils[i] = b.volumeFactors(entry)
		b.importFactor(&e.Cost, i, b.get(entry, "import_rate"))
		b.importFactor(&e.Carbon, i, b.get(entry, "import_carbon"))
	}
}

func (b *builder) volumeFactors(v value) remedies.SoilFactors {
	var f remedies.SoilFactors
	f.Bulking, _ = b.number(b.get(v, "bulking"))
	f.Shrinkage, _ = b.number(b.get(v, "shrinkage"))
	return f
}

// workFactors returns the factors that are given by work; nil if none is.
func (b *builder) workFactors(v value) map[remedies.Work]float64 {
	var out map[remedies.Work]float64
	for _, w := range remedies.Works() {
		if x, ok := b.number(b.get(v, w.String())); ok {
			if out == nil {
				out = map[remedies.Work]float64{}
			}
			out[w] = x
		}
	}
	return out
}

func (b *builder) importFactor(f *remedies.Factors, soil int, v value) {
	x, ok := b.number(v)
	if !ok {
		return
	}
	if f.Import == nil {
		f.Import = map[int]float64{}
	}
	f.Import[soil] = x
}

// readFormLimits fills the limits on faces, widths and import.
func (b *builder) readFormLimits(v value) {
	l := &b.job.Limits
	batters := b.get(v, "steepest_batters")
	l.Batters.Permanent, _ = b.number(b.get(batters, "permanent"))
	l.Batters.Temporary, _ = b.number(b.get(batters, "temporary"))
	l.MinBench, _ = b.number(b.get(v, "minimum_bench_width"))
	l.MinHaul, _ = b.number(b.get(v, "minimum_haul_width"))
	if most, ok := b.number(b.get(v, "maximum_import")); ok {
		l.MaxImport = &most
	}
	overhead := b.get(v, "overhead")
	b.uniqueNames(overhead)
	for _, item := range b.items(overhead) {
		var o remedies.Overhead
		o.Name, _ = b.text(b.get(item, "name"))
		o.FromX, o.ToX, _ = b.fromTo(item)
		o.Level, _ = b.number(b.get(item, "level"))
		o.Clearance, _ = b.number(b.get(item, "clearance"))
		l.Overhead = append(l.Overhead, o)
	}
}
