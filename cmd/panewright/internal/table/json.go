package table

// The JSON of rate: a tree built from the keys of the list of figures.

import (
	"bytes"
	"encoding/json"
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"panewright/glazing"
	"panewright/thermal"
)

// JSON returns the report in the documented format: full precision, figures at the paths of
// their keys, null where a figure is unknown, [] where a list is empty.
func JSON(r Report) []byte {
	top := newNode()
	r.said(top)
	r.person(top)
	ratings := top.at("ratings")
	ratings.list = true
	for i := range r.Ratings {
		r.rating(ratings.at(strconv.Itoa(i)), i)
	}
	return top.bytes()
}

// said writes what the user says of the project, and what makes the page traceable.
func (r Report) said(top *node) {
	top.set(quoted(r.Version), "panewright")
	top.set(quoted(r.Project.Title), "project")
	for _, x := range []struct{ key, value string }{
		{"author", r.Project.Author}, {"date", r.Project.Date}, {"client", r.Project.Client}, {"notes", r.Project.Notes},
	} {
		if x.value != "" {
			top.set(quoted(x.value), x.key)
		}
	}
	top.set(quoted(r.Project.Digest), "input_sha256")
}

func (r Report) rating(n *node, i int) {
	rating := &r.Ratings[i]
	n.set(quoted(rating.Makeup.ID), "makeup")
	n.set(quoted(rating.Tint), "tint")
	n.set(quoted(rating.Method.Basis.Name), "basis")
	n.set(quoted(rating.Method.Editions()), "editions")
	n.set(figure(rating.Makeup.Tilt.Degrees()), "tilt_deg")
	if angle := rating.Method.Options.AngleDeg; angle > 0 {
		n.set(figure(angle), "angle_deg")
	}
	if rating.Makeup.Title != "" {
		n.set(quoted(rating.Makeup.Title), "title")
	}
	panes := n.at("panes")
	panes.list = true
	for k, p := range rating.Makeup.Panes {
		pane := panes.at(strconv.Itoa(k))
		pane.set(quoted(p.Pane.ID), "pane")
		pane.set(quoted(p.Pane.Tints[rating.Ready.States[rating.State].Tints[k]].Name), "tint")
		pane.set(strconv.FormatBool(p.Turned), "turned")
		pane.set(quoted(string(p.Pane.Origin)), "origin")
	}
	kinds := r.kinds()
	for _, f := range kinds {
		if f.Condition == "" {
			n.figure(f.Key, f, rating)
		}
	}
	if i < len(r.Spectra) {
		spectraLists(n.at("spectra"), r.Spectra[i])
	}
	if r.Choices == nil || slices.ContainsFunc(kinds, func(f glazing.Figure) bool { return f.Condition != "" }) {
		r.balanceList(n.at("balances"), rating, kinds)
	}
	r.screening(n, rating)
	r.remarks(n, i)
}

// figure writes a figure at the path of a key, as a list where it occurs more than once.
func (n *node) figure(key string, f glazing.Figure, rating *glazing.Rating) {
	path := strings.Split(key, ".")
	if f.Per != glazing.PerMakeup {
		list := n
		for _, key := range path {
			if key == "#" {
				break
			}
			list = list.at(key)
		}
		list.list = true
	}
	for k := range f.Count(rating) {
		own := make([]string, len(path))
		for j, key := range path {
			own[j] = strings.ReplaceAll(key, "#", strconv.Itoa(k))
		}
		n.set(leaf(f, rating, k), own...)
	}
}

// balanceList writes the balances of a rating; where figures were chosen, those of which some are under
// their condition, with these alone.
func (r Report) balanceList(n *node, rating *glazing.Rating, kinds []glazing.Figure) {
	n.list = true
	for i := range rating.Balances {
		b := &rating.Balances[i]
		of := slices.DeleteFunc(slices.Clone(kinds), func(f glazing.Figure) bool { return f.Condition != b.Condition.ID })
		if len(of) == 0 {
			continue
		}
		item := n.at(strconv.Itoa(i))
		item.set(quoted(b.Condition.ID), "condition")
		for _, f := range of {
			item.figure(f.WithinBalance(), f, rating)
		}
		if r.Choices == nil {
			given(item, b.Condition, b.TiltDeg)
		}
	}
}

