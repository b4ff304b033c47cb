package rigid_test

import (
	"encoding/json"
	"math"
	"os"
	"testing"
)

// A tableRow has the inputs of a problem, its results worked out with 50 digits or
// more by the script beside the file, and Σ|x·∂y/∂x| over the inputs for each.
type tableRow struct{ In, Out, Spread []float64 }

func readTable(t *testing.T, name string) []tableRow {
	t.Helper()
	text, err := os.ReadFile(name)
	if err != nil {
		t.Fatal(err)
	}
	var rows []tableRow
	if err := json.Unmarshal(text, &rows); err != nil {
		t.Fatal(err)
	}
	if len(rows) == 0 {
		t.Fatalf("%s is empty", name)
	}
	return rows
}

// errorOf returns the worst error of got in units of ε(|y| + Σ|x·∂y/∂x|): what
// rounding the inputs and the result would make.
func (r tableRow) errorOf(got []float64) (worst float64, at int) {
	for i, y := range r.Out {
		unit := 0x1p-52 * (math.Abs(y) + r.Spread[i])
		if e := math.Abs(got[i]-y) / unit; !(e <= worst) {
			worst, at = e, i
		}
	}
	return worst, at
}
