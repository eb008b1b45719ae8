package association

import (
	"gonum.org/v1/gonum/dsp/fourier"
	"gonum.org/v1/gonum/floats"
)

// directWork is the number of multiplications from which the Fourier route is
// the faster one.
const directWork = 1 << 18

// lagProducts are sum x[t] x[t+k] for k = 1..lags over the pairs inside a run.
func lagProducts(x []float64, runs []int, lags int) []float64 {
	sums := make([]float64, max(lags, 1))
	from := 0
	for _, end := range runs {
		run := x[from:end]
		from = end
		if lags := min(len(sums), len(run)-1); lags*len(run) <= directWork {
			for k := 1; k <= lags; k++ {
				sums[k-1] += floats.Dot(run[:len(run)-k], run[k:])
			}
		} else {
			addSpectral(sums[:lags], run)
		}
	}
	return sums
}

// addSpectral adds the lag products of one long run: the inverse transform of
// the periodogram of the run, padded so that nothing wraps around.
func addSpectral(sums, run []float64) {
	n := padded(len(run) + len(sums))
	wide := make([]float64, n)
	copy(wide, run)
	fft := fourier.NewFFT(n)
	c := fft.Coefficients(nil, wide)
	for i, v := range c {
		c[i] = complex(real(v)*real(v)+imag(v)*imag(v), 0)
	}
	fft.Sequence(wide, c)
	for k := range sums {
		sums[k] += wide[k+1] / float64(n)
	}
}

// padded is the smallest length of at least n that is a product of twos and at
// most one three or five, for which the transform is quick.
func padded(n int) int {
	best := 1
	for best < n {
		best *= 2
	}
	for _, odd := range []int{3, 5} {
		m := odd
		for m < n {
			m *= 2
		}
		best = min(best, m)
	}
	return best
}
