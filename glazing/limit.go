package glazing

// A limit as the user typed it, and what it is called. Package glazing/limits holds ratings
// against it.

import (
	"slices"
	"strconv"
	"strings"
)

// A Limit is a requirement of a figure that the user typed in, with its source. It is the user's:
// nothing here knows what an authority asks for.
type Limit struct {
	Figure    Figure
	Place     int      // of the pane, gap or surface, from 1; 0 for every one
	AtMost    Value    // in the unit of the figure; known where the user gave it
	AtLeast   Value    // likewise
	Scope     Scope    // "" where the user gave none
	Basis     string   // its name; "" where the user gave none
	Tint      string   // a rule or the name of a tint; "" where the user gave none, which means EachTint
	Condition string   // an id; "" for none
	Makeups   []string // ids; nil for all
	Source    string   // who set the limit, and where
	Date      string   // of the source
	TypedBy   string   // who typed it in; "" where nothing says
	From      string   // file and line where it stands
}

// Scope is what a limit bounds.
type Scope string

// The scopes.
const (
	CentreScope Scope = "centre" // the centre of the glass
	WindowScope Scope = "window" // glass, edge seal and frame
)

// The tint rules of a limit. Any other word is the name of a tint, as Rating.InTint takes it.
const (
	ClearTint = "clear" // the tint of the highest light transmittance, unless one is called so
	FullTint  = "full"  // that of the lowest
	EachTint  = "each"  // every tint for itself
	WorstTint = "worst" // the tint farthest past the limit, or nearest to it
)

// Rule returns the tint rule, or the name of a tint.
func (l *Limit) Rule() string {
	if l.Tint == "" {
		return EachTint
	}
	return l.Tint
}

// For reports whether the limit is for the make-up of an id.
func (l *Limit) For(makeup string) bool {
	return l.Makeups == nil || slices.Contains(l.Makeups, makeup)
}

// Judged returns the figure that is held against the limit. Where the limit is for a condition, it is
// that of the balance which has the alias or the key of the limit's figure; ok is false where a balance
// has none such.
func (l *Limit) Judged() (f Figure, ok bool) {
	if l.Condition == "" || l.Figure.Condition != "" {
		return l.Figure, true
	}
	for _, f := range BalanceFigures() {
		if f.Alias == l.Figure.Alias && f.Alias != "" || f.Key == l.Figure.Key {
			return f.At(l.Condition), true
		}
	}
	return l.Figure, false
}

// Key returns the key of the figure that is held against the limit, with the number of the pane, gap
// or surface if the limit names one, else with "#".
func (l *Limit) Key() string {
	f, _ := l.Judged()
	if l.Place == 0 {
		return f.Key
	}
	return f.KeyAt(l.Place)
}

// String returns the requirement as a person writes it: "Ug at most 1.2 W/(m²·K)".
func (l *Limit) String() string {
	f, _ := l.Judged()
	s := f.Symbol + f.Mark
	if l.Place > 0 {
		s += strconv.Itoa(l.Place)
	}
	var bounds []string
	for _, b := range []struct {
		words string
		value Value
	}{{"at least ", l.AtLeast}, {"at most ", l.AtMost}} {
		if b.value.Known {
			bounds = append(bounds, b.words+PrintShort(b.value.Number))
		}
	}
	s += " " + strings.Join(bounds, " and ")
	if f.Unit != "" {
		s += " " + f.Unit
	}
	return s
}

// PrintShort prints a number with as many digits as it was typed with.
func PrintShort(v float64) string { return strconv.FormatFloat(v, 'g', -1, 64) }

// Terms returns what goes with the requirement: make-ups, tint, basis, scope, condition.
func (l *Limit) Terms() string {
	terms := []string{"all make-ups"}
	if l.Makeups != nil {
		terms[0] = strings.Join(l.Makeups, ", ")
	}
	switch rule := l.Rule(); rule {
	case EachTint:
		terms = append(terms, "each tint")
	case WorstTint:
		terms = append(terms, "the worst tint")
	default:
		terms = append(terms, "tint "+rule)
	}
	if l.Basis != "" {
		terms = append(terms, "basis "+l.Basis)
	}
	switch l.Scope {
	case CentreScope:
		terms = append(terms, "centre of the glass")
	case WindowScope:
		terms = append(terms, "whole window")
	}
	if l.Condition != "" {
		terms = append(terms, "condition "+l.Condition)
	}
	return strings.Join(terms, "; ")
}

// Origin returns who typed the limit in and where, from which source and of which date.
func (l *Limit) Origin() string {
	s := "typed by the user"
	if l.TypedBy != "" {
		s += " (" + l.TypedBy + ")"
	}
	if l.From != "" {
		s += " in " + l.From
	}
	said := func(text, none string) string {
		if text == "" {
			return none
		}
		return text
	}
	return s + "; source: " + said(l.Source, "none given") + "; date: " + said(l.Date, "none given")
}

// FigureNamed returns the figure that a name means, as Figure.Place reads it, and the number of the
// pane, gap or surface in the name; 0 where it stands for every one.
func FigureNamed(name string) (f Figure, place int, ok bool) {
	for _, f := range Figures() {
		if place, ok := f.Place(name); ok {
			return f, place, true
		}
	}
	return Figure{}, 0, false
}

// KeyAt returns the key with the number of a pane, gap or surface, from 1.
func (f Figure) KeyAt(place int) string {
	return strings.ReplaceAll(f.Key, "#", strconv.Itoa(place))
}

// Limitable reports whether a limit can be set for the figure: it is a number that people have a
// symbol for.
func (f Figure) Limitable() bool { return f.Value != nil && f.Symbol != "" }

// Share reports whether a figure is a share of one: a transmittance, a reflectance, g, an emissivity.
func (f Figure) Share() bool {
	return f.Small && f.Alias != "shading" || strings.HasPrefix(f.Key, "surfaces.#.emissivity")
}
