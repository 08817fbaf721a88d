package spectra

// Which block of a JCAMP-DX file is meant.

import "strings"

// OneOf returns the column of the one block of a file that has a quantity. An error is Errors; it
// names the titles where several have it.
func OneOf(blocks []Block, q Quantity, file string) (Column, error) {
	var titles, others []string
	var found Column
	for _, b := range blocks {
		title := clip(b.Title)
		if title == "" {
			title = "untitled"
		}
		if b.Quantity == q {
			found = b.Column
			titles = append(titles, title)
		} else {
			others = append(others, title+" ("+string(b.Quantity)+")")
		}
	}
	const listed = 6
	short := func(list []string) string {
		if len(list) > listed {
			return strings.Join(list[:listed], "; ") + "; and others"
		}
		return strings.Join(list, "; ")
	}
	switch {
	case len(titles) == 1:
		return found, nil
	case len(titles) > 1:
		return Column{}, Errors{{File: file, Text: "holds several spectra of " + string(q) + ": " + short(titles) + "; leave one in the file"}}
	}
	return Column{}, Errors{{File: file, Text: "holds no spectrum of " + string(q) + ", but: " + short(others)}}
}
