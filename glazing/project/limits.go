package project

// The limits of a project and those of a limits file, which projects share.

import (
	"crypto/sha256"
	"encoding/hex"
	"fmt"
	"slices"
	"strconv"
	"strings"

	"panewright/glazing"
)

// A LimitsFile is a file of limits that projects share.
type LimitsFile struct {
	File   string // as the user, or the project, named it
	Name   string // its title
	Author string
	Digest string          // SHA-256 of its bytes
	Limits []glazing.Limit // their make-ups are those of some project
}

// LimitsNotChecked is the code of the caution that a project's limits stand unused beside its
// figures.
const LimitsNotChecked = "limits_not_checked"

// LoadLimits reads a limits file from anywhere. The error is Errors, as that of Load.
func LoadLimits(path string) (*LimitsFile, error) {
	content, err := ReadFile(path, maxProjectBytes)
	if err != nil {
		return nil, Errors{&Problem{File: path, Text: err.Error()}}
	}
	f, faults := readLimits(path, content)
	if len(faults) > 0 {
		return nil, faults
	}
	return f, nil
}

func readLimits(file string, content []byte) (*LimitsFile, Errors) {
	r := newReader(aLimitsFile, file)
	var spec limitsFileSpec
	if r.parse(content, &spec) && len(spec.Limits) == 0 && len(r.faults) == 0 {
		r.fail(position{}, "limits", "holds no limit")
	}
	sum := sha256.Sum256(content)
	f := &LimitsFile{File: file, Name: spec.Name.value, Author: spec.Author.value, Digest: hex.EncodeToString(sum[:])}
	f.Limits = r.limits(spec.Limits, f.Author, nil)
	return f, r.faults
}

// AllLimits returns the limits for the project: its own, those of its limits file, and those of
// other files, each file once. Make-ups that such a file names and the project does not have are
// left out, with a caution.
func (p *Project) AllLimits(others ...*LimitsFile) ([]glazing.Limit, []glazing.Caution) {
	list := slices.Clone(p.Limits)
	var cautions []glazing.Caution
	var seen []string // digests
	if p.LimitsFile != nil {
		others = append([]*LimitsFile{p.LimitsFile}, others...)
	}
	for _, f := range others {
		if slices.Contains(seen, f.Digest) {
			continue
		}
		seen = append(seen, f.Digest)
		for _, l := range f.Limits {
			if l.Makeups != nil {
				own := []string{}
				for _, id := range l.Makeups {
					if p.Makeup(id) != nil {
						own = append(own, id)
						continue
					}
					cautions = append(cautions, glazing.Caution{Code: "limit_makeup_absent", Text: fmt.Sprintf(
						"The limit %s (%s) is for a make-up %s, which the project does not have: it was left out for that.", &l, l.From, id)})
				}
				if l.Makeups = own; len(own) == 0 {
					continue
				}
			}
			list = append(list, l)
		}
	}
	return list, cautions
}

// ids are those that the limits of a project may use.
type ids struct{ makeups, conditions []string }

// limits reads the limits of a project and of the limits file that it names.
func (b *builder) limits(p *Project, s *fileSpec) {
	known := &ids{conditions: []string{glazing.Winter, glazing.Summer, glazing.ColdSun}}
	for _, m := range s.Makeups {
		known.makeups = append(known.makeups, m.ID.value)
	}
	for _, c := range s.Conditions {
		if c.ID.value != glazing.ColdSun { // which a project may replace
			known.conditions = append(known.conditions, c.ID.value)
		}
	}
	p.Limits = b.reader.limits(s.Limits, p.Author, known)
	if !s.LimitsFile.given {
		return
	}
	content, err := b.bytesOf(s.LimitsFile)
	if err != nil {
		b.fail(s.LimitsFile.at, "limits_file", "%s: %v", clip(s.LimitsFile.value), err)
		return
	}
	f, faults := readLimits(s.LimitsFile.value, content)
	b.faults = append(b.faults, faults...)
	p.LimitsFile = f
}

// limits checks what the tags cannot, and returns the limits. Ids are looked up among the known
// ones, if any are given.
func (r *reader) limits(list []limitSpec, author string, known *ids) []glazing.Limit {
	var out []glazing.Limit
	for i := range list {
		if l, ok := r.limit(&list[i], known); ok {
			l.TypedBy = author
			out = append(out, l)
		}
	}
	return out
}

