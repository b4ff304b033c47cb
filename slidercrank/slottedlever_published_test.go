package slidercrank_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

// A published value: stated as its source prints it, to the last digit printed, and
// worked out again with 20 digits from the closure equations. Where stated is NaN
// there is none, or it was scaled off a drawing.
type published struct {
	what        string
	got, stated float64
	digit       float64 // of the stated value
	exact       float64
}

func (p published) check(t *testing.T) {
	t.Helper()
	if math.Abs(p.got-p.stated) > p.digit/2*(1+1e-9) {
		t.Errorf("%s = %v, published %v", p.what, p.got, p.stated)
	}
	if !(math.Abs(p.got-p.exact) <= 1e-13*math.Max(1, math.Abs(p.exact))) {
		t.Errorf("%s = %.17g, want %.17g", p.what, p.got, p.exact)
	}
}

var none = math.NaN()

func newLever(t *testing.T, d slidercrank.LeverDimensions) *slidercrank.SlottedLever {
	t.Helper()
	l, err := slidercrank.NewSlottedLever(d)
	if err != nil {
		t.Fatal(err)
	}
	return l
}

// Khurmi & Gupta, Theory of Machines, examples 5.1 to 5.3, printed answers; the
// 2 cm item is an examination question on the web.
func TestPublishedTimeRatios(t *testing.T) {
	for _, row := range []struct {
		crank, centre         float64
		stated, digit, recalc float64
	}{
		{0.120, 0.300, 1.7, 0.1, 1.7099527817214105091},
		{0.120, 0.240, 2, 1, 2},
		{0.02, 0.04, 2.0, 0.1, 2},
		{0.030, 0.075742319028319591987, 1.7, 0.1, 1.7},
	} {
		ratio, err := newLever(t, slidercrank.LeverDimensions{Crank: row.crank, Centre: row.centre}).TimeRatio()
		if err != nil {
			t.Fatal(err)
		}
		published{"time ratio", ratio, row.stated, row.digit, row.recalc}.check(t)
	}
}

// Bevan, The Theory of Machines, ch. 3 ex. 7: in and s, lever pivot at the origin,
// crank pivot 8 in to the right. The book's rates were scaled off a drawing.
func TestPublishedShaper(t *testing.T) {
	l := newLever(t, slidercrank.LeverDimensions{Crank: 4, Centre: 8, Mount: rigid.Placement{X: 8}})
	var st slidercrank.LeverState
	if err := l.Solve(&st, rigid.Coordinate{Pos: 60 * rigid.Degree, Vel: 2 * math.Pi}); err != nil {
		t.Fatal(err)
	}
	coriolis, end := st.Pin().Coriolis, st.Lever.At(r2.Vec{X: 15})
	for _, p := range []published{
		{"pin distance", st.Slide.Pos, 10.6, 0.1, 10.583005244258362362},
		{"lever angle", st.Swing.Pos, none, 0, 0.33347317225183211534},
		{"lever rate", st.Swing.Vel, none, 0, 1.795195802051310422},
		{"lever acceleration", st.Swing.Acc, none, 0, -4.1864464342756332526},
		{"sliding speed", st.Slide.Vel, none, 0, -16.453241300334180896},
		{"sliding acceleration", st.Slide.Acc, none, 0, -85.265367457538037454},
		{"Coriolis x", coriolis.X, none, 0, 19.336367806215886274},
		{"Coriolis y", coriolis.Y, none, 0, -55.819285790341776701},
		{"end velocity x", end.Vel.X, none, 0, -8.8142364108933111941},
		{"end velocity y", end.Vel.Y, none, 0, 25.444508822651270331},
		{"end acceleration x", end.Acc.X, none, 0, -25.122831483024600321},
		{"end acceleration y", end.Acc.Y, none, 0, -75.160580964836537198},
	} {
		p.check(t)
	}
}

