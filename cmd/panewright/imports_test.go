package main

import (
	"go/parser"
	"go/token"
	"io/fs"
	"os"
	"os/exec"
	"path"
	"path/filepath"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"testing"

	"panewright/reference"
)

const module = "panewright/"

// mayImport holds, for each package of ours, the packages of ours that its non-test
// files may name. Packages under cmd are not listed: they may use everything, and no
// row below names one of them.
var mayImport = map[string][]string{
	"reference":        {},
	"reference/checks": {},
	"spectra":          {"reference"},
	"spectra/colour":   {"spectra", "reference"},
	"thermal":          {"reference"},
	"glazing/optics":   {},
	"glazing/film":     {"spectra", "reference"},
	"glazing":          {"glazing/optics", "glazing/film", "spectra", "spectra/colour", "thermal", "reference"},
	"glazing/library":  {"glazing", "glazing/film", "reference"},
	"glazing/project":  {"glazing", "glazing/library", "glazing/film", "spectra", "reference"},
	"glazing/limits":   {"glazing"},
	"glazing/tint":     {"glazing"},
	"glazing/study":    {"glazing"},
	"glazing/proof": {
		"reference", "reference/checks", "spectra", "spectra/colour", "thermal",
		"glazing", "glazing/optics", "glazing/film", "glazing/library", "glazing/project",
		"glazing/limits", "glazing/tint", "glazing/study",
	},
}

// TestImports holds the direction of dependence. It reads every Go file, whatever its
// build constraints, and also sees to it that none stands in a testdata folder.
func TestImports(t *testing.T) {
	root := moduleRoot(t)
	err := filepath.WalkDir(root, func(file string, d fs.DirEntry, err error) error {
		if err != nil {
			return err
		}
		if d.IsDir() && file != root && strings.HasPrefix(d.Name(), ".") {
			return fs.SkipDir
		}
		if d.IsDir() || path.Ext(d.Name()) != ".go" {
			return nil
		}
		rel, err := filepath.Rel(root, file)
		if err != nil {
			return err
		}
		rel = filepath.ToSlash(rel)
		pkg := path.Dir(rel)
		if slices.Contains(strings.Split(pkg, "/"), "testdata") {
			t.Errorf("%s: a Go file may not stand in a testdata folder", rel)
			return nil
		}
		if strings.HasPrefix(pkg, "cmd/") || strings.HasSuffix(rel, "_test.go") {
			return nil
		}
		allowed, listed := mayImport[pkg]
		if !listed {
			t.Errorf("%s: package %s is not in the import table; add it to mayImport", rel, pkg)
			return nil
		}
		parsed, err := parser.ParseFile(token.NewFileSet(), file, nil, parser.ImportsOnly)
		if err != nil {
			return err
		}
		for _, spec := range parsed.Imports {
			name, err := strconv.Unquote(spec.Path.Value)
			if err != nil {
				return err
			}
			if ours, ok := strings.CutPrefix(name, module); ok && !slices.Contains(allowed, ours) {
				t.Errorf("%s: %s may not import %s; it may import %q", rel, pkg, ours, allowed)
			}
		}
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
}

// TestTopLevel keeps the top of the repository short. What .gitignore leaves out of
// the repository may lie there too.
func TestTopLevel(t *testing.T) {
	allowed := []string{
		"cmd", "glazing", "spectra", "thermal", "reference", "testdata",
		"go.mod", "go.sum", "README.md", "DEVELOPERS.md",
		".ci", ".git", ".gitattributes", ".gitignore",
	}
	root := moduleRoot(t)
	ignore, err := os.ReadFile(filepath.Join(root, ".gitignore"))
	if err != nil {
		t.Fatal(err)
	}
	for _, pattern := range strings.Fields(string(ignore)) {
		allowed = append(allowed, strings.Trim(pattern, "/"))
	}
	entries, err := os.ReadDir(root)
	if err != nil {
		t.Fatal(err)
	}
	for _, e := range entries {
		if !slices.ContainsFunc(allowed, func(pattern string) bool {
			ok, err := path.Match(pattern, e.Name())
			return ok && err == nil
		}) {
			t.Errorf("%s does not belong at the top level of the repository", e.Name())
		}
	}
}

// TestNoticesNameEveryModule holds the notices against the modules that the program is built from.
func TestNoticesNameEveryModule(t *testing.T) {
	out, err := exec.Command("go", "list", "-deps", "-f", "{{with .Module}}{{if not .Main}}{{.Path}}{{end}}{{end}}", ".").Output()
	if err != nil {
		t.Fatal(err)
	}
	notices := reference.Notices()
	for _, path := range slices.Compact(slices.Sorted(strings.FieldsSeq(string(out)))) {
		if !regexp.MustCompile(`(?m)^\|.*\b` + regexp.QuoteMeta(path) + `( |,)`).MatchString(notices) {
			t.Errorf("reference/NOTICES.md does not name %s", path)
		}
	}
}

// moduleRoot returns the nearest folder upwards that holds a go.mod.
func moduleRoot(t *testing.T) string {
	t.Helper()
	dir, err := os.Getwd()
	if err != nil {
		t.Fatal(err)
	}
	for {
		if _, err := os.Stat(filepath.Join(dir, "go.mod")); err == nil {
			return dir
		}
		if dir == filepath.Dir(dir) {
			t.Fatal("no go.mod in this folder or above it")
		}
		dir = filepath.Dir(dir)
	}
}
