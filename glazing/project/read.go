package project

// From YAML nodes to the spec types of keys.go: each value checked where it stands.

import (
	"fmt"
	"panewright/glazing"
	"panewright/spectra"
	"reflect"
	"slices"
	"strconv"
	"strings"
	"unicode"

	"go.yaml.in/yaml/v4"
)

// position is a place in the project file, counted from 1.
type position struct{ line, column int }

// text, number, flag and names are values of the file, with their place.
type (
	text struct {
		value string
		given bool
		at    position
	}
	number struct {
		value float64
		given bool
		at    position
		name  position // of its name, in a map from names to numbers
	}
	flag struct {
		value, given bool
		at           position
	}
	names struct {
		values []text
		given  bool
		at     position
	}
)

// object is the place of a map in the file, and whether something in it was refused: then what
// it lacks or contradicts is not reported as well.
type object struct {
	At     position
	Faulty bool
}

// or returns the number, or a default where the key is absent.
func (n number) or(v float64) float64 {
	if n.given {
		return n.value
	}
	return v
}

// orUnknown returns the number as a value, which is not known where the key is absent.
func (n number) orUnknown() glazing.Value { return glazing.Value{Number: n.value, Known: n.given} }

// absoluteZeroC is the bound of keys in °C, for messages.
const absoluteZeroC = -273.15

// reader fills the spec types from YAML nodes and gathers every fault.
type reader struct {
	kind   kind
	file   string
	faults Errors
	// incomplete holds the keys of which a value was refused or misspelt somewhere: what would
	// stand there may be missed elsewhere, and that is not reported as well.
	incomplete map[string]bool
	keys       map[reflect.Type][]specKey // of each spec type, once looked up
}

func newReader(k kind, file string) *reader {
	return &reader{kind: k, file: file, incomplete: map[string]bool{}, keys: map[reflect.Type][]specKey{}}
}

// specKey is one key of a spec type.
type specKey struct {
	name  string
	field reflect.StructField
}

func (r *reader) fail(at position, key, format string, args ...any) {
	r.faults = append(r.faults, &Problem{File: r.file, Line: at.line, Column: at.column, Key: key, Text: fmt.Sprintf(format, args...)})
}

func place(n *yaml.Node) position { return position{n.Line, n.Column} }

// plain refuses what YAML has and a file of ours does not: anchors, aliases, tags.
func (r *reader) plain(n *yaml.Node, key string) bool {
	switch {
	case n.Kind == yaml.AliasNode || n.Anchor != "":
		r.fail(place(n), key, "anchors and aliases are not used in %s; write the value out", r.kind.name)
	case n.Style&yaml.TaggedStyle != 0:
		r.fail(place(n), key, "tags such as %s are not used in %s", clip(n.Tag), r.kind.name)
	default:
		return true
	}
	return false
}

// object fills a struct from a map. It returns false where anything in it was refused.
func (r *reader) object(n *yaml.Node, into reflect.Value, key string) bool {
	called := called(into.Type())
	done := func(ok bool) bool {
		if o := into.FieldByName("object"); o.IsValid() {
			into.FieldByName("At").Set(reflect.ValueOf(place(n)))
			into.FieldByName("Faulty").SetBool(!ok)
		}
		return ok
	}
	if n.Kind != yaml.MappingNode {
		r.fail(place(n), key, "%s is a map of keys and values, not %s", called, kindOf(n))
		return done(false)
	}
	before := len(r.faults)
	known, ok := r.keys[into.Type()]
	if !ok {
		known = keysOf(into.Type())
		r.keys[into.Type()] = known
	}
	seen := map[string]bool{}
	spoilt := map[string]bool{} // keys of which a misspelling stands there
	for i := 0; i+1 < len(n.Content); i += 2 {
		k, v := n.Content[i], n.Content[i+1]
		if !r.plain(k, key) {
			continue
		}
		if k.Tag == "!!merge" {
			r.fail(place(k), key, "merge keys (<<) are not used in %s; write the keys out", r.kind.name)
			continue
		}
		if k.Kind != yaml.ScalarNode {
			r.fail(place(k), key, "a key of %s is a plain word", called)
			continue
		}
		at := slices.IndexFunc(known, func(f specKey) bool { return f.name == k.Value })
		if at < 0 {
			near := Nearest(k.Value, keyNames(known))
			for _, name := range near {
				spoilt[name] = true
			}
			offer := didYouMean(near, keyNames(known))
			if isDigits(k.Value) {
				offer = "a decimal comma? write a point"
			}
			r.fail(place(k), k.Value, "unknown key in %s; %s", called, offer)
			continue
		}
		if seen[k.Value] {
			r.fail(place(k), k.Value, "stands twice in %s", called)
			continue
		}
		seen[k.Value] = true
		field := known[at].field
		if !r.value(v, into.FieldByIndex(field.Index), field) {
			spoilt[k.Value] = true
		}
	}
	for _, f := range known {
		if f.field.Tag.Get("need") == "yes" && !seen[f.name] && !spoilt[f.name] {
			r.fail(place(n), f.name, "is missing in %s: %s", called, f.field.Tag.Get("doc"))
		}
	}
	for name := range spoilt {
		r.incomplete[name] = true
	}
	return done(len(r.faults) == before)
}

