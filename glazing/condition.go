package glazing

// What the user says of heat: conditions, evacuated gaps, edges, who feels it, how stress is screened.

// A Condition is one set of outdoor and indoor temperatures, wind and sun. Values that are not
// known take their defaults: radiant temperatures that of the air, convection inside that of a free
// wall of air, the tilt that of the make-up, the height 1 m.
type Condition struct {
	ID                    string
	OutsideC, InsideC     float64 // air
	OutsideRadiantC       Value   // of what the outside face sees, but for the sky where SkyC is known
	SkyC                  Value   // radiant temperature of the sky, of which a tilted face sees (1 + cos tilt)/2
	InsideRadiantC        Value
	InsideHumidity        Value // relative, 0 to 1
	WindMS                Value // 4 + 4 v W/(m²·K)
	OutsideConvectionWM2K Value // instead of wind
	InsideConvectionWM2K  Value // instead of natural convection
	SunWM2                float64
	TiltDeg               Value
	HeightM               Value
	Standard              bool // built in: of a basis, or the cold sunny one
}

// A Vacuum is an evacuated gap with a square array of pillars.
type Vacuum struct {
	PressurePa     float64
	PillarRadiusMM float64
	PillarPitchMM  float64
	// PillarWMK is the conductivity of the pillars; unknown, their own resistance is left out, which
	// makes U greater.
	PillarWMK Value
}

// An Edge is what the user says of the edge of the glass; either may be unknown.
type Edge struct {
	TemperatureFactor Value // of the room-side surface at the edge, 0 to 1
	PsiWMK            Value // linear thermal transmittance of the edge
}

// A Person is who feels what the glazing does: where, and how the sun falls.
type Person struct {
	DistanceM, GlassWidthM, GlassHeightM float64 // in front of the middle of the glass
	Standing                             bool
	SunAltitudeDeg                       float64
	SunFromFrontDeg                      float64 // horizontal angle between the sun and where the person faces, 0 to 180
	SkyShare                             float64 // of the sky vault that the person sees
	BodyShare                            float64 // of the body that the sun strikes
	Absorptivity                         float64 // of skin and clothes for sun
	FloorReflectance                     float64
}

// AnyPerson is who is assumed where the user says nothing; common practice, no source.
func AnyPerson() Person {
	return Person{DistanceM: 1, GlassWidthM: 3, GlassHeightM: 2.5, SunAltitudeDeg: 45, SkyShare: 0.2, BodyShare: 0.5,
		Absorptivity: 0.7, FloorReflectance: 0.6}
}

// StressScreening is how thermal stress is screened.
type StressScreening struct {
	FrameMarginK float64 // by which the shaded edge is colder than the same pane without sun, K
	Factor       float64 // k of σ = k E α ΔT
}
