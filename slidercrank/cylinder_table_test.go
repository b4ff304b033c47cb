package slidercrank_test

import (
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// cylinder returns the oscillating cylinder of a row.
func cylinder(t *testing.T, r row) *slidercrank.OscillatingCylinder {
	t.Helper()
	c, err := slidercrank.NewOscillatingCylinder(slidercrank.CylinderDimensions{Crank: r.dims[0], Centre: r.dims[1], Offset: r.dims[2]})
	if err != nil {
		t.Fatal(err)
	}
	return c
}

func TestOscillatingCylinderTable(t *testing.T) {
	var st slidercrank.CylinderState
	compare(t, "turn", 3, 4, func(r row) ([]rigid.Coordinate, error) {
		err := cylinder(t, r).Solve(&st, r.drive)
		return []rigid.Coordinate{st.Swing, st.Slide}, err
	})
}

func TestOscillatingCylinderSlideTable(t *testing.T) {
	var st slidercrank.CylinderState
	compare(t, "length", 3, 4, func(r row) ([]rigid.Coordinate, error) {
		knee := rigid.Right
		if r.pick < 0 {
			knee = rigid.Left
		}
		err := cylinder(t, r).SolveSlide(&st, r.drive, knee)
		return []rigid.Coordinate{st.Turn, st.Swing}, err
	})
}
