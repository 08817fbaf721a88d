package thermal_test

// The second evaluation solves by shooting: it supposes the heat that enters the outermost face,
// follows it inwards through plies and gaps by scalar root finding, and compares what arrives with
// what the room takes. Infrared that passes sheets is found round that, by secant steps on the
// irradiation of their faces. The sun in each ply is integrated exactly, without lumping.

import (
	"errors"
	"math"

	"gonum.org/v1/gonum/mat"

	"panewright/thermal"
)

// A secondCase is a glazing in its surroundings, made for the first and the second evaluation.
type secondCase struct {
	sheets   []thermal.Sheet
	cavities []thermal.Cavity // their gas for the first evaluation
	blends   []secondBlend    // the same gas for the second
	at       thermal.Surroundings
	absorbed []float64
}

// A secondState is what the second evaluation finds. Fluxes count inwards.
type secondState struct {
	surface, irradiation    []float64
	gapConv, gapRad, gapRa  []float64
	gapGamma                []float64
	outsideConv, outsideRad float64
	roomConv, roomRad       float64
}

var errSecond = errors.New("the second evaluation found no state")

func secondPower4(t float64) float64 { return thermal.StefanBoltzmann4 * t * t * t * t }

// secondRoot finds the zero of f between a and b, where it has opposite signs; it steps over
// infinities and settles on a jump (Brent's method).
func secondRoot(f func(float64) float64, a, fa, b, fb float64) float64 {
	for math.IsInf(fa, 0) || math.IsInf(fb, 0) {
		m := a + (b-a)/2
		if m == a || m == b {
			return m
		}
		if fm := f(m); (fm > 0) == (fa > 0) {
			a, fa = m, fm
		} else {
			b, fb = m, fm
		}
	}
	c, fc := a, fa
	d := b - a
	e := d
	for range 300 {
		if (fb > 0) == (fc > 0) {
			c, fc = a, fa
			d = b - a
			e = d
		}
		if math.Abs(fc) < math.Abs(fb) {
			a, b, c = b, c, b
			fa, fb, fc = fb, fc, fb
		}
		tol := 1e-16 * math.Abs(b)
		m := (c - b) / 2
		if math.Abs(m) <= tol || fb == 0 {
			return b
		}
		if math.Abs(e) >= tol && math.Abs(fa) > math.Abs(fb) {
			s := fb / fa
			var p, q float64
			if a == c {
				p, q = 2*m*s, 1-s
			} else {
				u, r := fa/fc, fb/fc
				p = s * (2*m*u*(u-r) - (b-a)*(r-1))
				q = (u - 1) * (r - 1) * (s - 1)
			}
			if p > 0 {
				q = -q
			} else {
				p = -p
			}
			if 2*p < math.Min(3*m*q-math.Abs(tol*q), math.Abs(e*q)) {
				e, d = d, p/q
			} else {
				d, e = m, m
			}
		} else {
			d, e = m, m
		}
		a, fa = b, fb
		if math.Abs(d) > tol {
			b += d
		} else {
			b += math.Copysign(tol, m)
		}
		if b == a {
			return b
		}
		fb = f(b)
	}
	return b
}

const secondColdest, secondHottest = 1.0, 50000.0

// secondFall finds the temperature at which a falling f is zero, from a start; it is ±Inf where none is.
func secondFall(f func(float64) float64, start float64) float64 {
	a, fa := start, f(start)
	for step := 0.5; fa != 0; step *= 4 {
		b := a + math.Copysign(step, fa)
		if b < secondColdest || b > secondHottest {
			b = math.Min(math.Max(b, secondColdest), secondHottest)
		}
		fb := f(b)
		if (fb > 0) != (fa > 0) || fb == 0 {
			return secondRoot(f, a, fa, b, fb)
		}
		if b == a {
			return math.Copysign(math.Inf(1), fa)
		}
		a, fa = b, fb
	}
	return a
}

// convection is the heat across gap k from the face at t2 to that at t3, with its Ra and γ.
func (c *secondCase) convection(k int, t2, t3 float64) (flux, ra, gamma float64) {
	v := &c.cavities[k]
	if v.Vacuum != nil {
		return secondPillars(v.Vacuum) * (t2 - t3), 0, 0
	}
	conductivity, ra := c.blends[k].rayleigh(v.WidthM, t2-t3, (t2+t3)/2)
	gamma = secondAngle(c.at.TiltDeg, t3 > t2)
	nu := secondNusselt(ra, c.at.HeightM/v.WidthM, gamma)
	return nu * conductivity / v.WidthM * (t2 - t3), ra, gamma
}

