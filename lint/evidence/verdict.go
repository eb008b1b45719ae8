package evidence

// Verdict is what the two tests with opposite nulls say of a series together.
type Verdict string

// The verdicts, in the trade's terms.
const (
	Stationary           Verdict = "stationary"
	TrendStationary      Verdict = "trend-stationary"
	DifferenceStationary Verdict = "difference-stationary"
	Inconclusive         Verdict = "inconclusive"
	TooShort             Verdict = "too-short"
	Constant             Verdict = "constant"
)

// Drifts reports whether a series with this verdict is treated as drifting.
func (v Verdict) Drifts() bool {
	switch v {
	case TrendStationary, DifferenceStationary, Inconclusive, TooShort:
		return true
	}
	return false
}

// Walks reports whether only differences of the series may be related.
func (v Verdict) Walks() bool {
	return v == DifferenceStationary || v == Inconclusive || v == TooShort
}

// The notes that go with a verdict.
const (
	KPSSDisagrees = "KPSS disagrees"
	LowPower      = "below 50 values: low power"
	OnAnomalies   = "judged on anomalies from its season"
	AroundLine    = "judged around its fitted line"
)

// signs is what the tests said, the input of the verdict's table.
type signs struct {
	adf, kpss           bool // constant: ADF rejects a unit root, KPSS rejects stationarity
	adfTrend, kpssTrend bool // the same with a trend
	adfOne, kpssOne     bool // constant: at 1 % each
	trendP              float64
}

// verdict is the table of the decision procedure: the augmented Dickey-Fuller
// test (null: unit root) against KPSS (null: stationary). The second value is
// whether KPSS disagrees with the verdict.
func verdict(s signs) (Verdict, bool) {
	aroundTrend := func(p float64) bool { return s.adfTrend && !s.kpssTrend && s.trendP < p }
	switch {
	case s.adf && !s.kpss:
		return Stationary, false
	case !s.adf && s.kpss:
		if aroundTrend(0.05) {
			return TrendStationary, false
		}
		return DifferenceStationary, false
	case !s.adf && !s.kpss:
		if aroundTrend(0.05) {
			return TrendStationary, false
		}
		return Inconclusive, false
	case aroundTrend(0.01):
		return TrendStationary, false
	case s.adfOne && !s.kpssOne:
		return Stationary, true
	}
	return Inconclusive, false
}

// verdictAroundLine is the verdict of a series whose fitted line was taken
// off: only the trend forms of both tests know its distribution.
func verdictAroundLine(s signs) Verdict {
	switch {
	case s.adfTrend && !s.kpssTrend:
		return Stationary
	case !s.adfTrend && s.kpssTrend:
		return DifferenceStationary
	}
	return Inconclusive
}
