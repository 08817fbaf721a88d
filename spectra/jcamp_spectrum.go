package spectra

// From a table of JCAMP-DX to a spectrum: factors, the checks of what is said twice, conversion.

import (
	"fmt"
	"math"
	"slices"
	"strings"
)

// A given is a number that a label gives, or does not.
type given struct {
	numeral
	line int // 0 where the label is not there
}

func (b *jcampBlock) number(name string) given {
	l := b.labels[name]
	if l == nil || len(l.text) == 0 {
		return given{}
	}
	v, unit, n := affn(l.text, exponentAlways)
	if n != len(l.text) || math.IsInf(v, 0) {
		b.fail(l.line, 0, "##%s= %q: not a finite number", name, clip(latin(l.text)))
		return given{}
	}
	return given{numeral{v, unit}, l.line}
}

// factor returns what the printed numbers are multiplied with.
func (b *jcampBlock) factor(name string) float64 {
	f := b.number(name)
	switch {
	case f.line == 0:
		return 1
	case f.value == 0:
		b.fail(f.line, 0, "##%s= is 0", name)
	}
	return f.value
}

// apart reports whether two numbers differ by the largest of the units, or more.
func apart(a, b float64, units ...float64) bool {
	tolerance := max(slices.Max(units), 1e-9*math.Abs(b))
	return a != b && !(math.Abs(a-b) < float64(tolerance*(1-1e-9)))
}

// spectrum makes the spectrum of a block that has ended; it is not ok where the block has faults.
func (b *jcampBlock) spectrum() (spectrum Block, ok bool) {
	t := b.table
	for _, name := range []string{"XUNITS", "YUNITS"} {
		if b.value(name) == "" {
			b.fail(b.line, 0, "the block has no ##%s=", name)
		}
	}
	for _, name := range []string{"FIRSTX", "LASTX", "NPOINTS", "DELTAX", "FIRSTY", "MAXX", "MINX", "MAXY", "MINY"} {
		b.number(name) // a fault is that of the block
	}
	xFactor, yFactor := b.factor("XFACTOR"), b.factor("YFACTOR")
	switch {
	case t.stopped:
	case t.form == formUnread:
		b.fail(t.line, 0, "##%s= without (X++(Y..Y)) or (XY..XY)", t.name)
	case t.wantY:
		b.fail(t.end, 0, "the last x has no ordinate; is the file cut?")
	case len(t.y) == 0:
		b.fail(t.line, 0, "##%s= holds no points", t.name)
	}
	if b.faults.any() {
		return Block{}, false
	}
	x := b.abscissa(xFactor)
	unscaled := false // whether ##FIRSTY= is without the factor, as some programs write it
	if first := b.number("FIRSTY"); first.line > 0 && t.firstY.unit > 0 {
		y := t.firstY.value * yFactor
		unscaled = yFactor != 1 && first.value == t.firstY.value
		if !unscaled && apart(y, first.value, first.unit, math.Abs(t.firstY.unit*yFactor), 1e-4*math.Abs(first.value)) {
			b.fail(t.lines[0], 0, "the first ordinate, times ##YFACTOR=, is %s; ##FIRSTY= at line %d says %s", Brief(y), first.line, short(first.value))
		}
	}
	if b.faults.any() {
		return Block{}, false
	}
	spectrum = Block{Title: Clip(strings.TrimSpace(latin(b.title.text)), maxTitle), Notes: []string{"table " + t.shape()}}
	if unscaled {
		spectrum.Notes = append(spectrum.Notes, "##FIRSTY= is the first ordinate without ##YFACTOR=")
	}
	if t.form == formPairs && b.number("NPOINTS").line == 0 {
		spectrum.Notes = append(spectrum.Notes, "no ##NPOINTS=; that no line is lost cannot be seen")
	}
	if delta := b.number("DELTAX"); delta.value != 0 && (delta.value > 0) != (x[len(x)-1] > x[0]) {
		spectrum.Notes = append(spectrum.Notes, fmt.Sprintf("##DELTAX= says %s, but x goes from %s to %s; its sign was passed over", short(delta.value), Brief(x[0]), Brief(x[len(x)-1])))
	}
	spectrum.Notes = append(spectrum.Notes, b.extremes(x, yFactor)...)
	b.curve(&spectrum, x, yFactor)
	return spectrum, !b.faults.any()
}

