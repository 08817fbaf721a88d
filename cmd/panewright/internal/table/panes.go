package table

// The pages of panes: the list, and one pane with its angles and a plot.

import (
	"bytes"
	"fmt"
	"slices"

	"github.com/jedib0t/go-pretty/v6/text"

	"panewright/glazing"
)

// A PaneView is what is said of one pane beside its figures.
type PaneView struct {
	About  string
	Angles []Angle // of uncoated glass; none where the angles are not known
}

// An Angle is a pane rated alone at an angle of incidence.
type Angle struct {
	Name   string
	Rating *glazing.Rating
}

// listed are the figures of the list of panes.
var listed = []string{"light", "light_outside", "solar", "solar_outside", "g", "uv", "emissivity"}

// PaneList returns the list of panes, each rated alone: those of the project, then the built-in
// ones.
func PaneList(r Report) ([]byte, error) {
	if err := r.Choose(listed); err != nil {
		return nil, err
	}
	var b bytes.Buffer
	writeWrapped(&b, "Panes, each alone as a single glazing", "")
	b.WriteByte('\n')
	r.paneBases(&b)
	var ids, tints []string
	for i := range r.Ratings {
		rating := &r.Ratings[i]
		ids = append(ids, text.WrapHard(rating.Makeup.ID, nameWidth))
		tints = append(tints, text.WrapHard(rating.Tint, nameWidth))
	}
	var figures []column
	for _, c := range r.Choices {
		var cells []string
		for i := range r.Ratings {
			cells = append(cells, c.Printed(&r.Ratings[i]))
		}
		figures = append(figures, newColumn(c.Head(), cells))
	}
	fold(&b, []column{newColumn("pane", ids), newColumn("tint", tints)}, figures)
	r.symbols(&b, r.Choices)
	b.WriteByte('\n')
	writeWrapped(&b, "ε1 and ε2 are those of the front and of the back. The uncoated built-in panes were computed from published optical constants, not measured. Those called invented-… have made-up curves, describe no product and must not be specified.", "")
	if r.Project != nil {
		own := r
		own.Ratings = slices.DeleteFunc(slices.Clone(r.Ratings), func(x glazing.Rating) bool { return !slices.Contains(r.Project.Panes, x.Makeup.Panes[0].Pane) })
		own.origins(&b)
	}
	fmt.Fprintf(&b, "\nPanewright %s\n", r.Version)
	return b.Bytes(), nil
}

// paneBases names the basis of figures of panes.
func (r Report) paneBases(b *bytes.Buffer) {
	for _, x := range r.editions() {
		writeWrapped(b, "Basis "+x.basis+": "+x.editions, "  ")
	}
}

// Pane returns a page of one pane: what it is, its figures in each tint, its angles, a plot.
func Pane(r Report, v PaneView) []byte {
	var b bytes.Buffer
	p := r.Ratings[0].Makeup.Panes[0].Pane
	writeWrapped(&b, p.ID+": "+v.About, "  ")
	fmt.Fprintf(&b, "%.6g mm, %.6g kg/m²\n", p.ThicknessMM(), p.MassKGM2())
	r.paneBases(&b)
	for i := range r.Ratings {
		rating := &r.Ratings[i]
		if rating.Tint != "" {
			b.WriteByte('\n')
			writeWrapped(&b, "Tint "+rating.Tint, "  ")
		}
		tint := p.Tints[rating.Ready.States[rating.State].Tints[0]]
		writeWrapped(&b, string(p.Origin)+" spectrum, from "+tint.Source, "  ")
		allFigures(&b, r.Figures, rating)
		for k, e := range rating.Surfaces {
			if e.ComputedNormal.Known {
				writeWrapped(&b, fmt.Sprintf("  ε%d is the convention for uncoated soda-lime glass (EN 673); the optical constants give %.3f normal, %.3f over the half space.",
					k+1, e.ComputedNormal.Number, e.Hemispherical.Number), "  ")
			}
		}
		b.WriteByte('\n')
		s := tint.Spectrum
		Plot(&b, []PlotCurve{{"τ", 'T', s.Tau}, {"ρ front", 'f', s.RhoFront}, {"ρ back", 'b', s.RhoBack}})
	}
	angles(&b, v.Angles)
	r.cautionList(&b)
	fmt.Fprintf(&b, "\nPanewright %s\n", r.Version)
	return b.Bytes()
}

// angles prints figures by angle of incidence.
func angles(b *bytes.Buffer, list []Angle) {
	if len(list) == 0 {
		return
	}
	b.WriteString("\nAngle of incidence, exact, unpolarised\n")
	var names []string
	for _, a := range list {
		names = append(names, a.Name)
	}
	var figures []column
	for _, f := range glazing.Figures() {
		switch f.Alias {
		case "light", "light_outside", "solar", "solar_outside", "uv":
		default:
			continue
		}
		var cells []string
		for _, a := range list {
			cells = append(cells, glazing.PrintRounded(f.Value(a.Rating, 0).Number, 3))
		}
		figures = append(figures, newColumn(f.Symbol, cells))
	}
	fold(b, []column{newColumn("angle", names)}, figures)
}
