package main

import (
	"math"
	"math/rand/v2"
)

// family makes pairs of series of one kind. Innovations of the two series are
// correlated rho; 0 makes them independent.
type family struct {
	name     string
	drifting bool // at least one series drifts
	season   int
	make     func(r *rand.Rand, n int, rho float64) (x, y, ex, ey []float64)
}

// innovations are two series of normal values correlated rho.
func innovations(r *rand.Rand, n int, rho float64) (a, b []float64) {
	a, b = make([]float64, n), make([]float64, n)
	for i := range a {
		a[i] = r.NormFloat64()
		b[i] = rho*a[i] + math.Sqrt(1-rho*rho)*r.NormFloat64()
	}
	return a, b
}

// each is a pair in which both series are made from their innovations alike.
func each(build func(r *rand.Rand, e []float64) []float64) func(*rand.Rand, int, float64) (x, y, ex, ey []float64) {
	return func(r *rand.Rand, n int, rho float64) (x, y, ex, ey []float64) {
		const burn = 200
		ex, ey = innovations(r, n+burn, rho)
		x, y = build(r, ex), build(r, ey)
		return x[burn:], y[burn:], ex[burn:], ey[burn:]
	}
}

func autoregression(phi float64) func(*rand.Rand, []float64) []float64 {
	return func(_ *rand.Rand, e []float64) []float64 {
		x := make([]float64, len(e))
		for t := range e {
			x[t] = e[t]
			if t > 0 {
				x[t] += phi * x[t-1]
			}
		}
		return x
	}
}

func walk(_ *rand.Rand, e []float64) []float64 { return autoregression(1)(nil, e) }

// plus adds to what build makes a fixed course along the rows.
func plus(build func(*rand.Rand, []float64) []float64, course func(r *rand.Rand, n int) func(t int) float64) func(*rand.Rand, []float64) []float64 {
	return func(r *rand.Rand, e []float64) []float64 {
		x := build(r, e)
		at := course(r, len(e))
		for t := range x {
			x[t] += at(t)
		}
		return x
	}
}

// slope is a line of that rise a row, up or down.
func slope(perRow float64) func(*rand.Rand, int) func(int) float64 {
	return func(r *rand.Rand, _ int) func(int) float64 {
		sign := float64(2*r.IntN(2) - 1)
		return func(t int) float64 { return sign * perRow * float64(t) }
	}
}

// cycle is a fixed season of 12 steps with its own phase.
func cycle(amplitude float64) func(*rand.Rand, int) func(int) float64 {
	return func(r *rand.Rand, _ int) func(int) float64 {
		phase := 2 * math.Pi * r.Float64()
		return func(t int) float64 { return amplitude * math.Sin(2*math.Pi*float64(t)/12+phase) }
	}
}

// localLevel is a walk with innovations of sd 0.3 measured with noise of sd 1;
// a related pair shares both, the walk's innovations and the noise.
func localLevel(r *rand.Rand, n int, rho float64) (x, y, ex, ey []float64) {
	wx, wy := innovations(r, n, rho)
	ex, ey = innovations(r, n, rho)
	measured := func(w, e []float64) []float64 {
		x := make([]float64, n)
		level := 0.0
		for t := range e {
			level += 0.3 * w[t]
			x[t] = level + e[t]
		}
		return x
	}
	return measured(wx, ex), measured(wy, ey), ex, ey
}

func movingAverage(theta float64) func(*rand.Rand, []float64) []float64 {
	return func(_ *rand.Rand, e []float64) []float64 {
		x := make([]float64, len(e))
		for t := range e {
			x[t] = e[t]
			if t > 0 {
				x[t] += theta * e[t-1]
			}
		}
		return x
	}
}

// families of the design; a strong trend rises 10 sd over 100 rows, a weak one 1.2.
func families() []family {
	ar := autoregression
	return []family{
		{"walks", true, 0, each(walk)},
		{"walks with trend", true, 0, each(plus(walk, slope(0.2)))},
		{"strong trend + AR(1) 0.3", true, 0, each(plus(ar(0.3), slope(0.1)))},
		{"strong trend + white", true, 0, each(plus(ar(0), slope(0.1)))},
		{"weak trend + white", true, 0, each(plus(ar(0), slope(0.012)))},
		{"AR(1) 0.3", false, 0, each(ar(0.3))},
		{"AR(1) 0.6", false, 0, each(ar(0.6))},
		{"AR(1) 0.9", false, 0, each(ar(0.9))},
		{"AR(1) 0.6 and -0.5", false, 0, unlike(ar(0.6), ar(-0.5))},
		{"MA(1) -0.6", false, 0, each(movingAverage(-0.6))},
		{"white", false, 0, each(ar(0))},
		{"local level", true, 0, localLevel},
		{"walk and AR(1) 0.6", true, 0, unlike(walk, ar(0.6))},
		{"season + white", false, 12, each(plus(ar(0), cycle(3)))},
		{"season + AR(1) 0.6", false, 12, each(plus(ar(0.6), cycle(3)))},
		{"season + walk", true, 12, each(plus(walk, cycle(6)))},
		{"season + trend", true, 12, each(plus(plus(ar(0.3), slope(0.1)), cycle(3)))},
		{"stochastic season", true, 12, each(changingSeason)},
		{"variance doubling", false, 0, each(spreading)},
		{"level break", true, 0, each(plus(ar(0.3), halfway(3)))},
		{"counts", false, 0, each(counted)},
	}
}

// unlike is a pair of two different kinds.
func unlike(first, second func(*rand.Rand, []float64) []float64) func(*rand.Rand, int, float64) (x, y, ex, ey []float64) {
	return func(r *rand.Rand, n int, rho float64) (x, y, ex, ey []float64) {
		const burn = 200
		ex, ey = innovations(r, n+burn, rho)
		x, y = first(r, ex), second(r, ey)
		return x[burn:], y[burn:], ex[burn:], ey[burn:]
	}
}

// changingSeason has a season whose twelve places walk by themselves.
func changingSeason(r *rand.Rand, e []float64) []float64 {
	x := make([]float64, len(e))
	for t := range e {
		x[t] = e[t]
		if t >= 12 {
			x[t] += x[t-12]
		}
	}
	return x
}

// spreading is white noise whose variance doubles halfway.
func spreading(_ *rand.Rand, e []float64) []float64 {
	x := make([]float64, len(e))
	half := (len(e) + 200) / 2 // of the rows after the burn-in
	for t := range e {
		x[t] = e[t]
		if t >= half {
			x[t] *= math.Sqrt2
		}
	}
	return x
}

// halfway is a step of that height in the middle of the rows, up or down.
func halfway(height float64) func(*rand.Rand, int) func(int) float64 {
	return func(r *rand.Rand, n int) func(int) float64 {
		sign := float64(2*r.IntN(2) - 1)
		return func(t int) float64 {
			if t >= (n+200)/2 {
				return sign * height
			}
			return 0
		}
	}
}

// counted are small counts with a mean of about two.
func counted(_ *rand.Rand, e []float64) []float64 {
	x := make([]float64, len(e))
	for t := range e {
		x[t] = math.Floor(math.Exp(0.6 + 0.5*e[t]))
	}
	return x
}
