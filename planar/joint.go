package planar

// A Joint ties links together. The joints are Revolute, Prismatic, SlidingPin,
// Fixed, GearPair and RackPair.
type Joint interface{ joint() }

// A Revolute is a pin: the two points coincide.
type Revolute struct{ A, B Attachment }

// A Prismatic is a straight guide: B's line stays on A's, in the same direction.
type Prismatic struct{ A, B Line }

// A SlidingPin is a pin that slides in a straight slot.
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
// given they must agree to 1e-9. The centres are held by other joints; their
// distance is checked against the radii, where given. An open belt is Internal,
// a crossed belt is not.
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
// +. Another joint holds the distance.
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

// A Drive is a motion that is given. The drives are Turn, Slide and Reach.
type Drive interface{ drive() }

// A Turn is a driven angle: of one link as seen from another, in rad.
type Turn struct{ Of, From Link }

// A Slide is a driven displacement, in m: of the point of line Of along the line
// From, as seen from From's link.
type Slide struct{ Of, From Line }

// A Reach is a driven distance of two points, in m, greater than 0.
type Reach struct{ A, B Attachment }

func (Turn) drive()  {}
func (Slide) drive() {}
func (Reach) drive() {}

var (
	_, _, _ Joint = Revolute{}, Prismatic{}, SlidingPin{}
	_, _, _ Joint = Fixed{}, GearPair{}, RackPair{}
	_, _, _ Drive = Turn{}, Slide{}, Reach{}
)
