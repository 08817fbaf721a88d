package table

// The page of a pane whose films are known: where light goes, what its films are like as conductors, the
// emissivity of each face, its figures by angle of incidence.

import (
	"bytes"
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"panewright/glazing"
	"panewright/glazing/film"
)

// A FilmPage is what is shown of a pane whose films are known. The report rates the pane alone, at normal
// incidence.
type FilmPage struct {
	Report
	Pane         *glazing.Pane
	Stack        film.Coated           // films of some thickness, with each material as it is in them
	Emissivity   [2]glazing.Emissivity // of the front and the back, as the films and the glass give it
	AngleDeg     float64               // of light
	Polarisation string                // of light: s, p or mean
	NM           []float64
	Light        []film.Light // at each of NM
	Angles       []Incidence
}

// An Incidence is a pane rated alone at an angle of incidence, in light of no polarisation.
type Incidence struct {
	Deg    float64
	Rating *glazing.Rating
}

// faceNames are those of the faces of a pane.
var faceNames = [...]string{film.Front: "front", film.Back: "back"}

// A shownFilm is a film with its figures; what is not known, or no figure of an insulator, has no number.
type shownFilm struct {
	film.Film
	number int // on the page: from the glass outward, the front first
	face   film.Face

	screen                        film.Screen
	sheetOhm, resistivityOhmCM    glazing.Value
	plasmaNM, screenedNM          glazing.Value
	undampedNM, gapEV             glazing.Value
	thinSheet, hagenRubens, depth glazing.Value
	omegaTau, radioDB             glazing.Value
	indium, silver                glazing.Value // g/m²
}

// some is a known figure, if it is a number.
func some(v float64) glazing.Value {
	return glazing.Value{Number: v, Known: !math.IsNaN(v) && !math.IsInf(v, 0)}
}

// films returns those of both faces with their figures.
func (p FilmPage) films() (list []shownFilm) {
	for face, films := range [...][]film.Film{film.Front: p.Stack.Front, film.Back: p.Stack.Back} {
		for _, f := range films {
			s := shownFilm{Film: f, number: len(list) + 1, face: film.Face(face),
				indium: massOf(f, f.Material.Indium), silver: massOf(f, f.Material.Silver)}
			if c := f.Material.Carriers; c != nil {
				in := c.InFilm(f.ThicknessNM)
				s.screen = c.Screening(f.ThicknessNM)
				s.sheetOhm, s.resistivityOhmCM = some(s.screen.SheetOhm), some(in.ResistivityOhmCM())
				s.plasmaNM = some(film.PhotonEV(in.PlasmaEV())) // E = hc/λ turns an energy into a wavelength too
				if nm, ok := in.ScreenedPlasmaNM(); ok {
					s.screenedNM = some(nm)
				}
				s.undampedNM = some(in.UndampedPlasmaNM())
				if e := f.Material.Edge; e != nil {
					s.gapEV = some(e.OpticalGapEV(in))
				}
				s.thinSheet, s.hagenRubens = some(s.screen.ThinSheetEmissivity), some(s.screen.HagenRubens)
				s.depth, s.omegaTau, s.radioDB = some(s.screen.SkinDepthNM), some(s.screen.OmegaTau), some(s.screen.RadioAttenuationDB)
			}
			list = append(list, s)
		}
	}
	return list
}

// massOf returns the mass per area in g/m² of what makes the fraction of a film; it is not known where the
// composition or the density is not.
func massOf(f film.Film, fraction float64) glazing.Value {
	if fraction > 0 && f.Material.DensityKGM3 == 0 {
		return glazing.Value{}
	}
	return some(film.MassGM2(f.ThicknessNM, f.Material.DensityKGM3, fraction))
}

// A shownFace is a face with its figures.
type shownFace struct {
	name           string
	films          []shownFilm
	emissivity     glazing.Emissivity
	typed          glazing.Value // corrected emissivity that the project puts in its place
	sheetOhm       glazing.Value // of its conductors in parallel
	screenedNM     glazing.Value // of the conductor of the least sheet resistance
	thinSheet      glazing.Value // emissivity by the sheet resistance alone
	haacke, gordon glazing.Value // 1/Ω
	indium, silver glazing.Value // g/m²
}

