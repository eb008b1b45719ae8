package request

import "strconv"

// Implicit makes the series of a numeric column of a record whose manifest
// declares no series; unit is what the header says, or empty.
func (rec *Record) Implicit(column string) *Series {
	s := &Series{Name: column, Record: rec.Name, Column: column, Implicit: true, Header: rec.Header}
	s.fill(rec)
	return s
}

// fill gives a series what it does not say itself: first from the defaults of
// its record (nil: it has none that is known), then from the schema.
func (s *Series) fill(rec *Record) {
	var given map[string]string
	if rec != nil {
		given = rec.Defaults
	}
	for key, field := range map[string]*string{
		"unit": &s.Unit, "measures": &s.Measures, "support": &s.Support,
		"season": &s.Season, "smoothed": &s.Smoothed, "age-model": &s.AgeModel,
	} {
		if *field == "" {
			*field = given[key]
		}
	}
	for key, field := range map[string]**float64{"detection-limit": &s.DetectionLimit, "measurement-sd": &s.MeasurementSD} {
		if v, err := strconv.ParseFloat(given[key], 64); err == nil && *field == nil {
			*field = &v
		}
	}
	if s.Measures == "" {
		s.Measures = "amount"
	}
	if s.Support == "" {
		s.Support = "instant"
	}
	if s.Column == "" {
		s.Column = s.Name
	}
}
