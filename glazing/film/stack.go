package film

// Films thin enough for light to interfere: the amplitudes of a stack of them.
//
// In a medium of the index N = n + ik a plane wave has, in units of 2π/λ, the wave number κ along the
// films, which is the same in every medium, and q = √(N² − κ²) across them. Both polarisations follow
// one set of formulas in a tangential field F and its partner G, with G = yF in a wave that travels
// forward: F is the electric field and y = q for S, F the magnetic field and y = q/N² for P. A film
// joins the fields of its faces (Abelès, Ann. Phys. (Paris) 5 (1950) 596, from memory), with δ = 2πqd/λ:
//
//	F = cos δ F' − i sin δ/y G'
//	G = −i y sin δ F' + cos δ G'
//
// cos δ and sin δ have no bound where a film is opaque. They are taken times a = |exp(iδ)| ≤ 1, with
// which every term is bounded. The product of all a is kept beside the fields: only what is
// transmitted needs it, and it may come down to 0.

import "math"

// A Layer is a film at one wavelength: its index n + ik, which must not be 0, and its thickness.
type Layer struct {
	Index       complex128
	ThicknessNM float64
}

// An Amplitude holds what a stack reflects and transmits of a wave of the amplitude 1: R and T of light
// from the first medium, RBack and TBack of light from the last. T and TBack are of the electric
// field, R and RBack of the field that is tangential, so that at normal incidence P and S reflect
// opposite amplitudes. The share of the power is |R|², and |T|² times Re y of the last medium over
// Re y of the first, in P also times |N|² of the last over |N|² of the first.
type Amplitude struct{ R, T, RBack, TBack complex128 }

// Amplitudes returns the amplitudes of films between two half spaces, in both polarisations. The
// films are listed as light from the first medium meets them. The angle is that in the first
// medium; where that absorbs, κ = n sin θ is taken of its real part n, as of light that came into it
// from a transparent medium.
func Amplitudes(first complex128, films []Layer, last complex128, wavelengthNM, angleDeg float64) (s, p Amplitude) {
	sin, cos := math.Sincos(angleDeg * math.Pi / 180)
	along := float64(real(first) * sin * real(first) * sin)
	a, b := newMedium(first, along), newMedium(last, along)
	if imag(first) == 0 { // exact where the difference of squares is small
		a.q = complex(real(first)*cos, 0)
	}
	ya, yb := a.admittances(), b.admittances()
	c := newFields(yb)
	for i := range films {
		f := films[len(films)-1-i]
		m := newMedium(f.Index, along)
		x := m.crossing(along, 2*math.Pi/wavelengthNM*f.ThicknessNM)
		c.through(&x, m.square, 1/m.square, along)
		c.bound()
	}
	s = c[0].amplitude(ya[0], yb[0])
	if along == 0 {
		return s, Amplitude{R: -s.R, T: s.T, RBack: -s.RBack, TBack: s.TBack}
	}
	p = c[1].amplitude(ya[1], yb[1])
	p.T *= first / last
	p.TBack *= last / first
	return s, p
}

// A medium has the index squared and the wave number across the films.
type medium struct{ square, q complex128 }

// newMedium returns the medium of an index at κ².
func newMedium(index complex128, along float64) medium {
	n, k := real(index), imag(index)
	square := complex(float64((n-k)*(n+k)), 2*n*k)
	qr, qi, _ := wave(real(square)-along, imag(square))
	return medium{square, complex(qr, qi)}
}

// admittances are y of S and of P.
func (m medium) admittances() [2]complex128 { return [2]complex128{m.q, product(m.q, 1/m.square)} }

// crossing is that of a film of the medium, from κ² and 2πd/λ.
func (m medium) crossing(along, kd float64) (x crossing) {
	x.root(real(m.square)-along, imag(m.square))
	x.set(kd)
	return x
}

