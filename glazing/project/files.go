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

// readRegular reads an open file that must be a regular one of at most limit bytes.
func readRegular(f *os.File, limit int64) ([]byte, error) {
	info, err := f.Stat()
	switch {
	case err != nil:
		return nil, reason(err)
	case info.IsDir():
		return nil, errors.New("is a folder, not a file")
	case !info.Mode().IsRegular():
		return nil, errors.New("is not a regular file")
	case info.Size() > limit:
		return nil, fmt.Errorf("is larger than %d MB", limit>>20)
	}
	content, err := io.ReadAll(io.LimitReader(f, limit+1))
	if err != nil {
		return nil, reason(err)
	}
	return content, nil
}

// reason strips the operation and the path off an error of the file system, for both are said
// already.
func reason(err error) error {
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return errors.New("there is no such file")
	case errors.Is(err, fs.ErrPermission):
		return errors.New("may not be read (permission denied)")
	}
	if pe, ok := errors.AsType[*fs.PathError](err); ok {
		return pe.Err
	}
	return err
}

// readProjectFile reads the project file itself.
func readProjectFile(path string) ([]byte, error) {
	if info, err := os.Stat(path); err == nil && !info.Mode().IsRegular() {
		if info.IsDir() {
			text := "is a folder; name the project file in it"
			found, _ := filepath.Glob(filepath.Join(path, "*.y*ml"))
			if len(found) > 0 {
				text += ", such as " + found[0]
			}
			return nil, errors.New(text)
		}
		return nil, errors.New("is not a regular file")
	}
	f, err := os.Open(path)
	if err != nil {
		return nil, reason(err)
	}
	defer f.Close()
	return readRegular(f, maxProjectBytes)
}

// folder returns the files of a folder as a source, and a function to call when no more is read.
// Without anywhere, a name may not lead out of the folder, not by a symbolic link either.
func folder(dir string, anywhere bool) (from source, done func()) {
	if anywhere {
		return func(name string) ([]byte, error) {
			path := filepath.FromSlash(name)
			if !filepath.IsAbs(path) {
				path = filepath.Join(dir, path)
			}
			if info, err := os.Stat(path); err == nil && !info.Mode().IsRegular() && !info.IsDir() {
				return nil, errors.New("is not a regular file") // opening a pipe would wait
			}
			f, err := os.Open(path)
			if err != nil {
				return nil, reason(err)
			}
			defer f.Close()
			return readRegular(f, spectra.MaxBytes)
		}, func() {}
	}
	var root *os.Root
	var rootErr error
	done = func() {
		if root != nil {
			root.Close()
		}
	}
	return func(name string) ([]byte, error) {
		path := filepath.FromSlash(name)
		if !filepath.IsLocal(path) {
			return nil, errors.New("leads out of the project's folder; copy the file there, or allow it with --files-anywhere")
		}
		if root == nil && rootErr == nil {
			root, rootErr = os.OpenRoot(dir)
		}
		if rootErr != nil {
			return nil, reason(rootErr)
		}
		info, err := root.Stat(path)
		switch {
		case errors.Is(err, fs.ErrNotExist):
			return nil, errors.New("there is no such file in the project's folder")
		case err != nil && !errors.Is(err, fs.ErrPermission):
			if strings.Contains(err.Error(), "escapes") {
				return nil, errors.New("is a link that leads out of the project's folder; copy the file there, or allow it with --files-anywhere")
			}
			return nil, reason(err)
		case err == nil && !info.Mode().IsRegular() && !info.IsDir():
			return nil, errors.New("is not a regular file") // opening a pipe would wait
		}
		f, err := root.Open(path)
		if err != nil {
			return nil, reason(err)
		}
		defer f.Close()
		return readRegular(f, spectra.MaxBytes)
	}, done
}

// fileSet reads each named file once and remembers the order in which the project names them.
type fileSet struct {
	read    source
	content map[string][]byte
	columns map[string]spectra.Columns
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

// spectrum reads the columns of a spectrum file, once. A fault of the file is reported once.
func (l *fileSet) spectrum(r *reader, t text, key string) (spectra.Columns, bool) {
	content, err := l.bytesOf(t)
	if c, ok := l.columns[t.value]; ok {
		return c, true
	}
	if l.failed[t.value] != nil {
		return spectra.Columns{}, false
	}
	if err == nil {
		var c spectra.Columns
		if c, err = spectra.ReadCSV(bytes.NewReader(content), t.value); err == nil {
			l.columns[t.value] = c
			return c, true
		}
		r.spectrumFaults(err)
	} else {
		r.fail(t.at, key, "%s: %v", clip(t.value), err)
	}
	l.failed[t.value] = err
	return spectra.Columns{}, false
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
