package table

// Thermal stress and moisture on one screen: the worst of each make-up; what both and comfort stand on.

import (
	"fmt"
	"slices"
	"strconv"
	"strings"

	"panewright/glazing"
)

// A worstPane is the pane of a make-up that comes nearest to its guide value, or is most above it.
type worstPane struct {
	*glazing.Stress
	pane   int // from 0
	rating *glazing.Rating
}

// worstStress returns that of each make-up, over tints and bases; a make-up of which none is known is
// left out.
func (r Report) worstStress() (list []worstPane) {
	if r.Choices != nil {
		return nil
	}
	for i := range r.Ratings {
		rating := &r.Ratings[i]
		at := slices.IndexFunc(list, func(w worstPane) bool { return w.rating.Makeup == rating.Makeup })
		for k := range rating.Stress {
			s := &rating.Stress[k]
			switch w := (worstPane{s, k, rating}); {
			case s.Why != "":
			case at < 0:
				list, at = append(list, w), len(list)
			case s.DropK*list[at].GuideK > list[at].DropK*s.GuideK:
				list[at] = w
			}
		}
	}
	return list
}

// StressTable returns a row a make-up.
func (r Report) StressTable() Titled {
	t := Titled{Title: "Thermal stress, a screening",
		Head: []string{"make-up", "pane", "tint", "condition"}, Names: 4}
	var columns []Choice
	for _, f := range r.figures() {
		if f.Condition == "" && slices.Contains(stressColumns, f.Alias) {
			columns = append(columns, Choice{Figure: f})
			t.Head = append(t.Head, f.Symbol)
		}
	}
	t.Head = append(t.Head, "against guide")
	for _, w := range r.worstStress() {
		row := []string{w.rating.Makeup.ID, strconv.Itoa(w.pane+1) + " " + w.rating.Makeup.Panes[w.pane].Pane.ID, w.rating.Tint, w.Condition}
		for _, c := range columns {
			row = append(row, c.Print(w.rating, w.pane))
		}
		t.Rows = append(t.Rows, append(row, string(w.Word)))
	}
	if len(t.Rows) > 0 {
		t.About = "In each make-up the pane that is nearest to its guide value, or most above it. ΔTs is by how much the sunlit middle is warmer than the shaded edge, ΔTg the guide value, in " + columns[0].Unit +
			"; discuss what is near or above it with a licensed engineer."
		t.Note = r.ScreeningSaid()
	}
	return t
}

// stressColumns are the short names of the figures of the table of thermal stress.
var stressColumns = []string{"stress_drop", "stress_guide"}

// moistureColumns are those of the table of moisture.
var moistureColumns = []string{"temperature_factor", "condensing_rh", "dew_point", "edge_temperature", "edge_condensing_rh"}

// MoistureTable returns a row for each condition of known humidity and make-up, and for each tint where
// they differ. Bases do not differ without sun.
func (r Report) MoistureTable() Titled {
	t := Titled{Title: "Moisture, without sun", Names: 3}
	var legends []string
	if r.Choices != nil {
		return t
	}
	figures := slices.DeleteFunc(glazing.BalanceFigures(), func(f glazing.BalanceFigure) bool { return !slices.Contains(moistureColumns, f.Alias) })
	var heads []string
	for _, f := range figures {
		c := r.under(f, "")
		heads = append(heads, c.Symbol)
		s := c.Symbol + " " + c.Meaning
		if c.Unit != "" {
			s += ", " + c.Unit
		}
		legends = append(legends, s)
	}
	for _, id := range glazing.ConditionIDs(r.Ratings) {
		for _, m := range r.makeups() {
			var rows [][]string
			var seen []string // tints
			for i := range r.Ratings {
				x := &r.Ratings[i]
				b := x.Balance(id)
				if x.Makeup != m || b == nil || !b.Condition.InsideHumidity.Known || slices.Contains(seen, x.Tint) {
					continue
				}
				seen = append(seen, x.Tint)
				row := []string{id, m.ID, x.Tint}
				for _, f := range figures {
					row = append(row, r.under(f, id).Printed(x))
				}
				rows = append(rows, row)
			}
			t.Rows = append(t.Rows, t.asOne(rows)...)
		}
	}
	t.Head = append([]string{"condition", "make-up", "tint"}, heads...)
	t.About = t.drop(legends)
	for _, f := range figures {
		if f.Above1 != "" && slices.ContainsFunc(t.Rows, func(row []string) bool { return slices.Contains(row, f.Above1) }) {
			t.About = strings.TrimSuffix(t.About, ".") + "; " + Above1(f.Figure) + "."
			break
		}
	}
	figures = slices.DeleteFunc(figures, func(f glazing.BalanceFigure) bool { return !slices.Contains(t.Head, f.Symbol) })
	humid := func(c Choice) bool {
		return slices.ContainsFunc(t.Rows, func(row []string) bool { return row[0] == c.Condition })
	}
	t.Note = r.NotKnown(slices.DeleteFunc(r.UnderConditions(figures), func(c Choice) bool { return !humid(c) }), nil)
	return t
}