func (r *reader) limit(s *limitSpec, known *ids) (glazing.Limit, bool) {
	before := len(r.faults)
	l := glazing.Limit{
		Scope: glazing.Scope(s.Scope.value), Basis: s.Basis.value, Tint: s.Tint.value, Condition: s.Condition.value,
		Source: s.Source.value, Date: s.Date.value, From: fmt.Sprintf("%s:%d", r.file, s.At.line),
	}
	if s.Figure.given {
		var ok bool
		if l.Figure, l.Place, ok = figureNamed(s.Figure.value, s.Condition.value); !ok {
			r.fail(s.Figure.at, "figure", "unknown figure %q; %s", clip(s.Figure.value), offerFigure(s.Figure.value, s.Condition.given))
		} else if !l.Figure.Limitable() || l.Figure.Numbering {
			r.fail(s.Figure.at, "figure", "%s is no figure that a limit can be set for", clip(s.Figure.value))
		}
	}
	if known != nil {
		for _, m := range s.Makeups.values {
			if !slices.Contains(known.makeups, m.value) && !r.incomplete["id"] && !r.incomplete["makeups"] {
				r.fail(m.at, "makeups", "unknown make-up %q; %s", clip(m.value), Offer(m.value, known.makeups))
			}
		}
		if c := s.Condition; c.given && !slices.Contains(known.conditions, c.value) && !r.incomplete["id"] && !r.incomplete["conditions"] {
			r.fail(c.at, "condition", "unknown condition %q; %s", clip(c.value), Offer(c.value, known.conditions))
		}
	}
	for _, m := range s.Makeups.values {
		l.Makeups = append(l.Makeups, m.value)
	}
	for _, x := range []struct {
		key  string
		is   number
		into *glazing.Value
	}{{"at_most", s.AtMost, &l.AtMost}, {"at_least", s.AtLeast, &l.AtLeast}} {
		if !x.is.given {
			continue
		}
		*x.into = x.is.orUnknown()
		if fault := boundFault(l.Figure, x.is.value); fault != "" {
			r.fail(x.is.at, x.key, "%s %s", short(x.is.value), fault)
		}
	}
	switch {
	case s.Faulty:
	case !s.AtMost.given && !s.AtLeast.given:
		r.fail(s.At, "limits", "a limit has at_most or at_least")
	case s.AtMost.given && s.AtLeast.given && s.AtMost.value < s.AtLeast.value:
		r.fail(s.At, "limits", "at_most is below at_least; no figure can meet both")
	}
	return l, !s.Faulty && len(r.faults) == before
}

// ratioMost is far beyond any ratio of two figures.
const ratioMost = 10

// boundFault says why a bound was not meant for a figure: every figure would meet it, or none.
func boundFault(f glazing.Figure, bound float64) string {
	ratio := f.Alias == "shading" || f.Alias == "light_to_solar"
	signed := strings.HasPrefix(f.Key, "colour.") || f.Unit == "°C" || f.Unit == "K" || f.Unit == "W/m²" // heat goes either way
	share := f.Share() || strings.HasSuffix(f.Key, "_rh") || strings.HasSuffix(f.Key, "temperature_factor")
	switch {
	case share && bound > 1:
		return "is above 1; " + f.Symbol + " is a fraction of one, not percent"
	case ratio && bound > ratioMost:
		return "is no ratio; " + f.Symbol + " is about 1, not percent"
	case f.Alias == "ra" && bound > 0 && bound <= 1:
		return "is no rendering index; it runs to 100"
	case f.Unit == "°C" && bound <= absoluteZeroC:
		return "is not above " + short(absoluteZeroC) + " °C, absolute zero"
	case bound < 0 && !signed:
		return "is below 0, and " + f.Symbol + " never is"
	}
	return ""
}

// figureNamed returns the figure that a name means, and the number in the name; where a limit is for a
// condition, a figure that only balances have too.
func figureNamed(name, condition string) (f glazing.Figure, place int, ok bool) {
	if f, place, ok = glazing.FigureNamed(name); ok || condition == "" {
		return f, place, ok
	}
	for _, x := range glazing.BalanceFigures() {
		if place, ok := x.Place(name); ok {
			return x.At(condition), place, true
		}
	}
	return glazing.Figure{}, 0, false
}

// offerFigure says what to do about a name that is no figure: it may be one under a condition; else it
// offers the nearest names, keys with the number that the name has.
func offerFigure(name string, balances bool) string {
	figure, id, at := strings.Cut(name, "@")
	under := slices.ContainsFunc(glazing.BalanceFigures(), func(f glazing.BalanceFigure) bool { return f.Named(figure) })
	switch _, _, ok := figureNamed(figure, glazing.Winter); {
	case ok && at && !under:
		return figure + " is not one of the figures under a condition; write figure: " + figure
	case ok && at && id == "":
		return "write figure: " + figure + ", and under condition: its id"
	case ok && at:
		return "write figure: " + figure + " and condition: " + clip(id)
	case ok && !balances:
		return "it is one under a condition; name that with condition"
	}
	place := 1
	for part := range strings.SplitSeq(name, ".") {
		if n, err := strconv.Atoi(part); err == nil {
			place = max(1, n)
		}
	}
	var aliases, keys []string
	for _, f := range glazing.Figures() {
		if f.Limitable() {
			aliases, keys = append(aliases, f.Alias), append(keys, f.KeyAt(place))
		}
	}
	if balances {
		for _, f := range glazing.BalanceFigures() {
			if !f.Numbering {
				aliases = append(aliases, f.Alias)
			}
		}
	}
	if all := append(keys, aliases...); len(Nearest(name, all)) > 0 {
		return Offer(name, all)
	}
	return Offer(name, aliases)
}
