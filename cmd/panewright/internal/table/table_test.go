package table

import (
	"encoding/json"
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"
	"testing"

	"github.com/jedib0t/go-pretty/v6/text"

	"panewright/cmd/panewright/internal/demo"
	"panewright/glazing"
	"panewright/glazing/project"
)

// demoProject is the demo project, of which nothing is rated.
func demoProject(t *testing.T) Report {
	t.Helper()
	path, err := demo.Write(t.TempDir())
	if err != nil {
		t.Fatal(err)
	}
	p, err := project.Load(path, project.Access{})
	if err != nil {
		t.Fatal(err)
	}
	return Report{Version: "test", Project: p, Figures: glazing.Figures()}
}

// rated rates the make-ups of a report's project under the given bases.
func rated(t *testing.T, r Report, bases ...glazing.Basis) Report {
	t.Helper()
	for _, b := range bases {
		method := r.Project.Method(b)
		for _, m := range r.Project.Makeups {
			ratings, err := r.Project.RateBy(method, m)
			if err != nil {
				t.Fatal(err)
			}
			r.Ratings = append(r.Ratings, ratings...)
		}
	}
	return r
}

// demoReport rates the demo project under the given bases.
func demoReport(t *testing.T, bases ...glazing.Basis) Report {
	t.Helper()
	return rated(t, demoProject(t), bases...)
}

// plainReport rates the demo project without its conditions.
func plainReport(t *testing.T, bases ...glazing.Basis) Report {
	t.Helper()
	r := demoProject(t)
	r.Project.Conditions = nil
	return rated(t, r, bases...)
}

// A figure that is added to the list appears in every output without another edit.
func TestAddedFigureAppears(t *testing.T) {
	r := demoReport(t, glazing.EN)
	r.Figures = append(r.Figures, glazing.Figure{
		Key: "invented.figure", Alias: "inv", Symbol: "Xq", Unit: "furlong", Places: 3, Column: 99, Meaning: "an invented figure",
		Value: func(*glazing.Rating, int) glazing.Value { return glazing.Value{Number: 7.125, Known: true} },
	}, glazing.Figure{
		Key: "panes_invented.#", Symbol: "Yq", Places: 1, Per: glazing.PerPane, Meaning: "one a pane",
		Value: func(_ *glazing.Rating, i int) glazing.Value {
			return glazing.Value{Number: float64(i), Known: i > 0, Why: "a test"}
		},
	})
	schedule := strings.Join(strings.Fields(string(Schedule(r))), " ")
	for _, want := range []string{"Xq", "7.125", "Xq an invented figure, furlong"} {
		if !strings.Contains(schedule, want) {
			t.Errorf("the schedule lacks %q", want)
		}
	}
	explained := string(Explain(r))
	for _, want := range []string{"an invented figure", "one a pane, pane 2"} {
		if !strings.Contains(explained, want) {
			t.Errorf("explain lacks %q", want)
		}
	}
	sheet, err := CSV(r, CSVForm{UnitsRow: true})
	if err != nil {
		t.Fatal(err)
	}
	compared, err := CompareCSV(r, CSVForm{})
	if err != nil {
		t.Fatal(err)
	}
	file := openXLSX(t, r)
	for name, tt := range map[string]struct {
		out   string
		wants []string
	}{
		"CSV":                  {string(sheet), []string{"invented.figure", "panes_invented.2", ",7.125,", ",furlong,"}},
		"XLSX":                 {fmt.Sprint(rowsOf(t, file, "en")), []string{" invented.figure ", " panes_invented.2 ", " 7.125 ", " furlong "}},
		"XLSX, about":          {fmt.Sprint(rowsOf(t, file, aboutSheet)), []string{"Xq: an invented figure, furlong", "Yq2: one a pane, pane 2"}},
		"Markdown":             {string(Markdown(r)), []string{"| Xq |", "| 7.125 |", "- Xq an invented figure, furlong"}},
		"comparison":           {strings.Join(strings.Fields(string(Compare(r))), " "), []string{"Xq", "7.125", "Xq an invented figure, furlong"}},
		"comparison, JSON":     {string(CompareJSON(r)), []string{`"invented.figure": 7.125`, `"invented.figure": 0`, `"panes_invented.1": null`}},
		"comparison, CSV":      {string(compared), []string{"invented.figure", "difference.invented.figure"}},
		"comparison, Markdown": {string(CompareMarkdown(r)), []string{"| Xq | furlong | 7.125 |"}},
	} {
		for _, want := range tt.wants {
			if !strings.Contains(tt.out, want) {
				t.Errorf("%s lacks %q", name, want)
			}
		}
	}
	chosen := r
	if err := chosen.Choose([]string{"inv", "panes_invented.2"}); err != nil {
		t.Fatal(err)
	}
	if out := string(Schedule(chosen)); !strings.Contains(out, "Xq") || !strings.Contains(out, "Yq2") || strings.Contains(out, "τv") {
		t.Errorf("chosen, the schedule is\n%s", out)
	}
	var doc struct {
		Ratings []struct {
			Invented struct{ Figure float64 }
			Panes    []*float64 `json:"panes_invented"`
		}
	}
	if err := json.Unmarshal(JSON(r), &doc); err != nil {
		t.Fatal(err)
	}
	for _, x := range doc.Ratings {
		if x.Invented.Figure != 7.125 || len(x.Panes) < 2 || x.Panes[0] != nil || *x.Panes[1] != 1 {
			t.Errorf("JSON has %+v", x)
		}
	}
}

