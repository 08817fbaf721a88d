package table

import (
	"encoding/json"
	"math"
	"slices"
	"strconv"
	"strings"
	"testing"

	"github.com/jedib0t/go-pretty/v6/text"

	"panewright/glazing"
)

func TestCompareText(t *testing.T) {
	r := demoReport(t, glazing.EN)
	out := string(Compare(r))
	lines := strings.Split(out, "\n")
	for i, line := range lines {
		if w := text.StringWidth(line); w > Width {
			t.Errorf("line %d: %d columns: %s", i+1, w, line)
		}
	}
	// The reference stands in every block, and every figure does.
	for _, c := range r.compared() {
		blocks := 0
		for _, line := range lines {
			words := strings.Fields(line)
			if len(words) > 0 && words[0] == c.Head() && (!c.in(&r.Ratings[0]) || slices.Contains(words, c.Printed(&r.Ratings[0]))) {
				blocks++
			}
		}
		if blocks < 2 {
			t.Errorf("%s stands in %d blocks, want two at least", c.Head(), blocks)
		}
	}
	for _, want := range []string{
		"figure change", "The reference is D1.", "reflected outside", "Pane 1: mill-dusk-7 (7 mm) instead of mill-clear-6 (6 mm).",
		"Gap 2: 14 mm argon 90 / air 10 instead of none.", "Tilt: 30° instead of 90°.", "typed by the user: acoustic: Rw 36 dB",
		"Calculated figures", "EN 410:2011", r.Project.Digest, "ε2 to ε5 corrected emissivity, surfaces 2 to 5",
	} {
		if !strings.Contains(out, want) {
			t.Errorf("the comparison lacks %q", want)
		}
	}
	for _, head := range []string{"ε1", "ε6", "L*τ,10"} { // not towards a gap; the other observer
		if slices.Contains(strings.Fields(out), head) {
			t.Errorf("the comparison shows %s", head)
		}
	}
	// A make-up beside itself differs in nothing.
	r.Ratings = []glazing.Rating{r.Ratings[0], r.Ratings[0]}
	if out := string(Compare(r)); !strings.Contains(out, nothing) || strings.Contains(out, "instead of") {
		t.Errorf("a make-up differs from itself:\n%s", out)
	}
}

// change prints the difference of unrounded figures with the decimals of the finer of both.
func TestChange(t *testing.T) {
	r := demoReport(t, glazing.EN)
	of := func(alias string, values ...glazing.Value) Choice {
		return Choice{Figure: glazing.Figure{Alias: alias, Places: 2, Small: true, Value: func(x *glazing.Rating, _ int) glazing.Value {
			if x == &r.Ratings[0] {
				return values[0]
			}
			return values[1]
		}}}
	}
	v := func(x float64) glazing.Value { return glazing.Value{Number: x, Known: true} }
	c := glazing.Compare(&r.Ratings[0], &r.Ratings[1])
	for _, tt := range []struct {
		was, is glazing.Value
		want    string
	}{
		{v(0.5), v(0.7), "+0.20"}, {v(0.7), v(0.5), "-0.20"}, {v(0.5), v(0.0168), "-0.483"},
		{v(0.5), v(0.5), "0.00"}, {v(0.504), v(0.506), "0.00"}, {v(0.506), v(0.504), "0.00"}, {v(0.494), v(0.5), "+0.01"},
		{v(0.5), glazing.Value{Why: "a test"}, "–"}, {glazing.Value{Why: "a test"}, v(0.5), "–"},
	} {
		if got := change(c, of("x", tt.was, tt.is)); got != tt.want {
			t.Errorf("from %+v to %+v: %q, want %q", tt.was, tt.is, got, tt.want)
		}
	}
}

