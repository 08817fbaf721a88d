package main

// panewright film: a pane whose films are known: where light goes, its conductors, its emissivities.

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"github.com/spf13/cobra"

	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/glazing/film"
	"panewright/glazing/library"
	"panewright/glazing/project"
)

type filmOptions struct {
	at, polarisation, basis string
	angleDeg                float64
	filesAnywhere           bool
}

// filmNM are the wavelengths in nm that are shown where none are asked for: ultraviolet, light, sun, and
// what rooms radiate.
var filmNM = []float64{
	300, 320, 340, 360, 380, 400, 450, 500, 550, 600, 650, 700, 780, 900, 1000, 1200, 1500, 2000, 2500,
	3000, 5000, 7000, 10000, 15000, 20000, 30000, 50000,
}

// filmAnglesDeg are the angles of incidence of the figures, beside 0.
var filmAnglesDeg = []float64{45, 60}

// polarisations are those of light: of one kind, or the mean of both.
var polarisations = []string{"s", "p", "mean"}

func newFilm(s streams) *cobra.Command {
	var o filmOptions
	var p page
	c := &cobra.Command{
		Use:                   "film PROJECT PANE [options]",
		DisableFlagsInUseLine: true,
		Short:                 "Show a pane by its films: light, conductors, emissivity",
		Long: `Shows a pane that is computed from its films, of the project or built in:

- transmittance, both reflectances, and what each film and the glass absorb, at
  wavelengths in nm, at an angle of incidence, in one polarisation or the mean;
- of each conducting film the sheet resistance, resistivity, plasma wavelength
  and optical gap, and what the short rules of the trade make of it, with a
  warning where they do not hold;
- of each face the normal, the corrected and the exact hemispherical emissivity,
  figures of merit, indium and silver;
- light, sun, ultraviolet and colours at 0, 45 and 60° of incidence.

Figures are of the whole pane, films and glass, in air. Uncoated glass is shown
as well, without what films alone have. Of a measured pane no films are known.

CSV has a row a wavelength, for plots. JSON has everything, with all digits, its
lists in the order of --at. --at all gives the wavelengths of the standards, and
those of the infrared. At one that lies outside the range of a material there is
an error; without --at such wavelengths are left out.

` + spreadsheetText,
		Example: `  panewright film panewright-demo/project.yaml soda-lime-6
  panewright film panewright-demo/project.yaml soda-lime-6 --at 450,550,10200
  panewright film panewright-demo/project.yaml soda-lime-6 --angle 60 \
      --polarisation s --at all -o soda-lime-6.csv`,
		Args: func(_ *cobra.Command, args []string) error {
			if len(args) != 2 || slices.Contains(args, "") {
				return fmt.Errorf("film needs a project file and a pane, such as: panewright film panewright-demo/project.yaml soda-lime-6")
			}
			return nil
		},
		RunE: func(_ *cobra.Command, args []string) error { return runFilm(s, args[0], args[1], o, p) },
	}
	c.Flags().StringVar(&o.at, "at", "", "light at the wavelengths `NM,NM`, in this order, or all")
	c.Flags().Float64Var(&o.angleDeg, "angle", 0, "light at `DEG` of incidence, 0 to "+strconv.Itoa(glazing.LargestAngleDeg))
	c.Flags().StringVar(&o.polarisation, "polarisation", "mean", "light of polarisation `NAME`: "+strings.Join(polarisations, ", "))
	c.Flags().StringVar(&o.basis, "basis", "", "figures under basis `NAME`: "+strings.Join(glazing.BasisNames(), ", ")+"; the project's first when absent")
	c.Flags().BoolVar(&o.filesAnywhere, "files-anywhere", false, "let the project name files outside its folder")
	p.formatFlags(c, "table", "json", "csv")
	return c
}

func runFilm(s streams, path, id string, o filmOptions, p page) error {
	form, err := p.form()
	if err != nil {
		return err
	}
	if !(o.angleDeg >= 0 && o.angleDeg <= glazing.LargestAngleDeg) {
		return fmt.Errorf("--angle %g is no angle of incidence here; it lies in 0 to %d degrees", o.angleDeg, glazing.LargestAngleDeg)
	}
	if !slices.Contains(polarisations, o.polarisation) {
		return fmt.Errorf("--polarisation %s is not known; %s", short(o.polarisation), project.OfferAll(o.polarisation, polarisations))
	}
	of, err := project.Load(path, project.Access{Anywhere: o.filesAnywhere})
	if err != nil {
		return err
	}
	basis := of.Bases[0]
	if o.basis != "" {
		if basis, err = basisNamed(o.basis); err != nil {
			return err
		}
	}
	options := of.Method(basis).Options
	options.Conditions = nil // the figures are those of light and sun
	from := shelf{project: of, method: glazing.NewMethod(basis, options)}
	entry, pane, err := from.find(id, path)
	if err != nil {
		return err
	}
	if _, ok := stackOf(pane); !ok {
		shows := "panewright panes " + id
		if entry == nil {
			shows += " --project " + path
		}
		return fmt.Errorf("film shows a pane that is computed from what it is made of, a glass and films on it (glass: and coatings: in the project); the spectrum of %s is %s, and its films are not known; for its figures: %s", id, pane.Origin, shows)
	}
	view, err := from.filmPage(pane, o)
	if err != nil {
		return err
	}
	if err := keepInputs(p.output, of); err != nil {
		return err
	}
	out, err := forms[table.FilmPage]{text: table.Film, json: table.FilmJSON, csv: table.FilmCSV}.print(p, form, view)
	if err != nil {
		return err
	}
	return s.write(p.output, out)
}

