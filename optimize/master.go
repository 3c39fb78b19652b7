package optimize

import (
	"cmp"
	"math"
	"math/rand/v2"
	"slices"
	"sync"

	"gonum.org/v1/gonum/mat"
	gopt "gonum.org/v1/gonum/optimize"
)

// Values of the master's objective are ranked as by Deb (An efficient constraint handling method for genetic algorithms,
// Comput. Methods Appl. Mech. Engrg. 186, 2000): allowed points that hold on the pool by scaled cost, then those that
// do not by how far they fall short, then the forbidden by their distance from an allowed point. The bases
// keep the three apart; within each, values are capped below the next base.
const (
	shortBase     = 1e1
	forbiddenBase = 1e6
)

// Effort of the master, which is only an estimate: gonum's CMA-ES converges slowly with its default population.
const (
	scanPoints      = 64   // lattice designs tried for a start, and points of the scan of one parameter
	cmaSpread       = 0.25 // standard deviation of the first population, in shares of an axis
	cmaIterations   = 25
	cmaStall        = 8    // iterations without gain that end it
	cmaGain         = 1e-4 // gain of scaled cost that counts
	cmaRounds       = 2    // rounds of the exchange that evolve a population; later ones start near the answer
	simplexSize     = 0.05 // of the first simplex after CMA-ES, in shares of an axis,
	simplexAlone    = 0.15 // and without it
	simplexMoves    = 80
	simplexStall    = 15
	simplexGain     = 1e-6
	bracketDivision = 40 // golden sections: 0.618^40 = 4e-9 of the bracket
)

// cmaPopulation is three to four times gonum's default 4 + 3 ln(n).
func cmaPopulation(dim int) int { return 12 + 6*dim }

// trial is an evaluated point of the master problem.
type trial struct {
	value float64 // see shortBase
	cost  float64 // NaN unless the point is allowed and holds on the pool
	u     []float64
}

// holds reports whether the point is allowed and every pool margin reaches the allowance.
func (t trial) holds() bool { return t.value < shortBase }

// compareTrials is a total order, so that the best trial does not depend on the order of evaluation.
func compareTrials(a, b trial) int {
	return cmp.Or(cmp.Compare(a.value, b.value), slices.Compare(a.u, b.u))
}

// master is the continuous problem on the pool, in scaled coordinates u: one a free axis, 0 at the first and 1 at the last
// lattice point.
type master[C any] struct {
	r         *run[C]
	free      []int     // axes with more than one point
	base      []float64 // the first point of every axis
	span      []float64 // of the free axes
	costMin   float64
	costRange float64
	asked     float64   // of every margin: the allowance and a lead, see exchange
	home      []float64 // an allowed point

	mu     sync.Mutex
	best   trial
	caught guard
}

func newMaster[C any](r *run[C]) *master[C] {
	m := &master[C]{r: r, base: Point(r.res.Axes, 0)}
	for k, a := range r.res.Axes {
		if a.Len() > 1 {
			m.free = append(m.free, k)
			m.span = append(m.span, a.At(a.Len()-1)-a.At(0))
		}
	}
	first, last := r.designs[0], r.designs[len(r.designs)-1]
	m.costMin, m.costRange = first.cost, last.cost-first.cost
	if m.costRange == 0 {
		m.costRange = 1
	}
	m.home = m.scaled(first)
	return m
}

// at returns the parameters at u.
func (m *master[C]) at(u []float64) []float64 {
	x := slices.Clone(m.base)
	for i, k := range m.free {
		x[k] += u[i] * m.span[i]
	}
	return x
}

func (m *master[C]) scaled(d design) []float64 {
	x := m.r.point(d)
	u := make([]float64, len(m.free))
	for i, k := range m.free {
		u[i] = (x[k] - m.base[k]) / m.span[i]
	}
	return u
}

// solve returns the best point found on the present pool, asked for the allowance and a lead; when none holds, that is the one that
// misses by least, ok is false and its cost NaN.
func (m *master[C]) solve(round int, lead float64) (best trial, ok bool, err error) {
	m.asked = m.r.s.Allowance + lead
	m.best = trial{value: math.Inf(1), cost: math.NaN(), u: m.home}
	n := len(m.r.designs)
	for i := range min(n, scanPoints) {
		m.value(m.scaled(m.r.designs[i*n/min(n, scanPoints)]))
	}
	switch {
	case len(m.free) == 1:
		m.bracket()
	case round < cmaRounds:
		m.evolve(round)
		m.slide(simplexSize)
	default:
		m.slide(simplexAlone)
	}
	return m.best, m.best.holds(), m.r.ctx.Err()
}

