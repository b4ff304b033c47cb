package planar_test

import (
	"errors"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// A cylinder has no length of 0 or less, though its equations close there with the
// rod pointing the other way.
func TestReachIsPositive(t *testing.T) {
	var d Design
	flap := d.Link("flap")
	d.Joints = []Joint{Revolute{A: Frame.At(0.4, 0), B: flap.At(0, 0)}}
	d.Drives = []Drive{Reach{A: Frame.At(0.7, -0.4), B: flap.At(0.5, 0)}}
	l, err := New(d)
	if err != nil {
		t.Fatal(err)
	}
	guess := []rigid.Placement{{}, {X: 0.4, Angle: 1}}
	st, err := l.Assemble(guess, rigid.Coordinate{Pos: 0.6})
	if err != nil {
		t.Fatal(err)
	}
	before := *st.Motion(flap)
	for _, x := range []float64{0, -0.1, -0.6} {
		in := rigid.Coordinate{Pos: x}
		if err := st.Move(in); !errors.Is(err, rigid.ErrUnreachable) {
			t.Errorf("Move to %v: %v", x, err)
		}
		if _, err := l.Assemble(guess, in); !errors.Is(err, rigid.ErrUnreachable) {
			t.Errorf("Assemble at %v: %v", x, err)
		}
		if _, err := l.AssembleMode(st.Mode(), in); !errors.Is(err, rigid.ErrUnreachable) {
			t.Errorf("AssembleMode at %v: %v", x, err)
		}
	}
	if *st.Motion(flap) != before {
		t.Error("a refused Move has moved the State")
	}
}
