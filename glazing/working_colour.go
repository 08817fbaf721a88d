package glazing

// The working of colours and of the colour rendering index.

import (
	"fmt"
	"strconv"
	"strings"

	"panewright/spectra/colour"
)

// seen is one of the three colours of a rating.
type seen struct {
	title  string // of the light seen
	letter string // of the quantity that is weighted
	values []float64
	why    string // why it is not known
}

func (r *Rating) seen() [3]seen {
	return [3]seen{
		{"transmitted light", "τ", r.stack.T, r.Transmitted.Why},
		{"light reflected outside", "ρ", r.stack.Ro, r.Outside.Why},
		{"light reflected inside", "ρ′", r.stack.Ri, r.Inside.Why},
	}
}

const clauseXYZ, clauseLab = "CIE 15, 7.1", "CIE 15, 8.2.1"

// workColours writes out the three colours for the 2° observer, and those for the 10° observer in
// short.
func workColours(r *Rating) []Chapter {
	white := r.Method.meter.Working(colour.TwoDegree, r.stack.T)
	first := Chapter{
		Title: "White of D65, 2° observer",
		Note:  fmt.Sprintf("Sums over %d wavelengths, 380 to 780 nm at 5 nm, of the power S of D65 times the colour-matching functions x, y, z. Y/100 and the light figures, whose table has other wavelengths, may differ in the fourth decimal.", len(colour.Wavelengths())),
		Steps: []Step{
			{Symbol: "Xn", Meaning: "white", Formula: "100·Σ S·x / Σ S·y", Value: white.White.X, Clause: clauseXYZ,
				Numbers: "100·" + put(white.WhiteSums.X) + "/" + put(white.WhiteSums.Y)},
			{Symbol: "Zn", Meaning: "white; Yn is 100", Formula: "100·Σ S·z / Σ S·y", Value: white.White.Z, Clause: clauseXYZ,
				Numbers: "100·" + put(white.WhiteSums.Z) + "/" + put(white.WhiteSums.Y)},
		},
	}
	out := []Chapter{first}
	for _, s := range r.seen() {
		out = append(out, workColour(r, s))
	}
	return append(out, workTenDegree(r))
}

func workColour(r *Rating, s seen) Chapter {
	c := Chapter{Title: "Colour of " + s.title + ", 2° observer"}
	if s.why != "" {
		c.lack("X, Y, Z, L*, a*, b*", s.why)
		return c
	}
	w := r.Method.meter.Working(colour.TwoDegree, s.values)
	for _, x := range []struct {
		name       string
		sum, value float64
	}{
		{"X", w.Sums.X, w.XYZ.X}, {"Y", w.Sums.Y, w.XYZ.Y}, {"Z", w.Sums.Z, w.XYZ.Z},
	} {
		c.Steps = append(c.Steps, Step{Symbol: x.name, Meaning: "tristimulus value", Clause: clauseXYZ,
			Formula: "100·Σ " + s.letter + "·S·" + strings.ToLower(x.name) + " / Σ S·y",
			Numbers: "100·" + put(x.sum) + "/" + put(w.WhiteSums.Y), Value: x.value})
	}
	for _, x := range []struct {
		name               string
		value, white, root float64
	}{
		{"X", w.XYZ.X, w.White.X, w.Roots.X}, {"Y", w.XYZ.Y, w.White.Y, w.Roots.Y}, {"Z", w.XYZ.Z, w.White.Z, w.Roots.Z},
	} {
		quotient := put(x.value) + "/" + put(x.white)
		step := Step{Symbol: "f" + x.name, Meaning: "of " + x.name + "/" + x.name + "n, above (24/116)^3", Clause: clauseLab,
			Formula: "(" + x.name + "/" + x.name + "n)^(1/3)", Numbers: "(" + quotient + ")^(1/3)", Value: x.root}
		if x.value/x.white <= colour.LinearBelow {
			step.Meaning = "of " + x.name + "/" + x.name + "n, up to (24/116)^3"
			step.Formula, step.Numbers = "841/108·"+x.name+"/"+x.name+"n + 16/116", "841/108·"+quotient+" + 16/116"
		}
		c.Steps = append(c.Steps, step)
	}
	c.Steps = append(c.Steps, labSteps(w)...)
	return c
}