// wave returns q and |q|² from q²: the root in the upper half plane, from the larger part as in root.
// Where q is 0 a negligible one stands in, so that sin δ/q keeps its limit.
func wave(qqr, qqi float64) (qr, qi, h float64) {
	const negligible = 1e-30
	h = math.Sqrt(float64(qqr*qqr) + float64(qqi*qqi))
	if h == 0 {
		return negligible, 0, negligible * negligible
	}
	if qqr >= 0 {
		qr = math.Sqrt((h + qqr) / 2)
		return qr, qqi / (2 * qr), h
	}
	qi = math.Sqrt((h - qqr) / 2)
	return qqi / (2 * qi), qi, h
}

// columns are the fields at a face of a stack, in one polarisation, that two waves in the last medium belong
// to: F, G to the one that leaves, (1, y), and H, K to the one that arrives, (1, −y). The fields are times
// crossed.
type columns struct {
	fr, fi, gr, gi, hr, hi, kr, ki float64
	crossed                        float64
}

// fields are the columns of S and P.
type fields [2]columns

// newFields returns the fields in the last medium, of the y of S and P.
func newFields(y [2]complex128) fields {
	return fields{newColumns(y[0]), newColumns(y[1])}
}

func newColumns(y complex128) columns {
	return columns{fr: 1, gr: real(y), gi: imag(y), hr: 1, kr: -real(y), ki: -imag(y), crossed: 1}
}

// A crossing is the matrix of a film in S, times a: F' = C F + A G, G' = B F + C G, with
//
//	C = a cos δ    A = S/q    B = qS    S = −i a sin δ
//
// and q, |q|². Without loss, and where the wave is not evanescent, it is plain: C is real, A and B imaginary.
// It is made in two steps, of which each runs through many wavelengths faster than both together.
type crossing struct {
	cr, ci, ar, ai, br, bi float64
	a                      float64
	qr, qi, qq             float64
	plain                  bool
}

// root sets q from q².
func (x *crossing) root(qqr, qqi float64) {
	x.plain = qqi == 0 && qqr > 0
	if x.plain {
		x.qr, x.qi = math.Sqrt(qqr), 0
		return
	}
	x.qr, x.qi, x.qq = wave(qqr, qqi)
}

// nearCritical is the |q|² below which a film's wave runs almost along it.
const nearCritical = 1e-3

// set sets the matrix from q and 2πd/λ. With the real and imaginary part φ, β of δ, and so a = exp(−β):
//
//	C = cos φ (1 + a²)/2 − i sin φ (1 − a²)/2
//	S = cos φ (1 − a²)/2 − i sin φ (1 + a²)/2
func (x *crossing) set(kd float64) {
	qr, qi := x.qr, x.qi
	if x.plain {
		sin, cos := math.Sincos(kd * qr)
		x.cr, x.ai, x.bi, x.a = cos, -sin/qr, -sin*qr, 1
		return
	}
	a := math.Exp(-kd * qi)
	sin, cos := math.Sincos(kd * qr)
	plus, minus := (1+float64(a*a))/2, (1-float64(a*a))/2
	if x.qq < nearCritical { // S is divided by q
		minus = -math.Expm1(-2*kd*qi) / 2
	}
	sr, si := cos*minus, -sin*plus
	inverse := 1 / x.qq
	x.cr, x.ci = cos*plus, -sin*minus
	x.ar, x.ai = (float64(sr*qr)+float64(si*qi))*inverse, (float64(si*qr)-float64(sr*qi))*inverse
	x.br, x.bi = float64(sr*qr)-float64(si*qi), float64(sr*qi)+float64(si*qr)
	x.a = a
}

