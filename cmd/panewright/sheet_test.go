package main

import (
	"bytes"
	"encoding/json"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"

	"panewright/cmd/panewright/internal/demo"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/reference/checks"
)

// demoSheets writes the sheets of the demo, and returns the project and the PDF.
func demoSheets(t *testing.T) (project, pdf string) {
	t.Helper()
	dir := t.TempDir()
	project, err := demo.Write(filepath.Join(dir, "mill"))
	if err != nil {
		t.Fatal(err)
	}
	pdf = filepath.Join(dir, "sheets.pdf")
	printed(t, "sheet", project, "-o", pdf)
	return project, pdf
}

// said runs an outside program and returns what it prints.
func said(t *testing.T, program string, args ...string) string {
	t.Helper()
	out, err := exec.Command(outside(t, program), args...).CombinedOutput()
	if err != nil {
		t.Fatalf("%s %s: %v\n%s", program, strings.Join(args, " "), err, out)
	}
	return string(out)
}

// An outside reader finds each figure of each make-up as the JSON has it, rounded: to one decimal for
// U, to two for fractions and to three for those below 0.05.
func TestSheetReadOutside(t *testing.T) {
	project, pdf := demoSheets(t)
	text := said(t, "pdftotext", "-layout", pdf, "-")
	var doc struct {
		Ratings []struct {
			Makeup, Tint string
			U            float64 `json:"u_w_m2k"`
			Light        struct{ Transmittance float64 }
			Solar        struct {
				G             float64
				Transmittance float64
			}
		}
	}
	if err := json.Unmarshal([]byte(printed(t, "rate", project, "--as", "json")), &doc); err != nil {
		t.Fatal(err)
	}
	fraction := func(v float64) string {
		if v < 0.05 {
			return fmt.Sprintf("%.3f", v)
		}
		return fmt.Sprintf("%.2f", v)
	}
	pages := strings.Split(text, "\f")
	rows := map[string][]string{} // of a make-up: the figures in the rows of its table
	for _, page := range pages {
		for _, x := range doc.Ratings {
			if !regexp.MustCompile(`(?m)^\s*`+x.Makeup+`\s*$`).MatchString(page) || !strings.Contains(page, "Data sheet") || rows[x.Makeup] != nil {
				continue
			}
			rows[x.Makeup] = []string{}
			for _, name := range []string{"light transmittance", "solar direct transmittance", "U-value of the centre of the glass, W/\\(m²·K\\)"} {
				m := regexp.MustCompile(name + `((?: +[0-9.]+)+)`).FindStringSubmatch(page)
				if m == nil {
					t.Fatalf("%s: no row %q in\n%s", x.Makeup, name, page)
				}
				rows[x.Makeup] = append(rows[x.Makeup], strings.Join(strings.Fields(m[1]), " "))
			}
		}
	}
	want := map[string][3][]string{}
	for _, x := range doc.Ratings {
		w := want[x.Makeup]
		for i, s := range []string{fraction(x.Light.Transmittance), fraction(x.Solar.Transmittance), fmt.Sprintf("%.1f", x.U)} {
			w[i] = append(w[i], s)
		}
		want[x.Makeup] = w
	}
	for id, w := range want {
		for i := range w {
			if got := rows[id]; len(got) != 3 || got[i] != strings.Join(w[i], " ") {
				t.Errorf("%s: row %d is read as %q, want %q", id, i+1, got, w[i])
			}
		}
	}
	if strings.Contains(text, "panewright check does that") {
		t.Error("the sheets say that limits were not checked, and check them")
	}
	for _, s := range []string{"Heron Mill, weaving hall and lantern rooms (invented)", "prepared by", "figures.json", "Data sheet, basis en", "not a certified rating"} {
		if !strings.Contains(text, s) {
			t.Errorf("%q is not read", s)
		}
	}
}

// The document says what it is, embeds its fonts, and is well-formed to other programs.
func TestSheetDocument(t *testing.T) {
	_, pdf := demoSheets(t)
	info := said(t, "pdfinfo", pdf)
	for _, want := range []string{
		`Title: +Heron Mill, weaving hall and lantern rooms \(invented\): data sheets`, `Author: +Panewright demo`, `Subject: +Calculated figures, not a certified rating\.`,
		`Producer: +Panewright ` + regexp.QuoteMeta(version), `Page size: +595\.\d+ x 841\.\d+ pts \(A4\)`, `Pages: +14`,
	} {
		if !regexp.MustCompile(`(?m)^` + want + `$`).MatchString(info) {
			t.Errorf("pdfinfo does not say %s:\n%s", want, info)
		}
	}
	fonts := strings.Split(strings.TrimSpace(said(t, "pdffonts", pdf)), "\n")
	if len(fonts) < 4 {
		t.Errorf("the fonts are\n%s", strings.Join(fonts, "\n"))
	}
	embedded := strings.Index(fonts[0], "emb")
	for _, line := range fonts[2:] {
		if !strings.HasPrefix(line[embedded:], "yes") {
			t.Errorf("not embedded: %s", line)
		}
	}
	if text := said(t, "qpdf", "--check", pdf); strings.Contains(text, "WARNING") || !strings.Contains(text, "No syntax or stream encoding errors") {
		t.Errorf("qpdf says %s", text)
	}
}

