package planar

import (
	"fmt"
	"math"

	"example.com/twopoint/internal/dims"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A Curve is a smooth plane curve: the point at a parameter t in Pos, in m, and its
// first and second derivative by t in Vel and Acc. It has no corners and doesn't
// stand still anywhere; the second derivative may jump, and accelerations do so then
// too. It keeps no state, so that goroutines may share it.
type Curve func(t float64) rigid.Point

// Polar returns the curve with a radius, in m, for every angle t round the origin, in
// rad: the profile of a cam by angle. It runs counter-clockwise. The point is NaN
// where the radius has no value.
//
//	c = r·e,  c′ = r′·e + r·e⊥,  c″ = (r″ − r)·e + 2r′·e⊥,  e = (cos t, sin t)
func Polar(radius rigid.Law) Curve {
	return func(t float64) rigid.Point {
		k, err := rigid.Coefficients{}, rigid.ErrInput
		if radius != nil {
			k, err = radius(t)
		}
		if err != nil {
			k.Out = math.NaN()
		}
		sin, cos := math.Sincos(t)
		e := r2.Vec{X: cos, Y: sin}
		along := func(out, side float64) r2.Vec {
			return r2.Vec{X: out*e.X - side*e.Y, Y: out*e.Y + side*e.X}
		}
		return rigid.Point{Pos: along(k.Out, 0), Vel: along(k.First, k.Out), Acc: along(k.Second-k.Out, 2*k.First)}
	}
}

// Circle returns a circle about the origin, by the angle; counter-clockwise.
func Circle(radius float64) Curve {
	return Polar(func(in float64) (rigid.Coefficients, error) { return rigid.Coefficients{In: in, Out: radius}, nil })
}

// Ellipse returns the ellipse with the half axes a along x and b along y, by the
// angle whose cosine is x/a; counter-clockwise.
func Ellipse(a, b float64) Curve {
	return func(t float64) rigid.Point {
		sin, cos := math.Sincos(t)
		return rigid.Point{
			Pos: r2.Vec{X: a * cos, Y: b * sin},
			Vel: r2.Vec{X: -a * sin, Y: b * cos},
			Acc: r2.Vec{X: -a * cos, Y: -b * sin},
		}
	}
}

// A Profile is a curve fixed in a link: a slot, or the edge of a cam.
type Profile struct {
	On     Line // axes of the curve: its origin at the line's point, its x axis along the line
	Curve  Curve
	Over   rigid.Interval // of the parameter; a slot has its ends there
	Closed bool           // the curve goes on at Over.Lo where it comes to Over.Hi
}

// check reports what is wrong with a profile.
func (p *Profile) check() error {
	switch width := p.Over.Hi - p.Over.Lo; {
	case p.Curve == nil:
		return fmt.Errorf("%w: a profile without a curve", ErrReference)
	case !(width > 0) || math.IsInf(width, 0):
		return &rigid.DimensionError{Name: "Over", Value: width, Err: rigid.ErrNotPositive}
	}
	if p.Closed {
		a, b := p.Curve(p.Over.Lo).Pos, p.Curve(p.Over.Hi).Pos
		size := 0.0
		for t := range p.sample {
			size = math.Max(size, r2.Norm(p.Curve(t).Pos))
		}
		if gap := r2.Norm(r2.Sub(a, b)); gap > 1e-9*size {
			return fmt.Errorf("%w: the ends of a closed profile are %.3g m apart", ErrInconsistent, gap)
		}
	}
	return finiteLine(p.On)
}

func finiteLine(l Line) error {
	return finiteAll("X", l.X, "Y", l.Y, "Angle", l.Angle)
}

// finiteAll returns an error for the first of named values that is no finite number.
func finiteAll(named ...any) error {
	for i := 0; i < len(named); i += 2 {
		if v := named[i+1].(float64); v*0 != 0 {
			return &rigid.DimensionError{Name: named[i].(string), Value: v, Err: rigid.ErrNotFinite}
		}
	}
	return nil
}

// samples is the number of steps in which a profile is looked at for a first time.
const samples = 360

// sample yields parameters all along.
func (p *Profile) sample(yield func(t float64) bool) {
	for i := range samples + 1 {
		f := float64(i) / samples
		if !yield(p.Over.Lo*(1-f) + p.Over.Hi*f) {
			return
		}
	}
}

// marks returns points all along, in the link.
func (p *Profile) marks() (all []Attachment) {
	at := p.On.pose()
	for t := range p.sample {
		if c := at.Point(p.Curve(t).Pos); c.X*0+c.Y*0 == 0 {
			all = append(all, p.On.Link.At(c.X, c.Y))
		}
	}
	return all
}

// errEnd: beyond the end of a profile that is not closed.
var errEnd = fmt.Errorf("%w: beyond the end of the curve", rigid.ErrUnreachable)

// errFoot: no point of the curve is the nearest, or touches, near the last one.
var errFoot = fmt.Errorf("%w: the curve has no point of contact here", rigid.ErrUnreachable)

// seek finds where g, with its slope, is 0 along the profile, from a parameter near
// there, by Newton's method in steps of limited length.
func (p *Profile) seek(t float64, g func(c rigid.Point) (value, slope float64)) (float64, rigid.Point, error) {
	const turns = 60
	width := p.Over.Hi - p.Over.Lo
	last := math.Inf(1)
	for range turns {
		c := p.Curve(t)
		value, slope := g(c)
		step := -value / slope
		size := math.Abs(step)
		if step != step {
			return t, c, nil // what the curve gives tells
		}
		if size <= 1e-15*width || size <= 1e-9*width && size >= last {
			return t, c, nil
		}
		last = size
		if most := width / 32; size > most {
			step = math.Copysign(most, step)
		}
		if t += step; !p.Closed && !p.Over.Contains(t) {
			end := math.Min(math.Max(t, p.Over.Lo), p.Over.Hi)
			if math.Abs(t-end) > 1e-9*width && (t-step == end || size < 1e-3*width) {
				return t, c, errEnd
			}
			t = end
		}
	}
	return t, rigid.Point{}, errFoot
}

// wrap brings the parameter of a closed profile into Over.
func (p *Profile) wrap(t float64) float64 {
	if width := p.Over.Hi - p.Over.Lo; p.Closed && !p.Over.Contains(t) {
		t -= width * math.Floor((t-p.Over.Lo)/width)
	}
	return t
}

// A contact is two links at a point with a common normal: what a Constraint between
// a profile and a follower comes down to.
//
//	∂Φ by a follower's place = n, by its angle = r×n, r from its origin to the point
//
// and the opposite for the profile's link.
func (e *Evaluation) contact(profile, follower int, at, n r2.Vec) {
	set := func(i int, n r2.Vec) {
		r := r2.Sub(at, e.Links[i].Pose.Origin)
		e.Rows[0].Slopes[i] = Slope{X: n.X, Y: n.Y, Angle: cross(r, n)}
	}
	set(follower, n)
	set(profile, r2.Vec{X: -n.X, Y: -n.Y})
}

// seen returns a point of the second link as one sees it in the axes of a profile
// on the first, and these axes.
func (e *Evaluation) seen(p *Profile, local r2.Vec) (point rigid.Point, axes rigid.Pose) {
	axes = e.Links[0].Pose.Compose(p.On.pose())
	q := e.Links[1].At(local)
	q = e.Links[0].Observe(q)
	own := p.On.pose()
	return rigid.Point{
		Pos: own.Local(q.Pos),
		Vel: back(own.Axis, q.Vel),
		Acc: back(own.Axis, q.Acc),
	}, axes
}

// A Roller is a Constraint: a roller on a profile, on which it rolls or slides. One
// of radius 0 is a pin in a curved slot.
//
// The roller lies right of the profile as one goes along it, that is outside of one
// that runs counter-clockwise round a cam; with Left set it lies left. The guess
// decides for the point of the profile that is nearest; from there it goes on
// continuously, through crossings too.
//
// With n the normal towards the roller and κ the curvature, positive where the
// profile bulges towards the roller, the centre p is at a distance of Radius from the
// nearest point c of the profile, and for a centre that moves along with v, in the
// profile's axes,
//
//	Φ = n·(p − c) − Radius,  Φ″ = n·p″ + (v·t)²·κ/(1 + κ·n·(p − c))
//
// It has no value beyond an end of a profile that is not closed, nor where the
// profile is hollow by less than the Radius, and the roller would not touch it.
type Roller struct {
	Centre Attachment
	Radius float64 // m
	On     Profile
	Left   bool
}

var (
	_ Rememberer = Roller{}
	_ Rememberer = FlatFace{}
)

// Links returns the profile's link and the roller's.
func (r Roller) Links() []Link { return []Link{r.On.On.Link, r.Centre.Link} }

// Rows returns 1.
func (r Roller) Rows() int { return 1 }

// Memory returns 2: whether there is a place before, and its parameter.
func (r Roller) Memory() int { return 2 }

// String returns the constraint in a few words.
func (r Roller) String() string {
	if r.Radius == 0 {
		return "pin in a curved slot"
	}
	return fmt.Sprintf("roller of radius %g", r.Radius)
}

func (r Roller) check() error {
	if err := r.On.check(); err != nil {
		return err
	}
	if r.Radius < 0 || r.Radius > dims.Greatest {
		return &rigid.DimensionError{Name: "Radius", Value: r.Radius, Err: rigid.ErrInput}
	}
	return finiteAll("Radius", r.Radius, "X", r.Centre.X, "Y", r.Centre.Y)
}

func (r Roller) marks() []Attachment { return append(r.On.marks(), r.Centre) }

// Evaluate writes the equation.
func (r Roller) Evaluate(e *Evaluation) error {
	local := r2.Vec{X: r.Centre.X, Y: r.Centre.Y}
	p, axes := e.seen(&r.On, local)
	if e.Memory[0] == 0 {
		e.Memory[1] = r.On.nearest(p.Pos)
	}
	// (p − c)·c′ = 0, with the slope (p − c)·c″ − |c′|² of a nearest point below 0
	t, c, err := r.On.seek(e.Memory[1], func(c rigid.Point) (value, slope float64) {
		d, along := r2.Sub(p.Pos, c.Pos), r2.Norm2(c.Vel)
		return r2.Dot(d, c.Vel), math.Min(r2.Dot(d, c.Acc)-along, -along/8)
	})
	if err != nil {
		return err
	}
	e.Memory[0], e.Memory[1] = 1, r.On.wrap(t)
	speed := r2.Norm(c.Vel)
	along := r2.Vec{X: c.Vel.X / speed, Y: c.Vel.Y / speed}
	n, bulge := r2.Vec{X: along.Y, Y: -along.X}, cross(c.Vel, c.Acc)/(speed*speed*speed)
	if r.Left {
		n, bulge = r2.Vec{X: -n.X, Y: -n.Y}, -bulge
	}
	off := r2.Dot(n, r2.Sub(p.Pos, c.Pos))
	if 1+bulge*off <= 0 {
		return errFoot
	}
	v := r2.Dot(along, p.Vel)
	e.contact(0, 1, e.Links[1].Pose.Point(local), turned(axes.Axis, n))
	e.Rows[0].Residual = off - r.Radius
	e.Rows[0].Bias = r2.Dot(n, p.Acc) + v*v*bulge/(1+bulge*off)
	return nil
}

// nearest returns the parameter of a point near the one of the profile that is
// nearest to p.
func (p *Profile) nearest(to r2.Vec) float64 {
	at, least := p.Over.Lo, math.Inf(1)
	for t := range p.sample {
		if d := r2.Norm2(r2.Sub(p.Curve(t).Pos, to)); d < least {
			at, least = t, d
		}
	}
	return at
}
