package sheet

// What a document says of its figures: meanings, reasons, conditions, clauses.

import (
	"strings"
	"testing"

	"panewright/glazing"
)

// The schedule has thermal stress and moisture as the pages of text have them.
func TestScheduleHasConsequences(t *testing.T) {
	r := conditioned(t, "en", "na")
	p := &paper{r: r, full: map[string]bool{}}
	p.schedule()
	printed := body(t, p.pages)
	for _, table := range []struct {
		title, about string
		rows         [][]string
	}{
		{r.StressTable().Title, r.StressTable().About, r.StressTable().Rows},
		{r.MoistureTable().Title, r.MoistureTable().About, r.MoistureTable().Rows},
	} {
		if len(table.rows) < 3 {
			t.Fatalf("%s has %d rows", table.title, len(table.rows))
		}
		if !strings.Contains(printed, tight(table.title)) || !strings.Contains(printed, tight(table.about)) {
			t.Errorf("the schedule lacks %q or what is said of it", table.title)
		}
		for _, row := range table.rows {
			want := tight(strings.ReplaceAll(strings.Join(row[1:], ""), "-", "−"))
			if !strings.Contains(strings.ReplaceAll(printed, "-", "−"), want) {
				t.Errorf("%s lacks the row %q", table.title, row)
			}
		}
	}
	// What symbols mean under conditions is said apart from what they mean by themselves.
	for _, f := range glazing.BalanceFigures() {
		if f.Schedule > 0 && !strings.Contains(printed, tight(f.Symbol+f.Meaning)) {
			t.Errorf("the schedule does not say what %s is under a condition", f.Symbol)
		}
	}
}

// The pages of limits describe the conditions that limits are for and no other, and give a figure the
// meaning that it has there.
func TestLimitsDescribeConditions(t *testing.T) {
	r, c := made(t, t.TempDir(), keys{"project": "Limits", "basis": "na",
		"conditions": []keys{{"id": "hot-roof", "outside_c": 30, "inside_c": 25, "sun_w_m2": 500}, {"id": "other", "outside_c": 1, "inside_c": 25}},
		"makeups":    []keys{{"id": "A", "outside_to_inside": []keys{pane("soda-lime-6"), gap(16), pane("soda-lime-4")}}},
		"limits":     []keys{{"figure": "u", "at_most": 3, "condition": "winter"}, {"figure": "hottest", "at_most": 40, "condition": "hot-roof"}},
	}, nil)
	p := &paper{r: r, full: map[string]bool{}}
	p.limits(*c)
	printed := body(t, p.pages)
	for want, is := range map[string]bool{
		"winter, of basis na: outdoors −18 °C": true, "hot-roof: outdoors 30 °C": true, "other: outdoors": false, "summer, of basis": false,
		"UU-value at the temperatures of the condition, without sun": true, "U-value of the centre of the glass": false,
		"U@winter": true, "θmax@hot-roof": true,
	} {
		if strings.Contains(printed, tight(want)) != is {
			t.Errorf("the pages of limits say %q: %v", want, !is)
		}
	}
	if got := symbolAt("θmax@hot-roof"); got != "θ_{max}@hot-roof" {
		t.Errorf("the markup is %q", got)
	}
}

// Words of a sentence that are symbols are set as such, with what stands behind them; no others are.
func TestWorded(t *testing.T) {
	p := &paper{r: conditioned(t, "en")}
	for s, want := range map[string]string{
		"qin heat, θsi; of ΔTs.":            "q_{in} heat, θ_{si}; of ΔT_{s}.",
		"fRsi@hot_1: no, θ4@he":             `f_{Rsi}@hot\_1: no, θ_{4}@he`,
		"h_1 said Rest pane vf":             `h\_1 said Rest pane v_{f}`,
		"g − τe":                            "g − τ_{e}",
		"the Rhine, quiet Ug: temperatures": "the Rhine, quiet U_{g}: temperatures",
	} {
		if got := p.worded(s); got != want {
			t.Errorf("%q is set as %q, want %q", s, got, want)
		}
	}
}

// U, g and what goes with them are defined by ISO 15099 on sheets of the bases of balances, and nowhere else.
func TestClausesOfBalances(t *testing.T) {
	for basis, is := range map[string]bool{"en": false, "iso": false, "na": true, "iso15099": true} {
		r := conditioned(t, basis)
		for _, group := range groups(r) {
			for _, row := range (&paper{r: r}).figureTables(group, width)[0].rows {
				clause := row[len(row)-1]
				switch row[0] {
				case "U_{g}", "g", "q_{i}", "h_{e}", "h_{i}":
					if strings.HasPrefix(clause, "ISO 15099") != is {
						t.Errorf("under %s %s is defined in %q", basis, row[0], clause)
					}
				case "τ_{v}":
					if strings.Contains(clause, "15099") {
						t.Errorf("under %s light is defined in %q", basis, clause)
					}
				}
			}
		}
	}
}

// Tables of moisture and comfort have about as many conditions each, and a source all or none.
func TestManyConditions(t *testing.T) {
	var list []keys
	for _, id := range strings.Fields("c1 c2 c3 c4 c5 c6 c7") {
		list = append(list, keys{"id": id, "outside_c": 1, "inside_c": 20, "inside_rh": 0.5})
	}
	r, _ := made(t, t.TempDir(), keys{"project": "Many", "conditions": list,
		"makeups": []keys{{"id": "A", "outside_to_inside": []keys{pane("soda-lime-6"), gap(16), pane("soda-lime-4")}}}}, nil)
	p := &paper{r: r, full: map[string]bool{}}
	p.makeup(groups(r)[0], false)
	printed := body(t, p.pages)
	if n := strings.Count(printed, tight("Moisture and comfort")); n != 2 || strings.Count(printed, tight("EN ISO 13788")) != 2*4 {
		t.Errorf("%d tables, with %d sources", n, strings.Count(printed, tight("EN ISO 13788")))
	}
	if n := strings.Count(printed, tight("Comfort is that of a person (assumed")); n != 1 {
		t.Errorf("whose comfort it is is said %d times", n)
	}
}
