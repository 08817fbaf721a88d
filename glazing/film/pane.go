package film

// A coated pane as a rating takes it: its spectrum, at an angle or over the half space, and the
// emissivity of each face.

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"
	"sync"

	"gonum.org/v1/gonum/integrate/quad"

	"panewright/spectra"
)

// MaxFilms is the largest number of films on a face.
const MaxFilms = 200

// Check returns an error if no figure of the pane can be computed: it has no thickness, a film has one
// below 0 or no material, a face has too many, or no wavelength of sunlight lies in the ranges of the
// glass and of every material.
func (c Coated) Check() error {
	if !(c.ThicknessMM > 0) || math.IsInf(c.ThicknessMM, 1) {
		return fmt.Errorf("a thickness of %g mm is not above 0", c.ThicknessMM)
	}
	for _, face := range [2][]Film{c.Front, c.Back} {
		if len(face) > MaxFilms {
			return fmt.Errorf("%d films on a face; at most %d", len(face), MaxFilms)
		}
		for _, f := range face {
			switch {
			case f.Material == nil:
				return errors.New("a film has no material")
			case !(f.ThicknessNM >= 0) || math.IsInf(f.ThicknessNM, 1):
				return fmt.Errorf("a film of %s has a thickness of %g nm, which is below 0 or no number", f.Material.ID, f.ThicknessNM)
			}
		}
	}
	c = c.InFilms()
	if first, last := c.FirstNM(), c.LastNM(); max(first, spectra.SolarFirstNM) > min(last, spectra.SolarLastNM) {
		return fmt.Errorf("no wavelength from %d to %d nm lies in the range of the glass and of every film: %s", spectra.SolarFirstNM, spectra.SolarLastNM, c.narrowest())
	}
	if len(c.materials()) == 0 {
		return nil
	}
	tables := []Constants{c.Glass}
	for _, m := range c.materials() {
		if t, ok := m.Model.(Tabulated); ok {
			tables = append(tables, t.Constants)
		}
	}
	for _, t := range tables {
		for i, nm := range t.N.NM {
			if n, k := t.At(nm); !(n+k >= leastIndex && n+k <= mostIndex) {
				return fmt.Errorf("%s: n %.6g and k %.6g at %.6g nm add to what is not between %g and %g (row %d)", t.Name, n, k, nm, leastIndex, mostIndex, i+1)
			}
		}
	}
	return nil
}

// Bounds of an index of which films can be computed.
const leastIndex, mostIndex = 1e-3, 1e4

// InFilms returns the pane without films of no thickness, and with materials as they are in films of the
// thicknesses of these.
func (c Coated) InFilms() Coated {
	for _, face := range [2]*[]Film{&c.Front, &c.Back} {
		var films []Film
		for _, f := range *face {
			if f.ThicknessNM == 0 {
				continue
			}
			if f.Material.ThicknessNM != f.ThicknessNM {
				f.Material = f.Material.InFilm(f.ThicknessNM)
			}
			films = append(films, f)
		}
		*face = films
	}
	return c
}

// materials returns each material of the films once, those of the front first.
func (c Coated) materials() (list []*Material) {
	for _, f := range slices.Concat(c.Front, c.Back) {
		if !slices.Contains(list, f.Material) {
			list = append(list, f.Material)
		}
	}
	return list
}

// FirstNM and LastNM are the ends of the range in nm in which the glass and every material may be used.
func (c Coated) FirstNM() float64 {
	first := c.Glass.FirstNM()
	for _, m := range c.materials() {
		first = max(first, m.FromNM)
	}
	return first
}

// LastNM returns the longest wavelength in nm.
func (c Coated) LastNM() float64 {
	last := c.Glass.LastNM()
	for _, m := range c.materials() {
		last = min(last, m.ToNM)
	}
	return last
}

// narrowest names what begins last and what ends first.
func (c Coated) narrowest() string {
	first, last := c.FirstNM(), c.LastNM()
	begins, ends := "glass "+c.Glass.Name, "glass "+c.Glass.Name
	for _, m := range c.materials() {
		if m.FromNM == first && c.Glass.FirstNM() < first {
			begins = "material " + m.ID
		}
		if m.ToNM == last && c.Glass.LastNM() > last {
			ends = "material " + m.ID
		}
	}
	return fmt.Sprintf("%s begins at %.6g nm, %s ends at %.6g nm", begins, first, ends, last)
}

