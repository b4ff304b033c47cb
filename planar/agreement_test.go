package planar_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/twopoint/fourbar"
	. "example.com/twopoint/planar"
	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
	"gonum.org/v1/gonum/spatial/r2"
)

// differ returns how far two motions are apart: the place over the size, rates over
// the greatest ones.
func differ(a, b *rigid.Motion, size, speed, surge float64) float64 {
	d := func(u, v r2.Vec) float64 { return r2.Norm(r2.Sub(u, v)) }
	return max(d(a.Pose.Origin, b.Pose.Origin)/size, d(a.Pose.Axis, b.Pose.Axis),
		d(a.Vel, b.Vel)/(speed*size), math.Abs(a.Omega-b.Omega)/speed,
		d(a.Acc, b.Acc)/(surge*size), math.Abs(a.Alpha-b.Alpha)/surge)
}

// TestAgreement compares with the packages that solve one mechanism each, down to
// margins of 0.02, by a bound of 8 ε for each loop's condition: its lengths over the
// shortest and the margin, once more by the margin for every derivative.
func TestAgreement(t *testing.T) {
	random := rand.New(rand.NewPCG(11, 4))
	worst, compared := 0.0, 0
	see := func(name string, off, lengths, shortest, margin float64) {
		bound := 8 * 0x1p-52 * lengths / (shortest * margin * margin * margin)
		worst = max(worst, off/bound)
		compared++
		if !(off < bound) {
			t.Errorf("%s: off by %.2g, bound %.2g, margin %.2g", name, off, bound, margin)
		}
	}
	for range 400 {
		scale := math.Pow(10, 6*random.Float64()-4)
		dim := func() float64 { return scale * (0.2 + random.Float64()) }
		in := rigid.Coordinate{Pos: 20 * (random.Float64() - 0.5), Vel: 4 * (random.Float64() - 0.5), Acc: 9 * (random.Float64() - 0.5)}
		a, b, c, d := dim(), dim(), dim(), dim()
		f, err := fourbar.New(fourbar.Dimensions{Frame: d, Crank: a, Coupler: b, Follower: c})
		var fs fourbar.State
		if err == nil && f.Solve(&fs, in) == nil && fs.Margin > 0.02 {
			var p plan
			p.four(a, b, c, r2.Vec{X: d})
			s := mode(t, p.Design, ".+", in)
			speed := max(math.Abs(fs.Crank.Omega), math.Abs(fs.Coupler.Omega), math.Abs(fs.Follower.Omega))
			surge := max(speed*speed, math.Abs(fs.Coupler.Alpha), math.Abs(fs.Follower.Alpha), math.Abs(in.Acc))
			for i, m := range []*rigid.Motion{&fs.Crank, &fs.Coupler, &fs.Follower} {
				see("four-bar", differ(s.Motion(Link(i+1)), m, a+b+c+d, speed, surge), a+b+c+d, min(a, b, c, d), fs.Margin)
			}
		}
		r, l, e := dim()/2, dim(), dim()/4
		k, err := slidercrank.New(slidercrank.Dimensions{Crank: r, Rod: l, Offset: e})
		var ks slidercrank.State
		if err == nil && k.Solve(&ks, in) == nil && ks.Margin > 0.02 {
			var p plan
			n := p.links("crank", "rod", "slider")
			p.pin(Frame.At(0, 0), n[0].At(0, 0))
			p.pin(n[0].At(r, 0), n[1].At(0, 0))
			p.pin(n[1].At(l, 0), n[2].At(0, 0))
			p.guide(Frame.Line(0, e, 0), n[2].Line(0, 0, 0))
			p.turn(n[0], Frame)
			s := mode(t, p.Design, ".+", in)
			speed := max(math.Abs(in.Vel), math.Abs(ks.Rod.Omega))
			surge := max(speed*speed, math.Abs(in.Acc), math.Abs(ks.Rod.Alpha))
			for i, m := range []*rigid.Motion{&ks.Crank, &ks.Rod, &ks.Slider} {
				see("slider-crank", differ(s.Motion(Link(i+1)), m, r+l+e, speed, surge), r+l+e, min(r, l), ks.Margin)
			}
		}
	}
	if compared < 500 {
		t.Fatalf("only %d motions compared", compared)
	}
	t.Logf("%d motions, at worst %.2g of the bound", compared, worst)
}
