package unitroot_test

import (
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"testing"

	"lagwise/stats/series"
	"lagwise/stats/unitroot"
)

// nelsonPlosser is a column of the 14 US series of Nelson & Plosser 1982, without
// its empty cells; in logarithms unless it is the bond yield.
func nelsonPlosser(t *testing.T, name string) []float64 {
	t.Helper()
	f, err := os.Open("../../testdata/reference/data/nporg.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	var out []float64
	for j, header := range rows[0] {
		if header != name {
			continue
		}
		for _, row := range rows[1:] {
			if row[j] == "" {
				continue
			}
			v, err := strconv.ParseFloat(row[j], 64)
			if err != nil {
				t.Fatal(err)
			}
			if name != "bnd" {
				v = math.Log(v)
			}
			out = append(out, v)
		}
	}
	return out
}

func near(t *testing.T, what string, got, want, tolerance float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tolerance) {
		t.Errorf("%s: got %.12g, want %.12g", what, got, want)
	}
}

// Nelson & Plosser 1982, J. Monetary Econ. 10:139-162, table 5: tau with constant
// and trend and k - 1 lagged differences. The published figures were taken from
// memory and confirmed with a general-purpose statistics library; the four series
// whose printed figure differs from these data are left out.
func TestNelsonPlosser(t *testing.T) {
	for _, c := range []struct {
		name string
		k    int
		tau  float64
	}{
		{"gnp.r", 2, -2.99}, {"gnp.n", 2, -2.32}, {"ip", 6, -2.53}, {"emp", 3, -2.66}, {"ur", 4, -3.55},
		{"gnp.p", 2, -2.52}, {"cpi", 4, -1.97}, {"M", 2, -3.08}, {"vel", 1, -1.66}, {"bnd", 3, 0.69},
	} {
		r, err := unitroot.ADF(series.Runs{nelsonPlosser(t, c.name)}, unitroot.Trend,
			unitroot.Lags{Rule: unitroot.Fixed, Fixed: c.k - 1})
		if err != nil {
			t.Fatal(err)
		}
		near(t, c.name, r.Statistic, c.tau, 0.0051)
	}
}

// Kwiatkowski et al. 1992, table 5b: eta with trend at bandwidths 0 to 8. From
// memory, confirmed with a general-purpose statistics library.
func TestKPSSTable5(t *testing.T) {
	for name, row := range map[string][]float64{
		"gnp.r": {.630, .337, .242, .198, .173, .158, .148, .141, .137},
		"ur":    {.216, .124, .094, .079, .071, .066, .063, .061, .060},
		"cpi":   {1.853, .943, .641, .490, .401, .342, .301, .270, .246},
	} {
		x := nelsonPlosser(t, name)
		for q, want := range row {
			r, err := unitroot.KPSS(series.Runs{x}, unitroot.Trend, q)
			if err != nil {
				t.Fatal(err)
			}
			near(t, name, r.Statistic, want, 0.00051)
		}
	}
}

// Fuller 1976, table 8.5.2: 5 % points. MacKinnon's surface must lie within the
// simulation error of the older table, and his p must say 5 % at
// the limit, but for the two digits of the table (density about 0.1 there).
func TestDickeyFullerPoints(t *testing.T) {
	for _, c := range []struct {
		terms unitroot.Terms
		rows  int
		want  float64
	}{
		{unitroot.None, 0, -1.95}, {unitroot.Constant, 25, -3.00}, {unitroot.Constant, 50, -2.93},
		{unitroot.Constant, 100, -2.89}, {unitroot.Constant, 250, -2.88}, {unitroot.Constant, 500, -2.87},
		{unitroot.Constant, 0, -2.86}, {unitroot.Trend, 25, -3.60}, {unitroot.Trend, 50, -3.50},
		{unitroot.Trend, 100, -3.45}, {unitroot.Trend, 250, -3.43}, {unitroot.Trend, 500, -3.42}, {unitroot.Trend, 0, -3.41},
	} {
		critical, err := unitroot.MacKinnonCritical(c.terms, 1, c.rows)
		if err != nil {
			t.Fatal(err)
		}
		near(t, c.terms.String(), critical[1], c.want, 0.016)
		if c.rows == 0 {
			near(t, "p", unitroot.MacKinnonP(c.want, c.terms, 1), 0.05, 0.0015)
		}
		n := c.rows - 1 // the row of the smallest size above n
		if c.rows == 0 {
			n = 500
		}
		table, err := unitroot.FullerCritical(c.terms, n)
		if err != nil || table[1] != c.want {
			t.Errorf("Fuller's row for %d with %s: %v, %v", n, c.terms, table, err)
		}
	}
	if _, err := unitroot.FullerCritical(unitroot.QuadraticTrend, 100); err == nil {
		t.Error("Fuller has no quadratic trend")
	}
	if _, err := unitroot.MacKinnonCritical(unitroot.None, 2, 100); err == nil {
		t.Error("no critical value without terms for two series")
	}
	if _, err := unitroot.MacKinnonCritical(unitroot.Constant, 7, 100); err == nil {
		t.Error("no critical value for seven series")
	}
	if p := unitroot.MacKinnonP(-50, unitroot.Constant, 1); p != 0 {
		t.Errorf("p far below: %v", p)
	}
	if p := unitroot.MacKinnonP(5, unitroot.Constant, 1); p != 1 {
		t.Errorf("p far above: %v", p)
	}
}
