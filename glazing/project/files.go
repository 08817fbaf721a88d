package project

// The files of a project: where they may stand, how they are read once, the digest over them.

import (
	"bytes"
	"crypto/sha256"
	"encoding/hex"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"syscall"

	"panewright/spectra"
)

// A source gives the content of a file that a project names.
type source func(name string) ([]byte, error)

// filePlace is where files may be looked at and opened: a folder, or the whole file system.
type filePlace interface {
	Stat(name string) (fs.FileInfo, error)
	Open(name string) (*os.File, error)
}

// anywhere is the whole file system; *os.Root is a folder.
type anywhere struct{}

func (anywhere) Stat(name string) (fs.FileInfo, error) { return os.Stat(name) }
func (anywhere) Open(name string) (*os.File, error)    { return os.Open(name) }

// ReadFile reads a regular file of at most limit bytes, from anywhere. An error says what is wrong
// with it, without its name.
func ReadFile(path string, limit int64) ([]byte, error) { return readFile(anywhere{}, path, limit) }

// readFile reads a regular file of at most limit bytes. It is looked at before it is opened, for
// opening a pipe would wait.
func readFile(in filePlace, path string, limit int64) ([]byte, error) {
	info, err := in.Stat(path)
	switch {
	case err != nil:
		return nil, reason(err)
	case info.IsDir():
		return nil, errFolder
	case !info.Mode().IsRegular():
		return nil, errors.New("is not a regular file")
	case info.Size() > limit:
		return nil, fmt.Errorf("is larger than %d MB", limit>>20)
	}
	f, err := in.Open(path)
	if err != nil {
		return nil, reason(err)
	}
	defer f.Close()
	var content bytes.Buffer
	content.Grow(int(info.Size()) + bytes.MinRead) // so that it need not grow again
	if _, err := content.ReadFrom(io.LimitReader(f, limit+1)); err != nil {
		return nil, reason(err)
	}
	return content.Bytes(), nil
}

var errFolder = errors.New("is a folder, not a file")

// missingFile is the error of a file that is not there.
type missingFile struct{}

func (missingFile) Error() string        { return "there is no such file" }
func (missingFile) Is(target error) bool { return target == fs.ErrNotExist }

const (
	copyIt     = "; copy the file there, or allow it with --files-anywhere"
	leadsOut   = "leads out of the project's folder" + copyIt
	linkingOut = "is a link that leads out of the project's folder" + copyIt
)

// reason strips the operation and the path off an error of the file system, for both are said
// already.
func reason(err error) error {
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return missingFile{}
	case errors.Is(err, fs.ErrPermission):
		return errors.New("may not be read (permission denied)")
	case strings.Contains(err.Error(), "escapes"): // what os.Root says
		return errors.New(linkingOut)
	}
	if pe, ok := errors.AsType[*fs.PathError](err); ok {
		return pe.Err
	}
	return err
}

// readProjectFile reads the project file itself.
func readProjectFile(path string) ([]byte, error) {
	content, err := readFile(anywhere{}, path, maxProjectBytes)
	if err == errFolder {
		text := "is a folder; name the project file in it"
		if found, _ := filepath.Glob(filepath.Join(path, "*.y*ml")); len(found) > 0 {
			text += ", such as " + found[0]
		}
		return nil, errors.New(text)
	}
	return content, err
}

// folder returns the files of a folder as a source, and a function to call when no more is read.
// Unless free, a name may not lead out of the folder, not by a symbolic link either.
func folder(dir string, free bool) (from source, done func()) {
	if free {
		return func(name string) ([]byte, error) {
			path := filepath.FromSlash(name)
			if !filepath.IsAbs(path) {
				path = filepath.Join(dir, path)
			}
			return readFile(anywhere{}, path, spectra.MaxBytes)
		}, func() {}
	}
	root, err := os.OpenRoot(dir)
	if err != nil {
		return func(string) ([]byte, error) { return nil, reason(err) }, func() {}
	}
	return func(name string) ([]byte, error) {
		path := filepath.FromSlash(name)
		if !filepath.IsLocal(path) {
			return nil, errors.New(leadsOut)
		}
		return readFile(root, path, spectra.MaxBytes)
	}, func() { root.Close() }
}

// OpenSpectrum reads a file of spectra that is named as FILE, or with one of its spectra as FILE#N or
// FILE#TITLE. A file of the whole name comes first, then that of the longest part before a #. It
// returns the name of the file, and the number or title, "" where none is named; an error of read is
// about the file that is returned.
func OpenSpectrum(name string, read func(file string) ([]byte, error)) (content []byte, file, which string, err error) {
	content, whole := read(name)
	file, err = name, whole
	for err != nil && (errors.Is(err, fs.ErrNotExist) || errors.Is(err, syscall.ENAMETOOLONG)) { // a title may be long
		i := strings.LastIndex(file, spectra.BlockSign)
		if i <= 0 || strings.TrimSpace(name[i+1:]) == "" {
			return nil, name, "", whole
		}
		file, which = name[:i], strings.TrimSpace(name[i+1:])
		content, err = read(file)
	}
	return content, file, which, err
}

