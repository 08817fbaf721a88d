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
	path     string
	which    string // of its spectra is meant; "" where none is named
	digest   [sha256.Size]byte
	comments []string // of its own
}

// written is how the user names the file, and the spectrum in it.
func (f *spectrumFile) written() string {
	if f.which != "" {
		return f.path + spectra.BlockSign + f.which
	}
	return f.path
}

func (f *spectrumFile) understood(format string, args ...any) {
	f.Understood = append(f.Understood, fmt.Sprintf(format, args...))
}

// spectrumKeys are those under which a file may stand, as in a project.
var spectrumKeys = []string{"tau", "rho_front", "rho_back", "infrared_front", "infrared_back"}

// add reads FILE or KEY=FILE; a file may have the number or title of a spectrum behind a #.
func (in *spectrumInput) add(arg string, layout *spectra.Layout) error {
	var f spectrumFile
	name, key := arg, ""
	before, after, keyed := strings.Cut(arg, "=")
	if keyed && slices.Contains(spectrumKeys, before) {
		if key, name = before, after; name == "" {
			return fmt.Errorf("%s= needs a file, such as %s=scan.txt", key, key)
		}
	}
	read := func(path string) ([]byte, error) { return project.ReadFile(path, spectra.MaxBytes) }
	content, path, which, err := project.OpenSpectrum(name, read)
	switch {
	case err != nil && keyed && key == "" && errors.Is(err, fs.ErrNotExist):
		return fmt.Errorf("unknown key %q in KEY=FILE; %s", short(before), project.OfferAll(before, spectrumKeys))
	case err != nil:
		return fmt.Errorf("%s: %w", path, err)
	}
	f.path, f.which, f.digest = path, which, sha256.Sum256(content)
	f.Name = spectra.Clip(filepath.Base(path), 60)
	switch {
	case spectra.IsJCAMP(content):
		err = in.addBlocks(&f, key, content, layout != nil)
	case which != "":
		err = fmt.Errorf("%s is no JCAMP-DX, which alone has spectra by number or title; write %s", short(path), short(path))
	case layout != nil:
		err = in.addForeign(&f, key, content, *layout)
	default:
		err = in.addCSV(&f, key, content)
	}
	if err != nil {
		return eachLine(err)
	}
	for i := range in.files {
		if x := &in.files[i]; x.path == f.path && x.digest == f.digest && x.Format == f.Format {
			x.Understood = append(x.Understood, f.Understood...)
			x.keep(f.comments)
			return nil
		}
	}
	in.files = append(in.files, f)
	return nil
}

// commentsKept is how many comments of one file are kept.
const commentsKept = 20

// keep keeps comments, each once.
func (f *spectrumFile) keep(comments []string) {
	for _, x := range comments {
		if !slices.Contains(f.comments, x) && len(f.comments) < commentsKept {
			f.comments = append(f.comments, x)
		}
	}
}

func (in *spectrumInput) addCSV(f *spectrumFile, key string, content []byte) error {
	f.Format = "CSV as projects have it"
	c, err := spectra.ReadCSV(bytes.NewReader(content), f.path)
	if otherLayout(err, content) {
		return eachLine(err, f.path+": if another program wrote this, say how: --columns wavelength=1,tau=2 and, as need be, --percent, --decimal-comma, --separator, --unit")
	}
	if err != nil {
		return err
	}
	f.comments = c.Comments
	return in.addColumns(f, key, c)
}

