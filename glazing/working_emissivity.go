package glazing

// The working of emissivities.

import (
	"fmt"
	"math"
	"sort"

	"panewright/reference"
	"panewright/spectra"
)

func workEmissivities(r *Rating) Chapter {
	c := Chapter{Title: "Emissivities: normal, and corrected by the table of EN 12898"}
	for i := range r.Surfaces {
		c.workEmissivity(r, i)
	}
	return c
}

// workEmissivity writes out the emissivity of surface i, from 0.
func (c *Chapter) workEmissivity(r *Rating, i int) {
	e, pane, number := &r.Surfaces[i], i/2, i+1
	name := r.Makeup.faceName(pane, i%2 == 1)
	if !e.Corrected.Known {
		c.lack(fmt.Sprintf("ε%d", number), e.Corrected.Why)
		return
	}
	corrected := Step{Symbol: fmt.Sprintf("ε%d", number), Meaning: name, Value: e.Corrected.Number, Clause: "EN 12898"}
	switch {
	case e.Source == EmissivityConvention:
		corrected.Formula, corrected.Clause = "by convention for uncoated soda-lime glass, with "+put(e.Normal.Number)+" normal", "EN 673"
		if e.ComputedNormal.Known && e.Hemispherical.Known {
			corrected.Formula += fmt.Sprintf("; its optical constants give %.4f normal and %.4f hemispherical, which enter nothing", e.ComputedNormal.Number, e.Hemispherical.Number)
		}
		corrected.Numbers = put(e.Corrected.Number)
		c.Steps = append(c.Steps, corrected)
		return
	case !e.Normal.Known:
		corrected.Formula, corrected.Numbers = "corrected, typed by the user", put(e.Corrected.Number)
		c.Steps = append(c.Steps, corrected)
		return
	}
	normal := Step{Symbol: fmt.Sprintf("εn%d", number), Meaning: name, Formula: "normal, typed by the user", Numbers: put(e.Normal.Number), Value: e.Normal.Number, Clause: "EN 12898"}
	if e.Source != EmissivityGivenNormal {
		normal.Formula, normal.Numbers = workNormal(r, i)
	}
	ratio := e.Corrected.Number / e.Normal.Number
	step := Step{Symbol: "ratio", Meaning: "of corrected to normal emissivity", Value: ratio, Clause: "EN 12898"}
	step.Formula, step.Numbers = workRatio(e.Normal.Number)
	corrected.Meaning, corrected.Formula, corrected.Numbers = "corrected emissivity", "ratio·εn", put(ratio)+"·"+put(e.Normal.Number)
	c.Steps = append(c.Steps, normal, step, corrected)
	if e.Hemispherical.Known {
		c.Steps = append(c.Steps, Step{Symbol: fmt.Sprintf("εh%d", number), Meaning: "hemispherical emissivity", Value: e.Hemispherical.Number,
			Formula: "exact integral over angle; " + entersWhere(r), Numbers: put(e.Hemispherical.Number), Clause: "integral over angle"})
	}
}

// entersWhere says where the exact emissivity enters and where the corrected one does.
func entersWhere(r *Rating) string {
	switch {
	case r.Method.Basis.Balances():
		return "it enters balances, the one above nothing"
	case len(r.Balances) > 0:
		return "it enters the balances of conditions, the one above U"
	}
	return "the one above enters U"
}

// workNormal writes out the normal emissivity of surface i from the infrared rows of its face.
func workNormal(r *Rating, i int) (formula, numbers string) {
	p := r.Makeup.Panes[i/2]
	s := &p.Pane.Tints[r.Ready.States[r.State].Tints[i/2]].Spectrum
	rho := s.InfraredFront
	if (i%2 == 1) != p.Turned {
		rho = s.InfraredBack
	}
	e := &r.Surfaces[i]
	const rounding = 1e-12 // of a mean that is the same
	if math.Abs(spectra.NormalEmissivity(rho, s.InfraredTau)-e.Normal.Number) > rounding {
		return "by the optical constants of the face", put(e.Normal.Number)
	}
	count := float64(len(reference.EmissivityWavelengths().Column("wavelength_um")))
	n := put(count)
	formula, numbers = "1 − Σρ/"+n, "1 − "+put(count*spectra.InfraredMean(rho))+"/"+n
	if tau := spectra.InfraredMean(s.InfraredTau); tau > 0 {
		formula, numbers = formula+" − Στ/"+n, numbers+" − "+put(count*tau)+"/"+n
	}
	if e.Source == EmissivityComputed {
		return formula + ", ρ by the optical constants", numbers
	}
	return formula + ", ρ of the infrared rows", numbers
}

// sameRow is how near to a row of the table a normal emissivity, a mean of binary numbers, is on it.
const sameRow = 1e-9

// workRatio writes out the ratio of the table of EN 12898 for a normal emissivity.
func workRatio(normal float64) (formula, numbers string) {
	at, ratio := reference.EmissivityRatio().Series("ratio")
	last := len(at) - 1
	for i, x := range at {
		if math.Abs(normal-x) < sameRow {
			return "of the table's row of εn " + put(x), put(ratio[i])
		}
	}
	i := sort.SearchFloat64s(at, normal)
	if i == 0 || i > last {
		i = min(i, last)
		return "of the table's end, εn " + put(at[i]) + ", held beyond", put(ratio[i])
	}
	formula = fmt.Sprintf("linear between the rows of εn %s and %s", put(at[i-1]), put(at[i]))
	numbers = fmt.Sprintf("%s + (%s)·(%s)/(%s)", put(ratio[i-1]), minus(ratio[i], ratio[i-1]), minus(normal, at[i-1]), minus(at[i], at[i-1]))
	return formula, numbers
}
