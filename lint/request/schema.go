package request

import "slices"

// Types is the set of TOML types that a key takes.
type Types uint16

// The types. List means that a list of the others serves too; one value and
// the list of it mean the same.
const (
	Text Types = 1 << iota
	Integer
	Number // floats and integers, finite
	Boolean
	Date // local dates, and date-times where a position is meant
	List
	Table       // one table, inline or with a header
	NamedTables // tables by name: [record.NAME]
	TableList   // an array of tables: [[correlation]]
)

// Form is what the text of a value has to look like.
type Form uint8

// The forms.
const (
	Free           Form = iota
	Words               // one of Key.Values
	Name                // any text that is not empty
	Path                // a file, relative to the document, with /
	Pattern             // paths with * and **
	Character           // a single character, or empty
	SeriesName          // a series of a manifest in reach
	RecordName          // a record of this manifest
	RuleName            // a rule of the catalogue
	Duration            // an ISO 8601 duration
	DurationOrSize      // an ISO 8601 duration, or a number in the axis' unit
	SeasonLength        // a duration, a number of steps, or false
	TransformName       // a transform, or levels
	ErrorsOf            // a process of the errors
	MonthDay            // MM-DD
	Day                 // YYYY-MM-DD
	Position            // a number, date or text in the axis' unit
	DataDigest          // sha256:…
	KeyPath             // a dotted key of the conventions
	GroupsOf            // within, each, or names of groups
)

// Bounds limits a number. Both ends belong to it unless Open.
type Bounds struct {
	Min, Max float64
	Open     bool // Min itself is not allowed
}

// Key is one key of one table: everything that checking, completion, hover
// and the reference pages say about it.
type Key struct {
	Table    string // schema name of the table it stands in
	Name     string
	Types    Types
	Form     Form
	Values   []string // allowed words; other forms may add to them
	Bounds   *Bounds  // of a number
	Sub      string   // schema name of the table that is its value
	Default  string   // as written, or what is done in words; "": none
	Required bool
	Meaning  string // one sentence
	Example  string // a whole statement
}

// Any is the name of the one key of a table whose keys are free: series,
// rules or thresholds by name.
const Any = "*"

// Schema is every key of every table, in the order of the reference pages.
var Schema = slices.Concat(
	manifestKeys, recordKeys, alongKeys, sitesKeys, defaultsKeys, seriesKeys,
	analysisKeys, correlationKeys, regressionKeys, onEachKeys, lagsKeys, gridKeys, predictorKeys, deviationKeys,
	conventionsKeys, reviewKeys, leastNKeys, askedForKeys, acceptedKeys, weightKeys, limitsKeys, testKeys, adfKeys, kpssKeys,
)

var (
	schemaTables = tablesOf(Schema)
	schemaIndex  = indexOf(Schema)
)

func tablesOf(keys []Key) map[string][]Key {
	tables := map[string][]Key{}
	for _, k := range keys {
		tables[k.Table] = append(tables[k.Table], k)
	}
	return tables
}

func indexOf(keys []Key) map[[2]string]Key {
	index := map[[2]string]Key{}
	for _, k := range keys {
		index[[2]string{k.Table, k.Name}] = k
	}
	return index
}

// SchemaOf returns the keys that may stand in a table, in their order; nil
// for a table that is not known. The tables are manifest, analysis and
// conventions (the roots), record, along, at, defaults, series, correlation,
// regression, on-each, lags, grid, predictor, deviation, review, least-n,
// asked-for, accepted-methods, weight, limits, test-settings, adf and kpss.
func SchemaOf(table string) []Key { return slices.Clone(schemaTables[table]) }

// Lookup returns one key of a table; in a table with free keys, the key that
// stands for any.
func Lookup(table, key string) (Key, bool) {
	if k, ok := schemaIndex[[2]string{table, key}]; ok {
		return k, true
	}
	k, ok := schemaIndex[[2]string{table, Any}]
	return k, ok
}

// TableAt returns the schema name of the table at a path of keys from the
// root of a document: record, moorings, along gives along. ok is false where
// no table may stand.
func TableAt(doc Doc, path ...string) (table string, ok bool) {
	table = doc.String()
	for i := 0; i < len(path); i++ {
		k, found := Lookup(table, path[i])
		if !found || k.Sub == "" {
			return "", false
		}
		if k.Types&NamedTables != 0 {
			i++ // the name itself
			if i == len(path) {
				return "", false
			}
		}
		table = k.Sub
	}
	return table, table != ""
}

// heading returns how a table is written in messages.
func heading(table string) string {
	switch table {
	case "manifest":
		return "a manifest"
	case "analysis":
		return "an analysis"
	case "conventions":
		return "conventions"
	case "record", "series":
		return "[" + table + ".…]"
	case "correlation", "regression":
		return "[[" + table + "]]"
	case "deviation":
		return "a deviation"
	case "predictor":
		return "a predictor"
	case "review", "asked-for", "accepted-methods", "weight", "limits", "test-settings":
		return "[" + table + "]"
	}
	return table
}

func names(keys ...[]Key) []string {
	var all []string
	for _, k := range slices.Concat(keys...) {
		if !slices.Contains(all, k.Name) {
			all = append(all, k.Name)
		}
	}
	return all
}
