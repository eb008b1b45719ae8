package unitroot

import (
	"fmt"
	"math"

	"lagwise/stats"
	"lagwise/stats/series"
)

// LagRule says how the number of lagged differences is chosen.
type LagRule uint8

const (
	AIC               LagRule = iota // Akaike 1974
	Fixed                            // as given
	BIC                              // Schwarz 1978
	GeneralToSpecific                // from the largest down, until the last lag's |t| >= 1.6449 (10 %; Ng & Perron 1995)
)

// Lags is the choice of lagged differences.
type Lags struct {
	Rule  LagRule
	Fixed int // with Rule Fixed
	Max   int // largest tried by the other rules; below zero: min(ceil(12 (n/100)^(1/4)), floor(n/2) - terms - 1)
}

// ADFResult is an augmented Dickey-Fuller test.
type ADFResult struct {
	Statistic float64    // t of the level
	P         float64    // MacKinnon 1994, asymptotic
	Lags      int        // lagged differences in the final regression
	N         int        // its rows
	Terms     Terms      //
	Critical  [3]float64 // 1, 5, 10 %: MacKinnon 2010 at N rows
	Criterion float64    // AIC or BIC of the chosen lags on the common sample, in the data's units; 0 with the other rules
	Dependent int        // when above zero: this lag follows exactly from those before, so only fewer were used
}

// ADF is the augmented Dickey-Fuller test. Null hypothesis: a unit root. In
//
//	x[t+1] - x[t] = terms + g x[t] + sum over j = 1..p of c_j (x[t+1-j] - x[t-j]) + e
//
// the statistic is the t of g. p is chosen on the rows that all candidates have
// and the test made on all rows that the chosen p leaves. p counts every
// regressor in AIC and BIC. Gaps: rows whose lags would cross one are dropped,
// the terms count values, and Max is lowered until half of the rows without lags
// remain.
//
// The values are centred first where the terms allow, which costs nothing and
// keeps the digits of small movements on a large offset. When the lags are
// dependent to rounding, the largest number that is not is used (Dependent).
//
// The error is *stats.Undefined: NotFinite; Constant when there is no movement
// around the terms; TooShort when the rows do not outnumber the coefficients;
// Singular when the past determines every value exactly. It panics on unknown
// terms or rules and on a negative fixed lag. Critical values are made for about
// 20 rows and more. Sources: Dickey & Fuller 1979; Said & Dickey 1984.
func ADF(r series.Runs, terms Terms, lags Lags) (ADFResult, error) {
	terms.check()
	if lags.Rule > GeneralToSpecific || lags.Rule == Fixed && lags.Fixed < 0 {
		panic(fmt.Sprintf("unitroot: lags %+v", lags))
	}
	s, err := newSample(r, terms)
	if err != nil {
		return ADFResult{}, err
	}
	top := lags.Fixed
	if lags.Rule != Fixed {
		if top, err = s.largest(lags.Max); err != nil {
			return ADFResult{}, err
		}
	}
	out := ADFResult{Terms: terms}
	for {
		choice, err := s.choose(lags.Rule, top)
		if d, ok := err.(dependent); ok {
			out.Dependent = int(d)
			top = int(d) - 1
			continue
		}
		if err != nil {
			return ADFResult{}, err
		}
		out.Statistic, out.N, out.Lags, out.Criterion = choice.t, choice.rows, choice.lags, choice.criterion
		break
	}
	out.P = MacKinnonP(out.Statistic, terms, 1)
	out.Critical, err = MacKinnonCritical(terms, 1, out.N)
	return out, err
}

// dependent is the first lag that follows exactly from those before it.
type dependent int

func (d dependent) Error() string { return fmt.Sprintf("lag %d is exactly dependent", int(d)) }

