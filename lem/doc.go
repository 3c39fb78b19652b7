// Package lem is a plane-strain limit-equilibrium engine: it computes the factor of safety (FS) of a slope on given slip
// surfaces and searches for the slips that govern.
//
// # Conventions
//
// Section coordinates everywhere: x to the right, y up, metres. Forces are kN per metre run, stresses kPa, unit weights
// kN/m3, angles radians. A slope may face either way; mirroring is private to [Model].
//
// # Use
//
// A [Section] holds ground, strata, placed bodies and loads; a [Situation] holds water, drained or undrained soils and
// earthquake coefficient. [Model.Compile] turns both into flat columns once; [Model.FS] then evaluates slips by the million
// without allocating, one [Workspace] per goroutine; [Model.Search] finds the critical slips.
//
// # Methods
//
// Ordinary (Fellenius 1936), Bishop simplified (Bishop 1955), Spencer (Spencer 1967), Morgenstern-Price (Morgenstern and Price
// 1965) with a side-force function, and Janbu simplified (Janbu 1954, 1973) with and without its correction. [GoverningMethods]
// tells which govern; [Reason] lists the rules of admissibility; [Model.Detail] gives the slice table. The factor of safety is defined on
// strength: tau = (c + (sigma - u) tan phi)/F along the whole slip.
//
// # Assumptions and limits
//
// Two dimensions, a rigid sliding body, no deformation, no side friction. A result is only as good as its ground and water
// model. A trial that did not converge has no FS: [Result.F] is NaN unless [Result.Status] is [Converged].
package lem
