package request

// The documents that the tests read: an estuary lab's, with every key.

const estuaryManifest = `title = "Aldermere estuary, long records"

[record.moorings]
file = "moorings.csv"                 # one row a year
delimiter = ","
decimal = "."
thousands = ""
encoding = "utf-8"
comment = "#"
header-rows = 1
sheet = "2020"
missing = ["-9999"]
defaults = { unit = "mg/L", support = "mean" }
along = { column = "year", kind = "time", step = "P1Y" }

[record.core_a7]
file = "core-a7.csv"
along = { column = "age", kind = "age", unit = "ka", before = 1950 }

[record.mares]
file = "follicles.csv"
along = { kind = "sequence" }
group = "animal"

[record.plots]
file = "plots.csv"
at = { x = "easting_km", y = "northing_km", unit = "km" }

[series.boats]
record = "moorings"
column = "boats_moored"
title = "Boats moored on 1 August"
unit = "{count}"
measures = "amount"
support = "instant"
season = "P1Y"
smoothed = "5-point moving mean"
derived-from = ["landings", "effort"]
detection-limit = 0.05
measurement-sd = 2.0
age-model = "A7-2019"
method-changed = ["1994-05-01"]

[[series.boats.deviation]]
from = "smoothed-input"
reason = "the raw counts are lost"
`

const eelgrassAnalysis = `title = "What drives eelgrass decline"
manifests = ["../data/estuary.series.toml"]

[[correlation]]
name = "eelgrass-boats"
question = "Do eelgrass cover and moored boats change together?"
aim = "association"
expected = "negative"
planned = true
time-scale = "P10Y"
between = ["eelgrass", "boats"]
given = ["nitrate"]
remove-from = "both"
coefficient = "pearson"
on = "levels"
on-each = { boats = ["log"] }
inference = "usual"
replicates = 2000
lag = 0
every = "P1Y"
aggregate = "mean"
least-share = 0.8
year-starts = "10-01"
tolerance = "P1D"
grid = { step = 0.5, by = "linear" }
from = "1970"
until = "2020"
groups = "within"

[[correlation.deviation]]             # a documented deviation
from = "short-record"
reason = "pilot series, see the log of 3 May"
by = "RQ"
accepted-by = "TM"
until = 2027-06-30
data = "sha256:…"

[[regression]]
name = "nitrate-effect"
question = "Does nitrate lower eelgrass cover?"
aim = "effect"
response = "eelgrass"
predictors = ["nitrate", { series = "rain", lag = 1 }]
on = "levels"
estimator = "gls"
errors = "ar(1)"
likelihood = "reml"
standard-errors = "usual"
trend = false
seasonal-terms = false
form = "static"
`

const estuaryConventions = `builds-on = ["../lab/estuary.conventions.toml"]

[review]
exclude = ["archive/**"]
final = ["weight.shared-drift", "accepted-methods"]
hold-at = "warning"
alpha = 0.05
least-n = { correlation = 20, regression = 30 }
least-effective-n = 6

[asked-for]
request = ["question", "aim"]
series = ["unit", "title"]
deviation = ["reason", "by", "until"]
deviation-longest = "P1Y"

[accepted-methods]
coefficient = ["pearson", "spearman", "kendall"]
estimator = ["ols", "gls"]
on = ["first-differences", "seasonal-differences", "rates-of-change", "prewhitened"]
always-difference = false

[weight]
shared-drift = "error"
many-relations = "none"

[limits]
variance-inflation = 10
material-skewness = 1.0

[test-settings]
adf = { lags = "aic" }
kpss = { bandwidth = "newey-west" }
least-n-verdict = 20
family = "holm"
`
