// Package casefile reads and writes the case file: the YAML file in which an engineer describes a failing slope and what may be
// done about it.
//
// [Parse] fills a remedies.Job. It reads in two steps: the YAML library gives a tree of nodes with their positions; one table of keys
// (see shape) then checks the tree, and [Schema] and docs/case-file.md are made from the same table. Every fault is reported at once,
// each as a [*Fault] with file, line, column, the offending line and what would be right.
//
// In the file lengths are m, unit weights kN/m3, stresses kPa and angles degrees; in the Job angles are radians.
package casefile
