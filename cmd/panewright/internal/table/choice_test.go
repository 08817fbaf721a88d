package table

import (
	"bytes"
	"encoding/json"
	"slices"
	"strconv"
	"strings"
	"testing"

	"github.com/jedib0t/go-pretty/v6/text"

	"panewright/glazing"
)

// paths returns what was chosen.
func paths(list []Choice) (out []string) {
	for _, c := range list {
		out = append(out, c.Path())
	}
	return out
}

func TestChoose(t *testing.T) {
	r := demoReport(t, glazing.EN) // at most three panes
	for _, tt := range []struct{ names, want, head string }{
		{"light,g,u", "light.transmittance solar.g u_w_m2k", "τv g Ug"},
		{"u,light", "u_w_m2k light.transmittance", "Ug τv"},
		{"absorptance", "solar.absorptance.1 solar.absorptance.2 solar.absorptance.3", "αe1 αe2 αe3"},
		{"surfaces.3.emissivity", "surfaces.3.emissivity", "ε3"},
		{"surfaces.#.emissivity_normal", "surfaces.1.emissivity_normal surfaces.2.emissivity_normal surfaces.3.emissivity_normal " +
			"surfaces.4.emissivity_normal surfaces.5.emissivity_normal surfaces.6.emissivity_normal", "εn1 εn2 εn3 εn4 εn5 εn6"},
		{"gaps.1.nusselt, solar.conductances_w_m2k.2", "gaps.1.nusselt solar.conductances_w_m2k.2", "Nu1 Λ2"},
		{"solar.g,g,g", "solar.g", "g"},
		{"absorptance,solar.absorptance.2", "solar.absorptance.1 solar.absorptance.2 solar.absorptance.3", "αe1 αe2 αe3"},
		{"surfaces.2.source", "surfaces.2.source", "source 2"},
		{"l_transmitted,l_outside,b_inside10", "colour.transmitted.l colour.reflected_outside.l colour.reflected_inside_10deg.b", "L*τ L*ρ b*ρ′,10"},
		// symbols, as headings have them, also those that hold a comma
		{"τv,Ug,ρv′", "light.transmittance u_w_m2k light.reflectance_inside", "τv Ug ρv′"},
		{"αe2,ε3,Nu1", "solar.absorptance.2 surfaces.3.emissivity gaps.1.nusselt", "αe2 ε3 Nu1"},
		{"αe", "solar.absorptance.1 solar.absorptance.2 solar.absorptance.3", "αe1 αe2 αe3"},
		{"τdf,700,τdf,L*τ,10,g", "uv.damage_weighted_700 uv.damage_weighted colour.transmitted_10deg.l solar.g", "τdf,700 τdf L*τ,10 g"},
	} {
		if err := r.Choose(strings.Split(tt.names, ",")); err != nil {
			t.Errorf("%s: %v", tt.names, err)
			continue
		}
		if got := strings.Join(paths(r.Choices), " "); got != tt.want {
			t.Errorf("%s chooses %s, want %s", tt.names, got, tt.want)
		}
		var heads []string
		for _, c := range r.Choices {
			heads = append(heads, c.Head())
		}
		if got := strings.Join(heads, " "); got != tt.head {
			t.Errorf("%s has the headings %s, want %s", tt.names, got, tt.head)
		}
	}
	for _, tt := range []struct{ names, want string }{
		{"lihgt", `unknown figure "lihgt" (did you mean light?); see panewright help figures`},
		{"light,surfaces.3.emisivity", "did you mean surfaces.3.emissivity?"},
		{"shgc", "did you mean g?"},
		{"U-value", "did you mean u?"},
		{"lt", "did you mean light?"},
		{"ρv'", "did you mean ρv or ρv′?"},
		{"L*", "did you mean L*τ or L*ρ?"},
		{"emiss", "did you mean emissivity_normal or emissivity or emissivity_hemispherical?"},
		{"ε0", "unknown figure"},
		{"ε9", "no make-up that was selected has surface 9"},
		{"nothing,light,nowhere", `unknown figures "nothing", "nowhere"; see panewright help figures`},
		{"aa-,bb-,cc-,dd-,ee-,ff-,gg-,hh-,ii-,jj-", `"hh-", and 2 more; see`},
		{"", "a name is empty"},
		{"light,,g", "a name is empty"},
		{"xyzzy-and-more", `unknown figure "xyzzy-and-more"; see panewright help figures`},
		{"surfaces.9.emissivity", "no make-up that was selected has surface 9"},
		{"gaps.3.nusselt", "no make-up that was selected has gap 3"},
		{"surfaces.0.emissivity", "unknown figure"},
		{"u_btu_h_ft2_f", "unknown figure"}, // not in inch-pound units
		{strings.Repeat("x", 5000), "unknown figure"},
	} {
		err := r.Choose(strings.Split(tt.names, ","))
		if err == nil || !strings.Contains(err.Error(), tt.want) || len(err.Error()) > 700 {
			t.Errorf("%.40q: %v, want %q", tt.names, err, tt.want)
		}
	}
	// In inch-pound units a figure is known by both keys.
	r.InchPound = true
	if err := r.Choose([]string{"u_w_m2k", "thickness_in", "conductance"}); err != nil {
		t.Fatal(err)
	}
	if got := strings.Join(paths(r.Choices), " "); got != "u_btu_h_ft2_f thickness_in solar.conductances_btu_h_ft2_f.1 solar.conductances_btu_h_ft2_f.2" {
		t.Errorf("in inch-pound units: %s", got)
	}
}

