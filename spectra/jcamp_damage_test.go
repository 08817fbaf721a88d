package spectra

import (
	"strings"
	"testing"
)

// Damage that leaves the number of points right is seen all the same.
func TestJCAMPDamageThatKeepsTheCount(t *testing.T) {
	const head = "##TITLE= damaged\n##JCAMP-DX= 4.24\n##DATA TYPE= UV/VIS SPECTRUM\n##XUNITS= NANOMETERS\n##XFACTOR= 1\n##YFACTOR= 0.001\n##FIRSTX= 300\n##NPOINTS= 10\n"
	for _, tt := range []struct{ name, text, want string }{
		{"a lost line break in absorbance", // 504 and the next line's x 350 became one number
			head + "##YUNITS= ABSORBANCE\n##LASTX= 390\n##XYDATA= (X++(Y..Y))\n300 500 501 502 503 504350 505 506 507 508 509\n##END=\n",
			"absorbance 504.35: no instrument reads beyond 12"},
		{"LASTX wrong by a step, before a bare check", // of ten points from 300 in steps of 9 the last is 381
			head + "##YUNITS= TRANSMITTANCE\n##LASTX= 381\n##XYDATA= (X++(Y..Y))\n300A00J0J0J0J0J0J0J0J0J0\n390A90\n##END=\n",
			"the line begins with x 390"},
	} {
		if _, err := ReadJCAMP(strings.NewReader(tt.text), "d.jdx"); err == nil || !strings.Contains(err.Error(), tt.want) {
			t.Errorf("%s: %v, want %q", tt.name, err, tt.want)
		}
	}
}
