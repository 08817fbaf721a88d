package glazing

// Inch-pound units: the figures of the list as the North American trade prints them.

import (
	"fmt"
	"strings"
)

// The units of which inch-pound units are made, exact by definition: the international foot, inch
// and pound, and the Btu of the international table, of which one a pound is 2326 J/kg.
const (
	footM          = 0.3048
	inchMM         = 25.4
	poundKG        = 0.45359237
	btuJ           = 2326 * poundKG // 1055.05585262
	hourS          = 3600
	fahrenheitPerK = 1.8 // of a difference
)

// An inchPound is a row of the table of units: a unit of the list of figures, and what stands in
// its place.
type inchPound struct {
	si, ip       string  // as printed
	siKey, ipKey string  // ends of keys
	factor       float64 // ip = si·factor
	places       int     // decimals added
}

var inchPounds = []inchPound{
	{"W/(m²·K)", "Btu/(h·ft²·°F)", "_w_m2k", "_btu_h_ft2_f", hourS * footM * footM / (btuJ * fahrenheitPerK), 1},
	{"mm", "in", "_mm", "_in", 1 / inchMM, 2},
	{"kg/m²", "lb/ft²", "_kg_m2", "_lb_ft2", footM * footM / poundKG, 1},
	{"K", "°F (difference)", "_k", "_f", fahrenheitPerK, 0},
}

// placesOfU are the decimals of a U-value in Btu/(h·ft²·°F) under every basis.
const placesOfU = 2

// InchPound returns figures in inch-pound units: unit, end of the key, decimals and value are
// converted. A figure whose unit has no row in the table stays as it is.
func InchPound(list []Figure) []Figure {
	out := make([]Figure, len(list))
	for i, f := range list {
		out[i] = f.inchPound()
	}
	return out
}

func (f Figure) inchPound() Figure {
	for _, u := range inchPounds {
		if f.Unit != u.si {
			continue
		}
		value, parts := f.Value, strings.Split(f.Key, ".")
		for i := range parts {
			if stem, ok := strings.CutSuffix(parts[i], u.siKey); ok {
				parts[i] = stem + u.ipKey
			}
		}
		f.Key = strings.Join(parts, ".")
		f.Unit = u.ip
		f.Places += u.places
		if f.BasisU {
			f.BasisU, f.Places = false, placesOfU
		}
		f.Value = func(r *Rating, i int) Value {
			v := value(r, i)
			v.Number *= u.factor
			return v
		}
		break
	}
	return f
}

func millimetres(mm float64) string { return fmt.Sprintf("%.6g mm", mm) }

// inches prints a width to the thousandth, without zeros at its end.
func inches(mm float64) string {
	return strings.TrimRight(strings.TrimRight(PrintRounded(mm/inchMM, 3), "0"), ".") + " in"
}

// BuildUpInches is BuildUp with the widths of gaps in inches.
func (m *Makeup) BuildUpInches() string { return m.buildUp(inches) }
