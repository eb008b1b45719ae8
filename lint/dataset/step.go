package dataset

import (
	"math"
	"slices"
)

// evenShare is the least share of distances of one step on an even axis.
const evenShare = 0.5

// measure finds the step of sorted positions: the most frequent distance of
// neighbours within a group. The axis is even when all distances are whole
// steps and at least half are one step.
func (a *Axis) measure() {
	if a.Unit == Row && a.groups == nil {
		a.Step, a.StepText, a.Even, a.Share = 1, "1", true, 1
		return
	}
	distances := a.distances()
	if len(distances) == 0 {
		a.Even = a.Unit == Row
		return
	}
	slack := slackOf(a.Positions, a.Unit)
	step, share := modal(distances, slack)
	a.Step, a.Share, a.Variation = step, share, variation(distances)
	off, gaps := 0, 0
	whole := 0.0
	for _, d := range distances {
		n := math.Round(d / step)
		whole += n
		if n > 1 {
			gaps++
		}
		if n < 1 || math.Abs(d-n*step) > slack*(1+1e-3*n)+1e-6*step {
			off++
		}
	}
	a.Even = off == 0 && share >= evenShare
	if a.Even {
		a.Gaps = gaps
		a.refine(distances, whole)
	}
	a.StepText = stepText(a.Unit, a.Step)
}

// refine takes rounding off a step that is not whole.
func (a *Axis) refine(distances []float64, whole float64) {
	if a.Step == math.Trunc(a.Step) {
		return
	}
	sum := 0.0
	for _, d := range distances {
		sum += d
	}
	if refined := sum / whole; math.Abs(refined-a.Step) > 1e-9*a.Step {
		a.Step = refined
	}
}

// distances returns the positive distances of neighbours.
func (a *Axis) distances() []float64 {
	distances := make([]float64, 0, len(a.Positions))
	for i := 1; i < len(a.Positions); i++ {
		if a.groups != nil && a.groups[i] != a.groups[i-1] {
			continue
		}
		if d := a.Positions[i] - a.Positions[i-1]; d > 0 {
			distances = append(distances, d)
		}
	}
	return distances
}

// modal returns the most frequent distance, the smaller of equals, and its
// share; distances within slack of each other count as one.
func modal(distances []float64, slack float64) (step, share float64) {
	if same(distances, slack) {
		return median(distances), 1
	}
	sorted := slices.Clone(distances)
	slices.Sort(sorted)
	best, most := 0, 0
	for i := 0; i < len(sorted); {
		j := i
		limit := sorted[i] + max(slack, 1e-6*sorted[i])
		for j < len(sorted) && sorted[j] <= limit {
			j++
		}
		if j-i > most {
			best, most = (i+j)/2, j-i
		}
		i = j
	}
	return sorted[best], float64(most) / float64(len(sorted))
}

func same(distances []float64, slack float64) bool {
	first := distances[0]
	for _, d := range distances {
		if math.Abs(d-first) > max(slack/2, 5e-7*first) {
			return false
		}
	}
	return true
}

func median(values []float64) float64 {
	first := values[0]
	for _, v := range values {
		if v != first {
			sorted := slices.Clone(values)
			slices.Sort(sorted)
			return sorted[len(sorted)/2]
		}
	}
	return first
}

func variation(distances []float64) float64 {
	mean, squares := 0.0, 0.0
	for _, d := range distances {
		mean += d / float64(len(distances))
	}
	for _, d := range distances {
		squares += (d - mean) * (d - mean)
	}
	if len(distances) < 2 {
		return 0
	}
	return math.Sqrt(squares/float64(len(distances)-1)) / mean
}

// slackOf returns how far rounding in the file can move a distance: one unit
// of the last decimal that positions are written with, when distances are far
// larger; 0 for whole positions.
func slackOf(positions []float64, unit AxisUnit) float64 {
	if unit != Number && unit != Year {
		return 0
	}
	scale := 1.0
	for decimals := 0; decimals <= 6; decimals++ {
		if allWhole(positions, scale) {
			break
		}
		scale *= 10
	}
	if scale == 1 {
		return 0
	}
	span := positions[len(positions)-1] - positions[0]
	if mean := span / float64(max(1, len(positions)-1)); mean < 20/scale {
		return 0
	}
	return 1 / scale
}

func allWhole(positions []float64, scale float64) bool {
	for _, p := range positions {
		if v := p * scale; math.Abs(v-math.Round(v)) > 1e-6 {
			return false
		}
	}
	return true
}
