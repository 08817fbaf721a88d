package glazing

// How U and g follow from what is put in: sensitivities, and U of other gas fills. Each figure is a
// rating of a changed copy of the make-up.

import (
	"errors"
	"fmt"
	"math"
	"slices"

	"panewright/thermal"
)

// An Input is a kind of quantity that U and g depend on.
type Input string

// The inputs.
const (
	EmissivityInput Input = "emissivity" // corrected, of a surface
	FillInput       Input = "fill"       // share of a gap's volume that is not air; the rest is air
	WidthInput      Input = "width_mm"   // of a gap
)

// A Side says on which side of an input's value the differences were taken.
type Side string

// The sides.
const (
	BothSides Side = "both"
	Above     Side = "above" // the value is at its lower bound
	Below     Side = "below" // the value is at its upper bound
)

// A Sensitivity is how much U and g change for a rise of one input, all others held: the
// derivative times Change.
type Sensitivity struct {
	Input  Input
	Number int     // of the surface or gap, from 1 at the outside
	Value  float64 // what the rating has
	Change float64 // the rise that U and G are for, in the unit of Value
	Step   float64 // over which differences were taken, to each side of Value unless Side says
	Side   Side
	// Corner says that convection begins within the step, Nu leaving 1: U and G are then a mean of
	// the derivatives on both sides.
	Corner bool
	U, G   Value // W/(m²·K); a fraction of one
}

// A variation is how an input is varied.
type variation struct {
	input        Input
	change, step float64
	lowest       float64 // the value stays above this or, with least, at it
	least        bool
	highest      float64
}

// The rises for which sensitivities are given, and the steps of their differences: small enough
// that the third derivative does not show in four digits (of emissivities from 0.01), large enough
// that neither rounding nor the 1e-9 K to which the drops of several gaps are shared shows.
var variations = [...]variation{
	{input: EmissivityInput, change: 0.01, step: 0.0001, lowest: 0, highest: 1},
	{input: FillInput, change: 0.01, step: 0.001, lowest: 0, least: true, highest: 1},
	{input: WidthInput, change: 1, step: 0.01, lowest: 0, highest: math.Inf(1)},
}

// Sensitivities returns the sensitivities of U and g of a rating to the corrected emissivity of
// each surface that faces a gap and of that which faces the room (where a balance stands behind them
// also of surface 1), and to the fill and the width of each gap with gas, by central differences of second order, at a bound by one-sided ones. Where hi is
// given by the user, that of the room-side surface is left out, for it enters nothing. It is an
// error if U is not known.
func Sensitivities(r *Rating) ([]Sensitivity, error) {
	return sensitivities(r, variations[:])
}

func sensitivities(r *Rating, kinds []variation) ([]Sensitivity, error) {
	if !r.U.Known {
		return nil, errors.New(r.U.Why)
	}
	var out []Sensitivity
	for _, v := range kinds {
		for i := range v.input.count(r) {
			if v.leavesOut(r, i) {
				continue
			}
			s, err := v.sensitivity(r, i)
			if err != nil {
				return nil, err
			}
			out = append(out, s)
		}
	}
	return out, nil
}

// leavesOut reports whether input i, from 0, of a kind enters neither U nor g, or is not there: the
// emissivity of surface 1 where outside a coefficient stands for convection and radiation, gas and
// width of a vacuum.
func (v variation) leavesOut(r *Rating, i int) bool {
	if v.input == EmissivityInput {
		return i == 0 && !r.Method.Basis.Balances()
	}
	return r.Makeup.Gaps[i].Vacuum != nil
}

// count returns how many surfaces or gaps an input may be of.
func (in Input) count(r *Rating) int {
	if in != EmissivityInput {
		return len(r.Makeup.Gaps)
	}
	if r.Method.Options.InsideWM2K > 0 && !r.Method.Basis.Balances() {
		return 2*len(r.Makeup.Panes) - 1
	}
	return 2 * len(r.Makeup.Panes)
}

// of returns the value of input i, from 0, in a rating.
func (in Input) of(r *Rating, i int) float64 {
	switch in {
	case EmissivityInput:
		if r.Method.Basis.Balances() {
			return r.Surfaces[i].Balanced().Number
		}
		return r.Surfaces[i].Corrected.Number
	case FillInput:
		return fill(r.Makeup.Gaps[i].Gas)
	}
	return r.Makeup.Gaps[i].WidthMM
}

// set changes input i, from 0, of a make-up in one state.
func (in Input) set(m *Makeup, i int, value float64) {
	switch in {
	case EmissivityInput:
		p := &m.Panes[i/2]
		face := &p.Pane.Tints[0].Front
		if (i%2 == 1) != p.Turned {
			face = &p.Pane.Tints[0].Back
		}
		face.Corrected, face.Hemispherical = known(value), known(value)
	case FillInput:
		m.Gaps[i].Gas = filled(m.Gaps[i].Gas, value)
	case WidthInput:
		m.Gaps[i].WidthMM = value
	}
}

// A difference takes the derivative from values at multiples of the step.
type difference struct {
	side   Side
	at     []float64 // multiples of the step
	weight []float64
}

