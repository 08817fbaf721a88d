package spectra

import (
	"fmt"
	"math"
	"strings"
)

// Measured is the spectrum of one pane in one tint: transmittance and both reflectances below
// 5 µm, and the reflectances of the faces beyond, from which emissivity follows. Front is the
// face that looks outside when the pane is not turned.
type Measured struct {
	Tau, RhoFront, RhoBack      Curve
	InfraredFront, InfraredBack Curve // reflectance from 5 µm on; empty where not measured
	Cautions                    []Caution
}

// InfraredFirstNM is where the infrared rows that give emissivity begin (EN 12898: 5 to 50 µm).
const InfraredFirstNM = 5000

const (
	infraredLastNM  = 50000
	infraredLeastNM = 25000 // infrared rows that stop before are refused
	// EN 12898 begins at 5.5 µm; rows that begin later leave that wavelength without a value.
	infraredStartNM = 5500

	stepEdgeNM    = 780 // below: steps up to stepVisible are fine, beyond up to stepSolar
	stepVisibleNM = 10
	stepSolarNM   = 50
)

// Join makes the spectrum of a pane from its columns, which may come from several files. Rows of
// the reflectances from 5 µm on give the infrared part of each face unless a column of its own
// is given. Values within Slack of a bound are set to it, with a caution. An error is Errors.
func Join(c Columns, infraredFront, infraredBack Column) (Measured, error) {
	var m Measured
	var faults Errors
	for _, x := range []struct {
		name string
		col  *Column
	}{{headTau, &c.Tau}, {headRhoFront, &c.RhoFront}, {headRhoBack, &c.RhoBack}} {
		switch n := x.col.below(InfraredFirstNM).Len(); {
		case x.col.Len() == 0:
			faults = append(faults, &RowError{File: x.col.File, Text: "no column " + x.name + ", or nothing in it"})
		case n < minimumRows:
			faults = append(faults, &RowError{File: x.col.File, Text: fmt.Sprintf("%d values of %s below 5 µm; at least %d are needed", n, x.name, minimumRows)})
		}
	}
	if len(faults) > 0 {
		return m, faults
	}
	bounded := &rowList{}
	tau := bound(c.Tau, bounded)
	front, back := bound(c.RhoFront, bounded), bound(c.RhoBack, bounded)
	faults = append(faults, sumToOne(tau, front, headRhoFront, bounded)...)
	faults = append(faults, sumToOne(tau, back, headRhoBack, bounded)...)
	m.Tau, m.RhoFront, m.RhoBack = tau.below(InfraredFirstNM), front.below(InfraredFirstNM), back.below(InfraredFirstNM)
	var err *RowError
	if m.InfraredFront, err = infrared(front, infraredFront, "front", bounded, &m.Cautions); err != nil {
		faults = append(faults, err)
	}
	if m.InfraredBack, err = infrared(back, infraredBack, "back", bounded, &m.Cautions); err != nil {
		faults = append(faults, err)
	}
	if len(faults) > 0 {
		return Measured{}, faults
	}
	if bounded.n > 0 {
		m.Cautions = append(m.Cautions, Caution{"set_to_bound", fmt.Sprintf(
			"%s: values up to %g outside 0..1, or transmittance and reflectance adding to more than 1, were set to the bound in %s.",
			c.Tau.File, Slack, bounded)})
	}
	if text := coarse(c.Tau); text != "" {
		m.Cautions = append(m.Cautions, Caution{"coarse_steps", c.Tau.File + ": " + text})
	}
	return m, nil
}

// below returns the points below limit nm, and the point at it.
func (c Curve) below(limit float64) Curve { return c.cut(0, limit) }

// rowList collects the lines of rows for a message: the first few and a count.
type rowList struct {
	lines []int
	n     int
}

func (l *rowList) add(line int) {
	for _, x := range l.lines {
		if x == line {
			return
		}
	}
	if l.n++; len(l.lines) < 8 {
		l.lines = append(l.lines, line)
	}
}

