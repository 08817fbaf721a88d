package glazing

// What one curve is good for: its weighted means, and which figures it leaves unknown; and what the
// emissivities of a pane leave of U and g.

import "panewright/spectra"

// A Coverage says of one band what a curve leaves of the figures that depend on it.
type Coverage struct {
	Band string // as cautions name it: "light", "solar", "uv", …
	Why  string // why those figures are not known; "" where they are
	Mean Value  // of the curve; of colour there is none
	// Below, Above and Within are the shares of the band's weight, from 0 to 1, that lie below the
	// curve's first point, beyond its last, and inside its gaps.
	Below, Above, Within float64
	Cautions             []Caution // where an end is held or a gap interpolated, or why not, in a rating's words
}

// Covers returns for each band of the method, and for colour, what a rating says of a pane's curve
// up to 2500 nm, by the same code. The means are those of the pane alone, bit for bit where the
// curve is that of spectra.Measured. The curve must not be empty.
func (m *Method) Covers(pane string, c spectra.Curve) []Coverage {
	values := make([]float64, m.grid.Padded())
	c.Sample(values[:m.grid.Len()], m.grid.NM)
	list := make([]Coverage, 0, bandCount+1)
	for i := range bandCount + 1 {
		w := m.coverageOf(i)
		v := Coverage{Band: w.Name, Within: w.Within(c.Gaps)}
		v.Below, v.Above = w.Missing(c.First(), c.Last())
		v.Why = reach(pane, w, []spectra.Curve{c}, &v.Cautions)
		if i == colours {
			v.Mean = unknown("a colour is no mean")
		} else {
			v.Mean = known(m.bands[i].Mean(values)).orNot(v.Why)
		}
		list = append(list, v)
	}
	return list
}

// CoversHeat returns what a rating says of the emissivity of either face of a pane of one tint, and of
// U and g of the pane alone with its front outside and turned, by the same code. Shares and cautions
// are left empty. It is an error if the pane is impossible.
func (m *Method) CoversHeat(p *Pane) ([]Coverage, error) {
	of := func(name string, v Value) Coverage { return Coverage{Band: name, Why: v.Why, Mean: v} }
	list := []Coverage{of("emissivity front", p.Tints[0].Front.Corrected), of("emissivity back", p.Tints[0].Back.Corrected)}
	var g []Coverage
	for _, x := range []struct {
		placed Placed
		also   string
	}{{Placed{Pane: p}, ""}, {Placed{Pane: p, Turned: true}, " turned"}} {
		ready, err := m.Ready(&Makeup{ID: p.ID, Panes: []Placed{x.placed}})
		if err != nil {
			return nil, err
		}
		var r Rating
		if err := ready.RateInto(&r, 0); err != nil {
			return nil, err
		}
		list, g = append(list, of("U"+x.also, r.U)), append(g, of("g"+x.also, r.G))
	}
	return append(list, g...), nil
}
