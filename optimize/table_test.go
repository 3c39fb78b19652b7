package optimize

import (
	"cmp"
	"context"
	"math"
	"slices"
	"sync/atomic"

	"pgregory.net/rapid"
)

// table is a problem given by its numbers: one row a lattice design, one margin a cut. Between lattice points the nearest row
// holds, so margins are discontinuous.
type table struct {
	axes      []Axis
	cost, tie []float64
	forbidden []bool
	margins   [][]float64
	// hidden cuts are met by audits only.
	hidden []bool

	opened, closed atomic.Int64
	// onSearch and onMargin, when set, run at the start of every call.
	onSearch func(ctx context.Context, row int, e Effort) error
	onMargin func(row int)
}

// line is a table with one axis and the cost of a row its number.
func line(margins ...[]float64) *table {
	p := &table{
		axes: []Axis{{"row", 0, float64(len(margins) - 1), 1}}, margins: margins,
		forbidden: make([]bool, len(margins)), tie: make([]float64, len(margins)),
		hidden: make([]bool, len(margins[0])),
	}
	for i := range margins {
		p.cost = append(p.cost, float64(i))
	}
	if len(margins) == 1 {
		p.axes[0].Step = 0
	}
	return p
}

func (p *table) row(x []float64) int {
	index := 0
	for k, a := range p.axes {
		i := 0
		if a.Step > 0 {
			i = int(math.Round((x[k] - a.Min) / a.Step))
		}
		index = index*a.Len() + i
	}
	return index
}

func (p *table) problem() Problem[int] {
	return Problem[int]{
		Axes: p.axes,
		Cost: func(x []float64) (cost, tie float64, ok bool) {
			i := p.row(x)
			return p.cost[i], p.tie[i], !p.forbidden[i]
		},
		Open: func(x []float64) Design[int] {
			p.opened.Add(1)
			return &tableDesign{p: p, row: p.row(x)}
		},
	}
}

type tableDesign struct {
	p      *table
	row    int
	closed bool
}

func (d *tableDesign) Margin(c *int) float64 {
	if d.p.onMargin != nil {
		d.p.onMargin(d.row)
	}
	return d.p.margins[d.row][*c]
}

// Search finds every cut that is not hidden from it.
func (d *tableDesign) Search(ctx context.Context, e Effort) ([]Found[int], error) {
	if d.p.onSearch != nil {
		if err := d.p.onSearch(ctx, d.row, e); err != nil {
			return nil, err
		}
	}
	var found []Found[int]
	for c, m := range d.p.margins[d.row] {
		if !d.p.hidden[c] || e.Audit {
			found = append(found, Found[int]{Cut: c, Margin: m})
		}
	}
	return found, nil
}

func (d *tableDesign) Close() {
	if d.closed {
		panic("closed twice")
	}
	d.closed = true
	d.p.closed.Add(1)
}

// minimize runs Minimize and checks that every design opened was closed.
func (p *table) minimize(t rapid.TB, s Settings[int]) Result[int] {
	t.Helper()
	r, err := Minimize(context.Background(), p.problem(), s)
	if err != nil {
		t.Fatal(err)
	}
	p.checkClosed(t)
	return r
}

func (p *table) checkClosed(t rapid.TB) {
	t.Helper()
	if o, c := p.opened.Load(), p.closed.Load(); o != c {
		t.Fatalf("%d designs opened, %d closed", o, c)
	}
}

// plain is the slow twin's answer.
type plain struct {
	status     Status
	row        int // of the answer
	unresolved int // cheaper rows neither passed nor rejected
	before     int // rows allowed and before the answer
	best       float64
}

// solvePlain weighs every row on every cut, in walk order.
func (p *table) solvePlain(allowance float64) plain {
	var rows []int
	for i := range p.cost {
		if !p.forbidden[i] {
			rows = append(rows, i)
		}
	}
	slices.SortFunc(rows, func(a, b int) int {
		return cmp.Or(cmp.Compare(p.cost[a], p.cost[b]), cmp.Compare(p.tie[a], p.tie[b]), cmp.Compare(a, b))
	})
	out := plain{status: NoDesign, row: -1, best: math.Inf(-1)}
	for _, i := range rows {
		lowest, unknown := math.Inf(1), false
		for _, m := range p.margins[i] {
			if math.IsNaN(m) {
				unknown = true
			} else if m < lowest {
				lowest = m
			}
		}
		switch {
		case lowest < allowance:
			out.best = max(out.best, lowest)
		case unknown:
			out.unresolved++
		default:
			out.status, out.row = Optimal, i
			return out
		}
		out.before++
	}
	if len(rows) > 0 {
		out.status = Infeasible
	}
	if out.unresolved > 0 {
		out.status = Unresolved
	}
	return out
}
