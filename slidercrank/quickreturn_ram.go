package slidercrank

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dyad"
	"example.com/twopoint/rigid"
)

// A ramMotion is the motion of the rod and the ram for one of the lever, in the
// axes of the ram's guide.
type ramMotion struct {
	arm, vel, acc r2.Vec // of the output pin: its place from the lever pivot
	rod           dyad.Rod
	omega, alpha  float64 // of the rod
	travel        rigid.Coordinate
	margin        float64
}

// push solves the ram for the motion of the lever. The output pin is at foot + arm,
// and the rod from there to the guide is an RRP dyad; without a rod the ram goes
// with the pin's x.
func (q *QuickReturn) push(r *ramMotion, m *slotMotion) error {
	q.carry(r, m)
	r.margin = m.margin
	if q.byArm.L == 0 {
		r.travel = rigid.Coordinate{Pos: q.foot.X + r.arm.X, Vel: 0 + r.vel.X, Acc: 0 + r.acc.X} // no −0 at rest
		return r.finite()
	}
	var ok bool
	if r.rod, ok = q.reach(r.arm); !ok {
		return rigid.ErrUnreachable
	}
	r.travel = rigid.Coordinate{Pos: q.foot.X + r.arm.X + r.rod.Xi}
	r.margin = min(m.margin, q.byArm.Margin(r.rod))
	if settle(r.rod.Xi, q.byArm.L, q.loose(r.arm, m.slide.Pos)) == 0 {
		r.margin = 0
	}
	if m.turn.Vel == 0 && m.turn.Acc == 0 {
		return nil
	}
	if r.margin < rigid.LeastMargin {
		return rigid.ErrSingular
	}
	r.omega, r.travel.Vel = r.rod.Rates(r.vel)
	r.alpha, r.travel.Acc = r.rod.Rates(q.byArm.Bias(r.rod, r.acc, r.omega))
	return r.finite()
}

// carry sets the motion of the output pin, which the lever carries.
func (q *QuickReturn) carry(r *ramMotion, m *slotMotion) {
	r.arm = r2.Scale(q.arm, turned(q.toPin, m.line))
	r.vel, r.acc = swung(r.arm, m.swing.Vel, m.swing.Acc)
}

// reach places the rod for the arm a, square to the guide where it is too short by
// a rounding, and reports whether it reaches.
func (q *QuickReturn) reach(a r2.Vec) (dyad.Rod, bool) {
	eta := -q.foot.Y - a.Y
	if over := math.Abs(eta) - q.byArm.L; over > 0 && over <= beyond*q.size {
		eta = math.Copysign(q.byArm.L, eta)
	}
	return q.byArm.Place(eta, q.side)
}

// loose returns the size of what the height of the arm's pin is rounded by: its
// terms, and what a rounding of the crank's angle moves it by. A lever turns at ξ/σ
// times the speed of its crank, |ξ| ≤ r: see solveSwing.
func (q *QuickReturn) loose(a r2.Vec, sigma float64) float64 {
	k := &q.form
	return math.Abs(q.foot.Y) + math.Abs(a.Y) + math.Abs(a.X)*(1+(k.r+k.c+math.Abs(k.e))/sigma)
}

// finite returns ErrNotFinite if a rate overflows.
func (r *ramMotion) finite() error {
	if (r.acc.X+r.acc.Y+r.omega+r.alpha+r.travel.Vel+r.travel.Acc)*0 != 0 {
		return rigid.ErrNotFinite
	}
	return nil
}

// write writes the whole state, adding Mount's origin last.
func (q *QuickReturn) write(dst *QuickReturnState, m *slotMotion, r *ramMotion) {
	q.form.write(&dst.Crank, &dst.Block, &dst.Lever, m)
	dst.Turn, dst.Swing, dst.Slide = m.turn, m.swing, m.slide
	dst.Slot, dst.Knee, dst.Margin = q.given.Slot, knee(m.crank, m.line), r.margin
	u, pin := q.ram, turned(q.ram, r.arm)
	axis := u
	if q.byArm.L != 0 {
		axis = q.byArm.Axis(r.rod, u)
	}
	setPinned(&dst.Rod, q.form.pivot, pin, m.swing.Vel, m.swing.Acc, axis, r.omega, r.alpha)
	setGuided(&dst.Ram, q.zero, u, r2.Vec{}, &r.travel)
	unsign(&dst.Rod, &dst.Ram)
	dst.Travel = r.travel
	dst.Elbow = rigid.Left
	if q.elbow(r) < 0 {
		dst.Elbow = rigid.Right
	}
}

// elbow returns a number that is positive where the output pin lies left of the
// line from the lever pivot to the ram pin, negative where it lies right: the ram
// pin is at arm + rod from the pivot, or at infinity along the travel.
func (q *QuickReturn) elbow(r *ramMotion) float64 {
	if q.byArm.L == 0 {
		return r.arm.Y
	}
	return r.rod.Xi*r.arm.Y - r.rod.Eta*r.arm.X
}

