package glazing

// Two ratings side by side: how far their figures and colours lie apart, and what differs in what
// was put in.

import (
	"fmt"
	"slices"
	"strconv"

	"panewright/spectra/colour"
)

// A Comparison is what tells a rating, the option, from another, the reference.
type Comparison struct {
	Reference, Option *Rating
	// CIEDE2000 of the colours for the 2° observer (ISO/CIE 11664-6); unknown where a colour is.
	Transmitted, ReflectedOutside, ReflectedInside Value
	// Inputs are sentences: each says one thing in which what was put in differs.
	Inputs []string
}

// Compare compares an option with a reference.
func Compare(reference, option *Rating) Comparison {
	return Comparison{
		Reference: reference, Option: option,
		Transmitted:      colourDifference(reference.Transmitted, option.Transmitted),
		ReflectedOutside: colourDifference(reference.Outside, option.Outside),
		ReflectedInside:  colourDifference(reference.Inside, option.Inside),
		Inputs:           inputDifferences(reference, option),
	}
}

// Difference returns by how much a figure of the option, at a pane, gap or surface counted from 0,
// is above that of the reference, unrounded; unknown where one of them is, or has no such place.
func (c Comparison) Difference(f Figure, i int) Value {
	if f.Value == nil {
		return unknown("not a number")
	}
	var v [2]Value
	for k, r := range []*Rating{c.Reference, c.Option} {
		if i >= f.Count(r) {
			return unknown(r.Makeup.ID + " has none")
		}
		if v[k] = f.Value(r, i); !v[k].Known {
			return v[k]
		}
	}
	return known(v[1].Number - v[0].Number)
}

func colourDifference(a, b Colours) Value {
	for _, c := range []Colours{a, b} {
		if c.Why != "" {
			return unknown(c.Why)
		}
	}
	return known(colour.Lab.CIEDE2000(a.TwoDegree, b.TwoDegree))
}

// none stands in a sentence for what one of two make-ups does not have.
const none = "none"

// inputDifferences says what of the option's input is not as in the reference's.
func inputDifferences(reference, option *Rating) []string {
	out := []string{}
	differ := func(what, is, was string) {
		if is != was {
			out = append(out, fmt.Sprintf("%s: %s instead of %s.", what, is, was))
		}
	}
	numbers := func(what string, is, was float64, digits int, unit string) {
		one, two := apart(is, was, digits)
		differ(what, one+unit, two+unit)
	}
	values := func(what string, is, was Value, unit string) { // not known where nothing was given
		if is.Known && was.Known {
			numbers(what, is.Number, was.Number, 4, unit)
		} else {
			differ(what, given(is, unit), given(was, unit))
		}
	}
	a, b := reference.Makeup, option.Makeup
	differ("Basis", option.Method.Basis.Name, reference.Method.Basis.Name)
	if reference.Method.Basis.Name == option.Method.Basis.Name {
		differ("Editions and coefficients", option.Method.Editions(), reference.Method.Editions())
	}
	for k := range max(len(a.Panes), len(b.Panes)) {
		what := fmt.Sprintf("Pane %d", k+1)
		was, is := a.paneInput(k), b.paneInput(k)
		differ(what, is, was)
		if is == none || was == none {
			continue
		}
		differ(what, turnedInput(b.Panes[k]), turnedInput(a.Panes[k]))
		differ(what+", tint", option.tintInput(k), reference.tintInput(k))
		differ(what+", heat treatment", treated(b.Panes[k]), treated(a.Panes[k]))
		numbers(what+", infrared transmittance", option.infraredInput(k), reference.infraredInput(k), 4, "")
	}
	for k := range max(len(a.Gaps), len(b.Gaps)) {
		what := fmt.Sprintf("Gap %d", k+1)
		if k >= len(a.Gaps) || k >= len(b.Gaps) {
			differ(what, b.gapInput(k), a.gapInput(k))
			continue
		}
		numbers(what, b.Gaps[k].WidthMM, a.Gaps[k].WidthMM, 6, " mm")
		is, was := b.Gaps[k].Gas, a.Gaps[k].Gas
		content := b.Gaps[k].Content()
		differ(what, content, a.Gaps[k].Content())
		if content == a.Gaps[k].Content() { // shares that differ below what is printed
			for i := range min(len(is), len(was)) {
				numbers(what+", share of "+is[i].Gas, is[i].Fraction, was[i].Fraction, 4, "")
			}
		}
		if is, was := b.Gaps[k].Vacuum, a.Gaps[k].Vacuum; is != nil && was != nil {
			numbers(what+", pressure", is.PressurePa, was.PressurePa, 6, " Pa")
			numbers(what+", radius of pillars", is.PillarRadiusMM, was.PillarRadiusMM, 6, " mm")
			numbers(what+", pitch of pillars", is.PillarPitchMM, was.PillarPitchMM, 6, " mm")
			values(what+", conductivity of pillars", is.PillarWMK, was.PillarWMK, " W/(m·K)")
		}
	}
	values("Temperature factor of the edge", b.Edge.TemperatureFactor, a.Edge.TemperatureFactor, "")
	values("ψ of the edge", b.Edge.PsiWMK, a.Edge.PsiWMK, " W/(m·K)")
	numbers("Tilt", b.Tilt.Degrees(), a.Tilt.Degrees(), 6, "°")
	if !a.Tilt.Vertical() || !b.Tilt.Vertical() {
		differ("Heat flow", flowNames[b.HeatFlow], flowNames[a.HeatFlow])
	}
	for k := range min(len(reference.Surfaces), len(option.Surfaces)) {
		what, is, was := fmt.Sprintf("Emissivity of surface %d", k+1), option.entering(k), reference.entering(k)
		if is.Known && was.Known {
			numbers(what, is.Number, was.Number, 4, "")
		} else {
			differ(what, emissivityInput(is), emissivityInput(was))
		}
	}
	var names []string
	for _, t := range slices.Concat(a.Typed, b.Typed) {
		if !slices.Contains(names, t.Name) {
			names = append(names, t.Name)
			differ("Typed by the user, "+t.Name, orNone(b.TypedText(t.Name)), orNone(a.TypedText(t.Name)))
		}
	}
	return out
}