// infraredWhy says why there is no emissivity, or returns "".
func (c Coated) infraredWhy() string {
	if c.FirstNM() <= spectra.InfraredFirstNM && c.LastNM() >= infraredLeastNM {
		return ""
	}
	return "5 to 25 µm at least are needed: " + c.narrowest()
}

// Ready is a coated pane whose indices were taken at every wavelength that its figures need. It may be
// read by several goroutines.
type Ready struct {
	coated Coated
	sheet  *Sheet // of a pane without films

	solarNM, infraredNM []float64
	solar, infrared     *Sampled  // the latter nil where the ranges do not reach
	planck              []float64 // weights of the emissivity at infraredNM
}

// Ready takes the indices. Films of no thickness are left out, and metals whose surfaces scatter are taken as
// they are in films of the thicknesses of these. The pane must pass Check.
func (c Coated) Ready() *Ready {
	c = c.InFilms()
	r := &Ready{coated: c}
	if len(c.Front)+len(c.Back) == 0 {
		r.sheet = &Sheet{c.Glass, c.ThicknessMM}
		return r
	}
	first, last := c.FirstNM(), c.LastNM()
	r.solarNM = slices.DeleteFunc(slices.Clone(solarNM()), func(x float64) bool { return x < first || x > last })
	r.solar = c.sampleHeld(r.solarNM)
	if c.infraredWhy() == "" {
		r.infraredNM, r.planck = c.emissivityRule()
		r.infrared = c.sampleHeld(r.infraredNM)
	}
	return r
}

// sampleHeld is Sample, with each index held beyond the end of its range, and of each material taken once.
func (c Coated) sampleHeld(nm []float64) *Sampled {
	taken := map[*Material][]complex128{}
	sampled := func(films []Film) (list []SampledLayer) {
		for _, f := range films {
			if taken[f.Material] == nil {
				taken[f.Material] = f.Material.held(nm)
			}
			list = append(list, SampledLayer{taken[f.Material], f.ThicknessNM})
		}
		return list
	}
	return NewSampled(nm, c.Glass.sample(nm), c.ThicknessMM, sampled(c.Front), sampled(c.Back))
}

// held returns the index at ascending wavelengths in nm, beyond the range that of its end.
func (m *Material) held(nm []float64) []complex128 {
	if t, ok := m.Model.(Tabulated); ok && nm[len(nm)-1] <= m.ToNM {
		return t.Constants.sample(nm)
	}
	return indices(nm, func(x float64) complex128 { return m.Index(min(x, m.ToNM)) })
}

// sample is At at ascending wavelengths in nm.
func (c Constants) sample(nm []float64) []complex128 {
	n, k := make([]float64, len(nm)), make([]float64, len(nm))
	c.N.Sample(n, nm)
	c.K.Sample(k, nm)
	list := make([]complex128, len(nm))
	for i := range list {
		list[i] = complex(n[i], k[i])
	}
	return list
}

// Films reports whether a face bears films of any thickness.
func (r *Ready) Films(face Face) bool {
	if face == Front {
		return len(r.coated.Front) > 0
	}
	return len(r.coated.Back) > 0
}

// InfraredWhy says why the emissivities are not known, or returns "": a range does not reach from 5 to 25 µm.
func (r *Ready) InfraredWhy() string { return r.coated.infraredWhy() }

// Spectrum returns the spectrum at an angle of incidence in degrees, below 90, as a rating takes it: at every
// wavelength of the standards' own tables, so that no weighted figure interpolates, and in the
// infrared at those of EN 12898 and as many between as the bands of the materials need. It ends where
// the glass or a material ends.
func (r *Ready) Spectrum(angleDeg float64) spectra.Measured {
	if r.sheet != nil {
		return r.sheet.Spectrum(angleDeg)
	}
	return r.spectrum(func(c *Sampled) *Shares {
		var s, p Shares
		c.At(&s, &p, angleDeg)
		if angleDeg != 0 { // at 0 both polarisations are one
			s.Mean(&s, &p)
		}
		return &s
	})
}

