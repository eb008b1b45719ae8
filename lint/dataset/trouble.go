package dataset

import "fmt"

// TroubleKind names the rule that speaks of a trouble.
type TroubleKind string

// The kinds of trouble.
const (
	UnreadableRecord TroubleKind = "unreadable-record"
	UnknownColumn    TroubleKind = "unknown-column"
	OutsideRoot      TroubleKind = "outside-root"
	ReachedLimit     TroubleKind = "reached-limit"
)

// Trouble says why a record or a column could not be read: what, where, and
// what to do.
type Trouble struct {
	Kind    TroubleKind
	Message string
	Column  string // the column concerned, or empty
	Nearest string // of unknown-column: the nearest name there is, or empty
	SplitBy string // the delimiter by which the file looks split although another is used
}

func (t *Trouble) Error() string { return t.Message }

func unreadable(format string, args ...any) *Trouble {
	return &Trouble{Kind: UnreadableRecord, Message: fmt.Sprintf(format, args...)}
}

// Refused says why a path was not opened. It never quotes what the file
// holds.
type Refused struct {
	Kind    TroubleKind // outside-root, unreadable-record or reached-limit
	Message string
}

func (r *Refused) Error() string { return r.Message }

func refuse(kind TroubleKind, format string, args ...any) *Refused {
	return &Refused{Kind: kind, Message: fmt.Sprintf(format, args...)}
}

// Mismatch says that the axes of the series of a request do not meet.
type Mismatch struct {
	Message      string
	A, B         string // the series, or empty
	StepA, StepB string // their steps in words
	Coarser      string // what to write in `every`, or empty
}

func (m *Mismatch) Error() string { return m.Message }

func mismatch(format string, args ...any) *Mismatch {
	return &Mismatch{Message: fmt.Sprintf(format, args...)}
}
