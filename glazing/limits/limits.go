// Package limits holds ratings against the limits that a user typed in. Each result is one of
// four: the figure meets the entered limit, does not meet it, is too close to call, or cannot be
// judged, with the reason. Both the unrounded figure and the figure as outputs round it are held
// against the limit; only where both say the same is it said.
//
// A limit is the user's. Nothing here knows what an authority asks for, and no result says more
// than how a calculated figure stands to a number that was typed in.
//
// A limit for a condition is held against the figures of the balance under it.
//
// Not in this version: whole windows, the uncertainty of what was put in.
package limits

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"panewright/glazing"
)

// A Verdict is how a figure stands to a limit, in the words in which it is printed.
type Verdict string

// The verdicts.
const (
	Meets          Verdict = "meets the entered limit"
	DoesNotMeet    Verdict = "does not meet"
	TooClose       Verdict = "too close to call"
	CannotBeJudged Verdict = "cannot be judged"
)

// Verdicts returns all verdicts, in the order in which they are counted up.
func Verdicts() []Verdict { return []Verdict{Meets, DoesNotMeet, TooClose, CannotBeJudged} }

// A Result is how one figure of a make-up stands to one limit.
type Result struct {
	Limit  *glazing.Limit // an element of the list that was judged
	Makeup *glazing.Makeup
	// Rating is what was judged; nil where no rating answers to the limit.
	Rating *glazing.Rating
	Tint   string // of the rating; without one the tint that the limit names, or ""
	Basis  string // under which the figure is meant; "" where that is not settled
	// Figure is the key of what was judged, with the number of the pane, gap or surface. Where the
	// limit is for every one, it is the worst; "#" stands where there is none.
	Figure string
	Judged glazing.Figure // of that key: the limit's, or that of the balance under its condition
	Index  int            // of that pane, gap or surface, from 0

	Value   glazing.Value // unrounded
	Rounded glazing.Value // as outputs round it
	Places  int           // decimals of that
	// Margin is the distance of the unrounded figure to the limit, above 0 where it is met; with
	// two bounds to the nearer, or to the one that is passed.
	Margin glazing.Value

	Verdict Verdict
	Why     string            // why it is too close to call, or cannot be judged
	Assumed []glazing.Caution // what the limit leaves open and was taken to be
}

// Judge holds the ratings of make-ups against limits. Ratings are of every tint of a make-up, in
// any order; those are used that are of a limit's basis. A limit without a basis takes that of the
// project if bases has just one. Results stand by make-up, and in each in the order of the limits.
//
// A limit gives one result, or one a tint if its rule says each. What it is for and no rating
// answers to gives one result that cannot be judged.
func Judge(list []glazing.Limit, makeups []*glazing.Makeup, bases []glazing.Basis, ratings []glazing.Rating) []Result {
	var out []Result
	for _, m := range makeups {
		for i := range list {
			if list[i].For(m.ID) {
				out = append(out, judge(&list[i], m, bases, ratings)...)
			}
		}
	}
	return out
}

// BasisOf returns the name of the basis that a limit is for: its own, or that of the project if
// there is just one; else "".
func BasisOf(l *glazing.Limit, bases []glazing.Basis) string {
	if l.Basis == "" && len(bases) == 1 {
		return bases[0].Name
	}
	return l.Basis
}

// AllMet reports whether there are results and each meets its limit.
func AllMet(results []Result) bool { return len(results) > 0 && Count(results, Meets) == len(results) }

// Count returns how many results have a verdict.
func Count(results []Result, v Verdict) int {
	n := 0
	for i := range results {
		if results[i].Verdict == v {
			n++
		}
	}
	return n
}

func judge(l *glazing.Limit, m *glazing.Makeup, bases []glazing.Basis, ratings []glazing.Rating) []Result {
	top := Result{Limit: l, Makeup: m, Basis: BasisOf(l, bases), Figure: l.Key(), Assumed: assumed(l, bases)}
	top.Judged, _ = l.Judged()
	rule := l.Rule()
	if rule != glazing.EachTint && rule != glazing.WorstTint {
		top.Tint = rule
	}
	if why := beyond(l, bases); why != "" {
		return []Result{top.cannot(why)}
	}
	var rated []*glazing.Rating
	var under []string
	for i := range ratings {
		if r := &ratings[i]; r.Makeup == m {
			if name := r.Method.Basis.Name; name == top.Basis {
				rated = append(rated, r)
			} else if !slices.Contains(under, name) {
				under = append(under, name)
			}
		}
	}
	switch {
	case len(rated) == 0 && len(under) == 0:
		return []Result{top.cannot("no rating of it is at hand")}
	case len(rated) == 0:
		return []Result{top.cannot("the limit is for basis " + top.Basis + ", the figures are under " + strings.Join(under, ", "))}
	}
	if top.Tint != "" {
		chosen := inTint(rated, rule)
		if len(chosen) == 0 {
			return []Result{top.cannot(noTint(m, rated, rule))}
		}
		rated = chosen
	}
	var results []Result
	for _, r := range rated {
		results = append(results, top.of(r))
	}
	if rule == glazing.WorstTint {
		return []Result{worst(results)}
	}
	return results
}

