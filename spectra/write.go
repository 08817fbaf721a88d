package spectra

// The writer of our CSV, and how columns of several files come onto one list of wavelengths.

import (
	"bytes"
	"fmt"
	"io"
	"math"
	"slices"
	"strings"
)

// A namedColumn is a column with the head under which it stands in a file.
type namedColumn struct {
	head string
	Column
}

// named returns the columns that hold anything, in the order in which they are written.
func (c Columns) named() (list []namedColumn) {
	for _, x := range []namedColumn{{headTau, c.Tau}, {headRhoFront, c.RhoFront}, {headRhoBack, c.RhoBack}} {
		if x.Len() > 0 {
			list = append(list, x)
		}
	}
	return list
}

// WriteCSV writes columns as a spectrum file, with a # line for each comment, that ReadCSV reads
// back bit for bit: points and gaps. A cell is blank beyond the ends of its column and where a
// column that stopped goes on in the infrared; it is ? in a gap, which gets a row of its own where
// no other column has one. A gap between two neighbouring floating-point numbers holds no
// wavelength and is left out. No value is made up: it is an error where a column lacks a value that
// the file would need, and OnOneGrid mends that.
func WriteCSV(w io.Writer, c Columns, comments []string) error {
	list := c.named()
	grid := unionOf(list)
	switch {
	case len(list) == 0:
		return fmt.Errorf("no column tau, rho_front or rho_back to write")
	case len(grid) < minimumRows:
		return fmt.Errorf("%d rows; a spectrum has at least %d", len(grid), minimumRows)
	case grid[len(grid)-1] < leastLastNM:
		return fmt.Errorf("the last wavelength is %s nm; a spectrum goes further", short(grid[len(grid)-1]))
	}
	var b bytes.Buffer
	for _, text := range comments {
		b.WriteString("# " + strings.TrimSpace(Clip(text, commentLetters)) + "\n")
	}
	b.WriteString(headNM)
	for _, x := range list {
		b.WriteString("," + x.head)
	}
	b.WriteByte('\n')
	for _, x := range list {
		if len(x.Gaps) > maxGaps {
			return fmt.Errorf("%s lacks values in %d places; more than %d are no spectrum", x.head, len(x.Gaps), maxGaps)
		}
	}
	at := make([]int, len(list))  // the first point at or beyond the row, by column
	gap := make([]int, len(list)) // the first gap that ends beyond the row
	for _, nm := range grid {
		b.WriteString(short(nm))
		for k, x := range list {
			for at[k] < x.Len() && x.NM[at[k]] < nm {
				at[k]++
			}
			for gap[k] < len(x.Gaps) && x.Gaps[gap[k]].ToNM <= nm {
				gap[k]++
			}
			b.WriteByte(',')
			switch i := at[k]; {
			case i == x.Len() || i == 0 && x.NM[0] != nm:
			case x.NM[i] == nm && (math.IsNaN(x.Value[i]) || math.IsInf(x.Value[i], 0)):
				return fmt.Errorf("%s at %s nm is not a finite number", x.head, short(nm))
			case x.NM[i] == nm:
				b.WriteString(short(x.Value[i]))
			case gap[k] < len(x.Gaps) && x.Gaps[gap[k]].FromNM < nm:
				b.WriteString(missingCell)
			case x.NM[i] <= SolarLastNM:
				return fmt.Errorf("%s has no value at %s nm, where another column has one", x.head, short(nm))
			}
		}
		b.WriteByte('\n')
	}
	if b.Len() > MaxBytes {
		return fmt.Errorf("the file would be larger than %d MB, and nothing would read it", MaxBytes>>20)
	}
	_, err := w.Write(b.Bytes())
	return err
}