// HemisphericalSpectrum is Spectrum for radiation that comes evenly from the half space.
func (r *Ready) HemisphericalSpectrum() spectra.Measured {
	if r.sheet != nil {
		return r.sheet.HemisphericalSpectrum()
	}
	return r.spectrum(func(c *Sampled) *Shares {
		var s, p, sum Shares
		h := hemisphere()
		for i, deg := range h.deg {
			c.At(&s, &p, deg)
			s.Mean(&s, &p)
			sum.resize(len(s.T)) // of new memory, which is 0
			for _, x := range [3][2][]float64{{sum.T, s.T}, {sum.RFront, s.RFront}, {sum.RBack, s.RBack}} {
				for k, v := range x[1] {
					x[0][k] += float64(h.weight[i] * v)
				}
			}
		}
		return &sum
	})
}

func (r *Ready) spectrum(at func(*Sampled) *Shares) spectra.Measured {
	d := at(r.solar)
	m := spectra.Measured{Tau: spectra.Curve{NM: r.solarNM, Value: d.T},
		RhoFront: spectra.Curve{NM: r.solarNM, Value: d.RFront}, RhoBack: spectra.Curve{NM: r.solarNM, Value: d.RBack}}
	if r.infrared != nil {
		d, last := at(r.infrared), r.coated.LastNM()
		n := len(r.infraredNM)
		for r.infraredNM[n-1] > last {
			n--
		}
		far := func(v []float64) spectra.Curve { return spectra.Curve{NM: r.infraredNM[:n], Value: v[:n]} }
		m.InfraredFront, m.InfraredBack = far(d.RFront), far(d.RBack)
		if slices.Max(d.T[:n]) > opaque {
			m.InfraredTau = far(d.T)
		}
	}
	m.Cautions = r.coated.cautions()
	return m
}

// HemisphericalEmissivity returns the emissivity at 283 K of the front and of the back over the half
// space, as that of a Sheet. ok is false where InfraredWhy says why.
//
// Eight angles and the points of emissivityRule leave less than 1e-5 (against 64 angles and 3000
// wavelengths: conducting oxides, silver, bulk metals, and films on them with bands in the infrared).
func (r *Ready) HemisphericalEmissivity() (front, back float64, ok bool) {
	switch {
	case r.sheet != nil:
		e, ok := r.sheet.HemisphericalEmissivity()
		return e, e, ok
	case r.infrared == nil:
		return 0, 0, false
	}
	var s, p Shares
	var angles float64
	h := emission()
	for i, deg := range h.deg {
		r.infrared.At(&s, &p, deg)
		s.Mean(&s, &p)
		var sumFront, sumBack float64
		for k, w := range r.planck {
			sumFront += float64(w * (1 - s.T[k] - s.RFront[k]))
			sumBack += float64(w * (1 - s.T[k] - s.RBack[k]))
		}
		front += float64(h.weight[i] * sumFront)
		back += float64(h.weight[i] * sumBack)
		angles += h.weight[i]
	}
	var weights float64
	for _, w := range r.planck {
		weights += w
	}
	return front / (weights * angles), back / (weights * angles), true
}

// emission are angles and weights of the mean over the half space for emissivities: Gauss and Legendre in
// v, cos θ = v^(3/2), for a metal emits most close to grazing.
var emission = sync.OnceValue(func() (h struct{ deg, weight []float64 }) {
	const nodes = 8
	x, weight := make([]float64, nodes), make([]float64, nodes)
	quad.Legendre{}.FixedLocations(x, weight, 0, 1)
	for i, v := range x {
		h.deg = append(h.deg, math.Acos(v*math.Sqrt(v))*180/math.Pi)
		h.weight = append(h.weight, 3*v*v*weight[i]) // 2 cos θ d cos θ
	}
	return h
})

// How fine the wavelengths of an emissivity are.
const (
	widestPart    = 0.05  // of the wavelength
	narrowestPart = 0.004 // likewise
	pointsInPart  = 4     // of a material's table
)

