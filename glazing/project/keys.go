package project

// The types below are the one table of keys: the reader checks a file against their tags, and
// Schema turns the same tags into the JSON Schema. Tags:
//
//	key     name in the file            need    "yes": must be there
//	above   the number is greater       from    the number is this or more
//	below   the number is less          upto    the number is this or less
//	one     the text is one of these    id      "yes": an id; "tint": the name of a tint
//	file    "yes": a file name          doc     what it means
//	pattern the text must match (for JSON Schema and reader)
//	high    what to add where a number is above upto
//
// A blank field's tag "called" says what the object is, for messages; object keeps its place.

type fileSpec struct {
	_            struct{}                `called:"a project"`
	Project      text                    `key:"project" need:"yes" doc:"title of the project"`
	Author       text                    `key:"author" doc:"who prepared it"`
	Date         text                    `key:"date" doc:"printed as given"`
	Client       text                    `key:"client" doc:"printed as given"`
	Notes        text                    `key:"notes" doc:"printed as given"`
	Basis        names                   `key:"basis" one:"en iso na iso15099" doc:"one basis, or a list; en when absent"`
	Sun          text                    `key:"sun" file:"yes" doc:"CSV of the site's solar spectrum; replaces the solar weighting of the basis"`
	Coefficients map[string]surfacesSpec `key:"coefficients" one:"en iso na iso15099" doc:"surface coefficients by basis; those of na and iso15099 move nothing"`
	Materials    []materialSpec          `key:"materials" doc:"film materials"`
	Glasses      []glassSpec             `key:"glasses" doc:"glasses by their optical constants"`
	Panes        []paneSpec              `key:"panes" doc:"panes"`
	Makeups      []makeupSpec            `key:"makeups" doc:"make-ups to rate"`
	Conditions   []conditionSpec         `key:"conditions" doc:"sets of temperatures, wind and sun, for which heat balances are made"`
	Comfort      *comfortSpec            `key:"comfort" doc:"the person who feels what the glazing does"`
	Stress       *stressSpec             `key:"thermal_stress" doc:"how thermal stress is screened"`
	Limits       []limitSpec             `key:"limits" doc:"requirements, with their sources"`
	LimitsFile   text                    `key:"limits_file" file:"yes" doc:"YAML with limits that projects share"`
}

// limitsFileSpec is a file of limits that projects share.
type limitsFileSpec struct {
	_      struct{}    `called:"a limits file"`
	Name   text        `key:"name" doc:"title of the file"`
	Author text        `key:"author" doc:"who typed the limits"`
	Limits []limitSpec `key:"limits" need:"yes" doc:"requirements, with their sources"`
}

type surfacesSpec struct {
	_       struct{} `called:"coefficients"`
	Outside number   `key:"he_w_m2k" above:"0" from:"0.1" upto:"1000" doc:"outside surface coefficient, W/(m²·K)"`
	Inside  number   `key:"hi_w_m2k" above:"0" from:"0.1" upto:"1000" doc:"inside surface coefficient, W/(m²·K); absent, it follows the room-side emissivity"`
}

type materialSpec struct {
	_ struct{} `called:"a material"`
	object
	ID          text       `key:"id" need:"yes" id:"yes" doc:"name by which films use it"`
	Model       text       `key:"model" one:"drude oscillators" doc:"drude: free carriers alone; oscillators: terms, with free carriers if they are given"`
	Carriers    number     `key:"carriers_cm3" above:"0" doc:"carrier density, 1/cm³; two of it, mobility and resistivity fix the third"`
	Mobility    number     `key:"mobility_cm2_v_s" above:"0" doc:"carrier mobility, cm²/(V·s)"`
	Resistivity number     `key:"resistivity_ohm_cm" above:"0" doc:"resistivity to direct current, Ω·cm"`
	Mass        number     `key:"effective_mass" above:"0" doc:"of the carriers, in electron masses"`
	EpsInf      number     `key:"eps_infinity" above:"0" from:"0.1" upto:"1000" doc:"high-frequency permittivity; of oscillators what is there beside their terms, 1 when absent"`
	Terms       []termSpec `key:"terms" doc:"what oscillators add to the permittivity"`
	Refraction  number     `key:"n" above:"0" from:"0.001" upto:"100" doc:"constant refractive index"`
	Extinction  number     `key:"k" from:"0" upto:"1000" doc:"constant extinction coefficient, 0 when absent"`
	NK          text       `key:"nk" file:"yes" doc:"CSV of wavelength_um or wavelength_nm, n, k"`
}

