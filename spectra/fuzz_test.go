package spectra

import (
	"errors"
	"strings"
	"testing"
	"unicode"
)

func FuzzReadCSV(f *testing.F) {
	infrared := strings.Builder{}
	infrared.WriteString("wavelength_um,rho_back,tau,rho_front\n")
	for _, um := range []string{"0.3", "0.4", "0.5", "0.6", "0.7", "0.8", "1", "1.5", "2", "2.5", "4"} {
		infrared.WriteString(um + ",0.1,0.6,0.2\n")
	}
	infrared.WriteString("5.2,0.9,,\n20,0.92,,\n31,0.94,,\n")
	for _, text := range []string{
		"",
		"\ufeff",
		"# a comment\n",
		good(same),
		"\ufeff" + strings.ReplaceAll(good(same), "\n", "\r\n"),
		strings.ReplaceAll(good(same), "\n", "\r"),
		strings.ReplaceAll(good(same), ",", ";"),
		strings.ReplaceAll(good(same), "0.8", "80"),
		strings.ReplaceAll(good(same), "0.8", `"0,8"`),
		strings.ReplaceAll(good(same), "0.8", "0,8"),
		strings.ReplaceAll(good(same), "0.1,", "0.201,"),
		withLine(3, "310,1.001,-0.001,0"),
		withLine(3, "310,NaN,0x1p-2,1_0"),
		withLine(3, "305,,,"),
		withLine(4, "320,?,?,0.15"),
		withLine(3, "0,-1,2,3"),
		withLine(1, "wavelength_nm,tau,tau,"),
		withLine(1, "wavelength_nm,irradiance"),
		infrared.String(),
	} {
		f.Add([]byte(text))
	}
	f.Fuzz(func(t *testing.T, content []byte) {
		if _, err := ReadSunCSV(strings.NewReader(string(content)), "pane.csv"); err != nil {
			checkMessages(t, err)
		}
		c, err := ReadCSV(strings.NewReader(string(content)), "pane.csv")
		if err != nil {
			checkMessages(t, err)
			return
		}
		checkRoundTrip(t, c)
		m, err := Join(c, Column{}, Column{})
		if err != nil {
			checkMessages(t, err)
			return
		}
		for name, curve := range map[string]Curve{"tau": m.Tau, "rho_front": m.RhoFront, "rho_back": m.RhoBack,
			"infrared_front": m.InfraredFront, "infrared_back": m.InfraredBack} {
			if len(curve.NM) != len(curve.Value) {
				t.Fatalf("%s: %d wavelengths, %d values", name, len(curve.NM), len(curve.Value))
			}
			for i, nm := range curve.NM {
				if !(nm > 0) || i > 0 && !(nm > curve.NM[i-1]) {
					t.Fatalf("%s: wavelengths do not ascend: %v", name, curve.NM)
				}
				if v := curve.Value[i]; !(v >= 0 && v <= 1) {
					t.Fatalf("%s at %v nm is %v", name, nm, v)
				}
			}
		}
		for name, rho := range map[string]Curve{"rho_front": m.RhoFront, "rho_back": m.RhoBack} {
			for i, nm := range rho.NM {
				if nm < m.Tau.First() || nm > m.Tau.Last() || m.Tau.InGap(nm) {
					continue
				}
				if sum := m.Tau.At(nm) + rho.Value[i]; !(sum <= 1) {
					t.Fatalf("tau + %s at %v nm is %v", name, nm, sum)
				}
			}
		}
		if m.InfraredFront.Len() > 0 {
			if e := NormalEmissivity(m.InfraredFront, m.InfraredTau); !(e >= -1e-12 && e <= 1) {
				t.Fatalf("normal emissivity %v", e)
			}
		}
	})
}

// checkRoundTrip writes what was read and wants it read again bit for bit.
func checkRoundTrip(t *testing.T, c Columns) {
	t.Helper()
	text, err := written(c, "a comment")
	if err != nil {
		if grid := unionOf(c.named()); len(grid) >= minimumRows && grid[len(grid)-1] >= leastLastNM {
			t.Fatal(err)
		}
		return
	}
	again, err := ReadCSV(strings.NewReader(text), "pane.csv")
	if err != nil || !sameColumns(c, again) {
		t.Fatalf("%v; written as\n%s", err, text)
	}
}

// checkMessages wants every fault to say something that a terminal can show, and not at any
// length.
func checkMessages(t *testing.T, err error) {
	t.Helper()
	var faults Errors
	if !errors.As(err, &faults) || len(faults) == 0 {
		t.Fatalf("%T: %v", err, err)
	}
	for _, f := range faults {
		if text := f.Error(); len(text) > 1500 || len(f.Text) == 0 || strings.ContainsFunc(text, unicode.IsControl) {
			t.Fatalf("a message of %d bytes: %.200q", len(text), text)
		}
	}
}
