package table

// The page of a spectrum: what its files were taken for, what the columns are like, its figures, and
// what each basis would say of it.

import (
	"bytes"
	"fmt"
	"slices"
	"strconv"
	"strings"

	"github.com/jedib0t/go-pretty/v6/text"

	"panewright/glazing"
	"panewright/spectra"
)

// A SpectrumPage is what there is to say of the spectrum of one pane, which may come from several
// files.
type SpectrumPage struct {
	Version string
	Files   []SpectrumFile
	Series  []Series
	// Refused is why a rating would take no such spectrum; Cautions are what it would say of it.
	Refused  []string
	Cautions []glazing.Caution
	Faces    []Face
	Pane     *glazing.Pane // of the spectrum; nil where a rating refuses it
}

// A SpectrumFile is a file, what it was taken for, and all that was understood.
type SpectrumFile struct {
	Name, Format string
	Understood   []string
}

// A Series is one column of the spectrum.
type Series struct {
	Name   string
	Mark   rune   // draws it
	Pane   string // as remarks name it
	Role   string
	Column spectra.Column
}

// The roles of a series.
const (
	RoleTau         = "tau"
	RoleRhoFront    = "rho_front"
	RoleRhoBack     = "rho_back"
	RoleReflectance = "reflectance" // of a face that is not known
	RoleInfrared    = "infrared"    // a reflectance of which rows from 5 µm on alone are used
)

// meanOf has the figures that are a weighted mean of one column of a pane alone: the role of the
// column, the band, the alias of the figure.
var meanOf = [...]struct{ role, band, alias string }{
	{RoleTau, "light", "light"}, {RoleRhoFront, "light", "light_outside"}, {RoleRhoBack, "light", "light_inside"},
	{RoleTau, "solar", "solar"}, {RoleRhoFront, "solar", "solar_outside"}, {RoleRhoBack, "solar", "solar_inside"},
	{RoleReflectance, "light", "light_outside"}, {RoleReflectance, "solar", "solar_outside"},
	{RoleTau, "uv", "uv"}, {RoleTau, "damage", "damage"}, {RoleTau, "damage to 700 nm", "damage_700"}, {RoleTau, "skin", "skin"},
}

// covers returns what is said of each series, by basis and then band; nothing of a series without a
// solar part, or of which that is not used.
func (p SpectrumPage) covers() [][][]glazing.Coverage {
	var methods []*glazing.Method
	for _, basis := range glazing.Bases() {
		methods = append(methods, glazing.NewMethod(basis, glazing.Options{}))
	}
	list := make([][][]glazing.Coverage, len(p.Series))
	for k, s := range p.Series {
		part := s.Column.SolarPart()
		for _, m := range methods {
			if part.Len() > 0 && s.Role != RoleInfrared {
				list[k] = append(list[k], m.Covers(s.Pane, part))
			}
		}
	}
	return list
}

// A Face is one whose infrared reflectance was measured; Why says why that gives no emissivity.
type Face struct {
	Name       string
	Emissivity glazing.Emissivity
	Why        string
}

// Bytes returns the page.
func (p SpectrumPage) Bytes() []byte {
	var b bytes.Buffer
	for _, f := range p.Files {
		writeWrapped(&b, f.Name+": "+f.Format, "  ")
		for _, x := range f.Understood {
			writeWrapped(&b, "- "+x, "  ")
		}
	}
	p.facts(&b)
	p.energy(&b)
	b.WriteByte('\n')
	var curves []PlotCurve
	for _, s := range p.Series {
		curves = append(curves, PlotCurve{s.Name, s.Mark, s.Column.Curve})
	}
	Plot(&b, curves)
	covers := p.covers()
	p.figures(&b, covers)
	p.faces(&b)
	p.coverage(&b, covers)
	if len(p.Refused) > 0 {
		b.WriteString("\nA rating refuses this spectrum\n")
		for _, x := range p.Refused {
			writeWrapped(&b, "- "+x, "  ")
		}
	}
	if len(p.Cautions) > 0 {
		b.WriteString("\nCautions that a rating would carry\n")
		for _, c := range p.Cautions {
			writeWrapped(&b, "- "+c.Text, "  ")
		}
	}
	fmt.Fprintf(&b, "\nPanewright %s\n", p.Version)
	return b.Bytes()
}

// between prints a range of wavelengths.
func between(a, b float64) string { return spectra.Brief(a) + " to " + spectra.Brief(b) }

