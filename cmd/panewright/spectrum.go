package main

// panewright spectrum: what a spectrum file is good for, and files of other programs as our CSV.

import (
	"bytes"
	"errors"
	"fmt"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"unicode/utf8"

	"github.com/spf13/cobra"

	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/glazing/project"
	"panewright/spectra"
)

type spectrumOptions struct {
	percent, decimalComma    bool
	separator, columns, unit string
	as, output               string
}

// layoutFlags are the options of which any has the files read in another layout than ours.
var layoutFlags = []string{"percent", "decimal-comma", "separator", "columns", "unit"}

func newSpectrum(s streams) *cobra.Command {
	var o spectrumOptions
	c := &cobra.Command{
		Use:                   "spectrum FILE… [options]",
		DisableFlagsInUseLine: true,
		Short:                 "Show what a spectrum file is good for, or convert it to CSV",
		Long: `Reports what the file of a spectrum was taken for, what its columns are like
(range, steps, gaps, extremes, noise), a plot, its figures, and what each basis
would say of it. A file is CSV as a project reads it, JCAMP-DX, or, once any of
the options of layout is given, text of another program: lines of anything, then
rows of numbers.

Files of one quantity each are joined to one pane by KEY=FILE, where KEY is tau,
rho_front, rho_back, infrared_front or infrared_back. A JCAMP-DX file says
itself whether it has transmittance or reflectance. One of several spectra in it
is named behind a #, by its number or its title: rho_back=pane.jdx#3.

With --as csv, prints the spectrum as CSV for the spectrum: key of a project. A
column without a value at a wavelength of another is interpolated there, which a
comment in the file says; nothing is made up beyond an end or in a gap. Comments
of the files are kept. What no pane can be, such as a transmittance and a
reflectance that add to more than 1, is not converted.`,
		Example: `  panewright spectrum panewright-demo/spectra/clear-6.csv
  panewright spectrum panewright-demo/spectra/low-e-6.csv --as csv -o low-e.csv
  panewright spectrum panewright-demo/spectra/clear-6.csv \
      --columns wavelength=1,tau=2 --separator , --unit nm
  panewright spectrum tau=t.txt rho_front=r.txt --percent --decimal-comma`,
		Args: func(_ *cobra.Command, args []string) error {
			if len(args) == 0 || slices.Contains(args, "") {
				return errors.New("spectrum needs a file, such as: panewright spectrum panewright-demo/spectra/clear-6.csv")
			}
			return nil
		},
		RunE: func(c *cobra.Command, args []string) error {
			foreign := slices.ContainsFunc(layoutFlags, func(name string) bool { return c.Flags().Changed(name) })
			return runSpectrum(s, args, o, foreign)
		},
	}
	c.Flags().BoolVar(&o.percent, "percent", false, "layout: values are per cent")
	c.Flags().BoolVar(&o.decimalComma, "decimal-comma", false, "layout: numbers have decimal commas")
	c.Flags().StringVar(&o.separator, "separator", "", "layout: `SIGN` between cells: comma, semicolon, tab, blank or a character; told from the rows when absent")
	c.Flags().StringVar(&o.columns, "columns", "", "layout: the columns that are read, a `LIST` such as wavelength=1,tau=2; also rho_front, rho_back")
	c.Flags().StringVar(&o.unit, "unit", "", "layout: `UNIT` of the wavelength: "+strings.Join(spectra.LayoutUnits(), ", ")+"; also µm, cm-1 (nm when absent)")
	c.Flags().StringVar(&o.as, "as", "", "print as `FORMAT`: table or csv (csv when -o names a .csv file)")
	outputFlag(c, &o.output)
	return c
}