// value fills one field. It returns false where the value was refused.
func (r *reader) value(n *yaml.Node, into reflect.Value, f reflect.StructField) bool {
	key := f.Tag.Get("key")
	if !r.plain(n, key) && n.Anchor == "" {
		return false
	}
	if n.Kind == yaml.ScalarNode && n.Tag == "!!null" {
		r.fail(place(n), key, "has no value; give one, or leave the key out")
		return false
	}
	target := into.Addr().Interface()
	switch t := target.(type) {
	case *text:
		return r.text(n, t, f.Tag, key)
	case *number:
		return r.number(n, t, f.Tag, key)
	case *flag:
		return r.flag(n, t, key)
	case *names:
		return r.names(n, t, f.Tag, key)
	}
	switch into.Kind() {
	case reflect.Pointer:
		into.Set(reflect.New(into.Type().Elem()))
		return r.object(n, into.Elem(), key)
	case reflect.Slice:
		return r.list(n, into, key)
	case reflect.Map:
		return r.dictionary(n, into, f)
	}
	panic("project: a field of " + f.Type.String() + " cannot be read")
}

// list fills a slice of structs.
func (r *reader) list(n *yaml.Node, into reflect.Value, key string) bool {
	if n.Kind != yaml.SequenceNode {
		r.fail(place(n), key, "is a list (each item begins with -), not %s", kindOf(n))
		return false
	}
	ok := true
	for _, item := range n.Content {
		e := reflect.New(into.Type().Elem()).Elem()
		if item.Kind == yaml.ScalarNode && item.Tag == "!!null" {
			r.fail(place(item), key, "has an empty item")
			ok = false
			continue
		}
		if !r.plain(item, key) {
			ok = false
			if item.Kind == yaml.AliasNode {
				continue // what it stands for is not looked at
			}
		}
		ok = r.object(item, e, key) && ok
		into.Set(reflect.Append(into, e))
	}
	return ok
}

// dictionary fills a map from names to numbers, texts or structs.
func (r *reader) dictionary(n *yaml.Node, into reflect.Value, f reflect.StructField) bool {
	key := f.Tag.Get("key")
	if n.Kind != yaml.MappingNode {
		r.fail(place(n), key, "is a map of names and values, not %s", kindOf(n))
		return false
	}
	into.Set(reflect.MakeMap(into.Type()))
	before := len(r.faults)
	for i := 0; i+1 < len(n.Content); i += 2 {
		k, v := n.Content[i], n.Content[i+1]
		if !r.plain(k, key) {
			continue
		}
		name := k.Value
		if k.Kind != yaml.ScalarNode || k.Tag == "!!merge" || k.Tag == "!!null" || name == "" {
			r.fail(place(k), key, "a name is a plain word")
			continue
		}
		if c, found := control(name, ""); found {
			r.fail(place(k), key, "a name holds the control character U+%04X", c)
			continue
		}
		if allowed := f.Tag.Get("one"); allowed != "" && !slices.Contains(strings.Fields(allowed), name) {
			r.fail(place(k), name, "unknown in %s; %s", key, Offer(name, strings.Fields(allowed)))
			continue
		}
		if into.MapIndex(reflect.ValueOf(name)).IsValid() {
			r.fail(place(k), name, "stands twice in %s", key)
			continue
		}
		e := reflect.New(into.Type().Elem()).Elem()
		element := f
		element.Tag = reflect.StructTag(`key:"` + name + `" ` + boundsOf(f.Tag))
		if e.Kind() == reflect.Struct && called(e.Type()) != "" {
			r.object(v, e, name)
		} else {
			r.value(v, e, element)
			if x, ok := e.Addr().Interface().(*number); ok {
				x.name = place(k)
			}
		}
		into.SetMapIndex(reflect.ValueOf(name), e)
	}
	return len(r.faults) == before
}