func TestCompareJSON(t *testing.T) {
	r := demoReport(t, glazing.EN)
	var doc struct {
		Version   string `json:"panewright"`
		Project   string
		Digest    string `json:"input_sha256"`
		Basis     string
		Editions  string
		Reference struct {
			Makeup, Tint string
			Figures      map[string]any
		}
		Options []struct {
			Makeup, Tint string
			Figures      map[string]any
			Differences  map[string]*float64
			Colour       map[string]*float64 `json:"colour_difference"`
			Inputs       []string            `json:"input_differences"`
			Cautions     []glazing.Caution
		}
	}
	if err := json.Unmarshal(CompareJSON(r), &doc); err != nil {
		t.Fatal(err)
	}
	if doc.Version != "test" || doc.Project != r.Project.Title || doc.Digest != r.Project.Digest || doc.Basis != "en" || doc.Editions != r.Ratings[0].Method.Editions() || doc.Reference.Makeup != "D1" || len(doc.Options) != 6 {
		t.Fatalf("the head is %+v", doc)
	}
	var whole struct{ Ratings []any }
	if err := json.Unmarshal(JSON(r), &whole); err != nil {
		t.Fatal(err)
	}
	for i, o := range doc.Options {
		rating := &r.Ratings[i+1]
		c := glazing.Compare(&r.Ratings[0], rating)
		if o.Makeup != rating.Makeup.ID || o.Tint != rating.Tint || !slices.Equal(o.Inputs, c.Inputs) || len(o.Cautions) != len(r.cautions(i+1)) {
			t.Errorf("option %d is %+v", i, o)
		}
		if *o.Colour["transmitted"] != c.Transmitted.Number || *o.Colour["reflected_outside"] != c.ReflectedOutside.Number || *o.Colour["reflected_inside"] != c.ReflectedInside.Number {
			t.Errorf("option %d: colour differences %v", i, o.Colour)
		}
		for _, choice := range r.everything() {
			key := choice.Path()
			got, ok := o.Figures[key]
			if want, _ := jsonAt(whole.Ratings[i+1], key); !ok || got != want {
				t.Errorf("option %d: %s is %v, in rate it is %v", i, key, got, want)
			}
			is, number := got.(float64)
			was, also := doc.Reference.Figures[key].(float64)
			d, there := o.Differences[key]
			switch {
			case !number || !also:
				if d != nil {
					t.Errorf("option %d: the difference of %s is %v", i, key, *d)
				}
			case !there || d == nil || *d != is-was:
				t.Errorf("option %d: the difference of %s is not %v", i, key, is-was)
			}
		}
	}
}

func TestCompareCSV(t *testing.T) {
	r := demoReport(t, glazing.EN)
	if err := r.Choose([]string{"light", "u"}); err != nil {
		t.Fatal(err)
	}
	out, err := CompareCSV(r, CSVForm{UnitsRow: true})
	if err != nil {
		t.Fatal(err)
	}
	keys, rows := readCSV(t, out, ',')
	if want := strings.Fields("difference.light.transmittance difference.u_w_m2k colour_difference.transmitted colour_difference.reflected_outside colour_difference.reflected_inside input_differences"); !slices.Equal(keys[len(keys)-6:], want) {
		t.Errorf("the last columns are %v", keys[len(keys)-6:])
	}
	if rows[0]["difference.u_w_m2k"] != "W/(m²·K)" || rows[1]["difference.u_w_m2k"] != "" || rows[1]["input_differences"] != "" {
		t.Errorf("units %v, reference %v", rows[0], rows[1])
	}
	for i := 1; i < len(r.Ratings); i++ {
		d, err := strconv.ParseFloat(rows[i+1]["difference.u_w_m2k"], 64)
		if want := r.Ratings[i].U.Number - r.Ratings[0].U.Number; err != nil || d != want {
			t.Errorf("row %d: the change of U is %q, want %v", i+1, rows[i+1]["difference.u_w_m2k"], want)
		}
		e, err := strconv.ParseFloat(rows[i+1]["colour_difference.transmitted"], 64)
		if want := glazing.Compare(&r.Ratings[0], &r.Ratings[i]).Transmitted.Number; err != nil || e != want || math.IsNaN(e) {
			t.Errorf("row %d: the colour difference is %v, want %v", i+1, e, want)
		}
		if !strings.Contains(rows[i+1]["input_differences"], "instead of") {
			t.Errorf("row %d: input differences %q", i+1, rows[i+1]["input_differences"])
		}
	}
}

func TestCompareMarkdown(t *testing.T) {
	r := demoReport(t, glazing.EN)
	r.InchPound = true
	out := string(CompareMarkdown(r))
	rows := cellsOf(out)
	// In january-night, without sun, there are U, qin, θsi and θmax; in july-afternoon also g, αe and qi.
	figures := 2 + len(r.compared()) + (2 + 4) + (2 + 7)
	if want := figures + 2 + len(colourRows); len(rows) != want {
		t.Errorf("%d rows, want %d", len(rows), want)
	}
	for i, row := range rows {
		want := 3 + 2*6
		if i >= figures {
			want = 1 + 6
		}
		if len(row) != want {
			t.Errorf("row %d has %d cells, want %d: %q", i, len(row), want, row)
		}
	}
	for _, want := range []string{"Btu/(h·ft²·°F)", siRemains, "- **E1 half**", "Pane 1, tint: half instead of none.", "The reference is D1.", r.Project.Digest} {
		if !strings.Contains(out, want) {
			t.Errorf("Markdown lacks %q", want)
		}
	}
}
