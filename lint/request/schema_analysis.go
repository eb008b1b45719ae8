package request

import "slices"

var analysisKeys = []Key{
	{Table: "analysis", Name: "title", Types: Text, Meaning: "What the analysis is about, in one line.", Example: `title = "What drives eelgrass decline"`},
	{Table: "analysis", Name: "manifests", Types: Text | List, Form: Path, Default: "the manifests in the same folder, else in the nearest folder above that has some", Meaning: "The manifests whose series the requests name.", Example: `manifests = ["../data/estuary.series.toml"]`},
	{Table: "analysis", Name: "correlation", Types: TableList, Sub: "correlation", Meaning: "A request: how closely series change together.", Example: `correlation = [{ between = ["eelgrass", "boats"] }]`},
	{Table: "analysis", Name: "regression", Types: TableList, Sub: "regression", Meaning: "A request: how a response changes with its predictors.", Example: `regression = [{ response = "eelgrass", predictors = ["nitrate"] }]`},
}

// The words of requests; conventions accept or refuse some of them.
var (
	coefficientWords = []string{"pearson", "spearman", "kendall"}
	estimatorWords   = []string{"ols", "gls"}
	aggregateWords   = []string{"mean", "sum", "median", "last", "maximum"}
	transformWords   = []string{Log, Anomalies, Detrended, FirstDifferences, SeasonalDifferences, RatesOfChange,
		Increments, Prewhitened, Standardized, "differences(2)", "moving-mean(3)"}
	onWords      = append([]string{Levels}, transformWords...)
	processWords = []string{"independent", "ar(1)", "ar(2)", "arma(1,1)", "car(1)", "exponential", "gaussian", "spherical",
		"nugget+exponential", "nugget+gaussian", "nugget+spherical"}
)

var correlationKeys = slices.Concat(purpose("correlation"), []Key{
	{Table: "correlation", Name: "between", Types: Text | List, Form: SeriesName, Required: true, Meaning: "The series that are correlated, two or more; every pair is a result.", Example: `between = ["eelgrass", "boats"]`},
	{Table: "correlation", Name: "given", Types: Text | List, Form: SeriesName, Default: "none", Meaning: "The controlled series of a partial correlation.", Example: `given = ["nitrate"]`},
	{Table: "correlation", Name: "remove-from", Types: Text, Form: Words, Values: []string{"both", "first", "second"}, Default: `"both"`, Meaning: "Where the controlled series are removed: from both (partial), or from the first or second alone (semipartial).", Example: `remove-from = "first"`},
	{Table: "correlation", Name: "coefficient", Types: Text, Form: Words, Values: coefficientWords, Default: `"pearson"`, Meaning: "The coefficient: Pearson's r, Spearman's rho or Kendall's tau.", Example: `coefficient = "spearman"`},
}, transforming("correlation"), []Key{
	{Table: "correlation", Name: "inference", Types: Text, Form: Words, Values: []string{"usual", "effective-n", "surrogates", "modified-t"}, Default: `"usual"`, Meaning: "How p and interval are found: as for independent values, by the effective n of autocorrelated ones, by surrogate series, or by the modified t-test for sites in the plane.", Example: `inference = "effective-n"`},
	{Table: "correlation", Name: "replicates", Types: Integer, Bounds: &Bounds{Min: 100, Max: 100000}, Default: "2000", Meaning: "The number of surrogate pairs.", Example: `replicates = 5000`},
	{Table: "correlation", Name: "lag", Types: Integer, Bounds: &Bounds{Min: -100000, Max: 100000}, Default: "0", Meaning: "The steps by which the second series trails the first.", Example: `lag = 2`},
	{Table: "correlation", Name: "lags", Types: Table, Sub: "lags", Default: "none", Meaning: "A window of lags to scan, ends included.", Example: `lags = { from = -6, to = 6 }`},
}, sampling("correlation"))