// abscissa returns x of each point in the unit of the file, and checks it against all that the
// labels and the lines say of it.
func (b *jcampBlock) abscissa(factor float64) []float64 {
	t := b.table
	first, last, count, delta := b.number("FIRSTX"), b.number("LASTX"), b.number("NPOINTS"), b.number("DELTAX")
	n := len(t.y)
	if count.line > 0 && count.value != float64(n) {
		b.fail(t.end, 0, "%d points up to here, ##NPOINTS= at line %d says %s; a line is lost or damaged", n, count.line, short(count.value))
	}
	if t.form == formPairs {
		for i := range t.x {
			t.x[i] *= factor
		}
		for _, e := range []struct {
			name  string
			label given
			x     float64
			unit  float64
			line  int
		}{{"FIRSTX", first, t.x[0], t.firstX.unit, t.lines[0]}, {"LASTX", last, t.x[n-1], t.lastX.unit, t.end}} {
			if e.label.line > 0 && apart(e.x, e.label.value, e.label.unit, math.Abs(e.unit*factor)) {
				b.fail(e.line, 0, "x %s, ##%s= at line %d says %s; a line is lost or damaged", Brief(e.x), e.name, e.label.line, short(e.label.value))
			}
		}
		return t.x
	}
	if first.line == 0 {
		first.value = t.heads[0].value * factor
	}
	points := n // as the labels have it
	if count.line > 0 && count.value >= 1 && count.value <= maxBlockPoints {
		points = int(count.value)
	}
	steps := float64(points - 1)
	switch {
	case points < 2:
		b.fail(t.end, 0, "%d points; a spectrum has at least %d", n, minimumRows)
		return nil
	case delta.value == 0 && (count.line == 0 || last.line == 0), count.line == 0 && last.line == 0:
		b.fail(t.line, 0, "##NPOINTS= and ##LASTX= must be there, or one of them and ##DELTAX=; lost points would not be seen")
		return nil
	case last.line == 0:
		last.value = first.value + float64(steps*delta.value)
	case delta.value != 0:
		reach := math.Abs(last.value - first.value)
		slack := max(math.Abs(delta.value)/2, steps*min(delta.unit/2, math.Abs(delta.value)/1000)) // delta may be rounded
		if got := math.Abs(steps * delta.value); apart(got, reach, slack) {
			b.fail(last.line, 0, "##LASTX= is %s from the first x; %d points in steps of ##DELTAX= reach %s", Brief(reach), points, Brief(got))
		}
	}
	at := func(i int) float64 {
		return (float64(first.value*(steps-float64(i))) + float64(last.value*float64(i))) / steps
	}
	step := math.Abs(last.value-first.value) / steps
	if !(step > 0) || math.IsInf(step, 0) {
		b.fail(t.line, 0, "x goes from %s to %s", short(first.value), short(last.value))
		return nil
	}
	for _, h := range t.heads {
		x, slack := h.value*factor, max(step/2, math.Abs(h.unit*factor))
		// Some programs write the x of the first new ordinate where a check comes before it.
		if apart(x, at(h.at), slack) && !(h.check && h.at+1 < n && !apart(x, at(h.at+1), slack)) {
			b.fail(h.line, 0, "the line begins with x %s, by ##FIRSTX=, ##LASTX= and the number of points it is %s; a line is lost or damaged", Brief(x), Brief(at(h.at)))
			break
		}
	}
	x := make([]float64, n)
	for i := range x {
		x[i] = at(i)
	}
	return x
}

