// Package planar solves any planar linkage: links, joints and drives as plain
// data, solved as Assur groups one after another.
//
// # Use
//
// An in-line crank press, solved at a tick of its control:
//
//	const (
//		frame = planar.Frame + iota
//		crank
//		rod
//		ram
//	)
//	press, err := planar.New(planar.Design{
//		Links: []string{"frame", "crank", "rod", "ram"},
//		Joints: []planar.Joint{
//			planar.Revolute{A: frame.At(0, 0), B: crank.At(0, 0)},
//			planar.Revolute{A: crank.At(0.05, 0), B: rod.At(0, 0)},
//			planar.Revolute{A: rod.At(0.2, 0), B: ram.At(0, 0)},
//			planar.Prismatic{A: frame.Line(0, 0, 0), B: ram.Line(0, 0, 0)},
//		},
//		Drives: []planar.Drive{planar.Turn{Of: crank, From: frame}},
//	})
//	…
//	st, err := press.Assemble([]rigid.Placement{crank: {}, rod: {X: 0.05}, ram: {X: 0.25}}, rigid.Coordinate{})
//	…
//	if err := st.Move(rigid.Coordinate{Pos: 0.1, Vel: 12}); err != nil {
//		… // st is as before
//	}
//	face := st.Point(ram.At(0.03, 0)) // its place, velocity and acceleration
//
// Where the number of links is not known beforehand, Design.Link gives them one by one;
// their guess is then made([]rigid.Placement, len(design.Links)), filled by guess[rod].
//
// # Designs
//
// A [Design] names the links and lists joints and drives between them. Link 0 is the
// frame. A link is no more than its index; l.At(x, y) is a point of link l, and
// l.Line(x, y, angle) a directed line, in the link's own axes, which may lie anywhere
// in it. Lengths are in m, angles in rad counter-clockwise.
//
// Joints:
//
//	Revolute    a pin                         takes 2 freedoms
//	Prismatic   a straight guide              2
//	SlidingPin  a pin in a straight slot      1
//	Fixed       two links made one            3
//	GearPair    gears or a belt, on an arm    1
//	RackPair    a rack and pinion, or a wheel that rolls on a line   1
//	Custom      a Constraint: a cam, a curved slot, one's own        1 an equation
//
// Drives, in the order in which their inputs are given:
//
//	Turn   the angle of a link as seen from another        rad
//	Slide  the displacement of a line along another        m
//	Reach  the distance of two points: a cylinder          m, above 0
//
// [New] checks a design and returns an immutable [Linkage], which goroutines may
// share. There must be as many drives as the linkage has freedoms, its Mobility: by
// Grübler and Kutzbach 3·(links − 1) less what the joints take, and more where
// constraints repeat others.
//
// # Constraints
//
// A [Constraint] is a joint that its user writes: residual, derivatives, and what
// velocities make of the second derivative by time. The package has some: a
// [Roller] or pin on a curve, a [FlatFace] on a cam, a [Follower] of a law of motion,
// which a table may give ([TableLaw]). It enters a Design as [Custom]. The package
// planartest checks one's own. Groups with a constraint are solved by Newton's method,
// and neither Sensitivity nor JSON takes them.
//
// # Groups
//
// New takes the linkage apart into driving links and Assur groups, which are solved
// one after another; Groups gives them. A group of class II, a dyad, is solved in
// closed form; its [Kind] tells its joints. Groups of higher class are solved by
// Newton's method. So the time of a Move grows with the number of groups, and is
// least when a linkage is driven where its groups are dyads.
//
// What is solved together is found exactly. Links that turn together by guides, gears
// and drives share one unknown angle. The rank of the equations is taken at random
// places modulo a prime, which no tolerance blurs: it tells links that hold each
// other doubly while others are free, although their numbers agree.
//
// # Refusals
//
// A [DesignError] names links, joints and drives: those that are tied doubly, those
// that stay free, those that contradict each other. Repeated constraints that hold by
// the dimensions alone are no fault, but cannot be told from faults by counting:
// with a Guess in the Design, a rough position, New finds what can be left out of
// the solution and checks it on every Move. A linkage that is right by its count and
// yet singular everywhere, by its dimensions, is found by Assemble.
//
// # States
//
// Assemble brings a Linkage to a position near a guess and gives a [State], which one
// goroutine owns. Move takes it along with the drives, without allocation, and stays in
// its assembly mode; where it fails the State is as before and Stop tells which group is
// stuck, and how far it got. Inputs are literal: 0 and 2π differ, so a wrapped encoder's
// angle goes through rigid.Nearest. Motion, Point, Turn and Slide read the State, Margin
// tells how far it is from a singular position, Limits how far its drive can go.
//
// Mode names the assembly mode, AssembleMode assembles in a mode by its name, and Modes
// gives all there are; where it may have missed one it ends with ErrIncomplete.
//
// # Analysis
//
//	Sweep                               a State over an interval of its one drive
//	Law                                 an output as a rigid.Law: dead centres, strokes, peaks, the way back
//	Drive, Influences                   the way back with two or three drives: which motions give the tool its own
//	VelocityTerms, AccelerationTerms    base, turning, relative and Coriolis terms in any link
//	Pole                                the instantaneous centre of two links
//	Sensitivity                         derivatives by a [Dimension], of a point; TurnSensitivity, SlideSensitivity
//	WorstCase, RootSumSquare            from sensitivities and tolerances to what a point may be off by
//	Calibrate                           dimensions, mounts and zeros of encoders from a log of readings
//
// A Design is also JSON and text: see its MarshalJSON and String.
//
// Positions and motions are those of ideal rigid links without play: they are no safety
// function, and where machinery can hurt someone local codes and licensed practice
// decide.
package planar
