package planar

import (
	"fmt"
	"strings"

	"example.com/twopoint/internal/enum"
	"example.com/twopoint/rigid"
)

// String returns "frame" or, as the link alone doesn't know its name, "link 3".
func (l Link) String() string {
	if l == Frame {
		return "frame"
	}
	return fmt.Sprintf("link %d", int(l))
}

// String returns the link with the point, in m: "link 3 (0.05, 0)".
func (a Attachment) String() string { return naming(Link.String).point(a) }

// String returns the link with the line, in m and rad: "link 3 (0.05, 0) at 1.5 rad".
func (l Line) String() string { return naming(Link.String).line(l) }

// String returns the joint in one line, as all joints and drives do:
// "revolute: frame (0, 0), link 1 (0, 0)".
func (j Revolute) String() string { return naming(Link.String).joint(j) }

// String returns the joint in one line.
func (j Prismatic) String() string { return naming(Link.String).joint(j) }

// String returns the joint in one line.
func (j SlidingPin) String() string { return naming(Link.String).joint(j) }

// String returns the joint in one line.
func (j Fixed) String() string { return naming(Link.String).joint(j) }

// String returns the joint in one line:
// "gear pair: link 1, link 2 on frame, 32:20 teeth, internal".
func (j GearPair) String() string { return naming(Link.String).joint(j) }

// String returns the joint in one line.
func (j RackPair) String() string { return naming(Link.String).joint(j) }

// String returns the drive in one line: "turn: link 1 from frame".
func (m Turn) String() string { return naming(Link.String).drive(m) }

// String returns the drive in one line.
func (m Slide) String() string { return naming(Link.String).drive(m) }

// String returns the drive in one line.
func (m Reach) String() string { return naming(Link.String).drive(m) }

// A naming says what to call links.
type naming func(Link) string

func (n naming) point(a Attachment) string { return fmt.Sprintf("%s (%g, %g)", n(a.Link), a.X, a.Y) }

func (n naming) line(l Line) string {
	return fmt.Sprintf("%s (%g, %g) at %g rad", n(l.Link), l.X, l.Y, l.Angle)
}

func (n naming) joint(j Joint) string {
	switch j := j.(type) {
	case Revolute:
		return "revolute: " + n.point(j.A) + ", " + n.point(j.B)
	case Prismatic:
		return "prismatic: " + n.line(j.A) + ", " + n.line(j.B)
	case SlidingPin:
		return "sliding pin: " + n.point(j.Pin) + " in " + n.line(j.Slot)
	case Fixed:
		return "fixed: " + n.line(j.A) + ", " + n.line(j.B)
	case GearPair:
		return n.gears(j)
	case RackPair:
		text := "rack pair: " + n.point(j.Pinion) + " on " + n.line(j.Rack) + fmt.Sprintf(", radius %g", j.Radius)
		if j.Right {
			text += ", right"
		}
		return text + phase(j.Phase, j.AsAssembled)
	}
	if j, ok := j.(Custom); ok && j.By != nil {
		names := make([]string, 0, 2)
		for _, l := range j.By.Links() {
			names = append(names, n(l))
		}
		return "custom: " + strings.Join(names, ", ") + " by " + calledItself(j.By)
	}
	return fmt.Sprintf("no joint: %T", j)
}

func (n naming) gears(j GearPair) string {
	text := fmt.Sprintf("gear pair: %s, %s on %s", n(j.A), n(j.B), n(j.Arm))
	if j.TeethA != 0 || j.TeethB != 0 {
		text += fmt.Sprintf(", %d:%d teeth", j.TeethA, j.TeethB)
	}
	if j.RadiusA != 0 || j.RadiusB != 0 {
		text += fmt.Sprintf(", radii %g:%g", j.RadiusA, j.RadiusB)
	}
	if j.Internal {
		text += ", internal"
	}
	return text + phase(j.Phase, j.AsAssembled)
}

func phase(p float64, asAssembled bool) string {
	switch {
	case asAssembled:
		return ", as assembled"
	case p != 0:
		return fmt.Sprintf(", phase %g", p)
	}
	return ""
}

func (n naming) drive(m Drive) string {
	switch m := m.(type) {
	case Turn:
		return "turn: " + n(m.Of) + " from " + n(m.From)
	case Slide:
		return "slide: " + n.line(m.Of) + " from " + n.line(m.From)
	case Reach:
		return "reach: " + n.point(m.A) + " to " + n.point(m.B)
	}
	return fmt.Sprintf("no drive: %T", m)
}

// String returns the design with its links by name, a joint or drive a line.
func (d Design) String() string {
	var text strings.Builder
	text.WriteString("links: " + strings.Join(d.Links, ", "))
	for i, j := range d.Joints {
		fmt.Fprintf(&text, "\njoint %d: %s", i, naming(d.name).joint(j))
	}
	for i, m := range d.Drives {
		fmt.Fprintf(&text, "\ndrive %d: %s", i, naming(d.name).drive(m))
	}
	return text.String()
}

var kindNames = enum.Names[Kind]{Type: "Kind", Wrong: rigid.ErrInput,
	Of: []string{NoDyad: "no dyad", RRR: "RRR", RRP: "RRP", RPR: "RPR", PRP: "PRP", RPP: "RPP"}}

// String returns the kind as its joints, "RRR", or "no dyad".
func (k Kind) String() string { return kindNames.String(k) }

// MarshalText returns the text of String; rigid.ErrInput for an unknown kind.
func (k Kind) MarshalText() ([]byte, error) { return kindNames.Text(k) }

// UnmarshalText reads what MarshalText writes; any other text is an error that wraps
// rigid.ErrInput and tells the names.
func (k *Kind) UnmarshalText(text []byte) error { return kindNames.Read(k, text) }

// String returns the links with the kind or the class: "link 2 + link 3, RRR".
func (g Group) String() string { return naming(Link.String).group(g) }

func (n naming) group(g Group) string {
	names := make([]string, len(g.Links))
	for i, l := range g.Links {
		names[i] = n(l)
	}
	text := strings.Join(names, " + ")
	if g.Kind != NoDyad {
		return text + ", " + g.Kind.String()
	}
	return fmt.Sprintf("%s, class %d", text, g.Class)
}

// String returns the groups in the order of solution, with links by name: "crank,
// class 1; rod + ram, RRP".
func (l *Linkage) String() string {
	var all []string
	for _, g := range l.Groups() {
		all = append(all, naming(l.design.name).group(g))
	}
	return strings.Join(all, "; ")
}

// String returns the mode, the drives, the margin and, in m and rad, where the first
// few links are.
func (s *State) String() string {
	if s.l == nil {
		return "no state"
	}
	const most = 8
	var text strings.Builder
	fmt.Fprintf(&text, "mode %q, drives", s.Mode())
	for _, c := range s.now.in {
		fmt.Fprintf(&text, " %g", c.Pos)
	}
	fmt.Fprintf(&text, ", margin %.3g", s.Margin())
	for i, name := range s.l.design.Links[1:] {
		if i == most {
			fmt.Fprintf(&text, "; and %d more", len(s.l.design.Links)-1-most)
			break
		}
		p := s.Motion(Link(i + 1)).Pose
		fmt.Fprintf(&text, "; %s (%.6g, %.6g) at %.6g", name, p.Origin.X, p.Origin.Y, p.Angle())
	}
	return text.String()
}
