package planar

import (
	"fmt"
	"math"
	"slices"
	"strconv"

	"example.com/twopoint/internal/dims"
	"example.com/twopoint/rigid"
)

// validate reports every reference and number of the design that is of no use.
func (d *Design) validate() error {
	c := checker{d: d}
	c.links()
	for i, j := range d.Joints {
		c.joint(i, j)
	}
	for i, m := range d.Drives {
		c.drive("Drives", i, m)
	}
	c.guess()
	if c.OK() {
		if size := d.size(); size < dims.Least {
			c.Add("largest length", size, errSmall)
		}
	}
	if c.OK() {
		return nil
	}
	return &DesignError{Err: sum(c.Faults), Links: c.names(), Joints: c.joints, Drives: c.drives}
}

// Causes for which a number is refused.
var (
	errSmall = dims.Because(rigid.ErrInput, "no two points of a link are farther than 1e-60 m apart")
	errPhase = dims.Because(rigid.ErrInput, "a pair as assembled reads its phase from the position: leave it 0")
	errTeeth = dims.Because(rigid.ErrInput, "no more than 2⁴⁰ teeth are taken")
)

// A checker gathers what is wrong with a design.
type checker struct {
	dims.Faults
	d              *Design
	concerned      []Link
	joints, drives []int
}

// wrong notes a reference of no use.
func (c *checker) wrong(format string, args ...any) {
	c.Faults = append(c.Faults, fmt.Errorf("%w: "+format, append([]any{ErrReference}, args...)...))
}

// names returns the names of the links concerned.
func (c *checker) names() []string { return c.d.names(c.concerned) }

func (c *checker) links() {
	if len(c.d.Links) < 2 {
		c.wrong("a linkage needs a frame and a link that moves")
	}
	seen := map[string]int{}
	for i, name := range c.d.Links {
		if first, ok := seen[name]; ok && name != "" {
			c.wrong("links %d and %d have the same name %s", first, i, strconv.Quote(name))
		}
		seen[name] = i
	}
}

func (c *checker) joint(i int, j Joint) {
	before := len(c.Faults)
	at := fmt.Sprintf("Joints[%d]", i)
	switch j := j.(type) {
	case Revolute:
		c.two(at, j.A.Link, j.B.Link)
		c.point(at+".A", j.A)
		c.point(at+".B", j.B)
	case Prismatic:
		c.two(at, j.A.Link, j.B.Link)
		c.line(at+".A", j.A)
		c.line(at+".B", j.B)
	case SlidingPin:
		c.two(at, j.Pin.Link, j.Slot.Link)
		c.point(at+".Pin", j.Pin)
		c.line(at+".Slot", j.Slot)
	case Fixed:
		c.two(at, j.A.Link, j.B.Link)
		c.line(at+".A", j.A)
		c.line(at+".B", j.B)
	case GearPair:
		c.two(at, j.A, j.B)
		c.two(at, j.A, j.Arm)
		c.two(at, j.B, j.Arm)
		c.gears(at, j)
	case RackPair:
		c.two(at, j.Pinion.Link, j.Rack.Link)
		c.point(at+".Pinion", j.Pinion)
		c.line(at+".Rack", j.Rack)
		c.Length(at+".Radius", j.Radius)
		c.phase(at, j.Phase, j.AsAssembled)
	case Custom:
		c.custom(at, j)
	default:
		c.wrong("%s is no joint but %T: a joint is a value of Revolute, Prismatic, SlidingPin, Fixed, GearPair, RackPair or Custom", at, j)
	}
	if len(c.Faults) > before {
		c.joints = append(c.joints, i)
	}
}

func (c *checker) drive(list string, i int, m Drive) {
	before := len(c.Faults)
	at := fmt.Sprintf("%s[%d]", list, i)
	switch m := m.(type) {
	case Turn:
		c.two(at, m.Of, m.From)
	case Slide:
		c.two(at, m.Of.Link, m.From.Link)
		c.line(at+".Of", m.Of)
		c.line(at+".From", m.From)
	case Reach:
		c.two(at, m.A.Link, m.B.Link)
		c.point(at+".A", m.A)
		c.point(at+".B", m.B)
	default:
		c.wrong("%s is no drive but %T: a drive is a value of Turn, Slide or Reach", at, m)
	}
	if len(c.Faults) > before {
		c.drives = append(c.drives, i)
	}
}

