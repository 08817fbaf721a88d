// Package glazing rates make-ups: from the spectra of panes and the gaps between them it
// computes light and solar transmittance and reflectance, colour, ultraviolet, solar heat gain,
// emissivity and the U-value of the centre of the glass, for every tint, under a basis (a family
// of standards used together).
//
// A make-up lists its panes from outside to inside; surfaces are numbered 1, 2, 3 … in the same
// direction. A rating is calculated: it is not certified, nor a maker's declaration.
//
// A make-up rated from one CSV spectrum; each err is to be looked at:
//
//	columns, err := spectra.ReadCSV(file, "low-e.csv")
//	spectrum, err := spectra.Join(columns, spectra.Column{}, spectra.Column{})
//	pane := &glazing.Pane{ID: "low-e", Plies: []glazing.Ply{{ThicknessMM: 6, ConductivityWMK: 1, DensityKGM3: 2500}},
//		Tints: []glazing.Tint{{Spectrum: spectrum, Front: glazing.GivenEmissivity(0.837), Back: glazing.GivenEmissivity(0.04)}}}
//	argon, err := glazing.Filling(map[string]float64{"argon": 0.9, "air": 0.1})
//	ratings, err := glazing.Rate(&glazing.Makeup{ID: "D1",
//		Panes: []glazing.Placed{{Pane: pane}, {Pane: pane, Turned: true}},
//		Gaps:  []glazing.Gap{{WidthMM: 16, Gas: argon}}}, glazing.EN)
//	fmt.Println(ratings[0].U.Number, ratings[0].G.Number)
//
// With conditions a rating has a detailed heat balance under each: in the place of Rate,
//
//	night := glazing.Condition{ID: "night", OutsideC: -12, InsideC: 20, WindMS: glazing.Value{Number: 4, Known: true}}
//	ready, err := glazing.NewMethod(glazing.EN, glazing.Options{Conditions: []glazing.Condition{night}}).Ready(makeup)
//	ratings, err := ready.RateAll()
//	fmt.Println(ratings[0].Balance("night").SurfaceC(3).Number) // of surface 4, °C
//
// Package glazing/project reads whole projects from their files.
//
// Everything here is pure: values in, values out. Methods, made-ready make-ups and panes may be
// shared by goroutines; a Rating belongs to one.
package glazing

import (
	"fmt"
	"slices"
	"strings"

	"panewright/glazing/film"
	"panewright/spectra"
	"panewright/thermal"
)

// A Caution is a remark that travels with the figures: a short code and a sentence.
type Caution = spectra.Caution

// Value is a figure: a number if Known, else the reason for which there is none.
type Value struct {
	Number float64
	Known  bool
	Why    string
}

func known(v float64) Value    { return Value{Number: v, Known: true} }
func unknown(why string) Value { return Value{Why: why} }
func (v Value) orNot(why string) Value {
	if why != "" {
		return unknown(why)
	}
	return v
}

// HeatTreatment of a pane.
type HeatTreatment string

// The heat treatments.
const (
	UnknownTreatment HeatTreatment = "unknown"
	Annealed         HeatTreatment = "annealed"
	HeatStrengthened HeatTreatment = "heat-strengthened"
	Toughened        HeatTreatment = "toughened"
)

// The properties of soda-lime glass that stand where none are given.
const (
	GlassKGM3 = 2500                      // density, kg/m³ (EN 572-1, from memory)
	GlassWMK  = thermal.GlassConductivity // conductivity, W/(m·K) (EN 673)
)

// Origin says where the spectrum of a pane comes from.
type Origin string

// The origins of spectra.
const (
	MeasuredOrigin Origin = "measured"
	ModelledOrigin Origin = "modelled"
	InventedOrigin Origin = "invented"
)

// A Pane is one sheet of glass or one laminate, with its films. Front is the face that looks
// outside when the pane is not turned.
type Pane struct {
	ID            string
	Plies         []Ply // outside to inside when not turned; one for a plain sheet
	HeatTreatment HeatTreatment
	HeatSoaked    bool
	Origin        Origin
	Sheet         *film.Sheet  // what an uncoated pane was computed from; nil of any other
	Coated        *film.Coated // what a coated pane was computed from; nil of any other
	Tints         []Tint       // at least one; a pane that does not switch has one, with no name
	// TauInfrared is the transmittance in the thermal infrared, if the user gave it, of a sheet
	// that is not opaque there. EN 673 cannot treat it: with such a pane U and g are unknown.
	TauInfrared float64
	Attributes  map[string]float64 // anything numeric of the user's
}

