package thermal_test

// Random glazings, and the second evaluation against closed forms.

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"panewright/thermal"
)

var secondNames = [...]string{"air", "argon", "krypton", "xenon"} // in the order of the table

// fluid makes a blend ready for the first evaluation.
func (x secondBlend) fluid() thermal.Fluid {
	fractions := map[string]float64{}
	for i, f := range x {
		if f > 0 {
			fractions[secondNames[i]] = f
		}
	}
	m, err := thermal.Mix(fractions)
	if err != nil {
		panic(err)
	}
	f, err := m.Fluid()
	if err != nil {
		panic(err)
	}
	return f
}

func secondGas(widthM float64, x secondBlend) (thermal.Cavity, secondBlend) {
	return thermal.Cavity{WidthM: widthM, Gas: x.fluid()}, x
}

// gap adds a gap with gas and a sheet to a case.
func (c *secondCase) add(widthM float64, x secondBlend, s thermal.Sheet) {
	v, x := secondGas(widthM, x)
	c.cavities, c.blends = append(c.cavities, v), append(c.blends, x)
	c.sheets = append(c.sheets, s)
	c.absorbed = append(c.absorbed, 0)
}

func secondPane(resistance, outer, inner float64) thermal.Sheet {
	return thermal.Sheet{Plies: []thermal.Layer{{ResistanceM2KW: resistance, Share: 1}}, Emissivity: [2]float64{outer, inner}}
}

func (c *secondCase) String() string {
	var b strings.Builder
	for i, s := range c.sheets {
		if i > 0 {
			v := c.cavities[i-1]
			fmt.Fprintf(&b, "  gap %.9g m %v vacuum %+v\n", v.WidthM, c.blends[i-1], v.Vacuum)
		}
		fmt.Fprintf(&b, "  sheet %+v absorbed %.9g\n", s, c.absorbed[i])
	}
	fmt.Fprintf(&b, "  %+v", c.at)
	return b.String()
}

func logUniform(r *rand.Rand, low, high float64) float64 {
	return low * math.Pow(high/low, r.Float64())
}

func oneOf(r *rand.Rand, v ...float64) float64 { return v[r.IntN(len(v))] }

// secondAny returns any legal glazing in any legal surroundings.
func secondAny(r *rand.Rand) *secondCase {
	n := 1 + r.IntN(thermal.MaxSheets)
	c := &secondCase{absorbed: make([]float64, n)}
	films := r.IntN(3) == 0
	for range n {
		c.sheets = append(c.sheets, secondAnySheet(r, films && r.IntN(2) == 0))
	}
	for range n - 1 {
		width := 0.004 + 0.02*r.Float64()
		switch r.IntN(4) {
		case 0:
			width = logUniform(r, 1e-5, 1)
		case 1:
			width = oneOf(r, 1e-5, 1e-3, 0.0127, 0.05, 1)
		}
		v, x := secondGas(width, secondAnyBlend(r))
		if r.IntN(8) == 0 {
			v.Gas, v.WidthM = thermal.Fluid{}, 1e-4+1e-3*r.Float64()
			v.Vacuum = &thermal.Vacuum{PressurePa: oneOf(r, 0, 0.1, 10*r.Float64()), PillarRadiusM: 1e-4 + 4e-4*r.Float64(),
				PillarPitchM: 0.01 + 0.05*r.Float64(), PillarWMK: oneOf(r, 0, 20, 200), PillarHeightM: v.WidthM,
				GlassWMK: [2]float64{1, 0.9 + 0.2*r.Float64()}}
		}
		c.cavities, c.blends = append(c.cavities, v), append(c.blends, x)
	}
	celsius := func() float64 { return thermal.ZeroCelsius - 60 + 120*r.Float64() }
	at := thermal.Surroundings{OutsideK: celsius(), InsideK: celsius(), OutsideConvection: logUniform(r, 4, 200),
		TiltDeg: 180 * r.Float64(), HeightM: logUniform(r, 0.1, 10)}
	at.OutsideRadiantK, at.InsideRadiantK = at.OutsideK, at.InsideK
	if r.IntN(2) == 0 {
		at.OutsideRadiantK, at.InsideRadiantK = celsius(), celsius()
	}
	if r.IntN(3) == 0 {
		at.InsideConvection = logUniform(r, 1, 50)
	}
	switch r.IntN(3) {
	case 0:
		at.TiltDeg = 90
	case 1:
		at.TiltDeg = oneOf(r, 0, 1, 15, 30, 60, 75, 90, 120, 165, 179, 180)
	}
	c.at = at
	if r.IntN(3) > 0 {
		sun := 1500 * r.Float64()
		for i := range c.absorbed {
			c.absorbed[i] = sun * r.Float64() / float64(n)
			if r.IntN(8) == 0 {
				c.absorbed[i] = 0
			}
		}
	}
	return c
}