func runSpectrum(s streams, args []string, o spectrumOptions, foreign bool) error {
	formats := []string{"table", "csv"}
	if err := checkEnding("spectrum", o.output, o.as, formats); err != nil {
		return err
	}
	if o.as == "" {
		o.as = "table"
		if strings.EqualFold(filepath.Ext(o.output), ".csv") {
			o.as = "csv"
		}
	}
	if !slices.Contains(formats, o.as) {
		return fmt.Errorf("--as %s is not known; %s", short(o.as), project.Offer(o.as, formats))
	}
	var layout *spectra.Layout
	if foreign {
		l, err := o.layout()
		if err != nil {
			return err
		}
		layout = &l
	}
	var in spectrumInput
	for _, arg := range args {
		if err := in.add(arg, layout); err != nil {
			return err
		}
	}
	if err := in.keep(o.output); err != nil {
		return err
	}
	if o.as == "csv" {
		return in.convert(s, o.output)
	}
	return s.write(o.output, in.page().Bytes())
}

// layout reads the options of layout.
func (o spectrumOptions) layout() (spectra.Layout, error) {
	l := spectra.Layout{Percent: o.percent, DecimalComma: o.decimalComma, Unit: spectra.UnitNamed(o.unit)}
	if o.unit != "" && l.Unit == "" {
		return l, fmt.Errorf("--unit %s is not known; %s", short(o.unit), project.OfferAll(o.unit, spectra.LayoutUnits()))
	}
	switch o.separator {
	case "":
	case "tab", `\t`:
		l.Separator = '\t'
	case "blank", "space":
		l.Separator = ' '
	case "comma":
		l.Separator = ','
	case "semicolon":
		l.Separator = ';'
	default:
		if utf8.RuneCountInString(o.separator) != 1 {
			return l, fmt.Errorf("--separator %s is not known; write comma, semicolon, tab, blank or one character", short(o.separator))
		}
		l.Separator, _ = utf8.DecodeRuneInString(o.separator)
	}
	for part := range strings.SplitSeq(o.columns, ",") {
		if o.columns == "" {
			break
		}
		key, place, ok := strings.Cut(strings.TrimSpace(part), "=")
		n, err := strconv.Atoi(place)
		switch {
		case !slices.Contains(spectra.LayoutColumns(), key):
			return l, fmt.Errorf("--columns: unknown quantity %q; %s", short(key), project.OfferAll(key, spectra.LayoutColumns()))
		case !ok || err != nil:
			return l, fmt.Errorf("--columns %s: write the number of the column, as in %s=2", short(part), key)
		case l.Columns[key] != 0:
			return l, fmt.Errorf("--columns: %s stands twice", key)
		case l.Columns == nil:
			l.Columns = map[string]int{}
		}
		l.Columns[key] = n
	}
	if problem := l.Check(); problem != "" {
		return l, errors.New(problem)
	}
	return l, nil
}

// impossible is why no pane can have the spectrum, of the columns that are there.
func (in *spectrumInput) impossible() spectra.Errors {
	c := in.columns
	return append(spectra.Impossible(c), spectra.Impossible(spectra.Columns{Tau: c.Tau, RhoFront: in.front, RhoBack: in.back})...)
}

// joined is what a rating would make of the spectrum, or why it would refuse it.
func (in *spectrumInput) joined() (m spectra.Measured, refused []string) {
	var lacks []string
	for _, key := range spectrumKeys[:3] {
		if in.place(key).Len() == 0 {
			lacks = append(lacks, key)
		}
	}
	faults := in.impossible()
	if lacks != nil {
		refused = []string{"it lacks " + strings.Join(lacks, " and ") + "; a pane needs tau, rho_front and rho_back"}
	} else {
		var err error
		m, err = spectra.Join(in.columns, in.front, in.back)
		faults, _ = errors.AsType[spectra.Errors](err)
	}
	for i, x := range faults {
		if i == errorsPrinted {
			return m, append(refused, fmt.Sprintf("and %d faults more", len(faults)-i))
		}
		refused = append(refused, clip(x.Error()))
	}
	return m, refused
}