// two refuses links that do not exist or are one.
func (c *checker) two(at string, a, b Link) {
	for _, l := range []Link{a, b} {
		if l < 0 || int(l) >= len(c.d.Links) {
			c.wrong("%s: link %d of %d does not exist", at, l, len(c.d.Links))
			return
		}
	}
	if a == b {
		c.wrong("%s: %s is tied to itself", at, c.d.name(a))
		c.concern(a)
	}
}

func (c *checker) concern(l Link) {
	if !slices.Contains(c.concerned, l) {
		c.concerned = append(c.concerned, l)
	}
}

func (c *checker) point(at string, a Attachment) {
	c.Distance(at+".X", a.X)
	c.Distance(at+".Y", a.Y)
}

func (c *checker) line(at string, l Line) {
	c.Distance(at+".X", l.X)
	c.Distance(at+".Y", l.Y)
	c.Number(at+".Angle", l.Angle)
}

func (c *checker) phase(at string, phase float64, asAssembled bool) {
	c.Number(at+".Phase", phase)
	if asAssembled && phase*0 == 0 && phase != 0 {
		c.Add(at+".Phase", phase, errPhase)
	}
}

func (c *checker) gears(at string, g GearPair) {
	c.phase(at, g.Phase, g.AsAssembled)
	teeth, radii := g.TeethA != 0 || g.TeethB != 0, g.RadiusA != 0 || g.RadiusB != 0
	if !teeth && !radii {
		c.wrong("%s: neither teeth nor radii", at)
	}
	if teeth {
		c.teeth(at+".TeethA", g.TeethA)
		c.teeth(at+".TeethB", g.TeethB)
	}
	if radii {
		c.Length(at+".RadiusA", g.RadiusA)
		c.Length(at+".RadiusB", g.RadiusB)
	}
	if teeth && radii && g.TeethB > 0 && g.RadiusB > 0 {
		byTeeth, byRadii := float64(g.TeethA)/float64(g.TeethB), g.RadiusA/g.RadiusB
		if math.Abs(byTeeth-byRadii) > 1e-9*byTeeth {
			c.Add(at+".RadiusA", g.RadiusA, fmt.Errorf("the radii's ratio %g is not the teeth's %g: %w", byRadii, byTeeth, rigid.ErrInput))
		}
	}
}

func (c *checker) teeth(at string, n int) {
	const most = 1 << 40 // beyond it a ratio of two is no longer exact
	switch {
	case n <= 0:
		c.Add(at, float64(n), rigid.ErrNotPositive)
	case int64(n) > most:
		c.Add(at, float64(n), errTeeth)
	}
}

func (c *checker) guess() {
	if c.d.Guess == nil {
		return
	}
	if len(c.d.Guess) != len(c.d.Links) {
		c.wrong("Guess has %d placements for %d links", len(c.d.Guess), len(c.d.Links))
		return
	}
	for i, g := range c.d.Guess {
		if i == 0 {
			continue // of the frame
		}
		at := fmt.Sprintf("Guess[%d]", i)
		c.Distance(at+".X", g.X)
		c.Distance(at+".Y", g.Y)
		c.Number(at+".Angle", g.Angle)
	}
}

// sum joins errors in one line.
func sum(errs []error) error {
	const most = 8
	all := errs[0]
	for i, err := range errs[1:] {
		if i == most {
			return fmt.Errorf("%w; and %d more", all, len(errs)-1-most)
		}
		all = fmt.Errorf("%w; %w", all, err)
	}
	return all
}

// name returns what to call a link in a message.
func (d *Design) name(l Link) string {
	if l >= 0 && int(l) < len(d.Links) && d.Links[l] != "" {
		return d.Links[l]
	}
	return "link " + strconv.Itoa(int(l))
}

func (d *Design) names(links []Link) []string {
	names := make([]string, len(links))
	for i, l := range links {
		names[i] = d.name(l)
	}
	return names
}
