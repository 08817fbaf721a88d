package glazing

// Panes at an angle of incidence: both polarisations apart through the whole stack, the mean of both last.

import (
	"fmt"
	"math"
	"strings"

	"panewright/glazing/film"
	"panewright/glazing/optics"
	"panewright/spectra"
)

// LargestAngleDeg is the largest angle of incidence of a rating.
const LargestAngleDeg = 89

// kindAtAngle says how the angular behaviour of a tint of a pane is known.
type kindAtAngle int

const (
	exactAtAngle    kindAtAngle = iota // computed from what the pane is made of
	uncoatedAtAngle                    // by the index and the absorption that follow from measured shares
	estimatedAtAngle
)

// The category of the estimate for a measured coated pane: our own choice, that of solar-control and
// low-e coatings; common practice, no source.
const coatedCategory = 2

// What a measured pane must be for an uncoated one: faces of no low emissivity, that reflect alike.
const (
	uncoatedEmissivity = 0.8
	uncoatedUnlike     = 0.01
)

// atAngle says how a tint is known off the normal.
func (p *Pane) atAngle(tint int) kindAtAngle {
	t := &p.Tints[tint]
	switch {
	case p.Sheet != nil, p.Coated != nil:
		return exactAtAngle
	case !(t.Front.Corrected.Known && t.Front.Corrected.Number >= uncoatedEmissivity && t.Back.Corrected.Known && t.Back.Corrected.Number >= uncoatedEmissivity):
		return estimatedAtAngle
	}
	for _, nm := range t.Spectrum.RhoFront.NM {
		if math.Abs(t.Spectrum.RhoFront.At(nm)-t.Spectrum.RhoBack.At(nm)) > uncoatedUnlike {
			return estimatedAtAngle
		}
	}
	return uncoatedAtAngle
}

// sampleAt returns one tint of a placed pane on a grid at an angle of incidence, in both polarisations,
// seen from outside.
func (p Placed) sampleAt(tint int, g spectra.Grid, angleDeg float64) (s, m optics.Pane) {
	s, m = p.sample(tint, g), p.sample(tint, g)
	if c := p.Pane.Coated; c != nil {
		var both [2]film.Shares
		c.On(g.NM).At(&both[0], &both[1], angleDeg)
		for i, x := range []*optics.Pane{&s, &m} {
			copy(x.T, both[i].T)
			copy(x.Ro, both[i].RFront)
			copy(x.Ri, both[i].RBack)
			if p.Turned {
				x.Ro, x.Ri = x.Ri, x.Ro
			}
		}
		return s, m
	}
	kind := p.Pane.atAngle(tint)
	ratio, more := film.Estimated(1, coatedCategory, angleDeg)
	for i := range g.Len() {
		var both film.Polarised
		switch kind {
		case exactAtAngle:
			both = p.Pane.Sheet.At(g.NM[i], angleDeg)
		case uncoatedAtAngle:
			u, ok := film.UncoatedOf(s.T[i], (s.Ro[i]+s.Ri[i])/2)
			if ok {
				both = u.At(angleDeg)
				break
			}
			fallthrough
		default:
			for _, x := range []*optics.Pane{&s, &m} {
				x.Ro[i] += float64((1 - x.Ro[i]) * more)
				x.Ri[i] += float64((1 - x.Ri[i]) * more)
				x.T[i] = max(0, min(x.T[i]*ratio, 1-max(x.Ro[i], x.Ri[i])))
			}
			continue
		}
		s.T[i], s.Ro[i], s.Ri[i] = both.S.T, both.S.R, both.S.R
		m.T[i], m.Ro[i], m.Ri[i] = both.P.T, both.P.R, both.P.R
	}
	return s, m
}

// meanOf leaves the mean of two stacks in the first.
func meanOf(a, b *optics.Stack) {
	half := func(x, y []float64) {
		for i := range x {
			x[i] = (x[i] + y[i]) / 2
		}
	}
	half(a.T, b.T)
	half(a.Ro, b.Ro)
	half(a.Ri, b.Ri)
	for k := range a.A {
		half(a.A[k], b.A[k])
	}
}

// angleRule makes the text of a caution of a code.
func angleRule(code string) func([]Rating, int) string {
	return func(all []Rating, i int) string {
		if c, text := angleCaution(&all[i]); c == code {
			return text
		}
		return ""
	}
}

// angleCaution says how far the figures at an angle can be trusted, or returns "".
func angleCaution(r *Rating) (code, text string) {
	angle := r.Method.Options.AngleDeg
	if angle == 0 {
		return "", ""
	}
	var estimated, inverted []string
	for k, p := range r.Makeup.Panes {
		switch p.Pane.atAngle(r.Ready.States[r.State].Tints[k]) {
		case estimatedAtAngle:
			estimated = append(estimated, p.Pane.ID)
		case uncoatedAtAngle:
			inverted = append(inverted, p.Pane.ID)
		}
	}
	by := ""
	if inverted != nil {
		by = " What " + strings.Join(inverted, ", ") + " does follows from measured shares, as of uncoated glass."
	}
	if estimated == nil {
		return "at_angle", fmt.Sprintf("Light, sun and colour are for an angle of incidence of %.6g°, both polarisations alike; U is not touched by it.", angle) + by
	}
	text = fmt.Sprintf("At %.6g° of incidence the figures of %s, measured and coated, are an estimate (Roos and others 2001, category %d)", angle, strings.Join(estimated, ", "), coatedCategory)
	if angle > 75 {
		text += "; beyond 75° their second decimal means nothing"
	}
	return "angle_estimate", text + "." + by
}
