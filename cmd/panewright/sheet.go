package main

// panewright sheet: the data sheets of a project as PDF.

import (
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"regexp"
	"slices"
	"strconv"
	"strings"

	"github.com/spf13/cobra"

	"panewright/cmd/panewright/internal/sheet"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/glazing/project"
)

func newSheet(s streams) *cobra.Command {
	var o selection
	var output, each string
	c := &cobra.Command{
		Use:                   "sheet PROJECT [options]",
		DisableFlagsInUseLine: true,
		Short:                 "Make the data sheets of a project as PDF",
		Long: `Makes a PDF with the schedule of the project, how its figures stand to the
limits that it enters, and a data sheet for each make-up: the section to scale,
figures, spectra, colours, cautions, and the figures in JSON attached. Under the
conditions of the project or the basis a sheet has heat balances, temperatures,
moisture and comfort; for each pane it has the screening for thermal stress. The
same project gives the same file; a date is printed if the project has one.

With --each, a file for each make-up, named by its id, or nearly so where some
system could not store that, without the schedule and the limits; the names of
the files are printed.`,
		Example: `  panewright sheet panewright-demo/project.yaml -o sheets.pdf
  panewright sheet panewright-demo/project.yaml --makeup E1 -o e1.pdf
  panewright sheet panewright-demo/project.yaml --each sheets`,
		Args: oneProject,
		RunE: func(c *cobra.Command, args []string) error {
			if err := checkEnding(c.Name(), output, "", []string{"pdf"}); err != nil {
				return err
			}
			if each != "" && output != "" {
				return errors.New("--each names a folder for many files, -o one file; give one of them")
			}
			r, err := rate(args[0], o)
			if err != nil {
				return err
			}
			if each != "" {
				return s.writeEach(each, r)
			}
			if err := keepInputs(output, r.Project); err != nil {
				return err
			}
			if output == "" && s.terminal() {
				return errors.New("a PDF is not for a terminal; add -o FILE")
			}
			return s.sheets(output, r, args[0], o)
		},
	}
	o.flags(c)
	outputFlag(c, &output)
	c.Flags().StringVar(&each, "each", "", "write a file for each make-up into folder `DIR`, which is made if need be")
	return c
}

// sheets writes the sheets of what is rated of a project.
func (s streams) sheets(output string, r table.Report, path string, o selection) error {
	limits, err := entered(&r, path, o)
	if err != nil {
		return err
	}
	f, err := sheet.Project(r, limits)
	if err != nil {
		return err
	}
	s.replaced(f)
	return s.write(output, f.PDF)
}

// entered holds the project's figures against its limits, where it has any; then no caution says
// that this was not done.
func entered(r *table.Report, path string, o selection) (*table.Check, error) {
	if all, _ := r.Project.AllLimits(); len(all) == 0 {
		return nil, nil
	}
	c, err := held(r.Project, path, o, nil)
	if err != nil {
		return nil, err
	}
	for i := range r.Ratings {
		r.Ratings[i].Cautions = slices.DeleteFunc(slices.Clone(r.Ratings[i].Cautions), func(x glazing.Caution) bool { return x.Code == project.LimitsNotChecked })
	}
	return &c, nil
}

// writeEach writes the sheets of make-ups into a folder.
func (s streams) writeEach(dir string, r table.Report) error {
	files, err := sheet.Makeups(r)
	if err != nil {
		return err
	}
	var names []string
	for _, f := range files {
		names = append(names, filepath.Join(dir, fileName(f.Makeup, names, dir)))
		if err := keepInputs(names[len(names)-1], r.Project); err != nil {
			return err
		}
	}
	if err := os.MkdirAll(dir, 0o755); err != nil {
		return &outputError{dir, cause(err)}
	}
	for i, f := range files {
		s.replaced(f)
		if err := s.write(names[i], f.PDF); err != nil {
			return err
		}
		fmt.Fprintln(s.out, names[i])
	}
	return nil
}

// devices are names that some systems keep for devices, whatever follows a point in them.
var devices = regexp.MustCompile(`(?i)^(con|prn|aux|nul|com[0-9]|lpt[0-9])(\.|$)`)

// fileName returns the name of the file of a make-up that any system can store beside those that are
// taken, also one that does not tell capitals from small letters.
func fileName(id string, taken []string, dir string) string {
	const most = 200 // bytes; systems store 255
	if devices.MatchString(id) {
		id = "_" + id
	}
	if len(id) > most {
		id = strings.ToValidUTF8(id[:most], "")
	}
	name := id + ".pdf"
	for n := 2; slices.ContainsFunc(taken, func(x string) bool { return strings.EqualFold(x, filepath.Join(dir, name)) }); n++ {
		name = fmt.Sprintf("%s-%d.pdf", id, n)
	}
	return name
}

// replaced says which letters of the user's no font has.
func (s streams) replaced(f sheet.File) {
	if len(f.Replaced) == 0 {
		return
	}
	const listed = 12
	var parts []string
	for _, r := range f.Replaced[:min(len(f.Replaced), listed)] {
		parts = append(parts, strconv.QuoteRuneToASCII(r))
	}
	if n := len(f.Replaced) - listed; n > 0 {
		parts = append(parts, fmt.Sprintf("and %d more", n))
	}
	fmt.Fprintln(s.err, "panewright: the sheet's font lacks "+strings.Join(parts, ", ")+"; a mark stands in their place")
}
