package project

// From keys to panes and make-ups: what only shows when keys are seen together.

import (
	"bytes"
	"fmt"
	"maps"
	"math"
	"slices"
	"strings"

	"panewright/glazing"
	"panewright/spectra"
)

// builder turns the spec types into panes and make-ups, and reports what only shows when keys
// are seen together.
type builder struct {
	*reader
	*fileSet
}

const notYet = "is not in this version"

func (b *builder) project(s *fileSpec) *Project {
	p := &Project{
		Title: s.Project.value, Author: s.Author.value, Date: s.Date.value, Client: s.Client.value, Notes: s.Notes.value,
		coefficients: s.Coefficients,
	}
	for _, t := range s.Basis.values {
		if basis, err := glazing.BasisNamed(t.value); err == nil {
			p.Bases = append(p.Bases, basis)
		}
	}
	if p.Bases == nil {
		p.Bases = []glazing.Basis{glazing.EN}
	}
	if s.Sun.given {
		p.sun, p.Cautions = b.sun(s.Sun, p.Cautions)
	}
	ids := map[string]position{}
	for _, m := range s.Materials {
		b.unique(ids, m.ID, "id", "material")
	}
	ids = map[string]position{}
	for _, g := range s.Glasses {
		b.unique(ids, g.ID, "id", "glass or pane")
	}
	for i := range s.Panes {
		b.unique(ids, s.Panes[i].ID, "id", "glass or pane")
		if pane := b.pane(&s.Panes[i]); pane != nil {
			p.Panes = append(p.Panes, pane)
		}
	}
	ids = map[string]position{}
	for i := range s.Makeups {
		b.unique(ids, s.Makeups[i].ID, "id", "make-up")
		if m := b.makeup(&s.Makeups[i], s.Panes, p.Panes); m != nil {
			p.Makeups = append(p.Makeups, m)
		}
	}
	b.conditions(s.Conditions)
	b.limits(s.Limits, s.Makeups)
	for _, name := range []string{glazing.NA.Name, glazing.ISO15099.Name} {
		if _, ok := s.Coefficients[name]; ok {
			p.Cautions = append(p.Cautions, glazing.Caution{Code: "coefficients_not_used",
				Text: "The coefficients given for " + name + " move nothing: U and g under it need the detailed heat balance, which this version does not have."})
		}
	}
	if len(s.Limits) > 0 {
		p.Cautions = append(p.Cautions, glazing.Caution{Code: "limits_not_checked",
			Text: "The project's limits were read and not checked: this version does not check limits."})
	}
	if len(s.Conditions) > 0 {
		p.Cautions = append(p.Cautions, glazing.Caution{Code: "conditions_not_rated",
			Text: "The project's conditions were read and not rated: they need the detailed heat balance of ISO 15099, which this version does not have."})
	}
	return p
}

// unique reports an id that stands twice.
func (b *builder) unique(ids map[string]position, id text, key, what string) {
	if !id.given {
		return
	}
	if first, ok := ids[id.value]; ok {
		b.fail(id.at, key, "%q is the name of another %s, in line %d", clip(id.value), what, first.line)
		b.incomplete["id"] = true
		return
	}
	ids[id.value] = id.at
}

// sun reads the site's spectrum; the limits of the solar range that it does not reach are said.
func (b *builder) sun(t text, cautions []glazing.Caution) (*spectra.Weighting, []glazing.Caution) {
	content, err := b.bytesOf(t)
	if err != nil {
		b.fail(t.at, "sun", "%s: %v", clip(t.value), err)
		return nil, cautions
	}
	w, err := spectra.ReadSunCSV(bytes.NewReader(content), t.value)
	if err != nil {
		b.spectrumFaults(err)
		return nil, cautions
	}
	if first, last := w.NM[0], w.NM[len(w.NM)-1]; first > spectra.SolarFirstNM || last < spectra.SolarLastNM {
		cautions = append(cautions, glazing.Caution{Code: "sun_range", Text: fmt.Sprintf(
			"The sun of %s reaches from %s to %s nm only, not from %d to %d.", t.value, short(first), short(last), spectra.SolarFirstNM, spectra.SolarLastNM)})
	}
	return &w, cautions
}