func labSteps(w colour.Working) []Step {
	return []Step{
		{Symbol: "L*", Meaning: "lightness", Formula: "116·fY − 16", Numbers: "116·" + putFor(w.Roots.Y, w.Lab.L/116) + " − 16", Value: w.Lab.L, Clause: clauseLab},
		{Symbol: "a*", Meaning: "green to red", Formula: "500·(fX − fY)", Numbers: "500·(" + minus(w.Roots.X, w.Roots.Y) + ")", Value: w.Lab.A, Clause: clauseLab},
		{Symbol: "b*", Meaning: "blue to yellow", Formula: "200·(fY − fZ)", Numbers: "200·(" + minus(w.Roots.Y, w.Roots.Z) + ")", Value: w.Lab.B, Clause: clauseLab},
	}
}

// workTenDegree shows the colours for the 10° observer, without the sums.
func workTenDegree(r *Rating) Chapter {
	c := Chapter{Title: "The same colours, 10° observer", Note: "By the same formulas from the colour-matching functions of the 10° observer.",
		Rows: &Rows{Head: []string{"", "X", "Y", "Z", "L*", "a*", "b*"}}}
	white := r.Method.meter.Working(colour.TenDegree, r.stack.T).White
	row := func(label string, v ...float64) {
		cells := []string{label}
		for _, x := range v {
			cells = append(cells, strconv.FormatFloat(x, 'f', 4, 64))
		}
		c.Rows.add(cells...)
	}
	row("white of D65", white.X, white.Y, white.Z, 100, 0, 0)
	for _, s := range r.seen() {
		if s.why != "" {
			c.lack("colour of "+s.title, s.why)
			continue
		}
		w := r.Method.meter.Working(colour.TenDegree, s.values)
		row(strings.TrimPrefix(s.title, "light "), w.XYZ.X, w.XYZ.Y, w.XYZ.Z, w.Lab.L, w.Lab.A, w.Lab.B)
	}
	return c
}

// shown writes a number of the order of 1 to 100 for the cell of a table.
func shown(v float64) string { return strconv.FormatFloat(v, 'f', 6, 64) }

// workRendering writes out Ra: the sources of light, the eight samples, the first of them and the
// mean.
func workRendering(r *Rating) []Chapter {
	const title = "Colour rendering index"
	if !r.Ra.Known {
		c := Chapter{Title: title}
		c.lack("Ra", r.Ra.Why)
		return []Chapter{c}
	}
	w := r.Method.meter.Rendering(r.stack.T)
	sources := Chapter{Title: title + ": D65 through the glazing, and D65 itself (marked r)",
		Note: "X, Y, Z are those of the transmitted light and of the white, 2° observer."}
	sources.Steps = append(chromaticity("", w.Test.XYZ, w.Test.UV, w.Test.CD), chromaticity("r", w.Reference.XYZ, w.Reference.UV, w.Reference.CD)...)

	colours := Chapter{Title: title + ": the eight samples",
		Note: "X, Y, Z of the sample in the transmitted light, where that has Y 100: 100·Σ τ·S·β·x / Σ τ·S·y and so on, β being the radiance factor of the sample; then U*, V*, W* of its adapted colour. The first sample is worked out below.",
		Rows: &Rows{Head: []string{"", "X", "Y", "Z", "U*", "V*", "W*"}}}
	differences := Chapter{Title: title + ": their differences",
		Note: "Ur*, Vr*, Wr* of the sample in D65; ΔE is the distance of both, R is 100 − 4.6·ΔE.",
		Rows: &Rows{Head: []string{"", "Ur*", "Vr*", "Wr*", "ΔE", "R"}}}
	var all []string
	for i, s := range w.Samples {
		label := "sample " + strconv.Itoa(i+1)
		colours.Rows.add(label, shown(s.XYZ.X), shown(s.XYZ.Y), shown(s.XYZ.Z), shown(s.Seen.U), shown(s.Seen.V), shown(s.Seen.W))
		differences.Rows.add(label, shown(s.Reference.U), shown(s.Reference.V), shown(s.Reference.W), shown(s.DeltaE), shown(s.R))
		all = append(all, putFor(s.R, w.Ra))
	}
	mean := Step{Symbol: "Ra", Meaning: "general colour rendering index", Formula: "(R1 + … + R8)/8",
		Numbers: "(" + strings.Join(all, " + ") + ")/" + strconv.Itoa(colour.Samples), Value: r.Ra.Number, Clause: "EN 410, 5.6"}
	worked := Chapter{Title: title + ": the first sample worked out, and the mean", Steps: append(workSample(w), mean)}
	return []Chapter{sources, colours, differences, worked}
}