// drop leaves out columns in which nothing is known, and returns what is said of the others.
func (t *Titled) drop(legends []string) string {
	var said []string
	for k := t.Names; k < len(t.Head); {
		if slices.ContainsFunc(t.Rows, func(row []string) bool { return row[k] != "–" }) {
			said = append(said, legends[k-t.Names])
			k++
			continue
		}
		legends = slices.Delete(legends, k-t.Names, k-t.Names+1)
		t.Head = slices.Delete(t.Head, k, k+1)
		for i := range t.Rows {
			t.Rows[i] = slices.Delete(t.Rows[i], k, k+1)
		}
	}
	return strings.Join(said, "; ") + "."
}

// ofStress reports whether a figure is of the screening for thermal stress.
func ofStress(f glazing.Figure) bool { return strings.HasPrefix(f.Key, "thermal_stress.") }

// ofComfort reports whether a figure is one of comfort.
func ofComfort(f glazing.Figure) bool { return strings.HasPrefix(f.WithinBalance(), "comfort.") }

// stressShown reports whether the page shows thermal stress, of which some is known.
func (r Report) stressShown() bool {
	if r.Choices != nil && !slices.ContainsFunc(r.Choices, func(c Choice) bool { return ofStress(c.Figure) }) {
		return false
	}
	return slices.ContainsFunc(r.Ratings, func(x glazing.Rating) bool {
		return slices.ContainsFunc(x.Stress, func(s glazing.Stress) bool { return s.Why == "" })
	})
}

// ScreeningSaid says how thermal stress was screened where the project has it otherwise than usual.
func (r Report) ScreeningSaid() string {
	if len(r.Ratings) == 0 {
		return ""
	}
	s := r.Ratings[0].Method.Stress()
	if s == (glazing.StressScreening{Factor: 1}) {
		return ""
	}
	margin, unit := s.FrameMarginK, "K"
	if r.InchPound {
		margin, unit = glazing.ToInchPound(margin, unit)
	}
	return fmt.Sprintf("As the project has it, the shaded edge is %.4g\u00a0%s colder than the pane without sun, which is in ΔTs, and σ is taken with a factor k of %.4g.", margin, unit, s.Factor)
}

// PersonSaid says who feels the glazing: by the figures of comfort.
func (r Report) PersonSaid() string {
	if len(r.Ratings) == 0 {
		return ""
	}
	m := r.Ratings[0].Method
	p, from := m.Person(), "assumed, common practice"
	if m.Options.Person != nil {
		from = "as the project has it"
	}
	return fmt.Sprintf("Comfort is that of a person (%s), %s %.4g\u00a0m in front of the middle of a glazing %.4g\u00a0m wide and %.4g\u00a0m high; sun %.4g° high, %.4g° from where the person faces; share of sky seen %.4g, of the body in the sun %.4g; absorptivity %.4g, reflectance of the floor %.4g.",
		from, posture(p), p.DistanceM, p.GlassWidthM, p.GlassHeightM, p.SunAltitudeDeg, p.SunFromFrontDeg, p.SkyShare, p.BodyShare, p.Absorptivity, p.FloorReflectance)
}

// posture is how a person is, as the project's key has it.
func posture(p glazing.Person) string {
	if p.Standing {
		return "standing"
	}
	return "seated"
}