// filmPage gathers what is shown of a pane that is computed.
func (s shelf) filmPage(pane *glazing.Pane, o filmOptions) (table.FilmPage, error) {
	view := table.FilmPage{Pane: pane, AngleDeg: o.angleDeg, Polarisation: o.polarisation}
	stack, _ := stackOf(pane)
	ready := stack.Ready()
	view.Stack = stack.InFilms()
	bare := library.Coated(pane.ID, stack).Tints[0] // whatever the project gives
	view.Emissivity = [2]glazing.Emissivity{bare.Front, bare.Back}
	var err error
	if view.NM, err = filmWavelengths(o.at, view.Stack, pane); err != nil {
		return view, err
	}
	for _, nm := range view.NM {
		across, within := view.Stack.At(nm, o.angleDeg)
		switch o.polarisation {
		case "s":
			view.Light = append(view.Light, across)
		case "p":
			view.Light = append(view.Light, within)
		default:
			view.Light = append(view.Light, film.Unpolarised(across, within))
		}
	}
	if view.Report, err = s.report(pane); err != nil {
		return view, err
	}
	view.Angles = []table.Incidence{{Deg: 0, Rating: &view.Ratings[0]}}
	for _, deg := range filmAnglesDeg {
		inclined := *pane
		inclined.Tints = slices.Clone(pane.Tints)
		inclined.Tints[0].Spectrum = ready.Spectrum(deg)
		ratings, err := s.alone(&inclined)
		if err != nil {
			return view, err
		}
		view.Angles = append(view.Angles, table.Incidence{Deg: deg, Rating: &ratings[0]})
	}
	return view, nil
}

// stackOf returns what a pane is made of; ok is false of a measured one.
func stackOf(p *glazing.Pane) (c film.Coated, ok bool) {
	switch {
	case p.Coated != nil:
		return *p.Coated, true
	case p.Sheet != nil:
		return film.Coated{Glass: p.Sheet.Constants, ThicknessMM: p.Sheet.ThicknessMM}, true
	}
	return c, false
}

// filmPanes lists the panes that are computed, of the project that a line names and the built-in ones.
func filmPanes(c *cobra.Command, args []string, _ string) (out []string) {
	if len(args) > 1 {
		return nil // the pane is there
	}
	if p := projectNamed(c, args); p != nil {
		for _, pane := range p.Panes {
			if _, ok := stackOf(pane); ok {
				out = append(out, about(pane.ID, "of the project"))
			}
		}
	}
	for _, e := range library.Entries() {
		if _, ok := stackOf(e.Pane()); ok {
			out = append(out, about(e.ID, e.About))
		}
	}
	return out
}

// filmWavelengths reads the wavelengths of --at in nm, in any order, which must lie in the range of the glass
// and of every material. Without --at they are the usual ones in that range.
func filmWavelengths(at string, c film.Coated, p *glazing.Pane) ([]float64, error) {
	var list []float64
	switch at {
	case "":
		list = slices.DeleteFunc(slices.Clone(filmNM), func(nm float64) bool { return nm < c.FirstNM() || nm > c.LastNM() })
		return list, nil
	case "all":
		s := &p.Tints[0].Spectrum
		return slices.Concat(s.Tau.NM, s.InfraredFront.NM), nil
	}
	for word := range strings.SplitSeq(at, ",") {
		nm, err := strconv.ParseFloat(strings.TrimSpace(word), 64)
		if err != nil || !(nm > 0) || math.IsInf(nm, 0) {
			return nil, fmt.Errorf("--at: %q is no wavelength in nm; write 450,550,10200 or all", short(word))
		}
		if nm < c.Glass.FirstNM() || nm > c.Glass.LastNM() {
			return nil, fmt.Errorf("--at: glass %s may be used from %.6g to %.6g nm, not at %.6g nm", c.Glass.Name, c.Glass.FirstNM(), c.Glass.LastNM(), nm)
		}
		for _, f := range slices.Concat(c.Front, c.Back) {
			if err := f.Material.Check(nm); err != nil {
				return nil, fmt.Errorf("--at: %w", err)
			}
		}
		list = append(list, nm)
	}
	return list, nil
}