// chromaticity writes out u, v, c, d of a colour; the mark follows the symbols.
func chromaticity(mark string, x colour.XYZ, p colour.UV, k colour.CD) []Step {
	sum := "(" + put(x.X) + " + 15·" + put(x.Y) + " + 3·" + put(x.Z) + ")"
	u, v := put(p.U), put(p.V)
	rest := k.C * p.V // 4 − u − 10·v, which strong colours bring near 0
	return []Step{
		{Symbol: "u" + mark, Meaning: "chromaticity, CIE 1960", Formula: "4·X/(X + 15·Y + 3·Z)", Numbers: "4·" + put(x.X) + "/" + sum, Value: p.U, Clause: "CIE 13.3"},
		{Symbol: "v" + mark, Meaning: "chromaticity, CIE 1960", Formula: "6·Y/(X + 15·Y + 3·Z)", Numbers: "6·" + put(x.Y) + "/" + sum, Value: p.V, Clause: "CIE 13.3"},
		{Symbol: "c" + mark, Meaning: "for the adaptation", Formula: "(4 − u − 10·v)/v", Numbers: "(4 − " + putFor(p.U, rest) + " − 10·" + putFor(p.V, rest/10) + ")/" + v, Value: k.C, Clause: "CIE 13.3, 5.7"},
		{Symbol: "d" + mark, Meaning: "for the adaptation", Formula: "(1.708·v + 0.404 − 1.481·u)/v", Numbers: "(1.708·" + v + " + 0.404 − 1.481·" + u + ")/" + v, Value: k.D, Clause: "CIE 13.3, 5.7"},
	}
}

// workSample writes out the first sample.
func workSample(w colour.Rendering) []Step {
	s := &w.Samples[0]
	ratio := func(reference, test, sample float64) string {
		return put(reference) + "/" + put(test) + "·" + put(sample)
	}
	a, b := w.Reference.CD.C/w.Test.CD.C*s.CD.C, w.Reference.CD.D/w.Test.CD.D*s.CD.D
	under := "(16.518 + 1.481·" + put(a) + " − " + put(b) + ")"
	w1 := put(s.Seen.W)
	square := func(a, b float64) string { return "(" + minus(a, b) + ")^2" }
	steps := chromaticity("1", s.XYZ, s.UV, s.CD)
	return append(steps,
		Step{Symbol: "A", Meaning: "for the adaptation", Formula: "cr/c·c1", Numbers: ratio(w.Reference.CD.C, w.Test.CD.C, s.CD.C), Value: a, Clause: "CIE 13.3, 5.7"},
		Step{Symbol: "B", Meaning: "for the adaptation", Formula: "dr/d·d1", Numbers: ratio(w.Reference.CD.D, w.Test.CD.D, s.CD.D), Value: b, Clause: "CIE 13.3, 5.7"},
		Step{Symbol: "u1′", Meaning: "adapted to D65", Formula: "(10.872 + 0.404·A − 4·B)/(16.518 + 1.481·A − B)",
			Numbers: "(10.872 + 0.404·" + put(a) + " − 4·" + put(b) + ")/" + under, Value: s.Adapted.U, Clause: "CIE 13.3, 5.7"},
		Step{Symbol: "v1′", Meaning: "adapted to D65", Formula: "5.520/(16.518 + 1.481·A − B)", Numbers: "5.520/" + under, Value: s.Adapted.V, Clause: "CIE 13.3, 5.7"},
		Step{Symbol: "W*", Meaning: "lightness", Formula: "25·Y^(1/3) − 17", Numbers: "25·" + putFor(s.XYZ.Y, s.Seen.W) + "^(1/3) − 17", Value: s.Seen.W, Clause: "CIE 13.3, 5.8"},
		Step{Symbol: "U*", Formula: "13·W*·(u1′ − ur)", Numbers: "13·" + w1 + "·(" + minus(s.Adapted.U, w.Reference.UV.U) + ")", Value: s.Seen.U, Clause: "CIE 13.3, 5.8"},
		Step{Symbol: "V*", Formula: "13·W*·(v1′ − vr)", Numbers: "13·" + w1 + "·(" + minus(s.Adapted.V, w.Reference.UV.V) + ")", Value: s.Seen.V, Clause: "CIE 13.3, 5.8"},
		Step{Symbol: "ΔE1", Meaning: "colour difference", Formula: "((U* − Ur*)^2 + (V* − Vr*)^2 + (W* − Wr*)^2)^(1/2)",
			Numbers: "(" + square(s.Seen.U, s.Reference.U) + " + " + square(s.Seen.V, s.Reference.V) + " + " + square(s.Seen.W, s.Reference.W) + ")^(1/2)",
			Value:   s.DeltaE, Clause: "CIE 13.3, 5.9"},
		Step{Symbol: "R1", Meaning: "special index", Formula: "100 − 4.6·ΔE1", Numbers: "100 − 4.6·" + putFor(s.DeltaE, s.R), Value: s.R, Clause: "CIE 13.3, 6.1"},
	)
}