// pane makes a pane, or returns nil after reporting why not.
func (b *builder) pane(s *paneSpec) *glazing.Pane {
	ok := !s.Faulty
	fail := func(at position, key, format string, args ...any) {
		if !s.Faulty { // what a faulty pane lacks is not said as well
			b.fail(at, key, format, args...)
		}
		ok = false
	}
	if s.modelled() {
		return nil // place refuses it where a make-up uses it
	}
	p := &glazing.Pane{ID: s.ID.value, HeatTreatment: glazing.HeatTreatment(s.HeatTreatment.value), HeatSoaked: s.HeatSoaked.value,
		Origin: glazing.Origin(s.Origin.value), TauInfrared: s.TauInfrared.value}
	if p.HeatTreatment == "" {
		p.HeatTreatment = glazing.UnknownTreatment
	}
	if p.Origin == "" {
		p.Origin = glazing.MeasuredOrigin
	}
	for name, v := range s.Attributes {
		if p.Attributes == nil {
			p.Attributes = map[string]float64{}
		}
		p.Attributes[name] = v.value
	}
	switch {
	case s.Thickness.given && len(s.Plies) > 0:
		fail(s.Thickness.at, "thickness_mm", "stands beside plies; the thickness of a laminate is that of its plies")
	case !s.Thickness.given && len(s.Plies) == 0:
		fail(s.At, "thickness_mm", "is missing: give thickness_mm, or plies for a laminate")
	case len(s.Plies) > 0 && (s.Conductivity.given || s.Density.given):
		fail(s.At, "plies", "stand beside conductivity_w_mk or density_kg_m3 of the pane; give those of each ply")
	}
	if s.Thickness.given {
		p.Plies = []glazing.Ply{{ThicknessMM: s.Thickness.value, ConductivityWMK: s.Conductivity.or(glazing.GlassWMK),
			DensityKGM3: s.Density.or(glazing.GlassKGM3)}}
	}
	for _, y := range s.Plies {
		if y.Glass.given == y.Interlayer.given {
			fail(y.At, "plies", "a ply has either glass_mm or interlayer_mm")
			continue
		}
		p.Plies = append(p.Plies, plyOf(y))
	}
	own := tintSpec{object: s.object, Spectrum: s.Spectrum, Spectra: s.Spectra,
		EmissivityFront: s.EmissivityFront, EmissivityBack: s.EmissivityBack, NormalFront: s.NormalFront, NormalBack: s.NormalBack}
	tints := s.Tints
	switch {
	case len(tints) > 0 && (s.Spectrum.given || s.Spectra != nil):
		fail(s.At, "tints", "stand beside a spectrum of the pane; give each tint its own")
	case len(tints) == 0 && !s.Spectrum.given && s.Spectra == nil && !s.Faulty:
		fail(s.At, "spectrum", "is missing: give spectrum, or tints with a spectrum each")
		return nil
	case len(tints) == 0:
		tints = []tintSpec{own}
	default:
		inherit(tints, own)
	}
	seen := map[string]position{}
	for i := range tints {
		b.unique(seen, tints[i].Tint, "tint", "tint of this pane")
		tint, good := b.tint(&tints[i], s.Faulty)
		ok = ok && good
		p.Tints = append(p.Tints, tint)
	}
	if !ok {
		b.incomplete["panes"] = true
		return nil
	}
	return p
}

// modelled reports whether the pane is given by glass and films and not by a spectrum.
func (s *paneSpec) modelled() bool { return s.Glass.given || len(s.Coatings) > 0 }

// Defaults of an interlayer; common practice for polyvinyl butyral, no source.
const (
	interlayerWMK  = 0.22
	interlayerKGM3 = 1070
)

func plyOf(y plySpec) glazing.Ply {
	if y.Interlayer.given {
		return glazing.Ply{Interlayer: true, ThicknessMM: y.Interlayer.value,
			ConductivityWMK: y.Conductivity.or(interlayerWMK), DensityKGM3: y.Density.or(interlayerKGM3)}
	}
	return glazing.Ply{ThicknessMM: y.Glass.value,
		ConductivityWMK: y.Conductivity.or(glazing.GlassWMK), DensityKGM3: y.Density.or(glazing.GlassKGM3)}
}

// inherit gives each tint the emissivities of its pane where it has none of its own.
func inherit(tints []tintSpec, pane tintSpec) {
	for i := range tints {
		t := &tints[i]
		if !t.EmissivityFront.given && !t.NormalFront.given {
			t.EmissivityFront, t.NormalFront = pane.EmissivityFront, pane.NormalFront
		}
		if !t.EmissivityBack.given && !t.NormalBack.given {
			t.EmissivityBack, t.NormalBack = pane.EmissivityBack, pane.NormalBack
		}
	}
}

