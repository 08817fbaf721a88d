package thermal_test

// What holds for any balance.

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"panewright/thermal"
)

// opaque takes the infrared transmittance from all sheets.
func (c *secondCase) opaque() {
	for i := range c.sheets {
		c.sheets[i].Transmittance = 0
	}
}

// dark takes the sun away and sets the radiant temperatures to those of the air.
func (c *secondCase) dark() {
	clear(c.absorbed)
	c.at.OutsideRadiantK, c.at.InsideRadiantK = c.at.OutsideK, c.at.InsideK
}

// closes checks that every face, every sheet and the whole keep their energy, in W/m².
func (c *secondCase) closes(t *testing.T, b *thermal.Balance, tolerance float64) {
	t.Helper()
	n := b.Sheets
	zero := func(what string, i int, v float64) {
		t.Helper()
		if !(math.Abs(v) < tolerance) {
			t.Errorf("%s %d keeps %.3g W/m²\n%v", what, i+1, v, c)
		}
	}
	inward := b.Outside.FluxWM2()
	convected := b.Outside.ConvectedWM2 // into the outer face of sheet i
	for i := range n {
		inner := &b.Room
		if i < n-1 {
			inner = &b.Gaps[i]
		}
		f := 2 * i
		var resistance float64
		for _, ply := range c.sheets[i].Plies {
			resistance += ply.ResistanceM2KW
		}
		zero("sun of sheet", i, b.SunWM2[f]+b.SunWM2[f+1]-c.absorbed[i])
		zero("outer face of sheet", i, convected+b.AbsorbedWM2[f]+b.SunWM2[f]-b.ConductedWM2[i])
		zero("inner face of sheet", i, b.ConductedWM2[i]+b.AbsorbedWM2[f+1]+b.SunWM2[f+1]-inner.ConvectedWM2)
		zero("conduction of sheet", i, b.ConductedWM2[i]-b.DropK[i]/resistance)
		if d := b.SurfaceK[f] - b.SurfaceK[f+1] - b.DropK[i]; !(math.Abs(d) < 1e-9) {
			t.Errorf("drop of sheet %d is off by %.3g K\n%v", i+1, d, c)
		}
		inward += c.absorbed[i]
		zero("outside and the sheets up to", i, inward-inner.FluxWM2())
		convected = inner.ConvectedWM2
	}
	zero("the whole of", n-1, b.InwardWM2()-inward)
}

// finite checks that nothing of a balance is NaN or infinite but what may be.
func (c *secondCase) finite(t *testing.T, b *thermal.Balance) {
	t.Helper()
	values := slices.Concat(b.SurfaceK[:2*b.Sheets], b.DropK[:b.Sheets], b.ConductedWM2[:b.Sheets], b.AbsorbedWM2[:2*b.Sheets], b.SunWM2[:2*b.Sheets], []float64{b.ResidualWM2})
	films := slices.ContainsFunc(c.sheets, func(s thermal.Sheet) bool { return s.Transmittance > 0 })
	for _, e := range append([]thermal.Exchange{b.Outside, b.Room}, b.Gaps[:b.Sheets-1]...) {
		values = append(values, e.DropK, e.MeanK, e.AngleDeg, e.Rayleigh, e.Nusselt, e.Convective, e.ConvectedWM2, e.RadiatedWM2,
			e.Gas.ConductivityWMK, e.Gas.DensityKGM3, e.Gas.HeatCapacityJKGK, e.Gas.ViscosityPaS)
		if !films {
			values = append(values, e.Radiative)
		}
	}
	for i, v := range values {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			t.Errorf("value %d is %g\n%v", i, v, c)
			return
		}
	}
}

// bounded checks that no face is colder than the coldest of its surroundings nor, without sun,
// warmer than the warmest.
func (c *secondCase) bounded(t *testing.T, b *thermal.Balance) {
	t.Helper()
	around := []float64{c.at.OutsideK, c.at.OutsideRadiantK, c.at.InsideK, c.at.InsideRadiantK}
	faces := b.SurfaceK[:2*b.Sheets]
	if slices.Min(faces) < slices.Min(around)-1e-7 {
		t.Errorf("a face of %.9f K in surroundings %.9f K\n%v", slices.Min(faces), around, c)
	}
	if slices.Max(c.absorbed) == 0 && slices.Max(faces) > slices.Max(around)+1e-7 {
		t.Errorf("a face of %.9f K without sun in surroundings %.9f K\n%v", slices.Max(faces), around, c)
	}
}

