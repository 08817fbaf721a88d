package film

// One film's thickness changed: what lies on either side of it is kept.

import "math"

// A Variation is a sampled pane of which one film's thickness changes, at one angle of incidence.
type Variation struct {
	face        Face
	film        sampledFilm
	along, cos  float64
	wavelengths []varied
}

// A varied is what a Variation keeps at one wavelength.
type varied struct {
	k0           float64
	y            [2]complex128 // of the glass
	surviving    float64       // one crossing of the glass
	inner, outer fields        // of the films from the glass outward, and from the air inward, up to the film
	other        [2]faceShare  // of the other face
}

// Vary prepares the pane for changes of the thickness of a film, counted from the glass outward from 0. Later
// changes of the pane do not reach the variation.
func (c *Sampled) Vary(face Face, film int, angleDeg float64) *Variation {
	sin, cos := math.Sincos(angleDeg * math.Pi / 180)
	films := c.faces[face]
	v := &Variation{face: face, film: films[film], along: float64(sin * sin), cos: cos, wavelengths: make([]varied, len(c.k0))}
	air := [2]complex128{complex(cos, 0), complex(cos, 0)}
	for i := range v.wavelengths {
		w := &v.wavelengths[i]
		w.k0, w.y = c.k0[i], c.inside(i, v.along)
		w.surviving = math.Exp(glassCrossing(imag(w.y[0]), c.thicknessMM, w.k0))
		w.inner, w.outer = newFields(w.y), newFields(air)
		for j := range film {
			films[j].pass(&w.inner, i, v.along, w.k0)
		}
		for j := len(films) - 1; j > film; j-- {
			films[j].pass(&w.outer, i, v.along, w.k0)
		}
		far := newFields(w.y)
		for j := range c.faces[1-face] {
			c.faces[1-face][j].pass(&far, i, v.along, w.k0)
		}
		for pol := range far {
			w.other[pol] = far[pol].share(cos, w.y[pol])
		}
	}
	return v
}

// pass takes fields through the film at wavelength i.
func (f *sampledFilm) pass(c *fields, i int, along, k0 float64) {
	var x crossing
	x.root(real(f.square[i])-along, imag(f.square[i]))
	x.set(k0 * f.thicknessNM)
	c.through(&x, f.square[i], f.inverse[i], along)
	c.bound()
}

// At sets s and p to the shares of both polarisations with a thickness of the film, in nm. They agree with
// Sampled.At to 1e-12, not to the last bit: what is printed comes from there.
func (v *Variation) At(s, p *Shares, thicknessNM float64) {
	s.resize(len(v.wavelengths))
	p.resize(len(v.wavelengths))
	var crossings [block]crossing
	for start := 0; start < len(v.wavelengths); start += block {
		list := v.wavelengths[start:min(start+block, len(v.wavelengths))]
		for i := range list {
			square := v.film.square[start+i]
			crossings[i].root(real(square)-v.along, imag(square))
		}
		for i := range list {
			crossings[i].set(list[i].k0 * thicknessNM)
		}
		for i := range list {
			w := &list[i]
			f := w.inner
			f.through(&crossings[i], v.film.square[start+i], v.film.inverse[start+i], v.along)
			v.set(s, start+i, w, &f, 0)
			if v.along > 0 {
				v.set(p, start+i, w, &f, 1)
			}
		}
	}
	if v.along == 0 { // both polarisations are one
		p.copy(s)
	}
}

// set closes the films in one polarisation.
func (v *Variation) set(d *Shares, i int, w *varied, f *fields, pol int) {
	near := f[pol].join(&w.outer[pol], v.cos, w.y[pol])
	if v.face == Front {
		d.set(i, near, w.other[pol], w.surviving)
	} else {
		d.set(i, w.other[pol], near, w.surviving)
	}
}

// join closes the films c of a face with those that lie outside of them, taken from the air inward: with
// F°, G°, H°, K° of these, F = F° and G = G° belong to a wave that leaves into the air,
//
//	D = G° F + F° G    R = −(K° F + H° G)/D    R' = −(G° H + F° K)/D
//
// and 2y/D is transmitted, y of the medium from which the light comes. Without films outside it is share.
func (c *columns) join(o *columns, cos float64, y complex128) faceShare {
	f, g, h, k := complex(c.fr, c.fi), complex(c.gr, c.gi), complex(c.hr, c.hi), complex(c.kr, c.ki)
	of, og, oh, ok := complex(o.fr, o.fi), complex(o.gr, o.gi), complex(o.hr, o.hi), complex(o.kr, o.ki)
	all := 1 / power(product(og, f)+product(of, g))
	crossed := c.crossed * o.crossed
	return faceShare{
		t:     4 * cos * real(y) * all * crossed * crossed,
		outer: power(product(ok, f)+product(oh, g)) * all,
		inner: power(product(og, h)+product(of, k)) * all,
	}
}
