package trend

import (
	"fmt"
	"math"
	"slices"

	"lagwise/stats"
	"lagwise/stats/distribution"
	"lagwise/stats/series"
)

// Sen is the median of the slopes between all pairs of values.
type Sen struct {
	Slope, Lower, Upper float64
	Intercept           float64 // median of x less Slope times the median of t (Conover 1980)
	Pairs               int64   // pairs at different times
	RankLower           int64   // rank of Lower among the sorted slopes, from 1
	RankUpper           int64
}

// TheilSen is the median slope (x[j] - x[i]) / (t[j] - t[i]) over all pairs at
// different times (Theil 1950), in units of x per unit of t, with the interval of
// Sen 1968 at the given level: of the N sorted slopes those of ranks
// round((N - C)/2) and round((N + C)/2) + 1, C = z sqrt(Var S), Var S with ties.
// Times need no order and no even steps; pairs at one time are left out, and
// Var S then has the ties in time as well. The interval supposes independent
// values.
//
// Exact at every length (a slope tied in thousands of pairs to the last bit but
// one): up to 200 values all slopes are sorted, above that a rank is enclosed first
// by counting slopes, O(n log n) each time.
//
// The error is *stats.Undefined: NotFinite; TooShort below three values or when
// no pair differs in time; Constant when all values are equal. It panics when
// the lengths differ or level is not between 0 and 1.
func TheilSen(t, x []float64, level float64) (Sen, error) {
	const what = "Theil-Sen slope"
	if len(t) != len(x) || !(level > 0 && level < 1) {
		panic(fmt.Sprintf("trend: slopes of %d values at %d times, level %v", len(x), len(t), level))
	}
	if len(x) < 3 {
		return Sen{}, tooShort(what, len(x), 3, "")
	}
	scaled, exponent, err := series.Scaled(what, x)
	if err != nil {
		return Sen{}, err
	}
	times, timeExponent, err := series.Scaled(what, t)
	if err != nil {
		return Sen{}, err
	}
	variance := kendallVariance(times, scaled)
	if slices.Min(scaled) == slices.Max(scaled) {
		return Sen{}, &stats.Undefined{What: what, Reason: stats.Constant, N: len(x)}
	}
	s := newSlopes(times, scaled)
	if s.total == 0 {
		return Sen{}, tooShort(what, len(x), 0, "all values are at one time")
	}
	pairs := float64(s.total)
	c := distribution.NormalQuantile((1+level)/2) * math.Sqrt(variance)
	out := Sen{Pairs: s.total}
	out.RankLower = int64(math.Max(1, math.RoundToEven((pairs-c)/2)))
	out.RankUpper = int64(math.Min(pairs, math.RoundToEven((pairs+c)/2)+1))
	values := s.at(out.RankLower, (s.total+1)/2, s.total/2+1, out.RankUpper)
	unit := exponent - timeExponent
	slope := (values[1] + values[2]) / 2
	out.Lower, out.Slope, out.Upper = math.Ldexp(values[0], unit), math.Ldexp(slope, unit), math.Ldexp(values[3], unit)
	out.Intercept = math.Ldexp(median(scaled)-slope*median(times), exponent)
	for _, v := range []float64{out.Lower, out.Slope, out.Upper, out.Intercept} {
		if math.IsInf(v, 0) {
			return Sen{}, &stats.Undefined{What: what, Reason: stats.NotFinite, N: len(x), Detail: "a slope is beyond the largest floating-point number"}
		}
	}
	return out, nil
}

// medianSlope is the Theil-Sen slope alone.
func medianSlope(t, x []float64) (float64, error) {
	s := newSlopes(t, x)
	if s.total == 0 {
		return 0, tooShort("Theil-Sen slope", len(x), 2, "all values are at one time")
	}
	values := s.at((s.total+1)/2, s.total/2+1)
	return (values[0] + values[1]) / 2, nil
}

func median(x []float64) float64 {
	s := slices.Clone(x)
	slices.Sort(s)
	n := len(s)
	return (s[(n-1)/2] + s[n/2]) / 2
}

// kendallVariance is Var S with ties in both (Kendall 1975, p. 55).
func kendallVariance(t, x []float64) float64 {
	n := float64(len(x))
	a, b := ties(t), ties(x)
	v := (n*(n-1)*(2*n+5) - a.five - b.five) / 18
	v += a.two * b.two / (2 * n * (n - 1))
	if n > 2 {
		v += a.three * b.three / (9 * n * (n - 1) * (n - 2))
	}
	return math.Max(0, v)
}

// tieSums are sums over the ties of k equal values.
type tieSums struct {
	two   float64 // k(k-1)
	three float64 // k(k-1)(k-2)
	five  float64 // k(k-1)(2k+5)
}

func ties(x []float64) tieSums {
	s := slices.Clone(x)
	slices.Sort(s)
	var out tieSums
	for i := 0; i < len(s); {
		j := i + 1
		for j < len(s) && s[j] == s[i] {
			j++
		}
		k := float64(j - i)
		out.two += k * (k - 1)
		out.three += k * (k - 1) * (k - 2)
		out.five += k * (k - 1) * (2*k + 5)
		i = j
	}
	return out
}