// boundsOf keeps those tags of a map that bound each of its numbers.
func boundsOf(t reflect.StructTag) string {
	var s string
	for _, b := range []string{"above", "from", "below", "upto"} {
		if v, ok := t.Lookup(b); ok {
			s += b + `:"` + v + `" `
		}
	}
	return s
}

// idPattern is 1 to 64 letters of any script, digits, points, underscores and hyphens, beginning
// with a letter or a digit; isID is the same in code.
const idPattern = `^[\p{L}\p{Nd}][\p{L}\p{M}\p{Nd}._-]{0,63}$`

func isID(s string) bool {
	n := 0
	for _, c := range s {
		switch {
		case unicode.IsLetter(c), unicode.IsDigit(c):
		case n > 0 && (c == '.' || c == '_' || c == '-' || unicode.IsMark(c)):
		default:
			return false
		}
		n++
	}
	return n >= 1 && n <= 64
}

func (r *reader) text(n *yaml.Node, into *text, tag reflect.StructTag, key string) bool {
	if n.Kind != yaml.ScalarNode {
		r.fail(place(n), key, "is a text, not %s", kindOf(n))
		return false
	}
	value := strings.TrimSpace(n.Value)
	allowed := "\n\t"
	if tag.Get("file") != "" {
		allowed = ""
	}
	if c, found := control(value, allowed); found {
		r.fail(place(n), key, "holds the control character U+%04X", c)
		return false
	}
	if value == "" {
		r.fail(place(n), key, "is blank; give a text, or leave the key out")
		return false
	}
	if one := strings.Fields(tag.Get("one")); len(one) > 0 && !slices.Contains(one, value) {
		r.fail(place(n), key, "%q is not known; %s", clip(value), Offer(value, one))
		return false
	}
	if tag.Get("id") != "" && !isID(value) {
		r.fail(place(n), key, "%q is no id: 1 to 64 letters of any script, digits, . _ -, beginning with a letter or digit", clip(value))
		return false
	}
	if tag.Get("id") == "tint" && value == "same" {
		r.fail(place(n), key, "a tint cannot be called same: that word makes a pane follow another")
		return false
	}
	*into = text{value, true, place(n)}
	return true
}

// isNumber reports whether a text is a decimal number as a project writes it: digits with at
// most one point, an exponent perhaps. Leading zeros, which some programs read as octal, are
// refused.
func isNumber(s string) bool {
	s = strings.TrimPrefix(strings.TrimPrefix(s, "-"), "+")
	mantissa, exponent, has := strings.Cut(strings.ToLower(s), "e")
	if has && !isDigits(strings.TrimPrefix(strings.TrimPrefix(exponent, "-"), "+")) {
		return false
	}
	whole, fraction, _ := strings.Cut(mantissa, ".")
	return whole+fraction != "" && (whole == "" || isDigits(whole)) && (fraction == "" || isDigits(fraction)) &&
		!(len(whole) > 1 && whole[0] == '0')
}

func isDigits(s string) bool { return s != "" && strings.Trim(s, "0123456789") == "" }

