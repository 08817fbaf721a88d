package thermal

import (
	"math"
	"testing"
)

// A triple of two low-e panes and argon, in the sun of a summer day.
func lowETriple(t testing.TB) (*System, Surroundings, []float64) {
	t.Helper()
	return lowE(t, 3), Surroundings{OutsideK: 305.15, OutsideRadiantK: 305.15, InsideK: 297.15, InsideRadiantK: 297.15,
		OutsideConvection: 15, TiltDeg: 90, HeightM: 1}, []float64{250, 30, 20}
}

// lowE makes a system of 4 mm panes with 14 mm gaps of argon, each gap with one low-e face.
func lowE(t testing.TB, sheets int) *System {
	t.Helper()
	mixture, err := Mix(map[string]float64{"argon": 0.9, "air": 0.1})
	if err != nil {
		t.Fatal(err)
	}
	gas, err := mixture.Fluid()
	if err != nil {
		t.Fatal(err)
	}
	var list []Sheet
	var cavities []Cavity
	for k := range sheets {
		list = append(list, Sheet{Plies: []Layer{{ResistanceM2KW: 0.004, Share: 1}}, Emissivity: [2]float64{0.837, 0.03}})
		if k > 0 {
			cavities = append(cavities, Cavity{WidthM: 0.014, Gas: gas})
		}
	}
	s, err := NewSystem(list, cavities)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// One condition of a triple, from a cold start.
func BenchmarkSolve(b *testing.B) {
	s, at, sun := lowETriple(b)
	var dst Balance
	b.ReportAllocs()
	for b.Loop() {
		if err := s.Solve(&dst, at, sun); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(float64(dst.Iterations), "steps")
}

// One to eight panes: the cost of a pane is that of the one before.
func BenchmarkSolvePanes(b *testing.B) {
	for n := 1; n <= MaxSheets; n++ {
		b.Run(string('0'+rune(n)), func(b *testing.B) {
			s := lowE(b, n)
			_, at, _ := lowETriple(b)
			sun := []float64{200, 50, 20, 10, 5, 5, 5, 5}[:n]
			var dst Balance
			for b.Loop() {
				if err := s.Solve(&dst, at, sun); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// hours are a made-up year, hour by hour: temperature, wind and sun swing by day and season.
func hours() (list []Surroundings, sun []float64) {
	for h := range 8760 {
		day, season := 2*math.Pi*float64(h%24)/24, 2*math.Pi*float64(h)/8760
		at := Surroundings{OutsideK: 283 - 12*math.Cos(season) - 5*math.Cos(day), InsideK: 293 - 2*math.Cos(season),
			OutsideConvection: 12 + 6*math.Sin(7*day+3*season), TiltDeg: 90, HeightM: 1}
		at.OutsideRadiantK, at.InsideRadiantK = at.OutsideK-4, at.InsideK
		list = append(list, at)
		sun = append(sun, max(0, -500*math.Cos(day)-100*math.Cos(season)))
	}
	return list, sun
}

// A year of one triple, each hour from the state of the hour before, and each from a cold start.
func BenchmarkYear(b *testing.B) {
	s := lowE(b, 3)
	list, sun := hours()
	for _, x := range []struct {
		name  string
		solve func(*Balance, Surroundings, []float64) error
	}{{"follow", s.Follow}, {"cold", s.Solve}} {
		b.Run(x.name, func(b *testing.B) {
			var dst Balance
			absorbed := make([]float64, 3)
			b.ReportAllocs()
			for b.Loop() {
				for h, at := range list {
					absorbed[0], absorbed[1], absorbed[2] = 0.3*sun[h], 0.05*sun[h], 0.03*sun[h]
					if err := x.solve(&dst, at, absorbed); err != nil {
						b.Fatal(err)
					}
				}
			}
		})
	}
}
