package planar_test

import (
	"fmt"
	"strings"

	. "example.com/twopoint/planar"
)

// A plan is a design with short ways to add to it.
type plan struct{ Design }

// links appends links by name.
func (p *plan) links(names ...string) []Link {
	out := make([]Link, len(names))
	for i, name := range names {
		out[i] = p.Link(name)
	}
	return out
}

func (p *plan) pin(a, b Attachment) { p.Joints = append(p.Joints, Revolute{A: a, B: b}) }
func (p *plan) guide(a, b Line)     { p.Joints = append(p.Joints, Prismatic{A: a, B: b}) }
func (p *plan) slot(a Attachment, s Line) {
	p.Joints = append(p.Joints, SlidingPin{Pin: a, Slot: s})
}
func (p *plan) turn(of, from Link)  { p.Drives = append(p.Drives, Turn{Of: of, From: from}) }
func (p *plan) slide(of, from Line) { p.Drives = append(p.Drives, Slide{Of: of, From: from}) }
func (p *plan) reach(a, b Attachment) {
	p.Drives = append(p.Drives, Reach{A: a, B: b})
}

// pinned joins links at arbitrary different points: structure alone counts.
func (p *plan) pinned(pairs ...[2]Link) {
	for i, pair := range pairs {
		x := 0.1 + 0.17*float64(i)
		p.pin(pair[0].At(x, x*x), pair[1].At(0.3-x, 0.2+x*x*x))
	}
}

// groups writes the groups of a linkage: links, then the class or the kind.
func groups(l *Linkage) string {
	d := l.Design()
	var text []string
	for _, g := range l.Groups() {
		var names []string
		for _, l := range g.Links {
			names = append(names, d.Links[l])
		}
		class := [...]string{RRR: " RRR", RRP: " RRP", RPR: " RPR", PRP: " PRP", RPP: " RPP"}[g.Kind]
		if g.Class > 2 || g.Class == 2 && g.Kind == NoDyad {
			class = fmt.Sprintf(" %d", g.Class)
		}
		text = append(text, strings.Join(names, "+")+class)
	}
	return strings.Join(text, " | ")
}

func driven(p plan, of, from Link) Design {
	p.turn(of, from)
	return p.Design
}
