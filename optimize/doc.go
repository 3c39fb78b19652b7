// Package optimize finds the least-cost design on a lattice of buildable sizes subject to "margin >= allowance for
// every cut", where the cuts are infinitely many: a semi-infinite programme
//
//	min cost(x)  over x in a lattice  such that  margin(x, c) >= allowance  for every cut c.
//
// The package knows nothing of what a design or a cut is. It needs a cost that is cheap to ask (Problem.Cost), the
// margin of one design at one cut (Design.Margin), and a search of one design for the cuts with the lowest margins
// (Design.Search). Margins may be non-smooth, discontinuous and not monotone in x.
//
// # Method
//
//  1. Exchange (Blankenship and Falk, Infinitely constrained optimization problems, J. Optim. Theory Appl. 19, 1976).
//     The master problem asks for the margin on a pool of known cuts only and takes x as continuous; gonum's optimize
//     solves it approximately. A full search near its answer adds the violating cuts to the pool, and so on until the
//     answer passes or its share of Settings.FullSearches is spent. This step only fills the pool. Its last cost is
//     Result.ContinuousEstimate: an estimate, never a bound.
//  2. Walk. Every design that geometry allows is visited in ascending (cost, tie, lattice index). One pool cut with a
//     margin below the allowance rejects it and is kept as its witness. What no pool cut rejects is searched in full;
//     what the search rejects adds the violating cuts it found to the pool (Effort.ToReject lets it end at the first that
//     are quick to find; what it does not reject it has looked at in full); what passes is audited (another sampler, another
//     seed, finer), and a failed audit is treated like a failed search. The first design to pass both is the answer.
//     The margin of one design is never inferred from that of another.
//  3. When no design passes, the design with the greatest margin is looked for, best bound first: see Result.Best.
//
// # Rejecting and accepting
//
// A search of finitely many cuts finds a lowest margin that is too high, if it is wrong. A design is therefore accepted
// only at Settings.Allowance or above, and rejected below it, by the same number: with a positive allowance a design
// with a margin between zero and the allowance counts as falling short. For such a weak rejection the rest of the pool is
// tried as well and the lowest margin becomes the witness, so that most witnesses lie below zero; the first
// margin below zero ends the trial.
//
// A margin of +Inf says that the cut misses the design. A NaN margin is no information: it neither rejects nor passes.
// A Found that is Unresolved (or NaN), and a search that finds nothing at all, leave the design unresolved unless another cut rejects it: it
// is not accepted, the walk goes on, and Result.Unresolved counts it.
//
// # What the result promises
//
// Optimal means: least on this lattice; every cheaper design that geometry allows has a witness in Result.Lattice, save
// those counted in Result.Unresolved; and no cut below the allowance was found at the answer in one search and one audit.
// It does not mean that no such cut exists, nor that no better design lies between the lattice points. Equal cost is
// broken by tie, then by lattice index.
//
// The same problem, settings and seed give the same result for any number of workers, if the callbacks are
// functions of their arguments alone. Searches run one at a time: a Search that wants several cores takes them itself.
//
// A panic in a callback reaches the caller of Minimize; from another goroutine it arrives as text with that goroutine's stack.
package optimize
