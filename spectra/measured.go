package spectra

// From columns to the spectrum of a pane: what is checked when columns are seen together, and the
// split of the solar range from the infrared.

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"
)

// Measured is the spectrum of one pane in one tint: transmittance and both reflectances up to
// 2500 nm, and the reflectances of the faces beyond, from which emissivity follows. Front is the
// face that looks outside when the pane is not turned.
type Measured struct {
	Tau, RhoFront, RhoBack      Curve
	InfraredFront, InfraredBack Curve // reflectance from 5 µm on; empty where not measured
	InfraredTau                 Curve // transmittance from 5 µm on; empty where not measured, as of glass
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
	var faults faultList
	for _, x := range []struct {
		name string
		col  *Column
	}{{headTau, &c.Tau}, {headRhoFront, &c.RhoFront}, {headRhoBack, &c.RhoBack}} {
		switch n := x.col.solar().Len(); {
		case x.col.Len() == 0:
			faults.add(&RowError{File: x.col.File, Text: "no column " + x.name + ", or nothing in it"})
		case n < minimumRows:
			faults.add(&RowError{File: x.col.File, Text: fmt.Sprintf("%d values of %s up to 2500 nm; at least %d are needed", n, x.name, minimumRows)})
		}
	}
	if faults.any() {
		return m, faults.errors()
	}
	bounded := &rowList{}
	tau := bound(c.Tau, bounded)
	front, back := bound(c.RhoFront, bounded), bound(c.RhoBack, bounded)
	sumToOne(tau, front, headRhoFront, bounded, &faults)
	sumToOne(tau, back, headRhoBack, bounded, &faults)
	m.Tau, m.RhoFront, m.RhoBack = tau.solar(), front.solar(), back.solar()
	for _, x := range []struct {
		rho, own Column
		face     string
		into     *Curve
	}{{front, infraredFront, "front", &m.InfraredFront}, {back, infraredBack, "back", &m.InfraredBack}} {
		var err *RowError
		if *x.into, err = infrared(x.rho, x.own, x.face, bounded, &m.Cautions); err != nil {
			faults.add(err)
		}
	}
	if faults.any() {
		return Measured{}, faults.errors()
	}
	if c := tau.cut(InfraredFirstNM, math.Inf(1)); c.Last() > InfraredFirstNM {
		m.InfraredTau = c
	}
	m.Cautions = append(m.Cautions, bounded.cautions()...)
	for _, col := range []Column{c.Tau, c.RhoFront, c.RhoBack} {
		if text := CoarseSteps(col.Curve); text != "" {
			caution := Caution{"coarse_steps", col.File + ": " + text}
			if !slices.Contains(m.Cautions, caution) {
				m.Cautions = append(m.Cautions, caution)
			}
		}
	}
	return m, nil
}

// Impossible returns why no pane can have such columns, as Join would, of those that are there:
// transmittance and reflectance that add to more than 1. It is nil where a pane can.
func Impossible(c Columns) Errors {
	var faults faultList
	tau := c.Tau.bounded()
	sumToOne(tau, c.RhoFront.bounded(), headRhoFront, &rowList{}, &faults)
	sumToOne(tau, c.RhoBack.bounded(), headRhoBack, &rowList{}, &faults)
	return faults.errors()
}

// solar returns the points up to 2500 nm; where none stands there, the next as well if it is no
// more than a usual step away. Points from there to 5 µm serve nothing.
func (c Curve) solar() Curve {
	s := c.cut(0, SolarLastNM)
	if n := s.Len(); n < c.Len() && s.Last() < SolarLastNM && c.NM[n] <= SolarLastNM+stepSolarNM {
		return c.slice(0, n+1)
	}
	return s
}

// rowList collects rows for a message: files and lines, each once.
type rowList struct{ rows []fileLine }

type fileLine struct {
	file string
	line int
}

func (l *rowList) add(file string, line int) { l.rows = append(l.rows, fileLine{file, line}) }

// listed is how many lines of a file a message names.
const listed = 8

// cautions names the lines of each file: the first few and a count.
func (l *rowList) cautions() (out []Caution) {
	slices.SortStableFunc(l.rows, func(a, b fileLine) int {
		return cmp.Or(strings.Compare(a.file, b.file), a.line-b.line)
	})
	for rest := slices.Compact(l.rows); len(rest) > 0; {
		n := 1
		for n < len(rest) && rest[n].file == rest[0].file {
			n++
		}
		lines := "line "
		if n > 1 {
			lines = "lines "
		}
		for i, row := range rest[:min(n, listed)] {
			if i > 0 {
				lines += ", "
			}
			lines += strconv.Itoa(row.line)
		}
		if n > listed {
			lines += fmt.Sprintf(" and %d more", n-listed)
		}
		out = append(out, Caution{"set_to_bound", fmt.Sprintf(
			"%s: values up to %g outside 0..1, or transmittance and reflectance adding to more than 1 by as much, were set to the bound in %s.",
			rest[0].file, Slack, lines)})
		rest = rest[n:]
	}
	return out
}