// A Ply is one layer of a pane, across which heat is conducted.
type Ply struct {
	Interlayer      bool
	ThicknessMM     float64
	ConductivityWMK float64
	DensityKGM3     float64
}

// A Tint is one state of a pane.
type Tint struct {
	Name         string
	ChargeMCCM2  Value // inserted charge density, mC/cm², if the user gave it
	TemperatureC Value // of a thermochromic pane
	Spectrum     spectra.Measured
	Source       string // where the spectrum comes from: files, a paper
	Front, Back  Emissivity
}

// Emissivity of a face, with where it comes from.
type Emissivity struct {
	Normal        Value // at 283 K (EN 12898)
	Corrected     Value // hemispherical by the table of EN 12898; enters U and g
	Hemispherical Value // exact integral over angle, where what the face is made of is known
	// ComputedNormal is the normal emissivity by the face's optical constants where a convention
	// stands in its place; it is shown and enters nothing.
	ComputedNormal Value
	Source         string
}

// The sources of an emissivity.
const (
	EmissivityGiven       = "given"        // corrected, typed by the user
	EmissivityGivenNormal = "given_normal" // normal, typed by the user
	EmissivityInfrared    = "infrared"     // from infrared rows of the spectrum
	EmissivityConvention  = "convention"   // of uncoated soda-lime glass (EN 673)
	EmissivityComputed    = "computed"     // from optical constants
	EmissivityUnknown     = "unknown"
)

// GivenEmissivity is a corrected emissivity that the user knows, above 0 and up to 1.
func GivenEmissivity(corrected float64) Emissivity {
	return Emissivity{Corrected: known(corrected), Source: EmissivityGiven,
		Normal: unknown("a corrected emissivity was given"), Hemispherical: unknown("the films are not known")}
}

// GivenNormalEmissivity is a normal emissivity that the user knows.
func GivenNormalEmissivity(normal float64) Emissivity {
	e := fromNormal(normal)
	e.Source = EmissivityGivenNormal
	return e
}

// InfraredEmissivity follows from the reflectance of a face from 5 to 50 µm (EN 12898), and from
// the transmittance of a sheet that is not opaque there.
func InfraredEmissivity(reflectance, transmittance spectra.Curve) Emissivity {
	normal := spectra.NormalEmissivity(reflectance, transmittance)
	if normal < leastEmissivity {
		return noEmissivity("the infrared rows leave none")
	}
	e := fromNormal(normal)
	e.Source = EmissivityInfrared
	return e
}

// ConventionalEmissivity is that of an uncoated face of soda-lime glass, 0.89 normal and 0.837
// corrected (EN 673), with the normal and the hemispherical emissivity by its optical constants,
// which enter nothing.
func ConventionalEmissivity(computedNormal, hemispherical float64) Emissivity {
	return Emissivity{Normal: known(thermal.GlassEmissivityNormal), Corrected: known(thermal.GlassEmissivity),
		Hemispherical: known(hemispherical), ComputedNormal: known(computedNormal), Source: EmissivityConvention}
}

// ComputedEmissivity is that of a face whose reflectance, and transmittance, from 5 to 50 µm were
// computed from optical constants, with the exact integral over the half space.
func ComputedEmissivity(reflectance, transmittance spectra.Curve, hemispherical float64) Emissivity {
	e := InfraredEmissivity(reflectance, transmittance)
	if e.Corrected.Known {
		e.Source, e.Hemispherical = EmissivityComputed, known(hemispherical)
	}
	return e
}

// leastEmissivity is below that of any surface; bulk silver has about 0.005.
const leastEmissivity = 0.0001

func fromNormal(normal float64) Emissivity {
	corrected, _ := thermal.CorrectedEmissivity(normal)
	return Emissivity{Normal: known(normal), Corrected: known(corrected), Hemispherical: unknown("the films are not known")}
}

// UnknownEmissivity is that of a face of which none is known, for a reason.
func UnknownEmissivity(why string) Emissivity { return noEmissivity(why) }

// NoEmissivity is that of a face of which nothing is known.
func NoEmissivity() Emissivity {
	return noEmissivity("no emissivity and no infrared rows were given")
}

func noEmissivity(why string) Emissivity {
	none := unknown(why)
	return Emissivity{Normal: none, Corrected: none, Hemispherical: none, Source: EmissivityUnknown}
}

// Tilt of a glazing; the zero value is vertical.
type Tilt struct {
	deg   float64
	given bool
}

// TiltDeg returns the tilt of a glazing in degrees: 90 vertical, 0 horizontal with the outside
// above.
func TiltDeg(deg float64) Tilt { return Tilt{deg, true} }

