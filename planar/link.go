package planar

// A Link is the index of a link in Design.Links; 0 is the frame.
type Link int

// Frame is the link that does not move.
const Frame Link = 0

// At returns the point (x, y) of the link, in m in the link's own axes.
func (l Link) At(x, y float64) Attachment { return Attachment{Link: l, X: x, Y: y} }

// Line returns the line of the link that starts at (x, y), in m, and runs at
// angle, in rad counter-clockwise from the link's x axis.
func (l Link) Line(x, y, angle float64) Line { return Line{Link: l, X: x, Y: y, Angle: angle} }

// An Attachment is a point fixed in a link, in m in the link's own axes.
type Attachment struct {
	Link Link
	X, Y float64
}

// A Line is a directed line fixed in a link: a point in m in the link's own axes,
// and a direction in rad, counter-clockwise from the link's x axis.
type Line struct {
	Link        Link
	X, Y, Angle float64
}