// What the user says of the project stands in the JSON, and where nothing is said no key does.
func TestSaidInJSON(t *testing.T) {
	r := demoReport(t, glazing.EN)
	p := *r.Project
	r.Project = &p
	for _, said := range []bool{true, false} {
		p.Author, p.Date, p.Client, p.Notes = "", "", "", ""
		if said {
			p.Author, p.Date, p.Client, p.Notes = "an author", "2026-01-31", "a client", "notes"
		}
		for name, out := range map[string][]byte{"rate": JSON(r), "compare": CompareJSON(r)} {
			var doc map[string]any
			if err := json.Unmarshal(out, &doc); err != nil {
				t.Fatal(err)
			}
			for key, want := range map[string]string{"author": p.Author, "date": p.Date, "client": p.Client, "notes": p.Notes} {
				if got, ok := doc[key]; ok != said || said && got != want {
					t.Errorf("%s: %s is %v, want %q", name, key, got, want)
				}
			}
		}
	}
}

// The keys of the JSON are a contract: these, in every rating, whatever is known.
func TestKeysOfJSON(t *testing.T) {
	r := demoReport(t, glazing.Bases()...)
	for i := range r.Ratings {
		r.Spectra = append(r.Spectra, r.Ratings[i].Ready.Spectra(r.Ratings[i].State, []float64{400, 550.5}))
	}
	var doc map[string]any
	if err := json.Unmarshal(JSON(r), &doc); err != nil {
		t.Fatal(err)
	}
	for _, key := range []string{"panewright", "project", "input_sha256"} {
		if s, ok := doc[key].(string); !ok || s == "" {
			t.Errorf("%s is %v", key, doc[key])
		}
	}
	lab := func(name string) string { return "colour." + name + ".l colour." + name + ".a colour." + name + ".b " }
	paths := strings.Fields(`makeup tint basis editions tilt_deg thickness_mm mass_kg_m2
		light.transmittance light.reflectance_outside light.reflectance_inside
		solar.transmittance solar.reflectance_outside solar.reflectance_inside solar.absorptance solar.conductances_w_m2k
		solar.secondary_heat_inward solar.g solar.shading_coefficient solar.light_to_solar_gain
		uv.transmittance uv.damage_weighted uv.damage_weighted_700 uv.skin_weighted colour.ra ` +
		lab("transmitted") + lab("reflected_outside") + lab("reflected_inside") +
		lab("transmitted_10deg") + lab("reflected_outside_10deg") + lab("reflected_inside_10deg") + `
		spectra.wavelength_nm spectra.tau spectra.rho_outside spectra.rho_inside spectra.absorptance
		surfaces gaps outside.coefficient_w_m2k inside.coefficient_w_m2k u_w_m2k balances cautions`)
	var reports []any // seen so far
	for _, x := range doc["ratings"].([]any) {
		rating := x.(map[string]any)
		for _, path := range paths {
			if _, ok := at(rating, path); !ok {
				t.Errorf("%v %v: no %s", rating["makeup"], rating["basis"], path)
			}
		}
		panes := len(rating["solar"].(map[string]any)["absorptance"].([]any))
		balance := rating["basis"] == "na" || rating["basis"] == "iso15099"
		balances := 2 // january-night and july-afternoon
		if balance {
			balances += 2 // winter and summer
		}
		for key, want := range map[string]int{"surfaces": 2 * panes, "gaps": panes - 1, "balances": balances, "thermal_stress": panes} {
			if list, ok := rating[key].([]any); !ok || len(list) != want {
				t.Errorf("%v: %s has %d elements, want %d", rating["makeup"], key, len(list), want)
			}
		}
		if i := len(reports); rating["editions"] != r.Ratings[i].Method.Editions() {
			t.Errorf("the editions are %v", rating["editions"])
		}
		reports = append(reports, rating)
		for i, s := range rating["surfaces"].([]any) {
			for _, key := range []string{"number", "emissivity_normal", "emissivity", "emissivity_hemispherical", "source"} {
				if _, ok := s.(map[string]any)[key]; !ok {
					t.Errorf("surface %d has no %s", i+1, key)
				}
			}
			if s.(map[string]any)["number"] != float64(i+1) {
				t.Errorf("surface %d is numbered %v", i+1, s.(map[string]any)["number"])
			}
		}
		for _, g := range rating["gaps"].([]any) {
			for _, key := range []string{"conductance_w_m2k", "radiative_w_m2k", "convective_w_m2k", "nusselt", "rayleigh", "temperature_drop_k"} {
				if _, ok := g.(map[string]any)[key]; !ok {
					t.Errorf("a gap has no %s", key)
				}
			}
		}
		for _, c := range rating["cautions"].([]any) {
			if c := c.(map[string]any); c["code"] == "" || c["text"] == "" {
				t.Errorf("an empty caution: %v", c)
			}
		}
		if rating["u_w_m2k"] == nil {
			t.Errorf("%v under %v: U is not known", rating["makeup"], rating["basis"])
		}
		nm := rating["spectra"].(map[string]any)["wavelength_nm"].([]any)
		if fmt.Sprint(nm) != "[400 550.5]" {
			t.Errorf("spectra at %v, want those asked for", nm)
		}
	}
}