// A turning lever below its crank, mm and s: the values are worked out from the
// closure equations; the ratios at the ends are the textbook's r/(r ± c).
func TestPublishedWhitworth(t *testing.T) {
	l := newLever(t, slidercrank.LeverDimensions{Crank: 150, Centre: 100, Mount: rigid.Placement{Angle: math.Pi / 2}})
	var st slidercrank.LeverState
	if err := l.Solve(&st, rigid.Coordinate{Pos: -60 * rigid.Degree, Vel: 8}); err != nil {
		t.Fatal(err)
	}
	far, err1 := l.Coefficients(0)
	near, err2 := l.Coefficients(math.Pi)
	if err1 != nil || err2 != nil {
		t.Fatal(err1, err2)
	}
	coriolis := st.Pin().Coriolis
	for _, p := range []published{
		{"pin distance", st.Slide.Pos, none, 0, 217.94494717703367761},
		{"sliding speed", st.Slide.Vel, none, 0, 476.83164854341577035},
		{"sliding acceleration", st.Slide.Acc, none, 0, -3245.6289086530001408},
		{"lever angle", st.Lever.Pose.Angle(), none, 0, 0.93223663069589129545},
		{"lever rate", st.Lever.Omega, none, 0, 5.0526315789473684211},
		{"lever acceleration", st.Lever.Alpha, none, 0, -4.6060076877177900326},
		{"Coriolis x", coriolis.X, none, 0, -3869.0464576829436274},
		{"Coriolis y", coriolis.Y, none, 0, 2872.0221606648199446},
		{"ratio at the farthest pin", far.First, none, 0, 0.6},
		{"ratio at the nearest pin", near.First, none, 0, 3},
	} {
		p.check(t)
	}
}

// Bevan, The Theory of Machines, ch. 3 ex. 8, in in and s: an engine whose crank of
// 3 in is fixed while the cylinder turns about it at 1200 rpm, the rod of 9 in
// turning about the crank pin; 55° between the crank and the cylinder's line. It is
// a turning slotted lever driven by the lever. The book's figures, 30.9 ft/s, 7764,
// 1698 and 4369 ft/s² and rad/s² and 150.0 rad/s, were scaled off a drawing.
func TestPublishedRotatingCylinder(t *testing.T) {
	l := newLever(t, slidercrank.LeverDimensions{Crank: 9, Centre: 3})
	var st slidercrank.LeverState
	drive := rigid.Coordinate{Pos: -55 * rigid.Degree, Vel: 40 * math.Pi}
	if err := l.SolveSwing(&st, drive, rigid.Right); err != nil {
		t.Fatal(err)
	}
	const foot = 12
	for _, p := range []published{
		{"sliding speed", st.Slide.Vel / foot, none, 0, 30.848995133462479684},
		{"Coriolis", r2.Norm(st.Pin().Coriolis) / foot, none, 0, 7753.1981185530407496},
		{"sliding acceleration", math.Abs(st.Slide.Acc) / foot, none, 0, 1832.7859722718887872},
		{"rod rate", math.Abs(st.Crank.Omega), none, 0, 150.63867739102727278},
		{"rod acceleration", math.Abs(st.Crank.Alpha), none, 0, 4305.1246361251290297},
	} {
		p.check(t)
	}
}

// Meriam & Kraige, Dynamics, sample problems on a slotted link that turns clockwise
// at 2 rad/s and drives a pin on a second link, from memory: the second link, 225 mm
// long, lies along −x with its pivot at (450, 225) mm, the slot at 45°. Stated: pin
// 900 mm/s, along the slot 636 mm/s and 8910 mm/s², link 4 rad/s and 32 rad/s².
func TestPublishedSlottedLink(t *testing.T) {
	centre, tilt := math.Hypot(450, 225), math.Atan2(225, 450)
	l := newLever(t, slidercrank.LeverDimensions{Crank: 225, Centre: centre, Mount: rigid.Placement{X: 450, Y: 225, Angle: tilt}})
	var st slidercrank.LeverState
	if err := l.SolveSwing(&st, rigid.Coordinate{Pos: math.Pi/4 - tilt, Vel: -2}, rigid.Left); err != nil {
		t.Fatal(err)
	}
	for _, p := range []published{
		{"pin x", st.Block.Pose.Origin.X, none, 0, 225},
		{"pin y", st.Block.Pose.Origin.Y, none, 0, 225},
		{"pin speed", r2.Norm(st.Block.Vel), 900, 1, 900},
		{"speed along the slot", math.Abs(st.Slide.Vel), 636, 1, 450 * math.Sqrt2},
		{"acceleration along the slot", st.Slide.Acc, 8910, 10, 6300 * math.Sqrt2},
		{"link rate", st.Crank.Omega, 4, 1, 4},
		{"link acceleration", math.Abs(st.Crank.Alpha), 32, 1, 32},
	} {
		p.check(t)
	}
}