// secondPillars is the conductance of an evacuated gap without radiation: pillars between two
// narrowings (Collins and Simko 1998, from memory), and 0.8 W/(m²·K·Pa) of residual gas.
func secondPillars(v *thermal.Vacuum) float64 {
	resistance := 0.0
	for _, k := range v.GlassWMK {
		resistance += 0.25 / (k * v.PillarRadiusM)
	}
	if v.PillarWMK > 0 {
		resistance += v.PillarHeightM / v.PillarWMK / (math.Pi * math.Pow(v.PillarRadiusM, 2))
	}
	return math.Pow(v.PillarPitchM, -2)/resistance + 0.8*v.PressurePa
}

func (c *secondCase) reflectance(face int) float64 {
	s := &c.sheets[face/2]
	return 1 - s.Emissivity[face%2] - s.Transmittance
}

func (c *secondCase) emissivity(face int) float64 { return c.sheets[face/2].Emissivity[face%2] }

// roomConvection is convection from a face at ts to the room.
func (c *secondCase) roomConvection(ts float64) float64 {
	if c.at.InsideConvection > 0 {
		return c.at.InsideConvection * (ts - c.at.InsideK)
	}
	return secondRoomConvection(ts, c.at.InsideK, c.at.HeightM, c.at.TiltDeg)
}

// shot follows the heat q0 that the outermost face takes up; through[f] is the infrared that
// leaves face f after passing its sheet. It writes s and returns the heat that arrives at the
// innermost face less the heat that this gives off: it rises with q0.
func (c *secondCase) shot(q0 float64, through []float64, s *secondState) float64 {
	n := len(c.sheets)
	at := &c.at
	e1 := c.emissivity(0)
	t := secondFall(func(t float64) float64 {
		return at.OutsideConvection*(at.OutsideK-t) + e1*(secondPower4(at.OutsideRadiantK)-secondPower4(t)) - q0
	}, at.OutsideK)
	q := q0
	for i := range n {
		if math.IsInf(t, 0) {
			return -t
		}
		s.surface[2*i] = t
		for _, ply := range c.sheets[i].Plies {
			sun := ply.Share * c.absorbed[i]
			t -= (q + sun/2) * ply.ResistanceM2KW // a parabola where the sun is spread evenly
			q += sun
		}
		if t < secondColdest {
			return math.Inf(1)
		}
		if t > secondHottest {
			return math.Inf(-1)
		}
		s.surface[2*i+1] = t
		if i == n-1 {
			break
		}
		f2, f3 := 2*i+1, 2*i+2
		ea, eb, ra, rb := c.emissivity(f2), c.emissivity(f3), c.reflectance(f2), c.reflectance(f3)
		t2, own := t, ea*secondPower4(t)+through[f2]
		radiosities := func(t3 float64) (j2, j3 float64) {
			other := eb*secondPower4(t3) + through[f3]
			return (own + ra*other) / (1 - ra*rb), (other + rb*own) / (1 - ra*rb)
		}
		t = secondFall(func(t3 float64) float64 { // the heat that leaves face 2, less what reaches it
			conv, _, _ := c.convection(i, t2, t3)
			_, j3 := radiosities(t3)
			return conv + ea*(secondPower4(t2)-j3) - q
		}, t2)
		if math.IsInf(t, 0) {
			return -t
		}
		j2, j3 := radiosities(t)
		s.irradiation[f2], s.irradiation[f3] = j3, j2
		s.gapConv[i] = q - ea*(secondPower4(t2)-j3) // so that a step that is held stays filled
		s.gapRad[i] = j2 - j3
		_, s.gapRa[i], s.gapGamma[i] = c.convection(i, t2, t)
		q += through[f2] - c.sheets[i].Transmittance*j3 + through[f3] - c.sheets[i+1].Transmittance*j2
	}
	last := 2*n - 1
	s.irradiation[0], s.irradiation[last] = secondPower4(at.OutsideRadiantK), secondPower4(at.InsideRadiantK)
	s.outsideConv = at.OutsideConvection * (at.OutsideK - s.surface[0])
	s.outsideRad = s.irradiation[0] - e1*secondPower4(s.surface[0]) - c.reflectance(0)*s.irradiation[0] - c.sheets[0].Transmittance*s.irradiation[1]
	s.roomConv = c.roomConvection(t)
	s.roomRad = c.emissivity(last)*secondPower4(t) + c.reflectance(last)*s.irradiation[last] +
		c.sheets[n-1].Transmittance*s.irradiation[last-1] - s.irradiation[last]
	return q - s.roomConv - c.emissivity(last)*(secondPower4(t)-s.irradiation[last])
}