func secondAnySheet(r *rand.Rand, film bool) thermal.Sheet {
	emissivity := func() float64 {
		return []float64{0.837, 1, logUniform(r, 1e-4, 1), r.Float64()*0.9999 + 1e-4}[r.IntN(4)]
	}
	s := thermal.Sheet{Emissivity: [2]float64{emissivity(), emissivity()}}
	switch {
	case film:
		s.Plies = []thermal.Layer{{ResistanceM2KW: 5e-5 / 0.2, Share: 1}}
		s.Transmittance = oneOf(r, 1e-6, 0.02, 0.98*r.Float64())
		for i := range s.Emissivity {
			s.Emissivity[i] = math.Max(1e-4, s.Emissivity[i]*(1-s.Transmittance))
		}
	case r.IntN(3) == 0:
		a, b := r.Float64(), r.Float64()
		s.Plies = []thermal.Layer{{ResistanceM2KW: 0.002 + 0.01*r.Float64(), Share: a * b},
			{ResistanceM2KW: 0.00152 / 0.22, Share: a * (1 - b)}, {ResistanceM2KW: 0.004, Share: 1 - a}}
	default:
		s.Plies = []thermal.Layer{{ResistanceM2KW: 0.001 + 0.02*r.Float64(), Share: 1}}
	}
	return s
}

func secondAnyBlend(r *rand.Rand) secondBlend {
	var x secondBlend
	if r.IntN(2) == 0 {
		x[r.IntN(4)] = 1
		return x
	}
	var sum float64
	for i := range x {
		if r.IntN(2) == 0 {
			x[i] = r.Float64()
		}
		sum += x[i]
	}
	if sum == 0 {
		return secondBlend{0.1, 0.9}
	}
	for i := range x {
		x[i] /= sum
	}
	return x
}

// The state that shooting finds meets the radiosity system and the finite volumes.
func TestSecondMeetsItsOtherForm(t *testing.T) {
	r := rand.New(rand.NewPCG(41, 43))
	for i := range 100 {
		c := secondAny(r)
		s, err := c.solve()
		if err != nil {
			t.Errorf("case %d: %v\n%v", i, err, c)
			continue
		}
		if got := c.imbalance(s); !(got < 1e-6) {
			t.Errorf("case %d: imbalance %.3g W/m²\n%v", i, got, c)
		}
	}
}

// One black pane that conducts without loss, between fixed coefficients: a scalar equation.
func TestSecondSinglePane(t *testing.T) {
	c := &secondCase{sheets: []thermal.Sheet{secondPane(1e-12, 1, 1)}, absorbed: []float64{300},
		at: thermal.Surroundings{OutsideK: 263, OutsideRadiantK: 250, InsideK: 293, InsideRadiantK: 296, OutsideConvection: 20, InsideConvection: 3, TiltDeg: 90, HeightM: 1}}
	s, err := c.solve()
	if err != nil {
		t.Fatal(err)
	}
	// By hand: 20 (263 − T) + 3 (293 − T) + σ (250⁴ + 296⁴ − 2 T⁴) + 300 = 0 at T, and rises below it.
	balance := func(k float64) float64 {
		return 20*(263-k) + 3*(293-k) + thermal.StefanBoltzmann4*(math.Pow(250, 4)+math.Pow(296, 4)-2*math.Pow(k, 4)) + 300
	}
	if k := s.surface[0]; !(balance(k-1e-9) > 0 && balance(k+1e-9) < 0) {
		t.Errorf("T = %.9f K leaves %.3g W/m²", k, balance(k))
	}
}

// stillVacuum is a gap without any conductance but of its pressure: conductance over 0.8 W/(m²·K·Pa).
func stillVacuum(conductance float64) thermal.Cavity {
	return thermal.Cavity{WidthM: 1e-3, Vacuum: &thermal.Vacuum{PressurePa: conductance / 0.8, PillarRadiusM: 1e-4, PillarPitchM: 1e9,
		PillarHeightM: 1e-3, GlassWMK: [2]float64{1, 1}}}
}

