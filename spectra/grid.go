package spectra

import "slices"

// A Grid is the set of wavelengths, in nm and ascending, on which several weightings are
// summed. Arrays over a grid have Padded elements, of which those beyond Len are 0: a multiple
// of four, so that every sum runs in four lanes without a remainder.
type Grid struct {
	NM []float64
}

// NewGrid returns the union of the given lists of wavelengths.
func NewGrid(lists ...[]float64) Grid {
	var all []float64
	for _, l := range lists {
		all = append(all, l...)
	}
	slices.Sort(all)
	return Grid{slices.Compact(all)}
}

// Len returns the number of wavelengths.
func (g Grid) Len() int { return len(g.NM) }

// Padded returns Len rounded up to a multiple of four.
func (g Grid) Padded() int { return (len(g.NM) + 3) &^ 3 }

// Placed is a weighting laid out on a grid: weights from index From, a multiple of four, with
// zeros where the weighting has no point, a multiple of four long.
type Placed struct {
	From   int
	Weight []float64
	Total  float64 // Σ W
}

// On lays the weighting out on a grid, which must hold all its wavelengths.
func (w Weighting) On(g Grid) Placed {
	first, _ := slices.BinarySearch(g.NM, w.NM[0])
	last, _ := slices.BinarySearch(g.NM, w.NM[len(w.NM)-1])
	p := Placed{From: first &^ 3}
	p.Weight = make([]float64, (last-p.From+1+3)&^3)
	at := first
	for i, nm := range w.NM {
		for at < len(g.NM) && g.NM[at] < nm {
			at++
		}
		if at == len(g.NM) || g.NM[at] != nm {
			panic("spectra: grid lacks a wavelength of the weighting " + w.Name)
		}
		p.Weight[at-p.From] = w.Weight[i]
	}
	p.Total = total(p.Weight)
	return p
}

// Mean returns Σ f W / Σ W of values given over the whole padded grid.
func (p Placed) Mean(values []float64) float64 {
	return dot(p.Weight, values[p.From:]) / p.Total
}

// Means returns the means of three arrays at once; each equals that of Mean bit for bit.
func (p Placed) Means(a, b, c []float64) (x, y, z float64) {
	n := len(p.Weight)
	w, a, b, c := p.Weight[:n], a[p.From:p.From+n], b[p.From:p.From+n], c[p.From:p.From+n]
	var a0, a1, a2, a3, b0, b1, b2, b3, c0, c1, c2, c3 float64
	for len(w) >= 4 && len(a) >= 4 && len(b) >= 4 && len(c) >= 4 {
		w0, w1, w2, w3 := w[0], w[1], w[2], w[3]
		a0 += float64(w0 * a[0])
		a1 += float64(w1 * a[1])
		a2 += float64(w2 * a[2])
		a3 += float64(w3 * a[3])
		b0 += float64(w0 * b[0])
		b1 += float64(w1 * b[1])
		b2 += float64(w2 * b[2])
		b3 += float64(w3 * b[3])
		c0 += float64(w0 * c[0])
		c1 += float64(w1 * c[1])
		c2 += float64(w2 * c[2])
		c3 += float64(w3 * c[3])
		w, a, b, c = w[4:], a[4:], b[4:], c[4:]
	}
	return ((a0 + a1) + (a2 + a3)) / p.Total, ((b0 + b1) + (b2 + b3)) / p.Total, ((c0 + c1) + (c2 + c3)) / p.Total
}

// Sum returns Σ f W of values given over the whole padded grid.
func (p Placed) Sum(values []float64) float64 {
	return dot(p.Weight, values[p.From:])
}

// dot returns Σ w[i] v[i] for i below len(w), a multiple of four, in four lanes: lane j takes
// i ≡ j mod 4 in ascending order, and the total is (s0+s1)+(s2+s3). This order is part of the
// result: every sum over wavelengths keeps it, so that the same input gives the same bits.
func dot(w, v []float64) float64 {
	v = v[:len(w)]
	var s0, s1, s2, s3 float64
	for len(w) >= 4 && len(v) >= 4 {
		s0 += float64(w[0] * v[0])
		s1 += float64(w[1] * v[1])
		s2 += float64(w[2] * v[2])
		s3 += float64(w[3] * v[3])
		w, v = w[4:], v[4:]
	}
	return (s0 + s1) + (s2 + s3)
}

// total returns Σ v in the same four lanes, for any number of values.
func total(v []float64) float64 {
	var s [4]float64
	for i, x := range v {
		s[i%4] += x
	}
	return (s[0] + s[1]) + (s[2] + s[3])
}

// Triple is three weightings over the same span of a grid, such as the three colour-matching
// functions, summed together; each sum equals that of its Placed bit for bit.
type Triple struct {
	from    int
	x, y, z []float64
}

// NewTriple joins three weightings placed over the same span.
func NewTriple(x, y, z Placed) Triple {
	if x.From != y.From || y.From != z.From || len(x.Weight) != len(y.Weight) || len(y.Weight) != len(z.Weight) {
		panic("spectra: a Triple needs three weightings over one span")
	}
	return Triple{x.From, x.Weight, y.Weight, z.Weight}
}

// Sums returns the three sums Σ f W over values given over the whole padded grid.
func (t Triple) Sums(values []float64) (x, y, z float64) {
	n := len(t.x)
	wx, wy, wz, v := t.x[:n], t.y[:n], t.z[:n], values[t.from:t.from+n]
	var x0, x1, x2, x3, y0, y1, y2, y3, z0, z1, z2, z3 float64
	for len(v) >= 4 && len(wx) >= 4 && len(wy) >= 4 && len(wz) >= 4 {
		v0, v1, v2, v3 := v[0], v[1], v[2], v[3]
		x0 += float64(wx[0] * v0)
		x1 += float64(wx[1] * v1)
		x2 += float64(wx[2] * v2)
		x3 += float64(wx[3] * v3)
		y0 += float64(wy[0] * v0)
		y1 += float64(wy[1] * v1)
		y2 += float64(wy[2] * v2)
		y3 += float64(wy[3] * v3)
		z0 += float64(wz[0] * v0)
		z1 += float64(wz[1] * v1)
		z2 += float64(wz[2] * v2)
		z3 += float64(wz[3] * v3)
		v, wx, wy, wz = v[4:], wx[4:], wy[4:], wz[4:]
	}
	return (x0 + x1) + (x2 + x3), (y0 + y1) + (y2 + y3), (z0 + z1) + (z2 + z3)
}