func at(doc map[string]any, path string) (any, bool) {
	key, rest, more := strings.Cut(path, ".")
	v, ok := doc[key]
	if !ok || !more {
		return v, ok
	}
	inner, ok := v.(map[string]any)
	if !ok {
		return nil, false
	}
	return at(inner, rest)
}

// No line is wider than the page, however long the names are.
func TestWidth(t *testing.T) {
	r := balancedReport(t, glazing.EN, glazing.ISO, glazing.NA)
	conditions := slices.Clone(r.Ratings[0].Balances)
	c := *conditions[0].Condition
	c.ID = strings.Repeat("a.condition-", 5) + "of_1"
	conditions[0].Condition = &c
	r.Ratings[0].Balances = conditions
	long := *r.Ratings[0].Makeup
	long.ID = strings.Repeat("Ω-long.id_", 6) + "abcd"
	long.Title = strings.Repeat("word ", 40) + strings.Repeat("x", 200)
	r.Ratings[0].Makeup = &long
	r.Ratings[0].Tint = strings.Repeat("tint/", 30)
	for name, out := range map[string][]byte{"schedule": Schedule(r), "explain": Explain(r), "comparison": Compare(r)} {
		for i, line := range strings.Split(string(out), "\n") {
			if w := text.StringWidth(line); w > Width {
				t.Errorf("%s, line %d: %d columns: %s", name, i+1, w, line)
			}
			if strings.TrimRight(line, " ") != line {
				t.Errorf("%s, line %d ends with blanks", name, i+1)
			}
		}
	}
}

// The right-hand sides that explain prints give the values that it prints, within one of their
// last digit, when they are worked out anew.
func TestExplainedNumbers(t *testing.T) {
	r := demoReport(t, glazing.Bases()...)
	out := string(Explain(r))
	steps := 0
	for _, block := range equations(out) {
		numbers, printed, ok := cutLast(block, " = ")
		if !ok {
			continue // a formula, or a number put in as it is
		}
		printed, _, _ = strings.Cut(printed, " ")
		want, err := strconv.ParseFloat(printed, 64)
		if err != nil {
			t.Fatalf("%q: %v", block, err)
		}
		got, err := evaluate(numbers)
		if err != nil {
			t.Fatalf("%q: %v", numbers, err)
		}
		if math.Abs(got-want) > lastDigit(want) {
			t.Errorf("%s\n  is %.9g", block, got)
		}
		steps++
	}
	balances, sums := 0, 0
	for i := range r.Ratings {
		balances += len(r.Ratings[i].Balances)
		sums += 41 // from 380 to 780 nm, in steps of 10 nm, and under na of 5 nm
		if r.Ratings[i].Method.Basis.Name == "na" {
			sums += 40
		}
	}
	if want := 20 * (len(r.Ratings) + balances); steps < want {
		t.Errorf("%d equations in the explanation of %d ratings, want %d at least", steps, len(r.Ratings), want)
	}
	products := 0
	for _, m := range rowsOfSums(out) {
		if want := m[1] * m[2]; math.Abs(want-m[3]) > 10*lastDigit(m[3]) { // five digits are printed
			t.Errorf("row of a sum: %v: the product is %.9g", m, want)
		}
		products++
	}
	if products != sums {
		t.Errorf("%d rows of sums, want %d", products, sums)
	}
}

