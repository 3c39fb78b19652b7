package casefile

import (
	"strings"

	"standfast/optimize"
	"standfast/remedies"
)

// readWorks fills the remedies to size, alone and together, and the trials.
func (b *builder) readWorks(root value) {
	toSize, trials, together := b.get(root, "remedies"), b.get(root, "trials"), b.get(root, "combinations")
	if b.finished {
		for _, v := range []value{toSize, trials, together} {
			if v.there() {
				b.addFault(v, "take it out, or `ground_before` and `placed` if this is the slope as it is", "a proposed section, with `ground_before`, is only assessed")
			}
		}
		return
	}
	for _, e := range b.entries(toSize) {
		if q, ok := b.request(e); ok {
			b.job.Requests = append(b.job.Requests, q)
		}
	}
	b.readTrials(trials)
	b.readCombinations(together)
	if len(b.faults) == 0 {
		b.tryWorks(toSize, trials)
	}
	if len(b.faults) == 0 {
		b.tryCombinations(together)
	}
}

// readTrials fills the trials. Their names stand beside those of the remedies in every output.
func (b *builder) readTrials(v value) {
	b.uniqueNames(v)
	for _, item := range b.items(v) {
		var t remedies.Trial
		at := b.get(item, "name")
		t.Name, _ = b.text(at)
		if _, taken := remedies.Find(t.Name); taken || t.Name == remedies.Existing.String() {
			b.addFault(at, "give the trial a name of its own", "`%s` already stands for something else in the outputs", t.Name)
		}
		works := b.get(item, "works")
		for _, e := range b.entries(works) {
			if q, ok := b.request(e); ok {
				t.Requests = append(t.Requests, q)
			}
		}
		if b.usable(works) && len(works.node.Content) == 0 {
			b.addFault(works, "write "+orList(kindNames()), "has no works")
		}
		b.job.Trials = append(b.job.Trials, t)
	}
}

// request returns the remedy under a key of the catalogue, with the settings given and defaults for the rest.
func (b *builder) request(v value) (remedies.Request, bool) {
	k, ok := remedies.Find(v.key.Value)
	if !ok || !b.usable(v) {
		return remedies.Request{}, false
	}
	q := remedies.Request{Kind: k.Name, Soils: map[string]int{}, Words: map[string]string{}}
	for _, c := range k.Choices {
		b.choose(&q, c, b.get(v, c.Name))
	}
	for _, p := range k.Parameters {
		q.Axes = append(q.Axes, b.axis(p, b.get(v, p.Name)))
	}
	return q, true
}

// choose fills one choice of a request.
func (b *builder) choose(q *remedies.Request, c remedies.Choice, v value) {
	switch {
	case c.Soil && v.there():
		if i, ok := b.ref(&b.soils, v); ok {
			q.Soils[c.Name] = i
		}
	case !c.Soil:
		q.Words[c.Name] = c.Values[0]
		if word, ok := b.text(v); ok {
			q.Words[c.Name] = word
		}
	}
}

// axis returns the values that a parameter may have: as given, else the default; empty if it is optional and absent.
func (b *builder) axis(p remedies.Parameter, v value) optimize.Axis {
	if !b.usable(v) {
		if p.Optional {
			return optimize.Axis{}
		}
		a := p.Default
		a.Name = p.Name
		return a
	}
	z, problem := parseSize(v.node)
	if problem == nil && z.count() > 1 && z.last() < z.max-stepSlack*z.step {
		b.warn(v, "steps of %s end at %s and do not reach %s", figure(z.step), figure(round9(z.last())), figure(z.max))
	}
	return optimize.Axis{Name: p.Name, Min: z.min, Max: z.max, Step: z.step}
}

// tryWorks makes every remedy once: what a remedy itself refuses is a fault of the case.
func (b *builder) tryWorks(toSize, trials value) {
	entries := b.entries(toSize)
	for i := range b.job.Requests {
		b.tryRemedies(b.job.Requests[i:i+1], entries[i])
	}
	items := b.items(trials)
	for i := range b.job.Trials {
		entries := b.entries(b.get(items[i], "works"))
		before := len(b.faults)
		for k := range b.job.Trials[i].Requests {
			b.tryRemedies(b.job.Trials[i].Requests[k:k+1], entries[k])
		}
		if len(b.faults) == before {
			b.tryRemedies(b.job.Trials[i].Requests, b.get(items[i], "works"))
		}
	}
}

// tryRemedies makes remedies that are built together.
func (b *builder) tryRemedies(qs []remedies.Request, v value) {
	_, err := remedies.NewRemedies(&b.job, qs)
	if err == nil {
		return
	}
	for _, line := range strings.Split(err.Error(), "\n") {
		line = strings.TrimPrefix(line, remedies.ErrRequest.Error()+": ")
		for _, q := range qs { // The place of the fault says which remedy it is.
			line = strings.TrimPrefix(line, q.Kind+": ")
		}
		message, suggestion, _ := strings.Cut(line, ": ") // What is wrong: what would be right.
		b.addFault(v, suggestion, "%s", message)
	}
}
