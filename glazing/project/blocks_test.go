package project

import (
	"crypto/sha256"
	"encoding/hex"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"syscall"
	"testing"

	"panewright/glazing"
)

// linked are the files of the hall with a pane as one file of three spectra, and files of odd names.
func linked() map[string]string {
	files := hallFiles()
	files["link.jdx"] = "##TITLE= a pane\n##DATA TYPE= LINK\n##BLOCKS= 3\n" +
		jcamp("tau", "TRANSMITTANCE", 0.7) + jcamp("front, coated", "REFLECTANCE", 0.2) + jcamp("back", "REFLECTANCE", 0.1) + "##END=\n"
	files["odd#name.jdx"] = jcamp("t", "TRANSMITTANCE", 0.7) + jcamp("a#b", "REFLECTANCE", 0.1)
	files["link.jdx#9"] = jcamp("r", "REFLECTANCE", 0.1)
	return files
}

// One file with all spectra of a pane is named with the number or the title of each.
func TestSpectraOfOneFile(t *testing.T) {
	files := linked()
	one := accept(t, hall, files)
	for _, spec := range []string{
		"{tau: link.jdx, rho_front: link.jdx#2, rho_back: link.jdx#3}",
		"{tau: link.jdx#1, rho_front: 'link.jdx#front, coated', rho_back: link.jdx#BACK}",
		"{tau: odd#name.jdx, rho_front: link.jdx#2, rho_back: odd#name.jdx}",
		"{tau: odd#name.jdx#1, rho_front: link.jdx#2, rho_back: odd#name.jdx#2}",
		"{tau: odd#name.jdx#t, rho_front: link.jdx#2, rho_back: odd#name.jdx#a#b}",
		"{tau: link.jdx, rho_front: link.jdx#2, rho_back: link.jdx#9}", // a file of the whole name comes first
	} {
		if several := accept(t, change(t, "spectrum: a.csv", "spectra: "+spec), files); !sameFigures(t, one, several, glazing.EN) {
			t.Errorf("%s rates otherwise than CSV", spec)
		}
	}
	p := accept(t, change(t, "spectrum: a.csv", "spectra: {tau: link.jdx, rho_front: link.jdx#2, rho_back: link.jdx#3}"), files)
	if i := slices.IndexFunc(p.Panes, func(p *glazing.Pane) bool { return p.ID == "plain-6" }); p.Panes[i].Tints[0].Source != "link.jdx, link.jdx#2, link.jdx#3" {
		t.Errorf("the source is %q", p.Panes[i].Tints[0].Source)
	}
	if !slices.Contains(p.Files, "link.jdx") || slices.Contains(p.Files, "link.jdx#2") {
		t.Errorf("files %q", p.Files)
	}
	// the digest has the file once
	text := "project: x\npanes:\n  - {id: p, thickness_mm: 4, spectra: {tau: link.jdx#1, rho_front: link.jdx#2, rho_back: link.jdx#3}}\n"
	h := sha256.New()
	h.Write([]byte(text + files["link.jdx"]))
	if got, want := accept(t, text, files).Digest, hex.EncodeToString(h.Sum(nil)); got != want {
		t.Error("the digest is not that of the project and the file once")
	}
}

