// Package engine holds the editions of a workspace, runs the rules on them,
// proves candidate rewrites and applies the preferred ones.
//
// Goals. One engine under two drivers, the editor and the batch command: the
// same bytes give the same findings, in the same order, on any number of
// workers. An Edition is an immutable state of the workspace (open texts over
// the disk, manifests and conventions included), so whoever holds one never
// sees a half-applied change. Trees are made when first asked for and once;
// versions nobody asked for are never parsed. One rule that breaks down never
// hides what the others say.
//
// What it does not do. It computes no statistic (package evidence does), knows
// no candidate (package procedure does), words no result (package present
// does) and knows no protocol. It remembers no evidence: evidence is
// remembered by content one layer below, so that judging an unchanged request
// again costs only the running of the rules, with places from the new text.
//
// Why rules see only an inquiry. A rule that opens no file and knows no clock
// can be run on an unsaved text, on a candidate that stands nowhere, and
// again on remembered evidence, with the same answer.
package engine
