package thermal

// Comfort of a person near glass: radiant asymmetry, draught and downdraught. Percentages are of
// persons dissatisfied, 0 to 100.

import "math"

// RadiantSource is what makes the radiation on a person uneven.
type RadiantSource int

// The sources for which ISO 7730 has a formula.
const (
	CoolWall RadiantSource = iota
	WarmWall
	CoolCeiling
	WarmCeiling
)

// asymmetries are PD = 100/(1 + exp(a − b Δt)) − c below a limit of Δt in K (ISO 7730:2005, 6.5; walls
// read, ceilings from memory), in the order of the sources.
var asymmetries = [...]struct{ a, b, c, limitK float64 }{
	CoolWall:    {6.61, 0.345, 0, 15},
	WarmWall:    {3.72, 0.052, 3.5, 35},
	CoolCeiling: {9.93, 0.50, 0, 15},
	WarmCeiling: {2.84, 0.174, 5.5, 23},
}

// AsymmetryDissatisfied returns the percentage dissatisfied by a radiant temperature asymmetry in K,
// at least 0 (ISO 7730:2005, 6.5). within is false where the asymmetry is outside the range of the
// formula; the percentage then extends it.
func AsymmetryDissatisfied(source RadiantSource, asymmetryK float64) (percent float64, within bool) {
	s := asymmetries[source]
	percent = 100/(1+math.Exp(s.a-float64(s.b*asymmetryK))) - s.c // ISO 7730:2005 (8)–(11)
	return max(percent, 0), asymmetryK >= 0 && asymmetryK < s.limitK
}

// DraughtRating returns the percentage dissatisfied by draught at the neck: of air temperature in K,
// mean air velocity in m/s, and turbulence intensity in per cent (ISO 7730:2005, 6.2 (6), from
// memory). Velocities below 0.05 m/s count as 0.05. within is false outside 20 to 26 °C, 0.5 m/s and
// 10 to 60 %, for which the formula was made.
func DraughtRating(airK, velocityMS, turbulencePercent float64) (percent float64, within bool) {
	t, v := airK-ZeroCelsius, max(velocityMS, stillAirMS)
	percent = (34 - t) * math.Pow(v-stillAirMS, 0.62) * (float64(0.37*v*turbulencePercent) + 3.14)
	within = t >= 20 && t <= 26 && velocityMS < 0.5 && turbulencePercent >= 10 && turbulencePercent <= 60
	return min(max(percent, 0), 100), within
}

const stillAirMS = 0.05 // ISO 7730:2005, 6.2

// Downdraught is an author's formula for the air that falls along a cold wall and runs out over the floor.
type Downdraught int

// The authors: P. Heiselberg, Building and Environment 29 (1994) 297 (coefficients from memory), and
// H. Manz and T. Frank 2003 (coefficients read, but that beyond 2 m, which is from memory), who find half
// as much again.
const (
	Heiselberg Downdraught = iota
	ManzFrank
)

// downdraughts are the coefficients near the wall, in between, and far from it.
var downdraughts = [...]struct{ near, between, far float64 }{
	Heiselberg: {0.055, 0.095, 0.028},
	ManzFrank:  {0.083, 0.143, 0.043},
}

// The distances from the wall, in m, between which the stream slows down as 1/(x + 1.32).
const (
	downdraughtNearM   = 0.4
	downdraughtFarM    = 2.0
	downdraughtOriginM = 1.32
)

// Velocity returns the largest mean velocity in m/s near the floor, at a distance in m from a flat
// wall of a height in m that is dropK colder than the air of the room; 0 if it is not colder.
// It is for a wall without sills or heaters below it.
func (d Downdraught) Velocity(heightM, dropK, distanceM float64) float64 {
	c := downdraughts[d]
	root := math.Sqrt(heightM * max(dropK, 0))
	switch {
	case distanceM < downdraughtNearM:
		return c.near * root
	case distanceM <= downdraughtFarM:
		return c.between / (distanceM + downdraughtOriginM) * root
	}
	return c.far * root
}

// FloorCooling returns by how many K that air is colder than the room, where it is coldest near the
// floor; dropK and distanceM are those of Velocity (Heiselberg 1994, read in Manz and Frank 2003). The
// formula reaches 2 m from the wall; what it gives there is held beyond.
func FloorCooling(dropK, distanceM float64) float64 {
	return (0.3 - float64(0.034*min(distanceM, downdraughtFarM))) * max(dropK, 0)
}

// RectangleViewFactor returns the view factor from a small plane element to a parallel rectangle in
// front of it, centred on the normal of the element, all in m (closed form for a rectangle with a
// corner on the normal, four times; in textbooks and ISO 7726, annex C).
func RectangleViewFactor(widthM, heightM, distanceM float64) float64 {
	x, y := widthM/2/distanceM, heightM/2/distanceM
	rx, ry := math.Sqrt(1+float64(x*x)), math.Sqrt(1+float64(y*y))
	return 4 * (float64(x/rx*math.Atan(y/rx)) + float64(y/ry*math.Atan(x/ry))) / (2 * math.Pi)
}

// PlaneRadiant returns the plane radiant temperature in K of an element that sees a black surface of
// facingK with a view factor, and black surfaces of restK otherwise (ISO 7726, annex C).
func PlaneRadiant(factor, facingK, restK float64) float64 {
	p := func(t float64) float64 { return t * t * t * t }
	return math.Sqrt(math.Sqrt(float64(factor*p(facingK)) + float64((1-factor)*p(restK))))
}

// RadiantAsymmetry returns the plane radiant temperature of the side that faces away from the glass,
// where all is at restK, less that of the side that faces it, in K: above 0 where the glass is the
// cooler (ISO 7726, definition).
func RadiantAsymmetry(factor, glassK, restK float64) float64 {
	return restK - PlaneRadiant(factor, glassK, restK)
}
