package fourbar_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// near fails unless got is within tol of want.
func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s = %.17g, want %.17g, off by %.2g", what, got, want, got-want)
	}
}

// mm scales lengths in mm.
func mm(d fourbar.Dimensions) fourbar.Dimensions {
	d.Frame *= rigid.Millimetre
	d.Crank *= rigid.Millimetre
	d.Coupler *= rigid.Millimetre
	d.Follower *= rigid.Millimetre
	return d
}

func solved(t *testing.T, d fourbar.Dimensions, turn rigid.Coordinate) (*fourbar.Linkage, *fourbar.State) {
	t.Helper()
	l, err := fourbar.New(d)
	if err != nil {
		t.Fatal(err)
	}
	st := new(fourbar.State)
	if err := l.Solve(st, turn); err != nil {
		t.Fatal(err)
	}
	return l, st
}

// TestCrankRocker: R. L. Norton, Design of Machinery, examples 4-1, 6-7 and 7-1,
// from memory: θ3 = 20.298°, θ4 = 57.325°, ω = −4.121 and 6.998 rad/s, α = 296.089
// and 470.134 rad/s²; crossed −60.98° and (misremembered) −98.01°. All digits
// beyond from the closure equations solved with 60 digits.
func TestCrankRocker(t *testing.T) {
	d := mm(fourbar.Dimensions{Frame: 100, Crank: 40, Coupler: 120, Follower: 80})
	turn := rigid.Coordinate{Pos: 40 * rigid.Degree, Vel: 25, Acc: 15}
	_, st := solved(t, d, turn)
	near(t, "θ3", st.Coupler.Pose.Angle()/rigid.Degree, 20.2978827881964747, 1e-12)
	near(t, "θ4", st.Swing.Pos/rigid.Degree, 57.324880070360794216, 1e-12)
	near(t, "ω3", st.Coupler.Omega, -4.1209144153476989463, 1e-13)
	near(t, "ω4", st.Swing.Vel, 6.9979852421767748602, 1e-13)
	near(t, "α3", st.Coupler.Alpha, 296.08919317431022113, 1e-11)
	near(t, "α4", st.Swing.Acc, 470.1335302610225283, 1e-11)
	d.Branch = fourbar.Crossed
	_, st = solved(t, d, turn)
	near(t, "crossed θ3", st.Coupler.Pose.Angle()/rigid.Degree, -60.977966795864430686, 1e-12)
	near(t, "crossed θ4", st.Swing.Pos/rigid.Degree, -98.004964078028750203, 1e-12)
	near(t, "crossed ω3", st.Coupler.Omega, -9.2587722995397417841, 1e-13)
	near(t, "crossed ω4", st.Swing.Vel, -20.377671957064215591, 1e-13)
	near(t, "crossed α3", st.Coupler.Alpha, 597.62240007628099192, 1e-11)
	near(t, "crossed α4", st.Swing.Acc, 423.57806298956868474, 1e-11)
}

// TestTurnedGround: R. L. Williams II, mechanism kinematics notes, Ohio University,
// four-bar snapshot, from memory: ω3 = −8.073 and ω4 = −3.729 rad/s. The frame's
// line lies at 10.3°, where the crank at 30° from the horizontal is at 19.7°.
func TestTurnedGround(t *testing.T) {
	const tilt = 10.3 * rigid.Degree
	d := fourbar.Dimensions{Frame: 0.284, Crank: 0.076, Coupler: 0.203, Follower: 0.178, Mount: rigid.Placement{Angle: tilt}}
	_, st := solved(t, d, rigid.Coordinate{Pos: 30*rigid.Degree - tilt, Vel: 20})
	near(t, "ω3", st.Coupler.Omega, -8.0729875338567581674, 1e-14)
	near(t, "ω4", st.Follower.Omega, -3.7287640625721245935, 1e-14)
	near(t, "θ3", st.Coupler.Pose.Angle(), 0.9403458153695053929, 1e-15)
	near(t, "θ4", st.Follower.Pose.Angle(), 2.1267169997126243836, 1e-15)
	near(t, "α3", st.Coupler.Alpha, 7.9942149982543667587, 1e-12)
	near(t, "α4", st.Follower.Alpha, 243.01829219880464509, 1e-12)
	sin, cos := math.Sincos(10 * rigid.Degree)
	p := st.Coupler.At(r2.Vec{X: 0.127 * cos, Y: 0.127 * sin})
	near(t, "x", p.Pos.X, 0.12173429848777287045, 1e-16)
	near(t, "y", p.Pos.Y, 0.15202789050069166936, 1e-16)
	near(t, "vx", p.Vel.X, 0.16054573852406730111, 1e-14)
	near(t, "vy", p.Vel.Y, 0.86494647356314168248, 1e-14)
	near(t, "ax", p.Acc.X, -30.882980327885922592, 1e-13)
	near(t, "ay", p.Acc.Y, -22.184546805333847326, 1e-13)
}

