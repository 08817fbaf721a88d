package table

import (
	"encoding/json"
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"panewright/glazing"
	"panewright/thermal"
)

func value(v float64) glazing.Value { return glazing.Value{Number: v, Known: true} }

// The invented conditions of tests: a night and a noon.
func invented() []glazing.Condition {
	return []glazing.Condition{
		{ID: "night", OutsideC: -12, InsideC: 20, InsideHumidity: value(0.45), WindMS: value(4), SkyC: value(-30)},
		{ID: "noon", OutsideC: 33, InsideC: 25, SunWM2: 650, InsideRadiantC: value(26), TiltDeg: value(60), HeightM: value(1.5), InsideConvectionWM2K: value(3)},
	}
}

// balancedReport rates the demo project under the given bases, with those conditions in the place of its own.
func balancedReport(t *testing.T, bases ...glazing.Basis) Report {
	t.Helper()
	r := demoProject(t)
	r.Project.Conditions = invented()
	return rated(t, r, bases...)
}

// The keys of a balance in JSON are a contract: these, in every balance, whatever is known. Those of a
// gap are those of a rating's gaps.
func TestBalancesOfJSON(t *testing.T) {
	r := balancedReport(t, glazing.EN, glazing.NA)
	single := &glazing.Makeup{ID: "S", Panes: r.Project.Makeups[0].Panes[:1]}
	alone, err := r.Project.Rate(single, glazing.NA)
	if err != nil {
		t.Fatal(err)
	}
	r.Ratings = append(r.Ratings, alone...)
	var doc struct{ Ratings []map[string]any }
	if err := json.Unmarshal(JSON(r), &doc); err != nil {
		t.Fatal(err)
	}
	paths := strings.Fields(`condition tilt_deg u_w_m2k g surface_temperatures_c inward_flux_w_m2 transmitted_w_m2 gaps
		outside.convective_w_m2k outside.radiative_w_m2k inside.convective_w_m2k inside.radiative_w_m2k iterations residual_w_m2
		absorptance secondary_heat_inward absorbed_w_m2 inside_surface_c hottest_c hottest_pane
		moisture.temperature_factor moisture.dew_point_c moisture.condensing_rh comfort.asymmetry_k comfort.sun_radiant_rise_k
		outside_c outside_radiant_c outside_mean_radiant_c inside_c inside_radiant_c wind_assumed
		outside_convection_w_m2k sun_w_m2 height_m`)
	for i, rating := range doc.Ratings {
		x := &r.Ratings[i]
		want := []string{"night", "noon"}
		if x.Method.Basis.Name == "na" {
			want = []string{"winter", "summer", "night", "noon"}
		}
		list := rating["balances"].([]any)
		if len(list) != len(want) {
			t.Fatalf("%s: %d balances, want %v", x.Makeup.ID, len(list), want)
		}
		for k, item := range list {
			b, of := item.(map[string]any), x.Balances[k]
			for _, path := range paths {
				if _, ok := at(b, path); !ok {
					t.Errorf("%s, %s: no %s", x.Makeup.ID, want[k], path)
				}
			}
			panes := len(x.Makeup.Panes)
			for key, n := range map[string]int{"surface_temperatures_c": 2 * panes, "gaps": panes - 1, "absorbed_w_m2": panes} {
				if list, ok := b[key].([]any); !ok || len(list) != n {
					t.Errorf("%s, %s: %s is %v, want a list of %d", x.Makeup.ID, want[k], key, b[key], n)
				}
			}
			for i, theta := range b["surface_temperatures_c"].([]any) {
				if theta != of.Lit.SurfaceK[i]-thermal.ZeroCelsius {
					t.Errorf("%s, %s: surface %d is at %v °C", x.Makeup.ID, want[k], i+1, theta)
				}
			}
			for key, v := range map[string]any{"condition": want[k], "sun_w_m2": of.Condition.SunWM2, "outside_c": of.Condition.OutsideC, "inside_c": of.Condition.InsideC} {
				if b[key] != v {
					t.Errorf("%s, %s: %s is %v, want %v", x.Makeup.ID, want[k], key, b[key], v)
				}
			}
			if sun := of.Condition.SunWM2 > 0; (b["g"] == nil) == sun || b["u_w_m2k"] != of.U.Number {
				t.Errorf("%s, %s: g is %v, U %v", x.Makeup.ID, want[k], b["g"], b["u_w_m2k"])
			}
			for _, g := range b["gaps"].([]any) {
				for _, key := range []string{"conductance_w_m2k", "radiative_w_m2k", "convective_w_m2k", "nusselt", "rayleigh", "temperature_drop_k"} {
					if _, ok := g.(map[string]any)[key]; !ok {
						t.Errorf("a gap has no %s", key)
					}
				}
			}
		}
		// What was given, and what was taken where nothing was.
		night, noon := list[len(list)-2].(map[string]any), list[len(list)-1].(map[string]any)
		for _, tt := range []struct {
			of   map[string]any
			key  string
			want any
		}{
			{night, "inside_rh", 0.45}, {noon, "inside_rh", nil}, {night, "wind_m_s", 4.0}, {noon, "wind_m_s", nil},
			{night, "wind_assumed", false}, {noon, "wind_assumed", true}, {night, "outside_convection_w_m2k", 20.0}, // 4 + 4 v
			{night, "sky_c", -30.0}, {noon, "sky_c", nil}, {night, "outside_radiant_c", -12.0}, {noon, "inside_radiant_c", 26.0},
			{night, "inside_convection_w_m2k", nil}, {noon, "inside_convection_w_m2k", 3.0}, {night, "height_m", 1.0}, {noon, "height_m", 1.5}, {noon, "tilt_deg", 60.0},
		} {
			if got, ok := tt.of[tt.key]; got != tt.want || ok != (tt.want != nil) {
				t.Errorf("%s, %v: %s is %v, want %v", x.Makeup.ID, tt.of["condition"], tt.key, got, tt.want)
			}
		}
		// Upright, half of what surface 1 sees is the sky: by hand, the mean of the fourth powers of
		// 261.15 and 243.15 K is that of 252.6306 K.
		if got := night["outside_mean_radiant_c"].(float64); x.Makeup.Tilt.Vertical() && math.Abs(got+20.5194) > 0.00005 {
			t.Errorf("the mean radiant temperature outdoors is %v °C", got)
		}
	}
}