func (l *rowList) String() string {
	var s []string
	for _, x := range l.lines {
		s = append(s, fmt.Sprint(x))
	}
	out := "line " + strings.Join(s, ", ")
	if l.n > 1 {
		out = "lines " + strings.Join(s, ", ")
	}
	if l.n > len(l.lines) {
		out += fmt.Sprintf(" and %d more", l.n-len(l.lines))
	}
	return out
}

// bound returns a copy of the column with values set into 0…1.
func bound(c Column, changed *rowList) Column {
	out := Column{c.File, c.Line, Curve{c.NM, make([]float64, len(c.Value))}}
	for i, v := range c.Value {
		out.Value[i] = min(max(v, 0), 1)
		if out.Value[i] != v {
			changed.add(c.Line[i])
		}
	}
	return out
}

// sumToOne checks τ + ρ ≤ 1 at the wavelengths of ρ within those of τ, and takes an excess
// within Slack off ρ.
func sumToOne(tau, rho Column, name string, changed *rowList) (faults Errors) {
	values := make([]float64, rho.Len())
	tau.Sample(values, rho.NM)
	for i, nm := range rho.NM {
		if nm < tau.First() || nm > tau.Last() {
			continue
		}
		switch sum := values[i] + rho.Value[i]; {
		case sum > 1+Slack+1e-12:
			faults = append(faults, &RowError{rho.File, rho.Line[i], nm,
				fmt.Sprintf("tau + %s is %.4f; transmittance and reflectance add to at most 1", name, sum)})
		case sum > 1:
			rho.Value[i] = 1 - values[i]
			changed.add(rho.Line[i])
		}
	}
	return faults
}

// infrared returns the reflectance of a face from 5 to 50 µm, from a column of its own or from
// the rows of the spectrum beyond 5 µm; empty where there are none.
func infrared(rho, own Column, face string, changed *rowList, cautions *[]Caution) (Curve, *RowError) {
	if own.Len() > 0 {
		rho = bound(own, changed)
	}
	c := rho.cut(InfraredFirstNM, math.Inf(1))
	if c.Last() <= InfraredFirstNM {
		if own.Len() > 0 {
			return Curve{}, &RowError{File: own.File, Text: "no rows beyond 5 µm for the infrared reflectance of the " + face}
		}
		return Curve{}, nil
	}
	line := rho.Line[rho.Len()-1]
	switch {
	case c.Last() < infraredLeastNM:
		return Curve{}, &RowError{rho.File, line, c.Last(), "infrared rows of the " + face + " must reach 25 µm at least (5 to 50 µm give emissivity); drop them or measure on"}
	case c.First() > infraredStartNM:
		return Curve{}, &RowError{rho.File, line, c.First(), "infrared rows of the " + face + " must begin at 5.5 µm or before (5 to 50 µm give emissivity)"}
	case c.Last() < infraredLastNM:
		*cautions = append(*cautions, Caution{"extended", fmt.Sprintf(
			"%s: infrared rows of the %s stop at %s µm; the last value was held to 50 µm.", rho.File, face, short(c.Last()/1000))})
	}
	return c, nil
}

// coarse says where steps are too wide for the standards' tables, or returns "".
func coarse(c Column) string {
	widest := map[bool]float64{}
	for i := 1; i < c.Len() && c.NM[i-1] < SolarLastNM && c.NM[i] <= InfraredFirstNM; i++ {
		visible := c.NM[i-1] < stepEdgeNM
		widest[visible] = max(widest[visible], c.NM[i]-c.NM[i-1])
	}
	var parts []string
	if widest[true] > stepVisibleNM {
		parts = append(parts, fmt.Sprintf("steps of up to %s nm below %d nm (at most %d are usual)", short(widest[true]), stepEdgeNM, stepVisibleNM))
	}
	if widest[false] > stepSolarNM {
		parts = append(parts, fmt.Sprintf("steps of up to %s nm beyond %d nm (at most %d)", short(widest[false]), stepEdgeNM, stepSolarNM))
	}
	if parts == nil {
		return ""
	}
	return strings.Join(parts, ", ") + "; values between were interpolated."
}