// through takes the fields through one more film, of N² and its inverse, at κ². In P, y = q/N². At normal
// incidence, κ = 0, both polarisations are one, and S alone is computed.
func (c *fields) through(x *crossing, square, inverse complex128, along float64) {
	er, ei, ir, ii := real(square), imag(square), real(inverse), imag(inverse)
	cr, ci, ar, ai, br, bi := x.cr, x.ci, x.ar, x.ai, x.br, x.bi
	if x.plain {
		for i := range c {
			x := &c[i]
			fr, fi, gr, gi, hr, hi, kr, ki := x.fr, x.fi, x.gr, x.gi, x.hr, x.hi, x.kr, x.ki
			x.fr, x.fi = float64(cr*fr)-float64(ai*gi), float64(cr*fi)+float64(ai*gr)
			x.gr, x.gi = float64(cr*gr)-float64(bi*fi), float64(cr*gi)+float64(bi*fr)
			x.hr, x.hi = float64(cr*hr)-float64(ai*ki), float64(cr*hi)+float64(ai*kr)
			x.kr, x.ki = float64(cr*kr)-float64(bi*hi), float64(cr*ki)+float64(bi*hr)
			if along == 0 {
				return
			}
			ai, bi = ai*er, bi*ir
		}
		return
	}
	a := x.a
	for i := range c {
		x := &c[i]
		fr, fi, gr, gi := x.fr, x.fi, x.gr, x.gi
		x.fr = (float64(cr*fr) - float64(ci*fi)) + (float64(ar*gr) - float64(ai*gi))
		x.fi = (float64(cr*fi) + float64(ci*fr)) + (float64(ar*gi) + float64(ai*gr))
		x.gr = (float64(br*fr) - float64(bi*fi)) + (float64(cr*gr) - float64(ci*gi))
		x.gi = (float64(br*fi) + float64(bi*fr)) + (float64(cr*gi) + float64(ci*gr))
		hr, hi, kr, ki := x.hr, x.hi, x.kr, x.ki
		x.hr = (float64(cr*hr) - float64(ci*hi)) + (float64(ar*kr) - float64(ai*ki))
		x.hi = (float64(cr*hi) + float64(ci*hr)) + (float64(ar*ki) + float64(ai*kr))
		x.kr = (float64(br*hr) - float64(bi*hi)) + (float64(cr*kr) - float64(ci*ki))
		x.ki = (float64(br*hi) + float64(bi*hr)) + (float64(cr*ki) + float64(ci*kr))
		x.crossed *= a
		if along == 0 {
			return
		}
		ar, ai = float64(ar*er)-float64(ai*ei), float64(ar*ei)+float64(ai*er)
		br, bi = float64(br*ir)-float64(bi*ii), float64(br*ii)+float64(bi*ir)
	}
}

// bound scales the fields down if they have grown, as they do film by film where metals and dielectrics
// alternate. It is needed after eight films at the latest.
func (c *fields) bound() {
	const large, scale = 0x1p200, 0x1p-200
	for i := range c {
		x := &c[i]
		if max(math.Abs(x.fr), math.Abs(x.fi), math.Abs(x.gr), math.Abs(x.gi)) < large {
			continue
		}
		for _, f := range []*float64{&x.fr, &x.fi, &x.gr, &x.gi, &x.hr, &x.hi, &x.kr, &x.ki, &x.crossed} {
			*f *= scale
		}
	}
}

// amplitude closes the stack with its first medium: R = (yF − G)/(yF + G), RBack = −(yH + K)/(yF + G), and
// T = 2y/(yF + G) with y of the medium that the light comes from. What is transmitted is F.
func (c *columns) amplitude(first, last complex128) Amplitude {
	f, g, h, k := complex(c.fr, c.fi), complex(c.gr, c.gi), complex(c.hr, c.hi), complex(c.kr, c.ki)
	a, b := product(first, f), product(first, h)
	all := a + g
	return Amplitude{
		R: (a - g) / all, RBack: -(b + k) / all,
		T: 2 * first / all * complex(c.crossed, 0), TBack: 2 * last / all * complex(c.crossed, 0),
	}
}

// product is a product of complex numbers that no processor fuses.
func product(a, b complex128) complex128 {
	return complex(float64(real(a)*real(b))-float64(imag(a)*imag(b)), float64(real(a)*imag(b))+float64(imag(a)*real(b)))
}
