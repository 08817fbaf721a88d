package film

// Conductors with one or more figures changed.

import (
	"fmt"
	"slices"
)

// Conductor returns a material with the figures of change in place of its own; what is 0 there stays.
// A resistivity or a sheet resistance alone leaves the density and changes the mobility. The model is
// made anew: its free carriers, its band edge if it has one, and with a thickness the scattering at the
// surfaces of a metal. What else the model has, measured constants too, stays. It is an error if
// the free carriers of the material are not known, or if the figures contradict each other.
func Conductor(m *Material, change Given) (*Material, error) {
	if m.Carriers == nil {
		return nil, fmt.Errorf("material %s: its free carriers are not known, so that none of their figures can be changed", m.ID)
	}
	old := *m.Carriers
	for _, x := range []struct{ to, own *float64 }{
		{&change.EffectiveMass, &old.EffectiveMass}, {&change.EpsInf, &old.EpsInf},
		{&change.SurfaceScattering, &old.SurfaceScattering}, {&change.Persistence, &old.Persistence},
	} {
		if *x.to == 0 {
			*x.to = *x.own
		}
	}
	resistivity := change.ResistivityOhmCM != 0 || change.SheetResistanceOhm != 0
	if change.DensityCM3 == 0 && !(resistivity && change.MobilityCM2VS != 0) {
		change.DensityCM3 = old.DensityCM3
	}
	if change.MobilityCM2VS == 0 && !resistivity {
		change.MobilityCM2VS = old.MobilityCM2VS
	}
	c, err := change.Carriers()
	if err != nil {
		return nil, fmt.Errorf("material %s: %w", m.ID, err)
	}
	made := *m
	made.Carriers, made.ThicknessNM = &c, change.ThicknessNM
	less := Oxide(old.InFilm(m.ThicknessNM), m.Edge, m.FallingLoss)
	more := Oxide(c.InFilm(change.ThicknessNM), m.Edge, m.FallingLoss)
	made.Model = changed(m.Model, less, more)
	return &made, nil
}

// InFilm returns the material as it is in a film of a thickness in nm: itself, but for metals whose
// surfaces scatter and for a mesh.
func (m *Material) InFilm(thicknessNM float64) *Material {
	if mesh, ok := m.Model.(Mesh); ok {
		made := *m
		mesh.ThicknessNM = thicknessNM
		made.Model, made.ThicknessNM = mesh, thicknessNM
		return &made
	}
	if m.Carriers == nil || m.Carriers.SurfaceScattering == 0 || thicknessNM <= 0 {
		return m
	}
	if made, err := Conductor(m, Given{ThicknessNM: thicknessNM}); err == nil {
		return made
	}
	return m // its carriers are out of range, which Check says
}

// changed is a model with other terms: in place of the old ones where it has them, else as a difference.
func changed(base Dispersion, less, more Oscillators) Dispersion {
	o, ok := base.(Oscillators)
	if !ok {
		return Adjusted{Base: base, Less: less, More: more}
	}
	terms := slices.Clone(o.Terms)
	for i, t := range less.Terms {
		at := slices.Index(terms, t)
		if at < 0 {
			return Adjusted{Base: base, Less: less, More: more}
		}
		terms[at] = more.Terms[i]
	}
	return Oscillators{EpsInf: o.EpsInf - less.EpsInf + more.EpsInf, Terms: terms}
}