// faces returns the front and the back.
func (p FilmPage) faces() [2]shownFace {
	var faces [2]shownFace
	tint, rating := &p.Pane.Tints[0], &p.Ratings[0]
	used := [2]glazing.Emissivity{tint.Front, tint.Back}
	all := p.films()
	for i := range faces {
		f := &faces[i]
		f.name, f.emissivity = faceNames[i], p.Emissivity[i]
		if source := used[i].Source; source == glazing.EmissivityGiven || source == glazing.EmissivityGivenNormal {
			f.typed = used[i].Corrected
		}
		reflected := rating.Light.ReflectanceOutside
		if film.Face(i) == film.Back {
			reflected = rating.Light.ReflectanceInside
		}
		f.films = slices.DeleteFunc(slices.Clone(all), func(x shownFilm) bool { return x.face != film.Face(i) })
		siemens, least := 0.0, math.Inf(1)
		for _, x := range f.films {
			if x.sheetOhm.Known {
				siemens += 1 / x.sheetOhm.Number
				if x.sheetOhm.Number < least {
					least, f.screenedNM = x.sheetOhm.Number, x.screenedNM
				}
			}
		}
		f.indium = total(f.films, func(x shownFilm) glazing.Value { return x.indium })
		f.silver = total(f.films, func(x shownFilm) glazing.Value { return x.silver })
		if siemens == 0 {
			continue
		}
		f.sheetOhm = some(1 / siemens)
		f.thinSheet = some(film.ThinSheetEmissivity(f.sheetOhm.Number))
		if tau := rating.Light.Transmittance; tau.Known {
			f.haacke = some(film.Haacke(tau.Number, f.sheetOhm.Number))
			if reflected.Known {
				f.gordon = some(film.Gordon(tau.Number, reflected.Number, f.sheetOhm.Number))
			}
		}
	}
	return faces
}

// total adds a figure of films up; it is known where each is.
func total(films []shownFilm, of func(shownFilm) glazing.Value) glazing.Value {
	sum := 0.0
	for _, f := range films {
		v := of(f)
		if !v.Known {
			return glazing.Value{}
		}
		sum += v.Number
	}
	return some(sum)
}

// coated returns the face with films; the front if both have some, or neither.
func coated(faces *[2]shownFace) *shownFace {
	if len(faces[film.Front].films) == 0 && len(faces[film.Back].films) > 0 {
		return &faces[film.Back]
	}
	return &faces[film.Front]
}

// The figures that are shown by angle of incidence.
var (
	powersByAngle  = []string{"light", "light_outside", "light_inside", "solar", "solar_outside", "solar_inside", "uv"}
	coloursByAngle = []string{"l_transmitted", "a_transmitted", "b_transmitted", "l_outside", "a_outside", "b_outside", "l_inside", "a_inside", "b_inside"}
)

// aliased returns the figures of aliases, in their order.
func (p FilmPage) aliased(aliases []string) []Choice {
	var list []Choice
	for _, alias := range aliases {
		for _, f := range p.Figures {
			if f.Alias == alias {
				list = append(list, Choice{Figure: f})
			}
		}
	}
	return list
}

// incidence says at which angle and in which polarisation light is shown.
func (p FilmPage) incidence() string {
	if p.AngleDeg == 0 {
		return "at normal incidence"
	}
	at := fmt.Sprintf("at %.6g° of incidence, ", p.AngleDeg)
	if p.Polarisation == "mean" {
		return at + "mean of both polarisations"
	}
	return at + p.Polarisation + "-polarised"
}

// digits prints a known figure to four digits that count.
func digits(v glazing.Value) string {
	if !v.Known {
		return "–"
	}
	return strconv.FormatFloat(v.Number, 'g', 4, 64)
}