type termSpec struct {
	_ struct{} `called:"a term"`
	object
	Kind       text   `key:"kind" need:"yes" one:"drude lorentz tauc-lorentz sellmeier" doc:"drude: plasma_ev, damping_ev; lorentz: strength, energy_ev, broadening_ev; tauc-lorentz: amplitude_ev, energy_ev, broadening_ev, gap_ev, urbach_ev; sellmeier: strength, resonance_nm"`
	Plasma     number `key:"plasma_ev" above:"0" from:"0.0001" upto:"100" doc:"plasma energy without screening, eV"`
	Damping    number `key:"damping_ev" above:"0" from:"0.000001" upto:"100" doc:"damping energy, eV"`
	Strength   number `key:"strength" above:"0" from:"0.000001" upto:"1000000" doc:"lorentz: what the term adds to the permittivity far below its energy; sellmeier: far beyond its wavelength"`
	Energy     number `key:"energy_ev" above:"0" from:"0.0001" upto:"100" doc:"energy of the oscillator, eV"`
	Broadening number `key:"broadening_ev" above:"0" from:"0.000001" upto:"100" doc:"its broadening, eV"`
	Amplitude  number `key:"amplitude_ev" above:"0" from:"0.000001" upto:"100000" doc:"amplitude of tauc-lorentz, eV"`
	Gap        number `key:"gap_ev" above:"0" from:"0.0001" upto:"100" doc:"gap of tauc-lorentz, eV, below energy_ev"`
	Urbach     number `key:"urbach_ev" from:"0" upto:"1" doc:"width of the tail below the gap, eV; 0 when absent, for none"`
	Resonance  number `key:"resonance_nm" above:"0" from:"1" upto:"1000000" doc:"wavelength of the resonance of sellmeier, which has no loss: outside 300 to 50000 nm"`
}

type glassSpec struct {
	_ struct{} `called:"a glass"`
	object
	ID           text   `key:"id" need:"yes" id:"yes" doc:"name by which panes use it"`
	NK           text   `key:"nk" need:"yes" file:"yes" doc:"CSV of wavelength_um or wavelength_nm, n, k"`
	Conductivity number `key:"conductivity_w_mk" above:"0" from:"0.001" upto:"1000" doc:"W/(m·K), 1.0 when absent"`
	Density      number `key:"density_kg_m3" above:"0" from:"1" upto:"30000" doc:"kg/m³, 2500 when absent"`
}

type paneSpec struct {
	_ struct{} `called:"a pane"`
	object
	ID              text              `key:"id" need:"yes" id:"yes" doc:"name by which make-ups use it"`
	Thickness       number            `key:"thickness_mm" above:"0" from:"0.001" upto:"200" doc:"thickness of a plain pane"`
	Plies           []plySpec         `key:"plies" doc:"layers of a laminate instead of thickness_mm, outside to inside when not turned"`
	Conductivity    number            `key:"conductivity_w_mk" above:"0" from:"0.001" upto:"1000" doc:"W/(m·K), 1.0 when absent"`
	Density         number            `key:"density_kg_m3" above:"0" from:"1" upto:"30000" doc:"kg/m³, 2500 when absent"`
	HeatTreatment   text              `key:"heat_treatment" one:"annealed heat-strengthened toughened unknown" doc:"unknown when absent"`
	HeatSoaked      flag              `key:"heat_soaked" doc:"true if heat soaked (EN 14179)"`
	Origin          text              `key:"origin" one:"measured modelled invented" doc:"where the spectrum comes from; measured when absent"`
	Spectrum        text              `key:"spectrum" file:"yes" doc:"CSV of wavelength, tau, rho_front, rho_back"`
	Spectra         *spectraSpec      `key:"spectra" doc:"the same from several files, or from several spectra of one JCAMP-DX file: FILE#2 is its second, FILE#TITLE the one of that title"`
	EmissivityFront number            `key:"emissivity_front" above:"0" from:"0.0001" upto:"1" doc:"corrected (hemispherical) emissivity of the front; with tau_ir at most 1"`
	EmissivityBack  number            `key:"emissivity_back" above:"0" from:"0.0001" upto:"1" doc:"corrected (hemispherical) emissivity of the back; with tau_ir at most 1"`
	NormalFront     number            `key:"emissivity_normal_front" above:"0" from:"0.0001" upto:"1" doc:"normal emissivity of the front"`
	NormalBack      number            `key:"emissivity_normal_back" above:"0" from:"0.0001" upto:"1" doc:"normal emissivity of the back"`
	TauInfrared     number            `key:"tau_ir" from:"0" below:"1" doc:"transmittance in the thermal infrared; absent, that of infrared rows, else 0"`
	Glass           text              `key:"glass" id:"yes" doc:"a glass, or a pane of the library, that is coated"`
	Coatings        []coatingSpec     `key:"coatings" doc:"films on the faces"`
	Tints           []tintSpec        `key:"tints" doc:"states of a switchable pane"`
	Attributes      map[string]number `key:"attributes" doc:"anything numeric of the user's"`
}

