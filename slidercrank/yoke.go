package slidercrank

import (
	"math"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/internal/dims"
	"example.com/twopoint/rigid"
)

// YokeDimensions are those of a ScotchYoke and where it is mounted. The crank pivot
// is the origin of the mechanism's own axes, the yoke slides along their x axis.
// More fields may come: write keyed literals.
type YokeDimensions struct {
	Crank float64         `json:"crank"` // crank pivot to crank pin, m
	Tilt  float64         `json:"tilt"`  // of the slot from the normal of the travel, rad counter-clockwise; usually 0
	Mount rigid.Placement `json:"mount"` // of the mechanism's own axes in the machine
}

// YokeState is the motion of a ScotchYoke at one instant. Yoke has its origin where
// the slot crosses the line of travel through the crank pivot, Block its origin at
// the crank pin, both the mechanism's axes; Crank has its origin at its pivot and
// its x axis to the pin. The Coordinates are in the mechanism's own axes, without
// Mount. More fields may come.
type YokeState struct {
	Crank, Block, Yoke rigid.Motion
	Turn               rigid.Coordinate // of the crank from the line of travel
	Slide              rigid.Coordinate // of the yoke: the x of its origin
	Run                rigid.Coordinate // of the block along the slot from the yoke's origin, positive upwards
	Knee               rigid.Side       // of the perpendicular from the crank pivot on the slot: see SolveSlide
	Margin             float64
}

// A ScotchYoke is a crank whose pin carries a block in a slot of a sliding yoke: the
// double slider-crank chain. The slide is a pure sine of the crank's angle, of
// amplitude Crank/cos Tilt. The zero ScotchYoke gives ErrInput. Any number of
// goroutines may share one.
type ScotchYoke struct {
	given    YokeDimensions
	r        float64
	sin, cos float64 // of Tilt
	mount    rigid.Pose
}

// NewScotchYoke checks the dimensions and returns the yoke. Errors are
// *rigid.DimensionError, joined if several: Crank must be a positive length and
// Tilt must leave the slot out of parallel with the travel, |cos Tilt| > 1e-9, else
// rigid.ErrSingular.
func NewScotchYoke(d YokeDimensions) (*ScotchYoke, error) {
	var f dims.Faults
	f.Length("Crank", d.Crank)
	f.Number("Tilt", d.Tilt)
	f.Mount(d.Mount)
	sin, cos := math.Sincos(d.Tilt)
	if math.Abs(cos) <= parallel {
		f.Add("Tilt", d.Tilt, errAlong)
	}
	if !f.OK() {
		return nil, f.Err()
	}
	return &ScotchYoke{given: d, r: d.Crank, sin: sin, cos: cos, mount: d.Mount.Pose()}, nil
}

// parallel is the sine of the angle between two guides below which they count as
// parallel.
const parallel = 1e-9

// Dimensions returns what NewScotchYoke was given.
func (y *ScotchYoke) Dimensions() YokeDimensions { return y.given }

// Solve writes into dst the motion of all links for a motion of the crank, turn in
// rad counter-clockwise from the line of travel. With τ for Tilt, the pin at
// r·exp(iφ) lies at Run from the yoke's origin:
//
//	Slide = r(cos φ + sin φ tan τ) = r cos(φ − τ)/cos τ,  Run = r sin φ/cos τ
//
// Margin is |cos Tilt|, of the angle between slot and travel. Errors: ErrNotFinite;
// ErrInput for a zero ScotchYoke. An error leaves dst as it was.
func (y *ScotchYoke) Solve(dst *YokeState, turn rigid.Coordinate) error {
	w, al := turn.Vel, turn.Acc
	if turn.Pos*0+w*0+al*0 != 0 {
		return rigid.ErrNotFinite
	}
	if y.r == 0 {
		return rigid.ErrInput
	}
	sin, cos := math.Sincos(turn.Pos)
	slide := harmonic(y.r, y.r*y.sin/y.cos, sin, cos, w, al)
	run := harmonic(0, y.r/y.cos, sin, cos, w, al)
	return y.write(dst, r2.Vec{X: cos, Y: sin}, turn, slide, run, math.Abs(y.cos))
}

// harmonic returns the motion of a·cos φ + b·sin φ.
func harmonic(a, b, sin, cos, w, al float64) rigid.Coordinate {
	x, first := a*cos+b*sin, b*cos-a*sin
	return rigid.Coordinate{Pos: x, Vel: 0 + first*w, Acc: 0 + first*al - x*w*w} // no −0 at rest
}