// Degrees returns the tilt: 90 vertical, 0 horizontal with the outside above.
func (t Tilt) Degrees() float64 {
	if t.given {
		return t.deg
	}
	return 90
}

// Vertical reports whether the tilt is 90°.
func (t Tilt) Vertical() bool { return t.Degrees() == 90 }

// A Makeup is a sequence of panes and gaps from outside to inside.
type Makeup struct {
	ID, Title string
	Tilt      Tilt
	HeatFlow  HeatFlow // off vertical
	Typed     []Typed  // carried to the schedule, marked as typed by the user
	Panes     []Placed
	Gaps      []Gap // one fewer than panes
	Edge      Edge
}

// HeatFlow is the direction of heat through a make-up that is not vertical; the zero value is up.
type HeatFlow = thermal.Flow

// The directions of heat flow.
const (
	FlowUp   = thermal.Up
	FlowDown = thermal.Down
)

// Typed is a value that the user typed in and that nothing here computes.
type Typed struct{ Name, Text string }

// Placed is a pane in its place.
type Placed struct {
	Pane   *Pane
	Turned bool   // the back face looks outside
	Tint   string // one fixed tint; SameTint; or "" for every tint in turn
}

// SameTint makes a pane follow the tint of the outermost pane that can switch.
const SameTint = "same"

// A Gap is the space between two panes.
type Gap struct {
	WidthMM float64
	Gas     thermal.Mixture // nil where evacuated
	Vacuum  *Vacuum         // nil where filled
}

// Content returns what is in the gap, as the trade writes it: "argon 90 / air 10", or "vacuum".
func (g Gap) Content() string {
	if g.Vacuum != nil {
		return "vacuum"
	}
	return g.Gas.String()
}

// Filling makes a gas filling from fractions by volume that add to 1; see thermal.Mix.
func Filling(fractions map[string]float64) (thermal.Mixture, error) { return thermal.Mix(fractions) }

// Gases returns the names of the gases that a gap may be filled with.
func Gases() []string { return thermal.GasNames() }

// MaxPanes is the largest number of panes of a make-up.
const MaxPanes = 8

// Tintable reports whether the pane has named tints.
func (p *Pane) Tintable() bool { return len(p.Tints) > 1 || p.Tints[0].Name != "" }

// TintNames returns the names of the tints, in the order given.
func (p *Pane) TintNames() []string {
	var names []string
	for _, t := range p.Tints {
		names = append(names, t.Name)
	}
	return names
}

// TintNamed returns the index of a tint, or -1. Where no tint is called clear or full, clear is
// that of the highest and full that of the lowest light transmittance.
func (p *Pane) TintNamed(name string) int {
	if at := slices.Index(p.TintNames(), name); at >= 0 || (name != "clear" && name != "full") || !p.Tintable() {
		return at
	}
	light := spectra.LightEN410()
	best, at := 0.0, -1
	for i := range p.Tints {
		tau := light.Mean(p.Tints[i].Spectrum.Tau)
		if at < 0 || (name == "clear" && tau > best) || (name == "full" && tau < best) {
			best, at = tau, i
		}
	}
	return at
}

// ThicknessMM returns the thickness of the pane, interlayers included.
func (p *Pane) ThicknessMM() float64 {
	var sum float64
	for _, y := range p.Plies {
		sum += y.ThicknessMM
	}
	return sum
}

// MassKGM2 returns the mass of the pane in kg/m².
func (p *Pane) MassKGM2() float64 {
	var sum float64
	for _, y := range p.Plies {
		sum += float64(y.ThicknessMM * y.DensityKGM3 / 1000)
	}
	return sum
}

// Resistance returns the thermal resistance Σ d/λ of the plies in m²·K/W.
func (p *Pane) Resistance() float64 {
	var sum float64
	for _, y := range p.Plies {
		sum += y.resistance()
	}
	return sum
}

// resistance returns d/λ in m²·K/W.
func (y Ply) resistance() float64 { return y.ThicknessMM / (1000 * y.ConductivityWMK) }

// Tintable reports whether any pane of the make-up has named tints.
func (m *Makeup) Tintable() bool {
	return slices.ContainsFunc(m.Panes, func(p Placed) bool { return p.Pane.Tintable() })
}

// BuildUp returns the sequence from outside to inside as the trade writes it: thickness and pane,
// gap and gas. Spaces within a part are no-break spaces.
func (m *Makeup) BuildUp() string { return m.buildUp(millimetres) }

