package main

// The files of panewright spectrum: FILE and KEY=FILE, in three formats, joined to one pane.

import (
	"bytes"
	"crypto/sha256"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"

	"panewright/cmd/panewright/internal/table"
	"panewright/glazing/project"
	"panewright/spectra"
)

// spectrumInput is the spectrum of one pane, from the files that were named.
type spectrumInput struct {
	files       []spectrumFile
	from        map[string]string // the file of each key
	columns     spectra.Columns
	front, back spectra.Column // infrared reflectances of their own
	// loose are blocks of which nothing says which is which, for the reason looseness.
	loose     []table.Series
	looseness error
}

// spectrumFile is a file that was read.
type spectrumFile struct {
	table.SpectrumFile
	path   string
	digest [sha256.Size]byte
}

func (f *spectrumFile) understood(format string, args ...any) {
	f.Understood = append(f.Understood, fmt.Sprintf(format, args...))
}

// spectrumKeys are those under which a file may stand, as in a project.
var spectrumKeys = []string{"tau", "rho_front", "rho_back", "infrared_front", "infrared_back"}

// add reads FILE or KEY=FILE.
func (in *spectrumInput) add(arg string, layout *spectra.Layout) error {
	f := spectrumFile{path: arg}
	key := ""
	if before, after, ok := strings.Cut(arg, "="); ok && slices.Contains(spectrumKeys, before) {
		key, f.path = before, after
	} else if _, err := os.Stat(arg); ok && errors.Is(err, fs.ErrNotExist) {
		return fmt.Errorf("unknown key %q in KEY=FILE; %s", short(before), project.OfferAll(before, spectrumKeys))
	}
	f.Name = spectra.Clip(filepath.Base(f.path), 60)
	content, err := project.ReadFile(f.path, spectra.MaxBytes)
	if err != nil {
		return fmt.Errorf("%s: %w", f.path, err)
	}
	f.digest = sha256.Sum256(content)
	switch {
	case spectra.IsJCAMP(content):
		err = in.addBlocks(&f, key, content, layout != nil)
	case layout != nil:
		err = in.addForeign(&f, key, content, *layout)
	default:
		err = in.addCSV(&f, key, content)
	}
	if err != nil {
		return eachLine(err)
	}
	in.files = append(in.files, f)
	return nil
}

func (in *spectrumInput) addCSV(f *spectrumFile, key string, content []byte) error {
	f.Format = "CSV as projects have it"
	c, err := spectra.ReadCSV(bytes.NewReader(content), f.path)
	if err != nil && !bytes.Contains(content, []byte("wavelength_")) {
		return eachLine(err, f.path+": if another program wrote this, say how: --columns wavelength=1,tau=2 and, as need be, --percent, --decimal-comma, --separator, --unit")
	}
	if err != nil {
		return err
	}
	return in.addColumns(f, key, c)
}

func (in *spectrumInput) addForeign(f *spectrumFile, key string, content []byte, l spectra.Layout) error {
	f.Format = "text, read as the options say"
	if key != "" {
		l.Second = faceOf(key)
	}
	c, understood, err := spectra.ReadForeign(bytes.NewReader(content), f.path, l)
	f.Understood = understood
	if err != nil && len(understood) > 0 {
		return eachLine(err, f.path+": understood so far: "+strings.Join(understood, "; "))
	}
	if err != nil {
		return err
	}
	return in.addColumns(f, key, c)
}

// faceOf returns the column of a file that a key asks for.
func faceOf(key string) string { return strings.Replace(key, "infrared_", "rho_", 1) }

// addColumns takes the columns of a file: all, or the one that the key asks for.
func (in *spectrumInput) addColumns(f *spectrumFile, key string, c spectra.Columns) error {
	var has []string
	for _, x := range []struct {
		name   string
		column spectra.Column
	}{{"tau", c.Tau}, {"rho_front", c.RhoFront}, {"rho_back", c.RhoBack}} {
		if x.column.Len() == 0 {
			continue
		}
		has = append(has, x.name)
		if key == "" {
			if err := in.take(f, x.name, x.column); err != nil {
				return err
			}
		} else if x.name == faceOf(key) {
			f.understood("%s is taken from its column %s", key, x.name)
			return in.take(f, key, x.column)
		}
	}
	if key != "" {
		return fmt.Errorf("%s: no column %s for %s; it has %s", f.path, faceOf(key), key, strings.Join(has, ", "))
	}
	return nil
}

