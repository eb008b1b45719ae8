package request

var manifestKeys = []Key{
	{Table: "manifest", Name: "title", Types: Text, Meaning: "What the manifest holds, in one line.", Example: `title = "Aldermere estuary, long records"`},
	{Table: "manifest", Name: "record", Types: NamedTables, Sub: "record", Meaning: "One data file and how to read it, under a name.", Example: "record.moorings.file = \"moorings.csv\""},
	{Table: "manifest", Name: "series", Types: NamedTables, Sub: "series", Default: "one series for every numeric column, named by its header", Meaning: "One measured series, under the name that requests use.", Example: "series.boats.record = \"moorings\""},
}

var recordKeys = []Key{
	{Table: "record", Name: "file", Types: Text, Form: Path, Required: true, Meaning: "The data file, relative to this manifest.", Example: `file = "moorings.csv"`},
	{Table: "record", Name: "delimiter", Types: Text, Form: Character, Default: "inferred from the file, and told", Meaning: "The character between two cells of a line.", Example: `delimiter = ";"`},
	{Table: "record", Name: "decimal", Types: Text, Form: Words, Values: []string{".", ","}, Default: `"."`, Meaning: "The decimal sign; a comma implies another delimiter than a comma.", Example: `decimal = ","`},
	{Table: "record", Name: "thousands", Types: Text, Form: Character, Default: "none", Meaning: "The sign that groups the digits of large numbers.", Example: `thousands = "'"`},
	{Table: "record", Name: "encoding", Types: Text, Form: Words, Values: []string{"utf-8", "utf-16", "latin-1", "windows-1252"}, Default: "utf-8, a byte order mark honoured", Meaning: "The character encoding of the file.", Example: `encoding = "latin-1"`},
	{Table: "record", Name: "comment", Types: Text, Default: "none", Meaning: "Lines that begin with this text are comments.", Example: `comment = "#"`},
	{Table: "record", Name: "header-rows", Types: Integer, Bounds: &Bounds{Min: 0, Max: 1000}, Default: "1", Meaning: "The number of lines above the first row of data.", Example: `header-rows = 2`},
	{Table: "record", Name: "sheet", Types: Text, Form: Name, Default: "the first", Meaning: "The sheet of a workbook.", Example: `sheet = "2020"`},
	{Table: "record", Name: "range", Types: Text, Form: Name, Default: "all of the sheet", Meaning: "The cells of a sheet.", Example: `range = "A3:F200"`},
	{Table: "record", Name: "table", Types: Text, Form: Name, Default: "the only table", Meaning: "The table of a database.", Example: `table = "readings"`},
	{Table: "record", Name: "query", Types: Text, Form: Name, Default: "none", Meaning: "One SELECT that gives the rows, instead of a table.", Example: `query = "SELECT year, boats FROM counts"`},
	{Table: "record", Name: "missing", Types: Text | Number | List, Default: "empty, NA, NaN, null, n.d. and -", Meaning: "Further codes of a missing value; numbers compare as numbers.", Example: `missing = ["-9999"]`},
	{Table: "record", Name: "missing-only", Types: Text | Number | List, Default: "none", Meaning: "The codes of a missing value, replacing the built-in ones.", Example: `missing-only = ["x"]`},
	{Table: "record", Name: "defaults", Types: Table, Sub: "defaults", Default: "none", Meaning: "What holds for every series of the record that does not say otherwise.", Example: `defaults = { unit = "mg/L", support = "mean" }`},
	{Table: "record", Name: "along", Types: Table, Sub: "along", Default: "found, and told", Meaning: "The axis along which the values were measured.", Example: `along = { column = "year", kind = "time", step = "P1Y" }`},
	{Table: "record", Name: "at", Types: Table, Sub: "at", Default: "none", Meaning: "The positions of sites in the plane, instead of an axis.", Example: `at = { x = "easting_km", y = "northing_km", unit = "km" }`},
	{Table: "record", Name: "group", Types: Text, Form: Name, Default: "none", Meaning: "The column that tells several runs of one file apart; nothing is differenced, lagged or aligned across them.", Example: `group = "animal"`},
	{Table: "record", Name: "deviation", Types: TableList, Sub: "deviation", Default: "none", Meaning: "A documented deviation from the conventions, for findings about the record.", Example: `deviation = [{ from = "uneven-steps", reason = "ice in winter" }]`},
}