type plySpec struct {
	_ struct{} `called:"a ply"`
	object
	Glass        number `key:"glass_mm" above:"0" from:"0.001" upto:"200" doc:"thickness of a glass ply"`
	Interlayer   number `key:"interlayer_mm" above:"0" from:"0.001" upto:"200" doc:"thickness of an interlayer"`
	Conductivity number `key:"conductivity_w_mk" above:"0" from:"0.001" upto:"1000" doc:"W/(m·K); glass 1.0, interlayer 0.22 when absent"`
	Density      number `key:"density_kg_m3" above:"0" from:"1" upto:"30000" doc:"kg/m³; glass 2500, interlayer 1070 when absent"`
}

type spectraSpec struct {
	_ struct{} `called:"spectra"`
	object
	Tau           text `key:"tau" need:"yes" file:"yes" doc:"transmittance; FILE, FILE#2 or FILE#TITLE"`
	RhoFront      text `key:"rho_front" need:"yes" file:"yes" doc:"reflectance of the front; FILE, FILE#2 or FILE#TITLE"`
	RhoBack       text `key:"rho_back" need:"yes" file:"yes" doc:"reflectance of the back; FILE, FILE#2 or FILE#TITLE"`
	InfraredFront text `key:"infrared_front" file:"yes" doc:"reflectance of the front, 5 to 50 µm; FILE, FILE#2 or FILE#TITLE"`
	InfraredBack  text `key:"infrared_back" file:"yes" doc:"reflectance of the back, 5 to 50 µm; FILE, FILE#2 or FILE#TITLE"`
}

type coatingSpec struct {
	_ struct{} `called:"a coating"`
	object
	Face  text       `key:"face" need:"yes" one:"front back" doc:"face of the pane"`
	Films []filmSpec `key:"films" need:"yes" doc:"from the glass outward"`
}

type filmSpec struct {
	_ struct{} `called:"a film"`
	object
	Material    text   `key:"material" need:"yes" id:"yes" doc:"a material of the project or a built-in one"`
	Thickness   number `key:"thickness_nm" need:"yes" from:"0" upto:"10000" doc:"thickness; 0 leaves the film out"`
	Carriers    number `key:"carriers_cm3" above:"0" doc:"carrier density instead of the material's, 1/cm³; two of it, mobility and a resistance fix the third"`
	Mobility    number `key:"mobility_cm2_v_s" above:"0" doc:"mobility instead of the material's, cm²/(V·s)"`
	Resistivity number `key:"resistivity_ohm_cm" above:"0" doc:"resistivity to direct current, Ω·cm; alone it changes the mobility"`
	Sheet       number `key:"sheet_resistance_ohm" above:"0" doc:"the same of this film, Ω"`
	Mass        number `key:"effective_mass" above:"0" doc:"effective mass instead of the material's"`
	EpsInf      number `key:"eps_infinity" above:"0" doc:"high-frequency permittivity instead of the material's"`
}

type tintSpec struct {
	_ struct{} `called:"a tint"`
	object
	Tint            text         `key:"tint" need:"yes" id:"tint" doc:"name of the state"`
	Charge          number       `key:"charge_mc_cm2" doc:"inserted charge density, mC/cm²"`
	Temperature     number       `key:"temperature_c" above:"-273.15" doc:"temperature of a thermochromic state, °C"`
	Spectrum        text         `key:"spectrum" file:"yes" doc:"CSV of wavelength, tau, rho_front, rho_back"`
	Spectra         *spectraSpec `key:"spectra" doc:"the same from several files, or from several spectra of one JCAMP-DX file: FILE#2 is its second, FILE#TITLE the one of that title"`
	EmissivityFront number       `key:"emissivity_front" above:"0" from:"0.0001" upto:"1" doc:"corrected emissivity of the front in this tint"`
	EmissivityBack  number       `key:"emissivity_back" above:"0" from:"0.0001" upto:"1" doc:"corrected emissivity of the back in this tint"`
	NormalFront     number       `key:"emissivity_normal_front" above:"0" from:"0.0001" upto:"1" doc:"normal emissivity of the front in this tint"`
	NormalBack      number       `key:"emissivity_normal_back" above:"0" from:"0.0001" upto:"1" doc:"normal emissivity of the back in this tint"`
}

