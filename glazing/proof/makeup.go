package proof

// Checks of whole make-ups: built-in panes, and panes that a check defines by straight lines.

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"panewright/glazing"
	"panewright/glazing/library"
	"panewright/spectra"
)

// makeupFigure is any figure of a make-up. Bases that are named together must give the same.
func makeupFigure(in *inputs) (float64, error) {
	var got float64
	key, m := in.text("figure"), in.sequence()
	for i, basis := range strings.Split(in.text("basis"), "/") {
		if in.err != nil {
			return 0, in.err
		}
		r, err := kept(&in.memo.ratings, basis+"\n"+m.key, func() (*glazing.Rating, error) { return in.rated(basis, &m.Makeup) })
		if err != nil {
			return 0, err
		}
		v, err := figure(r, key)
		switch {
		case err != nil:
			return 0, err
		case i > 0 && math.Abs(v-got) > sameUnder:
			return 0, fmt.Errorf("%s is %.9g under basis %s and %.9g under the first", key, v, basis, got)
		case i == 0:
			got = v
		}
	}
	return got, nil
}

// sameUnder is how far figures may lie apart that bases have in common.
const sameUnder = 1e-12

// A sequence is a make-up with a text that tells it from others.
type sequence struct {
	glazing.Makeup
	key string
}

// sequence reads the make-up "soda-lime-4 | 16 argon:0.9/air:0.1 | soft turned": panes, and gaps by
// width in mm and gas. A pane is built in, unless the check defines it.
func (in *inputs) sequence() sequence {
	text := in.text("makeup")
	m := sequence{glazing.Makeup{ID: "check"}, text}
	for i, part := range strings.Split(text, "|") {
		words := strings.Fields(part)
		switch {
		case i%2 == 0 && (len(words) == 1 || len(words) == 2 && words[1] == "turned"):
			name, definition := words[0], ""
			if in.has("pane " + name) {
				definition = in.text("pane " + name)
				m.key += "\n" + name + ": " + definition
			}
			m.Panes = append(m.Panes, glazing.Placed{Pane: in.pane(name, definition), Turned: len(words) == 2})
		case i%2 == 1 && len(words) == 2:
			m.Gaps = append(m.Gaps, glazing.Gap{WidthMM: in.parse("makeup", words[0]), Gas: in.mixture("makeup", words[1])})
		default:
			in.fail("input makeup: %q is neither a pane nor, in its place, a gap", strings.TrimSpace(part))
		}
	}
	return m
}

// pane returns the built-in pane of a name, or makes what a definition says.
func (in *inputs) pane(name, definition string) *glazing.Pane {
	p, err := kept(&in.memo.panes, name+": "+definition, func() (*glazing.Pane, error) {
		if definition != "" {
			return defined(name, definition)
		}
		if p := library.Pane(name); p != nil {
			return p, nil
		}
		return nil, fmt.Errorf("there is no built-in pane %q, nor an input %q", name, "pane "+name)
	})
	if err != nil {
		in.fail("input makeup: %w", err)
	}
	return p
}

// defined makes the pane that a text defines, such as "4 mm, emissivity 0.837/0.03, tau
// 300:0.1/780:0.8/2500:0.2, rho_front 0.1, rho_back 300:0.2/2500:0.9": corrected emissivities of
// front and back, and quantities that are straight lines between wavelengths in nm, or the same
// everywhere.
func defined(name, text string) (*glazing.Pane, error) {
	p := &glazing.Pane{ID: name, Origin: glazing.InventedOrigin, Tints: make([]glazing.Tint, 1)}
	t := &p.Tints[0]
	curves := map[string]*spectra.Curve{"tau": &t.Spectrum.Tau, "rho_front": &t.Spectrum.RhoFront, "rho_back": &t.Spectrum.RhoBack}
	var seen []string
	for part := range strings.SplitSeq(text, ", ") {
		first, second, _ := strings.Cut(part, " ")
		key, err := first, error(nil)
		switch curve := curves[first]; {
		case second == "mm":
			var mm float64
			key = "mm"
			mm, err = strconv.ParseFloat(first, 64)
			p.Plies = sheet(mm)
		case first == "emissivity":
			var front, back float64
			_, err = fmt.Sscanf(second, "%g/%g", &front, &back)
			t.Front, t.Back = glazing.GivenEmissivity(front), glazing.GivenEmissivity(back)
		case curve != nil:
			*curve, err = line(second)
		default:
			err = fmt.Errorf("nothing is called %q", first)
		}
		if err != nil {
			return nil, fmt.Errorf("pane %s: %q: %w", name, part, err)
		}
		seen = append(seen, key)
	}
	slices.Sort(seen)
	if want := []string{"emissivity", "mm", "rho_back", "rho_front", "tau"}; !slices.Equal(seen, want) {
		return nil, fmt.Errorf("pane %s has %q; it must have each of %q once", name, seen, want)
	}
	return p, nil
}

// line reads "300:0.1/780:0.8/2500:0.2", or one number for the whole solar range.
func line(text string) (c spectra.Curve, err error) {
	if v, err := strconv.ParseFloat(text, 64); err == nil {
		return flat(v), nil
	}
	for point := range strings.SplitSeq(text, "/") {
		var nm, v float64
		if _, err := fmt.Sscanf(point, "%g:%g", &nm, &v); err != nil {
			return c, err
		}
		if c.Len() > 0 && nm <= c.Last() {
			return c, fmt.Errorf("%g nm follows %g nm; wavelengths ascend", nm, c.Last())
		}
		c.NM, c.Value = append(c.NM, nm), append(c.Value, v)
	}
	return c, nil
}
