// Package dataset turns the data files that a manifest names into columns of
// numbers along an axis, and columns into the aligned, transformed rows that
// a request uses.
//
// Reading is suspicious: a file is opened only below an allowed root, must be
// a regular file, and is bounded in bytes, columns and cells before anything
// is allocated. No message quotes a file that was refused.
//
// Values are honest: what cannot be read as a number is counted and told, not
// guessed; nothing is interpolated unless it is asked for; no difference, lag
// or product crosses a gap or a group. Columns, axes and frames are never
// changed once they are made, so they are shared freely.
package dataset
