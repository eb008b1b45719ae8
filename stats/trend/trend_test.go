package trend_test

import (
	"errors"
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"lagwise/stats"
	"lagwise/stats/trend"
)

func undefined(t *testing.T, what string, err error, reason stats.Reason) {
	t.Helper()
	var u *stats.Undefined
	if !errors.As(err, &u) || u.Reason != reason {
		t.Errorf("%s: got error %v, want %s", what, err, reason)
	}
}

func index(n int) ([]float64, []int) {
	t, at := make([]float64, n), make([]int, n)
	for i := range t {
		t[i], at[i] = float64(i), i
	}
	return t, at
}

func TestHostile(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for name, c := range map[string]struct {
		x      []float64
		reason stats.Reason
	}{
		"NaN":      {[]float64{1, 2, nan, 4, 5, 6}, stats.NotFinite},
		"infinite": {[]float64{1, 2, inf, 4, 5, 6}, stats.NotFinite},
		"constant": {[]float64{7, 7, 7, 7, 7, 7}, stats.Constant},
		"two":      {[]float64{1, 2}, stats.TooShort},
		"none":     {nil, stats.TooShort},
	} {
		time, at := index(len(c.x))
		_, err := trend.MannKendall(c.x)
		undefined(t, name+": MannKendall", err, c.reason)
		_, err = trend.MannKendallHamedRao(c.x, 2, true)
		undefined(t, name+": MannKendallHamedRao", err, c.reason)
		_, err = trend.TheilSen(time, c.x, 0.95)
		undefined(t, name+": TheilSen", err, c.reason)
		_, err = trend.LinearCosine(c.x, time)
		undefined(t, name+": LinearCosine", err, c.reason)
		_, err = trend.SeasonalMannKendall(c.x, at, 3, true)
		undefined(t, name+": SeasonalMannKendall", err, c.reason)
	}
	line, _ := index(50)
	_, err := trend.LinearCosine(line, line)
	undefined(t, "a line", err, stats.Constant)
	_, err = trend.LinearCosine(line, make([]float64, 50))
	undefined(t, "one time", err, stats.Constant)
	_, err = trend.TheilSen(make([]float64, 50), line, 0.95)
	undefined(t, "one time", err, stats.TooShort)
	r, err := trend.MannKendallHamedRao(line, 10, false)
	if err != nil || r.Correction != 1 {
		t.Errorf("every value on its line: %+v, %v", r, err)
	}
}

// S by its definition, over ties, signs and zeros of both signs.
func TestSByDefinition(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 2))
	for n := 3; n < 200; n += 7 {
		x := make([]float64, n)
		for i := range x {
			x[i] = math.Round(3*r.NormFloat64()) / 2
			if x[i] == 0 && i%2 == 0 {
				x[i] = math.Copysign(0, -1)
			}
		}
		want := 0.0
		for i := range x {
			for j := i + 1; j < n; j++ {
				if x[j] > x[i] {
					want++
				} else if x[j] < x[i] {
					want--
				}
			}
		}
		got, err := trend.MannKendall(x)
		if err != nil {
			t.Fatal(err)
		}
		if got.S != want {
			t.Errorf("n = %d: S %v, by definition %v", n, got.S, want)
		}
	}
}

// A unit or an offset changes no rank; a turned sign turns S.
func TestInvariance(t *testing.T) {
	r := rand.New(rand.NewPCG(4, 2))
	x := make([]float64, 300)
	for i := 1; i < len(x); i++ {
		x[i] = math.Round(8*(0.7*x[i-1]+r.NormFloat64()+0.01)) / 8
	}
	time, _ := index(len(x))
	want, _ := trend.MannKendallHamedRao(x, 20, true)
	sen, _ := trend.TheilSen(time, x, 0.95)
	line, _ := trend.LinearCosine(x, time)
	for _, c := range []struct{ scale, offset float64 }{{-1, 0}, {1e-300, 0}, {1e300, 0}, {1, 1 << 40}} {
		y := make([]float64, len(x))
		for i := range x {
			y[i] = c.scale*x[i] + c.offset
		}
		got, err := trend.MannKendallHamedRao(y, 20, true)
		if err != nil {
			t.Fatal(err)
		}
		sign := math.Copysign(1, c.scale)
		near(t, "Z", got.Z, sign*want.Z, 1e-9)
		s, err := trend.TheilSen(time, y, 0.95)
		if err != nil {
			t.Fatal(err)
		}
		near(t, "slope", s.Slope/c.scale, sen.Slope, 1e-12)
		l, err := trend.LinearCosine(y, time)
		if err != nil {
			t.Fatal(err)
		}
		near(t, "T", l.T, sign*line.T, 1e-9)
	}
}

