package thermal

// The detailed heat balance of ISO 15099:2003: Newton's method on the temperatures of all faces.
//
// Opaque sheets couple neighbours alone, and a step is solved along the ladder of sheets and gaps,
// in time that grows with their number (ladder.go). With sheets that pass infrared every face may
// see several others (exchange.go).

import (
	"errors"
	"fmt"
	"math"
)

// ErrNoBalance is returned when no steady state is found.
var ErrNoBalance = errors.New("thermal: the heat balance did not converge")

// A System is a sequence of sheets and cavities made ready for balances. It may be shared.
type System struct {
	n          int
	plies      [MaxSheets][]Layer
	resistance [MaxSheets]float64     // of each sheet, m²·K/W
	inner      [MaxSheets]float64     // part of the absorbed sun that acts at the inner face
	emissivity [MaxSheets + 1]float64 // effective, of outside, gaps and room
	gaps       [MaxSheets - 1]gap
	exchange   *exchange // nil where all sheets are opaque
}

// gap is a cavity made ready.
type gap struct {
	widthM     float64
	gas        Fluid
	evacuated  bool
	conduction float64 // of pillars and residual gas, W/(m²·K)
}

// NewSystem makes sheets, from outside, and the cavities between them ready. It is an error if their
// numbers do not go together or a value is impossible.
func NewSystem(sheets []Sheet, cavities []Cavity) (*System, error) {
	if len(sheets) < 1 || len(sheets) > MaxSheets || len(cavities) != len(sheets)-1 {
		return nil, fmt.Errorf("thermal: %d sheets and %d cavities; there are 1 to %d sheets and a cavity between two", len(sheets), len(cavities), MaxSheets)
	}
	s := &System{n: len(sheets)}
	opaque := true
	for k, sheet := range sheets {
		if err := s.sheet(k, sheet); err != nil {
			return nil, fmt.Errorf("thermal: sheet %d: %w", k+1, err)
		}
		opaque = opaque && sheet.Transmittance == 0
	}
	for k, c := range cavities {
		if !(c.WidthM > 0) || math.IsInf(c.WidthM, 0) {
			return nil, fmt.Errorf("thermal: cavity %d: a width of %g m; it is above 0", k+1, c.WidthM)
		}
		s.gaps[k] = gap{widthM: c.WidthM, gas: c.Gas}
		if c.Vacuum != nil {
			s.gaps[k].evacuated, s.gaps[k].conduction = true, c.Vacuum.Conductance()
		} else if c.Gas.n == 0 {
			return nil, fmt.Errorf("thermal: cavity %d has neither gas nor vacuum", k+1)
		}
	}
	s.emissivity[0], s.emissivity[s.n] = sheets[0].Emissivity[0], sheets[s.n-1].Emissivity[1]
	for k := 1; k < s.n; k++ {
		s.emissivity[k] = 1 / (1/sheets[k-1].Emissivity[1] + 1/sheets[k].Emissivity[0] - 1)
	}
	if !opaque {
		s.exchange = newExchange(sheets)
	}
	return s, nil
}

// sheet takes in sheet k.
func (s *System) sheet(k int, sheet Sheet) error {
	var total float64
	for _, l := range sheet.Plies {
		if !(l.ResistanceM2KW > 0) || math.IsInf(l.ResistanceM2KW, 0) {
			return fmt.Errorf("a ply of resistance %g m²·K/W; it is above 0", l.ResistanceM2KW)
		}
		total += l.ResistanceM2KW
	}
	if len(sheet.Plies) == 0 {
		return errors.New("it has no ply")
	}
	// Sun absorbed behind a part r of the resistance acts at both faces, by r at the inner one; that of
	// a ply, spread evenly, acts as in its middle.
	var before, inner float64
	for _, l := range sheet.Plies {
		inner += float64(l.Share * ((before + l.ResistanceM2KW/2) / total))
		before += l.ResistanceM2KW
	}
	for _, e := range sheet.Emissivity {
		if !(e > 0 && e+sheet.Transmittance <= 1+1e-9 && sheet.Transmittance >= 0) {
			return fmt.Errorf("emissivity %g and infrared transmittance %g; the first is above 0, and together they are at most 1", e, sheet.Transmittance)
		}
	}
	s.plies[k], s.resistance[k], s.inner[k] = sheet.Plies, total, inner
	return nil
}

