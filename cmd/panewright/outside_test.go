package main

import (
	"bytes"
	"encoding/json"
	"os"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"panewright/cmd/panewright/internal/demo"
)

// outside returns the path of an outside program that a test needs. Where it is absent the test
// is skipped, but fails when CI=true: there .ci/run installs it.
func outside(t *testing.T, program string) string {
	t.Helper()
	path, err := exec.LookPath(program)
	switch {
	case err == nil:
	case os.Getenv("CI") == "true":
		t.Fatalf("%s is needed: add it to the programs of .ci/run", program)
	default:
		t.Skipf("%s is not installed", program)
	}
	return path
}

// An outside reader of JSON finds the figures that Go's own finds, with all their digits.
func TestJSONReadOutside(t *testing.T) {
	jq := outside(t, "jq")
	project, err := demo.Write(filepath.Join(t.TempDir(), "mill"))
	if err != nil {
		t.Fatal(err)
	}
	var out, remarks bytes.Buffer
	if code := run([]string{"rate", project, "--as", "json"}, streams{out: &out, err: &remarks}); code != exitDone {
		t.Fatalf("rate exits %d: %s", code, remarks.String())
	}
	var doc struct {
		Ratings []struct {
			U     float64 `json:"u_w_m2k"`
			Solar struct{ G float64 }
		}
	}
	if err := json.Unmarshal(out.Bytes(), &doc); err != nil {
		t.Fatal(err)
	}
	cmd := exec.Command(jq, "-r", ".ratings[] | .u_w_m2k, .solar.g")
	cmd.Stdin = &out
	text, err := cmd.Output()
	if err != nil {
		t.Fatal(err)
	}
	words := strings.Fields(string(text))
	if len(words) != 2*len(doc.Ratings) {
		t.Fatalf("%d figures, want %d", len(words), 2*len(doc.Ratings))
	}
	for i, r := range doc.Ratings {
		for k, want := range []float64{r.U, r.Solar.G} {
			if got, err := strconv.ParseFloat(words[2*i+k], 64); err != nil || got != want {
				t.Errorf("rating %d: read outside as %s, want %v", i, words[2*i+k], want)
			}
		}
	}
}
