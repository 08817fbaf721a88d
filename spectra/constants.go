package spectra

// The reader of optical constants.

import (
	"io"
	"slices"
)

// The heads of a file of optical constants, beside a wavelength.
const (
	headN = "n"
	headK = "k"
)

// ReadConstantsCSV reads the optical constants of a material, N = n + ik with k ≥ 0 for loss: a
// header row, columns wavelength_nm or wavelength_um, n and k in any order; two rows suffice. An
// error is Errors, or that of r.
func ReadConstantsCSV(r io.Reader, file string) (n, k Curve, err error) {
	const leastRows = 2
	rows, err := readRows(r, file, leastRows, false)
	if err != nil {
		return Curve{}, Curve{}, err
	}
	cn, ck := rows.column(headN, positive), rows.column(headK, notNegative)
	for _, head := range rows.heads {
		if head != "" && !slices.Contains([]string{headNM, headUM, headN, headK}, head) {
			rows.fail(rows.headLine, 0, "unknown column %q; optical constants have wavelength_nm or wavelength_um, n, k", clip(head))
		}
	}
	if !rows.faults.any() && (cn.Len() != len(rows.line) || ck.Len() != len(rows.line)) {
		rows.fail(rows.headLine, 0, "n and k are needed in every row")
	}
	return cn.Curve, ck.Curve, rows.faults.err()
}

func positive(v float64) string {
	if !(v > 0) {
		return "not above 0"
	}
	return ""
}
