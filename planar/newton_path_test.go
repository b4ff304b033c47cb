package planar_test

import (
	"errors"
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"gonum.org/v1/gonum/spatial/r2"
)

// A platform is a plate on three legs, each on a crank of its own: a triad, or a
// group of its kin with slots. A leg is one of
//
//	c  a rod between the tip of the crank and the plate's pin
//	l  a slot in the crank for the plate's pin
//	m  a slot in the plate for the tip of the crank
type platform struct {
	plan
	legs  [3]leg
	start [3]float64 // x, y, angle of the plate
	in    [3]float64
}

type leg struct {
	kind   byte
	pivot  r2.Vec
	crank  float64
	pin    r2.Vec  // in the plate
	length float64 // of the rod
	line   float64 // angle of the slot in its link
	at     r2.Vec  // a point of the slot in its link
}

func newPlatform(random *rand.Rand, kinds string) *platform {
	spread := func() float64 { return 2*random.Float64() - 1 }
	p := &platform{start: [3]float64{spread(), spread(), 3 * spread()}}
	plate := rigid.NewPose(p.start[0], p.start[1], p.start[2])
	for i := range p.legs {
		g := leg{kind: kinds[i], pivot: r2.Vec{X: 2 * spread(), Y: 2 * spread()}, crank: 0.3 + 0.6*random.Float64(), pin: r2.Vec{X: spread(), Y: spread()}, line: 3 * spread()}
		p.in[i] = 3 * spread()
		crank := rigid.NewPose(g.pivot.X, g.pivot.Y, p.in[i])
		tip, pin := crank.Point(r2.Vec{X: g.crank}), plate.Point(g.pin)
		g.length = r2.Norm(r2.Sub(pin, tip))
		switch g.kind {
		case 'l':
			g.at = crank.Local(pin)
		case 'm':
			g.at = plate.Local(tip)
		}
		p.legs[i] = g
	}
	cranks := p.links("crank1", "crank2", "crank3")
	top := p.Link("plate")
	for i, g := range p.legs {
		p.pin(Frame.At(g.pivot.X, g.pivot.Y), cranks[i].At(0, 0))
		switch g.kind {
		case 'c':
			rod := p.Link(fmt.Sprint("rod", i+1))
			p.pin(cranks[i].At(g.crank, 0), rod.At(0, 0))
			p.pin(rod.At(g.length, 0), top.At(g.pin.X, g.pin.Y))
		case 'l':
			p.slot(top.At(g.pin.X, g.pin.Y), cranks[i].Line(g.at.X, g.at.Y, g.line))
		case 'm':
			p.slot(cranks[i].At(g.crank, 0), top.Line(g.at.X, g.at.Y, g.line))
		}
		p.turn(cranks[i], Frame)
	}
	return p
}

func (p *platform) guess() []rigid.Placement {
	out := []rigid.Placement{{}}
	plate := rigid.Placement{X: p.start[0], Y: p.start[1], Angle: p.start[2]}
	for i, g := range p.legs {
		out = append(out, rigid.Placement{X: g.pivot.X, Y: g.pivot.Y, Angle: p.in[i]})
	}
	out = append(out, plate)
	for i, g := range p.legs {
		if g.kind == 'c' {
			tip := out[i+1].Pose().Point(r2.Vec{X: g.crank})
			d := r2.Sub(plate.Pose().Point(g.pin), tip)
			out = append(out, rigid.Placement{X: tip.X, Y: tip.Y, Angle: math.Atan2(d.Y, d.X)})
		}
	}
	return out
}

// miss writes what the legs miss with the plate at q and the cranks at in, and the
// slopes by q: |d|² − l² over 2 l, or the distance from the slot.
func (p *platform) miss(q, in [3]float64) (f [3]float64, j [3][3]float64) {
	plate := rigid.NewPose(0, 0, q[2])
	for i, g := range p.legs {
		crank := rigid.NewPose(g.pivot.X, g.pivot.Y, in[i])
		tip := crank.Point(r2.Vec{X: g.crank})
		r := plate.Point(g.pin)
		pin := r2.Vec{X: q[0] + r.X, Y: q[1] + r.Y}
		switch g.kind {
		case 'c':
			d := r2.Sub(pin, tip)
			f[i] = (r2.Norm2(d) - g.length*g.length) / 2 / g.length
			j[i] = [3]float64{d.X / g.length, d.Y / g.length, r2.Cross(r, d) / g.length}
		case 'l':
			n := rigid.NewPose(0, 0, in[i]+g.line+math.Pi/2).Axis
			d := r2.Sub(pin, crank.Point(g.at))
			f[i] = r2.Dot(n, d)
			j[i] = [3]float64{n.X, n.Y, r2.Cross(r, n)}
		case 'm':
			n := rigid.NewPose(0, 0, q[2]+g.line+math.Pi/2).Axis
			a := plate.Point(g.at)
			d := r2.Sub(tip, r2.Vec{X: q[0] + a.X, Y: q[1] + a.Y})
			f[i] = r2.Dot(n, d) // n turns and the slot's point moves with the plate
			j[i] = [3]float64{-n.X, -n.Y, r2.Dot(r2.Vec{X: -n.Y, Y: n.X}, d) - r2.Cross(a, n)}
		}
	}
	return f, j
}

func det3(j [3][3]float64) float64 {
	return j[0][0]*(j[1][1]*j[2][2]-j[1][2]*j[2][1]) - j[0][1]*(j[1][0]*j[2][2]-j[1][2]*j[2][0]) + j[0][2]*(j[1][0]*j[2][1]-j[1][1]*j[2][0])
}