var regressionKeys = slices.Concat(purpose("regression"), []Key{
	{Table: "regression", Name: "response", Types: Text, Form: SeriesName, Required: true, Meaning: "The series that is explained.", Example: `response = "eelgrass"`},
	{Table: "regression", Name: "predictors", Types: Text | Table | List, Form: SeriesName, Sub: "predictor", Required: true, Meaning: "The series that explain it, each by its name or with a lag.", Example: `predictors = ["nitrate", { series = "rain", lag = 1 }]`},
}, transforming("regression"), []Key{
	{Table: "regression", Name: "estimator", Types: Text, Form: Words, Values: estimatorWords, Default: "ols; gls if errors is given", Meaning: "Ordinary or generalized least squares.", Example: `estimator = "gls"`},
	{Table: "regression", Name: "errors", Types: Text, Form: ErrorsOf, Values: processWords, Default: "independent for ols, ar(1) for gls", Meaning: "The process of the errors: ar(p), arma(p,q), car(1) for uneven steps, or a covariance that decays with distance, with a nugget or without.", Example: `errors = "ar(2)"`},
	{Table: "regression", Name: "likelihood", Types: Text, Form: Words, Values: []string{"reml", "ml"}, Default: `"reml"`, Meaning: "Restricted or full maximum likelihood for the error process.", Example: `likelihood = "ml"`},
	{Table: "regression", Name: "standard-errors", Types: Text, Form: Words, Values: []string{"usual", "effective-n", "hac"}, Default: `"usual"`, Meaning: "How standard errors are found: as for independent errors, by effective n, or consistent under heteroskedasticity and autocorrelation.", Example: `standard-errors = "hac"`},
	{Table: "regression", Name: "trend", Types: Boolean, Default: "false", Meaning: "Whether a linear term along the axis is fitted too.", Example: `trend = true`},
	{Table: "regression", Name: "seasonal-terms", Types: Boolean, Default: "false", Meaning: "Whether a term for each place in the season is fitted too.", Example: `seasonal-terms = true`},
	{Table: "regression", Name: "form", Types: Text, Form: Words, Values: []string{"static", "dynamic", "error-correction"}, Default: `"static"`, Meaning: "Static, dynamic (lags of response and predictors), or error-correction form.", Example: `form = "dynamic"`},
}, sampling("regression"))

func purpose(table string) []Key {
	return []Key{
		{Table: table, Name: "name", Types: Text, Form: Name, Default: "made of the series' names", Meaning: "The request's name, unique in the file.", Example: `name = "eelgrass-boats-1970"`},
		{Table: table, Name: "question", Types: Text, Meaning: "What the request is to answer, in a sentence.", Example: `question = "Do eelgrass cover and moored boats change together?"`},
		{Table: table, Name: "aim", Types: Text, Form: Words, Values: []string{"association", "effect", "prediction"}, Default: "unstated", Meaning: "Mutual association, the effect of one series on another, or prediction.", Example: `aim = "association"`},
		{Table: table, Name: "expected", Types: Text, Form: Words, Values: []string{"positive", "negative", "open"}, Default: "unstated", Meaning: "The sign that was expected before looking; it never makes a test one-sided.", Example: `expected = "negative"`},
		{Table: table, Name: "planned", Types: Boolean, Default: "unstated", Meaning: "Whether the request was planned before the data were seen; false is exploratory.", Example: `planned = true`},
		{Table: table, Name: "time-scale", Types: Text | Number, Form: DurationOrSize, Default: "unstated", Meaning: "The slowest change that the question is about.", Example: `time-scale = "P10Y"`},
	}
}

func transforming(table string) []Key {
	return []Key{
		{Table: table, Name: "on", Types: Text | List, Form: TransformName, Values: onWords, Default: `"levels"`, Meaning: "The levels, or the transforms that are taken of every series, in their order.", Example: `on = "first-differences"`},
		{Table: table, Name: "on-each", Types: Table, Sub: "on-each", Default: "none", Meaning: "The transforms of one series, taken before those of `on`.", Example: `on-each = { eelgrass = ["log"] }`},
	}
}

