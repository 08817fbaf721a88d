package table

// The check for programs: JSON and CSV, with all digits.

import (
	"strconv"
	"strings"

	"panewright/glazing"
	"panewright/glazing/limits"
)

// scopeOf returns the scope of a limit, or what is taken for it.
func scopeOf(l *glazing.Limit) string {
	if l.Scope == "" {
		return string(glazing.CentreScope)
	}
	return string(l.Scope)
}

// CheckJSON returns the check as JSON: one object a result, null where a number is not known or not
// given.
func CheckJSON(c Check) []byte {
	top := newNode()
	c.said(top)
	top.set(strconv.FormatBool(limits.AllMet(c.Results)), "all_met")
	texts := func(n *node, list []string) {
		n.list = true
		for i, s := range list {
			n.set(quoted(s), strconv.Itoa(i))
		}
	}
	cautions := func(n *node, list []glazing.Caution) {
		n.list = true
		for i, x := range list {
			item := n.at(strconv.Itoa(i))
			item.set(quoted(x.Code), "code")
			item.set(quoted(x.Text), "text")
		}
	}
	texts(top.at("notice"), checkNotice)
	list := top.at("limits")
	list.list = true
	for i := range c.Results {
		x := &c.Results[i]
		l, n := x.Limit, list.at(strconv.Itoa(i))
		n.set(quoted(x.Makeup.ID), "makeup")
		n.set(quoted(x.Tint), "tint")
		n.set(quoted(x.Basis), "basis")
		n.set(quoted(x.Figure), "figure")
		n.set(quoted(x.Judged.Unit), "unit")
		n.set(jsonValue(x.Value), "value")
		n.set(jsonValue(x.Rounded), "rounded")
		n.set(jsonValue(l.AtMost), "at_most")
		n.set(jsonValue(l.AtLeast), "at_least")
		n.set(quoted(scopeOf(l)), "scope")
		n.set(quoted(l.Condition), "condition")
		n.set(quoted(l.Rule()), "tint_rule")
		n.set(quoted(string(x.Verdict)), "result")
		n.set(jsonValue(x.Margin), "margin")
		n.set(quoted(x.Why), "reason")
		n.set(quoted(l.Source), "source")
		n.set(quoted(l.Date), "date")
		n.set(quoted(l.TypedBy), "typed_by")
		n.set(quoted(l.From), "limit_from")
		cautions(n.at("cautions"), x.Assumed)
	}
	files := top.at("limits_files")
	files.list = true
	for i, f := range c.Files {
		n := files.at(strconv.Itoa(i))
		n.set(quoted(f.File), "file")
		n.set(quoted(f.Name), "name")
		n.set(quoted(f.Digest), "sha256")
	}
	editions := top.at("editions")
	for _, x := range c.editions() {
		editions.set(quoted(x.editions), x.basis)
	}
	all := c.remarks()
	for i := range c.Ratings {
		for _, x := range c.Report.cautions(i) {
			all = addCaution(all, x)
		}
	}
	cautions(top.at("cautions"), all)
	return top.bytes()
}

// addCaution appends a caution to a list that does not hold it.
func addCaution(list []glazing.Caution, c glazing.Caution) []glazing.Caution {
	for _, x := range list {
		if x == c {
			return list
		}
	}
	return append(list, c)
}

// CheckCSV returns the check as CSV: one row a result, an empty cell where a number is not known or
// not given.
func CheckCSV(c Check, form CSVForm) ([]byte, error) {
	var fields []field
	of := func(key string, text func(x *limits.Result) string) {
		fields = append(fields, field{key: key, cell: func(i int) cell { return word(text(&c.Results[i])) }})
	}
	value := func(key string, value func(x *limits.Result) glazing.Value) {
		fields = append(fields, field{key: key, cell: func(i int) cell {
			if v := value(&c.Results[i]); v.Known {
				return number(v.Number, -1)
			}
			return cell{}
		}})
	}
	same := func(key, text string) { of(key, func(*limits.Result) string { return text }) }
	of("makeup", func(x *limits.Result) string { return x.Makeup.ID })
	of("title", func(x *limits.Result) string { return x.Makeup.Title })
	of("tint", func(x *limits.Result) string { return x.Tint })
	of("basis", func(x *limits.Result) string { return x.Basis })
	of("figure", func(x *limits.Result) string { return x.Figure })
	of("unit", func(x *limits.Result) string { return x.Judged.Unit })
	value("value", func(x *limits.Result) glazing.Value { return x.Value })
	value("rounded", func(x *limits.Result) glazing.Value { return x.Rounded })
	value("at_most", func(x *limits.Result) glazing.Value { return x.Limit.AtMost })
	value("at_least", func(x *limits.Result) glazing.Value { return x.Limit.AtLeast })
	of("scope", func(x *limits.Result) string { return scopeOf(x.Limit) })
	of("condition", func(x *limits.Result) string { return x.Limit.Condition })
	of("tint_rule", func(x *limits.Result) string { return x.Limit.Rule() })
	of("result", func(x *limits.Result) string { return string(x.Verdict) })
	value("margin", func(x *limits.Result) glazing.Value { return x.Margin })
	of("reason", func(x *limits.Result) string { return x.Why })
	of("source", func(x *limits.Result) string { return x.Limit.Source })
	of("source_date", func(x *limits.Result) string { return x.Limit.Date })
	of("typed_by", func(x *limits.Result) string { return x.Limit.TypedBy })
	of("limit_from", func(x *limits.Result) string { return x.Limit.From })
	of("cautions", func(x *limits.Result) string { return c.codesOf(x) })
	of("origins", func(x *limits.Result) string { return originsOf(x.Makeup) })
	of("editions", func(x *limits.Result) string {
		if x.Rating == nil {
			return ""
		}
		return x.Rating.Method.Editions()
	})
	same("notice", strings.Join(checkNotice, " "))
	same("project", c.Project.Title)
	same("author", c.Project.Author)
	same("date", c.Project.Date)
	same("limits_files", strings.Join(c.files(), "; "))
	same("input_sha256", c.Project.Digest)
	same("panewright", c.Version)
	return form.write(fields, len(c.Results))
}

// codesOf returns the codes of the cautions on a result and on its rating.
func (c Check) codesOf(x *limits.Result) string {
	var codes []string
	list := x.Assumed
	if x.Rating != nil {
		list = append(list[:len(list):len(list)], x.Rating.Cautions...)
	}
	for _, caution := range list {
		codes = add(codes, caution.Code)
	}
	return strings.Join(codes, " ")
}
