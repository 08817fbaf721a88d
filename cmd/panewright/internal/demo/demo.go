// Package demo holds the demo project, which is invented, and writes it into a folder, where it
// is a user's project like any other.
package demo

import (
	"bytes"
	"embed"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
)

//go:embed files
var embedded embed.FS

// ProjectFile is the name of the project file within the folder.
const ProjectFile = "project.yaml"

// A ChangedError says that a file of the demo stands in the folder with other content, which is
// not overwritten.
type ChangedError struct{ Path string }

func (e *ChangedError) Error() string {
	return fmt.Sprintf("%s is there already and differs from the demo's; it was left alone: name another folder", e.Path)
}

// Write writes the demo into a folder, which is made if need be, and returns the path of the
// project file. Files that stand there unchanged are left; if one was changed, nothing is
// written. What was written is taken away again if a later file fails.
func Write(dir string) (project string, err error) {
	files, err := fs.Sub(embedded, "files")
	if err != nil {
		return "", err
	}
	missing := map[string][]byte{}
	var order []string
	err = fs.WalkDir(files, ".", func(name string, entry fs.DirEntry, err error) error {
		if err != nil || entry.IsDir() {
			return err
		}
		want, err := fs.ReadFile(files, name)
		if err != nil {
			return err
		}
		path := filepath.Join(dir, filepath.FromSlash(name))
		have, err := os.ReadFile(path)
		switch {
		case err == nil && bytes.Equal(have, want):
		case err == nil:
			return &ChangedError{path}
		case errors.Is(err, fs.ErrNotExist):
			missing[name] = want
			order = append(order, name)
		default:
			return err
		}
		return nil
	})
	if err != nil {
		return "", err
	}
	var written []string
	defer func() {
		if err != nil {
			for i := len(written) - 1; i >= 0; i-- {
				os.Remove(written[i])
			}
		}
	}()
	for _, name := range order {
		path := filepath.Join(dir, filepath.FromSlash(name))
		made, err := makeFolders(filepath.Dir(path))
		written = append(written, made...)
		if err != nil {
			return "", err
		}
		written = append(written, path)
		if err := os.WriteFile(path, missing[name], 0o644); err != nil {
			return "", err
		}
	}
	return filepath.Join(dir, ProjectFile), nil
}

// makeFolders makes a folder and its parents and returns those that it made, outermost first.
func makeFolders(dir string) (made []string, err error) {
	for d := dir; ; d = filepath.Dir(d) {
		if _, err := os.Stat(d); err == nil || d == filepath.Dir(d) {
			break
		}
		made = append([]string{d}, made...)
	}
	return made, os.MkdirAll(dir, 0o755)
}
