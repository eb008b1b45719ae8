package evidence

// Read is what reading the file of one record showed, in the words that the
// rules about data need.
type Read struct {
	Record  string
	File    string // as written in the manifest
	Trouble *Trouble
	Rows    int
	Columns []string // headers as they stand in the file
	// SplitBy is set when the file looks split by another delimiter than
	// the declared one.
	SplitBy string
	Axis    AxisSeen
	Series  []SeriesRead
}

// Trouble says why a record could not be read.
type Trouble struct {
	Kind    TroubleKind
	Column  string // of unknown-column
	Nearest string // of unknown-column, or empty
	Message string // what, where, what to do
}

// TroubleKind names the rule that speaks of a trouble.
type TroubleKind string

// The kinds of trouble, each answered by the rule of the same name.
const (
	UnreadableRecord TroubleKind = "unreadable-record"
	UnknownColumn    TroubleKind = "unknown-column"
	OutsideRoot      TroubleKind = "outside-root"
	ReachedLimit     TroubleKind = "reached-limit"
)

// AxisSeen is the axis as the data show it.
type AxisSeen struct {
	Column        string
	Kind          string // time, age, depth, distance, sequence
	Declared      string // the step as declared, or empty
	Step          string // the step as measured: P1Y, P1M, 0.5
	Even          bool
	Gaps          int
	First, Last   string
	Backward      bool
	Unsorted      bool
	Repeated      int    // positions that stand more than once
	FirstRepeated string // the first of them
	RepeatedLine  int    // its line in the file, from 1
	Unparsed      int    // positions that could not be read
	UnparsedLine  int
	UnparsedText  string
	Ambiguous     bool // 01/02/2003 without a format
}

// SeriesRead is one series of a record as the data show it.
type SeriesRead struct {
	Name, Column   string
	Trouble        *Trouble // the column is not there
	N, Missing     int
	Unparsed       int
	UnparsedLine   int
	UnparsedText   string
	Constant       bool
	Value          float64 // of a constant series
	Suspect        float64 // a repeated extreme like -999 that is not declared
	SuspectCount   int
	Measured       int    // numbers and cells known to lie below a limit
	Censored       int    // of these, known only to lie at or below a limit
	HeaderUnit     string // unit found in the header, or empty
	Unit           string // unit in force, or empty
	DeclaredSeries bool   // stands in the manifest, not made from a header
}
