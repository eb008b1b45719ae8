package stats

import "fmt"

// Reason says why a statistic does not exist for the given data.
type Reason string

// The reasons, in the words that a person reads.
const (
	TooShort          Reason = "too short"
	Constant          Reason = "constant"
	NotFinite         Reason = "not finite"
	Singular          Reason = "collinear"
	NotConverged      Reason = "not converged"
	TooFewIndependent Reason = "too few independent values"
)

// Undefined is the error of every statistic that could not be computed.
type Undefined struct {
	What   string // the statistic or the series concerned
	Reason Reason
	N      int    // values there were
	Need   int    // values needed, 0 when that is not the trouble
	Detail string // one more fact with its number, or empty
}

func (u *Undefined) Error() string {
	s := fmt.Sprintf("%s: %s", u.What, u.Reason)
	if u.Need > 0 {
		s += fmt.Sprintf(" (%d values, %d needed)", u.N, u.Need)
	}
	if u.Detail != "" {
		s += ": " + u.Detail
	}
	return s
}