// buildUp is BuildUp with the widths of gaps as a function prints them.
func (m *Makeup) buildUp(width func(mm float64) string) string {
	var parts []string
	for i, p := range m.Panes {
		if i > 0 {
			g := m.Gaps[i-1]
			parts = append(parts, width(g.WidthMM)+" "+g.Content())
		}
		s := p.Pane.ID
		if p.Turned {
			s += " (turned)"
		}
		if p.Tint != "" {
			s += " (tint " + p.Tint + ")"
		}
		parts = append(parts, s)
	}
	for i := range parts {
		parts[i] = strings.ReplaceAll(parts[i], " ", "\u00a0")
	}
	return strings.Join(parts, "\u00a0| ")
}

// A State is one combination of tints: for each pane the index of its tint.
type State struct {
	Name  string // of the tints of the panes that can switch, outside first, joined by "/"
	Tints []int
}

// States returns every combination of tints of the make-up, the outermost pane's slowest. Panes
// that follow another's tint are not named. It is an error if a fixed or followed tint does not
// exist.
func (m *Makeup) States() ([]State, error) {
	states := []State{{Tints: make([]int, len(m.Panes))}}
	leader := -1
	for k, p := range m.Panes {
		var choices []int
		switch {
		case p.Tint == SameTint && leader < 0:
			return nil, fmt.Errorf("pane %d (%s) has tint: same, but no pane outside it can switch", k+1, p.Pane.ID)
		case p.Tint == SameTint:
			for i := range states {
				name := m.Panes[leader].Pane.Tints[states[i].Tints[leader]].Name
				at := slices.Index(p.Pane.TintNames(), name)
				if at < 0 {
					return nil, fmt.Errorf("pane %d (%s) has tint: same, but no tint %q as pane %d (%s) has", k+1, p.Pane.ID, name, leader+1, m.Panes[leader].Pane.ID)
				}
				states[i].Tints[k] = at
			}
			continue
		case p.Tint != "":
			at := p.Pane.TintNamed(p.Tint)
			if at < 0 {
				return nil, fmt.Errorf("pane %d (%s) has no tint %q", k+1, p.Pane.ID, p.Tint)
			}
			choices = []int{at}
		default:
			for i := range p.Pane.Tints {
				choices = append(choices, i)
			}
		}
		var next []State
		for _, s := range states {
			for _, c := range choices {
				tints := slices.Clone(s.Tints)
				tints[k] = c
				name := s.Name
				if p.Pane.Tintable() {
					if name != "" {
						name += "/"
					}
					name += p.Pane.Tints[c].Name
				}
				next = append(next, State{name, tints})
			}
		}
		states = next
		if leader < 0 && p.Pane.Tintable() {
			leader = k
		}
		if len(states) > maxStates {
			return nil, fmt.Errorf("more than %d combinations of tints; fix some with tint: NAME or tint: same", maxStates)
		}
	}
	return states, nil
}

const maxStates = 4096

// check refuses a make-up that no basis can rate.
func (m *Makeup) check() error {
	switch n := len(m.Panes); {
	case n == 0:
		return fmt.Errorf("make-up %s has no pane", m.ID)
	case n > MaxPanes:
		return fmt.Errorf("make-up %s has %d panes; at most %d", m.ID, n, MaxPanes)
	case len(m.Gaps) != n-1:
		return fmt.Errorf("make-up %s has %d panes and %d gaps; there is one gap between two panes", m.ID, n, len(m.Gaps))
	}
	for i, g := range m.Gaps {
		if !(g.WidthMM > 0) {
			return fmt.Errorf("make-up %s: gap %d is %g mm wide; a width is above 0", m.ID, i+1, g.WidthMM)
		}
		if len(g.Gas) == 0 && g.Vacuum == nil {
			return fmt.Errorf("make-up %s: gap %d has neither gas nor vacuum", m.ID, i+1)
		}
		if v := g.Vacuum; v != nil && !(v.PressurePa >= 0 && v.PillarRadiusMM > 0 && v.PillarPitchMM > 2*v.PillarRadiusMM) {
			return fmt.Errorf("make-up %s: gap %d: pillars of %g mm radius stand %g mm apart; the pitch is above twice the radius", m.ID, i+1, v.PillarRadiusMM, v.PillarPitchMM)
		}
	}
	for i, p := range m.Panes {
		if p.Pane == nil || len(p.Pane.Tints) == 0 || len(p.Pane.Plies) == 0 {
			return fmt.Errorf("make-up %s: pane %d has no spectrum or no thickness", m.ID, i+1)
		}
		for _, y := range p.Pane.Plies {
			if !(y.ThicknessMM > 0 && y.ConductivityWMK > 0) {
				return fmt.Errorf("make-up %s: pane %d (%s) has a ply without thickness or conductivity", m.ID, i+1, p.Pane.ID)
			}
		}
	}
	return nil
}
