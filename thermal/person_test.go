package thermal

import (
	"crypto/sha256"
	"fmt"
	"math"
	"strings"
	"testing"
)

var anyone = SunOnPerson{AltitudeDeg: 30, FromFrontDeg: 120, BeamWM2: 800, Transmittance: 0.5, SkyShare: 0.5, BodyShare: 0.5,
	Absorptivity: 0.7, FloorReflectance: 0.6}

// load is that of a person who is in range.
func load(t *testing.T, s SunOnPerson) SolarLoad {
	t.Helper()
	l, err := s.Load()
	if err != nil {
		t.Fatal(err)
	}
	return l
}

// A body casts a shadow of a quarter of its radiating area in the mean over all directions, and one as
// large from behind as from before. With a left like its right, fp at altitude 0 is then the same at an
// angle and at 180° less it. The tables were measured on people, whence the tolerances.
func TestProjectedAreas(t *testing.T) {
	for _, standing := range []bool{false, true} {
		s := SunOnPerson{Standing: standing}
		var sum, weight float64
		for altitude := 0.5; altitude < 90; altitude++ {
			w := math.Cos(altitude * math.Pi / 180)
			for angle := 0.5; angle < 180; angle++ {
				s.AltitudeDeg, s.FromFrontDeg = altitude, angle
				sum += w * s.projectedArea()
				weight += w
			}
		}
		near(t, "mean projected area", sum/weight, 0.25, 0.015*0.25, "closed form")
		s.AltitudeDeg = 0
		for angle := 0.0; angle < 90; angle += 15 {
			s.FromFrontDeg = angle
			before := s.projectedArea()
			s.FromFrontDeg = 180 - angle
			near(t, "shadow from behind over that from before", s.projectedArea()/before, 1, 0.055, "symmetry")
		}
		s.AltitudeDeg = 90
		for angle := 0.0; angle <= 180; angle += 7.5 {
			s.FromFrontDeg = angle
			want := 0.177 // the angle does not matter
			if standing {
				want = 0.082
			}
			near(t, "shadow of the sun overhead", s.projectedArea(), want, 1e-12, "ASHRAE 55-2017, appendix C, from memory")
		}
	}
}

// The seal is the SHA-256 of both tables, taken when the published cases among the checks came out and
// each cell had been compared with the recalled table. It guards against a slip of the hand and proves
// nothing else.
func TestProjectedAreasSeal(t *testing.T) {
	const seal = "6ba08cbd57bdbd9e4a8d5c877b440481acebe8e71d42b9855dfcf6f3a5de04f6"
	if got := fmt.Sprintf("%x", sha256.Sum256(fmt.Appendf(nil, "%.4f %.4f", seatedProjection, standingProjection))); got != seal {
		t.Errorf("the tables of fp have changed (now %s). Was that meant? Compare them with the source, then renew the seal", got)
	}
}

// What holds for any person: the parts add up, the load grows with each share in proportion, and a
// person whom no sun reaches has none.
func TestSunOnPerson(t *testing.T) {
	l := load(t, anyone)
	near(t, "field of its parts", l.EffectiveRadiantFieldWM2, (l.Diffuse+l.Direct+l.Reflected)*0.7/0.95, 1e-12, "ASHRAE 55-2017, appendix C")
	// By hand: 0.696·0.5·½·0.5·0.2·800; 0.696·0.224·0.5·0.5·800 with fp of the table; 0.696·0.5·½·0.5·(400 + 160)·0.6.
	near(t, "diffuse", l.Diffuse, 13.92, 1e-9, "by hand")
	near(t, "fp", l.ProjectedArea, 0.224, 1e-12, "ASHRAE 55-2017, appendix C, from memory")
	near(t, "direct", l.Direct, 31.1808, 1e-9, "by hand")
	near(t, "reflected", l.Reflected, 29.232, 1e-9, "by hand")
	near(t, "field", l.EffectiveRadiantFieldWM2, 54.771537, 1e-6, "by hand")
	near(t, "rise", l.RadiantRiseK, 13.115789, 1e-6, "by hand")
	twice := anyone
	twice.Transmittance *= 2
	near(t, "field of twice the sun", load(t, twice).EffectiveRadiantFieldWM2, 2*l.EffectiveRadiantFieldWM2, 1e-9, "proportion")
	for name, none := range map[string]func(*SunOnPerson){
		"no sun":                             func(s *SunOnPerson) { s.BeamWM2 = 0 },
		"opaque glass":                       func(s *SunOnPerson) { s.Transmittance = 0 },
		"in the back of a room, without sky": func(s *SunOnPerson) { s.SkyShare, s.BodyShare = 0, 0 },
		"white":                              func(s *SunOnPerson) { s.Absorptivity = 0 },
	} {
		s := anyone
		none(&s)
		if l := load(t, s); l.EffectiveRadiantFieldWM2 != 0 || l.RadiantRiseK != 0 {
			t.Errorf("%s: %g W/m², %g K", name, l.EffectiveRadiantFieldWM2, l.RadiantRiseK)
		}
	}
	standing := anyone
	standing.Standing, standing.FloorReflectance, standing.BodyShare = true, 0, 0
	// By hand: the rise by diffuse sun alone, ½·0.5·0.5·160·0.7/0.95/6, does not depend on the radiating area.
	near(t, "rise by the sky, standing", load(t, standing).RadiantRiseK, 20*0.7/0.95/6, 1e-12, "by hand")
}

func TestSunOnPersonRefuses(t *testing.T) {
	for _, tt := range []struct {
		word  string
		field func(*SunOnPerson) *float64
		upper float64
	}{
		{"altitude", func(s *SunOnPerson) *float64 { return &s.AltitudeDeg }, 90},
		{"front", func(s *SunOnPerson) *float64 { return &s.FromFrontDeg }, 180},
		{"transmittance", func(s *SunOnPerson) *float64 { return &s.Transmittance }, 1},
		{"sky", func(s *SunOnPerson) *float64 { return &s.SkyShare }, 1},
		{"body", func(s *SunOnPerson) *float64 { return &s.BodyShare }, 1},
		{"absorptivity", func(s *SunOnPerson) *float64 { return &s.Absorptivity }, 1},
		{"floor", func(s *SunOnPerson) *float64 { return &s.FloorReflectance }, 1},
		{"direct sun", func(s *SunOnPerson) *float64 { return &s.BeamWM2 }, math.MaxFloat64},
	} {
		for _, good := range []float64{0, min(tt.upper, 1300)} {
			s := anyone
			*tt.field(&s) = good
			if l, err := s.Load(); err != nil || !(l.EffectiveRadiantFieldWM2 >= 0) {
				t.Errorf("%s %g: %g W/m², error %v", tt.word, good, l.EffectiveRadiantFieldWM2, err)
			}
		}
		for _, bad := range []float64{-0.001, tt.upper * 1.005, math.NaN(), math.Inf(1)} {
			s := anyone
			*tt.field(&s) = bad
			if _, err := s.Load(); err == nil || !strings.Contains(err.Error(), tt.word) || strings.Contains(err.Error(), "e+308") {
				t.Errorf("%s %g: error is %v", tt.word, bad, err)
			}
		}
	}
}
