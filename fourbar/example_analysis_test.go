package fourbar_test

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// The examples show the ejector of an invented roof-tile press line: a crank-rocker
// that pushes raw tiles off the cutter's belt.
var ejector = fourbar.Dimensions{Frame: 0.300, Crank: 0.080, Coupler: 0.280, Follower: 0.160}

func ExampleClass() {
	l, err := fourbar.New(ejector)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Println(l.Class(), l.Class().ChangePoint())
	fmt.Printf("Grashof's measure %.3f\n", l.Grashof())
	least, greatest := l.Transmission()
	fmt.Printf("transmission angle %.1f° to %.1f°\n", least/rigid.Degree, greatest/rigid.Degree)
	// Output:
	// crank-rocker false
	// Grashof's measure 0.158
	// transmission angle 51.6° to 116.8°
}

func ExampleLimit() {
	l, err := fourbar.New(ejector)
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, x := range l.Limits() {
		fmt.Printf("crank %7.2f°, follower %6.2f°: %v\n", x.Turn/rigid.Degree, x.Swing/rigid.Degree, x.Kind)
	}
	ratio, err := l.TimeRatio()
	fmt.Printf("forth to back %.3f %v\n", ratio, err)
	// Output:
	// crank -150.46°, follower 141.95°: follower, folded
	// crank   26.08°, follower  81.61°: follower, stretched
	// forth to back 1.039 <nil>
}

func ExampleLimitKind() {
	// A rocker that is driven at its shorter end stops where coupler and follower
	// lie in one line.
	l, err := fourbar.New(fourbar.Dimensions{Frame: 0.300, Crank: 0.160, Coupler: 0.280, Follower: 0.080})
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, x := range l.Limits() {
		if x.Kind == fourbar.CrankStretched || x.Kind == fourbar.CrankFolded {
			fmt.Printf("%v at %.2f°\n", x.Kind, x.Turn/rigid.Degree)
		}
	}
	// Output:
	// crank, stretched at -98.39°
	// crank, folded at -38.05°
	// crank, folded at 38.05°
	// crank, stretched at 98.39°
}

func ExampleCurvePoint() {
	l, err := fourbar.New(ejector)
	if err != nil {
		fmt.Println(err)
		return
	}
	finger := r2.Vec{X: 0.140, Y: 0.060} // fixed to the coupler
	for p, err := range l.Curve(finger, rigid.Interval{Lo: 0, Hi: math.Pi}, 4) {
		if err != nil {
			fmt.Println(p.Turn, err)
			continue
		}
		centre, err := p.Path.Centre()
		fmt.Printf("crank %5.1f°: at (%.4f, %.4f), curvature %6.2f 1/m, centre of it %.3f m away %v\n",
			p.Turn/rigid.Degree, p.Point.Pos.X, p.Point.Pos.Y, p.Path.Curvature, math.Hypot(centre.X, centre.Y), err)
	}
	// Output:
	// crank   0.0°: at (0.1608, 0.1291), curvature  12.48 1/m, centre of it 0.080 m away <nil>
	// crank  60.0°: at (0.1530, 0.1714), curvature  19.71 1/m, centre of it 0.051 m away <nil>
	// crank 120.0°: at (0.0790, 0.1644), curvature   8.89 1/m, centre of it 0.112 m away <nil>
	// crank 180.0°: at (0.0272, 0.1082), curvature  11.80 1/m, centre of it 0.085 m away <nil>
}

func ExampleCognate() {
	l, err := fourbar.New(ejector)
	if err != nil {
		fmt.Println(err)
		return
	}
	finger := r2.Vec{X: 0.140, Y: 0.060}
	second := l.Cognates(finger)[1] // its crank turns with ours
	other, err := fourbar.New(second.Dimensions)
	if err != nil {
		fmt.Println(err)
		return
	}
	turn := rigid.Coordinate{Pos: 70 * rigid.Degree}
	var a, b fourbar.State
	if err := l.Solve(&a, turn); err != nil {
		fmt.Println(err)
	}
	if err := other.Solve(&b, turn); err != nil {
		fmt.Println(err)
	}
	d := second.Dimensions
	fmt.Printf("frame %.4f, crank %.4f, coupler %.4f, follower %.4f m, %v\n", d.Frame, d.Crank, d.Coupler, d.Follower, d.Branch)
	fmt.Printf("%.6f\n%.6f\n", a.Coupler.At(finger).Pos, b.Coupler.At(second.Coupler).Pos)
	// Output:
	// frame 0.1632, crank 0.0435, coupler 0.0870, follower 0.1523 m, crossed
	// {0.142645 0.174723}
	// {0.142645 0.174723}
}