// SolveTravel writes into dst the motion of all links for a motion of the ram,
// travel in m along Guide. Of the two places of the lever elbow picks the one with
// its output pin on that side of the line from the lever pivot to the ram pin;
// without a rod, of the line through the lever pivot along the travel. Of the two
// places of the crank that the lever then has, knee picks one as SolveSwing of
// SlottedLever says: Left is the quick stroke, Right the slow one. A State's own
// Travel, Elbow and Knee give the State back, with Turn.Pos in (−π, π].
//
// Margin is the lesser of |sin| of the angle between arm and rod, or travel and
// arm's normal, and that of SolveSwing, 0 at the dead centres and where no more than
// the rounding of the travel keeps the ram from one.
// Errors: ErrUnreachable out of reach, and where the pose is that of the other
// Branch; ErrSingular for rates where Margin is below rigid.LeastMargin;
// ErrNotFinite; ErrInput for a zero QuickReturn or an unknown side. An error leaves
// dst as it was.
func (q *QuickReturn) SolveTravel(dst *QuickReturnState, travel rigid.Coordinate, elbow, knee rigid.Side) error {
	if travel.Pos*0+travel.Vel*0+travel.Acc*0 != 0 {
		return rigid.ErrNotFinite
	}
	if q.arm == 0 || elbow != rigid.Left && elbow != rigid.Right {
		return rigid.ErrInput
	}
	var r ramMotion
	swing, err := q.pull(&r, travel, elbow)
	if err != nil {
		return err
	}
	var m slotMotion
	if err := q.form.solveSwing(&m, swing, knee); err != nil {
		return err
	}
	m.swing.Pos = q.form.follow(swing.Pos, m.turn.Pos)
	q.carry(&r, &m)
	r.rod = dyad.Rod{Xi: travel.Pos - q.foot.X - r.arm.X, Eta: -q.foot.Y - r.arm.Y}
	r.travel, r.margin = travel, min(r.margin, m.margin)
	if err := r.finite(); err != nil {
		return err
	}
	q.write(dst, &m, &r)
	dst.Elbow, dst.Knee = elbow, knee
	return nil
}

// pull finds the motion of lever and rod for one of the ram: the triangle of arm and
// rod, an RRR dyad between the lever pivot, at rest, and the ram pin; without a rod,
//
//	arm·exp(iχ) = x + iy,  x = travel − foot.X,  v = −yχ',  a = −yχ'' − xχ'²
//
// A rounding of the travel turns the arm by loose. Where that is all there is between
// the lever and a limit of its own, the lever is there.
func (q *QuickReturn) pull(r *ramMotion, travel rigid.Coordinate, elbow rigid.Side) (swing rigid.Coordinate, err error) {
	side, x, off := 1-2*float64(elbow), travel.Pos-q.foot.X, equal*(math.Abs(q.foot.X)+q.arm+q.byArm.L)
	var t dyad.Triangle
	var loose float64
	if q.byArm.L == 0 {
		y, ok := leg(q.arm, x, q.size)
		if !ok {
			return swing, rigid.ErrUnreachable
		}
		y = settle(y, q.arm, math.Abs(travel.Pos)+math.Abs(q.foot.X))
		r.arm, r.margin = r2.Vec{X: x, Y: side * y}, y/q.arm
		loose = off / max(y, math.Sqrt(off*q.arm))
	} else {
		ok := q.triangle(&t, r2.Vec{X: x, Y: -q.foot.Y}, side, off)
		loose = 2 * off * (math.Abs(t.Q.X) + math.Abs(t.Q.Y)) / max(math.Abs(t.F), math.Sqrt(off*q.arm*q.byArm.L*(q.arm+q.byArm.L)))
		if !ok || -t.Q.X*q.side < -beyond*q.size*(1+q.arm*loose/off) {
			return swing, rigid.ErrUnreachable
		}
		r.arm, r.margin = t.R, q.byRam.Margin(&t)
	}
	swing.Pos = q.swingAt(r.arm)
	for _, limit := range q.swings {
		if math.Abs(rigid.Wrap(swing.Pos-limit)) <= loose {
			swing.Pos = limit
		}
	}
	if travel.Vel == 0 && travel.Acc == 0 {
		return swing, nil
	}
	if r.margin < rigid.LeastMargin {
		return swing, rigid.ErrSingular
	}
	if q.byArm.L == 0 {
		swing.Vel = -travel.Vel / r.arm.Y
		swing.Acc = -(travel.Acc + x*swing.Vel*swing.Vel) / r.arm.Y
	} else {
		swing.Vel, r.omega = t.Rates(r2.Vec{X: -travel.Vel})
		swing.Acc, r.alpha = t.Rates(t.Bias(r2.Vec{X: -travel.Acc}, swing.Vel, r.omega))
	}
	return swing, nil
}

// triangle places arm and rod between the lever pivot and the ram pin, d apart,
// flat where d is no more than off from the limits of their reach, or a rounding beyond.
func (q *QuickReturn) triangle(t *dyad.Triangle, d r2.Vec, side, off float64) bool {
	l, b, c := math.Hypot(d.X, d.Y), q.byRam.B, q.byRam.C
	if min(math.Abs(l-(b+c)), math.Abs(l-math.Abs(b-c))) > off && q.byRam.Place(t, d, side) {
		return true
	}
	if l == 0 || q.byRam.Gap(l) > beyond*q.size {
		return false
	}
	q.byRam.Flatten(t, d)
	return true
}

// swingAt returns the lever's angle for the arm's direction in Guide's axes, in
// (−π, π].
func (q *QuickReturn) swingAt(arm r2.Vec) float64 {
	u := turned(turned(q.ram, arm), r2.Vec{X: q.bend.X, Y: -q.bend.Y})
	u = turned(u, r2.Vec{X: q.form.mount.Axis.X, Y: -q.form.mount.Axis.Y})
	return rigid.Wrap(math.Atan2(u.Y, u.X))
}
