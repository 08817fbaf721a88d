package film

// The built-in materials of films.

import (
	"math"
	"slices"
	"sort"
	"strings"
	"sync"

	"panewright/reference"
	"panewright/spectra"
)

// The range of every built-in material in nm: sunlight and what a room radiates.
const (
	materialFromNM = 300
	materialToNM   = 50000
)

// Materials returns the built-in materials: conducting oxides, metals, clear films, and those that
// change with charge or temperature. They are shared and must not be written to.
func Materials() []*Material { return slices.Clone(materials()) }

// MaterialNamed returns a built-in material by its id.
func MaterialNamed(id string) (m *Material, ok bool) {
	for _, m := range materials() {
		if m.ID == id {
			return m, true
		}
	}
	return nil, false
}

var materials = sync.OnceValue(func() []*Material {
	list := slices.Concat(conductingOxides(), metals(), clearFilms(), switchingFilms())
	for _, m := range list {
		m.FromNM, m.ToNM = materialFromNM, materialToNM
	}
	return list
})

// published returns the optical constants of a reference table of n and k over wavelength_um.
func published(t *reference.Table) Constants {
	um, n := t.Series("n")
	_, k := t.Series("k")
	nm := make([]float64, len(um))
	for i, x := range um {
		nm[i] = toNM(x)
	}
	return Constants{Name: t.Title, Source: paper(t), N: spectra.Curve{NM: nm, Value: n}, K: spectra.Curve{NM: nm, Value: k}}
}

// paper is the source of a table, without the way by which it came.
func paper(t *reference.Table) string {
	text, _, _ := strings.Cut(t.Source, ";")
	return text
}

// until returns the constants up to a wavelength in nm.
func (c Constants) until(nm float64) Constants {
	n := sort.Search(len(c.N.NM), func(i int) bool { return c.N.NM[i] > nm })
	c.N = spectra.Curve{NM: c.N.NM[:n], Value: c.N.Value[:n]}
	c.K = spectra.Curve{NM: c.K.NM[:n], Value: c.K.Value[:n]}
	return c
}

// An Extended index is that of measured constants, carried on beyond their ends by a model. What the
// measured permittivity has over that of the model, N² − ε, is linear between the points, so that the
// curve between them follows the model, and is held beyond them, so that it has no step at the ends.
// Where less loss would be left than none, there is none.
type Extended struct {
	Constants Constants
	Model     Oscillators
	rest      []complex128 // N² − ε at the points
}

// Extend joins measured constants to a model.
func Extend(c Constants, model Oscillators) Extended {
	e := Extended{Constants: c, Model: model, rest: make([]complex128, len(c.N.NM))}
	for i, nm := range c.N.NM {
		n := complex(c.N.Value[i], c.K.Value[i])
		e.rest[i] = n*n - model.Epsilon(PhotonEV(nm))
	}
	return e
}

// Index returns n + ik = √ε.
func (e Extended) Index(nm float64) complex128 {
	eps := e.Model.Epsilon(PhotonEV(nm)) + e.over(nm)
	return root(complex(real(eps), math.Max(imag(eps), 0)))
}

// over is what the measured permittivity has over the model's.
func (e Extended) over(nm float64) complex128 {
	at := e.Constants.N.NM
	i := sort.SearchFloat64s(at, nm)
	switch {
	case i == 0:
		return e.rest[0]
	case i == len(at):
		return e.rest[i-1]
	}
	t := complex((nm-at[i-1])/(at[i]-at[i-1]), 0)
	return e.rest[i-1] + t*(e.rest[i]-e.rest[i-1])
}

// perCM is the energy in eV of a wave number of 1/cm, in which papers on lattices give theirs.
const perCM = hcEVNM / nmPerCM

// lattice is an oscillator of a lattice, from wave numbers in 1/cm.
func lattice(strength, perCMEnergy, perCMBroadening float64) Lorentz {
	return Lorentz{Strength: strength, EnergyEV: perCMEnergy * perCM, BroadeningEV: perCMBroadening * perCM}
}

// withEdge is a permittivity that is epsInf at 550 nm but for other terms, with an edge of absorption.
func withEdge(epsInf float64, edge TaucLorentz, others ...Term) Oscillators {
	return Oscillators{EpsInf: epsInf - real(edge.Epsilon(PhotonEV(visibleNM))), Terms: append([]Term{edge}, others...)}
}