// settle finds the shot that arrives, for given irradiation of the faces of sheets that pass infrared.
func (c *secondCase) settle(irradiation []float64, s *secondState) error {
	through := make([]float64, len(irradiation))
	for f := range through {
		through[f] = c.sheets[f/2].Transmittance * irradiation[f^1]
	}
	f := func(q0 float64) float64 { return c.shot(q0, through, s) }
	a, b := -2000.0, 2000.0
	fa, fb := f(a), f(b)
	for fa > 0 || fb < 0 {
		if b > 1e7 {
			return errSecond
		}
		a, b = 10*a, 10*b
		fa, fb = f(a), f(b)
	}
	residual := f(secondRoot(f, a, fa, b, fb))
	if math.IsInf(residual, 0) {
		return errSecond
	}
	return nil
}

func newSecondState(n int) *secondState {
	m := 2 * n
	v := func(n int) []float64 { return make([]float64, n) }
	return &secondState{surface: v(m), irradiation: v(m), gapConv: v(n - 1), gapRad: v(n - 1), gapRa: v(n - 1), gapGamma: v(n - 1)}
}

// solve returns the steady state.
func (c *secondCase) solve() (*secondState, error) {
	n := len(c.sheets)
	s := newSecondState(n)
	g := make([]float64, 2*n)
	for f := range g {
		g[f] = (secondPower4(c.at.OutsideRadiantK) + secondPower4(c.at.InsideRadiantK)) / 2
	}
	g[0], g[2*n-1] = secondPower4(c.at.OutsideRadiantK), secondPower4(c.at.InsideRadiantK)
	var free []int // faces towards gaps of sheets that pass infrared
	for f := 1; f < 2*n-1; f++ {
		if c.sheets[f/2].Transmittance > 0 {
			free = append(free, f)
		}
	}
	m := len(free)
	residual := func() ([]float64, float64, error) {
		if err := c.settle(g, s); err != nil {
			return nil, 0, err
		}
		r := make([]float64, m)
		var worst float64
		for i, f := range free {
			r[i] = s.irradiation[f] - g[f]
			worst = math.Max(worst, math.Abs(r[i]))
		}
		return r, worst, nil
	}
	r, worst, err := residual()
	if err != nil || m == 0 {
		return s, err
	}
	var jacobian *mat.Dense
	for range 60 {
		if worst < 1e-11*(1+g[free[0]]) {
			return s, nil
		}
		if jacobian == nil {
			jacobian = mat.NewDense(m, m, nil)
			for j, f := range free {
				keep := g[f]
				h := 1e-5 * math.Max(keep, 1)
				g[f] += h
				moved, _, err := residual()
				if err != nil {
					return s, err
				}
				g[f] = keep
				for i := range free {
					jacobian.Set(i, j, (moved[i]-r[i])/h)
				}
			}
		}
		var step mat.VecDense
		if err := step.SolveVec(jacobian, mat.NewVecDense(m, r)); err != nil {
			return s, err
		}
		for i, f := range free {
			g[f] = math.Max(0, g[f]-step.AtVec(i))
		}
		next, nextWorst, err := residual()
		if err != nil {
			return s, err
		}
		// Broyden: the step should have removed r and left next.
		norm := mat.Dot(&step, &step)
		if nextWorst > worst/2 || norm == 0 {
			jacobian = nil
		} else {
			jacobian.RankOne(jacobian, -1/norm, mat.NewVecDense(m, next), &step)
		}
		r, worst = next, nextWorst
	}
	if worst < 1e-9 {
		return s, nil
	}
	return s, errSecond
}