// otherLayout reports whether a file that cannot be read as our CSV may be one of another layout: not
// what is no text, nor where the fault names the way itself.
func otherLayout(err error, content []byte) bool {
	faults, ok := errors.AsType[spectra.Errors](err)
	if !ok || faults[0].Line == 0 || strings.Contains(faults[0].Text, "panewright spectrum") {
		return false
	}
	return !bytes.Contains(content, []byte("wavelength_")) || slices.ContainsFunc(faults, func(x *spectra.RowError) bool {
		return strings.Contains(x.Text, "decimal comma") || strings.Contains(x.Text, "percent")
	})
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
	f.comments = c.Comments
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

// addBlocks takes the spectra of a JCAMP-DX file: the one that is named or that the key asks for, or
// one transmittance and one reflectance. Others stay loose.
func (in *spectrumInput) addBlocks(f *spectrumFile, key string, content []byte, layout bool) error {
	f.Format = "JCAMP-DX"
	if layout {
		f.Format += ", for which the options of layout mean nothing"
	}
	blocks, err := spectra.ReadJCAMP(bytes.NewReader(content), f.path)
	if err != nil {
		return err
	}
	var quantity spectra.Quantity
	switch key {
	case "":
	case "tau":
		quantity = spectra.Transmittance
	default:
		quantity = spectra.Reflectance
	}
	if key != "" || f.which != "" {
		b, err := spectra.OneOf(blocks, quantity, f.path, f.which)
		if err != nil {
			return err
		}
		f.tell(blocks, slices.IndexFunc(blocks, func(x spectra.Block) bool { return x.Line[0] == b.Line[0] }))
		return in.takeBlock(f, key, b)
	}
	for i := range blocks[:min(len(blocks), blocksListed)] {
		f.tell(blocks, i)
	}
	if n := len(blocks) - blocksListed; n > 0 {
		f.understood("and %d spectra more", n)
	}
	for _, q := range []spectra.Quantity{spectra.Transmittance, spectra.Reflectance} {
		if !slices.ContainsFunc(blocks, func(b spectra.Block) bool { return b.Quantity == q }) {
			continue
		}
		if _, err := spectra.OneOf(blocks, q, f.path, ""); err != nil {
			in.looseness = project.Errors{fmt.Errorf("%w%s", err, f.asPane(blocks))}
			in.loosen(f, blocks)
			return nil
		}
	}
	for _, b := range blocks {
		if err := in.takeBlock(f, "", b); err != nil {
			return err
		}
	}
	return nil
}

// tell says of a spectrum of a JCAMP-DX file how it is named, what it holds and what was understood.
func (f *spectrumFile) tell(blocks []spectra.Block, i int) {
	b := blocks[i]
	name := f.Name
	if len(blocks) > 1 {
		name = spectra.BlockName(f.Name, i+1)
	}
	f.understood("%s, %q: %s, %d points", name, spectra.Clip(b.Title, 60), b.Quantity, b.Len())
	f.Understood = append(f.Understood, b.Notes...)
	f.keep(b.Comments)
}

// asPane says, for the end of a message, how spectra of a file are joined to one pane, such as the first
// transmittance and the first two reflectances.
func (f *spectrumFile) asPane(blocks []spectra.Block) string {
	keys := map[spectra.Quantity][]string{spectra.Transmittance: {"tau"}, spectra.Reflectance: {"rho_front", "rho_back"}}
	out := ", as in"
	for i, b := range blocks {
		if k := keys[b.Quantity]; len(k) > 0 {
			out += " " + k[0] + "=" + spectra.BlockName(f.path, i+1)
			keys[b.Quantity] = k[1:]
		}
	}
	return out
}

// loosen shows spectra side by side that cannot be joined.
func (in *spectrumInput) loosen(f *spectrumFile, blocks []spectra.Block) {
	for i, b := range blocks[:min(len(blocks), blocksListed)] {
		role := table.RoleTau
		if b.Quantity == spectra.Reflectance {
			role = table.RoleReflectance
		}
		in.loose = append(in.loose, table.Series{Name: spectra.BlockName("", i+1) + " " + spectra.Clip(b.Title, 18), Mark: rune('1' + i),
			Pane: spectra.Clip(b.Title, 60), Role: role, Column: b.Column})
	}
}

// takeBlock takes a spectrum of a JCAMP-DX file; without a key a reflectance is that of the front.
func (in *spectrumInput) takeBlock(f *spectrumFile, key string, b spectra.Block) error {
	switch {
	case key == "" && b.Quantity == spectra.Reflectance:
		key = "rho_front"
		f.understood("the reflectance is taken as rho_front; for the other face write rho_back=%s", f.written())
	case key == "":
		key = "tau"
	}
	return in.take(f, key, b.Column)
}

// take puts a column in the place of a key, which no other file may hold.
func (in *spectrumInput) take(f *spectrumFile, key string, c spectra.Column) error {
	if other := in.from[key]; other != "" {
		return fmt.Errorf("%s comes from %s and from %s; name one as KEY=FILE", key, short(other), short(f.written()))
	}
	if in.from == nil {
		in.from = map[string]string{}
	}
	in.from[key] = f.written()
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
