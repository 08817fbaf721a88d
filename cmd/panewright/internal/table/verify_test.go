package table

import (
	"encoding/json"
	"errors"
	"maps"
	"slices"
	"strconv"
	"strings"
	"testing"

	"github.com/jedib0t/go-pretty/v6/text"

	"panewright/glazing/proof"
	"panewright/reference/checks"
)

// verification is that of all checks, of which the first of a group misses its figure and the
// second, whose kind nobody knows, has none.
func verification() Verification {
	groups := checks.Groups()
	at := slices.IndexFunc(groups, func(g checks.Group) bool { return strings.Contains(g.Title, "EN 12898") })
	spoilt := slices.Clone(groups[at].Checks)
	spoilt[0].Want += 1
	spoilt[0].Printed = "2.22"
	spoilt[1].Kind = "guess"
	groups[at].Checks = spoilt
	return Verification{Version: "9.9", Go: "go9.99", System: "plan9", Architecture: "mips", Groups: proof.Run(groups)}
}

// outcomesByID returns all outcomes.
func outcomesByID(v Verification) map[string]proof.Outcome {
	list := map[string]proof.Outcome{}
	for _, g := range v.Groups {
		for _, o := range g.Outcomes {
			list[o.ID] = o
		}
	}
	return list
}

// The page fits 80 columns, and each check stands on it once with its five numbers; what is said of
// groups, the counts and the machine too.
func TestVerifyText(t *testing.T) {
	v := verification()
	out := string(Verify(v))
	rows, all := map[string][]string{}, outcomesByID(v)
	for i, line := range strings.Split(out, "\n") {
		if w := text.StringWidth(line); w > Width {
			t.Errorf("line %d: %d columns: %s", i+1, w, line)
		}
		words := strings.Fields(line)
		if len(words) == 0 {
			continue
		}
		if _, row := all[words[0]]; row && len(words) > len(numberHeads) {
			if rows[words[0]] != nil {
				t.Errorf("%s stands twice", words[0])
			}
			rows[words[0]] = words[len(words)-len(numberHeads):]
		}
	}
	for id, o := range all {
		if want := numbersOf(o); !slices.Equal(rows[id], want) {
			t.Errorf("%s: the page has %q, want %q", id, rows[id], want)
		}
	}
	page := strings.Join(strings.Fields(out), " ")
	for _, g := range v.Groups {
		list := []string{g.Title}
		for _, n := range notes(g) {
			list = append(list, n[0]+": "+n[1])
		}
		for _, o := range g.Outcomes {
			list = append(list, o.Subject, o.Source, o.Standing, o.Known.Why)
		}
		for _, want := range list {
			if !strings.Contains(page, strings.Join(strings.Fields(want), " ")) {
				t.Errorf("the page does not say: %s", want)
			}
		}
	}
	missed := all[v.Missed()[1]]
	for _, want := range []string{
		"Panewright 9.9, go9.99, plan9/mips", "is not claimed", "not certified", "Missed: en12898-ratio-01, en12898-ratio-03 ", missed.Err.Error(), "unknown kind",
		"cie13-fl8-ra: FL8 computes to 95.50", "standing checks met known missed", " all " + strings.Join(v.countsOf(""), " ") + " ",
	} {
		if !strings.Contains(page, want) {
			t.Errorf("the page does not say: %s", want)
		}
	}
}

var errNone = errors.New("no figure")

// Numbers as they are printed, by hand.
func TestVerifyNumbers(t *testing.T) {
	check := checks.Check{Printed: "1.10", Want: 1.1, Tolerance: 0.005}
	for _, tt := range []struct {
		o    proof.Outcome
		want string
	}{
		{proof.Outcome{Check: check, Got: 1.10271, Deviation: 0.00271, Result: proof.Met}, "1.1027 1.10 +0.0027 0.005 met"},
		{proof.Outcome{Check: check, Got: 1.0923456, Deviation: -0.0076544, Result: proof.Missed}, "1.0923 1.10 -0.007654 0.005 missed"},
		{proof.Outcome{Check: checks.Check{Printed: "95", Want: 95, Tolerance: 0.5}, Got: 95.50441, Deviation: 0.50441, Result: proof.Known}, "95.50 95 +0.5044 0.5 known"},
		{proof.Outcome{Check: checks.Check{Printed: "2.8", Want: 2.8}, Got: 2.8, Result: proof.Met}, "2.8 2.8 0 0 met"},
		{proof.Outcome{Check: check, Result: proof.Missed, Err: errNone}, "– 1.10 – 0.005 missed"},
	} {
		if got := strings.Join(numbersOf(tt.o), " "); got != tt.want {
			t.Errorf("printed %q, want %q", got, tt.want)
		}
	}
}

