package thermal

// What a detailed balance is put to and what it returns (ISO 15099:2003): sheets, cavities,
// surroundings, temperatures and fluxes.

// MaxSheets is the largest number of sheets of a balance.
const MaxSheets = 8

// ZeroCelsius is 0 °C in K.
const ZeroCelsius = 273.15

// A Sheet is a pane as the balance sees it: plies across which heat is conducted, and what its two
// faces do in the thermal infrared. Emissivity and Transmittance together are at most 1 at either
// face; what remains is reflected.
type Sheet struct {
	Plies         []Layer    // outside to inside
	Emissivity    [2]float64 // hemispherical, of the outer and the inner face
	Transmittance float64    // hemispherical, in the thermal infrared; 0 of glass
}

// A Layer is one ply of a sheet.
type Layer struct {
	ResistanceM2KW float64 // d/λ
	Share          float64 // of the sun that its sheet absorbs, spread evenly through the layer; the shares of a sheet add to 1
}

// A Cavity is the space between two sheets: filled with a gas, or evacuated.
type Cavity struct {
	WidthM float64
	Gas    Fluid   // not used where evacuated
	Vacuum *Vacuum // nil of a gap with gas
}

// Surroundings are what the glazing stands between. Radiant temperatures are those of a black
// enclosure that fills the half space.
type Surroundings struct {
	OutsideK, OutsideRadiantK float64 // air, radiation
	InsideK, InsideRadiantK   float64
	OutsideConvection         float64 // W/(m²·K)
	InsideConvection          float64 // W/(m²·K); 0 for natural convection
	TiltDeg                   float64 // 90 vertical, 0 horizontal with the outside above
	HeightM                   float64
}

// An Exchange is the heat that passes one gap, or passes between the glazing and its surroundings.
// Fluxes count from outside to inside: they are negative where heat leaves the room.
type Exchange struct {
	DropK        float64 // magnitude of the temperature difference of the two bounding faces, or of face and air
	MeanK        float64 // temperature for which the gas was taken
	AngleDeg     float64 // γ: the tilt, or 180 − tilt where the warm side is the other one
	Rayleigh     float64 // 0 where a coefficient was given, and in a vacuum
	Nusselt      float64 // likewise
	Convective   float64 // W/(m²·K), of gas and pillars
	Radiative    float64 // W/(m²·K); NaN where a sheet beside it passes infrared
	ConvectedWM2 float64
	RadiatedWM2  float64
	Gas          Properties // at MeanK; zero where no gas enters
}

// Total returns the conductance in W/(m²·K).
func (e *Exchange) Total() float64 { return e.Convective + e.Radiative }

// FluxWM2 returns the heat towards the inside.
func (e *Exchange) FluxWM2() float64 { return e.ConvectedWM2 + e.RadiatedWM2 }

// A Balance is the steady state of a glazing. Its arrays hold Sheets sheets and twice as many
// surfaces, from outside.
type Balance struct {
	Sheets        int
	SurfaceK      [2 * MaxSheets]float64
	DropK         [MaxSheets]float64      // of each sheet: outer less inner face, kept apart for its digits
	ConductedWM2  [MaxSheets]float64      // through each sheet towards the inside, at its middle when no sun is absorbed: DropK over resistance
	AbsorbedWM2   [2 * MaxSheets]float64  // net infrared that each face takes up
	SunWM2        [2 * MaxSheets]float64  // absorbed sun as it acts at each face
	Gaps          [MaxSheets - 1]Exchange // between sheets
	Outside, Room Exchange                // between surroundings and the outermost and innermost face
	Iterations    int
	ResidualWM2   float64 // largest energy residual of any surface
	Surroundings  Surroundings

	links [MaxSheets + 1]link // of outside, gaps, room, at these temperatures
}

// A link is the heat between two faces, or a face and its surroundings, at the present temperatures:
// a flux towards the inside, and its slopes with the temperature of the outer and, with the sign
// changed, of the inner face.
type link struct{ flux, outer, inner float64 }

// InwardWM2 returns the heat that the innermost surface gives to the room by convection and
// radiation; transmitted sun is not counted.
func (b *Balance) InwardWM2() float64 { return b.Room.FluxWM2() }

// GapState returns the exchange of a gap as that of a gap of EN 673, with which it
// shares its quantities.
func (e *Exchange) GapState() GapState {
	g := GapState{Drop: Delta(e.DropK), Rayleigh: e.Rayleigh, Nusselt: e.Nusselt, Convective: e.Convective, Radiative: e.Radiative, Total: e.Total()}
	if e.Rayleigh > 0 {
		g.Prandtl = e.Gas.ViscosityPaS * e.Gas.HeatCapacityJKGK / e.Gas.ConductivityWMK
		g.Grashof = g.Rayleigh / g.Prandtl
	}
	return g
}

// MeanK returns the mean temperature in K of the faces of sheet k, from 0.
func (b *Balance) MeanK(k int) float64 { return (b.SurfaceK[2*k] + b.SurfaceK[2*k+1]) / 2 }
