package film

import (
	"math"
	"testing"

	"panewright/reference"
)

// The models that carry constants on beyond their ends lie by the points they were fitted to, and the
// recalled oscillators of nickel and chromium by those of another model of the same paper, as closely as is
// said beside them: shares of n and of k.
func TestModelsBeyondPublishedPoints(t *testing.T) {
	model := func(id string) Oscillators {
		m, ok := MaterialNamed(id)
		if !ok {
			t.Fatal(id)
		}
		return m.Model.(Extended).Model
	}
	aluminium, _ := MaterialNamed("aluminium")
	withEpsInf := func(o Oscillators, eps float64) Oscillators { o.EpsInf += eps; return o }
	for _, tt := range []struct {
		id           string
		model        Oscillators
		table        *reference.Table
		fromUM, toUM float64
		n, k         float64
	}{
		{"silver", withEpsInf(model("silver"), -2.7), reference.NKSilver(), 2, 8.3, 0.09, 0.01},
		{"gold", withEpsInf(model("gold"), 10.8), reference.NKGold(), 3, 12.4, 0.04, 0.0015},
		{"copper", withEpsInf(model("copper"), -2.6), reference.NKCopper(), 3, 8.3, 0.02, 0.003},
		{"aluminium", withEpsInf(carriersOnly(*aluminium.Carriers), 3028), reference.NKAluminium(), 20, 50, 0.075, 0.025},
		{"nickel", model("nickel"), reference.NKNickel(), 0.4, 6.2, 0.08, 0.03},
		{"chromium", rakic(chromiumPlasmaEV, 1, chromiumTerms), reference.NKChromium(), 0.4, 50, 0.15, 0.08},
		{"aluminium nitride", model("aluminium-nitride"), reference.NKAluminiumNitride(), 15.5, 20.02, 0.0003, 0.01},
		{"tungsten oxide", model("tungsten-oxide"), reference.NKTungstenOxide(), 0.42, 1, 0.0005, math.Inf(1)},
		{"silicon nitride", model("silicon-nitride"), reference.NKSiliconNitride(), 0.3, 1.69, 0.004, math.Inf(1)},
		{"vanadia, hot", model("vanadia-hot"), reference.NKVanadiaHot(), 18, 25, 0.03, 0.03},
	} {
		points := published(tt.table)
		var mostN, mostK float64
		for i, nm := range points.N.NM {
			if nm < tt.fromUM*1000 || nm > tt.toUM*1000 {
				continue
			}
			x := tt.model.Index(nm)
			mostN = max(mostN, math.Abs(real(x)/points.N.Value[i]-1))
			if k := points.K.Value[i]; k > 0 {
				mostK = max(mostK, math.Abs(imag(x)/k-1))
			}
		}
		if mostN == 0 || mostN > tt.n || mostK > tt.k {
			t.Errorf("%s: strays by %.4f of n and %.4f of k, said to be %g and %g", tt.id, mostN, mostK, tt.n, tt.k)
		}
	}
}
