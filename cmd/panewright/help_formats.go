package main

// formatsText is the topic formats: what is read and what is printed. A test rates its project and
// runs its examples.
const formatsText = `THE PROJECT FILE is YAML; JSON is YAML too. A small one:

  project: Corner shop
  basis: [en, iso]
  panes:
    - id: shop-low-e-6
      thickness_mm: 6
      spectrum: spectra/low-e-6.csv
      emissivity_front: 0.837
      emissivity_back: 0.04
  makeups:
    - id: A1
      outside_to_inside:
        - {pane: soda-lime-6}
        - {gap_mm: 16, gas: {argon: 0.9, air: 0.1}}
        - {pane: shop-low-e-6, turned: true}

Numbers are in the unit that the key names, with a decimal point. Ids have 1 to
64 letters, digits, and . _ - after the first. Files are named from the folder
of the project and stay in it, unless --files-anywhere is given.

  basis           en, iso, na, iso15099 or a list; en when absent
  sun             CSV of the site's sun: a wavelength, and irradiance
  coefficients    {en: {he_w_m2k: 25, hi_w_m2k: 7.7}}, by basis
  glasses         id, and nk: a file of optical constants
  panes           thickness_mm, or plies: of a laminate; then one of
                    spectrum: FILE      columns of one CSV
                    spectra: {tau: FILE, rho_front: FILE, rho_back: FILE}
                    tints: a list of {tint: NAME, spectrum: FILE}
                    glass: of the project or built in, and coatings: films
                      on its faces, each a material and thickness_nm
                  emissivity_front and _back are corrected (hemispherical),
                  emissivity_normal_front and _back normal; either wins over
                  infrared rows of the spectrum
                  origin: measured (when absent), modelled, invented
                  heat_treatment: annealed, heat-strengthened, toughened
                  tau_ir: transmittance in the thermal infrared, of films
  makeups         id, title, tilt_deg, and outside_to_inside: panes (turned:,
                  tint:) and gaps (gap_mm, gas: shares that add to 1)
                  typed: {NAME: TEXT}, carried to every output and marked as
                  typed by you
                  edge: {temperature_factor: 0.6} or {psi_w_mk: 0.05}, for
                  moisture at the edge of the glass
                  a gap has vacuum: {pressure_pa: 0.1, pillar_pitch_mm: 20,
                  pillar_radius_mm: 0.25} instead of gas
  conditions      id, outside_c, inside_c; wind_m_s, sun_w_m2, inside_rh and
                  more, for heat balances: panewright help conditions
  comfort         who feels the glazing, and thermal_stress, how that is
                  screened: likewise
  limits          figure; at_most or at_least, in the unit of the figure; tint:
                  clear, full, each, worst or a name; scope, basis, condition,
                  makeups; source and date; panewright check holds figures
                  against them
  limits_file     YAML of limits: alone, which projects share

Every key, with its bounds, is in the schema; editors complete from it:

  panewright schema -o panewright.schema.json

A SPECTRUM is CSV with a row of column heads: wavelength_nm or wavelength_um,
tau, rho_front, rho_back in any order, as fractions of one. Lines that begin
with # are comments. A cell is blank beyond the ends of its column, and ? where
a value is missing in between: the figures that need it are not known; where it
has less than 0.1 % of a figure's weight, it is interpolated, with a caution.
Rows from 5 to 50 µm give the emissivity of faces.

Or JCAMP-DX, as spectrometers write it: transmittance, reflectance or absorbance
over nm, µm or 1/cm. It has one quantity a spectrum, so that a pane names its
files by quantity, under spectra:. FILE#2 is the second spectrum of a file.

OPTICAL CONSTANTS are CSV: wavelength_nm or wavelength_um, n, k. Two rows
suffice; between rows it is linear.

ANY OTHER TEXT with rows of numbers, perhaps in per cent, with decimal commas or
wavelengths in 1/cm, is looked at and turned into such CSV by spectrum:

  panewright spectrum tau=t.txt rho_front=r.txt --percent --decimal-comma \
    --as csv -o pane.csv

OUTPUTS. Results go to standard output or, whole or not at all, to the file of
-o; all else goes to standard error.

  panewright rate panewright-demo/project.yaml
  panewright rate panewright-demo/project.yaml --as json -o mill.json
  panewright rate panewright-demo/project.yaml --as csv --figures light,g,u

  table           80 columns, rounded as the trade rounds
  markdown        the same, for a report
  json            every figure with all its digits; one not known is null
  csv, xlsx       one row a rating; one not known is an empty cell

The names of figures: panewright help figures.

EXIT CODES

  0               done
  1               an output could not be written, or a published check is missed
  2               wrong usage, or wrong input
  3               not every limit that was checked is met
`
