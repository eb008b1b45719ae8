package regression

import "math"

// edge bounds the parameters u = atanh r: 1 - r is 5e-16 there.
const edge = 18.0

// filters whiten the errors with partial autocorrelations tanh u. For t lags:
// sums[t] are the running sums of the prediction-error filter (Durbin 1960),
// weights[t] is the innovation variance over that of the row, and slopes[v] and
// logWeightSlopes[v] are their derivatives by u[v] once differentiated.
type filters struct {
	sums            [][]float64
	weights         []float64
	logWeights      []float64
	slopes          [][][]float64
	logWeightSlopes [][]float64
}

func newFilters(u []float64) *filters {
	p := len(u)
	f := &filters{sums: [][]float64{{1}}, weights: make([]float64, p+1), logWeights: make([]float64, p+1)}
	for t := 1; t <= p; t++ {
		f.sums = append(f.sums, lengthen(f.sums[t-1], math.Tanh(u[t-1]), away(u[t-1])))
	}
	f.weights[p] = 1
	for t := p - 1; t >= 0; t-- {
		c := away(u[t]) * away(-u[t])
		f.weights[t] = f.weights[t+1] * c
		f.logWeights[t] = f.logWeights[t+1] + math.Log(c)
	}
	return f
}

// away is 1 - tanh u, with all its digits.
func away(u float64) float64 { return 2 / (1 + math.Exp(2*u)) }

// lengthen is Durbin's step on running sums: one more lag with partial
// autocorrelation r, c = 1 - r.
func lengthen(a []float64, r, c float64) []float64 {
	t := len(a)
	whole := a[t-1]
	out := make([]float64, t+1)
	for j := range t {
		out[j] = a[j] - r*(whole-a[t-1-j])
	}
	out[t] = whole * c
	out[t-1] = whole*c + r*a[0] // the same, without cancellation for r near 1
	return out
}

// differentiate fills in the derivatives by u[v].
func (f *filters) differentiate(u []float64, v int) {
	p := len(u)
	slopes := make([][]float64, p+1)
	logs := make([]float64, p+1)
	for t := range slopes {
		switch {
		case t <= v:
			slopes[t] = make([]float64, t+1)
		case t == v+1:
			slopes[t] = turned(f.sums[t-1], away(u[v])*away(-u[v]))
		default:
			slopes[t] = lengthenSlope(slopes[t-1], math.Tanh(u[t-1]), away(u[t-1]))
		}
		if t <= v {
			logs[t] = -2 * math.Tanh(u[v])
		}
	}
	f.slopes = append(f.slopes, slopes)
	f.logWeightSlopes = append(f.logWeightSlopes, logs)
}

// turned is the derivative of lengthen by u, c = dr/du.
func turned(a []float64, c float64) []float64 {
	t := len(a)
	out := make([]float64, t+1)
	for j := range t {
		out[j] = -c * (a[t-1] - a[t-1-j])
	}
	out[t] = -c * a[t-1]
	return out
}

// lengthenSlope is lengthen of a derivative: linear in a.
func lengthenSlope(a []float64, r, c float64) []float64 {
	t := len(a)
	out := make([]float64, t+1)
	for j := range t {
		out[j] = a[j] - r*(a[t-1]-a[t-1-j])
	}
	out[t] = a[t-1] * c
	return out
}

// coefficients are the AR coefficients of the errors.
func (l *likelihood) coefficients(u []float64) []float64 {
	phi := []float64{}
	for _, v := range u {
		r := math.Tanh(v)
		next := make([]float64, len(phi)+1)
		for i, a := range phi {
			next[i] = a - r*phi[len(phi)-1-i]
		}
		next[len(phi)] = r
		phi = next
	}
	return phi
}

// atEdge reports whether a partial autocorrelation has run to 1.
func (l *likelihood) atEdge(u []float64) bool {
	for _, v := range u {
		if v > edge-0.5 {
			return true
		}
	}
	return false
}
