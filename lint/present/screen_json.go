package present

import (
	"io"

	"lagwise/lint/result"
)

type screenJSON struct {
	Head
	Series []screenedJSON `json:"series"`
}

type screenedJSON struct {
	Manifest             string     `json:"manifest"`
	Name                 string     `json:"name"`
	Record               string     `json:"record"`
	Column               string     `json:"column"`
	Unit                 *string    `json:"unit"`
	N                    int        `json:"n"`
	Missing              int        `json:"missing"`
	First                *string    `json:"first"`
	Last                 *string    `json:"last"`
	Step                 *string    `json:"step"`
	Even                 bool       `json:"even"`
	Gaps                 int        `json:"gaps"`
	Mean                 number     `json:"mean"`
	SD                   number     `json:"sd"`
	Autocorrelation      []number   `json:"autocorrelation"`
	EffectiveN           number     `json:"effective-n"`
	Tests                []testJSON `json:"tests"`
	Trend                *trendJSON `json:"trend"`
	Season               seasonJSON `json:"season"`
	Break                breakJSON  `json:"break"`
	Verdict              *string    `json:"verdict"`
	VerdictOnDifferences *string    `json:"verdict-on-differences"`
	Cautions             []string   `json:"cautions"`
	Error                *string    `json:"error"`
}

type testJSON struct {
	Test      string         `json:"test"`
	Null      string         `json:"null"`
	Of        string         `json:"of"`
	Terms     *string        `json:"terms"`
	Lags      *int           `json:"lags,omitempty"`
	Bandwidth *int           `json:"bandwidth,omitempty"`
	Statistic number         `json:"statistic"`
	P         number         `json:"p"`
	PBound    *string        `json:"p-bound"`
	N         int            `json:"n"`
	Critical  []criticalJSON `json:"critical-values"`
	Error     *string        `json:"error"`
}

type criticalJSON struct {
	Level number `json:"level"`
	Value number `json:"value"`
}

type trendJSON struct {
	Per         string          `json:"per"`
	SenSlope    number          `json:"sen-slope"`
	Interval    *[2]number      `json:"interval"`
	MannKendall mannKendallJSON `json:"mann-kendall"`
}

type mannKendallJSON struct {
	S         number `json:"s"`
	Z         number `json:"z"`
	P         number `json:"p"`
	Corrected bool   `json:"corrected"`
}

type seasonJSON struct {
	Steps    *int    `json:"steps"`
	F        number  `json:"f"`
	P        number  `json:"p"`
	Strength number  `json:"strength"`
	Kind     *string `json:"kind"`
}

type breakJSON struct {
	At        *string `json:"at"`
	Statistic number  `json:"statistic"`
	P         number  `json:"p"`
}

// ScreenJSON writes what is known of each series.
func ScreenJSON(w io.Writer, head Head, all []result.Screened) error {
	out := screenJSON{Head: head, Series: []screenedJSON{}}
	for _, s := range all {
		out.Series = append(out.Series, screenedRow(s))
	}
	return writeJSON(w, out)
}

func screenedRow(s result.Screened) screenedJSON {
	row := screenedJSON{Manifest: s.Manifest, Name: s.Name, Record: s.Record, Column: s.Column, Unit: orNull(s.Unit), N: s.N, Missing: s.Missing,
		First: orNull(s.First), Last: orNull(s.Last), Step: orNull(s.Step), Even: s.Even, Gaps: s.Gaps, Mean: number{s.Mean}, SD: number{s.SD},
		Autocorrelation: numbers(s.Autocorrelation), EffectiveN: number{s.EffectiveN}, Tests: []testJSON{},
		Season:  seasonJSON{s.Season.Steps, number{s.Season.F}, number{s.Season.P}, number{s.Season.Strength}, orNull(s.Season.Kind)},
		Break:   breakJSON{s.Break.At, number{s.Break.Statistic}, number{s.Break.P}},
		Verdict: orNull(s.Verdict), VerdictOnDifferences: orNull(s.VerdictOnDifferences), Cautions: orEmpty(s.Cautions), Error: orNull(s.Error)}
	for _, t := range s.Tests {
		row.Tests = append(row.Tests, testRow(t))
	}
	if t := s.Trend; t != nil {
		row.Trend = &trendJSON{t.Per, number{t.SenSlope}, interval(t.Interval),
			mannKendallJSON{number{t.MannKendall.S}, number{t.MannKendall.Z}, number{t.MannKendall.P}, t.MannKendall.Corrected}}
	}
	return row
}

func testRow(t result.Test) testJSON {
	row := testJSON{Test: t.Test, Null: t.Null, Of: t.Of, Terms: orNull(t.Terms), Lags: t.Lags, Bandwidth: t.Bandwidth,
		Statistic: number{t.Statistic}, P: number{t.P}, PBound: bound(t.PBound), N: t.N, Critical: []criticalJSON{}, Error: orNull(t.Error)}
	for _, c := range t.Critical {
		row.Critical = append(row.Critical, criticalJSON{value(c.Level), value(c.Value)})
	}
	return row
}
