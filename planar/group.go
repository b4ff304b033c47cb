package planar

// A Group is an Assur group, or a driving link: links that are solved together, with
// the joints among them and to links solved before. Links fixed to one another count
// as one, and so do links that a drive ties to one another, as cylinder and piston:
// then a group of three links can be a dyad.
type Group struct {
	Links []Link
	// Class is 1 for a driving link, or one that a mesh or guides alone place; 2 for
	// a dyad; else the number of links in the smallest closed contour inside the
	// group, at least 3.
	Class int
	Kind  Kind // of a dyad
}

// A Kind is the kind of a dyad: its joints in order, R for a revolute, P for a
// prismatic one. The middle one joins the two links, the outer ones join them to
// links solved before. A pin in a slot counts as R and P with a link between.
type Kind uint8

// The kinds of dyad. NoDyad is any other group.
const (
	NoDyad Kind = iota
	RRR
	RRP
	RPR
	PRP
	RPP
)
