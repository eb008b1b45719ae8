// Package editors holds set-ups of real editors. Its tests, behind the build
// tag editors, start each of them on the built program.
package editors