// Film returns the page as text.
func Film(p FilmPage) []byte {
	var b bytes.Buffer
	faces := p.faces()
	all := slices.Concat(faces[film.Front].films, faces[film.Back].films)
	where := "no films"
	switch front, back := len(p.Stack.Front), len(p.Stack.Back); {
	case front > 0 && back > 0:
		where = "films on both faces"
	case front > 0:
		where = "films on the front"
	case back > 0:
		where = "films on the back"
	}
	writeWrapped(&b, fmt.Sprintf("%s: %.6g mm of %s glass, %s", p.Pane.ID, p.Stack.ThicknessMM, p.Stack.Glass.Name, where), "  ")
	writeWrapped(&b, "Front is the face that looks outside when the pane is not turned. Computed, not measured.", "")
	p.filmTable(all).print(&b)
	p.screenTable(all).print(&b)
	for _, x := range all {
		for _, doubt := range x.screen.Doubts {
			writeWrapped(&b, fmt.Sprintf("! %d %s: %s", x.number, x.Material.ID, doubt), "  ")
		}
	}
	faceTable(faces).print(&b)
	for _, f := range faces {
		if e := f.emissivity; e.ComputedNormal.Known {
			writeWrapped(&b, fmt.Sprintf("ε of the %s is the convention for uncoated soda-lime glass (EN 673); the optical constants give %.3f normal, %.3f over the half space.",
				f.name, e.ComputedNormal.Number, e.Hemispherical.Number), "  ")
		} else if !e.Corrected.Known {
			writeWrapped(&b, "ε of the "+f.name+" is not known: "+e.Corrected.Why+".", "  ")
		}
		if f.typed.Known {
			writeWrapped(&b, fmt.Sprintf("For the %s the project gives a corrected ε of %s, which ratings use.", f.name, printedValue(f.typed, 3)), "  ")
		}
	}
	meritTable(faces).print(&b)
	p.lightTable(all).print(&b)
	powers, colours := p.aliased(powersByAngle), p.aliased(coloursByAngle)
	p.angleTable("Light, sun and ultraviolet by angle of incidence, both polarisations alike",
		"Outside is the front here. "+strings.Join(legend(powers, p.Ratings), "; ")+".", powers).print(&b)
	p.angleTable("Colours by angle of incidence, both polarisations alike",
		"L*a*b* (D65, 2°) of what is transmitted (τ), and reflected on the front (ρ) and on the back (ρ′).", colours).print(&b)
	b.WriteByte('\n')
	p.paneBases(&b)
	p.cautionList(&b)
	p.trace(&b)
	return b.Bytes()
}

// filmTable lists the films.
func (p FilmPage) filmTable(films []shownFilm) Titled {
	t := Titled{Title: "Films, from the glass outward", Names: 3,
		Head: []string{"", "face", "material", "d/nm", "R□/Ω", "ρ/Ω·cm", "λp/nm", "λs/nm", "undamped", "Eg/eV", "In/g/m²", "Ag/g/m²"},
		Note: "R□ sheet resistance; ρ resistivity; λp plasma wavelength, not screened; λs where the permittivity of carriers passes 0, undamped the same without damping; Eg optical gap with these carriers, where the absorption of the model begins; of fitted materials it is a figure of the fit. – not known, or none."}
	for _, f := range films {
		t.Rows = append(t.Rows, []string{strconv.Itoa(f.number), faceNames[f.face], f.Material.ID, strconv.FormatFloat(f.ThicknessNM, 'g', 6, 64),
			digits(f.sheetOhm), digits(f.resistivityOhmCM), digits(f.plasmaNM), digits(f.screenedNM), digits(f.undampedNM), digits(f.gapEV),
			digits(f.indium), digits(f.silver)})
	}
	return t
}

// screenTable lists what the short rules say of conductors.
func (p FilmPage) screenTable(films []shownFilm) Titled {
	t := Titled{Title: "Short rules for each conductor alone, beside the exact emissivity and not in its place", Names: 2,
		Head: []string{"", "material", "ε thin sheet", "ε Hagen–Rubens", "skin depth/nm", "ωτ", "radio/dB"},
		Note: "Normal emissivities. Thin sheet: by R□ alone. Hagen–Rubens: bulk of that ρ at 10 µm. Skin depth and ωτ at 10 µm. Radio: attenuation by a sheet without openings, a hint."}
	for _, f := range films {
		if f.sheetOhm.Known {
			t.Rows = append(t.Rows, []string{strconv.Itoa(f.number), f.Material.ID, printedValue(f.thinSheet, 3), printedValue(f.hagenRubens, 3),
				printedValue(f.depth, 0), printedValue(f.omegaTau, 2), printedValue(f.radioDB, 0)})
		}
	}
	return t
}

// faceTable lists the emissivities.
func faceTable(faces [2]shownFace) Titled {
	t := Titled{Title: "Emissivity at 283 K", Names: 1, Head: []string{"face", "normal", "corrected", "exact", "source"},
		Note: "Normal and corrected: EN 12898. Exact: integral over the half space, 5 to 50 µm."}
	conductors := faces[film.Front].thinSheet.Known || faces[film.Back].thinSheet.Known
	if conductors {
		t.Head = append(t.Head, "thin sheet")
		t.Note += " Thin sheet: the short rule for the normal emissivity, by the conductors of the face in parallel."
	}
	for _, f := range faces {
		e := f.emissivity
		row := []string{f.name, printedValue(e.Normal, 3), printedValue(e.Corrected, 3), printedValue(e.Hemispherical, 3), strings.ReplaceAll(e.Source, "_", " ")}
		if conductors {
			row = append(row, printedValue(f.thinSheet, 3))
		}
		t.Rows = append(t.Rows, row)
	}
	return t
}

