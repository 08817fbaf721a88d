package spectra

// What the user says of the layout of a foreign text file.

import (
	"fmt"
	"maps"
	"slices"
	"strings"
	"unicode"
)

// A Layout says how a foreign text file is to be read. The zero value has fractions of one, decimal
// points and wavelengths in nm.
type Layout struct {
	Percent      bool // the values are per cent
	DecimalComma bool
	Separator    rune // between cells, ' ' for any blanks; 0: told from the rows
	// Columns are the places of wavelength, tau, rho_front and rho_back, counted from 1; other
	// columns are left out. The wavelength is 1 where it is absent. Empty: heads as those of our
	// own CSV say what the columns are.
	Columns map[string]int
	Second  string // what the second column of a file of two is, where nothing else says it
	Unit    string // nm, also where it is blank; um or 1/cm
}

// Wavelength is the key of the wavelength in Layout.Columns.
const Wavelength = "wavelength"

// The units of a foreign wavelength.
const (
	UnitNM         = "nm"
	UnitUM         = "um"
	UnitReciprocal = "1/cm"
)

// LayoutColumns returns the keys of Layout.Columns.
func LayoutColumns() []string { return []string{Wavelength, headTau, headRhoFront, headRhoBack} }

// LayoutUnits returns the units that a foreign wavelength may have.
func LayoutUnits() []string { return []string{UnitNM, UnitUM, UnitReciprocal} }

// UnitNamed returns the unit of a layout that somebody spells in one of the ways of the trade, such as
// µm or cm-1; "" of one that is not known.
func UnitNamed(name string) string {
	switch unitOfX(name).name {
	case "nm":
		return UnitNM
	case "µm":
		return UnitUM
	case "1/cm":
		return UnitReciprocal
	}
	return ""
}

// Check says why nothing can have such a layout, or returns "".
func (l Layout) Check() string {
	switch s := l.Separator; {
	case s == 0:
	case unicode.IsLetter(s) || unicode.IsDigit(s) || unicode.IsControl(s) && s != '\t' || strings.ContainsRune(`.+-"?%`, s) || s == unicode.ReplacementChar:
		return fmt.Sprintf("%q cannot separate cells", s)
	}
	if l.Unit != "" && !slices.Contains(LayoutUnits(), l.Unit) {
		return fmt.Sprintf("unit %q of the wavelength; known are %s", clip(l.Unit), strings.Join(LayoutUnits(), ", "))
	}
	if l.Second != "" && (l.Second == Wavelength || !slices.Contains(LayoutColumns(), l.Second)) {
		return fmt.Sprintf("the second column cannot be %q", clip(l.Second))
	}
	if len(l.Columns) == 0 {
		return ""
	}
	for _, key := range slices.Sorted(maps.Keys(l.Columns)) {
		if !slices.Contains(LayoutColumns(), key) {
			return fmt.Sprintf("unknown quantity %q; known are %s", clip(key), strings.Join(LayoutColumns(), ", "))
		}
	}
	at := map[int]string{}
	places := l.placed()
	for _, key := range LayoutColumns() {
		n, ok := places[key]
		switch {
		case !ok:
			continue
		case n < 1 || n > maxColumns:
			return fmt.Sprintf("%s is column %d; columns are counted from 1 to %d", key, n, maxColumns)
		case at[n] != "":
			return fmt.Sprintf("column %d cannot be both %s and %s", n, at[n], key)
		}
		at[n] = key
	}
	if len(at) < 2 {
		return "no column tau, rho_front or rho_back is named"
	}
	return ""
}

// placed returns Columns with the wavelength in it.
func (l Layout) placed() map[string]int {
	out := map[string]int{Wavelength: 1}
	maps.Copy(out, l.Columns)
	return out
}

// plain reads a number with the decimal sign of the layout.
func (l Layout) plain(cell string) (v float64, problem string) {
	switch {
	case !l.DecimalComma:
		v, problem = number(cell)
		if problem != "" && strings.Contains(cell, ",") {
			problem = "not a number; decimal commas? add --decimal-comma"
		}
		return v, problem
	case strings.Contains(cell, "."):
		return 0, "a point in it, and the file has decimal commas"
	}
	return number(strings.ReplaceAll(cell, ",", "."))
}

// quantity reads a transmittance or a reflectance as a fraction of one.
func (l Layout) quantity(cell string) (v float64, problem string) {
	if !l.Percent {
		return l.plain(cell)
	}
	cell = strings.TrimSpace(strings.TrimSuffix(cell, "%"))
	if v, problem = l.plain(cell); problem != "" {
		return 0, problem
	}
	if strings.ContainsAny(cell, "eE") {
		return v / 100, ""
	}
	return l.plain(cell + "e-2") // 91.2 is 0.912 and not what is left of a division
}

// nanometres converts what the column of the wavelength holds.
func (l Layout) nanometres(v float64) float64 {
	switch l.Unit {
	case UnitUM:
		return toNM(v, 1000)
	case UnitReciprocal:
		return reciprocalNM / v
	}
	return v
}

// reciprocalNM is a centimetre in nm: the product of a wavelength in nm and its wavenumber in 1/cm.
const reciprocalNM = 1e7

// maxLine is how long a line may be, in bytes, that is looked at for numbers.
const maxLine = 1 << 16

// split returns the cells of a line, or none where they are too many to be looked at. A cell in quotes
// may hold the separator.
func split(line string, separator rune) []string {
	if len(line) > maxLine {
		return nil
	}
	if separator == ' ' {
		cells := strings.Fields(line)
		for i, cell := range cells {
			cells[i] = unquoted(cell)
		}
		return cells
	}
	var cells []string
	for more := true; more && len(cells) <= maxColumns; {
		var cell string
		cell, line, more = cutCell(line, string(separator))
		cells = append(cells, unquoted(cell))
	}
	return cells
}

// cutCell cuts the first cell off a line.
func cutCell(line, separator string) (cell, rest string, more bool) {
	if begins := strings.TrimLeft(line, " "); strings.HasPrefix(begins, `"`) {
		quoted, after, closed := strings.Cut(begins[1:], `"`)
		after = strings.TrimLeft(after, " ")
		if rest, more = strings.CutPrefix(after, separator); closed && (more || strings.TrimSpace(after) == "") {
			return quoted, rest, more
		}
	}
	return strings.Cut(line, separator)
}

// unquoted returns a cell without blanks and without quotes at both its ends.
func unquoted(cell string) string {
	cell = strings.TrimSpace(cell)
	if n := len(cell); n > 1 && cell[0] == '"' && cell[n-1] == '"' {
		cell = strings.TrimSpace(cell[1 : n-1])
	}
	return cell
}

func separatorName(s rune) string {
	switch s {
	case ';':
		return "semicolons"
	case '\t':
		return "tabs"
	case ',':
		return "commas"
	case ' ':
		return "blanks"
	}
	return fmt.Sprintf("%q", s)
}
