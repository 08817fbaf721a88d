package spectra

// The units of JCAMP-DX spectra, in the spellings that programs write.

import (
	"fmt"
	"math"
	"strings"
	"unicode"
)

// bare returns a text in capitals without blanks, brackets and marks; micro is U, ångström A, a
// superscript one 1.
func bare(s string) string {
	return strings.Map(func(c rune) rune {
		switch c {
		case ' ', '\t', ',', '-', '_', '.', '^', '*', '(', ')', '[', ']', '\u207b', '\u00af', '\u2212':
			return -1
		case '\u00b5', '\u03bc':
			return 'U'
		case '\u00b9':
			return '1'
		case '\u00c5', '\u00e5', '\u212b':
			return 'A'
		case '\u00d6', '\u00f6':
			return 'O'
		}
		return unicode.ToUpper(c)
	}, s)
}

// A unitX is a unit of the abscissa: its nm, or 0 for wavenumbers. Without a name it is none that
// an optical spectrum has.
type unitX struct {
	name string
	nm   float64
}

func unitOfX(s string) unitX {
	// "Nanometers (nm)" names the unit twice
	if i := strings.IndexAny(s, "(["); i >= 0 {
		if u := unitOfX(s[:i]); u.name != "" && u == unitOfX(s[i+1:]) {
			return u
		}
	}
	unit := bare(s)
	for _, quantity := range []string{"WAVELENGTHS", "WAVELENGTH", "WAVENUMBERS", "WAVENUMBER"} {
		rest, ok := strings.CutPrefix(unit, quantity)
		if !ok {
			continue
		}
		if rest = strings.TrimPrefix(rest, "IN"); rest != "/CM" {
			rest = strings.TrimPrefix(rest, "/")
		}
		if rest != "" {
			unit = rest
		}
		break
	}
	switch unit {
	case "NM", "NANOMETER", "NANOMETERS", "NANOMETRE", "NANOMETRES":
		return unitX{"nm", 1}
	case "UM", "MICROMETER", "MICROMETERS", "MICROMETRE", "MICROMETRES", "MICRON", "MICRONS":
		return unitX{"µm", 1000}
	case "ANGSTROM", "ANGSTROMS":
		return unitX{"ångström", 0.1}
	case "A":
		if !strings.ContainsAny(s, "aA") { // the letter with the ring alone
			return unitX{"ångström", 0.1}
		}
	case "1/CM", "CM1", "/CM", "WAVENUMBER", "WAVENUMBERS", "RECIPROCALCENTIMETERS", "RECIPROCALCENTIMETRES",
		"RECIPROCALCM", "INVERSECENTIMETERS", "INVERSECENTIMETRES", "INVERSECM", "KAYSER", "KAYSERS":
		return unitX{"1/cm", 0}
	}
	return unitX{}
}

// wavelength converts x, which is above 0, to nm.
func (u unitX) wavelength(x float64) float64 {
	x = undusted(x, 1e6)
	if u.nm == 0 {
		return reciprocalNM / x
	}
	return toNM(x, u.nm)
}

// undusted returns the whole number of parts of one that v is, but for what some roundings of
// binary arithmetic added; else v.
func undusted(v, parts float64) float64 {
	if r := math.Round(v*parts) / parts; math.Abs(r-v) < 4e-15*math.Abs(v) {
		return r
	}
	return v
}

// A unitY is what the ordinates are. Without a quantity they are nothing that a pane needs.
type unitY struct {
	quantity            Quantity
	percent, absorbance bool
}

func unitOfY(s string) unitY {
	unit, percent := bare(s), false
	for _, sign := range []string{"%", "PERCENT", "PCT"} {
		if strings.Contains(unit, sign) {
			unit, percent = strings.ReplaceAll(unit, sign, ""), true
		}
	}
	switch strings.TrimSuffix(strings.Trim(unit, "/"), "IN") {
	case "T", "TRANS", "TRANSMITTANCE", "TRANSMISSION":
		return unitY{Transmittance, percent, false}
	case "R", "REFL", "REFLECTANCE", "REFLECTION":
		return unitY{Reflectance, percent, false}
	case "A", "ABS", "ABSORBANCE", "ABSORBANCEUNITS", "OD", "OPTICALDENSITY":
		if !percent {
			return unitY{Transmittance, false, true}
		}
	}
	return unitY{}
}

// mostAbsorbance is beyond what any spectrometer reads; common practice, no source.
const mostAbsorbance = 12

// fraction turns an ordinate into a fraction of one; problem says why it is none.
func (u unitY) fraction(y float64) (v float64, problem string) {
	switch {
	case u.absorbance:
		v = math.Pow(10, -y)
	case u.percent:
		v = undusted(y/100, 1e12)
	default:
		v = undusted(y, 1e12)
	}
	problem = fraction(v)
	switch {
	case u.absorbance && y > mostAbsorbance:
		return v, fmt.Sprintf("absorbance %s: no instrument reads beyond %d; two numbers run together?", Brief(y), mostAbsorbance)
	case problem == "":
		return v, ""
	case u.absorbance:
		return v, fmt.Sprintf("absorbance %s: a transmittance of %s, not in 0..1", Brief(y), Brief(v))
	case u.percent:
		return v, fmt.Sprintf("%s %s %%: not in 0..100", u.quantity, Brief(y))
	case v > 1 && v <= 100+100*Slack:
		return v, fmt.Sprintf("%s %s: not in 0..1; per cent? ##YUNITS= must say so, as %% %s", u.quantity, Brief(v), strings.ToUpper(string(u.quantity)))
	}
	return v, fmt.Sprintf("%s %s: %s", u.quantity, Brief(v), problem)
}
