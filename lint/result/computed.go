package result

import (
	"lagwise/lint/evidence"
	"lagwise/lint/request"
)

// Levels returns the request as a person who suspects nothing would ask it:
// of the values as measured, with the usual inference.
func Levels(r request.Request) request.Request {
	r.On = nil
	if r.Kind == request.Regression {
		r.Estimator, r.Errors, r.StandardErrors, r.Form = "ols", "independent", "usual", "static"
		r.Trend, r.SeasonalTerms = false, false
		return r
	}
	r.Inference = "usual"
	return r
}

// Compare computes a request on levels, as written, and as recommended; the
// last may be nil. One entry a pair, or one for a regression.
func Compare(c, recommended *evidence.Case) ([]Computed, error) {
	raw := Levels(*c.Req())
	onLevels, err := Outcomes(c.With(raw))
	if err != nil {
		return nil, err
	}
	written, err := Outcomes(c)
	if err != nil {
		return nil, err
	}
	better := written
	var changed []string
	if recommended != nil {
		if better, err = Outcomes(recommended); err != nil {
			return nil, err
		}
		changed = request.Changed(c.Req(), recommended.Req())
	}
	pairs := c.Req().Pairs()
	all := make([]Computed, len(written))
	for i := range all {
		all[i] = Computed{File: c.Asked.File, Request: c.Asked.Name, Kind: c.Req().Kind.String(),
			OnLevels: onLevels[i], AsWritten: written[i], Recommended: better[i], Changed: changed}
		all[i].Response = c.Req().Response
		if c.Req().Kind == request.Correlation {
			all[i].Pair = &pairs[i]
		}
	}
	return all, nil
}