var flowNames = map[HeatFlow]string{FlowUp: "up", FlowDown: "down"}

func orNone(s string) string {
	if s == "" {
		return none
	}
	return s
}

// TypedText returns the value of a name that the user typed, or "".
func (m *Makeup) TypedText(name string) string {
	for _, t := range m.Typed {
		if t.Name == name {
			return t.Text
		}
	}
	return ""
}

func (m *Makeup) paneInput(k int) string {
	if k >= len(m.Panes) {
		return none
	}
	p := m.Panes[k].Pane
	return fmt.Sprintf("%s (%s)", p.ID, millimetres(p.ThicknessMM()))
}

// treated returns the heat treatment of a pane.
func treated(p Placed) string {
	if t := p.Pane.HeatTreatment; t != "" {
		return string(t)
	}
	return string(UnknownTreatment)
}

// infraredInput returns what a pane lets through of the thermal infrared.
func (r *Rating) infraredInput(k int) float64 {
	return r.Makeup.Panes[k].Pane.infraredTau(r.Ready.States[r.State].Tints[k])
}

// given returns a value of the user's with its unit, or that there is none.
func given(v Value, unit string) string {
	if v.Known {
		return fmt.Sprintf("%.4g", v.Number) + unit
	}
	return none
}

func turnedInput(p Placed) string {
	if p.Turned {
		return "turned"
	}
	return "not turned"
}

// tintInput returns the tint that a pane has in the rating.
func (r *Rating) tintInput(k int) string {
	return orNone(r.Makeup.Panes[k].Pane.Tints[r.Ready.States[r.State].Tints[k]].Name)
}

func (m *Makeup) gapInput(k int) string {
	if k >= len(m.Gaps) {
		return none
	}
	return millimetres(m.Gaps[k].WidthMM) + " " + m.Gaps[k].Content()
}

// entering returns the emissivity of a surface that enters U.
func (r *Rating) entering(k int) Value {
	if r.Method.Basis.Balances() {
		return r.Surfaces[k].Balanced()
	}
	return r.Surfaces[k].Corrected
}

func emissivityInput(v Value) string {
	if v.Known {
		return fmt.Sprintf("%.4g", v.Number)
	}
	return "not known"
}

// sameInput is how many digits of two inputs are the same where they differ by rounding alone.
const sameInput = 10

// apart prints two numbers with as many digits as are given, or, where they would look the same,
// with as many as they need to differ.
func apart(a, b float64, digits int) (string, string) {
	for ; ; digits++ {
		one, two := strconv.FormatFloat(a, 'g', digits, 64), strconv.FormatFloat(b, 'g', digits, 64)
		if one != two || digits >= sameInput {
			return one, two
		}
	}
}
