package glazing

// The working of what follows from other inputs: gas fills and sensitivities.

import (
	"fmt"
	"slices"
	"strconv"
	"strings"

	"panewright/thermal"
)

// workFills shows U of other gas fills.
func workFills(r *Rating) Chapter {
	c := Chapter{Title: "Gas and time"}
	other := func(gas string) bool {
		return slices.ContainsFunc(r.Makeup.Gaps, func(g Gap) bool {
			return slices.ContainsFunc(g.Gas, func(s thermal.Share) bool { return s.Gas != air && s.Gas != gas && s.Fraction > 0 })
		})
	}
	if other("") && !other("argon") {
		c.Title = "Argon and time"
	}
	fills, err := Fills(r)
	if err != nil {
		c.lack("U of other fills", err.Error())
		return c
	}
	var rated []string // shares, each once
	least := 1.0
	for _, g := range r.Makeup.Gaps {
		if share := fill(g.Gas); share > 0 {
			least = min(least, share)
			if text := strconv.FormatFloat(100*share, 'g', 6, 64); !slices.Contains(rated, text) {
				rated = append(rated, text)
			}
		}
	}
	c.remark("Gas leaks and air takes its place; a seal that meets EN 1279-3 loses less than 1 % of the gas a year (from memory). U as rated, and of the same make-up where gas fills this share of each gap that has any, and air the rest.")
	if len(fills) > 0 && least < fills[0].Share {
		c.remark("A share above the rated one is what a fuller gap would have, and not what comes of leaking.")
	}
	c.Rows = &Rows{Head: []string{"gas", "as rated " + strings.Join(rated, "/") + " %"}}
	cells := []string{"U, W/(m²·K)", strconv.FormatFloat(r.U.Number, 'g', 6, 64)}
	for _, f := range fills {
		c.Rows.Head = append(c.Rows.Head, PrintRounded(100*f.Share, 0)+" %")
		cells = append(cells, strconv.FormatFloat(f.UWM2K, 'g', 6, 64))
	}
	c.Rows.add(cells...)
	return c
}

// workSensitivities shows how U and g follow from emissivities, fills and widths.
func workSensitivities(r *Rating) Chapter {
	c := Chapter{Title: "Sensitivity of U and g"}
	list, err := Sensitivities(r)
	if err != nil {
		c.lack("sensitivities", err.Error())
		return c
	}
	if list == nil {
		c.remark("None of emissivities, fills and widths enters: there is no gap, and hi was typed by the user.")
		return c
	}
	c.remark("What a rise of one input by the change shown adds to U and g, the rest held: differences of the rating itself over the step shown. A fill rises as gas takes the place of air.")
	c.Rows = &Rows{Head: []string{"input", "as rated", "change", "U, W/(m²·K)", "g", "step"}}
	short := func(v Value) string {
		if !v.Known {
			return "–"
		}
		return strconv.FormatFloat(v.Number, 'g', 4, 64)
	}
	oneSided, corner := false, false
	for _, s := range list {
		label, unit := "", ""
		switch s.Input {
		case EmissivityInput:
			label = fmt.Sprintf("ε%d", s.Number)
			if r.Method.Basis.Balances() {
				label = r.emissivitySymbol(s.Number - 1)
			}
		case FillInput:
			label = fmt.Sprintf("gas in gap %d", s.Number)
		case WidthInput:
			label, unit = fmt.Sprintf("width of gap %d", s.Number), " mm"
		}
		step := map[Side]string{BothSides: "±", Above: "+", Below: "−"}[s.Side] + put(s.Step) + unit
		oneSided = oneSided || s.Side == Above || s.Side == Below
		if s.Corner {
			label, corner = label+" *", true
		}
		if !s.U.Known {
			c.lack(label, s.U.Why)
			step = "–"
		}
		c.Rows.add(label, strconv.FormatFloat(s.Value, 'g', 6, 64)+unit, "+"+put(s.Change)+unit, short(s.U), short(s.G), step)
	}
	if oneSided {
		c.remark("A step with + or − alone was taken to one side, for the value is at a bound.")
	}
	if corner {
		c.remark("*: the gas of a gap begins to move within the step; the mean of both sides.")
	}
	if !r.G.Known {
		c.lack("g", r.G.Why)
	}
	return c
}
