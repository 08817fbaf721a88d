package table

import (
	"fmt"
	"strings"
	"testing"
	"unicode"

	"panewright/glazing"
	"panewright/spectra"
)

func TestVerdict(t *testing.T) {
	for _, tt := range []struct {
		c    glazing.Coverage
		want string
	}{
		{glazing.Coverage{}, "covered"},
		{glazing.Coverage{Below: 0.0005}, "held 0.05 %"},
		{glazing.Coverage{Above: 0.00012, Below: 0.0002}, "held 0.032 %"},
		{glazing.Coverage{Within: 0.0009}, "gap 0.09 %"},
		{glazing.Coverage{Within: 0.0004, Above: 0.0001}, "held+gap 0.05 %"},
		{glazing.Coverage{Below: 0.25, Why: "a reason"}, "null 25 %"},
		{glazing.Coverage{Below: 1e-6}, "held <0.001 %"},
		{glazing.Coverage{Above: 1, Why: "a reason"}, "null 100 %"},
		{glazing.Coverage{Why: "a reason"}, "null"},
	} {
		if got := verdict(tt.c); got != tt.want {
			t.Errorf("%+v: %q, want %q", tt.c, got, tt.want)
		}
	}
}

// words returns a page with its blanks and line ends made one blank each.
func words(page []byte) string { return strings.Join(strings.Fields(string(page)), " ") }

func TestSpectrumPage(t *testing.T) {
	tau := spectra.Column{File: "held.csv", Curve: straight(302, 2500, 1, 0.5, 0.7)}
	tau.Value[400] = -0.001
	for k := range 10 { // gaps of 1 nm from 1400 nm on, each of two steps
		i := 1098 - 2*k
		tau.NM, tau.Value = append(tau.NM[:i:i], tau.NM[i+1:]...), append(tau.Value[:i:i], tau.Value[i+1:]...)
	}
	for i := 1; i < tau.Len(); i++ {
		if tau.NM[i]-tau.NM[i-1] > 1 {
			tau.Gaps = append(tau.Gaps, spectra.Span{FromNM: tau.NM[i-1], ToNM: tau.NM[i]})
		}
	}
	rho := spectra.Column{Curve: straight(400, 2500, 20, 0.1, 0.35)}
	infrared := spectra.Column{Curve: straight(5000, 50000, 1000, 0.9, 0.9)}
	p := SpectrumPage{
		Version: "test",
		Files:   []SpectrumFile{{"held.csv", "a format", []string{strings.Repeat("a long remark ", 20)}}},
		Series: []Series{
			{RoleTau, 'T', "held", RoleTau, tau}, {RoleRhoFront, 'f', "held", RoleRhoFront, rho},
			{"spectrum 3 of a very long name indeed", '3', "other", RoleRhoBack, rho}, {"infrared_front", 'F', "far", RoleInfrared, infrared},
		},
		Faces:    []Face{{Name: "front", Emissivity: glazing.GivenNormalEmissivity(0.1)}, {Name: "back", Why: "a reason"}},
		Cautions: []glazing.Caution{{Code: "c", Text: "a caution"}},
		Refused:  []string{"a fault"},
	}
	page := p.Bytes()
	for line := range strings.SplitSeq(string(page), "\n") {
		if n := width(line); n > Width || strings.ContainsFunc(line, unicode.IsControl) {
			t.Errorf("%d columns: %q", n, line)
		}
	}
	text := words(page)
	for _, want := range []string{
		"held.csv: a format - a long remark",
		"points 2189 106 106 range, nm 302 to 2500 400 to 2500 400 to 2500 steps", "points 46 range, nm 5000 to 50000",
		"values below 0 1 noise", "gaps 10 least",
		"tau: and 2 gaps more",
		"tau + rho_front is at most 1.0500, at 2500 nm; at", // 0.7 + 0.35
		"3 spectrum 3 of a very long name indeed F infrared_front # where curves meet",
		"light reflectance, inside (spectrum 3 of",
		"front: 0.100 normal", "back: not known: a reason",
		"of tau en iso na iso15099 light covered covered covered covered solar",
		"of rho_front, spectrum 3 of a very long name indeed en iso na iso15099",
		"tau: The spectrum of pane held begins at 302 nm; its first value was held to 300 nm for solar",
		"A rating refuses this spectrum - a fault Cautions that a rating would carry - a caution Panewright test",
		"tau: values are marked as missing between",
		"– fewer than 15 points that have neighbours",
	} {
		if !strings.Contains(text, want) {
			t.Errorf("the page lacks %q\n%s", want, page)
		}
	}
	for _, not := range []string{"of infrared_front", "light reflectance, outside (rho_front)"} {
		if strings.Contains(text, not) {
			t.Errorf("the page has %q", not)
		}
	}
}

