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

// A ram that drives its press ends where rod and crank lie in one line, also where a
// step of the way lands there exactly; that is no parting of two motions.
func TestEndOfDriveHitExactly(t *testing.T) {
	var d Design
	crank, rod, ram := d.Link("crank"), d.Link("rod"), d.Link("ram")
	d.Joints = []Joint{
		Revolute{A: Frame.At(0, 0), B: crank.At(0, 0)},
		Revolute{A: crank.At(0.1, 0), B: rod.At(0, 0)},
		Revolute{A: rod.At(0.4, 0), B: ram.At(0, 0)},
		Prismatic{A: Frame.Line(0, 0, 0), B: ram.Line(0, 0, 0)},
	}
	d.Drives = []Drive{Slide{Of: ram.Line(0, 0, 0), From: Frame.Line(0, 0, 0)}}
	l, err := New(d)
	if err != nil {
		t.Fatal(err)
	}
	st, err := l.Assemble([]rigid.Placement{{}, {Angle: 1}, {X: 0.05, Y: 0.08, Angle: -0.2}, {X: 0.45}}, rigid.Coordinate{Pos: 0.45})
	if err != nil {
		t.Fatal(err)
	}
	for _, x := range []float64{0.501, 0.52, 0.55, 0.6, 0.7} { // 0.55 in halves lands on 0.5
		if err := st.Move(rigid.Coordinate{Pos: x}); !errors.Is(err, rigid.ErrUnreachable) {
			t.Errorf("Move to %v: %v", x, err)
		}
		_, hi, err := st.Limits(rigid.Interval{Lo: 0.4, Hi: x})
		if err != nil || hi.Kind != DriveEnd || hi.In < 0.5-1e-10 || hi.In > 0.5+1e-10 {
			t.Errorf("Limits up to %v: %+v, %v", x, hi, err)
		}
	}
}
