package project

// From keys to film materials, and to the films on the faces of a pane.

import (
	"bytes"

	"math"
	"slices"
	"strings"

	"panewright/glazing"
	"panewright/glazing/film"
	"panewright/glazing/library"
	"panewright/spectra"
)

// Materials without a table of their own are used from the first wavelength of the sun's tables to the last
// that gives emissivity.
const (
	materialFromNM = spectra.SolarFirstNM
	materialToNM   = 50000
)

// constants reads a file of n and k. A fault of the file is said once.
func (b *builder) constants(nk text) (n, k spectra.Curve, ok bool) {
	content, err := b.bytesOf(nk)
	if err != nil {
		b.fail(nk.at, "nk", "%s: %v", clip(nk.value), err)
		return n, k, false
	}
	n, k, err = spectra.ReadConstantsCSV(bytes.NewReader(content), nk.value)
	if err != nil && b.failed[nk.value] == nil { // glasses and materials may share a file
		b.spectrumFaults(err)
		b.failed[nk.value] = err
	}
	return n, k, err == nil
}

// materials makes the materials of the project, by id.
func (b *builder) materials(list []materialSpec) map[string]*film.Material {
	ids, out := map[string]position{}, map[string]*film.Material{}
	for i := range list {
		s := &list[i]
		b.unique(ids, s.ID, "id", "material")
		if _, builtIn := film.MaterialNamed(s.ID.value); builtIn {
			b.fail(s.ID.at, "id", "%q is built in; choose another name", s.ID.value)
		}
		if m := b.material(s); m != nil {
			out[s.ID.value] = m
		} else {
			b.incomplete["materials"] = true
		}
	}
	return out
}

// numberKey is a number with the key that it stands at.
type numberKey struct {
	key string
	number
}

func (s *materialSpec) carriers() []numberKey {
	return []numberKey{{"carriers_cm3", s.Carriers}, {"mobility_cm2_v_s", s.Mobility}, {"resistivity_ohm_cm", s.Resistivity}, {"effective_mass", s.Mass}}
}

// firstGiven returns the first key that is there.
func firstGiven(list []numberKey) (numberKey, bool) {
	i := slices.IndexFunc(list, func(k numberKey) bool { return k.given })
	if i < 0 {
		return numberKey{}, false
	}
	return list[i], true
}

// material makes a material, or returns nil after reporting why not.
func (b *builder) material(s *materialSpec) *film.Material {
	if s.Faulty {
		return nil
	}
	m := &film.Material{ID: s.ID.value, Name: s.ID.value, Source: "as the project says", FromNM: materialFromNM, ToNM: materialToNM,
		Indium: math.NaN(), Silver: math.NaN()}
	fail := func(at position, key, format string, args ...any) *film.Material {
		b.fail(at, key, format, args...)
		return nil
	}
	ofModel, model := firstGiven(append(s.carriers(), numberKey{"eps_infinity", s.EpsInf}))
	switch {
	case s.Model.given && s.Refraction.given:
		return fail(s.Refraction.at, "n", "stands beside model; give one")
	case s.NK.given && s.Model.given:
		return fail(s.NK.at, "nk", "stands beside model; give one")
	case s.NK.given && s.Refraction.given:
		return fail(s.NK.at, "nk", "stands beside n; give one")
	case s.Extinction.given && !s.Refraction.given:
		return fail(s.Extinction.at, "k", "stands without n; a constant index is n with k")
	case !s.Model.given && model:
		return fail(ofModel.at, ofModel.key, "belongs to a model; add model: drude, or model: oscillators with terms")
	case s.Model.value != "oscillators" && len(s.Terms) > 0:
		return fail(s.Terms[0].At, "terms", "belong to model: oscillators")
	case s.Refraction.given:
		m.Model = film.Constant(complex(s.Refraction.value, s.Extinction.value))
	case s.NK.given:
		n, k, ok := b.constants(s.NK)
		if !ok {
			return nil
		}
		m.Source, m.FromNM, m.ToNM = s.NK.value, n.First(), n.Last()
		m.Model = film.Tabulated{Constants: film.Constants{Name: s.ID.value, Source: s.NK.value, N: n, K: k}}
		if steps := spectra.CoarseSteps(n); steps != "" {
			m.Remarks = []string{"The optical constants have " + steps}
		}
	case s.Model.value == "drude":
		return b.drude(s, m)
	case s.Model.given:
		return b.oscillators(s, m)
	default:
		return fail(s.At, "model", "is missing: give n (with k) of a constant index, nk of a file, or model: drude or oscillators")
	}
	return m
}