// Any legal input settles, with the residual that it states, and keeps its energy.
func TestBalanceAlwaysSettles(t *testing.T) {
	cases := 10000
	if testing.Short() {
		cases = 2000
	}
	r := rand.New(rand.NewPCG(71, 73))
	var b thermal.Balance // as the last case left it
	var most int
	for range cases {
		c := secondAny(r)
		if err := c.system(t).Solve(&b, c.at, c.absorbed); err != nil {
			t.Fatalf("%v\n%v", err, c)
		}
		most = max(most, b.Iterations)
		if !(b.ResidualWM2 >= 0 && b.ResidualWM2 < 1e-6) {
			t.Errorf("residual %g W/m²\n%v", b.ResidualWM2, c)
		}
		c.finite(t, &b)
		c.closes(t, &b, 2e-6)
		c.bounded(t, &b)
		if b.Surroundings != c.at {
			t.Errorf("surroundings %+v, want %+v", b.Surroundings, c.at)
		}
		if t.Failed() {
			return
		}
	}
	t.Logf("at most %d iterations", most)
}

// Far corners of what is legal.
func TestBalanceFarCorners(t *testing.T) {
	r := rand.New(rand.NewPCG(79, 83))
	const cold, hot = thermal.ZeroCelsius - 60, thermal.ZeroCelsius + 60
	for range 400 {
		c := secondAny(r)
		for i := range c.cavities {
			if c.cavities[i].Vacuum == nil {
				c.cavities[i].WidthM = oneOf(r, 1e-5, 1)
			}
		}
		c.at.OutsideK, c.at.InsideK = oneOf(r, cold, hot), oneOf(r, cold, hot)
		c.at.OutsideRadiantK, c.at.InsideRadiantK = oneOf(r, cold, hot), oneOf(r, cold, hot)
		c.at.OutsideConvection, c.at.HeightM = oneOf(r, 4, 200), oneOf(r, 0.1, 10)
		c.at.TiltDeg = oneOf(r, 0, 15, 60, 90, 179, 180)
		clear(c.absorbed)
		c.absorbed[r.IntN(len(c.absorbed))] = 1500
		b := c.first(t)
		c.finite(t, b)
		c.closes(t, b, 2e-6)
		if s, err := c.solve(); err != nil {
			t.Errorf("%v\n%v", err, c)
		} else if !s.twoStates() && !c.state(b).twoStates() {
			c.compare(t, "far corner", b, s)
		}
		if t.Failed() {
			return
		}
	}
}

// Without sun and with the air as warm as what radiates, the flux over the difference of the air
// temperatures is one over the sum of the resistances.
func TestBalanceFluxEqualsResistances(t *testing.T) {
	r := rand.New(rand.NewPCG(89, 97))
	for range 1000 {
		c := secondAny(r)
		c.opaque()
		c.dark()
		b := c.first(t)
		sum := 1/b.Outside.Total() + 1/b.Room.Total()
		for i := range c.sheets {
			for _, ply := range c.sheets[i].Plies {
				sum += ply.ResistanceM2KW
			}
			if i > 0 {
				sum += 1 / b.Gaps[i-1].Total()
			}
		}
		if got, want := b.InwardWM2(), (c.at.OutsideK-c.at.InsideK)/sum; math.Abs(got-want) > 1e-6*(1+math.Abs(want)) {
			t.Fatalf("flux %.9g W/m², by resistances %.9g W/m²\n%v", got, want, c)
		}
	}
}

