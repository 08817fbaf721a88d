package project

// What heat balances and what follows from their temperatures are made for: conditions, who feels
// the glazing, how thermal stress is screened, edges.

import (
	"strings"

	"panewright/glazing"
)

// balancesOf says what of a project asks for detailed heat balances, "basis na", or returns "".
func balancesOf(bases []glazing.Basis, s *fileSpec) string {
	for _, b := range bases {
		if b.Balances() {
			return "basis " + b.Name
		}
	}
	if len(s.Conditions) > 0 {
		return "conditions"
	}
	return ""
}

// conditions checks what the tags cannot, and returns the conditions.
func (b *builder) conditions(list []conditionSpec) []glazing.Condition {
	var out []glazing.Condition
	ids := map[string]position{}
	for _, c := range list {
		b.unique(ids, c.ID, "id", "condition")
		b.nameOfCondition(c.ID)
		if c.ID.value == glazing.ColdSun && c.Sun.value == 0 && !c.Faulty {
			at := c.ID.at
			if c.Sun.given {
				at = c.Sun.at
			}
			b.fail(at, "sun_w_m2", "%s stands in the place of the built-in condition of that name, a sunny one that thermal stress is screened for: give its sun, above 0, or choose another id", c.ID.value)
		}
		if c.Wind.given && c.OutsideConvection.given {
			b.fail(c.OutsideConvection.at, "outside_convection_w_m2k", "stands beside wind_m_s; give one")
		}
		out = append(out, glazing.Condition{
			ID:       c.ID.value,
			OutsideC: c.Outside.value, OutsideRadiantC: c.OutsideRadiant.orUnknown(), SkyC: c.Sky.orUnknown(),
			InsideC: c.Inside.value, InsideRadiantC: c.InsideRadiant.orUnknown(), InsideHumidity: c.InsideHumidity.orUnknown(),
			WindMS: c.Wind.orUnknown(), OutsideConvectionWM2K: c.OutsideConvection.orUnknown(), InsideConvectionWM2K: c.InsideConvection.orUnknown(),
			SunWM2: c.Sun.value, TiltDeg: c.Tilt.orUnknown(), HeightM: c.Height.orUnknown(),
		})
	}
	return out
}

// nameOfCondition refuses the ids of the conditions that are built in, and what could be taken for one.
// A project may have a cold-sun of its own.
func (b *builder) nameOfCondition(id text) {
	const none = "none" // where conditions are named, as for drawings, it stands for no condition
	for _, x := range []struct{ name, is string }{
		{glazing.Winter, "a condition of the basis"}, {glazing.Summer, "a condition of the basis"},
		{glazing.SummerNA, "a built-in condition, for thermal stress"}, {glazing.ColdSun, "a built-in condition, for thermal stress"},
		{none, "the word for no condition"},
	} {
		switch {
		case !strings.EqualFold(id.value, x.name) || id.value == glazing.ColdSun:
		case id.value == x.name:
			b.fail(id.at, "id", "%s is %s; choose another name", id.value, x.is)
		default:
			b.fail(id.at, "id", "%s could be taken for %s, %s; choose another name", id.value, x.name, x.is)
		}
	}
}

// person returns who feels the glazing; nil where the project does not say.
func (s *comfortSpec) person() *glazing.Person {
	if s == nil {
		return nil
	}
	p := glazing.AnyPerson()
	if s.Posture.given {
		p.Standing = s.Posture.value == "standing"
	}
	for _, x := range []struct {
		is   number
		into *float64
	}{
		{s.Distance, &p.DistanceM}, {s.GlassWidth, &p.GlassWidthM}, {s.GlassHeight, &p.GlassHeightM},
		{s.SunAltitude, &p.SunAltitudeDeg}, {s.SunFromFront, &p.SunFromFrontDeg}, {s.SkyShare, &p.SkyShare},
		{s.BodyShare, &p.BodyShare}, {s.Absorptivity, &p.Absorptivity}, {s.FloorReflectance, &p.FloorReflectance},
	} {
		*x.into = x.is.or(*x.into)
	}
	return &p
}

// screening returns how thermal stress is screened; nil where the project does not say.
func (s *stressSpec) screening() *glazing.StressScreening {
	if s == nil {
		return nil
	}
	return &glazing.StressScreening{FrameMarginK: s.FrameMargin.or(0), Factor: s.Factor.or(1)}
}

// edge returns what is known of the edge of a make-up.
func (b *builder) edge(s *edgeSpec) glazing.Edge {
	switch {
	case s == nil || s.Faulty:
		return glazing.Edge{}
	case s.TemperatureFactor.given && s.Psi.given:
		b.fail(s.Psi.at, "psi_w_mk", "stands beside temperature_factor; give one")
	case !s.TemperatureFactor.given && !s.Psi.given:
		b.fail(s.At, "edge", "says nothing; give temperature_factor or psi_w_mk, or leave the key out")
	}
	return glazing.Edge{TemperatureFactor: s.TemperatureFactor.orUnknown(), PsiWMK: s.Psi.orUnknown()}
}

// balanced refuses a gas that a detailed heat balance cannot treat, where the project asks for one;
// once for a make-up. The gaps of the make-up are those of its keys.
func (b *builder) balanced(s *makeupSpec, m *glazing.Makeup) bool {
	if b.balances == "" {
		return true
	}
	gap := 0
	for i := range s.OutsideToInside {
		e := &s.OutsideToInside[i]
		if !e.Gap.given {
			continue
		}
		gas := m.Gaps[gap].Gas
		gap++
		for k := range gas {
			if _, err := gas[k : k+1].Fluid(); err != nil {
				b.fail(e.Gas[gas[k].Gas].name, "gas", "%v. Name another gas, or take out %s, for which balances are made", err, b.balances)
				return false
			}
		}
	}
	return true
}