// imbalance returns the largest energy residual in W/m² of a state, told by other equations than
// shot uses: the radiosities of all faces at once, and finite volumes with nodes at, between and
// within the plies. Convection across a gap is taken from the state where a step is held.
func (c *secondCase) imbalance(s *secondState) float64 {
	n := len(c.sheets)
	m := 2 * n
	a, b := mat.NewDense(m, m, nil), mat.NewVecDense(m, nil)
	for f := range m {
		a.Set(f, f, 1)
		b.SetVec(f, c.emissivity(f)*secondPower4(s.surface[f]))
		irradiate := func(face int, factor float64) { // factor·G of a face
			switch {
			case face == 0:
				b.SetVec(f, b.AtVec(f)+factor*secondPower4(c.at.OutsideRadiantK))
			case face == m-1:
				b.SetVec(f, b.AtVec(f)+factor*secondPower4(c.at.InsideRadiantK))
			case face%2 == 1:
				a.Set(f, face+1, a.At(f, face+1)-factor)
			default:
				a.Set(f, face-1, a.At(f, face-1)-factor)
			}
		}
		irradiate(f, c.reflectance(f))
		irradiate(f^1, c.sheets[f/2].Transmittance)
	}
	var j mat.VecDense
	if err := j.SolveVec(a, b); err != nil {
		return math.Inf(1)
	}
	received := func(f int) float64 {
		switch {
		case f == 0:
			return secondPower4(c.at.OutsideRadiantK)
		case f == m-1:
			return secondPower4(c.at.InsideRadiantK)
		case f%2 == 1:
			return j.AtVec(f + 1)
		}
		return j.AtVec(f - 1)
	}
	absorb := func(f int) float64 { return c.emissivity(f) * (received(f) - secondPower4(s.surface[f])) }
	convected := func(gap int) float64 {
		switch {
		case gap < 0:
			return c.at.OutsideConvection * (c.at.OutsideK - s.surface[0])
		case gap == n-1:
			return c.roomConvection(s.surface[m-1])
		}
		flux, ra, gamma := c.convection(gap, s.surface[2*gap+1], s.surface[2*gap+2])
		if secondNearStep(ra, gamma, 1e-6) {
			return s.gapConv[gap]
		}
		return flux
	}
	var worst float64
	for i := range n {
		outer, inner := c.faceHeat(i, s.surface[2*i], s.surface[2*i+1])
		worst = math.Max(worst, math.Abs(convected(i-1)+absorb(2*i)-outer))
		worst = math.Max(worst, math.Abs(inner+absorb(2*i+1)-convected(i)))
	}
	return worst
}

// faceHeat returns the heat that enters the outer face of a sheet and that which leaves its inner
// face by conduction, by finite volumes: four a ply, whose sun goes to the nodes on either side.
func (c *secondCase) faceHeat(sheet int, outerK, innerK float64) (outer, inner float64) {
	const volumes = 4
	var conductance, source []float64
	for _, ply := range c.sheets[sheet].Plies {
		for range volumes {
			conductance = append(conductance, volumes/ply.ResistanceM2KW)
			source = append(source, ply.Share*c.absorbed[sheet]/volumes)
		}
	}
	n := len(conductance) - 1 // inner nodes; node k lies between volumes k and k+1
	a, b := mat.NewDense(n, n, nil), mat.NewVecDense(n, nil)
	for k := range n {
		a.Set(k, k, conductance[k]+conductance[k+1])
		b.SetVec(k, (source[k]+source[k+1])/2)
		if k > 0 {
			a.Set(k, k-1, -conductance[k])
		}
		if k < n-1 {
			a.Set(k, k+1, -conductance[k+1])
		} else { // temperatures count from that of the outer face
			b.SetVec(k, b.AtVec(k)+conductance[n]*(innerK-outerK))
		}
	}
	var t mat.VecDense
	if err := t.SolveVec(a, b); err != nil {
		return math.NaN(), math.NaN()
	}
	outer = -conductance[0]*t.AtVec(0) - source[0]/2
	inner = conductance[n]*(t.AtVec(n-1)-(innerK-outerK)) + source[n]/2
	return outer, inner
}

// secondNearStep tells whether Ra stands within a fraction of one of the steps of the published
// correlation of vertical gaps, in a gap whose Nu holds it.
func secondNearStep(ra, gamma, within float64) bool {
	if gamma <= 60 {
		return false
	}
	return math.Abs(ra/1e4-1) < within || math.Abs(ra/5e4-1) < within
}

func (s *secondState) nearStep(within float64) bool {
	for i, ra := range s.gapRa {
		if secondNearStep(ra, s.gapGamma[i], within) {
			return true
		}
	}
	return false
}
