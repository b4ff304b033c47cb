package fourbar

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/trig"
	"example.com/twopoint/rigid"
)

// Solve writes into dst the motion of all links for a motion of the crank, in rad,
// rad/s and rad/s². Turn is the input as given, Swing goes on over any number of
// turns, as Coefficients has it. Solve gives every field of dst; where it returns an
// error it leaves dst as it was:
//
//   - ErrUnreachable: Turn.Pos lies outside Range;
//   - ErrSingular: Margin is below rigid.LeastMargin, at a limit of the crank or a
//     change point, and turn has a velocity or acceleration; or, of a kite with
//     Crank = Frame and Coupler = Follower, the two fixed joints of the coupler and
//     the follower fall together, which leaves their place open;
//   - ErrNotFinite: a number of turn is NaN or infinite, or a result would overflow;
//   - ErrInput: the linkage is not from New.
//
// A crank at rest, with velocity and acceleration 0, asks for the place alone,
// which a limit of the crank has too. Within rounding of a limit counts as at it,
// with Margin 0. Parallel and Contrary have rates in their flattened positions too,
// where Margin is 0: it tells how well the coupler drives the follower there, not
// whether the motion is determined.
func (l *Linkage) Solve(dst *State, turn rigid.Coordinate) error {
	k, w, al, ww := &l.byCrank, turn.Vel, turn.Acc, turn.Vel*turn.Vel
	sin, cos := trig.Sincos(turn.Pos)
	ax, ay := k.arm*cos, k.arm*sin
	dx := k.base - ax // d = (dx, −ay)
	d2 := dx*dx + ay*ay
	x, u, v, ff := k.dyad.Sides(d2)
	root := math.Sqrt(ff)
	margin := root * k.dyad.IG
	if rate := ww + al*al; !(margin > l.quick.least && rate > 0 && rate < 1e100) {
		return l.solveRare(dst, turn)
	}

	// What the root is not needed for, while it is on its way: m·d and −m×d.
	i, c := 1/d2, l.side/ff
	dot, cross, mm := ax*dx-ay*ay, k.base*ay, ww
	if k.long {
		dot, mm = k.base*dx, -ww
	}
	ex, ey := i*dx, i*ay
	di, ci := i*dot, i*cross

	// The directions of R = (u d + F d⊥)/2d² and Q = (v d + F d⊥)/2d², and the
	// factors that bring them to length 1: see dyad's unit.
	f := l.side * root
	along, across := l.quick.hb*u, l.quick.hb*f
	rx, ry := along*ex+across*ey, across*ex-along*ey
	along, across = l.quick.hc*v, l.quick.hc*f
	qx, qy := along*ex+across*ey, across*ex-along*ey
	nr, nq := 1.5-0.5*(rx*rx+ry*ry), 1.5-0.5*(qx*qx+qy*qy)

	// The rates, by 2m·R, −2m×R and the same of Q.
	fd, fc := f*di, f*ci
	rd, rc := u*di+fc, u*ci-fd
	qd, qc := v*di+fc, v*ci-fd
	c *= root // 1/F
	cw := c * w
	w3, w4 := cw*qc, cw*rc
	ww3, ww4 := w3*w3, w4*w4
	g3, g4 := ww3*x+ww4*k.dyad.CC, ww3*k.dyad.BB+ww4*x
	if d2 < k.dyad.Short {
		e := 2 * cw * cross * (w3 + w4) // ω4² − ω3²
		g3, g4 = k.dyad.CC*e-ww3*v, ww4*u-k.dyad.BB*e
	}
	al3 := c * (al*qc + mm*qd - g3)
	al4 := c * (al*rc + mm*rd + g4)
	if k.long {
		w3, w4, al3, al4 = w3+w, w4+w, al3+al, al4+al
	}

	mx, my := l.axis.X, l.axis.Y
	px, py := mx*cos-my*sin, mx*sin+my*cos
	m := &dst.Crank
	m.Pose.Origin = l.origin
	m.Pose.Axis.X, m.Pose.Axis.Y = px, py
	m.Vel, m.Acc = r2.Vec{}, r2.Vec{}
	m.Omega, m.Alpha = w, al

	px, py = k.arm*px, k.arm*py
	ux, uy := nr*rx, nr*ry
	m = &dst.Coupler
	m.Pose.Origin.X, m.Pose.Origin.Y = l.origin.X+px, l.origin.Y+py
	m.Pose.Axis.X, m.Pose.Axis.Y = mx*ux-my*uy, mx*uy+my*ux
	m.Vel.X, m.Vel.Y = -w*py, w*px
	m.Acc.X, m.Acc.Y = -al*py-ww*px, al*px-ww*py
	m.Omega, m.Alpha = w3, al3

	vx, vy := nq*qx, nq*qy
	m = &dst.Follower
	m.Pose.Origin = l.pivot
	m.Pose.Axis.X, m.Pose.Axis.Y = mx*vx-my*vy, mx*vy+my*vx
	m.Vel, m.Acc = r2.Vec{}, r2.Vec{}
	m.Omega, m.Alpha = w4, al4

	knee, lean := rigid.Left, rigid.Left
	if ux*sin < uy*cos {
		knee = rigid.Right
	}
	if cos*vy < sin*vx {
		lean = rigid.Right
	}
	dst.Branch, dst.Knee, dst.Lean, dst.Margin = l.dim.Branch, knee, lean, min(margin, 1)
	dst.Turn = turn
	dst.Swing.Vel, dst.Swing.Acc = w4, al4
	swing := trig.AngleOf(qx, qy, nq)
	if !(swing >= l.winding.least && swing <= l.winding.most) {
		swing = l.wind(turn.Pos, swing)
	}
	dst.Swing.Pos = swing
	dst.Transmission = trig.AngleOf(-x*k.dyad.IG, margin, 1)
	return nil
}