// meritTable lists the figures of the conductors of each face.
func meritTable(faces [2]shownFace) Titled {
	t := Titled{Title: "Conductors of a face, in parallel", Names: 1, Head: []string{"face", "R□/Ω", "λs/nm", "Haacke/S", "Gordon/S", "In/g/m²", "Ag/g/m²"},
		Note: "λs of the conductor of the least R□. Haacke T¹⁰/R□ and Gordon −1/(R□ ln(T + R)), with T = τv and R = ρv on that side, of the whole pane, glass too."}
	for _, f := range faces {
		if f.sheetOhm.Known {
			t.Rows = append(t.Rows, []string{f.name, digits(f.sheetOhm), digits(f.screenedNM), digits(f.haacke), digits(f.gordon), digits(f.indium), digits(f.silver)})
		}
	}
	return t
}

// lightTable lists where light from outside the front goes.
func (p FilmPage) lightTable(films []shownFilm) Titled {
	t := Titled{Title: "Light " + p.incidence(), Names: 1, Head: []string{"nm", "τ", "ρ front", "ρ back", "α glass"},
		Note: "Absorptances α of glass and films, numbered as above, are of light that meets the front. JSON and CSV have those of light that meets the back as well."}
	if len(films) == 0 {
		t.Note = "The absorptance α is that of light that meets the front."
	}
	for _, f := range films {
		t.Head = append(t.Head, "α "+strconv.Itoa(f.number))
	}
	for i, nm := range p.NM {
		l := p.Light[i]
		row := []string{strconv.FormatFloat(nm, 'g', 8, 64)}
		for _, v := range slices.Concat([]float64{l.T, l.RFront, l.RBack, l.FromFront.Glass}, l.FromFront.Front, l.FromFront.Back) {
			row = append(row, glazing.PrintRounded(v, 4))
		}
		t.Rows = append(t.Rows, row)
	}
	return t
}

// angleTable lists figures by angle of incidence.
func (p FilmPage) angleTable(title, note string, choices []Choice) Titled {
	t := Titled{Title: title, Names: 1, Head: []string{"angle"}, Note: note}
	for _, c := range choices {
		t.Head = append(t.Head, c.Head())
	}
	for _, a := range p.Angles {
		row := []string{fmt.Sprintf("%.6g°", a.Deg)}
		for _, c := range choices {
			row = append(row, c.Printed(a.Rating))
		}
		t.Rows = append(t.Rows, row)
	}
	return t
}

// absorptances returns those of the glass, or of a film, by wavelength, of light that meets a face. The film
// counts from 0; -1 is the glass.
func (p FilmPage) absorptances(from film.Face, at int) []float64 {
	list := make([]float64, len(p.Light))
	for i, l := range p.Light {
		a := l.FromFront
		if from == film.Back {
			a = l.FromBack
		}
		list[i] = a.Glass
		if at >= 0 {
			list[i] = slices.Concat(a.Front, a.Back)[at]
		}
	}
	return list
}

// spectrum returns the transmittance and both reflectances by wavelength.
func (p FilmPage) spectrum() (tau, front, back []float64) {
	for _, l := range p.Light {
		tau, front, back = append(tau, l.T), append(front, l.RFront), append(back, l.RBack)
	}
	return tau, front, back
}