// Of a pane that a rating takes, the page says what becomes of emissivity, U and g, with a rating's reasons.
func TestSpectrumPageHeat(t *testing.T) {
	tau, rho := spectra.Column{Curve: straight(300, 2500, 5, 0.5, 0.5)}, spectra.Column{Curve: straight(300, 2500, 5, 0.1, 0.1)}
	p := SpectrumPage{Version: "test",
		Series: []Series{{RoleTau, 'T', "p", RoleTau, tau}},
		Pane: &glazing.Pane{ID: "p", Plies: []glazing.Ply{{ThicknessMM: 6, ConductivityWMK: 1, DensityKGM3: 2500}},
			Tints: []glazing.Tint{{Spectrum: spectra.Measured{Tau: tau.Curve, RhoFront: rho.Curve, RhoBack: rho.Curve},
				Front: glazing.NoEmissivity(), Back: glazing.GivenEmissivity(0.837)}}},
	}
	page := p.Bytes()
	for line := range strings.SplitSeq(string(page), "\n") {
		if n := width(line); n > Width {
			t.Errorf("%d columns: %q", n, line)
		}
	}
	text := words(page)
	for _, want := range []string{
		"en iso na iso15099 emissivity front null null null null emissivity back covered covered covered covered",
		"U covered covered null null U turned null null null null g covered covered null null g turned null null null null",
		"- emissivity front: no emissivity and no infrared rows were given. - U turned,",
		"- U turned, g turned: the emissivity of surface 2 (pane p, front) is not known. - U, g: the emissivity of surface 1 (pane p, front) is not known. [na, iso15099]",
	} {
		if !strings.Contains(text, want) {
			t.Errorf("the page lacks %q\n%s", want, page)
		}
	}
	if p.Pane = nil; strings.Contains(string(p.Bytes()), "emissivity") {
		t.Error("a pane that is refused has emissivities")
	}
}

// A reflectance of a face that is not known is not said to be that of the outside.
func TestSpectrumPageReflectanceOfNoSide(t *testing.T) {
	rho := spectra.Column{Curve: straight(300, 2500, 5, 0.1, 0.1)}
	text := words(SpectrumPage{Version: "test", Series: []Series{{"#2 front", '2', "front", RoleReflectance, rho}, {"#3 back", '3', "back", RoleReflectance, rho}}}.Bytes())
	for _, want := range []string{"Figures of each spectrum by itself", "ρv light reflectance (#2 front)", "ρv light reflectance (#3 back)", "ρe solar direct reflectance (#3 back)",
		"There is no transmittance with a reflectance to add it to."} {
		if !strings.Contains(text, want) {
			t.Errorf("the page lacks %q\n%s", want, text)
		}
	}
	if strings.Contains(text, "outside") {
		t.Errorf("a side is named that is not known: %s", text)
	}
}

// A remark that not all bases make names those that do.
func TestSpectrumPageNamesBases(t *testing.T) {
	// The sun of ASTM G173 has weight at 301 nm, that of EN 410 none between 300 and 305 nm.
	s := Series{RoleTau, 'T', "p", RoleTau, spectra.Column{Curve: straight(302, 2500, 1, 0.5, 0.5)}}
	text := words(SpectrumPage{Version: "test", Series: []Series{s}}.Bytes())
	at := strings.Index(text, "held to 300 nm for solar")
	if at < 0 || !strings.Contains(text[at:min(at+90, len(text))], "[na]") {
		t.Error(fmt.Sprint("the remark on the sun is not said to be of na: ", text))
	}
}