// screening writes how thermal stress was screened: with what, and for which conditions.
func (r Report) screening(n *node, rating *glazing.Rating) {
	if !slices.ContainsFunc(r.kinds(), ofStress) {
		return
	}
	s := rating.Method.Stress()
	n = n.at("thermal_stress_screening")
	n.set(figure(s.Factor), "factor")
	n.set(figure(s.FrameMarginK), "frame_margin_k")
	list := n.at("conditions")
	list.list = true
	for i, c := range rating.Method.Screened() {
		item := list.at(strconv.Itoa(i))
		item.set(quoted(c.ID), "condition")
		item.set(figure(c.Tilt(rating.Makeup)), "tilt_deg")
		given(item, &c, c.Tilt(rating.Makeup))
	}
}

// person writes whose comfort that of the balances is.
func (r Report) person(top *node) {
	if !slices.ContainsFunc(r.kinds(), ofComfort) {
		return
	}
	m := r.Ratings[0].Method
	p := m.Person()
	n := top.at("person")
	n.set(strconv.FormatBool(m.Options.Person == nil), "assumed")
	n.set(quoted(posture(p)), "posture")
	for _, x := range []struct {
		key   string
		value float64
	}{
		{"distance_m", p.DistanceM}, {"glass_width_m", p.GlassWidthM}, {"glass_height_m", p.GlassHeightM},
		{"sun_altitude_deg", p.SunAltitudeDeg}, {"sun_from_front_deg", p.SunFromFrontDeg}, {"sky_share", p.SkyShare},
		{"body_share", p.BodyShare}, {"absorptivity", p.Absorptivity}, {"floor_reflectance", p.FloorReflectance},
	} {
		n.set(figure(x.value), x.key)
	}
}

// given writes what a condition puts a make-up of a tilt between; what was not given and has nothing
// taken for it is left out.
func given(n *node, c *glazing.Condition, tiltDeg float64) {
	at := c.Surroundings(tiltDeg)
	outside, assumed := c.OutsideConvection()
	number := func(key string, v float64) { n.set(figure(v), key) }
	value := func(key string, v glazing.Value) {
		if v.Known {
			number(key, v.Number)
		}
	}
	or := func(v glazing.Value, air float64) float64 {
		if v.Known {
			return v.Number
		}
		return air
	}
	number("outside_c", c.OutsideC)
	number("outside_radiant_c", or(c.OutsideRadiantC, c.OutsideC))
	value("sky_c", c.SkyC)
	number("outside_mean_radiant_c", at.OutsideRadiantK-thermal.ZeroCelsius)
	number("inside_c", c.InsideC)
	number("inside_radiant_c", or(c.InsideRadiantC, c.InsideC))
	value("inside_rh", c.InsideHumidity)
	value("wind_m_s", c.WindMS)
	n.set(strconv.FormatBool(assumed), "wind_assumed")
	number("outside_convection_w_m2k", outside)
	value("inside_convection_w_m2k", c.InsideConvectionWM2K)
	number("sun_w_m2", c.SunWM2)
	number("height_m", c.Height())
}

// remarks writes the cautions of a rating, and what the user typed of its make-up.
func (r Report) remarks(n *node, i int) {
	rating := &r.Ratings[i]
	cautions := n.at("cautions")
	cautions.list = true
	for k, c := range r.cautions(i) {
		item := cautions.at(strconv.Itoa(k))
		item.set(quoted(c.Code), "code")
		item.set(quoted(c.Text), "text")
	}
	if len(rating.Makeup.Typed) > 0 {
		typed := n.at("typed_by_user")
		for _, t := range rating.Makeup.Typed {
			typed.set(quoted(t.Text), t.Name)
		}
	}
}