// Above 200 values ranks are enclosed by counting; the slopes at those ranks must
// be those of a full sort. Times in disorder and repeated, values tied or not,
// slopes all of one sign or of both.
func TestTheilSenAgainstSort(t *testing.T) {
	r := rand.New(rand.NewPCG(9, 2))
	for name, make := range map[string]func(i int) (float64, float64){
		"noise":          func(i int) (float64, float64) { return float64(i), r.NormFloat64() },
		"rising":         func(i int) (float64, float64) { return float64(i), 5*float64(i) + r.NormFloat64() },
		"falling":        func(i int) (float64, float64) { return float64(i), -5*float64(i) + r.NormFloat64() },
		"ties":           func(i int) (float64, float64) { return float64(i), math.Round(r.NormFloat64()) },
		"mostly zero":    func(i int) (float64, float64) { return float64(i), math.Floor(r.Float64() * 1.1) },
		"repeated times": func(i int) (float64, float64) { return math.Floor(r.Float64() * 40), r.NormFloat64() },
		"heavy tails":    func(i int) (float64, float64) { return r.NormFloat64(), math.Exp(9 * r.NormFloat64()) },
		"line":           func(i int) (float64, float64) { return float64(i), 0.1 * float64(i) },
		"two lines":      func(i int) (float64, float64) { return float64(i), float64(i%2) * float64(i) },
	} {
		const n = 450
		var time, x []float64
		for i := 0; i < n; i++ {
			a, b := make(i)
			time, x = append(time, a), append(x, b)
		}
		var all []float64
		for i := range x {
			for j := i + 1; j < n; j++ {
				if time[i] != time[j] {
					all = append(all, (x[j]-x[i])/(time[j]-time[i]))
				}
			}
		}
		slices.Sort(all)
		s, err := trend.TheilSen(time, x, 0.95)
		if err != nil {
			t.Fatal(name, err)
		}
		if s.Pairs != int64(len(all)) {
			t.Fatalf("%s: %d pairs, want %d", name, s.Pairs, len(all))
		}
		m := len(all)
		for _, c := range []struct{ got, want float64 }{
			{s.Slope, (all[(m-1)/2] + all[m/2]) / 2}, {s.Lower, all[s.RankLower-1]}, {s.Upper, all[s.RankUpper-1]},
		} {
			near(t, name, c.got, c.want, 1e-13*math.Max(1e-3, math.Abs(c.want)))
		}
	}
}

// The slope and its error by their formula.
func TestLinearCosineByFormula(t *testing.T) {
	r := rand.New(rand.NewPCG(6, 2))
	const n = 80
	x, at := make([]float64, n), make([]float64, n)
	var ma, mx float64
	for i := range x {
		at[i] = 1950 + 1.5*float64(i)
		x[i] = 0.1*at[i] + r.NormFloat64()
		ma += at[i] / n
		mx += x[i] / n
	}
	var sxy, sxx float64
	for i := range x {
		sxy += (at[i] - ma) * (x[i] - mx)
		sxx += (at[i] - ma) * (at[i] - ma)
	}
	slope := sxy / sxx
	nu := int(0.41 * math.Pow(n, 2.0/3)) // 7
	variance := 0.0
	for j := 1; j <= nu; j++ {
		l := 0.0
		for i := range x {
			e := x[i] - mx - slope*(at[i]-ma)
			l += math.Sqrt(2.0/n) * math.Cos(math.Pi*float64(j)*(float64(i)+0.5)/n) * (at[i] - ma) * e
		}
		variance += l * l / float64(nu)
	}
	se := math.Sqrt(n*variance*n/(n-2)) / sxx
	got, err := trend.LinearCosine(x, at)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "slope", got.Slope, slope, 1e-12)
	near(t, "se", got.SE, se, 1e-12)
	near(t, "t", got.T, slope/se, 1e-8)
	if got.DF != 7 {
		t.Errorf("df %v", got.DF)
	}
}

// Missing months: a phase without them has fewer pairs, and the covariance stays
// that of Dietz & Killeen with the middle rank.
func TestSeasonalWithGaps(t *testing.T) {
	x := []float64{1, 5, 2, 6, 3, 7, 4, 9}
	at := []int{0, 1, 2, 3, 4, 5, 6, 7}
	whole, err := trend.SeasonalMannKendall(x, at, 2, true)
	if err != nil {
		t.Fatal(err)
	}
	// Both phases rise 4 times: S = 12; Var = 2 (4 3 13)/18 = 52/3; the covariance
	// of equal orders is that same variance, 26/3, twice.
	near(t, "S", whole.S, 12, 0)
	near(t, "VarS", whole.VarS, 52.0/3+2*26.0/3, 1e-12)
	gap, err := trend.SeasonalMannKendall(slices.Delete(slices.Clone(x), 3, 4), slices.Delete(slices.Clone(at), 3, 4), 2, false)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "S", gap.S, 6+3, 0)
	near(t, "VarS", gap.VarS, 26.0/3+3*2*11.0/18, 1e-12)
}
