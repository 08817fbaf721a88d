package reference_test

import (
	"fmt"

	"panewright/reference"
)

func ExampleTable_Series() {
	t := reference.EN410Weights()
	nm, weight := t.Series("light_pct")
	var sum float64
	for _, w := range weight {
		sum += w
	}
	fmt.Printf("%s: %d weights from %g to %g nm, sum %.4f\n", t.Source, len(nm), nm[0], nm[len(nm)-1], sum)
	// Output: EN 410:2011 tables 1 to 3, the same figures as ISO 9050:2003 tables 1 to 3: 41 weights from 380 to 780 nm, sum 99.9999
}