// Solve writes the steady state in the given surroundings into dst; absorbedWM2 is the sun that each
// sheet absorbs. It allocates nothing. The error is ErrNoBalance, or says which input is impossible.
func (s *System) Solve(dst *Balance, at Surroundings, absorbedWM2 []float64) error {
	var w work
	if err := w.begin(s, dst, at, absorbedWM2); err != nil {
		return err
	}
	w.start()
	return w.settle()
}

// Follow is Solve that starts from the state which dst holds, such as that of the hour before; its
// result agrees with that of Solve to 1e-9 K. Near the steps of the correlation of vertical gaps,
// where two states are possible, it starts as Solve does.
func (s *System) Follow(dst *Balance, at Surroundings, absorbedWM2 []float64) error {
	if dst.Sheets != s.n || !(dst.SurfaceK[0] > 0) {
		return s.Solve(dst, at, absorbedWM2)
	}
	before := &dst.Surroundings
	turned := before.TiltDeg != at.TiltDeg || before.HeightM != at.HeightM
	var w work
	if err := w.begin(s, dst, at, absorbedWM2); err != nil {
		return err
	}
	if s.exchange == nil && !turned {
		// What is around has changed, the gaps have not yet: their part of a step is known.
		w.lookAround()
		w.climb()
		w.move(w.boldness())
	}
	if err := w.settle(); err == nil && !w.nearStep() {
		return nil
	}
	return s.Solve(dst, at, absorbedWM2)
}

// work is a balance being solved.
type work struct {
	s *System
	b *Balance
	// The correlations of each gap, and of the room, for both directions of heat, made ready when
	// first needed.
	cavities [MaxSheets - 1][2]cavity
	walls    [2]wall
	ready    [MaxSheets][2]bool
	step     [2 * MaxSheets]float64 // of the temperatures of the faces
	stepDrop [MaxSheets]float64
	// past counts how often the Rayleigh number of a gap has crossed the second step of the vertical
	// correlation; pinned is whether the gap is held on it.
	past   [MaxSheets - 1]int
	beyond [MaxSheets - 1]bool
	pinned [MaxSheets - 1]bool
}

// begin takes in what is to be solved, or says what of it is impossible.
func (w *work) begin(s *System, b *Balance, at Surroundings, absorbedWM2 []float64) error {
	if len(absorbedWM2) != s.n {
		return fmt.Errorf("thermal: absorbed sun of %d sheets for %d", len(absorbedWM2), s.n)
	}
	for _, t := range [...]float64{at.OutsideK, at.OutsideRadiantK, at.InsideK, at.InsideRadiantK} {
		if !(t > 0) || math.IsInf(t, 0) {
			return fmt.Errorf("thermal: a temperature of %g K; it is above 0", t)
		}
	}
	switch {
	case !(at.OutsideConvection >= 0 && at.InsideConvection >= 0) || math.IsInf(at.OutsideConvection+at.InsideConvection, 0):
		return errors.New("thermal: a convective coefficient is below 0 or no number")
	case !(at.TiltDeg >= 0 && at.TiltDeg <= 180):
		return fmt.Errorf("thermal: a tilt of %g°; it lies in 0..180", at.TiltDeg)
	case !(at.HeightM > 0) || math.IsInf(at.HeightM, 0):
		return fmt.Errorf("thermal: a height of %g m; it is above 0", at.HeightM)
	}
	b.Sheets, b.Surroundings, b.Iterations = s.n, at, 0
	for k, a := range absorbedWM2 {
		if math.IsNaN(a) || math.IsInf(a, 0) {
			return fmt.Errorf("thermal: sheet %d absorbs %g W/m²", k+1, a)
		}
		inner := a * s.inner[k]
		b.SunWM2[2*k], b.SunWM2[2*k+1] = a-inner, inner
	}
	w.s, w.b = s, b
	return nil
}

// The conductances from which a cold start is made, W/(m²·K): natural convection in a room, and the
// least of a gap with gas. They enter no result.
const (
	startRoom = 3.0
	startGap  = 1.5
)

// start sets the temperatures to those of a network of constant conductances.
func (w *work) start() {
	s, b, at := w.s, w.b, &w.b.Surroundings
	mean := (at.OutsideK + at.InsideK) / 2
	for i := range 2 * s.n {
		b.SurfaceK[i] = mean
	}
	clear(b.DropK[:])
	radiative := func(e, t float64) float64 { return 4 * StefanBoltzmann4 * e * t * t * t }
	h := at.OutsideConvection + radiative(s.emissivity[0], at.OutsideK)
	b.links[0] = link{h * (at.OutsideK - mean), h, h}
	h = at.InsideConvection
	if h == 0 {
		h = startRoom
	}
	h += radiative(s.emissivity[s.n], at.InsideK)
	b.links[s.n] = link{h * (mean - at.InsideK), h, h}
	for k := 1; k < s.n; k++ {
		g := &s.gaps[k-1]
		h := g.conduction
		if !g.evacuated {
			h = max(startGap, g.gas.nominal/g.widthM)
		}
		h += radiative(s.emissivity[k], mean)
		b.links[k] = link{0, h, h}
	}
	w.climb()
	w.move(w.boldness())
}

