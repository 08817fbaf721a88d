package main

// panewright rate: which make-ups, tints and bases of a project to rate, and in which form to print.

import (
	"cmp"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"

	"github.com/spf13/cobra"
	"golang.org/x/term"

	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/glazing/project"
)

// selection is what part of a project to rate, and how to read it.
type selection struct {
	makeups, tints, bases []string
	filesAnywhere         bool
	angleDeg              float64 // of incidence
}

func (o *selection) flags(c *cobra.Command) {
	verb := "rate"
	if c.Name() == "explain" {
		verb = c.Name()
	}
	c.Flags().StringSliceVar(&o.makeups, "makeup", nil, verb+" only make-up `ID` (may be repeated)")
	c.Flags().StringSliceVar(&o.tints, "tint", nil, verb+" only tint `NAME` (may be repeated)")
	c.Flags().StringSliceVar(&o.bases, "basis", nil, verb+" under bases `NAME,NAME` instead of the project's: "+strings.Join(glazing.BasisNames(), ", "))
	c.Flags().BoolVar(&o.filesAnywhere, "files-anywhere", false, "let the project name files outside its folder")
}

func outputFlag(c *cobra.Command, output *string) {
	c.Flags().StringVarP(output, "output", "o", "", "write to `FILE`; to standard output when absent or -")
}

// page is how to print: the form, the file, the figures and their units.
type page struct {
	command    string // whose page it is
	as, output string
	formats    []string // offered
	figures    []string
	units      string
	csv        struct {
		separator               string
		decimalComma, rows, bom bool
	}
}

func (p *page) flags(c *cobra.Command, formats ...string) {
	p.formatFlags(c, formats...)
	c.Flags().StringSliceVar(&p.figures, "figures", nil, "show the figures `NAME,NAME`, in this order")
	c.Flags().StringVar(&p.units, "units", "si", "print figures in `UNITS`: si or ip (inch-pound)")
	c.Flags().BoolVar(&p.csv.rows, "units-row", false, "with --as csv: a second row with the units")
}

// formatFlags are those of a page whose figures and units are settled.
func (p *page) formatFlags(c *cobra.Command, formats ...string) {
	p.command, p.formats, p.units = c.Name(), formats, "si"
	c.Flags().StringVar(&p.as, "as", "", "print as `FORMAT`: "+strings.Join(formats, ", ")+"; table when absent, or what the end of -o says")
	c.Flags().StringVar(&p.csv.separator, "separator", "", "with --as csv: `SIGN` between cells: comma, semicolon or tab (default comma)")
	c.Flags().BoolVar(&p.csv.decimalComma, "decimal-comma", false, "with --as csv: write 0,25 for 0.25")
	c.Flags().BoolVar(&p.csv.bom, "bom", false, "with --as csv: begin with a byte-order mark, for spreadsheets that take UTF-8 for something else")
	outputFlag(c, &p.output)
}

// spreadsheetText is help that commands which print CSV or XLSX share.
const spreadsheetText = `CSV is UTF-8, without a byte-order mark unless --bom is given; lines end with a
line feed. A text that a spreadsheet would take for a formula (it begins with
= + - @, a tab or a carriage return, also after blanks) has an apostrophe put
before it.`

// figureNames lists the short names of figures, folded for a help text.
func figureNames() string {
	var b strings.Builder
	column := 0
	for i, name := range table.FigureNames(glazing.Figures()) {
		if i > 0 {
			b.WriteByte(',')
			column++
		}
		switch {
		case i == 0:
		case column+1+len(name) > table.Width-2: // room for a comma
			b.WriteByte('\n')
			column = 0
		default:
			b.WriteByte(' ')
			column++
		}
		b.WriteString(name)
		column += len(name)
	}
	return b.String()
}

