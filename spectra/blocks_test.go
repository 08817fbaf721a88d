package spectra

import (
	"strings"
	"testing"
)

// Which of the spectra of a file is meant, by quantity, number and title.
func TestOneOf(t *testing.T) {
	var text string
	for _, x := range [][2]string{{"tau", "TRANSMITTANCE"}, {"Front, coated", "REFLECTANCE"}, {"back", "REFLECTANCE"}, {"7", "REFLECTANCE"}, {"back", "TRANSMITTANCE"}} {
		text += tenPoints(tenAFFN, "ten points (invented)", x[0], "TRANSMITTANCE", x[1])
	}
	blocks, err := ReadJCAMP(strings.NewReader(text), "pane.jdx")
	if err != nil {
		t.Fatal(err)
	}
	for _, tt := range []struct {
		quantity Quantity
		which    string
		number   int    // of the spectrum, from 1; 0: none
		fault    string // its beginning
	}{
		{Reflectance, "2", 2, ""},
		{Reflectance, "front, COATED", 2, ""},
		{Reflectance, "back", 3, ""},
		{Transmittance, "back", 5, ""},
		{Transmittance, "1", 1, ""},
		{"", "4", 4, ""},
		{"", "tau", 1, ""},
		{Reflectance, "7", 0, "pane.jdx: has no spectrum number 7, but: pane.jdx#1 (transmittance, \"tau\"); pane.jdx#2 (reflectance, \"Front, coated\"); "},
		{Reflectance, "0", 0, "pane.jdx: holds no spectrum of reflectance titled \"0\", but: pane.jdx#1"},
		{Reflectance, "99999999999999999999", 0, "pane.jdx: holds no spectrum of reflectance titled"},
		{Reflectance, "+2", 0, "pane.jdx: holds no spectrum of reflectance titled"},
		{Reflectance, "1", 0, "pane.jdx: number 1 is a spectrum of transmittance, and one of reflectance is needed: pane.jdx#1"},
		{Reflectance, "tau", 0, "pane.jdx: holds no spectrum of reflectance titled \"tau\", but: pane.jdx#1 (transmittance, \"tau\")"},
		{"", "back", 0, "pane.jdx: holds several spectra; write which: pane.jdx#3 (reflectance, \"back\"); pane.jdx#5 (transmittance, \"back\")"},
		{Reflectance, "", 0, "pane.jdx: holds several spectra of reflectance; write which: pane.jdx#2 (reflectance, \"Front, coated\"); pane.jdx#3 (reflectance, \"back\"); pane.jdx#4 (reflectance, \"7\")"},
	} {
		b, err := OneOf(blocks, tt.quantity, "pane.jdx", tt.which)
		switch {
		case tt.number > 0 && (err != nil || b.Line[0] != blocks[tt.number-1].Line[0]):
			t.Errorf("%s %q: %v, spectrum %q", tt.quantity, tt.which, err, b.Title)
		case tt.number == 0 && (err == nil || !strings.HasPrefix(err.Error(), tt.fault)):
			t.Errorf("%s %q: %v, want %s", tt.quantity, tt.which, err, tt.fault)
		}
	}
	if b, err := OneOf(blocks[:2], Reflectance, "pane.jdx", ""); err != nil || b.Title != "Front, coated" {
		t.Errorf("%v, %q", err, b.Title)
	}
	if _, err := OneOf(blocks[:1], Reflectance, "pane.jdx", ""); err == nil || err.Error() != `pane.jdx: holds no spectrum of reflectance, but: pane.jdx#1 (transmittance, "tau")` {
		t.Errorf("%v", err)
	}
	blocks[2].Title = ""
	many := append(append([]Block{}, blocks...), blocks...)
	if _, err := OneOf(many, "", "pane.jdx", "nothing"); err == nil || !strings.Contains(err.Error(), "pane.jdx#3 (reflectance, \"untitled\")") || !strings.HasSuffix(err.Error(), "and others") {
		t.Errorf("%v", err)
	}
}