// SolveSlide writes into dst the motion of all links for a motion of the yoke,
// slide in m as in YokeState. Of the two places where the crank pin can lie in the
// slot, knee picks one by the side of the perpendicular dropped from the crank
// pivot on the slot, taken to the left of the slot's direction: Left is where Run
// is less than at its foot, Right where it is greater, the pin then being less than
// half a turn ahead of Tilt.
//
// Turn.Pos is in (−π, π]; Margin is |sin| of the angle between the crank and the
// slot's normal. Errors: ErrUnreachable beyond the stroke; ErrSingular for rates
// where Margin is below rigid.LeastMargin; ErrNotFinite; ErrInput for a zero
// ScotchYoke or an unknown knee. An error leaves dst as it was.
func (y *ScotchYoke) SolveSlide(dst *YokeState, slide rigid.Coordinate, knee rigid.Side) error {
	xi, back, err := legs(y.r, y.cos, slide, knee)
	if err != nil {
		return err
	}
	// in the axes of the slot's normal the pin is at h = slide·cos τ = r cos(φ − τ), ξ = r sin(φ − τ)
	axis := turned(r2.Vec{X: y.cos, Y: y.sin}, r2.Vec{X: slide.Pos * y.cos / y.r, Y: xi.Pos / y.r})
	turn := rigid.Coordinate{Pos: rigid.Wrap(math.Atan2(axis.Y, axis.X)), Vel: 0 - back.Vel, Acc: 0 - back.Acc}
	return y.write(dst, axis, turn, slide, past(y.sin, slide, xi), math.Abs(xi.Pos)/y.r)
}

// write writes the state, or leaves it and returns ErrNotFinite where a rate
// overflows.
func (y *ScotchYoke) write(dst *YokeState, axis r2.Vec, turn, slide, run rigid.Coordinate, margin float64) error {
	w, al, w2 := turn.Vel, turn.Acc, turn.Vel*turn.Vel
	if (slide.Vel+slide.Acc+run.Vel+run.Acc+w+al+w2+y.r*(math.Abs(al)+w2))*0 != 0 {
		return rigid.ErrNotFinite
	}
	o, u := y.mount.Origin, y.mount.Axis
	crank := turned(u, axis)
	set(&dst.Crank, o, r2.Vec{}, r2.Vec{}, crank, w, al)
	setPinned(&dst.Block, o, r2.Scale(y.r, crank), w, al, u, 0, 0)
	setGuided(&dst.Yoke, o, u, r2.Vec{}, &slide)
	unsign(&dst.Block, &dst.Yoke)
	dst.Turn, dst.Slide, dst.Run, dst.Margin = turn, slide, run, margin
	dst.Knee = rigid.Right
	if axis.Y*y.cos-axis.X*y.sin < 0 {
		dst.Knee = rigid.Left
	}
	return nil
}

// Coefficients returns the yoke's slide and its derivatives by the crank's angle,
// turn in rad: a rigid.Law. Errors as Solve.
func (y *ScotchYoke) Coefficients(turn float64) (rigid.Coefficients, error) {
	return harmonicLaw(y.r, y.r, y.r*y.sin/y.cos, turn)
}

// Range returns the crank's angles that have a position: all.
func (y *ScotchYoke) Range() []rigid.Interval { return wholeTurn(y.r) }

// DeadCentres returns the crank's angles, in (−π, π] and rising, where the yoke
// comes to rest, with the slide as Out and First = 0: the crank is square to the
// slot.
func (y *ScotchYoke) DeadCentres() []rigid.Coefficients {
	if y.r == 0 {
		return nil
	}
	s := y.r / y.cos
	far := rigid.Coefficients{In: rigid.Wrap(y.given.Tilt), Out: s, Second: -s}
	near := rigid.Coefficients{In: rigid.Wrap(y.given.Tilt + math.Pi), Out: -s, Second: s}
	if near.In < far.In {
		return []rigid.Coefficients{near, far}
	}
	return []rigid.Coefficients{far, near}
}

// Stroke returns the yoke's travel between its dead centres in m, 2·Crank/cos Tilt;
// 0 for a zero ScotchYoke.
func (y *ScotchYoke) Stroke() float64 {
	if y.r == 0 {
		return 0
	}
	return math.Abs(2 * y.r / y.cos)
}

// harmonicLaw returns the coefficients of a·cos φ + b·sin φ of a mechanism of the
// given size, 0 if no constructor made it.
func harmonicLaw(size, a, b, turn float64) (rigid.Coefficients, error) {
	if turn*0 != 0 {
		return rigid.Coefficients{}, rigid.ErrNotFinite
	}
	if size == 0 {
		return rigid.Coefficients{}, rigid.ErrInput
	}
	sin, cos := math.Sincos(turn)
	c := harmonic(a, b, sin, cos, 1, 0)
	return rigid.Coefficients{In: turn, Out: c.Pos, First: c.Vel, Second: c.Acc}, nil
}

// wholeTurn returns the range of what turns without limit; nil for the size 0 of
// a mechanism that no constructor made.
func wholeTurn(size float64) []rigid.Interval {
	if size == 0 {
		return nil
	}
	return []rigid.Interval{{Lo: -math.Pi, Hi: math.Pi}}
}