// emissivityRule returns the wavelengths in nm at which the infrared is taken, and the weights of an
// emissivity there: Planck's law times Simpson's weights over parts. Parts end at the points of the
// glass, at the wavelengths of EN 12898 and about sharp bands; they are divided where they are wide, and
// where a material's table has many points.
func (c Coated) emissivityRule() (nm, weight []float64) {
	ends := slices.Clone(c.Glass.N.NM)
	var tables [][]float64
	for _, m := range c.materials() {
		table, bands := shape(m.Model)
		if len(table) > 0 {
			tables = append(tables, table)
		}
		ends = append(ends, bands...)
	}
	ends = infraredNM(ends)
	nm, weight = append(nm, ends[0]), append(weight, 0)
	for i := 1; i < len(ends); i++ {
		from, to := ends[i-1], ends[i]
		parts := math.Ceil((to - from) / from / widestPart)
		for _, table := range tables {
			low, _ := slices.BinarySearch(table, from)
			high, _ := slices.BinarySearch(table, to)
			parts = max(parts, min(math.Ceil(float64(high-low)/pointsInPart), math.Ceil((to-from)/from/narrowestPart)))
		}
		width := (to - from) / parts
		for p := range int(parts) {
			end := to // exactly
			if p+1 < int(parts) {
				end = from + float64(width*float64(p+1))
			}
			nm = append(nm, from+float64(width*(float64(p)+0.5)), end)
			weight[len(weight)-1] += width / 6
			weight = append(weight, 4*width/6, width/6)
		}
	}
	for i, x := range nm {
		weight[i] *= planck(x)
	}
	return nm, weight
}

// shape returns the wavelengths of a model's table, and those about its bands, closest where a band is
// narrow: at the energy of each, and where the permittivity passes 0 above it.
func shape(d Dispersion) (tableNM, bandsNM []float64) {
	var list []Oscillators
	switch d := d.(type) {
	case Tabulated:
		tableNM = d.Constants.N.NM
	case Extended:
		tableNM, list = d.Constants.N.NM, []Oscillators{d.Model}
	case Adjusted:
		tableNM, bandsNM = shape(d.Base)
		list = []Oscillators{d.More}
	case Oscillators:
		list = []Oscillators{d}
	}
	for _, o := range list {
		for _, t := range o.Terms {
			l, ok := t.(Lorentz)
			if !ok {
				continue
			}
			energies := []float64{l.EnergyEV}
			if around := real(o.Epsilon(l.EnergyEV)); around > 0 { // of all terms but this, whose real part is 0 there
				energies = append(energies, l.EnergyEV*math.Sqrt(1+l.Strength/around))
			}
			for _, e := range energies {
				bandsNM = append(bandsNM, hcEVNM/e)
				for off := l.BroadeningEV / 4; off < widestPart*e; off *= 2 {
					bandsNM = append(bandsNM, hcEVNM/(e-off), hcEVNM/(e+off))
				}
			}
		}
	}
	return tableNM, bandsNM
}

// cautions say what is to be known of glass and materials, each once.
func (c Coated) cautions() []spectra.Caution {
	list := c.Glass.cautions()
	if last := c.LastNM(); c.infraredWhy() == "" && last < infraredLastNM && last < c.Glass.LastNM() {
		list = append(list, spectra.Caution{Code: "extended", Text: fmt.Sprintf(
			"%s; for the emissivity constants and reflectance were held to 50 µm.", c.narrowest())})
	}
	var ids []string
	for _, m := range c.materials() {
		if len(m.Remarks) > 0 && !slices.Contains(ids, m.ID) {
			list = append(list, m.caution(fmt.Sprintf("Film material %s: %s", m.ID, strings.Join(m.Remarks, " "))))
		}
		ids = append(ids, m.ID)
	}
	return list
}

// caution is one on the material, of the code that its model calls for.
func (m *Material) caution(text string) spectra.Caution {
	model := m.Model
	if a, ok := model.(Adjusted); ok {
		model = a.Base
	}
	switch _, extended := model.(Extended); {
	case strings.HasSuffix(m.Source, "typical"):
		return spectra.Caution{Code: "typical", Text: text}
	case extended:
		return spectra.Caution{Code: "extended", Text: text}
	}
	return spectra.Caution{Code: "modelled", Text: text}
}

// NewOscillators returns a permittivity made of terms, with what each needs for every energy found once.
func NewOscillators(epsInf float64, terms ...Term) Oscillators {
	o := Oscillators{EpsInf: epsInf, Terms: slices.Clone(terms)}
	for i, t := range o.Terms {
		if edge, ok := t.(TaucLorentz); ok {
			o.Terms[i] = edge.ready()
		}
	}
	return o
}
