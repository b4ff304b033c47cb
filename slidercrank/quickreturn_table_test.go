package slidercrank_test

import (
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// quickReturn returns the drive of a row.
func quickReturn(t *testing.T, r row) *slidercrank.QuickReturn {
	t.Helper()
	d := slidercrank.QuickReturnDimensions{
		Crank: r.dims[0], Centre: r.dims[1], Slot: r.dims[2], Arm: r.dims[3], ArmAngle: r.dims[4], Rod: r.dims[5],
		Guide: rigid.Placement{X: r.dims[6], Y: r.dims[7], Angle: r.dims[8]},
	}
	if r.pick < 0 {
		d.Branch = slidercrank.Behind
	}
	q, err := slidercrank.NewQuickReturn(d)
	if err != nil {
		t.Fatal(err)
	}
	return q
}

func TestQuickReturnTable(t *testing.T) {
	var st slidercrank.QuickReturnState
	compare(t, "ram", 9, 4, func(r row) ([]rigid.Coordinate, error) {
		err := quickReturn(t, r).Solve(&st, r.drive)
		return []rigid.Coordinate{st.Swing, st.Travel}, err
	})
}
