package rigid_test

import (
	"math/rand/v2"

	"gonum.org/v1/gonum/spatial/r2"

	"example.com/twopoint/rigid"
)

// A random makes test data, the same for the same seed.
type random struct{ *rand.Rand }

func newRandom(seed uint64) random { return random{rand.New(rand.NewPCG(seed, 1))} }

func (r random) number() float64 { return 4*r.Float64() - 2 }

func (r random) vec() r2.Vec { return r2.Vec{X: r.number(), Y: r.number()} }

func (r random) point() rigid.Point { return rigid.Point{Pos: r.vec(), Vel: r.vec(), Acc: r.vec()} }

func (r random) motion() rigid.Motion {
	return rigid.Motion{
		Pose: rigid.NewPose(r.number(), r.number(), 2*r.number()),
		Vel:  r.vec(), Acc: r.vec(), Omega: 2 * r.number(), Alpha: 2 * r.number(),
	}
}
