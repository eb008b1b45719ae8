// Package evidence holds what is known of the series, the pairs and the fit
// of one request: computed when somebody asks, remembered by content.
//
// Goals. One computation per question however many ask it; the same answer
// for the same values whatever they are called and wherever they stand; an
// answer that says why when there is none. A Case is what one request may
// know: its frames (as measured, as the verdict sees them, as they are used),
// a Profile of each series, the correlation of each pair, the fit.
//
// What it does not do. It judges nothing and words nothing: rules and package
// result do. It reads no document. It keeps no name and no place, so that a
// series that is renamed or a request that is moved keeps its evidence.
//
// Why by content. The same pair of series stands in many requests, and every
// candidate rewrite of a request shares its series with it: keyed by the
// digest of the values and of the options that bear on the number, a proof
// costs only what is new in it.
package evidence
