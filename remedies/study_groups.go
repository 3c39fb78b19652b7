package remedies

import "strings"

// groups returns the requests that are sized together, the single ones first: each alone, then every compatible pair, then the
// combinations that the job asks for.
func (j *Job) groups(pairs bool) [][]Request {
	var out [][]Request
	for _, r := range j.Requests {
		out = append(out, []Request{r})
	}
	if pairs {
		for i, a := range j.Requests {
			for _, b := range j.Requests[i+1:] {
				if compatible(a, b) {
					out = append(out, []Request{a, b})
				}
			}
		}
	}
	for _, names := range j.Combinations {
		var group []Request
		for _, r := range j.Requests {
			for _, n := range names {
				if r.Kind == n {
					group = append(group, r)
				}
			}
		}
		sized := pairs && len(group) == 2 && compatible(group[0], group[1])
		if len(group) > 1 && !sized {
			out = append(out, group)
		}
	}
	return out
}

// compatible reports whether two remedies can be built together: not in the same place, and neither a what-if.
func compatible(a, b Request) bool {
	ka, okA := Find(a.Kind)
	kb, okB := Find(b.Kind)
	return okA && okB && !ka.WhatIf && !kb.WhatIf && ka.Place != kb.Place
}

// groupName joins the names of remedies: "berm+trench_drains".
func groupName(group []Request) string {
	var names []string
	for _, r := range group {
		names = append(names, r.Kind)
	}
	return strings.Join(names, "+")
}

// pooled is a slip known from sizing a remedy, with the label of its check: a pair has checks of its own.
type pooled struct {
	label string
	cut   Cut
}

// keep files the pool of a sizing under its name.
func (st *study) keep(name string, checks []Check, pool []Cut) {
	for _, c := range pool {
		st.pools[name] = append(st.pools[name], pooled{checks[c.Check].Label(), c})
	}
}

// start returns the slips to start a sizing with: those known from sizing the same works before, with another strength, and from each of several
// remedies alone.
func (st *study) start(z *sizing, group []Request) []Cut {
	known := st.pools[z.w.name]
	if len(group) > 1 {
		for _, r := range group {
			known = append(known[:len(known):len(known)], st.pools[r.Kind]...)
		}
	}
	if len(known) == 0 {
		return nil
	}
	index := map[string]int{}
	for i, c := range Checks(st.j, z.w.apply(st.j, z.w.smallest())) {
		index[c.Label()] = i
	}
	var out []Cut
	for _, p := range known {
		if i, ok := index[p.label]; ok {
			p.cut.Check = uint16(i)
			out = append(out, p.cut)
		}
	}
	return out
}
