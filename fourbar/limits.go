package fourbar

import (
	"cmp"
	"math"
	"slices"

	"example.com/twopoint/internal/enum"
	"example.com/twopoint/rigid"
)

// A Limit is a position where a link turns back, or where the linkage may go on in
// two ways: the crank angle, in Range, and the follower angle there, as Solve
// gives it, both in rad in the mechanism's axes.
type Limit struct {
	Turn, Swing float64
	Kind        LimitKind
}

// A LimitKind tells which links lie in one line at a Limit.
type LimitKind uint8

const (
	// Crank and coupler lie in one line, stretched or folded: an extreme of the
	// follower, that is a dead centre of the output, where the crank goes on.
	FollowerStretched LimitKind = iota
	FollowerFolded
	// Coupler and follower lie in one line, stretched or folded: an extreme of the
	// crank, a toggle position, singular for a driving crank.
	CrankStretched
	CrankFolded
	// All links lie in one line, and the motion could go on in two ways.
	ChangePoint
)

var limitKinds = enum.Names[LimitKind]{Type: "LimitKind", Wrong: rigid.ErrInput, Of: []string{"follower, stretched", "follower, folded", "crank, stretched", "crank, folded", "change point"}}

// String returns which link has its limit and how the other two lie.
func (k LimitKind) String() string { return limitKinds.String(k) }

// MarshalText returns the text of String; ErrInput for an unknown kind.
func (k LimitKind) MarshalText() ([]byte, error) { return limitKinds.Text(k) }

// UnmarshalText reads the text of String; any other text is an error that
// wraps ErrInput and tells the names.
func (k *LimitKind) UnmarshalText(text []byte) error { return limitKinds.Read(k, text) }

// Limits returns the extremes of follower and crank and the change points on the
// linkage's branch, in order of Turn. Solve accepts each at rest. Parallel and
// Contrary pass their change points, turn fully and have none. Nil for a linkage
// that is not from New.
func (l *Linkage) Limits() []Limit {
	if l.longest == 0 || l.dim.Branch > Crossed {
		return nil
	}
	ranges := l.Range()
	var all []Limit
	add := func(turn float64, kind LimitKind) {
		for _, r := range ranges {
			if in, ok := r.Angle(turn); ok {
				turn = in
			}
		}
		var st State
		if l.Solve(&st, rigid.Coordinate{Pos: turn}) == nil {
			all = append(all, Limit{Turn: turn, Swing: st.Swing.Pos, Kind: kind})
		}
	}
	folded, stretched := l.limited(l.frame, l.crank, l.coupler, l.follower)
	end := func(turn, other float64) {
		kind := CrankFolded
		if stretched && (!folded || math.Abs(turn) > math.Abs(other)) {
			kind = CrankStretched // the pin is farthest from the follower pivot at turn π
		}
		add(turn, kind)
	}
	if folded || stretched {
		for _, r := range ranges {
			end(r.Lo, r.Hi)
			end(r.Hi, r.Lo)
		}
	}
	for _, turn := range l.flattened() {
		add(turn, ChangePoint)
	}
	if turn, ok := l.extreme(l.crank + l.coupler); ok {
		add(l.side*turn, FollowerStretched)
	}
	if turn, ok := l.extreme(math.Abs(l.coupler - l.crank)); ok {
		if l.coupler > l.crank { // the follower pin lies beyond the crank pivot
			turn -= math.Pi
		} else {
			turn = -turn
		}
		add(l.side*turn, FollowerFolded)
	}
	slices.SortFunc(all, func(a, b Limit) int { return cmp.Compare(a.Turn, b.Turn) })
	return all
}

// flattened returns the crank angles, 0 or π, at which all links fall into one line.
func (l *Linkage) flattened() []float64 {
	tol := equal * l.longest
	var at []float64
	if math.Abs(math.Abs(l.frame-l.crank)-math.Abs(l.coupler-l.follower)) <= tol {
		at = append(at, 0)
	}
	if math.Abs((l.frame+l.crank)-(l.coupler+l.follower)) <= tol {
		at = append(at, math.Pi)
	}
	return at
}

// extreme returns the angle β in (0, π) at which the follower pin is seen from the
// crank pivot at distance x, crank and coupler in one line:
//
//	tan²(β/2) = (c² − (d − x)²)/((d + x)² − c²)
//
// There is none where the pin never is at x, and where all links are in one line.
func (l *Linkage) extreme(x float64) (float64, bool) {
	d, c, tol := l.frame, l.follower, equal*l.longest
	far, near := (d+x)-c, c-math.Abs(d-x)
	if far <= tol || near <= tol || x <= tol {
		return 0, false
	}
	return 2 * math.Atan2(math.Sqrt(near*(c+math.Abs(d-x))), math.Sqrt(far*(d+x+c))), true
}

// TimeRatio returns the ratio of the times of the follower's two strokes for a
// crank that turns at constant speed counter-clockwise: the crank angle from the
// least to the greatest Swing over that back. Its inverse holds for a crank that
// turns the other way. ErrUnreachable where the crank does not turn fully in one
// motion or the follower has no two extremes; ErrInput for a linkage that is not
// from New.
func (l *Linkage) TimeRatio() (float64, error) {
	if l.longest == 0 {
		return 0, rigid.ErrInput
	}
	limits := l.Limits()
	if !l.turns || len(limits) != 2 || limits[0].Kind > FollowerFolded || limits[1].Kind > FollowerFolded {
		return 0, rigid.ErrUnreachable
	}
	forth := limits[1].Turn - limits[0].Turn // from the first, counter-clockwise
	ratio := forth / (rigid.Revolution - forth)
	if limits[0].Swing > limits[1].Swing {
		ratio = 1 / ratio
	}
	return ratio, nil
}

// Transmission returns the least and the greatest transmission angle over Range:
// the angle at the follower pin between coupler and follower, in rad in [0, π].
// A good drive stays within 40° or 45° of a right angle (common practice). Where
// the crank does not turn fully they reach 0 or π. NaN for a linkage that is not
// from New.
//
// By the law of cosines, in halved angles, with x the distance from the crank pin
// to the follower pivot,
//
//	tan²(μ/2) = (x² − (b − c)²)/((b + c)² − x²)
func (l *Linkage) Transmission() (least, greatest float64) {
	if l.longest == 0 {
		return math.NaN(), math.NaN()
	}
	return l.transmission(math.Abs(l.frame - l.crank)), l.transmission(l.frame + l.crank)
}

func (l *Linkage) transmission(x float64) float64 {
	near, far := math.Abs(l.coupler-l.follower), l.coupler+l.follower
	inside := func(by float64) float64 {
		if by <= equal*l.longest { // as Class has it
			return 0
		}
		return by
	}
	return 2 * math.Atan2(math.Sqrt(inside(x-near)*(x+near)), math.Sqrt(inside(far-x)*(far+x)))
}
