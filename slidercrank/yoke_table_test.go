package slidercrank_test

import (
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// yoke returns the Scotch yoke of a row.
func yoke(t *testing.T, r row) *slidercrank.ScotchYoke {
	t.Helper()
	y, err := slidercrank.NewScotchYoke(slidercrank.YokeDimensions{Crank: r.dims[0], Tilt: r.dims[1]})
	if err != nil {
		t.Fatal(err)
	}
	return y
}

func TestScotchYokeTable(t *testing.T) {
	var st slidercrank.YokeState
	compare(t, "yoke", 2, 4, func(r row) ([]rigid.Coordinate, error) {
		err := yoke(t, r).Solve(&st, r.drive)
		return []rigid.Coordinate{st.Slide, st.Run}, err
	})
}

func TestScotchYokeSlideTable(t *testing.T) {
	var st slidercrank.YokeState
	compare(t, "yokeback", 2, 4, func(r row) ([]rigid.Coordinate, error) {
		err := yoke(t, r).SolveSlide(&st, r.drive, r.side())
		return []rigid.Coordinate{st.Turn, st.Run}, err
	})
}

// rod returns the slider rod of a row.
func rod(t *testing.T, r row) *slidercrank.SliderRod {
	t.Helper()
	s, err := slidercrank.NewSliderRod(slidercrank.RodDimensions{Length: r.dims[0], Angle: r.dims[1]})
	if err != nil {
		t.Fatal(err)
	}
	return s
}

func TestSliderRodTable(t *testing.T) {
	var st slidercrank.RodState
	compare(t, "rod", 2, 4, func(r row) ([]rigid.Coordinate, error) {
		err := rod(t, r).Solve(&st, r.drive)
		return []rigid.Coordinate{st.SlideA, st.SlideB}, err
	})
}

func TestSliderRodEndsTable(t *testing.T) {
	var st slidercrank.RodState
	compare(t, "roda", 2, 4, func(r row) ([]rigid.Coordinate, error) {
		err := rod(t, r).SolveA(&st, r.drive, r.side())
		return []rigid.Coordinate{st.Turn, st.SlideB}, err
	})
	compare(t, "rodb", 2, 4, func(r row) ([]rigid.Coordinate, error) {
		err := rod(t, r).SolveB(&st, r.drive, r.side())
		return []rigid.Coordinate{st.Turn, st.SlideA}, err
	})
}