// largest is the largest lag order to try, at the asked value or by the rule.
func (s *sample) largest(asked int) (int, error) {
	n, m := len(s.z), s.terms.Count()
	top := asked
	if asked < 0 {
		top = min(int(math.Ceil(12*math.Pow(float64(n)/100, 0.25))), n/2-m-1)
		if top < 0 {
			return 0, tooShort(adfName, n, 2*(m+1), "")
		}
	}
	if len(s.ends) == 1 {
		return top, nil
	}
	half := s.count(0) / 2
	for top > 0 && (s.count(top) < half || s.count(top) <= m+1+top) {
		top--
	}
	return top, nil
}

const adfName = "augmented Dickey-Fuller test"

type choice struct {
	t         float64
	rows      int
	lags      int
	criterion float64
}

func (s *sample) choose(rule LagRule, top int) (choice, error) {
	if rows, need := s.count(top), s.terms.Count()+2+top; rows < need {
		return choice{}, tooShort(adfName, rows, need, fmt.Sprintf("rows left by %d lags", top))
	}
	g := s.newGram(top)
	lags, criterion := top, 0.0
	if rule != Fixed {
		nested, err := s.nested(g, top)
		if err != nil {
			return choice{}, err
		}
		lags, criterion = nested.best(rule, s.exponent)
	}
	last, err := s.final(g, lags)
	if err != nil {
		return choice{}, err
	}
	// A residual of that size is the rounding of the fit.
	if last.rss <= math.Max(float64(last.rows)*rounding*rounding, 1e-24*last.level*last.level) {
		return choice{}, exact(len(s.z))
	}
	df := float64(last.rows - s.terms.Count() - 1 - lags)
	return choice{t: last.level / math.Sqrt(last.rss/df), rows: last.rows, lags: lags, criterion: criterion}, nil
}

func exact(n int) error {
	return &stats.Undefined{What: adfName, Reason: stats.Singular, N: n,
		Detail: "the values before determine every value exactly"}
}

// nested fits all orders on the common sample, by the Gram matrix when that
// keeps the digits, by a QR decomposition otherwise.
func (s *sample) nested(g *gram, top int) (nested, error) {
	if g != nil {
		if fits, ok := g.nested(); ok {
			return fits, nil
		}
	}
	return s.nestedByRows(top)
}

func (s *sample) final(g *gram, lags int) (final, error) {
	if g != nil {
		if f, ok := g.final(lags); ok {
			return f, nil
		}
	}
	return s.finalByRows(lags)
}

// nested holds the fits of all orders 0..len(lag) on the same rows.
type nested struct {
	rows, terms int
	lag         []float64 // orthogonalised response along lag 1, 2, ..
	rss         float64   // with all lags
}

// final is the fit of the chosen order on all its rows.
type final struct {
	rows  int
	level float64 // orthogonalised response along the level, entered last
	rss   float64
}

// best is the order that the rule prefers and its criterion.
func (f nested) best(rule LagRule, exponent int) (lags int, criterion float64) {
	n := float64(f.rows)
	rss := make([]float64, len(f.lag)+1)
	rss[len(f.lag)] = f.rss
	for p := len(f.lag); p > 0; p-- {
		rss[p-1] = rss[p] + f.lag[p-1]*f.lag[p-1]
	}
	if rule == GeneralToSpecific {
		const tenPercent = 1.6448536269514722
		for p := len(f.lag); p > 0; p-- {
			df := n - float64(f.terms+1+p)
			if math.Abs(f.lag[p-1]) >= tenPercent*math.Sqrt(rss[p]/df) {
				return p, 0
			}
		}
		return 0, 0
	}
	penalty := 2.0
	if rule == BIC {
		penalty = math.Log(n)
	}
	units := 2 * float64(exponent) * math.Ln2
	criterion = math.Inf(1)
	for p, v := range rss {
		v = math.Max(v, n*rounding*rounding) // less is rounding, and prefers nothing
		c := n*(math.Log(2*math.Pi)+math.Log(v/n)+units+1) + penalty*float64(f.terms+1+p)
		if c < criterion {
			lags, criterion = p, c
		}
	}
	return lags, criterion
}