// given returns what a material says of its carriers.
func (s *materialSpec) given(epsInf float64) film.Given {
	return film.Given{DensityCM3: s.Carriers.value, MobilityCM2VS: s.Mobility.value, ResistivityOhmCM: s.Resistivity.value,
		EffectiveMass: s.Mass.value, EpsInf: epsInf}
}

// carriersOf makes the carriers of a material; nil after reporting why there are none.
func (b *builder) carriersOf(s *materialSpec, epsInf float64) *film.Carriers {
	if !s.Mass.given {
		b.fail(s.At, "effective_mass", "is missing: free carriers have a mass, in electron masses")
		return nil
	}
	c, err := s.given(epsInf).Carriers()
	if err != nil {
		first, _ := firstGiven(s.carriers())
		b.fail(first.at, first.key, "%v", err)
		return nil
	}
	return &c
}

// drude makes a material of free carriers alone.
func (b *builder) drude(s *materialSpec, m *film.Material) *film.Material {
	if !s.EpsInf.given {
		b.fail(s.At, "eps_infinity", "is missing: free carriers alone have a high-frequency permittivity")
		return nil
	}
	if m.Carriers = b.carriersOf(s, s.EpsInf.value); m.Carriers == nil {
		return nil
	}
	m.Model = film.Oxide(*m.Carriers, nil, false)
	return m
}

// oscillators makes a material of terms, with free carriers if they are given.
func (b *builder) oscillators(s *materialSpec, m *film.Material) *film.Material {
	if len(s.Terms) == 0 {
		b.fail(s.At, "terms", "is missing: oscillators have terms, such as {kind: sellmeier, strength: 1.1, resonance_nm: 95}")
		return nil
	}
	var terms []film.Term
	for i := range s.Terms {
		t := b.term(&s.Terms[i])
		if t == nil {
			return nil
		}
		terms = append(terms, t)
	}
	model := film.NewOscillators(s.EpsInf.or(1), terms...)
	if _, free := firstGiven(s.carriers()); free {
		const visibleNM = 550 // where the permittivity without free carriers is theirs
		if m.Carriers = b.carriersOf(s, real(model.Epsilon(film.PhotonEV(visibleNM)))); m.Carriers == nil {
			return nil
		}
		model.Terms = append([]film.Term{m.Carriers.Term(false)}, model.Terms...)
	}
	m.Model = model
	return m
}

// termKind is a kind of term: the keys that it needs and may have, in the order of its formula.
type termKind struct {
	kind      string
	need, may []string
}

var termKinds = []termKind{
	{"drude", []string{"plasma_ev", "damping_ev"}, nil},
	{"lorentz", []string{"strength", "energy_ev", "broadening_ev"}, nil},
	{"tauc-lorentz", []string{"amplitude_ev", "energy_ev", "broadening_ev", "gap_ev"}, []string{"urbach_ev"}},
	{"sellmeier", []string{"strength", "resonance_nm"}, nil},
}

// term makes one term, or returns nil after reporting why not.
func (b *builder) term(s *termSpec) film.Term {
	kind := termKinds[slices.IndexFunc(termKinds, func(k termKind) bool { return k.kind == s.Kind.value })]
	for _, k := range []numberKey{{"plasma_ev", s.Plasma}, {"damping_ev", s.Damping}, {"strength", s.Strength}, {"energy_ev", s.Energy},
		{"broadening_ev", s.Broadening}, {"amplitude_ev", s.Amplitude}, {"gap_ev", s.Gap}, {"urbach_ev", s.Urbach}, {"resonance_nm", s.Resonance}} {
		needs := slices.Contains(kind.need, k.key)
		if k.given && !needs && !slices.Contains(kind.may, k.key) {
			b.fail(k.at, k.key, "is no key of %s, which has %s", kind.kind, strings.Join(append(slices.Clone(kind.need), kind.may...), ", "))
			return nil
		}
		if needs && !k.given {
			b.fail(s.At, k.key, "is missing: %s has %s", kind.kind, strings.Join(append(slices.Clone(kind.need), kind.may...), ", "))
			return nil
		}
	}
	switch kind.kind {
	case "drude":
		return film.Drude{PlasmaEV: s.Plasma.value, DampingEV: s.Damping.value}
	case "lorentz":
		return film.Lorentz{Strength: s.Strength.value, EnergyEV: s.Energy.value, BroadeningEV: s.Broadening.value}
	case "sellmeier":
		if nm := s.Resonance.value; nm >= materialFromNM && nm <= materialToNM {
			b.fail(s.Resonance.at, "resonance_nm", "%s lies from %d to %d nm, where a resonance has loss; use lorentz", short(nm), materialFromNM, materialToNM)
			return nil
		}
		return film.Sellmeier{Strength: s.Strength.value, ResonanceNM: s.Resonance.value}
	}
	switch {
	case s.Gap.value >= s.Energy.value:
		b.fail(s.Gap.at, "gap_ev", "%s is not below energy_ev, %s", short(s.Gap.value), short(s.Energy.value))
		return nil
	case s.Broadening.value >= 2*s.Energy.value:
		b.fail(s.Broadening.at, "broadening_ev", "%s is not below twice energy_ev, %s", short(s.Broadening.value), short(2*s.Energy.value))
		return nil
	}
	return film.TaucLorentz{AmplitudeEV: s.Amplitude.value, EnergyEV: s.Energy.value, BroadeningEV: s.Broadening.value, GapEV: s.Gap.value, UrbachEV: s.Urbach.value}
}

