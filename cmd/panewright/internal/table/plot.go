package table

// Curves over wavelength as a plot of letters, for a terminal or a pipe.

import (
	"bytes"
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"panewright/spectra"
)

// A PlotCurve is a curve of fractions of one with its name and the letter that draws it.
type PlotCurve struct {
	Name  string
	Mark  rune
	Curve spectra.Curve
}

const (
	meeting     = '#' // drawn where curves of different marks meet
	plotRows    = 20  // steps from 0 to 1
	plotRowsFar = 10  // the same in the plot of the infrared
	plotLabels  = 5   // columns of the labels of the vertical axis, and the axis
	plotColumns = Width - plotLabels
)

// Plot draws curves from 0 to 1 over wavelength: up to 2500 nm, and below in a plot of its own what
// lies beyond. A column of the page shows the values from the least to the greatest that a curve
// has there. Where curves meet stands #, so that none hides another. Gaps stay blank.
func Plot(b *bytes.Buffer, curves []PlotCurve) {
	var near, far []PlotCurve
	var legend []string
	for _, c := range curves {
		n, _ := slices.BinarySearch(c.Curve.NM, math.Nextafter(spectra.SolarLastNM, math.Inf(1)))
		for _, part := range []struct {
			into     *[]PlotCurve
			from, to int
		}{{&near, 0, n}, {&far, n, c.Curve.Len()}} {
			if part.from < part.to {
				*part.into = append(*part.into, PlotCurve{c.Name, c.Mark, spectra.Curve{
					NM: c.Curve.NM[part.from:part.to], Value: c.Curve.Value[part.from:part.to], Gaps: c.Curve.Gaps}})
			}
		}
		if c.Curve.Len() > 0 {
			legend = append(legend, entry(c.Mark, c.Name))
		}
	}
	if len(legend) > 1 {
		legend = append(legend, entry(meeting, "where curves meet"))
	}
	plot(b, near, plotRows, 1, "nm")
	if len(near) > 0 && len(far) > 0 {
		b.WriteByte('\n')
	}
	plot(b, far, plotRowsFar, 1000, "µm")
	if legend != nil {
		writeWrapped(b, "   "+strings.Join(legend, " "), "   ")
	}
}

// entry returns one of the legend, which holds together and stands off the one before.
func entry(mark rune, name string) string {
	return strings.ReplaceAll("  "+string(mark)+" "+name, " ", "\u00a0")
}

// plot draws curves in a number of rows, with an axis in a unit of so many nm.
func plot(b *bytes.Buffer, curves []PlotCurve, rows int, unitNM float64, unit string) {
	if len(curves) == 0 {
		return
	}
	first, last := math.Inf(1), math.Inf(-1)
	for _, c := range curves {
		first, last = min(first, c.Curve.First()), max(last, c.Curve.Last())
	}
	if last-first < 1 {
		first, last = first-1, last+1 // a single point
	}
	perColumn := (last - first) / (plotColumns - 1)
	cells := make([][]rune, rows+1)
	for i := range cells {
		cells[i] = slices.Repeat([]rune{' '}, plotColumns)
	}
	for _, c := range curves {
		draw(cells, c, first, perColumn)
	}
	for i, row := range cells {
		label, axis := "    ", "|"
		if i*5%rows == 0 { // at every 0.2
			label, axis = fmt.Sprintf("%.1f ", 1-float64(i)/float64(rows)), "+"
		}
		b.WriteString(strings.TrimRight(label+axis+string(row), " ") + "\n")
	}
	step := tickStep(first/unitNM, last/unitNM)
	line, labels := slices.Repeat([]rune{'-'}, plotColumns), slices.Repeat([]rune{' '}, plotColumns)
	free := 0 // the first column that no label takes
	for k := math.Ceil(first / unitNM / step); float64(k*step) <= last/unitNM; k++ {
		x := float64(k * step)
		at := int(math.Round((x*unitNM - first) / perColumn))
		line[at] = '+'
		text := []rune(strconv.FormatFloat(x, 'g', 6, 64))
		if from := min(max(at-len(text)/2, 0), plotColumns-len(text)); from >= free {
			copy(labels[from:], text)
			free = from + len(text) + 1
		}
	}
	b.WriteString("    +" + string(line) + "\n")
	b.WriteString(strings.TrimRight(fmt.Sprintf("%3s  ", unit)+string(labels), " ") + "\n")
}

// draw puts one curve into the cells, whose columns lie so many nm apart.
func draw(cells [][]rune, p PlotCurve, first, perColumn float64) {
	c, rows := p.Curve, len(cells)-1
	row := func(v float64) int { return int(math.Round((1 - min(max(v, 0), 1)) * float64(rows))) }
	i := 0
	for k := range cells[0] {
		nm := first + float64(k)*perColumn
		least, greatest := math.Inf(1), math.Inf(-1)
		see := func(v float64) { least, greatest = min(least, v), max(greatest, v) }
		if nm >= c.First() && nm <= c.Last() && !c.InGap(nm) {
			see(c.At(nm))
		}
		for ; i < c.Len() && (c.NM[i] < nm+perColumn/2 || k == len(cells[0])-1); i++ {
			see(c.Value[i])
		}
		if !(least <= greatest) {
			continue
		}
		for r := row(greatest); r <= row(least); r++ {
			switch cell := &cells[r][k]; *cell {
			case ' ', p.Mark:
				*cell = p.Mark
			default:
				*cell = meeting
			}
		}
	}
}

// tickStep is the least of 1, 2 and 5 times a power of ten that leaves room for labels.
func tickStep(first, last float64) float64 {
	const room = 6 // columns from one tick to the next
	least := (last - first) * room / plotColumns
	for step := math.Pow(10, math.Floor(math.Log10(least))); ; step *= 10 {
		for _, m := range []float64{1, 2, 5} {
			if m*step >= least {
				return m * step
			}
		}
	}
}