// fileSet reads each named file once and remembers the order in which the project names them.
type fileSet struct {
	read    source
	content map[string][]byte
	columns map[string]spectra.Columns // by file, and of a JCAMP-DX file by key and spectrum as well
	blocks  map[string][]spectra.Block
	failed  map[string]error
	named   []named
}

type named struct {
	at   position
	name string
}

func (l *fileSet) bytesOf(t text) ([]byte, error) {
	l.named = append(l.named, named{t.at, t.value})
	return l.once(t.value)
}

// once reads a file unless it was read before.
func (l *fileSet) once(name string) ([]byte, error) {
	if content, ok := l.content[name]; ok {
		return content, nil
	}
	content, err := l.read(name)
	if err == nil {
		l.content[name] = content
	}
	return content, err
}

// digest is the SHA-256 of the project file's bytes and then those of each file read, each once,
// in the order in which the project names them.
func (l *fileSet) digest(project []byte) string {
	h := sha256.New()
	h.Write(project)
	slices.SortStableFunc(l.named, func(a, b named) int {
		if a.at.line != b.at.line {
			return a.at.line - b.at.line
		}
		return a.at.column - b.at.column
	})
	seen := map[string]bool{}
	for _, n := range l.named {
		if !seen[n.name] {
			h.Write(l.content[n.name])
		}
		seen[n.name] = true
	}
	return hex.EncodeToString(h.Sum(nil))
}

// spectrum reads the columns of a spectrum file, once. Of a JCAMP-DX file it is the one that the key
// asks for, or the one named behind the file. A fault of the file is reported once.
func (l *fileSet) spectrum(r *reader, t text, key string) (spectra.Columns, bool) {
	content, file, which, err := OpenSpectrum(t.value, l.once)
	l.named = append(l.named, named{t.at, file})
	asked := file
	jcamp := err == nil && spectra.IsJCAMP(content)
	if err == nil && (jcamp || which != "") {
		asked += "\n" + key + "\n" + which
	}
	if c, ok := l.columns[asked]; ok {
		return c, true
	}
	if l.failed[file] != nil || l.failed[asked] != nil {
		return spectra.Columns{}, false
	}
	var c spectra.Columns
	switch {
	case err != nil:
		r.fail(t.at, key, "%s: %v", clip(file), err)
	case which != "" && !jcamp:
		err = fmt.Errorf("%s is no JCAMP-DX, which alone has spectra by number or title; write %s", clip(file), clip(file))
		r.fail(t.at, key, "%v", err)
	case jcamp:
		blocks, read := l.blocks[file]
		if !read {
			if blocks, err = spectra.ReadJCAMP(bytes.NewReader(content), file); err != nil {
				asked = file // of no use for any key
				r.spectrumFaults(err)
				break
			}
			l.blocks[file] = blocks
		}
		if c, err = blockFor(key, blocks, file, which); err != nil {
			r.fail(t.at, key, "%v", err)
		}
	default:
		if c, err = spectra.ReadCSV(bytes.NewReader(content), file); err != nil {
			r.spectrumFaults(err)
		}
	}
	if err != nil {
		l.failed[asked] = err
		return spectra.Columns{}, false
	}
	l.columns[asked] = c
	return c, true
}

// blockFor returns the column of a JCAMP-DX file that a key asks for.
func blockFor(key string, blocks []spectra.Block, file, which string) (c spectra.Columns, err error) {
	quantity, into := spectra.Reflectance, &c.RhoFront
	switch key {
	case "spectrum":
		return c, spectra.Errors{{File: file, Text: "is JCAMP-DX, which has one quantity a spectrum; name its files by quantity: " + byQuantity(blocks, file)}}
	case "tau":
		quantity, into = spectra.Transmittance, &c.Tau
	case "rho_back", "infrared_back":
		into = &c.RhoBack
	}
	b, err := spectra.OneOf(blocks, quantity, file, which)
	*into = b.Column
	return c, err
}

// byQuantity says how a project names the spectra of a JCAMP-DX file; where it has all of one pane, by
// its own name.
func byQuantity(blocks []spectra.Block, file string) string {
	var tau, rho []string
	for i, b := range blocks {
		list := &rho
		if b.Quantity == spectra.Transmittance {
			list = &tau
		}
		*list = append(*list, spectra.BlockName(file, i+1))
	}
	if len(tau) != 1 || len(rho) != 2 {
		return "spectra: {tau: FILE, rho_front: FILE, rho_back: FILE}"
	}
	return fmt.Sprintf("spectra: {tau: %s, rho_front: %s, rho_back: %s}, if number %s is that of the front",
		tau[0], rho[0], rho[1], strings.TrimPrefix(rho[0], file+spectra.BlockSign))
}

// spectrumFaults takes over the faults of a spectrum file, which name their own place.
func (r *reader) spectrumFaults(err error) {
	faults, ok := errors.AsType[spectra.Errors](err)
	if !ok {
		r.faults = append(r.faults, err)
		return
	}
	for _, f := range faults {
		r.faults = append(r.faults, f)
	}
}