// TestClockwise: R. S. Khurmi and J. K. Gupta, Theory of Machines, 14th ed.,
// example 7.1: the follower turns at 4.8 rad/s with the crank at 120 rpm, both
// clockwise.
func TestClockwise(t *testing.T) {
	d := mm(fourbar.Dimensions{Frame: 150, Crank: 40, Coupler: 150, Follower: 80})
	_, st := solved(t, d, rigid.Coordinate{Pos: 60 * rigid.Degree, Vel: -120 * rigid.RPM})
	near(t, "ω4", st.Swing.Vel, -4.7845709475187396172, 1e-14)
	near(t, "θ3", st.Coupler.Pose.Angle(), 0.29939313703920490992, 1e-15)
	near(t, "θ4", st.Swing.Pos, 1.4034241247868051673, 1e-15)
	near(t, "ω3", st.Coupler.Omega, 1.3086251349486305119, 1e-14)
	near(t, "α3", st.Coupler.Alpha, 31.385444041238184732, 1e-13)
	near(t, "α4", st.Swing.Acc, 56.884349034569954909, 1e-13)
}

// TestAntiparallelogram: the speed ratio of the linkage that elliptical gears copy
// runs between −K and −1/K, K = (d + a)/(d − a) = 3
// (cunningham-ind.com/ellipt.html), and tan(θ4/2) = −K tan(θ2/2), from memory.
func TestAntiparallelogram(t *testing.T) {
	d := fourbar.Dimensions{Frame: 2, Crank: 1, Coupler: 2, Follower: 1, Branch: fourbar.Contrary}
	l, st := solved(t, d, rigid.Coordinate{Vel: 1})
	near(t, "ratio at 0", st.Swing.Vel, -3, 0)
	if err := l.Solve(st, rigid.Coordinate{Pos: math.Pi, Vel: 1}); err != nil {
		t.Fatal(err)
	}
	near(t, "ratio at π", st.Swing.Vel, -1./3, 1e-16)
	if err := l.Solve(st, rigid.Coordinate{Pos: 70 * rigid.Degree, Vel: 1}); err != nil {
		t.Fatal(err)
	}
	near(t, "θ4", st.Swing.Pos, -2.2529843499388026749, 1e-15)
	near(t, "ratio", st.Swing.Vel, -0.82600951385313107432, 1e-15)
	near(t, "K", -math.Tan(st.Swing.Pos/2)/math.Tan(35*rigid.Degree), 3, 1e-14)
	d.Branch = fourbar.Parallel
	_, st = solved(t, d, rigid.Coordinate{Pos: 70 * rigid.Degree, Vel: 1})
	near(t, "parallel ω4", st.Swing.Vel, 1, 0)
	near(t, "parallel ω3", st.Coupler.Omega, 0, 0)
}