// FilmJSON returns the page in the documented format: full precision, lists in the order of the wavelengths
// asked for, null where a figure is not known.
func FilmJSON(p FilmPage) []byte {
	top := newNode()
	p.said(top)
	top.set(quoted(p.Pane.ID), "pane")
	top.set(figure(p.AngleDeg), "angle_deg")
	top.set(quoted(p.Polarisation), "polarisation")
	tau, front, back := p.spectrum()
	top.set(figures(p.NM), "wavelength_nm")
	top.set(figures(tau), "tau")
	top.set(figures(front), "rho_front")
	top.set(figures(back), "rho_back")
	faces := p.faces()
	short := coated(&faces)
	all := slices.Concat(faces[film.Front].films, faces[film.Back].films)
	put := func(n *node, key string, v glazing.Value) { n.set(jsonValue(v), key) }
	emissivities := func(n *node, e glazing.Emissivity) {
		put(n, "emissivity_normal", e.Normal)
		put(n, "emissivity", e.Corrected)
		put(n, "emissivity_hemispherical", e.Hemispherical)
	}
	put(top, "sheet_resistance_ohm", short.sheetOhm)
	put(top, "screened_plasma_wavelength_nm", short.screenedNM)
	emissivities(top, short.emissivity)
	put(top, "indium_g_m2", total(all, func(f shownFilm) glazing.Value { return f.indium }))
	put(top, "silver_g_m2", total(all, func(f shownFilm) glazing.Value { return f.silver }))
	for _, f := range faces {
		n := top.at("faces").at(f.name)
		emissivities(n, f.emissivity)
		n.set(quoted(f.emissivity.Source), "emissivity_source")
		put(n, "emissivity_normal_computed", computedNormal(f.emissivity))
		put(n, "emissivity_given", f.typed)
		put(n, "emissivity_thin_sheet", f.thinSheet)
		put(n, "sheet_resistance_ohm", f.sheetOhm)
		put(n, "screened_plasma_wavelength_nm", f.screenedNM)
		put(n, "haacke_per_ohm", f.haacke)
		put(n, "gordon_per_ohm", f.gordon)
		put(n, "indium_g_m2", f.indium)
		put(n, "silver_g_m2", f.silver)
	}
	glass := top.at("glass")
	glass.set(quoted(p.Stack.Glass.Name), "material")
	glass.set(figure(p.Stack.ThicknessMM), "thickness_mm")
	glass.set(figures(p.absorptances(film.Front, -1)), "absorptance_front")
	glass.set(figures(p.absorptances(film.Back, -1)), "absorptance_back")
	list := top.at("films")
	list.list = true
	for i, f := range all {
		n := list.at(strconv.Itoa(i))
		n.set(quoted(faceNames[f.face]), "face")
		n.set(quoted(f.Material.ID), "material")
		n.set(figure(f.ThicknessNM), "thickness_nm")
		put(n, "sheet_resistance_ohm", f.sheetOhm)
		put(n, "resistivity_ohm_cm", f.resistivityOhmCM)
		put(n, "plasma_wavelength_nm", f.plasmaNM)
		put(n, "screened_plasma_wavelength_nm", f.screenedNM)
		put(n, "undamped_plasma_wavelength_nm", f.undampedNM)
		put(n, "optical_gap_ev", f.gapEV)
		put(n, "indium_g_m2", f.indium)
		put(n, "silver_g_m2", f.silver)
		put(n, "emissivity_thin_sheet", f.thinSheet)
		put(n, "emissivity_hagen_rubens", f.hagenRubens)
		put(n, "skin_depth_nm", f.depth)
		put(n, "omega_tau", f.omegaTau)
		put(n, "radio_attenuation_db", f.radioDB)
		doubts := n.at("doubts")
		doubts.list = true
		for k, text := range f.screen.Doubts {
			doubts.set(quoted(text), strconv.Itoa(k))
		}
		n.set(figures(p.absorptances(film.Front, i)), "absorptance_front")
		n.set(figures(p.absorptances(film.Back, i)), "absorptance_back")
	}
	angles := top.at("angles")
	angles.list = true
	for i, a := range p.Angles {
		n := angles.at(strconv.Itoa(i))
		n.set(figure(a.Deg), "angle_deg")
		for _, c := range p.aliased(slices.Concat(powersByAngle, coloursByAngle)) {
			n.figure(c.Key, c.Figure, a.Rating)
		}
	}
	top.set(quoted(p.Ratings[0].Method.Basis.Name), "basis")
	top.set(quoted(p.Ratings[0].Method.Editions()), "editions")
	p.remarks(top, 0)
	return top.bytes()
}

// computedNormal is the normal emissivity by what the face is made of, also where a convention stands in its
// place.
func computedNormal(e glazing.Emissivity) glazing.Value {
	if e.Source == glazing.EmissivityComputed {
		return e.Normal
	}
	return e.ComputedNormal
}

// FilmCSV returns the light as CSV: a row a wavelength, a column a curve, with all digits. A film is named by
// its number and its material.
func FilmCSV(p FilmPage, form CSVForm) ([]byte, error) {
	curve := func(key string, values []float64) field {
		return field{key: key, cell: func(i int) cell { return number(values[i], -1) }}
	}
	tau, front, back := p.spectrum()
	fields := []field{curve("wavelength_nm", p.NM), curve("tau", tau), curve("rho_front", front), curve("rho_back", back)}
	for face, name := range faceNames {
		from := film.Face(face)
		fields = append(fields, curve("glass.absorptance_"+name, p.absorptances(from, -1)))
		for i, f := range p.films() {
			key := fmt.Sprintf("films.%d.%s.absorptance_%s", f.number, f.Material.ID, name)
			fields = append(fields, curve(key, p.absorptances(from, i)))
		}
	}
	return form.write(fields, len(p.NM))
}