// Differences of second order.
var (
	central  = difference{BothSides, []float64{-1, 1}, []float64{-0.5, 0.5}}
	forward  = difference{Above, []float64{0, 1, 2}, []float64{-1.5, 2, -0.5}}
	backward = difference{Below, []float64{-2, -1, 0}, []float64{0.5, -2, 1.5}}
)

func (v variation) sensitivity(r *Rating, i int) (Sensitivity, error) {
	s := Sensitivity{Input: v.input, Number: i + 1, Value: v.input.of(r, i), Change: v.change, Step: v.step}
	if v.input == FillInput && s.Value == 0 {
		s.U = unknown(fmt.Sprintf("gap %d is filled with air", i+1))
		s.G = s.U
		return s, nil
	}
	d := central
	low := s.Value - v.step
	switch {
	case low < v.lowest || (low == v.lowest && !v.least):
		d = forward
	case s.Value+v.step > v.highest:
		d = backward
	}
	s.Side = d.side
	var u, g float64
	var moves []bool
	for k, at := range d.at {
		m := r.inState()
		v.input.set(m, i, s.Value+float64(at*v.step))
		var x Rating
		if err := x.again(r, m); err != nil {
			return s, err
		}
		if !x.U.Known {
			return s, errors.New(x.U.Why)
		}
		u += float64(d.weight[k] * x.U.Number)
		g += float64(d.weight[k] * x.G.Number)
		now := convects(&x)
		s.Corner = s.Corner || (moves != nil && !slices.Equal(moves, now))
		moves = now
	}
	s.U = known(u / v.step * v.change)
	s.G = known(g / v.step * v.change).orNot(r.G.Why)
	return s, nil
}

// convects says of each gap, as U and as g have it, whether its gas moves.
func convects(r *Rating) (moves []bool) {
	gaps := slices.Concat(r.Gaps, r.GapsG)
	if b := r.Balance(Summer); b != nil {
		for k := range r.Makeup.Gaps {
			gaps = append(gaps, b.Lit.Gaps[k].GapState(), b.Dark.Gaps[k].GapState())
		}
	}
	for _, s := range gaps {
		moves = append(moves, s.Nusselt > 1)
	}
	return moves
}

// inState returns a copy of the make-up in the one state of the rating, whose panes and gaps may
// be changed.
func (r *Rating) inState() *Makeup {
	m := *r.Makeup
	m.Panes, m.Gaps = slices.Clone(m.Panes), slices.Clone(m.Gaps)
	for k := range m.Panes {
		p := *m.Panes[k].Pane
		p.Tints = []Tint{p.Tints[r.Ready.States[r.State].Tints[k]]}
		m.Panes[k].Pane, m.Panes[k].Tint = &p, ""
	}
	return &m
}

// again rates a changed make-up of one state by the method of r.
func (x *Rating) again(r *Rating, m *Makeup) error {
	method := *r.Method
	method.conditions = method.conditions[:method.own] // those of the user move neither U nor g
	ready, err := method.Ready(m)
	if err != nil {
		return err
	}
	return ready.RateInto(x, 0)
}

// air is the gas that takes the place of any other.
const air = "air"

// fill returns the share of a mixture that is not air.
func fill(m thermal.Mixture) float64 {
	var sum float64
	for _, s := range m {
		if s.Gas != air {
			sum += s.Fraction
		}
	}
	return sum
}

// filled returns a mixture with its gases other than air scaled to a share, and air for the rest.
// The mixture must hold such a gas.
func filled(m thermal.Mixture, share float64) thermal.Mixture {
	have := fill(m)
	out := thermal.Mixture{{Gas: air, Fraction: 1 - share}}
	for _, s := range m {
		if s.Gas != air {
			out = append(out, thermal.Share{Gas: s.Gas, Fraction: s.Fraction * share / have})
		}
	}
	return out
}

// FillShares are the shares of gas for which Fills gives U.
func FillShares() []float64 { return []float64{0.90, 0.85, 0.80} }

// A Fill is U where gases other than air fill a share of the gaps.
type Fill struct {
	Share float64
	UWM2K float64
}

// Fills returns U for each of FillShares: in every gap that has a gas other than air, such gases,
// in the proportion that they have, fill that share and air the rest. It is an error if U is not
// known or no gap holds a gas other than air.
func Fills(r *Rating) ([]Fill, error) {
	switch {
	case !r.U.Known:
		return nil, errors.New(r.U.Why)
	case len(r.Makeup.Gaps) == 0:
		return nil, errors.New("there is no gap")
	case !slices.ContainsFunc(r.Makeup.Gaps, func(g Gap) bool { return fill(g.Gas) > 0 }):
		return nil, errors.New("no gap holds a gas other than air")
	}
	var out []Fill
	for _, share := range FillShares() {
		m := r.inState()
		for i := range m.Gaps {
			if fill(m.Gaps[i].Gas) > 0 {
				m.Gaps[i].Gas = filled(m.Gaps[i].Gas, share)
			}
		}
		var x Rating
		if err := x.again(r, m); err != nil {
			return nil, err
		}
		out = append(out, Fill{share, x.U.Number})
	}
	return out, nil
}
