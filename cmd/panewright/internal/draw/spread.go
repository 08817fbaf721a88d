package draw

// Labels in a row that must not run into each other.

// spread moves labels in a row, given the centres they want, in ascending order, and their widths,
// as little as can be, so that each keeps a distance from the next and all lie between two bounds.
// It reports false where they do not fit.
func spread(wanted, widths []float64, distance, from, to float64) (centres []float64, fit bool) {
	n := len(wanted)
	if n == 0 {
		return nil, true
	}
	// Relative to where each would stand if all were packed from the left, the order is all there
	// is to keep: the nearest ascending sequence, by pooling neighbours that violate the order.
	offset := make([]float64, n)
	for i := 1; i < n; i++ {
		offset[i] = offset[i-1] + (widths[i-1]+widths[i])/2 + distance
	}
	type block struct {
		sum   float64
		count int
	}
	var blocks []block
	for i := range n {
		blocks = append(blocks, block{wanted[i] - offset[i], 1})
		for len(blocks) > 1 {
			a, b := blocks[len(blocks)-2], blocks[len(blocks)-1]
			if a.sum/float64(a.count) <= b.sum/float64(b.count) {
				break
			}
			blocks = append(blocks[:len(blocks)-2], block{a.sum + b.sum, a.count + b.count})
		}
	}
	least, greatest := from+widths[0]/2, to-widths[n-1]/2-offset[n-1]
	for _, b := range blocks {
		at := b.sum / float64(b.count)
		for range b.count {
			centres = append(centres, max(least, min(at, greatest))+offset[len(centres)])
		}
	}
	return centres, greatest >= least-slack
}