// tint makes one state of a pane.
func (b *builder) tint(s *tintSpec, faulty bool) (glazing.Tint, bool) {
	t := glazing.Tint{Name: s.Tint.value}
	if s.Charge.given {
		t.ChargeMCCM2 = glazing.Value{Number: s.Charge.value, Known: true}
	}
	if s.Temperature.given {
		t.TemperatureC = glazing.Value{Number: s.Temperature.value, Known: true}
	}
	m, ok := b.measured(s, faulty || s.Faulty)
	if !ok {
		return t, false
	}
	t.Spectrum = m
	for _, f := range []struct {
		key               string
		corrected, normal number
		infrared          spectra.Curve
		into              *glazing.Emissivity
	}{
		{"front", s.EmissivityFront, s.NormalFront, m.InfraredFront, &t.Front},
		{"back", s.EmissivityBack, s.NormalBack, m.InfraredBack, &t.Back},
	} {
		if f.corrected.given && f.normal.given {
			b.fail(f.normal.at, "emissivity_normal_"+f.key, "stands beside emissivity_%s; give one", f.key)
			return t, false
		}
		*f.into = emissivity(f.corrected, f.normal, f.infrared, m.InfraredTau)
		if (f.corrected.given || f.normal.given) && f.infrared.Len() > 0 {
			measured := glazing.InfraredEmissivity(f.infrared, m.InfraredTau).Corrected.Number
			if math.Abs(measured-f.into.Corrected.Number) > emissivityDifference {
				t.Spectrum.Cautions = append(slices.Clone(t.Spectrum.Cautions), glazing.Caution{Code: "emissivity_differs", Text: fmt.Sprintf(
					"The emissivity typed for the %s (%.3f) was used; the infrared rows of its spectrum give %.3f.", f.key, f.into.Corrected.Number, measured)})
			}
		}
	}
	return t, true
}

// emissivityDifference is how far a typed emissivity and that of infrared rows may differ
// without a caution.
const emissivityDifference = 0.02

func emissivity(corrected, normal number, infrared, tau spectra.Curve) glazing.Emissivity {
	switch {
	case corrected.given:
		return glazing.GivenEmissivity(corrected.value)
	case normal.given:
		return glazing.GivenNormalEmissivity(normal.value)
	case infrared.Len() > 0:
		return glazing.InfraredEmissivity(infrared, tau)
	}
	return glazing.NoEmissivity()
}

// measured reads the spectrum of a tint from one file or from several.
func (b *builder) measured(s *tintSpec, faulty bool) (spectra.Measured, bool) {
	var all spectra.Columns
	var front, back spectra.Column
	ok := true
	switch {
	case s.Spectrum.given && s.Spectra != nil:
		b.fail(s.Spectra.At, "spectra", "stands beside spectrum; give one")
		return spectra.Measured{}, false
	case s.Spectrum.given:
		all, ok = b.spectrum(b.reader, s.Spectrum, "spectrum")
	case s.Spectra != nil:
		if s.Spectra.Faulty {
			return spectra.Measured{}, false
		}
		for _, x := range []struct {
			file text
			key  string
			pick func(spectra.Columns) spectra.Column
			into *spectra.Column
		}{
			{s.Spectra.Tau, "tau", func(c spectra.Columns) spectra.Column { return c.Tau }, &all.Tau},
			{s.Spectra.RhoFront, "rho_front", func(c spectra.Columns) spectra.Column { return c.RhoFront }, &all.RhoFront},
			{s.Spectra.RhoBack, "rho_back", func(c spectra.Columns) spectra.Column { return c.RhoBack }, &all.RhoBack},
			{s.Spectra.InfraredFront, "infrared_front", func(c spectra.Columns) spectra.Column { return c.RhoFront }, &front},
			{s.Spectra.InfraredBack, "infrared_back", func(c spectra.Columns) spectra.Column { return c.RhoBack }, &back},
		} {
			if !x.file.given {
				continue
			}
			c, good := b.spectrum(b.reader, x.file, x.key)
			if *x.into = x.pick(c); good && x.into.Len() == 0 {
				b.fail(x.file.at, x.key, "%s has no column %s", clip(x.file.value), strings.Replace(x.key, "infrared", "rho", 1))
				good = false
			}
			ok = ok && good
		}
	default:
		if !faulty {
			b.fail(s.At, "spectrum", "is missing: a tint has a spectrum")
		}
		return spectra.Measured{}, false
	}
	if !ok {
		return spectra.Measured{}, false
	}
	m, err := spectra.Join(all, front, back)
	if err != nil {
		files := strings.Join([]string{all.Tau.File, all.RhoFront.File, all.RhoBack.File, front.File, back.File}, "\n")
		if b.failed[files] == nil { // panes may share a spectrum; its faults are said once
			b.spectrumFaults(err)
			b.failed[files] = err
		}
		return spectra.Measured{}, false
	}
	return m, true
}

