package library

// The coated and switching panes, whose spectra are invented: smooth curves that behave like such
// panes do, made by a few numbers each. They describe no product.

import (
	"math"

	"panewright/glazing"
	"panewright/glazing/film"
)

// An inventedFilm is a film behind a sheet of clear glass, the same seen from both sides.
type inventedFilm struct {
	visible, infrared float64 // reflectance on either side of the edge
	edgeNM, widthNM   float64 // where the reflectance rises, and over how wide a stretch
	absorbs           float64 // absorptance, the same everywhere
	ultraviolet       float64 // further absorptance of the ultraviolet
	band              band    // absorption of a tint
	emissive          float64 // normal emissivity of the film
}

// band is an absorption in the manner of a tint: strength is the decadic optical density at its
// peak.
type band struct{ peakNM, widthNM, strength float64 }

// rise is a smooth step from 0 to 1.
func rise(x float64) float64 { return 1 / (1 + math.Exp(-x)) }

// shares returns reflectance and transmittance of the film alone.
func (f inventedFilm) shares(nm float64) (rho, t float64) {
	rho = f.visible + float64((f.infrared-f.visible)*rise((nm-f.edgeNM)/f.widthNM))
	const ultravioletEdgeNM, ultravioletWidthNM = 345, 12
	alpha := f.absorbs + float64(f.ultraviolet*rise((ultravioletEdgeNM-nm)/ultravioletWidthNM))
	x := (nm - f.band.peakNM) / f.band.widthNM
	density := f.band.strength * math.Exp(-float64(x*x))
	t = float64((1-rho)*(1-alpha)) * math.Pow(10, -density)
	return rho, t
}

// behind returns the spectrum of a sheet of glass with the film on its back.
func (f inventedFilm) behind(s film.Sheet, name string) glazing.Tint {
	t := glazing.Tint{Name: name}
	m := &t.Spectrum
	for nm := 300.0; nm <= 2500; {
		glass := s.At(nm, 0).Unpolarised()
		rho, through := f.shares(nm)
		d := 1 - float64(glass.R*rho)
		m.Tau.NM, m.Tau.Value = append(m.Tau.NM, nm), append(m.Tau.Value, tidy(glass.T*through/d))
		m.RhoFront.Value = append(m.RhoFront.Value, tidy(glass.R+float64(glass.T*glass.T)*rho/d))
		m.RhoBack.Value = append(m.RhoBack.Value, tidy(rho+float64(through*through)*glass.R/d))
		if nm < 800 {
			nm += 5
		} else {
			nm += 20
		}
	}
	m.RhoFront.NM, m.RhoBack.NM = m.Tau.NM, m.Tau.NM
	for nm := 5000.0; nm <= 50000; nm += 1000 {
		m.InfraredBack.NM = append(m.InfraredBack.NM, nm)
		m.InfraredBack.Value = append(m.InfraredBack.Value, tidy(1-f.emissive))
	}
	t.Back = glazing.InfraredEmissivity(m.InfraredBack, m.InfraredTau)
	return t
}

// tidy keeps the four decimals that an invented value deserves.
func tidy(v float64) float64 { return math.Round(v*1e4) / 1e4 }

// An inventedTint is a film in one state.
type inventedTint struct {
	name                 string
	chargeMCCM2, celsius glazing.Value
	film                 inventedFilm
}

func of(v float64) glazing.Value { return glazing.Value{Number: v, Known: true} }

// coat gives a pane of uncoated glass the spectra of its invented films.
func (e Entry) coat(p *glazing.Pane) {
	sheet, front := e.sheet(), p.Tints[0].Front
	p.Origin, p.Sheet, p.Tints = glazing.InventedOrigin, nil, nil
	for _, t := range e.tints {
		tint := t.film.behind(sheet, t.name)
		tint.Front, tint.ChargeMCCM2, tint.TemperatureC, tint.Source = front, t.chargeMCCM2, t.celsius, "smooth made-up curves"
		p.Tints = append(p.Tints, tint)
	}
}

func invented() []Entry {
	pane := func(id, about string, mm float64, tints ...inventedTint) Entry {
		return Entry{ID: id, About: about, glass: "soda-lime", mm: mm, tints: tints}
	}
	soft := inventedFilm{visible: 0.045, infrared: 0.93, edgeNM: 960, widthNM: 105, absorbs: 0.03, ultraviolet: 0.35, emissive: 0.030}
	sun := inventedFilm{visible: 0.075, infrared: 0.96, edgeNM: 790, widthNM: 55, absorbs: 0.12, ultraviolet: 0.6, emissive: 0.022}
	hard := inventedFilm{visible: 0.05, infrared: 0.55, edgeNM: 1900, widthNM: 260, absorbs: 0.035, ultraviolet: 0.5, emissive: 0.15}
	mirror := inventedFilm{visible: 0.30, infrared: 0.36, edgeNM: 900, widthNM: 150, absorbs: 0.30, ultraviolet: 0.3, emissive: 0.45}
	// dimming is a film that takes in charge: its absorption grows, widest in the red.
	dimming := func(strength float64) inventedFilm {
		return inventedFilm{visible: 0.06, infrared: 0.6, edgeNM: 1700, widthNM: 230, absorbs: 0.10, ultraviolet: 0.9,
			band: band{peakNM: 850, widthNM: 480, strength: strength}, emissive: 0.14}
	}
	// warming is a film that turns metallic when it is warm: its infrared reflectance grows.
	warming := func(infrared, strength float64) inventedFilm {
		return inventedFilm{visible: 0.09, infrared: infrared, edgeNM: 1250, widthNM: 190, absorbs: 0.28, ultraviolet: 0.7,
			band: band{peakNM: 1300, widthNM: 500, strength: strength}, emissive: 0.80}
	}
	return []Entry{
		pane("invented-low-e-4", "low-e film on the back of 4 mm clear glass", 4, inventedTint{film: soft}),
		pane("invented-low-e-6", "low-e film on the back of 6 mm clear glass", 6, inventedTint{film: soft}),
		pane("invented-sun-6", "sun-reflecting low-e film on the back of 6 mm clear glass", 6, inventedTint{film: sun}),
		pane("invented-hard-low-e-4", "low-e oxide film on the back of 4 mm clear glass", 4, inventedTint{film: hard}),
		pane("invented-mirror-6", "half-mirroring film on the back of 6 mm clear glass", 6, inventedTint{film: mirror}),
		pane("invented-dimming-7", "electrochromic films on the back of 7 mm clear glass", 7,
			inventedTint{"clear", of(0), glazing.Value{}, dimming(0.03)},
			inventedTint{"half", of(7), glazing.Value{}, dimming(0.7)},
			inventedTint{"full", of(15), glazing.Value{}, dimming(2.1)}),
		pane("invented-warming-6", "thermochromic film on the back of 6 mm clear glass", 6,
			inventedTint{"cold", glazing.Value{}, of(20), warming(0.10, 0.03)},
			inventedTint{"warm", glazing.Value{}, of(75), warming(0.35, 0.45)}),
	}
}