// Each exchange is its coefficient times its drop.
func TestBalanceExchangesAgree(t *testing.T) {
	r := rand.New(rand.NewPCG(101, 103))
	for range 1000 {
		c := secondAny(r)
		b := c.first(t)
		n := b.Sheets
		ends := []float64{c.at.OutsideK}
		ends = append(ends, b.SurfaceK[:2*n]...)
		ends = append(ends, c.at.InsideK)
		for k := range n + 1 {
			e := &b.Outside
			switch {
			case k == n:
				e = &b.Room
			case k > 0:
				e = &b.Gaps[k-1]
			}
			drop := ends[2*k] - ends[2*k+1]
			if math.Abs(e.DropK-math.Abs(drop)) > 1e-9 {
				t.Errorf("exchange %d: drop %.12g K between faces %.12g K apart\n%v", k, e.DropK, drop, c)
			}
			if want := e.Convective * drop; math.Abs(e.ConvectedWM2-want) > 1e-6+1e-9*math.Abs(want)+1e-10*e.Convective {
				t.Errorf("exchange %d: convected %.12g W/m², coefficient times drop %.12g W/m²\n%v", k, e.ConvectedWM2, want, c)
			}
			if 0 < k && k < n {
				v := &c.cavities[k-1]
				if v.Vacuum != nil {
					if e.Rayleigh != 0 || e.Nusselt != 0 {
						t.Errorf("a vacuum has Ra %g, Nu %g", e.Rayleigh, e.Nusselt)
					}
					continue
				}
				if want := e.Nusselt * e.Gas.ConductivityWMK / v.WidthM; math.Abs(e.Convective-want) > 1e-9*want {
					t.Errorf("gap %d: coefficient %.12g, Nu·λ/s %.12g\n%v", k, e.Convective, want, c)
				}
				if math.Abs(e.MeanK-(ends[2*k]+ends[2*k+1])/2) > 1e-9 {
					t.Errorf("gap %d: mean %.12g K between %.12g and %.12g K", k, e.MeanK, ends[2*k], ends[2*k+1])
				}
				_, ra := c.blends[k-1].rayleigh(v.WidthM, drop, e.MeanK)
				if math.Abs(e.Rayleigh-ra) > 1e-6*(ra+v.WidthM) {
					t.Errorf("gap %d: Ra %.12g, second evaluation %.12g\n%v", k, e.Rayleigh, ra, c)
				}
			}
		}
		if t.Failed() {
			return
		}
	}
}

// A symmetric make-up in symmetric surroundings has symmetric temperatures and no flux through its middle.
func TestBalanceSymmetric(t *testing.T) {
	r := rand.New(rand.NewPCG(107, 109))
	for range 300 {
		c := secondAny(r)
		n := len(c.sheets)
		for i := range n {
			m := n - 1 - i
			if m < i {
				break
			}
			outer := c.sheets[i]
			if m == i {
				outer.Emissivity[1] = outer.Emissivity[0]
				outer.Plies = outer.Plies[:1]
				outer.Plies[0].Share = 1
				c.sheets[i] = outer
				break
			}
			inner := thermal.Sheet{Plies: slices.Clone(outer.Plies), Emissivity: [2]float64{outer.Emissivity[1], outer.Emissivity[0]}, Transmittance: outer.Transmittance}
			slices.Reverse(inner.Plies)
			c.sheets[m] = inner
			c.absorbed[m] = c.absorbed[i]
		}
		for i := range c.cavities {
			if m := n - 2 - i; m > i {
				c.cavities[m], c.blends[m] = c.cavities[i], c.blends[i]
				if v := c.cavities[i].Vacuum; v != nil {
					w := *v
					w.GlassWMK[0], w.GlassWMK[1] = v.GlassWMK[1], v.GlassWMK[0]
					c.cavities[m].Vacuum = &w
				}
			}
		}
		c.at.InsideK, c.at.InsideRadiantK, c.at.TiltDeg = c.at.OutsideK, c.at.OutsideRadiantK, 90
		c.at.InsideConvection = c.at.OutsideConvection
		b := c.first(t)
		if c.state(b).twoStates() {
			continue
		}
		for f := range n {
			if d := b.SurfaceK[f] - b.SurfaceK[2*n-1-f]; math.Abs(d) > 1e-7 {
				t.Fatalf("surfaces %d and %d differ by %.3g K\n%v", f+1, 2*n-f, d, c)
			}
		}
		if d := b.Outside.FluxWM2() + b.Room.FluxWM2(); math.Abs(d) > 1e-5 {
			t.Fatalf("fluxes differ by %.3g W/m²\n%v", d, c)
		}
	}
}