// beyond says why no figure of this version can be held against a limit, or returns "".
func beyond(l *glazing.Limit, bases []glazing.Basis) string {
	var why []string
	if l.Scope == glazing.WindowScope {
		why = append(why, "the limit is for the whole window, the figures are of the centre of the glass")
	}
	if f, ok := l.Judged(); !ok {
		why = append(why, f.Symbol+f.Mark+" is none of the figures of a condition; a limit for it names no condition")
	}
	if BasisOf(l, bases) == "" {
		names := make([]string, len(bases))
		for i, b := range bases {
			names[i] = b.Name
		}
		why = append(why, "the limit names no basis, and the project has "+strings.Join(names, ", "))
	}
	if fault := boundsFault(l); fault != "" {
		why = append(why, fault)
	}
	return strings.Join(why, "; ")
}

// boundsFault says what is wrong with the bounds of a limit that was not read from a file.
func boundsFault(l *glazing.Limit) string {
	finite := func(v glazing.Value) bool {
		return !v.Known || !math.IsNaN(v.Number) && !math.IsInf(v.Number, 0)
	}
	switch {
	case l.Figure.Value == nil:
		return "the figure is no number"
	case !l.AtMost.Known && !l.AtLeast.Known:
		return "the limit has no bound"
	case !finite(l.AtMost) || !finite(l.AtLeast):
		return "a bound of the limit is no number"
	case l.AtMost.Known && l.AtLeast.Known && l.AtMost.Number < l.AtLeast.Number:
		return "no figure can meet both bounds of the limit"
	}
	return ""
}

// assumed returns cautions on what a limit leaves open.
func assumed(l *glazing.Limit, bases []glazing.Basis) []glazing.Caution {
	var out []glazing.Caution
	if l.Basis == "" && len(bases) == 1 {
		out = append(out, glazing.Caution{Code: "limit_basis",
			Text: fmt.Sprintf("The limit %s (%s) names no basis; %s was taken, the only one of the project.", l, l.From, bases[0].Name)})
	}
	if l.Figure.Share() && (l.AtMost.Known && l.AtMost.Number == 1 || l.AtLeast.Known && l.AtLeast.Number == 1) {
		out = append(out, glazing.Caution{Code: "limit_of_one",
			Text: fmt.Sprintf("The limit %s (%s) has a bound of 1, the whole: was 1 %%, 0.01, meant?", l, l.From)})
	}
	if l.Scope == "" {
		out = append(out, glazing.Caution{Code: "limit_scope",
			Text: fmt.Sprintf("The limit %s (%s) names no scope; the centre of the glass was taken.", l, l.From)})
	}
	return out
}

// inTint returns the ratings of a tint that a limit names: clear is the state of the highest light
// transmittance and full that of the lowest, whatever their names; the one state of a make-up that
// does not switch is both.
func inTint(rated []*glazing.Rating, name string) (chosen []*glazing.Rating) {
	if extreme := name == glazing.ClearTint || name == glazing.FullTint; extreme && lightKnown(rated) {
		at := rated[0]
		for _, r := range rated[1:] {
			if d := r.Light.Transmittance.Number - at.Light.Transmittance.Number; name == glazing.ClearTint && d > 0 || name == glazing.FullTint && d < 0 {
				at = r
			}
		}
		return []*glazing.Rating{at}
	}
	for _, r := range rated {
		if r.InTint(name) || !r.Makeup.Tintable() && (name == glazing.ClearTint || name == glazing.FullTint) {
			chosen = append(chosen, r)
		}
	}
	return chosen
}

// lightKnown reports whether the light transmittance of every rating is known.
func lightKnown(rated []*glazing.Rating) bool {
	return !slices.ContainsFunc(rated, func(r *glazing.Rating) bool { return !r.Light.Transmittance.Known })
}

// noTint says that a make-up has no tint of a name.
func noTint(m *glazing.Makeup, rated []*glazing.Rating, name string) string {
	if !m.Tintable() {
		return fmt.Sprintf("it does not switch and has no tint %q", name)
	}
	var names []string
	for _, r := range rated {
		names = append(names, r.Tint)
	}
	const most = 6
	if len(names) > most {
		names = append(names[:most], "others")
	}
	return fmt.Sprintf("it has no tint %q; its tints are %s", name, strings.Join(names, ", "))
}

