package slidercrank

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dims"
	"example.com/twopoint/rigid"
)

// RodDimensions are those of a SliderRod and where it is mounted. Both guides pass
// through the origin of the mechanism's own axes: end A of the rod runs on their x
// axis, end B on the line at Angle to it. More fields may come: write keyed
// literals.
type RodDimensions struct {
	Length float64         `json:"length"` // of the rod from A to B, m
	Angle  float64         `json:"angle"`  // of B's guide from A's, rad; π/2 for the elliptical trammel
	Mount  rigid.Placement `json:"mount"`  // of the mechanism's own axes in the machine
}

// RodState is the motion of a SliderRod at one instant. Rod has its origin at A and
// its x axis to B; A and B are the sliders, each with its origin at its pin and its
// x axis along its guide. The Coordinates are in the mechanism's own axes, without
// Mount. More fields may come.
type RodState struct {
	Rod, A, B      rigid.Motion
	Turn           rigid.Coordinate // of the rod from A's guide
	SlideA, SlideB rigid.Coordinate // from the crossing of the guides, along A's guide and along B's
	KneeA, KneeB   rigid.Side       // that give this pose to SolveA and to SolveB
	Margin         float64
}

// A SliderRod is a rod whose ends run on two guides that cross at any angle. Every
// point of the rod draws an ellipse about the crossing. The zero SliderRod gives
// ErrInput. Any number of goroutines may share one.
type SliderRod struct {
	given    RodDimensions
	l        float64
	sin, cos float64 // of Angle
	mount    rigid.Pose
	guideB   r2.Vec // unit vector along B's guide, in the frame
}

// NewSliderRod checks the dimensions and returns the rod. Errors are
// *rigid.DimensionError, joined if several: Length must be a positive length and
// Angle must leave the guides out of parallel, |sin Angle| > 1e-9, else
// rigid.ErrSingular.
func NewSliderRod(d RodDimensions) (*SliderRod, error) {
	var f dims.Faults
	f.Length("Length", d.Length)
	f.Number("Angle", d.Angle)
	f.Mount(d.Mount)
	sin, cos := math.Sincos(d.Angle)
	if math.Abs(sin) <= parallel {
		f.Add("Angle", d.Angle, errParallel)
	}
	if !f.OK() {
		return nil, f.Err()
	}
	m := d.Mount.Pose()
	return &SliderRod{given: d, l: d.Length, sin: sin, cos: cos, mount: m, guideB: turned(m.Axis, r2.Vec{X: cos, Y: sin})}, nil
}

// Dimensions returns what NewSliderRod was given.
func (s *SliderRod) Dimensions() RodDimensions { return s.given }

// Solve writes into dst the motion of rod and sliders for a turn of the rod, in rad
// from A's guide to the direction from A to B. With γ for Angle and θ for turn,
//
//	SlideB = L sin θ/sin γ,  SlideA = L(sin θ cot γ − cos θ) = L sin(θ − γ)/sin γ
//
// Margin is |sin Angle|. Errors: ErrNotFinite; ErrInput for a zero SliderRod. An
// error leaves dst as it was.
func (s *SliderRod) Solve(dst *RodState, turn rigid.Coordinate) error {
	if turn.Pos*0+turn.Vel*0+turn.Acc*0 != 0 {
		return rigid.ErrNotFinite
	}
	if s.l == 0 {
		return rigid.ErrInput
	}
	sin, cos := math.Sincos(turn.Pos)
	return s.write(dst, r2.Vec{X: cos, Y: sin}, turn, s.slideA(sin, cos, turn), s.slideB(sin, cos, turn), math.Abs(s.sin))
}

func (s *SliderRod) slideA(sin, cos float64, turn rigid.Coordinate) rigid.Coordinate {
	return harmonic(-s.l, s.l*s.cos/s.sin, sin, cos, turn.Vel, turn.Acc)
}

func (s *SliderRod) slideB(sin, cos float64, turn rigid.Coordinate) rigid.Coordinate {
	return harmonic(0, s.l/s.sin, sin, cos, turn.Vel, turn.Acc)
}

