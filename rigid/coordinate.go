package rigid

import "math"

// A Coordinate is the motion of one scalar: the angle of a revolute joint in
// rad, or the displacement of a prismatic joint in m, with its first and second
// derivatives by time, per s and per s². The zero Coordinate is at 0 and at rest.
type Coordinate struct{ Pos, Vel, Acc float64 }

// After returns the coordinate dt seconds later (earlier, for a negative dt) if
// its acceleration stays as it is:
//
//	Pos + Vel·dt + Acc·dt²/2,  Vel + Acc·dt,  Acc
//
// It makes up for the latency of a measurement, or looks ahead.
func (c Coordinate) After(dt float64) Coordinate {
	return Coordinate{
		Pos: c.Pos + (c.Vel+c.Acc*dt/2)*dt,
		Vel: c.Vel + c.Acc*dt,
		Acc: c.Acc,
	}
}

// An Interval is the range of a scalar, in its unit. Intervals that the library
// returns for an angle start in [−π, π); one given to it may lie anywhere and
// span many revolutions. The zero Interval holds 0 alone.
type Interval struct{ Lo, Hi float64 }

// Contains reports whether x lies in the interval, both ends included.
func (i Interval) Contains(x float64) bool { return i.Lo <= x && x <= i.Hi }

// Angle returns x plus the whole revolutions that bring it into the interval,
// and whether there are any. An angle that lies inside comes back as it is; of
// several that would do it is the least (the greatest, where Lo is −Inf). One that
// misses an end by no more than the rounding of x, 2.2e-16·|x|, counts as that
// end, since the sum of an end and some revolutions is rounded so. Where there is
// none, and for an x that is not finite, it returns x and false.
func (i Interval) Angle(x float64) (float64, bool) {
	if i.Contains(x) && !math.IsInf(x, 0) {
		return x, true
	}
	const epsilon = 0x1p-52
	slack := Interval{i.Lo - epsilon*math.Abs(x), i.Hi + epsilon*math.Abs(x)}
	w := Wrap(x)
	k, step := math.Ceil((i.Lo-w)/Revolution)-1, 1.0
	if math.IsInf(i.Lo, -1) {
		k, step = math.Floor((i.Hi-w)/Revolution)+1, -1
	}
	for range 3 { // the quotient is rounded
		// w is exact and the sum rounded once: over a whole turn there are no gaps
		y := math.FMA(k, Revolution, w)
		if i.Lo <= i.Hi && slack.Contains(y) {
			return min(max(y, i.Lo), i.Hi), true
		}
		k += step
	}
	return x, false
}
