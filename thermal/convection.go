package thermal

// Convection of a detailed balance: in gaps at every tilt, on the room side, outside by wind
// (ISO 15099:2003, 5.3.3 and 8.3; formulas and clause numbers from memory).
//
// Each correlation returns Nu and its slope dNu/d ln Ra, by which Newton's steps are steered.

import "math"

// The Rayleigh numbers at which the correlation of vertical gaps changes. It has a step at both:
// down by 0.5 % at the first, up by 0.6 % at the second.
const (
	firstStep  = 1e4
	secondStep = 5e4
)

// CavityNusselt returns Nu of a gap with gas, of a Rayleigh number, the ratio of its height to its width,
// and an angle γ in degrees: that of the tilt where the inner side is the warmer, 180 − tilt where
// the outer is; at 0 a horizontal gap is heated from below.
func CavityNusselt(rayleigh, aspect, angleDeg float64) float64 {
	c := cavityAt(angleDeg, aspect)
	nu, _ := c.nusselt(rayleigh, false)
	return nu
}

// cavity is the correlation of a gap at one angle, made ready.
type cavity struct {
	angleDeg         float64
	weight           float64 // of the vertical correlation; the rest is that of 60°
	tilted, vertical bool    // which correlations have a part
	fromBelow        bool    // Hollands' correlation
	cosine, onset    float64 // of Hollands: cos γ, 1708·(sin 1.8γ)^1.6
	sine             float64 // of gaps heated from above
	fromAbove        bool
	aspect           float64 // A, height over width
}

const (
	tiltedDeg   = 60.0 // of ElSherbiny's correlation, where Hollands' ends
	verticalDeg = 90.0
)

func cavityAt(angleDeg, aspect float64) cavity {
	c := cavity{angleDeg: angleDeg, aspect: aspect}
	radians := angleDeg * math.Pi / 180
	switch {
	case angleDeg < tiltedDeg:
		c.fromBelow = true
		c.cosine = math.Cos(radians)
		c.onset = 1708 * math.Pow(math.Sin(1.8*radians), 1.6)
	case angleDeg < verticalDeg:
		c.weight = (angleDeg - tiltedDeg) / (verticalDeg - tiltedDeg)
		c.tilted, c.vertical = true, c.weight > 0
	case angleDeg == verticalDeg:
		c.weight, c.vertical = 1, true
	default:
		c.vertical, c.fromAbove = true, true
		c.sine = math.Sin(radians)
		if angleDeg == 180 {
			c.sine = 0
		}
	}
	return c
}

// nusselt returns Nu and its slope at a Rayleigh number. Pinned is whether a solver
// holds the gap on the second step of the vertical correlation.
func (c *cavity) nusselt(ra float64, pinned bool) (nu, slope float64) {
	switch {
	case ra <= 0:
		return 1, 0
	case c.fromBelow:
		return c.hollands(ra)
	}
	logRa := math.Log(ra)
	if c.vertical {
		nu, slope = wright(ra, logRa, c.aspect, pinned)
	}
	switch {
	case c.fromAbove: // ISO 15099:2003 (52)
		return 1 + float64((nu-1)*c.sine), slope * c.sine
	case c.tilted:
		n60, s60 := c.elSherbiny(ra, logRa)
		return float64(c.weight*nu) + float64((1-c.weight)*n60), float64(c.weight*slope) + float64((1-c.weight)*s60)
	}
	return nu, slope
}

// wright is the correlation of vertical gaps (Wright 1996; ISO 15099:2003 (48) to (51)).
func wright(ra, logRa, aspect float64, pinned bool) (nu, slope float64) {
	switch {
	case pinned:
		nu, slope = onStep(ra)
	case ra > secondStep:
		nu = 0.0673838 * math.Exp(logRa/3)
		slope = nu / 3
	case ra > firstStep:
		nu = 0.028154 * math.Exp(0.4134*logRa)
		slope = 0.4134 * nu
	default:
		rise := 1.7596678e-10 * math.Exp(2.2984755*logRa)
		nu, slope = 1+rise, 2.2984755*rise
	}
	if slender := ra / aspect; slender > tallFrom { // else what follows is below 1
		if tall := 0.242 * math.Exp(0.272*math.Log(slender)); tall > nu {
			return tall, 0.272 * tall
		}
	}
	return nu, slope
}

// tallFrom is a Ra/A at which 0.242·(Ra/A)^0.272 is still below 1.
const tallFrom = 180

// stepWidth is the part of its Rayleigh number over which the second step is taken to rise.
const stepWidth = 1e-7

// stepEnds returns Nu on either side of the second step.
func stepEnds() (low, high float64) {
	l := math.Log(secondStep)
	return 0.028154 * math.Exp(0.4134*l), 0.0673838 * math.Exp(l/3)
}