// blocksListed is how many blocks of a JCAMP-DX file are shown.
const blocksListed = 8

// addBlocks takes the spectra of a JCAMP-DX file: the one that the key asks for, or one
// transmittance and one reflectance. Others stay loose.
func (in *spectrumInput) addBlocks(f *spectrumFile, key string, content []byte, layout bool) error {
	f.Format = "JCAMP-DX"
	if layout {
		f.Format += ", for which the options of layout mean nothing"
	}
	blocks, err := spectra.ReadJCAMP(bytes.NewReader(content), f.path)
	if err != nil {
		return err
	}
	for i, b := range blocks {
		if i == blocksListed {
			f.understood("and %d spectra more", len(blocks)-i)
			break
		}
		f.understood("spectrum %d, %q: %s, %d points", i+1, spectra.Clip(b.Title, 60), b.Quantity, b.Len())
		f.Understood = append(f.Understood, b.Notes...)
	}
	if key != "" {
		quantity := spectra.Reflectance
		if key == "tau" {
			quantity = spectra.Transmittance
		}
		column, err := spectra.OneOf(blocks, quantity, f.path)
		if err != nil {
			return err
		}
		return in.take(f, key, column)
	}
	for _, q := range []spectra.Quantity{spectra.Transmittance, spectra.Reflectance} {
		if !slices.ContainsFunc(blocks, func(b spectra.Block) bool { return b.Quantity == q }) {
			continue
		}
		if _, err := spectra.OneOf(blocks, q, f.path); err != nil {
			in.looseness = eachLine(err)
			in.loosen(blocks)
			return nil
		}
	}
	for _, b := range blocks {
		key = "tau"
		if b.Quantity == spectra.Reflectance {
			key = "rho_front"
			f.understood("the reflectance is taken as rho_front; for the other face write rho_back=%s", f.Name)
		}
		if err := in.take(f, key, b.Column); err != nil {
			return err
		}
	}
	return nil
}

// loosen shows blocks side by side that cannot be joined.
func (in *spectrumInput) loosen(blocks []spectra.Block) {
	for i, b := range blocks[:min(len(blocks), blocksListed)] {
		role := table.RoleTau
		if b.Quantity == spectra.Reflectance {
			role = table.RoleRhoFront
		}
		name := "spectrum " + strconv.Itoa(i+1)
		in.loose = append(in.loose, table.Series{Name: name, Mark: rune('1' + i), Pane: spectra.Clip(b.Title, 60), Role: role, Column: b.Column})
	}
}

// take puts a column in the place of a key, which no other file may hold.
func (in *spectrumInput) take(f *spectrumFile, key string, c spectra.Column) error {
	if other := in.from[key]; other != "" {
		return fmt.Errorf("%s comes from %s and from %s; name one as KEY=FILE", key, short(other), short(f.path))
	}
	if in.from == nil {
		in.from = map[string]string{}
	}
	in.from[key] = f.path
	*in.place(key) = c
	return nil
}

func (in *spectrumInput) place(key string) *spectra.Column {
	switch key {
	case "tau":
		return &in.columns.Tau
	case "rho_front":
		return &in.columns.RhoFront
	case "rho_back":
		return &in.columns.RhoBack
	case "infrared_front":
		return &in.front
	}
	return &in.back
}

// keep refuses to write over a file that was read.
func (in *spectrumInput) keep(output string) error {
	out, err := os.Stat(output)
	if err != nil {
		return nil // nothing is there
	}
	for _, f := range in.files {
		if info, err := os.Stat(f.path); err == nil && os.SameFile(info, out) {
			return fmt.Errorf("-o %s is a file that is read; name another", short(output))
		}
	}
	return nil
}

// eachLine makes each fault of a spectrum file an error of its own line, after lines that say what
// they rest on.
func eachLine(err error, before ...string) error {
	faults, ok := errors.AsType[spectra.Errors](err)
	if !ok {
		return err
	}
	var list project.Errors
	for _, x := range before {
		list = append(list, errors.New(x))
	}
	for _, x := range faults {
		list = append(list, x)
	}
	return list
}