func newRate(s streams) *cobra.Command {
	var o selection
	var p page
	var spectra string
	c := &cobra.Command{
		Use:                   "rate PROJECT [options]",
		DisableFlagsInUseLine: true,
		Short:                 "Print the schedule of a project",
		Long: `Rates every make-up of a project in every tint and prints the schedule, as text
of 80 columns or as Markdown.

Under conditions, those of the project and of the bases na and iso15099, a
second table says what each make-up absorbs and gives inwards, and how warm it
gets; see panewright help conditions.

JSON, CSV and XLSX have every figure with all its digits. What is not known is
null in JSON and an empty cell elsewhere; the cautions say why, and explain does
of figures under conditions.

CSV and XLSX have one row a rating. The first row has the keys of the figures,
which are their paths in JSON, with panes, gaps and surfaces counted from 1.
XLSX also has the units, editions, cautions, and a chart of the spectra.

--angle rates light, sun, colour and g off the normal; polarisations are kept
apart to the last pane. Computed panes are exact, measured uncoated glass is
inverted, and measured coated panes follow a published estimate, which the
cautions say. U does not depend on it.
` + spreadsheetText + `

--figures takes keys, such as solar.g or surfaces.3.emissivity, symbols as the
tables print them, such as τv or ε3, and the short names below. A figure of
panes, gaps or surfaces without a number stands for all of them; in JSON its
list is always whole. After @ stands a condition: u@winter, θ4@winter; for those
figures see panewright help figures, for conditions panewright help conditions.
The short names of figures of a rating:

` + figureNames(),
		Example: `  panewright rate panewright-demo/project.yaml
  panewright rate panewright-demo/project.yaml --makeup E1 --tint full
  panewright rate panewright-demo/project.yaml --basis en,iso --as json
  panewright rate panewright-demo/project.yaml --as json --spectra 400,550,700
  panewright rate panewright-demo/project.yaml --figures light,g,u,absorptance
  panewright rate panewright-demo/project.yaml --basis na \
    --figures u,u@summer,temperature@summer
  panewright rate panewright-demo/project.yaml --units ip
  panewright rate panewright-demo/project.yaml --makeup D1 --angle 60
  panewright rate panewright-demo/project.yaml -o mill.xlsx
  panewright rate panewright-demo/project.yaml -o mill.csv --separator ";" \
    --decimal-comma`,
		Args: oneProject,
		RunE: func(_ *cobra.Command, args []string) error {
			return runRate(s, args[0], o, p, spectra)
		},
	}
	o.flags(c)
	p.flags(c, "table", "json", "csv", "xlsx", "markdown")
	c.Flags().Float64Var(&o.angleDeg, "angle", 0, "light, sun and colour at `DEG` of incidence, 0 to 89")
	c.Flags().StringVar(&spectra, "spectra", "", "with --as json: spectra at the wavelengths `NM,NM`, or all")
	return c
}

// oneProject wants the project file as the one argument.
func oneProject(c *cobra.Command, args []string) error {
	if len(args) != 1 || args[0] == "" {
		return fmt.Errorf("%s needs one project file, such as: panewright %s panewright-demo/project.yaml", c.Name(), c.Name())
	}
	return nil
}