// Black plates with a grey film between them that is in radiative equilibrium exchange
// (τ + ε/2)·σ(T1⁴ − T2⁴) (net radiation balance, derived).
func secondFilmCase(emissivity, transmittance float64) *secondCase {
	film := secondPane(1e-9, emissivity, emissivity)
	film.Transmittance = transmittance
	return &secondCase{
		sheets:   []thermal.Sheet{secondPane(0.004, 1, 1), film, secondPane(0.004, 1, 1)},
		cavities: []thermal.Cavity{stillVacuum(0), stillVacuum(0)}, blends: make([]secondBlend, 2), absorbed: make([]float64, 3),
		at: thermal.Surroundings{OutsideK: 313, OutsideRadiantK: 320, InsideK: 273, InsideRadiantK: 270, OutsideConvection: 100, InsideConvection: 50, TiltDeg: 90, HeightM: 1},
	}
}

func TestSecondFilmBetweenBlackPlates(t *testing.T) {
	for _, tt := range []struct{ emissivity, transmittance, want float64 }{{0.5, 0.4, 0.65}, {0.2, 0.7, 0.8}, {0.9, 0, 0.45}, {0.001, 0.999, 0.9995}} {
		s, err := secondFilmCase(tt.emissivity, tt.transmittance).solve()
		if err != nil {
			t.Fatal(err)
		}
		for _, gap := range s.gapRad {
			if got := gap / (secondPower4(s.surface[1]) - secondPower4(s.surface[4])); math.Abs(got-tt.want) > 1e-6 {
				t.Errorf("exchange factor %.7f, want %g (derived)", got, tt.want)
			}
		}
	}
}

// A double unit in sun as a linear network of two panes.
func TestSecondLinearNetwork(t *testing.T) {
	for _, tt := range []struct{ a1, a2, he, outer, inner float64 }{
		{0.55, 0.02, 16, 56.685, 30.669}, // two-node balance by hand, from memory
		{0.75, 0.01, 12, 75.991, 32.726},
	} {
		const none = 1e-12
		c := &secondCase{sheets: []thermal.Sheet{secondPane(1e-9, none, none), secondPane(1e-9, none, none)},
			cavities: []thermal.Cavity{stillVacuum(1.372)}, blends: make([]secondBlend, 1), absorbed: []float64{tt.a1 * 783, tt.a2 * 783},
			at: thermal.Surroundings{OutsideK: 305.15, OutsideRadiantK: 305.15, InsideK: 297.15, InsideRadiantK: 297.15, OutsideConvection: tt.he, InsideConvection: 7.7, TiltDeg: 90, HeightM: 1}}
		s, err := c.solve()
		if err != nil {
			t.Fatal(err)
		}
		if math.Abs(s.surface[0]-thermal.ZeroCelsius-tt.outer) > 0.002 || math.Abs(s.surface[3]-thermal.ZeroCelsius-tt.inner) > 0.002 {
			t.Errorf("%.3f and %.3f °C, want %g and %g", s.surface[0]-thermal.ZeroCelsius, s.surface[3]-thermal.ZeroCelsius, tt.outer, tt.inner)
		}
	}
}

// Centre-of-glass U of the ASHRAE Handbook, Fundamentals, fenestration chapter, from memory:
// 3 mm panes of emissivity 0.84, −18 and 21 °C, 5.5 m/s.
func TestSecondHandbook(t *testing.T) {
	at := thermal.Surroundings{OutsideK: 255.15, OutsideRadiantK: 255.15, InsideK: 294.15, InsideRadiantK: 294.15, OutsideConvection: 26, TiltDeg: 90, HeightM: 1}
	pane := secondPane(0.003, 0.84, 0.84)
	double := func(c *secondCase, x secondBlend, outer float64) *secondCase {
		c.add(0.0127, x, secondPane(0.003, outer, 0.84))
		return c
	}
	single := func() *secondCase {
		return &secondCase{sheets: []thermal.Sheet{pane}, absorbed: []float64{0}, at: at}
	}
	for _, tt := range []struct {
		what string
		c    *secondCase
		want float64
	}{
		{"single", single(), 5.91},
		{"double, air", double(single(), secondBlend{1}, 0.84), 2.73},
		{"double, argon, one face 0.05", double(single(), secondBlend{0, 1}, 0.05), 1.42},
		{"triple, air", double(double(single(), secondBlend{1}, 0.84), secondBlend{1}, 0.84), 1.76},
	} {
		s, err := tt.c.solve()
		if err != nil {
			t.Fatal(err)
		}
		if got := -(s.roomConv + s.roomRad) / 39; math.Abs(got-tt.want) > 0.03 {
			t.Errorf("U, %s: %.4f, want %g (handbook, from memory)", tt.what, got, tt.want)
		}
	}
}
