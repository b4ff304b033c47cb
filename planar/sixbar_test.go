package planar_test

import (
	"math"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
)

// TestSixBars drives a six-bar of Watt and one of Stephenson at every link on the
// frame in turn, from the position in which its crank has put it, over a small swing
// both ways: the links must go where the crank-driven linkage has them, whatever
// groups the drive makes.
func TestSixBars(t *testing.T) {
	cases, _ := peers(t)
	for _, name := range []string{"sixbar_watt", "sixbar_steph"} {
		p := cases[name]
		l, guess := p.linkage(t)
		byCrank, err := l.Assemble(guess, at(3))
		if err != nil {
			t.Fatal(err)
		}
		for _, driven := range []Link{1, 3, 5, 2, 4} {
			d := l.Design()
			d.Drives = []Drive{Turn{Of: driven, From: Frame}}
			other, err := New(d)
			if err != nil {
				t.Errorf("%s by %d: %v", name, driven, err)
				continue
			}
			if err := byCrank.Move(at(3)); err != nil {
				t.Fatal(err)
			}
			s, err := other.Assemble(placed(l, byCrank), at(byCrank.Turn(driven, Frame).Pos))
			if err != nil {
				t.Errorf("%s by %d: %v", name, driven, err)
				continue
			}
			for k := -20; k <= 20; k++ {
				if err := byCrank.Move(rigid.Coordinate{Pos: 3 + 0.01*float64(k), Vel: 1.7, Acc: -2.1}); err != nil {
					t.Fatal(err)
				}
				in := byCrank.Turn(driven, Frame)
				if err := s.Move(in); err != nil {
					t.Errorf("%s by %d, step %d: %v", name, driven, k, err)
					break
				}
				m := s.Margin()
				if gap := far(l, s, byCrank); !(gap < 1e-13/m) {
					t.Errorf("%s by %d, step %d: %.2g apart, margin %.2g", name, driven, k, gap, m)
				}
				if a := s.Motion(1); !(math.Abs(a.Omega-1.7) < 1e-12/(m*m)) || !(math.Abs(a.Alpha+2.1) < 1e-11/(m*m*m)) {
					t.Errorf("%s by %d, step %d: the crank turns at %v, %v", name, driven, k, a.Omega, a.Alpha)
				}
				if o := open(other, s, []rigid.Coordinate{in}); !(o.pos < 1e-14) {
					t.Errorf("%s by %d, step %d: %+v", name, driven, k, o)
				}
			}
		}
	}
}

// placed returns where a State has the links, as a guess.
func placed(l *Linkage, s *State) []rigid.Placement {
	out := make([]rigid.Placement, len(l.Design().Links))
	for i := range out {
		p := s.Motion(Link(i)).Pose
		out[i] = rigid.Placement{X: p.Origin.X, Y: p.Origin.Y, Angle: p.Angle()}
	}
	return out
}

// wattI and its like drive one link of the six-bar by its angle to the frame. The
// chains are from the theory of machines: in Watt's the two links with three pins
// are neighbours, in Stephenson's they are not.
func wattI(driven int) Design {
	var p plan
	l := p.links("base", "arm", "coupler", "rocker", "link")
	// The frame is a link of two pins, arm and base have three.
	p.pinned([2]Link{0, l[0]}, [2]Link{l[0], l[2]}, [2]Link{l[2], l[1]}, [2]Link{l[1], 0},
		[2]Link{l[0], l[3]}, [2]Link{l[2], l[4]}, [2]Link{l[3], l[4]})
	p.turn(l[driven], Frame)
	return p.Design
}

func wattII(driven int) Design {
	var p plan
	l := p.links("crank", "rod", "beam", "link", "rocker")
	p.pinned([2]Link{0, l[0]}, [2]Link{l[0], l[1]}, [2]Link{l[1], l[2]}, [2]Link{l[2], 0},
		[2]Link{l[2], l[3]}, [2]Link{l[3], l[4]}, [2]Link{l[4], 0})
	p.turn(l[driven], Frame)
	return p.Design
}

func stephensonI(driven int) Design {
	var p plan
	l := p.links("left", "bar", "right", "link", "tie")
	// left and right have three pins each; frame and bar join them, link and tie too.
	p.pinned([2]Link{0, l[0]}, [2]Link{l[0], l[1]}, [2]Link{l[1], l[2]}, [2]Link{l[2], 0},
		[2]Link{l[0], l[3]}, [2]Link{l[3], l[4]}, [2]Link{l[4], l[2]})
	p.turn(l[driven], Frame)
	return p.Design
}

func stephensonII(driven int) Design {
	var p plan
	l := p.links("base", "one", "two", "plate", "crank")
	p.pinned([2]Link{0, l[0]}, [2]Link{l[0], l[1]}, [2]Link{l[0], l[2]}, [2]Link{l[1], l[3]},
		[2]Link{l[2], l[3]}, [2]Link{l[3], l[4]}, [2]Link{l[4], 0})
	p.turn(l[driven], Frame)
	return p.Design
}

func stephensonIII(driven int) Design {
	var p plan
	l := p.links("crank", "plate", "rocker", "link", "lever")
	p.pinned([2]Link{0, l[0]}, [2]Link{l[0], l[1]}, [2]Link{l[1], l[2]}, [2]Link{l[2], 0},
		[2]Link{l[1], l[3]}, [2]Link{l[3], l[4]}, [2]Link{l[4], 0})
	p.turn(l[driven], Frame)
	return p.Design
}