const (
	energyBound = 1e-6  // W/m², the largest residual of a result
	settledK    = 2e-10 // the step below which the state is taken as reached
	quadraticK  = 1e-5  // the step after which, with Newton's convergence, it is reached if
	closedWM2   = 1e-10 // the residual is below this
	boldest     = 0.3   // the longest step, as a part of the temperature
	mostRounds  = 400   // of which after
	patience    = 40    // steps are halved, and one of
	tiredK      = 1e-8  // is small enough: of stacks so insulated that rounding shows
	pinAfter    = 3     // crossings of the second step
)

// settle moves the temperatures to the steady state.
func (w *work) settle() error {
	b := w.b
	longest := math.Inf(1) // of the components of a step, K
	for b.Iterations = 1; b.Iterations <= mostRounds; b.Iterations++ {
		w.look()
		b.ResidualWM2 = w.residual()
		there := longest < quadraticK && b.ResidualWM2 < closedWM2
		if !there {
			longest = w.newton()
			switch {
			case math.IsNaN(longest) || math.IsNaN(b.ResidualWM2):
				return ErrNoBalance
			case b.ResidualWM2 < energyBound:
				there = longest <= settledK || (b.Iterations > patience && longest <= tiredK)
			}
		}
		if there {
			if w.unpin() {
				longest = math.Inf(1)
				continue
			}
			w.finish()
			return nil
		}
		w.move(w.boldness())
		w.pin()
	}
	return ErrNoBalance
}

// boldness returns the part of a step that is taken: all of it, but where a temperature would change
// by more than a share of itself, and where many steps have not settled it.
func (w *work) boldness() float64 {
	b := w.b
	part := 1.0
	for i := range 2 * w.s.n {
		if step := math.Abs(w.step[i]); step > boldest*b.SurfaceK[i] {
			part = min(part, boldest*b.SurfaceK[i]/step)
		}
	}
	if b.Iterations > patience {
		part /= 2
	}
	return part
}

// newton solves for the step of all temperatures and returns its longest component.
func (w *work) newton() (longest float64) {
	if w.s.exchange == nil {
		w.climb()
	} else {
		w.s.exchange.step(w)
	}
	for i := range 2 * w.s.n {
		longest = max(longest, math.Abs(w.step[i]))
	}
	return longest
}

// move adds a part of the step to the temperatures.
func (w *work) move(part float64) {
	b := w.b
	for k := range w.s.n {
		b.SurfaceK[2*k] += float64(part * w.step[2*k])
		b.DropK[k] += float64(part * w.stepDrop[k])
		b.SurfaceK[2*k+1] = b.SurfaceK[2*k] - b.DropK[k]
	}
}

// residual returns the largest energy that is not accounted for at any face, W/m².
func (w *work) residual() float64 {
	s, b := w.s, w.b
	var most float64
	for k := range s.n {
		b.ConductedWM2[k] = b.DropK[k] / s.resistance[k]
		outer := b.links[k].flux + b.SunWM2[2*k] - b.ConductedWM2[k]
		inner := b.ConductedWM2[k] + b.SunWM2[2*k+1] - b.links[k+1].flux
		if s.exchange != nil {
			outer += b.AbsorbedWM2[2*k]
			inner += b.AbsorbedWM2[2*k+1]
		}
		most = max(most, math.Abs(outer), math.Abs(inner))
	}
	return most
}

// look takes the fluxes, with their slopes, at the present temperatures.
func (w *work) look() {
	s, b := w.s, w.b
	w.lookAround()
	for k := 1; k < s.n; k++ {
		w.cavity(k, &b.Gaps[k-1])
		if s.exchange == nil {
			w.radiate(k, &b.Gaps[k-1], b.SurfaceK[2*k-1], b.SurfaceK[2*k])
		}
	}
	if s.exchange != nil {
		s.exchange.look(w)
	}
}

