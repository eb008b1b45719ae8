package dataset

import (
	"crypto/sha256"
	"math"
	"strconv"

	"lagwise/lint/request"
)

// Series is one series of a manifest with its values along its axis.
type Series struct {
	Name     string
	Axis     *Axis
	Values   []float64 // NaN where missing, in the order of the axis
	Support  string    // instant, mean, sum
	Season   int       // steps in a season, 0 when it has none
	Unit     string
	Censored int      // marked as such, or at or below the declared detection limit
	Digest   [32]byte // of values, axis, support and season
}

// Series returns a declared series. What a manifest leaves open is taken from
// the record: the unit from the header, the season from the step (months 12,
// quarters 4, hours 24). Values at or below a declared detection limit are
// censored: missing, and counted.
func (r *Record) Series(decl *request.Series, rec *request.Record) (*Series, *Trouble) {
	name := decl.Column
	if name == "" {
		name = decl.Name
	}
	c, trouble := r.Column(name)
	if trouble != nil {
		return nil, trouble
	}
	if !c.Numeric {
		t := unreadable("column %q holds no numbers", name)
		if c.Unparsed > 0 {
			t = unreadable("column %q holds text, not numbers: %q on line %d", name, c.UnparsedText, c.UnparsedLine)
		}
		t.Column = name
		return nil, t
	}
	s := &Series{Name: decl.Name, Axis: r.Axis, Values: c.Values, Support: firstOf(decl.Support, rec.Defaults["support"], "instant"),
		Unit: firstOf(decl.Unit, rec.DefaultUnit, rec.Defaults["unit"], c.HeaderUnit), Censored: c.Censored}
	s.Season = seasonOf(firstOf(decl.Season, rec.Defaults["season"]), r.Axis)
	if decl.DetectionLimit != nil {
		s.censor(*decl.DetectionLimit)
	}
	h := sha256.New()
	axis, values := r.Axis.Digest(), c.valueDigest()
	h.Write(axis[:])
	h.Write(values[:])
	h.Write([]byte(s.Support))
	hashInts(h, []int{s.Season, s.Censored})
	if decl.DetectionLimit != nil {
		hashFloats(h, []float64{*decl.DetectionLimit})
	}
	s.Digest = [32]byte(h.Sum(nil))
	return s, nil
}

// censor makes values at or below a limit missing.
func (s *Series) censor(limit float64) {
	kept := make([]float64, len(s.Values))
	for i, v := range s.Values {
		if v <= limit {
			s.Censored++
			v = math.NaN()
		}
		kept[i] = v
	}
	s.Values = kept
}

func firstOf(texts ...string) string {
	for _, t := range texts {
		if t != "" {
			return t
		}
	}
	return ""
}

// seasonOf returns the steps of a season: as declared (a duration, a number
// of steps, or false), else inferred from an even step.
func seasonOf(declared string, a *Axis) int {
	if declared == "false" || !a.Even || a.Step <= 0 {
		return 0
	}
	if declared == "" {
		return usualSeason(a.Unit, a.Step)
	}
	if n, err := strconv.Atoi(declared); err == nil {
		return seasonal(n)
	}
	p, err := request.ParsePeriod(declared)
	if err != nil {
		return 0
	}
	return seasonal(int(math.Round(lengthIn(p, a.Unit) / a.Step)))
}

// seasonal drops seasons of less than two steps.
func seasonal(steps int) int {
	if steps < 2 {
		return 0
	}
	return steps
}

// usualSeason is the season that a step suggests: a year of months or
// quarters, a day of hours.
func usualSeason(unit AxisUnit, step float64) int {
	switch {
	case unit == Month && step < 12 && math.Mod(12, step) == 0:
		return seasonal(int(12 / step))
	case unit == Second && step == 3600:
		return 24
	}
	return 0
}

// lengthIn returns the length of a period in an axis unit, months and years
// by their mean length where the unit is days or seconds.
func lengthIn(p request.Period, unit AxisUnit) float64 {
	days := float64(p.Months)*yearDays/12 + float64(p.Days) + p.Seconds/daySeconds
	switch unit {
	case Year:
		if p.Days == 0 && p.Seconds == 0 {
			return float64(p.Months) / 12
		}
		return days / yearDays
	case Month:
		if p.Days == 0 && p.Seconds == 0 {
			return float64(p.Months)
		}
		return days / yearDays * 12
	case Day:
		return days
	case Second:
		return days * daySeconds
	}
	return 0
}
