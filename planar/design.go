package planar

import "example.com/twopoint/rigid"

// A Design describes a linkage as plain data. A link needs no more than a name:
// its axes are where its attachments and lines put them.
type Design struct {
	Links  []string // names, no two alike; Links[0] is the frame's
	Joints []Joint
	Drives []Drive
	// Guess is a rough position, one placement a link, of which Guess[0] is not
	// read. New needs it only where constraints are redundant.
	Guess []rigid.Placement
}

// Link appends a link and returns it. In a design without links it puts the frame
// first, which is Frame: don't append it yourself. Nor does Link look for a name: in
// a design that was read a link is Link(slices.Index(d.Links, name)).
func (d *Design) Link(name string) Link {
	if len(d.Links) == 0 {
		d.Links = append(d.Links, "frame")
	}
	d.Links = append(d.Links, name)
	return Link(len(d.Links) - 1)
}