// Turned round in turned surroundings, with a given coefficient in the room, a glazing has the same
// temperatures in turn.
func TestBalanceTurned(t *testing.T) {
	r := rand.New(rand.NewPCG(113, 127))
	for range 500 {
		c := secondAny(r)
		if c.at.InsideConvection == 0 {
			c.at.InsideConvection = 3
		}
		if c.at.TiltDeg == 60 || c.at.TiltDeg == 120 {
			c.at.TiltDeg = 50
		}
		turned := &secondCase{at: c.at, sheets: slices.Clone(c.sheets), cavities: slices.Clone(c.cavities), absorbed: slices.Clone(c.absorbed), blends: slices.Clone(c.blends)}
		slices.Reverse(turned.sheets)
		slices.Reverse(turned.cavities)
		slices.Reverse(turned.blends)
		slices.Reverse(turned.absorbed)
		for i := range turned.sheets {
			s := &turned.sheets[i]
			s.Plies = slices.Clone(s.Plies)
			slices.Reverse(s.Plies)
			s.Emissivity[0], s.Emissivity[1] = s.Emissivity[1], s.Emissivity[0]
		}
		a := &turned.at
		a.OutsideK, a.InsideK = a.InsideK, a.OutsideK
		a.OutsideRadiantK, a.InsideRadiantK = a.InsideRadiantK, a.OutsideRadiantK
		a.OutsideConvection, a.InsideConvection = a.InsideConvection, a.OutsideConvection
		a.TiltDeg = 180 - a.TiltDeg
		b, back := c.first(t), turned.first(t)
		if c.state(b).twoStates() || turned.state(back).twoStates() {
			continue
		}
		for f := range 2 * b.Sheets {
			if d := b.SurfaceK[f] - back.SurfaceK[2*b.Sheets-1-f]; math.Abs(d) > 1e-6 {
				t.Fatalf("surface %d moves by %.3g K when all is turned\n%v", f+1, d, c)
			}
		}
	}
}

// Nothing flows where all is equally warm.
func TestBalanceAtRest(t *testing.T) {
	r := rand.New(rand.NewPCG(131, 137))
	for range 500 {
		c := secondAny(r)
		c.dark()
		k := c.at.OutsideK
		off := oneOf(r, 0, 0, 1e-12, 1e-9, 1e-6, 1e-3) // hardly any difference must settle too
		c.at.OutsideRadiantK, c.at.InsideK, c.at.InsideRadiantK = k, k+off, k+off
		b := c.first(t)
		c.finite(t, b)
		c.bounded(t, b)
		if off > 1e-6 {
			continue
		}
		for f := range 2 * b.Sheets {
			if math.Abs(b.SurfaceK[f]-k) > 1e-7+off {
				t.Fatalf("surface %d at %.12g K in surroundings of %.12g K\n%v", f+1, b.SurfaceK[f], k, c)
			}
		}
		if most := 1e-6 + 100*off; math.Abs(b.InwardWM2()) > most || math.Abs(b.Outside.FluxWM2()) > most {
			t.Fatalf("flux %g, %g W/m² at rest\n%v", b.InwardWM2(), b.Outside.FluxWM2(), c)
		}
	}
}

// In the dark, with still gaps, more heat passes the better the gas conducts; in any gaps, more
// passes the more a face emits.
func TestBalanceMonotone(t *testing.T) {
	r := rand.New(rand.NewPCG(139, 149))
	for range 300 {
		c := secondAny(r)
		c.opaque()
		c.dark()
		if len(c.sheets) > 1 {
			still := *c
			still.at.TiltDeg = 0 // the warm side above
			if still.at.OutsideK < still.at.InsideK {
				still.at.OutsideK, still.at.InsideK = still.at.InsideK, still.at.OutsideK
				still.dark()
			}
			still.cavities, still.blends = slices.Clone(c.cavities), slices.Clone(c.blends)
			k := r.IntN(len(c.cavities))
			last := 0.0
			for i, x := range []secondBlend{{0, 0, 0, 1}, {0, 0, 1}, {0, 1}, {0.1, 0.9}, {0.5, 0.5}, {1}} {
				if still.cavities[k].Vacuum != nil {
					break
				}
				still.cavities[k], still.blends[k] = secondGas(still.cavities[k].WidthM, x)
				b := still.first(t)
				if nu := b.Gaps[k].Nusselt; math.Abs(nu-1) > 1e-9 {
					t.Errorf("Nu %.12g in a gap heated from above\n%v", nu, &still)
				}
				flux := b.InwardWM2()
				if i > 0 && !(flux > last-1e-9) {
					t.Errorf("flux falls from %.12g to %.12g W/m² in a gas that conducts more\n%v", last, flux, &still)
				}
				last = flux
			}
		}
		face := r.IntN(2 * len(c.sheets))
		last, skip := 0.0, false
		for i, e := range []float64{0.0001, 0.01, 0.04, 0.2, 0.5, 0.837, 0.9999, 1} {
			c.sheets[face/2].Emissivity[face%2] = e
			b := c.first(t)
			skip = skip || c.state(b).nearStep(0.05)
			flux := math.Abs(b.InwardWM2())
			if i > 0 && !skip && flux < last-1e-7 {
				t.Errorf("flux falls from %.12g to %.12g W/m² where face %d emits %g\n%v", last, flux, face+1, e, c)
			}
			last = flux
		}
		if t.Failed() {
			return
		}
	}
}

