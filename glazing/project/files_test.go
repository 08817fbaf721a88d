package project

import (
	"errors"
	"os"
	"path/filepath"
	"runtime"
	"strings"
	"testing"

	"panewright/spectra"
)

// write makes a folder with a project and its files and returns the project's path.
func write(t *testing.T, dir, text string, files map[string]string) string {
	t.Helper()
	for name, content := range files {
		path := filepath.Join(dir, name)
		if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
			t.Fatal(err)
		}
		if err := os.WriteFile(path, []byte(content), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	path := filepath.Join(dir, "p.yaml")
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
	return path
}

func TestFilesOutsideTheFolder(t *testing.T) {
	root := t.TempDir()
	inside := filepath.Join(root, "hall")
	if err := os.WriteFile(filepath.Join(root, "x.csv"), []byte(hallFiles()["a.csv"]), 0o644); err != nil {
		t.Fatal(err)
	}
	files := hallFiles()
	files["sub/x.csv"] = files["a.csv"]
	write(t, inside, hall, files)
	link := func(target, name string) {
		if err := os.Symlink(target, filepath.Join(inside, name)); err != nil {
			t.Skipf("no symbolic links here: %v", err)
		}
	}
	link(filepath.Join("..", "x.csv"), "out.csv")
	link("..", "up")
	link(filepath.Join("sub", "x.csv"), "in.csv")
	for _, tt := range []struct {
		name, file string
		words      []string // of the refusal; empty where it is read
	}{
		{"in the folder", "sub/x.csv", nil},
		{"up and down again", "sub/../sub/x.csv", nil},
		{"link within", "in.csv", nil},
		{"above", "../x.csv", []string{"leads out of the project's folder", "--files-anywhere"}},
		{"above by a detour", "sub/../../x.csv", []string{"leads out of the project's folder", "--files-anywhere"}},
		{"absolute", filepath.ToSlash(filepath.Join(root, "x.csv")), []string{"leads out of the project's folder", "--files-anywhere"}},
		{"link leading out", "out.csv", []string{"leads out of the project's folder", "--files-anywhere"}},
		{"folder leading out", "up/x.csv", []string{"leads out of the project's folder", "--files-anywhere"}},
	} {
		t.Run(tt.name, func(t *testing.T) {
			text, at := marked(change(t, "spectrum: a.csv", "spectrum: "+mark+"'"+tt.file+"'"))
			path := write(t, inside, text, nil)
			_, err := Load(path, Access{})
			if tt.words == nil {
				if err != nil {
					t.Error(err)
				}
			} else if faults, ok := errors.AsType[Errors](err); !ok || len(faults) != 1 {
				t.Errorf("%v: want one fault", err)
			} else {
				p, ok := errors.AsType[*Problem](faults[0])
				if !ok || p.File != path || p.Line != at[0].line || p.Column != at[0].column || p.Key != "spectrum" {
					t.Errorf("%v: want line %d, column %d, key spectrum", faults, at[0].line, at[0].column)
				}
				for _, w := range tt.words {
					if !strings.Contains(faults.Error(), w) {
						t.Errorf("%v: lacks %q", faults, w)
					}
				}
			}
			if _, err := Load(path, Access{Anywhere: true}); err != nil {
				t.Errorf("anywhere: %v", err)
			}
		})
	}
}

func TestFilesThatCannotBeRead(t *testing.T) {
	dir := t.TempDir()
	files := hallFiles()
	files["sub/x.csv"] = files["a.csv"]
	write(t, dir, hall, files)
	if err := os.WriteFile(filepath.Join(dir, "locked.csv"), []byte(files["a.csv"]), 0o000); err != nil {
		t.Fatal(err)
	}
	large, err := os.Create(filepath.Join(dir, "large.csv"))
	if err != nil {
		t.Fatal(err)
	}
	if err := errors.Join(large.Truncate(spectra.MaxBytes+1), large.Close()); err != nil {
		t.Fatal(err)
	}
	for _, tt := range []struct {
		name, file, words string
		skip              bool
	}{
		{"folder", "sub", "is a folder, not a file", false},
		{"the folder itself", ".", "is a folder, not a file", false},
		{"missing", "none.csv", "no such file", false},
		{"missing in a folder that is missing", "none/x.csv", "no such file", false},
		{"a file as a folder", "a.csv/x.csv", "a.csv/x.csv", runtime.GOOS == "windows"},
		{"not permitted", "locked.csv", "permission denied", runtime.GOOS == "windows" || os.Getuid() == 0},
		{"too large", "large.csv", "larger than 64 MB", false},
	} {
		t.Run(tt.name, func(t *testing.T) {
			if tt.skip {
				t.Skip("this user or system may read it")
			}
			text, at := marked(change(t, "spectrum: a.csv", "spectrum: "+mark+tt.file))
			path := write(t, dir, text, nil)
			for _, a := range []Access{{}, {Anywhere: true}} {
				_, err := Load(path, a)
				p, ok := errors.AsType[*Problem](err)
				if !ok || p.Line != at[0].line || p.Column != at[0].column || p.Key != "spectrum" || !strings.Contains(p.Text, tt.words) {
					t.Errorf("%+v: got %v, want %q", a, err, tt.words)
				} else if strings.Contains(p.Text, dir) || strings.Contains(p.Text, "openat") {
					t.Errorf("%+v: %v tells of the machine's own affairs", a, err)
				}
			}
		})
	}
}

func TestProjectFileThatCannotBeRead(t *testing.T) {
	dir := t.TempDir()
	path := write(t, dir, hall, hallFiles())
	for name, words := range map[string]string{
		dir:                               "is a folder; name the project file in it, such as " + path,
		filepath.Join(dir, "none.yaml"):   "there is no such file",
		filepath.Join(dir, "p.yaml", "x"): filepath.Join(dir, "p.yaml", "x"),
	} {
		_, err := Load(name, Access{})
		if p, ok := errors.AsType[*Problem](err); !ok || p.File != name || !strings.Contains(p.Error(), words) {
			t.Errorf("%s: got %v, want %q", name, err, words)
		}
	}
	if p, err := Load(path, Access{}); err != nil || p.File != path {
		t.Errorf("%v, %v", p, err)
	}
}
