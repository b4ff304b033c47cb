package fourbar

import (
	"math"
	"slices"

	"example.com/twopoint/internal/enum"
	"example.com/twopoint/rigid"
)

// A Class tells by Grashof's condition which links of a four-bar turn fully. With
// s and l the shortest and the longest link, p and q the others, one link turns
// fully against the rest where s + l < p + q; none does where s + l > p + q; at a
// change point, s + l = p + q, all links can fall into one line.
type Class uint8

// The classes. The shortest link is the one that turns fully on both its
// neighbours, and where it stands gives the name.
const (
	NoClass      Class = iota // of a linkage that is not from New
	CrankRocker               // s + l < p + q, the crank shortest: it turns, the follower swings
	DoubleCrank               // s + l < p + q, the frame shortest: crank and follower turn
	RockerCrank               // s + l < p + q, the follower shortest: it turns, the crank swings
	DoubleRocker              // s + l < p + q, the coupler shortest: it turns, crank and follower swing
	TripleRocker              // s + l > p + q: no link turns fully; the double rocker without Grashof's condition
	// Change points: s + l = p + q.
	ChangePointCrankRocker  // the crank shortest
	ChangePointDoubleCrank  // the frame shortest
	ChangePointRockerCrank  // the follower shortest
	ChangePointDoubleRocker // the coupler shortest
	Parallelogram           // opposite links equal; also the antiparallelogram
	Kite                    // neighbouring links equal in two pairs
	Rhombus                 // all links equal
)

var classes = enum.Names[Class]{Type: "Class", Wrong: rigid.ErrInput, Of: []string{
	"no class", "crank-rocker", "double-crank", "rocker-crank", "double-rocker", "triple-rocker",
	"change-point crank-rocker", "change-point double-crank", "change-point rocker-crank", "change-point double-rocker",
	"parallelogram", "kite", "rhombus",
}}

// String returns the class's name in lower case.
func (c Class) String() string { return classes.String(c) }

// MarshalText returns the class's name in lower case; ErrInput for an unknown one.
func (c Class) MarshalText() ([]byte, error) { return classes.Text(c) }

// UnmarshalText reads a class's name in lower case; any other text is an error that
// wraps ErrInput and tells the names.
func (c *Class) UnmarshalText(text []byte) error { return classes.Read(c, text) }

// ChangePoint reports whether all links can fall into one line.
func (c Class) ChangePoint() bool { return ChangePointCrankRocker <= c && c <= Rhombus }

// Class returns the linkage's class. Lengths come as decimals, whose sums are
// rounded, so |s + l − p − q| up to 4 units of rounding (2⁻⁵²) of the longest link
// counts as a change point. It does not depend on Branch.
func (l *Linkage) Class() Class {
	if l.longest == 0 {
		return NoClass
	}
	tol := equal * l.longest
	same := func(x, y float64) bool { return math.Abs(x-y) <= tol }
	least, excess := l.grashof()
	shortest := slices.Index([]float64{l.crank, l.frame, l.follower, l.coupler}, least)
	switch {
	case excess > tol:
		return CrankRocker + Class(shortest)
	case excess < -tol:
		return TripleRocker
	case same(least, l.longest):
		return Rhombus
	case same(l.frame, l.coupler) && same(l.crank, l.follower):
		return Parallelogram
	case same(l.frame, l.crank) && same(l.coupler, l.follower), same(l.frame, l.follower) && same(l.crank, l.coupler):
		return Kite
	}
	return ChangePointCrankRocker + Class(shortest)
}

// Grashof returns how far the linkage is from a change point, as the measure
//
//	(p + q − s − l)/(s + l)
//
// which is positive where a link turns fully, 0 at a change point, and does not
// depend on size. NaN for a linkage that is not from New.
func (l *Linkage) Grashof() float64 {
	least, excess := l.grashof()
	return excess / (least + l.longest)
}

// grashof returns s and p + q − s − l, as (p − s) − (l − q), which is exact where
// the lengths are near one another.
func (l *Linkage) grashof() (least, excess float64) {
	x := [...]float64{l.frame, l.crank, l.coupler, l.follower}
	slices.Sort(x[:])
	return x[0], (x[1] - x[0]) - (x[3] - x[2])
}
