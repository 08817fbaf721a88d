package glazing

// The working of the outside and of the room in detailed balances.

import (
	"math"

	"panewright/thermal"
)

// Where the correlations of the room side change (ISO 15099:2003, 8.3, from memory), as package thermal
// has it.
const (
	roomLevelDeg   = 15.0
	roomCeilingDeg = 179.0
)

const clauseSides = "ISO 15099, 8.3"

// outside writes out the heat between the outside and surface 1.
func (w *balanceWork) outside() Chapter {
	c := w.chapter("outside, surface 1")
	x, at, e := w.b.Condition, &w.state.Surroundings, &w.state.Outside
	coefficient, assumed := x.OutsideConvection()
	formula, numbers := "of the condition", put(coefficient)
	switch {
	case assumed:
		formula, numbers = "4 + 4·v, v assumed, for there is neither wind nor coefficient", "4 + 4·"+put(assumedWindMS)
	case !x.OutsideConvectionWM2K.Known:
		formula, numbers = "4 + 4·v, v in m/s", "4 + 4·"+put(x.WindMS.Number)
	}
	c.step("hce", "convective coefficient outside", formula, numbers, coefficient, unitCoefficient, clauseSides)
	face := w.face(0)
	c.flux("qc", "by convection", "hce", e.Convective, e.ConvectedWM2, end{"Te", at.OutsideK}, face, clauseSides)
	w.radiated(&c, "hre", e, end{w.radiantSymbol(true), at.OutsideRadiantK}, face, 0)
	return c
}

// radiantSymbol names the temperature at which a side radiates: that of its air, where that is the same.
func (w *balanceWork) radiantSymbol(outside bool) string {
	x := w.b.Condition
	switch {
	case outside && (x.SkyC.Known || x.OutsideRadiantC.Known):
		return "Tre"
	case outside:
		return "Te"
	case x.InsideRadiantC.Known:
		return "Tri"
	}
	return "Ti"
}

// room writes out the heat between the room and the surface that faces it.
func (w *balanceWork) room() Chapter {
	last := 2*w.state.Sheets - 1
	at, e, face := &w.state.Surroundings, &w.state.Room, w.face(last)
	c := w.chapter("room, surface " + face.symbol[len("T"):])
	air := end{"Ti", at.InsideK}
	if at.InsideConvection > 0 {
		c.step("hci", "convective coefficient in the room", "of the condition", put(at.InsideConvection), e.Convective, unitCoefficient, clauseSides)
	} else {
		w.naturalConvection(&c, e, face, air)
	}
	c.flux("qc", "by convection", "hci", e.Convective, e.ConvectedWM2, face, air, clauseSides)
	w.radiated(&c, "hri", e, face, end{w.radiantSymbol(false), at.InsideRadiantK}, last)
	c.step("qin", "heat into the room", "qc + qr", put(e.ConvectedWM2)+" + "+put(e.RadiatedWM2), e.FluxWM2(), "W/m²", clauseBalance)
	return c
}

// naturalConvection writes out hc of the free air at the room-side surface.
func (w *balanceWork) naturalConvection(c *Chapter, e *thermal.Exchange, face, air end) {
	at := &w.state.Surroundings
	formula, numbers := differs(face, air)
	c.step("Tm", "film temperature", "Ti + ("+formula+")/4", put(air.k)+" + ("+numbers+")/4", e.MeanK, "K", clauseSides)
	c.gas(thermal.Mixture{{Gas: "air", Fraction: 1}}, e.MeanK, e.Gas)
	c.angle(clauseSides, at.TiltDeg, face.k > air.k, "the glass is warmer than the air", "the glass is not warmer than the air")
	c.rayleigh(e, face, air, "H", at.HeightM, clauseSides)
	c.roomNusselt(e)
	c.step("hci", "convective coefficient in the room", "Nu·λ/H", put(e.Nusselt)+"·"+put(e.Gas.ConductivityWMK)+"/"+put(at.HeightM), e.Convective, unitCoefficient, clauseSides)
}

// roomNusselt writes out Nu of the room side.
func (c *Chapter) roomNusselt(e *thermal.Exchange) {
	ra, deg := e.Rayleigh, e.AngleDeg
	n, g := put(ra), put(deg)
	nu := func(range_, formula, numbers, clause string) {
		c.step("Nu", "Nusselt number, "+range_, formula, numbers, e.Nusselt, "", clause)
	}
	switch {
	case ra <= 0:
		nu("glass as warm as the air", "0", "0", clauseSides)
	case deg < roomLevelDeg:
		nu("γ below 15°", "0.13·Ra^(1/3)", "0.13·"+n+"^(1/3)", "ISO 15099 (107)")
	case deg > roomCeilingDeg:
		nu("γ above 179°", "0.58·Ra^0.2", "0.58·"+n+"^0.2", "ISO 15099 (112)")
	case deg > uprightDeg:
		nu("γ of 90 to 179°", "0.56·(Ra·sin(γ))^(1/4)", "0.56·("+n+"·sin("+g+"))^(1/4)", "ISO 15099 (111)")
	default:
		critical := 2.5e5 * math.Pow(math.Exp(0.72*deg)/math.Sin(deg*math.Pi/180), 1.0/5)
		c.step("Racv", "critical Rayleigh number", "2.5e5·(exp(0.72·γ)/sin(γ))^(1/5)", "2.5e5·(exp(0.72·"+g+")/sin("+g+"))^(1/5)", critical, "", "ISO 15099 (110)")
		if ra <= critical {
			nu("Ra up to Racv", "0.56·(Ra·sin(γ))^(1/4)", "0.56·("+n+"·sin("+g+"))^(1/4)", "ISO 15099 (108)")
			return
		}
		cv := put(critical)
		nu("Ra above Racv", "0.13·(Ra^(1/3) − Racv^(1/3)) + 0.56·(Racv·sin(γ))^(1/4)",
			"0.13·("+n+"^(1/3) − "+cv+"^(1/3)) + 0.56·("+cv+"·sin("+g+"))^(1/4)", "ISO 15099 (109)")
	}
}
