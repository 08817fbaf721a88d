package film

// What is known of a measured sheet off the normal: exactly of an uncoated one, by an estimate of a
// coated one.

import "math"

// An Uncoated is a sheet without films of which only its normal transmittance and reflectance are
// known: the index of its faces and the share of the power that survives one crossing.
type Uncoated struct{ Index, Surviving float64 }

// UncoatedOf returns the sheet of a normal transmittance and reflectance: r of a face and a of a crossing
// from T = (1 − r)² a/(1 − r² a²) and R = r (1 + a T), solved for r. ok is false where no sheet has
// such shares.
func UncoatedOf(t, r float64) (u Uncoated, ok bool) {
	if !(t > 0 && r > 0 && t+r <= 1) {
		return u, false
	}
	b := t*t - r*r + 2*r + 1
	face := (b - math.Sqrt(b*b-4*(2-r)*r)) / (2 * (2 - r))
	if !(face > 0 && face < r) {
		return u, false
	}
	root := math.Sqrt(face)
	u = Uncoated{Index: (1 + root) / (1 - root), Surviving: min(1, (r-face)/(face*t))}
	return u, u.Surviving > 0
}

// At returns the shares at an angle of incidence in degrees: Fresnel at the faces, and the crossing
// along the refracted path. The absorption of glass is too weak to change the reflectance of a face.
func (u Uncoated) At(angleDeg float64) Polarised {
	sin, cos := math.Sincos(angleDeg * math.Pi / 180)
	square := u.Index * u.Index
	q := math.Sqrt(square - sin*sin) // n cos θ' of the refracted light
	a := math.Pow(u.Surviving, u.Index/q)
	return Polarised{
		S: slab(complex((cos-q)/(cos+q), 0), a),
		P: slab(complex((square*cos-q)/(square*cos+q), 0), a),
	}
}

// Estimated returns the transmittance at an angle of incidence in degrees over that at normal incidence,
// and the share of what is not reflected at normal incidence that is reflected more, by the
// polynomial for coated glazing of a number of panes in a category from 1 (strongly coated) to 4
// (clear) (Roos, Polato, van Nijnatten, Hutchins, Olive, Anderson, Solar Energy 69 (2001) S6 15, from
// memory). It is an estimate.
func Estimated(panes, category, angleDeg float64) (transmittance, reflected float64) {
	z := angleDeg / 90
	const a, beta = 8.0, 2.0
	b := 0.25 / category
	c := 1 - a - b
	alpha := 5.2 + 0.7*category
	gamma := (5.26 + 0.06*panes) + (0.73+0.04*panes)*category
	return 1 - float64(a*math.Pow(z, alpha)) - float64(b*math.Pow(z, beta)) - float64(c*math.Pow(z, gamma)), math.Pow(z, gamma)
}

// On takes the pane's indices at ascending wavelengths in nm, each held beyond its range, as a rating
// needs it at an angle.
func (c Coated) On(nm []float64) *Sampled { return c.InFilms().sampleHeld(nm) }