func (r *reader) number(n *yaml.Node, into *number, tag reflect.StructTag, key string) bool {
	refuse := func(format string, args ...any) bool {
		r.fail(place(n), key, format, args...)
		return false
	}
	if n.Kind != yaml.ScalarNode {
		return refuse("is a number, not %s", kindOf(n))
	}
	s := n.Value
	if n.Style&(yaml.SingleQuotedStyle|yaml.DoubleQuotedStyle|yaml.LiteralStyle|yaml.FoldedStyle) != 0 {
		return refuse("%q is a text; write the number without quotes", clip(s))
	}
	if !isNumber(s) {
		switch {
		case isNumber(strings.Replace(s, ",", ".", 1)):
			return refuse("%q is not a number; write a decimal point", clip(s))
		case isNumber(strings.TrimLeft(s, "0")):
			return refuse("%q begins with a zero; write the number without it", clip(s))
		}
		return refuse("%q is not a number; write it with digits and a point, in the unit that the key names", clip(s))
	}
	v, err := strconv.ParseFloat(s, 64)
	if err != nil {
		return refuse("%q is too large for a number", clip(s))
	}
	if b := bound(tag, "above"); b != nil && v <= *b {
		if *b == absoluteZeroC {
			return refuse("%s is not above %s °C, absolute zero", clip(s), short(*b))
		}
		return refuse("%s is not above %s", clip(s), short(*b))
	}
	if b := bound(tag, "from"); b != nil && v < *b {
		return refuse("%s is below %s", clip(s), short(*b))
	}
	if b := bound(tag, "below"); b != nil && v >= *b {
		return refuse("%s is not below %s", clip(s), short(*b))
	}
	if b := bound(tag, "upto"); b != nil && v > *b {
		hint := tag.Get("high")
		if hint == "" && *b == 1 && v <= 100 {
			hint = "fractions of one, not percent"
		}
		if hint != "" {
			hint = "; " + hint
		}
		return refuse("%s is above %s%s", clip(s), short(*b), hint)
	}
	*into = number{value: v, given: true, at: place(n)}
	return true
}

func (r *reader) flag(n *yaml.Node, into *flag, key string) bool {
	if n.Kind != yaml.ScalarNode || (n.Value != "true" && n.Value != "false") || n.Tag != "!!bool" {
		r.fail(place(n), key, "is true or false, not %s", kindOf(n))
		return false
	}
	*into = flag{n.Value == "true", true, place(n)}
	return true
}

// names reads one name or a list of names.
func (r *reader) names(n *yaml.Node, into *names, tag reflect.StructTag, key string) bool {
	items := []*yaml.Node{n}
	if n.Kind == yaml.SequenceNode {
		items = n.Content
	}
	if len(items) == 0 {
		r.fail(place(n), key, "is an empty list; name one at least, or leave the key out")
		return false
	}
	*into = names{given: true, at: place(n)}
	ok := true
	for _, item := range items {
		var t text
		if item.Kind == yaml.ScalarNode && item.Tag == "!!null" {
			r.fail(place(item), key, "has an empty item")
			ok = false
			continue
		}
		if !r.plain(item, key) || !r.text(item, &t, tag, key) {
			ok = false
			continue
		}
		if slices.ContainsFunc(into.values, func(x text) bool { return x.value == t.value }) {
			r.fail(place(item), key, "%q stands twice", clip(t.value))
			ok = false
			continue
		}
		into.values = append(into.values, t)
	}
	return ok
}

// control returns the first control character of a text that is not among the allowed ones.
func control(s, allowed string) (rune, bool) {
	for _, c := range s {
		if unicode.IsControl(c) && !strings.ContainsRune(allowed, c) {
			return c, true
		}
	}
	return 0, false
}

// kindOf names what a node is, for messages.
func kindOf(n *yaml.Node) string {
	switch n.Kind {
	case yaml.MappingNode:
		return "a map"
	case yaml.SequenceNode:
		return "a list"
	}
	return strconv.Quote(clip(n.Value))
}

// keysOf returns the fields of a spec type that have a key.
func keysOf(t reflect.Type) []specKey {
	var out []specKey
	for f := range t.Fields() {
		if name := f.Tag.Get("key"); name != "" {
			out = append(out, specKey{name, f})
		}
	}
	return out
}

func keyNames(keys []specKey) []string {
	var out []string
	for _, k := range keys {
		out = append(out, k.name)
	}
	return out
}

// called says what an object of a spec type is: "a pane".
func called(t reflect.Type) string {
	if f, ok := t.FieldByName("_"); ok {
		return f.Tag.Get("called")
	}
	return ""
}

func short(v float64) string { return strconv.FormatFloat(v, 'g', -1, 64) }

// clip shortens a text of the user's for a message.
func clip(s string) string { return spectra.Clip(s, 60) }
