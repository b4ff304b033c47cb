package fourbar

import (
	"errors"
	"math"

	"example.com/twopoint/internal/dims"
	"example.com/twopoint/rigid"
)

// Reasons why the linkage that Freudenstein's equation gives for three precision
// positions is of no use.
var (
	// ErrBranch: the precision positions lie on different branches, or in different
	// pieces of the crank's range, or a change point lies between them.
	ErrBranch = errors.New("twopoint: no motion joins the precision positions")
	// ErrOrder: the motion passes the precision positions in another order, or with
	// more or fewer turns of the follower than asked for.
	ErrOrder = errors.New("twopoint: the precision positions are passed in another order")
)

// A Precision is a pair of angles, in rad, that a function generator must pass: of
// the crank and of the follower, each from a zero mark of its own.
type Precision struct{ Turn, Swing float64 }

// A Generator is a four-bar that generates a function. Where the zero marks of
// crank and follower do not lie along the links, the linkage's own angles are the
// precision angles plus TurnZero and SwingZero, each 0 or π.
type Generator struct {
	Dimensions          Dimensions
	TurnZero, SwingZero float64
}

// Freudenstein returns the four-bar with a given frame, in m, whose crank and
// follower, measured from the frame's line, pass three precision positions in the
// order given. By Freudenstein's equation (F. Freudenstein, Approximate synthesis
// of four-bar linkages, Transactions of the ASME 77, 1955; from memory)
//
//	K1 cos θ4 − K2 cos θ2 + K3 = cos(θ2 − θ4)
//	K1 = d/a,  K2 = d/c,  K3 = (a² − b² + c² + d²)/(2ac)
//
// with θ2 the crank's angle and θ4 the follower's. A negative a or c is a link that
// lies the other way.
//
// A solution of the equation may still not do: ErrBranch and ErrOrder. The crank
// must pass the positions in one direction: Turn of the second between those of the
// first and the third (else ErrOrder). An error that wraps ErrSingular where the
// positions do not determine the lengths, ErrUnreachable where they ask for links
// without end; ErrNotFinite for an angle that is not finite, and for a frame that
// is no length a *rigid.DimensionError.
func Freudenstein(frame float64, at [3]Precision) (Generator, error) {
	if err := dims.Length(frame); err != nil {
		return Generator{}, &rigid.DimensionError{Name: "Frame", Value: frame, Err: err}
	}
	for _, p := range at {
		if dims.Number(p.Turn-p.Swing) != nil || dims.Number(p.Turn+p.Swing) != nil {
			return Generator{}, rigid.ErrNotFinite
		}
	}
	g, err := generator(frame, at)
	if err != nil {
		return Generator{}, err
	}
	return g, g.check(at)
}

// generator solves Freudenstein's equation. The differences of the second and third
// from the first leave two equations for K1 and K2.
func generator(d float64, at [3]Precision) (Generator, error) {
	var p, q, w [2]float64
	for i := range 2 {
		x, o := at[i+1], at[0]
		p[i] = lessCos(x.Swing, o.Swing)
		q[i] = -lessCos(x.Turn, o.Turn)
		w[i] = lessCos(x.Turn-x.Swing, o.Turn-o.Swing)
	}
	det := p[0]*q[1] - p[1]*q[0]
	if scale := math.Hypot(p[0], p[1]) * math.Hypot(q[0], q[1]); !(math.Abs(det) > 1e-13*scale) {
		return Generator{}, errPositions
	}
	k1, k2 := (w[0]*q[1]-w[1]*q[0])/det, (p[0]*w[1]-p[1]*w[0])/det
	k3 := math.Cos(at[0].Turn-at[0].Swing) - k1*math.Cos(at[0].Swing) + k2*math.Cos(at[0].Turn)
	a, c := d/k1, d/k2
	b2 := a*a + c*c + d*d - 2*a*c*k3
	if math.IsInf(a, 0) || math.IsInf(c, 0) || !(b2 > 0) {
		return Generator{}, errEndless
	}
	g := Generator{Dimensions: Dimensions{Frame: d, Crank: math.Abs(a), Coupler: math.Sqrt(b2), Follower: math.Abs(c)}}
	if a < 0 {
		g.TurnZero = math.Pi
	}
	if c < 0 {
		g.SwingZero = math.Pi
	}
	return g, nil
}

// lessCos returns cos x − cos y, of near angles too.
func lessCos(x, y float64) float64 { return -2 * math.Sin((x+y)/2) * math.Sin((x-y)/2) }

// check sets the branch and follows the motion through the precision positions.
func (g *Generator) check(at [3]Precision) error {
	first, last := at[0].Turn, at[2].Turn
	if middle := at[1].Turn; middle == first || middle == last || (first < middle) != (middle < last) {
		return ErrOrder
	}
	var l *Linkage
	var start State
	for _, g.Dimensions.Branch = range []Branch{Open, Crossed} {
		var err error
		if l, err = New(g.Dimensions); err != nil {
			return rigid.ErrUnreachable
		}
		if l.Solve(&start, rigid.Coordinate{Pos: first + g.TurnZero}) == nil && g.off(&start, at[0]) < missed {
			break
		}
	}
	if l.parted(first+g.TurnZero, last+g.TurnZero) {
		return ErrBranch
	}
	for _, p := range at {
		var st State
		if l.Solve(&st, rigid.Coordinate{Pos: p.Turn + g.TurnZero}) != nil || g.off(&st, p) > missed {
			return ErrBranch
		}
		if math.Abs((st.Swing.Pos-start.Swing.Pos)-(p.Swing-at[0].Swing)) > missed {
			return ErrOrder
		}
	}
	return nil
}

// missed is the angle, in rad, by which a linkage that is on the other branch, or
// a turn away, misses a precision position at least, and one on the right branch
// never does.
const missed = 1e-6

// off returns by what angle the follower misses a precision position.
func (g *Generator) off(st *State, p Precision) float64 {
	return math.Abs(rigid.Wrap(st.Swing.Pos - g.SwingZero - p.Swing))
}

// parted reports whether a crank that goes from one angle to another leaves its
// range or meets a change point.
func (l *Linkage) parted(from, to float64) bool {
	from, to = min(from, to), max(from, to)
	for _, x := range l.flattened() {
		if _, ok := (rigid.Interval{Lo: from, Hi: to}).Angle(x); ok {
			return true
		}
	}
	if l.turns {
		return false
	}
	for _, r := range l.Range() {
		if in, ok := r.Angle(from); ok {
			return in+(to-from) > r.Hi
		}
	}
	return true
}