func sampling(table string) []Key {
	return []Key{
		{Table: table, Name: "every", Types: Text | Number, Form: DurationOrSize, Default: "the common step", Meaning: "A coarser step to work at.", Example: `every = "P1Y"`},
		{Table: table, Name: "aggregate", Types: Text, Form: Words, Values: aggregateWords, Default: "by support: mean of instants and means, sum of sums", Meaning: "How the values of a coarser step are brought together.", Example: `aggregate = "median"`},
		{Table: table, Name: "least-share", Types: Number, Bounds: &Bounds{Min: 0, Max: 1, Open: true}, Default: "0.8", Meaning: "The share of a period's values that must be there.", Example: `least-share = 0.5`},
		{Table: table, Name: "year-starts", Types: Text, Form: MonthDay, Default: `"01-01"`, Meaning: "The month and day on which a year begins, as for water years.", Example: `year-starts = "10-01"`},
		{Table: table, Name: "tolerance", Types: Text | Number, Form: DurationOrSize, Default: "0", Meaning: "Positions this close count as the same.", Example: `tolerance = "P1D"`},
		{Table: table, Name: "grid", Types: Table, Sub: "grid", Default: "none", Meaning: "Interpolation to an even grid; only when asked for, and always told.", Example: `grid = { step = 0.5, by = "linear" }`},
		{Table: table, Name: "from", Types: Text | Number | Date, Form: Position, Default: "the first position", Meaning: "Where the part of the record that is used begins, inclusive.", Example: `from = "1970"`},
		{Table: table, Name: "until", Types: Text | Number | Date, Form: Position, Default: "the last position", Meaning: "Where the part of the record that is used ends, inclusive; a year is the whole year.", Example: `until = "2020"`},
		{Table: table, Name: "groups", Types: Text | Number | List, Form: GroupsOf, Values: []string{"within", "each"}, Default: `"within"`, Meaning: "Transforms within each group and one result (within), one result a group (each), or the groups to use.", Example: `groups = "each"`},
		{Table: table, Name: "deviation", Types: TableList, Sub: "deviation", Default: "none", Meaning: "A documented deviation from the conventions (ISO/IEC 17025:2017, 7.2.1.7).", Example: `deviation = [{ from = "short-record", reason = "pilot series" }]`},
	}
}

var onEachKeys = []Key{
	{Table: "on-each", Name: Any, Types: Text | List, Form: TransformName, Values: onWords, Meaning: "The transforms of the series of that name.", Example: `eelgrass = ["log"]`},
}

var lagsKeys = []Key{
	{Table: "lags", Name: "from", Types: Integer, Bounds: &Bounds{Min: -100000, Max: 100000}, Required: true, Meaning: "The first lag that is looked at.", Example: `from = -6`},
	{Table: "lags", Name: "to", Types: Integer, Bounds: &Bounds{Min: -100000, Max: 100000}, Required: true, Meaning: "The last lag that is looked at.", Example: `to = 6`},
}

var gridKeys = []Key{
	{Table: "grid", Name: "step", Types: Number, Bounds: &Bounds{Min: 0, Max: 1e300, Open: true}, Required: true, Meaning: "The spacing of the grid, in the axis' unit.", Example: `step = 0.5`},
	{Table: "grid", Name: "by", Types: Text, Form: Words, Values: []string{"linear"}, Default: `"linear"`, Meaning: "The interpolation.", Example: `by = "linear"`},
}

var predictorKeys = []Key{
	{Table: "predictor", Name: "series", Types: Text, Form: SeriesName, Required: true, Meaning: "The series.", Example: `series = "rain"`},
	{Table: "predictor", Name: "lag", Types: Integer, Bounds: &Bounds{Min: -100000, Max: 100000}, Default: "0", Meaning: "The steps by which the response trails it.", Example: `lag = 1`},
}

var deviationKeys = []Key{
	{Table: "deviation", Name: "from", Types: Text, Form: RuleName, Required: true, Meaning: "The rule that is deviated from.", Example: `from = "short-record"`},
	{Table: "deviation", Name: "reason", Types: Text, Form: Name, Required: true, Meaning: "Why.", Example: `reason = "pilot series, see the log of 3 May"`},
	{Table: "deviation", Name: "by", Types: Text, Form: Name, Meaning: "Who decided it.", Example: `by = "RQ"`},
	{Table: "deviation", Name: "accepted-by", Types: Text, Form: Name, Meaning: "Who accepted it.", Example: `accepted-by = "TM"`},
	{Table: "deviation", Name: "until", Types: Text | Date, Form: Day, Meaning: "The last day on which it holds.", Example: `until = 2027-06-30`},
	{Table: "deviation", Name: "data", Types: Text, Form: DataDigest, Meaning: "The digest of the data it was given for; it ends when they change.", Example: `data = "sha256:2f5d"`},
	{Table: "deviation", Name: "pair", Types: Text | List, Form: SeriesName, Default: "every pair", Meaning: "The one pair of series that it is about.", Example: `pair = ["eelgrass", "boats"]`},
}
