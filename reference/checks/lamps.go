package checks

// The lamps whose rendering index and chromaticity the CIE publishes.

import (
	_ "embed" // the file of lamps
	"encoding/csv"
	"fmt"
	"strconv"
	"strings"
	"sync"
)

//go:embed spectra/lamps.csv
var lampFile string

// Lamp returns the relative spectral power of an illuminant of the CIE, fl1 to fl12, from 380 to
// 780 nm at 5 nm. The slices are shared and must not be written to. ok is false for any other name.
func Lamp(name string) (wavelengthNM, power []float64, ok bool) {
	t := lamps()
	power, ok = t[name]
	ok = ok && name != lampWavelengths
	return t[lampWavelengths], power, ok
}

const lampWavelengths = "wavelength_nm"

var lamps = sync.OnceValue(func() map[string][]float64 {
	t, err := readColumns(lampFile)
	if err != nil {
		panic("checks: lamps: " + err.Error())
	}
	return t
})

// readColumns reads a table of numbers by the heads of its columns.
func readColumns(text string) (map[string][]float64, error) {
	r := csv.NewReader(strings.NewReader(text))
	r.Comment = '#'
	rows, err := r.ReadAll()
	if err != nil {
		return nil, err
	}
	out := map[string][]float64{}
	for i, row := range rows[1:] {
		for k, cell := range row {
			v, err := strconv.ParseFloat(cell, 64)
			if err != nil {
				return nil, fmt.Errorf("row %d: %q is not a number", i+1, cell)
			}
			out[rows[0][k]] = append(out[rows[0][k]], v)
		}
	}
	return out, nil
}
