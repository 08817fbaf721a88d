package table

// Why figures under conditions are not known: cautions of a rating say that of its own figures alone.

import (
	"slices"
	"strings"

	"panewright/glazing"
)

// A lack is one reason, the figures that it leaves unknown, and the ratings.
type lack struct {
	why     string
	figures []Choice
	of      []int
}

// heads returns those of the figures; symbols that lack under the same conditions stand together.
func (l *lack) heads() string {
	var symbols []string
	under := map[string][]string{}
	for _, c := range l.figures {
		id := c.Condition
		c.Condition = ""
		symbols, under[c.Head()] = add(symbols, c.Head()), add(under[c.Head()], id)
	}
	var parts []string
	for len(symbols) > 0 {
		ids := under[symbols[0]]
		var same, others []string
		for _, s := range symbols {
			if slices.Equal(under[s], ids) {
				same = append(same, s)
			} else {
				others = append(others, s)
			}
		}
		if len(ids) == 1 {
			parts = append(parts, strings.Join(same, "@"+ids[0]+", ")+"@"+ids[0])
		} else {
			parts = append(parts, strings.Join(same, ", ")+" in "+strings.Join(ids, ", "))
		}
		symbols = others
	}
	return strings.Join(parts, ", ")
}

// lacks returns why figures under conditions are not known in ratings that a function keeps, or in all
// where it is nil.
func (r Report) lacks(choices []Choice, keep func(*glazing.Rating) bool) (list []*lack) {
	if len(choices) == 0 {
		return nil
	}
	for i := range r.Ratings {
		x := &r.Ratings[i]
		if keep != nil && !keep(x) {
			continue
		}
		for _, c := range choices {
			if c.Condition == "" || c.Value == nil || !c.in(x) {
				continue
			}
			v := c.Value(x, c.Index)
			if v.Known {
				continue
			}
			at := slices.IndexFunc(list, func(l *lack) bool { return l.why == v.Why })
			if at < 0 {
				at = len(list)
				list = append(list, &lack{why: v.Why})
			}
			l := list[at]
			if !slices.ContainsFunc(l.figures, func(o Choice) bool { return o.Key == c.Key && o.Index == c.Index }) {
				l.figures = append(l.figures, c)
			}
			if n := len(l.of); n == 0 || l.of[n-1] != i {
				l.of = append(l.of, i)
			}
		}
	}
	return list
}

// NotKnown says why figures under conditions are not known in ratings that a function keeps, or in all
// where it is nil; "" where all are known.
func (r Report) NotKnown(choices []Choice, keep func(*glazing.Rating) bool) string {
	n := 0
	for i := range r.Ratings {
		if keep == nil || keep(&r.Ratings[i]) {
			n++
		}
	}
	var parts []string
	for _, l := range r.lacks(choices, keep) {
		s := l.heads()
		if len(l.of) < n {
			s += " [" + r.names(l.of) + "]"
		}
		parts = append(parts, s+": "+l.why)
	}
	if parts == nil {
		return ""
	}
	return "Not known: " + strings.Join(parts, "; ") + "."
}

// UnderConditions returns figures of balances under each condition of the ratings, but for those that say
// nothing without sun where there is none.
func (r Report) UnderConditions(figures []glazing.BalanceFigure) (list []Choice) {
	for _, id := range glazing.ConditionIDs(r.Ratings) {
		for _, f := range figures {
			for k := range r.most(f.Figure) {
				if c := (Choice{f.At(id), k}); !OfSun(f) || r.sunny(id) {
					list = append(list, c)
				}
			}
		}
	}
	return list
}

// sunny reports whether a condition has sun.
func (r Report) sunny(id string) bool {
	return slices.ContainsFunc(r.Ratings, func(x glazing.Rating) bool {
		b := x.Balance(id)
		return b != nil && b.Condition.SunWM2 > 0
	})
}

// Above1 says what is printed in the place of a humidity above 1.
func Above1(f glazing.Figure) string { return f.Above1 + ": at no humidity" }