// SolveA writes into dst the motion of rod and sliders for a motion of A along its
// guide, slide in m from the crossing. Of the two places of B on its guide, knee
// picks one by the side of the perpendicular dropped from A on B's guide, taken to
// the left of that guide: Left is where SlideB is less than at its foot, Right
// where it is greater.
//
// Turn.Pos is in (−π, π]; Margin is |sin| of the angle between the rod and the
// normal of B's guide. Errors: ErrUnreachable where A is farther from B's guide
// than the rod is long; ErrSingular for rates where Margin is below
// rigid.LeastMargin; ErrNotFinite; ErrInput for a zero SliderRod or an unknown
// knee. An error leaves dst as it was.
func (s *SliderRod) SolveA(dst *RodState, slide rigid.Coordinate, knee rigid.Side) error {
	axis, turn, other, margin, err := s.lean(slide, knee, r2.Vec{X: s.cos, Y: s.sin}, 1)
	if err != nil {
		return err
	}
	return s.write(dst, axis, turn, slide, other, margin)
}

// SolveB is SolveA with A and B exchanged: knee picks the place of A on its guide,
// Left where SlideA is less than at the foot of the perpendicular from B.
func (s *SliderRod) SolveB(dst *RodState, slide rigid.Coordinate, knee rigid.Side) error {
	axis, turn, other, margin, err := s.lean(slide, knee, r2.Vec{X: 1}, -1)
	if err != nil {
		return err
	}
	return s.write(dst, axis, turn, other, slide, margin)
}

// lean solves the rod for a motion of one end, with the other on the guide along u.
// Seen along u the driven end is at ∓s sin γ to the left of that guide and the foot of
// its perpendicular at s cos γ, so that the vector to the other end is (ξ, η), with
// η = ±s sin γ, and that end at s cos γ + ξ; sign is +1 where the driven end is A, from
// which the rod's axis points, and −1 where it is B,
//
//	axis·L = sign·(ξ + iη)·u
func (s *SliderRod) lean(slide rigid.Coordinate, knee rigid.Side, u r2.Vec, sign float64) (axis r2.Vec, turn, other rigid.Coordinate, margin float64, err error) {
	k := sign * s.sin
	xi, turn, err := legs(s.l, k, slide, knee)
	if err != nil {
		return axis, turn, other, 0, err
	}
	axis = turned(u, r2.Vec{X: sign * xi.Pos / s.l, Y: sign * k * slide.Pos / s.l})
	turn.Pos = rigid.Wrap(math.Atan2(axis.Y, axis.X))
	return axis, turn, past(s.cos, slide, xi), math.Abs(xi.Pos) / s.l, nil
}

// write writes the state, or leaves it and returns ErrNotFinite where a rate
// overflows.
func (s *SliderRod) write(dst *RodState, axis r2.Vec, turn, a, b rigid.Coordinate, margin float64) error {
	w2 := turn.Vel * turn.Vel
	if (a.Vel+a.Acc+b.Vel+b.Acc+turn.Vel+turn.Acc+w2+s.l*(math.Abs(turn.Acc)+w2))*0 != 0 {
		return rigid.ErrNotFinite
	}
	setGuided(&dst.A, s.mount.Origin, s.mount.Axis, r2.Vec{}, &a)
	setGuided(&dst.B, s.mount.Origin, s.guideB, r2.Vec{}, &b)
	unsign(&dst.A, &dst.B)
	set(&dst.Rod, dst.A.Pose.Origin, dst.A.Vel, dst.A.Acc, turned(s.mount.Axis, axis), turn.Vel, turn.Acc)
	dst.Turn, dst.SlideA, dst.SlideB, dst.Margin = turn, a, b, margin
	dst.KneeA, dst.KneeB = rigid.Right, rigid.Right
	if axis.X*s.cos+axis.Y*s.sin < 0 { // ξ of B on its guide
		dst.KneeA = rigid.Left
	}
	if axis.X > 0 { // −ξ of A on its guide
		dst.KneeB = rigid.Left
	}
	return nil
}

// Coefficients returns SlideB and its derivatives by the rod's angle, turn in rad:
// a rigid.Law. Any other output is one rigid.LawOf away. Errors as Solve.
func (s *SliderRod) Coefficients(turn float64) (rigid.Coefficients, error) {
	return harmonicLaw(s.l, 0, s.l/s.sin, turn)
}

// Range returns the rod's angles that have a position: all.
func (s *SliderRod) Range() []rigid.Interval { return wholeTurn(s.l) }

// DeadCentres returns the rod's angles where B comes to rest, −π/2 and π/2, with
// SlideB as Out and First = 0: the rod is square to A's guide there, and A cannot
// be driven by B. A's own are the same about Angle.
func (s *SliderRod) DeadCentres() []rigid.Coefficients {
	if s.l == 0 {
		return nil
	}
	b := s.l / s.sin
	return []rigid.Coefficients{{In: -math.Pi / 2, Out: -b, Second: b}, {In: math.Pi / 2, Out: b, Second: -b}}
}