func runRate(s streams, path string, o selection, p page, spectra string) error {
	form, err := p.form()
	if err != nil {
		return err
	}
	if !(o.angleDeg >= 0 && o.angleDeg <= glazing.LargestAngleDeg) {
		return fmt.Errorf("--angle %g is no angle of incidence here; it lies in 0 to %d degrees", o.angleDeg, glazing.LargestAngleDeg)
	}
	if spectra != "" && p.as != "json" {
		return fmt.Errorf("--spectra prints spectra in JSON; add --as json")
	}
	if p.as == "xlsx" {
		if p.output == "" && s.terminal() {
			return fmt.Errorf("a spreadsheet is not for a terminal; add -o FILE.xlsx")
		}
		spectra = "all"
	}
	r, err := rate(path, o)
	if err != nil {
		return err
	}
	if err := p.choose(&r); err != nil {
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
	if err := keepInputs(p.output, r.Project); err != nil {
		return err
	}
	out, err := forms[table.Report]{table.Schedule, table.JSON, table.Markdown, table.CSV, table.XLSX}.print(p, form, r)
	if err != nil {
		return err
	}
	return s.write(p.output, out)
}

// choose makes a report show the figures and units that were asked for.
func (p *page) choose(r *table.Report) error {
	r.InchPound = p.units == "ip"
	if p.figures == nil {
		return nil
	}
	if err := r.Choose(p.figures); err != nil {
		return fmt.Errorf("--figures: %w", err)
	}
	return nil
}

// separators are what may stand between the cells of CSV, by name and as they are.
var separators = map[string]rune{"": 0, "comma": ',', ",": ',', "semicolon": ';', ";": ';', "tab": '\t', "\t": '\t', `\t`: '\t'}

// form settles the format and checks what goes with it.
func (p *page) form() (table.CSVForm, error) {
	var none table.CSVForm
	if p.as == "md" {
		p.as = "markdown"
	}
	if p.as != "" && !slices.Contains(p.formats, p.as) {
		return none, fmt.Errorf("--as %s is not known; %s", short(p.as), project.Offer(p.as, p.formats))
	}
	tabs := p.as == "csv" && separators[p.csv.separator] == '\t' && strings.EqualFold(filepath.Ext(p.output), ".tsv")
	if !tabs {
		if err := checkEnding(cmp.Or(p.command, "this command"), p.output, p.as, p.formats); err != nil {
			return none, err
		}
	}
	if p.as == "" {
		p.as = "table"
		if end := ends[strings.ToLower(filepath.Ext(p.output))]; end != "" {
			p.as = end
		}
	}
	switch units := []string{"si", "ip"}; {
	case !slices.Contains(units, p.units):
		return none, fmt.Errorf("--units %s is not known; %s", short(p.units), project.OfferAll(p.units, units))
	case p.units == "ip" && p.as == "json":
		others := slices.DeleteFunc(slices.Clone(p.formats), func(f string) bool { return f == "json" })
		return none, fmt.Errorf("--units ip is not for JSON, whose keys name SI units; it goes with --as %s", strings.Join(others, ", "))
	}
	if p.figures != nil && len(p.figures) == 0 {
		return none, fmt.Errorf("--figures names no figure; write light,g,u")
	}
	if p.as != "csv" {
		for _, x := range []struct {
			name string
			set  bool
		}{{"--separator", p.csv.separator != ""}, {"--decimal-comma", p.csv.decimalComma}, {"--units-row", p.csv.rows}, {"--bom", p.csv.bom}} {
			if x.set {
				return none, fmt.Errorf("%s is for CSV; add --as csv", x.name)
			}
		}
	}
	sign, ok := separators[p.csv.separator]
	if !ok {
		return none, fmt.Errorf("--separator %s is not known; write comma, semicolon or tab", short(p.csv.separator))
	}
	if p.csv.decimalComma && (sign == 0 || sign == ',') {
		return none, fmt.Errorf("--decimal-comma needs another sign between cells; add --separator semicolon")
	}
	return table.CSVForm{Separator: sign, DecimalComma: p.csv.decimalComma, UnitsRow: p.csv.rows, ByteOrderMark: p.csv.bom}, nil
}

// terminal reports whether standard output is a terminal.
func (s streams) terminal() bool {
	out := s.out
	if c, ok := out.(*checkedWriter); ok {
		out = c.w
	}
	f, ok := out.(*os.File)
	return ok && term.IsTerminal(int(f.Fd()))
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
			b, err := basisNamed(name)
			if err != nil {
				return r, err
			}
			bases = append(bases, b)
		}
	}
	makeups, err := o.makeupsOf(p)
	if err != nil {
		return r, err
	}
	var tints []string         // of all that was selected otherwise
	found := map[string]bool{} // the tints asked for that there are
	for _, b := range bases {
		method := p.Method(b).AtAngle(o.angleDeg)
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

// makeupsOf returns the make-ups that --makeup names, or all.
func (o *selection) makeupsOf(p *project.Project) ([]*glazing.Makeup, error) {
	if len(o.makeups) == 0 {
		return p.Makeups, nil
	}
	var list []*glazing.Makeup
	for _, id := range unique(o.makeups) {
		m, err := makeupNamed(p, id)
		if err != nil {
			return nil, fmt.Errorf("--makeup: %w", err)
		}
		list = append(list, m)
	}
	return list, nil
}

// basisNamed returns the basis that --basis names.
func basisNamed(name string) (glazing.Basis, error) {
	b, err := glazing.BasisNamed(name)
	if err != nil {
		return b, fmt.Errorf("--basis: unknown basis %q; %s", short(name), project.OfferAll(name, glazing.BasisNames()))
	}
	return b, nil
}

// makeupNamed returns the make-up of an id.
func makeupNamed(p *project.Project, id string) (*glazing.Makeup, error) {
	if m := p.Makeup(id); m != nil {
		return m, nil
	}
	var known []string
	for _, m := range p.Makeups {
		known = append(known, m.ID)
	}
	return nil, fmt.Errorf("%s has no make-up %q; %s", p.File, short(id), project.Offer(id, known))
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

// forms are what a command prints of something, by format; nil what it does not print.
type forms[T any] struct {
	text, json, markdown func(T) []byte
	csv                  func(T, table.CSVForm) ([]byte, error)
	file                 func(T) ([]byte, error) // a spreadsheet or a PDF
}

// print returns the form that the page names.
func (f forms[T]) print(p page, form table.CSVForm, x T) ([]byte, error) {
	switch p.as {
	case "table":
		return f.text(x), nil
	case "json":
		return f.json(x), nil
	case "markdown":
		return f.markdown(x), nil
	case "csv":
		return f.csv(x, form)
	}
	return f.file(x)
}
