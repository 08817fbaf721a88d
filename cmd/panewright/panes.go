package main

// panewright panes: the built-in panes, and those of a project: figures, angles, a plot, CSV.

import (
	"bytes"
	"fmt"
	"path/filepath"
	"slices"
	"strings"

	"github.com/spf13/cobra"

	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/glazing/library"
	"panewright/glazing/project"
	"panewright/spectra"
)

func newPanes(s streams) *cobra.Command {
	var o panesOptions
	c := &cobra.Command{
		Use:                   "panes [ID] [options]",
		DisableFlagsInUseLine: true,
		Short:                 "List the built-in panes, or show one",
		Long: `Lists the built-in panes with the figures of each alone, as a single glazing.
A project uses them by their ids. With an ID, shows one pane: where its spectrum
comes from, its figures, the angles of incidence of uncoated glass, a plot.

With --project, the panes of that project as well. With --as csv, the spectrum
of the pane named, for a project's spectrum: key.`,
		Example: `  panewright panes
  panewright panes soda-grey-6
  panewright panes soda-lime-6 --as csv -o soda-lime-6.csv
  panewright panes mill-lam-8 --project panewright-demo/project.yaml`,
		Args: func(_ *cobra.Command, args []string) error {
			if len(args) > 1 {
				return fmt.Errorf("panes shows one pane; %d were named", len(args))
			}
			return nil
		},
		RunE: func(_ *cobra.Command, args []string) error {
			if len(args) == 0 {
				return runPanes(s, o)
			}
			return runPane(s, args[0], o)
		},
	}
	c.Flags().StringVar(&o.basis, "basis", glazing.EN.Name, "figures under basis `NAME`: "+strings.Join(glazing.BasisNames(), ", "))
	c.Flags().StringVar(&o.tint, "tint", "", "show only tint `NAME`")
	c.Flags().StringVar(&o.project, "project", "", "the panes of project `FILE` as well")
	c.Flags().StringVar(&o.as, "as", "", "print as `FORMAT`: table, csv with an ID; table when absent, or what the end of -o says")
	c.Flags().BoolVar(&o.filesAnywhere, "files-anywhere", false, "let the project name files outside its folder")
	outputFlag(c, &o.output)
	return c
}

type panesOptions struct {
	basis, tint, project, as, output string
	filesAnywhere                    bool
}

// shelf is where panes are looked for: a project's, then the built-in ones.
type shelf struct {
	project *project.Project // or nil
	method  *glazing.Method
}

func (o panesOptions) shelf() (shelf, error) {
	var s shelf
	b, err := glazing.BasisNamed(o.basis)
	if err != nil {
		return s, fmt.Errorf("--basis: unknown basis %q; %s", short(o.basis), project.OfferAll(o.basis, glazing.BasisNames()))
	}
	s.method = glazing.NewMethod(b, glazing.Options{})
	if o.project != "" {
		if s.project, err = project.Load(o.project, project.Access{Anywhere: o.filesAnywhere}); err != nil {
			return s, err
		}
		s.method = s.project.Method(b)
	}
	return s, nil
}

// alone rates a pane as a single glazing.
func (s shelf) alone(p *glazing.Pane) ([]glazing.Rating, error) {
	ready, err := s.method.Ready(&glazing.Makeup{ID: p.ID, Panes: []glazing.Placed{{Pane: p}}})
	if err != nil {
		return nil, err
	}
	return ready.RateAll()
}

// report rates panes alone.
func (s shelf) report(panes ...*glazing.Pane) (table.Report, error) {
	r := table.Report{Version: version, Figures: glazing.Figures(), Project: s.project}
	for _, p := range panes {
		ratings, err := s.alone(p)
		if err != nil {
			return r, err
		}
		r.Ratings = append(r.Ratings, ratings...)
	}
	return r, nil
}

