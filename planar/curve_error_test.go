package planar_test

import (
	"errors"
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A curve by a law that is none has no point, and one of a law with a gap none in it.
func TestPolarWithoutRadius(t *testing.T) {
	gap := func(in float64) (rigid.Coefficients, error) { return rigid.Coefficients{Out: 1}, rigid.ErrUnreachable }
	for _, c := range []Curve{Polar(nil), Polar(gap)} {
		if p := c(1); !math.IsNaN(p.Pos.X) || !math.IsNaN(p.Pos.Y) {
			t.Errorf("%+v", p)
		}
	}
}

// TestBadProfiles refuses the package's own Constraints where their numbers are of no use.
func TestBadProfiles(t *testing.T) {
	good := Profile{On: Link(1).Line(0.02, 0, 0), Curve: Circle(0.05), Over: round, Closed: true}
	with := func(change func(p *Profile)) Profile {
		p := good
		change(&p)
		return p
	}
	nan := math.NaN()
	law := rigid.Linear(1, 0)
	for name, k := range map[string]struct {
		by Constraint
		is error
	}{
		"no curve":    {Roller{Centre: Link(2).At(0, 0), On: with(func(p *Profile) { p.Curve = nil })}, ErrReference},
		"empty":       {Roller{Centre: Link(2).At(0, 0), On: with(func(p *Profile) { p.Over = rigid.Interval{Lo: 1, Hi: 1} })}, rigid.ErrNotPositive},
		"NaN range":   {FlatFace{Face: Link(2).Line(0, 0, 0), On: with(func(p *Profile) { p.Over.Hi = nan })}, rigid.ErrNotPositive},
		"not closed":  {FlatFace{Face: Link(2).Line(0, 0, 0), On: with(func(p *Profile) { p.Over.Hi = 3 })}, ErrInconsistent},
		"NaN line":    {FlatFace{Face: Link(2).Line(0, nan, 0), On: good}, rigid.ErrNotFinite},
		"NaN profile": {Roller{Centre: Link(2).At(0, 0), On: with(func(p *Profile) { p.On.Angle = nan })}, rigid.ErrNotFinite},
		"radius":      {Roller{Centre: Link(2).At(0, 0), Radius: -1, On: good}, rigid.ErrInput},
		"NaN radius":  {Roller{Centre: Link(2).At(0, 0), Radius: nan, On: good}, rigid.ErrNotFinite},
		"NaN centre":  {Roller{Centre: Link(2).At(nan, 0), On: good}, rigid.ErrNotFinite},
		"own link":    {Roller{Centre: Link(1).At(0, 0), On: good}, ErrReference},
		"foreign":     {Roller{Centre: Link(9).At(0, 0), On: good}, ErrReference},
		"no law":      {Follower{Of: Turn{2, 0}, Cam: Turn{1, 0}}, ErrReference},
		"no motion":   {Follower{Of: Turn{2, 2}, Cam: Turn{1, 0}, By: law}, ErrReference},
		"nil motion":  {Follower{Cam: Turn{1, 0}, By: law}, ErrReference},
		"NaN slide":   {Follower{Of: Slide{Link(2).Line(nan, 0, 0), Frame.Line(0, 0, 0)}, Cam: Turn{1, 0}, By: law}, rigid.ErrNotFinite},
		"NaN reach":   {Follower{Of: Reach{Link(2).At(nan, 0), Frame.At(0, 0)}, Cam: Turn{1, 0}, By: law}, rigid.ErrNotFinite},
	} {
		d := wound(nil)
		d.Joints[2] = Custom{By: k.by}
		l, err := New(d)
		if bad := (*DesignError)(nil); l != nil || !errors.Is(err, k.is) || !errors.As(err, &bad) || len(bad.Joints) != 1 || bad.Joints[0] != 2 {
			t.Errorf("%s: %v", name, err)
		}
	}
	// A curve without a number: found where it is asked.
	d := wound(nil)
	d.Joints[2] = Custom{By: Roller{Centre: Link(2).At(0, 0), On: with(func(p *Profile) { p.Curve = func(float64) rigid.Point { return rigid.Point{Pos: r2.Vec{X: nan}} } })}}
	if _, err := mustNew(t, d).Assemble([]rigid.Placement{{}, {Y: 0.3}, {X: 0.1}}, at(0)); !errors.Is(err, rigid.ErrNotFinite) {
		t.Error(err)
	}
}
