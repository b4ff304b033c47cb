// Package rigid describes how rigid bodies and their points move in a plane. It
// solves no mechanism itself: the mechanism packages answer in its types, and one
// question more turns their answer into the place, velocity and acceleration of any
// point, and the terms that make it up.
//
// # Conventions
//
// They hold in the whole library. Lengths are in m, angles in rad, times in s, and
// what is made of them likewise: m/s, rad/s². Degree, RPM and Millimetre are there to
// multiply in and divide out. x points right, y up, and counter-clockwise is
// positive for angles, angular velocities and accelerations. A vector is an
// r2.Vec; v⊥ = (−v.Y, v.X) is v turned a quarter left, and ω×v stands for ω·v⊥.
// Angles that the library makes lie in (−π, π], where it says nothing else; those
// that a motor or an encoder gives may span any number of revolutions, and a turn
// lost is an error of the motion, not a matter of notation. [Wrap], [Nearest] and
// [Interval.Angle] go from one to the other.
//
// # Frames
//
// A frame is where an observer stands; a body is a frame that moves. [Pose] tells
// where a body is, by its origin and the unit vector of its x axis. Every type here
// is meant in one frame, and nothing records which: poses and motions chain only
// where the child is given in the axes of its parent. A point given in a body is
// called local.
//
//	Placement   x, y, angle, as people and files write a pose
//	Pose        place of a body:  Point, Local, Compose, Inverse
//	Point       place, velocity, acceleration of a point:  Path
//	Motion      the same of a body, with ω and α of it
//	Coordinate  the same of one scalar: the angle or travel of a joint
//
// The zero Pose and the zero Motion are the frame itself, at rest.
//
// # From a body to its points
//
// [Motion.At] gives the motion of a point fixed in the body: the two-point equation,
// with r from the body's origin to the point,
//
//	v = v₀ + ω×r
//	a = a₀ + α×r − ω²r
//
// [Motion.Carry] does so for a point that moves in the body, such as the block in a
// slotted lever, and [Motion.VelocityTerms] and [Motion.AccelerationTerms] give the
// terms one by one: base, tangential, normal, relative and Coriolis. [Motion.Observe]
// is the way back: how a point of the frame moves for one who rides on the body.
// [Motion.Compose] and [Motion.Relative] do both for whole bodies.
//
// [Motion.Pole], [RelativePole], [Motion.AccelerationPole] and
// [Motion.InflectionCircle] answer the questions of plane geometry; [Point.Path]
// gives speed, curvature and their directions.
//
// [Guided] finds the motion of a body from one point's motion and the line along
// which another is guided, [Fit] from tracked points that measurement has shaken.
//
// # From an input to an output
//
// [Coefficients] are the first and second derivative of an output of a mechanism by
// its input. They depend on the position alone; [Coefficients.Output] puts in speed
// and acceleration. A [Law] gives them for every position, and can be searched for
// extremes, inverted and chained. [LawOf] makes one of any output, such as the x of
// a gripper on a coupler; [Linear](1/i, 0).Then(law) puts a gear before it, of which
// the motor makes i turns in one of the crank.
//
// # Dead centre and singular position
//
// The two are not the same, and the library keeps them apart. At a dead centre of
// the output its first coefficient is 0: the press is at the end of its stroke, and
// everything is determined. A position is singular for a drive where the closure
// equations do not determine the rates: push the ram of that press at its dead
// centre, and the crank may go either way. What is a dead centre one way is singular
// the other way.
//
// A margin measures how near a singular position is: a sine, 0 at it, at most 1.
// Below [LeastMargin] rates are refused with [ErrSingular]. Above it they are exact,
// and may be huge: a controller holds by a margin and a speed limit of its own.
// Motion asked for without rates, Vel and Acc zero, is answered everywhere.
//
// # Errors
//
// What runs in a loop returns one of five values, without allocation:
// [ErrUnreachable], [ErrSingular], [ErrNoPole], [ErrNotFinite], [ErrInput]. Package
// planar wraps them to name the links that are stuck, and has causes of its own. What
// builds something from dimensions returns a pointer to a [DimensionError] that
// names the one to blame, or several joined; its cause, like that of texts and of laws
// that can't be made, may say more than the value it stands for, so match it by
// errors.Is. A number returned with a nil error is finite. Nothing panics but a nil
// receiver or destination. Methods that return no error give NaN or an infinity where
// they are given one, or overflow.
//
// Structs may gain fields: write literals with keys.
//
// # Files
//
// Dimensions and placements have JSON keys. Plain encoding/json passes over a key
// that it doesn't know, so that a misspelt offset is an offset of 0: read them with a
// json.Decoder after its DisallowUnknownFields.
//
// # Caution
//
// All results are ideal kinematics: rigid links, exact dimensions, joints without
// play, belts that don't slip, no loads, no wear. A real machine is off by its
// tolerances and gives way under load. Nothing here is a safety function: guarding,
// stopping and limits of speed follow the machine's risk assessment, local codes and
// a licensed engineer's judgement, and must hold when this software fails.
//
// Examples follow an invented machine, a press line for roof tiles.
package rigid
