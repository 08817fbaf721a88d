package film

// Many wavelengths at once, and one film's thickness changed.

import "math"

// A SampledLayer is a film whose index n + ik is given at each of a list of wavelengths.
type SampledLayer struct {
	Index       []complex128
	ThicknessNM float64
}

// Face is a face of a pane: Front is the one that looks outside when the pane is not turned.
type Face int

// The faces.
const (
	Front Face = iota
	Back
)

// Sampled is a coated pane whose indices were taken at a list of wavelengths. It gives the same bits as a
// Plate at each of them, faster, and may be read by several goroutines.
type Sampled struct {
	k0          []float64 // 2π/λ, 1/nm
	thicknessMM float64
	glass       sampledFilm
	faces       [2][]sampledFilm
}

// A sampledFilm has N² and its inverse at each wavelength.
type sampledFilm struct {
	square, inverse []complex128
	thicknessNM     float64
}

func newSampledFilm(index []complex128, thicknessNM float64) sampledFilm {
	f := sampledFilm{make([]complex128, len(index)), make([]complex128, len(index)), thicknessNM}
	for i, x := range index {
		f.square[i] = newMedium(x, 0).square
		f.inverse[i] = 1 / f.square[i]
	}
	return f
}

// NewSampled returns the pane at vacuum wavelengths in nm; the films of each face are listed from the glass
// outward. Each list of indices must be as long as that of the wavelengths.
func NewSampled(nm []float64, glass []complex128, thicknessMM float64, front, back []SampledLayer) *Sampled {
	s := &Sampled{k0: make([]float64, len(nm)), thicknessMM: thicknessMM, glass: newSampledFilm(glass, 0)}
	for i, x := range nm {
		s.k0[i] = 2 * math.Pi / x
	}
	for face, films := range [2][]SampledLayer{front, back} {
		for _, f := range films {
			s.faces[face] = append(s.faces[face], newSampledFilm(f.Index, f.ThicknessNM))
		}
	}
	for _, list := range append([][]sampledFilm{{s.glass}}, s.faces[:]...) {
		for _, f := range list {
			if len(f.square) != len(nm) {
				panic("film: an index is needed at each wavelength")
			}
		}
	}
	return s
}

// SetThickness changes the thickness of a film, counted from the glass outward from 0.
func (s *Sampled) SetThickness(face Face, i int, thicknessNM float64) {
	s.faces[face][i].thicknessNM = thicknessNM
}

// SetIndex changes the index of a film at every wavelength.
func (s *Sampled) SetIndex(face Face, i int, index []complex128) {
	if len(index) != len(s.k0) {
		panic("film: an index is needed at each wavelength")
	}
	s.faces[face][i] = newSampledFilm(index, s.faces[face][i].thicknessNM)
}

// Shares are the shares of the power that a pane transmits and reflects at each wavelength of a list: T
// the same from both sides, RFront and RBack of light that meets the front and the back. The memory
// is the caller's and kept from call to call.
type Shares struct{ T, RFront, RBack []float64 }

func (d *Shares) resize(n int) {
	for _, x := range []*[]float64{&d.T, &d.RFront, &d.RBack} {
		if cap(*x) < n {
			*x = make([]float64, n)
		}
		*x = (*x)[:n]
	}
}

// Mean sets d to the mean of two, as of both polarisations. It may be one of them.
func (d *Shares) Mean(s, p *Shares) {
	d.resize(len(s.T))
	for i := range d.T {
		d.T[i] = (s.T[i] + p.T[i]) / 2
		d.RFront[i] = (s.RFront[i] + p.RFront[i]) / 2
		d.RBack[i] = (s.RBack[i] + p.RBack[i]) / 2
	}
}

func (d *Shares) set(i int, front, back faceShare, surviving float64) {
	d.T[i], d.RFront[i], d.RBack[i] = combine(front, back, surviving)
}

// copy sets d to what s is.
func (d *Shares) copy(s *Shares) {
	copy(d.T, s.T)
	copy(d.RFront, s.RFront)
	copy(d.RBack, s.RBack)
}

// At sets s and p to the shares of both polarisations at an angle of incidence in degrees, below 90
// (see Plate.At).
func (c *Sampled) At(s, p *Shares, angleDeg float64) {
	s.resize(len(c.k0))
	p.resize(len(c.k0))
	sin, cos := math.Sincos(angleDeg * math.Pi / 180)
	along := float64(sin * sin)
	var y [block][2]complex128
	var surviving [block]float64
	var front, back [block]fields
	for start := 0; start < len(c.k0); start += block {
		n := min(block, len(c.k0)-start)
		for w := range n {
			y[w] = c.inside(start+w, along)
		}
		for w := range n {
			surviving[w] = math.Exp(glassCrossing(imag(y[w][0]), c.thicknessMM, c.k0[start+w]))
		}
		c.through(front[:n], y[:n], Front, start, along)
		c.through(back[:n], y[:n], Back, start, along)
		for w := range n {
			s.set(start+w, front[w][0].share(cos, y[w][0]), back[w][0].share(cos, y[w][0]), surviving[w])
		}
		if along == 0 { // both polarisations are one
			continue
		}
		for w := range n {
			p.set(start+w, front[w][1].share(cos, y[w][1]), back[w][1].share(cos, y[w][1]), surviving[w])
		}
	}
	if along == 0 {
		p.copy(s)
	}
}

// inside returns y of the glass at wavelength i.
func (c *Sampled) inside(i int, along float64) [2]complex128 {
	square := c.glass.square[i]
	qr, qi, _ := wave(real(square)-along, imag(square))
	q := complex(qr, qi)
	return [2]complex128{q, product(q, c.glass.inverse[i])}
}

// block is the number of wavelengths that are taken through a film together.
const block = 32

// through sets f to the fields outside of a face at wavelengths from start, from the glass outward.
func (c *Sampled) through(f []fields, y [][2]complex128, face Face, start int, along float64) {
	var crossings [block]crossing
	for w := range f {
		f[w] = newFields(y[w])
	}
	k0 := c.k0[start:]
	for j := range c.faces[face] {
		x := &c.faces[face][j]
		square, inverse := x.square[start:][:len(f)], x.inverse[start:][:len(f)]
		for w := range f {
			crossings[w].root(real(square[w])-along, imag(square[w]))
		}
		for w := range f {
			crossings[w].set(k0[w] * x.thicknessNM)
		}
		for w := range f {
			f[w].through(&crossings[w], square[w], inverse[w], along)
		}
		if j&7 == 7 {
			for w := range f {
				f[w].bound()
			}
		}
	}
}