// extremes says where ##MAXX= and the like, which some programs keep when they cut a spectrum,
// differ from the points.
func (b *jcampBlock) extremes(x []float64, yFactor float64) (notes []string) {
	highest, lowest := math.Inf(-1), math.Inf(1)
	for _, y := range b.table.y {
		if !math.IsNaN(y) {
			highest, lowest = max(highest, y*yFactor), min(lowest, y*yFactor)
		}
	}
	step := math.Abs(x[len(x)-1]-x[0]) / float64(len(x))
	for _, e := range []struct {
		name      string
		is, slack float64
	}{
		{"MAXX", max(x[0], x[len(x)-1]), step}, {"MINX", min(x[0], x[len(x)-1]), step},
		{"MAXY", highest, math.Abs(b.table.firstY.unit * yFactor)}, {"MINY", lowest, math.Abs(b.table.firstY.unit * yFactor)},
	} {
		label := b.number(e.name)
		if label.line > 0 && apart(e.is, label.value, label.unit, e.slack, 1e-3*math.Abs(label.value)) {
			notes = append(notes, fmt.Sprintf("##%s= says %s, the points have %s", e.name, short(label.value), Brief(e.is)))
		}
	}
	return notes
}

// curve makes the column of a spectrum: known points, in nm, ascending, as fractions of one.
func (b *jcampBlock) curve(out *Block, x []float64, yFactor float64) {
	t, c := b.table, &out.Column
	ux, uy := unitOfX(b.value("XUNITS")), unitOfY(b.value("YUNITS"))
	out.Quantity, c.File = uy.quantity, b.file
	c.NM, c.Value, c.Line = x[:0], t.y[:0], t.lines[:0] // no point goes further back than it was
	gaps, ends, lost := 0, 0, 0
	for i, y := range t.y {
		if math.IsNaN(y) {
			lost++
			continue
		}
		line, nm := t.lines[i], ux.wavelength(x[i])
		if !(x[i] > 0 && nm > 0) || math.IsInf(x[i], 0) || math.IsInf(nm, 0) {
			b.fail(line, 0, "x is %s %s; it must be above 0, and finite", Brief(x[i]), ux.name)
			return
		}
		v, problem := uy.fraction(y * yFactor)
		if problem != "" {
			b.fail(line, nm, "%s", problem)
		}
		if b.faults.full() {
			return
		}
		switch last := len(c.NM) - 1; {
		case last < 0:
			ends, lost = lost, 0
		case nm == c.NM[last]:
			b.fail(line, nm, "this wavelength stands twice")
		case last > 0 && (nm > c.NM[last]) != (c.NM[1] > c.NM[0]):
			b.fail(line, nm, "x must ascend or descend throughout; the point before is at %s nm", shortNM(c.NM[last]))
		case lost > 0 && len(c.Gaps) == maxGaps:
			b.fail(line, nm, "ordinates are missing (?) in more than %d places; that is no spectrum", maxGaps)
			return
		case lost > 0:
			c.Gaps = append(c.Gaps, Span{min(nm, c.NM[last]), max(nm, c.NM[last])})
		}
		gaps, lost = gaps+lost, 0
		c.NM, c.Value, c.Line = append(c.NM, nm), append(c.Value, v), append(c.Line, line)
	}
	ends += lost
	if n := len(c.NM); n < minimumRows {
		b.fail(t.line, 0, "%d points; a spectrum has at least %d", n, minimumRows)
		return
	}
	turned := c.NM[1] < c.NM[0]
	if turned {
		slices.Reverse(c.NM)
		slices.Reverse(c.Value)
		slices.Reverse(c.Line)
		slices.Reverse(c.Gaps)
	}
	switch {
	case ux.nm == 1 && c.Last() < leastLastNM:
		b.fail(t.line, 0, "the last wavelength is %s nm; µm? ##XUNITS= must say MICROMETERS", short(c.Last()))
	case ux.nm == 1000 && c.First() > 1e5:
		b.fail(t.line, 0, "the first wavelength is %s µm; nm? ##XUNITS= must say NANOMETERS", short(c.First()/1000))
	}
	if ux.nm != 1 {
		out.Notes = append(out.Notes, "x in "+ux.name+", turned to nm")
	}
	if turned {
		out.Notes = append(out.Notes, "wavelengths descending, turned")
	}
	if uy.percent {
		out.Notes = append(out.Notes, "ordinates in per cent, divided by 100")
	}
	if uy.absorbance {
		out.Notes = append(out.Notes, "absorbance A read as transmittance 10^-A")
	}
	if gaps > 0 {
		out.Notes = append(out.Notes, plural(gaps, "missing ordinate")+" kept as gaps")
	}
	if ends > 0 {
		out.Notes = append(out.Notes, plural(ends, "missing ordinate")+" at an end left out")
	}
}