func TestSpectraOfOneFileRefused(t *testing.T) {
	files := linked()
	for spec, words := range map[string]string{
		"spectrum: " + mark + "link.jdx":                                                "spectrum: link.jdx: is JCAMP-DX, which has one quantity a spectrum; name its files by quantity: spectra: {tau: link.jdx#1, rho_front: link.jdx#2, rho_back: link.jdx#3}, if number 2 is that of the front",
		"spectra: {tau: link.jdx, rho_front: " + mark + "link.jdx, rho_back: a.csv}":    `rho_front: link.jdx: holds several spectra of reflectance; write which: link.jdx#2 (reflectance, "front, coated"); link.jdx#3 (reflectance, "back")`,
		"spectra: {tau: " + mark + "link.jdx#2, rho_front: a.csv, rho_back: a.csv}":     "tau: link.jdx: number 2 is a spectrum of reflectance, and one of transmittance is needed",
		"spectra: {tau: " + mark + "link.jdx#4, rho_front: a.csv, rho_back: a.csv}":     "tau: link.jdx: has no spectrum number 4",
		"spectra: {tau: " + mark + "link.jdx#front, rho_front: a.csv, rho_back: a.csv}": `tau: link.jdx: holds no spectrum of transmittance titled "front"`,
		"spectra: {tau: " + mark + "a.csv#1, rho_front: a.csv, rho_back: a.csv}":        "tau: a.csv is no JCAMP-DX, which alone has spectra by number or title; write a.csv",
		"spectrum: " + mark + "a.csv#1":                                                 "spectrum: a.csv is no JCAMP-DX",
		"spectra: {tau: " + mark + "nope.jdx#1, rho_front: a.csv, rho_back: a.csv}":     "tau: nope.jdx#1: ",
		"spectra: {tau: " + mark + "link.jdx#, rho_front: a.csv, rho_back: a.csv}":      "tau: link.jdx#: ",
		"spectra: {tau: " + mark + "'#1', rho_front: a.csv, rho_back: a.csv}":           "tau: #1: ",
	} {
		text, at := marked(change(t, "spectrum: a.csv", spec))
		faults := faultsOf(text, memory(files))
		if len(faults) != 1 {
			t.Errorf("%s: %v, want one fault", spec, faults)
			continue
		}
		if p, ok := errors.AsType[*Problem](faults[0]); !ok || p.Line != at[0].line || p.Column != at[0].column || !strings.Contains(p.Error(), words) {
			t.Errorf("%s: %v, want line %d, column %d, %s", spec, faults, at[0].line, at[0].column, words)
		}
	}
	// a fault of the file is told once, and each of two panes that take other spectra has its own
	files["bad.jdx"] = strings.Replace(files["link.jdx"], "FIRSTY= 0.7", "FIRSTY= 0.6", 1)
	if faults := faultsOf(change(t, "spectrum: a.csv", "spectra: {tau: bad.jdx#1, rho_front: bad.jdx#2, rho_back: bad.jdx#3}"), memory(files)); len(faults) != 1 || !strings.HasPrefix(faults[0].Error(), "bad.jdx:") {
		t.Errorf("%v, want the fault of the file once", faults)
	}
	files["hot.jdx"] = jcamp("t", "TRANSMITTANCE", 0.7) + jcamp("f", "REFLECTANCE", 0.4) + jcamp("r", "REFLECTANCE", 0.5)
	faults := faultsOf("project: x\npanes:\n"+
		"  - {id: a, thickness_mm: 4, spectra: {tau: hot.jdx, rho_front: hot.jdx#2, rho_back: a.csv}}\n"+
		"  - {id: b, thickness_mm: 4, spectra: {tau: hot.jdx, rho_front: hot.jdx#3, rho_back: a.csv}}\n", memory(files))
	if len(faults) != 2 || !strings.Contains(faults[0].Error(), "is 1.1000") || !strings.Contains(faults[1].Error(), "is 1.2000") {
		t.Errorf("%v, want a fault of each pane", faults)
	}
}

