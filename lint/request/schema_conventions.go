package request

var severityWords = []string{"error", "warning", "information", "hint"}

var conventionsKeys = []Key{
	{Table: "conventions", Name: "builds-on", Types: Text | List, Form: Path, Default: "none", Meaning: "Conventions that are taken first; what stands here wins, key by key.", Example: `builds-on = ["../lab/estuary.conventions.toml"]`},
	{Table: "conventions", Name: "review", Types: Table, Sub: "review", Meaning: "What a review looks at and when it fails.", Example: `review.alpha = 0.01`},
	{Table: "conventions", Name: "asked-for", Types: Table, Sub: "asked-for", Meaning: "The fields that must be there.", Example: `asked-for.request = ["question", "aim"]`},
	{Table: "conventions", Name: "accepted-methods", Types: Table, Sub: "accepted-methods", Meaning: "The methods that the lab accepts.", Example: `accepted-methods.estimator = ["ols"]`},
	{Table: "conventions", Name: "weight", Types: Table, Sub: "weight", Meaning: "The severity of rules.", Example: `weight.shared-drift = "error"`},
	{Table: "conventions", Name: "limits", Types: Table, Sub: "limits", Meaning: "The thresholds of rules.", Example: `limits.variance-inflation = 10`},
	{Table: "conventions", Name: "test-settings", Types: Table, Sub: "test-settings", Meaning: "The options of tests.", Example: `test-settings.family = "benjamini-hochberg"`},
}

var reviewKeys = []Key{
	{Table: "review", Name: "exclude", Types: Text | List, Form: Pattern, Default: "none", Meaning: "Files that a review passes over.", Example: `exclude = ["archive/**"]`},
	{Table: "review", Name: "final", Types: Text | List, Form: KeyPath, Default: "none", Meaning: "Keys and tables that conventions further down cannot change.", Example: `final = ["weight.shared-drift", "accepted-methods"]`},
	{Table: "review", Name: "hold-at", Types: Text, Form: Words, Values: severityWords, Default: `"warning"`, Meaning: "The severity at which a review fails.", Example: `hold-at = "error"`},
	{Table: "review", Name: "alpha", Types: Number, Bounds: &Bounds{Min: 0.0001, Max: 0.5}, Default: "0.05", Meaning: "The significance level of the judgement.", Example: `alpha = 0.01`},
	{Table: "review", Name: "least-n", Types: Table, Sub: "least-n", Default: "{ correlation = 20, regression = 30 }", Meaning: "The fewest values a result may rest on, after alignment and transform.", Example: `least-n = { correlation = 20, regression = 30 }`},
	{Table: "review", Name: "least-effective-n", Types: Number, Bounds: &Bounds{Min: 0, Max: 1e9}, Default: "6", Meaning: "The fewest effective values a result may rest on.", Example: `least-effective-n = 8`},
}

var leastNKeys = []Key{
	{Table: "least-n", Name: "correlation", Types: Integer, Bounds: &Bounds{Min: 0, Max: 1e9}, Default: "20", Meaning: "The fewest values of a correlation.", Example: `correlation = 25`},
	{Table: "least-n", Name: "regression", Types: Integer, Bounds: &Bounds{Min: 0, Max: 1e9}, Default: "30", Meaning: "The fewest values of a regression.", Example: `regression = 40`},
}

var askedForKeys = []Key{
	{Table: "asked-for", Name: "request", Types: Text | List, Form: Words, Values: names(correlationKeys, regressionKeys), Default: "none", Meaning: "Fields that every request must have.", Example: `request = ["question", "aim"]`},
	{Table: "asked-for", Name: "series", Types: Text | List, Form: Words, Values: names(seriesKeys), Default: "none", Meaning: "Fields that every series must have.", Example: `series = ["unit", "title"]`},
	{Table: "asked-for", Name: "deviation", Types: Text | List, Form: Words, Values: names(deviationKeys), Default: "none", Meaning: "Fields that every deviation must have before it takes effect.", Example: `deviation = ["reason", "by", "until"]`},
	{Table: "asked-for", Name: "deviation-longest", Types: Text, Form: Duration, Default: "none", Meaning: "The longest time that a deviation may hold.", Example: `deviation-longest = "P1Y"`},
}

var acceptedKeys = []Key{
	{Table: "accepted-methods", Name: "coefficient", Types: Text | List, Form: Words, Values: coefficientWords, Default: "all", Meaning: "The coefficients that the lab accepts.", Example: `coefficient = ["pearson", "spearman"]`},
	{Table: "accepted-methods", Name: "estimator", Types: Text | List, Form: Words, Values: estimatorWords, Default: "all", Meaning: "The estimators that the lab accepts.", Example: `estimator = ["ols"]`},
	{Table: "accepted-methods", Name: "on", Types: Text | List, Form: TransformName, Values: onWords, Default: "all", Meaning: "Transforms of which one must be among a request's.", Example: `on = ["first-differences", "prewhitened"]`},
	{Table: "accepted-methods", Name: "always-difference", Types: Boolean, Default: "false", Meaning: "Whether levels are never accepted for correlation.", Example: `always-difference = true`},
}

var weightKeys = []Key{
	{Table: "weight", Name: Any, Types: Text, Form: Words, Values: append([]string{"none"}, severityWords...), Default: "the rule's own", Meaning: "The severity of the rule of that name; none turns it off.", Example: `shared-drift = "error"`},
}

var limitsKeys = []Key{
	{Table: "limits", Name: Any, Types: Number, Default: "the rule's own", Meaning: "The threshold of that name; its rule's page says where it acts.", Example: `variance-inflation = 10`},
}

var testKeys = []Key{
	{Table: "test-settings", Name: "adf", Types: Table, Sub: "adf", Default: `{ lags = "aic" }`, Meaning: "The options of the augmented Dickey-Fuller test.", Example: `adf = { lags = "bic" }`},
	{Table: "test-settings", Name: "kpss", Types: Table, Sub: "kpss", Default: `{ bandwidth = "newey-west" }`, Meaning: "The options of the KPSS test.", Example: `kpss = { bandwidth = 8 }`},
	{Table: "test-settings", Name: "least-n-verdict", Types: Integer, Bounds: &Bounds{Min: 10, Max: 1e6}, Default: "20", Meaning: "The fewest values in the longest run without a gap that a verdict may rest on.", Example: `least-n-verdict = 25`},
	{Table: "test-settings", Name: "family", Types: Text, Form: Words, Values: []string{"holm", "benjamini-hochberg"}, Default: `"holm"`, Meaning: "The adjustment for many tests.", Example: `family = "benjamini-hochberg"`},
}

var adfKeys = []Key{
	{Table: "adf", Name: "lags", Types: Text | Integer, Form: Words, Values: []string{"aic", "bic", "general-to-specific"}, Bounds: &Bounds{Min: 0, Max: 1000}, Default: `"aic"`, Meaning: "How the number of lagged differences is chosen, or the number.", Example: `lags = "bic"`},
}

var kpssKeys = []Key{
	{Table: "kpss", Name: "bandwidth", Types: Text | Integer, Form: Words, Values: []string{"newey-west"}, Bounds: &Bounds{Min: 0, Max: 100000}, Default: `"newey-west"`, Meaning: "How the bandwidth is chosen (Newey & West 1994, as in Hobijn, Franses & Ooms 2004), or the number.", Example: `bandwidth = 8`},
}
