package slidercrank_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

const inch = 0.0254 // m

// newPress returns the slider-crank with the given dimensions.
func newPress(t *testing.T, d slidercrank.Dimensions) *slidercrank.Linkage {
	t.Helper()
	l, err := slidercrank.New(d)
	if err != nil {
		t.Fatal(err)
	}
	return l
}

// solved returns the motion of l for a motion of the crank.
func solved(t *testing.T, l *slidercrank.Linkage, turn rigid.Coordinate) *slidercrank.State {
	t.Helper()
	var st slidercrank.State
	if err := l.Solve(&st, turn); err != nil {
		t.Fatal(err)
	}
	return &st
}

// A motor-sport forum's article on piston speed, with figures for a stroke of
// 3.307 in, a rod of 6.024 in and 6000 rpm:
// http://www.quartermile.ws/forum/index.php?topic=7907.msg80124
func TestPublishedPiston(t *testing.T) {
	l := newPress(t, slidercrank.Dimensions{Crank: 3.307 / 2 * inch, Rod: 6.024 * inch})
	w := 6000 * rigid.RPM
	at := solved(t, l, rigid.Coordinate{Pos: 0.0021 * w, Vel: w})
	zero := func(from float64) float64 { // of the acceleration, by halving from a quarter turn on
		lo, hi := from, from+math.Pi/2
		f := func(x float64) float64 { return solved(t, l, rigid.Coordinate{Pos: x, Vel: w}).Slide.Acc }
		sign := math.Signbit(f(lo))
		for range 60 {
			if mid := (lo + hi) / 2; math.Signbit(f(mid)) == sign {
				lo = mid
			} else {
				hi = mid
			}
		}
		return lo
	}
	first, second := zero(0.5), zero(4)
	for _, p := range []published{
		{"piston position, in", at.Slide.Pos / inch, 6.218, 1e-3, 6.2184117013164130605},
		{"piston speed, 100 in/s", -at.Slide.Vel / inch / 100, 10.78, 1e-2, 10.775401178812267707},
		{"first time of zero acceleration, s", first / w, 0.002100653404, 1e-12, 0.0021006534042477771515},
		{"second such time, s", second / w, 0.007899346596, 1e-12, 0.0078993465957522228485},
		{"crank angle there, deg", first / rigid.Degree, 75.6, 0.1, 75.623522552919977455},
	} {
		p.check(t)
	}
}

// R. S. Khurmi and J. K. Gupta, Theory of Machines, 14th ed., example 8.1: crank
// 150 mm, rod 600 mm, 300 rpm clockwise, 45° from inner dead centre. Its 4.1 m/s,
// 5.67 rad/s and 171.67 rad/s² were scaled off a drawing, so that only the
// acceleration of the rod's middle agrees; the exact values are those of the
// closure equations with 20 digits.
func TestPublishedRodAcceleration(t *testing.T) {
	l := newPress(t, slidercrank.Dimensions{Crank: 0.15, Rod: 0.6})
	st := solved(t, l, rigid.Coordinate{Pos: -45 * rigid.Degree, Vel: -10 * math.Pi})
	mid := st.Rod.At(r2.Vec{X: 0.3})
	for _, p := range []published{
		{"acceleration of the rod's middle, m/s²", r2.Norm(mid.Acc), 117, 1, 117.31042577013006153},
		{"speed of the rod's middle, m/s", r2.Norm(mid.Vel), none, 0, 3.995358107874296511},
		{"rod's angular velocity, rad/s", st.Rod.Omega, none, 0, 5.6424669739309203009},
		{"rod's angular acceleration, rad/s²", st.Rod.Alpha, none, 0, -171.54515606539752209},
		{"slider's velocity, m/s", st.Slide.Vel, none, 0, -3.9306362026019285176},
		{"slider's acceleration, m/s²", st.Slide.Acc, none, 0, -105.28946671025092897},
	} {
		p.check(t)
	}
}