// form settles the format.
func (o *panesOptions) form() error {
	formats := []string{"table", "csv"}
	if o.as != "" && !slices.Contains(formats, o.as) {
		return fmt.Errorf("--as %s is not known; %s", short(o.as), project.Offer(o.as, formats))
	}
	if err := checkEnding("panes", o.output, o.as, formats); err != nil {
		return err
	}
	if o.as == "" {
		o.as = "table"
		if strings.EqualFold(filepath.Ext(o.output), ".csv") {
			o.as = "csv"
		}
	}
	return nil
}

func runPanes(s streams, o panesOptions) error {
	if err := o.form(); err != nil {
		return err
	}
	if o.as == "csv" {
		return fmt.Errorf("--as csv writes the spectrum of one pane; name it, such as: panewright panes soda-lime-6 --as csv")
	}
	if o.tint != "" {
		return fmt.Errorf("--tint needs the pane to show")
	}
	from, err := o.shelf()
	if err != nil {
		return err
	}
	var panes []*glazing.Pane
	if from.project != nil {
		panes = from.project.Panes
	}
	for _, e := range library.Entries() {
		panes = append(panes, e.Pane())
	}
	r, err := from.report(panes...)
	if err != nil {
		return err
	}
	text, err := table.PaneList(r)
	if err != nil {
		return err
	}
	return s.write(o.output, text)
}

func runPane(s streams, id string, o panesOptions) error {
	if err := o.form(); err != nil {
		return err
	}
	from, err := o.shelf()
	if err != nil {
		return err
	}
	entry, pane, err := from.find(id, o.project) // entry is nil of a project's pane
	if err != nil {
		return err
	}
	tint := -1
	if o.tint != "" {
		if tint = pane.TintNamed(o.tint); tint < 0 {
			if !pane.Tintable() {
				return fmt.Errorf("--tint %s: pane %s does not switch", short(o.tint), id)
			}
			return fmt.Errorf("--tint: pane %s has no tint %q; %s", id, short(o.tint), project.Offer(o.tint, pane.TintNames()))
		}
	}
	if from.project != nil {
		if err := keepInputs(o.output, from.project); err != nil {
			return err
		}
	}
	if o.as == "csv" {
		if tint < 0 && len(pane.Tints) > 1 {
			return fmt.Errorf("pane %s has tints; name one: --tint %s", id, strings.Join(pane.TintNames(), ", --tint "))
		}
		text, err := paneCSV(pane, max(tint, 0), entry)
		if err != nil {
			return err
		}
		return s.write(o.output, text)
	}
	r, err := from.report(pane)
	if err != nil {
		return err
	}
	if tint >= 0 {
		r.Ratings = r.Ratings[tint : tint+1]
	}
	view := table.PaneView{About: "a pane of " + o.project}
	if entry != nil {
		view.About = entry.About
	}
	if pane.Sheet != nil {
		if view.Angles, err = from.angles(pane); err != nil {
			return err
		}
	}
	return s.write(o.output, table.Pane(r, view))
}

// find returns the pane of an id, and what the library says of it if it is built in.
func (s shelf) find(id, file string) (*library.Entry, *glazing.Pane, error) {
	var own []*glazing.Pane
	if s.project != nil {
		own = s.project.Panes
	}
	var known []string
	for _, p := range own {
		if p.ID == id {
			return nil, p, nil
		}
		known = append(known, p.ID)
	}
	list := library.Entries()
	if i := slices.IndexFunc(list, func(e library.Entry) bool { return e.ID == id }); i >= 0 {
		return &list[i], list[i].Pane(), nil
	}
	known = append(known, library.IDs()...)
	offer := "panewright panes lists them"
	if len(project.Nearest(id, known)) > 0 {
		offer = project.Offer(id, known)
	}
	where := "there is no built-in pane"
	if s.project != nil {
		where = "neither " + file + " nor the library has a pane"
	}
	return nil, nil, fmt.Errorf("%s %q; %s", where, short(id), offer)
}

