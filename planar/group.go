package planar

// A Group is an Assur group: links that are solved together, with the joints
// among them and to links solved before.
type Group struct {
	Links []Link
	Class int  // II for a dyad, written 2; III and higher: links in the smallest closed contour; 1: a driving link
	Kind  Kind // of a dyad
}

// A Kind is the kind of a dyad: its joints in order.
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
