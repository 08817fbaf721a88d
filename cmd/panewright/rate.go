package main

// panewright rate: which make-ups, tints and bases of a project to rate, and in which form to print.

import (
	"fmt"
	"math"
	"os"
	"slices"
	"strconv"
	"strings"

	"github.com/spf13/cobra"

	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/glazing/project"
)

// selection is what part of a project to rate, and how to read it.
type selection struct {
	makeups, tints, bases []string
	filesAnywhere         bool
}

func (o *selection) flags(c *cobra.Command) {
	c.Flags().StringSliceVar(&o.makeups, "makeup", nil, "rate only make-up `ID` (may be repeated)")
	c.Flags().StringSliceVar(&o.tints, "tint", nil, "rate only tint `NAME` (may be repeated)")
	c.Flags().StringSliceVar(&o.bases, "basis", nil, "rate under bases `NAME,NAME` instead of the project's: "+strings.Join(glazing.BasisNames(), ", "))
	c.Flags().BoolVar(&o.filesAnywhere, "files-anywhere", false, "let the project name files outside its folder")
}

func outputFlag(c *cobra.Command, output *string) {
	c.Flags().StringVarP(output, "output", "o", "", "write to `FILE` instead of standard output")
}

func newRate(s streams) *cobra.Command {
	var o selection
	var as, spectra, output string
	c := &cobra.Command{
		Use:                   "rate PROJECT [options]",
		DisableFlagsInUseLine: true,
		Short:                 "Print the schedule of a project",
		Long: `Rates every make-up of a project in every tint and prints the schedule.

JSON has every figure with all its digits; null marks a figure that is not
known, with the reason among the cautions.`,
		Example: `  panewright rate panewright-demo/project.yaml
  panewright rate panewright-demo/project.yaml --makeup E1 --tint full
  panewright rate panewright-demo/project.yaml --basis en,iso --as json
  panewright rate panewright-demo/project.yaml --as json --spectra 400,550,700`,
		Args: oneProject,
		RunE: func(_ *cobra.Command, args []string) error {
			return runRate(s, args[0], o, as, spectra, output)
		},
	}
	o.flags(c)
	c.Flags().StringVar(&as, "as", "table", "print as `FORMAT`: table or json")
	c.Flags().StringVar(&spectra, "spectra", "", "with --as json: spectra at the wavelengths `NM,NM`, or all")
	outputFlag(c, &output)
	return c
}

// oneProject wants the project file as the one argument.
func oneProject(c *cobra.Command, args []string) error {
	if len(args) != 1 || args[0] == "" {
		return fmt.Errorf("%s needs one project file, such as: panewright %s panewright-demo/project.yaml", c.Name(), c.Name())
	}
	return nil
}

func runRate(s streams, path string, o selection, as, spectra, output string) error {
	formats := []string{"table", "json"}
	if !slices.Contains(formats, as) {
		return fmt.Errorf("--as %s is not known; %s", short(as), project.Offer(as, formats))
	}
	if spectra != "" && as != "json" {
		return fmt.Errorf("--spectra prints spectra in JSON; add --as json")
	}
	r, err := rate(path, o)
	if err != nil {
		return err
	}
	if spectra != "" {
		for i := range r.Ratings {
			rating := &r.Ratings[i]
			nm := rating.Method.WavelengthsNM()
			if spectra != "all" {
				if nm, err = wavelengths(spectra); err != nil {
					return err
				}
			}
			r.Spectra = append(r.Spectra, rating.Ready.Spectra(rating.State, nm))
		}
	}
	if err := keepInputs(output, r.Project); err != nil {
		return err
	}
	if as == "json" {
		return s.write(output, table.JSON(r))
	}
	return s.write(output, table.Schedule(r))
}

// keepInputs refuses to write over the project or a file that it names.
func keepInputs(output string, p *project.Project) error {
	if output == "" {
		return nil
	}
	out, err := os.Stat(output)
	if err != nil {
		return nil // nothing is there
	}
	for _, name := range p.Files {
		if in, err := os.Stat(name); err == nil && os.SameFile(in, out) {
			return fmt.Errorf("-o %s is a file that the project is read from; name another", short(output))
		}
	}
	return nil
}

// rate reads a project and rates what is selected of it.
func rate(path string, o selection) (table.Report, error) {
	r := table.Report{Version: version, Figures: glazing.Figures()}
	p, err := project.Load(path, project.Access{Anywhere: o.filesAnywhere})
	if err != nil {
		return r, err
	}
	r.Project = p
	bases := p.Bases
	if len(o.bases) > 0 {
		bases = nil
		for _, name := range unique(o.bases) {
			b, err := glazing.BasisNamed(name)
			if err != nil {
				return r, fmt.Errorf("--basis: unknown basis %q; %s", short(name), project.OfferAll(name, glazing.BasisNames()))
			}
			bases = append(bases, b)
		}
	}
	makeups := p.Makeups
	if len(o.makeups) > 0 {
		makeups = nil
		for _, id := range unique(o.makeups) {
			m := p.Makeup(id)
			if m == nil {
				var known []string
				for _, m := range p.Makeups {
					known = append(known, m.ID)
				}
				return r, fmt.Errorf("--makeup: %s has no make-up %q; %s", path, short(id), project.Offer(id, known))
			}
			makeups = append(makeups, m)
		}
	}
	var tints []string         // of all that was selected otherwise
	found := map[string]bool{} // the tints asked for that there are
	for _, b := range bases {
		method := p.Method(b)
		for _, m := range makeups {
			ratings, err := p.RateBy(method, m)
			if err != nil {
				return r, err
			}
			for i := range ratings {
				tints = append(tints, ratings[i].Tint)
				keep := len(o.tints) == 0
				for _, t := range o.tints {
					if ratings[i].InTint(t) {
						keep, found[t] = true, true
					}
				}
				if keep {
					r.Ratings = append(r.Ratings, ratings[i])
				}
			}
		}
	}
	for _, t := range o.tints {
		if !found[t] {
			known := slices.DeleteFunc(tints, func(x string) bool { return x == "" })
			if len(known) == 0 {
				return r, fmt.Errorf("--tint %s: no make-up that was selected has a pane that switches", short(t))
			}
			return r, fmt.Errorf("--tint: no tint %q; %s", short(t), project.Offer(t, known))
		}
	}
	return r, nil
}

// unique returns a list without what stands in it before.
func unique(list []string) (out []string) {
	for _, x := range list {
		if !slices.Contains(out, x) {
			out = append(out, x)
		}
	}
	return out
}

// wavelengths reads a list of wavelengths in nm, ascending.
func wavelengths(list string) ([]float64, error) {
	var out []float64
	for word := range strings.SplitSeq(list, ",") {
		v, err := strconv.ParseFloat(strings.TrimSpace(word), 64)
		if err != nil || !(v > 0) || math.IsInf(v, 0) {
			return nil, fmt.Errorf("--spectra: %q is no wavelength in nm; write 400,550 or all", short(word))
		}
		if len(out) > 0 && v <= out[len(out)-1] {
			return nil, fmt.Errorf("--spectra: wavelengths ascend, and %s does not", short(word))
		}
		out = append(out, v)
	}
	return out, nil
}
