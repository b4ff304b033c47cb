package fourbar_test

import (
	"math/rand/v2"
	"testing"

	"example.com/twopoint/fourbar"
	"example.com/twopoint/rigid"
)

// randomLinkages returns linkages of all classes with random mounts.
func randomLinkages(t testing.TB, n int) []*fourbar.Linkage {
	r := rand.New(rand.NewPCG(4, 2026))
	var all []*fourbar.Linkage
	for len(all) < n {
		x := func() float64 { return 0.1 + 2*r.Float64() }
		d := fourbar.Dimensions{Frame: x(), Crank: x(), Coupler: x(), Follower: x(), Branch: fourbar.Branch(r.IntN(2)),
			Mount: rigid.Placement{X: r.NormFloat64(), Y: r.NormFloat64(), Angle: r.NormFloat64()}}
		if l, err := fourbar.New(d); err == nil {
			all = append(all, l)
		}
	}
	return all
}

// inRange returns a crank angle well inside the first interval of the range.
func inRange(l *fourbar.Linkage, share float64) float64 {
	r := l.Range()[0]
	return r.Lo + (r.Hi-r.Lo)*(0.05+0.9*share)
}
