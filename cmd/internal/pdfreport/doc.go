// Package pdfreport makes report.pdf, what a designer hands to a checker: the inputs as understood, the ground and water model, the slope as
// it is, every option with its section, answers and slice table, and what the whole rests on. It is made from result.json alone.
//
// Text stands on upright A4 pages; sections, influence lines and slice tables on A3 pages across, which fold out. All is drawn in vectors with
// the fonts embedded, so that it can be searched. A report is laid out first, as pages of marks, and drawn then, so that the contents and the
// number of pages are known and a test can look at where texts stand. Nothing in it depends on the day: the same result gives the same bytes.
//
// Factors of safety are rounded down, required factors and quantities up. A number that did not converge is not shown. Lengths on a page are
// points of 1/72 inch, counted from the upper left corner.
package pdfreport
