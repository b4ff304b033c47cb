package planar

// A Joint ties links together. The joints are the values (not pointers) of Revolute,
// Prismatic, SlidingPin, Fixed, GearPair, RackPair and Custom.
type Joint interface{ joint() }

// A Revolute is a pin: the two points coincide. Where one pin holds several links,
// every link beyond the first takes one Revolute.
type Revolute struct{ A, B Attachment }

// A Prismatic is a straight guide: B's line stays on A's, in the same direction. It
// holds the angle between the two links.
type Prismatic struct{ A, B Line }

// A SlidingPin is a pin that slides in a straight slot, which may turn about it.
type SlidingPin struct {
	Pin  Attachment
	Slot Line
}

// A Fixed joint makes two links one: the two lines coincide, point on point.
type Fixed struct{ A, B Line }

// A GearPair ties the turns of two links on an arm: as seen from Arm,
//
//	turn of B = ∓(A/B) × turn of A + Phase
//
// with the ratio of the teeth or of the radii, + when Internal. Where both are
// given they must agree to 1e-9. Other joints hold the centres; where both are pinned
// to Arm, their distance must be that of the radii, RadiusA + RadiusB or, when
// Internal, the difference, to 1e-9. An open belt is Internal, a crossed belt is not:
// for belts and chains give teeth, which say nothing of the distance. Arm may be the
// frame.
type GearPair struct {
	A, B, Arm        Link
	TeethA, TeethB   int
	RadiusA, RadiusB float64 // m
	Internal         bool
	Phase            float64 // rad
	AsAssembled      bool    // Phase is read from the position assembled, and the field is 0
}

// A RackPair is a pinion on a straight rack, or a wheel that rolls on it: the
// displacement of the pinion's centre along the rack, as seen from the rack, is
//
//	−Radius × (turn of the pinion as seen from the rack) + Phase
//
// with the pinion left of the line; with Right set it lies right, and the sign is
// +. The displacement counts from the line's point; the line is the rack's pitch
// line, or the track. Other joints hold the pinion's centre at a distance of Radius
// from it: where its link is guided on the rack by a Prismatic, that is checked to
// 1e-9.
type RackPair struct {
	Pinion      Attachment // its centre
	Rack        Line
	Radius      float64 // m
	Right       bool
	Phase       float64 // m
	AsAssembled bool    // Phase is read from the position assembled, and the field is 0
}

func (Revolute) joint()   {}
func (Prismatic) joint()  {}
func (SlidingPin) joint() {}
func (Fixed) joint()      {}
func (GearPair) joint()   {}
func (RackPair) joint()   {}

// A Drive is a motion that is given. The drives are the values (not pointers) of
// Turn, Slide and Reach, between any two links.
type Drive interface{ drive() }

// A Turn is a driven angle: of one link as seen from another, in rad.
type Turn struct{ Of, From Link }

// A Slide is a driven displacement, in m: of the point of line Of along the line
// From, as seen from From's link.
type Slide struct{ Of, From Line }

// A Reach is a driven distance of two points, in m, greater than 0: a cylinder with
// its piston, of which neither need be a link.
type Reach struct{ A, B Attachment }

func (Turn) drive()  {}
func (Slide) drive() {}
func (Reach) drive() {}

var (
	_, _, _ Joint = Revolute{}, Prismatic{}, SlidingPin{}
	_, _, _ Joint = Fixed{}, GearPair{}, RackPair{}
	_, _, _ Drive = Turn{}, Slide{}, Reach{}
)