// page gathers what the report shows.
func (in *spectrumInput) page() table.SpectrumPage {
	p := table.SpectrumPage{Version: version}
	for _, f := range in.files {
		p.Files = append(p.Files, f.SpectrumFile)
	}
	for i, key := range spectrumKeys {
		role := key
		if i >= 3 {
			role = table.RoleInfrared
		}
		if c := *in.place(key); c.Len() > 0 {
			name := filepath.Base(c.File)
			p.Series = append(p.Series, table.Series{Name: key, Mark: []rune("TfbFB")[i], Role: role, Column: c,
				Pane: spectra.Clip(strings.TrimSuffix(name, filepath.Ext(name)), 60)})
		}
	}
	p.Series = append(p.Series, in.loose...)
	if in.loose != nil {
		p.Refused = []string{clip(in.looseness.Error())}
		return p
	}
	var m spectra.Measured
	m, p.Refused = in.joined()
	p.Cautions = m.Cautions
	for _, face := range []struct {
		name     string
		rho, own spectra.Column
		joined   spectra.Curve
	}{{"front", in.columns.RhoFront, in.front, m.InfraredFront}, {"back", in.columns.RhoBack, in.back, m.InfraredBack}} {
		if face.own.Len() > 0 {
			face.rho = face.own
		}
		rho, tau := face.joined, m.InfraredTau
		if p.Refused != nil {
			var err error
			if rho, err = face.rho.InfraredPart(face.name); err != nil {
				p.Faces = append(p.Faces, table.Face{Name: face.name, Why: clip(err.Error())})
			}
			tau = in.columns.Tau.InfraredRows()
		}
		if rho.Len() > 0 {
			p.Faces = append(p.Faces, table.Face{Name: face.name, Emissivity: glazing.InfraredEmissivity(rho, tau)})
		}
	}
	if p.Refused == nil {
		p.Pane = &glazing.Pane{ID: p.Series[0].Pane, Plies: []glazing.Ply{{ThicknessMM: 6, ConductivityWMK: glazing.GlassWMK, DensityKGM3: glazing.GlassKGM3}},
			Tints: []glazing.Tint{{Spectrum: m, Front: emissivity(p.Faces, "front"), Back: emissivity(p.Faces, "back")}}}
	}
	return p
}

// emissivity returns that of a face, not known where it has no infrared rows.
func emissivity(faces []table.Face, name string) glazing.Emissivity {
	for _, f := range faces {
		if f.Name == name {
			return f.Emissivity
		}
	}
	return glazing.NoEmissivity()
}

// convert prints the spectrum as CSV, and what was done on the side.
func (in *spectrumInput) convert(s streams, output string) error {
	if in.looseness != nil {
		return in.looseness
	}
	if faults := in.impossible(); faults != nil {
		return eachLine(faults)
	}
	comments := []string{"written by panewright " + version + " from:"}
	var own []string // comments of the files
	for _, f := range in.files {
		comments = append(comments, fmt.Sprintf("%s, %s, sha256 %x", f.Name, f.Format, f.digest))
		for _, x := range f.Understood {
			comments = append(comments, "- "+x)
		}
		if f.comments != nil {
			own = append(append(own, "comments of "+f.Name+":"), f.comments...)
		}
	}
	c, notes := in.columns.WithInfrared(in.front, in.back).OnOneGrid()
	comments = append(comments, notes...)
	var b bytes.Buffer
	if err := spectra.WriteCSV(&b, c, slices.Concat(comments, own)); err != nil {
		return fmt.Errorf("this cannot be CSV: %w", err)
	}
	if err := s.write(output, b.Bytes()); err != nil {
		return err
	}
	for _, x := range comments[1:] {
		fmt.Fprintln(s.err, clip(x))
	}
	_, refused := in.joined()
	for _, x := range refused {
		fmt.Fprintln(s.err, clip("a rating refuses this spectrum as it stands: "+x))
	}
	if output != "" {
		fmt.Fprintf(s.err, "wrote %s\n", short(output))
	}
	return nil
}