// coatings makes the films of both faces of a pane; ok is false after reporting why there are none.
func (b *builder) coatings(s *paneSpec) (front, back []film.Film, ok bool) {
	first := map[string]position{}
	for i := range s.Coatings {
		c := &s.Coatings[i]
		if at, twice := first[c.Face.value]; twice {
			b.fail(c.Face.at, "face", "%s stands twice, first in line %d; list all films of a face together, from the glass outward", c.Face.value, at.line)
			return nil, nil, false
		}
		first[c.Face.value] = c.Face.at
		switch n := len(c.Films); {
		case n == 0:
			b.fail(c.At, "films", "holds no film; leave the coating out")
			return nil, nil, false
		case n > film.MaxFilms:
			b.fail(c.At, "films", "%d films; at most %d on a face", n, film.MaxFilms)
			return nil, nil, false
		}
		films := &front
		if c.Face.value == "back" {
			films = &back
		}
		for k := range c.Films {
			f, good := b.film(&c.Films[k])
			if !good {
				return nil, nil, false
			}
			*films = append(*films, f)
		}
	}
	return front, back, true
}

// film makes one film; ok is false after reporting why there is none.
func (b *builder) film(s *filmSpec) (f film.Film, ok bool) {
	name := s.Material.value
	m := b.own[name]
	if m == nil {
		m, _ = film.MaterialNamed(name)
	}
	if m == nil {
		if !b.incomplete["materials"] && !b.incomplete["id"] {
			names := make([]string, 0, len(b.own))
			for id := range b.own {
				names = append(names, id)
			}
			for _, builtIn := range film.Materials() {
				names = append(names, builtIn.ID)
			}
			b.fail(s.Material.at, "material", "unknown material %q; %s", clip(name), Offer(name, names))
		}
		return f, false
	}
	f = film.Film{Material: m.InFilm(s.Thickness.value), ThicknessNM: s.Thickness.value}
	change, changed := firstGiven([]numberKey{{"carriers_cm3", s.Carriers}, {"mobility_cm2_v_s", s.Mobility}, {"resistivity_ohm_cm", s.Resistivity},
		{"sheet_resistance_ohm", s.Sheet}, {"effective_mass", s.Mass}, {"eps_infinity", s.EpsInf}})
	if s.Resistivity.given || s.Sheet.given {
		m = withSurfaces(f.Material, s.Thickness.value)
	}
	if changed {
		made, err := film.Conductor(m, film.Given{DensityCM3: s.Carriers.value, MobilityCM2VS: s.Mobility.value, ResistivityOhmCM: s.Resistivity.value,
			SheetResistanceOhm: s.Sheet.value, ThicknessNM: s.Thickness.value, EffectiveMass: s.Mass.value, EpsInf: s.EpsInf.value})
		if err != nil {
			b.fail(change.at, change.key, "%v", err)
			return f, false
		}
		f.Material = made
	}
	return f, true
}

// withSurfaces is a metal in a film of a thickness in nm whose carriers have in their mobility what the surfaces
// scatter: a resistance that is given is that of the film, with its surfaces.
func withSurfaces(m *film.Material, thicknessNM float64) *film.Material {
	if m.Carriers == nil || m.Carriers.SurfaceScattering == 0 {
		return m
	}
	made, c := *m, m.Carriers.InFilm(thicknessNM)
	made.Carriers = &c
	return &made
}

// films makes the pane of a sheet and its films, or returns nil after reporting why not.
func (b *builder) films(s *paneSpec, sheet film.Sheet) *glazing.Pane {
	c := film.Coated{Glass: sheet.Constants, ThicknessMM: sheet.ThicknessMM}
	var ok bool
	if c.Front, c.Back, ok = b.coatings(s); ok {
		if err := c.Check(); err == nil {
			return library.Coated(s.ID.value, c)
		} else if len(s.Coatings) > 0 {
			b.fail(s.Coatings[0].At, "coatings", "%v", err)
		} else {
			b.fail(s.Glass.at, "glass", "%v", err)
		}
	}
	b.incomplete["panes"] = true
	return nil
}