// No two columns have one heading, and every short name chooses something.
func TestHeadings(t *testing.T) {
	r := demoReport(t, glazing.EN)
	var heads []string
	for _, c := range r.everything() {
		if head := c.Head(); head == "" || slices.Contains(heads, head) {
			t.Errorf("%s has the heading %q, as another has", c.Path(), head)
		}
		heads = append(heads, c.Head())
	}
	if err := r.Choose(FigureNames(r.Figures)); err != nil {
		t.Error(err)
	}
}

// A trade word stands for a figure that there is, and is none itself.
func TestTradeWords(t *testing.T) {
	for word, name := range tradeWords {
		if _, _, ok := glazing.FigureNamed(name); !ok {
			t.Errorf("%s is said to be %q, which is no figure", word, name)
		}
		if f, _, ok := glazing.FigureNamed(word); ok {
			t.Errorf("%s names %s by itself", word, f.Key)
		}
		if word != strings.ToLower(word) {
			t.Errorf("%s is not in lower case", word)
		}
	}
}

// All figures at once are folded at the width of the page, and all are there.
func TestManyColumns(t *testing.T) {
	r := demoReport(t, glazing.EN, glazing.NA)
	for _, ip := range []bool{false, true} {
		r.InchPound, r.Choices = ip, nil
		if err := r.Choose(FigureNames(r.Figures)); err != nil {
			t.Fatal(err)
		}
		out := string(Schedule(r))
		for i, line := range strings.Split(out, "\n") {
			if w := text.StringWidth(line); w > Width {
				t.Errorf("line %d: %d columns: %s", i+1, w, line)
			}
		}
		words := " " + words([]byte(out)) + " "
		for _, c := range r.Choices {
			if !strings.Contains(words, " "+c.Head()+" ") {
				t.Errorf("the schedule lacks %s", c.Head())
			}
		}
		if strings.Contains(out, siRemains[:20]) != ip {
			t.Errorf("inch-pound units are %t, and what is said of them is not so", ip)
		}
	}
}

// JSON of chosen figures has these alone, as they stand in the whole.
func TestChosenJSON(t *testing.T) {
	r := demoReport(t, glazing.EN)
	var all, some map[string]any
	if err := json.Unmarshal(JSON(r), &all); err != nil {
		t.Fatal(err)
	}
	if err := r.Choose([]string{"u", "surfaces.3.emissivity", "absorptance", "light"}); err != nil {
		t.Fatal(err)
	}
	out := JSON(r)
	if err := json.Unmarshal(out, &some); err != nil {
		t.Fatal(err)
	}
	for i, x := range some["ratings"].([]any) {
		rating, whole := x.(map[string]any), all["ratings"].([]any)[i].(map[string]any)
		for _, path := range []string{"u_w_m2k", "light.transmittance", "cautions", "panes", "title"} {
			got, ok := at(rating, path)
			want, _ := at(whole, path)
			if a, b := canonical(t, got), canonical(t, want); !ok || a != b {
				t.Errorf("%s is %s, want %s", path, a, b)
			}
		}
		absorbed, _ := at(rating, "solar.absorptance")
		want, _ := at(whole, "solar.absorptance")
		if a, b := canonical(t, absorbed), canonical(t, want); a != b {
			t.Errorf("absorptance is %s, want %s", a, b)
		}
		faces := rating["surfaces"].([]any)
		for k, s := range faces {
			if want := whole["surfaces"].([]any)[k].(map[string]any)["emissivity"]; len(s.(map[string]any)) != 1 || s.(map[string]any)["emissivity"] != want {
				t.Errorf("surface %d is %v, want the emissivity %v alone", k+1, s, want)
			}
		}
		if len(faces) != len(whole["surfaces"].([]any)) {
			t.Errorf("%d surfaces", len(faces))
		}
		for _, path := range []string{"light.reflectance_outside", "solar.g", "uv", "colour", "gaps", "balances"} {
			if v, ok := at(rating, path); ok {
				t.Errorf("%s was not chosen and is %v", path, v)
			}
		}
	}
	if !bytes.Contains(out, []byte("typed_by_user")) {
		t.Error("what the user typed is left out")
	}
}

func canonical(t *testing.T, v any) string {
	t.Helper()
	out, err := json.Marshal(v)
	if err != nil {
		t.Fatal(err)
	}
	return string(out)
}

// jsonAt returns what stands in a JSON document at the key of a figure, which counts from 1, and names
// balances by their conditions.
func jsonAt(doc any, path string) (any, bool) {
	if rest, ok := strings.CutPrefix(path, "balances."); ok {
		id, within, _ := strings.Cut(rest, ".")
		for _, b := range doc.(map[string]any)["balances"].([]any) {
			if b.(map[string]any)["condition"] == id {
				return jsonAt(b, within)
			}
		}
		return nil, false
	}
	for key := range strings.SplitSeq(path, ".") {
		switch x := doc.(type) {
		case map[string]any:
			v, ok := x[key]
			if !ok {
				return nil, false
			}
			doc = v
		case []any:
			n, err := strconv.Atoi(key)
			if err != nil || n < 1 || n > len(x) {
				return nil, false
			}
			doc = x[n-1]
		default:
			return nil, false
		}
	}
	return doc, true
}
