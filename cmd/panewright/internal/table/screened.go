package table

// Thermal stress and moisture on one screen: the worst of each make-up.

import (
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

// stressTable returns a row a make-up.
func (r Report) stressTable() small {
	t := small{title: "Thermal stress, a screening",
		head: []string{"make-up", "pane", "tint", "condition"}, names: 4}
	var columns []Choice
	for _, f := range r.figures() {
		if f.Condition == "" && slices.Contains(stressColumns, f.Alias) {
			columns = append(columns, Choice{Figure: f})
			t.head = append(t.head, f.Symbol)
		}
	}
	t.head = append(t.head, "against guide")
	for _, w := range r.worstStress() {
		row := []string{w.rating.Makeup.ID, strconv.Itoa(w.pane+1) + " " + w.rating.Makeup.Panes[w.pane].Pane.ID, w.rating.Tint, w.Condition}
		for _, c := range columns {
			row = append(row, c.Print(w.rating, w.pane))
		}
		t.rows = append(t.rows, append(row, string(w.Word)))
	}
	if len(t.rows) > 0 {
		t.about = "In each make-up the pane that is nearest to its guide value, or most above it. ΔTs is by how much the sunlit middle is warmer than the shaded edge, ΔTg the guide value, in " + columns[0].Unit +
			"; discuss what is near or above it with a licensed engineer."
	}
	return t
}

// stressColumns are the short names of the figures of the table of thermal stress.
var stressColumns = []string{"stress_drop", "stress_guide"}

// moistureColumns are those of the table of moisture.
var moistureColumns = []string{"temperature_factor", "condensing_rh", "dew_point", "edge_temperature", "edge_condensing_rh"}

// moistureTable returns a row for each condition of known humidity and make-up, and for each tint where
// they differ. Bases do not differ without sun.
func (r Report) moistureTable() small {
	t := small{title: "Moisture, without sun", names: 3}
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
			t.rows = append(t.rows, t.asOne(rows)...)
		}
	}
	t.head = append([]string{"condition", "make-up", "tint"}, heads...)
	t.about = t.drop(legends)
	return t
}

// drop leaves out columns in which nothing is known, and returns what is said of the others.
func (t *small) drop(legends []string) string {
	var said []string
	for k := t.names; k < len(t.head); {
		if slices.ContainsFunc(t.rows, func(row []string) bool { return row[k] != "–" }) {
			said = append(said, legends[k-t.names])
			k++
			continue
		}
		legends = slices.Delete(legends, k-t.names, k-t.names+1)
		t.head = slices.Delete(t.head, k, k+1)
		for i := range t.rows {
			t.rows[i] = slices.Delete(t.rows[i], k, k+1)
		}
	}
	return strings.Join(said, "; ") + "."
}
