package thermal

// Moisture on surfaces: saturation and dew point by EN ISO 13788, temperature factors, the clear sky.

import (
	"fmt"
	"math"
)

// InsideResistanceM2KW is the room-side surface resistance Rsi with which a temperature factor is
// stated (EN ISO 6946 and EN ISO 13788 for glazing, from memory).
const InsideResistanceM2KW = 0.13

// Saturation over water and over ice, in °C: p = p0 exp(a t/(b + t)) (EN ISO 13788, annex E, from memory).
const (
	saturationAtZeroPa = 610.5
	overWaterA         = 17.269
	overWaterB         = 237.3
	overIceA           = 21.875
	overIceB           = 265.5
)

// SaturationPressure returns the pressure of saturated water vapour in Pa at a temperature in K: over
// water from 0 °C on, over ice below (EN ISO 13788, annex E). From −10 to 40 °C it lies within 0.25 % of
// the equations of state of water and ice.
func SaturationPressure(temperatureK float64) float64 {
	t := temperatureK - ZeroCelsius
	a, b := overWaterA, overWaterB
	if t < 0 {
		a, b = overIceA, overIceB
	}
	return saturationAtZeroPa * math.Exp(a*t/(b+t))
}

// DewPoint returns the temperature in K at which air of a temperature in K and a relative humidity is
// saturated. frost says that it lies below 0 °C, so that frost forms and no dew (EN ISO 13788, annex
// E). It is an error if the humidity is not above 0 and at most 1.
func DewPoint(airK, humidity float64) (dewK float64, frost bool, err error) {
	if !(humidity > 0 && humidity <= 1) {
		return 0, false, fmt.Errorf("relative humidity is %g; it is above 0 and at most 1", humidity)
	}
	x := math.Log(humidity * SaturationPressure(airK) / saturationAtZeroPa)
	if x < 0 {
		return ZeroCelsius + overIceB*x/(overIceA-x), true, nil
	}
	return ZeroCelsius + overWaterB*x/(overWaterA-x), false, nil
}

// CondensingHumidity returns the relative humidity of air at which water begins to condense on a
// surface, both of given temperatures in K. Above 1 it never does. It serves the room and its faces as
// it does the outdoor air and the outside face.
func CondensingHumidity(surfaceK, airK float64) float64 {
	return SaturationPressure(surfaceK) / SaturationPressure(airK)
}

// TemperatureFactor returns f_Rsi = (θsi − θe)/(θi − θe) of a room-side surface; all in K
// (EN ISO 13788, definition). It is NaN if both airs are equally warm.
func TemperatureFactor(surfaceK, outsideK, insideK float64) float64 {
	if insideK == outsideK {
		return math.NaN()
	}
	return (surfaceK - outsideK) / (insideK - outsideK)
}

// TemperatureFactorOfU returns f_Rsi = 1 − U·Rsi of U in W/(m²·K) and Rsi in m²·K/W (EN ISO 13788).
func TemperatureFactorOfU(u, insideResistance float64) float64 {
	return 1 - float64(u*insideResistance)
}

// FactorTemperature returns the temperature in K of a room-side surface with a temperature factor
// (EN ISO 13788).
func FactorTemperature(factor, outsideK, insideK float64) float64 {
	return outsideK + float64(factor*(insideK-outsideK))
}

// EdgeBandM is the width of the band along the edge of the glass over which EdgeFactor spreads the
// heat of the edge, where the user states no other. It is our own choice: with it, linear
// transmittances of 0.08 and 0.04 W/(m·K) give a double of 1.1 W/(m²·K) a factor of 0.65 and of 0.75.
const EdgeBandM = 0.05

// EdgeFactor estimates the temperature factor of the edge of a glazing: the heat ψ of each metre of
// edge, in W/(m·K), passes a band of a width in m along it beside that of the centre, so that there
// U = U_centre + ψ/band. It is an estimate of our own and no standard's; a factor that the maker gives, or
// a calculation in two dimensions, is better. A factor below 0 means that the band is too narrow for ψ.
func EdgeFactor(u, psi, bandM, insideResistance float64) float64 {
	return TemperatureFactorOfU(u+psi/bandM, insideResistance)
}

// ClearSky returns the temperature in K at which the clear sky radiates as a black body, from that of
// the air near the ground in K (W. C. Swinbank, Quarterly Journal of the Royal Meteorological Society
// 89 (1963) 339, from memory). His flux 5.31e-13 T⁶ W/m² gives 0.0553; clouds make the sky warmer.
func ClearSky(airK float64) float64 { return 0.0552 * airK * math.Sqrt(airK) }
