package sheet

import (
	"flag"
	"os"
	"strings"
	"testing"
)

var update = flag.Bool("update", false, "write the words of the pictured sheet")

// The sheet that README shows is the demo's of today: it has these words. .ci/pictures makes both anew.
func TestPicturedSheet(t *testing.T) {
	const file = "../../../../testdata/pictures/sheet.txt"
	r, _ := demoReport(t)
	var b strings.Builder
	for _, part := range byMakeup(r) {
		if part.Ratings[0].Makeup.ID != "E1" {
			continue
		}
		texts, _ := onPage(t, makeupPages(part).pages[0])
		for _, x := range texts {
			if !strings.HasPrefix(x.text, "Panewright "+testVersion) {
				b.WriteString(x.text + "\n")
			}
		}
	}
	if *update {
		if err := os.WriteFile(file, []byte(b.String()), 0o644); err != nil {
			t.Fatal(err)
		}
		return
	}
	want, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	if got := b.String(); got != strings.ReplaceAll(string(want), "\r\n", "\n") {
		t.Errorf("run .ci/pictures and look at what changes: the sheet reads\n%s", got)
	}
}
