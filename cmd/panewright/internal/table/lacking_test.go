package table

import (
	"encoding/json"
	"fmt"
	"slices"
	"strings"
	"testing"

	"panewright/glazing"
)

// Every dash under a condition has its reason on the page that shows it, and a chosen figure a caution in
// every format.
func TestReasonsUnderConditions(t *testing.T) {
	r := demoProject(t)
	r.Project.Conditions = append(invented(), glazing.Condition{ID: "even", OutsideC: 20, InsideC: 20, InsideHumidity: value(0.5)})
	r = rated(t, r, glazing.EN)
	for name, page := range map[string][]byte{"schedule": Schedule(r), "Markdown": Markdown(r), "comparison": Compare(r), "comparison, Markdown": CompareMarkdown(r)} {
		flat := strings.ReplaceAll(words(page), `\`, "")
		if !strings.Contains(flat, "Not known: U@even: indoor and outdoor air have one temperature.") {
			t.Errorf("%s does not say why U is not known where the air has one temperature", name)
		}
		// Only V1 has an edge.
		want := "θedge, φedge in night, even [D1, T1, E1, L1]: neither a temperature factor"
		if name := name; !strings.HasPrefix(name, "comparison") && !strings.Contains(flat, want) {
			t.Errorf("%s does not say %q", name, want)
		}
	}
	explained := words(Explain(r))
	for _, want := range []string{"θd@noon: the condition has no inside_rh", "g@night, qi@night, ERF@night, Δtmr@night: the condition has no sun"} {
		if !strings.Contains(explained, want) {
			t.Errorf("explain does not say %q", want)
		}
	}
	if err := r.Choose([]string{"u", "dew_point@noon", "g@night"}); err != nil {
		t.Fatal(err)
	}
	csv, err := CSV(r, CSVForm{})
	if err != nil {
		t.Fatal(err)
	}
	for name, page := range map[string][]byte{"schedule": Schedule(r), "Markdown": Markdown(r), "JSON": JSON(r), "CSV": csv} {
		flat := words(page)
		wants := []string{"No figure for θd@noon: the condition has no inside\\_rh", "No figure for g@night: the condition has no sun"}
		switch name {
		case "CSV":
			wants = []string{"missing_data"}
		case "Markdown":
		default:
			wants[0] = strings.ReplaceAll(wants[0], `\`, "")
		}
		for _, want := range wants {
			if !strings.Contains(flat, want) {
				t.Errorf("%s lacks %q", name, want)
			}
		}
	}
}

// Figures of one reason stand together where they lack under the same conditions.
func TestLackHeads(t *testing.T) {
	figure := func(symbol, id string) Choice {
		return Choice{Figure: glazing.Figure{Key: "balances." + id + "." + symbol, Symbol: symbol, Condition: id}}
	}
	for _, tt := range []struct {
		of   []Choice
		want string
	}{
		{[]Choice{figure("θd", "a")}, "θd@a"},
		{[]Choice{figure("g", "a"), figure("qi", "a")}, "g@a, qi@a"},
		{[]Choice{figure("g", "a"), figure("qi", "a"), figure("g", "b"), figure("qi", "b")}, "g, qi in a, b"},
		{[]Choice{figure("U", "a"), figure("g", "a"), figure("U", "b")}, "U in a, b, g@a"},
	} {
		if got := (&lack{figures: tt.of}).heads(); got != tt.want {
			t.Errorf("heads %q, want %q", got, tt.want)
		}
	}
}

// How stress is screened is said where the project has it otherwise than usual, and in JSON always, with
// all conditions; whose comfort it is stands there too.
func TestScreeningAndPersonSaid(t *testing.T) {
	r := balancedReport(t, glazing.EN)
	if s := r.ScreeningSaid(); s != "" {
		t.Errorf("without thermal_stress it is said that %q", s)
	}
	usual := words(Schedule(r))
	for _, id := range []string{"cold-sun", "summer-na"} { // of which either may be the worst of none
		if !strings.Contains(usual, id+", screened for thermal stress: outdoors ") {
			t.Errorf("the schedule does not describe %s", id)
		}
	}
	screening := glazing.StressScreening{FrameMarginK: 5, Factor: 0.8}
	person := glazing.AnyPerson()
	person.Standing, person.DistanceM, person.SkyShare = true, 1.25, 0.35
	for i := range r.Ratings {
		m := *r.Ratings[i].Method
		m.Options.Stress, m.Options.Person = &screening, &person
		r.Ratings[i].Method = &m
	}
	want := "the shaded edge is 5 K colder than the pane without sun, which is in ΔTs, and σ is taken with a factor k of 0.8."
	for name, page := range map[string][]byte{"schedule": Schedule(r), "Markdown": Markdown(r)} {
		if !strings.Contains(words(page), want) {
			t.Errorf("%s does not say %q", name, want)
		}
	}
	r.InchPound = true // 5 K are 9 °F
	if s := r.ScreeningSaid(); !strings.Contains(s, "9\u00a0°F (difference) colder") {
		t.Errorf("in inch-pound units: %q", s)
	}
	r.InchPound = false
	var doc struct {
		Person  map[string]any
		Ratings []struct {
			Screening struct {
				Factor, FrameMarginK float64
				Conditions           []map[string]any
			} `json:"thermal_stress_screening"`
		}
	}
	out := strings.ReplaceAll(string(JSON(r)), "frame_margin_k", "FrameMarginK")
	if err := json.Unmarshal([]byte(out), &doc); err != nil {
		t.Fatal(err)
	}
	for key, want := range map[string]any{"assumed": false, "posture": "standing", "distance_m": 1.25, "glass_width_m": 3.0, "sky_share": 0.35} {
		if doc.Person[key] != want {
			t.Errorf("the person's %s is %v, want %v", key, doc.Person[key], want)
		}
	}
	for _, x := range doc.Ratings {
		var ids []string
		for _, c := range x.Screening.Conditions {
			ids = append(ids, fmt.Sprint(c["condition"]))
			if sun, _ := c["sun_w_m2"].(float64); sun <= 0 {
				t.Errorf("stress is screened for %v without sun", c["condition"])
			}
		}
		if x.Screening.Factor != 0.8 || x.Screening.FrameMarginK != 5 || !slices.Equal(ids, []string{"noon", "summer-na", "cold-sun"}) {
			t.Errorf("screening %+v", x.Screening)
		}
	}
	if err := r.Choose([]string{"asymmetry@night", "stress_word"}); err != nil {
		t.Fatal(err)
	}
	flat := words(Schedule(r))
	for _, want := range []string{"a person (as the project has it), standing 1.25 m in front", want, "against guide 1", "noon: outdoors 33 °C", "cold-sun, screened"} {
		if !strings.Contains(flat, want) {
			t.Errorf("of chosen figures the schedule lacks %q", want)
		}
	}
}

// The number of the hottest pane is a column of CSV, that of a surface is not.
func TestNumbersInSheets(t *testing.T) {
	r := balancedReport(t, glazing.EN)
	keys := paths(r.inSheets())
	if !slices.Contains(keys, "balances.noon.hottest_pane") || slices.Contains(keys, "surfaces.1.number") {
		t.Errorf("the columns of CSV are %q", keys)
	}
}

// In the notes of a spreadsheet a figure is defined where the bases of the page define it.
func TestClausesOfBases(t *testing.T) {
	u, _, _ := glazing.FigureNamed("u")
	for _, tt := range []struct {
		bases []glazing.Basis
		want  []string
		not   string
	}{
		{[]glazing.Basis{glazing.EN}, []string{"EN 673"}, "under"},
		{[]glazing.Basis{glazing.NA}, []string{"ISO 15099"}, "EN 673"},
		{[]glazing.Basis{glazing.EN, glazing.ISO, glazing.NA}, []string{"under en and iso EN 673", "under na ISO 15099"}, "under iso"},
	} {
		got := balancedReport(t, tt.bases...).clauses(u)
		for _, want := range tt.want {
			if !strings.Contains(got, want) || strings.Contains(got, tt.not) {
				t.Errorf("%d bases: U is defined in %q", len(tt.bases), got)
			}
		}
	}
}
