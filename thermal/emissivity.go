package thermal

import (
	"sort"

	"panewright/reference"
)

// CorrectedEmissivity returns the corrected (hemispherical) emissivity of a face from its normal
// emissivity by the table of EN 12898, linear between rows. Below and above the table (0.03 and
// 0.89) the ratio of the end is held, and held is true below it.
func CorrectedEmissivity(normal float64) (corrected float64, held bool) {
	keys, ratios := reference.EmissivityRatio().Series("ratio")
	last := len(keys) - 1
	switch {
	case normal < keys[0]:
		return normal * ratios[0], true
	case normal >= keys[last]:
		return normal * ratios[last], false
	}
	i := sort.SearchFloat64s(keys, normal)
	if keys[i] == normal {
		return normal * ratios[i], false
	}
	t := (normal - keys[i-1]) / (keys[i] - keys[i-1])
	return normal * (ratios[i-1] + float64(t*(ratios[i]-ratios[i-1]))), false
}