type makeupSpec struct {
	_ struct{} `called:"a make-up"`
	object
	ID              text            `key:"id" need:"yes" id:"yes" doc:"name of the make-up"`
	Title           text            `key:"title" doc:"printed beside the id"`
	Tilt            number          `key:"tilt_deg" from:"0" upto:"180" doc:"90 vertical (when absent), 0 horizontal with the outside above"`
	HeatFlow        text            `key:"heat_flow" one:"up down" doc:"direction of heat off vertical, for EN 673; up when absent"`
	Typed           map[string]text `key:"typed" doc:"values carried to the schedule, marked as typed by the user"`
	Edge            *edgeSpec       `key:"edge" doc:"what is known of the edge of the glass"`
	OutsideToInside []elementSpec   `key:"outside_to_inside" need:"yes" doc:"panes and gaps in turn, beginning and ending with a pane"`
}

type elementSpec struct {
	_ struct{} `called:"a pane or gap of a make-up"`
	object
	Pane   text              `key:"pane" id:"yes" doc:"id of a pane"`
	Turned flag              `key:"turned" doc:"true if the back face looks outside"`
	Tint   text              `key:"tint" id:"yes" doc:"a fixed tint, or same to follow the outermost pane that switches"`
	Gap    number            `key:"gap_mm" above:"0" from:"0.01" upto:"1000" doc:"width of a gap"`
	Gas    map[string]number `key:"gas" from:"0" upto:"1" doc:"fractions by volume: air, argon, krypton, xenon, sf6; they add to 1"`
	Vacuum *vacuumSpec       `key:"vacuum" doc:"an evacuated gap, instead of gas"`
}

type vacuumSpec struct {
	_ struct{} `called:"a vacuum"`
	object
	Pressure number `key:"pressure_pa" need:"yes" from:"0" upto:"10" high:"that is no vacuum, and its gas conducts otherwise; name the filling with gas" doc:"residual pressure"`
	Radius   number `key:"pillar_radius_mm" need:"yes" above:"0" from:"0.001" upto:"10" doc:"radius of a pillar"`
	Pitch    number `key:"pillar_pitch_mm" need:"yes" above:"0" from:"0.01" upto:"1000" doc:"distance of pillars, centre to centre, in a square array"`
	Pillar   number `key:"pillar_conductivity_w_mk" above:"0" from:"0.001" upto:"10000" doc:"conductivity of the pillars, W/(m·K); absent, their own resistance is left out, which makes U greater"`
}

type edgeSpec struct {
	_ struct{} `called:"an edge"`
	object
	TemperatureFactor number `key:"temperature_factor" from:"0" upto:"1" doc:"of the room-side surface at the edge: (surface − outdoors)/(indoors − outdoors)"`
	Psi               number `key:"psi_w_mk" from:"0" upto:"2" doc:"instead of it the linear thermal transmittance of the edge, W/(m·K)"`
}

