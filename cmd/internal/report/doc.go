// Package report turns the answer to a job into what people and programs read: result.json with its witnesses, and the tables
// printed in a terminal.
//
// [New] lays a result out as a [File]; everything printed is printed from a File, so that nothing stands on the screen that is not
// in result.json too. JSON numbers are unrounded; on the screen a factor of safety is rounded down and a quantity up.
//
// Coordinates are the case file's own, m; forces kN, stresses kPa, angles degrees, quantities m3 per metre run unless a name says
// otherwise. The bytes written depend on the job, the settings and the seed alone: no times, no number of workers.
package report
