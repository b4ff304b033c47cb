package fourbar

import (
	"math"
	"math/cmplx"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// A Cognate is another four-bar of which a coupler point traces the same curve.
type Cognate struct {
	Dimensions Dimensions
	Coupler    r2.Vec // the coupler point, in m in the cognate's coupler
}

// Cognates returns the two other four-bars that trace the curve of a coupler point,
// in m in the coupler, by the theorem of Roberts and Chebyshev. With z = coupler as
// a complex number, k = z/b and j = k − 1, the closure a·u2 + b·u3 = d + c·u4 may
// be multiplied by k, and by −j, and its terms put in another order:
//
//	kb·u3 + ka·u2 = kd + kc·u4      pivots O2 and O6 = O2 + kd
//	−ja·u2 + jc·u4 = −jd + jb·u3    pivots O6 and O4
//
// The first has its crank where the linkage has its, turning with the linkage's
// coupler; its own coupler turns with the linkage's crank, so SolveCoupler of the
// linkage's Turn, with lean Left for Open, Right for Crossed, follows the linkage in
// time. The second has its crank at the third pivot, turning with the linkage's crank,
// on the other Branch: Solve of the linkage's Turn follows. The Mounts turn the axes in
// which these angles are alike.
//
// Where Range has two intervals, the first's Branch is that for the first of them:
// the other may need the other. Where the first's crank does not turn fully, one
// motion of it passes both branches, and Dimensions has one of them. The cognates of
// a parallelogram are kites, which can't be driven through their flattened
// positions; Branch is then that for crank angles in (0, π), where Parallel is as
// Open, Contrary as Crossed. For a coupler point in a pin one cognate shrinks to
// nothing: its lengths are 0, which New refuses.
func (l *Linkage) Cognates(coupler r2.Vec) [2]Cognate {
	if l.longest == 0 {
		return [2]Cognate{}
	}
	d, a, b, c := l.frame, l.crank, l.coupler, l.follower
	k := complex(coupler.X/b, coupler.Y/b)
	j := complex((coupler.X-b)/b, coupler.Y/b)
	mount := l.dim.Mount
	var pair [2]Cognate
	if n := cmplx.Abs(k); n > 0 {
		first := &pair[0].Dimensions
		*first = Dimensions{Frame: n * d, Crank: n * b, Coupler: n * a, Follower: n * c, Mount: mount}
		first.Mount.Angle += cmplx.Phase(k)
		if l.leansRight() {
			first.Branch = Crossed
		}
		pair[0].Coupler = vector(complex(a/n, 0) * cmplx.Conj(k)) // the point is a·u2 from the crank pin
	}
	if n := cmplx.Abs(j); n > 0 {
		second := &pair[1].Dimensions
		*second = Dimensions{Frame: n * d, Crank: n * a, Coupler: n * c, Follower: n * b}
		o6 := mount.Pose().Point(vector(k * complex(d, 0)))
		second.Mount = rigid.Placement{X: o6.X, Y: o6.Y, Angle: mount.Angle + cmplx.Phase(-j)}
		if !l.crossed() {
			second.Branch = Crossed
		}
		pair[1].Coupler = vector(complex(c/n, 0) * k * cmplx.Conj(j)) // the point is kc·u4 from the crank pin
	}
	return pair
}

func vector(z complex128) r2.Vec { return r2.Vec{X: real(z), Y: imag(z)} }

// crossed reports whether the linkage is on Crossed: Contrary is so for crank angles
// in (0, π).
func (l *Linkage) crossed() bool { return l.dim.Branch == Crossed || l.dim.Branch == Contrary }

// leansRight reports the Lean of the linkage in its range, at that of some
// positions where it is clearest; of Contrary, for crank angles in (0, π).
func (l *Linkage) leansRight() bool {
	r, most := l.Range()[0], 0.0
	if l.dim.Branch == Contrary {
		r.Lo = 0
	}
	for i := range 8 {
		var st State
		if l.Solve(&st, rigid.Coordinate{Pos: r.Lo + (r.Hi-r.Lo)*(float64(i)+0.5)/8}) != nil {
			continue
		}
		if sin := r2.Cross(st.Crank.Pose.Axis, st.Follower.Pose.Axis); math.Abs(sin) > math.Abs(most) {
			most = sin
		}
	}
	return most < 0
}
