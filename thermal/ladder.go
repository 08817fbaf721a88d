package thermal

// A Newton step of opaque sheets: links and sheets are rungs of a ladder, which is folded from
// outside and unfolded from inside. All terms have one sign, so that sheets that conduct well and
// gaps that hardly do lose no digits.

// climb solves for the step of all temperatures from the links and the absorbed sun.
func (w *work) climb() {
	s, b := w.s, w.b
	// What lies outside a face sends it a − c·δ, where δ is the step of its temperature.
	var a, c [2 * MaxSheets]float64
	at, fall := w.b.links[0].flux, w.b.links[0].inner
	for k := range s.n {
		r := s.resistance[k]
		at += b.SunWM2[2*k]
		a[2*k], c[2*k] = at, fall
		through := 1 / (1 + float64(r*fall))
		at = float64((at+float64(fall*b.DropK[k]))*through) + b.SunWM2[2*k+1]
		fall *= through
		a[2*k+1], c[2*k+1] = at, fall
		l := &w.b.links[k+1]
		share := 1 / (l.outer + fall)
		at = float64(l.outer*share*at) + float64(fall*share*l.flux)
		fall *= l.inner * share
	}
	next := 0.0 // the step of the face inside the present one
	for k := s.n - 1; k >= 0; k-- {
		l := &w.b.links[k+1]
		i := 2*k + 1
		inner := (a[i] - l.flux + float64(l.inner*next)) / (l.outer + c[i])
		r := s.resistance[k]
		drop := (float64(r*a[2*k]) - b.DropK[k] - float64(r*c[2*k]*inner)) / (1 + float64(r*c[2*k]))
		w.step[i], w.stepDrop[k] = inner, drop
		next = inner + drop
		w.step[2*k] = next
	}
}
