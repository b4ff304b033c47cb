// Package slidercrank solves the slider-crank, in line or offset, driven by the
// crank or by the slide, and its inversions: the slotted lever, the quick return,
// the oscillating cylinder, the Scotch yoke and the rod with both ends guided.
// Everything is in closed form, without iteration: a solve takes some tens of
// nanoseconds, allocates nothing and never jumps to another assembly.
//
// Units, signs and errors are those of package rigid. Each mechanism has its own
// Dimensions, checked by its New function, and a State, which the caller owns and
// the solvers write: one rigid.Motion for each moving link, so that every point of
// every link is one At away, and the Coordinates of the driving and driven joints.
//
//	press, err := slidercrank.New(slidercrank.Dimensions{Crank: 0.12, Rod: 0.48, Offset: 0.015})
//	…
//	var st slidercrank.State
//	err = press.Solve(&st, rigid.Coordinate{Pos: angle, Vel: speed, Acc: acc})
//	tool := st.Slider.At(r2.Vec{X: 0.03})
//
// rigid.Law(press.Coefficients) is the law of motion of the slide by the crank's
// angle, with extremes, peaks, strokes and the way back; so it is for each inversion.
//
// # The slider-crank
//
// In the mechanism's own axes the crank pivot is the origin and the guide the line
// y = Offset; Slide is the x of the slider pin, Turn the crank's angle from +x. Mount
// places these axes in the machine: a press whose ram goes down has the Angle −90°.
// Turn and Slide don't know of Mount.
//
//	                        crank turns      change point       crank rocks
//	                        Rod > C + |O|    Rod = C + |O|      Rod < C + |O|
//	Range                   whole turn       whole turn         one or two intervals
//	Branch                  never changes    never changes      changes at the ends of Range
//	Knee                    changes at the dead centres, in all three
//	Solve is singular       nowhere          at a quarter turn  at the ends of Range
//	SolveSlide is singular  at the dead centres, in all three
//
// with C and O for Crank and Offset; where Rod = C − |O| two intervals of a rocking
// crank meet at a quarter turn, where Solve is singular too. So a crank drives through the dead centres, and
// Knee tells on which stroke it is; where it can only rock, it comes to rest at the
// ends of Range with the rod square to the guide, and only the slide can drive the
// mechanism through there, to the other Branch. A slide drives from one dead centre
// to the next with Knee constant; at one, the crank may go on either way, which
// something else than the slide decides: its mass, or a second machine.
//
// A dead centre of the slide is a place where it turns back, and all is determined
// for a driving crank; the same place is singular for a driving slide. Margin tells
// how near a singular position is: in Solve |cos| of the rod's angle to the guide, in
// SolveSlide |sin| of the angle between crank and rod.
//
// Zero Vel and Acc ask for the place alone, which is given at singular positions too:
// a press parked at its dead centre is answered.
//
// # Accuracy
//
// An output y of inputs x, the dimensions and the drive's place, rate and
// acceleration, is off by at most 4ε(|y| + Σ|x ∂y/∂x|), ε = 2⁻⁵²; of the slider-crank
// no more than two fifths of that was seen, for cranks of 0.01 to 100 rods and sizes
// of 1e-6 to 1e3 m, down to 1e-6 rad from singular positions. The loop closes within
// 1e-14 of the largest length.
//
// # Caution
//
// These are ideal kinematics: rigid links without clearance, elasticity or wear. They
// are no safety function. Guarding, stopping and the setting of presses follow local
// codes and a licensed engineer's judgement.
//
// Examples follow an invented machine, a press line for roof tiles.
package slidercrank