// lookAround takes those of the outside and of the room.
func (w *work) lookAround() {
	s, b, at := w.s, w.b, &w.b.Surroundings
	outerK, innerK := b.SurfaceK[0], b.SurfaceK[2*s.n-1]
	e := &b.Outside
	e.DropK = math.Abs(at.OutsideK - outerK)
	e.Convective = at.OutsideConvection
	e.ConvectedWM2 = e.Convective * (at.OutsideK - outerK)
	b.links[0] = link{e.ConvectedWM2, 0, e.Convective}
	w.room(&b.Room, innerK)
	if s.exchange == nil {
		w.radiate(0, e, at.OutsideRadiantK, outerK)
		w.radiate(s.n, &b.Room, innerK, at.InsideRadiantK)
	}
}

// radiate adds radiation between opaque faces to link k.
func (w *work) radiate(k int, e *Exchange, outerK, innerK float64) {
	sigma := w.s.emissivity[k] * StefanBoltzmann4
	o2, i2 := outerK*outerK, innerK*innerK
	e.Radiative = sigma * (o2 + i2) * (outerK + innerK)
	e.RadiatedWM2 = e.Radiative * (outerK - innerK)
	l := &w.b.links[k]
	l.flux += e.RadiatedWM2
	l.outer += 4 * sigma * o2 * outerK
	l.inner += 4 * sigma * i2 * innerK
}

// mostLean is how much the slopes of a gap with its two temperatures may differ, as a part of their
// mean: over hundreds of kelvins the properties of gases would turn one below 0.
const mostLean = 0.75

// cavity takes the convection of gap k, from 1.
func (w *work) cavity(k int, e *Exchange) {
	s, b := w.s, w.b
	g := &s.gaps[k-1]
	outerK, innerK := b.SurfaceK[2*k-1], b.SurfaceK[2*k]
	drop := outerK - innerK
	e.DropK, e.MeanK = math.Abs(drop), (outerK+innerK)/2
	tilt, side := b.Surroundings.TiltDeg, 0
	if drop > 0 && tilt != verticalDeg { // the outer side is the warmer
		tilt, side = 180-tilt, 1
	}
	e.AngleDeg = tilt
	if g.evacuated {
		e.Rayleigh, e.Nusselt, e.Gas = 0, 0, Properties{}
		e.Convective = g.conduction
		e.ConvectedWM2 = g.conduction * drop
		b.links[k] = link{e.ConvectedWM2, g.conduction, g.conduction}
		return
	}
	c := &w.cavities[k-1][side]
	if !w.ready[k-1][side] {
		*c = cavityAt(tilt, b.Surroundings.HeightM/g.widthM)
		w.ready[k-1][side] = true
	}
	var slope slopes
	e.Gas, slope = g.gas.at(e.MeanK)
	e.Rayleigh = e.Gas.Rayleigh(g.widthM, e.DropK, e.MeanK)
	var nuSlope float64
	e.Nusselt, nuSlope = c.nusselt(e.Rayleigh, w.pinned[k-1])
	still := e.Gas.ConductivityWMK / g.widthM
	e.Convective = e.Nusselt * still
	e.ConvectedWM2 = e.Convective * drop
	bend := still * nuSlope // d h/d ln Ra
	rise := e.Convective + bend
	lean := drop / 2 * (float64(e.Convective*slope.conductivity) + float64(bend*slope.rayleigh))
	lean = min(max(lean, -mostLean*rise), mostLean*rise)
	b.links[k] = link{e.ConvectedWM2, rise + lean, rise - lean}
}

// filmShare is the part of the way from the air to the surface at which the room's air is taken (ISO
// 15099:2003 (113), from memory).
const filmShare = 0.25