// Of chosen figures under conditions JSON has these alone, with the names of the conditions.
func TestChosenBalancesOfJSON(t *testing.T) {
	r := balancedReport(t, glazing.EN, glazing.NA)
	if err := r.Choose([]string{"u@winter", "θ4@night", "balances.night.gaps.1.nusselt"}); err != nil {
		t.Fatal(err)
	}
	var doc struct {
		Ratings []struct {
			Basis    string
			U        *float64 `json:"u_w_m2k"`
			Balances []map[string]any
		}
	}
	if err := json.Unmarshal(JSON(r), &doc); err != nil {
		t.Fatal(err)
	}
	for i, x := range doc.Ratings {
		var got []string
		for _, b := range x.Balances {
			keys := []string{}
			for key := range b {
				keys = append(keys, key)
			}
			slices.Sort(keys)
			got = append(got, fmt.Sprint(b["condition"], keys))
		}
		want := []string{"night[condition gaps surface_temperatures_c]"}
		if x.Basis == "na" {
			want = append([]string{"winter[condition u_w_m2k]"}, want...)
		}
		if !slices.Equal(got, want) || x.U != nil {
			t.Errorf("rating %d has %q, want %q", i+1, got, want)
		}
	}
}

// A figure under a condition is known by its short name, symbol and key with the condition; the
// conditions are offered where that is missing or not known.
func TestChooseUnderConditions(t *testing.T) {
	r := balancedReport(t, glazing.NA)
	for _, tt := range []struct{ names, want, head string }{
		{"u@winter,u,U@night", "balances.winter.u_w_m2k u_w_m2k balances.night.u_w_m2k", "U@winter Ug U@night"},
		{"balances.noon.g,solar.g", "balances.noon.g solar.g", "g@noon g"},
		{"θ4@noon", "balances.noon.surface_temperatures_c.4", "θ4@noon"},
		{"balances.noon.surface_temperatures_c.2", "balances.noon.surface_temperatures_c.2", "θ2@noon"},
		{"nusselt@noon", "balances.noon.gaps.1.nusselt balances.noon.gaps.2.nusselt", "Nu1@noon Nu2@noon"},
	} {
		if err := r.Choose(strings.Split(tt.names, ",")); err != nil {
			t.Errorf("%s: %v", tt.names, err)
			continue
		}
		var heads []string
		for _, c := range r.Choices {
			heads = append(heads, c.Head())
		}
		if got := strings.Join(paths(r.Choices), " "); got != tt.want || strings.Join(heads, " ") != tt.head {
			t.Errorf("%s chooses %s, headed %q; want %s, %s", tt.names, got, heads, tt.want, tt.head)
		}
	}
	for _, tt := range []struct{ name, want string }{
		{"inside_surface", "it is one under a condition: write inside_surface@winter"},
		{"u@", "after @ stands a condition: winter, summer, night, noon"},
		{"u@cold-sun", "cold-sun is screened for thermal stress alone; a condition of the project has every figure"},
		{"light@noon", "light is not one of the figures under a condition: write light"},
		{"u@wintr", "no condition is called wintr; there are winter, summer, night, noon"},
		{"temprature@noon", "did you mean temperature@noon"},
		{"θ9@noon", "no make-up that was selected has surface 9"},
	} {
		if err := r.Choose([]string{tt.name}); err == nil || !strings.Contains(err.Error(), tt.want) {
			t.Errorf("%s: %v, want %q", tt.name, err, tt.want)
		}
	}
	en := plainReport(t, glazing.EN)
	if err := en.Choose([]string{"u@winter"}); err == nil || !strings.Contains(err.Error(), "the ratings have no condition") {
		t.Errorf("%v", err)
	}
	// Each has its own heading, and every short name chooses something.
	var heads []string
	for _, c := range r.everything() {
		if slices.Contains(heads, c.Head()) && c.Alias != "" {
			t.Errorf("%s has the heading %q, as another has", c.Path(), c.Head())
		}
		heads = append(heads, c.Head())
	}
	if err := r.Choose(FigureNames(r.all())); err != nil {
		t.Error(err)
	}
	if out := string(Schedule(r)); !strings.Contains(out, "θsi@noon") {
		t.Error("the schedule of all lacks θsi@noon")
	}
}