// facts prints what the columns are like, beside each other.
func (p SpectrumPage) facts(b *bytes.Buffer) {
	var all []spectra.Facts
	for _, s := range p.Series {
		all = append(all, spectra.Survey(s.Column))
	}
	steps := func(from float64) func(spectra.Facts) string {
		return func(f spectra.Facts) string {
			for _, s := range f.Steps {
				if s.Part.FromNM != from {
					continue
				}
				if spectra.Brief(s.Least) == spectra.Brief(s.GreatestNM) {
					return spectra.Brief(s.Least)
				}
				return fmt.Sprintf("%s (%s to %s)", spectra.Brief(s.Usual), spectra.Brief(s.Least), spectra.Brief(s.GreatestNM))
			}
			return ""
		}
	}
	where := func(from float64) func(spectra.Facts) string {
		return func(f spectra.Facts) string {
			for _, s := range f.Steps {
				if s.Part.FromNM == from && spectra.Brief(s.Least) != spectra.Brief(s.GreatestNM) {
					return between(s.Greatest.FromNM, s.Greatest.ToNM)
				}
			}
			return ""
		}
	}
	extreme := func(pick func(spectra.Facts) spectra.Extreme) func(spectra.Facts) string {
		return func(f spectra.Facts) string {
			if e := pick(f); e.NM > 0 {
				return fmt.Sprintf("%.4f at %s", e.Value, spectra.Brief(e.NM))
			}
			return ""
		}
	}
	noise := func(k int) func(spectra.Facts) string {
		return func(f spectra.Facts) string {
			switch n := f.Noise[k]; {
			case n.Why != "":
				return "–"
			case n.Sigma < 1e-12: // of binary numbers alone
				return "0"
			default:
				return strconv.FormatFloat(n.Sigma, 'g', 2, 64)
			}
		}
	}
	count := func(n int) string {
		if n == 0 {
			return "" // is not worth a row
		}
		return strconv.Itoa(n)
	}
	var names []string
	cells := make([][]string, len(all))
	for _, row := range []struct {
		name string
		cell func(spectra.Facts) string
	}{
		{"points", func(f spectra.Facts) string { return strconv.Itoa(f.Count) }},
		{"range, nm", func(f spectra.Facts) string { return between(f.FirstNM, f.LastNM) }},
		{"steps below 780 nm", steps(0)},
		{"  widest", where(0)},
		{"steps 780-2500 nm", steps(780)},
		{"  widest", where(780)},
		{"steps from 5 µm, nm", steps(spectra.InfraredFirstNM)},
		{"  widest", where(spectra.InfraredFirstNM)},
		{"gaps", func(f spectra.Facts) string { return count(len(f.Gaps)) }},
		{"least", extreme(func(f spectra.Facts) spectra.Extreme { return f.Least })},
		{"greatest", extreme(func(f spectra.Facts) spectra.Extreme { return f.Greatest })},
		{"least from 5 µm", extreme(func(f spectra.Facts) spectra.Extreme { return f.InfraredLeast })},
		{"greatest from 5 µm", extreme(func(f spectra.Facts) spectra.Extreme { return f.InfraredGreatest })},
		{"values below 0", func(f spectra.Facts) string { return count(f.Below) }},
		{"values above 1", func(f spectra.Facts) string { return count(f.Above) }},
		{"noise 300-380 nm", noise(0)},
		{"noise 380-780 nm", noise(1)},
		{"noise 780-2500 nm", noise(2)},
	} {
		var line []string
		for _, f := range all {
			line = append(line, row.cell(f))
		}
		if !slices.ContainsFunc(line, func(s string) bool { return s != "" }) {
			continue
		}
		names = append(names, row.name)
		for i := range line {
			cells[i] = append(cells[i], line[i])
		}
	}
	var columns []column
	for i, s := range p.Series {
		columns = append(columns, newColumn(text.WrapHard(s.Name, nameWidth), cells[i]))
	}
	b.WriteString("\nColumns\n")
	fold(b, []column{newColumn("", names)}, columns)
	b.WriteByte('\n')
	writeWrapped(b, "Steps are the median (least to greatest), in nm. Noise is a standard deviation, estimated from how far points lie off the line between their neighbours; where steps are wide, the curve's own bends are counted in. – fewer than "+strconv.Itoa(spectra.NoisePoints)+" points that have neighbours on both sides.", "")
	p.gaps(b, all)
}

// gapsListed is how many gaps of a column are named.
const gapsListed = 8

