package project

// From keys to panes and make-ups: what only shows when keys are seen together.

import (
	"bytes"
	"fmt"
	"math"
	"slices"
	"strings"

	"panewright/glazing"
	"panewright/glazing/film"
	"panewright/glazing/library"
	"panewright/spectra"
)

// builder turns the spec types into panes and make-ups, and reports what only shows when keys
// are seen together.
type builder struct {
	*reader
	*fileSet
	builtIn  map[string]*glazing.Pane  // the panes of the library that make-ups use
	reserved []string                  // ids of the library
	own      map[string]*film.Material // the film materials of the project
	balances string                    // what of the project asks for detailed heat balances, as balancesOf has it
}

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
	b.own = b.materials(s.Materials)
	ids := map[string]position{}
	for _, g := range s.Glasses {
		b.unique(ids, g.ID, "id", "glass or pane")
		b.notBuiltIn(g.ID)
	}
	glasses := b.glasses(s.Glasses)
	for i := range s.Panes {
		b.unique(ids, s.Panes[i].ID, "id", "glass or pane")
		b.notBuiltIn(s.Panes[i].ID)
		if pane := b.pane(&s.Panes[i], glasses); pane != nil {
			p.Panes = append(p.Panes, pane)
		}
	}
	b.balances = balancesOf(p.Bases, s)
	ids = map[string]position{}
	for i := range s.Makeups {
		b.unique(ids, s.Makeups[i].ID, "id", "make-up")
		if m := b.makeup(&s.Makeups[i], s.Panes, p.Panes); m != nil {
			p.Makeups = append(p.Makeups, m)
		}
	}
	p.Conditions, p.person, p.stress = b.conditions(s.Conditions), s.Comfort.person(), s.Stress.screening()
	b.limits(p, s)
	for _, basis := range glazing.Bases() {
		if _, ok := s.Coefficients[basis.Name]; ok && basis.Balances() {
			p.Cautions = append(p.Cautions, glazing.Caution{Code: "coefficients_not_used",
				Text: "The coefficients given for " + basis.Name + " move nothing: U and g under it come from heat balances, with the convection of their conditions."})
		}
	}
	if len(p.Limits) > 0 || p.LimitsFile != nil {
		p.Cautions = append(p.Cautions, glazing.Caution{Code: LimitsNotChecked,
			Text: "The project has limits, against which these figures are not held here: panewright check does that."})
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

// notBuiltIn reports an id that a glass or a pane of the library has.
func (b *builder) notBuiltIn(id text) {
	if b.reserved == nil { // once for all panes
		b.reserved = append(film.Glasses(), library.IDs()...)
	}
	if slices.Contains(b.reserved, id.value) {
		b.fail(id.at, "id", "%q is built in; choose another name", id.value)
	}
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
func (b *builder) pane(s *paneSpec, glasses map[string]glass) *glazing.Pane {
	ok := !s.Faulty
	fail := func(at position, key, format string, args ...any) {
		if !s.Faulty { // what a faulty pane lacks is not said as well
			b.fail(at, key, format, args...)
		}
		ok = false
	}
	p := &glazing.Pane{ID: s.ID.value, Origin: glazing.MeasuredOrigin}
	if s.modelled() {
		if s.Faulty {
			return nil
		}
		if p = b.sheetOf(s, glasses); p == nil {
			return nil
		}
	}
	p.HeatTreatment, p.HeatSoaked, p.TauInfrared = glazing.UnknownTreatment, s.HeatSoaked.value, s.TauInfrared.value
	if s.HeatTreatment.given {
		p.HeatTreatment = glazing.HeatTreatment(s.HeatTreatment.value)
	}
	if s.Origin.given {
		p.Origin = glazing.Origin(s.Origin.value)
	}
	for name, v := range s.Attributes {
		if p.Attributes == nil {
			p.Attributes = map[string]float64{}
		}
		p.Attributes[name] = v.value
	}
	if s.modelled() {
		if !b.infraredShares(s, p) {
			return nil
		}
		return p
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
	if !b.infraredShares(s, p) {
		return nil
	}
	return p
}

// infraredTolerance is how far the shares of the thermal infrared may add to more than 1.
const infraredTolerance = 1e-9

// infraredShares reports whether tau_ir leaves room for the emissivities of a pane's faces, in every
// tint, as a sheet absorbs, transmits and reflects 1 together.
func (b *builder) infraredShares(s *paneSpec, p *glazing.Pane) bool {
	if !s.TauInfrared.given {
		return true
	}
	for _, t := range p.Tints {
		for _, f := range []struct {
			name string
			of   glazing.Emissivity
		}{{"front", t.Front}, {"back", t.Back}} {
			e, name := f.of.Normal, "normal emissivity of the "+f.name
			if f.of.Source == glazing.EmissivityGiven {
				e, name = f.of.Corrected, "emissivity of the "+f.name
			}
			if sum := e.Number + p.TauInfrared; e.Known && sum > 1+infraredTolerance {
				b.fail(s.TauInfrared.at, "tau_ir", "%s and the %s, %.4g, add to %.4g; together they are at most 1",
					short(p.TauInfrared), name, e.Number, sum)
				b.incomplete["panes"] = true
				return false
			}
		}
	}
	return true
}

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
	t := glazing.Tint{Name: s.Tint.value, ChargeMCCM2: s.Charge.orUnknown(), TemperatureC: s.Temperature.orUnknown()}
	m, ok := b.measured(s, faulty || s.Faulty)
	if !ok {
		return t, false
	}
	t.Spectrum, t.Source = m, s.files()
	return t, b.faces(&t, [2]faceSpec{{s.EmissivityFront, s.NormalFront}, {s.EmissivityBack, s.NormalBack}})
}

// files lists the files of a tint's spectrum, each once.
func (s *tintSpec) files() string {
	names := []string{s.Spectrum.value}
	if x := s.Spectra; x != nil {
		names = []string{x.Tau.value, x.RhoFront.value, x.RhoBack.value, x.InfraredFront.value, x.InfraredBack.value}
	}
	var once []string
	for _, name := range names {
		if name != "" && !slices.Contains(once, name) {
			once = append(once, name)
		}
	}
	return strings.Join(once, ", ")
}

// faceSpec is what a pane or a tint says of the emissivity of a face.
type faceSpec struct{ corrected, normal number }

// faces gives the front and the back of a tint their emissivities: the typed one, else that of the
// infrared rows, else what the tint has already.
func (b *builder) faces(t *glazing.Tint, typed [2]faceSpec) bool {
	m := &t.Spectrum
	for i, f := range []struct {
		key      string
		infrared spectra.Curve
		into     *glazing.Emissivity
	}{
		{"front", m.InfraredFront, &t.Front},
		{"back", m.InfraredBack, &t.Back},
	} {
		switch given := typed[i]; {
		case given.corrected.given && given.normal.given:
			b.fail(given.normal.at, "emissivity_normal_"+f.key, "stands beside emissivity_%s; give one", f.key)
			return false
		case given.corrected.given:
			*f.into = glazing.GivenEmissivity(given.corrected.value)
		case given.normal.given:
			*f.into = glazing.GivenNormalEmissivity(given.normal.value)
		case f.into.Source == "" && f.infrared.Len() > 0:
			*f.into = glazing.InfraredEmissivity(f.infrared, m.InfraredTau)
			continue
		case f.into.Source == "":
			*f.into = glazing.NoEmissivity()
			continue
		default:
			continue
		}
		if f.infrared.Len() > 0 {
			measured := glazing.InfraredEmissivity(f.infrared, m.InfraredTau).Corrected.Number
			if math.Abs(measured-f.into.Corrected.Number) > emissivityDifference {
				m.Cautions = append(slices.Clone(m.Cautions), glazing.Caution{Code: "emissivity_differs", Text: fmt.Sprintf(
					"The emissivity typed for the %s (%.3f) was used; the infrared rows of its spectrum give %.3f.", f.key, f.into.Corrected.Number, measured)})
			}
		}
	}
	return true
}

// emissivityDifference is how far a typed emissivity and that of infrared rows may differ
// without a caution.
const emissivityDifference = 0.02

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
		files := "" // with the line where each column begins, as a file may hold several spectra
		for _, c := range []spectra.Column{all.Tau, all.RhoFront, all.RhoBack, front, back} {
			files += fmt.Sprintln(c.File, c.Line[:min(1, len(c.Line))])
		}
		if b.failed[files] == nil { // panes may share a spectrum; its faults are said once
			b.spectrumFaults(err)
			b.failed[files] = err
		}
		return spectra.Measured{}, false
	}
	return m, true
}