// A kernel holds the constants of Solve's inner loop beside those of byCrank.
//
// That is one long function for the sake of speed: its numbers stay in registers,
// where in the parts that solveRare is made of they go through memory from one to
// the next. What is out of the ordinary is left to those.
//
// In the mechanism's own axes let R and Q be the vectors along coupler and follower
// to their common pin, d = R − Q from the crank pin to the follower pivot, F = 2 R×Q
// and, seen from the frame, m the vector along the crank. The first and second
// derivative of m + R = Q + const are, with the crank's ω and α,
//
//	ω×m + ω3×R − ω4×Q = 0,  α×m − ω²m + α3×R − ω3²R − α4×Q + ω4²Q = 0
//
// and their scalar products with Q and R, for R·R = b², Q·Q = c² and R·Q = −x/2,
// x = d² − b² − c²,
//
//	ω3 = −2ω m×Q/F,  α3 = −2(α m×Q − ω² m·Q + ω3² x/2 + ω4² c²)/F
//	ω4 = −2ω m×R/F,  α4 = −2(α m×R − ω² m·R − ω3² b² − ω4² x/2)/F
//
// Where d is short R and Q may be nearly one vector, and so the last two terms of α3,
// and of α4, nearly cancel. With ω4 − ω3 = −2ω m×d/F there
//
//	ω3² x/2 + ω4² c² = (ω4² − ω3²) c² − ω3² v/2,  v = b² − c² − d²
//	ω3² b² + ω4² x/2 = ω4² u/2 − (ω4² − ω3²) b²,  u = b² − c² + d²
//
// A crank much longer than the frame has all links turn almost as one, and seen from
// the frame their accelerations are small differences of large terms. There it looks
// from the crank, with −m the vector along the frame, which turns at −ω: ω×m and α×m
// keep their signs, ω²m changes its own, and ω and α are added in the end.
type kernel struct {
	least  float64 // Margin above which nothing is out of the ordinary
	hb, hc float64 // 1/2b, 1/2c
}

func (l *Linkage) newKernel() kernel {
	k := kernel{least: max(rigid.LeastMargin, l.byCrank.near), hb: 0.5 / l.coupler, hc: 0.5 / l.follower}
	if l.dim.Branch > Crossed || l.longest > 1e6*min(l.frame, l.crank, l.coupler, l.follower) {
		k.least = math.Inf(1)
	}
	return k
}