// bracket scans one parameter and divides the bracket round the best point by golden section.
func (m *master[C]) bracket() {
	for i := range scanPoints + 1 {
		m.value([]float64{float64(i) / scanPoints})
	}
	lo, hi := m.best.u[0]-1.0/scanPoints, m.best.u[0]+1.0/scanPoints
	ratio := (math.Sqrt(5) - 1) / 2
	for range bracketDivision {
		a, b := hi-ratio*(hi-lo), lo+ratio*(hi-lo)
		if m.value([]float64{a}) <= m.value([]float64{b}) {
			hi = b
		} else {
			lo = a
		}
	}
}

// evolve runs CMA-ES from the best point so far. How it ends does not matter, since the best point evaluated counts.
func (m *master[C]) evolve(round int) {
	dim := len(m.free)
	problem := gopt.Problem{Func: m.guarded, Status: m.status}
	// The Cholesky factor, not the step size, sets the spread of gonum's first population.
	spread := mat.NewSymDense(dim, nil)
	for i := range dim {
		spread.SetSym(i, i, cmaSpread*cmaSpread)
	}
	var factor mat.Cholesky
	factor.Factorize(spread)
	_, _ = gopt.Minimize(problem, slices.Clone(m.best.u), &gopt.Settings{
		MajorIterations: cmaIterations, Concurrent: m.r.s.Workers,
		Converger: &gopt.FunctionConverge{Absolute: cmaGain, Iterations: cmaStall},
	}, &gopt.CmaEsChol{
		InitStepSize: 1, InitCholesky: &factor, Population: cmaPopulation(dim),
		Src: rand.NewPCG(m.r.s.Seed, uint64(round)),
	})
	m.caught.rethrow()
}

// slide runs Nelder and Mead's method from the best point so far.
func (m *master[C]) slide(size float64) {
	problem := gopt.Problem{Func: m.guarded, Status: m.status}
	_, _ = gopt.Minimize(problem, slices.Clone(m.best.u), &gopt.Settings{
		MajorIterations: simplexMoves,
		Converger:       &gopt.FunctionConverge{Absolute: simplexGain, Iterations: simplexStall},
	}, &gopt.NelderMead{SimplexSize: size})
	m.caught.rethrow()
}

// status stops gonum when the context has ended or a callback has panicked.
func (m *master[C]) status() (gopt.Status, error) {
	if m.caught.tripped.Load() || m.r.ctx.Err() != nil {
		return gopt.Failure, m.r.ctx.Err()
	}
	return gopt.NotTerminated, nil
}

// guarded is value for gonum's goroutines, where a panic could not reach the caller.
func (m *master[C]) guarded(u []float64) float64 {
	value := math.MaxFloat64
	m.caught.do(func() { value = m.value(u) })
	return value
}

// value evaluates the point of the unit box nearest to u, keeps it if it is the best so far, and returns its value plus
// the squared distance to u.
func (m *master[C]) value(u []float64) float64 {
	if m.r.ctx.Err() != nil {
		return math.MaxFloat64
	}
	inside := make([]float64, len(u))
	outside := 0.0
	for i := range u {
		inside[i] = min(1, max(0, u[i]))
		outside += (u[i] - inside[i]) * (u[i] - inside[i])
	}
	t := m.evaluate(inside)
	m.mu.Lock()
	if compareTrials(t, m.best) < 0 {
		m.best = t
	}
	m.mu.Unlock()
	return t.value + outside
}

func (m *master[C]) evaluate(u []float64) trial {
	x := m.at(u)
	cost, _, ok := m.r.p.Cost(x)
	if !ok || !finite(cost) {
		away := 0.0
		for i := range u {
			away += (u[i] - m.home[i]) * (u[i] - m.home[i])
		}
		return trial{value: forbiddenBase + away, cost: math.NaN(), u: u}
	}
	short := m.shortfall(x)
	if short > 0 {
		return trial{value: min(shortBase+short, forbiddenBase-1), cost: math.NaN(), u: u}
	}
	return trial{value: min((cost-m.costMin)/m.costRange, shortBase-1), cost: cost, u: u}
}

// shortfall returns by how much the lowest pool margin misses the allowance, or 0.
func (m *master[C]) shortfall(x []float64) float64 {
	d := m.r.open(x)
	defer d.Close()
	short := 0.0
	for k := range m.r.pool {
		if margin := d.Margin(&m.r.pool[k]); m.asked-margin > short {
			short = m.asked - margin
		}
	}
	m.r.margins.Add(int64(len(m.r.pool)))
	return short
}