func ExampleCentres() {
	l, err := fourbar.New(ejector)
	if err != nil {
		fmt.Println(err)
		return
	}
	var st fourbar.State
	if err := l.Solve(&st, rigid.Coordinate{Pos: 70 * rigid.Degree}); err != nil {
		fmt.Println(err)
		return
	}
	c, err := l.Centres(&st)
	if err != nil {
		fmt.Println(err)
		return
	}
	// Aronhold and Kennedy: the follower's angular velocity over the crank's is the
	// distance ratio of the crank and follower pivots from their common centre.
	i24 := c.CrankFollower.Point.X
	fmt.Printf("centre of crank and follower at x = %.4f m: ratio %.4f\n", i24, i24/(i24-ejector.Frame))
	x, err := l.Coefficients(st.Turn.Pos)
	fmt.Printf("first coefficient %.4f %v\n", x.First, err)
	// Output:
	// centre of crank and follower at x = -0.2094 m: ratio 0.4111
	// first coefficient 0.4111 <nil>
}

func ExampleCentre() {
	l, err := fourbar.New(fourbar.Dimensions{Frame: 0.200, Crank: 0.080, Coupler: 0.200, Follower: 0.080, Branch: fourbar.Parallel})
	if err != nil {
		fmt.Println(err)
		return
	}
	var st fourbar.State
	if err := l.Solve(&st, rigid.Coordinate{Pos: math.Pi / 2}); err != nil {
		fmt.Println(err)
		return
	}
	c, err := l.Centres(&st)
	fmt.Printf("the lifting table only translates: %v, towards %.0f, %v\n", c.FrameCoupler.AtInfinity, c.FrameCoupler.Direction, err)
	// Output:
	// the lifting table only translates: true, towards {0 1}, <nil>
}

func ExampleSensitivity() {
	l, err := fourbar.New(ejector)
	if err != nil {
		fmt.Println(err)
		return
	}
	finger := r2.Vec{X: 0.140, Y: 0.060}
	var s fourbar.Sensitivity
	if err := l.Sensitivity(&s, rigid.Coordinate{Pos: 70 * rigid.Degree}, finger); err != nil {
		fmt.Println(err)
		return
	}
	const tolerance = 0.05 * rigid.Millimetre
	worst, squares := 0.0, 0.0
	for _, by := range []fourbar.LengthSensitivity{s.Frame, s.Crank, s.Coupler, s.Follower} {
		x := math.Hypot(by.Point.Pos.X, by.Point.Pos.Y) * tolerance
		worst, squares = worst+x, squares+x*x
	}
	fmt.Printf("finger off by %.3f mm at worst, %.3f mm likely\n", worst/rigid.Millimetre, math.Sqrt(squares)/rigid.Millimetre)
	// Output:
	// finger off by 0.081 mm at worst, 0.053 mm likely
}

func ExampleLengthSensitivity() {
	l, err := fourbar.New(ejector)
	if err != nil {
		fmt.Println(err)
		return
	}
	var s fourbar.Sensitivity
	if err := l.Sensitivity(&s, rigid.Coordinate{Pos: 70 * rigid.Degree}, r2.Vec{}); err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("0.1 mm more crank turns the follower by %.4f°\n", s.Crank.Swing.Pos*0.1*rigid.Millimetre/rigid.Degree)
	// Output:
	// 0.1 mm more crank turns the follower by -0.0227°
}

func ExampleGenerator() {
	// A gate that opens 40° with the square root of the crank's 100°, exactly so at
	// three places (Chebyshev's spacing).
	var at [3]fourbar.Precision
	for i, x := range []float64{0.067, 0.5, 0.933} {
		at[i] = fourbar.Precision{Turn: (40 + 100*x) * rigid.Degree, Swing: (40 + 40*math.Sqrt(x)) * rigid.Degree}
	}
	g, err := fourbar.Freudenstein(0.400, at)
	d := g.Dimensions
	fmt.Printf("crank %.4f, coupler %.4f, follower %.4f m, %v, marks at %.0f° and %.0f°, %v\n",
		d.Crank, d.Coupler, d.Follower, d.Branch, g.TurnZero/rigid.Degree, g.SwingZero/rigid.Degree, err)
	// Output:
	// crank 0.1350, coupler 0.3247, follower 0.3178 m, crossed, marks at 180° and 180°, <nil>
}

func ExamplePrecision() {
	// A follower that has to stand still while the crank turns can't be had.
	_, err := fourbar.Freudenstein(0.400, [3]fourbar.Precision{{Turn: 0.2, Swing: 1}, {Turn: 0.6, Swing: 1}, {Turn: 1.0, Swing: 1}})
	fmt.Println(err)
	// Output:
	// twopoint: the precision positions do not determine the lengths
}
