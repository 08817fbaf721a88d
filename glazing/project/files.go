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
		return errors.New("there is no such file")
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

// fileSet reads each named file once and remembers the order in which the project names them.
type fileSet struct {
	read    source
	content map[string][]byte
	columns map[string]spectra.Columns // by file, and of a JCAMP-DX file by key as well
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
	if content, ok := l.content[t.value]; ok {
		return content, nil
	}
	content, err := l.read(t.value)
	if err == nil {
		l.content[t.value] = content
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
// asks for. A fault of the file is reported once.
func (l *fileSet) spectrum(r *reader, t text, key string) (spectra.Columns, bool) {
	content, err := l.bytesOf(t)
	asked := t.value
	if err == nil && spectra.IsJCAMP(content) {
		asked += "\n" + key
	}
	if c, ok := l.columns[asked]; ok {
		return c, true
	}
	if l.failed[t.value] != nil || l.failed[asked] != nil {
		return spectra.Columns{}, false
	}
	switch {
	case err != nil:
		r.fail(t.at, key, "%s: %v", clip(t.value), err)
	case asked != t.value:
		blocks, read := l.blocks[t.value]
		if !read {
			if blocks, err = spectra.ReadJCAMP(bytes.NewReader(content), t.value); err != nil {
				asked = t.value // of no use for any key
			}
			l.blocks[t.value] = blocks
		}
		var c spectra.Columns
		if err == nil {
			c, err = blockFor(key, blocks, t.value)
		}
		if err == nil {
			l.columns[asked] = c
			return c, true
		}
		r.spectrumFaults(err)
	default:
		var c spectra.Columns
		if c, err = spectra.ReadCSV(bytes.NewReader(content), t.value); err == nil {
			l.columns[asked] = c
			return c, true
		}
		r.spectrumFaults(err)
	}
	l.failed[asked] = err
	return spectra.Columns{}, false
}

// blockFor returns the column of a JCAMP-DX file that a key asks for.
func blockFor(key string, blocks []spectra.Block, file string) (c spectra.Columns, err error) {
	quantity, into := spectra.Reflectance, &c.RhoFront
	switch key {
	case "spectrum":
		return c, spectra.Errors{{File: file, Text: "is JCAMP-DX, which has one quantity a spectrum; name its files by quantity: spectra: {tau: FILE, rho_front: FILE, rho_back: FILE}"}}
	case "tau":
		quantity, into = spectra.Transmittance, &c.Tau
	case "rho_back", "infrared_back":
		into = &c.RhoBack
	}
	*into, err = spectra.OneOf(blocks, quantity, file)
	return c, err
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
