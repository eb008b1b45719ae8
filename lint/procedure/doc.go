// Package procedure is the decision procedure as one readable piece of code:
// what a request asks, what its series look like, and, from these alone, the
// candidate requests in the order in which they are preferred.
//
// It proposes; it proves nothing. The engine computes each candidate, asks
// the rules about it and keeps the order. The result of a request (the
// coefficient, its sign, its p-value) never enters: Facts holds none.
package procedure