// Two make-ups of equal U and g may feel different: the schedule says under each condition what they
// absorb and give inwards, and how warm the room side and the hottest pane are.
func TestScheduleOfConditions(t *testing.T) {
	r := balancedReport(t, glazing.EN, glazing.NA)
	out := string(Schedule(r))
	flat := words([]byte(out))
	if got := strings.Count(flat, "condition make-up tint U g αe qi qin θsi θmax pane"); got != 2 {
		t.Errorf("the tables of conditions have their heads %d times", got)
	}
	for i := range r.Ratings {
		x := &r.Ratings[i]
		b := x.Balance("noon")
		var alpha float64
		for _, a := range x.Absorptance {
			alpha += a.Number
		}
		two := func(v float64) string {
			if v < 0.05 {
				return glazing.PrintRounded(v, 3)
			}
			return glazing.PrintRounded(v, 2)
		}
		want := words([]byte(strings.Join([]string{"noon", x.Makeup.ID, x.Tint, glazing.PrintRounded(b.U.Number, 2), two(b.G.Number), two(alpha),
			two(b.G.Number - x.Solar.Transmittance.Number), glazing.PrintRounded(b.Lit.InwardWM2(), 1), glazing.PrintRounded(b.SurfaceC(2*len(x.Makeup.Panes)-1).Number, 1)}, " ")))
		if !strings.Contains(flat, want) {
			t.Errorf("the schedule lacks %q", want)
		}
	}
	for _, want := range []string{
		"winter, of basis na: outdoors -18 °C; indoors 21 °C; convection outdoors 26 W/(m²·K); no sun",
		"summer, of basis na: outdoors 32 °C; indoors 24 °C; convection outdoors 15 W/(m²·K); sun 783 W/m²",
		"night: outdoors -12 °C, sky -30 °C; indoors 20 °C, humidity 0.45; wind 4 m/s, convection 20 W/(m²·K); no sun",
		"noon: outdoors 33 °C; indoors 25 °C, radiant 26 °C; wind assumed, convection 20 W/(m²·K); convection indoors 3 W/(m²·K); sun 650 W/m²; tilt 60°; height 1.5 m",
		"Thermal stress, a screening", "Moisture, without sun", "condition make-up tint fRsi θd φsi θedge φedge night D1 0.", "E1 each", r.BasesDiffer(),
	} {
		if !strings.Contains(flat, strings.ReplaceAll(want, "\u00a0", " ")) {
			t.Errorf("the schedule lacks %q", want)
		}
	}
	// In inch-pound units, by hand: -18 °C is -0.4 °F, -12 °C is 10.4 °F, 4 m/s are 8.948 mph, 783 W/m² 248.2 Btu/(h·ft²).
	r.InchPound = true
	flat = words(Schedule(r))
	for _, want := range []string{"outdoors -0.4 °F", "outdoors 10.4 °F, sky -22 °F", "wind 8.948 mph", "sun 248.2 Btu/(h·ft²)"} {
		if !strings.Contains(flat, want) {
			t.Errorf("in inch-pound units the schedule lacks %q", want)
		}
	}
	// Chosen figures stand alone; what they are under is said.
	r = balancedReport(t, glazing.NA)
	if err := r.Choose([]string{"u@night"}); err != nil {
		t.Fatal(err)
	}
	flat = words(Schedule(r))
	if strings.Contains(flat, "θmax") || strings.Contains(flat, "Thermal stress, a screening") || !strings.Contains(flat, "night: outdoors -12 °C") {
		t.Errorf("chosen, the schedule is\n%s", flat)
	}
}

