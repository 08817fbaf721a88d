package film_test

// A second evaluation of films, written apart: Fresnel's coefficients of the electric field, face by
// face, the recursion of a film's reflected waves (Airy), and the heat of the film's fields, summed.

import (
	"math"
	"math/cmplx"

	"panewright/glazing/film"
)

// second holds a stack of media, the first and last of them half spaces, in one polarisation.
type second struct {
	index []complex128
	delta []complex128 // 2π q d/λ, of the half spaces 0
	q     []complex128
	kappa complex128
	p     bool
}

func newSecond(first complex128, films []film.Layer, last complex128, nm float64, kappa complex128, p bool) second {
	s := second{kappa: kappa, p: p}
	add := func(n complex128, d float64) {
		q := cmplx.Sqrt((n - kappa) * (n + kappa))
		if imag(q) < 0 {
			q = -q
		}
		s.index, s.q = append(s.index, n), append(s.q, q)
		s.delta = append(s.delta, q*complex(2*math.Pi*d/nm, 0))
	}
	add(first, 0)
	for _, f := range films {
		add(f.Index, f.ThicknessNM)
	}
	add(last, 0)
	return s
}

// fresnel returns r and t of the electric field from medium i to j, with r of the magnetic sign in P.
func (s second) fresnel(i, j int) (r, t complex128) {
	if !s.p {
		d := s.q[i] + s.q[j]
		return (s.q[i] - s.q[j]) / d, 2 * s.q[i] / d
	}
	ni, nj := s.index[i], s.index[j]
	ci, cj := s.q[i]/ni, s.q[j]/nj // cosines
	d := nj*ci + ni*cj
	return (nj*ci - ni*cj) / d, 2 * ni * ci / d
}

// solve returns r and t, and the forward and backward electric amplitudes at the near face of each medium.
func (s second) solve() (r, t complex128, forward, backward []complex128) {
	n := len(s.index)
	gamma := make([]complex128, n) // reflected over forward at the near side of face i, i+1
	for i := n - 2; i >= 0; i-- {
		rho, _ := s.fresnel(i, i+1)
		x := gamma[i+1] * cmplx.Exp(2i*s.delta[i+1])
		gamma[i] = (rho + x) / (1 + rho*x)
	}
	forward, backward = make([]complex128, n), make([]complex128, n)
	a := complex128(1) // forward at the near side of face i
	for i := range n - 1 {
		rho, tau := s.fresnel(i, i+1)
		next := gamma[i+1] * cmplx.Exp(2i*s.delta[i+1])
		b := a * tau / (1 + rho*next)
		forward[i+1], backward[i+1] = b, b*next
		a = b * cmplx.Exp(1i*s.delta[i+1])
	}
	return gamma[0], forward[n-1], forward, backward
}

// flux is the power that a wave of the electric amplitude 1 carries across the films.
func (s second) flux(i int) float64 {
	if !s.p {
		return real(s.q[i])
	}
	return real(cmplx.Conj(s.q[i]/s.index[i]) * s.index[i]) // E along the film times H*
}

// heat returns the share that each film absorbs: 2π/λ Im(N²)|E|² summed over its thickness (Gauss and
// Legendre of three points in short pieces).
func (s second) heat() []float64 {
	_, _, forward, backward := s.solve()
	var list []float64
	for i := 1; i < len(s.index)-1; i++ {
		pieces := 400 + int(20*cmplx.Abs(s.delta[i]))
		var sum float64
		loss := imag(s.index[i] * s.index[i])
		q, n := s.q[i], s.index[i]
		kd := real(s.delta[i] / q) // 2πd/λ
		if loss > 0 {
			for k := range pieces {
				for _, g := range [3][2]float64{{-math.Sqrt(0.6), 5. / 18}, {0, 8. / 18}, {math.Sqrt(0.6), 5. / 18}} {
					z := (float64(k) + 0.5 + g[0]/2) / float64(pieces) * kd
					f, b := forward[i]*cmplx.Exp(1i*q*complex(z, 0)), backward[i]*cmplx.Exp(-1i*q*complex(z, 0))
					e := sq(f + b)
					if s.p {
						e = sq(q/n*(f-b)) + sq(s.kappa/n*(f+b))
					}
					sum += g[1] * e
				}
			}
		}
		list = append(list, sum/float64(pieces)*kd*loss/s.flux(0))
	}
	return list
}

func sq(z complex128) float64 { return real(z)*real(z) + imag(z)*imag(z) }

// matrix returns r and t between half spaces by the product of 2×2 matrices of cos and sin, each scaled by
// its largest element, whose logarithm is kept: t comes out as an amplitude of the tangential field.
func (s second) matrix() (r, t complex128) {
	y := make([]complex128, len(s.q))
	for i := range y {
		y[i] = s.q[i]
		if s.p {
			y[i] = s.q[i] / (s.index[i] * s.index[i])
		}
	}
	m := [4]complex128{1, 0, 0, 1}
	var logScale complex128
	for i := 1; i < len(s.q)-1; i++ {
		// cos δ and sin δ over exp(−iδ)
		e := cmplx.Exp(2i * s.delta[i])
		logScale += -1i * s.delta[i]
		c, sn := (1+e)/2, (1-e)/2*1i // sin δ exp(iδ) = (1 − e)·i/2
		f := [4]complex128{c, -1i * sn / y[i], -1i * y[i] * sn, c}
		m = [4]complex128{m[0]*f[0] + m[1]*f[2], m[0]*f[1] + m[1]*f[3], m[2]*f[0] + m[3]*f[2], m[2]*f[1] + m[3]*f[3]}
		largest := 0.0
		for _, x := range m {
			largest = max(largest, cmplx.Abs(x))
		}
		for k := range m {
			m[k] /= complex(largest, 0)
		}
		logScale += complex(math.Log(largest), 0)
	}
	y0, y1 := y[0], y[len(y)-1]
	up := m[0] + m[1]*y1
	down := m[2] + m[3]*y1
	return (y0*up - down) / (y0*up + down), 2 * y0 / (y0*up + down) * cmplx.Exp(-logScale)
}

func conj(z complex128) complex128  { return cmplx.Conj(z) }
func exp1i(z complex128) complex128 { return cmplx.Exp(1i * z) }
