package project

// Panes that are computed from the optical constants of a glass, and of films on its faces.

import (
	"panewright/glazing"
	"panewright/glazing/film"
	"panewright/glazing/library"
)

// modelled reports whether the pane is given by glass and films and not by a spectrum.
func (s *paneSpec) modelled() bool { return s.Glass.given || len(s.Coatings) > 0 }

// glass is a glass of the project.
type glass struct {
	constants       film.Constants
	conductivityWMK float64
	densityKGM3     float64
}

// glasses reads the optical constants of the project's glasses, by id.
func (b *builder) glasses(list []glassSpec) map[string]glass {
	out := map[string]glass{}
	for _, s := range list {
		if s.Faulty {
			b.incomplete["glasses"] = true
			continue
		}
		n, k, ok := b.constants(s.NK)
		if !ok {
			b.incomplete["glasses"] = true
			continue
		}
		out[s.ID.value] = glass{film.Constants{Name: s.ID.value, Source: s.NK.value, N: n, K: k},
			s.Conductivity.or(glazing.GlassWMK), s.Density.or(glazing.GlassKGM3)}
	}
	return out
}

// sheetOf makes a pane of the sheet that a pane of the project names by glass, with its films; nil after
// reporting why there is none.
func (b *builder) sheetOf(s *paneSpec, own map[string]glass) *glazing.Pane {
	name := s.Glass.value
	fail := func(at position, key, format string, args ...any) *glazing.Pane {
		b.fail(at, key, format, args...)
		b.incomplete["panes"] = true
		return nil
	}
	switch {
	case len(s.Coatings) > 0 && len(s.Plies) > 0:
		return fail(s.Coatings[0].At, "coatings", "stand beside plies; films are computed on one sheet of glass, a laminate has a spectrum")
	case len(s.Coatings) > 0 && (s.Spectrum.given || s.Spectra != nil || len(s.Tints) > 0):
		return fail(s.Coatings[0].At, "coatings", "stand beside a spectrum, which has its films in it; give one")
	case !s.Glass.given:
		return fail(s.At, "glass", "is missing: coatings stand on a glass or a pane of the library")
	case s.Spectrum.given || s.Spectra != nil:
		return fail(s.Glass.at, "glass", "stands beside a spectrum; give one")
	case len(s.Plies) > 0:
		return fail(s.Glass.at, "glass", "stands beside plies; a laminate has a spectrum")
	case s.Origin.value == string(glazing.MeasuredOrigin):
		return fail(s.Origin.at, "origin", "a pane of glass is computed, not measured; leave the key out")
	case len(s.Tints) > 0:
		return fail(s.Glass.at, "glass", "stands beside tints; a pane that switches has a spectrum for each")
	}
	base, of := library.Pane(name), own[name]
	constants, builtin := film.Glass(name)
	if builtin {
		of = glass{constants, glazing.GlassWMK, glazing.GlassKGM3}
	}
	_, found := own[name]
	switch {
	case base != nil && s.Thickness.given:
		return fail(s.Thickness.at, "thickness_mm", "stands beside %s, which has its own thickness; name the glass instead to choose one: %s", name, known(film.Glasses()))
	case base != nil && base.Sheet == nil && len(s.Coatings) > 0:
		return fail(s.Glass.at, "glass", "%s bears films that are not known; name an uncoated pane, or a glass with thickness_mm", name)
	case base != nil && len(s.Coatings) == 0:
		base.ID = s.ID.value
	case base != nil:
		if base = b.films(s, *base.Sheet); base == nil {
			return nil
		}
	case !found && !builtin:
		if b.incomplete["glasses"] || b.incomplete["id"] {
			b.incomplete["panes"] = true
			return nil
		}
		names := append(film.Glasses(), library.IDs()...)
		for id := range own {
			names = append(names, id)
		}
		if len(Nearest(name, names)) == 0 {
			names = names[:len(film.Glasses())]
		}
		return fail(s.Glass.at, "glass", "unknown glass %q; %s", clip(name), Offer(name, names))
	case !s.Thickness.given:
		return fail(s.At, "thickness_mm", "is missing: a pane of %s has a thickness", name)
	default:
		if base = b.films(s, film.Sheet{Constants: of.constants, ThicknessMM: s.Thickness.value}); base == nil {
			return nil
		}
		base.Plies[0].ConductivityWMK, base.Plies[0].DensityKGM3 = of.conductivityWMK, of.densityKGM3
	}
	y := &base.Plies[0]
	y.ConductivityWMK, y.DensityKGM3 = s.Conductivity.or(y.ConductivityWMK), s.Density.or(y.DensityKGM3)
	for i := range base.Tints {
		if !b.faces(&base.Tints[i], [2]faceSpec{{s.EmissivityFront, s.NormalFront}, {s.EmissivityBack, s.NormalBack}}) {
			b.incomplete["panes"] = true
			return nil
		}
	}
	return base
}