// JSON and CSV have every check with all its digits, its inputs, source and standing, and agree with
// each other and with the page.
func TestVerifyFormatsAgree(t *testing.T) {
	v := verification()
	var doc struct {
		Panewright, Go, System, Architecture, Scope string
		Groups                                      []struct {
			Title, Inputs, Tolerance, Verified string
			Checks                             []struct {
				ID, Subject, What, Unit, Result, Source, Standing, Remark string
				Inputs                                                    map[string]string
				Computed, Deviation                                       *float64
				Published, Tolerance                                      float64
			}
		}
		Summary map[string]any
	}
	if err := json.Unmarshal(VerifyJSON(v), &doc); err != nil {
		t.Fatal(err)
	}
	content, err := VerifyCSV(v, CSVForm{})
	if err != nil {
		t.Fatal(err)
	}
	_, rows := readCSV(t, content, ',')
	all := outcomesByID(v)
	n := 0
	for _, g := range doc.Groups {
		for _, c := range g.Checks {
			row, o := rows[n], all[c.ID]
			n++
			if c.Source == "" || !slices.Contains(checks.Standings(), c.Standing) || !maps.Equal(c.Inputs, o.Inputs) {
				t.Errorf("%s has source %q, standing %q, inputs %q", c.ID, c.Source, c.Standing, c.Inputs)
			}
			if c.Published != o.Want || c.Tolerance != o.Tolerance || c.Result != string(o.Result) {
				t.Errorf("%s: JSON has %g ± %g, %s; want %g ± %g, %s", c.ID, c.Published, c.Tolerance, c.Result, o.Want, o.Tolerance, o.Result)
			}
			if known := c.Computed != nil && c.Deviation != nil; known != (o.Err == nil) || known && (*c.Computed != o.Got || *c.Deviation != o.Deviation) {
				t.Errorf("%s: JSON has %v off by %v, want %g off by %g", c.ID, c.Computed, c.Deviation, o.Got, o.Deviation)
			}
			text := map[string]string{"group": g.Title, "id": c.ID, "subject": c.Subject, "what": c.What, "unit": c.Unit, "result": c.Result,
				"source": c.Source, "standing": c.Standing, "remark": c.Remark, "computed_by": "Panewright 9.9, go9.99, plan9/mips"}
			for key, want := range text {
				if row[key] != want {
					t.Errorf("%s: CSV has %s %q, JSON %q", c.ID, key, row[key], want)
				}
			}
			for key, want := range map[string]*float64{"computed": c.Computed, "deviation": c.Deviation, "published": &c.Published, "tolerance": &c.Tolerance} {
				if got, err := strconv.ParseFloat(row[key], 64); want == nil && row[key] != "" || want != nil && (err != nil || got != *want) {
					t.Errorf("%s: CSV has %s %q, JSON %v", c.ID, key, row[key], want)
				}
			}
			for key, value := range c.Inputs {
				if !strings.Contains("; "+row["inputs"]+"; ", "; "+key+"="+value+"; ") {
					t.Errorf("%s: CSV has the inputs %q without %s=%s", c.ID, row["inputs"], key, value)
				}
			}
		}
	}
	if n != len(all) || len(rows) != n {
		t.Errorf("JSON has %d checks, CSV %d, there are %d", n, len(rows), len(all))
	}
	if doc.Panewright != "9.9" || doc.Go != "go9.99" || doc.System != "plan9" || doc.Architecture != "mips" || !strings.Contains(doc.Scope, "not claimed") {
		t.Errorf("JSON is headed %+v", doc)
	}
	for i, key := range []string{"checks", "met", "known", "missed"} {
		if got := doc.Summary[key]; strconv.FormatFloat(got.(float64), 'g', -1, 64) != v.countsOf("")[i] {
			t.Errorf("the summary has %s %v, the page %q", key, got, v.countsOf(""))
		}
	}
	known := 0.0
	for _, o := range all {
		if o.Result == proof.Known {
			known++
		}
	}
	if doc.Summary["missed"] != 2.0 || doc.Summary["known"] != known || known < 1 {
		t.Errorf("the summary is %v, want 2 missed and %g known", doc.Summary, known)
	}
}

// Markdown has a row a check with the numbers of the page.
func TestVerifyMarkdown(t *testing.T) {
	v := verification()
	out := string(VerifyMarkdown(v))
	rows := map[string][]string{}
	for _, row := range cellsOf(out) {
		rows[row[0]] = row
	}
	for id, o := range outcomesByID(v) {
		row := rows[strings.ReplaceAll(id, "_", `\_`)]
		if len(row) != 2+len(numberHeads) || !slices.Equal(row[2:], numbersOf(o)) {
			t.Errorf("%s: the row is %q, want %q", id, row, numbersOf(o))
		}
	}
	for _, want := range []string{"# " + verifyTitle, "## Summary", "is not claimed", "Missed: en12898-ratio-01"} {
		if !strings.Contains(out, want) {
			t.Errorf("Markdown lacks %q", want)
		}
	}
}
