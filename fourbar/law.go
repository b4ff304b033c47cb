package fourbar

import "example.com/twopoint/rigid"

// Coefficients returns the kinematic coefficients of Swing for Turn at a crank
// angle in rad. Out is continuous along every interval of Range and on over any
// number of turns, and grows by the follower's whole turns for one of the crank.
// Errors are those of Solve for a crank that moves.
func (l *Linkage) Coefficients(turn float64) (rigid.Coefficients, error) {
	var st State
	if err := l.Solve(&st, rigid.Coordinate{Pos: turn, Vel: 1}); err != nil {
		return rigid.Coefficients{}, err
	}
	return rigid.Coefficients{In: turn, Out: st.Swing.Pos, First: st.Swing.Vel, Second: st.Swing.Acc}, nil
}