// The pane that is nearest to its guide value is the one of the greatest share of it, in any tint: a
// toughened pane at 60 of 200 K is farther from it than an annealed one at 20 of 40 K.
func TestWorstStress(t *testing.T) {
	r := demoReport(t, glazing.EN)
	m := r.Ratings[0].Makeup
	state := func(drops ...float64) glazing.Rating {
		x := r.Ratings[0]
		x.Stress = nil
		for k, d := range drops {
			x.Stress = append(x.Stress, glazing.Stress{DropK: d, GuideK: []float64{200, 40}[k], Condition: "summer", Word: thermal.BelowGuide})
		}
		return x
	}
	unknown := state(0, 0)
	unknown.Stress[0].Why, unknown.Stress[1].Why = "a test", "a test"
	for _, tt := range []struct {
		of   []glazing.Rating
		pane int
		drop float64
	}{
		{[]glazing.Rating{state(60, 20)}, 1, 20}, {[]glazing.Rating{state(101, 20)}, 0, 101}, {[]glazing.Rating{state(60, 20), state(60, 21), state(60, 5)}, 1, 21},
		{[]glazing.Rating{unknown, state(60, 20)}, 1, 20}, {[]glazing.Rating{unknown}, -1, 0},
	} {
		got := Report{Figures: r.Figures, Ratings: tt.of}.worstStress()
		if tt.pane < 0 {
			if len(got) > 0 {
				t.Errorf("what is not known has a worst pane: %+v", got)
			}
			continue
		}
		if len(got) != 1 || got[0].pane != tt.pane || got[0].DropK != tt.drop || got[0].rating.Makeup != m {
			t.Errorf("the worst pane is %+v, want pane %d with %g K", got, tt.pane+1, tt.drop)
		}
	}
}

