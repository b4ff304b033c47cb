package rigid_test

import (
	"math"

	"example.com/twopoint/rigid"
)

// through returns f(a), of which the value and the first two derivatives at a.v are
// given: the chain rule.
func (a jet) through(f, d, dd float64) jet { return jet{f, d * a.d, dd*a.d*a.d + d*a.dd} }

func (a jet) sqrt() jet {
	r := math.Sqrt(a.v)
	return a.through(r, 1/(2*r), -1/(4*r*a.v))
}

func (a jet) acos() jet {
	s := math.Sqrt(1 - a.v*a.v)
	return a.through(math.Acos(a.v), -1/s, -a.v/(s*s*s))
}

func (a jet) inv() jet { return a.through(1/a.v, -1/(a.v*a.v), 2/(a.v*a.v*a.v)) }

func constant(v float64) jet { return jet{v: v} }

// lawOf makes a law of a formula in jets. Where that gives NaN, the formula has no value.
func lawOf(f func(x jet) jet) rigid.Law {
	return func(in float64) (rigid.Coefficients, error) {
		out := f(jet{in, 1, 0})
		switch {
		case math.IsNaN(in) || math.IsInf(in, 0):
			return rigid.Coefficients{}, rigid.ErrNotFinite
		case math.IsNaN(out.v):
			return rigid.Coefficients{}, rigid.ErrUnreachable
		case !finiteNumbers(out.d, out.dd):
			return rigid.Coefficients{}, rigid.ErrSingular
		}
		return rigid.Coefficients{In: in, Out: out.v, First: out.d, Second: out.dd}, nil
	}
}

// sliderCrank is the textbook's x = r cos θ + √(l² − (r sin θ − e)²).
func sliderCrank(r, l, e float64) rigid.Law {
	return lawOf(func(x jet) jet {
		s, c := x.sincos()
		h := s.mul(constant(r)).add(constant(-e))
		return c.mul(constant(r)).add(constant(l * l).add(h.mul(h).neg()).sqrt())
	})
}

// fourBar is the follower's angle by the law of cosines in the triangle of diagonal,
// coupler and follower: the diagonal's angle at the follower pivot less or plus the
// triangle's.
func fourBar(d, a, b, c, side float64) rigid.Law {
	return lawOf(func(x jet) jet {
		sin, cos := x.sincos()
		px, py := cos.mul(constant(a)).add(constant(-d)), sin.mul(constant(a))
		square := px.mul(px).add(py.mul(py))
		cosine := square.add(constant(c*c - b*b)).mul(square.sqrt().mul(constant(2 * c)).inv())
		// of the diagonal, less half a turn: d(angle) = (px·dpy − py·dpx)/square
		turn := jet{px.v*py.d - py.v*px.d, px.v*py.dd - py.v*px.dd, 0}.mul(jet{square.v, square.d, 0}.inv())
		diagonal := jet{math.Atan2(-py.v, -px.v), turn.v, turn.d}
		return diagonal.add(cosine.acos().mul(constant(-side))).add(constant(math.Pi))
	})
}

// shifted is l, its input counted from x.
func shifted(l rigid.Law, x float64) rigid.Law { return rigid.Linear(1, x).Then(l) }

// only is l where the input lies in the interval, and has no value elsewhere.
func only(l rigid.Law, i rigid.Interval) rigid.Law {
	return func(in float64) (rigid.Coefficients, error) {
		if !i.Contains(in) {
			return rigid.Coefficients{}, rigid.ErrUnreachable
		}
		return l(in)
	}
}

// polynomial has the given coefficients, that of x⁰ first.
func polynomial(k ...float64) rigid.Law {
	return lawOf(func(x jet) jet {
		y := jet{}
		for i := len(k) - 1; i >= 0; i-- {
			y = y.mul(x).add(constant(k[i]))
		}
		return y
	})
}

// camRise is a lift of 1 over the first part of a turn, a dwell, the lift undone, a
// dwell, each a quarter: lift gives the rise over 0 to 1.
func camRise(lift func(x jet) jet) rigid.Law {
	return lawOf(func(x jet) jet {
		const quarter = math.Pi / 2
		n := math.Floor(x.v / quarter)
		x = x.add(constant(-n * quarter)).mul(constant(1 / quarter))
		switch math.Mod(math.Mod(n, 4)+4, 4) {
		case 0:
			return lift(x)
		case 1:
			return constant(1)
		case 2:
			return constant(1).add(lift(x).neg())
		}
		return jet{}
	})
}

// cycloid is the textbook's x − sin(2πx)/2π.
func cycloid(x jet) jet {
	s, _ := x.mul(constant(2 * math.Pi)).sincos()
	return x.add(s.mul(constant(-1 / (2 * math.Pi))))
}
