package remedies

import (
	"context"
	"fmt"
	"math"
	"strconv"
	"strings"

	"standfast/optimize"
)

// NotEven stands in the reason of an option that a limit holds back, and that would not meet the target without the limit either.
const NotEven = "would not reach the target"

// judge sets status, reason and what binds from the optimiser's answer.
func (z *sizing) judge(o *Option, res *optimize.Result[Cut]) {
	switch res.Status {
	case optimize.Optimal:
		o.Status = MeetsTarget
		o.Reason = "every check stands at or above its required FS"
		if g := o.Governing(); g != nil {
			o.Binding = g.Check.Label()
		}
		if len(o.Proposal.NotChecked) > 0 {
			o.Status = Unresolved
			o.Reason = strings.Join(o.Proposal.NotChecked, "; ")
		}
	case optimize.Unresolved:
		o.Status = Unresolved
		o.Reason = fmt.Sprintf("no design passed, and %d could not be judged: no governing method answered on some of their slips", res.Unresolved)
	case optimize.Infeasible, optimize.NoDesign, optimize.Interrupted:
		o.Status = Infeasible
	}
}

// explain says why nothing within the limits meets the target: the best FS reached, and what binds. To tell which limit, the remedy is sized
// once more without limits, unless plain.
func (z *sizing) explain(ctx context.Context, o *Option, res *optimize.Result[Cut], plain bool, tell func(string, float64)) error {
	var reached string
	if g := o.Governing(); g != nil && res.Best.X != nil {
		o.Binding = g.Check.Label()
		reached = fmt.Sprintf("the best within the limits (%s) reaches FS %s in %s, required %s",
			dimensions(z.w, res.Best.X), floorFS(g.FS), g.Check.Label(), fsText(g.Check.Required))
	}
	if res.Forbidden == 0 {
		o.Reason = reached + z.endsOfRange(res.Best.X)
		return nil
	}
	if plain {
		if o.Reason = reached; reached == "" {
			o.Reason = noDesign
		}
		return nil
	}
	var start []Cut
	start = append(start, res.Pool...)
	unaudited := newSizing(z.j, z.w, z.s)
	unaudited.noAudit = true // What the target would take is told as about that.
	free, err := unaudited.minimize(ctx, unaudited.costWithoutLimits, start, tell)
	if err != nil {
		return err
	}
	x, verdict := free.X, "the target would take about %s, which breaks %s: %s"
	if x == nil {
		x, verdict = free.Best.X, "even %s, which breaks %s, "+NotEven+": %s"
		if free.Status == optimize.Unresolved { // Designs that could not be judged might.
			verdict = "even %s, which breaks %s, was not found to reach the target: %s"
		}
	}
	var limits, details []string
	broken := o.Proposal // Of the smallest works, where the ground allows none of them.
	if x != nil {
		broken = z.w.apply(z.j, x)
	} else if reached == "" {
		reached, verdict = "no design of the range can be built", "even %s breaks %s: %s"
		x = z.w.smallest()
	}
	if x != nil {
		for _, v := range broken.Violations {
			limits = appendOnce(limits, v.Limit)
			details = append(details, v.Detail)
		}
	}
	if len(limits) == 0 { // The limits do not stand in the way: nothing of the range does.
		o.Reason = reached + "; without the limits no design of the range was found to do better" + z.endsOfRange(x)
		return nil
	}
	o.Binding = strings.Join(limits, ", ")
	if reached == "" {
		reached = noDesign
	}
	o.Reason = reached + "; " + fmt.Sprintf(verdict, dimensions(z.w, x), o.Binding, strings.Join(details, "; "))
	return nil
}

// noDesign is why a remedy that the limits forbid altogether does not do.
const noDesign = "no design is within the limits"

// costWithoutLimits is cost with the limits of the site left out; works that geometry does not allow are still refused.
func (z *sizing) costWithoutLimits(x []float64) (cost, tie float64, ok bool) {
	p := z.w.apply(z.j, x)
	cost, tie = z.price(p, x)
	for _, v := range p.Violations {
		if v.Geometry {
			return cost, tie, false
		}
	}
	return cost, tie, true
}

