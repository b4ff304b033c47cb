// Package rolling describes parts that roll on one another: wheels on tracks, gear
// and friction pairs, rack and pinion, belts, and gear trains with planets.
//
// # What there is
//
//   - [Wheel]: on a straight line at any angle, on the outside or inside of a circle, a
//     ring on a peg; driven by its turn, by the travel of its centre, by the rolled arc,
//     or by a belt ([Wheel.SolveBelt]); on a [Track] of any shape ([Wheel.SolveTrack]),
//     which [NewTrack] makes from curvatures; on a moving ground ([WheelState.On]);
//     slipping ([Wheel.SolveSlip], [Wheel.SolveRatio]). [Wheel.Slip] tells from measured
//     turn and travel how it slips.
//   - [Pair]: two gears or friction wheels, external or internal, by radii or teeth.
//   - [Rack]: rack and pinion.
//   - [Belt]: open and crossed belts, toothed belts and chains.
//   - [Train]: any number of gears on fixed and carried axes, any of them driven, solved
//     exactly; [Planet] gives the motion of a planet, [Planetary] checks the numbers of
//     teeth of a stage.
//
// Each has plain dimensions (or a design), a constructor that checks them, and a value
// that never changes, whose Solve writes the motion of all parts into a state of the
// caller's. A state belongs to one goroutine.
//
// # Conventions
//
// SI units and radians; x right, y up, angles and turns positive counter-clockwise. A
// wheel that rolls towards +x turns clockwise, so its turn falls while its travel
// grows. Places are those of the mechanism's own axes, which Mount puts into the
// machine; turns, arcs, travels and slides are counted in the mechanism's own axes from
// the position assembled, in which all of them are 0. No turn is ever wrapped: a solve
// from the output back to the input gives all its revolutions too.
//
// The motion of every point of a part is one call away: st.Wheel.At(local) is a point
// fixed in the wheel, which describes a cycloid (or an epi- or hypocycloid, or a
// trochoid off the rim) while the wheel rolls. The pole of a part and the relative
// centre of two are its Pole and rigid.RelativePole; the pitch point is the relative
// centre of a pair, also at rest.
//
// A solver given zero Vel and Acc answers with the place and zero rates. Rolling has no
// singular position, so states have no margin.
//
// # Many turns
//
// Ratios and angles are kept to 32 digits inside, and ratios of teeth are whole
// fractions, so that after a million turns the result has no error but the rounding of
// the angle given and of the one returned: a float64 near 1e7 rad steps by 2e-9 rad. A
// controller that runs for longer counts whole revolutions as integers and gives the
// turn within one.
//
// # Errors
//
// Constructors return *rigid.DimensionError, several joined by errors.Join; use
// errors.AsType and errors.Is, since Err may wrap its cause with a reason. Solvers return
// the sentinel values of package rigid, allocate nothing, and leave dst as it was when
// they fail. A value that no constructor made gives rigid.ErrInput.
//
// # Cautions
//
// The results are ideal kinematics: rigid parts that touch in a point, without play,
// wear, elastic creep of belts and tyres, or the ripple of speed of a chain. They are
// no measurement and no safety function. Guards, interlocks, brakes and stops of moving
// machinery follow the local codes and the practice of licensed engineers, whatever a
// calculation says; a slip within its limit does not show that a drive is safe.
package rolling
