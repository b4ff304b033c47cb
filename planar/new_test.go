package planar_test

import (
	"fmt"
	"testing"

	. "example.com/twopoint/planar"
)

// chain is a row of so many four-bars, the follower of one the crank of the next.
func chain(loops int) Design {
	var p plan
	crank := p.Link("crank")
	p.pin(Frame.At(0, 0), crank.At(0, 0))
	for i := range loops {
		x := 0.5 * float64(i+1)
		l := p.links(fmt.Sprint("rod", i), fmt.Sprint("follower", i))
		p.pin(crank.At(1.5, 0.1*x), l[0].At(0, 0))
		p.pin(l[0].At(1.3, 0), l[1].At(1.6, 0))
		p.pin(Frame.At(x, 0), l[1].At(0, 0))
		crank = l[1]
	}
	p.turn(1, Frame)
	return p.Design
}

func BenchmarkNew(b *testing.B) {
	for _, loops := range []int{1, 10, 100, 330} {
		d := chain(loops)
		b.Run(fmt.Sprint("chain", loops), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				if _, err := New(d); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