// kinds returns the figures that the report shows. A list stays whole in JSON, whichever of its
// places were chosen, so that the position of a value tells which it is.
func (r Report) kinds() []glazing.Figure {
	if r.Choices == nil {
		return r.all()
	}
	var list []glazing.Figure
	for _, c := range r.Choices {
		if !slices.ContainsFunc(list, func(f glazing.Figure) bool { return f.Key == c.Key }) {
			list = append(list, c.Figure)
		}
	}
	return list
}

func leaf(f glazing.Figure, r *glazing.Rating, k int) string {
	if f.Text != nil {
		if s := f.Text(r, k); s != "" {
			return quoted(s)
		}
		return "null"
	}
	return jsonValue(f.Value(r, k))
}

func jsonValue(v glazing.Value) string {
	if v.Known {
		return figure(v.Number)
	}
	return "null"
}

func spectraLists(n *node, s glazing.Spectra) {
	n.set(figures(s.WavelengthNM), "wavelength_nm")
	n.set(figures(s.T), "tau")
	n.set(figures(s.RhoOutside), "rho_outside")
	n.set(figures(s.RhoInside), "rho_inside")
	list := n.at("absorptance")
	list.list = true
	for k, a := range s.Absorptance {
		list.set(figures(a), strconv.Itoa(k))
	}
}

// node is a value of a JSON document whose keys keep the order in which they were set.
type node struct {
	keys []string
	kids map[string]*node
	list bool
	leaf string
}

func newNode() *node { return &node{kids: map[string]*node{}} }

// at returns the node under a key, which is made if it is not there.
func (n *node) at(key string) *node {
	if n.kids[key] == nil {
		n.keys = append(n.keys, key)
		n.kids[key] = newNode()
	}
	return n.kids[key]
}

// set puts a value, already written as JSON, at a path.
func (n *node) set(value string, path ...string) {
	for _, key := range path {
		n = n.at(key)
	}
	n.leaf = value
}

// bytes returns the document whose top the node is.
func (n *node) bytes() []byte {
	var b bytes.Buffer
	n.print(&b, 0)
	b.WriteByte('\n')
	return b.Bytes()
}

// print writes the node; a list of numbers stands on one line.
func (n *node) print(b *bytes.Buffer, depth int) {
	if n.leaf != "" {
		b.WriteString(n.leaf)
		return
	}
	opening, closing := "{", "}"
	if n.list {
		opening, closing = "[", "]"
	}
	b.WriteString(opening)
	inline := n.list
	for _, key := range n.keys {
		inline = inline && n.kids[key].leaf != "" && n.kids[key].leaf[0] != '[' && n.kids[key].leaf[0] != '"'
	}
	for i, key := range n.keys {
		if i > 0 {
			b.WriteByte(',')
		}
		switch {
		case !inline:
			b.WriteString("\n" + strings.Repeat("  ", depth+1))
		case i > 0:
			b.WriteByte(' ')
		}
		if !n.list {
			b.WriteString(quoted(key) + ": ")
		}
		n.kids[key].print(b, depth+1)
	}
	if !inline && len(n.keys) > 0 {
		b.WriteString("\n" + strings.Repeat("  ", depth))
	}
	b.WriteString(closing)
}

// quoted writes a JSON string.
func quoted(s string) string {
	var b bytes.Buffer
	e := json.NewEncoder(&b)
	e.SetEscapeHTML(false)
	if err := e.Encode(s); err != nil {
		panic(fmt.Sprintf("table: %v", err)) // a string can always be written
	}
	return strings.TrimSuffix(b.String(), "\n")
}

// figure writes a number with all its digits, or null if it is none.
func figure(v float64) string {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return "null"
	}
	out, err := json.Marshal(v)
	if err != nil {
		panic(fmt.Sprintf("table: %v", err)) // a finite number can always be written
	}
	return string(out)
}

func figures(list []float64) string {
	parts := make([]string, len(list))
	for i, v := range list {
		parts[i] = figure(v)
	}
	return "[" + strings.Join(parts, ", ") + "]"
}