// What is attached is the JSON of the same ratings, and that of the limits.
func TestSheetAttachments(t *testing.T) {
	path, pdf := demoSheets(t)
	dir := t.TempDir()
	said(t, "pdfdetach", "-saveall", "-o", dir, pdf)
	r, err := rate(path, selection{})
	if err != nil {
		t.Fatal(err)
	}
	limits, err := entered(&r, path, selection{})
	if err != nil {
		t.Fatal(err)
	}
	for name, want := range map[string][]byte{"figures.json": table.JSON(r), "limits.json": table.CheckJSON(*limits)} {
		got, err := os.ReadFile(filepath.Join(dir, name))
		if err != nil || !bytes.Equal(got, want) {
			t.Errorf("%s: error %v; %d bytes, want %d", name, err, len(got), len(want))
		}
	}
	// but for one caution, since the sheets hold the figures against the limits, that is what rate prints
	if !strings.Contains(printed(t, "rate", path, "--as", "json"), `"u_w_m2k": `) || bytes.Contains(table.JSON(r), []byte("limits_not_checked")) {
		t.Error("the caution that limits were not checked is attached")
	}
}

// Each check of verify stands on the paper with its result; one that is missed exits 1, and the file is
// there all the same.
func TestVerificationReadOutside(t *testing.T) {
	groups := checks.Groups()
	groups[1].Checks = slices.Clone(groups[1].Checks)
	groups[1].Checks[3].Want += 1
	missed := groups[1].Checks[3].ID
	file := filepath.Join(t.TempDir(), "verification.pdf")
	err := verify(streams{out: &bytes.Buffer{}}, page{command: "verify", units: "si", formats: []string{"pdf"}, output: file}, "", groups)
	if exitOf(err) != exitFailed {
		t.Fatalf("error %v exits %d, want %d", err, exitOf(err), exitFailed)
	}
	if info, err := os.Stat(file); err != nil || info.Size() == 0 {
		t.Fatalf("no file: %v", err)
	}
	lines := map[string]string{}
	for line := range strings.Lines(said(t, "pdftotext", "-layout", file, "-")) {
		if words := strings.Fields(line); len(words) > 1 {
			lines[words[0]] = words[len(words)-1]
		}
	}
	for _, c := range checks.All() {
		got := lines[c.ID]
		if c.ID == missed && got != "missed" || c.ID != missed && got != "met" && got != "known" {
			t.Errorf("%s is read as %q", c.ID, got)
		}
	}
}

// The file of a make-up has a name that any system can store, and no two have the same.
func TestSheetFileNames(t *testing.T) {
	wide := strings.Repeat("\U00010428", 64) // small letters of four bytes
	var got []string
	for _, id := range []string{"A1", "a1", "a1-2", "con", "CON.east", "nul", "Com1", "com10", "console", "A.", wide, "Ж", "ж"} {
		got = append(got, fileName(id, got, ""))
	}
	want := []string{"A1.pdf", "a1-2.pdf", "a1-2-2.pdf", "_con.pdf", "_CON.east.pdf", "_nul.pdf", "_Com1.pdf", "com10.pdf", "console.pdf", "A..pdf", wide[:200] + ".pdf", "Ж.pdf", "ж-2.pdf"}
	if !slices.Equal(got, want) {
		t.Errorf("names are %q, want %q", got, want)
	}
}

// Sheets are made in every basis that there is.
func TestSheetBases(t *testing.T) {
	project, pdf := demoSheets(t)
	printed(t, "sheet", project, "-o", pdf, "--basis", strings.Join(glazing.BasisNames(), ","))
	text := said(t, "pdftotext", "-layout", pdf, "-")
	for _, name := range glazing.BasisNames() {
		if !strings.Contains(text, "Data sheet, basis "+name) {
			t.Errorf("no sheet under %s", name)
		}
	}
}

// README shows the sheet and the section of the demo as they are made today; .ci/pictures makes them
// anew.
func TestReadmePictures(t *testing.T) {
	const most = 150 << 10
	dir := filepath.Join(moduleRoot(t), "testdata", "pictures")
	text := readme(t)
	pictures := map[string][]byte{}
	for _, name := range []string{"sheet.png", "section.svg"} {
		content, err := os.ReadFile(filepath.Join(dir, name))
		if err != nil {
			t.Fatal(err)
		}
		if len(content) > most {
			t.Errorf("%s has %d bytes, want %d at most", name, len(content), most)
		}
		if !strings.Contains(text, "](testdata/pictures/"+name+")") {
			t.Errorf("README does not show %s", name)
		}
		pictures[name] = content
	}
	if !bytes.HasPrefix(pictures["sheet.png"], []byte("\x89PNG\r\n")) {
		t.Error("sheet.png is no picture")
	}
	project, _ := demoSheets(t)
	if want := printed(t, "section", project, "--makeup", "T1"); want != strings.ReplaceAll(string(pictures["section.svg"]), "\r\n", "\n") {
		t.Error("section.svg is another drawing than the demo's of today; run .ci/pictures")
	}
}
