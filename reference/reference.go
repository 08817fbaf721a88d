// Package reference holds the published tables that Panewright calculates with: the weights
// of EN 410 and ISO 9050, the CIE observers, daylight and colour samples, the reference sun of
// ASTM G173, the gas tables of EN 673 and ISO 15099, the emissivity tables of EN 12898, and the optical
// constants of soda-lime glass and of film materials.
//
// Each table is one file under tables/, embedded, that begins with its title, source, edition,
// units, standing and how the figures were verified. Standing is "read" where the figures were
// read from the source or from copies that agree, "from memory" where they were recalled
// and then checked as stated, and "computed" where they follow from others. A table is parsed when it is first asked for; its slices are
// shared and must not be written to.
package reference

import (
	"embed"
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"
	"sync"
)

//go:embed tables/*.csv
var files embed.FS

//go:embed NOTICES.md
var notices string

// The tables, each parsed on first use.
var (
	EN410Weights          = lazily("en410_weights")          // light_pct, solar, uv over wavelength_nm
	DamageWeights         = lazily("damage_weights")         // damage, damage_700, skin over wavelength_nm
	Daylight              = lazily("daylight")               // d65, s0, s1, s2 over wavelength_nm
	Observers             = lazily("observers")              // x2, y2, z2, x10, y10, z10 over wavelength_nm
	RenderingSamples      = lazily("rendering_samples")      // sample1 … sample8 over wavelength_nm
	SolarG173             = lazily("solar_g173")             // global, direct in W/(m²·nm) over wavelength_nm
	EmissivityWavelengths = lazily("emissivity_wavelengths") // wavelength_um, thirty rows
	EmissivityRatio       = lazily("emissivity_ratio")       // ratio over normal_emissivity
	GasesEN673            = lazily("gases_en673")            // density, viscosity, conductivity, heat_capacity by gas
	GasesISO15099         = lazily("gases_iso15099")         // molar_mass, and a and b of three properties, by gas
	SodaLimeGlass         = lazily("soda_lime_glass")        // n_clear, k_clear, … over wavelength_um
)

// Optical constants of film materials, each parsed on first use: n, k over wavelength_um.
var (
	NKITO                    = lazily("nk_ito")
	NKAZO                    = lazily("nk_azo")
	NKSilver                 = lazily("nk_silver")
	NKGold                   = lazily("nk_gold")
	NKCopper                 = lazily("nk_copper")
	NKAluminium              = lazily("nk_aluminium")
	NKChromium               = lazily("nk_chromium")
	NKNickel                 = lazily("nk_nickel")
	NKTitania                = lazily("nk_titania")
	NKSilica                 = lazily("nk_silica")
	NKSiliconNitride         = lazily("nk_silicon_nitride")
	NKSiliconNitrideInfrared = lazily("nk_silicon_nitride_infrared")
	NKAlumina                = lazily("nk_alumina")
	NKAluminiumNitride       = lazily("nk_aluminium_nitride")
	NKNiobia                 = lazily("nk_niobia")
	NKTantala                = lazily("nk_tantala")
	NKMagnesiumFluoride      = lazily("nk_magnesium_fluoride")
	NKTungstenOxide          = lazily("nk_tungsten_oxide")
	NKVanadiaCold            = lazily("nk_vanadia_cold")
	NKVanadiaHot             = lazily("nk_vanadia_hot")
)

// Notices returns the notices of the data and code that Panewright carries, as Markdown.
func Notices() string { return notices }

// All returns every table, in the order in which they are listed above.
func All() []*Table {
	return []*Table{
		EN410Weights(), DamageWeights(), Daylight(), Observers(), RenderingSamples(), SolarG173(),
		EmissivityWavelengths(), EmissivityRatio(), GasesEN673(), GasesISO15099(), SodaLimeGlass(),
		NKITO(), NKAZO(), NKSilver(), NKGold(), NKCopper(), NKAluminium(), NKChromium(), NKNickel(),
		NKTitania(), NKSilica(), NKSiliconNitride(), NKSiliconNitrideInfrared(), NKAlumina(), NKAluminiumNitride(),
		NKNiobia(), NKTantala(), NKMagnesiumFluoride(), NKTungstenOxide(), NKVanadiaCold(), NKVanadiaHot(),
	}
}

// A Table is one published table: what its file says of it, and its cells.
type Table struct {
	Name     string // of the file, without ending
	Title    string
	Source   string // publication and table
	Edition  string
	Units    string // of each column
	Standing string // "read", "from memory" or "computed"
	Verified string // how the figures were checked

	Columns []string // heads; the first column is the key of a row
	Labels  []string // the first column as text
	cells   [][]float64
}

// Column returns the cells of a column from top to bottom; a blank or textual cell is NaN. It
// panics if the table has no such column.
func (t *Table) Column(name string) []float64 {
	i := slices.Index(t.Columns, name)
	if i < 0 {
		panic(fmt.Sprintf("reference: table %s has no column %q", t.Name, name))
	}
	return t.cells[i]
}

// Series returns the rows in which the named column is not blank, as keys and values. The keys
// are the first column, ascending.
func (t *Table) Series(name string) (keys, values []float64) {
	column := t.Column(name)
	for i, v := range column {
		if !math.IsNaN(v) {
			keys, values = append(keys, t.cells[0][i]), append(values, v)
		}
	}
	return keys, values
}

func lazily(name string) func() *Table {
	return sync.OnceValue(func() *Table {
		text, err := files.ReadFile("tables/" + name + ".csv")
		if err != nil {
			panic("reference: " + err.Error())
		}
		t, err := parse(name, string(text))
		if err != nil {
			panic("reference: " + err.Error())
		}
		return t
	})
}

// parse reads one table file: lines "# key: text" (continued by "#   text"), a row of column
// heads, rows of cells.
func parse(name, text string) (*Table, error) {
	t := &Table{Name: name}
	fields := map[string]*string{
		"title": &t.Title, "source": &t.Source, "edition": &t.Edition, "units": &t.Units,
		"standing": &t.Standing, "verified": &t.Verified,
	}
	var last *string
	for n, line := range strings.Split(strings.TrimSuffix(text, "\n"), "\n") {
		if more, ok := strings.CutPrefix(line, "#   "); ok && last != nil {
			*last += " " + more
			continue
		}
		if head, ok := strings.CutPrefix(line, "# "); ok {
			key, value, _ := strings.Cut(head, ": ")
			if last = fields[key]; last == nil {
				return nil, fmt.Errorf("%s: line %d: unknown heading %q", name, n+1, key)
			}
			*last = value
			continue
		}
		cells := strings.Split(line, ",")
		if t.Columns == nil {
			t.Columns = cells
			t.cells = make([][]float64, len(cells))
			continue
		}
		if len(cells) != len(t.Columns) {
			return nil, fmt.Errorf("%s: line %d has %d cells, want %d", name, n+1, len(cells), len(t.Columns))
		}
		t.Labels = append(t.Labels, cells[0])
		for i, cell := range cells {
			v := math.NaN()
			if cell != "" {
				x, err := strconv.ParseFloat(cell, 64)
				if err == nil {
					v = x
				} else if i > 0 {
					return nil, fmt.Errorf("%s: line %d: %q is not a number", name, n+1, cell)
				}
			}
			t.cells[i] = append(t.cells[i], v)
		}
	}
	for key, field := range fields {
		if *field == "" {
			return nil, fmt.Errorf("%s: has no %s", name, key)
		}
	}
	return t, nil
}