// solve3 solves j·x = f by Cramer's rule.
func solve3(j [3][3]float64, f [3]float64) (x [3]float64) {
	d := det3(j)
	for k := range x {
		c := j
		for i := range c {
			c[i][k] = f[i]
		}
		x[k] = det3(c) / d
	}
	return x
}

// trace follows the plate along the straight path of the cranks from in to to, in
// steps of which the plate moves by less than a thousandth of what could lead it
// astray. It returns the least |determinant| over the first on the way, and how far
// it came.
func (p *platform) trace(to [3]float64) (q [3]float64, least, done float64) {
	const smallest = 1e-9
	q, least = p.start, 1.0
	at := func(t float64) (in [3]float64) {
		for i := range in {
			in[i] = p.in[i] + t*(to[i]-p.in[i])
		}
		return in
	}
	_, j := p.miss(q, p.in)
	first := det3(j)
	t, h := 0.0, 1e-3
	for t < 1 {
		next := math.Min(t+h, 1)
		in := at(next)
		try, ok, last := q, false, math.Inf(1)
		for range 20 {
			f, j := p.miss(try, in)
			if det3(j)*first <= 0 {
				break
			}
			x := solve3(j, f)
			size := 0.0
			for k := range x {
				try[k] -= x[k]
				size = math.Max(size, math.Abs(x[k])/math.Max(1, math.Abs(try[k])))
			}
			if size > 0.01 || size > last/2 && size > 1e-12 {
				break
			}
			if last = size; size < 1e-12 {
				ok = true
				break
			}
		}
		_, j := p.miss(try, in)
		share := det3(j) / first
		if !ok || !(share > 0) {
			if h /= 2; h < smallest {
				return q, least, t
			}
			continue
		}
		q, t, least = try, next, math.Min(least, share)
		h = math.Min(1.3*h, 1e-3)
	}
	return q, least, 1
}

// A Move of a group of higher class over a long path ends where a fine trace does,
// or says that there is no way.
func TestLongSteps(t *testing.T) {
	paths := 2000
	if testing.Short() {
		paths = 300
	}
	random := rand.New(rand.NewPCG(11, 7))
	moved, stopped, refused, limits := 0, 0, 0, 0
	for n := range paths {
		kinds := []string{"ccc", "ccc", "ccl", "ccm", "cll", "clm", "cmm", "llm", "lmm", "ccc", "lll", "mmm"}[n%12]
		p := newPlatform(random, kinds)
		l, err := New(p.Design)
		if err != nil {
			t.Fatalf("path %d, %s: %v", n, kinds, err)
		}
		in := []rigid.Coordinate{{Pos: p.in[0]}, {Pos: p.in[1]}, {Pos: p.in[2]}}
		s, err := l.Assemble(p.guess(), in...)
		if err != nil {
			t.Errorf("path %d, %s: %v", n, kinds, err)
			continue
		}
		to, far := p.in, 0.4
		if n%2 == 0 {
			far = 1
		}
		for i := range to {
			if n%3 == 0 && i > 0 {
				break // one crank alone
			}
			to[i] += far * (2*random.Float64() - 1)
		}
		if n%3 == 0 {
			to[0] = p.in[0] + math.Copysign(far, to[0]-p.in[0])
		}
		for i := range in {
			in[i] = rigid.Coordinate{Pos: to[i], Vel: random.NormFloat64(), Acc: random.NormFloat64()}
		}
		q, least, done := p.trace(to)
		err = s.Move(in...)
		switch {
		case err == nil && done < 1:
			t.Errorf("path %d, %s: went through a limit at %v of the way", n, kinds, done)
		case err == nil:
			moved++
			m := s.Motion(4).Pose
			off := math.Abs(m.Origin.X-q[0]) + math.Abs(m.Origin.Y-q[1]) + math.Abs(rigid.Wrap(m.Angle()-q[2]))
			if !(off < 1e-9/s.Margin()) {
				t.Errorf("path %d, %s: off by %.3g, margin %.2g, determinant down to %.2g", n, kinds, off, s.Margin(), least)
			}
			if o := open(l, s, in); !(o.pos < 1e-13 && o.vel < 1e-12/s.Margin() && o.acc < 1e-12/s.Margin()) {
				t.Errorf("path %d, %s: %+v, margin %.2g", n, kinds, o, s.Margin())
			}
		case done < 1:
			stopped++
			if errors.Is(err, rigid.ErrUnreachable) {
				limits++
			}
			away := math.Hypot(q[0], q[1]) > 30 // off to infinity, where no two solvers stop alike
			if stop, _ := s.Stop(); !away && math.Abs(stop.Done-done) > 1e-3 {
				t.Errorf("path %d, %s: stopped at %v, the limit is at %v: %v", n, kinds, stop.Done, done, err)
			}
		default:
			refused++
			if s.Margin()*least > 3e-3 {
				t.Errorf("path %d, %s: %v, though the determinant falls only to %.2g of that at margin %.2g", n, kinds, err, least, s.Margin())
			}
		}
	}
	t.Logf("%d moved, %d stopped at a limit, %d told as one, %d refused near one", moved, stopped, limits, refused)
	if limits < stopped*9/10 || moved < paths/2 || stopped < paths/20 || refused > paths/100 {
		t.Errorf("%d moved, %d stopped at a limit, %d refused near one", moved, stopped, refused)
	}
}