// placeNames are what a figure occurs per.
var placeNames = map[glazing.Per]string{glazing.PerPane: "pane", glazing.PerGap: "gap", glazing.PerSurface: "surface"}

// of judges one rating: at the place that the limit names, or at the worst of all.
func (top Result) of(r *glazing.Rating) Result {
	l := top.Limit
	top.Rating, top.Tint = r, r.Tint
	first, end := 0, top.Judged.Count(r)
	if l.Place > 0 {
		first, end = l.Place-1, min(l.Place, end)
	}
	switch {
	case top.Judged.Condition != "" && r.Balance(top.Judged.Condition) == nil:
		return top.cannot(noCondition(r, top.Judged.Condition))
	case first < end:
	case l.Place > 0:
		return top.cannot(fmt.Sprintf("it has no %s %d", placeNames[top.Judged.Per], l.Place))
	default:
		return top.cannot("it has no " + placeNames[top.Judged.Per])
	}
	var results []Result
	for i := first; i < end; i++ {
		results = append(results, top.at(i))
	}
	return worst(results)
}

// noCondition says that a rating has no balance under a condition, and under which it has one.
func noCondition(r *glazing.Rating, id string) string {
	basis := r.Method.Basis.Name
	if id == glazing.Winter || id == glazing.Summer {
		var names []string
		for _, b := range glazing.Bases() {
			if b.Balances() {
				names = append(names, b.Name)
			}
		}
		return fmt.Sprintf("%s is a condition of the bases %s, and basis %s has none", id, strings.Join(names, " and "), basis)
	}
	if id == glazing.ColdSun {
		return id + " is screened for thermal stress alone; a condition of the project that is called so has every figure"
	}
	ids := glazing.ConditionIDs([]glazing.Rating{*r})
	if len(ids) == 0 {
		return fmt.Sprintf("there is no condition %s; the project has none", id)
	}
	return fmt.Sprintf("there is no condition %s under basis %s; there are %s", id, basis, strings.Join(ids, ", "))
}

// at judges the figure at one pane, gap or surface, from 0.
func (top Result) at(i int) Result {
	l, r := top.Limit, top.Rating
	top.Index, top.Figure = i, top.Judged.KeyAt(i+1)
	v := top.Judged.Value(r, i)
	switch {
	case !v.Known:
		return top.cannot(v.Why)
	case math.IsNaN(v.Number) || math.IsInf(v.Number, 0):
		return top.cannot("the figure is no number")
	}
	top.Value, top.Places = v, top.Judged.Decimals(r, v.Number)
	top.Rounded = glazing.Value{Number: glazing.Round(v.Number, top.Places), Known: true}
	top.Margin = glazing.Value{Number: MarginOf(l, v.Number), Known: true}
	switch plain, rounded := MarginOf(l, v.Number) >= 0, MarginOf(l, top.Rounded.Number) >= 0; {
	case plain && rounded:
		top.Verdict = Meets
	case !plain && !rounded:
		top.Verdict = DoesNotMeet
	case plain:
		top.Verdict, top.Why = TooClose, "unrounded it meets the limit, rounded it does not"
	default:
		top.Verdict, top.Why = TooClose, "rounded it meets the limit, unrounded it does not"
	}
	return top
}

// binary is what binary arithmetic may add to a figure that decimals would put on a bound, of the
// figure.
const binary = 1e-12

// MarginOf returns how far a number is within the bounds of a limit; below 0 where it is past one,
// and 0 where only binary arithmetic keeps it off a bound.
func MarginOf(l *glazing.Limit, v float64) float64 {
	m := math.Inf(1)
	if l.AtMost.Known {
		m = min(m, l.AtMost.Number-v)
	}
	if l.AtLeast.Known {
		m = min(m, v-l.AtLeast.Number)
	}
	if math.Abs(m) < binary*max(1, math.Abs(v)) {
		return 0
	}
	return m
}

// cannot returns the result of what cannot be judged.
func (top Result) cannot(why string) Result {
	none := glazing.Value{Why: why}
	top.Value, top.Rounded, top.Margin = none, none, none
	top.Verdict, top.Why = CannotBeJudged, why
	return top
}

// gravity orders verdicts from the best to the worst. A figure that is past the limit settles what
// the worst is, whatever is not known beside it; one that is not known does so otherwise.
var gravity = map[Verdict]int{Meets: 0, TooClose: 1, CannotBeJudged: 2, DoesNotMeet: 3}

// worst returns the worst of some results: the gravest, and of these that of the least margin.
func worst(results []Result) Result {
	w := results[0]
	for _, r := range results[1:] {
		a, b := gravity[r.Verdict], gravity[w.Verdict]
		if a > b || a == b && r.Margin.Known && r.Margin.Number < w.Margin.Number {
			w = r
		}
	}
	return w
}