// onStep is the second step as a steep straight line, which goes on beyond both its ends.
func onStep(ra float64) (nu, slope float64) {
	low, high := stepEnds()
	slope = (high - low) / stepWidth
	return low + float64(slope*(ra/secondStep-1)), slope * (ra / secondStep)
}

// hollands is the correlation of gaps below 60° (Hollands and others 1976; ISO 15099:2003 (42)).
func (c *cavity) hollands(ra float64) (nu, slope float64) {
	rc := ra * c.cosine
	nu = 1
	if moves := 1 - 1708/rc; moves > 0 {
		damped := 1 - c.onset/rc
		nu += 1.44 * moves * damped
		slope += float64(1.44*damped*(1708/rc)) + float64(1.44*moves*(c.onset/rc))
	}
	if root := math.Cbrt(rc / 5830); root > 1 {
		nu += root - 1
		slope += root / 3
	}
	return nu, slope
}

// elSherbiny is the correlation of gaps at 60° (ElSherbiny and others 1982; ISO 15099:2003 (43) to
// (47)).
func (c *cavity) elSherbiny(ra, logRa float64) (nu, slope float64) {
	grown := math.Exp(20.6 * math.Log(ra/3160)) // (Ra/3160)^20.6
	g := 0.5 * math.Exp(-0.1*math.Log1p(grown)) // G
	bend := g * 2.06 * grown / (1 + grown)      // −dG/d ln Ra
	if math.IsInf(grown, 1) {
		g, bend = 0, 0
	}
	base := 0.0936 * math.Exp(0.314*logRa) / (1 + g)
	seventh := math.Exp(7 * math.Log(base))
	nu = math.Exp(math.Log1p(seventh) / 7)
	slope = nu * seventh / (1 + seventh) * (0.314 + bend/(1+g))
	if most := (0.104 + 0.175/c.aspect) * math.Exp(0.283*logRa); most > nu {
		return most, 0.283 * most
	}
	return nu, slope
}

// RoomNusselt returns Nu of the air at the room-side surface over its height, of a Rayleigh number
// over that height and an angle γ in degrees: the tilt where the glass is colder than the air, else
// 180 − tilt.
func RoomNusselt(rayleigh, angleDeg float64) float64 {
	w := wallAt(angleDeg)
	nu, _ := w.nusselt(rayleigh)
	return nu
}

// wall is the correlation of the room side at one angle, made ready.
type wall struct {
	angleDeg float64
	sine     float64
	critical float64 // Ra up to which the flow is laminar
}

func wallAt(angleDeg float64) wall {
	if angleDeg == verticalDeg {
		return wall{angleDeg: angleDeg, sine: 1, critical: 2.5e5 * verticalFactor}
	}
	w := wall{angleDeg: angleDeg, sine: math.Sin(angleDeg * math.Pi / 180)}
	if angleDeg >= levelDeg && angleDeg < verticalDeg {
		w.critical = 2.5e5 * math.Exp(0.2*(0.72*angleDeg-math.Log(w.sine))) // (e^(0.72γ)/sin γ)^⅕, ISO 15099:2003 (110)
	}
	return w
}

// verticalFactor is (e^(0.72γ)/sin γ)^⅕ at 90°: e^12.96.
const verticalFactor = 425066.114781728

const (
	levelDeg   = 15.0  // below it the surface counts as level
	ceilingDeg = 179.0 // above it as level, facing the other way
)

func (w *wall) nusselt(ra float64) (nu, slope float64) {
	laminar := func(ra float64) float64 { return 0.56 * math.Sqrt(math.Sqrt(ra*w.sine)) }
	switch {
	case ra <= 0:
		return 0, 0
	case w.angleDeg < levelDeg: // ISO 15099:2003 (107)
		nu = 0.13 * math.Cbrt(ra)
		return nu, nu / 3
	case w.angleDeg > ceilingDeg: // ISO 15099:2003 (112)
		nu = 0.58 * math.Exp(0.2*math.Log(ra))
		return nu, 0.2 * nu
	case w.angleDeg <= verticalDeg && ra > w.critical: // ISO 15099:2003 (109)
		root := math.Cbrt(ra)
		return 0.13*(root-math.Cbrt(w.critical)) + laminar(w.critical), 0.13 * root / 3
	}
	nu = laminar(ra) // ISO 15099:2003 (108), (111)
	return nu, nu / 4
}

// WindConvection returns the outdoor convective coefficient in W/(m²·K) for a wind speed in m/s at
// the glazing (ISO 15099:2003, 8.3, from memory).
func WindConvection(windMS float64) float64 { return 4 + float64(4*windMS) }
