package series

import (
	"math"
	"math/cmplx"

	"gonum.org/v1/gonum/dsp/fourier"
)

// directCosines is the number of multiplications from which the Fourier route
// is the faster one.
const directCosines = 1 << 16

// CosineSums are the first nu cosine coefficients of v,
//
//	sum over t of cos(pi j (t - 1/2)/n) v[t],  j = 1..nu, t = 1..n
//
// in O(n log n). It panics when nu is negative.
func CosineSums(v []float64, nu int) []float64 {
	n := len(v)
	if nu < 0 {
		panic("series: a negative number of cosines")
	}
	if n*nu <= directCosines {
		return cosinesDirect(v, nu)
	}
	return cosinesByChirp(v, nu)
}

func cosinesDirect(v []float64, nu int) []float64 {
	sums := make([]float64, nu)
	for j := range sums {
		step := math.Pi * float64(j+1) / float64(len(v))
		for t, x := range v {
			sums[j] += math.Cos(step*(float64(t)+0.5)) * x
		}
	}
	return sums
}

// cosinesByChirp writes the product of frequency and time as half of squares,
// jt = (j^2 + t^2 - (j-t)^2)/2, so that the sums become one convolution of a
// length that suits the transform whatever n is (Bluestein 1970).
func cosinesByChirp(v []float64, nu int) []float64 {
	n := len(v)
	size := 1
	for size < n+nu+1 {
		size *= 2
	}
	a, b := make([]complex128, size), make([]complex128, size)
	for t, x := range v {
		a[t] = complex(x, 0) * chirp(t, n, -1)
		if t > 0 {
			b[size-t] = chirp(t, n, 1)
		}
	}
	for j := 0; j <= nu; j++ {
		b[j] = chirp(j, n, 1)
	}
	fft := fourier.NewCmplxFFT(size)
	a, b = fft.Coefficients(a, a), fft.Coefficients(b, b)
	for i := range a {
		a[i] *= b[i]
	}
	a = fft.Sequence(a, a)
	sums := make([]float64, nu)
	for j := range sums {
		half := cmplx.Rect(1, -math.Pi*float64(j+1)/float64(2*n))
		sums[j] = real(a[j+1]*chirp(j+1, n, -1)*half) / float64(size)
	}
	return sums
}

// chirp is exp(sign i pi k^2/(2n)); the square is reduced first, for large
// angles lose digits.
func chirp(k, n int, sign float64) complex128 {
	angle := k % (4 * n) * k % (4 * n)
	return cmplx.Rect(1, sign*math.Pi*float64(angle)/float64(2*n))
}