// More sun on any sheet cools no face.
func TestBalanceSunWarms(t *testing.T) {
	r := rand.New(rand.NewPCG(193, 197))
	for range 500 {
		c := secondAny(r)
		before := c.first(t)
		i := r.IntN(len(c.sheets))
		more := oneOf(r, 1e-3, 1, 300)
		c.absorbed[i] += more
		b := c.first(t)
		if c.state(before).nearStep(0.02) || c.state(b).nearStep(0.02) {
			continue
		}
		for f := range 2 * b.Sheets {
			if b.SurfaceK[f] < before.SurfaceK[f]-1e-7 {
				t.Fatalf("%g W/m² more in sheet %d cools surface %d by %.3g K\n%v", more, i+1, f+1, before.SurfaceK[f]-b.SurfaceK[f], c)
			}
		}
		if !(b.SurfaceK[2*i] > before.SurfaceK[2*i]) {
			t.Fatalf("%g W/m² more in sheet %d do not warm it\n%v", more, i+1, c)
		}
	}
}

// A sheet that passes hardly any infrared is an opaque one.
func TestBalanceTransmittanceToNothing(t *testing.T) {
	r := rand.New(rand.NewPCG(151, 157))
	for range 200 {
		c := secondAny(r)
		c.opaque()
		i := r.IntN(len(c.sheets))
		s := &c.sheets[i]
		for f := range s.Emissivity {
			s.Emissivity[f] = math.Min(s.Emissivity[f], 0.9)
		}
		opaque := c.first(t)
		if c.state(opaque).nearStep(0.02) {
			continue
		}
		for _, tau := range []float64{1e-5, 1e-7, 1e-9, 1e-12, 1e-16, math.SmallestNonzeroFloat64} {
			s.Transmittance = tau
			b := c.first(t)
			for f := range 2 * b.Sheets {
				if d := math.Abs(b.SurfaceK[f] - opaque.SurfaceK[f]); !(d < 1e-7+1e5*tau) {
					t.Fatalf("τ %g of sheet %d moves surface %d by %.3g K\n%v", tau, i+1, f+1, d, c)
				}
			}
		}
	}
}

// Sun that one ply takes up is not that of another: by hand, one pane of two plies, all sun in the inner.
func TestBalanceSunByPly(t *testing.T) {
	c := &secondCase{sheets: []thermal.Sheet{{Plies: []thermal.Layer{{ResistanceM2KW: 0.1, Share: 0}, {ResistanceM2KW: 0.1, Share: 1}}, Emissivity: [2]float64{1, 1}}},
		absorbed: []float64{400}, at: thermal.Surroundings{OutsideK: 280, OutsideRadiantK: 280, InsideK: 280, InsideRadiantK: 280, OutsideConvection: 4, InsideConvection: 4, TiltDeg: 90, HeightM: 1}}
	b := c.first(t)
	// Equal coefficients h on both sides if radiation were linear; so from the fluxes themselves:
	// what leaves outside passes ply one whole and, on average, half of ply two's sun passes half of it.
	out, in := -b.Outside.FluxWM2(), b.Room.FluxWM2()
	if math.Abs(out+in-400) > 1e-6 {
		t.Errorf("%.9g and %.9g W/m² leave, want 400", out, in)
	}
	// T at the inner face less T at the outer: out·0.1 across ply one, then (out − 400/2)·0.1 across ply two.
	if got, want := b.SurfaceK[1]-b.SurfaceK[0], out*0.1+(out-200)*0.1; math.Abs(got-want) > 1e-7 {
		t.Errorf("drop %.9f K, want %.9f K (parabola, by hand)", got, want)
	}
}