// room takes the convection of the room side.
func (w *work) room(e *Exchange, surfaceK float64) {
	at := &w.b.Surroundings
	drop := surfaceK - at.InsideK
	e.DropK = math.Abs(drop)
	if at.InsideConvection > 0 {
		e.MeanK, e.AngleDeg, e.Rayleigh, e.Nusselt, e.Gas = 0, 0, 0, 0, Properties{}
		e.Convective = at.InsideConvection
		e.ConvectedWM2 = e.Convective * drop
		w.b.links[w.s.n] = link{e.ConvectedWM2, e.Convective, 0}
		return
	}
	tilt, side := at.TiltDeg, 0
	if drop > 0 { // the glass is warmer than the air
		tilt, side = 180-tilt, 1
	}
	e.AngleDeg = tilt
	wall := &w.walls[side]
	if !w.ready[MaxSheets-1][side] {
		*wall = wallAt(tilt)
		w.ready[MaxSheets-1][side] = true
	}
	e.MeanK = at.InsideK + float64(filmShare*drop)
	air := roomAir()
	var slope slopes
	e.Gas, slope = air.at(e.MeanK)
	e.Rayleigh = e.Gas.Rayleigh(at.HeightM, e.DropK, e.MeanK)
	var nuSlope float64
	e.Nusselt, nuSlope = wall.nusselt(e.Rayleigh)
	still := e.Gas.ConductivityWMK / at.HeightM
	e.Convective = e.Nusselt * still
	e.ConvectedWM2 = e.Convective * drop
	bend := still * nuSlope
	rise := e.Convective + bend + float64(filmShare*drop*(float64(e.Convective*slope.conductivity)+float64(bend*slope.rayleigh)))
	w.b.links[w.s.n] = link{e.ConvectedWM2, rise, 0}
}

// pin notes which gaps cross the second step of the vertical correlation and holds those on it that
// cross it again and again: there no temperature drop closes the balance with either value of Nu, and
// one between them does.
func (w *work) pin() {
	for k := range w.s.n - 1 {
		beyond := w.b.Gaps[k].Rayleigh > secondStep
		if w.b.Iterations > 1 && beyond != w.beyond[k] {
			if w.past[k]++; w.past[k] >= pinAfter {
				w.pinned[k] = true
			}
		}
		w.beyond[k] = beyond
	}
}

// unpin releases gaps that are held on the second step but do not belong there, and reports whether
// there were any.
func (w *work) unpin() (changed bool) {
	for k := range w.s.n - 1 {
		if past := w.b.Gaps[k].Rayleigh/secondStep - 1; w.pinned[k] && (past < 0 || past > stepWidth) {
			w.pinned[k], w.past[k], changed = false, 0, true
		}
	}
	return changed
}

// nearStep reports whether the Rayleigh number of a gap is close to a step of its correlation.
func (w *work) nearStep() bool {
	const close = 0.03
	for k := range w.s.n - 1 {
		e := &w.b.Gaps[k]
		if w.s.gaps[k].evacuated || e.AngleDeg <= tiltedDeg {
			continue
		}
		if math.Abs(e.Rayleigh/firstStep-1) < close || math.Abs(e.Rayleigh/secondStep-1) < close {
			return true
		}
	}
	return false
}

// finish settles what only the result needs.
func (w *work) finish() {
	b := w.b
	if w.s.exchange == nil {
		for k := range w.s.n {
			outer, inner := &b.Outside, &b.Room
			if k > 0 {
				outer = &b.Gaps[k-1]
			}
			if k < w.s.n-1 {
				inner = &b.Gaps[k]
			}
			b.AbsorbedWM2[2*k], b.AbsorbedWM2[2*k+1] = outer.RadiatedWM2, -inner.RadiatedWM2
		}
	}
}

// A Ply is the temperatures of one layer of a sheet, in K: at its outer and inner bound, and the highest
// anywhere in it.
type Ply struct{ OuterK, InnerK, PeakK float64 }

// Plies appends the temperatures of the layers of sheet k, from 0, in a state that the system solved.
// Sun that a layer absorbs is spread evenly through it, so that its temperature is a parabola.
func (s *System) Plies(dst []Ply, b *Balance, k int) []Ply {
	absorbed := b.SunWM2[2*k] + b.SunWM2[2*k+1]
	flux := b.ConductedWM2[k] - b.SunWM2[2*k] // towards the inside, at the outer face
	at := b.SurfaceK[2*k]
	for _, l := range s.plies[k] {
		a, r := absorbed*l.Share, l.ResistanceM2KW
		p := Ply{OuterK: at, InnerK: at - float64(r*(flux+a/2))}
		p.PeakK = max(p.OuterK, p.InnerK)
		if a > 0 && flux < 0 && flux+a > 0 { // the heat turns within
			p.PeakK = at + float64(r*flux*flux/(2*a))
		}
		dst = append(dst, p)
		at, flux = p.InnerK, flux+a
	}
	return dst
}

// Hottest returns the sheet, from 0, that is hottest anywhere, and that temperature in K.
func (s *System) Hottest(b *Balance) (sheet int, peakK float64) {
	var plies []Ply
	for k := range s.n {
		plies = s.Plies(plies[:0], b, k)
		for _, p := range plies {
			if p.PeakK > peakK {
				sheet, peakK = k, p.PeakK
			}
		}
	}
	return sheet, peakK
}