// makeup makes a make-up, or returns nil after reporting why not.
func (b *builder) makeup(s *makeupSpec, specs []paneSpec, panes []*glazing.Pane) *glazing.Makeup {
	m := &glazing.Makeup{ID: s.ID.value, Title: s.Title.value, Tilt: glazing.TiltDeg(s.Tilt.or(90))}
	if s.HeatFlow.value == "down" {
		m.HeatFlow = glazing.FlowDown
	}
	for _, name := range slices.SortedFunc(maps.Keys(s.Typed), func(x, y string) int {
		a, b := s.Typed[x].at, s.Typed[y].at
		return (a.line-b.line)*100000 + a.column - b.column
	}) {
		m.Typed = append(m.Typed, glazing.Typed{Name: name, Text: s.Typed[name].value})
	}
	before := len(b.faults)
	wantPane, sure := true, true // what may stand next, and whether that is known
	for i := range s.OutsideToInside {
		e := &s.OutsideToInside[i]
		isPane, isGap := e.Pane.given || e.Turned.given || e.Tint.given, e.Gap.given || e.Gas != nil || e.Vacuum != nil
		if e.Faulty && isPane == isGap { // what it was meant to be is not known
			sure = false
			continue
		}
		if e.Faulty {
			wantPane, sure = !isPane, true
			continue
		}
		switch {
		case !sure:
		case isPane && isGap:
			b.fail(e.At, "outside_to_inside", "an item is either a pane or a gap, not both")
		case !isPane && !isGap:
			b.fail(e.At, "outside_to_inside", "an item is a pane ({pane: ID}) or a gap ({gap_mm: 16, gas: {air: 1}})")
		case isPane && !wantPane:
			b.fail(e.At, "pane", "two panes in a row; there is a gap between panes (a laminate is one pane with plies)")
		case isGap && wantPane && i == 0:
			b.fail(e.At, "gap_mm", "a make-up begins with a pane, outside")
		case isGap && wantPane:
			b.fail(e.At, "gap_mm", "two gaps in a row; there is a pane between gaps")
		}
		wantPane, sure = !isPane, true
		if isPane {
			b.place(m, e, specs, panes)
		} else if isGap {
			b.gap(m, e)
		}
	}
	switch last := len(s.OutsideToInside) - 1; {
	case s.Faulty:
	case last < 0:
		b.fail(s.At, "outside_to_inside", "holds no pane")
	case wantPane && len(b.faults) == before:
		b.fail(s.OutsideToInside[last].At, "gap_mm", "a make-up ends with a pane, inside")
	case len(m.Panes) > glazing.MaxPanes:
		b.fail(s.At, "outside_to_inside", "%d panes; at most %d", len(m.Panes), glazing.MaxPanes)
	}
	if s.Faulty || len(b.faults) > before || slices.ContainsFunc(m.Panes, func(p glazing.Placed) bool { return p.Pane == nil }) {
		return nil
	}
	if _, err := m.States(); err != nil {
		b.fail(s.At, "outside_to_inside", "%v", err)
		return nil
	}
	return m
}