// What is written behind a file leads no further than the file itself may lead.
func TestSpectraOfOneFileOutsideTheFolder(t *testing.T) {
	root := t.TempDir()
	inside := filepath.Join(root, "hall")
	files := linked()
	for name, content := range map[string]string{"x.jdx": files["link.jdx"], "x.jdx#1": files["link.jdx"]} {
		if err := os.WriteFile(filepath.Join(root, name), []byte(content), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	files["sub/x.jdx"] = files["link.jdx"]
	write(t, inside, hall, files)
	if err := os.Symlink(filepath.Join("..", "x.jdx"), filepath.Join(inside, "out.jdx")); err != nil {
		t.Skipf("no symbolic links here: %v", err)
	}
	for file, words := range map[string]string{
		"sub/x.jdx#1": "", "sub/x.jdx#tau": "", "sub/../link.jdx#1": "",
		"../x.jdx#1": "leads out of the project's folder", "../x.jdx#tau": "leads out of the project's folder", "sub/../../x.jdx#tau": "leads out of the project's folder",
		"out.jdx#1": "leads out of the project's folder", "link.jdx#/../../x.jdx": "leads out of the project's folder", "sub#1": "is a folder, not a file", "none/x.jdx#1": "there is no such file",
		filepath.ToSlash(filepath.Join(root, "x.jdx")) + "#1": "leads out of the project's folder",
		"link.jdx#" + strings.Repeat("long ", 100):            "holds no spectrum of transmittance titled",
	} {
		path := write(t, inside, change(t, "spectrum: a.csv", "spectra: {tau: '"+file+"', rho_front: a.csv, rho_back: a.csv}"), nil)
		if _, err := Load(path, Access{}); words == "" && err != nil || words != "" && (err == nil || !strings.Contains(err.Error(), words)) {
			t.Errorf("%s: %v, want %q", file, err, words)
		}
	}
	path := write(t, inside, change(t, "spectrum: a.csv", "spectra: {tau: ../x.jdx#tau, rho_front: a.csv, rho_back: a.csv}"), nil)
	if p, err := Load(path, Access{Anywhere: true}); err != nil || !slices.Contains(p.Files, filepath.Join(root, "x.jdx")) {
		t.Errorf("anywhere: %v", err)
	}
}

func TestOpenSpectrum(t *testing.T) {
	var tried []string
	read := func(name string) ([]byte, error) {
		tried = append(tried, name)
		switch {
		case name == "a#b.jdx":
			return []byte("x"), nil
		case name == "locked":
			return nil, errors.New("is locked")
		case len(name) > 100:
			return nil, fmt.Errorf("stat: %w", syscall.ENAMETOOLONG)
		}
		return nil, fs.ErrNotExist
	}
	for _, tt := range []struct{ name, file, which, fault, tried string }{
		{"a#b.jdx", "a#b.jdx", "", "", "a#b.jdx"},
		{"a#b.jdx#c # d", "a#b.jdx", "c # d", "", "a#b.jdx#c # d|a#b.jdx#c |a#b.jdx"},
		{"locked#1", "locked", "1", "is locked", "locked#1|locked"},
		{"locked", "locked", "", "is locked", "locked"},
		{"none", "none", "", fs.ErrNotExist.Error(), "none"},
		{"none#1#2", "none#1#2", "", fs.ErrNotExist.Error(), "none#1#2|none#1|none"},
		{"a#b.jdx# ", "a#b.jdx# ", "", fs.ErrNotExist.Error(), "a#b.jdx# "},
		{"#1", "#1", "", fs.ErrNotExist.Error(), "#1"},
	} {
		tried = nil
		content, file, which, err := OpenSpectrum(tt.name, read)
		if file != tt.file || which != tt.which || (err == nil) != (tt.fault == "") || err != nil && err.Error() != tt.fault || (string(content) == "x") != (err == nil) {
			t.Errorf("%s: %q, %q, %v", tt.name, file, which, err)
		}
		if got := strings.Join(tried, "|"); got != tt.tried {
			t.Errorf("%s: tried %s", tt.name, got)
		}
	}
	if _, file, which, err := OpenSpectrum("a#b.jdx#"+strings.Repeat("m", 200), read); err != nil || file != "a#b.jdx" || len(which) != 200 {
		t.Errorf("a long title: %q, %v", file, err)
	}
}

// What is no map of files is one fault; the columns are not missed as well.
func TestSpectraOfAnotherKind(t *testing.T) {
	for _, spec := range []string{"a.jdx", "[a.csv]", "7", "{}x", "'a.csv'", "!!map {tau: a.csv}"} {
		for _, text := range []string{
			change(t, "spectrum: a.csv", "spectra: "+spec),
			change(t, "{tint: full, spectrum: b.csv}", "{tint: full, spectra: "+spec+"}"),
		} {
			faults := faultsOf(text, memory(hallFiles()))
			if len(faults) != 1 || strings.Contains(faults.Error(), "no column") || strings.HasPrefix(faults[0].Error(), ":") {
				t.Errorf("spectra: %s: %v", spec, faults)
			}
		}
	}
}
