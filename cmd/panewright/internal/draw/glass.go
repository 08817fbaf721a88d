package draw

// The colour of glass, for drawings: what a pane makes of daylight.

import (
	"math"
	"sync"

	"panewright/glazing"
	"panewright/spectra"
	"panewright/spectra/colour"
)

// glassLook is how the body of a pane is drawn.
type glassLook struct {
	fill    Colour
	light   float64 // light transmittance of the pane alone, under D65
	known   bool
	clipped bool // the colour lies beyond what a screen shows
}

// meter measures colours on the wavelengths of the observers.
var meter = sync.OnceValue(func() *colour.Meter { return colour.NewMeter(spectra.NewGrid(colour.Wavelengths())) })

// lookOf returns the look of a pane in one tint, the colour of D65 after it at normal incidence. It
// is not known where more than a thousandth of the weight of a colour is missing.
func lookOf(p *glazing.Pane, tint int) glassLook {
	tau, w := p.Tints[tint].Spectrum.Tau, colour.Weighting()
	if tau.Len() == 0 {
		return glassLook{fill: Wash}
	}
	below, above := w.Missing(tau.First(), tau.Last())
	if below+above+w.Within(tau.Gaps) >= 0.001 {
		return glassLook{fill: Wash}
	}
	grid := spectra.NewGrid(colour.Wavelengths())
	values := make([]float64, grid.Padded())
	tau.Sample(values[:grid.Len()], grid.NM)
	xyz := meter().XYZ(colour.TwoDegree, values)
	s, inside := xyz.SRGB()
	return glassLook{fill: RGB(s.R, s.G, s.B), light: xyz.Y / 100, known: true, clipped: !inside}
}

// Swatch returns the colour on a screen of one in L*a*b*; inside says whether a screen can show it.
// It is an indication.
func Swatch(l colour.Lab) (c Colour, inside bool) {
	s, inside := l.SRGB()
	return RGB(s.R, s.G, s.B), inside
}

// mix returns a colour that lies a share of the way from one to another.
func mix(a, b Colour, share float64) Colour {
	part := func(a, b uint8) uint8 { return uint8(math.Round(float64(a) + share*(float64(b)-float64(a)))) }
	return Colour{part(a.R, b.R), part(a.G, b.G), part(a.B, b.B), 255}
}

// lightness is a rough one of a colour, 0 to 1, to choose what can be read on it.
func (c Colour) lightness() float64 {
	return (0.3*float64(c.R) + 0.59*float64(c.G) + 0.11*float64(c.B)) / 255
}

// hatchSpacing returns the distance in mm of the lines that hatch glass: the less light it lets
// through, the closer.
func (g glassLook) hatchSpacing() float64 { return 0.9 + 3.1*min(max(g.light, 0), 1) }

// hatchColour is seen on the glass in colour and in grey.
func (g glassLook) hatchColour() Colour {
	if g.fill.lightness() > 0.4 {
		return mix(g.fill, Ink, 0.3)
	}
	return mix(g.fill, Paper, 0.35)
}
