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
	minuteS        = 60
	fahrenheitPerK = 1.8 // of a difference
	fahrenheitAt0  = 32  // °F at 0 °C
	mileM          = 5280 * footM
	standardG      = 9.80665 // m/s², of the pound as a force
)

// An inchPound is a row of the table of units: a unit of the list of figures, and what stands in
// its place.
type inchPound struct {
	si, ip       string  // as printed
	siKey, ipKey string  // ends of keys
	factor       float64 // ip = si·factor + offset
	places       int     // decimals added
	offset       float64
}

// The speeds of the list are those of air indoors, which the North American trade gives in feet a
// minute; wind is another matter, see MilesPerHour.
var inchPounds = []inchPound{
	{"W/(m²·K)", "Btu/(h·ft²·°F)", "_w_m2k", "_btu_h_ft2_f", hourS * footM * footM / (btuJ * fahrenheitPerK), 1, 0},
	{"W/m²", "Btu/(h·ft²)", "_w_m2", "_btu_h_ft2", hourS * footM * footM / btuJ, 1, 0},
	{"mm", "in", "_mm", "_in", 1 / inchMM, 2, 0},
	{"kg/m²", "lb/ft²", "_kg_m2", "_lb_ft2", footM * footM / poundKG, 1, 0},
	{"K", "°F (difference)", "_k", "_f", fahrenheitPerK, 0, 0},
	{"°C", "°F", "_c", "_f", fahrenheitPerK, 0, fahrenheitAt0},
	{"m/s", "ft/min", "_m_s", "_ft_min", minuteS / footM, -2, 0},
	{"MPa", "psi", "_mpa", "_psi", 1e6 * (inchMM / 1000) * (inchMM / 1000) / (poundKG * standardG), 0, 0},
}

// placesOfU are the decimals of a U-value in Btu/(h·ft²·°F) under every basis and condition.
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
		within := f.WithinBalance() // the id of a condition may end as a unit does
		before := strings.TrimSuffix(f.Key, within)
		value, parts := f.Value, strings.Split(within, ".")
		for i := range parts {
			if stem, ok := strings.CutSuffix(parts[i], u.siKey); ok {
				parts[i] = stem + u.ipKey
			}
		}
		f.Key = before + strings.Join(parts, ".")
		f.Unit = u.ip
		f.Places += u.places
		if f.BasisU || f.Alias == "u" {
			f.BasisU, f.Places = false, placesOfU
		}
		f.Value = func(r *Rating, i int) Value {
			v := value(r, i)
			v.Number = u.of(v.Number)
			return v
		}
		break
	}
	return f
}

// of converts a number.
func (u inchPound) of(si float64) float64 { return float64(si*u.factor) + u.offset }

// ToInchPound converts a number in a unit of the list of figures, and returns the other unit; what has
// no row in the table stays as it is.
func ToInchPound(v float64, unit string) (float64, string) {
	for _, u := range inchPounds {
		if u.si == unit {
			return u.of(v), u.ip
		}
	}
	return v, unit
}

// DifferenceUnit returns the unit of a difference of two figures in a unit: of temperatures it is K, or
// °F as a difference.
func DifferenceUnit(unit string) string {
	switch unit {
	case "°C":
		return "K"
	case "°F":
		return "°F (difference)"
	}
	return unit
}

// MilesPerHour converts the speed of a wind in m/s.
func MilesPerHour(ms float64) float64 { return ms * hourS / mileM }

func millimetres(mm float64) string { return fmt.Sprintf("%.6g mm", mm) }

// inches prints a width to the thousandth, without zeros at its end.
func inches(mm float64) string {
	return strings.TrimRight(strings.TrimRight(PrintRounded(mm/inchMM, 3), "0"), ".") + " in"
}

// BuildUpInches is BuildUp with the widths of gaps in inches.
func (m *Makeup) BuildUpInches() string { return m.buildUp(inches) }