type conditionSpec struct {
	_ struct{} `called:"a condition"`
	object
	ID                text   `key:"id" need:"yes" id:"yes" doc:"name of the condition; winter and summer are those of a basis; one called cold-sun, with sun, stands in the place of the built-in condition of that name, for which thermal stress is screened"`
	Outside           number `key:"outside_c" need:"yes" above:"-273.15" from:"-100" upto:"100" high:"°C is meant, not K" doc:"outdoor air temperature"`
	OutsideRadiant    number `key:"outside_radiant_c" above:"-273.15" from:"-200" upto:"200" high:"°C is meant, not K" doc:"outdoor radiant temperature; the air's when absent"`
	Sky               number `key:"sky_c" above:"-273.15" from:"-200" upto:"200" high:"°C is meant, not K" doc:"radiant temperature of the sky; the outdoor radiant temperature when absent"`
	Inside            number `key:"inside_c" need:"yes" above:"-273.15" from:"-100" upto:"100" high:"°C is meant, not K" doc:"indoor air temperature"`
	InsideRadiant     number `key:"inside_radiant_c" above:"-273.15" from:"-200" upto:"200" high:"°C is meant, not K" doc:"indoor radiant temperature; the air's when absent"`
	InsideHumidity    number `key:"inside_rh" from:"0" upto:"1" doc:"indoor relative humidity"`
	Wind              number `key:"wind_m_s" from:"0" upto:"100" high:"m/s is meant, not km/h" doc:"wind speed; where neither it nor outside_convection_w_m2k is given, one is assumed and said"`
	OutsideConvection number `key:"outside_convection_w_m2k" above:"0" from:"0.1" upto:"1000" doc:"instead of wind, W/(m²·K)"`
	InsideConvection  number `key:"inside_convection_w_m2k" above:"0" from:"0.1" upto:"1000" doc:"instead of natural convection, W/(m²·K)"`
	Sun               number `key:"sun_w_m2" from:"0" upto:"3000" doc:"solar irradiance on the glazing, 0 when absent"`
	Tilt              number `key:"tilt_deg" from:"0" upto:"180" doc:"tilt; the make-up's when absent"`
	Height            number `key:"height_m" above:"0" from:"0.01" upto:"100" doc:"height of the glazing, 1.0 when absent"`
}

type comfortSpec struct {
	_ struct{} `called:"comfort"`
	object
	Distance         number `key:"distance_m" above:"0" from:"0.01" upto:"100" doc:"from the glass, in front of its middle, 1 when absent"`
	GlassWidth       number `key:"glass_width_m" above:"0" from:"0.01" upto:"100" doc:"width of the glass, 3 when absent"`
	GlassHeight      number `key:"glass_height_m" above:"0" from:"0.01" upto:"100" doc:"height of the glass, 2.5 when absent"`
	Posture          text   `key:"posture" one:"seated standing" doc:"seated when absent"`
	SunAltitude      number `key:"sun_altitude_deg" from:"0" upto:"90" doc:"above the horizon, 45 when absent"`
	SunFromFront     number `key:"sun_from_front_deg" from:"0" upto:"180" doc:"horizontal angle between the sun and where the person faces, 0 when absent"`
	SkyShare         number `key:"sky_share" from:"0" upto:"1" doc:"share of the sky that the person sees, 0.2 when absent"`
	BodyShare        number `key:"body_share" from:"0" upto:"1" doc:"share of the body that the sun strikes, 0.5 when absent"`
	Absorptivity     number `key:"absorptivity" from:"0" upto:"1" doc:"of skin and clothes for sun, 0.7 when absent"`
	FloorReflectance number `key:"floor_reflectance" from:"0" upto:"1" doc:"of the floor for sun, 0.6 when absent"`
}

type stressSpec struct {
	_ struct{} `called:"thermal stress"`
	object
	FrameMargin number `key:"frame_margin_k" from:"0" upto:"100" doc:"how much colder than its pane without sun the edge is, 0 when absent; widens the difference that is held against the guide value, and the stress with it"`
	Factor      number `key:"factor" above:"0" from:"0.1" upto:"10" doc:"k of the stress σ = k E α ΔT, 1 when absent; moves σ only, neither the difference nor how it stands to the guide value"`
}

type limitSpec struct {
	_ struct{} `called:"a limit"`
	object
	Figure    text   `key:"figure" need:"yes" doc:"key or alias of a figure"`
	AtMost    number `key:"at_most" doc:"the figure is at most this, in its unit"`
	AtLeast   number `key:"at_least" doc:"the figure is at least this, in its unit"`
	Scope     text   `key:"scope" one:"centre window" doc:"centre of the glass (when absent), or whole window"`
	Basis     text   `key:"basis" one:"en iso na iso15099" doc:"basis of the figure; the project's when absent, if it has just one"`
	Tint      text   `key:"tint" doc:"clear, full, each (when absent), worst, or the name of a tint"`
	Condition text   `key:"condition" doc:"id of a condition of the project, or winter, summer, cold-sun"`
	Makeups   names  `key:"makeups" doc:"ids of make-ups; all when absent"`
	Source    text   `key:"source" doc:"who set the limit, and where"`
	Date      text   `key:"date" doc:"of the source"`
}
