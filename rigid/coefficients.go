package rigid

// Coefficients are the kinematic coefficients of an output for an input: place of
// both, and the first and second derivative of the output by the input, in their
// units. They depend on the position alone, not on time.
type Coefficients struct{ In, Out, First, Second float64 }

// Output returns the motion of the output for an input at In that moves with vel
// and acc:
//
//	First·vel,  First·acc + Second·vel²
func (c Coefficients) Output(vel, acc float64) Coordinate {
	return Coordinate{Pos: c.Out, Vel: c.First * vel, Acc: c.First*acc + c.Second*vel*vel}
}

// Inverse returns the coefficients of the input for the output:
//
//	1/First,  −Second/First³
//
// ErrSingular at a dead centre of the output, where First is 0, and where a
// result overflows; ErrNotFinite where c itself is not finite.
func (c Coefficients) Inverse() (Coefficients, error) {
	if !finite(c.In, c.Out, c.First, c.Second) {
		return Coefficients{}, ErrNotFinite
	}
	first := 1 / c.First
	inv := Coefficients{In: c.Out, Out: c.In, First: first, Second: -c.Second * first * first * first}
	if !finite(inv.First, inv.Second) {
		return Coefficients{}, ErrSingular
	}
	return inv, nil
}

// Then returns the coefficients of next's output for c's input, where next was
// taken at c's output: the chain rule
//
//	next.First·c.First,  next.Second·c.First² + next.First·c.Second
func (c Coefficients) Then(next Coefficients) Coefficients {
	return Coefficients{
		In:     c.In,
		Out:    next.Out,
		First:  next.First * c.First,
		Second: next.Second*c.First*c.First + next.First*c.Second,
	}
}
