package slidercrank_test

import (
	"math"
	"testing"

	"example.com/twopoint/rigid"
	"example.com/twopoint/slidercrank"
)

func pressMaker(d slidercrank.Dimensions) maker {
	return func(t *testing.T, scale float64, mirror bool, mount rigid.Placement) machine {
		d := d
		d.Crank, d.Rod, d.Offset, d.Mount = scale*d.Crank, scale*d.Rod, sign(mirror)*scale*d.Offset, mount
		l := newPress(t, d)
		of := func(st *slidercrank.State) sample {
			return sample{[]rigid.Motion{st.Crank, st.Rod, st.Slider}, []rigid.Coordinate{st.Turn, st.Slide}, st.Margin}
		}
		return machine{
			solve: func(turn rigid.Coordinate) (sample, error) {
				var st slidercrank.State
				err := l.Solve(&st, turn)
				return of(&st), err
			},
			back: func(turn rigid.Coordinate) ([]sample, error) {
				var st, again slidercrank.State
				if err := l.Solve(&st, turn); err != nil {
					return nil, err
				}
				err := l.SolveSlide(&again, st.Slide, st.Knee)
				return []sample{of(&again)}, err
			},
			law: l.Coefficients, over: l.Range(), dead: pressDeadCentres(t, l),
		}
	}
}

// pressDeadCentres returns the dead centres as coefficients. With crank r and rod l
// in one line, pin and rod turning at 1 and ∓r/l, the slider's acceleration along the
// crank is −r ∓ r²/l, − stretched and + folded: that on the guide times the cosine of
// the angle between the two.
func pressDeadCentres(t *testing.T, l *slidercrank.Linkage) []rigid.Coefficients {
	outer, inner, err := l.DeadCentres()
	at := func(c slidercrank.DeadCentre, stretched float64) rigid.Coefficients {
		r, rod := l.Dimensions().Crank, l.Dimensions().Rod
		return rigid.Coefficients{In: c.Turn, Out: c.Slide, Second: -(r + stretched*r*r/rod) / math.Cos(c.Turn)}
	}
	if err == rigid.ErrUnreachable {
		return []rigid.Coefficients{at(outer, 1)}
	} else if err != nil {
		t.Fatal(err)
	}
	return []rigid.Coefficients{at(outer, 1), at(inner, -1)}
}
