package evidence

import "testing"

// The table of the decision procedure, row by row: the readings of the two
// opposite nulls are those of Kwiatkowski et al. 1992 and common practice;
// which p-value and which level decide is the design of this project.
func TestVerdictTable(t *testing.T) {
	for _, row := range []struct {
		name      string
		signs     signs
		want      Verdict
		disagrees bool
	}{
		{"rejects, keeps", signs{adf: true, trendP: 1}, Stationary, false},
		{"rejects, keeps, with a trend", signs{adf: true, adfTrend: true, trendP: 0.001}, Stationary, false},
		{"keeps, rejects", signs{kpss: true, trendP: 1}, DifferenceStationary, false},
		{"keeps, rejects, around a trend", signs{kpss: true, adfTrend: true, trendP: 0.049}, TrendStationary, false},
		{"keeps, rejects, trend not material", signs{kpss: true, adfTrend: true, trendP: 0.05}, DifferenceStationary, false},
		{"keeps, rejects, KPSS trend rejects", signs{kpss: true, adfTrend: true, kpssTrend: true, trendP: 0.001}, DifferenceStationary, false},
		{"keeps, keeps", signs{trendP: 1}, Inconclusive, false},
		{"keeps, keeps, around a trend", signs{adfTrend: true, trendP: 0.01}, TrendStationary, false},
		{"rejects, rejects, around a clear trend", signs{adf: true, kpss: true, adfTrend: true, trendP: 0.009}, TrendStationary, false},
		{"rejects, rejects, trend at 2 %", signs{adf: true, kpss: true, adfTrend: true, trendP: 0.02}, Inconclusive, false},
		{"rejects, rejects, clear for stationary", signs{adf: true, kpss: true, adfOne: true, trendP: 1}, Stationary, true},
		{"rejects, rejects, KPSS clear too", signs{adf: true, kpss: true, adfOne: true, kpssOne: true, trendP: 1}, Inconclusive, false},
	} {
		got, disagrees := verdict(row.signs)
		if got != row.want || disagrees != row.disagrees {
			t.Errorf("%s: got %s (disagrees %v), want %s (%v)", row.name, got, disagrees, row.want, row.disagrees)
		}
	}
}

func TestDrifts(t *testing.T) {
	for v, want := range map[Verdict]bool{Stationary: false, Constant: false, TrendStationary: true, DifferenceStationary: true,
		Inconclusive: true, TooShort: true} {
		if v.Drifts() != want {
			t.Errorf("%s drifts: got %v", v, v.Drifts())
		}
	}
}
