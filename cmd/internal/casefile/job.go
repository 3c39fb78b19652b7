package casefile

import (
	"go.yaml.in/yaml/v4"

	"standfast/lem"
	"standfast/remedies"
)

// names are the names that other parts of the file refer to, with the index of each.
type names struct {
	what  string // What they name: "soil".
	all   []string
	index map[string]int
	known bool // False: the names themselves are faulty, and references are not judged.
}

func (n *names) add(name string) {
	n.index[name] = len(n.all)
	n.all = append(n.all, name)
}

// builder fills a job from a tree that has been checked. What has a fault is left out, so that the rest is still looked at.
type builder struct {
	*reader
	job           remedies.Job
	soils, waters names
	soilValues    []value     // By soil.
	stratumValues []value     // By stratum of the section.
	before        lem.Profile // Ground before works; nil if it has a fault.
	finished      bool        // The case is a proposed section: it names the ground before works.
}

// build returns a builder with the job that the case describes; it means something only if no fault is recorded.
func (r *reader) build(root value) *builder {
	b := &builder{reader: r}
	b.soils = names{what: "soil", index: map[string]int{}}
	b.waters = names{what: "water line", index: map[string]int{}}
	b.job.Title, _ = r.text(r.get(root, "title"))
	b.job.Length, _ = r.number(r.get(root, "length"))
	b.job.MinDepth, _ = r.number(r.get(root, "ignore_slips_shallower_than"))
	b.readSoils(r.get(root, "soils"))
	b.readGround(root)
	b.readStrata(r.get(root, "strata"))
	b.readWaters(r.get(root, "water"))
	b.readUndrained()
	b.readPlaced(r.get(root, "placed"))
	b.job.Section.FirmBase, _ = b.line(r.get(root, "firm_base"))
	b.readCrack(r.get(root, "tension_crack"))
	b.readSurcharges(r.get(root, "surcharges"))
	b.readLineLoads(r.get(root, "line_loads"))
	b.readRestraints(r.get(root, "restraints"))
	b.readKnownSlips(r.get(root, "known_slips"))
	b.readLimits(r.get(root, "limits"))
	b.readOnSite(r.get(root, "on_site_fill"))
	b.readEconomics(r.get(root, "economics"))
	b.readObjective(r.get(root, "objective"))
	b.readSensitivity(r.get(root, "sensitivity"))
	b.readSituations(r.get(root, "situations"))
	b.readObserved(r.get(root, "observed_slip"))
	b.readStages(r.get(root, "stages"))
	b.checkStrengths()
	b.readSideForce(r.get(root, "side_force_function"))
	b.readSlips(r.get(root, "slips"))
	b.readSlope(root)
	b.readWorks(root)
	b.warnOfLines(root)
	return b
}

// ref returns the index of the thing that the value names; it records a fault if there is none of that name.
func (b *builder) ref(n *names, v value) (int, bool) {
	name, ok := b.text(v)
	if !ok {
		return 0, false
	}
	if i, ok := n.index[name]; ok {
		return i, true
	}
	if !n.known {
		return 0, false
	}
	b.addFault(v, didYouMean(name, n.all), "there is no %s named `%s`", n.what, clip(name))
	return 0, false
}

// fromTo returns the keys `from` and `to`; it records a fault if they are reversed.
func (b *builder) fromTo(v value) (from, to float64, ok bool) {
	f, t := b.get(v, "from"), b.get(v, "to")
	from, okFrom := b.number(f)
	to, okTo := b.number(t)
	if !okFrom || !okTo {
		return 0, 0, false
	}
	return from, to, b.ordered(t, from, to)
}

// span returns a range [from x, to x] of x; it records a fault if it is reversed.
func (b *builder) span(v value) (lem.Range, bool) {
	x, ok := b.numbers(v)
	if !ok || len(x) != 2 {
		return lem.Range{}, false
	}
	return lem.Range{From: x[0], To: x[1]}, b.ordered(v, x[0], x[1])
}

func (b *builder) ordered(v value, from, to float64) bool {
	if from < to {
		return true
	}
	b.addFault(v, "x grows to the right: write the left end first", "the right end %s is not right of the left end %s", figure(to), figure(from))
	return false
}

// uniqueNames records a fault for each name of the list that an earlier item has.
func (b *builder) uniqueNames(list value) {
	first := map[string]*yaml.Node{}
	for _, item := range b.items(list) {
		v := b.get(item, "name")
		name, ok := b.text(v)
		if !ok {
			continue
		}
		if before, twice := first[name]; twice {
			b.addFault(v, "give each a name of its own", "the name `%s` stands twice, first in line %d", clip(name), before.Line)
			continue
		}
		first[name] = v.node
	}
}
