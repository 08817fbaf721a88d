package thermal

// Radiation among sheets of which some pass infrared: every face may see several others, and the
// surroundings through them (net radiation method; ISO 15099:2003, 5.3.2, from memory).

import "math"

// exchange is the radiation of a sequence of sheets, linear in the black emissions σT⁴ of its faces,
// of the outside and of the room, in that order.
type exchange struct {
	n     int
	plain [MaxSheets + 1]bool                     // whether opaque sheets alone bound a gap, the outside, the room
	sent  [MaxSheets + 1][2*MaxSheets + 2]float64 // net flux towards the inside, in front of each sheet and behind the last
	taken [2 * MaxSheets][2*MaxSheets + 2]float64 // net absorbed by each face
}

// newExchange solves the radiosities for a unit of emission of every source.
func newExchange(sheets []Sheet) *exchange {
	n := len(sheets)
	x := &exchange{n: n}
	faces := 2 * n
	for g := range n + 1 {
		x.plain[g] = (g == 0 || sheets[g-1].Transmittance == 0) && (g == n || sheets[g].Transmittance == 0)
	}
	// Radiosities J of the faces: J = ε E + τ·(what falls on the other face) + ρ·(what falls on it).
	var m [2 * MaxSheets][2 * MaxSheets]float64
	var rhs [2 * MaxSheets][2*MaxSheets + 2]float64
	// falls adds what falls on a face, times a factor, to the equation of row.
	falls := func(row, face int, factor float64) {
		switch {
		case face == 0:
			rhs[row][faces] += factor
		case face == faces-1:
			rhs[row][faces+1] += factor
		case face%2 == 0:
			m[row][face-1] -= factor
		default:
			m[row][face+1] -= factor
		}
	}
	for i := range faces {
		s := &sheets[i/2]
		e := s.Emissivity[i%2]
		m[i][i]++
		rhs[i][i] += e
		falls(i, i, max(0, 1-e-s.Transmittance))
		falls(i, i^1, s.Transmittance)
	}
	sources := faces + 2
	for i := range faces { // diagonally dominant
		for j := i + 1; j < faces; j++ {
			f := m[j][i] / m[i][i]
			if f == 0 {
				continue
			}
			for k := i; k < faces; k++ {
				m[j][k] -= float64(f * m[i][k])
			}
			for k := range sources {
				rhs[j][k] -= float64(f * rhs[i][k])
			}
		}
	}
	for i := faces - 1; i >= 0; i-- {
		for k := range sources {
			v := rhs[i][k]
			for j := i + 1; j < faces; j++ {
				v -= float64(m[i][j] * rhs[j][k])
			}
			rhs[i][k] = v / m[i][i]
		}
	}
	// on returns what falls on a face from source k.
	on := func(face, k int) float64 {
		switch {
		case face == 0:
			return unit(k == faces)
		case face == faces-1:
			return unit(k == faces+1)
		case face%2 == 0:
			return rhs[face-1][k]
		}
		return rhs[face+1][k]
	}
	for k := range sources {
		for i := range faces {
			x.taken[i][k] = sheets[i/2].Emissivity[i%2] * (on(i, k) - unit(i == k))
		}
		for g := range n {
			x.sent[g][k] = on(2*g, k) - rhs[2*g][k]
		}
		x.sent[n][k] = rhs[faces-1][k] - on(faces-1, k)
	}
	return x
}

func unit(is bool) float64 {
	if is {
		return 1
	}
	return 0
}

// emissions returns the black emission of every source.
func (x *exchange) emissions(b *Balance) (e [2*MaxSheets + 2]float64) {
	black := func(t float64) float64 { return StefanBoltzmann4 * (t * t) * (t * t) }
	for i := range 2 * x.n {
		e[i] = black(b.SurfaceK[i])
	}
	e[2*x.n], e[2*x.n+1] = black(b.Surroundings.OutsideRadiantK), black(b.Surroundings.InsideRadiantK)
	return e
}

// look takes the radiation at the present temperatures.
func (x *exchange) look(w *work) {
	b := w.b
	e := x.emissions(b)
	sources := 2*x.n + 2
	sum := func(row *[2*MaxSheets + 2]float64) (v float64) {
		for k := range sources {
			v += float64(row[k] * e[k])
		}
		return v
	}
	for i := range 2 * x.n {
		b.AbsorbedWM2[i] = sum(&x.taken[i])
	}
	set := func(g int, to *Exchange, outerK, innerK float64) {
		to.RadiatedWM2 = sum(&x.sent[g])
		to.Radiative = math.NaN()
		if x.plain[g] {
			to.Radiative = w.s.emissivity[g] * StefanBoltzmann4 * (outerK*outerK + innerK*innerK) * (outerK + innerK)
		}
	}
	last := 2*x.n - 1
	set(0, &b.Outside, b.Surroundings.OutsideRadiantK, b.SurfaceK[0])
	for g := 1; g < x.n; g++ {
		set(g, &b.Gaps[g-1], b.SurfaceK[2*g-1], b.SurfaceK[2*g])
	}
	set(x.n, &b.Room, b.SurfaceK[last], b.Surroundings.InsideRadiantK)
}

// step solves for the step of all temperatures: the residuals of all faces over their slopes.
func (x *exchange) step(w *work) {
	s, b := w.s, w.b
	faces := 2 * x.n
	var m [2 * MaxSheets][2 * MaxSheets]float64
	var rhs [2 * MaxSheets]float64
	for k := range x.n {
		o, i := 2*k, 2*k+1
		g := 1 / s.resistance[k]
		outer, inner := &w.b.links[k], &w.b.links[k+1]
		rhs[o] = outer.flux + b.SunWM2[o] + b.AbsorbedWM2[o] - b.ConductedWM2[k]
		rhs[i] = b.ConductedWM2[k] + b.SunWM2[i] + b.AbsorbedWM2[i] - inner.flux
		m[o][o] += outer.inner + g
		m[o][i] -= g
		m[i][i] += inner.outer + g
		m[i][o] -= g
		if k > 0 {
			m[o][o-1] -= outer.outer
		}
		if k < x.n-1 {
			m[i][i+1] -= inner.inner
		}
	}
	for j := range faces {
		t := b.SurfaceK[j]
		slope := 4 * StefanBoltzmann4 * t * t * t
		for i := range faces {
			m[i][j] -= float64(x.taken[i][j] * slope)
		}
	}
	for i := range faces { // diagonally dominant but for a little in gaps with gas
		for j := i + 1; j < faces; j++ {
			f := m[j][i] / m[i][i]
			for k := i + 1; k < faces; k++ {
				m[j][k] -= float64(f * m[i][k])
			}
			rhs[j] -= float64(f * rhs[i])
		}
	}
	for i := faces - 1; i >= 0; i-- {
		v := rhs[i]
		for j := i + 1; j < faces; j++ {
			v -= float64(m[i][j] * w.step[j])
		}
		w.step[i] = v / m[i][i]
	}
	for k := range x.n {
		w.stepDrop[k] = w.step[2*k] - w.step[2*k+1]
	}
}