// endsOfRange names the parameters of a design that stand at an end of their range.
func (z *sizing) endsOfRange(x []float64) string {
	var ends []string
	for i, a := range z.w.axes {
		if x != nil && a.Len() > 1 && (x[i] == a.At(0) || x[i] == a.At(a.Len()-1)) {
			ends = append(ends, ParameterWords(a.Name))
		}
	}
	if len(ends) == 0 {
		return ""
	}
	return "; at the end of the range given: " + strings.Join(ends, ", ")
}

// dimensions prints the sized parameters of a design.
func dimensions(w *works, x []float64) string {
	var parts []string
	for i, v := range w.values(x) {
		if w.axes[i].Len() == 1 {
			continue
		}
		parts = append(parts, v.String())
	}
	if len(parts) == 0 {
		for _, v := range w.values(x) {
			parts = append(parts, v.String())
		}
	}
	return strings.Join(parts, ", ")
}

// ParameterWords puts the name of a parameter into words: "top width", and "trench drains depth" for one of several remedies sized together.
func ParameterWords(name string) string { return strings.NewReplacer("_", " ", ".", " ").Replace(name) }

// String prints a parameter for people: "top width 5.50 m", "batter 1V:2.5H".
func (v Value) String() string {
	decimals := -1
	if v.Unit == "m" {
		decimals = 2
	}
	return v.Words(strconv.FormatFloat(v.Value, 'f', decimals, 64))
}

// Words puts a parameter into words, with its value written as given.
func (v Value) Words(number string) string {
	name := ParameterWords(v.Name)
	switch {
	case strings.HasSuffix(name, "pivot") && v.Value == 0:
		return name + " at the toe"
	case strings.HasSuffix(name, "pivot") && v.Value == 1:
		return name + " at the crest"
	case strings.HasSuffix(name, "pivot"):
		return name + " at " + number + " of the height"
	case v.Unit == "1V:nH":
		return name + " 1V:" + number + "H"
	case v.Unit == "1", v.Unit == "":
		return name + " " + number
	}
	return name + " " + number + " " + v.Unit
}

// stepsLess says for each parameter why the design one step cheaper in it is not the answer.
func (z *sizing) stepsLess(res *optimize.Result[Cut]) []StepLess {
	witness := map[int]optimize.Witness{}
	for _, w := range res.Lattice {
		witness[w.Index] = w
	}
	var out []StepLess
	index := make([]int, len(res.Axes))
	for i, a := range res.Axes {
		index[i] = int(math.Round((res.X[i] - a.Min) / math.Max(a.Step, math.SmallestNonzeroFloat64)))
		if a.Len() == 1 {
			index[i] = 0
		}
	}
	for i, a := range res.Axes {
		for _, step := range []int{-1, 1} {
			k := index[i] + step
			if k < 0 || k >= a.Len() {
				continue
			}
			x := append([]float64(nil), res.X...)
			x[i] = a.At(k)
			if s, ok := z.stepLess(a.Name, x, i, res, witness, position(res.Axes, index, i, k)); ok {
				out = append(out, s)
			}
		}
	}
	return out
}

// position returns the index on the lattice of a design that differs from another in axis i only; the last axis runs fastest.
func position(axes []optimize.Axis, index []int, i, k int) int {
	p := 0
	for n, a := range axes {
		v := index[n]
		if n == i {
			v = k
		}
		p = p*a.Len() + v
	}
	return p
}

// stepLess describes a neighbour of the answer; ok is false if it is no cheaper.
func (z *sizing) stepLess(name string, x []float64, i int, res *optimize.Result[Cut], witness map[int]optimize.Witness, at int) (StepLess, bool) {
	p := z.w.apply(z.j, x)
	s := StepLess{Parameter: name, Value: x[i], FS: math.NaN()}
	cost, _ := z.price(p, x)
	if w, ok := witness[at]; ok && w.Cut != optimize.NoCut {
		c := &Checks(z.j, p)[res.Pool[w.Cut].Check]
		s.Check, s.Required, s.FS = c.Label(), c.Required, w.Margin+c.Required
		return s, true
	}
	if len(p.Violations) > 0 && cost <= res.Cost {
		s.Limit = p.Violations[0].Limit
		return s, true
	}
	return s, false
}