// Why bases differ stands in each page that shows several.
func TestBasesDifferIsSaid(t *testing.T) {
	for _, bases := range [][]glazing.Basis{{glazing.EN, glazing.NA}, {glazing.EN, glazing.ISO}, {glazing.NA, glazing.ISO15099}, {glazing.EN}} {
		r := balancedReport(t, bases...)
		want := strings.ReplaceAll(r.BasesDiffer(), "\u00a0", " ")
		if (want == "") != (len(bases) == 1) {
			t.Errorf("%d bases: %q", len(bases), want)
		}
		for name, page := range map[string][]byte{"schedule": Schedule(r), "Markdown": Markdown(r), "comparison": Compare(r), "comparison, Markdown": CompareMarkdown(r)} {
			if got := strings.Contains(strings.ReplaceAll(words(page), `\`, ""), want); !got {
				t.Errorf("%s lacks %q", name, want)
			}
			if len(bases) == 1 && strings.Contains(string(page), "bases differ. ") {
				t.Errorf("%s of one basis says that bases differ", name)
			}
		}
	}
}

// A comparison has a table for each condition; the change of a temperature is one in K.
func TestCompareConditions(t *testing.T) {
	r := balancedReport(t, glazing.NA)
	r.Ratings = r.Ratings[:2]
	out := words(Compare(r))
	a, b := &r.Ratings[0], &r.Ratings[1]
	for _, id := range []string{"winter", "summer", "night", "noon"} {
		if !strings.Contains(out, "Condition "+id+" D1 T1 figure figure change U W/(m²·K)") {
			t.Errorf("the comparison lacks condition %s", id)
		}
		was, is := a.Balance(id).SurfaceC(3).Number, b.Balance(id).SurfaceC(5).Number
		sign := ""
		if is > was {
			sign = "+"
		}
		want := fmt.Sprintf("θsi °C %s %s %s%s", glazing.PrintRounded(was, 1), glazing.PrintRounded(is, 1), sign, glazing.PrintRounded(is-was, 1))
		if !strings.Contains(out, want) {
			t.Errorf("the comparison lacks %q", want)
		}
	}
	if !strings.Contains(out, "of temperatures it is in K.") {
		t.Error("the comparison does not say that changes of temperatures are in K")
	}
	content, err := CompareCSV(r, CSVForm{UnitsRow: true})
	if err != nil {
		t.Fatal(err)
	}
	_, rows := readCSV(t, content, ',')
	if u := rows[0]; u["balances.noon.inside_surface_c"] != "°C" || u["difference.balances.noon.inside_surface_c"] != "K" {
		t.Errorf("CSV has the units %q and %q", u["balances.noon.inside_surface_c"], u["difference.balances.noon.inside_surface_c"])
	}
}

// A limit for a condition is shown with it, and the condition is said.
func TestCheckConditions(t *testing.T) {
	r := balancedReport(t, glazing.EN)
	u := limitOf(t, "u", value(0).Number, 1.4)
	u.Condition, u.Basis = "night", "en"
	long := u
	long.Condition = strings.Repeat("a.condition-", 5) + "of_1"
	for line := range strings.SplitSeq(string(CheckText(checkOf(r, u, long))), "\n") {
		if w := width(line); w > Width {
			t.Errorf("%d columns: %s", w, line)
		}
	}
	c := checkOf(r, u)
	for name, out := range outputsOf(t, c) {
		flat := words([]byte(out))
		wants := []string{"U@night", "U at least 0 and at most 1.4 W/(m²·K)", "condition night", "night: outdoors -12 °C"}
		if name == "JSON" || name == "CSV" {
			wants = []string{"balances.night.u_w_m2k", "night", "W/(m²·K)"}
		}
		for _, want := range wants {
			if !strings.Contains(flat, want) {
				t.Errorf("%s lacks %q", name, want)
			}
		}
	}
}