func (p SpectrumPage) gaps(b *bytes.Buffer, all []spectra.Facts) {
	for i, f := range all {
		for k, g := range f.Gaps {
			if k == gapsListed {
				writeWrapped(b, fmt.Sprintf("%s: and %d gaps more", p.Series[i].Name, len(f.Gaps)-k), "  ")
				break
			}
			if g.Marked {
				writeWrapped(b, fmt.Sprintf("%s: values are marked as missing between %s and %s nm", p.Series[i].Name, spectra.Brief(g.FromNM), spectra.Brief(g.ToNM)), "  ")
			} else {
				writeWrapped(b, fmt.Sprintf("%s: the step from %s nm is several times as wide as its neighbours: do values lack?", p.Series[i].Name, between(g.FromNM, g.ToNM)), "  ")
			}
		}
	}
}

// energy prints whether transmittance and reflectances leave room for each other.
func (p SpectrumPage) energy(b *bytes.Buffer) {
	b.WriteString("\nEnergy\n")
	any := false
	for _, t := range p.Series {
		for _, r := range p.Series {
			if t.Role != RoleTau || r.Role == RoleTau {
				continue
			}
			e := spectra.Energy(t.Column, r.Column)
			if e.Points == 0 {
				continue
			}
			any = true
			line := fmt.Sprintf("%s + %s is at most %.4f, at %s nm", t.Name, r.Name, e.Greatest.Value, spectra.Brief(e.Greatest.NM))
			if e.Beyond > 0 {
				line += fmt.Sprintf("; at %d of %d wavelengths the pane would absorb less than nothing, by more than the %g that is let pass", e.Beyond, e.Points, spectra.Slack)
			}
			writeWrapped(b, line+".", "  ")
		}
	}
	if !any {
		b.WriteString("There is no transmittance with a reflectance to add it to.\n")
	}
}

// figures prints the weighted means of the pane alone under each basis.
func (p SpectrumPage) figures(b *bytes.Buffer, covers [][][]glazing.Coverage) {
	bases := glazing.Bases()
	var symbols, meanings []string
	cells := make([][]string, len(bases))
	for _, f := range glazing.Figures() {
		for _, x := range meanOf {
			if x.alias != f.Alias {
				continue
			}
			for k, s := range p.Series {
				if s.Role != x.role || covers[k] == nil {
					continue
				}
				meaning := f.Meaning
				if s.Role == RoleReflectance {
					meaning = strings.TrimSuffix(meaning, ", outside")
				}
				if s.Name != s.Role {
					meaning += " (" + s.Name + ")"
				}
				symbols, meanings = append(symbols, f.Symbol), append(meanings, text.WrapSoft(meaning, meaningWidth))
				for i := range bases {
					at := slices.IndexFunc(covers[k][i], func(c glazing.Coverage) bool { return c.Band == x.band })
					cell := "–"
					if v := covers[k][i][at].Mean; v.Known {
						cell = glazing.PrintRounded(v.Number, 4)
					}
					cells[i] = append(cells[i], cell)
				}
			}
		}
	}
	if symbols == nil {
		return
	}
	var columns []column
	for i, basis := range bases {
		columns = append(columns, newColumn(basis.Name, cells[i]))
	}
	head := "Figures of the pane alone, its front outside"
	if slices.ContainsFunc(p.Series, func(s Series) bool { return s.Role == RoleReflectance }) {
		head = "Figures of each spectrum by itself"
	}
	b.WriteString("\n" + head + "\n")
	fold(b, []column{newColumn("", symbols), newColumn("", meanings)}, columns)
}

// meaningWidth is where the meaning of a figure is folded.
const meaningWidth = 41

// faces prints the emissivities that follow from infrared rows.
func (p SpectrumPage) faces(b *bytes.Buffer) {
	if len(p.Faces) == 0 {
		return
	}
	b.WriteString("\nEmissivity from infrared rows (EN 12898)\n")
	for _, f := range p.Faces {
		why := f.Why
		if why == "" && !f.Emissivity.Corrected.Known {
			why = f.Emissivity.Corrected.Why
		}
		if why != "" {
			writeWrapped(b, f.Name+": not known: "+why, "  ")
			continue
		}
		writeWrapped(b, fmt.Sprintf("%s: %s normal, %s corrected", f.Name,
			glazing.PrintRounded(f.Emissivity.Normal.Number, 3), glazing.PrintRounded(f.Emissivity.Corrected.Number, 3)), "  ")
	}
}

