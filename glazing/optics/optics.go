// Package optics combines panes into a stack, wavelength by wavelength: incoherent multiple
// reflection between panes, each described by its transmittance T and the reflectances of its
// outer face Ro and inner face Ri (EN 410:2011, 5.2 and 5.3; ISO 9050:2003, 3.3 and 3.4). It knows slices of
// numbers only: which wavelength an element belongs to, and what a pane is, are the caller's.
//
// For an outer part (T1, Ro1, Ri1) and an inner part (T2, Ro2, Ri2), with D = 1 − Ri1·Ro2:
//
//	T  = T1·T2 / D
//	Ro = Ro1 + T1²·Ro2 / D
//	Ri = Ri2 + T2²·Ri1 / D
//
// A stack is folded from outside inwards. The absorptance of a pane is what it takes from the
// radiation that meets its two faces, each multiplied out on its own, so that the sum
// T + Ro + ΣA = 1 is a check and no identity.
package optics

// A Pane is one sheet as it stands in the stack: fractions of one, all slices of one length.
type Pane struct {
	T  []float64 // transmittance, the same from both sides
	Ro []float64 // reflectance of the face that looks outside
	Ri []float64 // reflectance of the face that looks inside
}

// A Stack is the result: T, Ro and Ri of the whole, and A[k], the absorptance of pane k for
// radiation from outside. The memory is the caller's and kept from call to call.
type Stack struct {
	T, Ro, Ri []float64
	A         [][]float64

	// Of the panes 0…k: transmittance and inner reflectance, for k from 1 to the last but one;
	// and 1/D of gap k.
	outerT, outerRi, inverse [][]float64
	outward                  []float64 // radiation outward in the gap being left, for one unit from outside
}

// Resize makes room for a number of panes and wavelengths. It allocates only to grow.
func (s *Stack) Resize(panes, n int) {
	s.T, s.Ro, s.Ri = resize(s.T, n), resize(s.Ro, n), resize(s.Ri, n)
	s.outward = resize(s.outward, n)
	s.A = resizeAll(s.A, panes, n)
	s.outerT = resizeAll(s.outerT, panes-1, n)
	s.outerRi = resizeAll(s.outerRi, panes-1, n)
	s.inverse = resizeAll(s.inverse, panes-1, n)
}

func resize(s []float64, n int) []float64 {
	if cap(s) < n {
		return make([]float64, n)
	}
	return s[:n]
}

func resizeAll(s [][]float64, k, n int) [][]float64 {
	for cap(s) < k {
		s = append(s[:cap(s)], nil)
	}
	s = s[:k]
	for i := range s {
		s[i] = resize(s[i], n)
	}
	return s
}

// Combine folds panes, outside first, into s. There must be at least one pane.
func (s *Stack) Combine(panes []Pane) {
	n, last := len(panes[0].T), len(panes)-1
	s.Resize(len(panes), n)
	if last == 0 {
		p := panes[0]
		copy(s.T, p.T)
		copy(s.Ro, p.Ro)
		copy(s.Ri, p.Ri)
		absorbSingle(s.A[0], p.T, p.Ro)
		return
	}
	t, ro, ri := panes[0].T, panes[0].Ro, panes[0].Ri
	for k := 1; k <= last; k++ {
		toT, toRi := s.T, s.Ri
		if k < last {
			toT, toRi = s.outerT[k], s.outerRi[k]
		}
		p := panes[k]
		add(toT, s.Ro, toRi, s.inverse[k-1], t, ro, ri, p.T, p.Ro, p.Ri)
		t, ro, ri = toT, s.Ro, toRi
	}
	for k := last; k > 0; k-- {
		p := panes[k]
		t, ri := panes[0].T, panes[0].Ri // of the panes outside pane k
		if k > 1 {
			t, ri = s.outerT[k-1], s.outerRi[k-1]
		}
		if k == last {
			absorbInnermost(s.A[k], s.outward, t, s.inverse[k-1], p.T, p.Ro)
		} else {
			absorbMiddle(s.A[k], s.outward, t, ri, s.inverse[k-1], p.T, p.Ro, p.Ri)
		}
	}
	absorbOutermost(s.A[0], s.outward, panes[0].T, panes[0].Ro, panes[0].Ri)
}

// add writes the combination of an outer part 1 and an inner part 2, and 1/D. ro may lie in the
// memory of ro1. One division a point.
func add(t, ro, ri, inverse, t1, ro1, ri1, t2, ro2, ri2 []float64) {
	n := len(t)
	ro, ri, inverse = ro[:n], ri[:n], inverse[:n]
	t1, ro1, ri1, t2, ro2, ri2 = t1[:n], ro1[:n], ri1[:n], t2[:n], ro2[:n], ri2[:n]
	for i := range n {
		a, b := t1[i], t2[i]
		r, q := ri1[i], ro2[i]
		d := 1 - float64(r*q)
		if d == 0 { // two perfect mirrors: nothing passes either, whatever D
			d = 1
		}
		d = 1 / d
		ad, bd := a*d, b*d
		inverse[i] = d
		t[i] = ad * b
		ro[i] = ro1[i] + float64(float64(ad*a)*q)
		ri[i] = ri2[i] + float64(float64(bd*b)*r)
	}
}

// absorbSingle writes the absorptance of a single pane.
func absorbSingle(a, t, ro []float64) {
	t, ro = t[:len(a)], ro[:len(a)]
	for i := range a {
		a[i] = 1 - t[i] - ro[i]
	}
}

// absorbInnermost writes the absorptance of the innermost pane, and the radiation outward
// in the gap before it.
func absorbInnermost(a, outward, outerT, inverse, t, ro []float64) {
	n := len(a)
	outward, outerT, inverse, t, ro = outward[:n], outerT[:n], inverse[:n], t[:n], ro[:n]
	for i := range n {
		in := outerT[i] * inverse[i]
		outward[i] = in * ro[i]
		a[i] = in * (1 - t[i] - ro[i])
	}
}

// absorbMiddle writes the absorptance of a pane between two gaps. outward holds the
// outward radiation of the gap behind it and receives that of the gap before it.
func absorbMiddle(a, outward, outerT, outerRi, inverse, t, ro, ri []float64) {
	n := len(a)
	outward, outerT, outerRi, inverse = outward[:n], outerT[:n], outerRi[:n], inverse[:n]
	t, ro, ri = t[:n], ro[:n], ri[:n]
	for i := range n {
		back := outward[i]
		through := float64(t[i] * back)
		in := (outerT[i] + float64(outerRi[i]*through)) * inverse[i]
		a[i] = float64(in*(1-t[i]-ro[i])) + float64(back*(1-t[i]-ri[i]))
		outward[i] = float64(in*ro[i]) + through
	}
}

// absorbOutermost writes the absorptance of the outermost pane, which meets one unit from
// outside and the outward radiation of the gap behind it.
func absorbOutermost(a, outward, t, ro, ri []float64) {
	n := len(a)
	outward, t, ro, ri = outward[:n], t[:n], ro[:n], ri[:n]
	for i := range n {
		a[i] = (1 - t[i] - ro[i]) + float64(outward[i]*(1-t[i]-ri[i]))
	}
}
