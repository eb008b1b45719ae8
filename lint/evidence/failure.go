package evidence

import (
	"context"
	"errors"

	"lagwise/stats"
)

// passing reports whether an error says nothing of the data: the computation
// was cancelled or broke down.
func passing(err error) bool {
	var broken *Broken
	return errors.Is(err, context.Canceled) || errors.Is(err, context.DeadlineExceeded) || errors.As(err, &broken)
}

// IsConstant reports whether an error says that a series does not vary.
func IsConstant(err error) bool { return hasReason(err, stats.Constant) }

// IsTooFewIndependent reports whether an error says that the effective n is
// too small for any statement.
func IsTooFewIndependent(err error) bool { return hasReason(err, stats.TooFewIndependent) }

// IsTooShort reports whether an error says that there are too few values.
func IsTooShort(err error) bool { return hasReason(err, stats.TooShort) }

func hasReason(err error, r stats.Reason) bool {
	var u *stats.Undefined
	return errors.As(err, &u) && u.Reason == r
}