// TestDragLink: Grashof's rule that both pivoted links turn fully where the frame
// is the shortest, from memory; the rest from the closure equations with 60 digits.
func TestDragLink(t *testing.T) {
	d := mm(fourbar.Dimensions{Frame: 20, Crank: 60, Coupler: 50, Follower: 55})
	l, st := solved(t, d, rigid.Coordinate{Pos: 50 * rigid.Degree, Vel: 10})
	near(t, "θ3", st.Coupler.Pose.Angle(), -0.78433806201332288004, 1e-15)
	near(t, "θ4", st.Swing.Pos, 0.19477145928201441524, 1e-15)
	near(t, "ω3", st.Coupler.Omega, 9.0672670763713797821, 1e-14)
	near(t, "ω4", st.Swing.Vel, 13.09465895807471623, 1e-14)
	near(t, "α3", st.Coupler.Alpha, -59.389125402400366636, 1e-13)
	near(t, "α4", st.Swing.Acc, -36.495080956191358757, 1e-13)
	const n = 360 // the mean over a turn, by the midpoint rule, which is exact for so smooth a periodic function
	sum := 0.0
	for k := range n {
		c, err := l.Coefficients(rigid.Revolution * (float64(k) + 0.5) / n)
		if err != nil {
			t.Fatal(err)
		}
		sum += c.First
	}
	near(t, "mean of ω4/ω2", sum/n, 1, 1e-14)
}

// TestChebyshev: the straight-line linkage 4 : 5 : 2 : 5 has input limits at
// 36.8699° and 101.537° (en.wikipedia.org/wiki/Chebyshev_linkage).
func TestChebyshev(t *testing.T) {
	d := fourbar.Dimensions{Frame: 4, Crank: 5, Coupler: 2, Follower: 5, Branch: fourbar.Crossed}
	l, st := solved(t, d, rigid.Coordinate{Pos: 45 * rigid.Degree, Vel: 1})
	limits := l.Range()
	if len(limits) != 2 {
		t.Fatalf("range %v, want two intervals", limits)
	}
	near(t, "lower limit", limits[1].Lo/rigid.Degree, 36.869897645844021297, 1e-13)
	near(t, "upper limit", limits[1].Hi/rigid.Degree, 101.53695903281548769, 1e-13)
	p := st.Coupler.At(r2.Vec{X: 1})
	near(t, "x", p.Pos.X, 2.652770073425638274, 1e-14)
	near(t, "y", p.Pos.Y, 4.0053509086235489817, 1e-14)
	near(t, "vx", p.Vel.X, -5.4539454616418307155, 1e-13)
	near(t, "vy", p.Vel.Y, -0.069070285793734258249, 1e-13)
	near(t, "ax", p.Acc.X, 17.321135971997107826, 1e-12)
	near(t, "ay", p.Acc.Y, 0.16386298420132026166, 1e-12)
}

// TestWatt: the middle of the coupler draws Watt's curve
// (everything.explained.today/Watt's_curve), with half the ground a, arms b and
// half the coupler c: r² = b² − (a sin θ ± √(c² − a² cos² θ))².
func TestWatt(t *testing.T) {
	const a, b, c = 1.2, 1, 0.5
	d := fourbar.Dimensions{Frame: 2 * a, Crank: b, Coupler: 2 * c, Follower: b, Mount: rigid.Placement{X: -a}}
	_, st := solved(t, d, rigid.Coordinate{Pos: 50 * rigid.Degree, Vel: 2, Acc: 1})
	p := st.Coupler.At(r2.Vec{X: c})
	near(t, "x", p.Pos.X, -0.060921272756444554667, 1e-15)
	near(t, "y", p.Pos.Y, 0.70525688983701078914, 1e-15)
	near(t, "vx", p.Vel.X, -1.7544565540426190878, 1e-14)
	near(t, "vy", p.Vel.Y, -0.52991318910777030079, 1e-14)
	near(t, "ax", p.Acc.X, -12.380547821686254547, 1e-13)
	near(t, "ay", p.Acc.Y, -21.219485072987394836, 1e-13)
	rr := r2.Norm2(p.Pos)
	sin, cos := p.Pos.Y/math.Sqrt(rr), p.Pos.X/math.Sqrt(rr)
	root := math.Sqrt(c*c - a*a*cos*cos)
	plus, minus := b*b-(a*sin+root)*(a*sin+root), b*b-(a*sin-root)*(a*sin-root)
	near(t, "distance from Watt's curve", min(math.Abs(rr-plus), math.Abs(rr-minus)), 0, 1e-14)
}