// place adds a pane to a make-up.
func (b *builder) place(m *glazing.Makeup, e *elementSpec, specs []paneSpec, panes []*glazing.Pane) {
	if !e.Pane.given {
		b.fail(e.At, "pane", "is missing: turned and tint belong to a pane")
		return
	}
	placed := glazing.Placed{Turned: e.Turned.value, Tint: e.Tint.value}
	if i := slices.IndexFunc(panes, func(p *glazing.Pane) bool { return p.ID == e.Pane.value }); i >= 0 {
		placed.Pane = panes[i]
		if names := placed.Pane.TintNames(); placed.Tint != "" && placed.Tint != glazing.SameTint && placed.Pane.TintNamed(placed.Tint) < 0 {
			if placed.Pane.Tintable() {
				b.fail(e.Tint.at, "tint", "pane %s has no tint %q; %s", e.Pane.value, clip(placed.Tint), Offer(placed.Tint, names))
			} else {
				b.fail(e.Tint.at, "tint", "pane %s does not switch", e.Pane.value)
			}
		}
	} else if i := slices.IndexFunc(specs, func(s paneSpec) bool { return s.ID.value == e.Pane.value }); i >= 0 {
		if specs[i].modelled() {
			b.fail(e.Pane.at, "pane", "%s is modelled from glass and films, which %s; give the pane a spectrum", e.Pane.value, notYet)
		}
	} else if !b.incomplete["id"] {
		var known []string
		for _, s := range specs {
			known = append(known, s.ID.value)
		}
		offer := "the project has no panes"
		if len(known) > 0 {
			offer = Offer(e.Pane.value, known)
		}
		if len(known) > 0 || !b.incomplete["panes"] {
			b.fail(e.Pane.at, "pane", "unknown pane %q; %s", clip(e.Pane.value), offer)
		}
	}
	m.Panes = append(m.Panes, placed)
}

// gap adds a gap to a make-up.
func (b *builder) gap(m *glazing.Makeup, e *elementSpec) {
	switch {
	case !e.Gap.given:
		b.fail(e.At, "gap_mm", "is missing: a gap has a width")
	case e.Vacuum != nil && e.Gas != nil:
		b.fail(e.Vacuum.At, "vacuum", "stands beside gas; give one")
	case e.Vacuum != nil:
		b.fail(e.Vacuum.At, "vacuum", "a vacuum gap %s", notYet)
	case e.Gas == nil:
		b.fail(e.Gap.at, "gas", "is missing: a gap has a gas, such as {air: 1} or {argon: 0.9, air: 0.1}")
	default:
		fractions := map[string]float64{}
		known := glazing.Gases()
		for name, f := range e.Gas {
			fractions[name] = f.value
		}
		for _, name := range slices.Sorted(maps.Keys(e.Gas)) {
			if !slices.Contains(known, name) {
				b.fail(e.Gas[name].name, "gas", "unknown gas %q; %s", clip(name), OfferAll(name, known))
				return
			}
		}
		mixture, err := glazing.Filling(fractions)
		if err != nil {
			b.fail(e.At, "gas", "%v", err)
			return
		}
		m.Gaps = append(m.Gaps, glazing.Gap{WidthMM: e.Gap.value, Gas: mixture})
	}
}

// conditions checks what the tags cannot.
func (b *builder) conditions(list []conditionSpec) {
	ids := map[string]position{}
	for _, c := range list {
		b.unique(ids, c.ID, "id", "condition")
		if c.ID.value == "winter" || c.ID.value == "summer" {
			b.fail(c.ID.at, "id", "%s is a condition of the basis; choose another name", c.ID.value)
		}
		if c.Wind.given && c.OutsideConvection.given {
			b.fail(c.OutsideConvection.at, "outside_convection_w_m2k", "stands beside wind_m_s; give one")
		}
	}
}

// limits checks what the tags cannot.
func (b *builder) limits(list []limitSpec, makeups []makeupSpec) {
	var ids []string
	for _, m := range makeups {
		ids = append(ids, m.ID.value)
	}
	if len(list) == 0 {
		return
	}
	figures := glazing.Figures()
	for _, l := range list {
		if l.Figure.given && !slices.ContainsFunc(figures, func(f glazing.Figure) bool { return f.Named(l.Figure.value) }) {
			var known []string
			for _, f := range figures {
				known = append(known, f.Key, f.Alias)
			}
			b.fail(l.Figure.at, "figure", "unknown figure %q; %s", clip(l.Figure.value), Offer(l.Figure.value, known))
		}
		for _, m := range l.Makeups.values {
			if !slices.Contains(ids, m.value) && !b.incomplete["id"] && !b.incomplete["makeups"] {
				b.fail(m.at, "makeups", "unknown make-up %q; %s", clip(m.value), Offer(m.value, ids))
			}
		}
		switch {
		case l.Faulty:
		case !l.AtMost.given && !l.AtLeast.given:
			b.fail(l.At, "limits", "a limit has at_most or at_least")
		case l.AtMost.given && l.AtLeast.given && l.AtMost.value < l.AtLeast.value:
			b.fail(l.At, "limits", "at_most is below at_least; no figure can meet both")
		}
	}
}
