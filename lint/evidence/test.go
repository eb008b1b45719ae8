package evidence

// Limit says that a p-value is known only as a bound: the end of a published
// table. The empty value is exact.
type PBound string

// The bounds.
const (
	AtMost  PBound = "at-most"
	AtLeast PBound = "at-least"
)

// Test is one test with all that a reader needs to repeat it. Pointers are
// nil where the test has no such number; Error says why it has none at all.
type Test struct {
	Test      string
	Null      string
	Of        string // levels, first differences, …
	Terms     string // none, constant, constant and trend
	Lags      *int
	Bandwidth *int
	Statistic *float64
	P         *float64
	PBound    PBound
	N         int
	Critical  []Critical
	Error     string
}

// Critical is one critical value.
type Critical struct{ Level, Value float64 }