// verdict says in two words what a curve leaves of a band.
func verdict(c glazing.Coverage) string {
	share := c.Below + c.Above + c.Within
	var what []string
	switch {
	case c.Why != "" && share == 0:
		return "null"
	case c.Why != "":
		what = []string{"null"}
	case share == 0:
		return "covered"
	default:
		if c.Below+c.Above > 0 {
			what = append(what, "held")
		}
		if c.Within > 0 {
			what = append(what, "gap")
		}
	}
	return strings.Join(what, "+") + " " + perCent(share)
}

// perCent prints a share with two digits that count.
func perCent(share float64) string {
	switch p := 100 * share; {
	case p >= 9.95:
		return fmt.Sprintf("%.0f %%", p)
	case p < 0.001:
		return "<0.001 %"
	default:
		return strconv.FormatFloat(p, 'g', 2, 64) + " %"
	}
}

// coverage prints what each basis would say of each band, and why.
func (p SpectrumPage) coverage(b *bytes.Buffer, covers [][][]glazing.Coverage) {
	bases := glazing.Bases()
	var bands []string
	var remarks []*remark
	var list []*alike
	for k, s := range p.Series {
		if covers[k] == nil {
			continue
		}
		a := &alike{names: []string{s.Name}, cells: make([][]string, len(bases))}
		bands = nil
		for i, basis := range bases {
			for _, c := range covers[k][i] {
				bands = append(bands, c.Band)
				a.cells[i] = append(a.cells[i], verdict(c))
				for _, x := range c.Cautions {
					remarks = noted(remarks, x.Text, s.Name, basis.Name)
				}
			}
		}
		at := slices.IndexFunc(list, func(x *alike) bool { return slices.EqualFunc(x.cells, a.cells, slices.Equal) })
		if at < 0 {
			list = append(list, a)
		} else {
			list[at].names = append(list[at].names, s.Name)
		}
	}
	if list == nil {
		return
	}
	b.WriteString("\nWhat each basis would say, by band\n")
	for _, a := range list {
		var columns []column
		for i, basis := range bases {
			columns = append(columns, newColumn(basis.Name, a.cells[i]))
		}
		b.WriteByte('\n')
		writeWrapped(b, "of "+strings.Join(a.names, ", "), "  ")
		fold(b, []column{newColumn("", bands[:len(bands)/len(bases)])}, columns)
	}
	remarks = p.heat(b, remarks)
	b.WriteByte('\n')
	writeWrapped(b, "The share of a band's weight that lies beyond an end or in a gap stands beside the word. Below 0.1 % an end is held or a gap interpolated. Beyond, each figure that the band gives is null, also of make-ups that have the pane.", "")
	for i, r := range remarks {
		if i == remarksListed {
			fmt.Fprintf(b, "- and %d more\n", len(remarks)-i)
			break
		}
		of := ""
		if len(r.bases) < len(bases) {
			of = " [" + strings.Join(r.bases, ", ") + "]"
		}
		writeWrapped(b, "- "+strings.Join(r.names, ", ")+": "+r.text+of, "  ")
	}
}

// heat prints what each basis would say of the emissivities of the pane and of what follows from them,
// and returns the remarks with the reasons.
func (p SpectrumPage) heat(b *bytes.Buffer, remarks []*remark) []*remark {
	if p.Pane == nil {
		return remarks
	}
	var names []string
	var columns []column
	for _, basis := range glazing.Bases() {
		list, err := glazing.NewMethod(basis, glazing.Options{}).CoversHeat(p.Pane)
		if err != nil {
			return remarks // a pane that a rating takes is possible
		}
		var cells []string
		names = nil
		for _, c := range list {
			names, cells = append(names, c.Band), append(cells, verdict(c))
			if c.Why != "" {
				remarks = noted(remarks, c.Why+".", c.Band, basis.Name)
			}
		}
		columns = append(columns, newColumn(basis.Name, cells))
	}
	b.WriteByte('\n')
	writeWrapped(b, "of the faces, and of the pane alone, its front outside or turned; a project may type emissivities instead", "  ")
	fold(b, []column{newColumn("", names)}, columns)
	return remarks
}

// remarksListed is how many remarks are printed.
const remarksListed = 30

// alike are series of which all bases say the same: their verdicts by basis, then band.
type alike struct {
	names []string
	cells [][]string
}

// A remark is what some bases say of some series.
type remark struct {
	text         string
	names, bases []string
}

// noted returns the list with one more series and basis of a text.
func noted(list []*remark, text, name, basis string) []*remark {
	at := slices.IndexFunc(list, func(r *remark) bool { return r.text == text })
	if at < 0 {
		at = len(list)
		list = append(list, &remark{text: text})
	}
	list[at].names, list[at].bases = add(list[at].names, name), add(list[at].bases, basis)
	return list
}
