package evidence

import (
	"testing"

	"lagwise/stats/regression"
)

// The value and the interval that are told belong to the same parameter.
func TestPersistenceIsTheParameterThatReachesHighest(t *testing.T) {
	f := &Fit{GLS: &regression.GLSFit{Order: 2, AR: []float64{1.3, -0.4}, Partial: []float64{0.93, -0.4},
		Intervals: [][2]float64{{0.85, 0.985}, {-0.6, -0.2}}}}
	value, interval := f.Persistence()
	if value != 0.93 || interval != [2]float64{0.85, 0.985} {
		t.Errorf("got %v in %v", value, interval)
	}
}
