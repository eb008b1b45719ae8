// Package document reads TOML as people type it.
//
// Goals. Parse always returns a tree together with its problems: a broken
// statement costs only itself, and every other key, value, header and comment
// keeps its byte range and its value. Two entries of one array of tables are
// two nodes, known by their place and never by a dotted name. Edits are byte
// ranges of a known text; no byte outside of them changes. Lines converts
// between bytes and the lines and columns of editors, in one place.
//
// How. The ranges come from go-toml's unstable parser; after an error it is
// started again at the next line that begins a statement. BurntSushi/toml says
// what is valid, and words what is wrong where this package has no plainer
// words. Rules that need the whole document (a key or table defined twice) are
// checked while the tree is built, so that every breach is told at its place.
//
// Limits. Time is linear in the text, also when every line is broken: what
// recovery reads again is bounded by a budget. Arrays and inline tables nested
// deeper than MaxNesting are a problem, not a value. A limit on the size of a
// text is the caller's.
//
// What it does not do. It knows no schema: which keys may stand where is
// lint/request's. It never re-formats. It reads TOML 1.0 and 1.1 and does not
// tell them apart.
package document
