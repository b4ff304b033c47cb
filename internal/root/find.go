package root

import "math"

// A Point is a function at In: its value Out, and its First and Second derivative.
// Where a derivative is not known it is 0: Find then does with what there is.
type Point struct{ In, Out, First, Second float64 }

// ulps is what f may be off for its rounding: four units of float64's precision.
const ulps = 0x1p-50

// Calls is how often Find calls f at most.
const Calls = 2*halvings + 1

// Find returns f at the place between a and b where Out is y; y must lie between
// a.Out and b.Out, and f is to rise or fall all the way. The first error of f ends
// the search.
//
// It steps by the second-order model of f, or of f's inverse (step), as long as
// that stays in the bracket and at least halves the distance from y, and halves the
// bracket where it does not. So it is of third order, also at an end where First
// is 0 or grows without bound, and bounded for any f. It goes on until rounding
// lets it come no nearer to y: where f jumps over y that is beside the jump.
func Find(f func(x float64) (Point, error), a, b Point, y float64) (Point, error) {
	rising := b.Out > a.Out
	noise := ulps * math.Max(math.Abs(a.Out), math.Abs(b.Out))
	best, p := a, a
	if math.Abs(b.Out-y) < math.Abs(a.Out-y) {
		best, p = b, b
	}
	halve := false
	for range Calls {
		if best.Out == y {
			break
		}
		x := a.In + (b.In-a.In)/2
		if !halve {
			x = step(p, y, rising, a.In, b.In, x)
		}
		if x == a.In || x == b.In {
			break
		}
		var err error
		if p, err = f(x); err != nil {
			return Point{}, err
		}
		if (p.Out < y) == rising {
			a = p
		} else {
			b = p
		}
		off, was := math.Abs(p.Out-y), math.Abs(best.Out-y)
		if off <= was {
			best = p
		}
		if halve = !(off <= was/2); halve && off <= noise+ulps*math.Abs(p.First*p.In) {
			break // no nearer than rounding allows
		}
	}
	return best, nil
}

// step returns the next place to try, between a and b, from f at p. With e = Out − y
// and n = e/First the second-order Taylor polynomial of f and of its inverse have
// their roots at
//
//	p − 2n/(1 + √(1 − 2n·Second/First)),  p − n − n²·Second/(2·First)
//
// (Euler's and Chebyshev's iteration). The first is exact for a parabola, as f is
// at an end where First is 0; the second for a square root, as f is at an end where
// First is infinite. Where both lead out of the bracket, it is middle. A step less
// than rounding of p goes to the next float64, which shows whether p is the nearest.
func step(p Point, y float64, rising bool, a, b, middle float64) float64 {
	e, slope := p.Out-y, math.Abs(p.First) // its sign is known, also where rounding hides it
	n := e / slope
	bend := n * p.Second / slope
	d := 2 * n / (1 + math.Sqrt(1-2*bend))
	if math.IsNaN(bend) || math.IsInf(bend, 0) {
		d = math.Copysign(math.Sqrt(2*math.Abs(e/p.Second)), e)
	}
	if !rising {
		d = -d
	}
	x := p.In - d
	if x == p.In {
		x = math.Nextafter(x, a+b-x)
	}
	if a < x && x < b {
		return x
	}
	n = e / p.First
	if x = p.In - n - n*n*p.Second/p.First/2; a < x && x < b {
		return x
	}
	return middle
}
