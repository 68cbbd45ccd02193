// Package refdata holds published numbers: embedded tables, each with its
// source and how sure it is, and typed look-ups that return that source.
//
// A table is one file tables/NAME.csv. Its '#' header states, in this order,
// title, standard, edition, table, units, how (obtained) and confidence; what
// else there is to say follows as notes. To add a table, add such a file: it is
// found, checked and listed by itself.
//
// How a value was obtained is transcribed (copied from print, a reprint
// included), recalled (from memory), computed (by the formula named) or common
// practice. Confidence is one of
//
//	high             confirmed by a second source, by the standard's formula or by arithmetic
//	medium-high      recalled, and confirmed by arithmetic or a formula; or read once
//	medium           recalled and plausible, not confirmed
//	medium-low       known to vary between sources: show it as approximate
//	common practice  no standard behind it, and never presented as one
//
// or "by row", where a column of that name says it.
//
// Look-ups that take a name do not mind case, spaces or punctuation. Lengths
// are in mm unless a name or comment says otherwise.
package refdata