var alongKeys = []Key{
	{Table: "along", Name: "column", Types: Text, Form: Name, Default: "found, and told", Meaning: "The column that holds the positions.", Example: `column = "year"`},
	{Table: "along", Name: "kind", Types: Text, Form: Words, Values: []string{"time", "age", "depth", "distance", "sequence"}, Default: "found, and told", Meaning: "What a position is; sequence is the order of the rows.", Example: `kind = "depth"`},
	{Table: "along", Name: "step", Types: Text | Number, Form: DurationOrSize, Default: "measured, and told", Meaning: "The spacing of the positions: an ISO 8601 duration for time, a number otherwise.", Example: `step = "P1Y"`},
	{Table: "along", Name: "unit", Types: Text, Form: Name, Default: "none", Meaning: "The unit of the positions, in UCUM.", Example: `unit = "ka"`},
	{Table: "along", Name: "format", Types: Text, Form: Name, Default: "ISO 8601, years, decimal years", Meaning: "How times are written, in POSIX strftime codes.", Example: `format = "%d/%m/%Y"`},
	{Table: "along", Name: "before", Types: Number, Default: "none", Meaning: "The calendar year that ages count back from.", Example: `before = 1950`},
}

var sitesKeys = []Key{
	{Table: "at", Name: "x", Types: Text, Form: Name, Required: true, Meaning: "The column of eastings or longitudes.", Example: `x = "easting_km"`},
	{Table: "at", Name: "y", Types: Text, Form: Name, Required: true, Meaning: "The column of northings or latitudes.", Example: `y = "northing_km"`},
	{Table: "at", Name: "unit", Types: Text, Form: Name, Default: "none", Meaning: "The unit of both; deg means longitude and latitude.", Example: `unit = "km"`},
}

var (
	measuresWords = []string{"amount", "count", "proportion", "flux", "index", "running-total"}
	supportWords  = []string{"instant", "mean", "sum"}
)

var defaultsKeys = describe("defaults")

var seriesKeys = append([]Key{
	{Table: "series", Name: "record", Types: Text, Form: RecordName, Default: "the only record", Meaning: "The record that holds the series.", Example: `record = "moorings"`},
	{Table: "series", Name: "column", Types: Text, Form: Name, Default: "the series' own name", Meaning: "The column of the record.", Example: `column = "boats_moored"`},
	{Table: "series", Name: "title", Types: Text, Meaning: "What was measured, in one line.", Example: `title = "Boats moored on 1 August"`},
}, append(describe("series"),
	Key{Table: "series", Name: "derived-from", Types: Text | List, Form: Name, Default: "none", Meaning: "The series or columns that this one is computed from.", Example: `derived-from = ["landings", "effort"]`},
	Key{Table: "series", Name: "method-changed", Types: Text | Number | Date | List, Form: Position, Default: "none", Meaning: "Declared changes of instrument or method, as positions on the axis.", Example: `method-changed = ["1994-05-01"]`},
	Key{Table: "series", Name: "deviation", Types: TableList, Sub: "deviation", Default: "none", Meaning: "A documented deviation from the conventions, for findings about the series.", Example: `deviation = [{ from = "missing-unit", reason = "an index without one" }]`},
)...)

// describe returns the keys that say what the values of a series are; a
// record may give them for all of its series.
func describe(table string) []Key {
	return []Key{
		{Table: table, Name: "unit", Types: Text, Default: "from a header like no3 (mg/L)", Meaning: "The unit of the values, in UCUM; °C and µg/L are read as Cel and ug/L.", Example: `unit = "{count}"`},
		{Table: table, Name: "measures", Types: Text, Form: Words, Values: measuresWords, Default: `"amount"`, Meaning: "The kind of quantity; a running total is used by its increments.", Example: `measures = "count"`},
		{Table: table, Name: "support", Types: Text, Form: Words, Values: supportWords, Default: `"instant"`, Meaning: "What one value stands for: an instant, or the mean or sum of its period.", Example: `support = "mean"`},
		{Table: table, Name: "season", Types: Text | Integer | Boolean, Form: SeasonLength, Default: "inferred from the step (months 12, quarters 4, hours 24), tested, and told", Meaning: "The length of the season, a duration or a number of steps; false where there is none.", Example: `season = "P1Y"`},
		{Table: table, Name: "smoothed", Types: Text, Form: Name, Default: "none", Meaning: "The smoothing that was done before the values came here.", Example: `smoothed = "5-point moving mean"`},
		{Table: table, Name: "detection-limit", Types: Number, Default: "none", Meaning: "Values at or below are censored.", Example: `detection-limit = 0.05`},
		{Table: table, Name: "measurement-sd", Types: Number, Bounds: &Bounds{Min: 0, Max: 1e300}, Default: "unknown", Meaning: "The standard deviation of one reading.", Example: `measurement-sd = 2.0`},
		{Table: table, Name: "age-model", Types: Text, Form: Name, Default: "none", Meaning: "The age model that dates the values.", Example: `age-model = "A7-2019"`},
	}
}
