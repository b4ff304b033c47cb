package slidercrank_test

import (
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// rowLinkage returns the slider-crank of a row on the given branch.
func rowLinkage(t *testing.T, r row, branch slidercrank.Branch) *slidercrank.Linkage {
	t.Helper()
	l, err := slidercrank.New(slidercrank.Dimensions{Crank: r.dims[0], Rod: r.dims[1], Offset: r.dims[2], Branch: branch})
	if err != nil {
		t.Fatal(err)
	}
	return l
}

// rodMotion returns the rod's angle, within half a turn of near, and its rates.
func rodMotion(s *slidercrank.State, near float64) rigid.Coordinate {
	return rigid.Coordinate{Pos: rigid.Nearest(s.Rod.Pose.Angle(), near), Vel: s.Rod.Omega, Acc: s.Rod.Alpha}
}

func TestSolveAgainst50Digits(t *testing.T) {
	var st slidercrank.State
	compareRows(t, readTable(t, "slidercrank_crank", 3), 4, func(r row) ([]rigid.Coordinate, error) {
		branch := slidercrank.Ahead
		if r.pick < 0 {
			branch = slidercrank.Behind
		}
		err := rowLinkage(t, r, branch).Solve(&st, r.drive)
		return []rigid.Coordinate{rodMotion(&st, r.want[0].Pos), st.Slide}, err
	})
}

func TestSolveSlideAgainst50Digits(t *testing.T) {
	var st slidercrank.State
	compareRows(t, readTable(t, "slidercrank_slide", 3), 4, func(r row) ([]rigid.Coordinate, error) {
		branch := slidercrank.Ahead
		if r.drive.Pos < 0 {
			branch = slidercrank.Behind
		}
		err := rowLinkage(t, r, branch).SolveSlide(&st, r.drive, r.side())
		return []rigid.Coordinate{st.Turn, rodMotion(&st, r.want[1].Pos)}, err
	})
}
