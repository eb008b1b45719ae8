package regression

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/mat"

	"lagwise/stats"
)

// point is a set of parameters and the value there.
type point struct {
	u     []float64
	value float64
}

// maximise is the highest of the maxima that are reached from the best of many
// starting points.
func (l *likelihood) maximise(what string) (point, error) {
	if l.order == 0 {
		return point{[]float64{}, l.value(nil)}, nil
	}
	best := point{value: math.Inf(-1)}
	for _, start := range l.starts() {
		if p := l.climb(start, -1); p.value > best.value {
			best = p
		}
	}
	if math.IsInf(best.value, -1) {
		return best, &stats.Undefined{What: what, Reason: stats.NotConverged, N: l.basis.n,
			Detail: "the likelihood has no value anywhere"}
	}
	return best, nil
}

// grid are values of u that leave no room for a peak between two of them:
// close where r changes, wide where it is next to -1 or 1.
func grid() []float64 {
	var g []float64
	for u := -edge; u < -4; u += 2 {
		g = append(g, u)
	}
	for u := -4.0; u < 6; u += 0.25 {
		g = append(g, u)
	}
	for u := 6.0; u < edge; u++ {
		g = append(g, u)
	}
	return append(g, edge)
}

// starts are the local maxima of a scan for order 1. For more parameters a
// coarse lattice of the first two, the others 0, stands for it: the best few.
func (l *likelihood) starts() []point {
	if l.order == 1 {
		return l.scan()
	}
	var all []point
	for _, first := range []float64{-1.5, -0.5, 0, 0.5, 1, 1.5, 2.5, 4, 7, edge} {
		for _, second := range []float64{-1.5, -0.5, 0, 0.5, 1.5, 3} {
			u := make([]float64, l.order)
			u[0], u[1] = first, second
			all = append(all, point{u, l.value(u)})
		}
	}
	slices.SortStableFunc(all, func(a, b point) int {
		switch {
		case a.value > b.value:
			return -1
		case a.value < b.value:
			return 1
		}
		return 0
	})
	return all[:8]
}

func (l *likelihood) scan() []point {
	var all, peaks []point
	for _, u := range grid() {
		all = append(all, point{[]float64{u}, l.value([]float64{u})})
	}
	for i, p := range all {
		if (i == 0 || p.value >= all[i-1].value) && (i == len(all)-1 || p.value >= all[i+1].value) {
			peaks = append(peaks, p)
		}
	}
	return peaks
}

// climb is Newton's method from a starting point, with the parameter held
// (none: -1) kept as it is. A step is shortened until the value rises.
func (l *likelihood) climb(start point, held int) point {
	at := point{slices.Clone(start.u), start.value}
	if held >= 0 && len(at.u) == 1 {
		at.value = l.value(at.u)
		return at
	}
	for range 80 {
		e := l.evaluate(at.u)
		if math.IsInf(e.value, -1) {
			return point{at.u, e.value}
		}
		at.value = e.value
		step := l.newton(at.u, l.gradient(at.u, e), held)
		next, size := l.shorten(at, step)
		if size < 1e-12 {
			break
		}
		at = next
	}
	return at
}

// shorten takes the step, or the largest part of it that does not lower the
// value, inside the bounds.
func (l *likelihood) shorten(at point, step []float64) (point, float64) {
	for part := 1.0; part > 1e-6; part /= 4 {
		u := slices.Clone(at.u)
		size := 0.0
		for i, s := range step {
			u[i] = max(-edge, min(edge, u[i]+part*s))
			size = max(size, math.Abs(u[i]-at.u[i]))
		}
		if size == 0 {
			break
		}
		if v := l.value(u); v > at.value || part == 1 && v >= at.value-1e-13*math.Abs(at.value) && size < 1e-4 {
			return point{u, v}, size
		}
	}
	return at, 0
}

// newton is the step -H^-1 g over the parameters that are free, H made
// negative definite by damping, no parameter moving by more than 2. H comes
// from differences of the exact gradient.
func (l *likelihood) newton(u, gradient []float64, held int) []float64 {
	const h = 1e-4
	var free []int
	for i, v := range u {
		if i != held && !(v >= edge && gradient[i] > 0) && !(v <= -edge && gradient[i] < 0) {
			free = append(free, i)
		}
	}
	step := make([]float64, len(u))
	if len(free) == 0 {
		return step
	}
	hessian := mat.NewSymDense(len(free), nil)
	for a, i := range free {
		up, down := slices.Clone(u), slices.Clone(u)
		up[i] += h
		down[i] -= h
		gu, gd := l.gradientAt(up), l.gradientAt(down)
		for b := a; b < len(free); b++ {
			if gu != nil && gd != nil {
				hessian.SetSym(a, b, -(gu[free[b]]-gd[free[b]])/(2*h))
			}
		}
	}
	solved := damped(hessian, gradient, free)
	for a, i := range free {
		step[i] = max(-2, min(2, solved.AtVec(a)))
	}
	return step
}

// damped solves (H + d I) s = g with the least d that makes H + d I positive
// definite.
func damped(h *mat.SymDense, gradient []float64, free []int) *mat.VecDense {
	n := len(free)
	g, s := mat.NewVecDense(n, nil), mat.NewVecDense(n, nil)
	top := 0.0
	for a, i := range free {
		g.SetVec(a, gradient[i])
		top = max(top, math.Abs(h.At(a, a)), math.Abs(gradient[i]))
	}
	add := 0.0
	for range 60 {
		m := mat.NewSymDense(n, nil)
		m.CopySym(h)
		for a := range n {
			m.SetSym(a, a, m.At(a, a)+add)
		}
		var c mat.Cholesky
		if c.Factorize(m) && c.SolveVecTo(s, g) == nil {
			return s
		}
		add = max(4*add, 1e-6*top, 1e-300)
	}
	return s
}