// bound returns a copy of the column with values set into 0…1.
func bound(c Column, changed *rowList) Column {
	out := Column{c.File, c.Line, Curve{NM: c.NM, Value: make([]float64, len(c.Value)), Gaps: c.Gaps}}
	for i, v := range c.Value {
		out.Value[i] = min(max(v, 0), 1)
		if out.Value[i] != v {
			changed.add(c.File, c.Line[i])
		}
	}
	return out
}

// binary is what binary arithmetic may add to a sum of decimal fractions.
const binary = 1e-12

// sumToOne checks τ + ρ ≤ 1 at the wavelengths of both, where both are given, and takes an
// excess within Slack off.
func sumToOne(tau, rho Column, name string, changed *rowList, faults *faultList) {
	// lower takes off c what exceeds 1 together with the other, at the points of c.
	lower := func(c Column, other Curve) {
		values := make([]float64, c.Len())
		other.Sample(values, c.NM)
		for i, nm := range c.NM {
			sum := c.Value[i] + values[i]
			switch {
			case nm < other.First() || nm > other.Last() || other.InGap(nm):
			case sum > 1+Slack+binary:
				faults.add(&RowError{c.File, c.Line[i], nm,
					fmt.Sprintf("tau + %s is %.4f; transmittance and reflectance add to at most 1", name, sum)})
			case sum > 1:
				c.Value[i] = 1 - values[i]
				if sum > 1+binary {
					changed.add(c.File, c.Line[i])
				}
			}
		}
	}
	lower(rho, tau.Curve)
	if !slices.Equal(tau.NM, rho.NM) { // a peak may lie between two points of the other
		lower(tau, rho.Curve)
	}
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
	line := rho.Line[rho.Len()-1] // of the last row, and of the first of the infrared
	firstLine := rho.Line[rho.Len()-c.Len()]
	switch {
	case c.Last() < infraredLeastNM:
		return Curve{}, &RowError{rho.File, line, c.Last(), "infrared rows of the " + face + " must reach 25 µm at least (5 to 50 µm give emissivity); drop them or measure on"}
	case c.First() > infraredStartNM:
		return Curve{}, &RowError{rho.File, firstLine, c.First(), "infrared rows of the " + face + " must begin at 5.5 µm or before (5 to 50 µm give emissivity)"}
	case len(c.Gaps) > 0:
		g := c.Gaps[0]
		return Curve{}, &RowError{rho.File, 0, g.FromNM, fmt.Sprintf("infrared rows of the %s have no values from here to %s nm (5 to 50 µm give emissivity); drop them or measure again", face, short(g.ToNM))}
	case c.Last() < infraredLastNM:
		*cautions = append(*cautions, Caution{"extended", fmt.Sprintf(
			"%s: infrared rows of the %s stop at %s µm; the last value was held to 50 µm.", rho.File, face, short(c.Last()/1000))})
	}
	return c, nil
}

// CoarseSteps says where the steps of a curve up to 2500 nm are too wide for the standards' tables,
// or returns "".
func CoarseSteps(c Curve) string {
	c = c.solar()
	var visible, beyond float64 // the widest steps
	for i := 1; i < c.Len(); i++ {
		step := c.NM[i] - c.NM[i-1]
		if slices.Contains(c.Gaps, Span{c.NM[i-1], c.NM[i]}) {
			continue // which the figures that need it speak of
		}
		if c.NM[i-1] < stepEdgeNM {
			visible = max(visible, step)
		} else {
			beyond = max(beyond, step)
		}
	}
	var parts []string
	if visible > stepVisibleNM {
		parts = append(parts, fmt.Sprintf("steps of up to %s nm below %d nm (at most %d are usual)", short(visible), stepEdgeNM, stepVisibleNM))
	}
	if beyond > stepSolarNM {
		parts = append(parts, fmt.Sprintf("steps of up to %s nm beyond %d nm (at most %d)", short(beyond), stepEdgeNM, stepSolarNM))
	}
	if parts == nil {
		return ""
	}
	return strings.Join(parts, ", ") + "; values between were interpolated."
}