// The examination GATE ME 2025, question 60: crank 30 mm, rod 50 mm, offset 10 mm;
// limits 79.37 and 17.32 mm, stroke 62.05 mm:
// https://examprev.com/question/mechanical-engineering-gate-2025-question-60
// The rest is from the closure equations with 20 digits.
func TestPublishedOffsetStroke(t *testing.T) {
	l := newPress(t, slidercrank.Dimensions{Crank: 30, Rod: 50, Offset: 10})
	outer, inner, err := l.DeadCentres()
	if err != nil {
		t.Fatal(err)
	}
	stroke, err := l.Stroke()
	if err != nil {
		t.Fatal(err)
	}
	ratio, err := l.TimeRatio()
	if err != nil {
		t.Fatal(err)
	}
	st := solved(t, l, rigid.Coordinate{Pos: 60 * rigid.Degree, Vel: 10})
	for _, p := range []published{
		{"outer limit, mm", outer.Slide, 79.37, 0.01, 79.372539331937717715},
		{"inner limit, mm", inner.Slide, 17.32, 0.01, 17.320508075688772935},
		{"stroke, mm", stroke, 62.05, 0.01, 62.05203125624894478},
		{"crank angle at outer limit", outer.Turn, none, 0, 0.12532783116806539687},
		{"crank angle at inner limit", inner.Turn + 2*math.Pi, none, 0, 3.6651914291880921115},
		{"time ratio", 1 / ratio, none, 0, 1.2903567183538581123},
		{"slide, mm", st.Slide.Pos, none, 0, 62.377370571515080527},
		{"speed, mm/s", st.Slide.Vel, none, 0, -310.40380847357957676},
		{"acceleration, mm/s²", st.Slide.Acc, none, 0, -1152.5922921692147328},
		{"rod angle", st.Rod.Pose.Angle(), none, 0, -0.32532340303092496905},
		{"rod's angular velocity", st.Rod.Omega, none, 0, -3.1660684877726246361},
		{"rod's angular acceleration", st.Rod.Alpha, none, 0, 51.45674374943023819},
	} {
		p.check(t)
	}
}

// T. Bevan, The Theory of Machines, ch. 3: the rotating-cylinder engine, crank 3 in
// fixed, rod 9 in, cylinders turning at 1200 rpm, the crank at 55° from the line of
// the cylinder. It is the slider-crank as an observer on the crank sees it. His
// figures (30.9 ft/s, 7764 ft/s², 150 rad/s) were scaled off a drawing and don't
// agree to the last digit; the exact ones are from the closure equations.
func TestPublishedRotatingCylinderSeenFromCrank(t *testing.T) {
	const foot = 12 * inch
	l := newPress(t, slidercrank.Dimensions{Crank: 3 * inch, Rod: 9 * inch})
	w := 1200 * rigid.RPM
	st := solved(t, l, rigid.Coordinate{Pos: 55 * rigid.Degree, Vel: -w})
	cylinder := (&rigid.Motion{}).Relative(&st.Crank)
	rod := st.Rod.Relative(&st.Crank)
	terms := cylinder.AccelerationTerms(rigid.Point{
		Pos: st.Slider.Pose.Origin, Vel: st.Slider.Vel, Acc: st.Slider.Acc,
	})
	for _, p := range []published{
		{"sliding speed, ft/s", st.Slide.Vel / foot, none, 0, 30.848995133462479684},
		{"sliding acceleration, ft/s²", r2.Norm(terms.Relative) / foot / 1000, none, 0, 1.8327859722718887872},
		{"Coriolis term, 1000 ft/s²", r2.Norm(terms.Coriolis) / foot / 1000, none, 0, 7.7531981185530407496},
		{"cylinder's angular velocity, rad/s", cylinder.Omega, none, 0, w},
		{"rod's angular velocity, rad/s", math.Abs(rod.Omega), none, 0, 150.63867739102727278},
		{"rod's angular acceleration, 1000 rad/s²", math.Abs(rod.Alpha) / 1000, none, 0, 4.3051246361251290297},
	} {
		p.check(t)
	}
}
