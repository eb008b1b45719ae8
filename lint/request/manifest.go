package request

import "lagwise/lint/document"

// Manifest is the typed content of NAME.series.toml.
type Manifest struct {
	File    string // relative to the root
	Name    string // NAME
	Title   string
	Records []*Record
	Series  []*Series
	Tree    *document.Tree
}

// Record is one data file and how to read it.
type Record struct {
	Name        string
	File        string // as written
	Delimiter   string // "": inferred
	Decimal     string // "" is "."
	Thousands   string
	Encoding    string // "" is utf-8, byte order mark honoured
	Comment     string
	HeaderRows  int // default 1
	Sheet       string
	Range       string
	Table       string
	Query       string
	Missing     []string // added to the built-in codes
	MissingOnly []string // replaces them when not nil
	DefaultUnit string
	Defaults    map[string]string
	Along       *Along // nil: found
	At          *Sites
	Group       string
	Deviations  []Deviation
	Header      document.Span
	Keys        map[string]Place
}

// AxisKind says what positions along an axis are.
type AxisKind string

// The kinds of axis.
const (
	Time     AxisKind = "time"
	Age      AxisKind = "age"
	Depth    AxisKind = "depth"
	Distance AxisKind = "distance"
	Sequence AxisKind = "sequence"
)

// Along is the declared axis of a record.
type Along struct {
	Column string
	Kind   AxisKind
	Step   string // duration or number as written; "": measured
	Unit   string
	Format string
	Before *float64
	Keys   map[string]Place
}

// Sites says which columns hold the position of sites in the plane.
type Sites struct{ X, Y, Unit string }

// Series is one declared series.
type Series struct {
	Name           string
	Record         string // "": the only record
	Column         string // "": the series' name
	Title          string
	Unit           string
	Measures       string // amount, count, proportion, flux, index, running-total
	Support        string // instant, mean, sum
	Season         string // duration, number of steps, "false", or "" inferred
	Smoothed       string
	DerivedFrom    []string
	DetectionLimit *float64
	MeasurementSD  *float64
	AgeModel       string
	MethodChanged  []string
	Implicit       bool // made from a numeric column of a manifest without [series.…]
	Deviations     []Deviation
	Header         document.Span
	Keys           map[string]Place
}