// unionOf returns the wavelengths of all columns, with one inside each gap that has none.
func unionOf(list []namedColumn) []float64 {
	var lists [][]float64
	for _, x := range list {
		lists = append(lists, x.NM)
	}
	grid := NewGrid(lists...).NM
	var more []float64
	for _, x := range list {
		for _, g := range x.Gaps {
			i, found := slices.BinarySearch(grid, g.FromNM)
			if found {
				i++
			}
			if i < len(grid) && grid[i] < g.ToNM {
				continue
			}
			if middle := g.FromNM + (g.ToNM-g.FromNM)/2; middle > g.FromNM && middle < g.ToNM {
				more = append(more, middle)
			}
		}
	}
	return NewGrid(grid, more).NM
}

// OnOneGrid returns the columns on the wavelengths of all of them, interpolated linearly where a
// column has no point of its own, and says of which columns that was done and how far it reached.
// Nothing is made up beyond an end of a column, in a gap, or between the solar range and the
// infrared. A column that needs nothing keeps its bits.
func (c Columns) OnOneGrid() (Columns, []string) {
	list := c.named()
	grid := unionOf(list)
	var notes []string
	for _, x := range list {
		out, added, widest := x.onGrid(grid)
		if added == 0 {
			continue
		}
		notes = append(notes, fmt.Sprintf("%s: %d of %d values were interpolated linearly, to have the wavelengths of the other columns; the widest step between two of its own was %s nm, from %s nm",
			x.head, added, out.Len(), Brief(widest.ToNM-widest.FromNM), shortNM(widest.FromNM)))
		switch x.head {
		case headTau:
			c.Tau = out
		case headRhoFront:
			c.RhoFront = out
		case headRhoBack:
			c.RhoBack = out
		}
	}
	return c, notes
}

// onGrid returns the column with points added by interpolation at the wavelengths of grid, which
// holds its own; how many; and the widest step of the column that one was added in.
func (c Column) onGrid(grid []float64) (out Column, added int, widest Span) {
	out = Column{File: c.File, Curve: Curve{Gaps: c.Gaps}}
	i, gap := 0, 0 // the first point at or beyond nm, and the first gap that ends beyond it
	for _, nm := range grid {
		for i < c.Len() && c.NM[i] < nm {
			i++
		}
		for gap < len(c.Gaps) && c.Gaps[gap].ToNM <= nm {
			gap++
		}
		switch {
		case i == c.Len() || i == 0 && c.NM[0] != nm:
			continue
		case c.NM[i] == nm:
		case gap < len(c.Gaps) && c.Gaps[gap].FromNM < nm:
			continue
		case c.NM[i] > SolarLastNM+stepSolarNM && c.NM[i-1] < InfraredFirstNM:
			continue // between the solar range, as a rating sees it, and the infrared
		default:
			added++
			if step := c.NM[i] - c.NM[i-1]; step > widest.ToNM-widest.FromNM {
				widest = Span{c.NM[i-1], c.NM[i]}
			}
		}
		out.NM, out.Value = append(out.NM, nm), append(out.Value, c.between(i, nm))
		if len(c.Line) == c.Len() {
			out.Line = append(out.Line, c.Line[i])
		}
	}
	return out, added, widest
}

// WithInfrared returns the columns with the infrared reflectance of a face, from 5 µm on, taken from
// a column of its own where one is given; as Join does, for a single file to hold all.
func (c Columns) WithInfrared(front, back Column) Columns {
	join := func(rho, own Column) Column {
		if own.Len() == 0 {
			return rho
		}
		i, _ := slices.BinarySearch(rho.NM, InfraredFirstNM)
		j, _ := slices.BinarySearch(own.NM, InfraredFirstNM)
		near, far := rho.slice(0, i), own.slice(j, own.Len())
		out := Column{File: own.File, Curve: Curve{
			NM: slices.Concat(near.NM, far.NM), Value: slices.Concat(near.Value, far.Value), Gaps: slices.Concat(near.Gaps, far.Gaps),
		}}
		if len(rho.Line) == rho.Len() && len(own.Line) == own.Len() {
			out.Line = slices.Concat(rho.Line[:i], own.Line[j:])
		}
		return out
	}
	c.RhoFront, c.RhoBack = join(c.RhoFront, front), join(c.RhoBack, back)
	return c
}
