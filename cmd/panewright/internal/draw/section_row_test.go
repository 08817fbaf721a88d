package draw

import (
	"fmt"
	"math/rand/v2"
	"strings"
	"testing"

	"panewright/glazing"
)

// Sections beside each other have glass at one height, and below them what is said once; nothing lies on
// anything else, or beyond the height that was announced.
func TestSections(t *testing.T) {
	check := func(name string, m *glazing.Makeup, width, glass float64, conditions ...glazing.Condition) {
		ratings := ratingsUnder(t, m, conditions...)
		pair := []*glazing.Rating{ratings[0], ratings[len(ratings)-1]}
		for _, ids := range [][]string{ColdAndHot(pair[0]), nil} {
			temperatures := TemperaturesOf(pair, ids)
			c := New(300, 300)
			at := Rect{20, 20, width, SectionsHeight(width, 6, glass, pair, temperatures)}
			Sections(c, at, 6, glass, pair, temperatures)
			if c.Err() != nil {
				t.Fatalf("%s: %v", name, c.Err())
			}
			labelsApart(t, name, c, at)
			labelsOffLines(t, name, c)
			said := strings.Join(texts(c), " ")
			if n := strings.Count(said, "edges are not shown"); n != 1 {
				t.Errorf("%s: what is said below is said %d times", name, n)
			}
			if n := strings.Count(said, filmText); n > 1 {
				t.Errorf("%s: the mark of films is explained %d times", name, n)
			}
			if n := len(heatLines(c)); n != 2*len(ids) {
				t.Errorf("%s: %d lines of temperatures in two sections, want %d", name, n, 2*len(ids))
			}
		}
	}
	for name, m := range heated(t) {
		check(name, m, 176, 33, coldNight, hotNoon)
		check(name, m, 130, 0, coldNight, hotNoon)
	}
	r := rand.New(rand.NewPCG(13, 14))
	for i := range 60 {
		check(fmt.Sprintf("random %d", i), random(t, r), 126+60*r.Float64(), 50*r.Float64(), randomConditions(r)...)
	}
}