// equations returns the texts that begin with "= ", with the lines they were folded into joined.
func equations(out string) (list []string) {
	open := false
	for line := range strings.SplitSeq(out, "\n") {
		switch {
		case strings.HasPrefix(line, "         = "):
			list, open = append(list, strings.TrimPrefix(line, "         = ")), true
		case open && strings.HasPrefix(line, "           "):
			list[len(list)-1] += " " + strings.TrimSpace(line)
		default:
			open = false
		}
	}
	return list
}

func cutLast(s, sep string) (before, after string, ok bool) {
	i := strings.LastIndex(s, sep)
	if i < 0 {
		return s, "", false
	}
	return s[:i], s[i+len(sep):], true
}

// lastDigit is one unit of the sixth significant digit.
func lastDigit(v float64) float64 {
	if v == 0 {
		return 1e-6
	}
	return math.Pow10(int(math.Floor(math.Log10(math.Abs(v)))) - 5)
}

// rowsOfSums returns λ, f, W and the product of each row of a weighted sum.
func rowsOfSums(out string) (rows [][4]float64) {
	for line := range strings.SplitSeq(out, "\n") {
		fields := strings.Fields(line)
		var v []float64
		for _, f := range fields {
			if x, err := strconv.ParseFloat(f, 64); err == nil {
				v = append(v, x)
			}
		}
		if len(v) != len(fields) || len(v)%4 != 0 {
			continue
		}
		for ; len(v) > 0; v = v[4:] {
			rows = append(rows, [4]float64(v[:4]))
		}
	}
	return rows
}

// evaluate works out + − · / ^, brackets, max(a, b), exp(a), ln(a), and sin(a), cos(a) and atan(a) in degrees
// over decimal numbers.
func evaluate(s string) (float64, error) {
	p := &parser{s: strings.NewReplacer(" ", "", "−", "-", "·", "*").Replace(s)}
	v := p.sum()
	if p.s != "" || p.bad {
		return 0, fmt.Errorf("cannot evaluate at %q", p.s)
	}
	return v, nil
}

type parser struct {
	s   string
	bad bool
}

func (p *parser) take(prefix string) bool {
	rest, ok := strings.CutPrefix(p.s, prefix)
	if ok {
		p.s = rest
	}
	return ok
}

func (p *parser) sum() float64 {
	sign := 1.0
	if p.take("-") {
		sign = -1
	}
	v := sign * p.product()
	for {
		switch {
		case p.take("+"):
			v += p.product()
		case p.take("-"):
			v -= p.product()
		default:
			return v
		}
	}
}

func (p *parser) product() float64 {
	v := p.power()
	for {
		switch {
		case p.take("*"):
			v *= p.power()
		case p.take("/"):
			v /= p.power()
		default:
			return v
		}
	}
}

func (p *parser) power() float64 {
	v := p.atom()
	if p.take("^") {
		v = math.Pow(v, p.atom())
	}
	return v
}

func (p *parser) atom() float64 {
	if p.take("max(") {
		a := p.sum()
		p.bad = p.bad || !p.take(",")
		b := p.sum()
		p.bad = p.bad || !p.take(")")
		return math.Max(a, b)
	}
	for name, f := range map[string]func(float64) float64{
		"(": func(v float64) float64 { return v }, "exp(": math.Exp, "ln(": math.Log,
		"sin(":  func(degrees float64) float64 { return math.Sin(degrees * math.Pi / 180) },
		"cos(":  func(degrees float64) float64 { return math.Cos(degrees * math.Pi / 180) },
		"atan(": func(v float64) float64 { return math.Atan(v) * 180 / math.Pi },
	} {
		if p.take(name) {
			v := p.sum()
			p.bad = p.bad || !p.take(")")
			return f(v)
		}
	}
	n := 0
	for n < len(p.s) {
		c := p.s[n]
		exponent := n > 0 && (c == '+' || c == '-') && p.s[n-1] == 'e'
		if !(c >= '0' && c <= '9' || c == '.' || c == 'e' || exponent) {
			break
		}
		n++
	}
	v, err := strconv.ParseFloat(p.s[:n], 64)
	p.bad = p.bad || err != nil
	p.s = p.s[n:]
	return v
}