// angles rates an uncoated pane at angles of incidence, and for radiation from the half space.
func (s shelf) angles(p *glazing.Pane) ([]table.Angle, error) {
	var out []table.Angle
	rate := func(name string, m spectra.Measured) error {
		turned := *p
		turned.Tints = slices.Clone(p.Tints)
		turned.Tints[0].Spectrum = m
		ratings, err := s.alone(&turned)
		if err == nil {
			out = append(out, table.Angle{Name: name, Rating: &ratings[0]})
		}
		return err
	}
	for _, deg := range []float64{0, 30, 45, 60, 75, 85} {
		if err := rate(fmt.Sprintf("%g°", deg), p.Sheet.Spectrum(deg)); err != nil {
			return nil, err
		}
	}
	return out, rate("half space", p.Sheet.HemisphericalSpectrum())
}

// paneCSV writes the spectrum of a tint as a spectrum file; what of the pane it cannot hold stands
// in comments.
func paneCSV(p *glazing.Pane, tint int, e *library.Entry) ([]byte, error) {
	t := &p.Tints[tint]
	m := t.Spectrum
	title := "pane " + p.ID
	if t.Name != "" {
		title += ", tint " + t.Name
	}
	comments := []string{title + ", " + string(p.Origin) + "; Panewright " + version}
	if e != nil {
		comments = append(comments, e.About)
	}
	comments = append(comments, "from "+t.Source)
	if p.Origin != glazing.MeasuredOrigin {
		comments = append(comments, "add to the pane: origin: "+string(p.Origin))
	}
	if p.HeatTreatment != "" && p.HeatTreatment != glazing.UnknownTreatment {
		comments = append(comments, "add to the pane: heat_treatment: "+string(p.HeatTreatment))
	}
	if p.HeatSoaked {
		comments = append(comments, "add to the pane: heat_soaked: true")
	}
	if p.TauInfrared > 0 {
		comments = append(comments, fmt.Sprintf("add to the pane: tau_ir: %v", p.TauInfrared))
	}
	if len(p.Plies) == 1 {
		comments = append(comments, fmt.Sprintf("add to the pane: thickness_mm: %v", p.ThicknessMM()))
	}
	front, back := m.InfraredFront, m.InfraredBack
	for _, f := range []struct {
		key      string
		of       glazing.Emissivity
		infrared *spectra.Curve
	}{{"front", t.Front, &front}, {"back", t.Back, &back}} {
		switch f.of.Source {
		case glazing.EmissivityInfrared, glazing.EmissivityComputed:
			continue // the infrared rows give it
		case glazing.EmissivityGivenNormal:
			comments = append(comments, fmt.Sprintf("add to the pane: emissivity_normal_%s: %v", f.key, f.of.Normal.Number))
		case glazing.EmissivityGiven:
			comments = append(comments, fmt.Sprintf("add to the pane: emissivity_%s: %v", f.key, f.of.Corrected.Number))
		case glazing.EmissivityConvention:
			comments = append(comments, fmt.Sprintf("add to the pane: emissivity_%s: %v (uncoated soda-lime glass, EN 673; its optical constants give %.3f normal)",
				f.key, f.of.Corrected.Number, f.of.ComputedNormal.Number))
		}
		*f.infrared = spectra.Curve{}
	}
	tau := m.Tau
	if far := m.InfraredTau; front.Len()+back.Len() > 0 {
		tau = spectra.Curve{NM: slices.Concat(tau.NM, far.NM), Value: slices.Concat(tau.Value, far.Value), Gaps: tau.Gaps}
	}
	for _, c := range m.Cautions {
		comments = append(comments, c.Text)
	}
	column := func(c spectra.Curve) spectra.Column { return spectra.Column{Curve: c} }
	columns := spectra.Columns{Tau: column(tau), RhoFront: column(m.RhoFront), RhoBack: column(m.RhoBack)}
	var b bytes.Buffer
	err := spectra.WriteCSV(&b, columns.WithInfrared(column(front), column(back)), comments)
	if err != nil {
		return nil, fmt.Errorf("pane %s: %w", p.ID, err)
	}
	return b.Bytes(), nil
}
