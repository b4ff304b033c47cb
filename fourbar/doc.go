// Package fourbar solves the four-bar linkage: a crank, a coupler and a follower
// on a frame, joined by four revolute joints. For a motion of the crank, of the
// follower or of the coupler it gives the place, velocity and acceleration of
// every link, and so of every point of it by rigid.Motion's At.
//
//	feeder, err := fourbar.New(fourbar.Dimensions{Frame: 0.3, Crank: 0.08, Coupler: 0.28, Follower: 0.2})
//	…
//	var st fourbar.State
//	err = feeder.Solve(&st, rigid.Coordinate{Pos: angle, Vel: speed, Acc: acc})
//	tool := st.Coupler.At(r2.Vec{X: 0.14, Y: 0.05})
//
// [Linkage.Law] is the law of motion of the follower by the crank's angle, with
// extremes, peaks, strokes and the way back.
//
// # Conventions
//
// SI units and radians; x right, y up, angles counter-clockwise. In the mechanism's
// own axes the crank pivot is the origin and the follower pivot (Frame, 0); Mount
// places these axes in the machine. All angles that go in and come out are taken in
// the mechanism's axes, all Motions in the machine's. Each link's frame:
//
//	link      origin              x axis to
//	Crank     its fixed pivot     the crank pin
//	Coupler   the crank pin       the follower pin
//	Follower  its fixed pivot     the follower pin
//
// # Sides
//
// A pose has three sides, each the sign of the sine between the two links that a
// drive does not hold. It picks the pose for that drive, and changes only where
// these two links fall into one line, which is where the driven link stops:
//
//	side    sign of                    picks the pose for
//	Branch  sin(follower − coupler)    Solve, given to New
//	Knee    sin(crank − coupler)       SolveFollower
//	Lean    sin(follower − crank)      SolveCoupler
//
// So along any motion of the linkage a side is constant where the link that it
// belongs to turns fully. With s the shortest, l the longest, p and q the other
// lengths:
//
//	class                                   constant            changes
//	double crank, frame shortest            Branch, Knee, Lean
//	crank-rocker, crank shortest            Branch              Knee, Lean
//	rocker-crank, follower shortest         Knee                Branch, Lean
//	double rocker, coupler shortest         Lean                Branch, Knee
//	triple rocker, s + l > p + q                                Branch, Knee, Lean
//	change point, s + l = p + q             as its class        with all links in one line, where Open and Crossed end
//	Parallel and Contrary                                       Knee, and Contrary's Lean, with all links in one line
//
// # Errors
//
// The solvers return the sentinels of package rigid, cost nothing when they fail,
// and leave the State as it was. A position up to 1e-14 of the longest link beyond
// a limit counts as the limit.
//
// # Accuracy
//
// With ε = 2⁻⁵² an output y of a solve is off by at most 4ε(|y| + Σ|x ∂y/∂x|), x all
// lengths and the motion of the driven link: what rounding the inputs does, times 4.
// It was tested for sizes from 1e-6 to 1e3 m and ratios of lengths up to 1e4.
//
// The results are ideal kinematics of rigid links without play. They are no safety
// function: guard and stop a machine by the codes and the licensed practice of
// where it runs.
package fourbar
