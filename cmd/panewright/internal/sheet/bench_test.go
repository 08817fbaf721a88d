package sheet

import (
	"testing"

	"panewright/cmd/panewright/internal/table"
)

// BenchmarkSheet makes documents from ratings: the demo's, one of four pages, and a schedule of 200
// make-ups with 5 tints each and their sheets.
func BenchmarkSheet(b *testing.B) {
	four, limits := demoReport(b)
	four.Ratings = four.Ratings[:2] // with schedule and limits
	for _, x := range []struct {
		name string
		read func() (table.Report, *table.Check)
	}{
		{"demo", func() (table.Report, *table.Check) { return demoReport(b) }},
		{"four-pages", func() (table.Report, *table.Check) { return four, limits }},
		{"200x5", func() (table.Report, *table.Check) { return many(b, 200, 5) }},
	} {
		b.Run(x.name, func(b *testing.B) {
			r, c := x.read()
			b.ReportAllocs()
			size := 0
			for b.Loop() {
				f, err := Project(r, c)
				if err != nil {
					b.Fatal(err)
				}
				size = len(f.PDF)
			}
			b.ReportMetric(float64(len(projectPages(r, c).pages)), "pages")
			b.ReportMetric(float64(size), "B/file")
		})
	}
}
