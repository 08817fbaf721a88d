package main

// The topic conditions: what a heat balance is made for. A test rates its project.

import (
	"strings"

	"github.com/jedib0t/go-pretty/v6/text"

	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
)

const conditionsAbout = `A CONDITION is one set of outdoor and indoor temperatures, wind and sun. For
each a make-up is solved as a heat balance (ISO 15099): the temperature of every
surface, what every gap passes, U without the sun and g with it, and what
follows for moisture, comfort and thermal stress.

  conditions:
    - id: january-night
      outside_c: -12
      inside_c: 20
      inside_rh: 0.45
      wind_m_s: 4
    - {id: july-noon, outside_c: 33, inside_c: 25, sun_w_m2: 650}

  id                        its name, none of those built in but cold-sun
  outside_c, inside_c       temperatures of the air
  outside_radiant_c         what the outside face sees; the air's when absent
  sky_c                     temperature of the sky, of which a face that looks
                            up sees more
  inside_radiant_c          the room's surfaces; the air's when absent
  inside_rh                 humidity of the room, 0 to 1: for the dew point
  wind_m_s                  convection outdoors of 4 + 4 v; where it is absent a
                            wind is assumed, and said
  outside_convection_w_m2k  instead of wind
  inside_convection_w_m2k   instead of natural convection
  sun_w_m2                  on the glazing; 0 when absent
  tilt_deg                  90 upright; the make-up's when absent
  height_m                  of the glazing; 1 when absent

Conditions that are built in:

`

const conditionsUse = `
Under na and iso15099 U is that of winter and g that of summer, which these
bases bring. The conditions of a project are rated under every basis.

THERMAL STRESS is screened, under every basis, for each condition with sun, for
the summer of na, called summer-na under the other bases, and for cold-sun. If
the project has a condition cold-sun, with sun, the screening uses that and not
the built-in one. How it is screened:

  thermal_stress: {frame_margin_k: 5, factor: 1}

  frame_margin_k            by how much the shaded edge is colder than the pane
                            without sun; 0 when absent; widens the difference
  factor                    k of the stress k E α ΔT, 1 when absent; moves the
                            stress only, not how it stands to the guide value

MOISTURE at the edge of the glass needs the edge of a make-up, one of:

  edge: {temperature_factor: 0.62}
  edge: {psi_w_mk: 0.05}

COMFORT is that of a person, of whom the project may say any of these:

  comfort: {distance_m: 1, glass_width_m: 3, glass_height_m: 2.5,
    posture: seated, sun_altitude_deg: 45, sun_from_front_deg: 0,
    sky_share: 0.2, body_share: 0.5, absorptivity: 0.7, floor_reflectance: 0.6}

Absent, they are as here, by common practice.

FIGURES under a condition are named with @, or by their keys. Which there are
says panewright help figures.

  panewright rate panewright-demo/project.yaml --basis na --figures u@winter
  panewright rate panewright-demo/project.yaml --basis na \
    --figures balances.winter.u_w_m2k,temperature@summer,fRsi@winter

In JSON they are in balances, a list by condition, with what was put in. A limit
names the condition beside the figure:

  limits:
    - {figure: inside_surface, at_least: 15, condition: january-night}
    - {figure: u, at_most: 1.4, condition: winter, basis: na}

U of a condition is the flux over the difference of the air temperatures; where
there is none, U is not known, nor is g without sun. SF6 is in no balance. Which
conditions a contract asks for is yours to settle.
`

func conditionsText() string {
	var b strings.Builder
	b.WriteString(conditionsAbout)
	for _, x := range builtIn() {
		fold(&b, text.Pad("  "+x[0], 20, ' '), x[1])
	}
	b.WriteString(conditionsUse)
	return b.String()
}

// builtIn returns the names of the built-in conditions, and each in words.
func builtIn() (list [][2]string) {
	var none table.Report
	add := func(name string, c glazing.Condition) {
		list = append(list, [2]string{name, strings.ReplaceAll(none.ConditionText(&c), "\u00a0", " ")})
	}
	for _, basis := range glazing.Bases() {
		for _, c := range glazing.NewMethod(basis, glazing.Options{}).Conditions() {
			add(c.ID+", "+basis.Name, c)
		}
	}
	for _, c := range glazing.NewMethod(glazing.NA, glazing.Options{}).Screened() {
		if c.ID == glazing.ColdSun {
			add(c.ID, c)
		}
	}
	return list
}
